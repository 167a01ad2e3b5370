//! An audit as SARIF 2.1.0 (OASIS), in pieces: the head, the results of one file after the other, the end.
use super::audit::{Audited, Finding};
use super::audit_table::{audit_rules, what_to_do};
use super::band_words::worst_words;
use super::words::margin_words;
use super::{CAUTION_LINE, CAUTIONS, Report};
use crate::margin::{Margin, Verdict};
use crate::quantity::UnitSystem;
use crate::scenario::{Fault, Faults, Places, Review, Reviewed, Severity, places};
use percent_encoding::{AsciiSet, NON_ALPHANUMERIC, percent_encode};
use serde_json::{Value, json};
use sha2::{Digest, Sha256};
use std::collections::HashMap;
use std::fmt::Write;
use std::path::{Component, Path};

/// Where the standard keeps its schema.
const SCHEMA: &str = "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json";
/// What a segment of a path may hold as it is (RFC 3986, 2.3).
const KEPT: &AsciiSet = &NON_ALPHANUMERIC.remove(b'-').remove(b'.').remove(b'_').remove(b'~');

/// The file's place as a URI reference: relative as the path is, percent-encoded byte by byte.
///
/// # Reference
/// RFC 3986 (2005), 2.1 and 4.2.
#[must_use]
pub fn file_uri(path: &Path) -> String {
    let mut segments: Vec<String> = Vec::new();
    for component in path.components() {
        match component {
            Component::CurDir | Component::RootDir => {}
            Component::ParentDir => segments.push("..".to_owned()),
            Component::Prefix(prefix) => segments.push(encoded(prefix.as_os_str().as_encoded_bytes())),
            Component::Normal(name) => segments.push(encoded(name.as_encoded_bytes())),
        }
    }
    let joined = segments.join("/");
    if path.is_absolute() { format!("file:///{joined}") } else { joined }
}

fn encoded(bytes: &[u8]) -> String {
    percent_encode(bytes, KEPT).to_string()
}

/// Everything before the first result. Results follow with a comma between two.
#[must_use]
pub fn sarif_open() -> String {
    let driver = json!({
        "name": "underfoot",
        "version": env!("CARGO_PKG_VERSION"),
        "semanticVersion": env!("CARGO_PKG_VERSION"),
        "shortDescription": { "text": "First-pass estimate of fall arrest and suspended lines" },
        "fullDescription": { "text": CAUTION_LINE },
        "rules": audit_rules().map(rule).collect::<Vec<_>>(),
    });
    format!(
        "{{\"$schema\":{},\"version\":\"2.1.0\",\"runs\":[{{\"tool\":{{\"driver\":{driver}}},\
         \"columnKind\":\"unicodeCodePoints\",\"properties\":{},\"results\":[\n",
        json!(SCHEMA),
        json!({ "cautions": CAUTIONS })
    )
}

/// Everything after the last result.
#[must_use]
pub fn sarif_close(complete: bool, exit_code: u8) -> String {
    let mut invocation = json!({ "executionSuccessful": complete, "exitCode": exit_code });
    if !complete {
        invocation["toolExecutionNotifications"] = json!([{
            "level": "error",
            "message": { "text": "interrupted: the results are a part only" },
        }]);
    }
    format!("\n],\"invocations\":[{invocation}]}}]}}\n")
}

fn rule(rule: &crate::scenario::DoubtRule) -> Value {
    json!({
        "id": rule.id,
        "shortDescription": { "text": rule.about },
        "fullDescription": { "text": rule.why },
        "help": { "text": format!("{} {CAUTION_LINE}", what_to_do(rule)) },
        "defaultConfiguration": { "level": default_level(rule.id) },
    })
}

fn default_level(id: &str) -> &'static str {
    match id {
        "file-fault" | "file-unreadable" | "not-computed" | "check-short" => "error",
        _ => "warning",
    }
}

/// One result before it has its fingerprint.
struct Found {
    rule: &'static str,
    level: &'static str,
    message: String,
    /// First line and column, line and column of the end; none where there is no text.
    region: Option<((usize, usize), (usize, usize))>,
    /// What tells it from others of its rule in the file, free of line numbers.
    key: String,
    accepted: Option<String>,
}

/// The results of one file, one JSON object each.
#[must_use]
pub fn sarif_results(audited: &Audited) -> Vec<String> {
    let mut seen: HashMap<String, usize> = HashMap::new();
    let found = match &audited.finding {
        Finding::Judged(report, review) => judged(report, review),
        Finding::Refused(faults) => faults.faults.iter().map(|fault| refused(faults, fault)).collect(),
        Finding::Unreadable(why) => vec![no_text("file-unreadable", why)],
        Finding::NotComputed(why) => vec![no_text("not-computed", why)],
    };
    found
        .into_iter()
        .map(|found| {
            let key = format!("{}\n{}\n{}", found.rule, audited.uri, found.key);
            let before = seen.entry(key.clone()).or_default();
            *before += 1;
            result(&found, &audited.uri, &fingerprint(&format!("{key}\n{before}"))).to_string()
        })
        .collect()
}

fn fingerprint(key: &str) -> String {
    Sha256::digest(key.as_bytes()).iter().take(16).fold(String::with_capacity(32), |mut hex, byte| {
        let _ = write!(hex, "{byte:02x}");
        hex
    })
}

fn result(found: &Found, uri: &str, fingerprint: &str) -> Value {
    let mut place = json!({ "artifactLocation": { "uri": uri } });
    if let Some(((line, column), (end_line, end_column))) = found.region {
        place["region"] =
            json!({ "startLine": line, "startColumn": column, "endLine": end_line, "endColumn": end_column });
    }
    let suppressions = found
        .accepted
        .as_ref()
        .map_or_else(|| json!([]), |why| json!([{ "kind": "inSource", "status": "accepted", "justification": why }]));
    json!({
        "ruleId": found.rule,
        "ruleIndex": audit_rules().position(|rule| rule.id == found.rule),
        "level": found.level,
        "message": { "text": found.message },
        "locations": [{ "physicalLocation": place }],
        "partialFingerprints": { "finding/v1": fingerprint },
        "suppressions": suppressions,
    })
}

fn no_text(rule: &'static str, why: &str) -> Found {
    let region = None;
    Found { rule, level: "error", message: why.to_owned(), region, key: String::new(), accepted: None }
}

fn refused(faults: &Faults, fault: &Fault) -> Found {
    Found {
        rule: "file-fault",
        level: "error",
        message: with_hint(fault),
        region: Some(faults.region(fault)),
        key: fault.message.clone(),
        accepted: None,
    }
}

fn with_hint(fault: &Fault) -> String {
    let hint = fault.hint.as_ref().map(|hint| format!("; {hint}")).unwrap_or_default();
    format!("{}{hint}", fault.message)
}

fn judged(report: &Report, review: &Review) -> Vec<Found> {
    let places = places(&review.text);
    let checks = report.margins.iter().filter(|margin| margin.verdict != Verdict::Holds);
    checks
        .map(|margin| check(report, review, &places, margin))
        .chain(review.doubts.iter().map(|doubt| doubted(review, doubt)))
        .collect()
}

fn check(report: &Report, review: &Review, places: &Places, margin: &Margin) -> Found {
    let (rule, level) = match margin.verdict {
        Verdict::Short => ("check-short", "error"),
        Verdict::Open => ("check-open", "warning"),
        Verdict::Thin | Verdict::Holds => ("check-thin", "warning"),
    };
    let worst = worst_words(report, margin, UnitSystem::Metric).map(|words| format!("; {words}")).unwrap_or_default();
    let at = Fault {
        severity: Severity::Doubt,
        span: places.of(&place_of(report, &margin.id)),
        message: String::new(),
        expected: String::new(),
        hint: None,
    };
    let text = Faults { file: String::new(), text: review.text.clone(), faults: Vec::new() };
    Found {
        rule,
        level,
        message: format!("{}{worst}", margin_words(&report.scenario, margin, UnitSystem::Metric)),
        region: Some(text.region(&at)),
        key: margin.id.clone(),
        accepted: None,
    }
}

/// The input that a check is about.
fn place_of(report: &Report, id: &str) -> String {
    let scenario = &report.scenario;
    if let Some(name) = id.strip_prefix("clearance.").or_else(|| id.strip_prefix("swing_strike.")) {
        let level = scenario.obstacles.iter().position(|obstacle| obstacle.id() == name);
        let face = scenario.faces.iter().position(|face| face.id() == name);
        let number = |list: &str, index: usize| format!("{list}.{}.top", index + 1);
        let level = level.map(|index| number("obstacle", index));
        return level.or_else(|| face.map(|index| number("face", index))).unwrap_or_default();
    }
    match id {
        "stroke" => "absorber.stroke",
        "rated_mass" => "absorber.rated_mass",
        "rated_free_fall" => "absorber.rated_free_fall",
        "subject_mass" => "subject.mass",
        "lanyard_length" => "line.length",
        "line_load" | "line_strength" => "line.strength",
        "static_elongation" | "dynamic_elongation" => "line",
        "anchor_load" | "anchor_strength" | "span_end_load" | "span_anchor_strength" => "anchor.capacity",
        "total_fall_distance" => "limits.arrest_distance",
        id if id.starts_with("span_") => "anchor.span",
        "arrest_force" | "free_fall" | "deceleration_distance" => return format!("limits.{id}"),
        _ => "limits",
    }
    .to_owned()
}

fn doubted(review: &Review, doubt: &Reviewed) -> Found {
    let (level, reason) = match &doubt.accepted {
        Some(why) => ("note", format!("; accepted: {why}")),
        None => ("warning", String::new()),
    };
    Found {
        rule: doubt.id,
        level,
        message: format!("{}{reason}", with_hint(&doubt.fault)),
        region: Some(review.region(doubt)),
        key: doubt.path.clone(),
        accepted: doubt.accepted.clone(),
    }
}
