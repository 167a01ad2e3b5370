//! A key with its modifiers, and its name.
use crossterm::event::{KeyCode, KeyEvent, KeyModifiers};

/// A key with its modifiers; shift is written out only where the key itself does not change with it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Key {
    pub(super) code: KeyCode,
    pub(super) modifiers: KeyModifiers,
}

impl Key {
    pub(super) const fn plain(code: KeyCode) -> Self {
        Self { code, modifiers: KeyModifiers::NONE }
    }

    pub(super) const fn letter(letter: char) -> Self {
        Self::plain(KeyCode::Char(letter))
    }

    pub(super) const fn shift(code: KeyCode) -> Self {
        Self { code, modifiers: KeyModifiers::SHIFT }
    }

    pub(super) const fn ctrl(letter: char) -> Self {
        Self { code: KeyCode::Char(letter), modifiers: KeyModifiers::CONTROL }
    }

    /// The key of an event, in the form the table uses.
    #[must_use]
    pub fn of(event: KeyEvent) -> Self {
        let relevant = KeyModifiers::SHIFT | KeyModifiers::CONTROL | KeyModifiers::ALT;
        let mut modifiers = event.modifiers & relevant;
        if matches!(event.code, KeyCode::Char(_) | KeyCode::BackTab) {
            modifiers -= KeyModifiers::SHIFT;
        }
        Self { code: event.code, modifiers }
    }

    /// The name on the key line and in help: `shift-right`, `ctrl-s`, `space`.
    #[must_use]
    pub fn name(self) -> String {
        let code = match self.code {
            KeyCode::Char(' ') => "space".to_owned(),
            KeyCode::Char(letter) => letter.to_string(),
            KeyCode::BackTab => "shift-tab".to_owned(),
            KeyCode::PageUp => "page-up".to_owned(),
            KeyCode::PageDown => "page-down".to_owned(),
            KeyCode::F(number) => format!("F{number}"),
            other => format!("{other:?}").to_lowercase(),
        };
        let ctrl = if self.modifiers.contains(KeyModifiers::CONTROL) { "ctrl-" } else { "" };
        let shift = if self.modifiers.contains(KeyModifiers::SHIFT) { "shift-" } else { "" };
        format!("{ctrl}{shift}{code}")
    }
}
