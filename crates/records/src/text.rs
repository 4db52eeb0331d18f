//! Texts in files: how long they may be and what they may hold.

use std::fmt;

use jiff::civil::Date;
use serde::{
    Deserialize, Deserializer, Serialize, Serializer,
    de::{Error, Unexpected},
};

use crate::{client::Code, problem::shown, saved::Saved};

/// Longest client code, characters.
pub const CODE_MAX_CHARS: usize = 40;
/// Longest name of a task, characters.
pub const NAME_MAX_CHARS: usize = 60;
/// Longest source of a precaution, characters.
pub const SOURCE_MAX_CHARS: usize = 200;
/// Longest note, characters.
pub const NOTE_MAX_CHARS: usize = 20_000;

/// What a code needs, in words.
pub(crate) const CODE_ALLOWED: &str = "1 to 40 characters, none of / \\ : * ? \" < > | and no control character, \
                                       not starting or ending with a space or a full stop";

/// Characters that some file system cannot hold in a name.
const NOT_IN_FILE_NAMES: [char; 9] = ['/', '\\', ':', '*', '?', '"', '<', '>', '|'];

/// Whether a text can be a client's code, which becomes the name of a file.
pub(crate) fn code_holds(code: &str) -> bool {
    let edge = |c: char| c == '.' || c.is_whitespace();
    !code.is_empty()
        && code.chars().count() <= CODE_MAX_CHARS
        && !code.chars().any(|c| c.is_control() || NOT_IN_FILE_NAMES.contains(&c))
        && !code.starts_with(edge)
        && !code.ends_with(edge)
}

fn refused<'de, D: Deserializer<'de>>(found: &str, allowed: &str) -> D::Error {
    D::Error::invalid_value(Unexpected::Other(found), &allowed)
}

fn quoted(text: &str) -> String {
    if text.is_empty() { "an empty text".to_owned() } else { format!("\"{}\"", shown(text)) }
}

/// A code as it stands in a file.
#[derive(Serialize)]
#[serde(transparent)]
pub(crate) struct SavedCode(String);

impl<'de> Deserialize<'de> for SavedCode {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        let text = String::deserialize(deserializer)?;
        if code_holds(&text) { Ok(Self(text)) } else { Err(refused::<D>(&quoted(&text), CODE_ALLOWED)) }
    }
}

impl Saved for SavedCode {
    type Live = Code;
    fn live(self) -> Code {
        Code::from_checked(self.0)
    }
    fn of(live: &Code) -> Self {
        Self(live.as_str().to_owned())
    }
}

/// A name of one line, not blank.
#[derive(Serialize)]
#[serde(transparent)]
pub(crate) struct SavedName(pub String);

impl<'de> Deserialize<'de> for SavedName {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        let text = String::deserialize(deserializer)?;
        let holds =
            !text.trim().is_empty() && text.chars().count() <= NAME_MAX_CHARS && !text.chars().any(char::is_control);
        if holds {
            Ok(Self(text))
        } else {
            let allowed = format!("1 to {NAME_MAX_CHARS} characters on one line, not only spaces");
            Err(refused::<D>(&quoted(&text), &allowed))
        }
    }
}

impl Saved for SavedName {
    type Live = String;
    fn live(self) -> String {
        self.0
    }
    fn of(live: &String) -> Self {
        Self(live.clone())
    }
}

/// Free text of at most `MAX` characters.
#[derive(Serialize)]
#[serde(transparent)]
pub(crate) struct SavedText<const MAX: usize>(String);

impl<'de, const MAX: usize> Deserialize<'de> for SavedText<MAX> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        let text = String::deserialize(deserializer)?;
        let count = text.chars().count();
        if count <= MAX {
            Ok(Self(text))
        } else {
            Err(refused::<D>(&format!("{count} characters"), &format!("at most {MAX} characters")))
        }
    }
}

impl<const MAX: usize> Saved for SavedText<MAX> {
    type Live = String;
    fn live(self) -> String {
        self.0
    }
    fn of(live: &String) -> Self {
        Self(live.clone())
    }
}

/// A calendar date, `YYYY-MM-DD`.
pub(crate) struct SavedDate(Date);

impl fmt::Display for SavedDate {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        fmt::Display::fmt(&self.0, f)
    }
}

impl Serialize for SavedDate {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_str(self)
    }
}

impl<'de> Deserialize<'de> for SavedDate {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        const LENGTH: usize = "2026-11-03".len();
        let text = String::deserialize(deserializer)?;
        // Parsers of dates take more than this one way of writing; writing it again tells.
        match text.parse::<Date>() {
            Ok(date) if text.len() == LENGTH && date.to_string() == text => Ok(Self(date)),
            _ => Err(refused::<D>(&quoted(&text), "a date of the calendar, year-month-day, such as 2026-11-03")),
        }
    }
}

impl Saved for SavedDate {
    type Live = Date;
    fn live(self) -> Date {
        self.0
    }
    fn of(live: &Date) -> Self {
        Self(*live)
    }
}
