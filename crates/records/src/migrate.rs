//! From the saved structs of every format version to the types of today.
//!
//! Each version keeps its own structs, frozen once released. A later version adds a module beside
//! `v1` and a step here that turns the older structs into the newer ones; files of every old version
//! stay readable, and a fixture of each is kept under `tests/files/fixtures`.

use crate::{client::Client, explain::Trouble, read::parse, v1, v1::Saved};

/// Reads a text as a file of format `format`, or as the current one where the format is missing or
/// is none that ever was, so that the error names that field.
pub(crate) fn to_current(text: &str, format: Option<u32>) -> Result<Client, Trouble> {
    match format {
        // One version so far: no step to take.
        Some(_) | None => parse::<v1::Client>(text).map(Saved::live),
    }
}
