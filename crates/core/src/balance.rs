//! The verdict on a posture: the lean that balances it, and how it stands.

use crate::{
    angle::Angle,
    case::Case,
    pose::{Posture, pose},
    row::{LEAN_MIN, Refusal, Row},
};

/// Towards which end of the foot.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Toward {
    /// Heels.
    Heels,
    /// Toes.
    Toes,
}

/// How a posture stands on its support.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Standing {
    /// Centre of mass in the mid-foot zone, to 0.1 mm.
    Steady,
    /// In the support, outside the zone.
    Drifting(Toward),
    /// Outside the support.
    Tips {
        /// Which way.
        toward: Toward,
        /// By how much, m.
        by_m: f64,
    },
}

/// A posture with its verdict, or why there is none.
#[derive(Clone, Copy, Debug, PartialEq)]
#[must_use]
#[expect(clippy::large_enum_variant, reason = "a posture is a plain value that lives on the stack, by the thousand")]
pub enum Balance {
    /// The posture exists; `standing` says whether it holds.
    Stands {
        /// The posture.
        posture: Posture,
        /// How it stands.
        standing: Standing,
    },
    /// No posture within the limits.
    Refused(Refusal),
}

impl Balance {
    /// The posture, whether or not it holds.
    #[must_use]
    pub const fn posture(&self) -> Option<&Posture> {
        match self {
            Self::Stands { posture, .. } => Some(posture),
            Self::Refused(_) => None,
        }
    }

    /// The posture, if it holds (steady or drifting).
    #[must_use]
    pub const fn held(&self) -> Option<&Posture> {
        match self {
            Self::Stands { standing: Standing::Tips { .. }, .. } | Self::Refused(_) => None,
            Self::Stands { posture, .. } => Some(posture),
        }
    }

    /// Whether it is steady.
    #[must_use]
    pub const fn is_steady(&self) -> bool {
        matches!(self, Self::Stands { standing: Standing::Steady, .. })
    }
}

/// In the zone to this much, m.
const STEADY_TOL_M: f64 = 1e-4;
/// Angles at a limit count as within it to this much, rad.
pub(crate) const ANGLE_TOL: f64 = 1e-9;

/// How a posture stands.
#[must_use]
pub fn standing(c: &Case, p: &Posture) -> Standing {
    let s = &c.stand.support;
    let x = p.com.x;
    // rounding of the last bits is no tipping
    let tol = 1e-9;
    if x < s.edge_back_m - tol {
        Standing::Tips { toward: Toward::Heels, by_m: s.edge_back_m - x }
    } else if x > s.edge_front_m + tol {
        Standing::Tips { toward: Toward::Toes, by_m: x - s.edge_front_m }
    } else if x < s.zone_back_m - STEADY_TOL_M {
        Standing::Drifting(Toward::Heels)
    } else if x > s.zone_front_m + STEADY_TOL_M {
        Standing::Drifting(Toward::Toes)
    } else {
        Standing::Steady
    }
}

/// Balance at a given shank and thigh: refused, in this order, by stance, ankle, knee, hip; else the
/// lean that puts the centre of mass on the aim, or the end of the lean range nearest to it.
///
/// Exact: one arcsine on the piece of the upper body's moment that holds the target.
pub fn balance(c: &Case, shank: Angle, thigh: Angle) -> Balance {
    let row = Row::new(c, thigh);
    balance_in(&row, shank)
}

pub(crate) fn balance_in(row: &Row<'_>, shank: Angle) -> Balance {
    let c = row.case;
    // the trunk does not change what may refuse before it
    let Some(p) = pose(c, shank, row.thigh, row.lean(shank)) else {
        return Balance::Refused(Refusal::Stance);
    };
    let (low, high) = row.ankle_range();
    if shank.rad() > high.rad() + ANGLE_TOL {
        return Balance::Refused(Refusal::Ankle);
    }
    let knee_over = p.knee_flexion.rad() > c.limits.knee.rad() + ANGLE_TOL
        || shank.rad() + row.thigh.rad() > std::f64::consts::PI + ANGLE_TOL
        || shank.rad() < low.rad() - ANGLE_TOL;
    if knee_over {
        return Balance::Refused(Refusal::Knee);
    }
    if row.lean_high.rad() < LEAN_MIN.rad() - ANGLE_TOL {
        return Balance::Refused(Refusal::Hip);
    }
    Balance::Stands { standing: standing(c, &p), posture: p }
}
