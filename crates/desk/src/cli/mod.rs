//! The command line: arguments in, text out, an exit code back.
//!
//! [`run`] does all that needs no window and draws nothing; what is left to do comes back as
//! [`Outcome::Window`] or [`Outcome::Sheet`] with the client already read, so that a broken file is
//! one sentence whatever was asked for.

mod args;
mod check;
mod choose;
mod figures;
mod figures_text;
mod reasons;
mod sheet;
#[cfg(test)]
mod tests;

use std::{
    ffi::OsString,
    io::{self, ErrorKind, Write},
    path::PathBuf,
    process::ExitCode,
};

use clap::Parser as _;
use plumbfold_records::{Client, Problem};

use args::{Args, Command};
pub use choose::Chosen;
pub use figures::{Figures, figures};
pub use sheet::SheetJob;

/// How the program ends.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Exit {
    /// All went well.
    Fine,
    /// A file could not be read, computed with or written; one sentence on standard error names it.
    BadInput,
    /// The arguments make no sense.
    WrongUsage,
}

impl Exit {
    /// The number the shell sees.
    #[must_use]
    pub const fn code(self) -> u8 {
        match self {
            Self::Fine => 0,
            Self::BadInput => 1,
            Self::WrongUsage => 2,
        }
    }
}

impl From<Exit> for ExitCode {
    fn from(exit: Exit) -> Self {
        Self::from(exit.code())
    }
}

/// What remains to be done after the arguments were read.
#[derive(Debug, PartialEq)]
pub enum Outcome {
    /// Nothing: end like this.
    Done(Exit),
    /// Open the window.
    Window(Launch),
    /// Draw a sheet, then [`SheetJob::write`] it.
    Sheet(SheetJob),
}

/// A window to open.
#[derive(Debug, PartialEq)]
pub struct Launch {
    /// The client and the file it came from; none: a demo client.
    pub opened: Option<(PathBuf, Client)>,
    /// Whether frame times are printed at the end.
    pub frame_times: bool,
}

/// Carries out the command that the arguments (the program's name first) ask for.
pub fn run(args: impl IntoIterator<Item = OsString>, out: &mut dyn Write, err: &mut dyn Write) -> Outcome {
    let args = match Args::try_parse_from(args) {
        Ok(args) => args,
        Err(told) if told.use_stderr() => {
            // Where not even that can be told, the exit code still says it.
            let _ = write!(err, "{told}");
            return Outcome::Done(Exit::WrongUsage);
        }
        // Help and version are what was asked for.
        Err(told) => return Outcome::Done(print(&told.to_string(), out, err)),
    };
    let frame_times = args.frame_times;
    let outcome = match args.command {
        None => Ok(Outcome::Window(Launch { opened: None, frame_times })),
        Some(Command::Open { file }) => {
            choose::client(&file).map(|client| Outcome::Window(Launch { opened: Some((file, client)), frame_times }))
        }
        Some(Command::Figures { of, json }) => {
            let form = if json { figures::Form::Json } else { figures::Form::Text };
            figures::command(&of, form).map(|text| Outcome::Done(print(&text, out, err)))
        }
        Some(Command::Reasons { of, json }) => {
            let form = if json { figures::Form::Json } else { figures::Form::Text };
            reasons::command(&of, form).map(|text| Outcome::Done(print(&text, out, err)))
        }
        Some(Command::Check { files }) => Ok(Outcome::Done(check::command(&files, out, err))),
        Some(Command::Sheet { of, output }) => sheet::command(&of, output).map(Outcome::Sheet),
    };
    outcome.unwrap_or_else(|problem| Outcome::Done(refuse(&problem, err)))
}

/// Tells a problem in its one sentence.
pub fn refuse(problem: &Problem, err: &mut dyn Write) -> Exit {
    let _ = writeln!(err, "{problem}");
    Exit::BadInput
}

fn print(text: &str, out: &mut dyn Write, err: &mut dyn Write) -> Exit {
    match out.write_all(text.as_bytes()).and_then(|()| out.flush()) {
        Ok(()) => Exit::Fine,
        Err(error) => unprinted(&error, err),
    }
}

fn unprinted(error: &io::Error, err: &mut dyn Write) -> Exit {
    // Whoever reads had enough, as `head` does.
    if error.kind() == ErrorKind::BrokenPipe {
        return Exit::Fine;
    }
    let _ = writeln!(err, "The output could not be written: {error}.");
    Exit::BadInput
}
