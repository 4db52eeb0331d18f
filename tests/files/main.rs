//! Client files from the bytes to the figures and to the exit code.
//!
//! - `worked` holds seven clients against numbers computed by two other solvers, through the command
//!   line; `reference` 240 random ones against the solver in `tests/reference`; `tables` that
//!   solver's tables against the program's; `unchanged` its files against the numbers they made.
//! - `documents` is whether the README and its companions say what is there.
//! - `shape` is the machine-readable output as others read it; `refusals` what is said of files
//!   that cannot be read, and which exit code goes with it.

mod compare;
mod documents;
mod ordered;
mod reference;
mod refusals;
mod run;
mod shape;
mod tables;
mod unchanged;
mod worked;

/// The folder of these tests, with `worked` and `reference` in it.
const TESTS: &str = env!("CARGO_MANIFEST_DIR");
