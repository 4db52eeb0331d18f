//! Joint ranges as angles, where each comes from, and the precautions on top.

use crate::{
    angle::Angle,
    body::Body,
    bounds::{Field, bounds},
    measures::{AnkleRange, Caps, HipRange, KneeRange, Measures, Sex},
    notice::Invalid,
    tables,
    task::Task,
};

/// Where a limit comes from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Origin {
    /// Measured.
    Measured,
    /// Not measured: a usual value is assumed.
    Assumed,
    /// A precaution, lower than what was measured or assumed.
    Precaution,
}

/// The angles a squat must stay within.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Limits {
    /// Most dorsiflexion, relative to the sole.
    pub ankle: Angle,
    /// Its origin.
    pub ankle_from: Origin,
    /// Most knee flexion.
    pub knee: Angle,
    /// Its origin.
    pub knee_from: Origin,
    /// Most flexion of the hip joint.
    pub hip: Angle,
    /// Its origin.
    pub hip_from: Origin,
    /// Bend beyond the hip available.
    pub bend: Angle,
    /// Most trunk lean.
    pub lean: Angle,
    /// How far the arms go up from hanging.
    pub reach: Angle,
}

/// Most lean where none is chosen.
pub const LEAN_MAX: Angle = Angle::from_deg(85.0);

/// Ankle dorsiflexion of a knee-to-wall distance: `sin a = (foot + w − knee front − heel to ankle) / shank`.
///
/// # Errors
/// Where the distance cannot be reached by this foot and shank.
pub fn dorsiflexion_of_knee_to_wall(body: &Body, wall_m: f64) -> Result<Angle, Invalid> {
    let front_m = tables::KNEE_FRONT * body.stature_m;
    let sine = (body.foot_m + wall_m - front_m - body.heel_to_ankle_m) / body.shank_m;
    if (-1.0..=1.0).contains(&sine) {
        return Ok(Angle::from_rad(sine.asin()));
    }
    let at = |s: f64| 100.0 * (s * body.shank_m - body.foot_m + front_m + body.heel_to_ankle_m);
    Err(Invalid {
        name: bounds(Field::KneeToWall).name,
        value: format!("{:.1} cm", wall_m * 100.0),
        allowed: format!("{:.1} to {:.1} cm for this foot and shank", at(-1.0), at(1.0)),
        hint: "measure the distance, the foot and the shank again",
    })
}

/// The knee-to-wall distance (m) of a dorsiflexion; the inverse of [`dorsiflexion_of_knee_to_wall`].
#[must_use]
pub fn knee_to_wall_of_dorsiflexion(body: &Body, ankle: Angle) -> f64 {
    ankle.rad().sin() * body.shank_m - body.foot_m + tables::KNEE_FRONT * body.stature_m + body.heel_to_ankle_m
}

/// Hip flexion of the femur on the pelvis, by the way it was measured; `None` where it was not.
#[must_use]
pub fn measured_hip(hip: HipRange, sex: Sex) -> Option<Angle> {
    match hip {
        HipRange::PelvisHeld(sides) | HipRange::RockBack(sides) => sides.lesser(),
        HipRange::KneeToChest(sides) => {
            sides.lesser().map(|a| a - Angle::from_deg(tables::knee_to_chest_less_deg(sex)))
        }
        HipRange::NotMeasured => None,
    }
}

fn capped(range: Option<Angle>, assumed: Angle, cap: Option<Angle>) -> (Angle, Origin) {
    let (angle, from) = range.map_or((assumed, Origin::Assumed), |a| (a, Origin::Measured));
    match cap {
        Some(cap) if cap < angle => (cap, Origin::Precaution),
        _ => (angle, from),
    }
}

impl Limits {
    /// The lesser side of each range, assumed values where nothing was measured, precautions on top.
    ///
    /// # Errors
    /// Where a knee-to-wall distance cannot be reached by this foot and shank.
    pub fn new(body: &Body, m: &Measures, task: &Task) -> Result<Self, Invalid> {
        let measured_ankle = match m.ankle {
            AnkleRange::KneeToWall(sides) => {
                for wall_m in [sides.left, sides.right].into_iter().flatten() {
                    dorsiflexion_of_knee_to_wall(body, wall_m)?;
                }
                sides.lesser().map(|w| dorsiflexion_of_knee_to_wall(body, w)).transpose()?
            }
            AnkleRange::Degrees(sides) => sides.lesser(),
            AnkleRange::NotMeasured => None,
        };
        let (ankle, ankle_from) = match measured_ankle {
            Some(a) => (a, Origin::Measured),
            None => (assumed_ankle(body), Origin::Assumed),
        };
        let measured_knee = match m.knee {
            KneeRange::Degrees(sides) => sides.lesser(),
            KneeRange::NotMeasured => None,
        };
        let Caps { knee: knee_cap, hip: hip_cap, .. } = m.caps;
        let (knee, knee_from) = capped(measured_knee, Angle::from_deg(tables::KNEE_DEFAULT_DEG), knee_cap);
        let hip_default = Angle::from_deg(tables::hip_default_deg(m.sex));
        let (hip, hip_from) = capped(measured_hip(m.hip, m.sex), hip_default, hip_cap);
        Ok(Self {
            ankle,
            ankle_from,
            knee,
            knee_from,
            hip,
            hip_from,
            bend: task.bend.available(),
            lean: task.lean_limit.unwrap_or(LEAN_MAX),
            reach: m.reach_limit,
        })
    }
}

/// Dorsiflexion assumed where nothing was measured: a knee-to-wall distance of 10 cm. A foot so
/// long for its shank that 10 cm is out of reach gets what it can reach.
#[must_use]
pub fn assumed_ankle(body: &Body) -> Angle {
    let front_m = tables::KNEE_FRONT * body.stature_m;
    let sine = (body.foot_m + tables::KNEE_TO_WALL_DEFAULT_M - front_m - body.heel_to_ankle_m) / body.shank_m;
    Angle::from_rad(sine.clamp(-1.0, 1.0).asin())
}
