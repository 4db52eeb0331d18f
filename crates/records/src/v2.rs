//! Format 2: what format 1 has, how a change that was tried felt, and which joint hurts.
//!
//! Only the structs that differ stand here; all others are those of format 1, the client and the
//! visit holding the task of this format. Both additions are left out where nothing was noted.

use serde::{Deserialize, Serialize};

use crate::{
    bounded::within,
    saved::{Saved, fields, words},
    task,
    text::SavedName,
    v1::{self, Bend, Named, Placement, Rule, StoppedBy, Support},
};

/// A file of format 2.
pub(crate) type File = v1::Client<2, Task>;

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
    #[serde(skip_serializing_if = "Option::is_none")]
    pub(crate) felt: Option<Felt>,
    #[serde(default, skip_serializing_if = "Support::is_default")]
    pub(crate) support: Support,
}

impl Named for Task {
    fn name(&self) -> &str {
        &self.name.0
    }
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
    #[serde(skip_serializing_if = "Option::is_none")]
    pub(crate) pain_at: Option<PainAt>,
    pub(crate) stopped_by: Option<StoppedBy>,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
pub(crate) enum PainAt {
    Ankle,
    Knee,
    Hip,
    LowBack,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(crate) struct Felt {
    compared: Compared,
    depth_thigh_deg: Option<within!(Goal)>,
    pain_0_10: Option<within!(Pain)>,
}

#[derive(Clone, Copy, Serialize, Deserialize)]
enum Compared {
    Easier,
    Same,
    Harder,
}

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
        felt,
        support,
    }
);
fields!(
    Seen = task::Seen {
        thigh_deg,
        shank_deg,
        trunk_deg,
        heels_lifted,
        pain_0_10,
        pain_from_thigh_deg,
        pain_at,
        stopped_by,
    }
);
fields!(Felt = task::Felt { compared, depth_thigh_deg, pain_0_10 });
words!(PainAt = task::PainAt { Ankle, Knee, Hip, LowBack });
words!(Compared = task::Compared { Easier, Same, Harder });
