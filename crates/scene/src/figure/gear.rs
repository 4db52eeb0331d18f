//! Load, wedge and shoe.

use plumbfold_core::{Case, Placement, Point, Posture};

use super::view::View;
use crate::{
    geometry::{Convex, Pt, RectPt},
    scene::Scene,
    shapes,
    theme::Role,
};

/// Radius of a large disc, m: IWF technical rules (read).
const DISC_M: f64 = 0.225;
/// Loads up to this are the bar alone, kg (IWF: 20 kg; read).
const BAR_KG: f64 = 20.0;
/// Radius at which a bar or a stick is drawn, m (looks only).
const BAR_M: f64 = 0.020;

/// Half the length of a dumbbell, m (looks only).
const HALF_M: f64 = 0.16;

/// What is held.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Held {
    /// Nothing in the hands.
    Nothing,
    /// A bar seen along its length; radius of its discs, m.
    Bar(Option<f64>),
    /// A disc held upright, seen edge on; radius, m.
    Plate(f64),
    /// A round weight with a handle; radius, m.
    Bell(f64),
    /// A short bar with a weight at each end, seen from its side; radius, m.
    Dumbbell(f64),
}

fn held(placement: Placement, load_kg: f64) -> Held {
    // looks only: a disc or bell grows with the cube root of its mass
    let by_mass = 0.055 * (load_kg / 5.0).max(0.2).cbrt();
    match placement {
        Placement::HighBar | Placement::LowBar | Placement::FrontRack => Held::Bar(disc(load_kg)),
        Placement::Overhead if load_kg > 0.0 => Held::Bar(disc(load_kg)),
        _ if load_kg <= 0.0 => Held::Nothing,
        Placement::ArmsForward | Placement::ArmsCrossed => Held::Plate(by_mass.min(DISC_M) * 1.3),
        Placement::AtSides => Held::Dumbbell(by_mass.min(DISC_M)),
        Placement::Goblet | Placement::Overhead => Held::Bell(by_mass.min(DISC_M)),
    }
}

fn disc(load_kg: f64) -> Option<f64> {
    (load_kg > BAR_KG).then_some(DISC_M)
}

/// Extent of the load around its place: least x, greatest x, top (m).
pub(super) fn extent(case: &Case, p: &Posture) -> Option<(f64, f64, f64)> {
    let at = p.joints.load;
    let r = match held(case.task().placement, case.task().load_kg) {
        Held::Nothing => return None,
        Held::Bar(Some(r)) | Held::Plate(r) | Held::Bell(r) => r,
        Held::Dumbbell(r) => return Some((at.x - HALF_M, at.x + HALF_M, at.y + r)),
        Held::Bar(None) => BAR_M,
    };
    Some((at.x - r, at.x + r, at.y + r))
}

/// An area with its edge, so far as it is above `low`.
fn edged(scene: &mut Scene, low: f32, grow: impl Fn(f32) -> Convex, width: f32, fill: Role) {
    scene.fill(grow(width).above(low), Role::BodyEdge);
    scene.fill(grow(0.0).above(low), fill);
}

/// What lies behind the body: discs of a bar.
pub(super) fn behind(scene: &mut Scene, view: &View, case: &Case, p: &Posture, edge: f32) {
    if let Held::Bar(Some(r)) = held(case.task().placement, case.task().load_kg) {
        let at = view.to_page(p.joints.load);
        edged(scene, view.floor(), |g| shapes::circle(at, view.length(r) + g), edge, Role::Panel);
        for share in [0.88, 0.30] {
            scene.line(shapes::ring(at, view.length(r * share)), 1.0, Role::Gear);
        }
    }
}

/// What lies before the body: the bar's end, a plate, a bell.
pub(super) fn before(scene: &mut Scene, view: &View, case: &Case, p: &Posture, edge: f32) {
    let at = view.to_page(p.joints.load);
    match held(case.task().placement, case.task().load_kg) {
        Held::Nothing => {}
        Held::Bar(_) => edged(scene, view.floor(), |g| shapes::circle(at, view.length(BAR_M) + g), edge, Role::Gear),
        Held::Plate(r) => edged(
            scene,
            view.floor(),
            |g| {
                let (half, thick) = (view.length(r), view.length(0.018) + g);
                shapes::capsule(at - Pt::new(0.0, half - thick), thick, at + Pt::new(0.0, half - thick), thick)
            },
            edge,
            Role::Gear,
        ),
        Held::Dumbbell(r) => {
            let (half, thick) = (view.length(HALF_M), view.length(0.055));
            let pieces = [
                RectPt::at(at.x - half, at.y - view.length(0.014), 2.0 * half, view.length(0.028)),
                RectPt::at(at.x - half, at.y - view.length(r), thick, view.length(2.0 * r)),
                RectPt::at(at.x + half - thick, at.y - view.length(r), thick, view.length(2.0 * r)),
            ];
            for piece in pieces {
                scene.fill(shapes::rounded(piece.grown(edge), edge * 2.0).above(view.floor()), Role::BodyEdge);
            }
            for piece in pieces {
                scene.fill(shapes::rounded(piece, edge * 2.0).above(view.floor()), Role::Gear);
            }
        }
        Held::Bell(r) => {
            let radius = view.length(r);
            let top = at - Pt::new(0.0, radius * 0.9);
            scene.line(shapes::ring(top, radius * 0.55), radius * 0.28 + edge, Role::BodyEdge);
            scene.line(shapes::ring(top, radius * 0.55), radius * 0.28, Role::Gear);
            edged(scene, view.floor(), |g| shapes::circle(at, radius + g), edge, Role::Gear);
        }
    }
}

/// Wedge and shoe heel under the pitched foot.
pub(super) fn under_foot(scene: &mut Scene, view: &View, case: &Case, p: &Posture, edge: f32) {
    let (heel, ball, task) = (p.joints.heel, p.joints.ball, case.task());
    let total = task.heel_raise_m + task.footwear_drop_m;
    if total <= 0.0 {
        return;
    }
    let wedge_top = Point::new(heel.x, heel.y * task.heel_raise_m / total);
    let foot = Point::new(heel.x, 0.0);
    let piece = |a: Point, b: Point| Convex::hull([a, b, ball].map(|q| view.to_page(q)));
    for (area, role) in [(piece(wedge_top, heel), Role::Shoe), (piece(foot, wedge_top), Role::Gear)] {
        if !area.is_empty() {
            scene.line(shapes::outline(&area), edge, Role::BodyEdge);
            scene.fill(area, role);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn an_empty_hand_holds_nothing_and_a_bar_stays_a_bar() {
        assert_eq!(held(Placement::ArmsForward, 0.0), Held::Nothing);
        assert_eq!(held(Placement::Overhead, 0.0), Held::Nothing);
        assert_eq!(held(Placement::HighBar, 0.0), Held::Bar(None));
        assert_eq!(held(Placement::HighBar, 60.0), Held::Bar(Some(DISC_M)));
        assert!(matches!(held(Placement::Goblet, 12.0), Held::Bell(_)));
        assert!(matches!(held(Placement::ArmsForward, 5.0), Held::Plate(_)));
    }
}
