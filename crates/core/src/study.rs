//! One client studied whole: depths, the descent, and what follows from them.

use crate::{
    angle::Angle,
    balance::Balance,
    case::Case,
    depth::{Depths, depths},
    posture::posture,
    readings::{Readings, readings},
};

/// One depth of the descent by the task's rule.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Step {
    /// Thigh angle.
    pub thigh: Angle,
    /// The posture and its verdict.
    pub balance: Balance,
    /// Its readings, where there is a posture.
    pub readings: Option<Readings>,
}

impl Step {
    /// The posture at a thigh angle by the task's rule, with its readings.
    #[must_use]
    pub fn at(c: &Case, thigh: Angle) -> Self {
        let balance = posture(c, thigh);
        Self { thigh, balance, readings: balance.posture().map(|p| readings(c, p)) }
    }
}

/// A case with what was computed of it.
#[derive(Clone, Debug, PartialEq)]
pub struct Study {
    /// The case.
    pub case: Case,
    /// Steady and balance depth.
    pub depths: Depths,
    /// Steps of the descent in rising depth, from standing to the balance depth, at most 3° apart,
    /// with the steady and the balance depth among them.
    pub descent: Vec<Step>,
}

/// Thigh angle to which a descent is followed where there is no depth at all.
const WITHOUT_DEPTH: f64 = 90.0;

/// Depths and descent of a case.
#[must_use]
pub fn study(c: &Case) -> Study {
    let depths = depths(c);
    let end = depths.balance.or(depths.steady).unwrap_or(Angle::from_deg(WITHOUT_DEPTH));
    let n = (end.deg() / 3.0).ceil().max(1.0) as usize;
    let mut at: Vec<f64> = (0..=n).map(|k| end.deg() * k as f64 / n as f64).collect();
    at.extend(depths.steady.map(Angle::deg));
    at.sort_by(f64::total_cmp);
    at.dedup_by(|a, b| (*a - *b).abs() < 1e-9);
    let descent = at.into_iter().map(|deg| Step::at(c, Angle::from_deg(deg))).collect();
    Study { case: c.clone(), depths, descent }
}
