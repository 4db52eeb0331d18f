//! What a posture asks for: lever arms, net moments, effort.

use crate::{
    angle::Angle,
    case::Case,
    measures::PerJoint,
    notice::Notice,
    pose::Posture,
    tables::{self, CapacityRow, CapacityRows, GRAVITY},
};

/// Readings of one posture. Moments are extensor demands: ankle, knee and hip for one leg (the one
/// that carries more), low back whole, N·m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Readings {
    /// Knee ahead of the plumb line, m.
    pub knee_arm_m: f64,
    /// Hip behind the plumb line, m.
    pub hip_arm_m: f64,
    /// Hip arm to knee arm; none where the knee arm is under 1 mm.
    pub ratio: Option<f64>,
    /// Net moments, N·m.
    pub moments_nm: PerJoint<f64>,
    /// What a typical untrained adult of this sex, age, mass and stature can do there, N·m.
    pub capacity_nm: PerJoint<f64>,
    /// Demand over capacity, by the client's strength factors.
    pub effort: PerJoint<f64>,
    /// Whether a joint is bent beyond the range over which capacity was fitted.
    pub stretched: PerJoint<bool>,
    /// Centre of mass ahead of the rear edge of support, m.
    pub heel_margin_m: f64,
    /// Centre of mass behind the front edge of support, m.
    pub toe_margin_m: f64,
    /// Distances of the centre of mass to the zone's rear and front end, inside positive, m.
    pub zone_m: (f64, f64),
}

/// Positions a demand follows from, m and kg·m.
pub(crate) struct Load {
    pub ankle_x: f64,
    pub knee_x: f64,
    pub hip_x: f64,
    /// First moment above the hips about the hip centre.
    pub upper: f64,
    pub pelvis: Angle,
}

/// Static net moments, N·m: `M = g Σ m (x_m − x_joint)` over the masses above, per leg about the
/// joint's own axis.
pub(crate) fn demands(c: &Case, l: &Load) -> PerJoint<f64> {
    let (m, s) = (&c.body.masses, c.body.segments);
    let up_kg = c.upper.mass_kg;
    let thighs_kg = 2.0 * m.thigh_kg;
    let shanks_kg = 2.0 * m.shank_kg;
    let about = |x: f64| {
        let thigh_x = l.hip_x + s.thigh.cm * (l.knee_x - l.hip_x);
        l.upper + up_kg * (l.hip_x - x) + thighs_kg * (thigh_x - x)
    };
    let shank_x = l.knee_x + s.shank.cm * (l.ankle_x - l.knee_x);
    let ankle = about(l.ankle_x) + shanks_kg * (shank_x - l.ankle_x);
    let share = 2.0 * c.heavier_share() * GRAVITY;
    PerJoint {
        ankle: share * ankle / (2.0 * c.stand.cos_out),
        knee: -share * about(l.knee_x) / (2.0 * c.stand.cos_out),
        hip: share * l.upper / 2.0,
        low_back: GRAVITY
            * (c.upper.moment_above_lumbosacral(l.upper, l.pelvis)
                - c.upper.above_lumbosacral_kg * c.body.lumbosacral_m * l.pelvis.rad().sin()),
    }
}

fn row(r: &CapacityRow, flexion_rad: f64) -> f64 {
    r.c1 * (r.c2 * (flexion_rad.min(r.to_rad) - r.c3)).cos()
}

/// Capacity at a joint angle as a fraction of mass · g · stature, linear between the ages of the rows.
fn by_age(rows: &CapacityRows, age_years: f64, flexion_rad: f64) -> f64 {
    let between = |a: &CapacityRow, b: &CapacityRow, t: f64| {
        let low = row(a, flexion_rad);
        low + t * (row(b, flexion_rad) - low)
    };
    if age_years <= 25.0 {
        row(&rows.young, flexion_rad)
    } else if age_years < 60.0 {
        between(&rows.young, &rows.older, (age_years - 25.0) / 35.0)
    } else if age_years < 70.0 {
        between(&rows.older, &rows.eldest, (age_years - 60.0) / 10.0)
    } else {
        row(&rows.eldest, flexion_rad)
    }
}

/// Capacity of a typical untrained adult at these joint angles, N·m (Anderson 2007; low back from memory).
pub(crate) fn capacities(c: &Case, knee_rad: f64, hip_rad: f64) -> PerJoint<f64> {
    let t = tables::capacity(c.body.sex);
    let scale = c.body.mass_kg * GRAVITY * c.body.stature_m;
    let age = c.body.age_years;
    PerJoint {
        ankle: scale * by_age(&t.ankle, age, 0.0),
        knee: scale * by_age(&t.knee, age, knee_rad),
        hip: scale * by_age(&t.hip, age, hip_rad),
        low_back: scale * t.lumbosacral,
    }
}

pub(crate) fn efforts(c: &Case, demand: &PerJoint<f64>, capacity: &PerJoint<f64>) -> PerJoint<f64> {
    let f = &c.measures.strength;
    PerJoint {
        ankle: demand.ankle / (capacity.ankle * f.ankle),
        knee: demand.knee / (capacity.knee * f.knee),
        hip: demand.hip / (capacity.hip * f.hip),
        low_back: demand.low_back / (capacity.low_back * f.low_back),
    }
}

/// All readings of a posture.
#[must_use]
pub fn readings(c: &Case, p: &Posture) -> Readings {
    let j = &p.joints;
    let load = Load {
        ankle_x: j.ankle.x,
        knee_x: j.knee.x,
        hip_x: j.hip.x,
        upper: c.upper.moment(p.trunk, p.pelvis).0,
        pelvis: p.pelvis,
    };
    let moments_nm = demands(c, &load);
    let capacity_nm = capacities(c, p.knee_flexion.rad(), p.hip_flexion.rad());
    let (knee_arm_m, hip_arm_m) = (j.knee.x - p.com.x, p.com.x - j.hip.x);
    let s = &c.stand.support;
    let t = tables::capacity(c.body.sex);
    Readings {
        knee_arm_m,
        hip_arm_m,
        ratio: (knee_arm_m.abs() >= 1e-3).then(|| hip_arm_m / knee_arm_m),
        moments_nm,
        capacity_nm,
        effort: efforts(c, &moments_nm, &capacity_nm),
        stretched: PerJoint {
            ankle: false,
            knee: p.knee_flexion.rad() > t.knee.young.to_rad,
            hip: p.hip_flexion.rad() > t.hip.young.to_rad,
            low_back: false,
        },
        heel_margin_m: p.com.x - s.edge_back_m,
        toe_margin_m: s.edge_front_m - p.com.x,
        zone_m: (p.com.x - s.zone_back_m, s.zone_front_m - p.com.x),
    }
}

/// What must be told beside a posture.
#[must_use]
pub fn posture_notices(c: &Case, p: &Posture) -> Vec<Notice> {
    let mut n = Vec::new();
    if p.thigh.deg() >= 30.0 && p.twist.deg() > 15.0 {
        n.push(Notice::KneesOffFeet { twist: p.twist });
    }
    if p.arms_short.deg() > 1e-6 {
        n.push(Notice::ArmsShort { by: p.arms_short });
    }
    if p.knee_flexion.deg() > 130.0 {
        n.push(Notice::CalfContact);
    }
    let r = readings(c, p);
    if !c.figure_only() && (r.stretched.knee || r.stretched.hip) {
        n.push(Notice::StrengthStretched);
    }
    n
}
