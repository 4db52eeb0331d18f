//! The client's body: lengths, masses and where they sit. Built once, never changed.

use crate::{
    measures::{Measures, Sex},
    tables::{self, Inertia, Segments},
};

/// Mass of one segment (one side), kg.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Masses {
    /// Pelvis.
    pub pelvis_kg: f64,
    /// Thorax and abdomen.
    pub thorax_kg: f64,
    /// Head and neck.
    pub head_kg: f64,
    /// One thigh.
    pub thigh_kg: f64,
    /// One shank.
    pub shank_kg: f64,
    /// One foot.
    pub foot_kg: f64,
    /// One upper arm.
    pub upper_arm_kg: f64,
    /// One forearm.
    pub forearm_kg: f64,
    /// One hand.
    pub hand_kg: f64,
}

impl Masses {
    /// Fractions of a table scaled to sum to `mass_kg`, limbs counted twice.
    #[must_use]
    pub fn scaled(s: &Segments, mass_kg: f64) -> Self {
        let limbs = [s.thigh, s.shank, s.foot, s.upper_arm, s.forearm, s.hand];
        let sum = s.pelvis.mass + s.thorax.mass + s.head.mass + 2.0 * limbs.iter().map(|l| l.mass).sum::<f64>();
        let kg = |i: Inertia| i.mass * mass_kg / sum;
        Self {
            pelvis_kg: kg(s.pelvis),
            thorax_kg: kg(s.thorax),
            head_kg: kg(s.head),
            thigh_kg: kg(s.thigh),
            shank_kg: kg(s.shank),
            foot_kg: kg(s.foot),
            upper_arm_kg: kg(s.upper_arm),
            forearm_kg: kg(s.forearm),
            hand_kg: kg(s.hand),
        }
    }

    /// Both arms, kg.
    #[must_use]
    pub fn arms_kg(&self) -> f64 {
        2.0 * (self.upper_arm_kg + self.forearm_kg + self.hand_kg)
    }

    /// Everything above the hips, kg.
    #[must_use]
    pub fn above_hips_kg(&self) -> f64 {
        self.pelvis_kg + self.thorax_kg + self.head_kg + self.arms_kg()
    }

    /// The whole body, kg.
    #[must_use]
    pub fn total_kg(&self) -> f64 {
        self.above_hips_kg() + 2.0 * (self.thigh_kg + self.shank_kg + self.foot_kg)
    }
}

/// Landmark lengths in metres, each measured or estimated from stature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Landmarks {
    /// Lateral malleolus to epicondyle.
    pub shank_m: f64,
    /// Epicondyle to trochanter.
    pub thigh_m: f64,
    /// Trochanter to acromion.
    pub trunk_m: f64,
    /// Heel to longest toe.
    pub foot_m: f64,
    /// Malleolus above the floor.
    pub ankle_height_m: f64,
    /// Heel to malleolus.
    pub heel_to_ankle_m: f64,
    /// Acromion to elbow crease.
    pub upper_arm_m: f64,
    /// Elbow crease to wrist.
    pub forearm_m: f64,
    /// Wrist to fingertip.
    pub hand_m: f64,
}

impl Landmarks {
    /// Measured lengths as they are, the rest from stature: `exp(a + b ln S)`, S in mm.
    #[must_use]
    pub fn of(m: &Measures) -> Self {
        let fit = tables::from_stature(m.sex);
        let ln_mm = (m.stature_m * 1000.0).ln();
        let or = |measured: Option<f64>, (a, b): (f64, f64)| measured.unwrap_or_else(|| (a + b * ln_mm).exp() / 1000.0);
        let l = &m.lengths;
        let foot_m = or(l.foot_m, fit.foot);
        Self {
            shank_m: or(l.shank_m, fit.shank),
            thigh_m: or(l.thigh_m, fit.thigh),
            trunk_m: or(l.trunk_m, fit.trunk),
            foot_m,
            ankle_height_m: or(l.ankle_height_m, fit.malleolus),
            heel_to_ankle_m: l.heel_to_ankle_m.unwrap_or(tables::HEEL_TO_ANKLE * foot_m),
            upper_arm_m: or(l.upper_arm_m, fit.upper_arm),
            forearm_m: or(l.forearm_m, fit.forearm),
            hand_m: or(l.hand_m, fit.hand),
        }
    }

    /// Floor to acromion standing upright, as the lengths add up, m.
    #[must_use]
    pub fn acromion_height_m(&self) -> f64 {
        self.ankle_height_m + self.shank_m + self.thigh_m + self.trunk_m
    }
}

/// Lengths between joint centres (m), masses (kg) and their places.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub struct Body {
    /// Which tables.
    pub sex: Sex,
    /// Age used for strength and support edges, years.
    pub age_years: f64,
    /// Standing height, m.
    pub stature_m: f64,
    /// Body mass, kg.
    pub mass_kg: f64,
    /// Landmark lengths it was built from.
    pub landmarks: Landmarks,
    /// Ankle to knee, m.
    pub shank_m: f64,
    /// Knee to hip, m.
    pub thigh_m: f64,
    /// Hip centre to shoulder centre, m.
    pub trunk_m: f64,
    /// Hip centre to lumbosacral joint, m.
    pub lumbosacral_m: f64,
    /// Shoulder centre to the head's centre of mass, m.
    pub head_m: f64,
    /// Shoulder centre to elbow, m.
    pub upper_arm_m: f64,
    /// Elbow to wrist, m.
    pub forearm_m: f64,
    /// Wrist to fingertip, m.
    pub hand_m: f64,
    /// Heel to toe, m.
    pub foot_m: f64,
    /// Ankle above the sole, m.
    pub ankle_height_m: f64,
    /// Ankle from the heel along the foot, m.
    pub heel_to_ankle_m: f64,
    /// Ball from the heel along the foot, m.
    pub heel_to_ball_m: f64,
    /// Hip centre from the midline, m.
    pub hip_half_m: f64,
    /// Segment masses.
    pub masses: Masses,
    /// Fractions of the table in use.
    pub segments: &'static Segments,
}

impl Body {
    /// From measured or estimated lengths. `Case::new` checks the bounds first.
    #[must_use]
    pub fn new(m: &Measures) -> Self {
        let landmarks = Landmarks::of(m);
        let below = tables::SHOULDER_CENTRE_BELOW_ACROMION * landmarks.upper_arm_m;
        let trunk_m = landmarks.trunk_m - below;
        let segments = tables::segments(m.table, m.sex);
        Self {
            sex: m.sex,
            age_years: m.age_years.unwrap_or(30.0),
            stature_m: m.stature_m,
            mass_kg: m.mass_kg,
            landmarks,
            shank_m: landmarks.shank_m,
            thigh_m: landmarks.thigh_m,
            trunk_m,
            lumbosacral_m: tables::lumbosacral_height(m.sex) * trunk_m,
            head_m: segments.head.cm * m.stature_m,
            upper_arm_m: landmarks.upper_arm_m - below,
            forearm_m: landmarks.forearm_m,
            hand_m: landmarks.hand_m,
            foot_m: landmarks.foot_m,
            ankle_height_m: landmarks.ankle_height_m,
            heel_to_ankle_m: landmarks.heel_to_ankle_m,
            heel_to_ball_m: tables::HEEL_TO_BALL * landmarks.foot_m,
            hip_half_m: tables::HIP_HALF_SPACING * m.stature_m,
            masses: Masses::scaled(segments, m.mass_kg),
            segments,
        }
    }
}
