//! Input that cannot be computed with, and things to be told beside a result.

use crate::{angle::Angle, bounds::Bounds, measures::Scope};

/// Input that the model cannot be built from.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[error("{name} {value} is not possible here: allowed is {allowed}; {hint}")]
pub struct Invalid {
    /// The input in words.
    pub name: &'static str,
    /// The value as a person reads it.
    pub value: String,
    /// The allowed range as a person reads it.
    pub allowed: String,
    /// What to do.
    pub hint: &'static str,
}

impl Invalid {
    /// A value outside its bounds, in the units of the bounds table.
    #[must_use]
    pub fn out_of_bounds(b: &Bounds, value: f64) -> Self {
        Self {
            name: b.name,
            value: format!("{value}{}", b.unit.suffix()),
            allowed: b.allowed(),
            hint: "check the value and its unit",
        }
    }
}

/// Something the reader of a result must know.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Notice {
    /// No age given: rows and edges of a 30-year-old.
    AgeUnknown,
    /// Older than the surveyed adults (58 years): lengths are estimated beyond the survey.
    PastSurveyAge,
    /// Figure and angles only: no effort, no percentiles.
    FigureOnly(Scope),
    /// A circumstance that calls for care.
    Care(Scope),
    /// Ankle, shank, thigh and trunk add up to a share of stature far from the usual 0.82.
    LengthsUnlikely {
        /// Floor to acromion over stature.
        share: f64,
    },
    /// The load asked for is above the precaution: the precaution is used.
    LoadCapped {
        /// What was asked, kg.
        asked_kg: f64,
        /// What is used, kg.
        used_kg: f64,
    },
    /// Demands are those of the leg that carries more.
    WeightUneven {
        /// Share of that leg, 0.5 to 1.
        share: f64,
    },
    /// No thigh angle up to 10° is steady: no depth can be given.
    NoSteadyStanding,
    /// Not even out of the zone does the model stand.
    NoStanding,
    /// Knees and feet point apart.
    KneesOffFeet {
        /// By this much.
        twist: Angle,
    },
    /// The arms' reach keeps them from the vertical.
    ArmsShort {
        /// By this much.
        by: Angle,
    },
    /// A joint is bent beyond the range over which strength was fitted.
    StrengthStretched,
    /// Thigh and calf touch: knee demand is overstated.
    CalfContact,
    /// Stance wider than the model was made for.
    WideStance,
}
