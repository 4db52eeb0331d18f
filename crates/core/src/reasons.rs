//! Why not lower, and what would change it, in one piece.

use crate::{
    angle::Angle,
    case::Case,
    seen::{SeenStudy, seen_study},
    stops::{Edge, ShapeOrRange, Stopped, by_bend, shape_or_range, stopped},
    takes::{Takes, takes},
};

/// Everything the clinician's "why" is answered with.
#[derive(Clone, Debug, PartialEq)]
pub struct Reasons {
    /// The steady depth and what stops there.
    pub steady: Stopped,
    /// The balance depth and what stops there.
    pub balance: Stopped,
    /// Steady depth with the back kept small, some, free.
    pub by_bend: [Option<Angle>; 3],
    /// Shape or range.
    pub shape_or_range: ShapeOrRange,
    /// What it would take to be steady at the goal.
    pub takes: Takes,
    /// What the seen squat tells.
    pub seen: Option<SeenStudy>,
}

/// Answers why, about 2 ms at the most in one thread.
#[must_use]
pub fn reasons(c: &Case) -> Reasons {
    Reasons {
        steady: stopped(c, Edge::Steady),
        balance: stopped(c, Edge::Balance),
        by_bend: by_bend(c),
        shape_or_range: shape_or_range(c),
        takes: takes(c),
        seen: seen_study(c),
    }
}
