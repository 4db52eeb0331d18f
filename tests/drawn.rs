//! What egui was told to draw, read back without pixels: each row of text with its box, its clip and its neighbours.

use egui::{Pos2, Rect, Shape, epaint::ClippedShape, pos2};
use plumbfold_scene::fonts;

/// One row of text as drawn.
#[derive(Clone, Debug)]
pub struct Text {
    /// What it says.
    pub text: String,
    /// Left end of the baseline, points.
    pub baseline: Pos2,
    /// Width by the advances of its glyphs, points.
    pub width: f32,
    /// Font size, points.
    pub size: f32,
    /// The part of the screen it is clipped to.
    pub clip: Rect,
    /// Whether letters were left out for want of room.
    pub shortened: bool,
}

impl Text {
    /// The box that ink can reach, measured as labels of a scene are.
    #[must_use]
    pub fn ink(&self) -> Rect {
        let y = self.baseline.y;
        Rect::from_min_max(
            pos2(self.baseline.x, y - fonts::INK_ABOVE * self.size),
            pos2(self.baseline.x + self.width, y + fonts::INK_BELOW * self.size),
        )
    }

    /// Whether any of it can be seen.
    #[must_use]
    pub fn is_seen(&self) -> bool {
        self.ink().intersect(self.clip).is_positive()
    }
}

/// All rows of text among shapes, in the order drawn; blank ones are left out.
#[must_use]
pub fn texts(shapes: &[ClippedShape]) -> Vec<Text> {
    let mut out = Vec::new();
    for ClippedShape { clip_rect, shape, .. } in shapes {
        collect(shape, *clip_rect, &mut out);
    }
    out
}

fn collect(shape: &Shape, clip: Rect, out: &mut Vec<Text>) {
    match shape {
        Shape::Vec(shapes) => shapes.iter().for_each(|s| collect(s, clip, out)),
        Shape::Text(t) => {
            let size = t.galley.job.sections.first().map_or(0.0, |s| s.format.font_id.size);
            for row in &t.galley.rows {
                let drawn: Vec<_> = row.row.glyphs.iter().filter(|g| !g.chr.is_whitespace()).collect();
                let (Some(first), Some(last)) = (drawn.first(), drawn.last()) else { continue };
                let origin = t.pos + row.pos.to_vec2();
                out.push(Text {
                    text: row.row.glyphs.iter().map(|g| g.chr).collect(),
                    baseline: origin + first.pos.to_vec2(),
                    width: last.pos.x + last.advance_width - first.pos.x,
                    size,
                    clip,
                    shortened: t.galley.elided,
                });
            }
        }
        _ => {}
    }
}

/// Pairs of rows that can be seen and lie on each other.
#[must_use]
pub fn overlaps(texts: &[Text]) -> Vec<(&Text, &Text)> {
    let seen: Vec<(&Text, Rect)> =
        texts.iter().filter(|t| t.is_seen()).map(|t| (t, t.ink().intersect(t.clip))).collect();
    let mut out = Vec::new();
    for (i, (a, ra)) in seen.iter().enumerate() {
        for (b, rb) in &seen[i + 1..] {
            // boxes that only touch share no pixel
            if ra.intersect(*rb).shrink(0.25).is_positive() {
                out.push((*a, *b));
            }
        }
    }
    out
}

/// Every shape that reaches beyond an area by more than half a point, as text for a message.
#[must_use]
pub fn beyond(shapes: &[ClippedShape], area: Rect) -> Vec<String> {
    let page = area.expand(0.5);
    let holds = |r: Rect| !r.is_positive() || page.contains_rect(r);
    let mut out: Vec<String> = texts(shapes)
        .iter()
        .filter(|t| !page.contains_rect(t.ink()))
        .map(|t| format!("“{}” {:?}", t.text, t.ink()))
        .collect();
    for c in shapes {
        if !matches!(c.shape, Shape::Text(_) | Shape::Vec(_)) && !holds(c.shape.visual_bounding_rect()) {
            out.push(format!("{:?}", c.shape.visual_bounding_rect()));
        }
    }
    out
}
