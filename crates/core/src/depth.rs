//! How deep the client gets, whatever the rule: on mid-foot, and at all.

use crate::{
    angle::Angle,
    case::Case,
    roots,
    row::{LEAN_MIN, Row},
};

/// Steady and balance depth as thigh angles.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Depths {
    /// Deepest on mid-foot, reached from standing without a gap.
    pub steady: Option<Angle>,
    /// Deepest in the support; beyond it the model tips.
    pub balance: Option<Angle>,
}

/// Standing is looked for up to this thigh angle.
const STANDING_TO: f64 = 10.0;
/// No thigh angle beyond this is looked at.
const DEEPEST: f64 = 180.0;
/// Step of the scan, degrees.
const STEP: f64 = 3.0;
/// Depths are bracketed to this much, rad.
const TOL: f64 = 1e-9;
/// A slack of this much below zero is none.
const FEASIBLE: f64 = -1e-12;

/// Steady and balance depth.
///
/// Scan every 3° of a continuous slack, every dip that could reach below zero followed to its
/// bottom, the end bracketed to 1e-9 rad.
#[must_use]
pub fn depths(c: &Case) -> Depths {
    Depths { steady: steady_depth(c), balance: balance_depth(c) }
}

/// Deepest on mid-foot; none where not even standing is steady.
#[must_use]
pub fn steady_depth(c: &Case) -> Option<Angle> {
    let s = &c.stand.support;
    depth_within(c, s.zone_back_m, s.zone_front_m)
}

/// Deepest in the support; none where not even standing is in balance.
#[must_use]
pub fn balance_depth(c: &Case) -> Option<Angle> {
    let s = &c.stand.support;
    depth_within(c, s.edge_back_m, s.edge_front_m)
}

/// Room at a thigh angle: positive where some posture has its centre of mass within `[back, front]`
/// (m), zero at the edge, negative beyond (m or rad, whichever runs out first), continuous.
#[must_use]
pub fn room(c: &Case, thigh: Angle, back_m: f64, front_m: f64) -> f64 {
    let row = Row::new(c, thigh);
    let fold = row.lean_high.rad() - LEAN_MIN.rad();
    let (shanks, space) = row.shanks();
    let (low, high) = match shanks {
        Ok(s) => (s.low, s.high),
        // clearly below what counts as feasible
        Err(_) => return fold.min(space.min(-1e-11)),
    };
    fold.min(space).min(row.slack(low, high, back_m, front_m))
}

/// The largest thigh angle reached from standing without a gap, centre of mass within `[back, front]`.
pub(crate) fn depth_within(c: &Case, back_m: f64, front_m: f64) -> Option<Angle> {
    let f = |deg: f64| room(c, Angle::from_deg(deg), back_m, front_m);
    let start = standing(&f)?;
    reach(&f, start).map(Angle::from_deg)
}

/// Least thigh angle (degrees) up to 10° with room.
fn standing(f: &impl Fn(f64) -> f64) -> Option<(f64, f64)> {
    let mut last = (0.0, f(0.0));
    if last.1 >= FEASIBLE {
        return Some(last);
    }
    let mut before: Option<(f64, f64)> = None;
    for k in 1..=10 {
        let x = STANDING_TO * f64::from(k) / 10.0;
        let here = (x, f(x));
        if here.1 >= FEASIBLE {
            return Some(entry(f, last, here));
        }
        if let Some(b) = before
            && last.1 >= b.1
            && last.1 >= here.1
        {
            let (top, minus) = roots::least(|x| -f(x), b.0, here.0, 1e-9);
            if -minus >= FEASIBLE {
                return Some(entry(f, b, (top, -minus)));
            }
        }
        before = Some(last);
        last = here;
    }
    None
}

/// The first feasible point between an infeasible and a feasible one.
fn entry(f: &impl Fn(f64) -> f64, out: (f64, f64), inside: (f64, f64)) -> (f64, f64) {
    let x = roots::bracketed_from(f, out, inside, TOL.to_degrees());
    let y = f(x);
    if y >= FEASIBLE { (x, y) } else { inside }
}

/// From a feasible start, the end of the feasible stretch, degrees.
fn reach(f: &impl Fn(f64) -> f64, start: (f64, f64)) -> Option<f64> {
    let tol = TOL.to_degrees();
    let mut before = start;
    let mut last = start;
    let mut x = start.0;
    while x < DEEPEST {
        x = (x + STEP).min(DEEPEST);
        let here = (x, f(x));
        let dips = last.0 > before.0 && last.1 <= before.1 && last.1 <= here.1;
        let could_cross = last.1 < (before.1 - last.1).max(here.1 - last.1);
        if dips && could_cross && here.1 >= FEASIBLE {
            let (bottom, value) = roots::least(f, before.0, here.0, 1e-7);
            if value < FEASIBLE {
                return Some(roots::bracketed_from(f, before, (bottom, value), tol));
            }
        }
        if here.1 < FEASIBLE {
            if last.1 <= 0.0 {
                // the start itself is the edge
                return Some(last_feasible(f, last.0, here.0));
            }
            return Some(roots::bracketed_from(f, last, here, tol));
        }
        before = last;
        last = here;
    }
    Some(DEEPEST)
}

/// Where the room is exactly nothing at the start: it may open at once or close at once.
fn last_feasible(f: &impl Fn(f64) -> f64, start: f64, end: f64) -> f64 {
    let probe = start + 1e-6;
    let here = (probe, f(probe));
    if here.1 < FEASIBLE {
        return start;
    }
    roots::bracketed_from(f, here, (end, f(end)), TOL.to_degrees())
}
