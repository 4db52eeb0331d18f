//! One way: from what was typed to the SI types of the model.

use plumbfold_core::{
    angle::Angle,
    measures::{self, AnkleRange, HipRange, KneeRange, Lengths, Measures, Sides},
    task as model,
};

use crate::{
    client::{Ankle, Build, Hip, Joints, Knee, Visit},
    task::{Bend, Rule, Seen, Task},
};

const CM_PER_M: f64 = 100.0;
const MM_PER_M: f64 = 1000.0;
const PERCENT: f64 = 100.0;

fn metres(cm: f64) -> f64 {
    cm / CM_PER_M
}

fn sides<T>(typed: Sides<f64>, convert: impl Fn(f64) -> T) -> Sides<T> {
    Sides { left: typed.left.map(&convert), right: typed.right.map(&convert) }
}

impl Visit {
    /// What was measured, in metres, kilograms and [`Angle`]s.
    #[must_use]
    pub fn measures(&self) -> Measures {
        Measures {
            sex: self.sex_model,
            age_years: self.age_years,
            stature_m: metres(self.stature_cm),
            mass_kg: self.mass_kg,
            scope: self.scope.clone(),
            lengths: self.build.lengths(),
            ankle: self.joints.ankle(),
            hip: self.joints.hip(),
            knee: self.joints.knee(),
            reach_limit: Angle::from_deg(self.joints.reach_limit_deg),
            caps: measures::Caps {
                knee: self.caps.knee_deg.map(Angle::from_deg),
                hip: self.caps.hip_deg.map(Angle::from_deg),
                load_kg: self.caps.load_kg,
            },
            table: self.segments,
            strength: self.strength,
        }
    }

    /// The task at this place of the list, in metres, kilograms and [`Angle`]s.
    #[must_use]
    pub fn task(&self, at: usize) -> Option<model::Task> {
        self.tasks.get(at).map(Task::model)
    }
}

impl Build {
    fn lengths(&self) -> Lengths {
        Lengths {
            shank_m: self.shank_cm.map(metres),
            thigh_m: self.thigh_cm.map(metres),
            trunk_m: self.trunk_cm.map(metres),
            foot_m: self.foot_cm.map(metres),
            ankle_height_m: self.ankle_height_cm.map(metres),
            heel_to_ankle_m: self.heel_to_ankle_cm.map(metres),
            upper_arm_m: self.upper_arm_cm.map(metres),
            forearm_m: self.forearm_cm.map(metres),
            hand_m: self.hand_cm.map(metres),
        }
    }
}

impl Joints {
    fn ankle(&self) -> AnkleRange {
        match self.ankle {
            Ankle::KneeToWall(typed) => AnkleRange::KneeToWall(sides(typed, metres)),
            Ankle::Degrees(typed) => AnkleRange::Degrees(sides(typed, Angle::from_deg)),
            Ankle::NotMeasured => AnkleRange::NotMeasured,
        }
    }

    fn hip(&self) -> HipRange {
        match self.hip {
            Hip::PelvisHeld(typed) => HipRange::PelvisHeld(sides(typed, Angle::from_deg)),
            Hip::RockBack(typed) => HipRange::RockBack(sides(typed, Angle::from_deg)),
            Hip::KneeToChest(typed) => HipRange::KneeToChest(sides(typed, Angle::from_deg)),
            Hip::NotMeasured => HipRange::NotMeasured,
        }
    }

    fn knee(&self) -> KneeRange {
        match self.knee {
            Knee::Degrees(typed) => KneeRange::Degrees(sides(typed, Angle::from_deg)),
            Knee::NotMeasured => KneeRange::NotMeasured,
        }
    }
}

impl Task {
    fn model(&self) -> model::Task {
        model::Task {
            placement: self.placement,
            load_kg: self.load_kg,
            footwear_drop_m: self.footwear_drop_mm / MM_PER_M,
            heel_raise_m: self.heel_raise_mm / MM_PER_M,
            stance_m: self.stance_width_cm.map(metres),
            toe_out: Angle::from_deg(self.toe_out_deg),
            bend: match self.bend {
                Bend::KeepSmall => model::Bend::KeepSmall,
                Bend::KeepSome => model::Bend::KeepSome,
                Bend::Free => model::Bend::Free,
                Bend::Degrees(deg) => model::Bend::Degrees(Angle::from_deg(deg)),
            },
            lean_limit: self.lean_limit_deg.map(Angle::from_deg),
            goal: Angle::from_deg(self.goal_thigh_deg),
            weight_left: self.weight_left_percent.map(|share| share / PERCENT),
            rule: match self.rule {
                Rule::Usual { slope } => model::Rule::Usual { slope },
                Rule::LeastEffort => model::Rule::LeastEffort,
                Rule::ArmRatio(ratio) => model::Rule::ArmRatio(ratio),
                Rule::HeldShank(deg) => model::Rule::HeldShank(Angle::from_deg(deg)),
            },
            seen: self.seen.map(Seen::model),
            support: self.support,
        }
    }
}

impl Seen {
    fn model(self) -> model::Seen {
        model::Seen {
            thigh: Angle::from_deg(self.thigh_deg),
            shank: Angle::from_deg(self.shank_deg),
            trunk: Angle::from_deg(self.trunk_deg),
        }
    }
}
