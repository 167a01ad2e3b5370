//! The table of commands: dispatch, key line and help screen all read it.
use super::key::Key;
use crossterm::event::{KeyCode, KeyEvent};

/// What the user can ask for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Command {
    /// The row above.
    Up,
    /// The row below.
    Down,
    /// A page up.
    PageUp,
    /// A page down.
    PageDown,
    /// Keys go to the next pane.
    NextPane,
    /// Keys go to the pane before.
    PreviousPane,
    /// Raise the input by a small step.
    Raise,
    /// Lower the input by a small step.
    Lower,
    /// Raise the input by a large step.
    RaiseMuch,
    /// Lower the input by a large step.
    LowerMuch,
    /// Type a value.
    Type,
    /// Back to the file's value.
    Restore,
    /// Undo.
    Undo,
    /// Redo.
    Redo,
    /// Save.
    Save,
    /// Read the file again.
    Reload,
    /// Metric or US.
    Units,
    /// The view Elevation.
    Elevation,
    /// The view History.
    History,
    /// The margins.
    Margins,
    /// The view Notes.
    Notes,
    /// The view Ledger.
    Ledger,
    /// The next view.
    NextView,
    /// Play or pause the fall.
    Play,
    /// Slower.
    Slower,
    /// Faster.
    Faster,
    /// A short time back.
    StepBack,
    /// A short time on.
    StepOn,
    /// The event before.
    EventBack,
    /// The next event.
    EventOn,
    /// The start of the fall.
    ToStart,
    /// The end of the motion.
    ToEnd,
    /// The stretch of time shown.
    Window,
    /// The other curves of History.
    Curves,
    /// Help.
    Help,
    /// Leave.
    Quit,
    /// Leave at once, as after an interrupt.
    Interrupt,
}

/// Headings of the help screen.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Group {
    /// Choosing rows and panes.
    Choose,
    /// Changing inputs.
    Change,
    /// The file.
    File,
    /// Views and units.
    View,
    /// Playing the fall.
    Play,
}

impl Group {
    /// All groups in the order of the help screen.
    pub const ALL: [Self; 5] = [Self::Choose, Self::Change, Self::View, Self::Play, Self::File];

    /// The heading.
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Self::Choose => "choose",
            Self::Change => "change an input",
            Self::File => "file and program",
            Self::View => "views",
            Self::Play => "play the fall",
        }
    }
}

/// One row of the table.
#[derive(Clone, Copy, Debug)]
pub struct Entry {
    /// The command.
    pub command: Command,
    /// Stable name.
    pub id: &'static str,
    /// Keys; the first is the one the key line shows.
    pub keys: &'static [Key],
    /// A word or two for the key line; empty where it is not shown there.
    pub label: &'static str,
    /// One sentence for the help screen.
    pub help: &'static str,
    /// Where the help screen lists it.
    pub group: Group,
}

const fn entry(
    command: Command,
    id: &'static str,
    keys: &'static [Key],
    label: &'static str,
    help: &'static str,
    group: Group,
) -> Entry {
    Entry { command, id, keys, label, help, group }
}

/// Every command of the screen.
pub const COMMANDS: &[Entry] = &[
    entry(Command::Up, "up", &[Key::plain(KeyCode::Up)], "", "the row above", Group::Choose),
    entry(Command::Down, "down", &[Key::plain(KeyCode::Down)], "", "the row below", Group::Choose),
    entry(Command::PageUp, "page-up", &[Key::plain(KeyCode::PageUp)], "", "ten rows up", Group::Choose),
    entry(Command::PageDown, "page-down", &[Key::plain(KeyCode::PageDown)], "", "ten rows down", Group::Choose),
    entry(Command::NextPane, "next-pane", &[Key::plain(KeyCode::Tab)], "", "keys go to the next pane", Group::Choose),
    entry(
        Command::PreviousPane,
        "previous-pane",
        &[Key::plain(KeyCode::BackTab)],
        "",
        "keys go to the pane before",
        Group::Choose,
    ),
    entry(
        Command::Raise,
        "raise",
        &[Key::plain(KeyCode::Right), Key::letter('+'), Key::letter('=')],
        "raise",
        "raise the chosen input by a small step",
        Group::Change,
    ),
    entry(
        Command::Lower,
        "lower",
        &[Key::plain(KeyCode::Left), Key::letter('-')],
        "",
        "lower the chosen input by a small step",
        Group::Change,
    ),
    entry(
        Command::RaiseMuch,
        "raise-much",
        &[Key::shift(KeyCode::Right), Key::letter('}')],
        "",
        "raise it by ten small steps",
        Group::Change,
    ),
    entry(
        Command::LowerMuch,
        "lower-much",
        &[Key::shift(KeyCode::Left), Key::letter('{')],
        "",
        "lower it by ten small steps",
        Group::Change,
    ),
    entry(
        Command::Type,
        "type",
        &[Key::plain(KeyCode::Enter), Key::letter('t')],
        "type",
        "type a value with its unit, or a band such as 80..100..120 kg; enter takes it, esc leaves it",
        Group::Change,
    ),
    entry(
        Command::Undo,
        "undo",
        &[Key::letter('u'), Key::ctrl('z')],
        "undo",
        "take back the last change",
        Group::Change,
    ),
    entry(
        Command::Save,
        "save",
        &[Key::letter('s'), Key::ctrl('s')],
        "save",
        "write the changed values to the file; comments and order stay",
        Group::File,
    ),
    entry(Command::Redo, "redo", &[Key::letter('y'), Key::ctrl('y')], "", "make it again", Group::Change),
    entry(Command::Restore, "restore", &[Key::letter('f')], "", "back to the file's value", Group::Change),
    entry(
        Command::Elevation,
        "elevation",
        &[Key::letter('1')],
        "",
        "Elevation: the fall to scale, with its dimensions",
        Group::View,
    ),
    entry(
        Command::History,
        "history",
        &[Key::letter('2')],
        "",
        "History: travel and line force over time",
        Group::View,
    ),
    entry(Command::Margins, "margins", &[Key::letter('3')], "", "Margins: every check with its limit", Group::View),
    entry(
        Command::Notes,
        "notes",
        &[Key::letter('4')],
        "",
        "Notes: warnings, limits, assumptions and cautions; page-up and page-down scroll",
        Group::View,
    ),
    entry(
        Command::Ledger,
        "ledger",
        &[Key::letter('5')],
        "",
        "Ledger: the energy account, every number with its definition, and the working; page-up and page-down scroll",
        Group::View,
    ),
    entry(Command::NextView, "next-view", &[Key::letter('v')], "view", "the next view", Group::View),
    entry(
        Command::Window,
        "window",
        &[Key::letter('w')],
        "",
        "History shows the first catch or the whole motion",
        Group::View,
    ),
    entry(
        Command::Curves,
        "curves",
        &[Key::letter('c')],
        "",
        "History of a swing shows travel and force, or angle and speed, where there is no room for all",
        Group::View,
    ),
    entry(Command::Units, "units", &[Key::letter('m')], "units", "metric or US units", Group::View),
    entry(Command::Play, "play", &[Key::letter(' ')], "play", "play the fall in slow motion, or pause", Group::Play),
    entry(Command::Slower, "slower", &[Key::letter('[')], "", "play slower", Group::Play),
    entry(Command::Faster, "faster", &[Key::letter(']')], "", "play faster", Group::Play),
    entry(Command::StepBack, "step-back", &[Key::letter(',')], "", "a short time back", Group::Play),
    entry(Command::StepOn, "step-on", &[Key::letter('.')], "", "a short time on", Group::Play),
    entry(Command::EventBack, "event-back", &[Key::letter('p')], "", "the event before", Group::Play),
    entry(Command::EventOn, "event-on", &[Key::letter('n')], "next event", "the next event", Group::Play),
    entry(Command::ToStart, "to-start", &[Key::plain(KeyCode::Home)], "", "the start of the fall", Group::Play),
    entry(Command::ToEnd, "to-end", &[Key::plain(KeyCode::End)], "", "the end of the motion", Group::Play),
    entry(
        Command::Reload,
        "reload",
        &[Key::letter('r')],
        "",
        "read the file again; undo brings your changes back",
        Group::File,
    ),
    entry(Command::Help, "help", &[Key::letter('?'), Key::plain(KeyCode::F(1))], "keys", "this list", Group::File),
    entry(Command::Quit, "quit", &[Key::letter('q')], "quit", "leave; asks once when there are changes", Group::File),
    entry(
        Command::Interrupt,
        "interrupt",
        &[Key::ctrl('c')],
        "",
        "leave with the exit code of an interrupt; asks once when there are changes",
        Group::File,
    ),
];

/// The command a key stands for.
#[must_use]
pub fn command_for(event: KeyEvent) -> Option<Command> {
    let key = Key::of(event);
    COMMANDS.iter().find(|entry| entry.keys.contains(&key)).map(|entry| entry.command)
}

/// The name of a command's first key.
#[must_use]
pub fn key_name(command: Command) -> String {
    COMMANDS
        .iter()
        .find(|entry| entry.command == command)
        .and_then(|entry| entry.keys.first())
        .map_or_else(String::new, |key| key.name())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crossterm::event::KeyModifiers;
    use std::collections::HashSet;

    #[test]
    fn no_two_commands_share_a_key_an_id_or_a_name() {
        let mut keys = HashSet::new();
        let mut ids = HashSet::new();
        let mut commands = HashSet::new();
        for entry in COMMANDS {
            assert!(ids.insert(entry.id), "id {} twice", entry.id);
            assert!(commands.insert(entry.command), "command {:?} twice", entry.command);
            assert!(!entry.keys.is_empty(), "{} has no key", entry.id);
            for key in entry.keys {
                assert!(keys.insert(*key), "{} clashes on {}", entry.id, key.name());
            }
        }
    }

    #[test]
    fn every_key_of_the_table_is_found_from_its_event() {
        for entry in COMMANDS {
            for key in entry.keys {
                let event = KeyEvent::new(key.code, key.modifiers);
                assert_eq!(command_for(event), Some(entry.command), "{}", key.name());
            }
        }
    }

    #[test]
    fn shift_on_a_character_is_part_of_the_character() {
        let event = KeyEvent::new(KeyCode::Char('?'), KeyModifiers::SHIFT);
        assert_eq!(command_for(event), Some(Command::Help));
        let event = KeyEvent::new(KeyCode::BackTab, KeyModifiers::SHIFT);
        assert_eq!(command_for(event), Some(Command::PreviousPane));
    }

    #[test]
    fn every_command_has_help() {
        assert!(COMMANDS.iter().all(|entry| entry.help.len() > 5));
    }
}
