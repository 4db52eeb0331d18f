//! Names in words of things the model has keys for.

use plumbfold_core::{Placement, Scope, balance::Toward};

/// How arms and load are held.
#[must_use]
pub const fn placement(p: Placement) -> &'static str {
    match p {
        Placement::ArmsCrossed => "arms crossed",
        Placement::ArmsForward => "arms forward",
        Placement::AtSides => "arms at the sides",
        Placement::HighBar => "bar on the upper back",
        Placement::LowBar => "bar low on the back",
        Placement::FrontRack => "bar in front of the shoulders",
        Placement::Goblet => "weight at the chest",
        Placement::Overhead => "arms overhead",
    }
}

/// A circumstance.
#[must_use]
pub const fn scope(s: Scope) -> &'static str {
    match s {
        Scope::Under18 => "under 18",
        Scope::Pregnant => "pregnant",
        Scope::HighBmi => "body-mass index of 30 or more",
        Scope::LimbDifference => "limb difference",
        Scope::RecentSurgery => "recent surgery",
        Scope::Osteoporosis => "osteoporosis",
    }
}

/// An end of the foot.
#[must_use]
pub const fn toward(t: Toward) -> &'static str {
    match t {
        Toward::Heels => "heels",
        Toward::Toes => "toes",
    }
}
