//! What panels return; only `apply` acts on it.

use std::path::PathBuf;

use plumbfold_core::{Angle, Placement, Scope, SegmentTable, Sex, takes::Change};
use plumbfold_records::{Bend, Client, Felt, PainAt, Problem, Rule, StoppedBy};
use plumbfold_scene::theme::Palette;

use crate::{command::Command, entry::Entry};

/// One press of the pointer or one hold of a key.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct GestureId(pub u64);

/// How an edit counts in the history.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Step {
    /// A step of its own.
    Whole,
    /// One step together with all edits of the same gesture.
    Gesture(GestureId),
}

/// How the ankle was measured.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum AnkleWay {
    /// Knee to wall, cm.
    KneeToWall,
    /// Degrees.
    Degrees,
    /// Not measured.
    NotMeasured,
}

/// How the hip was measured.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HipWay {
    /// Pelvis held.
    PelvisHeld,
    /// Rocking back on hands and knees.
    RockBack,
    /// Knee to chest.
    KneeToChest,
    /// Not measured.
    NotMeasured,
}

/// A change of the document.
#[derive(Clone, Debug, PartialEq)]
pub enum Edit {
    /// A number, or none.
    Number(Entry, Option<f64>),
    /// Which tables.
    Sex(Sex),
    /// How the ankle was measured; values of another unit are dropped.
    AnkleWay(AnkleWay),
    /// How the hip was measured; values are kept.
    HipWay(HipWay),
    /// Arms and load.
    Placement(Placement),
    /// Bend allowed.
    Bend(Bend),
    /// Which posture.
    Rule(Rule),
    /// Which segment table.
    Table(SegmentTable),
    /// Turns a circumstance on or off.
    Scope(Scope),
    /// Whether the heels came up.
    HeelsLifted(bool),
    /// What ended the descent.
    StoppedBy(Option<StoppedBy>),
    /// The squat seen, as angles in degrees: thigh, shank, trunk.
    Seen([f64; 3]),
    /// No squat seen.
    NotSeen,
    /// The note.
    Note(String),
    /// Where precautions come from.
    CapSource(String),
    /// The client's code.
    Code(String),
    /// Another visit.
    GoToVisit(usize),
    /// Another task.
    GoToTask(usize),
    /// A task after the present one, with its values.
    AddTask(String),
    /// The present task removed; the last one stays.
    RemoveTask,
    /// A task after the present one with changes made, as a person sets them.
    Keep(Vec<Change>),
    /// How the set-up felt.
    Felt(Option<Felt>),
    /// Which joint hurts.
    PainAt(Option<PainAt>),
}

/// A change of the view: neither saved nor undone.
#[derive(Clone, Debug, PartialEq)]
pub enum ViewChange {
    /// Depth shown, degrees of thigh angle.
    Depth(f64),
    /// The trunk held at this lean; none: as balance needs it.
    Straighten(Option<Angle>),
    /// Changes tried on the figure; none: as set up.
    Try(Option<Vec<Change>>),
    /// More lengths shown or not.
    MoreLengths,
    /// More choices shown or not.
    MoreChoices,
    /// A section folded or not.
    Fold(Section),
    /// A field's entry was not understood: shown under it until it is mended.
    FieldError(Entry, Option<String>),
    /// Depth moved on by the playing descent, seconds.
    PlayOn(f64),
    /// The message is read.
    MessageRead,
    /// A path is being typed.
    Path(String),
    /// A dialog is closed.
    Cancel,
    /// A palette.
    Palette(Palette),
}

/// Sections of the left side.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Section {
    /// Build.
    Build,
    /// Ranges measured.
    Ranges,
    /// Our choices today.
    Choices,
    /// Precautions.
    Precautions,
    /// Seen today.
    Seen,
    /// Note.
    Note,
}

/// What a file was asked for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ask {
    /// A client to open.
    Open,
    /// Where to save the client.
    SaveAs,
    /// Where to write the sheet.
    Sheet,
}

/// What happens after a guard's question.
#[derive(Clone, Debug, PartialEq)]
pub enum Then {
    /// The window closes.
    Close,
    /// A file is asked for and opened.
    Open,
    /// This file is opened.
    OpenFile(PathBuf),
    /// A new client is started.
    New,
}

/// An answer to a question on the desk.
#[derive(Clone, Debug, PartialEq)]
pub enum Answer {
    /// Save, then go on.
    SaveFirst,
    /// Go on without saving.
    Discard,
    /// Stay.
    Stay,
    /// Write over the file that is there.
    Overwrite,
    /// The path typed is meant.
    UsePath,
}

/// What came back from outside.
#[derive(Clone, Debug)]
pub enum Arrived {
    /// A file dialog's answer; `None`: cancelled, or no dialog could be shown.
    Picked(Ask, Option<PathBuf>),
    /// A client was read.
    Opened(PathBuf, Client),
    /// A file of a newer version was read: it can be looked at nowhere yet and is not touched.
    Newer(PathBuf, u32),
    /// A file could not be read or written.
    Failed(Problem),
    /// The file to be written is there already.
    Exists(Ask, PathBuf),
    /// The client was saved.
    Saved(PathBuf, Client),
    /// The sheet was written.
    SheetWritten(PathBuf),
    /// Something could not be done, as a sentence.
    Trouble(String),
}

/// Everything that can happen on the desk.
#[derive(Clone, Debug)]
pub enum Action {
    /// The document changes.
    Edit(Edit, Step),
    /// The view changes.
    View(ViewChange),
    /// A command runs.
    Run(Command),
    /// A question is answered.
    Answer(Answer),
    /// A file was dropped on the window.
    Dropped(PathBuf),
    /// The window is asked to close.
    CloseAsked,
    /// Something came back from outside.
    Arrived(Arrived),
}

/// What to do about a file that is there already.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Over {
    /// Come back and ask.
    Ask,
    /// Write over it: it is the client's own file, or the question was answered.
    Write,
}

/// What the shell must do; nothing inside `apply` touches the outside.
#[derive(Clone, Debug, PartialEq)]
pub enum Effect {
    /// Ask for a file.
    Ask(Ask),
    /// Read a client file.
    Open(PathBuf),
    /// Write the client.
    Save(PathBuf, Client, Over),
    /// Write the sheet of what is on the desk.
    WriteSheet(PathBuf, Over),
    /// Close the window.
    Close,
}
