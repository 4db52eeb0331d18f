//! Scenes as files: SVG as text, PNG as bytes. Writing them to disk is the caller's.
//!
//! Page units are 1/96 inch. The picture is the scene exactly: one exhaustive `match` over its
//! items, nothing laid out again. Text is written in the one bundled family; no font of the machine
//! is ever read, so a sheet is the same everywhere.
//!
//! ```
//! use plumbfold_scene::{Anchor, Label, Pt, Role, Scene, Size, Theme, Weight};
//!
//! let mut scene = Scene::new(Size::new(200.0, 60.0), "a word");
//! scene.text(Label {
//!     baseline: Pt::new(10.0, 40.0),
//!     anchor: Anchor::Start,
//!     size: 20.0,
//!     weight: Weight::SemiBold,
//!     role: Role::Ink,
//!     text: "lean < 45°".to_owned(),
//! });
//! let svg = plumbfold_sheet::svg(&scene, &Theme::light());
//! assert!(svg.contains("lean &lt; 45°"));
//! let png = plumbfold_sheet::png(&svg, 400)?;
//! assert!(png.starts_with(b"\x89PNG"));
//! # Ok::<(), plumbfold_sheet::SheetError>(())
//! ```

mod png;
mod svg;

pub use png::{SheetError, WIDEST_PX, is_page, png};
pub use svg::svg;
