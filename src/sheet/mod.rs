//! Results to bytes: text, JSON and CSV. Pure functions.
mod audit;
mod audit_table;
mod band_words;
mod bands;
mod caution;
mod compare;
mod csv;
mod json;
mod limits;
mod page;
mod places;
mod remedy;
mod report;
mod sarif;
mod spread;
mod spread_data;
mod text;
pub mod ticks;
mod vary;
mod words;
mod working;

pub use audit::{Audited, Finding, audit_head, audit_json, audit_text};
pub use audit_table::{FINDING_RULES, MOST_LISTED, MOST_ROWS, Summary, Table, audit_rules, explain_text};
pub use band_words::{
    bands_object, bands_sentence, place_word, place_words, report_margin_object, share_object, share_words, worst_words,
};
pub use bands::{InputAt, MarginBand, ReportBands, report_bands, report_worst};
pub use caution::{CAUTION_LINE, CAUTIONS, EQUIPMENT_CAUTIONS, LEFT_OUT};
pub use compare::{compare_object, compare_text, comparison};
pub use csv::csv;
pub use json::{Layout, json, margin as margin_object, object, print};
pub use limits::{limits_json, limits_text};
pub use page::{Paint, clean};
pub use remedy::{REMEDY_CAUTION, remedy_object, remedy_text};
pub use report::{Report, ReportError, report, sha256_hex};
pub use sarif::{file_uri, sarif_close, sarif_open, sarif_results};
pub use spread::{NO_BAND, SpreadSheet, spread_text};
pub use spread_data::{spread_csv, spread_object};
pub use text::text;
pub use vary::{vary_csv, vary_text};
pub use words::{governing_words, margin_words};
