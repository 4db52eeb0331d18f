//! Numbers the model stands on, each with its source and status.
//!
//! Status: *read* in a published table; *derived* from read data; *memory*: from memory, to be
//! re-checked; *assumed*: our choice.

use crate::{measures::Sex, task::Placement};

/// Standard gravity, m/s² (exact by definition, 3rd CGPM 1901; read).
pub const GRAVITY: f64 = 9.806_65;

/// Shoulder centre below the acromion, fraction of the upper arm. de Leva 1996, J Biomech 29:1231–1233 (memory).
pub const SHOULDER_CENTRE_BELOW_ACROMION: f64 = 0.104;

/// Ankle centre from the back of the heel, fraction of the foot; sources disagree, 0.17–0.25: measure it (assumed).
pub const HEEL_TO_ANKLE: f64 = 0.25;

/// Ball of the foot from the back of the heel, fraction of the foot. ANSUR II: .741 ± .015 men, .739 ± .013 women (derived).
pub const HEEL_TO_BALL: f64 = 0.74;

/// Hip centre from the midline, fraction of stature (memory).
pub const HIP_HALF_SPACING: f64 = 0.0485;

/// Front of the knee ahead of the knee axis, fraction of stature (assumed).
pub const KNEE_FRONT: f64 = 0.03;

/// Load in the hand beyond the wrist, fraction of the hand (assumed).
pub const GRIP: f64 = 0.46;

/// Hip centre above the seat, m, ± 0.02 (assumed).
pub const HIP_ABOVE_SEAT_M: f64 = 0.09;

/// Usual shank angle standing, degrees (assumed; checked against Sato 2013).
pub const USUAL_SHANK_AT_STANDING_DEG: f64 = 6.0;

/// Usual shank lean gained per degree of thigh (assumed; checked against Sato 2013).
pub const USUAL_SHANK_PER_THIGH: f64 = 0.33;

/// Lumbosacral joint above the hip centre, fraction of hip–shoulder length. Reed, Manary and
/// Schneider 1999 (SAE 1999-01-0959) with Dumas 2007 pelvis widths (derived).
#[must_use]
pub const fn lumbosacral_height(sex: Sex) -> f64 {
    match sex {
        Sex::Male => 0.18,
        Sex::Female => 0.22,
    }
}

/// Degrees that the pelvis rolls in a knee-to-chest test. "The influence of pelvic rotation on
/// clinical measurements of hip flexion and extension range of motion across sex and age",
/// abstract: 110.8 → 93.8° men, 121.3 → 107.3° women (read).
#[must_use]
pub const fn knee_to_chest_less_deg(sex: Sex) -> f64 {
    match sex {
        Sex::Male => 17.0,
        Sex::Female => 14.0,
    }
}

/// Hip flexion, femur on pelvis, where it was not measured, degrees. Same source; deepest squats
/// show 95–101° (Hemmerich 2006, Hyodo 2017) (derived).
#[must_use]
pub const fn hip_default_deg(sex: Sex) -> f64 {
    match sex {
        Sex::Male => 95.0,
        Sex::Female => 107.0,
    }
}

/// Knee to wall where it was not measured, m (assumed).
pub const KNEE_TO_WALL_DEFAULT_M: f64 = 0.10;

/// Knee flexion where it was not measured, degrees (assumed).
pub const KNEE_DEFAULT_DEG: f64 = 140.0;

/// Which segment-inertia table.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub enum SegmentTable {
    /// de Leva 1996, J Biomech 29:1223–1230, Table 4 (read).
    #[default]
    DeLeva,
    /// Dempster's values in Winter 2009, Table 4.1 (read; hand and pelvis from memory).
    DempsterWinter,
    /// Dumas 2007, J Biomech 40:543–553, Table 3 (read).
    Dumas,
}

impl SegmentTable {
    /// Every table.
    pub const ALL: [Self; 3] = [Self::DeLeva, Self::DempsterWinter, Self::Dumas];
}

/// Mass as a fraction of body mass, centre of mass and radius of gyration as fractions of the
/// segment's reference length (about the mediolateral axis).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Inertia {
    /// Fraction of body mass (one side).
    pub mass: f64,
    /// Centre of mass, fraction from the near end (head: of stature above the shoulder centre).
    pub cm: f64,
    /// Radius of gyration (head: of stature).
    pub rg: f64,
}

/// Inertia of all segments; limbs count twice.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Segments {
    /// Pelvis, from the hip centre.
    pub pelvis: Inertia,
    /// Thorax and abdomen, from the hip centre.
    pub thorax: Inertia,
    /// Head and neck, beyond the shoulder centre.
    pub head: Inertia,
    /// Thigh, from the hip.
    pub thigh: Inertia,
    /// Shank, from the knee.
    pub shank: Inertia,
    /// Foot, from the heel.
    pub foot: Inertia,
    /// Upper arm, from the shoulder centre.
    pub upper_arm: Inertia,
    /// Forearm, from the elbow.
    pub forearm: Inertia,
    /// Hand, from the wrist.
    pub hand: Inertia,
}

const fn i(mass: f64, cm: f64, rg: f64) -> Inertia {
    Inertia { mass, cm, rg }
}

/// de Leva 1996, Table 4, men; trunk parts brought to hip–shoulder length (515.5 mm) (read, derived).
pub const DE_LEVA_MEN: Segments = Segments {
    pelvis: i(0.1117, 0.1098, 0.1557),
    thorax: i(0.3229, 0.7278, 0.2612),
    head: i(0.0694, 0.1202, 0.0439),
    thigh: i(0.1416, 0.4095, 0.329),
    shank: i(0.0433, 0.4459, 0.249),
    foot: i(0.0137, 0.4415, 0.245),
    upper_arm: i(0.0271, 0.5772, 0.269),
    forearm: i(0.0162, 0.4574, 0.265),
    hand: i(0.0061, 0.3691, 0.233),
};

/// de Leva 1996, Table 4, women; trunk parts brought to hip–shoulder length (497.9 mm) (read, derived).
pub const DE_LEVA_WOMEN: Segments = Segments {
    pelvis: i(0.1247, 0.1852, 0.1465),
    thorax: i(0.301, 0.8027, 0.2521),
    head: i(0.0668, 0.1398, 0.0414),
    thigh: i(0.1478, 0.3612, 0.364),
    shank: i(0.0481, 0.4416, 0.267),
    foot: i(0.0129, 0.4014, 0.279),
    upper_arm: i(0.0255, 0.5754, 0.26),
    forearm: i(0.0138, 0.4559, 0.257),
    hand: i(0.0056, 0.3502, 0.206),
};

/// Winter 2009, Table 4.1 (Dempster), brought to our endpoints; the same for both sexes (read; hand and pelvis from memory).
pub const DEMPSTER_WINTER: Segments = Segments {
    pelvis: i(0.142, 0.161, 0.16),
    thorax: i(0.355, 0.6356, 0.26),
    head: i(0.081, 0.112, 0.044),
    thigh: i(0.1, 0.433, 0.323),
    shank: i(0.0465, 0.433, 0.302),
    foot: i(0.0145, 0.495, 0.233),
    upper_arm: i(0.028, 0.436, 0.322),
    forearm: i(0.016, 0.43, 0.303),
    hand: i(0.006, 0.37, 0.22),
};

/// Dumas 2007, Table 3, men, brought to our endpoints (read; trunk radii from memory).
pub const DUMAS_MEN: Segments = Segments {
    pelvis: i(0.142, 0.134, 0.177),
    thorax: i(0.333, 0.734, 0.264),
    head: i(0.067, 0.121, 0.047),
    thigh: i(0.123, 0.429, 0.3),
    shank: i(0.045, 0.41, 0.28),
    foot: i(0.012, 0.436, 0.25),
    upper_arm: i(0.024, 0.452, 0.32),
    forearm: i(0.017, 0.417, 0.27),
    hand: i(0.006, 0.357, 0.26),
};

/// Dumas 2007, Table 3, women, brought to our endpoints (read; trunk radii from memory).
pub const DUMAS_WOMEN: Segments = Segments {
    pelvis: i(0.146, 0.18, 0.185),
    thorax: i(0.304, 0.7636, 0.272),
    head: i(0.067, 0.139, 0.047),
    thigh: i(0.146, 0.377, 0.32),
    shank: i(0.045, 0.404, 0.28),
    foot: i(0.01, 0.443, 0.25),
    upper_arm: i(0.022, 0.454, 0.33),
    forearm: i(0.013, 0.411, 0.25),
    hand: i(0.005, 0.327, 0.25),
};

/// The segments of a table for a sex.
#[must_use]
pub const fn segments(table: SegmentTable, sex: Sex) -> &'static Segments {
    match (table, sex) {
        (SegmentTable::DeLeva, Sex::Male) => &DE_LEVA_MEN,
        (SegmentTable::DeLeva, Sex::Female) => &DE_LEVA_WOMEN,
        (SegmentTable::DempsterWinter, _) => &DEMPSTER_WINTER,
        (SegmentTable::Dumas, Sex::Male) => &DUMAS_MEN,
        (SegmentTable::Dumas, Sex::Female) => &DUMAS_WOMEN,
    }
}

/// Coefficients (a, b) of `length = exp(a + b ln stature)`, both in mm. ANSUR II (2012), public
/// working data base, 4,082 men and 1,986 women; log-normal fit, measuring-site offsets removed,
/// means kept; shank and thigh split ± 10 mm; serving adults 17–58 only (derived).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FromStature {
    /// Foot length.
    pub foot: (f64, f64),
    /// Shank.
    pub shank: (f64, f64),
    /// Thigh.
    pub thigh: (f64, f64),
    /// Trunk.
    pub trunk: (f64, f64),
    /// Upper arm.
    pub upper_arm: (f64, f64),
    /// Forearm.
    pub forearm: (f64, f64),
    /// Hand.
    pub hand: (f64, f64),
    /// Height of the lateral malleolus.
    pub malleolus: (f64, f64),
}

/// Fit for men.
pub const FROM_STATURE_MEN: FromStature = FromStature {
    foot: (-1.06613, 0.89258),
    shank: (-3.22822, 1.24011),
    thigh: (-2.78974, 1.17829),
    trunk: (-0.62162, 0.92516),
    upper_arm: (-2.15584, 1.06683),
    forearm: (-2.33646, 1.06094),
    hand: (-1.35268, 0.88559),
    malleolus: (-2.68768, 0.93356),
};

/// Fit for women.
pub const FROM_STATURE_WOMEN: FromStature = FromStature {
    foot: (-1.33892, 0.92556),
    shank: (-3.11832, 1.23278),
    thigh: (-2.27, 1.10983),
    trunk: (-0.72933, 0.93602),
    upper_arm: (-2.5291, 1.11811),
    forearm: (-2.6159, 1.09541),
    hand: (-1.52563, 0.90919),
    malleolus: (-2.60254, 0.91125),
};

/// The fit for a sex.
#[must_use]
pub const fn from_stature(sex: Sex) -> &'static FromStature {
    match sex {
        Sex::Male => &FROM_STATURE_MEN,
        Sex::Female => &FROM_STATURE_WOMEN,
    }
}

/// Where a load sits.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum LoadSite {
    /// In the hands.
    Hands,
    /// From the shoulder centre, fractions of stature: along the trunk line, forward of it.
    Trunk {
        /// Along the trunk line, upward.
        along: f64,
        /// Forward of the trunk line.
        forward: f64,
    },
}

/// How the arms are held.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ArmFrame {
    /// Directions ride with the trunk.
    Trunk,
    /// Directions keep to the vertical.
    World,
    /// Vertical, as far as the reach limit allows.
    Overhead,
}

/// Arm directions in degrees, forward positive, and the load's place.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hold {
    /// What the directions are measured from.
    pub frame: ArmFrame,
    /// Shoulder to elbow.
    pub upper_arm_deg: f64,
    /// Elbow to wrist and on.
    pub forearm_deg: f64,
    /// Place of the load.
    pub load: LoadSite,
}

/// The hold of a placement (assumed).
#[must_use]
pub const fn hold(placement: Placement) -> Hold {
    let (frame, upper_arm_deg, forearm_deg, load) = match placement {
        Placement::ArmsCrossed => (ArmFrame::Trunk, 150.0, 60.0, LoadSite::Hands),
        Placement::ArmsForward => (ArmFrame::World, 90.0, 90.0, LoadSite::Hands),
        Placement::AtSides => (ArmFrame::World, 180.0, 180.0, LoadSite::Hands),
        Placement::HighBar => (ArmFrame::Trunk, 190.0, 10.0, LoadSite::Trunk { along: 0.045, forward: -0.045 }),
        Placement::LowBar => (ArmFrame::Trunk, 200.0, 10.0, LoadSite::Trunk { along: 0.005, forward: -0.055 }),
        Placement::FrontRack => (ArmFrame::Trunk, 85.0, -60.0, LoadSite::Trunk { along: 0.03, forward: 0.05 }),
        Placement::Goblet => (ArmFrame::Trunk, 160.0, 50.0, LoadSite::Trunk { along: -0.06, forward: 0.14 }),
        Placement::Overhead => (ArmFrame::Overhead, 0.0, 0.0, LoadSite::Hands),
    };
    Hold { frame, upper_arm_deg, forearm_deg, load }
}

/// One row of the torque–angle fit: capacity `c1 · cos(c2 (θ − c3)) · mass · g · stature`, θ the
/// flexion in rad but at most `to_rad`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CapacityRow {
    /// Peak.
    pub c1: f64,
    /// Width.
    pub c2: f64,
    /// Angle of the peak, rad.
    pub c3: f64,
    /// End of the fitted range, rad.
    pub to_rad: f64,
}

/// Rows of three ages.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CapacityRows {
    /// Up to 25 years.
    pub young: CapacityRow,
    /// At 60 years.
    pub older: CapacityRow,
    /// From 70 years.
    pub eldest: CapacityRow,
}

/// Capacity of a typical untrained adult.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Capacity {
    /// Plantar flexors, one leg.
    pub ankle: CapacityRows,
    /// Knee extensors, one leg.
    pub knee: CapacityRows,
    /// Hip extensors, one leg.
    pub hip: CapacityRows,
    /// Back extensors: a constant fraction of mass · g · stature (memory).
    pub lumbosacral: f64,
}

const fn r(c1: f64, c2: f64, c3: f64, to_rad: f64) -> CapacityRow {
    CapacityRow { c1, c2, c3, to_rad }
}

/// Anderson, Madigan and Nussbaum 2007, J Biomech 40:3105–3113, Table 3, men (read; ankle rows
/// kept from rising with age: ours).
pub const CAPACITY_MEN: Capacity = Capacity {
    ankle: CapacityRows {
        young: r(0.095, 0.0, 0.0, f64::INFINITY),
        older: r(0.095, 0.0, 0.0, f64::INFINITY),
        eldest: r(0.095, 0.0, 0.0, f64::INFINITY),
    },
    knee: CapacityRows {
        young: r(0.163, 1.258, 1.133, 1.8),
        older: r(0.156, 1.225, 1.173, 1.8),
        eldest: r(0.137, 1.31, 1.067, 1.8),
    },
    hip: CapacityRows {
        young: r(0.161, 0.958, 0.932, 1.3),
        older: r(0.171, 0.922, 1.176, 1.3),
        eldest: r(0.144, 0.896, 1.125, 1.3),
    },
    lumbosacral: 0.18,
};

/// Anderson, Madigan and Nussbaum 2007, J Biomech 40:3105–3113, Table 3, women (read; ankle rows
/// kept from rising with age: ours).
pub const CAPACITY_WOMEN: Capacity = Capacity {
    ankle: CapacityRows {
        young: r(0.104, 0.0, 0.0, f64::INFINITY),
        older: r(0.093, 0.0, 0.0, f64::INFINITY),
        eldest: r(0.093, 0.0, 0.0, f64::INFINITY),
    },
    knee: CapacityRows {
        young: r(0.159, 1.187, 1.274, 1.8),
        older: r(0.128, 1.286, 1.141, 1.8),
        eldest: r(0.124, 1.347, 1.14, 1.8),
    },
    hip: CapacityRows {
        young: r(0.181, 0.697, 1.242, 1.3),
        older: r(0.14, 0.83, 1.241, 1.3),
        eldest: r(0.138, 0.707, 1.542, 1.3),
    },
    lumbosacral: 0.15,
};

/// The capacity rows of a sex.
#[must_use]
pub const fn capacity(sex: Sex) -> &'static Capacity {
    match sex {
        Sex::Male => &CAPACITY_MEN,
        Sex::Female => &CAPACITY_WOMEN,
    }
}
