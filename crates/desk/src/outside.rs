//! Effects carried out: dialogs, reading, writing. Nothing here changes the state; what happened
//! comes back through the line.

use std::{path::Path, sync::mpsc::Sender, thread};

use egui::Context;
use plumbfold_records::{Client, Opened, open, save};

use crate::action::{Arrived, Ask, Effect, Over};

/// Carries out one effect. Dialogs block, so each runs on a thread of its own.
pub fn carry_out(ctx: &Context, line: &Sender<Arrived>, effect: Effect, sheet: impl FnOnce() -> Option<Sheet>) {
    match effect {
        Effect::Close => {}
        Effect::Ask(ask) => {
            let (line, ctx) = (line.clone(), ctx.clone());
            thread::spawn(move || {
                let picked = dialog(ask);
                // the desk may be gone by now
                let _ = line.send(Arrived::Picked(ask, picked));
                ctx.request_repaint();
            });
        }
        Effect::Open(path) => {
            let arrived = match open(&path) {
                Ok(Opened::Current(client)) => Arrived::Opened(path, client),
                Ok(Opened::Newer { format, .. }) => Arrived::Newer(path, format),
                Err(problem) => Arrived::Failed(problem),
            };
            back(ctx, line, arrived);
        }
        Effect::Save(path, client, over) => back(ctx, line, write_client(&path, client, over)),
        Effect::WriteSheet(path, over) => {
            let arrived = sheet().map_or_else(
                || Arrived::Trouble("There is no figure to put on a sheet: mend the values first.".to_owned()),
                |s| write_sheet(&path, &s, over),
            );
            back(ctx, line, arrived);
        }
    }
}

/// A sheet ready to be written.
pub struct Sheet {
    /// The picture, or why there is none.
    pub png: Result<Vec<u8>, String>,
}

fn back(ctx: &Context, line: &Sender<Arrived>, arrived: Arrived) {
    let _ = line.send(arrived);
    ctx.request_repaint();
}

fn write_client(path: &Path, client: Client, over: Over) -> Arrived {
    if over == Over::Ask && path.exists() {
        return Arrived::Exists(Ask::SaveAs, path.to_owned());
    }
    match save(&client, path) {
        Ok(_) => Arrived::Saved(path.to_owned(), client),
        Err(problem) => Arrived::Failed(problem),
    }
}

fn write_sheet(path: &Path, sheet: &Sheet, over: Over) -> Arrived {
    if over == Over::Ask && path.exists() {
        return Arrived::Exists(Ask::Sheet, path.to_owned());
    }
    let written = match &sheet.png {
        Ok(bytes) => std::fs::write(path, bytes).map_err(|e| e.to_string()),
        Err(why) => Err(why.clone()),
    };
    match written {
        Ok(()) => Arrived::SheetWritten(path.to_owned()),
        Err(why) => Arrived::Trouble(format!(
            "{}: the sheet could not be written: {why}; choose another place.",
            path.display()
        )),
    }
}

fn dialog(ask: Ask) -> Option<std::path::PathBuf> {
    let d = rfd::FileDialog::new();
    match ask {
        Ask::Open => d.set_title("Open a client file").add_filter("Client file", &["ron"]).pick_file(),
        Ask::SaveAs => d.set_title("Save the client").add_filter("Client file", &["ron"]).save_file(),
        Ask::Sheet => d.set_title("Write the sheet").add_filter("Picture", &["png"]).save_file(),
    }
}
