//! The planar run: from the geometry to the swing solver and back to numbers.
use super::collect::{absorber, put_energy};
use super::setup::{Setup, allowance, body_below_attachment};
use super::{Elevations, EstimateError, Event, EventKind, Numbers, PlacePoint, PlaneView, StrikeView, log};
use crate::arrest::Settings;
use crate::physics::Layout;
use crate::scenario::{Scenario, SubjectKind};
use crate::swing::{self, Approach, Face, Level, Plane, PlaneOutcome, SwingError};

/// Solves a fall whose pivot lies beside the fall line.
///
/// # Errors
/// As the swing solver.
pub fn solve(scenario: &Scenario, setup: &Setup, layout: &Layout) -> Result<PlaneOutcome, EstimateError> {
    let body = body_below_attachment(&scenario.subject).unwrap_or(0.0) + allowance(&scenario.subject);
    let plane = Plane {
        mass_kg: setup.fall.mass_kg,
        gravity_m_per_s2: setup.fall.gravity_m_per_s2,
        path: setup.fall.path.clone(),
        pivot: swing::Point::new(layout.pivot.offset_m, layout.pivot.elevation_m),
        start: swing::Point::new(0.0, layout.attachment_start_m),
        free_length_m: layout.free_length_m,
        body_below_m: body,
        half_width_m: scenario.subject.half_width.map_or(0.0, |w| w.si()),
        levels: scenario
            .obstacles
            .iter()
            .map(|o| {
                let (from_m, to_m) =
                    o.extent.map_or((f64::NEG_INFINITY, f64::INFINITY), |(from, to)| (from.si(), to.si()));
                Level { top_m: o.top.si(), from_m, to_m }
            })
            .collect(),
        faces: scenario
            .faces
            .iter()
            .map(|f| Face { offset_m: f.offset.si(), bottom_m: f.bottom.si(), top_m: f.top.si() })
            .collect(),
    };
    let limits = Settings::default();
    let settings =
        swing::Settings { time_limit_s: limits.time_limit_s, levels_n: limits.levels_n, ..swing::Settings::default() };
    Ok(swing::solve(&plane, &settings)?)
}

impl From<SwingError> for EstimateError {
    fn from(error: SwingError) -> Self {
        match error {
            SwingError::Energy { residual } => Self::Energy { residual },
            SwingError::Path(error) => error.into(),
            SwingError::LineTooShort { .. } => Self::Geometry {
                message: error.to_string(),
                hint: "lengthen the line, or check the anchor and the attachment height".to_owned(),
                path: "line.length",
            },
            error => Self::Numerical { message: error.to_string() },
        }
    }
}

/// Every number that applies to a planar run.
pub fn numbers(
    scenario: &Scenario,
    setup: &Setup,
    outcome: &PlaneOutcome,
    elevations: Option<&Elevations>,
    strikes: &[StrikeView],
) -> Numbers {
    let mut n = Numbers::default();
    let fall = &setup.fall;
    let weight = fall.weight_n();
    n.put("free_fall_distance", outcome.free_fall_m);
    n.put_some("fall_factor", scenario.line.length.map(|l| outcome.free_fall_m / l.si()));
    n.put("fall_energy", weight * outcome.free_fall_m);
    n.put("speed_at_taut", outcome.speed_at_taut_m_per_s);
    n.put("time_taut", outcome.time_taut_s);
    if let Some(peak) = outcome.peak_force {
        n.put("arrest_force_peak", peak.value);
        n.put("time_peak_force", peak.time_s);
        n.put("anchor_force_peak", peak.value);
        n.put("deceleration_peak", (peak.value - weight) / weight);
    }
    n.put("time_above_4kn", outcome.time_above_s[0]);
    n.put("time_above_6kn", outcome.time_above_s[1]);
    n.put("line_elongation_peak", outcome.line_elongation_peak_m);
    n.put("other_elongation_peak", outcome.other_elongation_peak_m);
    absorber(&mut n, fall, outcome.deployed_m, outcome.stroke_used_up);
    n.put("time_lowest", outcome.lowest.time_s);
    heights(&mut n, scenario, outcome, elevations);
    n.put_some("time_first_slack", outcome.time_first_slack_s);
    swing_numbers(&mut n, outcome);
    if let Some(first) = strikes.first() {
        n.put("strike_speed", first.speed_m_per_s);
        n.put("strike_drop_equivalent", first.drop_equivalent_m);
    }
    approaches(&mut n, scenario, outcome);
    put_energy(&mut n, &outcome.energy, outcome.energy_residual);
    n
}

fn heights(n: &mut Numbers, scenario: &Scenario, outcome: &PlaneOutcome, elevations: Option<&Elevations>) {
    let Some(elevations) = elevations else { return };
    n.put("lowest_attachment", elevations.attachment_lowest_m);
    match scenario.subject.kind {
        SubjectKind::Person => n.put("lowest_foot", elevations.lowest_point_m()),
        SubjectKind::Load => n.put("lowest_underside", elevations.lowest_point_m()),
    }
    for (obstacle, approach) in scenario.obstacles.iter().zip(&outcome.levels) {
        let Some(clearance) = approach.gap_m else { continue };
        n.put(&format!("clearance.{}", obstacle.id()), clearance);
        n.put(&format!("margin.{}", obstacle.id()), clearance - obstacle.reserve.map_or(0.0, |r| r.si()));
    }
}

fn swing_numbers(n: &mut Numbers, outcome: &PlaneOutcome) {
    n.put("swing_drop", outcome.swing_drop_m);
    n.put("swing_speed_lowest", outcome.lowest.speed_m_per_s);
    n.put("swing_angle_peak", outcome.angle_at_taut_rad.abs().max(outcome.angle_at_end_rad.abs()));
    n.put("swing_offset_peak", outcome.reach_m);
}

fn approaches(n: &mut Numbers, scenario: &Scenario, outcome: &PlaneOutcome) {
    let levels = scenario.obstacles.iter().map(crate::scenario::Obstacle::id).zip(&outcome.levels);
    let faces = scenario.faces.iter().map(crate::scenario::Face::id).zip(&outcome.faces);
    for (id, approach) in levels.chain(faces) {
        n.put_some(&format!("closest_approach.{id}"), approach.gap_m);
    }
}

/// Elevations of a planar run; the rest position is plumb below the pivot.
pub fn elevations(scenario: &Scenario, setup: &Setup, layout: &Layout, outcome: &PlaneOutcome) -> Option<Elevations> {
    let body = body_below_attachment(&scenario.subject)?;
    let hang = setup.fall.hang_travel_m(outcome.deployed_m);
    Some(Elevations {
        anchor_m: Some(layout.anchor.elevation_m),
        standing_m: scenario.place.standing?.si(),
        attachment_start_m: layout.attachment_start_m,
        attachment_taut_m: outcome.taut_at.elevation_m,
        attachment_lowest_m: outcome.lowest.at.elevation_m,
        attachment_rest_m: layout.pivot.elevation_m - layout.free_length_m - hang,
        lowest_point_below_attachment_m: body + allowance(&scenario.subject),
        body_below_attachment_m: body,
    })
}

/// For screens and sheets.
pub fn view(scenario: &Scenario, layout: &Layout, outcome: &PlaneOutcome) -> PlaneView {
    let place = |p: swing::Point| PlacePoint { offset_m: p.offset_m, elevation_m: p.elevation_m };
    let stand = |p: crate::physics::Point| PlacePoint { offset_m: p.offset_m, elevation_m: p.elevation_m };
    PlaneView {
        anchor: stand(layout.anchor),
        pivot: stand(layout.pivot),
        edge: scenario.place.edge.as_ref().map(|_| stand(layout.pivot)),
        start: PlacePoint { offset_m: 0.0, elevation_m: layout.attachment_start_m },
        taut: place(outcome.taut_at),
        lowest: place(outcome.lowest.at),
        strikes: strikes(scenario, outcome),
    }
}

/// Every strike, the first one first.
pub fn strikes(scenario: &Scenario, outcome: &PlaneOutcome) -> Vec<StrikeView> {
    let levels = scenario.obstacles.iter().map(|o| (&o.name, false)).zip(&outcome.levels);
    let faces = scenario.faces.iter().map(|f| (&f.name, true)).zip(&outcome.faces);
    let strike = |((name, is_face), approach): ((&String, bool), &Approach)| {
        let s = approach.strike.as_ref()?;
        Some(StrikeView {
            name: name.clone(),
            is_face,
            time_s: s.time_s,
            at: PlacePoint { offset_m: s.at.offset_m, elevation_m: s.at.elevation_m },
            speed_m_per_s: s.speed_m_per_s,
            drop_equivalent_m: s.drop_equivalent_m,
        })
    };
    let mut all: Vec<_> = levels.chain(faces).filter_map(strike).collect();
    all.sort_by(|a, b| a.time_s.total_cmp(&b.time_s));
    all
}

/// The event log of a planar run.
pub fn events(setup: &Setup, outcome: &PlaneOutcome, strikes: &[StrikeView]) -> Vec<Event> {
    let taut_m = outcome.taut_at.elevation_m;
    let at = |kind, time_s: f64| {
        let i = outcome.trajectory.at(time_s);
        Event {
            time_s,
            kind,
            travel_m: taut_m - i.at.elevation_m,
            speed_m_per_s: i.velocity_m_per_s[0].hypot(i.velocity_m_per_s[1]),
            force_n: i.force_n,
            deployed_m: i.deployed_m,
            name: None,
        }
    };
    let mut events = vec![at(EventKind::Start, 0.0)];
    events.extend(log::happenings(setup, &outcome.happenings, &at));
    events.extend(outcome.peak_force.map(|p| Event { force_n: p.value, ..at(EventKind::PeakForce, p.time_s) }));
    events.push(at(EventKind::Lowest, outcome.lowest.time_s));
    events.extend(strikes.iter().map(|s| {
        let kind = if s.is_face { EventKind::StrikeFace } else { EventKind::StrikeLevel };
        Event { speed_m_per_s: s.speed_m_per_s, name: Some(s.name.clone()), ..at(kind, s.time_s) }
    }));
    let end = match outcome.ended {
        swing::Ended::Reversal | swing::Ended::Rebound => EventKind::TurnsBack,
        swing::Ended::TimeLimit => EventKind::TimeLimit,
    };
    log::in_order(events, at(end, outcome.end_s))
}
