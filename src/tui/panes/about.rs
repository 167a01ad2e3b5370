//! What the chosen input is, below the list.
use crate::quantity::{Unit, UnitSystem, display_unit, format_measure, format_si};
use crate::scenario::Input;
use crate::tui::lean::Lean;
use crate::tui::model::{Mode, Model};
use crate::tui::text::{put, put_wrapped};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// Draws a rule and a few rows of text; the fault of a text being typed comes first.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    put(buffer, area, 0, 0, &"─".repeat(usize::from(area.width)), model.theme.quiet());
    let Some(input) = model.chosen() else { return };
    let (words, style) = match &model.mode {
        Mode::Typing(typing) if typing.fault.is_some() => {
            (typing.fault.clone().unwrap_or_default(), model.theme.fault())
        }
        _ => (words(input, model), model.theme.plain()),
    };
    let inner = Rect {
        x: area.x + 1,
        y: area.y + 1,
        width: area.width.saturating_sub(2),
        height: area.height.saturating_sub(1),
    };
    put_wrapped(buffer, inner, &words, style);
}

fn words(input: &Input, model: &Model) -> String {
    let lean = model.leans.get(model.input).copied().unwrap_or(Lean::Unknown);
    let other = converted(input, model.units);
    let value = format!("{} = {}{other}", input.path, format_measure(&input.measure));
    format!("{value}; {} {}; {}", lean.symbol(), lean.words(), input.field.doc.trim_end_matches('.'))
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
