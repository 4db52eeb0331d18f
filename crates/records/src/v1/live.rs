//! Between the structs of format 1 and the types the desk edits, both ways, nothing lost.
//!
//! Every struct is taken apart and put together by all its fields and every choice by all its words,
//! so that a field added on one side does not compile until it has its place on the other.

use plumbfold_core::{
    measures::{self, PerJoint, Sides},
    tables::SegmentTable,
    task as model,
};

use crate::{client, task};

use super::{
    Ankle, Build, Caps, Client, Format, Hip, Joints, Knee, Scope, Segments, SexModel, Strength, Visit,
    tasks::{Bend, Placement, Rule, Seen, StoppedBy, Support, Task},
};

/// A saved type and the type it stands for.
pub(crate) trait Saved: Sized {
    /// What the desk edits.
    type Live;
    /// From the file.
    fn live(self) -> Self::Live;
    /// To the file; nothing is checked here.
    fn of(live: &Self::Live) -> Self;
}

impl<T: Saved> Saved for Option<T> {
    type Live = Option<T::Live>;
    fn live(self) -> Self::Live {
        self.map(T::live)
    }
    fn of(live: &Self::Live) -> Self {
        live.as_ref().map(T::of)
    }
}

impl<T: Saved> Saved for Vec<T> {
    type Live = Vec<T::Live>;
    fn live(self) -> Self::Live {
        self.into_iter().map(T::live).collect()
    }
    fn of(live: &Self::Live) -> Self {
        live.iter().map(T::of).collect()
    }
}

impl Saved for bool {
    type Live = Self;
    fn live(self) -> Self {
        self
    }
    fn of(live: &Self) -> Self {
        *live
    }
}

macro_rules! fields {
    ($saved:ty = $live:ty { $($field:ident),* $(,)? }) => {
        impl Saved for $saved {
            type Live = $live;
            fn live(self) -> Self::Live {
                let Self { $($field),* } = self;
                Self::Live { $($field: $field.live()),* }
            }
            fn of(live: &Self::Live) -> Self {
                let Self::Live { $($field),* } = live;
                Self { $($field: Saved::of($field)),* }
            }
        }
    };
}

macro_rules! words {
    ($saved:ty = $live:ty { $($word:ident),* $(,)? }) => {
        impl Saved for $saved {
            type Live = $live;
            fn live(self) -> Self::Live {
                match self { $(Self::$word => <$live>::$word),* }
            }
            fn of(live: &Self::Live) -> Self {
                match live { $(<$live>::$word => Self::$word),* }
            }
        }
    };
}

/// A choice of ways to measure left and right, or not at all.
macro_rules! ways {
    ($saved:ident = $live:ident { $($way:ident($left:ident, $right:ident)),* $(,)? }) => {
        impl Saved for $saved {
            type Live = client::$live;
            fn live(self) -> Self::Live {
                match self {
                    $(Self::$way { $left, $right } => client::$live::$way(Sides { left: $left.live(), right: $right.live() }),)*
                    Self::NotMeasured => client::$live::NotMeasured,
                }
            }
            fn of(live: &Self::Live) -> Self {
                match live {
                    $(client::$live::$way(Sides { left, right }) => {
                        Self::$way { $left: Saved::of(left), $right: Saved::of(right) }
                    })*
                    client::$live::NotMeasured => Self::NotMeasured,
                }
            }
        }
    };
}

impl Saved for Client {
    type Live = client::Client;
    fn live(self) -> Self::Live {
        let Self { format: Format, code, visits } = self;
        client::Client { code: code.live(), visits: visits.live() }
    }
    fn of(live: &Self::Live) -> Self {
        let client::Client { code, visits } = live;
        Self { format: Format, code: Saved::of(code), visits: Saved::of(visits) }
    }
}

fields!(
    Visit = client::Visit {
        date,
        sex_model,
        age_years,
        stature_cm,
        mass_kg,
        scope,
        build,
        joints,
        caps,
        tasks,
        note,
        segments,
        strength,
    }
);
fields!(
    Build = client::Build {
        shank_cm,
        thigh_cm,
        trunk_cm,
        foot_cm,
        ankle_height_cm,
        heel_to_ankle_cm,
        upper_arm_cm,
        forearm_cm,
        hand_cm,
    }
);
fields!(Joints = client::Joints { ankle, hip, knee, reach_limit_deg });
fields!(Caps = client::Caps { knee_deg, hip_deg, load_kg, source });
fields!(Strength = PerJoint<f64> { ankle, knee, hip, low_back });
fields!(
    Task = task::Task {
        name,
        placement,
        load_kg,
        footwear_drop_mm,
        heel_raise_mm,
        stance_width_cm,
        toe_out_deg,
        bend,
        lean_limit_deg,
        goal_thigh_deg,
        weight_left_percent,
        rule,
        seen,
        support,
    }
);
fields!(
    Seen = task::Seen { thigh_deg, shank_deg, trunk_deg, heels_lifted, pain_0_10, pain_from_thigh_deg, stopped_by }
);
fields!(Support = model::Support { edge_back, zone_back, aim, zone_front, edge_front });

words!(SexModel = measures::Sex { Male, Female });
words!(Scope = measures::Scope { Under18, Pregnant, HighBmi, LimbDifference, RecentSurgery, Osteoporosis });
words!(Segments = SegmentTable { DeLeva, DempsterWinter, Dumas });
words!(
    Placement = model::Placement { ArmsCrossed, ArmsForward, AtSides, HighBar, LowBar, FrontRack, Goblet, Overhead }
);
words!(StoppedBy = task::StoppedBy { Pain, Effort, Balance, Stiffness, Confidence, Instruction });

ways!(Ankle = Ankle { KneeToWall(left_cm, right_cm), Degrees(left, right) });
ways!(Hip = Hip { PelvisHeld(left, right), RockBack(left, right), KneeToChest(left, right) });
ways!(Knee = Knee { Degrees(left, right) });

impl Saved for Bend {
    type Live = task::Bend;
    fn live(self) -> Self::Live {
        match self {
            Self::KeepSmall => task::Bend::KeepSmall,
            Self::KeepSome => task::Bend::KeepSome,
            Self::Free => task::Bend::Free,
            Self::Degrees(deg) => task::Bend::Degrees(deg.live()),
        }
    }
    fn of(live: &Self::Live) -> Self {
        match live {
            task::Bend::KeepSmall => Self::KeepSmall,
            task::Bend::KeepSome => Self::KeepSome,
            task::Bend::Free => Self::Free,
            task::Bend::Degrees(deg) => Self::Degrees(Saved::of(deg)),
        }
    }
}

impl Saved for Rule {
    type Live = task::Rule;
    fn live(self) -> Self::Live {
        match self {
            Self::Usual { slope } => task::Rule::Usual { slope: slope.live() },
            Self::LeastEffort => task::Rule::LeastEffort,
            Self::ArmRatio(ratio) => task::Rule::ArmRatio(ratio.live()),
            Self::HeldShank(deg) => task::Rule::HeldShank(deg.live()),
        }
    }
    fn of(live: &Self::Live) -> Self {
        match live {
            task::Rule::Usual { slope } => Self::Usual { slope: Saved::of(slope) },
            task::Rule::LeastEffort => Self::LeastEffort,
            task::Rule::ArmRatio(ratio) => Self::ArmRatio(Saved::of(ratio)),
            task::Rule::HeldShank(deg) => Self::HeldShank(Saved::of(deg)),
        }
    }
}
