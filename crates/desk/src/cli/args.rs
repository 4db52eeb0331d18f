//! The arguments.

use std::path::PathBuf;

use clap::{Parser, Subcommand};
use plumbfold_core::bounds::{Field, bounds};

/// Squat mechanics of a client's own body.
///
/// Without a command the window opens with a demo client.
#[derive(Debug, Parser)]
#[command(name = "plumbfold", version)]
pub struct Args {
    #[command(subcommand)]
    pub command: Option<Command>,
    /// Print the median and the 95th percentile of the frame times when the window closes.
    #[arg(long, global = true, hide = true)]
    pub frame_times: bool,
}

#[derive(Debug, Subcommand)]
pub enum Command {
    /// Open a client file in the window.
    Open {
        /// The client file.
        file: PathBuf,
    },
    /// Print posture, depths and demands of a client.
    Figures {
        #[command(flatten)]
        of: Selection,
        /// Print one JSON object: angles in degrees, lengths in metres, moments in N·m.
        #[arg(long)]
        json: bool,
    },
    /// Print what runs out first, what it would take, and what the seen squat tells.
    Reasons {
        #[command(flatten)]
        of: Selection,
        /// Print one JSON object: angles in degrees, moments in N·m.
        #[arg(long)]
        json: bool,
    },
    /// Draw an annotated figure of a client.
    Sheet {
        #[command(flatten)]
        of: Selection,
        /// The picture to write, a PNG.
        #[arg(short, long, value_name = "OUT.png", value_parser = picture)]
        output: PathBuf,
    },
    /// Read client files and say whether they are in order.
    Check {
        /// The client files.
        #[arg(required = true)]
        files: Vec<PathBuf>,
    },
}

/// Which squat of which client.
#[derive(Clone, Debug, clap::Args)]
pub struct Selection {
    /// The client file.
    pub file: PathBuf,
    /// The visit, counted from 1; the latest by default.
    #[arg(long, value_name = "N")]
    pub visit: Option<usize>,
    /// The task by its name; the first by default.
    #[arg(long, value_name = "NAME")]
    pub task: Option<String>,
    /// The thigh angle in degrees, 0 standing and 90 level; the task's goal by default.
    #[arg(long, value_name = "DEG", value_parser = thigh_deg, allow_negative_numbers = true)]
    pub thigh: Option<f64>,
}

fn thigh_deg(text: &str) -> Result<f64, String> {
    let bounds = bounds(Field::Goal);
    match text.parse() {
        Ok(deg) if bounds.holds(deg) => Ok(deg),
        _ => Err(format!("a thigh angle is {}", bounds.allowed())),
    }
}

fn picture(text: &str) -> Result<PathBuf, String> {
    let path = PathBuf::from(text);
    match path.extension() {
        Some(extension) if extension.eq_ignore_ascii_case("png") => Ok(path),
        _ => Err("a sheet is a picture whose name ends in .png".to_owned()),
    }
}
