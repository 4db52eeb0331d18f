//! Invented clients for examples, tests and benches.

use crate::{
    angle::Angle,
    measures::{AnkleRange, Caps, HipRange, KneeRange, Lengths, Measures, PerJoint, Sex, Sides},
    tables::SegmentTable,
    task::{Bend, Placement, Rule, Support, Task},
};

/// An unloaded squat to thigh level, arms forward, feet under the hips.
#[must_use]
pub fn plain_task() -> Task {
    Task {
        placement: Placement::ArmsForward,
        load_kg: 0.0,
        footwear_drop_m: 0.0,
        heel_raise_m: 0.0,
        stance_m: None,
        toe_out: Angle::ZERO,
        bend: Bend::Free,
        lean_limit: None,
        goal: Angle::from_deg(90.0),
        weight_left: None,
        rule: Rule::Usual { slope: None },
        seen: None,
        support: Support::default(),
    }
}

/// Nothing measured but stature and mass.
#[must_use]
pub fn measures(sex: Sex, stature_m: f64, mass_kg: f64) -> Measures {
    Measures {
        sex,
        age_years: Some(30.0),
        stature_m,
        mass_kg,
        scope: Vec::new(),
        lengths: Lengths::default(),
        ankle: AnkleRange::NotMeasured,
        hip: HipRange::NotMeasured,
        knee: KneeRange::NotMeasured,
        reach_limit: Angle::from_deg(200.0),
        caps: Caps::default(),
        table: SegmentTable::DeLeva,
        strength: PerJoint { ankle: 1.0, knee: 1.0, hip: 1.0, low_back: 1.0 },
    }
}

/// A man of average lengths.
#[must_use]
pub fn average_man() -> (Measures, Task) {
    (measures(Sex::Male, 1.76, 80.0), plain_task())
}

/// A woman with long thighs, short shanks, stiff ankles.
#[must_use]
pub fn long_thigh_woman() -> (Measures, Task) {
    let mut m = measures(Sex::Female, 1.68, 61.0);
    m.age_years = Some(34.0);
    m.lengths = Lengths {
        shank_m: Some(0.398),
        thigh_m: Some(0.424),
        trunk_m: Some(0.48),
        foot_m: Some(0.245),
        ..Lengths::default()
    };
    m.ankle = AnkleRange::KneeToWall(Sides { left: Some(0.05), right: Some(0.06) });
    m.hip = HipRange::PelvisHeld(Sides { left: Some(Angle::from_deg(98.0)), right: Some(Angle::from_deg(101.0)) });
    (m, plain_task())
}
