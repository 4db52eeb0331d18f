//! What was measured of a client, in SI units and radians; absent means not measured.

use crate::{angle::Angle, tables::SegmentTable};

/// Which mass, capacity and population table applies.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Sex {
    /// Tables of women.
    Female,
    /// Tables of men.
    Male,
}

/// One value for each joint that works in a squat.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct PerJoint<T> {
    /// Ankle (plantar flexors).
    pub ankle: T,
    /// Knee (extensors).
    pub knee: T,
    /// Hip (extensors).
    pub hip: T,
    /// Lumbosacral joint (back extensors).
    pub low_back: T,
}

impl<T> PerJoint<T> {
    /// The same for every joint through a function.
    pub fn map<U>(self, f: impl Fn(T) -> U) -> PerJoint<U> {
        PerJoint { ankle: f(self.ankle), knee: f(self.knee), hip: f(self.hip), low_back: f(self.low_back) }
    }
}

/// Circumstances in which part of the results is withheld or a caution is due.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Scope {
    /// Under 18 years.
    Under18,
    /// Pregnant.
    Pregnant,
    /// Body-mass index of 30 or more.
    HighBmi,
    /// A limb differs or is missing.
    LimbDifference,
    /// Surgery not long ago.
    RecentSurgery,
    /// Osteoporosis.
    Osteoporosis,
}

impl Scope {
    /// Every circumstance, in the order asked.
    pub const ALL: [Self; 6] =
        [Self::Under18, Self::Pregnant, Self::HighBmi, Self::LimbDifference, Self::RecentSurgery, Self::Osteoporosis];
}

/// Landmark lengths in metres, as palpated; `None` is estimated from stature.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Lengths {
    /// Lateral malleolus to lateral femoral epicondyle, m.
    pub shank_m: Option<f64>,
    /// Lateral femoral epicondyle to greater trochanter, m.
    pub thigh_m: Option<f64>,
    /// Greater trochanter to acromion, m.
    pub trunk_m: Option<f64>,
    /// Heel to longest toe, m.
    pub foot_m: Option<f64>,
    /// Lateral malleolus above the floor, m.
    pub ankle_height_m: Option<f64>,
    /// Back of the heel to the malleolus along the foot, m.
    pub heel_to_ankle_m: Option<f64>,
    /// Acromion to elbow crease, m.
    pub upper_arm_m: Option<f64>,
    /// Elbow crease to wrist, m.
    pub forearm_m: Option<f64>,
    /// Wrist to fingertip, m.
    pub hand_m: Option<f64>,
}

/// A value of the left and of the right side; either may be missing.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Sides<T> {
    /// Left.
    pub left: Option<T>,
    /// Right.
    pub right: Option<T>,
}

impl<T: Copy + PartialOrd> Sides<T> {
    /// The lesser side, which a squat on both legs uses.
    pub fn lesser(&self) -> Option<T> {
        match (self.left, self.right) {
            (Some(l), Some(r)) => Some(if r < l { r } else { l }),
            (one, other) => one.or(other),
        }
    }
}

/// How ankle dorsiflexion was measured.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum AnkleRange {
    /// Toe to wall with the heel down, m.
    KneeToWall(Sides<f64>),
    /// Weight-bearing dorsiflexion.
    Degrees(Sides<Angle>),
    /// Not measured.
    NotMeasured,
}

/// How hip flexion was measured.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum HipRange {
    /// Pelvis held still.
    PelvisHeld(Sides<Angle>),
    /// On hands and knees, rocking back until the back starts to bend.
    RockBack(Sides<Angle>),
    /// Knee to chest, pelvis free to roll.
    KneeToChest(Sides<Angle>),
    /// Not measured.
    NotMeasured,
}

/// How knee flexion was measured.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum KneeRange {
    /// Flexion.
    Degrees(Sides<Angle>),
    /// Not measured.
    NotMeasured,
}

/// Precautions: never exceeded, never lifted.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Caps {
    /// Most knee flexion allowed.
    pub knee: Option<Angle>,
    /// Most hip flexion allowed.
    pub hip: Option<Angle>,
    /// Most load allowed, kg.
    pub load_kg: Option<f64>,
}

/// Everything measured of one client at one visit.
#[derive(Clone, Debug, PartialEq)]
pub struct Measures {
    /// Which tables apply.
    pub sex: Sex,
    /// Age in years.
    pub age_years: Option<f64>,
    /// Standing height, m.
    pub stature_m: f64,
    /// Body mass, kg.
    pub mass_kg: f64,
    /// Circumstances.
    pub scope: Vec<Scope>,
    /// Landmark lengths.
    pub lengths: Lengths,
    /// Ankle range.
    pub ankle: AnkleRange,
    /// Hip range.
    pub hip: HipRange,
    /// Knee range.
    pub knee: KneeRange,
    /// How far the arms go up, from hanging at the sides through the front: 180° is in line with the trunk.
    pub reach_limit: Angle,
    /// Precautions.
    pub caps: Caps,
    /// Which segment-inertia table.
    pub table: SegmentTable,
    /// The client's strength against a typical untrained adult.
    pub strength: PerJoint<f64>,
}
