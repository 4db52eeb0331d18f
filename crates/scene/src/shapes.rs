//! Shapes flattened to polygons and polylines: circles, arcs, tapered segments, dashes, hatching.

use std::f32::consts::{PI, TAU};

use crate::geometry::{Convex, Pt, RectPt};

/// Greatest distance between a curve and its flattened line, page units.
pub const FLATNESS: f32 = 0.05;

/// Steps for an arc of a radius so that it strays by no more than [`FLATNESS`].
fn steps(radius: f32, sweep: f32) -> usize {
    let r = radius.abs().max(FLATNESS * 2.0);
    let per_step = 2.0 * (1.0 - FLATNESS / r).clamp(-1.0, 1.0).acos();
    ((sweep.abs() / per_step).ceil() as usize).clamp(2, 256)
}

/// A place on a circle; angles from the right, clockwise as seen on the page.
#[must_use]
pub fn on_circle(middle: Pt, radius: f32, angle: f32) -> Pt {
    let (s, c) = angle.sin_cos();
    middle + Pt::new(c, s) * radius
}

/// An arc as a polyline, from one angle to the other (radians, from the right, clockwise).
#[must_use]
pub fn arc(middle: Pt, radius: f32, from: f32, to: f32) -> Vec<Pt> {
    let n = steps(radius, to - from);
    (0..=n).map(|i| on_circle(middle, radius, from + (to - from) * i as f32 / n as f32)).collect()
}

/// A disc.
#[must_use]
pub fn circle(middle: Pt, radius: f32) -> Convex {
    Convex::hull(arc(middle, radius, 0.0, TAU))
}

/// A circle as a closed polyline.
#[must_use]
pub fn ring(middle: Pt, radius: f32) -> Vec<Pt> {
    arc(middle, radius, 0.0, TAU)
}

/// An ellipse turned by an angle (radians, clockwise): `along` is the half axis in that direction.
#[must_use]
pub fn ellipse(middle: Pt, along: f32, across: f32, turned: f32) -> Convex {
    let u = on_circle(Pt::default(), 1.0, turned);
    let n = steps(along.max(across), TAU);
    Convex::hull((0..n).map(|i| {
        let (s, c) = (TAU * i as f32 / n as f32).sin_cos();
        middle + u * (along * c) + u.turned() * (across * s)
    }))
}

/// A pie slice of a disc narrower than half of it (hull of the middle and an arc).
#[must_use]
pub fn slice(middle: Pt, radius: f32, from: f32, to: f32) -> Convex {
    let to = from + (to - from).clamp(-PI, PI);
    Convex::hull(arc(middle, radius, from, to).into_iter().chain([middle]))
}

/// A tapered segment with round ends: the hull of two discs.
#[must_use]
pub fn capsule(a: Pt, radius_a: f32, b: Pt, radius_b: f32) -> Convex {
    Convex::hull(arc(a, radius_a, 0.0, TAU).into_iter().chain(arc(b, radius_b, 0.0, TAU)))
}

/// A rectangle.
#[must_use]
pub fn rect(r: RectPt) -> Convex {
    Convex::hull(r.corners())
}

/// A rectangle with round corners.
#[must_use]
pub fn rounded(r: RectPt, radius: f32) -> Convex {
    let q = radius.min(r.w() / 2.0).min(r.h() / 2.0).max(0.0);
    let inner = r.grown(-q);
    Convex::hull(inner.corners().into_iter().flat_map(|c| arc(c, q, 0.0, TAU)))
}

/// A closed polyline around an area.
#[must_use]
pub fn outline(area: &Convex) -> Vec<Pt> {
    let mut pts = area.points().to_vec();
    pts.extend(area.points().first());
    pts
}

/// The drawn pieces of a dashed polyline; the pattern runs on over corners.
#[must_use]
pub fn dashes(pts: &[Pt], on: f32, off: f32) -> Vec<Vec<Pt>> {
    let (on, off) = (on.max(0.1), off.max(0.1));
    let mut out = Vec::new();
    let mut piece: Vec<Pt> = pts.first().copied().into_iter().collect();
    let (mut drawing, mut left) = (true, on);
    for pair in pts.windows(2) {
        let (mut a, b) = (pair[0], pair[1]);
        let mut rest = a.distance(b);
        if !rest.is_finite() {
            return out;
        }
        while rest > left {
            let p = a.toward(b, left / rest);
            if drawing {
                piece.push(p);
                out.push(std::mem::take(&mut piece));
            } else {
                piece = vec![p];
            }
            rest -= left;
            a = p;
            drawing = !drawing;
            left = if drawing { on } else { off };
        }
        left -= rest;
        if drawing {
            piece.push(b);
        }
    }
    if drawing && piece.len() > 1 {
        out.push(piece);
    }
    out
}

/// Parallel lines inside an area, `spacing` apart, leaning to the right; fixed to the page so that
/// neighbouring areas continue each other.
#[must_use]
pub fn hatch(area: &Convex, spacing: f32) -> Vec<[Pt; 2]> {
    let Some(r) = area.bounds() else { return Vec::new() };
    let spacing = spacing.max(1.0);
    // lines x + y = k · step
    let step = spacing * std::f32::consts::SQRT_2;
    let (from, to) = ((r.min.x + r.min.y) / step, (r.max.x + r.max.y) / step);
    let mut out = Vec::new();
    let mut k = from.ceil();
    while k <= to && out.len() < 4096 {
        let sum = k * step;
        let (a, b) = (Pt::new(sum - r.max.y - 1.0, r.max.y + 1.0), Pt::new(sum - r.min.y + 1.0, r.min.y - 1.0));
        if let Some((p, q)) = area.clip(a, b) {
            out.push([p, q]);
        }
        k += 1.0;
    }
    out
}

/// A triangle pointing along `direction`, its tip at `tip`.
#[must_use]
pub fn pointer(tip: Pt, direction: Pt, length: f32, width: f32) -> Convex {
    let u = direction.unit();
    let base = tip - u * length;
    Convex::hull([tip, base + u.turned() * (width / 2.0), base - u.turned() * (width / 2.0)])
}

/// A square standing on its corner.
#[must_use]
pub fn diamond(middle: Pt, radius: f32) -> Convex {
    Convex::hull((0..4).map(|i| on_circle(middle, radius, PI / 2.0 * i as f32)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_circle_is_round_to_the_flatness() {
        for r in [2.0_f32, 20.0, 300.0] {
            for pair in ring(Pt::new(5.0, 5.0), r).windows(2) {
                let mid = pair[0].toward(pair[1], 0.5).distance(Pt::new(5.0, 5.0));
                assert!(r - mid <= FLATNESS * 1.1, "{r} {mid}");
            }
        }
    }

    #[test]
    fn a_capsule_holds_both_discs_and_is_no_wider() {
        let c = capsule(Pt::new(0.0, 0.0), 10.0, Pt::new(100.0, 0.0), 4.0);
        let b = c.bounds().expect("an area");
        assert!((b.min.x + 10.0).abs() < 0.1 && (b.max.x - 104.0).abs() < 0.1 && (b.h() - 20.0).abs() < 0.2);
        let inside = capsule(Pt::new(0.0, 0.0), 10.0, Pt::new(1.0, 0.0), 2.0);
        assert!((inside.bounds().expect("an area").w() - 20.0).abs() < 0.2);
    }

    #[test]
    fn dashes_add_up_and_run_over_corners() {
        let line = [Pt::new(0.0, 0.0), Pt::new(10.0, 0.0), Pt::new(10.0, 10.0)];
        let pieces = dashes(&line, 3.0, 2.0);
        let drawn: f32 = pieces.iter().flat_map(|p| p.windows(2).map(|w| w[0].distance(w[1]))).sum();
        assert!((drawn - 12.0).abs() < 1e-3, "{drawn}");
        assert_eq!(pieces.len(), 4);
        assert!(dashes(&[], 3.0, 2.0).is_empty());
    }

    #[test]
    fn hatching_stays_inside() {
        let area = circle(Pt::new(50.0, 50.0), 20.0);
        let lines = hatch(&area, 5.0);
        assert!(lines.len() >= 7);
        for [a, b] in lines {
            assert!(a.distance(Pt::new(50.0, 50.0)) < 20.1 && b.distance(Pt::new(50.0, 50.0)) < 20.1);
        }
    }
}
