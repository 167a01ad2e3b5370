//! The first sections: cautions, the verdict, what is taken for granted; and the last: how to run it again, who decides.
use super::value::{Block, Cell, Column, Kind, Row, Section, Table, column};
use crate::margin::Margin;
use crate::quantity::UnitSystem;
use crate::sheet::{CAUTION_LINE, CAUTIONS, LEFT_OUT, Report, governing_words, worst_words};

const FACTS: &[Column] = &[column("name", "about", Kind::Name), column("words", "this sheet", Kind::Words)];

/// The cautions, and the warnings of this run.
pub fn cautions(report: &Report) -> Section {
    let mut blocks = vec![Block::words(CAUTION_LINE), Block::list(CAUTIONS)];
    if !report.estimate.warnings.is_empty() {
        blocks.push(Block::part("Warnings about the numbers of this run"));
        blocks.push(Block::list(&report.estimate.warnings));
    }
    Section::new("cautions", "Cautions", blocks)
}

/// The verdict with the check that governs, and what the sheet is about.
pub fn verdict(report: &Report, margins: &[Margin], system: UnitSystem) -> Section {
    let mut words = governing_words(&report.scenario, margins, system);
    if let Some(worst) = margins.first().and_then(|margin| worst_words(report, margin, system)) {
        words = format!("{words}; {worst}");
    }
    let counts = ["short", "open", "thin", "holds"].map(|word| {
        let count = margins.iter().filter(|margin| margin.verdict.word() == word).count();
        format!("{count} {word}")
    });
    let scenario = &report.scenario;
    let or = |words: &Option<String>| words.clone().unwrap_or_else(|| "not stated".to_owned());
    let facts = [
        ("title", or(&scenario.title)),
        ("notes", or(&scenario.notes)),
        ("file", report.file.clone()),
        ("elevation 0 is", or(&scenario.datum)),
        ("limits", scenario.limits.basis.clone().unwrap_or_else(|| "none named".to_owned())),
        ("checks", counts.join(", ")),
    ];
    Section::new(
        "verdict",
        "Verdict",
        vec![
            Block::Verdict(report.verdict, crate::sheet::clean(&words)),
            Block::words(
                "Holds: the estimate meets the limit. Thin: the typical value meets it, the worst found in the bands does \
                 not. Short: it does not. Open: it cannot be judged, which is never a pass.",
            ),
            facts_table("about", "what this sheet is about", &facts),
        ],
    )
}

/// A table of names with their words.
pub fn facts_table(id: &str, caption: &str, facts: &[(&str, String)]) -> Block {
    let row = |(name, words): &(&str, String)| Row::new(vec![Cell::words(name), Cell::words(words)]);
    Block::Table(Table {
        id: id.to_owned(),
        caption: caption.to_owned(),
        columns: FACTS,
        rows: facts.iter().map(row).collect(),
    })
}

/// What the model takes for granted and what it leaves out.
pub fn assumptions(report: &Report, system: UnitSystem) -> Section {
    let mut blocks = vec![
        Block::list(&report.estimate.assumptions),
        Block::part("What the model leaves out"),
        Block::words(LEFT_OUT),
    ];
    if !report.estimate.validity.is_empty() {
        blocks.push(Block::part("Where the model is not valid for this run"));
        let reasons: Vec<String> = report.estimate.validity.iter().map(|reason| reason.words(system)).collect();
        blocks.push(Block::list(&reasons));
    }
    Section::new("assumptions", "Assumptions and limits of the model", blocks)
}

/// How to make the same sheet again.
pub fn reproduction(report: &Report, command: &str, seed: Option<u64>) -> Section {
    let facts = [
        ("command", command.to_owned()),
        ("version", format!("underfoot {}", env!("CARGO_PKG_VERSION"))),
        ("SHA-256 of the file", report.scenario_sha256.clone()),
        ("seed", seed.map_or_else(|| "none: nothing on this sheet is sampled".to_owned(), |seed| seed.to_string())),
    ];
    Section::new(
        "reproduction",
        "How to make this sheet again",
        vec![
            Block::words("The same file, version and command give the same bytes."),
            facts_table("reproduction", "reproduction", &facts),
        ],
    )
}

/// The block that a person fills in.
pub fn decision() -> Section {
    Section::new(
        "decision",
        "Decision of the competent or licensed person",
        vec![
            Block::words(
                "This sheet decides nothing. The person named here has looked at the real place, the equipment and the \
                 local code, and has the rescue planned.",
            ),
            Block::Blank(&[
                "Name",
                "Qualification, licence number",
                "Date",
                "Rescue plan, where it is kept",
                "Decision and its conditions",
                "Signature",
            ]),
        ],
    )
}
