//! Seen and computed: is the squat that was seen explained by range, shape and balance?

use crate::{
    angle::Angle,
    balance::{Standing, balance, standing},
    case::Case,
    depth::{Depths, depths},
    pose::{Posture, pose},
    posture::posture,
    task::Seen,
};

/// A seen depth within this much of the computed one is explained (assumed: two readings of a
/// goniometer at 2–3° each, and a stop by eye).
pub const DEPTH_TOLERANCE: Angle = Angle::from_deg(10.0);
/// A seen lean within this much of what balance needs is explained (assumed, as above).
pub const LEAN_TOLERANCE: Angle = Angle::from_deg(10.0);
/// A seen posture further outside the support than this cannot have stood: drawing or measures are
/// off (assumed), m.
pub const FAR_OUTSIDE_M: f64 = 0.03;

/// Whether the seen depth is explained.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum DepthGap {
    /// Range, shape and balance account for where it stops.
    Explained,
    /// Something else is needed to explain it: strength, pain, confidence, practice.
    Shallower,
    /// Deeper than the measures allow.
    Deeper,
    /// Nothing to compare with: no steady depth.
    NoDepth,
}

/// Whether the seen lean is explained.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LeanGap {
    /// What balance needs at the seen shank and thigh.
    Needed,
    /// More than balance needs.
    More,
    /// Less than balance needs.
    Less,
    /// The seen legs are outside what the measures allow.
    Unknown,
}

/// What follows from the seen squat.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SeenStudy {
    /// What was seen.
    pub seen: Seen,
    /// What the measures allow.
    pub allowed: Depths,
    /// Whether the depth is explained.
    pub depth: DepthGap,
    /// The lean that balance needs at the seen shank and thigh.
    pub lean_needed: Option<Angle>,
    /// Whether the lean is explained.
    pub lean: LeanGap,
    /// The seen posture, where the legs can span it.
    pub posture: Option<Posture>,
    /// How it stands in the model.
    pub standing: Option<Standing>,
}

impl SeenStudy {
    /// Whether the seen posture lies so far outside the support that the drawing or the measures
    /// must be off.
    #[must_use]
    pub fn far_outside(&self) -> bool {
        matches!(self.standing, Some(Standing::Tips { by_m, .. }) if by_m > FAR_OUTSIDE_M)
    }
}

/// Compares the seen squat with the measures; none where none was seen.
#[must_use]
pub fn seen_study(c: &Case) -> Option<SeenStudy> {
    let seen = c.task.seen?;
    let allowed = depths(c);
    let depth = match allowed.steady {
        None => DepthGap::NoDepth,
        Some(steady) if seen.thigh < steady - DEPTH_TOLERANCE => DepthGap::Shallower,
        Some(steady) if seen.thigh > steady + DEPTH_TOLERANCE => DepthGap::Deeper,
        Some(_) => DepthGap::Explained,
    };
    let lean_needed = balance(c, seen.shank, seen.thigh).posture().map(|p| p.trunk);
    let lean = match lean_needed {
        None => LeanGap::Unknown,
        Some(needed) if seen.trunk > needed + LEAN_TOLERANCE => LeanGap::More,
        Some(needed) if seen.trunk < needed - LEAN_TOLERANCE => LeanGap::Less,
        Some(_) => LeanGap::Needed,
    };
    let as_seen = pose(c, seen.shank, seen.thigh, seen.trunk);
    let stands = as_seen.map(|p| standing(c, &p));
    Some(SeenStudy { seen, allowed, depth, lean_needed, lean, posture: as_seen, standing: stands })
}

/// A depth that suits.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Suits {
    /// The posture there.
    pub posture: Posture,
    /// Whether the pain mark, not the model, ends it.
    pub by_pain: bool,
}

/// The deepest depth on mid-foot, within the lean and bend chosen and not beyond the pain mark.
#[must_use]
pub fn depth_that_suits(c: &Case, pain_from: Option<Angle>) -> Option<Suits> {
    let steady = depths(c).steady?;
    let by_pain = pain_from.is_some_and(|p| p < steady);
    let thigh = if by_pain { pain_from? } else { steady };
    posture(c, thigh).held().map(|p| Suits { posture: *p, by_pain })
}
