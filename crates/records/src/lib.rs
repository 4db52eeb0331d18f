//! Client files: reading, checking, writing.
//!
//! A [`Client`] holds what a clinician typed, in the units it was typed in: centimetres,
//! millimetres, kilograms, degrees. Nothing here is converted and written back; [`Visit::measures`]
//! and [`Visit::task`] lead one way, to the SI types of `plumbfold_core`.
//!
//! The way through: bytes → [`read`] → the saved structs of one format version (`v1`, `v2`, every
//! range checked while reading, so that an error knows its line and field) → `migrate` → [`Client`];
//! and back with [`write()`], which takes the lowest format that loses nothing and reads its own text
//! again before it hands it out. Files of a newer format come back as [`Opened::Newer`], which has no
//! way to be saved.
//!
//! Format 2 adds to format 1 how a change that was tried felt ([`Task::felt`]) and which joint hurts
//! ([`Seen::pain_at`]); both may be left out, and a file without either is written in format 1.
//!
//! ```
//! use plumbfold_core::measures::Sex;
//! use plumbfold_records::{Client, Code, Date, Opened, Visit, read, write};
//! use std::path::Path;
//!
//! let visit = Visit::new(Date::constant(2026, 11, 3), Sex::Female, 168.0, 61.0);
//! let client = Client::new(Code::new("demo-1")?, visit);
//! let text = write(&client)?;
//! assert_eq!(read(text.as_bytes(), Path::new("demo-1.ron"))?, Opened::Current(client));
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```

mod bounded;
mod client;
mod convert;
mod disk;
mod explain;
mod migrate;
mod problem;
mod read;
mod saved;
mod task;
mod text;
mod v1;
mod v2;
mod write;

pub use client::{Ankle, Build, Caps, Client, Code, CodeFault, Hip, Joints, Knee, Visit};
pub use disk::{open, save};
pub use jiff::civil::Date;
pub use problem::Problem;
pub use read::{CURRENT_FORMAT, Opened, SIZE_LIMIT_BYTES, read};
pub use task::{Bend, Compared, Felt, PainAt, Rule, Seen, StoppedBy, Support, Task};
pub use text::{CODE_MAX_CHARS, NAME_MAX_CHARS, NOTE_MAX_CHARS, SOURCE_MAX_CHARS};
pub use write::write;
