//! What the client is asked to do: set-up, goal and the rule that picks a posture.

use crate::angle::Angle;

/// Where arms and load are.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Placement {
    /// Arms crossed on the chest.
    ArmsCrossed,
    /// Arms held level in front.
    ArmsForward,
    /// Arms hanging.
    AtSides,
    /// Bar on the upper back.
    HighBar,
    /// Bar below the spine of the scapula.
    LowBar,
    /// Bar on the front of the shoulders.
    FrontRack,
    /// Weight held at the chest.
    Goblet,
    /// Arms overhead.
    Overhead,
}

impl Placement {
    /// Every placement.
    pub const ALL: [Self; 8] = [
        Self::ArmsCrossed,
        Self::ArmsForward,
        Self::AtSides,
        Self::HighBar,
        Self::LowBar,
        Self::FrontRack,
        Self::Goblet,
        Self::Overhead,
    ];

    /// The name used in client files and machine-readable output.
    #[must_use]
    pub const fn key(self) -> &'static str {
        match self {
            Self::ArmsCrossed => "ArmsCrossed",
            Self::ArmsForward => "ArmsForward",
            Self::AtSides => "AtSides",
            Self::HighBar => "HighBar",
            Self::LowBar => "LowBar",
            Self::FrontRack => "FrontRack",
            Self::Goblet => "Goblet",
            Self::Overhead => "Overhead",
        }
    }
}

/// How much bend beyond the hip (pelvis and low back together) we allow.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Bend {
    /// 15°.
    KeepSmall,
    /// 30°.
    KeepSome,
    /// 45°.
    Free,
    /// As chosen.
    Degrees(Angle),
}

impl Bend {
    /// The bend available. The three steps are ours (assumed).
    #[must_use]
    pub const fn available(self) -> Angle {
        match self {
            Self::KeepSmall => Angle::from_deg(15.0),
            Self::KeepSome => Angle::from_deg(30.0),
            Self::Free => Angle::from_deg(45.0),
            Self::Degrees(a) => a,
        }
    }
}

/// Which of the balanced postures at a depth is shown.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Rule {
    /// Nearest to a usual shank angle; the slope is the client's own where given or seen.
    Usual {
        /// Shank lean gained per degree of thigh.
        slope: Option<f64>,
    },
    /// Least sum of squared efforts.
    LeastEffort,
    /// Hip arm to knee arm nearest to this ratio.
    ArmRatio(f64),
    /// This shank angle at every depth.
    HeldShank(Angle),
}

/// Fractions of the foot from the heel, in rising order; `None` follows age.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Support {
    /// Rear edge of support.
    pub edge_back: Option<f64>,
    /// Rear end of the mid-foot zone.
    pub zone_back: f64,
    /// Where the centre of mass is aimed.
    pub aim: f64,
    /// Front end of the mid-foot zone.
    pub zone_front: f64,
    /// Front edge of support.
    pub edge_front: Option<f64>,
}

impl Default for Support {
    /// Zone 0.40–0.60, aim 0.50: Ishida 2022, J Sports Sci Med 21:341–346 (read).
    fn default() -> Self {
        Self { edge_back: None, zone_back: 0.40, aim: 0.50, zone_front: 0.60, edge_front: None }
    }
}

/// The squat that was seen, at its lowest point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Seen {
    /// Thigh angle.
    pub thigh: Angle,
    /// Shank angle.
    pub shank: Angle,
    /// Trunk lean.
    pub trunk: Angle,
}

/// One set-up of the squat.
#[derive(Clone, Debug, PartialEq)]
pub struct Task {
    /// Arms and load.
    pub placement: Placement,
    /// Load, kg.
    pub load_kg: f64,
    /// Heel of the shoe above its ball, m.
    pub footwear_drop_m: f64,
    /// Wedge under the heel, m.
    pub heel_raise_m: f64,
    /// Between the ankle centres, m; `None`: under the hips.
    pub stance_m: Option<f64>,
    /// Feet turned out, each.
    pub toe_out: Angle,
    /// Bend beyond the hip.
    pub bend: Bend,
    /// Lean chosen to stay within.
    pub lean_limit: Option<Angle>,
    /// Thigh angle to reach.
    pub goal: Angle,
    /// Share of weight on the left leg, 0 to 1.
    pub weight_left: Option<f64>,
    /// Which posture is shown.
    pub rule: Rule,
    /// What was seen.
    pub seen: Option<Seen>,
    /// Zone and edges.
    pub support: Support,
}
