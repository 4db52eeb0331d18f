//! The mechanics of a squatting body.
//!
//! Frame: the sagittal plane seen from the client's right, x forward, y up, z to the client's right;
//! origin on the floor under the back of the flat heel. Inclinations are measured from the vertical,
//! forward positive. The thigh runs from the knee up and back: 0 standing, 90° level. SI units and
//! radians throughout ([`Angle`] is the only door to degrees, [`bounds`](mod@bounds) the only table
//! in a person's units).
//!
//! No input or output, no clock, no global state. A posture that cannot balance is a result
//! ([`Balance`]), malformed input an error ([`Invalid`]).
//!
//! ```
//! use plumbfold_core::{Angle, Case, depths, posture, sample};
//!
//! let (measures, task) = sample::average_man();
//! let (case, _notices) = Case::new(&measures, &task)?;
//! let at_level = posture(&case, Angle::from_deg(90.0));
//! let lean = at_level.held().map(|p| p.trunk.deg());
//! assert!(lean.is_some_and(|deg| deg > 40.0 && deg < 46.0));
//! assert!(depths(&case).steady.is_some());
//! # Ok::<(), plumbfold_core::Invalid>(())
//! ```

pub mod angle;
pub mod balance;
pub mod body;
pub mod bounds;
pub mod case;
pub mod depth;
pub mod limits;
pub mod map;
pub mod measures;
pub mod notice;
pub mod pose;
pub mod posture;
pub mod readings;
pub mod reasons;
pub mod roots;
mod row;
pub mod sample;
pub mod seen;
pub mod stand;
pub mod stops;
pub mod study;
pub mod tables;
pub mod takes;
pub mod task;
mod upper;

pub use angle::{Angle, direction};
pub use balance::{Balance, Standing, Toward, balance, standing};
pub use body::Body;
pub use bounds::{Bounds, Field, Unit, bounds};
pub use case::Case;
pub use depth::{Depths, depths};
pub use limits::{Limits, Origin};
pub use measures::{Measures, PerJoint, Scope, Sex, Sides};
pub use notice::{Invalid, Notice};
pub use pose::{Joints, Point, Posture, pose};
pub use posture::posture;
pub use readings::{Readings, posture_notices, readings};
pub use reasons::{Reasons, reasons};
pub use row::Refusal;
pub use study::{Step, Study, study};
pub use tables::SegmentTable;
pub use task::{Bend, Placement, Rule, Seen, Support, Task};
