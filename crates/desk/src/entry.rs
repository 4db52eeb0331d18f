//! Every number a person can enter, as one place in the document with its bounds.

use plumbfold_core::{
    bounds::{Bounds, Field, bounds},
    measures::Sides,
};
use plumbfold_records::{Ankle, Bend, Hip, Knee, Rule, Seen};

use crate::document::Document;

/// Left or right.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Side {
    /// Left.
    Left,
    /// Right.
    Right,
}

/// A number of the document.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Entry {
    /// Standing height.
    Stature,
    /// Body mass.
    Mass,
    /// Age.
    Age,
    /// Shank length.
    Shank,
    /// Thigh length.
    Thigh,
    /// Trunk length.
    Trunk,
    /// Foot length.
    Foot,
    /// Ankle height.
    AnkleHeight,
    /// Heel to ankle.
    HeelToAnkle,
    /// Upper arm length.
    UpperArm,
    /// Forearm length.
    Forearm,
    /// Hand length.
    Hand,
    /// Ankle range of a side, by the way of measuring chosen.
    Ankle(Side),
    /// Hip range of a side, by the way of measuring chosen.
    Hip(Side),
    /// Knee range of a side.
    Knee(Side),
    /// Arm reach limit.
    Reach,
    /// Knee precaution.
    CapKnee,
    /// Hip precaution.
    CapHip,
    /// Load precaution.
    CapLoad,
    /// Load.
    Load,
    /// Footwear drop.
    Footwear,
    /// Wedge.
    HeelRaise,
    /// Stance width.
    Stance,
    /// Toe-out.
    ToeOut,
    /// Bend chosen in degrees.
    Bend,
    /// Lean chosen.
    Lean,
    /// Goal.
    Goal,
    /// Weight on the left leg.
    WeightLeft,
    /// Slope of the usual shank.
    Slope,
    /// Arms ratio.
    Ratio,
    /// Held shank.
    HeldShank,
    /// Seen thigh angle.
    SeenThigh,
    /// Seen shank angle.
    SeenShank,
    /// Seen trunk lean.
    SeenTrunk,
    /// Pain, 0 to 10.
    SeenPain,
    /// Thigh angle where pain starts.
    PainFrom,
    /// Thigh angle reached with this set-up.
    FeltDepth,
    /// Pain with this set-up.
    FeltPain,
}

fn side<T: Copy>(s: &Sides<T>, side: Side) -> Option<T> {
    match side {
        Side::Left => s.left,
        Side::Right => s.right,
    }
}

fn put<T>(s: &mut Sides<T>, side: Side, value: Option<T>) {
    match side {
        Side::Left => s.left = value,
        Side::Right => s.right = value,
    }
}

impl Entry {
    /// Its row in the bounds table.
    #[must_use]
    pub fn bounds(self, d: &Document) -> &'static Bounds {
        bounds(match self {
            Self::Stature => Field::Stature,
            Self::Mass => Field::Mass,
            Self::Age => Field::Age,
            Self::Shank => Field::Shank,
            Self::Thigh => Field::Thigh,
            Self::Trunk => Field::Trunk,
            Self::Foot => Field::Foot,
            Self::AnkleHeight => Field::AnkleHeight,
            Self::HeelToAnkle => Field::HeelToAnkle,
            Self::UpperArm => Field::UpperArm,
            Self::Forearm => Field::Forearm,
            Self::Hand => Field::Hand,
            Self::Ankle(_) if matches!(d.visit().joints.ankle, Ankle::Degrees(_)) => Field::AnkleRange,
            Self::Ankle(_) => Field::KneeToWall,
            Self::Hip(_) | Self::CapHip => Field::HipRange,
            Self::Knee(_) | Self::CapKnee => Field::KneeRange,
            Self::Reach => Field::Reach,
            Self::CapLoad | Self::Load => Field::Load,
            Self::Footwear => Field::Footwear,
            Self::HeelRaise => Field::HeelRaise,
            Self::Stance => Field::Stance,
            Self::ToeOut => Field::ToeOut,
            Self::Bend => Field::Bend,
            Self::Lean => Field::Lean,
            Self::Goal => Field::Goal,
            Self::WeightLeft => Field::WeightLeft,
            Self::Slope => Field::Slope,
            Self::Ratio => Field::Ratio,
            Self::HeldShank => Field::HeldShank,
            Self::SeenThigh | Self::PainFrom => Field::SeenThigh,
            Self::FeltDepth => Field::Goal,
            Self::SeenShank => Field::SeenShank,
            Self::SeenTrunk => Field::SeenTrunk,
            Self::SeenPain | Self::FeltPain => Field::Pain,
        })
    }

    /// Whether it may be left empty.
    #[must_use]
    pub const fn may_be_empty(self) -> bool {
        !matches!(
            self,
            Self::Stature
                | Self::Mass
                | Self::Reach
                | Self::Load
                | Self::Footwear
                | Self::HeelRaise
                | Self::ToeOut
                | Self::Bend
                | Self::Goal
                | Self::Ratio
                | Self::HeldShank
                | Self::SeenThigh
                | Self::SeenShank
                | Self::SeenTrunk
        )
    }

    /// The value as typed; `None` where empty.
    #[must_use]
    pub fn get(self, d: &Document) -> Option<f64> {
        let (v, t) = (d.visit(), d.task());
        let b = &v.build;
        match self {
            Self::Stature => Some(v.stature_cm),
            Self::Mass => Some(v.mass_kg),
            Self::Age => v.age_years,
            Self::Shank => b.shank_cm,
            Self::Thigh => b.thigh_cm,
            Self::Trunk => b.trunk_cm,
            Self::Foot => b.foot_cm,
            Self::AnkleHeight => b.ankle_height_cm,
            Self::HeelToAnkle => b.heel_to_ankle_cm,
            Self::UpperArm => b.upper_arm_cm,
            Self::Forearm => b.forearm_cm,
            Self::Hand => b.hand_cm,
            Self::Ankle(at) => match &v.joints.ankle {
                Ankle::KneeToWall(s) | Ankle::Degrees(s) => side(s, at),
                Ankle::NotMeasured => None,
            },
            Self::Hip(at) => match &v.joints.hip {
                Hip::PelvisHeld(s) | Hip::RockBack(s) | Hip::KneeToChest(s) => side(s, at),
                Hip::NotMeasured => None,
            },
            Self::Knee(at) => match &v.joints.knee {
                Knee::Degrees(s) => side(s, at),
                Knee::NotMeasured => None,
            },
            Self::Reach => Some(v.joints.reach_limit_deg),
            Self::CapKnee => v.caps.knee_deg,
            Self::CapHip => v.caps.hip_deg,
            Self::CapLoad => v.caps.load_kg,
            Self::Load => Some(t.load_kg),
            Self::Footwear => Some(t.footwear_drop_mm),
            Self::HeelRaise => Some(t.heel_raise_mm),
            Self::Stance => t.stance_width_cm,
            Self::ToeOut => Some(t.toe_out_deg),
            Self::Bend => Some(bend_deg(t.bend)),
            Self::Lean => t.lean_limit_deg,
            Self::Goal => Some(t.goal_thigh_deg),
            Self::WeightLeft => t.weight_left_percent,
            Self::Slope => match t.rule {
                Rule::Usual { slope } => slope,
                _ => None,
            },
            Self::Ratio => match t.rule {
                Rule::ArmRatio(r) => Some(r),
                _ => None,
            },
            Self::HeldShank => match t.rule {
                Rule::HeldShank(a) => Some(a),
                _ => None,
            },
            Self::SeenThigh => t.seen.map(|s| s.thigh_deg),
            Self::SeenShank => t.seen.map(|s| s.shank_deg),
            Self::SeenTrunk => t.seen.map(|s| s.trunk_deg),
            Self::SeenPain => t.seen.and_then(|s| s.pain_0_10),
            Self::PainFrom => t.seen.and_then(|s| s.pain_from_thigh_deg),
            Self::FeltDepth => t.felt.and_then(|f| f.depth_thigh_deg),
            Self::FeltPain => t.felt.and_then(|f| f.pain_0_10),
        }
    }

    /// Puts a value in place. An empty required entry stays as it was. A value for a range that was
    /// not measured, or for a squat that was not seen, brings it about.
    pub fn put(self, d: &mut Document, value: Option<f64>) {
        if value.is_none() && !self.may_be_empty() {
            return;
        }
        match self {
            Self::Shank
            | Self::Thigh
            | Self::Trunk
            | Self::Foot
            | Self::AnkleHeight
            | Self::HeelToAnkle
            | Self::UpperArm
            | Self::Forearm
            | Self::Hand => {
                let b = &mut d.visit_mut().build;
                *match self {
                    Self::Shank => &mut b.shank_cm,
                    Self::Thigh => &mut b.thigh_cm,
                    Self::Trunk => &mut b.trunk_cm,
                    Self::Foot => &mut b.foot_cm,
                    Self::AnkleHeight => &mut b.ankle_height_cm,
                    Self::HeelToAnkle => &mut b.heel_to_ankle_cm,
                    Self::UpperArm => &mut b.upper_arm_cm,
                    Self::Forearm => &mut b.forearm_cm,
                    _ => &mut b.hand_cm,
                } = value;
            }
            Self::Age => d.visit_mut().age_years = value,
            Self::Stature => put_some(&mut d.visit_mut().stature_cm, value),
            Self::Mass => put_some(&mut d.visit_mut().mass_kg, value),
            Self::Reach => put_some(&mut d.visit_mut().joints.reach_limit_deg, value),
            Self::Ankle(at) => put_ankle(&mut d.visit_mut().joints.ankle, at, value),
            Self::Hip(at) => put_hip(&mut d.visit_mut().joints.hip, at, value),
            Self::Knee(at) => put_knee(&mut d.visit_mut().joints.knee, at, value),
            Self::CapKnee => d.visit_mut().caps.knee_deg = value,
            Self::CapHip => d.visit_mut().caps.hip_deg = value,
            Self::CapLoad => d.visit_mut().caps.load_kg = value,
            Self::Load => put_some(&mut d.task_mut().load_kg, value),
            Self::Footwear => put_some(&mut d.task_mut().footwear_drop_mm, value),
            Self::HeelRaise => put_some(&mut d.task_mut().heel_raise_mm, value),
            Self::Stance => d.task_mut().stance_width_cm = value,
            Self::ToeOut => put_some(&mut d.task_mut().toe_out_deg, value),
            Self::Bend => d.task_mut().bend = value.map_or(d.task().bend, Bend::Degrees),
            Self::Lean => d.task_mut().lean_limit_deg = value,
            Self::Goal => put_some(&mut d.task_mut().goal_thigh_deg, value),
            Self::WeightLeft => d.task_mut().weight_left_percent = value,
            Self::Slope => d.task_mut().rule = Rule::Usual { slope: value },
            Self::Ratio => d.task_mut().rule = value.map_or(d.task().rule, Rule::ArmRatio),
            Self::HeldShank => d.task_mut().rule = value.map_or(d.task().rule, Rule::HeldShank),
            Self::FeltDepth | Self::FeltPain => {
                // says nothing before it is known how it felt
                if let Some(felt) = &mut d.task_mut().felt {
                    match self {
                        Self::FeltDepth => felt.depth_thigh_deg = value,
                        _ => felt.pain_0_10 = value,
                    }
                }
            }
            Self::SeenThigh | Self::SeenShank | Self::SeenTrunk | Self::SeenPain | Self::PainFrom => {
                let seen = d.task_mut().seen.get_or_insert(UNSEEN);
                match self {
                    Self::SeenThigh => put_some(&mut seen.thigh_deg, value),
                    Self::SeenShank => put_some(&mut seen.shank_deg, value),
                    Self::SeenTrunk => put_some(&mut seen.trunk_deg, value),
                    Self::SeenPain => seen.pain_0_10 = value,
                    _ => seen.pain_from_thigh_deg = value,
                }
            }
        }
    }
}

/// Where a seen squat starts to be described when one of its numbers is typed first.
pub const UNSEEN: Seen = Seen {
    thigh_deg: 60.0,
    shank_deg: 20.0,
    trunk_deg: 40.0,
    heels_lifted: false,
    pain_0_10: None,
    pain_from_thigh_deg: None,
    stopped_by: None,
    pain_at: None,
};

/// A bend choice in degrees.
#[must_use]
pub fn bend_deg(bend: Bend) -> f64 {
    match bend {
        Bend::KeepSmall => plumbfold_core::Bend::KeepSmall.available().deg(),
        Bend::KeepSome => plumbfold_core::Bend::KeepSome.available().deg(),
        Bend::Free => plumbfold_core::Bend::Free.available().deg(),
        Bend::Degrees(deg) => deg,
    }
}

fn put_some(place: &mut f64, value: Option<f64>) {
    if let Some(v) = value {
        *place = v;
    }
}

fn put_ankle(ankle: &mut Ankle, at: Side, value: Option<f64>) {
    if value.is_some() && matches!(ankle, Ankle::NotMeasured) {
        *ankle = Ankle::KneeToWall(Sides::default());
    }
    if let Ankle::KneeToWall(s) | Ankle::Degrees(s) = ankle {
        put(s, at, value);
        if s.left.is_none() && s.right.is_none() {
            *ankle = Ankle::NotMeasured;
        }
    }
}

fn put_hip(hip: &mut Hip, at: Side, value: Option<f64>) {
    if value.is_some() && matches!(hip, Hip::NotMeasured) {
        *hip = Hip::PelvisHeld(Sides::default());
    }
    if let Hip::PelvisHeld(s) | Hip::RockBack(s) | Hip::KneeToChest(s) = hip {
        put(s, at, value);
        if s.left.is_none() && s.right.is_none() {
            *hip = Hip::NotMeasured;
        }
    }
}

fn put_knee(knee: &mut Knee, at: Side, value: Option<f64>) {
    if value.is_some() && matches!(knee, Knee::NotMeasured) {
        *knee = Knee::Degrees(Sides::default());
    }
    if let Knee::Degrees(s) = knee {
        put(s, at, value);
        if s.left.is_none() && s.right.is_none() {
            *knee = Knee::NotMeasured;
        }
    }
}
