//! Everything the desk holds between frames.

use std::{collections::HashMap, path::PathBuf};

use plumbfold_core::{Angle, takes::Change};
use plumbfold_records::Client;
use plumbfold_scene::theme::Palette;

use crate::{
    action::{Ask, Section, Then},
    document::Document,
    entry::Entry,
    history::History,
};

/// The desk.
#[derive(Clone, Debug)]
pub struct State {
    /// What is edited.
    pub doc: Document,
    /// Undo and redo.
    pub history: History,
    /// View state.
    pub view: ViewState,
    /// The file behind the document.
    pub file: FileState,
    /// A question that waits for an answer.
    pub dialog: Option<Dialog>,
    /// What goes on once the client is saved.
    pub after_save: Option<Then>,
    /// Something to read.
    pub message: Option<Message>,
}

/// What is shown and how; neither saved nor undone.
#[derive(Clone, Debug, PartialEq)]
#[expect(clippy::struct_excessive_bools, reason = "independent switches of the view")]
pub struct ViewState {
    /// Depth shown, degrees of thigh angle.
    pub depth_deg: f64,
    /// The trunk held at a lean by the shoulder handle.
    pub straighten: Option<Angle>,
    /// Whether the descent plays.
    pub playing: bool,
    /// Whether the figure faces left.
    pub facing_left: bool,
    /// Colours.
    pub palette: Palette,
    /// What is outlined behind the figure.
    pub outline: Behind,
    /// Changes tried on the figure, neither saved nor undone.
    pub trying: Option<Vec<Change>>,
    /// Whether handles write what was seen.
    pub matching: bool,
    /// Whether the view for the client is shown.
    pub client_view: bool,
    /// Whether the plots are shown.
    pub plots: bool,
    /// Whether the list of keys is shown.
    pub keys: bool,
    /// Whether all lengths are shown.
    pub more_lengths: bool,
    /// Whether all choices are shown.
    pub more_choices: bool,
    /// Folded sections.
    pub folded: Vec<Section>,
    /// Entries not understood, with why.
    pub field_errors: HashMap<Entry, String>,
    /// Whether anything on the figure was dragged yet; the first-use line goes then.
    pub dragged: bool,
}

/// What is outlined behind the figure.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Behind {
    /// Nothing.
    Nothing,
    /// Average lengths for this stature, the client's ranges.
    AverageLengths,
    /// The client's lengths, usual ranges.
    UsualRanges,
}

impl Behind {
    /// The next in turn.
    #[must_use]
    pub const fn next(self) -> Self {
        match self {
            Self::Nothing => Self::AverageLengths,
            Self::AverageLengths => Self::UsualRanges,
            Self::UsualRanges => Self::Nothing,
        }
    }
}

/// The file behind the document.
#[derive(Clone, Debug, PartialEq, Default)]
pub struct FileState {
    /// Where it lies; none for a client not saved yet and for the demo client.
    pub path: Option<PathBuf>,
    /// What lies there.
    pub saved: Option<Client>,
}

/// A question.
#[derive(Clone, Debug, PartialEq)]
pub enum Dialog {
    /// Changes are not saved.
    Unsaved(Then),
    /// A path to type, since no file dialog answered.
    Path {
        /// What for.
        ask: Ask,
        /// What is typed so far.
        typed: String,
    },
    /// The file is there already.
    Exists {
        /// What for.
        ask: Ask,
        /// Which file.
        path: PathBuf,
    },
}

/// Something to read at the top of the desk.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Message {
    /// Something went well.
    Good(String),
    /// Something is wrong.
    Bad(String),
}

impl State {
    /// A client on the desk; `path` where it came from a file of the user's.
    #[must_use]
    pub fn new(client: Client, path: Option<PathBuf>) -> Self {
        let saved = Some(client.clone());
        let doc = Document::new(client);
        let view = ViewState {
            depth_deg: doc.task().goal_thigh_deg,
            straighten: None,
            playing: false,
            facing_left: false,
            palette: Palette::Light,
            outline: Behind::AverageLengths,
            trying: None,
            matching: false,
            client_view: false,
            plots: true,
            keys: false,
            more_lengths: false,
            more_choices: false,
            folded: vec![Section::Precautions],
            field_errors: HashMap::new(),
            dragged: false,
        };
        Self {
            doc,
            history: History::default(),
            view,
            file: FileState { path, saved },
            dialog: None,
            after_save: None,
            message: None,
        }
    }

    /// Whether the client on the desk differs from what lies in the file.
    #[must_use]
    pub fn unsaved(&self) -> bool {
        self.file.saved.as_ref() != Some(&self.doc.client)
    }
}
