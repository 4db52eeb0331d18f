//! A client to the text of a file.

use std::path::PathBuf;

use ron::ser::PrettyConfig;

use crate::{
    client::Client,
    migrate,
    problem::Problem,
    read::{Opened, read},
    saved::Saved as _,
    v2,
};

/// Depth to which fields stand on lines of their own: those of the client and those of a visit.
const LINES_TO_DEPTH: usize = 2;

/// The text of a client's file, in the lowest format that loses nothing: format 2 where a task has
/// [`felt`](crate::Task::felt) or a seen squat [`pain_at`](crate::Seen::pain_at), otherwise format 1,
/// so that a file without them can be read wherever files of format 1 can.
///
/// Reading the text again gives the same client, every number to its bits; that is tried before the
/// text is handed out, so nothing is written that could not be read.
///
/// # Errors
/// A [`Problem`] that names the field that is out of its bounds, not finite or otherwise unfit.
pub fn write(client: &Client) -> Result<String, Problem> {
    let file = PathBuf::from(format!("{}.ron", client.code));
    let unfit = |value: String| Problem {
        file: file.clone(),
        line: None,
        field: None,
        value,
        allowed: "a client that can be read again".to_owned(),
        hint: "it was not saved, please report this",
    };
    let layout = PrettyConfig::new().depth_limit(LINES_TO_DEPTH).compact_arrays(true).new_line("\n");
    let newest = || v2::File::of(client);
    let mut text = match migrate::v2_to_v1(newest()) {
        Some(file) => ron::ser::to_string_pretty(&file, layout),
        None => ron::ser::to_string_pretty(&newest(), layout),
    }
    .map_err(|error| unfit(error.to_string()))?;
    text.push('\n');
    match read(text.as_bytes(), &file) {
        Ok(Opened::Current(again)) if again == *client => Ok(text),
        Ok(_) => Err(unfit("a text that reads otherwise".to_owned())),
        // The line would be one of a text that nobody sees.
        Err(problem) => Err(Problem { line: None, hint: "correct it, then save again", ..problem }),
    }
}
