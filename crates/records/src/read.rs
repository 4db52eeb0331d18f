//! Bytes to a client, or to the one problem that stands first in the file.

use std::{cell::Cell, fmt, path::Path};

use serde::{
    Deserialize, Deserializer as _,
    de::{DeserializeOwned, IgnoredAny, MapAccess, Visitor},
};

use crate::{
    client::Client,
    explain::{Trouble, explain},
    migrate,
    problem::Problem,
};

/// The newest format; files up to it are read. [`write()`](crate::write()) writes the oldest that
/// holds all there is.
pub const CURRENT_FORMAT: u32 = 2;

/// Largest file read, bytes. A client of many years is some hundred kilobytes.
pub const SIZE_LIMIT_BYTES: usize = 4 * 1024 * 1024;

/// What a file turned out to be.
#[derive(Clone, Debug, PartialEq)]
pub enum Opened {
    /// A client in a format known here.
    Current(Client),
    /// A file of a newer format: its text may be looked at; there is no way to save it.
    Newer {
        /// The format it says it has.
        format: u32,
        /// The text as it stands.
        text: String,
    },
}

/// Reads the bytes of a client file. `file` only names it in problems.
///
/// # Errors
/// One [`Problem`], that of the first place in the file that cannot be read.
pub fn read(bytes: &[u8], file: &Path) -> Result<Opened, Problem> {
    let problem = |value: &str, allowed: &str, hint| Problem {
        file: file.to_owned(),
        line: None,
        field: None,
        value: value.to_owned(),
        allowed: allowed.to_owned(),
        hint,
    };
    if bytes.len() > SIZE_LIMIT_BYTES {
        return Err(too_large(file));
    }
    let text = std::str::from_utf8(bytes).map_err(|fault| {
        let before = bytes.get(..fault.valid_up_to()).unwrap_or_default();
        let line = 1 + before.iter().filter(|&&byte| byte == b'\n').count();
        Problem {
            line: u32::try_from(line).ok(),
            ..problem(
                "bytes that are not UTF-8 text",
                "a client file in UTF-8",
                "choose a client file, or save it again as UTF-8",
            )
        }
    })?;
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    if text.trim().is_empty() {
        return Err(problem("an empty file", "a client file", "take a copy of it from a backup"));
    }
    match format_of(text) {
        Some(format) if format > CURRENT_FORMAT => Ok(Opened::Newer { format, text: text.to_owned() }),
        format => {
            migrate::to_current(text, format).map(Opened::Current).map_err(|trouble| explain(text, file, trouble))
        }
    }
}

pub(crate) fn too_large(file: &Path) -> Problem {
    Problem {
        file: file.to_owned(),
        line: None,
        field: None,
        value: format!("more than {} MB", SIZE_LIMIT_BYTES / (1024 * 1024)),
        allowed: "a client file, which is far smaller".to_owned(),
        hint: "choose a client file",
    }
}

/// Parses a whole text, with the field and the place of the first trouble.
pub(crate) fn parse<T: DeserializeOwned>(text: &str) -> Result<T, Trouble> {
    let mut deserializer =
        ron::Deserializer::from_str(text).map_err(|error| Trouble { error: error.into(), path: Vec::new() })?;
    let value = match serde_path_to_error::deserialize(&mut deserializer) {
        Ok(value) => value,
        Err(error) => {
            let path = error.path().iter().cloned().collect();
            return Err(Trouble { error: deserializer.span_error(error.into_inner()).into(), path });
        }
    };
    match deserializer.end() {
        Ok(()) => Ok(value),
        Err(code) => Err(Trouble { error: deserializer.span_error(code).into(), path: Vec::new() }),
    }
}

/// The format a text says it has, whatever else it holds or lacks.
fn format_of(text: &str) -> Option<u32> {
    let found = Cell::new(None);
    let mut deserializer = ron::Deserializer::from_str(text).ok()?;
    // Stopping in the middle leaves an error behind; only what was found by then counts.
    let _ = deserializer.deserialize_struct("Client", &["format"], Header(&found));
    found.get()
}

/// Looks for the field `format`, passes over others, and stops when it has it.
struct Header<'a>(&'a Cell<Option<u32>>);

impl<'de> Visitor<'de> for Header<'_> {
    type Value = ();

    fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str("a client file")
    }

    fn visit_map<A: MapAccess<'de>>(self, mut fields: A) -> Result<(), A::Error> {
        while let Some(Named(name)) = fields.next_key()? {
            if name == "format" {
                self.0.set(Some(fields.next_value()?));
                return Ok(());
            }
            fields.next_value::<IgnoredAny>()?;
        }
        Ok(())
    }
}

/// The name of a field.
struct Named(String);

impl<'de> Deserialize<'de> for Named {
    fn deserialize<D: serde::Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        String::deserialize(deserializer).map(Self)
    }
}
