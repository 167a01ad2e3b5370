//! What the chosen input is, below the list.
use crate::quantity::{Unit, UnitSystem, display_unit, format_measure, format_si};
use crate::scenario::{Input, field_for};
use crate::tui::choice::{Choice, Entry};
use crate::tui::lean::Lean;
use crate::tui::model::{Mode, Model, Typing};
use crate::tui::text::{put, put_wrapped};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// Draws a rule and a few rows of text; the fault of a text being typed comes first.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    put(buffer, area, 0, 0, &"─".repeat(usize::from(area.width)), model.theme.quiet());
    let (words, style) = match &model.mode {
        Mode::Typing(typing) if typing.fault.is_some() => {
            (typing.fault.clone().unwrap_or_default(), model.theme.fault())
        }
        Mode::Typing(typing) if !typing.before.is_empty() => (wanted(typing), model.theme.heading()),
        _ => (words(model), model.theme.plain()),
    };
    let inner = Rect {
        x: area.x + 1,
        y: area.y + 1,
        width: area.width.saturating_sub(2),
        height: area.height.saturating_sub(1),
    };
    put_wrapped(buffer, inner, &words, style);
}

fn words(model: &Model) -> String {
    match model.entries.get(model.input) {
        Some(Entry::Word(choice)) => word_words(choice),
        Some(Entry::Number(index)) => model.inputs.get(*index).map_or_else(String::new, |input| {
            let lean = model.leans.get(*index).copied().unwrap_or(Lean::Unknown);
            number_words(input, lean, model.units)
        }),
        None => String::new(),
    }
}

fn number_words(input: &Input, lean: Lean, units: UnitSystem) -> String {
    let value = format!("{} = {}{}", input.path, format_measure(&input.measure), converted(input, units));
    format!("{value}; {} {}; {}", lean.symbol(), lean.words(), input.field.doc.trim_end_matches('.'))
}

fn word_words(choice: &Choice) -> String {
    let doc = choice.field.doc.trim_end_matches('.');
    format!("{} = {}; {doc}; one of {}", choice.path, choice.word, choice.words().join(", "))
}

/// What a changed word asks for.
#[must_use]
pub fn wanted(typing: &Typing) -> String {
    let word = typing.before.first().map_or("it", |(_, word)| word);
    match field_for(&typing.path) {
        Some(field) => format!("`{word}` needs `{}`, such as {}: {}", typing.path, field.example, field.doc),
        None => format!("`{word}` needs `{}`", typing.path),
    }
}

/// The typical value in the units of display where the file uses others.
fn converted(input: &Input, units: UnitSystem) -> String {
    let dimension = input.measure.dimension();
    let unit = display_unit(dimension, units);
    if unit == input.measure.unit || unit == Unit::One || same_family(input.measure.unit, units) {
        return String::new();
    }
    format!(" ({})", format_si(input.measure.si(), dimension, units))
}

fn same_family(unit: Unit, units: UnitSystem) -> bool {
    let is_us = matches!(
        unit,
        Unit::Foot
            | Unit::Inch
            | Unit::Pound
            | Unit::PoundForce
            | Unit::PoundForcePerFoot
            | Unit::PoundForcePerInch
            | Unit::PoundForceSecondPerFoot
            | Unit::FootPerSecond
            | Unit::FootPerSecondSquared
            | Unit::FootPoundForce
            | Unit::PoundPerFoot
    );
    let is_shared = matches!(unit, Unit::Second | Unit::Degree | Unit::Percent | Unit::One | Unit::Gravity);
    is_shared || is_us == (units == UnitSystem::Us)
}
