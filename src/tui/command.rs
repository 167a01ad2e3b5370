//! Commands of the screen and how the keys find them.
use super::key::Key;
pub use super::table::COMMANDS;
use super::views::View;
use crossterm::event::KeyEvent;

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
    /// One view.
    Show(View),
    /// The next view.
    NextView,
    /// Break off the studies that run.
    Stop,
    /// Start the studies of this view again.
    Again,
    /// Write the point of Map or the chosen remedy into the inputs.
    IntoInputs,
    /// The chosen input goes to the right in Map.
    AxisAcross,
    /// The chosen input goes upwards in Map.
    AxisUp,
    /// Remedies at the typical values or at the worst found.
    HeldAt,
    /// Keep the present state to compare with.
    Keep,
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
    /// The next stop of a walk-through.
    WalkOn,
    /// The stop before.
    WalkBack,
    /// The start of the walk-through.
    WalkStart,
    /// Leave the walk-through.
    WalkLeave,
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
    /// Studies: many runs.
    Study,
    /// Playing the fall.
    Play,
    /// Leading through a walk.
    Walk,
}

impl Group {
    /// All groups in the order of the help screen.
    pub const ALL: [Self; 7] =
        [Self::Choose, Self::Change, Self::View, Self::Study, Self::Play, Self::Walk, Self::File];

    /// The heading.
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Self::Choose => "choose",
            Self::Change => "change an input",
            Self::File => "file and program",
            Self::View => "views",
            Self::Study => "studies",
            Self::Play => "play the fall",
            Self::Walk => "walk-through",
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
    use crossterm::event::{KeyCode, KeyModifiers};
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
