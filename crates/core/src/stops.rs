//! What runs out first: which limits stop the squat, alone or together, and what each is worth.

use crate::{
    angle::Angle,
    balance::ANGLE_TOL,
    case::Case,
    depth::{balance_depth, depth_within, steady_depth},
    limits::{LEAN_MAX, Limits, Origin, dorsiflexion_of_knee_to_wall},
    measures::Sex,
    pose::legs,
    row::{Refusal, Row},
    tables,
    task::Bend,
};

/// Something that can run out.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Limit {
    /// Ankle dorsiflexion.
    Ankle,
    /// Hip flexion.
    Hip,
    /// Knee flexion.
    Knee,
    /// Bend beyond the hip that we allow.
    Bend,
    /// Lean we choose to stay within.
    Lean,
    /// The support under the feet (balance depth only).
    Support,
    /// The legs' reach over the stance.
    Stance,
    /// A precaution on the knee.
    CapKnee,
    /// A precaution on the hip.
    CapHip,
}

impl Limit {
    /// The name used in machine-readable output.
    #[must_use]
    pub const fn key(self) -> &'static str {
        match self {
            Self::Ankle => "Ankle",
            Self::Hip => "Hip",
            Self::Knee => "Knee",
            Self::Bend => "Bend",
            Self::Lean => "Lean",
            Self::Support => "Support",
            Self::Stance => "Stance",
            Self::CapKnee => "Cap:Knee",
            Self::CapHip => "Cap:Hip",
        }
    }

    /// Whether it is a precaution: named, never lifted.
    #[must_use]
    pub const fn is_precaution(self) -> bool {
        matches!(self, Self::CapKnee | Self::CapHip)
    }
}

/// One limit that stops the squat.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stop {
    /// Which.
    pub limit: Limit,
    /// Whether it does so alone; else together with the others named.
    pub alone: bool,
    /// Whether its value was assumed, not measured.
    pub assumed: bool,
    /// The depth without it; none for a precaution and where there is none.
    pub without: Option<Angle>,
    /// Degrees of thigh angle per degree of the limit, or per centimetre of support.
    pub worth: f64,
}

/// A depth and what stops there.
#[derive(Clone, Debug, PartialEq)]
pub struct Stopped {
    /// The depth; none where not even standing is.
    pub depth: Option<Angle>,
    /// What stops it, worth most first.
    pub stops: Vec<Stop>,
}

/// Which depth is asked about.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Edge {
    /// On mid-foot.
    Steady,
    /// In the support.
    Balance,
}

/// A limit stops if lifting it alone allows this much more.
const MATTERS: Angle = Angle::from_deg(0.5);
/// Half the step of the central difference.
const STEP: Angle = Angle::from_deg(0.05);

fn depth(c: &Case, edge: Edge) -> Option<Angle> {
    match edge {
        Edge::Steady => steady_depth(c),
        Edge::Balance => balance_depth(c),
    }
}

/// The balance depth with both edges of support moved outward along the foot, m; never past heel and toe.
fn with_support(c: &Case, outward_m: f64) -> Option<Angle> {
    let s = &c.stand.support;
    let d = outward_m * c.stand.cos_out;
    depth_within(c, (s.edge_back_m - d).max(s.heel_m), (s.edge_front_m + d).min(s.toe_m))
}

impl Case {
    /// The same case with one limit lifted: ankle 89°, knee 180°, hip and bend 179°, lean 89°.
    /// Support and stance are no angles and stay.
    #[must_use]
    pub fn lifting(&self, limit: Limit) -> Self {
        let to = Angle::from_deg;
        self.with_limits(match limit {
            Limit::Ankle => Limits { ankle: to(89.0), ..self.limits },
            Limit::Knee | Limit::CapKnee => Limits { knee: to(180.0), ..self.limits },
            Limit::Hip | Limit::CapHip => Limits { hip: to(179.0), ..self.limits },
            Limit::Bend => Limits { bend: to(179.0), ..self.limits },
            Limit::Lean => Limits { lean: to(89.0), ..self.limits },
            Limit::Support | Limit::Stance => self.limits,
        })
    }

    /// The same case with one limit moved by an angle.
    fn moved(&self, limit: Limit, by: Angle) -> Self {
        let l = self.limits;
        self.with_limits(match limit {
            Limit::Ankle => Limits { ankle: l.ankle + by, ..l },
            Limit::Knee | Limit::CapKnee => Limits { knee: l.knee + by, ..l },
            Limit::Hip | Limit::CapHip => Limits { hip: l.hip + by, ..l },
            Limit::Bend => Limits { bend: l.bend + by, ..l },
            Limit::Lean => Limits { lean: l.lean + by, ..l },
            Limit::Support | Limit::Stance => l,
        })
    }

    /// The limits that can be lifted one by one, precautions under their own names.
    fn angle_limits(&self) -> [Limit; 5] {
        let cap = |from: Origin, plain: Limit, cap: Limit| if from == Origin::Precaution { cap } else { plain };
        [
            Limit::Ankle,
            cap(self.limits.hip_from, Limit::Hip, Limit::CapHip),
            cap(self.limits.knee_from, Limit::Knee, Limit::CapKnee),
            Limit::Bend,
            Limit::Lean,
        ]
    }

    fn is_assumed(&self, limit: Limit) -> bool {
        let from = match limit {
            Limit::Ankle => self.limits.ankle_from,
            Limit::Hip => self.limits.hip_from,
            Limit::Knee => self.limits.knee_from,
            _ => return false,
        };
        from == Origin::Assumed
    }
}

/// What stops the squat at its steady or balance depth.
///
/// Each limit is lifted alone and the depth solved anew; worth by central difference of ± 0.05° or
/// ± 0.05 cm. Where none matters alone, those at their end in the deepest posture are named together.
#[must_use]
pub fn stopped(c: &Case, edge: Edge) -> Stopped {
    let Some(now) = depth(c, edge) else { return Stopped { depth: None, stops: Vec::new() } };
    let mut stops: Vec<Stop> = c
        .angle_limits()
        .into_iter()
        .filter_map(|limit| {
            let without = depth(&c.lifting(limit), edge);
            without.filter(|w| *w >= now + MATTERS).map(|_| named(c, edge, limit, without))
        })
        .collect();
    if edge == Edge::Balance {
        let s = &c.stand.support;
        let without = depth_within(c, s.heel_m, s.toe_m);
        if without.is_some_and(|w| w >= now + MATTERS) {
            stops.push(named(c, edge, Limit::Support, without));
        }
    }
    if stops.is_empty() {
        stops = at_their_end(c, edge, now)
            .into_iter()
            .map(|limit| Stop { alone: false, without: None, ..named(c, edge, limit, None) })
            .collect();
    }
    stops.sort_by(|a, b| b.worth.total_cmp(&a.worth));
    Stopped { depth: Some(now), stops }
}

fn named(c: &Case, edge: Edge, limit: Limit, without: Option<Angle>) -> Stop {
    let assumed = c.is_assumed(limit);
    let without = without.filter(|_| !limit.is_precaution());
    Stop { limit, alone: true, assumed, without, worth: worth(c, edge, limit) }
}

fn worth(c: &Case, edge: Edge, limit: Limit) -> f64 {
    let (less, more, width) = match limit {
        Limit::Stance => return 0.0,
        Limit::Support => (with_support(c, -0.0005), with_support(c, 0.0005), 0.1),
        _ => (depth(&c.moved(limit, -STEP), edge), depth(&c.moved(limit, STEP), edge), 2.0 * STEP.deg()),
    };
    match (less, more) {
        (Some(a), Some(b)) => (b.deg() - a.deg()) / width,
        _ => 0.0,
    }
}

/// The limits at their end in the deepest posture.
fn at_their_end(c: &Case, edge: Edge, deepest: Angle) -> Vec<Limit> {
    let row = Row::new(c, deepest);
    let near = 1e-5;
    let [ankle, hip, knee, bend, lean] = c.angle_limits();
    let mut at_end = Vec::new();
    let s = &c.stand.support;
    let (back, front) = match edge {
        Edge::Steady => (s.zone_back_m, s.zone_front_m),
        Edge::Balance => (s.edge_back_m, s.edge_front_m),
    };
    let shank = match row.shanks().0 {
        Ok(shanks) => row.reaching(shanks, back, front).nearest_to(shanks.high),
        Err(Refusal::Stance) => return vec![Limit::Stance],
        Err(_) => row.ankle_range().1,
    };
    if shank.rad() >= row.ankle_range().1.rad() - near {
        at_end.push(ankle);
    }
    let flexion = legs(c, shank, deepest).map_or(0.0, |l| l.knee_flexion);
    if flexion >= c.limits.knee.rad() - near {
        at_end.push(knee);
    }
    let folded = c.limits.hip + c.limits.bend - deepest;
    if row.lean(shank).rad() >= row.lean_high.rad() - near {
        if row.lean_high.rad() >= folded.rad() - near {
            at_end.extend([hip, bend]);
        }
        if row.lean_high.rad() >= c.limits.lean.rad() - near {
            at_end.push(lean);
        }
    }
    let beyond = Row::new(c, deepest + Angle::from_rad(1e3 * ANGLE_TOL));
    if matches!(beyond.shanks().0, Err(Refusal::Stance)) {
        at_end.push(Limit::Stance);
    }
    if edge == Edge::Balance && at_end.is_empty() {
        at_end.push(Limit::Support);
    }
    at_end
}

/// Steady depth with the back kept small, some, free.
#[must_use]
pub fn by_bend(c: &Case) -> [Option<Angle>; 3] {
    [Bend::KeepSmall, Bend::KeepSome, Bend::Free]
        .map(|b| steady_depth(&c.with_limits(Limits { bend: b.available(), ..c.limits })))
}

/// Knee to wall of usual range, m: 26 men, 11.7 ± 4.1 cm. Calatayud 2015, IJSPT 10:197–202 (read).
pub const USUAL_KNEE_TO_WALL_M: f64 = 0.117;

/// The same case with usual ranges, never below the client's own and never past a precaution.
#[must_use]
pub fn with_usual_ranges(c: &Case) -> Case {
    let l = c.limits;
    // a foot so long for its shank that the usual distance is out of reach keeps the client's own
    let usual_ankle = dorsiflexion_of_knee_to_wall(&c.body, USUAL_KNEE_TO_WALL_M).unwrap_or(l.ankle);
    let hip_default = |sex: Sex| Angle::from_deg(tables::hip_default_deg(sex));
    let raised = |own: Angle, from: Origin, usual: Angle, cap: Option<Angle>| {
        if from == Origin::Precaution { own } else { own.max(usual).min(cap.unwrap_or(Angle::from_deg(360.0))) }
    };
    c.with_limits(Limits {
        ankle: l.ankle.max(usual_ankle),
        hip: raised(l.hip, l.hip_from, hip_default(c.body.sex), c.measures.caps.hip),
        knee: raised(l.knee, l.knee_from, Angle::from_deg(tables::KNEE_DEFAULT_DEG), c.measures.caps.knee),
        bend: l.bend.max(Bend::Free.available()),
        lean: l.lean.max(LEAN_MAX),
        ..l
    })
}

/// Shape or range: four steady depths, no subtraction.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ShapeOrRange {
    /// As measured.
    pub now: Option<Angle>,
    /// With average lengths for the stature.
    pub average_lengths: Option<Angle>,
    /// With usual ranges.
    pub usual_ranges: Option<Angle>,
    /// With both.
    pub both: Option<Angle>,
}

/// The four depths of shape and range.
#[must_use]
pub fn shape_or_range(c: &Case) -> ShapeOrRange {
    let average = c.with_average_lengths();
    ShapeOrRange {
        now: steady_depth(c),
        average_lengths: steady_depth(&average),
        usual_ranges: steady_depth(&with_usual_ranges(c)),
        both: steady_depth(&with_usual_ranges(&average)),
    }
}
