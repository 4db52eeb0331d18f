//! Tasks of format 1.

use std::collections::HashSet;

use serde::{
    Deserialize, Deserializer, Serialize,
    de::{Error, Unexpected},
};

use crate::{bounded::within, problem::shown, saved::Saved as _, text::SavedName};

#[derive(Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(crate) struct Task {
    pub(crate) name: SavedName,
    pub(crate) placement: Placement,
    pub(crate) load_kg: within!(Load),
    pub(crate) footwear_drop_mm: within!(Footwear),
    pub(crate) heel_raise_mm: within!(HeelRaise),
    pub(crate) stance_width_cm: Option<within!(Stance)>,
    pub(crate) toe_out_deg: within!(ToeOut),
    pub(crate) bend: Bend,
    pub(crate) lean_limit_deg: Option<within!(Lean)>,
    pub(crate) goal_thigh_deg: within!(Goal),
    pub(crate) weight_left_percent: Option<within!(WeightLeft)>,
    pub(crate) rule: Rule,
    pub(crate) seen: Option<Seen>,
    #[serde(default, skip_serializing_if = "Support::is_default")]
    pub(crate) support: Support,
}

/// A task of any format.
pub(crate) trait Named {
    fn name(&self) -> &str;
}

impl Named for Task {
    fn name(&self) -> &str {
        &self.name.0
    }
}

/// At least one task, no name twice.
pub(super) fn each_named<'de, D: Deserializer<'de>, T: Deserialize<'de> + Named>(
    deserializer: D,
) -> Result<Vec<T>, D::Error> {
    let tasks = Vec::<T>::deserialize(deserializer)?;
    if tasks.is_empty() {
        return Err(D::Error::invalid_value(Unexpected::Other("no task"), &"at least one task"));
    }
    let mut names = HashSet::new();
    match tasks.iter().find(|task| !names.insert(task.name())) {
        None => Ok(tasks),
        Some(task) => {
            let found = format!("two tasks named \"{}\"", shown(task.name()));
            Err(D::Error::invalid_value(Unexpected::Other(&found), &"a name of its own for each task"))
        }
    }
}

#[derive(Clone, Copy, Serialize, Deserialize)]
pub(crate) enum Placement {
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
pub(crate) enum Bend {
    KeepSmall,
    KeepSome,
    Free,
    Degrees(within!(Bend)),
}

#[derive(Clone, Copy, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(crate) enum Rule {
    Usual { slope: Option<within!(Slope)> },
    LeastEffort,
    ArmRatio(within!(Ratio)),
    HeldShank(within!(HeldShank)),
}

#[derive(Clone, Copy, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(crate) struct Seen {
    pub(crate) thigh_deg: within!(SeenThigh),
    pub(crate) shank_deg: within!(SeenShank),
    pub(crate) trunk_deg: within!(SeenTrunk),
    pub(crate) heels_lifted: bool,
    pub(crate) pain_0_10: Option<within!(Pain)>,
    pub(crate) pain_from_thigh_deg: Option<within!(SeenThigh)>,
    pub(crate) stopped_by: Option<StoppedBy>,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
pub(crate) enum StoppedBy {
    Pain,
    Effort,
    Balance,
    Stiffness,
    Confidence,
    Instruction,
}

#[derive(Clone, Copy, PartialEq, Serialize)]
pub(crate) struct Support {
    pub(crate) edge_back: Option<within!(SupportFraction)>,
    pub(crate) zone_back: within!(SupportFraction),
    pub(crate) aim: within!(SupportFraction),
    pub(crate) zone_front: within!(SupportFraction),
    pub(crate) edge_front: Option<within!(SupportFraction)>,
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
    pub(crate) fn is_default(&self) -> bool {
        *self == Self::default()
    }
}
