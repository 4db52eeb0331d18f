//! Commands: one place for label, hint and shortcut; menus, buttons and help derive from it.

use egui::{Key, KeyboardShortcut, Modifiers};

/// Something that a button, a menu or a key asks for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Command {
    /// Takes the last change back.
    Undo,
    /// Makes it again.
    Redo,
    /// Opens a client file.
    Open,
    /// Saves the client.
    Save,
    /// Saves the client under another name.
    SaveAs,
    /// Starts a client anew.
    NewClient,
    /// Writes the sheet as a picture.
    SheetPicture,
    /// Shows the view for the client.
    ClientView,
    /// Plays the descent.
    Play,
    /// Lets the handles write what was seen.
    MatchSeen,
    /// Shows or hides the outline with average lengths.
    Outline,
    /// Faces the figure the other way.
    Face,
    /// Changes between light, dark and high contrast.
    Palette,
    /// Shows or folds the plots.
    Plots,
    /// Shows the keys.
    Keys,
}

const NONE: Modifiers = Modifiers::NONE;
const CTRL: Modifiers = Modifiers::COMMAND;
const CTRL_SHIFT: Modifiers = Modifiers { shift: true, ..Modifiers::COMMAND };

impl Command {
    /// Every command, in the order of the list of keys.
    pub const ALL: [Self; 15] = [
        Self::Undo,
        Self::Redo,
        Self::NewClient,
        Self::Open,
        Self::Save,
        Self::SaveAs,
        Self::SheetPicture,
        Self::ClientView,
        Self::Play,
        Self::MatchSeen,
        Self::Outline,
        Self::Face,
        Self::Plots,
        Self::Palette,
        Self::Keys,
    ];

    /// Label, hint and shortcut.
    #[must_use]
    pub const fn about(self) -> (&'static str, &'static str, KeyboardShortcut) {
        match self {
            Self::Undo => ("Undo", "Take the last change back", KeyboardShortcut::new(CTRL, Key::Z)),
            Self::Redo => ("Redo", "Make it again", KeyboardShortcut::new(CTRL_SHIFT, Key::Z)),
            Self::NewClient => ("New…", "Start a new client", KeyboardShortcut::new(CTRL, Key::N)),
            Self::Open => ("Open…", "Open a client file", KeyboardShortcut::new(CTRL, Key::O)),
            Self::Save => ("Save", "Save the client", KeyboardShortcut::new(CTRL, Key::S)),
            Self::SaveAs => ("Save as…", "Save the client in another file", KeyboardShortcut::new(CTRL_SHIFT, Key::S)),
            Self::SheetPicture => ("Sheet…", "Write the sheet as a picture", KeyboardShortcut::new(CTRL, Key::P)),
            Self::ClientView => {
                ("For client", "Figure and one sentence, for the client", KeyboardShortcut::new(NONE, Key::F5))
            }
            Self::Play => ("Play", "Play the descent", KeyboardShortcut::new(NONE, Key::F8)),
            Self::MatchSeen => {
                ("Match what I saw", "Drag the figure onto the squat you saw", KeyboardShortcut::new(NONE, Key::F2))
            }
            Self::Outline => (
                "Outline",
                "Behind the figure: average lengths, then usual ranges, then nothing",
                KeyboardShortcut::new(NONE, Key::F3),
            ),
            Self::Face => ("Face the other way", "Turn the figure round", KeyboardShortcut::new(NONE, Key::F4)),
            Self::Plots => ("Plots", "Show or fold the plots", KeyboardShortcut::new(NONE, Key::F7)),
            Self::Palette => ("Light or dark", "Light, dark, high contrast", KeyboardShortcut::new(NONE, Key::F6)),
            Self::Keys => ("Keys", "What the keys do", KeyboardShortcut::new(NONE, Key::F1)),
        }
    }

    /// The label.
    #[must_use]
    pub const fn label(self) -> &'static str {
        self.about().0
    }

    /// The hint, with the shortcut behind it.
    #[must_use]
    pub fn hint(self, ctx: &egui::Context) -> String {
        let (_, hint, key) = self.about();
        format!("{hint} ({})", ctx.format_shortcut(&key))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_two_commands_share_a_key_or_a_label() {
        for (i, a) in Command::ALL.iter().enumerate() {
            for b in &Command::ALL[i + 1..] {
                assert_ne!(a.about().2, b.about().2, "{a:?} {b:?}");
                assert_ne!(a.label(), b.label());
            }
        }
    }
}
