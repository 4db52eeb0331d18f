//! Paints a scene: one exhaustive match over its items. Roles become colours here and nowhere else
//! in the window.

use egui::{Color32, FontFamily, FontId, Pos2, Rect, Shape, Stroke, Vec2, epaint::PathShape, pos2, vec2};
use plumbfold_scene::{Anchor, Item, Label, Pt, RectPt, Role, Scene, Theme, Weight};

/// The family of the semi-bold weight.
pub const SEMIBOLD: &str = "semibold";

/// A role's colour in a theme.
#[must_use]
#[expect(clippy::disallowed_methods, reason = "the one place where the theme's numbers become egui colours")]
pub fn color(theme: Theme, role: Role) -> Color32 {
    let c = theme.rgba(role);
    Color32::from_rgba_unmultiplied(c.r, c.g, c.b, c.a)
}

/// A font of a label.
#[must_use]
pub fn font(size: f32, weight: Weight) -> FontId {
    match weight {
        Weight::Regular => FontId::new(size, FontFamily::Proportional),
        Weight::SemiBold => FontId::new(size, FontFamily::Name(SEMIBOLD.into())),
    }
}

fn to_pos(origin: Pos2, p: Pt) -> Pos2 {
    origin + vec2(p.x, p.y)
}

/// A page rectangle on the screen.
#[must_use]
pub fn to_rect(origin: Pos2, r: RectPt) -> Rect {
    Rect::from_min_max(to_pos(origin, r.min), to_pos(origin, r.max))
}

/// A place on the screen as a place on the page.
#[must_use]
pub fn to_page(origin: Pos2, p: Pos2) -> Pt {
    let Vec2 { x, y } = p - origin;
    Pt::new(x, y)
}

/// Paints a scene with its top left corner at `origin`.
pub fn paint(painter: &egui::Painter, origin: Pos2, scene: &Scene, theme: Theme) {
    for item in &scene.items {
        match item {
            Item::Fill(area, role) => {
                let points = area.points().iter().map(|&p| to_pos(origin, p)).collect();
                painter.add(Shape::convex_polygon(points, color(theme, *role), Stroke::NONE));
            }
            Item::Line { pts, width, role } => {
                painter.add(line(origin, pts, *width, color(theme, *role), painter.pixels_per_point()));
            }
            Item::Cells(cells) => {
                // edges on whole pixels, so that neighbours leave no seam
                let px = painter.pixels_per_point();
                let snap = |v: f32| (v * px).round() / px;
                for (area, role) in cells.runs() {
                    let r = to_rect(origin, area);
                    let on_pixels =
                        Rect::from_min_max(pos2(snap(r.min.x), snap(r.min.y)), pos2(snap(r.max.x), snap(r.max.y)));
                    painter.rect_filled(on_pixels, 0.0, color(theme, role));
                }
            }
            Item::Text(label) => text(painter, origin, label, theme),
        }
    }
}

/// A line with butt ends. A stroke's soft edge lengthens it at both ends, which makes short dashes too
/// long: a straight piece is filled as the rectangle it is, unless it is too thin for that.
fn line(origin: Pos2, pts: &[Pt], width: f32, ink: Color32, pixels_per_point: f32) -> Shape {
    let points: Vec<Pos2> = pts.iter().map(|&p| to_pos(origin, p)).collect();
    if let [a, b] = points[..]
        && width * pixels_per_point >= 1.0
        && a != b
    {
        let across = (b - a).normalized().rot90() * (width / 2.0);
        let corners = vec![a + across, b + across, b - across, a - across];
        return Shape::convex_polygon(corners, ink, Stroke::NONE);
    }
    PathShape::line(trimmed(points, 0.5 / pixels_per_point), Stroke::new(width, ink)).into()
}

/// A line without the last bit at both ends, which its soft edge adds again.
fn trimmed(mut points: Vec<Pos2>, by: f32) -> Vec<Pos2> {
    let shorter = |end: Pos2, next: Pos2| {
        let step = next - end;
        if step.length() > 2.0 * by { end + step.normalized() * by } else { end }
    };
    if let [first, second, ..] = points[..] {
        points[0] = shorter(first, second);
    }
    if let [.., second, last] = points[..] {
        let at = points.len() - 1;
        points[at] = shorter(last, second);
    }
    points
}

fn text(painter: &egui::Painter, origin: Pos2, label: &Label, theme: Theme) {
    let galley = painter.layout_no_wrap(label.text.clone(), font(label.size, label.weight), color(theme, label.role));
    let across = match label.anchor {
        Anchor::Start => 0.0,
        Anchor::Middle => galley.size().x / 2.0,
        Anchor::End => galley.size().x,
    };
    // where the first row's baseline lies in the laid-out text
    let ascent = galley.rows.first().and_then(|row| row.row.glyphs.first().map(|g| row.pos.y + g.pos.y)).unwrap_or(0.0);
    let at = to_pos(origin, label.baseline);
    painter.galley(pos2(at.x - across, at.y - ascent), galley, color(theme, label.role));
}
