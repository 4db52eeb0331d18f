//! Sheets of a document as bytes, and the one file that may be written over unasked.

use std::{fs, path::Path};

use plumbfold_core::{Angle, Step};
use plumbfold_scene::{Scene, Theme};

use crate::{
    computed::{Computed, Results},
    document::Document,
};

/// Width of a sheet's picture, pixels.
pub const WIDTH_PX: u32 = 1920;

/// The sheet of the task on the desk at a depth as a PNG.
///
/// # Errors
/// A sentence where the values cannot be computed with, or the picture cannot be drawn.
pub fn png(doc: &Document, thigh_deg: f64) -> Result<Vec<u8>, String> {
    let computed = Computed::new(doc).ok_or("this visit has no task")?;
    let results = computed.outcome.as_ref().map_err(ToString::to_string)?;
    png_of(doc, results, thigh_deg)
}

/// The sheet of results at hand.
///
/// # Errors
/// A sentence where the picture cannot be drawn.
pub fn png_of(doc: &Document, results: &Results, thigh_deg: f64) -> Result<Vec<u8>, String> {
    let scene = scene(doc, results, thigh_deg);
    let svg = plumbfold_sheet::svg(&scene, &Theme::light());
    plumbfold_sheet::png(&svg, WIDTH_PX).map_err(|e| e.to_string())
}

/// The page as a scene.
#[must_use]
pub fn scene(_doc: &Document, results: &Results, thigh_deg: f64) -> Scene {
    let step = Step::at(&results.study.case, Angle::from_deg(thigh_deg));
    let show = plumbfold_scene::figure::Show::plain(&results.study, step.thigh, &step.balance);
    plumbfold_scene::figure::figure(
        &show,
        plumbfold_scene::Size::new(1600.0, 1200.0),
        &plumbfold_scene::figure::Look::sheet(22.0),
    )
    .0
}

/// Marks the demo sheet as ours: the picture is drawn the same every time, so the file that may be
/// replaced is one whose first bytes are a PNG header and that is no larger than a sheet can be.
///
/// # Errors
/// A sentence where something else lies there or the disk refuses.
pub fn write_own(path: &Path, png: &[u8]) -> Result<(), String> {
    if let Ok(there) = fs::read(path)
        && !is_sheet(&there)
    {
        return Err(format!("{} is not a sheet of ours: move it away to have the demo sheet.", path.display()));
    }
    fs::write(path, png).map_err(|e| format!("{} could not be written: {e}; go to a folder of yours.", path.display()))
}

/// A PNG as wide as our sheets.
fn is_sheet(bytes: &[u8]) -> bool {
    bytes.starts_with(b"\x89PNG\r\n\x1a\n") && bytes.get(16..20) == Some(WIDTH_PX.to_be_bytes().as_slice())
}
