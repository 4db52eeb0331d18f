//! What is wrong with a file, in parts and as one sentence.

use std::{fmt, path::PathBuf};

/// Why a file could not be read or written.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Problem {
    /// The file.
    pub file: PathBuf,
    /// The line, from 1, where it is known.
    pub line: Option<u32>,
    /// The field, such as `visits[0].build.shank_cm`, where it is known.
    pub field: Option<String>,
    /// What was found.
    pub value: String,
    /// What is needed there.
    pub allowed: String,
    /// What to do.
    pub hint: &'static str,
}

impl fmt::Display for Problem {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}", self.file.display())?;
        if let Some(line) = self.line {
            write!(f, ", line {line}")?;
        }
        if let Some(field) = &self.field {
            write!(f, ", {field}")?;
        }
        write!(f, ": found {}, needs {}; {}.", self.value, self.allowed, self.hint)
    }
}

impl std::error::Error for Problem {}

/// Longest piece of a file that a message repeats, characters.
const SHOWN_CHARS: usize = 60;

/// A piece of a file made fit for a message: one line, not long, nothing invisible.
pub(crate) fn shown(piece: &str) -> String {
    let mut out: String =
        piece.chars().take(SHOWN_CHARS).map(|c| if c.is_control() { '\u{fffd}' } else { c }).collect();
    if piece.chars().nth(SHOWN_CHARS).is_some() {
        out.push('…');
    }
    out
}
