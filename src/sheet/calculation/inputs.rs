//! The inputs: as the file states them, in SI as used, and where each comes from.
use super::value::{Block, Cell, Column, Kind, Row, Section, Table, column, exact};
use crate::quantity::{Dimension, Measure, Shape, format_unit};
use crate::scenario::{
    AnchorKind, DampingLaw, FIELDS, Field, LineKind, Need, Places, Scenario, StretchLaw, inputs, places,
};
use crate::sheet::Report;
use crate::sheet::json::si_unit;

const STATED: &[Column] = &[
    column("label", "input", Kind::Name),
    column("path", "path", Kind::Formula),
    column("stated", "as stated", Kind::Words),
    column("low", "low", Kind::Number),
    column("typical", "typical", Kind::Number),
    column("high", "high", Kind::Number),
    column("used", "used, SI", Kind::Number),
    column("from", "from", Kind::Words),
];
const ABSENT: &[Column] = &[
    column("label", "input", Kind::Name),
    column("path", "path", Kind::Formula),
    column("means", "not stated, which means", Kind::Words),
];
const PAIRS: &[Column] = &[column("length", "length", Kind::Number), column("force", "force", Kind::Number)];

/// The section of the inputs; `text` is the file's.
pub fn section(report: &Report, text: &str) -> Section {
    let found = places(text);
    let own = report.scenario.limits.own.iter().map(|limit| (format!("limits.{}", limit.key), limit.value));
    let numeric: Vec<(String, Measure)> =
        inputs(&report.scenario).into_iter().map(|input| (input.path, input.measure)).chain(own).collect();
    let scenario = &report.scenario;
    let counts =
        [("obstacle", scenario.obstacles.len()), ("face", scenario.faces.len()), ("accept", scenario.accepted.len())];
    let fields: Vec<(String, &Field)> = FIELDS.iter().flat_map(|f| concrete(f, &counts)).collect();
    let source = Source { text, places: &found };
    let stated = fields.iter().filter_map(|(path, field)| source.row(path, field, &numeric)).collect();
    let absent = fields.iter().filter_map(|(path, field)| source.absent(path, field, &report.scenario)).collect();
    let mut blocks = vec![
        Block::words(
            "The file's own words and units; typical is what is solved, low and high are the ends of its band. Used is \
             the typical value in SI. From says the line of the file, or default where the file is silent.",
        ),
        table("inputs", "inputs", STATED, stated),
    ];
    blocks.extend(pairs(&report.scenario));
    blocks.push(table("defaults", "inputs that the file does not state", ABSENT, absent));
    Section::new("inputs", "Inputs", blocks)
}

fn table(id: &str, caption: &str, columns: &'static [Column], rows: Vec<Row>) -> Block {
    Block::Table(Table { id: id.to_owned(), caption: caption.to_owned(), columns, rows })
}

/// A field under each of its concrete paths.
fn concrete<'f>(field: &'f Field, counts: &[(&str, usize)]) -> Vec<(String, &'f Field)> {
    let list = counts.iter().find(|(name, _)| field.path.starts_with(&format!("{name}.")));
    match list.filter(|_| field.path.contains('*')) {
        Some((_, count)) => (1..=*count).map(|n| (field.path.replace('*', &n.to_string()), field)).collect(),
        None => vec![(field.path.to_owned(), field)],
    }
}

struct Source<'a> {
    text: &'a str,
    places: &'a Places,
}

impl Source<'_> {
    /// The value of a key as it stands in the file, without quotes, and its line.
    fn stated(&self, path: &str) -> Option<(String, usize)> {
        let span = self.places.exactly(path)?;
        let line = self.text.get(..span.start)?.matches('\n').count() + 1;
        let raw = self.text.get(span)?.trim();
        Some((raw.trim_matches('"').trim_matches('\'').split_whitespace().collect::<Vec<_>>().join(" "), line))
    }

    fn row(&self, path: &str, field: &Field, numeric: &[(String, Measure)]) -> Option<Row> {
        let input = numeric.iter().find(|(known, _)| known == path).map(|(_, measure)| measure);
        let stated = self.stated(path);
        if stated.is_none() && input.is_none() {
            return None;
        }
        let (words, from) = match stated {
            Some((words, line)) => (words, format!("line {line}")),
            None => ("-".to_owned(), "default".to_owned()),
        };
        let words = if field.columns.is_some() { "table below".to_owned() } else { words };
        let mut cells = vec![Cell::words(field.label), Cell::words(path), Cell::words(&words)];
        match input {
            Some(measure) => cells.extend(band_cells(measure)),
            None => cells.extend([Cell::none(), Cell::none(), Cell::none(), Cell::none()]),
        }
        cells.push(Cell::words(&from));
        Some(Row::new(cells))
    }

    fn absent(&self, path: &str, field: &Field, scenario: &Scenario) -> Option<Row> {
        let Need::Default(means) = field.need else { return None };
        let section = path.rsplit_once('.').map_or("", |(section, _)| section);
        let there = section.is_empty() || self.places.exactly(section).is_some();
        if self.places.exactly(path).is_some() || !there || !matters(path, scenario) {
            return None;
        }
        Some(Row::new(vec![Cell::words(field.label), Cell::words(path), Cell::words(means)]))
    }
}

/// Whether the absence of a key says anything about this scenario.
fn matters(path: &str, scenario: &Scenario) -> bool {
    match path {
        "gravity" | "title" | "notes" => false,
        "line.damping" | "line.damping_ratio" => {
            path == "line.damping" && matches!(scenario.line.damping, DampingLaw::None)
        }
        "line.grab_slide" => scenario.line.kind == LineKind::Vertical,
        "line.slack" | "line.lock_travel" => scenario.line.kind == LineKind::Retractable,
        "anchor.damping" | "anchor.stiffness" => matches!(scenario.anchor.kind, AnchorKind::Sprung(_)),
        path => !path.starts_with("limits.") && !path.starts_with("study"),
    }
}

fn band_cells(measure: &Measure) -> [Cell; 4] {
    let band = measure.band;
    let unit = si_unit(measure.dimension());
    let shown = |value: f64| Cell::shown(format_unit(value, measure.unit), value, unit);
    let used = if unit == "1" { exact(band.typical) } else { format!("{} {unit}", exact(band.typical)) };
    let used = Cell::shown(used, band.typical, unit);
    if !band.is_wide() {
        return [Cell::none(), shown(band.typical), Cell::none(), used];
    }
    let shape = match band.shape {
        Shape::Uniform => "",
        Shape::Triangular => ", triangular",
        Shape::Normal => ", normal",
    };
    let mut high = shown(band.high);
    high.words.push_str(shape);
    [shown(band.low), shown(band.typical), high, used]
}

/// The tables of the file.
fn pairs(scenario: &Scenario) -> Vec<Block> {
    let rows = |list: &[(f64, f64)]| {
        let cell = |value: f64, dimension| {
            let unit = si_unit(dimension);
            Cell::shown(format!("{} {unit}", exact(value)), value, unit)
        };
        list.iter().map(|&(x, f)| Row::new(vec![cell(x, Dimension::Length), cell(f, Dimension::Force)])).collect()
    };
    let mut blocks = Vec::new();
    if let StretchLaw::Curve(list) = &scenario.line.stretch {
        blocks.push(table("line_curve", "force over elongation of the line (`line.curve`)", PAIRS, rows(list)));
    }
    if let Some(list) = scenario.absorber.as_ref().and_then(|a| a.force_table.as_ref()) {
        let caption = "force over deployed length of the absorber (`absorber.force_table`)";
        blocks.push(table("absorber_force", caption, PAIRS, rows(list)));
    }
    blocks
}
