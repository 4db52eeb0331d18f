//! A case: one body, its limits and one task, with everything that does not change while it squats.

use crate::{
    angle::Angle,
    body::{Body, Landmarks},
    bounds::{Bounds, Field, bounds},
    limits::{Limits, Origin},
    measures::{AnkleRange, HipRange, KneeRange},
    measures::{Lengths, Measures, Scope, Sides},
    notice::{Invalid, Notice},
    stand::Stand,
    tables,
    task::{Bend, Rule, Task},
    upper::Upper,
};

/// Body, limits and task, checked; the key of every memo.
#[derive(Clone, Debug, PartialEq)]
pub struct Case {
    pub(crate) measures: Measures,
    pub(crate) task: Task,
    pub(crate) body: Body,
    pub(crate) limits: Limits,
    pub(crate) stand: Stand,
    pub(crate) upper: Upper,
    pub(crate) chain: Chain,
}

/// Coefficients of the whole-body first moment: `M x = feet + knee·x_knee + hip·x_hip + U`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Chain {
    /// Body and load, kg.
    pub mass_kg: f64,
    /// Feet and the ankle ends of the shanks: forward, kg·m.
    pub feet_x: f64,
    /// Feet and the ankle ends of the shanks: up, kg·m.
    pub feet_y: f64,
    /// Mass that goes with the knees, kg.
    pub knee_kg: f64,
    /// Mass that goes with the hips, kg.
    pub hip_kg: f64,
    /// Shank angle of the straight leg at thigh 0.
    pub straight_shank: Angle,
}

impl Chain {
    fn new(body: &Body, stand: &Stand, upper: &Upper) -> Self {
        let (m, s) = (&body.masses, body.segments);
        let ankle_kg = 2.0 * m.shank_kg * s.shank.cm;
        let hip_kg = 2.0 * m.thigh_kg * (1.0 - s.thigh.cm) + upper.mass_kg;
        let side = side_offset(body, stand, Angle::ZERO);
        let level = (body.shank_m * body.shank_m - side * side).max(0.0).sqrt();
        let straight = if level > 0.0 { side * stand.sin_out / (stand.cos_out * level) } else { 0.0 };
        Self {
            mass_kg: 2.0 * (m.foot_kg + m.shank_kg + m.thigh_kg) + upper.mass_kg,
            feet_x: (2.0 * m.foot_kg * stand.foot_cm_s_m + ankle_kg * stand.ankle_s_m) * stand.cos_out,
            feet_y: 2.0 * m.foot_kg * stand.foot_cm_y_m + ankle_kg * stand.ankle_y_m,
            knee_kg: 2.0 * m.shank_kg * (1.0 - s.shank.cm) + 2.0 * m.thigh_kg * s.thigh.cm,
            hip_kg,
            straight_shank: Angle::from_rad(straight.clamp(-1.0, 1.0).asin()),
        }
    }
}

/// Side offset of the knee from the foot's plane at a thigh angle, m: a straight leg shares its
/// side offset between shank and thigh; from thigh level down the knee is over the foot.
pub(crate) fn side_offset(body: &Body, stand: &Stand, thigh: Angle) -> f64 {
    if thigh.rad() >= std::f64::consts::FRAC_PI_2 {
        return 0.0;
    }
    let c = thigh.rad().cos();
    (body.hip_half_m - stand.half_stance_m) * stand.cos_out * body.shank_m / (body.shank_m + body.thigh_m) * c * c
}

impl Case {
    /// Core's only door.
    ///
    /// # Errors
    /// [`Invalid`] where a value is outside its bounds, a knee-to-wall distance cannot be reached by
    /// this foot and shank, or a heel raise would stand the foot on end.
    pub fn new(m: &Measures, t: &Task) -> Result<(Self, Vec<Notice>), Invalid> {
        check(m, t)?;
        let mut notices = notices(m);
        let mut task = t.clone();
        if let Some(cap_kg) = m.caps.load_kg
            && task.load_kg > cap_kg
        {
            notices.push(Notice::LoadCapped { asked_kg: task.load_kg, used_kg: cap_kg });
            task.load_kg = cap_kg;
        }
        if let Some(left) = task.weight_left
            && (left - 0.5).abs() > 1e-9
        {
            notices.push(Notice::WeightUneven { share: left.max(1.0 - left) });
        }
        let body = Body::new(m);
        let limits = Limits::new(&body, m, &task)?;
        let case = Self::assemble(m.clone(), task, body, limits)?;
        if 2.0 * case.stand.half_stance_m > 0.40 * case.body.stature_m {
            notices.push(Notice::WideStance);
        }
        Ok((case, notices))
    }

    /// Puts parts together, trusting that they were checked.
    ///
    /// # Errors
    /// Where a heel raise would stand the foot on end.
    pub(crate) fn assemble(measures: Measures, task: Task, body: Body, limits: Limits) -> Result<Self, Invalid> {
        let stand = Stand::new(&body, &task)?;
        let upper = Upper::new(&body, task.placement, task.load_kg, limits.reach);
        let chain = Chain::new(&body, &stand, &upper);
        Ok(Self { measures, task, body, limits, stand, upper, chain })
    }

    /// The body.
    #[must_use]
    pub const fn body(&self) -> &Body {
        &self.body
    }

    /// The limits as angles.
    #[must_use]
    pub const fn limits(&self) -> &Limits {
        &self.limits
    }

    /// The task, load within its precaution.
    #[must_use]
    pub const fn task(&self) -> &Task {
        &self.task
    }

    /// What was measured.
    #[must_use]
    pub const fn measures(&self) -> &Measures {
        &self.measures
    }

    /// Feet and support.
    #[must_use]
    pub const fn stand(&self) -> &Stand {
        &self.stand
    }

    /// Body and load, kg.
    #[must_use]
    pub const fn mass_kg(&self) -> f64 {
        self.chain.mass_kg
    }

    /// Whether efforts and percentiles are withheld (under 18, pregnant, limb difference).
    #[must_use]
    pub fn figure_only(&self) -> bool {
        figure_only(&self.measures).is_some()
    }

    /// Share of the leg that carries more, 0.5 where even.
    #[must_use]
    pub fn heavier_share(&self) -> f64 {
        self.task.weight_left.map_or(0.5, |left| left.max(1.0 - left))
    }

    /// The slope of the usual shank in force: explicit, else from the squat seen, else assumed.
    #[must_use]
    pub fn usual_slope(&self) -> f64 {
        if let Rule::Usual { slope: Some(slope) } = self.task.rule {
            return slope;
        }
        match self.task.seen {
            Some(seen) if seen.thigh.deg() >= 20.0 => {
                ((seen.shank.deg() - tables::USUAL_SHANK_AT_STANDING_DEG) / seen.thigh.deg()).clamp(0.0, 0.8)
            }
            _ => tables::USUAL_SHANK_PER_THIGH,
        }
    }

    /// The usual shank angle at a thigh angle, capped at what the ankle allows.
    #[must_use]
    pub fn usual_shank(&self, thigh: Angle) -> Angle {
        let usual = tables::USUAL_SHANK_AT_STANDING_DEG + self.usual_slope() * thigh.deg();
        Angle::from_deg(usual).min(self.limits.ankle + self.stand.pitch)
    }

    /// The same task and the same limits **as angles** on average lengths for this stature.
    #[must_use]
    pub fn with_average_lengths(&self) -> Self {
        let mut m = self.measures.clone();
        m.lengths = Lengths::default();
        let body = Body::new(&m);
        // an average foot may be shorter than the client's: a raise at its very limit then stays as it was
        Self::assemble(m, self.task.clone(), body, self.limits).unwrap_or_else(|_| self.clone())
    }

    /// The same client under another set-up.
    ///
    /// # Errors
    /// As [`Case::new`].
    pub fn with_task(&self, t: &Task) -> Result<Self, Invalid> {
        Self::new(&self.measures, t).map(|(case, _)| case)
    }

    /// The same case with other limits.
    #[must_use]
    pub fn with_limits(&self, limits: Limits) -> Self {
        let upper = Upper::new(&self.body, self.task.placement, self.task.load_kg, limits.reach);
        Self { limits, upper, ..self.clone() }
    }
}

fn figure_only(m: &Measures) -> Option<Scope> {
    let asked = [Scope::Under18, Scope::Pregnant, Scope::LimbDifference];
    if let Some(s) = asked.into_iter().find(|s| m.scope.contains(s)) {
        return Some(s);
    }
    m.age_years.filter(|&a| a < 18.0).map(|_| Scope::Under18)
}

fn notices(m: &Measures) -> Vec<Notice> {
    let mut n = Vec::new();
    match m.age_years {
        None => n.push(Notice::AgeUnknown),
        Some(a) if a > 58.0 => n.push(Notice::PastSurveyAge),
        Some(_) => {}
    }
    if let Some(s) = figure_only(m) {
        n.push(Notice::FigureOnly(s));
    }
    let care = [Scope::RecentSurgery, Scope::Osteoporosis, Scope::HighBmi];
    n.extend(care.into_iter().filter(|s| m.scope.contains(s)).map(Notice::Care));
    let share = Landmarks::of(m).acromion_height_m() / m.stature_m;
    // the usual 0.82 (Drillis and Contini 1966 in Winter 2009); ± 0.04 is ours
    if (share - 0.82).abs() > 0.04 {
        n.push(Notice::LengthsUnlikely { share });
    }
    n
}

fn check(m: &Measures, t: &Task) -> Result<(), Invalid> {
    let one = |field: Field, value: f64| {
        let b: &Bounds = bounds(field);
        // a value typed at its bound may come back from radians or metres off by the last bits
        let slip = 1e-9 * (1.0 + b.min.abs().max(b.max.abs()));
        if value.is_finite() && value >= b.min - slip && value <= b.max + slip {
            Ok(())
        } else {
            Err(Invalid::out_of_bounds(b, value))
        }
    };
    let maybe = |field: Field, value: Option<f64>| value.map_or(Ok(()), |v| one(field, v));
    let deg = |field: Field, a: Option<Angle>| maybe(field, a.map(Angle::deg));
    let cm = |field: Field, v: Option<f64>| maybe(field, v.map(|v| v * 100.0));
    let both = |field: Field, s: Sides<Angle>| deg(field, s.left).and_then(|()| deg(field, s.right));
    one(Field::Stature, m.stature_m * 100.0)?;
    one(Field::Mass, m.mass_kg)?;
    maybe(Field::Age, m.age_years)?;
    let l = &m.lengths;
    for (field, value) in [
        (Field::Shank, l.shank_m),
        (Field::Thigh, l.thigh_m),
        (Field::Trunk, l.trunk_m),
        (Field::Foot, l.foot_m),
        (Field::AnkleHeight, l.ankle_height_m),
        (Field::HeelToAnkle, l.heel_to_ankle_m),
        (Field::UpperArm, l.upper_arm_m),
        (Field::Forearm, l.forearm_m),
        (Field::Hand, l.hand_m),
    ] {
        cm(field, value)?;
    }
    match m.ankle {
        AnkleRange::KneeToWall(s) => cm(Field::KneeToWall, s.left).and_then(|()| cm(Field::KneeToWall, s.right))?,
        AnkleRange::Degrees(s) => both(Field::AnkleRange, s)?,
        AnkleRange::NotMeasured => {}
    }
    match m.hip {
        HipRange::PelvisHeld(s) | HipRange::RockBack(s) | HipRange::KneeToChest(s) => both(Field::HipRange, s)?,
        HipRange::NotMeasured => {}
    }
    if let KneeRange::Degrees(s) = m.knee {
        both(Field::KneeRange, s)?;
    }
    one(Field::Reach, m.reach_limit.deg())?;
    deg(Field::KneeRange, m.caps.knee)?;
    deg(Field::HipRange, m.caps.hip)?;
    maybe(Field::Load, m.caps.load_kg)?;
    for factor in [m.strength.ankle, m.strength.knee, m.strength.hip, m.strength.low_back] {
        one(Field::Strength, factor)?;
    }
    one(Field::Load, t.load_kg)?;
    one(Field::Footwear, t.footwear_drop_m * 1000.0)?;
    // a heel raise tried by the solver may add 50 mm to the most a file can hold
    one(Field::HeelRaise, (t.heel_raise_m * 1000.0 - 50.0).max(t.heel_raise_m.min(0.0)))?;
    cm(Field::Stance, t.stance_m)?;
    one(Field::ToeOut, t.toe_out.deg())?;
    if let Bend::Degrees(a) = t.bend {
        one(Field::Bend, a.deg())?;
    }
    deg(Field::Lean, t.lean_limit)?;
    one(Field::Goal, t.goal.deg())?;
    maybe(Field::WeightLeft, t.weight_left.map(|w| w * 100.0))?;
    match t.rule {
        Rule::Usual { slope } => maybe(Field::Slope, slope)?,
        Rule::LeastEffort => {}
        Rule::ArmRatio(r) => one(Field::Ratio, r)?,
        Rule::HeldShank(a) => one(Field::HeldShank, a.deg())?,
    }
    if let Some(seen) = t.seen {
        one(Field::SeenThigh, seen.thigh.deg())?;
        one(Field::SeenShank, seen.shank.deg())?;
        one(Field::SeenTrunk, seen.trunk.deg())?;
    }
    check_support(t)
}

fn check_support(t: &Task) -> Result<(), Invalid> {
    let s = &t.support;
    let b = bounds(Field::SupportFraction);
    let mut last = b.min;
    for value in [s.edge_back, Some(s.zone_back), Some(s.aim), Some(s.zone_front), s.edge_front].into_iter().flatten() {
        if !b.holds(value) {
            return Err(Invalid::out_of_bounds(b, value));
        }
        if value < last {
            return Err(Invalid {
                name: b.name,
                value: format!("{value}"),
                allowed: format!("{last} to 1"),
                hint: "fractions go in rising order: rear edge, zone back, aim, zone front, front edge",
            });
        }
        last = value;
    }
    Ok(())
}

/// Whether a limit is a precaution.
#[must_use]
pub const fn is_precaution(origin: Origin) -> bool {
    matches!(origin, Origin::Precaution)
}
