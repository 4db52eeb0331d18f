//! Sheets of a document as bytes, and the one file that may be written over unasked.

use std::{fs, path::Path};

use plumbfold_core::{Angle, Step, posture};
use plumbfold_scene::{
    Role, Scene, Theme,
    figure::{Outline, Show},
    page::{Page, sheet_page},
};

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

/// The page as a scene: the posture at a depth, with the outline of average lengths behind it.
#[must_use]
pub fn scene(doc: &Document, results: &Results, thigh_deg: f64) -> Scene {
    let visit = doc.visit();
    let step = Step::at(&results.study.case, Angle::from_deg(thigh_deg));
    let average = posture(&results.average.case, step.thigh);
    let outline = average.held().filter(|_| step.balance.posture().is_some()).map(|posture| Outline {
        case: &results.average.case,
        posture,
        what: "average lengths for this stature, same ranges",
    });
    let pain = doc.task().seen.and_then(|s| s.pain_from_thigh_deg);
    sheet_page(&Page {
        code: doc.client.code.as_str(),
        date: &visit.date.to_string(),
        visit: doc.visit + 1,
        task: &doc.task().name,
        show: Show {
            study: &results.study,
            thigh: step.thigh,
            now: &step.balance,
            straightened: None,
            outline,
            pain_from: pain.map(Angle::from_deg),
            deepest: Angle::from_deg(results.deepest_deg),
            note: None,
        },
        notices: &results.notices,
    })
}

/// Writes the demo sheet over nothing but an earlier one.
///
/// # Errors
/// A sentence where something else lies there or the disk refuses.
pub fn write_own(path: &Path, png: &[u8]) -> Result<(), String> {
    if let Ok(there) = fs::symlink_metadata(path) {
        // nothing is read from a pipe, nothing written through a link
        let ours = there.is_file() && fs::read(path).is_ok_and(|bytes| is_own(&bytes));
        if !ours {
            return Err(format!("{} is not a sheet of ours: move it away to have the demo sheet.", path.display()));
        }
    }
    fs::write(path, png).map_err(|e| format!("{} could not be written: {e}; go to a folder of yours.", path.display()))
}

fn is_own(bytes: &[u8]) -> bool {
    let paper = Theme::light().rgba(Role::Paper);
    plumbfold_sheet::is_page(bytes, WIDTH_PX, [paper.r, paper.g, paper.b])
}
