//! Floor, support strip, plumb line with its bob, and the two arms laid end to end as a measuring rule.

use plumbfold_core::{Case, Posture, Readings, Standing, balance::Toward};

use super::view::View;
use crate::{
    format,
    geometry::{Pt, RectPt},
    place::Wanted,
    scene::{Anchor, Label, Scene, Weight},
    shapes,
    theme::Role,
};

/// Heights under the floor line, in font sizes.
pub(super) struct Levels {
    pub strip: (f32, f32),
    pub bob: (f32, f32),
    pub rule: (f32, f32),
}

impl Levels {
    /// For a floor at page y `floor` and a base font size.
    pub fn new(floor: f32, t: f32) -> Self {
        let strip = (floor + 0.35 * t, floor + 1.15 * t);
        let bob = (strip.1 + 0.12 * t, strip.1 + 1.42 * t);
        let rule = (bob.1 + 0.25 * t, bob.1 + 1.15 * t);
        Self { strip, bob, rule }
    }
}

/// The support under the foot: open, hatched near heel and toe, solid on mid-foot.
pub(super) fn strip(scene: &mut Scene, view: &View, case: &Case, levels: &Levels) {
    let s = &case.stand().support;
    let (top, bottom) = levels.strip;
    let piece = |a: f64, b: f64| RectPt::new(Pt::new(view.x(a), top), Pt::new(view.x(b), bottom));
    let whole = piece(s.heel_m, s.toe_m);
    scene.fill(shapes::rect(whole.grown(0.1 * (bottom - top))), Role::BodyEdge);
    scene.fill(shapes::rect(whole), Role::NeedsHold);
    for (a, b) in [(s.edge_back_m, s.zone_back_m), (s.zone_front_m, s.edge_front_m)] {
        let area = shapes::rect(piece(a, b));
        scene.fill(area.clone(), Role::DriftingBg);
        for l in shapes::hatch(&area, 0.35 * (bottom - top)) {
            scene.line(l, 0.11 * (bottom - top), Role::Drifting);
        }
    }
    for edge in [s.edge_back_m, s.edge_front_m] {
        let x = view.x(edge);
        scene.line([Pt::new(x, top), Pt::new(x, bottom)], 0.12 * (bottom - top), Role::BodyEdge);
    }
    scene.fill(shapes::rect(piece(s.zone_back_m, s.zone_front_m)), Role::Steady);
}

/// The plumb line from `top` down to its bob under the strip.
pub(super) fn plumb(scene: &mut Scene, view: &View, p: &Posture, top: f32, levels: &Levels, width: f32) {
    let x = view.x(p.com.x);
    let (from, tip) = levels.bob;
    for d in shapes::dashes(&[Pt::new(x, top), Pt::new(x, from)], width * 4.5, width * 2.5) {
        scene.line(d, width, Role::Plumb);
    }
    let h = tip - from;
    let cap = RectPt::new(Pt::new(x - h * 0.13, from), Pt::new(x + h * 0.13, from + h * 0.18));
    scene.fill(shapes::rect(cap), Role::Plumb);
    let shoulder = from + h * 0.18;
    let bob = [(-0.30, 0.0), (0.30, 0.0), (0.34, 0.16), (0.0, 0.82), (-0.34, 0.16)];
    scene.fill(crate::geometry::Convex::hull(bob.map(|(dx, dy)| Pt::new(x + h * dx, shoulder + h * dy))), Role::Plumb);
}

/// The centre-of-mass mark: a disc in quarters.
pub(super) fn com_mark(scene: &mut Scene, at: Pt, radius: f32) {
    let quarter = std::f32::consts::FRAC_PI_2;
    scene.fill(shapes::circle(at, radius + 1.5), Role::Plumb);
    scene.fill(shapes::circle(at, radius), Role::Paper);
    for k in [0.0, 2.0] {
        scene.fill(shapes::slice(at, radius + 0.5, quarter * (k - 1.0), quarter * k), Role::Plumb);
    }
}

/// Both arms under the floor with centimetre marks from the plumb line outward, and their names.
pub(super) fn rule(scene: &mut Scene, view: &View, p: &Posture, r: &Readings, levels: &Levels, t: f32, page: RectPt) {
    let (com, hip, knee) = (view.x(p.com.x), view.x(p.joints.hip.x), view.x(p.joints.knee.x));
    let (top, bottom) = levels.rule;
    // end to end where hip and knee lie on different sides of the plumb line, else one under the other
    let end_to_end = (hip - com) * (knee - com) <= 0.0;
    let half = (bottom - top) / 2.0;
    let rows = if end_to_end { [(top, bottom), (top, bottom)] } else { [(top, bottom - half), (top + half, bottom)] };
    for ((end, joint_y, role), (y0, y1)) in
        [(hip, view.y(p.joints.hip.y), Role::Hip), (knee, view.y(p.joints.knee.y), Role::Knee)].into_iter().zip(rows)
    {
        for d in shapes::dashes(&[Pt::new(end, joint_y), Pt::new(end, y0)], 6.0, 4.0) {
            scene.line(d, 1.2, role);
        }
        let bar = RectPt::new(Pt::new(com, y0), Pt::new(end, y1));
        if bar.w() < 0.5 {
            continue;
        }
        scene.fill(shapes::rect(bar), role);
        centimetres(scene, com, end, view.length(0.01), (y0, y1));
    }
    for (l, _) in names(view, p, r, levels, t, page) {
        scene.text(l);
    }
}

/// Marks every centimetre, longer ones every 5 and 10, from one end of a bar to the other.
fn centimetres(scene: &mut Scene, from: f32, to: f32, cm: f32, (top, bottom): (f32, f32)) {
    let step = if cm >= 2.4 { 1 } else { 5 };
    let count = ((to - from).abs() / cm).floor() as usize;
    for k in (step..=count).step_by(step) {
        let x = from + (to - from).signum() * cm * k as f32;
        if (to - x).abs() < 1.0 {
            continue;
        }
        let share = if k % 10 == 0 {
            1.0
        } else if k % 5 == 0 {
            0.6
        } else {
            0.3
        };
        scene.line([Pt::new(x, bottom - (bottom - top) * share), Pt::new(x, bottom)], 0.9, Role::OnStrong);
    }
}

/// Names of both arms beside the rule, kept on the page and apart.
pub(super) fn names(
    view: &View,
    p: &Posture,
    r: &Readings,
    levels: &Levels,
    t: f32,
    page: RectPt,
) -> Vec<(Label, RectPt)> {
    let (com, hip, knee) = (view.x(p.com.x), view.x(p.joints.hip.x), view.x(p.joints.knee.x));
    let (top, bottom) = levels.rule;
    let wanted = |text: String, role| Wanted { text, size: t * 1.2, weight: Weight::SemiBold, role };
    let hip_name = wanted(format!("hip arm {}", format::cm(r.hip_arm_m)), Role::Hip);
    let knee_name = wanted(format!("knee arm {}", format::cm(r.knee_arm_m)), Role::Knee);
    let (left, right) = (com.min(hip).min(knee), com.max(hip).max(knee));
    let y = f32::midpoint(top, bottom) + t * 0.34;
    // the hip lies behind: on the page's left when facing right
    let (first, last) = if view.forward() > 0.0 { (hip_name, knee_name) } else { (knee_name, hip_name) };
    let mut first = first.at(Pt::new(left - t * 0.6, y), Anchor::End);
    let mut last = last.at(Pt::new(right + t * 0.6, y), Anchor::Start);
    let over = page.min.x - first.bounds().min.x;
    if over > 0.0 {
        first.baseline = Pt::new(first.baseline.x + over, bottom + t * 1.3);
    }
    let over = last.bounds().max.x - page.max.x;
    if over > 0.0 {
        last.baseline = Pt::new(last.baseline.x - over, bottom + t * 1.3);
    }
    [first, last].into_iter().map(|l| (l.clone(), l.bounds())).collect()
}

/// How far outside the support the plumb line falls, as a dimension from the support's edge.
pub(super) fn gap(
    scene: &mut Scene,
    view: &View,
    case: &Case,
    p: &Posture,
    standing: &Standing,
    levels: &Levels,
    t: f32,
) -> Option<(Wanted, Pt)> {
    let Standing::Tips { toward, by_m } = *standing else { return None };
    let s = &case.stand().support;
    let edge = match toward {
        Toward::Heels => s.edge_back_m,
        Toward::Toes => s.edge_front_m,
    };
    let y = f32::midpoint(levels.strip.0, levels.strip.1);
    let (a, b) = (Pt::new(view.x(edge), y), Pt::new(view.x(p.com.x), y));
    let along = (b - a).unit();
    scene.line([a, b], 2.5, Role::Warn);
    if a.distance(b) > 14.0 {
        scene.fill(shapes::pointer(b, along, 8.0, 8.0), Role::Warn);
        scene.fill(shapes::pointer(a, -along, 8.0, 8.0), Role::Warn);
    }
    for x in [a, b] {
        scene.line([x - Pt::new(0.0, 6.0), x + Pt::new(0.0, 6.0)], 1.5, Role::Warn);
    }
    let side = match toward {
        Toward::Heels => "behind the support",
        Toward::Toes => "in front of the support",
    };
    let wanted = Wanted {
        text: format!("{} {side}", format::cm(by_m.max(0.005))),
        size: t,
        weight: Weight::SemiBold,
        role: Role::Warn,
    };
    Some((wanted, b))
}
