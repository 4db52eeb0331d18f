//! Between the structs of format 1 that are still those of today and the types the desk edits.

use plumbfold_core::{
    measures::{self, PerJoint, Sides},
    tables::SegmentTable,
    task as model,
};

use crate::{
    client,
    saved::{Saved, fields, words},
    task,
};

use super::{
    Ankle, Build, Caps, Client, Format, Hip, Joints, Knee, Scope, Segments, SexModel, Strength, Visit,
    tasks::{Bend, Placement, Rule, StoppedBy, Support},
};

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

/// Any task that stands for a task of today; older ones are brought up to it first.
pub(crate) trait TaskOfToday: Saved<Live = task::Task> {}

impl<T: Saved<Live = task::Task>> TaskOfToday for T {}

impl<const FORMAT: u32, T: TaskOfToday> Saved for Client<FORMAT, T> {
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
    Visit<T> = client::Visit where T: TaskOfToday {
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
