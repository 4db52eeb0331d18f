//! Tasks and the seen squat, exactly as typed.

pub use plumbfold_core::task::Support;
use plumbfold_core::{
    bounds::{Field, bounds},
    task::Placement,
};

/// One set-up of the squat.
#[derive(Clone, Debug, PartialEq)]
pub struct Task {
    /// Its name, different from that of every other task of the visit.
    pub name: String,
    /// Where arms and load are.
    pub placement: Placement,
    /// Load, kg.
    pub load_kg: f64,
    /// Heel of the shoe above its ball, mm.
    pub footwear_drop_mm: f64,
    /// Wedge or plate under the heels, mm.
    pub heel_raise_mm: f64,
    /// Between the ankle centres, cm; `None`: under the hips.
    pub stance_width_cm: Option<f64>,
    /// Feet turned out, each, degrees.
    pub toe_out_deg: f64,
    /// Bend beyond the hip that we allow.
    pub bend: Bend,
    /// Trunk lean we choose to stay within, degrees.
    pub lean_limit_deg: Option<f64>,
    /// Thigh angle to reach, degrees.
    pub goal_thigh_deg: f64,
    /// Share of the weight on the left leg, per cent.
    pub weight_left_percent: Option<f64>,
    /// Which balanced posture is shown.
    pub rule: Rule,
    /// The squat that was seen.
    pub seen: Option<Seen>,
    /// How this set-up felt when the client tried it.
    pub felt: Option<Felt>,
    /// Mid-foot zone and support edges, fractions of the foot from the heel.
    pub support: Support,
}

impl Task {
    /// A squat with the arms forward, without load, flat, under the hips, thigh level as its goal.
    #[must_use]
    pub fn new(name: impl Into<String>) -> Self {
        Self {
            name: name.into(),
            placement: Placement::ArmsForward,
            load_kg: 0.0,
            footwear_drop_mm: 0.0,
            heel_raise_mm: 0.0,
            stance_width_cm: None,
            toe_out_deg: 0.0,
            bend: Bend::Free,
            lean_limit_deg: None,
            goal_thigh_deg: bounds(Field::Goal).default,
            weight_left_percent: None,
            rule: Rule::default(),
            seen: None,
            felt: None,
            support: Support::default(),
        }
    }
}

/// How much bend beyond the hip we allow.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Bend {
    /// Small, 15°.
    KeepSmall,
    /// Some, 30°.
    KeepSome,
    /// Free, 45°.
    Free,
    /// As chosen, degrees.
    Degrees(f64),
}

/// Which of the balanced postures at a depth is shown.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Rule {
    /// Nearest to a usual shank angle.
    Usual {
        /// Shank lean gained per degree of thigh; `None`: from what was seen, else the usual one.
        slope: Option<f64>,
    },
    /// Least sum of squared efforts.
    LeastEffort,
    /// Hip arm to knee arm nearest to this ratio.
    ArmRatio(f64),
    /// This shank angle at every depth, degrees.
    HeldShank(f64),
}

impl Default for Rule {
    fn default() -> Self {
        Self::Usual { slope: None }
    }
}

/// The squat that was seen, at its lowest point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Seen {
    /// Thigh angle, degrees.
    pub thigh_deg: f64,
    /// Shank angle, degrees.
    pub shank_deg: f64,
    /// Trunk lean, degrees.
    pub trunk_deg: f64,
    /// Whether the heels came off the floor.
    pub heels_lifted: bool,
    /// Pain as the client rates it.
    pub pain_0_10: Option<f64>,
    /// Thigh angle at which pain starts, degrees.
    pub pain_from_thigh_deg: Option<f64>,
    /// Which joint hurts.
    pub pain_at: Option<PainAt>,
    /// What ended the descent.
    pub stopped_by: Option<StoppedBy>,
}

/// Which joint hurts.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum PainAt {
    /// Ankle.
    Ankle,
    /// Knee.
    Knee,
    /// Hip.
    Hip,
    /// Low back.
    LowBack,
}

impl PainAt {
    /// Every joint, from the floor up.
    pub const ALL: [Self; 4] = [Self::Ankle, Self::Knee, Self::Hip, Self::LowBack];
}

/// What ended the descent.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum StoppedBy {
    /// Pain.
    Pain,
    /// Effort.
    Effort,
    /// Balance.
    Balance,
    /// Stiffness.
    Stiffness,
    /// Confidence.
    Confidence,
    /// We asked to stop.
    Instruction,
}

impl StoppedBy {
    /// Every reason, in the order asked.
    pub const ALL: [Self; 6] =
        [Self::Pain, Self::Effort, Self::Balance, Self::Stiffness, Self::Confidence, Self::Instruction];
}

/// How a change that was tried felt to the client.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Felt {
    /// Against the squat before the change.
    pub compared: Compared,
    /// Thigh angle reached with it, degrees.
    pub depth_thigh_deg: Option<f64>,
    /// Pain with it as the client rates it.
    pub pain_0_10: Option<f64>,
}

/// How a squat with a change felt against the one without it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Compared {
    /// Easier.
    Easier,
    /// The same.
    Same,
    /// Harder.
    Harder,
}

impl Compared {
    /// Every answer, in the order asked.
    pub const ALL: [Self; 3] = [Self::Easier, Self::Same, Self::Harder];
}
