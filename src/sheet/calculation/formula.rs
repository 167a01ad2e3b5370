//! Formulas of the geometry's steps, by what each step is and the steps before it.
use super::value::digits;

/// A step before: its name and its value, m.
pub struct Before<'a> {
    /// Name: `G3`.
    pub name: &'a str,
    /// What it is.
    pub what: &'a str,
    /// Value, m.
    pub value_m: f64,
}

/// Beginnings of a step's words, its formula with `#` for each step that it takes, and the beginnings of theirs.
type Rule = (&'static str, &'static str, &'static [&'static str]);

const LINE: &[&str] = &["line out at lock", "second line, which", "line from the anchor to the attachment"];
const ANCHOR: &str = "elevation of the anchor";
const START: &str = "elevation of the attachment at the start";
const ABOVE: &str = "anchor above the attachment";
const BESIDE: &str = "anchor beside the fall line";
const DISTANCE: &str = "distance from the anchor";
const BEHIND: &str = "line behind the edge";
const PAST: &str = "line past the edge";
const EDGE: &str = "elevation of the edge";
const EDGE_BESIDE: &str = "edge beside the fall line";
const TAUT: &str = "elevation of the attachment when the line comes taut";
const WHOLE: &str = "the line";

const RULES: &[Rule] = &[
    (ABOVE, "# − #", &[ANCHOR, START]),
    ("distance from the anchor to the attachment, along", "|#|", &[ABOVE]),
    ("distance from the anchor to the attachment: third", "√(#² + #²)", &[ABOVE, BESIDE]),
    ("line out at the start", "# + #", &[DISTANCE, "slack at the start"]),
    ("line out at lock", "# + #", &["line out at the start", "travel of the line until it locks"]),
    ("second line, which", "# + #", &[DISTANCE, "slack of the second line"]),
    (BEHIND, "√((# − #)² + (# − #)²)", &[ANCHOR, EDGE, BESIDE, EDGE_BESIDE]),
    (BEHIND, "√((# − #)² + #²)", &[ANCHOR, EDGE, EDGE_BESIDE]),
    (PAST, "# − #", &[WHOLE, BEHIND]),
    ("depth below the anchor when taut: the length", "#", &[WHOLE]),
    ("depth below the anchor when taut: second", "√(#² − #²)", &[WHOLE, BESIDE]),
    ("depth below the edge when taut: the line", "#", &[PAST]),
    ("depth below the edge when taut: second", "√(#² − #²)", &[PAST, EDGE_BESIDE]),
    (TAUT, "# − #", &[EDGE, "depth below the edge"]),
    (TAUT, "# − #", &[ANCHOR, "depth below the anchor"]),
    ("free fall: from the start down", "# − #", &[START, TAUT]),
    ("free fall: until the line is taut, and the slide", "# + #", &["free fall: from", "slide of the grab"]),
    (
        "free fall: until the grab takes the load, and its slide",
        "# + #",
        &["free fall until the grab takes the load", "slide of the grab"],
    ),
    ("free fall: the line's own, and that deflection", "# + #", &["free fall", "deflection of the lifeline"]),
];

/// The formula of a step and the same with numbers put in; empty where its words say it all.
pub fn formula(what: &str, before: &[Before<'_>]) -> [String; 2] {
    let found = RULES.iter().filter(|rule| what.starts_with(rule.0)).find_map(|rule| {
        let steps: Option<Vec<&Before<'_>>> = rule.2.iter().map(|start| step(start, before)).collect();
        steps.map(|steps| (rule.1, steps))
    });
    let Some((pattern, steps)) = found else { return [String::new(), String::new()] };
    let put = |show: &dyn Fn(&Before<'_>) -> String| {
        let mut parts = pattern.split('#');
        let first = parts.next().unwrap_or("").to_owned();
        parts.zip(&steps).fold(first, |text, (part, step)| format!("{text}{}{part}", show(step)))
    };
    let number = |step: &Before<'_>| {
        if step.value_m < 0.0 { format!("({})", digits(step.value_m)) } else { digits(step.value_m) }
    };
    [put(&|step| step.name.to_owned()), put(&number)]
}

/// The last step whose words start so; the line in whichever words it is worked out.
fn step<'b>(start: &str, before: &'b [Before<'b>]) -> Option<&'b Before<'b>> {
    let starts = |step: &&Before<'_>| {
        if start == WHOLE { LINE.iter().any(|line| step.what.starts_with(line)) } else { step.what.starts_with(start) }
    };
    before.iter().rfind(starts)
}
