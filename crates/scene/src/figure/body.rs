//! The body as drawn: tapered parts around the joints. Widths are those of a neutral manikin, by
//! stature alone (assumed; for looks only, nothing is computed from them).

use nalgebra::Vector2;
use plumbfold_core::{Case, Point, Posture};

use super::view::View;
use crate::{geometry::Convex, scene::Scene, shapes, theme::Role};

type Step = Vector2<f64>;

/// Whether a part's length was measured.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Known {
    Measured,
    Estimated,
}

impl Known {
    const fn of(measured: bool) -> Self {
        if measured { Self::Measured } else { Self::Estimated }
    }
}

/// One part: the hull of discs (middle and radius in metres).
#[derive(Clone, Debug)]
pub(super) struct Part {
    discs: Vec<(Point, f64)>,
    known: Known,
}

impl Part {
    /// The part on the page, moved outward by some page units.
    pub fn area(&self, view: &View, grown: f32) -> Convex {
        let points = self
            .discs
            .iter()
            .flat_map(|&(p, r)| shapes::arc(view.to_page(p), view.length(r) + grown, 0.0, std::f32::consts::TAU));
        // arms that hang may reach through the floor in a deep squat; what is under it is not drawn
        Convex::hull(points).above(view.floor() + grown)
    }
}

/// The parts of a body: behind, and the arm that lies before it.
pub(super) struct Figure {
    pub body: Vec<Part>,
    pub arm: Vec<Part>,
}

impl Figure {
    /// The same with every edge solid, for outlines.
    pub fn solid(mut self) -> Self {
        for part in self.body.iter_mut().chain(&mut self.arm) {
            part.known = Known::Measured;
        }
        self
    }
}

fn between(a: Point, b: Point, share: f64) -> Point {
    a + (b - a) * share
}

/// Parts of a body in a posture.
pub(super) fn parts(case: &Case, p: &Posture) -> Figure {
    let (j, s, l) = (&p.joints, case.body().stature_m, &case.measures().lengths);
    let part = |known: Known, discs: &[(Point, f64)]| Part {
        discs: discs.iter().map(|&(at, r)| (at, r * s)).collect(),
        known,
    };
    let along = plumbfold_core::direction(p.trunk);
    let front = ahead(along);
    let pelvis_front = ahead(plumbfold_core::direction(p.pelvis));
    let shank_back = back_of(j.ankle, j.knee);
    let (shank, thigh) = (Known::of(l.shank_m.is_some()), Known::of(l.thigh_m.is_some()));
    let (trunk, foot) = (Known::of(l.trunk_m.is_some()), Known::of(l.foot_m.is_some()));
    let waist = between(j.lumbosacral, j.shoulder, 0.25);
    let chest = between(j.lumbosacral, j.shoulder, 0.68);
    let head = j.head;
    let at_head = |up: f64, ahead: f64| head + along * (up * s) + front * (ahead * s);
    let up = |p: Point, r: f64| Point::new(p.x, p.y + r * s);
    let heel_in = |p: Point, r: f64| Point::new(p.x + r * s * 0.8, p.y + r * s);
    // the trunk counts as measured only with its own length; head and neck are always by stature
    let body = vec![
        // neck, skull, face, nose
        part(trunk, &[(between(j.shoulder, head, 0.10), 0.027), (at_head(-0.030, -0.006), 0.025)]),
        part(trunk, &[(at_head(0.016, -0.004), 0.050), (at_head(-0.002, 0.000), 0.049)]),
        part(
            trunk,
            &[(at_head(0.004, 0.018), 0.034), (at_head(-0.036, 0.014), 0.026), (at_head(-0.040, 0.026), 0.014)],
        ),
        part(
            trunk,
            &[(at_head(0.010, 0.046), 0.006), (at_head(-0.008, 0.054), 0.006), (at_head(-0.010, 0.040), 0.008)],
        ),
        part(trunk, &[(chest + front * (0.004 * s), 0.061), (j.shoulder, 0.042)]),
        part(trunk, &[(waist, 0.052), (chest + front * (0.004 * s), 0.061)]),
        part(trunk, &[(j.lumbosacral, 0.054), (waist, 0.052)]),
        part(trunk, &[(j.hip - pelvis_front * (0.010 * s), 0.060), (j.lumbosacral, 0.054)]),
        part(foot, &[(heel_in(j.heel, 0.019), 0.019), (j.ankle, 0.024), (up(j.ball, 0.013), 0.013)]),
        part(foot, &[(up(j.ball, 0.017), 0.017), (up(Point::new(j.toe.x - 0.011 * s, j.toe.y), 0.011), 0.011)]),
        part(
            shank,
            &[(j.knee, 0.035), (between(j.knee, j.ankle, 0.30) + shank_back * (0.008 * s), 0.034), (j.ankle, 0.022)],
        ),
        part(thigh, &[(j.hip, 0.056), (between(j.hip, j.knee, 0.35), 0.051), (j.knee, 0.036)]),
    ];
    let arm = vec![
        part(Known::of(l.upper_arm_m.is_some()), &[(j.shoulder, 0.031), (j.elbow, 0.023)]),
        part(
            Known::of(l.forearm_m.is_some()),
            &[(j.elbow, 0.022), (between(j.elbow, j.wrist, 0.3), 0.022), (j.wrist, 0.015)],
        ),
        part(
            Known::of(l.hand_m.is_some()),
            &[
                (j.wrist, 0.015),
                (between(j.wrist, j.fingertip, 0.45), 0.016),
                (between(j.wrist, j.fingertip, 0.93), 0.009),
            ],
        ),
    ];
    Figure { body, arm }
}

/// A quarter turn forward.
fn ahead(along: Step) -> Step {
    Step::new(along.y, -along.x)
}

/// Unit step to the back of a shank.
fn back_of(ankle: Point, knee: Point) -> Step {
    let d = knee - ankle;
    let n = d.norm();
    if n > 0.0 { Step::new(-d.y, d.x) / n } else { Step::new(-1.0, 0.0) }
}

/// How a body is painted.
#[derive(Clone, Copy, Debug)]
pub(super) struct Paint {
    pub edge: Role,
    pub edge_width: f32,
    pub fill: Role,
    pub estimated: Role,
}

/// Draws parts as one silhouette: all edges first, then all areas, so that no line crosses the
/// inside. Edges of estimated parts are dashed.
pub(super) fn draw(scene: &mut Scene, view: &View, parts: &[Part], paint: Paint) {
    let w = paint.edge_width;
    for part in parts {
        match part.known {
            Known::Measured => scene.fill(part.area(view, w), paint.edge),
            Known::Estimated => {
                for d in shapes::dashes(&shapes::outline(&part.area(view, w / 2.0)), w * 3.2, w * 2.2) {
                    scene.line(d, w, paint.edge);
                }
            }
        }
    }
    for part in parts {
        let role = match part.known {
            Known::Measured => paint.fill,
            Known::Estimated => paint.estimated,
        };
        scene.fill(part.area(view, 0.0), role);
    }
}
