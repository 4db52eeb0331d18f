//! Format 1: the structs of the file, apart from the types the desk edits.
//!
//! Order and names of fields are those of the file. Numbers carry the bounds they are checked
//! against while being read; every `Option` may be left out.

mod live;
mod tasks;

use plumbfold_core::tables::SegmentTable;
use serde::{
    Deserialize, Deserializer, Serialize, Serializer,
    de::{Error, Unexpected},
};

use crate::{
    bounded::{AS_TYPED, within},
    text::{NOTE_MAX_CHARS, SOURCE_MAX_CHARS, SavedCode, SavedDate, SavedText},
};
pub(crate) use live::Saved;

/// A client file.
#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(crate) struct Client {
    #[serde(deserialize_with = "format_1")]
    format: Format,
    code: SavedCode,
    #[serde(deserialize_with = "at_least_one")]
    visits: Vec<Visit>,
}

/// The number 1.
struct Format;

impl Format {
    const NUMBER: u32 = 1;
}

impl Serialize for Format {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_u32(Self::NUMBER)
    }
}

fn format_1<'de, D: Deserializer<'de>>(deserializer: D) -> Result<Format, D::Error> {
    match i64::deserialize(deserializer) {
        Ok(number) if number == i64::from(Format::NUMBER) => Ok(Format),
        Ok(other) => Err(D::Error::invalid_value(Unexpected::Other(&other.to_string()), &"format 1")),
        Err(_) => Err(D::Error::invalid_value(Unexpected::Other(AS_TYPED), &"format 1")),
    }
}

fn at_least_one<'de, D: Deserializer<'de>>(deserializer: D) -> Result<Vec<Visit>, D::Error> {
    let visits = Vec::<Visit>::deserialize(deserializer)?;
    if visits.is_empty() {
        return Err(D::Error::invalid_value(Unexpected::Other("no visit"), &"at least one visit"));
    }
    Ok(visits)
}

#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
struct Visit {
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
    tasks: Vec<tasks::Task>,
    note: SavedText<NOTE_MAX_CHARS>,
    #[serde(default, skip_serializing_if = "Segments::is_default")]
    segments: Segments,
    #[serde(default, skip_serializing_if = "Strength::is_default")]
    strength: Strength,
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
