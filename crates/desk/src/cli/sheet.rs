//! `plumbfold sheet`: which squat is drawn, and where the picture goes.

use std::{
    fs,
    path::{Path, PathBuf},
};

use plumbfold_records::Problem;

use super::{
    args::Selection,
    choose::{self, Chosen},
};

/// A sheet to draw.
#[derive(Clone, Debug, PartialEq)]
pub struct SheetJob {
    /// The squat, known to be one that can be computed.
    pub of: Chosen,
    /// Where the picture goes.
    pub output: PathBuf,
}

pub fn command(of: &Selection, output: PathBuf) -> Result<SheetJob, Problem> {
    let of = choose::chosen(of)?;
    of.case()?;
    Ok(SheetJob { of, output })
}

impl SheetJob {
    /// Writes the picture.
    ///
    /// # Errors
    /// Where the disk refuses.
    pub fn write(&self, png: &[u8]) -> Result<(), Problem> {
        fs::write(&self.output, png).map_err(|error| unwritten(&self.output, error.to_string()))
    }
}

fn unwritten(output: &Path, why: String) -> Problem {
    Problem {
        file: output.to_owned(),
        line: None,
        field: None,
        value: format!("a fault of the system ({why})"),
        allowed: "a place that can be written".to_owned(),
        hint: "choose another place with -o",
    }
}
