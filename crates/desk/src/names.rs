//! What choices are called on the desk.

use plumbfold_core::{Placement, Scope, SegmentTable};
use plumbfold_records::{Bend, Compared, PainAt, Rule, StoppedBy};
use plumbfold_scene::format;

use crate::action::{AnkleWay, HipWay};

/// Arms and load.
#[must_use]
pub const fn placement(p: Placement) -> &'static str {
    match p {
        Placement::ArmsCrossed => "crossed on the chest",
        Placement::ArmsForward => "forward",
        Placement::AtSides => "at the sides",
        Placement::HighBar => "high bar",
        Placement::LowBar => "low bar",
        Placement::FrontRack => "front rack",
        Placement::Goblet => "goblet",
        Placement::Overhead => "overhead",
    }
}

/// Bend allowed.
#[must_use]
pub fn bend(b: Bend) -> String {
    match b {
        Bend::KeepSmall => "keep small, 15°".to_owned(),
        Bend::KeepSome => "keep some, 30°".to_owned(),
        Bend::Free => "freely, 45°".to_owned(),
        Bend::Degrees(deg) => format!("chosen, {}°", format::short(deg, 1)),
    }
}

/// Which posture.
#[must_use]
pub const fn rule(r: Rule) -> &'static str {
    match r {
        Rule::Usual { .. } => "usual shank",
        Rule::LeastEffort => "least effort",
        Rule::ArmRatio(_) => "arms in a ratio",
        Rule::HeldShank(_) => "shank held",
    }
}

/// Segment tables by author.
#[must_use]
pub const fn table(t: SegmentTable) -> &'static str {
    match t {
        SegmentTable::DeLeva => "de Leva 1996",
        SegmentTable::DempsterWinter => "Dempster, Winter 2009",
        SegmentTable::Dumas => "Dumas 2007",
    }
}

/// Circumstances.
#[must_use]
pub const fn scope(s: Scope) -> &'static str {
    match s {
        Scope::Under18 => "Under 18",
        Scope::Pregnant => "Pregnant",
        Scope::HighBmi => "BMI of 30 or more",
        Scope::LimbDifference => "Limb difference",
        Scope::RecentSurgery => "Recent surgery",
        Scope::Osteoporosis => "Osteoporosis",
    }
}

/// How the ankle was measured.
#[must_use]
pub const fn ankle_way(w: AnkleWay) -> &'static str {
    match w {
        AnkleWay::KneeToWall => "knee to wall",
        AnkleWay::Degrees => "degrees",
        AnkleWay::NotMeasured => "not measured",
    }
}

/// How the hip was measured.
#[must_use]
pub const fn hip_way(w: HipWay) -> &'static str {
    match w {
        HipWay::PelvisHeld => "pelvis held",
        HipWay::RockBack => "rocking back",
        HipWay::KneeToChest => "knee to chest",
        HipWay::NotMeasured => "not measured",
    }
}

/// What ended the descent.
#[must_use]
pub const fn stopped_by(s: StoppedBy) -> &'static str {
    match s {
        StoppedBy::Pain => "pain",
        StoppedBy::Effort => "effort",
        StoppedBy::Balance => "balance",
        StoppedBy::Stiffness => "stiffness",
        StoppedBy::Confidence => "confidence",
        StoppedBy::Instruction => "we asked to stop",
    }
}

/// How a set-up felt.
#[must_use]
pub const fn compared(c: Compared) -> &'static str {
    match c {
        Compared::Easier => "easier",
        Compared::Same => "the same",
        Compared::Harder => "harder",
    }
}

/// Which joint hurts.
#[must_use]
pub const fn pain_at(j: PainAt) -> &'static str {
    match j {
        PainAt::Ankle => "ankle",
        PainAt::Knee => "knee",
        PainAt::Hip => "hip",
        PainAt::LowBack => "low back",
    }
}
