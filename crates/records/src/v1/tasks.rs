//! Tasks of format 1.

use std::collections::HashSet;

use serde::{
    Deserialize, Deserializer, Serialize,
    de::{Error, Unexpected},
};

use crate::{bounded::within, problem::shown, text::SavedName};

use super::Saved;

#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Task {
    pub(super) name: SavedName,
    pub(super) placement: Placement,
    pub(super) load_kg: within!(Load),
    pub(super) footwear_drop_mm: within!(Footwear),
    pub(super) heel_raise_mm: within!(HeelRaise),
    pub(super) stance_width_cm: Option<within!(Stance)>,
    pub(super) toe_out_deg: within!(ToeOut),
    pub(super) bend: Bend,
    pub(super) lean_limit_deg: Option<within!(Lean)>,
    pub(super) goal_thigh_deg: within!(Goal),
    pub(super) weight_left_percent: Option<within!(WeightLeft)>,
    pub(super) rule: Rule,
    pub(super) seen: Option<Seen>,
    #[serde(default, skip_serializing_if = "Support::is_default")]
    pub(super) support: Support,
}

/// At least one task, no name twice.
pub(super) fn each_named<'de, D: Deserializer<'de>>(deserializer: D) -> Result<Vec<Task>, D::Error> {
    let tasks = Vec::<Task>::deserialize(deserializer)?;
    if tasks.is_empty() {
        return Err(D::Error::invalid_value(Unexpected::Other("no task"), &"at least one task"));
    }
    let mut names = HashSet::new();
    match tasks.iter().find(|task| !names.insert(task.name.0.as_str())) {
        None => Ok(tasks),
        Some(task) => {
            let found = format!("two tasks named \"{}\"", shown(&task.name.0));
            Err(D::Error::invalid_value(Unexpected::Other(&found), &"a name of its own for each task"))
        }
    }
}

#[derive(Clone, Copy, Serialize, Deserialize)]
pub(super) enum Placement {
    ArmsCrossed,
    ArmsForward,
    AtSides,
    HighBar,
    LowBar,
    FrontRack,
    Goblet,
    Overhead,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
pub(super) enum Bend {
    KeepSmall,
    KeepSome,
    Free,
    Degrees(within!(Bend)),
}

#[derive(Clone, Copy, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) enum Rule {
    Usual { slope: Option<within!(Slope)> },
    LeastEffort,
    ArmRatio(within!(Ratio)),
    HeldShank(within!(HeldShank)),
}

#[derive(Clone, Copy, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Seen {
    pub(super) thigh_deg: within!(SeenThigh),
    pub(super) shank_deg: within!(SeenShank),
    pub(super) trunk_deg: within!(SeenTrunk),
    pub(super) heels_lifted: bool,
    pub(super) pain_0_10: Option<within!(Pain)>,
    pub(super) pain_from_thigh_deg: Option<within!(SeenThigh)>,
    pub(super) stopped_by: Option<StoppedBy>,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
pub(super) enum StoppedBy {
    Pain,
    Effort,
    Balance,
    Stiffness,
    Confidence,
    Instruction,
}

#[derive(Clone, Copy, PartialEq, Serialize)]
pub(super) struct Support {
    pub(super) edge_back: Option<within!(SupportFraction)>,
    pub(super) zone_back: within!(SupportFraction),
    pub(super) aim: within!(SupportFraction),
    pub(super) zone_front: within!(SupportFraction),
    pub(super) edge_front: Option<within!(SupportFraction)>,
}

/// The fields of [`Support`], their order not yet looked at.
#[derive(Deserialize)]
#[serde(deny_unknown_fields, rename = "Support")]
struct Fractions {
    edge_back: Option<within!(SupportFraction)>,
    zone_back: within!(SupportFraction),
    aim: within!(SupportFraction),
    zone_front: within!(SupportFraction),
    edge_front: Option<within!(SupportFraction)>,
}

impl<'de> Deserialize<'de> for Support {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        let Fractions { edge_back, zone_back, aim, zone_front, edge_front } = Fractions::deserialize(deserializer)?;
        // An edge that follows age is put in its place by the model.
        let given: Vec<f64> = [edge_back, Some(zone_back), Some(aim), Some(zone_front), edge_front]
            .into_iter()
            .flatten()
            .map(|fraction| fraction.0)
            .collect();
        match given.windows(2).find(|pair| pair[0] > pair[1]) {
            None => Ok(Self { edge_back, zone_back, aim, zone_front, edge_front }),
            Some(pair) => {
                let found = format!("{:?} followed by {:?}", pair[0], pair[1]);
                Err(D::Error::invalid_value(Unexpected::Other(&found), &"fractions in rising order from heel to toe"))
            }
        }
    }
}

impl Default for Support {
    fn default() -> Self {
        Self::of(&crate::task::Support::default())
    }
}

impl Support {
    fn is_default(&self) -> bool {
        *self == Self::default()
    }
}
