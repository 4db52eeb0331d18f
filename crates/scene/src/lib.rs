//! What is drawn, as a plain display list: the window paints it and the sheet writes it, so the
//! two cannot disagree.
//!
//! # Coordinates
//! The page: x to the right, y **down**, origin at the top left, in page units (one point of the
//! window, 1/96 inch of a sheet). [`Pt`] is a place on the page; the model's world (metres, y up)
//! has a different type, `plumbfold_core`'s point, and the view of a figure is the one function
//! between them. A builder lays out for the area it is given and nothing is scaled afterwards.
//!
//! Arcs, caps, dashes and hatching are flattened here; filled areas are convex by construction;
//! text has a baseline anchor and one bundled family; colours are [`Role`]s, resolved by a
//! [`Theme`] at the very end.
//!
//! ```
//! use plumbfold_scene::{Anchor, Item, Label, Pt, Role, Scene, Size, Weight, shapes};
//!
//! let mut scene = Scene::new(Size { w: 200.0, h: 100.0 }, "A joint with its name");
//! scene.push(Item::Fill(shapes::circle(Pt::new(40.0, 50.0), 12.0), Role::Hip));
//! scene.push(Item::Text(Label {
//!     baseline: Pt::new(60.0, 55.0),
//!     anchor: Anchor::Start,
//!     size: 14.0,
//!     weight: Weight::Regular,
//!     role: Role::Ink,
//!     text: "hip".to_owned(),
//! }));
//! assert!(plumbfold_scene::overlaps(&scene).is_empty());
//! assert!(plumbfold_scene::out_of_page(&scene).is_empty());
//! ```

pub mod chart;
pub mod figure;
pub mod fonts;
pub mod format;
pub mod geometry;
pub mod map;
pub mod measure;
pub mod page;
pub mod place;
pub mod plots;
pub mod scene;
pub mod shapes;
pub mod theme;
pub mod words;

pub use chart::{Axis, Band, BandKind, Chart, Look as ChartLook, Mark, Series, chart};
pub use figure::{Facing, Look, Show, View, figure};
pub use fonts::text_width;
pub use geometry::{Convex, Pt, RectPt, Size};
pub use measure::{out_of_page, overlaps};
pub use page::{Page, sheet_page};
pub use scene::{Anchor, Cells, Grip, Handle, Hit, Item, Label, Scene, Weight};
pub use theme::{Role, Theme};
