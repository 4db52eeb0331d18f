//! The client, the visit and what was measured, exactly as typed.

use std::fmt;

use jiff::civil::Date;
use plumbfold_core::{
    bounds::{Field, bounds},
    measures::{PerJoint, Scope, Sex, Sides},
    tables::SegmentTable,
};

use crate::{
    task::Task,
    text::{CODE_ALLOWED, code_holds},
};

/// One client: a code and the visits, in the order they were written down.
#[derive(Clone, Debug, PartialEq)]
pub struct Client {
    /// Never a name.
    pub code: Code,
    /// At least one.
    pub visits: Vec<Visit>,
}

impl Client {
    /// A new client with the first visit.
    #[must_use]
    pub fn new(code: Code, visit: Visit) -> Self {
        Self { code, visits: vec![visit] }
    }

    /// Where the latest visit stands in the list: by date, the later in the list where dates are
    /// the same; 0 where there is none.
    #[must_use]
    pub fn latest_visit(&self) -> usize {
        self.visits.iter().enumerate().max_by_key(|(_, visit)| visit.date).map_or(0, |(at, _)| at)
    }
}

/// What a client is called in files: 1 to 40 characters that any file system can hold.
#[derive(Clone, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Code(String);

impl Code {
    /// A checked code.
    ///
    /// # Errors
    /// Where it is empty, too long or cannot be part of a file name.
    pub fn new(code: impl Into<String>) -> Result<Self, CodeFault> {
        let code = code.into();
        if code_holds(&code) { Ok(Self(code)) } else { Err(CodeFault) }
    }

    /// A code that was checked where it was read.
    pub(crate) const fn from_checked(code: String) -> Self {
        Self(code)
    }

    /// The code as text.
    #[must_use]
    pub fn as_str(&self) -> &str {
        &self.0
    }
}

impl fmt::Display for Code {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.0)
    }
}

/// Why a text is not a [`Code`]; says what is allowed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("a code needs {CODE_ALLOWED}")]
pub struct CodeFault;

/// What was measured, chosen and seen on one day.
#[derive(Clone, Debug, PartialEq)]
pub struct Visit {
    /// The day.
    pub date: Date,
    /// Which mass, capacity and population tables apply.
    pub sex_model: Sex,
    /// Age in years; `None`: as at 30, with a notice.
    pub age_years: Option<f64>,
    /// Standing height, cm.
    pub stature_cm: f64,
    /// Body mass, kg.
    pub mass_kg: f64,
    /// Circumstances that withhold results or call for a caution.
    pub scope: Vec<Scope>,
    /// Landmark lengths.
    pub build: Build,
    /// Ranges of motion.
    pub joints: Joints,
    /// Precautions.
    pub caps: Caps,
    /// At least one, each with a name of its own.
    pub tasks: Vec<Task>,
    /// Free text.
    pub note: String,
    /// Which segment-inertia table.
    pub segments: SegmentTable,
    /// Strength against a typical untrained adult of the same sex and age.
    pub strength: PerJoint<f64>,
}

impl Visit {
    /// A visit with nothing measured beyond stature and mass, and one task, `main`.
    #[must_use]
    pub fn new(date: Date, sex_model: Sex, stature_cm: f64, mass_kg: f64) -> Self {
        Self {
            date,
            sex_model,
            age_years: None,
            stature_cm,
            mass_kg,
            scope: Vec::new(),
            build: Build::default(),
            joints: Joints::default(),
            caps: Caps::default(),
            tasks: vec![Task::new("main")],
            note: String::new(),
            segments: SegmentTable::default(),
            strength: as_typical(),
        }
    }

    /// Where the task of this name stands in the list.
    #[must_use]
    pub fn task_named(&self, name: &str) -> Option<usize> {
        self.tasks.iter().position(|task| task.name == name)
    }
}

/// Strength of a typical untrained adult.
pub(crate) fn as_typical() -> PerJoint<f64> {
    PerJoint { ankle: 1.0, knee: 1.0, hip: 1.0, low_back: 1.0 }
}

/// Landmark lengths, cm; `None` is estimated from stature.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Build {
    /// Lateral malleolus to lateral femoral epicondyle, cm.
    pub shank_cm: Option<f64>,
    /// Lateral femoral epicondyle to greater trochanter, cm.
    pub thigh_cm: Option<f64>,
    /// Greater trochanter to acromion, cm.
    pub trunk_cm: Option<f64>,
    /// Heel to longest toe, cm.
    pub foot_cm: Option<f64>,
    /// Lateral malleolus above the floor, cm.
    pub ankle_height_cm: Option<f64>,
    /// Back of the heel to the malleolus along the foot, cm.
    pub heel_to_ankle_cm: Option<f64>,
    /// Acromion to elbow crease, cm.
    pub upper_arm_cm: Option<f64>,
    /// Elbow crease to wrist, cm.
    pub forearm_cm: Option<f64>,
    /// Wrist to fingertip, cm.
    pub hand_cm: Option<f64>,
}

/// Ranges of motion.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Joints {
    /// Dorsiflexion.
    pub ankle: Ankle,
    /// Hip flexion.
    pub hip: Hip,
    /// Knee flexion.
    pub knee: Knee,
    /// How far the arms go up, from hanging at the sides through the front, degrees.
    pub reach_limit_deg: f64,
}

impl Default for Joints {
    fn default() -> Self {
        Self {
            ankle: Ankle::NotMeasured,
            hip: Hip::NotMeasured,
            knee: Knee::NotMeasured,
            reach_limit_deg: bounds(Field::Reach).default,
        }
    }
}

/// How ankle dorsiflexion was measured.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Ankle {
    /// Toe to wall with the heel down, cm; negative: the knee falls short.
    KneeToWall(Sides<f64>),
    /// Weight-bearing dorsiflexion, degrees.
    Degrees(Sides<f64>),
    /// Not measured.
    NotMeasured,
}

/// How hip flexion was measured, degrees.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Hip {
    /// Pelvis held still.
    PelvisHeld(Sides<f64>),
    /// On hands and knees, rocking back until the back starts to bend.
    RockBack(Sides<f64>),
    /// Knee to chest, pelvis free to roll.
    KneeToChest(Sides<f64>),
    /// Not measured.
    NotMeasured,
}

/// How knee flexion was measured, degrees.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Knee {
    /// Flexion.
    Degrees(Sides<f64>),
    /// Not measured.
    NotMeasured,
}

/// Precautions: never exceeded, never lifted.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Caps {
    /// Most knee flexion allowed, degrees.
    pub knee_deg: Option<f64>,
    /// Most hip flexion allowed, degrees.
    pub hip_deg: Option<f64>,
    /// Most load allowed, kg.
    pub load_kg: Option<f64>,
    /// Who set them and why.
    pub source: String,
}
