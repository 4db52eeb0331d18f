//! From a handle and a place in the world to an action. Pure: tested without a window.

use plumbfold_core::{
    Angle, Point, Posture, Step,
    bounds::{Field, bounds},
    roots, tables,
};
use plumbfold_records::Rule;
use plumbfold_scene::Handle;

use crate::{
    action::{Action, Edit, Step as Undo, ViewChange},
    computed::Results,
    entry::Entry,
    state::State,
};

/// Least thigh angle at which a dragged knee says something about the shank's slope.
const SLOPE_FROM_DEG: f64 = 10.0;
/// Steepest slope of the slider; beyond it the ankle range decides anyway.
pub const SLOPE_MOST: f64 = 0.8;
/// One kilogram for so much of a drag of the load, downward, m.
const KG_PER_M: f64 = 40.0;

/// A drag under way.
#[derive(Clone, Copy, Debug)]
pub struct Drag {
    /// What is held.
    pub handle: Handle,
    /// Where the pointer is, in the world.
    pub to: Point,
    /// How far it has come since the press, in the world, m up.
    pub risen_m: f64,
    /// The handle's value at the press.
    pub from_value: f64,
    /// How it counts in the history.
    pub undo: Undo,
}

/// What a drag asks for; nothing where it makes no sense.
#[must_use]
pub fn drag(state: &State, results: &Results, now: &Step, d: &Drag) -> Option<Action> {
    if state.view.matching {
        return matching(state, results, d);
    }
    let p = now.balance.posture();
    match d.handle {
        Handle::Hip | Handle::Rail => Some(depth(depth_of_hip(results, d.to.y))),
        Handle::Knee => knee(p?, d),
        Handle::Shoulder => Some(Action::View(ViewChange::Straighten(Some(lean_to(p?, d.to))))),
        Handle::Heel => {
            let b = bounds(Field::HeelRaise);
            let shoe = state.doc.task().footwear_drop_mm;
            let mm = (d.to.y * 1000.0 - shoe).clamp(b.min, b.max).round();
            Some(Action::Edit(Edit::Number(Entry::HeelRaise, Some(mm)), d.undo))
        }
        Handle::Load => {
            let b = bounds(Field::Load);
            let kg = (d.from_value - d.risen_m * KG_PER_M).clamp(b.min, b.max);
            Some(Action::Edit(Edit::Number(Entry::Load, Some((kg * 2.0).round() / 2.0)), d.undo))
        }
        Handle::KneeHipSlider | Handle::MapDot => None,
        Handle::PainMark => {
            // the mark stands at a seat height, not at the hip's
            let deg = depth_of_seat(results, d.to.y).round();
            Some(Action::Edit(Edit::Number(Entry::PainFrom, Some(deg)), d.undo))
        }
    }
}

fn depth(deg: f64) -> Action {
    Action::View(ViewChange::Depth(deg))
}

/// The depth at which the hip stands at a height, by the task's rule: the hip sinks as the thigh
/// angle grows, so a bracketed root finds it.
#[must_use]
pub fn depth_of_hip(results: &Results, hip_y_m: f64) -> f64 {
    let over = |deg: f64| results.at(deg).balance.posture().map_or(-1.0, |p| p.joints.hip.y) - hip_y_m;
    let (low, high) = (0.0, results.deepest_deg);
    if over(low) <= 0.0 {
        return low;
    }
    if over(high) >= 0.0 {
        return high;
    }
    roots::bracketed(over, low, high, 1e-4)
}

/// The depth of a seat height.
#[must_use]
pub fn depth_of_seat(results: &Results, seat_m: f64) -> f64 {
    depth_of_hip(results, seat_m + tables::HIP_ABOVE_SEAT_M)
}

/// The shank that points from the ankle to a place.
fn shank_to(p: &Posture, to: Point) -> Angle {
    let a = p.joints.ankle;
    Angle::from_rad((to.x - a.x).atan2((to.y - a.y).max(1e-6)))
}

/// The lean that points from the hip to a place.
fn lean_to(p: &Posture, to: Point) -> Angle {
    let h = p.joints.hip;
    let lean = Angle::from_rad((to.x - h.x).atan2((to.y - h.y).max(1e-6)));
    lean.within(Angle::from_deg(-20.0), Angle::from_deg(90.0))
}

/// A dragged knee sets the slope of the usual shank through that point.
fn knee(p: &Posture, d: &Drag) -> Option<Action> {
    if p.thigh.deg() < SLOPE_FROM_DEG {
        return None;
    }
    let b = bounds(Field::Slope);
    let slope = (shank_to(p, d.to).deg() - tables::USUAL_SHANK_AT_STANDING_DEG) / p.thigh.deg();
    let slope = (slope.clamp(b.min, b.max) * 1000.0).round() / 1000.0;
    Some(Action::Edit(Edit::Rule(Rule::Usual { slope: Some(slope) }), d.undo))
}

/// While matching, the handles write the squat seen and nothing else.
fn matching(state: &State, results: &Results, d: &Drag) -> Option<Action> {
    let shown = results.matched(state.view.depth_deg)?;
    let (mut thigh, mut shank, mut trunk) = (shown.thigh.deg(), shown.shank.deg(), shown.trunk.deg());
    let j = &shown.joints;
    match d.handle {
        Handle::Hip => {
            // the thigh points from the knee up and back
            thigh = (j.knee.x - d.to.x).atan2(d.to.y - j.knee.y).to_degrees().max(0.0);
        }
        Handle::Knee => {
            shank = shank_to(&shown, d.to).deg();
        }
        Handle::Shoulder => trunk = lean_to(&shown, d.to).deg(),
        Handle::Rail => {
            let drop_m = d.to.y + tables::HIP_ABOVE_SEAT_M - j.knee.y;
            let span = (j.hip - j.knee).norm();
            thigh = (drop_m / span).clamp(-1.0, 1.0).acos().to_degrees();
        }
        _ => return None,
    }
    let round = |deg: f64| (deg * 2.0).round() / 2.0;
    Some(Action::Edit(Edit::Seen([round(thigh), round(shank), round(trunk)]), d.undo))
}

/// The handle's value in its unit moved by arrow keys.
#[must_use]
pub fn nudge(state: &State, results: &Results, now: &Step, handle: Handle, steps: f64) -> Option<Action> {
    let p = now.balance.posture();
    if state.view.matching {
        let shown = results.matched(state.view.depth_deg)?;
        let mut angles = [shown.thigh.deg(), shown.shank.deg(), shown.trunk.deg()];
        let at = match handle {
            Handle::Hip | Handle::Rail => 0,
            Handle::Knee => 1,
            Handle::Shoulder => 2,
            _ => return None,
        };
        angles[at] = (angles[at] + steps).round();
        return Some(Action::Edit(Edit::Seen(angles), Undo::Whole));
    }
    match handle {
        Handle::Hip | Handle::Rail | Handle::MapDot => {
            let now_deg = state.view.depth_deg.min(results.deepest_deg);
            Some(depth((now_deg + steps).clamp(0.0, results.deepest_deg)))
        }
        Handle::Knee => {
            let p = p?;
            if p.thigh.deg() < SLOPE_FROM_DEG {
                return None;
            }
            let b = bounds(Field::Slope);
            let slope = (p.shank.deg() + steps - tables::USUAL_SHANK_AT_STANDING_DEG) / p.thigh.deg();
            Some(Action::Edit(Edit::Rule(Rule::Usual { slope: Some(slope.clamp(b.min, b.max)) }), Undo::Whole))
        }
        Handle::Shoulder => {
            let lean = state.view.straighten.unwrap_or(p?.trunk) - Angle::from_deg(steps);
            Some(Action::View(ViewChange::Straighten(Some(lean.within(Angle::from_deg(-20.0), Angle::from_deg(90.0))))))
        }
        Handle::Heel => step_entry(state, Entry::HeelRaise, steps),
        Handle::Load => step_entry(state, Entry::Load, steps),
        Handle::PainMark => step_entry(state, Entry::PainFrom, steps),
        Handle::KneeHipSlider => Some(slope_to(results.study.case.usual_slope() + 0.02 * steps, Undo::Whole)),
    }
}

fn step_entry(state: &State, entry: Entry, steps: f64) -> Option<Action> {
    let b = entry.bounds(&state.doc);
    let value = (entry.get(&state.doc)? + steps * b.step).clamp(b.min, b.max);
    Some(Action::Edit(Edit::Number(entry, Some(value)), Undo::Whole))
}

/// The dot on the map dragged to a pair of angles: the depth, and the slope of the usual shank
/// through that point.
#[must_use]
pub fn map_to(thigh: Angle, shank: Angle, undo: Undo) -> Vec<Action> {
    let mut out = vec![depth(thigh.deg())];
    if thigh.deg() >= SLOPE_FROM_DEG {
        out.push(slope_to((shank.deg() - tables::USUAL_SHANK_AT_STANDING_DEG) / thigh.deg(), undo));
    }
    out
}

/// Sets the slope of the usual shank: the slider between more knee and more hip and back.
#[must_use]
pub fn slope_to(slope: f64, undo: Undo) -> Action {
    let slope = (slope.clamp(bounds(Field::Slope).min, SLOPE_MOST) * 1000.0).round() / 1000.0;
    Action::Edit(Edit::Rule(Rule::Usual { slope: Some(slope) }), undo)
}
