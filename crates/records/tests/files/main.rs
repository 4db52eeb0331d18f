//! Client files: bytes → client or problem, client → text, and the disk.

mod bad_input;
mod bounds;
mod convert;
mod disk;
mod formats;
mod good_input;
mod round_trip;
mod strategies;

use std::path::Path;

use plumbfold_records::{Client, Opened, Problem, read};

/// A file with every field of format 1, from which the tests make broken ones by replacing a piece.
const FULL: &str = include_str!("fixtures/v1-full.ron");

/// The same in format 2, with the fields that it adds.
const FULL_2: &str = include_str!("fixtures/v2-full.ron");

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

/// The full file of format 1 with one piece, which must be there once, replaced.
fn with(piece: &str, instead: &str) -> String {
    replaced(FULL, piece, instead)
}

/// The full file of format 2 with one piece, which must be there once, replaced.
fn with_2(piece: &str, instead: &str) -> String {
    replaced(FULL_2, piece, instead)
}

fn replaced(text: &str, piece: &str, instead: &str) -> String {
    assert_eq!(text.matches(piece).count(), 1, "{piece:?} must stand once in the fixture");
    text.replace(piece, instead)
}

/// The debug text tells 0.0 from -0.0 and shows every number to its last bit, so two clients of the
/// same text have the same bits; `==` would take the two zeros for one.
fn bits(client: &Client) -> String {
    format!("{client:?}")
}

/// The client without what only format 2 can hold.
fn without_additions(mut client: Client) -> Client {
    for task in client.visits.iter_mut().flat_map(|visit| &mut visit.tasks) {
        task.felt = None;
        if let Some(seen) = &mut task.seen {
            seen.pain_at = None;
        }
    }
    client
}
