//! The window: eframe around the desk, and what to say where no window can be opened.

use std::{io::Write, panic, path::PathBuf};

use eframe::{NativeOptions, egui::ViewportBuilder};
use plumbfold_records::Client;

use crate::{app::App, cli::Launch, demo, frame_times::Timed};

/// Name of the window.
const TITLE: &str = "Plumbfold";

/// Why no window could be opened, as one sentence.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("No window can be opened here: {0}.")]
pub struct NoWindow(String);

/// Opens the window and returns when it is closed.
///
/// # Errors
/// Where there is no display, no OpenGL, or a library of the window system is missing.
pub fn open(launch: Launch, out: &mut dyn Write) -> Result<(), NoWindow> {
    if no_display() {
        return Err(NoWindow("there is no display".to_owned()));
    }
    let (path, client): (Option<PathBuf>, Client) = match launch.opened {
        Some((path, client)) => (Some(path), client),
        None => (None, demo::client().map_err(|p| NoWindow(p.to_string()))?),
    };
    let options = NativeOptions {
        viewport: ViewportBuilder::default()
            .with_title(TITLE)
            .with_app_id("plumbfold")
            .with_inner_size([1440.0, 900.0])
            .with_min_inner_size([1280.0, 720.0]),
        ..NativeOptions::default()
    };
    let timed = launch.frame_times.then(Timed::new);
    let report = timed.as_ref().map(Timed::report);
    // a missing library of the window system is a panic in winit, not an error
    let quiet = panic::take_hook();
    panic::set_hook(Box::new(|_| {}));
    let outcome = panic::catch_unwind(panic::AssertUnwindSafe(|| {
        eframe::run_native(
            TITLE,
            options,
            Box::new(move |cc| {
                drop(panic::take_hook());
                let app = App::new(&cc.egui_ctx, client, path);
                Ok(match timed {
                    Some(t) => Box::new(t.around(app)) as Box<dyn eframe::App>,
                    None => Box::new(app),
                })
            }),
        )
    }));
    panic::set_hook(quiet);
    match outcome {
        Ok(Ok(())) => {
            if let Some(r) = report {
                // whoever reads may have had enough
                let _ = writeln!(out, "{}", r.text());
            }
            Ok(())
        }
        Ok(Err(why)) => Err(NoWindow(why.to_string())),
        Err(_) => Err(NoWindow(
            "a library of the window system is missing (on Debian: libxkbcommon-x11-0, libxcursor1, libxi6, libgl1)"
                .to_owned(),
        )),
    }
}

/// On Unix a window needs a display server that a variable names.
fn no_display() -> bool {
    let named = |v: &str| std::env::var_os(v).is_some_and(|s| !s.is_empty());
    cfg!(all(unix, not(target_os = "macos"))) && !named("DISPLAY") && !named("WAYLAND_DISPLAY")
}
