//! The whole program: arguments in, exit code out.

use std::{ffi::OsString, io::Write, path::Path};

use crate::{
    cli::{self, Exit, Launch, Outcome, SheetJob, refuse},
    demo,
    document::Document,
    sheets, shell,
};

/// Where the demo client's sheet goes when there is no display.
const DEMO_SHEET: &str = "plumbfold-demo.png";

/// Runs the program.
pub fn program(args: impl IntoIterator<Item = OsString>, out: &mut dyn Write, err: &mut dyn Write) -> Exit {
    match cli::run(args, out, err) {
        Outcome::Done(exit) => exit,
        Outcome::Sheet(job) => write_sheet(&job, err),
        Outcome::Window(launch) => window(launch, out, err),
    }
}

fn write_sheet(job: &SheetJob, err: &mut dyn Write) -> Exit {
    let of = &job.of;
    let doc = Document { client: of.client.clone(), visit: of.visit, task: of.task };
    match sheets::png(&doc, of.thigh_deg) {
        Ok(png) => job.write(&png).map_or_else(|problem| refuse(&problem, err), |()| Exit::Fine),
        Err(why) => tell(&format!("{}: the sheet could not be drawn: {why}.", of.file.display()), err),
    }
}

fn tell(sentence: &str, err: &mut dyn Write) -> Exit {
    // where not even that can be told, the exit code still says it
    let _ = writeln!(err, "{sentence}");
    Exit::BadInput
}

fn window(launch: Launch, out: &mut dyn Write, err: &mut dyn Write) -> Exit {
    let file = launch.opened.as_ref().map(|(path, _)| path.clone());
    let Err(why) = shell::open(launch, out) else { return Exit::Fine };
    match file {
        Some(path) => {
            let sheet = "plumbfold sheet FILE -o OUT.png";
            tell(&format!("{}: {why} To have the sheet as a picture, use {sheet}.", path.display()), err)
        }
        None => demo_sheet(&why, Path::new(DEMO_SHEET), out, err),
    }
}

/// No display: says so and writes the demo client's sheet here, over nothing but its own earlier file.
fn demo_sheet(why: &shell::NoWindow, path: &Path, out: &mut dyn Write, err: &mut dyn Write) -> Exit {
    let drawn = demo::client().map_err(|p| p.to_string()).and_then(|client| {
        let doc = Document::new(client);
        let thigh = doc.task().goal_thigh_deg;
        sheets::png(&doc, thigh)
    });
    let png = match drawn {
        Ok(png) => png,
        Err(sentence) => return tell(&format!("{why} {sentence}"), err),
    };
    match sheets::write_own(path, &png) {
        Ok(()) => {
            let _ = writeln!(out, "{why} The demo client's sheet is in {} instead.", path.display());
            Exit::Fine
        }
        Err(sentence) => tell(&format!("{why} {sentence}"), err),
    }
}
