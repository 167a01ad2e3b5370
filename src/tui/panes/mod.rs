//! What the panes show: each draws itself from the model and nothing else.
pub mod about;
pub mod elevation;
pub mod foot;
pub mod header;
pub mod help;
pub mod history;
pub mod inputs;
pub mod log;
pub mod margins;
pub mod plot;
pub mod scene;
pub mod tabs;
pub mod timeline;
pub mod units;
pub mod verdict;
