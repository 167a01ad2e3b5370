//! Sheets of all shipped scenarios: well-formed, complete, the same twice, and no words of a file that become markup.
#![allow(clippy::expect_used, clippy::panic, clippy::unwrap_used, reason = "a test fails by panicking")]
use scraper::{ElementRef, Html, Selector};
use serde_json::Value;
use std::fs;
use std::path::{Path, PathBuf};
use underfoot::quantity::UnitSystem;
use underfoot::scenario::{load, read};
use underfoot::sheet::{
    Block, CAUTION_LINE, REMEDY_CAUTION, Report, STYLE, Sheet, SheetOptions, ranking, report, report_bands, sheet,
    sheet_html, sheet_json, sheet_markdown,
};
use underfoot::study::{Evaluator, remedies, unwatched};

fn shipped() -> Vec<PathBuf> {
    let mut files: Vec<PathBuf> = fs::read_dir("scenarios").unwrap().map(|entry| entry.unwrap().path()).collect();
    files.retain(|path| path.extension().is_some_and(|ending| ending == "toml"));
    files.sort();
    assert!(files.len() >= 23, "{files:?}");
    files
}

/// Without the bands, which take long on lifelines and are tried on some.
fn plain(path: &Path, system: UnitSystem) -> (Report, Sheet) {
    let loaded = load(path).unwrap();
    let report = report(&path.display().to_string(), &loaded.text, &loaded.scenario).unwrap();
    let options = SheetOptions { system, command: "underfoot sheet".to_owned(), ..SheetOptions::default() };
    let value = sheet(&report, &loaded.text, &options);
    (report, value)
}

fn with_bands(name: &str) -> (Report, Sheet) {
    let path = format!("scenarios/{name}.toml");
    let loaded = load(Path::new(&path)).unwrap();
    let mut report = report(&path, &loaded.text, &loaded.scenario).unwrap();
    if let Some(bands) = report_bands(&report, &unwatched).unwrap() {
        report.add_bands(bands).unwrap();
    }
    let options = SheetOptions {
        system: UnitSystem::Metric,
        command: format!("underfoot sheet {path} --remedies -o OUT.md"),
        ranking: ranking(&report).unwrap(),
        remedies: Some(remedies(&Evaluator::new(&report.scenario).unwrap()).unwrap()),
    };
    let value = sheet(&report, &loaded.text, &options);
    (report, value)
}

fn words(element: &ElementRef<'_>) -> String {
    element.text().collect()
}

fn all(selector: &str) -> Selector {
    Selector::parse(selector).unwrap()
}

/// Well-formed, with headings in order, heads on every table, names on every figure, ids once, nothing from outside.
fn is_sound(html: &str, name: &str) {
    let page = Html::parse_document(html);
    assert!(page.errors.is_empty(), "{name}: {:?}", page.errors);
    assert_eq!(page.select(&all("html[lang]")).count(), 1, "{name}");
    assert_eq!(page.select(&all("h1")).count(), 1, "{name}");
    let orders: Vec<u32> =
        page.select(&all("h1, h2, h3, h4")).map(|h| h.value().name()[1..].parse().unwrap()).collect();
    assert!(orders.windows(2).all(|w| w[1] <= w[0] + 1), "{name}: {orders:?}");
    for table in page.select(&all("table")) {
        assert_eq!(table.select(&all("caption")).count(), 1, "{name}");
        assert!(table.select(&all("th[scope]")).count() > 0, "{name}: {}", table.html());
        assert_eq!(table.select(&all("th:not([scope])")).count(), 0, "{name}");
        let widths: Vec<usize> = table.select(&all("tr")).map(|row| row.select(&all("th, td")).count()).collect();
        assert!(widths.windows(2).all(|w| w[0] == w[1]), "{name}: rows of unequal length");
    }
    assert!(page.select(&all("svg")).count() >= 2, "{name}");
    for svg in page.select(&all("svg")) {
        assert_eq!(svg.value().attr("role"), Some("img"), "{name}");
        assert!(svg.select(&all("title")).any(|t| words(&t).len() > 5), "{name}");
        assert!(svg.select(&all("desc")).any(|t| words(&t).len() > 20), "{name}");
    }
    let mut ids: Vec<&str> = page.select(&all("[id]")).filter_map(|e| e.value().attr("id")).collect();
    let count = ids.len();
    ids.sort_unstable();
    ids.dedup();
    assert_eq!(ids.len(), count, "{name}: an id stands twice");
    assert_eq!(page.select(&all("script, link, img, iframe, object, [src], [href], [onload]")).count(), 0, "{name}");
    let outside = html.matches("http").count() - html.matches("http://www.w3.org/2000/svg").count();
    assert_eq!(outside, 0, "{name}: an address");
    assert!(html.matches(CAUTION_LINE).count() >= 2, "{name}");
    for bad in ["NaN", "inf ", "not a number"] {
        assert!(!html.contains(bad), "{name}: {bad}");
    }
}

const ORDER: [&str; 11] = [
    "cautions",
    "verdict",
    "inputs",
    "assumptions",
    "geometry",
    "arrest",
    "margins",
    "spread",
    "figures",
    "ledger",
    "reproduction",
];

#[test]
fn every_shipped_scenario_gives_a_sound_sheet_in_both_unit_systems() {
    for path in shipped() {
        for system in [UnitSystem::Metric, UnitSystem::Us] {
            let (report, value) = plain(&path, system);
            let name = path.display().to_string();
            is_sound(&sheet_html(&value), &name);
            let ids: Vec<&str> = value.sections.iter().map(|section| section.id).collect();
            assert_eq!(ids, [&ORDER[..], &["decision"]].concat(), "{name}");
            assert!(value.sections.iter().all(|section| !section.blocks.is_empty()), "{name}: an empty section");
            let object: Value = serde_json::from_str(&sheet_json(&value, &report)).unwrap();
            assert_eq!(object["sections"].as_array().unwrap().len(), ids.len(), "{name}");
            assert_eq!(object["verdict"], report.verdict.word(), "{name}");
            let markdown = sheet_markdown(&value);
            assert!(markdown.starts_with("# Calculation sheet: ") && markdown.contains(CAUTION_LINE), "{name}");
        }
    }
}

#[test]
fn the_same_file_gives_the_same_bytes() {
    for name in ["roof-foot-level", "swing-clears-tower"] {
        let [(a, first), (b, second)] = [with_bands(name), with_bands(name)];
        assert_eq!(sheet_html(&first), sheet_html(&second));
        assert_eq!(sheet_markdown(&first), sheet_markdown(&second));
        assert_eq!(sheet_json(&first, &a), sheet_json(&second, &b));
    }
}

#[test]
fn with_bands_and_remedies_a_sheet_is_sound_and_says_so() {
    let (_, value) = with_bands("roof-foot-level");
    let html = sheet_html(&value);
    is_sound(&html, "roof-foot-level");
    for words in ["95 % Wilson interval", "Which input matters", "Spread of total fall distance", REMEDY_CAUTION] {
        assert!(html.contains(words), "{words}");
    }
}

#[test]
fn a_limit_from_memory_is_marked() {
    let files = shipped();
    let marked = files.iter().filter(|path| {
        let (report, value) = plain(path, UnitSystem::Metric);
        let from_memory = report.margins.iter().any(|margin| margin.basis.from_memory);
        let says = sheet_html(&value).contains("FROM MEMORY, UNVERIFIED");
        assert_eq!(from_memory, says, "{path:?}");
        says
    });
    assert!(marked.count() > 0, "no shipped scenario has a limit from memory: nothing was tried");
}

/// A scenario whose own words try to be markup.
fn hostile() -> String {
    let text = fs::read_to_string("scenarios/roof-foot-level.toml").unwrap();
    text.replace(
        "title = \"flat roof, anchor at the feet\"",
        r#"title = "</title><script>alert(1)</script> & | `x` \u001b[31m # *b*""#,
    )
    .replace("canopy over the door", "<img src=x onerror=alert(2)> & [a](javascript:b) | c")
    .replace("pavement at the north door", "</style></svg><b>\\u0007")
}

#[test]
fn words_of_the_file_stay_words() {
    let text = hostile();
    let scenario = read("a<b>.toml", &text).unwrap();
    let report = report("a<b>.toml", &text, &scenario).unwrap();
    let value = sheet(&report, &text, &SheetOptions { command: "x <y> \u{7}".to_owned(), ..SheetOptions::default() });
    let html = sheet_html(&value);
    is_sound(&html, "hostile");
    let page = Html::parse_document(&html);
    assert_eq!(page.select(&all("b, img, script")).count(), 0);
    let title = page.select(&all("h1")).next().map(|h| words(&h)).unwrap();
    assert!(title.contains("</title><script>alert(1)</script> & | `x` \u{fffd}[31m"), "{title}");
    let markdown = sheet_markdown(&value);
    let json = sheet_json(&value, &report);
    let shown: Value = serde_json::from_str(&json).unwrap();
    assert_eq!(shown["sections"][0]["id"], "cautions");
    for page in [&html, &markdown] {
        assert!(!page.chars().any(|c| c.is_control() && c != '\n'), "a control character");
        assert!(!page.contains("<script") && !page.contains("<img") && !page.contains("<b>"));
    }
    assert!(markdown.contains("\\[a\\](javascript:b) \\| c"), "a link or a cell of a table was made of a name");
}

#[test]
fn the_working_carries_its_numbers_in_json() {
    let (report, value) = plain(Path::new("scenarios/elastic-suspension.toml"), UnitSystem::Us);
    let tables = value.sections.iter().flat_map(|section| &section.blocks).filter_map(|block| match block {
        Block::Table(table) => Some(table),
        _ => None,
    });
    let mut with_numbers = 0;
    for table in tables {
        for row in &table.rows {
            assert_eq!(row.cells.len(), table.columns.len(), "{}", table.id);
            with_numbers += row.cells.iter().filter(|cell| cell.si.is_some()).count();
        }
    }
    assert!(with_numbers > 150, "{with_numbers}");
    let object: Value = serde_json::from_str(&sheet_json(&value, &report)).unwrap();
    let numbers = &object["report"]["numbers"];
    let ledger = object["sections"].as_array().unwrap().iter().find(|s| s["id"] == "ledger").unwrap();
    let table = ledger["blocks"].as_array().unwrap().iter().find(|b| b["id"] == "numbers").unwrap();
    for row in table["rows"].as_array().unwrap() {
        let id = row["id"].as_str().unwrap();
        if let Some(value) = row["si"]["value"].as_f64() {
            assert_eq!(Some(value), numbers[id]["value"].as_f64(), "{id}");
        }
    }
}

#[test]
fn every_step_of_the_geometry_has_its_formula_or_is_stated() {
    for path in shipped() {
        let (_, value) = plain(&path, UnitSystem::Metric);
        let geometry = value.sections.iter().find(|section| section.id == "geometry").unwrap();
        for block in &geometry.blocks {
            let Block::Table(table) = block else { continue };
            for row in table.rows.iter().filter(|_| table.id == "geometry") {
                let [what, formula] = [1, 2].map(|at| row.cells[at].words.as_str());
                let given = what.ends_with("as stated") || what == "elevation of the attachment at the start";
                let none = what.starts_with("free fall: none") || what.starts_with("deflection of the lifeline");
                assert_eq!(formula.is_empty(), given || none, "{path:?}: {what}: {formula}");
            }
        }
    }
}

/// Relative luminance of `#rrggbb` (WCAG 2.1, 1.4.3).
fn luminance(colour: &str) -> f64 {
    let part = |at: usize| {
        let share = f64::from(u8::from_str_radix(&colour[at..at + 2], 16).unwrap()) / 255.0;
        if share <= 0.040_45 { share / 12.92 } else { ((share + 0.055) / 1.055).powf(2.4) }
    };
    0.2126 * part(1) + 0.7152 * part(3) + 0.0722 * part(5)
}

#[test]
fn every_colour_of_words_stands_out_in_both_schemes() {
    let schemes: Vec<&str> = STYLE.split(":root {").skip(1).map(|part| part.split('}').next().unwrap()).collect();
    assert_eq!(schemes.len(), 2);
    for scheme in schemes {
        let colour = |name: &str| {
            let start = scheme.find(&format!("--{name}: ")).unwrap_or_else(|| panic!("no {name}")) + name.len() + 4;
            &scheme[start..start + 7]
        };
        for ground in ["paper", "stripe"] {
            for ink in ["ink", "faint", "accent", "holds", "thin", "open", "short"] {
                let [a, b] = [colour(ink), colour(ground)].map(luminance);
                let ratio = (a.max(b) + 0.05) / (a.min(b) + 0.05);
                assert!(ratio >= 4.5, "{ink} on {ground}: {ratio:.2}");
            }
        }
    }
}

/// Committed sheets; `UNDERFOOT_BLESS=1` writes them anew, to be read before they are committed.
#[test]
fn two_sheets_are_as_they_were_reviewed() {
    for name in ["roof-foot-level", "low-scaffold-short"] {
        let (report, value) = with_bands(name);
        let markdown = sheet_markdown(&value);
        let json = sheet_json(&value, &report);
        let [md_path, json_path] = ["md", "json"].map(|ending| format!("tests/sheets/{name}.{ending}"));
        if std::env::var_os("UNDERFOOT_BLESS").is_some() {
            fs::write(&md_path, &markdown).unwrap();
            fs::write(&json_path, &json).unwrap();
        }
        let known = fs::read_to_string(&md_path).unwrap_or_default();
        for (number, (was, is)) in known.lines().zip(markdown.lines()).enumerate() {
            assert_eq!(is, was, "{md_path}:{}", number + 1);
        }
        assert_eq!(known, markdown, "{md_path}");
        let known: Value = serde_json::from_str(&fs::read_to_string(&json_path).unwrap_or_default()).unwrap();
        same(&known, &serde_json::from_str(&json).unwrap(), &json_path);
    }
}

/// Equal but for the last digits of numbers, which a mathematical library of another system may round otherwise.
fn same(a: &Value, b: &Value, place: &str) {
    match (a, b) {
        (Value::Number(x), Value::Number(y)) => {
            let (x, y) = (x.as_f64().unwrap(), y.as_f64().unwrap());
            assert!((x - y).abs() <= 1e-9 * x.abs().max(1.0), "{place}: {x} {y}");
        }
        (Value::Array(x), Value::Array(y)) => {
            assert_eq!(x.len(), y.len(), "{place}");
            x.iter().zip(y).enumerate().for_each(|(i, (x, y))| same(x, y, &format!("{place}/{i}")));
        }
        (Value::Object(x), Value::Object(y)) => {
            assert_eq!(x.keys().collect::<Vec<_>>(), y.keys().collect::<Vec<_>>(), "{place}");
            x.iter().for_each(|(key, value)| same(value, &y[key], &format!("{place}/{key}")));
        }
        _ => assert_eq!(a, b, "{place}"),
    }
}
