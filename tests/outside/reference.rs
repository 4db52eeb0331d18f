//! Reading the files of numbers, and comparing many numbers at once.

use std::{fs, path::Path};

use plumbfold_core::Case;
use plumbfold_records::{Opened, read};
use serde_json::Value;

/// The folder with the scripts and what they wrote.
pub const FOLDER: &str = concat!(env!("CARGO_MANIFEST_DIR"), "/reference");

/// A file of numbers.
pub fn file(name: &str) -> Value {
    let text = fs::read_to_string(Path::new(FOLDER).join(name)).expect("shipped with the tests");
    serde_json::from_str(&text).expect("JSON")
}

/// The cases of a file.
#[track_caller]
pub fn cases(file: &Value) -> &[Value] {
    file["cases"].as_array().expect("a list of cases")
}

/// A number that must be there.
#[track_caller]
pub fn number(value: &Value) -> f64 {
    value.as_f64().unwrap_or_else(|| panic!("{value} is no number"))
}

/// A text that must be there.
#[track_caller]
pub fn text(value: &Value) -> &str {
    value.as_str().unwrap_or_else(|| panic!("{value} is no text"))
}

/// From the text of a client file to the case of its only task.
#[track_caller]
pub fn case(line: &Value) -> Case {
    let code = text(&line["code"]);
    let opened = read(text(&line["ron"]).as_bytes(), Path::new(code)).unwrap_or_else(|problem| panic!("{problem}"));
    let Opened::Current(client) = opened else { panic!("{code}: a format that is not known") };
    assert_eq!(client.code.as_str(), code);
    let visit = &client.visits[client.latest_visit()];
    let task = visit.task(0).expect("a task");
    Case::new(&visit.measures(), &task).unwrap_or_else(|invalid| panic!("{code}: {invalid}")).0
}

/// What was out of tolerance, and how many numbers were compared.
#[derive(Default)]
pub struct Report {
    over: Vec<String>,
    compared: usize,
    worst: f64,
}

impl Report {
    /// Two numbers no further apart than `tol`; a NaN never is.
    pub fn near(&mut self, what: &str, ours: f64, theirs: f64, tol: f64) {
        self.compared += 1;
        let off = (ours - theirs).abs() / tol;
        self.worst = self.worst.max(off);
        if off.is_nan() || off > 1.0 {
            self.over.push(format!("{what}: {ours} against {theirs}, more than {tol:e} apart"));
        }
    }

    /// A number no more than another; a NaN never is.
    pub fn no_more(&mut self, what: &str, ours: f64, most: f64) {
        self.compared += 1;
        if ours.is_nan() || most.is_nan() || ours > most {
            self.over.push(format!("{what}: {ours} is more than {most}"));
        }
    }

    /// Two answers of different kinds.
    pub fn differ(&mut self, what: &str, how: &str) {
        self.compared += 1;
        self.over.push(format!("{what}: {how}"));
    }

    /// How many are out of tolerance so far.
    pub fn over(&self) -> usize {
        self.over.len()
    }

    /// Fails where anything was out of tolerance, or fewer numbers were compared than there must be.
    #[track_caller]
    pub fn finish(self, at_least: usize) {
        let shown: Vec<&str> = self.over.iter().take(40).map(String::as_str).collect();
        assert!(shown.is_empty(), "{} of {} disagree:\n{}", self.over.len(), self.compared, shown.join("\n"));
        assert!(self.compared >= at_least, "only {} numbers were compared", self.compared);
        println!("{} numbers, at most {:.1e} of what is allowed apart", self.compared, self.worst);
    }
}
