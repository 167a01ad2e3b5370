//! The calculation sheet: a file's run with every step of its working, for whoever reviews and signs.
mod arrest;
mod checks;
mod drawing;
mod elevation;
mod figure;
mod figures;
mod formula;
mod geometry;
mod head;
mod html;
mod inputs;
mod json;
mod ledger;
mod markdown;
mod modes;
mod path;
mod plot;
mod steps;
mod studies;
mod value;

pub use html::{STYLE, sheet_html};
pub use json::sheet_json;
pub use markdown::sheet_markdown;
pub use studies::{Ranking, ranking};
pub use value::{Block, Cell, Column, Figure, Kind, Row, Section, Sheet, Table};

use super::Report;
use crate::quantity::UnitSystem;
use crate::study::Remedies;

/// What a sheet shows beside the run itself.
#[derive(Clone, Debug, Default)]
pub struct SheetOptions {
    /// Units of results; inputs stand as the file states them, and the working is in SI.
    pub system: UnitSystem,
    /// The command that makes this sheet again.
    pub command: String,
    /// The bars of the governing margin, where the file has bands.
    pub ranking: Option<Ranking>,
    /// The nearest values at which every check holds, where they are asked for.
    pub remedies: Option<Remedies>,
}

/// The sheet of a report; `text` is the file's. Equal input gives an equal sheet.
#[must_use]
pub fn sheet(report: &Report, text: &str, options: &SheetOptions) -> Sheet {
    let system = options.system;
    let margins = report.margins_in(system);
    let seed = report.bands.as_ref().map(|bands| bands.study.spread.seed);
    let mut sections = vec![
        head::cautions(report),
        head::verdict(report, &margins, system),
        inputs::section(report, text),
        head::assumptions(report, system),
        geometry::section(report, system),
        arrest::section(report, system),
        checks::section(report, &margins, system),
        studies::spread(report, options.ranking.as_ref(), system),
    ];
    sections.extend(options.remedies.as_ref().map(|found| studies::remedies(report, found)));
    sections.push(figures::section(report, &margins, system));
    sections.push(ledger::section(report, system));
    sections.push(head::reproduction(report, &options.command, seed));
    sections.push(head::decision());
    Sheet {
        title: super::clean(report.scenario.title.as_deref().unwrap_or(&report.file)),
        file: super::clean(&report.file),
        scenario_sha256: report.scenario_sha256.clone(),
        verdict: report.verdict,
        sections,
    }
}
