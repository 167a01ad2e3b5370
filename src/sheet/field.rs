//! A map of two inputs, as text and CSV.
use super::page::{Page, Paint, Tone, pad, pad_left};
use super::ticks::ticks;
use super::{CAUTION_LINE, CAUTIONS, Report};
use crate::margin::{Margin, Verdict};
use crate::quantity::{Dimension, UnitSystem, display_unit, format_si};
use crate::study::{Axis, Edge, Evaluator, Field};

/// Most values of the first input that a map as text has room for.
pub const MOST_TEXT_STEPS: usize = 82;
/// Columns before the map.
const LEAD: usize = 14;
/// Marks the cell nearest to the values of the file.
pub const TODAY: char = '@';
/// What a map of verdicts is and is not.
pub const MAP_CAUTION: &str = "Every cell is one run with all other inputs at their typical values: bands play no part in \
     it, so no cell is `thin`.";

/// The map, the line along its labelled rows, and the cautions.
#[must_use]
pub fn field_text(report: &Report, evaluator: &Evaluator, field: &Field, system: UnitSystem, paint: Paint) -> String {
    let mut page = Page::new(paint);
    let map = Map { evaluator, field, system };
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.gap();
    page.wrapped("file   ", &report.file, Tone::Plain);
    page.wrapped("over   ", &map.axis_words(&field.across, "to the right"), Tone::Plain);
    page.wrapped("and    ", &map.axis_words(&field.up, "upwards"), Tone::Plain);
    page.wrapped("       ", MAP_CAUTION, Tone::Plain);
    if field.partial {
        let (rows, all) = (field.rows(), field.up.steps);
        let words = format!("PARTIAL: stopped after {rows} of {all} rows, without the line where verdicts change");
        page.wrapped("       ", &words, Tone::Caution);
    }
    page.gap();
    map.rows(&mut page);
    map.foot(&mut page);
    page.gap();
    page.wrapped("       ", &map.legend(), Tone::Plain);
    map.today(&mut page, report);
    page.heading("where a verdict changes, along the rows with a value (refined, not read off the map)");
    map.crossings(&mut page);
    page.heading("cautions");
    for words in CAUTIONS {
        page.wrapped("  ", words, Tone::Plain);
    }
    page.finish()
}

/// A field with what it takes to show it.
pub(super) struct Map<'a> {
    pub evaluator: &'a Evaluator,
    pub field: &'a Field,
    pub system: UnitSystem,
}

impl Map<'_> {
    pub fn dimension(&self, axis: &Axis) -> Dimension {
        self.evaluator.inputs().get(axis.input).and_then(|input| input.field.dimension).unwrap_or(Dimension::Ratio)
    }

    pub fn path(&self, axis: &Axis) -> &str {
        self.evaluator.inputs().get(axis.input).map_or("", |input| input.path.as_str())
    }

    pub fn shown(&self, axis: &Axis, value: f64) -> String {
        format_si(value, self.dimension(axis), self.system)
    }

    fn axis_words(&self, axis: &Axis, way: &str) -> String {
        let Some(input) = self.evaluator.inputs().get(axis.input) else { return String::new() };
        let (low, high) = (self.shown(axis, *axis.range.start()), self.shown(axis, *axis.range.end()));
        let today = self.shown(axis, input.measure.si());
        format!("{} ({}), {low} to {high} {way}, {today} in the file", input.path, input.field.label)
    }

    /// The file's value on an axis; none outside of the range.
    pub fn present(&self, axis: &Axis) -> Option<f64> {
        let value = self.evaluator.inputs().get(axis.input)?.measure.si();
        axis.range.contains(&value).then_some(value)
    }

    /// The step nearest to the file's value; none outside of the range.
    fn nearest(&self, axis: &Axis) -> Option<usize> {
        let value = self.present(axis)?;
        (0..axis.steps).min_by(|a, b| (axis.value(*a) - value).abs().total_cmp(&(axis.value(*b) - value).abs()))
    }

    /// Every fourth row carries its value, and the highest.
    fn is_labelled(&self, up: usize) -> bool {
        up.is_multiple_of(4) || up + 1 == self.field.up.steps
    }

    fn rows(&self, page: &mut Page) {
        let present = self.nearest(&self.field.across).zip(self.nearest(&self.field.up));
        for up in (0..self.field.up.steps).rev() {
            let label =
                if self.is_labelled(up) { self.shown(&self.field.up, self.field.up.value(up)) } else { String::new() };
            let symbol = |across: usize| match self.field.cell(across, up) {
                Some(_) if present == Some((across, up)) => TODAY,
                Some(cell) => cell.verdict().symbol(),
                None => ' ',
            };
            let cells: String = (0..self.field.across.steps).map(symbol).collect();
            page.line(&format!("{} | {cells}", pad_left(&label, LEAD)), Tone::Plain);
        }
    }

    /// The axis to the right with round values of it.
    fn foot(&self, page: &mut Page) {
        let axis = &self.field.across;
        let unit = display_unit(self.dimension(axis), self.system).factor();
        let (low, high) = (*axis.range.start() / unit, *axis.range.end() / unit);
        let found = ticks(low, high, 1 + axis.steps / 14);
        let mut rule = vec!['-'; axis.steps];
        let mut labels = String::new();
        for &value in &found.values {
            let column = column(axis, value * unit);
            if let Some(place) = rule.get_mut(column) {
                *place = '+';
            }
            if labels.len() <= column {
                labels = pad(&labels, column);
                labels.push_str(&found.label(value));
                labels.push(' ');
            }
        }
        let lead = " ".repeat(LEAD);
        page.line(&format!("{lead} +-{}", rule.into_iter().collect::<String>()), Tone::Plain);
        page.line(&format!("{lead}   {labels}"), Tone::Plain);
        let symbol = display_unit(self.dimension(axis), self.system).symbol();
        let unit = if symbol.is_empty() { String::new() } else { format!(", {symbol}") };
        page.line(&format!("{lead}   {}{unit}", self.path(axis)), Tone::Plain);
    }

    fn legend(&self) -> String {
        let word = |verdict: Verdict| {
            format!("{} {} in {} cells", verdict.symbol(), verdict.word(), self.field.count(verdict))
        };
        let words: Vec<String> = [Verdict::Holds, Verdict::Open, Verdict::Short].into_iter().map(word).collect();
        format!("{} ({} of the open ones could not be run); {TODAY} the file", words.join("; "), self.field.failed())
    }

    fn today(&self, page: &mut Page, report: &Report) {
        let value = |axis: &Axis| {
            self.evaluator.inputs().get(axis.input).map_or(String::new(), |i| self.shown(axis, i.measure.si()))
        };
        let [across, up] = [&self.field.across, &self.field.up].map(value);
        let place = if self.nearest(&self.field.across).zip(self.nearest(&self.field.up)).is_some() {
            "its cell is the nearest one"
        } else {
            "outside of this map"
        };
        let verdict = report.verdict;
        let words = format!("the file: {across} and {up}, {} {}; {place}", verdict.symbol(), verdict.word());
        page.wrapped(&format!("     {TODAY} "), &words, Tone::Verdict(verdict));
    }

    /// Points of the line on the labelled rows, each once.
    fn crossings(&self, page: &mut Page) {
        if self.field.partial {
            return page.line("  not worked out: the map is partial", Tone::Plain);
        }
        if self.field.line.is_empty() {
            return page.line("  nowhere on this map", Tone::Plain);
        }
        for up in (0..self.field.up.steps).rev().filter(|up| self.is_labelled(*up)) {
            let y = self.field.up.value(up);
            let mut points: Vec<&Edge> = self.field.line.iter().flatten().filter(|p| p.y == y).collect();
            points.sort_by(|a, b| a.x.total_cmp(&b.x));
            points.dedup_by(|a, b| a.x == b.x);
            let words: Vec<String> = points.iter().map(|point| self.point_words(point)).collect();
            let words = if words.is_empty() { "nowhere".to_owned() } else { words.join("; ") };
            page.wrapped(&format!("{}  ", pad_left(&self.shown(&self.field.up, y), LEAD)), &words, Tone::Plain);
        }
        page.wrapped(
            "  ",
            "two changes within one cell can be missed; between its points the line may bend",
            Tone::Faint,
        );
    }

    fn point_words(&self, point: &Edge) -> String {
        let value = self.shown(&self.field.across, point.x);
        // Where a run cannot be made or its model is not valid, more than one check is open at once.
        let label = match self.margin(point) {
            Some(margin) if point.beyond != Verdict::Open => margin.label,
            _ => format!("{} beyond", Verdict::Open.word()),
        };
        let how = if point.through_zero { "" } else { ", a jump" };
        format!("{value} ({label}{how})")
    }

    /// The check that changes at a point, in words.
    pub fn margin(&self, point: &Edge) -> Option<Margin> {
        let check = self.field.cells.iter().find_map(|cell| cell.check(point.kind?))?;
        let run = self.evaluator.typical();
        Some(self.evaluator.margin(&run, check, self.system))
    }
}

/// The column of a value.
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a share of the range times few columns")]
#[expect(clippy::cast_precision_loss, reason = "columns are few")]
fn column(axis: &Axis, value: f64) -> usize {
    let share = ((value - axis.range.start()) / (axis.range.end() - axis.range.start())).clamp(0.0, 1.0);
    (share * (axis.steps - 1) as f64).round() as usize
}

/// Every cell with its worst verdict and the governing margin, then every check of it; a cell that could not be run with
/// its reason; then the points of the line, two a piece. SI units.
///
/// # Errors
/// When the writer refuses a record, which a buffer in memory does not.
pub fn field_csv(evaluator: &Evaluator, field: &Field) -> Result<String, csv::Error> {
    let map = Map { evaluator, field, system: UnitSystem::Metric };
    let (across, up) = (map.path(&field.across), map.path(&field.up));
    let mut writer = csv::Writer::from_writer(Vec::new());
    let heads = [format!("{across}_si"), format!("{up}_si")];
    writer.write_record(["row", &heads[0], &heads[1], "name", "margin_si", "verdict", "caution"])?;
    let mut caution = CAUTION_LINE;
    let mut line = |row: &str, at: (f64, f64), name: &str, margin: Option<f64>, verdict: &str| {
        let margin = margin.map_or(String::new(), |m| m.to_string());
        let (x, y) = (at.0.to_string(), at.1.to_string());
        writer.write_record([row, &x, &y, name, &margin, verdict, std::mem::take(&mut caution)])
    };
    let run = evaluator.typical();
    let id = |check| evaluator.margin(&run, check, UnitSystem::Metric).id;
    for (place, cell) in field.cells.iter().enumerate() {
        let at = (field.across.value(place % field.across.steps), field.up.value(place / field.across.steps));
        if let Some(failure) = &cell.failure {
            line("failed", at, &failure.to_string(), None, Verdict::Open.word())?;
        }
        let governing = cell.governing();
        line(
            "cell",
            at,
            &governing.map_or(String::new(), id),
            governing.and_then(|c| c.margin),
            cell.verdict().word(),
        )?;
        for check in &cell.checks {
            line("margin", at, &id(check), check.margin, check.verdict.word())?;
        }
    }
    for point in field.line.iter().flatten() {
        let name = map.margin(point).map_or(String::new(), |margin| margin.id);
        line(if point.through_zero { "zero" } else { "jump" }, (point.x, point.y), &name, None, point.beyond.word())?;
    }
    let bytes = writer.into_inner().map_err(|e| csv::Error::from(e.into_error()))?;
    Ok(String::from_utf8_lossy(&bytes).into_owned())
}
