//! Format 1: the structs of the file, apart from the types the desk edits.
//!
//! Order and names of fields are those of the file. Numbers carry the bounds they are checked
//! against while being read; every `Option` may be left out.
//!
//! What later formats did not change is theirs too: their client and visit are those of here with
//! a task of their own.

mod live;
mod tasks;

use plumbfold_core::tables::SegmentTable;
use serde::{
    Deserialize, Deserializer, Serialize, Serializer,
    de::{Error, Unexpected},
};

use crate::{
    bounded::{AS_TYPED, within},
    read::CURRENT_FORMAT,
    saved::Saved as _,
    text::{NOTE_MAX_CHARS, SOURCE_MAX_CHARS, SavedCode, SavedDate, SavedText},
};
pub(crate) use tasks::{Bend, Named, Placement, Rule, Seen, StoppedBy, Support, Task};

/// A file of format 1.
pub(crate) type File = Client<1, Task>;

/// A client file of any format whose clients and visits are those of format 1.
#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields, bound(deserialize = "T: Deserialize<'de> + Named"))]
pub(crate) struct Client<const FORMAT: u32, T> {
    #[serde(deserialize_with = "this_format")]
    format: Format<FORMAT>,
    code: SavedCode,
    #[serde(deserialize_with = "at_least_one")]
    visits: Vec<Visit<T>>,
}

impl<const FORMAT: u32, T> Client<FORMAT, T> {
    /// The same in another format, each task turned into one of that format.
    ///
    /// # Errors
    /// The first of `step`.
    pub(crate) fn with_tasks<const TO: u32, U, E>(self, step: impl Fn(T) -> Result<U, E>) -> Result<Client<TO, U>, E> {
        let Self { format: Format, code, visits } = self;
        let visits = visits.into_iter().map(|visit| visit.with_tasks(&step)).collect::<Result<_, _>>()?;
        Ok(Client { format: Format, code, visits })
    }
}

/// The number of a format.
struct Format<const NUMBER: u32>;

impl<const NUMBER: u32> Serialize for Format<NUMBER> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_u32(NUMBER)
    }
}

fn this_format<'de, D: Deserializer<'de>, const NUMBER: u32>(deserializer: D) -> Result<Format<NUMBER>, D::Error> {
    // The number chose the structs; one that comes here and is another is that of no format.
    let found = match i64::deserialize(deserializer) {
        Ok(number) if number == i64::from(NUMBER) => return Ok(Format),
        Ok(other) => other.to_string(),
        Err(_) => AS_TYPED.to_owned(),
    };
    let known: Vec<String> = (1..=CURRENT_FORMAT).map(|number| number.to_string()).collect();
    let known = format!("format {}", known.join(" or "));
    Err(D::Error::invalid_value(Unexpected::Other(&found), &known.as_str()))
}

fn at_least_one<'de, D: Deserializer<'de>, T: Deserialize<'de> + Named>(
    deserializer: D,
) -> Result<Vec<Visit<T>>, D::Error> {
    let visits = Vec::<Visit<T>>::deserialize(deserializer)?;
    if visits.is_empty() {
        return Err(D::Error::invalid_value(Unexpected::Other("no visit"), &"at least one visit"));
    }
    Ok(visits)
}

#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields, bound(deserialize = "T: Deserialize<'de> + Named"))]
struct Visit<T> {
    date: SavedDate,
    sex_model: SexModel,
    age_years: Option<within!(Age)>,
    stature_cm: within!(Stature),
    mass_kg: within!(Mass),
    scope: Vec<Scope>,
    build: Build,
    joints: Joints,
    caps: Caps,
    #[serde(deserialize_with = "tasks::each_named")]
    tasks: Vec<T>,
    note: SavedText<NOTE_MAX_CHARS>,
    #[serde(default, skip_serializing_if = "Segments::is_default")]
    segments: Segments,
    #[serde(default, skip_serializing_if = "Strength::is_default")]
    strength: Strength,
}

impl<T> Visit<T> {
    fn with_tasks<U, E>(self, step: impl Fn(T) -> Result<U, E>) -> Result<Visit<U>, E> {
        let Self {
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
        } = self;
        let tasks = tasks.into_iter().map(step).collect::<Result<_, _>>()?;
        Ok(Visit {
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
        })
    }
}

#[derive(Clone, Copy, Serialize, Deserialize)]
enum SexModel {
    Male,
    Female,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
enum Scope {
    Under18,
    Pregnant,
    HighBmi,
    LimbDifference,
    RecentSurgery,
    Osteoporosis,
}

#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
struct Build {
    shank_cm: Option<within!(Shank)>,
    thigh_cm: Option<within!(Thigh)>,
    trunk_cm: Option<within!(Trunk)>,
    foot_cm: Option<within!(Foot)>,
    ankle_height_cm: Option<within!(AnkleHeight)>,
    heel_to_ankle_cm: Option<within!(HeelToAnkle)>,
    upper_arm_cm: Option<within!(UpperArm)>,
    forearm_cm: Option<within!(Forearm)>,
    hand_cm: Option<within!(Hand)>,
}

#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
struct Joints {
    ankle: Ankle,
    hip: Hip,
    knee: Knee,
    reach_limit_deg: within!(Reach),
}

#[derive(Clone, Copy, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
enum Ankle {
    KneeToWall { left_cm: Option<within!(KneeToWall)>, right_cm: Option<within!(KneeToWall)> },
    Degrees { left: Option<within!(AnkleRange)>, right: Option<within!(AnkleRange)> },
    NotMeasured,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
enum Hip {
    PelvisHeld { left: Option<within!(HipRange)>, right: Option<within!(HipRange)> },
    RockBack { left: Option<within!(HipRange)>, right: Option<within!(HipRange)> },
    KneeToChest { left: Option<within!(HipRange)>, right: Option<within!(HipRange)> },
    NotMeasured,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
enum Knee {
    Degrees { left: Option<within!(KneeRange)>, right: Option<within!(KneeRange)> },
    NotMeasured,
}

#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
struct Caps {
    knee_deg: Option<within!(KneeRange)>,
    hip_deg: Option<within!(HipRange)>,
    load_kg: Option<within!(Load)>,
    source: SavedText<SOURCE_MAX_CHARS>,
}

#[derive(Clone, Copy, PartialEq, Serialize, Deserialize)]
enum Segments {
    DeLeva,
    DempsterWinter,
    Dumas,
}

impl Default for Segments {
    fn default() -> Self {
        Self::of(&SegmentTable::DeLeva)
    }
}

impl Segments {
    fn is_default(&self) -> bool {
        *self == Self::default()
    }
}

#[derive(Clone, Copy, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
struct Strength {
    ankle: within!(Strength),
    knee: within!(Strength),
    hip: within!(Strength),
    low_back: within!(Strength),
}

impl Default for Strength {
    fn default() -> Self {
        Self::of(&crate::client::as_typical())
    }
}

impl Strength {
    fn is_default(&self) -> bool {
        *self == Self::default()
    }
}
