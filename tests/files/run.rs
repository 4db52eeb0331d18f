//! Running the command line inside the test.

use std::{ffi::OsStr, path::Path};

use plumbfold::cli::{Exit, Outcome, run};
use serde_json::Value;

/// How a run ended and what it said.
#[derive(Debug)]
pub struct Said {
    pub outcome: Outcome,
    pub out: String,
    pub err: String,
}

impl Said {
    /// The exit code, where the run is over.
    pub fn code(&self) -> Option<u8> {
        match self.outcome {
            Outcome::Done(exit) => Some(exit.code()),
            Outcome::Window(_) | Outcome::Sheet(_) => None,
        }
    }
}

/// Runs a command.
pub fn said(args: &[&OsStr]) -> Said {
    let (mut out, mut err) = (Vec::new(), Vec::new());
    let all = [OsStr::new("plumbfold")].into_iter().chain(args.iter().copied()).map(OsStr::to_owned);
    let outcome = run(all, &mut out, &mut err);
    let utf8 = |bytes| String::from_utf8(bytes).expect("UTF-8");
    Said { outcome, out: utf8(out), err: utf8(err) }
}

/// What `figures FILE … --json` prints, which must go well.
#[track_caller]
pub fn printed(file: &Path, options: &[&str]) -> String {
    let mut args = vec![OsStr::new("figures"), file.as_os_str()];
    args.extend(options.iter().map(OsStr::new));
    args.push(OsStr::new("--json"));
    let said = said(&args);
    assert_eq!((&said.outcome, said.err.as_str()), (&Outcome::Done(Exit::Fine), ""), "{}", file.display());
    said.out
}

/// The same, parsed.
#[track_caller]
pub fn figures(file: &Path, options: &[&str]) -> Value {
    serde_json::from_str(&printed(file, options)).expect("one JSON object")
}
