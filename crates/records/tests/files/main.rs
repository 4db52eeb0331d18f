//! Client files: bytes → client or problem, client → text, and the disk.

mod bad_input;
mod bounds;
mod convert;
mod disk;
mod good_input;
mod round_trip;
mod strategies;

use std::path::Path;

use plumbfold_records::{Client, Opened, Problem, read};

/// A file with every field, from which the tests make broken ones by replacing a piece.
const FULL: &str = include_str!("fixtures/v1-full.ron");

/// What reading the text as `x.ron` refuses.
fn problem(text: &str) -> Problem {
    match read(text.as_bytes(), Path::new("x.ron")) {
        Err(problem) => problem,
        Ok(opened) => panic!("read without a problem: {opened:?}"),
    }
}

/// The client that the text holds.
fn client(text: &str) -> Client {
    match read(text.as_bytes(), Path::new("x.ron")) {
        Ok(Opened::Current(client)) => client,
        other => panic!("{other:?}"),
    }
}

/// The full file with one piece, which must be there once, replaced.
fn with(piece: &str, instead: &str) -> String {
    assert_eq!(FULL.matches(piece).count(), 1, "{piece:?} must stand once in the fixture");
    FULL.replace(piece, instead)
}
