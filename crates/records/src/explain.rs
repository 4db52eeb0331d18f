//! From an error of the parser to a sentence for people.

use std::path::Path;

use ron::error::{Error, Position, SpannedError};
use serde_path_to_error::Segment;

use crate::{
    bounded::AS_TYPED,
    problem::{Problem, shown},
};

/// What stopped reading: the parser's error with its place, and the way to the field.
#[derive(Debug)]
pub(crate) struct Trouble {
    pub error: Box<SpannedError>,
    pub path: Vec<Segment>,
}

/// The parts of a problem that depend on what went wrong.
struct Said {
    value: String,
    allowed: String,
    hint: &'static str,
    /// The field itself, where the path leads only to what holds it.
    below: Option<String>,
}

fn said(value: impl Into<String>, allowed: impl Into<String>, hint: &'static str) -> Said {
    Said { value: value.into(), allowed: allowed.into(), hint, below: None }
}

/// Says in words what was wrong, where, and what is needed.
pub(crate) fn explain(text: &str, file: &Path, trouble: Trouble) -> Problem {
    let SpannedError { code, span } = *trouble.error;
    let end = offset(text, &span.end);
    let rest = text.get(end..).unwrap_or_default();
    let Said { value, allowed, hint, below } = if is_cut_short(&code, rest) {
        said(
            "the end of the file",
            "the rest of it, up to the last closing bracket",
            "the file is cut short, take a copy that is whole",
        )
    } else {
        say(code, text.get(..end).unwrap_or_default(), rest)
    };
    Problem {
        file: file.to_owned(),
        line: u32::try_from(span.end.line).ok(),
        field: field(&trouble.path, below.as_deref()),
        value,
        allowed,
        hint,
    }
}

/// Whether the text simply ends too early.
fn is_cut_short(code: &Error, rest: &str) -> bool {
    match code {
        Error::Eof | Error::ExpectedStringEnd | Error::UnclosedBlockComment => true,
        // Complete as read; wrong for another reason.
        Error::NoSuchStructField { .. }
        | Error::NoSuchEnumVariant { .. }
        | Error::DuplicateStructField { .. }
        | Error::MissingStructField { .. }
        | Error::ExpectedDifferentStructName { .. }
        | Error::ExceededRecursionLimit => false,
        Error::InvalidValueForType { found, .. } => found == AS_TYPED && rest.trim().is_empty(),
        _ => rest.trim().is_empty(),
    }
}

fn say(code: Error, before: &str, rest: &str) -> Said {
    match code {
        Error::InvalidValueForType { expected, found } if found == AS_TYPED => {
            said(number_typed(before, rest), expected, "check the number and its unit")
        }
        Error::InvalidValueForType { expected, found } => said(shown(&found), expected, "correct it in the file"),
        Error::MissingStructField { field, .. } => {
            Said { below: Some(field.to_owned()), ..said("no value", "one", "add the field") }
        }
        Error::NoSuchStructField { expected, found, .. } => Said {
            below: Some(shown(&found)),
            ..said("a field not known here", any_of(expected), "correct its name or delete it")
        },
        Error::DuplicateStructField { field, .. } => Said {
            below: Some(field.to_owned()),
            ..said("the field twice", "each field once", "delete one of the two")
        },
        Error::NoSuchEnumVariant { expected, found, .. } => {
            said(shown(&found), any_of(expected), "choose one of these words")
        }
        Error::ExceededRecursionLimit => {
            said("brackets nested too deep", "the brackets of a client file", "choose a client file")
        }
        Error::TrailingCharacters => {
            said(typed_at(rest), "nothing after the last closing bracket", "delete what follows it")
        }
        Error::ExpectedOption => {
            said(typed_at(rest), "None or Some(…)", "write Some(39.8) for a value and None for no value")
        }
        Error::ExpectedString => said(typed_at(rest), "text in double quotes", "put it in double quotes"),
        Error::ExpectedBoolean => said(typed_at(rest), "true or false", "choose one of these words"),
        Error::ExpectedArray => said(typed_at(rest), "a list in [ ]", "put it in square brackets"),
        Error::ExpectedDifferentStructName { found, .. } => {
            said(shown(&found), "fields in ( )", "choose a client file, or delete this word")
        }
        Error::ExpectedStructLike | Error::ExpectedNamedStructLike(_) => {
            said(typed_at(rest), "fields in ( )", "put them in round brackets")
        }
        Error::ExpectedIdentifier | Error::InvalidIdentifier(_) | Error::SuggestRawIdentifier(_) => {
            said(typed_at(rest), "the name of a field", "check the commas here, and write decimals with a point")
        }
        other => {
            let words = other.to_string();
            let needed = words.strip_prefix("Expected ").map_or_else(|| "well-formed RON".to_owned(), str::to_owned);
            said(typed_at(rest), needed, "check commas, colons, quotes and brackets here")
        }
    }
}

/// A number as typed: before the cursor where it was taken for one, else what follows.
fn number_typed(before: &str, rest: &str) -> String {
    let start = before.trim_end_matches(|c: char| c.is_ascii_alphanumeric() || "+-._".contains(c)).len();
    match before.get(start..) {
        None | Some("") => typed_at(rest),
        Some(number) => shown(number),
    }
}

/// The piece of text at the cursor, up to where the next begins.
fn typed_at(rest: &str) -> String {
    let rest = rest.trim_start();
    let line = rest.lines().next().unwrap_or_default();
    let length = match line.strip_prefix('"') {
        Some(after) => after.find('"').map_or(line.len(), |at| at + 2),
        None => {
            let first = line.chars().next().map_or(0, char::len_utf8);
            let tail = line.get(first..).unwrap_or_default();
            first + tail.find([',', ')', ']', '}', ' ', ':', '"']).unwrap_or(tail.len())
        }
    };
    shown(line.get(..length).unwrap_or(line).trim_end())
}

fn any_of(words: &[&str]) -> String {
    match words {
        [] => "nothing".to_owned(),
        [one] => (*one).to_owned(),
        [before @ .., last] => format!("{} or {last}", before.join(", ")),
    }
}

/// `visits[0].joints.ankle.left_cm`; the words of choices (`KneeToWall`) are left out, for the
/// fields name the place without them.
fn field(path: &[Segment], below: Option<&str>) -> Option<String> {
    let mut out = String::new();
    let name = |out: &mut String, name: &str| {
        if !out.is_empty() {
            out.push('.');
        }
        out.push_str(name);
    };
    for segment in path {
        match segment {
            Segment::Seq { index } => out.push_str(&format!("[{index}]")),
            Segment::Map { key } => name(&mut out, key),
            Segment::Enum { .. } | Segment::Unknown => {}
        }
    }
    let at_it = matches!(path.last(), Some(Segment::Map { key }) if Some(key.as_str()) == below);
    if let Some(below) = below.filter(|_| !at_it) {
        name(&mut out, below);
    }
    (!out.is_empty()).then_some(out)
}

/// Byte offset of a line and column (both from 1, columns in characters).
fn offset(text: &str, at: &Position) -> usize {
    let line_start: usize = text.split_inclusive('\n').take(at.line.saturating_sub(1)).map(str::len).sum();
    let line = text.get(line_start..).unwrap_or_default();
    line_start + line.chars().take(at.col.saturating_sub(1)).map(char::len_utf8).sum::<usize>()
}
