//! The demo clients that ship with the program.

use std::path::{Path, PathBuf};

use plumbfold_records::{Client, Opened, read};

/// Codes of the demo clients; a test of the desk counts the files against them.
pub const DEMO: [&str; 8] = [
    "demo-ankle",
    "demo-hip",
    "demo-loaded",
    "demo-older",
    "demo-overhead",
    "demo-precautions",
    "demo-roomy",
    "demo-shape",
];

/// The folder they lie in.
#[must_use]
pub fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../demo-profiles")
}

/// A demo client by its code.
///
/// # Panics
/// Where the file as shipped cannot be read: the test cannot go on.
#[must_use]
pub fn demo(code: &str) -> Client {
    let file = folder().join(format!("{code}.ron"));
    let bytes = std::fs::read(&file).unwrap_or_else(|e| panic!("{}: {e}", file.display()));
    match read(&bytes, &file) {
        Ok(Opened::Current(client)) => client,
        Ok(Opened::Newer { format, .. }) => panic!("{}: format {format}", file.display()),
        Err(problem) => panic!("{problem}"),
    }
}
