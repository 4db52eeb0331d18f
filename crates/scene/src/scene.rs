//! The display list.

use plumbfold_core::bounds::Unit;

use crate::{
    fonts,
    geometry::{Convex, Pt, RectPt, Size},
    theme::Role,
};

/// Everything to draw in one area, back to front.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Scene {
    /// The area it was laid out for.
    pub size: Size,
    /// What is drawn, back to front.
    pub items: Vec<Item>,
    /// What can be grabbed.
    pub grips: Vec<Grip>,
    /// The picture in one or two sentences, for those who do not see it.
    pub alt: String,
}

impl Scene {
    /// Nothing drawn yet.
    #[must_use]
    pub fn new(size: Size, alt: impl Into<String>) -> Self {
        Self { size, items: Vec::new(), grips: Vec::new(), alt: alt.into() }
    }

    /// Draws on top; an empty area or a line of fewer than two points is left out.
    pub fn push(&mut self, item: Item) {
        let drawn = match &item {
            Item::Fill(area, _) => !area.is_empty(),
            Item::Line { pts, .. } => pts.len() > 1,
            Item::Cells(cells) => !cells.roles.is_empty(),
            Item::Text(label) => !label.text.is_empty(),
        };
        if drawn {
            self.items.push(item);
        }
    }

    /// Draws an area.
    pub fn fill(&mut self, area: Convex, role: Role) {
        self.push(Item::Fill(area, role));
    }

    /// Draws a line.
    pub fn line(&mut self, pts: impl Into<Vec<Pt>>, width: f32, role: Role) {
        self.push(Item::Line { pts: pts.into(), width, role });
    }

    /// Writes text.
    pub fn text(&mut self, label: Label) {
        self.push(Item::Text(label));
    }

    /// Everything of another scene moved by a step, on top of this one.
    pub fn place(&mut self, other: Scene, at: Pt) {
        self.items.extend(other.items.into_iter().map(|item| item.moved(at)));
        self.grips.extend(other.grips.into_iter().map(|g| Grip {
            hit: g.hit.moved(at),
            track: g.track.map(|(a, b)| (a + at, b + at)),
            ..g
        }));
    }

    /// All labels, in the order drawn.
    pub fn labels(&self) -> impl Iterator<Item = &Label> {
        self.items.iter().filter_map(|i| match i {
            Item::Text(l) => Some(l),
            _ => None,
        })
    }
}

/// One thing drawn.
#[derive(Clone, Debug, PartialEq)]
pub enum Item {
    /// A filled convex area.
    Fill(Convex, Role),
    /// A polyline with butt ends, page units wide.
    Line {
        /// Its corners.
        pts: Vec<Pt>,
        /// Width in page units.
        width: f32,
        /// Colour role.
        role: Role,
    },
    /// A grid of equal cells.
    Cells(Cells),
    /// One line of text.
    Text(Label),
}

impl Item {
    /// The same moved by a step.
    #[must_use]
    pub fn moved(self, by: Pt) -> Self {
        match self {
            Self::Fill(area, role) => Self::Fill(Convex::hull(area.points().iter().map(|&p| p + by)), role),
            Self::Line { pts, width, role } => {
                Self::Line { pts: pts.into_iter().map(|p| p + by).collect(), width, role }
            }
            Self::Cells(c) => Self::Cells(Cells { area: RectPt { min: c.area.min + by, max: c.area.max + by }, ..c }),
            Self::Text(l) => Self::Text(Label { baseline: l.baseline + by, ..l }),
        }
    }
}

/// A grid of equal cells filling an area, row by row from the top left; `None` leaves a cell open.
#[derive(Clone, Debug, PartialEq)]
pub struct Cells {
    /// The area filled.
    pub area: RectPt,
    /// Cells in a row; the number of rows follows from `roles`.
    pub columns: usize,
    /// Colour of each cell.
    pub roles: Vec<Option<Role>>,
}

impl Cells {
    /// Full rows.
    #[must_use]
    pub fn rows(&self) -> usize {
        self.roles.len().checked_div(self.columns).unwrap_or(0)
    }

    /// Runs of equal neighbours in a row as rectangles: what painters draw.
    #[must_use]
    pub fn runs(&self) -> Vec<(RectPt, Role)> {
        let rows = self.rows();
        let mut out = Vec::new();
        if rows == 0 {
            return out;
        }
        let (w, h) = (self.area.w() / self.columns as f32, self.area.h() / rows as f32);
        for row in 0..rows {
            let line = &self.roles[row * self.columns..(row + 1) * self.columns];
            let mut start = 0;
            for end in 1..=self.columns {
                if end == self.columns || line[end] != line[start] {
                    if let Some(role) = line[start] {
                        let min = self.area.min + Pt::new(start as f32 * w, row as f32 * h);
                        let max = self.area.min + Pt::new(end as f32 * w, (row + 1) as f32 * h);
                        out.push((RectPt { min, max }, role));
                    }
                    start = end;
                }
            }
        }
        out
    }
}

/// Which end of the text stands at its baseline point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Anchor {
    /// The left end.
    Start,
    /// The middle.
    Middle,
    /// The right end.
    End,
}

/// Weight of the bundled family.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Weight {
    /// Inter Regular.
    Regular,
    /// Inter SemiBold.
    SemiBold,
}

/// One line of text.
#[derive(Clone, Debug, PartialEq)]
pub struct Label {
    /// Where the anchor stands, on the baseline.
    pub baseline: Pt,
    /// Which end stands there.
    pub anchor: Anchor,
    /// Font size in page units (em).
    pub size: f32,
    /// Weight.
    pub weight: Weight,
    /// Colour role.
    pub role: Role,
    /// The text.
    pub text: String,
}

impl Label {
    /// Width of the text, page units.
    #[must_use]
    pub fn width(&self) -> f32 {
        fonts::text_width(&self.text, self.size, self.weight)
    }

    /// The box around the text as measured: from the tallest to the lowest part of any glyph we use.
    #[must_use]
    pub fn bounds(&self) -> RectPt {
        let w = self.width();
        let left = match self.anchor {
            Anchor::Start => self.baseline.x,
            Anchor::Middle => self.baseline.x - w / 2.0,
            Anchor::End => self.baseline.x - w,
        };
        RectPt {
            min: Pt::new(left, self.baseline.y - fonts::INK_ABOVE * self.size),
            max: Pt::new(left + w, self.baseline.y + fonts::INK_BELOW * self.size),
        }
    }
}

/// What can be grabbed on a figure.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Handle {
    /// Depth: thigh angle.
    Hip,
    /// Shank angle.
    Knee,
    /// Trunk lean; straightens the trunk to show where the centre of mass then falls.
    Shoulder,
    /// Heel raise.
    Heel,
    /// Load.
    Load,
    /// Depth, on the seat-height rail.
    Rail,
    /// The slider between more knee and more hip and back.
    KneeHipSlider,
    /// Where pain starts, on the rail.
    PainMark,
    /// Depth and shank, on the map of where it balances.
    MapDot,
}

/// Where a grip answers to the pointer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Hit {
    /// Within a radius.
    Circle {
        /// Middle.
        at: Pt,
        /// Radius.
        radius: f32,
    },
    /// Within a rectangle.
    Rect(RectPt),
}

impl Hit {
    /// Whether a place is within.
    #[must_use]
    pub fn contains(&self, p: Pt) -> bool {
        match self {
            Self::Circle { at, radius } => at.distance(p) <= *radius,
            Self::Rect(r) => r.contains(p),
        }
    }

    /// The rectangle around it.
    #[must_use]
    pub fn bounds(&self) -> RectPt {
        match self {
            Self::Circle { at, radius } => RectPt { min: *at, max: *at }.grown(*radius),
            Self::Rect(r) => *r,
        }
    }

    /// The same moved by a step.
    #[must_use]
    pub fn moved(self, by: Pt) -> Self {
        match self {
            Self::Circle { at, radius } => Self::Circle { at: at + by, radius },
            Self::Rect(r) => Self::Rect(RectPt { min: r.min + by, max: r.max + by }),
        }
    }
}

/// Something that can be grabbed, with what a screen reader and the arrow keys need.
#[derive(Clone, Debug, PartialEq)]
pub struct Grip {
    /// Which.
    pub handle: Handle,
    /// Where.
    pub hit: Hit,
    /// Name as spoken.
    pub name: String,
    /// Value now, in `unit`.
    pub value: f64,
    /// Least and greatest value, in `unit`.
    pub range: (f64, f64),
    /// Unit of value and range.
    pub unit: Unit,
    /// The line along which it moves, where that is a straight one: from the place of the least
    /// value to that of the greatest, in equal parts.
    pub track: Option<(Pt, Pt)>,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn equal_neighbours_become_one_run() {
        let c = Cells {
            area: RectPt::at(0.0, 0.0, 40.0, 20.0),
            columns: 4,
            roles: [
                Some(Role::Steady),
                Some(Role::Steady),
                None,
                Some(Role::Drifting),
                None,
                None,
                None,
                Some(Role::Steady),
            ]
            .to_vec(),
        };
        let runs = c.runs();
        assert_eq!(runs.len(), 3);
        assert_eq!(runs[0], (RectPt::at(0.0, 0.0, 20.0, 10.0), Role::Steady));
        assert_eq!(runs[2].0, RectPt::at(30.0, 10.0, 10.0, 10.0));
    }

    #[test]
    fn anchors_put_the_box_left_in_the_middle_and_right() {
        let label = |anchor| Label {
            baseline: Pt::new(100.0, 50.0),
            anchor,
            size: 20.0,
            weight: Weight::Regular,
            role: Role::Ink,
            text: "knee arm 13 cm".to_owned(),
        };
        let (s, m, e) = (label(Anchor::Start).bounds(), label(Anchor::Middle).bounds(), label(Anchor::End).bounds());
        assert!((s.min.x - 100.0).abs() < 1e-3 && (e.max.x - 100.0).abs() < 1e-3);
        assert!((m.middle().x - 100.0).abs() < 1e-3 && (s.w() - e.w()).abs() < 1e-3 && s.w() > 100.0);
    }
}
