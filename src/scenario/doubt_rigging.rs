//! Doubts about what the line runs over and hangs from.
use super::anchor::{AnchorKind, Span, SpanTension};
use super::doubt::{Doubt, doubt};
use super::line::{LineKind, StretchLaw};
use super::model::Scenario;
use crate::quantity::{Unit, format_measure, format_unit};

/// Least sag of a span that is not a doubt: below it the cable tension is tens of times the load.
const LEAST_SAG: f64 = 0.01;
/// Largest strain under pretension that is not a doubt; wire rope yields near it.
const MOST_STRAIN: f64 = 0.02;
/// Longest lock travel that is not a doubt, m: published tests stop the whole fall within about 1.4 m.
const LONG_LOCK_TRAVEL_M: f64 = 1.0;

/// Doubts about line kind, edge, span, faces and tables.
pub(super) fn doubts(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    found.extend(retractable(scenario));
    found.extend(vertical(scenario));
    found.extend(edge(scenario));
    found.extend(faces(scenario));
    found.extend(tables(scenario));
    if let AnchorKind::Span(span) = &scenario.anchor.kind {
        found.extend(tightness(span));
        found.extend(support(scenario, span));
    }
    found
}

fn retractable(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    if scenario.line.kind != LineKind::Retractable {
        return found;
    }
    if let Some(travel) = scenario.line.lock_travel
        && travel.band.high > LONG_LOCK_TRAVEL_M
    {
        let message = format!("a lock travel of `{}` is long", format_measure(&travel));
        let hint = "it is the travel until the line locks, without the braking after it";
        found.push(doubt("lock-travel-long", "line.lock_travel", message, "more than 1 m", hint));
    }
    let height = scenario.subject.attachment_above_feet.or(scenario.subject.underside_below_attachment);
    if let (Some(anchor), Some(standing), Some(height)) = (scenario.place.anchor, scenario.place.standing, height)
        && anchor.si() < standing.si() + height.si()
    {
        let message = "the retractable line is anchored below the attachment".to_owned();
        let hint = "it pays out only once the attachment has passed the anchor: the free fall is larger than the lock \
                    travel; ask its maker";
        found.push(doubt("retractable-below-attachment", "place.anchor", message, "below the attachment", hint));
    }
    found
}

fn vertical(scenario: &Scenario) -> Option<Doubt> {
    (scenario.line.kind == LineKind::Vertical && scenario.line.grab_slide.is_none()).then(|| {
        let hint = "add `grab_slide`, the slide of the grab before it holds; it counts as free fall";
        doubt(
            "grab-slide-missing",
            "line",
            "the grab has no slide, it would hold at once".to_owned(),
            "no `grab_slide`",
            hint,
        )
    })
}

fn edge(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    let Some(edge) = &scenario.place.edge else { return found };
    if scenario.line.kind == LineKind::Retractable {
        let hint = "use one that its maker has tested over such an edge, and state its lock travel from that test";
        let message = "a retractable line runs over an edge".to_owned();
        found.push(doubt("retractable-over-edge", "place.edge", message, "an edge in its way", hint));
    }
    if edge.strength_factor.is_none() {
        let hint = "add `strength_factor` to the edge where the line was not tested over such an edge";
        let message = "the line's strength is judged as if the edge did it no harm".to_owned();
        found.push(doubt("edge-strength-missing", "place.edge", message, "no `strength_factor`", hint));
    }
    if let Some(anchor) = scenario.place.anchor
        && edge.elevation.si() > anchor.si()
    {
        let message = format!(
            "the edge at `{}` is above the anchor at `{}`",
            format_measure(&edge.elevation),
            format_measure(&anchor)
        );
        let hint = "the line would climb to the edge; check both elevations and the datum";
        found.push(doubt("edge-above-anchor", "place.edge.elevation", message, "above the anchor", hint));
    }
    found
}

fn faces(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    let beside =
        |measure: Option<&crate::quantity::Measure>| measure.is_some_and(|m| m.band.low != 0.0 || m.band.high != 0.0);
    let pivot = scenario.place.edge.as_ref().map(|edge| &edge.offset).or(scenario.place.anchor_offset.as_ref());
    let swings = beside(pivot);
    if swings && scenario.faces.is_empty() {
        let hint = "add a `[[face]]` for every wall, column and machine beside the fall line";
        let message = "the subject swings and nothing says what stands beside it".to_owned();
        found.push(doubt("face-missing", "place", message, "no [[face]]", hint));
    }
    if !swings && !scenario.faces.is_empty() {
        let hint = "add `place.anchor_offset` where the anchor is beside the fall line, or take the face out";
        let message = "a fall below the anchor does not swing, no face is judged".to_owned();
        found.push(doubt("face-not-reached", "face.1", message, "not reached", hint));
    }
    let half_width = scenario.subject.half_width;
    if swings && !scenario.faces.is_empty() && half_width.is_none() {
        let hint = "add `half_width`, half the width of the body or load";
        found.push(doubt(
            "half-width-missing",
            "subject",
            "the body has no width, a strike comes late".to_owned(),
            "no `half_width`",
            hint,
        ));
    }
    let reach_m = half_width.map_or(0.0, |width| width.band.high);
    for (index, face) in scenario.faces.iter().enumerate() {
        if face.offset.band.low.abs().min(face.offset.band.high.abs()) <= reach_m {
            let message = format!("face {} at `{}` touches the fall line", index + 1, format_measure(&face.offset));
            let hint = "the offset counts from the fall line to the face; check it against `subject.half_width`";
            found.push(doubt(
                "face-in-reach",
                &format!("face.{}.offset", index + 1),
                message,
                "within the half width",
                hint,
            ));
        }
    }
    found
}

/// Tables that end before the fall is likely to.
fn tables(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    let weight_n = scenario.subject.mass.band.high * scenario.gravity.si();
    let shown = |force_n: f64| format_unit(force_n, Unit::Kilonewton);
    let absorber = scenario.absorber.as_ref();
    if let StretchLaw::Curve(rows) = &scenario.line.stretch
        && let Some((_, last_n)) = rows.last()
    {
        // Without an absorber a fall of no height at all takes twice the weight.
        let least_n = absorber.map_or(2.0 * weight_n, |a| {
            a.onset_force.map_or(a.first_force_n()[2], |onset| onset.band.high) * a.force_factor()
        });
        if *last_n < least_n {
            let message = format!("the line's table ends at `{}`, this fall takes more", shown(*last_n));
            let hint = "add rows up to the forces of the arrest; beyond the last row nothing can be judged";
            found.push(doubt("curve-ends-low", "line.curve", message, "ends too low", hint));
        }
    }
    if let Some(rows) = absorber.and_then(|a| a.force_table.as_ref())
        && let Some((_, last_n)) = rows.last()
        && *last_n <= weight_n
    {
        let message = format!("the absorber's table ends at `{}`, not above the weight", shown(*last_n));
        let hint = "such an absorber cannot stop the fall before its stroke is used up; check forces, mass and units";
        found.push(doubt("absorber-table-below-weight", "absorber.force_table", message, "not above the weight", hint));
    }
    if let Some(factor) = absorber.and_then(|a| a.wet_cold_factor)
        && factor.band.low < 1.0
    {
        let message = format!("a wet and cold factor of `{}` lowers the absorber's forces", format_measure(&factor));
        let hint = "wet and frozen absorbers are known to need more force, not less; check the factor";
        found.push(doubt("wet-factor-below-one", "absorber.wet_cold_factor", message, "below 1", hint));
    }
    found
}

fn tightness(span: &Span) -> Option<Doubt> {
    match &span.tension {
        SpanTension::Sag(sag) if sag.band.low < LEAST_SAG * span.length.si() => {
            let message = format!(
                "a sag of `{}` on a span of `{}` is below 1 %",
                format_measure(sag),
                format_measure(&span.length)
            );
            let hint = "so tight a cable multiplies the load on its supports; check the sag and its unit";
            Some(doubt("span-tight", "anchor.span.sag", message, "very tight", hint))
        }
        SpanTension::Pretension(pretension) if pretension.band.high > MOST_STRAIN * span.modulus.si() => {
            let message =
                format!("a pretension of `{}` stretches the cable by more than 2 %", format_measure(pretension));
            let hint = "check the pretension, the modulus and their units";
            Some(doubt("span-tight", "anchor.span.pretension", message, "very tight", hint))
        }
        _ => None,
    }
}

fn support(scenario: &Scenario, span: &Span) -> Vec<Doubt> {
    let mut found = Vec::new();
    if span.strength.is_none() && span.support_stiffness.is_none() {
        let message = "the span has neither `strength` nor `support_stiffness`".to_owned();
        let hint =
            "add what is known of cable and supports; without them the supports are rigid and the cable is not judged";
        found.push(doubt("span-strength-missing", "anchor.span", message, "cable and supports unknown", hint));
    }
    if scenario.anchor.capacity.is_none() {
        let hint = "add `capacity`, what each end support carries; a span multiplies the load on it";
        found.push(doubt(
            "span-capacity-missing",
            "anchor",
            "the supports of the span have no capacity".to_owned(),
            "no `capacity`",
            hint,
        ));
    }
    found
}
