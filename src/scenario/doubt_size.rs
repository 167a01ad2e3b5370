//! Doubts about sizes: units that slipped, numbers that are missing, bands that say little.
use super::anchor::AnchorKind;
use super::doubt::{Doubt, doubt};
use super::line::{LineKind, StretchLaw};
use super::model::{Scenario, SubjectKind};
use super::path::inputs;
use crate::quantity::{Measure, Unit, format_measure, format_unit};

/// Shortest line that is not a doubt, m.
const SHORT_LINE_M: f64 = 0.1;
/// Longest lanyard that is not a doubt, m: published sets allow 2 m.
const LONG_LANYARD_M: f64 = 5.0;
/// Stiffest line that is not a doubt, N per unit strain: a steel rope of 40 mm is near 80 MN.
const STIFF_LINE_N: f64 = 1e8;
/// Lowest attachment that is not a doubt, m above the soles: below it are the knees.
const LOW_ATTACHMENT_M: f64 = 0.6;
/// Largest stretch allowance that is not a doubt, m.
const LARGE_ALLOWANCE_M: f64 = 1.0;
/// Largest deployment force for a person that is not a doubt, N: the largest published limit is 8 kN.
const HIGH_DEPLOY_N: f64 = 10_000.0;
/// Largest own limit on the arrest force of a person that is not a doubt, N: that of rope tests with a rigid mass.
const HIGH_LIMIT_N: f64 = 12_000.0;
/// Longest stroke for a person that is not a doubt, m: published sets allow 1.75 m.
const LONG_STROKE_M: f64 = 3.0;
/// Largest onset over deployment force that is not a doubt.
const HIGH_ONSET: f64 = 2.0;
/// How far anchor or harness may give under the weight without a doubt, m.
const SOFT_PART_M: f64 = 0.5;
/// Largest mass of the line over the falling mass that is not a doubt.
const HEAVY_LINE: f64 = 0.1;
/// Largest high end of a band over its low end that is not a doubt.
const WIDE_BAND: f64 = 4.0;
/// Fewest runs of a sample that are not a doubt: none short of 256 is less than 1.5 % (95 % Wilson interval).
const FEW_SAMPLES: u64 = 256;

pub(super) fn doubts(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    found.extend(line(scenario));
    found.extend(stretch(scenario));
    found.extend(missing(scenario));
    found.extend(soft_parts(scenario));
    found.extend(bands(scenario));
    if scenario.subject.kind == SubjectKind::Person {
        found.extend(person(scenario));
        found.extend(absorber(scenario));
    }
    found
}

fn weight_n(scenario: &Scenario) -> f64 {
    scenario.subject.mass.band.high * scenario.gravity.si()
}

fn line(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    let Some(length) = scenario.line.length else { return found };
    let shown = format_measure(&length);
    if length.band.low < SHORT_LINE_M {
        let message = format!("a line of `{shown}` is very short");
        found.push(doubt("line-short", "line.length", message, "below 0.1 m", "check the number and its unit"));
    }
    if scenario.line.kind == LineKind::Lanyard && length.band.high > LONG_LANYARD_M {
        let message = format!("a lanyard of `{shown}` is very long");
        let hint = "check the number and its unit, or state another `line.kind`";
        found.push(doubt("lanyard-long", "line.length", message, "above 5 m", hint));
    }
    if let Some(mass_per_length) = scenario.line.mass_per_length {
        let mass_kg = mass_per_length.band.high * length.band.high;
        if mass_kg > HEAVY_LINE * scenario.subject.mass.band.low {
            let message =
                format!("the line weighs `{}`, the model has no line mass", format_unit(mass_kg, Unit::Kilogram));
            let hint = "check the number; if it is right, have the case solved with the mass of the line";
            found.push(doubt("line-heavy", "line.mass_per_length", message, "a heavy line", hint));
        }
    }
    found
}

/// Where the stiffness stands, and the line's force per unit strain, N: smallest and largest.
fn strain_stiffness(scenario: &Scenario) -> Option<(&'static str, f64, f64)> {
    let length = scenario.line.length;
    match &scenario.line.stretch {
        StretchLaw::Stiffness(k) => {
            let length = length?;
            Some(("line.stiffness", k.band.low * length.band.low, k.band.high * length.band.high))
        }
        StretchLaw::Modulus(modulus) => Some(("line.modulus", modulus.band.low, modulus.band.high)),
        _ => None,
    }
}

fn stretch(scenario: &Scenario) -> Option<Doubt> {
    let (path, least_n, most_n) = strain_stiffness(scenario)?;
    if least_n < weight_n(scenario) {
        let message = "the weight alone stretches the line to more than twice its length".to_owned();
        return Some(doubt("line-soft", path, message, "very soft", "check the number and its unit, such as N for kN"));
    }
    (most_n > STIFF_LINE_N).then(|| {
        let message = format!("the line takes `{}` per unit strain", format_unit(most_n, Unit::Kilonewton));
        doubt("line-stiff", path, message, "stiffer than a thick steel rope", "check the number and its unit")
    })
}

fn missing(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    if scenario.line.strength.is_none() {
        let message = "the breaking strength of the line is not stated".to_owned();
        let hint = "add `strength` from its label or data sheet, less what knots and age take";
        found.push(doubt("strength-missing", "line", message, "no `strength`", hint));
    }
    if scenario.anchor.capacity.is_none() && !matches!(scenario.anchor.kind, AnchorKind::Span(_)) {
        let message = "what the anchor carries is not stated".to_owned();
        let hint = "add `[anchor]` with `capacity` from a test or a structural report";
        found.push(doubt("capacity-missing", "anchor", message, "no `capacity`", hint));
    }
    found
}

fn soft_parts(scenario: &Scenario) -> Vec<Doubt> {
    let anchor = match &scenario.anchor.kind {
        AnchorKind::Sprung(spring) => Some(("anchor-soft", "anchor.stiffness", "the anchor", spring)),
        _ => None,
    };
    let harness = scenario.harness.as_ref().map(|spring| ("harness-soft", "harness.stiffness", "the harness", spring));
    let soft = |(id, path, name, spring): (&'static str, &str, &str, &super::Compliance)| {
        let gives_m = weight_n(scenario) / spring.stiffness.band.low;
        (gives_m > SOFT_PART_M).then(|| {
            let message = format!("{name} gives `{}` under the weight", format_unit(gives_m, Unit::Metre));
            doubt(id, path, message, "very soft", "check the number and its unit, such as N/m for kN/m")
        })
    };
    [anchor, harness].into_iter().flatten().filter_map(soft).collect()
}

fn person(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    let subject = &scenario.subject;
    if let Some(height) = subject.attachment_above_feet
        && height.band.low < LOW_ATTACHMENT_M
    {
        let message = format!("the attachment is `{}` above the feet", format_measure(&height));
        let hint = "it is measured from the soles, standing; check the number and its unit";
        found.push(doubt("attachment-low", "subject.attachment_above_feet", message, "very low on the body", hint));
    }
    let allowance = subject.stretch_allowance;
    if let Some(allowance) = allowance
        && allowance.band.high > LARGE_ALLOWANCE_M
    {
        let message = format!("a stretch allowance of `{}` is large", format_measure(&allowance));
        let hint = "it holds the harness's stretch alone; the clear space wanted is `reserve` of the obstacle";
        found.push(doubt("allowance-large", "subject.stretch_allowance", message, "above 1 m", hint));
    }
    let none = allowance.is_none_or(|allowance| allowance.band.high == 0.0);
    if none && scenario.absorber.is_some() && scenario.harness.is_none() && scenario.place.standing.is_some() {
        let message = "nothing is allowed for the stretch of the harness".to_owned();
        let hint = "add `stretch_allowance` from the maker's clearance sum, or a `[harness]`";
        found.push(doubt("allowance-missing", "subject", message, "no `stretch_allowance`", hint));
    }
    if scenario.fall.free_fall.is_some_and(|fall| fall.band.high == 0.0) {
        let hint = "add the slack of the line and what the body drops before it is taut";
        let message = "a person's free fall is stated as 0 m".to_owned();
        found.push(doubt("free-fall-none", "fall.free_fall", message, "no slack at all", hint));
    }
    found.extend(own_limit(scenario));
    found
}

fn own_limit(scenario: &Scenario) -> Option<Doubt> {
    let limit = scenario.limits.own.iter().find(|limit| limit.key == "arrest_force")?;
    (limit.value.band.high > HIGH_LIMIT_N).then(|| {
        let message = format!("a limit of `{}` on the arrest force of a person", format_measure(&limit.value));
        let hint = "check the number and its unit; published limits are 4 kN to 8 kN in work";
        doubt("arrest-limit-high", "limits.arrest_force", message, "above every published one", hint)
    })
}

fn absorber(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    let Some(absorber) = &scenario.absorber else { return found };
    let path = if absorber.deploy_force.is_some() { "absorber.deploy_force" } else { "absorber.force_table" };
    let [_, first_n, high_n] = absorber.first_force_n();
    if high_n > HIGH_DEPLOY_N {
        let message = format!("the absorber starts at `{}`", format_unit(high_n, Unit::Kilonewton));
        let hint = "check the number and its unit; published limits on a person are 4 kN to 8 kN";
        found.push(doubt("absorber-force-high", path, message, "above every limit on a person", hint));
    }
    if absorber.stroke_m() > LONG_STROKE_M {
        let path = if absorber.stroke.is_some() { "absorber.stroke" } else { "absorber.force_table" };
        let message = format!("a stroke of `{}` is long", format_unit(absorber.stroke_m(), Unit::Metre));
        found.push(doubt("stroke-long", path, message, "above 3 m", "check the number and its unit"));
    }
    if let Some(onset) = absorber.onset_force
        && onset.si() > HIGH_ONSET * first_n
    {
        let message = format!("an onset force of `{}` is more than twice the deployment force", format_measure(&onset));
        found.push(doubt(
            "onset-high",
            "absorber.onset_force",
            message,
            "very high",
            "check both numbers and their units",
        ));
    }
    found
}

fn bands(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    for input in inputs(scenario).iter().filter(|input| input.measure.band.is_wide()) {
        found.extend(band(&input.path, &input.measure, input.field.least >= 0.0));
    }
    if scenario.study.samples.is_some_and(|samples| samples < FEW_SAMPLES) {
        let message = "the sample of the bands is small".to_owned();
        found.push(doubt("samples-few", "study.samples", message, "fewer than 256", "take the key out to draw 4096"));
    }
    found
}

fn band(path: &str, measure: &Measure, positive: bool) -> Vec<Doubt> {
    let (band, shown) = (measure.band, format_measure(measure));
    let mut found = Vec::new();
    if positive && band.low > 0.0 && band.high > WIDE_BAND * band.low {
        let message = format!("the band `{shown}` reaches over more than a factor of four");
        found.push(doubt("band-wide", path, message, "very wide", "find out more about the number, or split the case"));
    }
    if band.typical == band.low || band.typical == band.high {
        let message = format!("the typical value of `{shown}` lies at an end of its band");
        let hint = "state what is typical, and how far it may be off to either side";
        found.push(doubt("band-one-sided", path, message, "one-sided", hint));
    }
    found
}
