//! What it would take to be steady at the goal: the least amount of each single change, and the
//! best pair of today's.

use crate::{
    angle::Angle,
    balance::Balance,
    case::Case,
    depth::{room, steady_depth},
    limits::{LEAN_MAX, Limits, Origin},
    notice::Invalid,
    posture::posture,
    readings::{Readings, readings},
    roots,
    task::{Bend, Placement, Task},
};

/// When a change can be had.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Group {
    /// Today, on the floor.
    Today,
    /// In weeks, uncertain.
    Weeks,
    /// By choosing otherwise.
    Choices,
}

impl Group {
    /// The name used in machine-readable output.
    #[must_use]
    pub const fn key(self) -> &'static str {
        match self {
            Self::Today => "Today",
            Self::Weeks => "Weeks",
            Self::Choices => "Choices",
        }
    }
}

/// One kind of change.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Kind {
    /// More heel raise, mm.
    HeelRaise,
    /// A wider stance, cm more, toes turning out with it.
    WiderStance,
    /// Arms forward holding so many kg in place of the load.
    Counterweight,
    /// Arms and load held another way.
    Placement(Placement),
    /// More ankle range, degrees.
    Ankle,
    /// More hip range, degrees.
    Hip,
    /// More bend allowed, degrees.
    Bend,
    /// More lean allowed, degrees.
    Lean,
}

impl Kind {
    /// Its group.
    #[must_use]
    pub const fn group(self) -> Group {
        match self {
            Self::HeelRaise | Self::WiderStance | Self::Counterweight | Self::Placement(_) => Group::Today,
            Self::Ankle | Self::Hip => Group::Weeks,
            Self::Bend | Self::Lean => Group::Choices,
        }
    }

    /// The name used in machine-readable output.
    #[must_use]
    pub fn key(self) -> String {
        match self {
            Self::HeelRaise => "HeelRaise".to_owned(),
            Self::WiderStance => "WiderStance".to_owned(),
            Self::Counterweight => "Counterweight".to_owned(),
            Self::Placement(p) => format!("Placement:{}", p.key()),
            Self::Ankle => "Ankle".to_owned(),
            Self::Hip => "Hip".to_owned(),
            Self::Bend => "Bend".to_owned(),
            Self::Lean => "Lean".to_owned(),
        }
    }

    /// The unit of its amount; none for a placement, which is taken whole.
    #[must_use]
    pub const fn unit(self) -> &'static str {
        match self {
            Self::HeelRaise => "mm",
            Self::WiderStance => "cm",
            Self::Counterweight => "kg",
            Self::Placement(_) => "",
            Self::Ankle | Self::Hip | Self::Bend | Self::Lean => "deg",
        }
    }
}

/// A change by an amount in its unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Change {
    /// Which kind.
    pub kind: Kind,
    /// How much, in the kind's unit; 1 for a placement.
    pub amount: f64,
}

impl Change {
    /// The same change as a person sets it, never less: wedges to the next 5 mm, stances to the next
    /// whole centimetre of width, counterweights to the next half kilogram, angles to the next degree.
    #[must_use]
    pub fn as_set(&self, c: &Case) -> Self {
        let up = |v: f64, to: f64| ((v / to - 1e-6).ceil() * to).max(0.0);
        let amount = match self.kind {
            Kind::HeelRaise => up(self.amount, 5.0),
            Kind::WiderStance => {
                let now_cm = 200.0 * c.stand.half_stance_m;
                up(now_cm + self.amount, 1.0) - now_cm
            }
            Kind::Counterweight => up(self.amount, 0.5),
            Kind::Placement(_) => self.amount,
            Kind::Ankle | Kind::Hip | Kind::Bend | Kind::Lean => up(self.amount, 1.0),
        };
        Self { amount, ..*self }
    }
}

/// Whether a change is enough.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Outcome {
    /// This much, and no less, makes the goal steady.
    Enough {
        /// Least amount, in the kind's unit.
        amount: f64,
    },
    /// No amount within the range does; the greatest steady depth anywhere in it.
    NotByItself {
        /// The amount of that depth.
        amount: f64,
    },
}

impl Outcome {
    /// The amount: the least that is enough, else that of the greatest depth.
    #[must_use]
    pub const fn amount(&self) -> f64 {
        match self {
            Self::Enough { amount } | Self::NotByItself { amount } => *amount,
        }
    }

    /// The least amount, where one is enough.
    #[must_use]
    pub const fn enough(&self) -> Option<f64> {
        match self {
            Self::Enough { amount } => Some(*amount),
            Self::NotByItself { .. } => None,
        }
    }
}

/// The posture at the goal after a change.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AtGoal {
    /// Trunk lean.
    pub lean: Angle,
    /// Arms and moments.
    pub readings: Readings,
}

/// One change with what it does.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Take {
    /// The change.
    pub kind: Kind,
    /// Whether it is enough.
    pub outcome: Outcome,
    /// The steady depth at that amount.
    pub depth: Option<Angle>,
    /// The posture at the goal at that amount, where it holds.
    pub at_goal: Option<AtGoal>,
}

/// Two of today's changes together.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pair {
    /// The changes.
    pub changes: [Change; 2],
    /// Sum of the used shares of their ranges.
    pub share: f64,
    /// The steady depth with both.
    pub depth: Option<Angle>,
    /// The posture at the goal with both, where it holds.
    pub at_goal: Option<AtGoal>,
}

/// All changes, and the best pair where no single one of today's suffices.
#[derive(Clone, Debug, PartialEq)]
pub struct Takes {
    /// Single changes: today, weeks, choices.
    pub single: Vec<Take>,
    /// The pair.
    pub pair: Option<Pair>,
}

/// Most heel raise added, mm.
pub const HEEL_MORE_MM: f64 = 50.0;
/// Widest stance, fraction of stature.
pub const STANCE_TO: f64 = 0.36;
/// Toe-out gained per centimetre of widening, degrees (assumed).
pub const TOE_OUT_PER_CM: f64 = 0.5;
/// Most toe-out that widening brings, degrees.
pub const TOE_OUT_TO: f64 = 35.0;
/// Heaviest counterweight, kg.
pub const COUNTERWEIGHT_TO_KG: f64 = 10.0;
/// Most range hoped for in weeks, degrees.
pub const RANGE_MORE_DEG: f64 = 10.0;
/// Most twist between knees and feet at the widest stance.
const TWIST_TO: Angle = Angle::from_deg(15.0);
/// From this goal on the twist counts.
const TWIST_FROM: Angle = Angle::from_deg(30.0);
/// Samples of an amount's range; between them crossings are bracketed and peaks followed.
const SAMPLES: usize = 24;

impl Case {
    /// The case after a change.
    ///
    /// # Errors
    /// As [`Case::new`], where the change does not go with the task (a heel raise the foot cannot take).
    pub fn changed(&self, change: &Change) -> Result<Self, Invalid> {
        let t = &self.task;
        let a = change.amount;
        let task = |task: Task| Self::assemble(self.measures.clone(), task, self.body.clone(), self.limits);
        let limits = |limits: Limits| Ok(self.with_limits(limits));
        let l = self.limits;
        let more = Angle::from_deg(a);
        match change.kind {
            Kind::HeelRaise => task(Task { heel_raise_m: t.heel_raise_m + a / 1000.0, ..t.clone() }),
            Kind::WiderStance => task(Task {
                stance_m: Some(2.0 * self.stand.half_stance_m + a / 100.0),
                toe_out: toe_out_with(t.toe_out, a),
                ..t.clone()
            }),
            Kind::Counterweight => task(Task { placement: Placement::ArmsForward, load_kg: a, ..t.clone() }),
            Kind::Placement(p) => {
                let load_kg = if p == Placement::ArmsCrossed { 0.0 } else { t.load_kg };
                task(Task { placement: p, load_kg, ..t.clone() })
            }
            Kind::Ankle => limits(Limits { ankle: l.ankle + more, ..l }),
            Kind::Hip => limits(Limits { hip: l.hip + more, ..l }),
            Kind::Bend => {
                let bend = l.bend + more;
                let changed = self.with_limits(Limits { bend, ..l });
                Ok(Self { task: Task { bend: Bend::Degrees(bend), ..t.clone() }, ..changed })
            }
            Kind::Lean => {
                let lean = l.lean + more;
                let changed = self.with_limits(Limits { lean, ..l });
                Ok(Self { task: Task { lean_limit: Some(lean), ..t.clone() }, ..changed })
            }
        }
    }
}

/// Toe-out after widening: the larger of the present and the present with half a degree a
/// centimetre, capped at 35°.
#[must_use]
pub fn toe_out_with(present: Angle, widening_cm: f64) -> Angle {
    present.max(Angle::from_deg((present.deg() + TOE_OUT_PER_CM * widening_cm).min(TOE_OUT_TO)))
}

/// The changes on offer and the ends of their ranges.
fn offered(c: &Case) -> Vec<(Kind, f64)> {
    let t = &c.task;
    let l = &c.limits;
    let cap_kg = c.measures.caps.load_kg.unwrap_or(f64::INFINITY);
    let mut all = vec![
        (Kind::HeelRaise, HEEL_MORE_MM),
        (Kind::WiderStance, widest(c)),
        (Kind::Counterweight, COUNTERWEIGHT_TO_KG.min(cap_kg)),
    ];
    for p in Placement::ALL {
        let same = p == t.placement && (p != Placement::ArmsCrossed || t.load_kg == 0.0);
        if !same {
            all.push((Kind::Placement(p), 1.0));
        }
    }
    all.push((Kind::Ankle, RANGE_MORE_DEG));
    all.push((Kind::Hip, hip_more(c)));
    let bend_more = Bend::Free.available().deg() - l.bend.deg();
    if bend_more > 0.0 {
        all.push((Kind::Bend, bend_more));
    }
    if t.lean_limit.is_some() {
        all.push((Kind::Lean, (LEAN_MAX.deg() - l.lean.deg()).max(0.0)));
    }
    all
}

/// Hip range that may be hoped for without passing a precaution, degrees.
fn hip_more(c: &Case) -> f64 {
    if c.limits.hip_from == Origin::Precaution {
        return 0.0;
    }
    c.measures.caps.hip.map_or(RANGE_MORE_DEG, |cap| RANGE_MORE_DEG.min((cap - c.limits.hip).deg().max(0.0)))
}

/// How much wider the stance may become, cm: to 0.36 of stature, and for a goal of 30° or more only
/// as far as knees and feet point within 15° of each other at the goal.
fn widest(c: &Case) -> f64 {
    let most = (100.0 * (STANCE_TO * c.body.stature_m - 2.0 * c.stand.half_stance_m)).max(0.0);
    if c.task.goal < TWIST_FROM {
        return most;
    }
    let over = |cm: f64| twist_at_goal(c, cm).map_or(f64::NAN, |t| (t - TWIST_TO).rad());
    if over(most) <= 0.0 {
        return most;
    }
    let at = |k: usize| most * k as f64 / SAMPLES as f64;
    for k in (0..SAMPLES).rev() {
        let f = over(at(k));
        if f <= 0.0 {
            // bisection on "points together", so that a stance without a posture counts as too wide
            let (mut low, mut high) = (at(k), at(k + 1));
            for _ in 0..50 {
                let mid = 0.5 * (low + high);
                if over(mid) <= 0.0 { low = mid } else { high = mid }
            }
            return low;
        }
    }
    0.0
}

fn twist_at_goal(c: &Case, widening_cm: f64) -> Option<Angle> {
    let wider = c.changed(&Change { kind: Kind::WiderStance, amount: widening_cm }).ok()?;
    posture(&wider, c.task.goal).posture().map(|p| p.twist)
}

/// Room at the goal after a change; negative where it is not steady there.
fn room_at_goal(c: &Case, change: &Change) -> f64 {
    c.changed(change).map_or(-1.0, |case| {
        let s = case.stand.support;
        room(&case, case.task.goal, s.zone_back_m, s.zone_front_m)
    })
}

/// Whether the goal is reached after a change, to rounding, from standing without a gap.
fn reaches(c: &Case, change: &Change) -> bool {
    c.changed(change).is_ok_and(|case| steady_depth(&case).is_some_and(|d| d.deg() >= c.task.goal.deg() - 1e-7))
}

/// The least amount in `0..=most` that is enough.
///
/// Room at the goal is followed over the range: crossings are bracketed, peaks between samples
/// followed to their top. Each crossing is then proved by the depth itself, since a gap further up
/// may stand in the way.
fn least_amount(c: &Case, kind: Kind, most: f64) -> Option<f64> {
    let change = |amount: f64| Change { kind, amount };
    if matches!(kind, Kind::Placement(_)) {
        return reaches(c, &change(1.0)).then_some(1.0);
    }
    let f = |a: f64| room_at_goal(c, &change(a));
    if reaches(c, &change(0.0)) {
        return Some(0.0);
    }
    if most <= 0.0 {
        return None;
    }
    let at = |k: usize| most * k as f64 / SAMPLES as f64;
    let (mut before, mut last) = (None, (0.0, f(0.0)));
    for k in 1..=SAMPLES {
        let here = (at(k), f(at(k)));
        let crossing = if last.1 < 0.0 && here.1 >= 0.0 {
            Some(up(&f, last, here))
        } else {
            let peak: Option<(f64, f64)> =
                before.filter(|b: &(f64, f64)| last.1 < 0.0 && here.1 < 0.0 && last.1 >= b.1 && last.1 >= here.1);
            peak.and_then(|b| {
                let (top, minus) = roots::least(|a| -f(a), b.0, here.0, 1e-9);
                (-minus >= 0.0).then(|| up(&f, b, (top, -minus)))
            })
        };
        if let Some(a) = crossing {
            if reaches(c, &change(a)) {
                return Some(a);
            }
            // steady there, but not from standing on: look on for where the gap closes
            if let Some(a) = beyond_gap(c, kind, a, most) {
                return Some(a);
            }
        }
        before = Some(last);
        last = here;
    }
    None
}

/// The feasible end of a bracketed crossing.
fn up(f: &impl Fn(f64) -> f64, low: (f64, f64), high: (f64, f64)) -> f64 {
    let a = roots::bracketed_from(f, low, high, 1e-10);
    if f(a) >= 0.0 { a } else { (a + 2e-10 * (1.0 + a.abs())).min(high.0) }
}

fn beyond_gap(c: &Case, kind: Kind, from: f64, most: f64) -> Option<f64> {
    let good = |amount: f64| reaches(c, &Change { kind, amount });
    let mut last = from;
    for k in 1..=SAMPLES {
        let here = from + (most - from) * k as f64 / SAMPLES as f64;
        if good(here) {
            let (mut low, mut high) = (last, here);
            for _ in 0..45 {
                let mid = 0.5 * (low + high);
                if good(mid) { high = mid } else { low = mid }
            }
            // where a gap closes the depth jumps: a hair more, so that rounding on the way through a
            // file does not open it again
            let safe = (high + 1e-9 * most).min(most);
            return Some(if good(safe) { safe } else { high });
        }
        last = here;
    }
    None
}

/// The amount of the greatest steady depth in a range.
fn deepest_amount(c: &Case, kind: Kind, most: f64) -> f64 {
    if matches!(kind, Kind::Placement(_)) {
        return 1.0;
    }
    let f = |amount: f64| {
        let depth = c.changed(&Change { kind, amount }).ok().and_then(|case| steady_depth(&case));
        depth.map_or(0.0, |d| -d.rad())
    };
    if most <= 0.0 {
        return 0.0;
    }
    if kind.group() != Group::Today && kind != Kind::Ankle {
        // easing one of these never loses depth; more ankle can, where the knee limit leaves two pieces
        return most;
    }
    let n = SAMPLES / 2;
    let at = |k: usize| if k == n { most } else { most * k as f64 / n as f64 };
    let values: Vec<f64> = (0..=n).map(|k| f(at(k))).collect();
    let best = (0..=n).min_by(|a, b| values[*a].total_cmp(&values[*b])).unwrap_or(0);
    // at an end of the range, a look just inside tells whether the peak lies there
    let inside = if best == 0 { 0.01 * most } else { 0.99 * most };
    if (best == 0 || best == n) && f(inside) >= values[best] {
        return at(best);
    }
    let (low, high) = (at(best.saturating_sub(1)), at((best + 1).min(n)));
    let (x, value) = roots::least(f, low, high, 1e-4 * most);
    if value < values[best] { x } else { at(best) }
}

fn at_goal(case: &Case) -> Option<AtGoal> {
    let balance: Balance = posture(case, case.task.goal);
    balance.held().map(|p| AtGoal { lean: p.trunk, readings: readings(case, p) })
}

/// Every single change, and the best pair where no single one of today's is enough.
#[must_use]
pub fn takes(c: &Case) -> Takes {
    let offered = offered(c);
    let single: Vec<Take> = offered
        .iter()
        .map(|&(kind, most)| {
            let outcome = match least_amount(c, kind, most) {
                Some(amount) => Outcome::Enough { amount },
                None => Outcome::NotByItself { amount: deepest_amount(c, kind, most) },
            };
            let case = c.changed(&Change { kind, amount: outcome.amount() }).ok();
            Take {
                kind,
                outcome,
                depth: case.as_ref().and_then(steady_depth),
                at_goal: case.as_ref().and_then(at_goal),
            }
        })
        .collect();
    let alone = single.iter().any(|t| t.kind.group() == Group::Today && t.outcome.enough().is_some());
    let pair = if alone { None } else { best_pair(c, &offered) };
    Takes { single, pair }
}

/// The pair of today's changes with the least sum of used shares of range.
fn best_pair(c: &Case, offered: &[(Kind, f64)]) -> Option<Pair> {
    let most = |kind: Kind| offered.iter().find(|o| o.0 == kind).map_or(0.0, |o| o.1);
    let (heel, stance, weight) = (most(Kind::HeelRaise), most(Kind::WiderStance), most(Kind::Counterweight));
    let mut best: Option<([Change; 2], f64)> = None;
    let better = |found: Option<([Change; 2], f64)>, best: Option<([Change; 2], f64)>| match (found, best) {
        (Some(f), Some(b)) if f.1 >= b.1 => Some(b),
        (found, best) => found.or(best),
    };
    for (outer, inner) in [
        ((Kind::WiderStance, stance), (Kind::HeelRaise, heel)),
        ((Kind::WiderStance, stance), (Kind::Counterweight, weight)),
        ((Kind::Counterweight, weight), (Kind::HeelRaise, heel)),
    ] {
        best = better(least_pair(c, outer, inner), best);
    }
    // a placement counts 1 by itself: it cannot be part of a pair better than that
    let placements = offered.iter().filter(|o| matches!(o.0, Kind::Placement(_)));
    for &(kind, _) in placements {
        if best.is_some_and(|b| b.1 <= 1.0) {
            break;
        }
        let held = Change { kind, amount: 1.0 };
        let Ok(case) = c.changed(&held) else { continue };
        for (other, most) in [(Kind::HeelRaise, heel), (Kind::WiderStance, stance)] {
            if most > 0.0
                && let Some(amount) = least_amount(&case, other, most)
                && points_together(&case, other, amount)
            {
                best = better(Some(([held, Change { kind: other, amount }], 1.0 + amount / most)), best);
            }
        }
    }
    let (changes, share) = best?;
    let case = c.changed(&changes[0]).ok()?.changed(&changes[1]).ok()?;
    Some(Pair { changes, share, depth: steady_depth(&case), at_goal: at_goal(&case) })
}

/// Whether knees and feet still point together at the goal after a wider stance.
fn points_together(c: &Case, kind: Kind, amount: f64) -> bool {
    if kind != Kind::WiderStance || c.task.goal < TWIST_FROM {
        return true;
    }
    twist_at_goal(c, amount).is_some_and(|t| t <= TWIST_TO)
}

/// Of two continuous changes, the amounts of least summed share that are enough together: the outer
/// one sampled and refined, the inner one least for each.
fn least_pair(c: &Case, outer: (Kind, f64), inner: (Kind, f64)) -> Option<([Change; 2], f64)> {
    if outer.1 <= 0.0 || inner.1 <= 0.0 {
        return None;
    }
    let inner_least = |a: f64| -> Option<f64> {
        let case = c.changed(&Change { kind: outer.0, amount: a }).ok()?;
        let least = crossing_to(&case, inner.0, inner.1)?;
        if outer.0 == Kind::WiderStance && c.task.goal >= TWIST_FROM {
            let both = case.changed(&Change { kind: inner.0, amount: least }).ok()?;
            let twist = posture(&both, c.task.goal).posture().map(|p| p.twist)?;
            if twist > TWIST_TO {
                return None;
            }
        }
        Some(least)
    };
    let pair = |a: f64, b: f64| [Change { kind: outer.0, amount: a }, Change { kind: inner.0, amount: b }];
    // the depth itself decides: a gap further up rules a pair out
    let proved = |a: f64, b: f64| c.changed(&pair(a, b)[0]).is_ok_and(|case| reaches(&case, &pair(a, b)[1]));
    let found = least_sum(outer.1, inner.1, inner_least)?;
    let (a, b, share) = if proved(found.0, found.1) {
        found
    } else {
        least_sum(outer.1, inner.1, |a| inner_least(a).filter(|&b| proved(a, b)))?
    };
    Some((pair(a, b), share))
}

/// Of the outer amounts the one with the least summed share, with its inner amount: sampled, then refined.
fn least_sum(outer: f64, inner: f64, least: impl Fn(f64) -> Option<f64>) -> Option<(f64, f64, f64)> {
    // infeasible pairs count as more than any sum, falling with the outer amount
    let sum = |a: f64| least(a).map_or(3.0 - a / outer, |b| a / outer + b / inner);
    let n = SAMPLES / 2;
    let at = |k: usize| outer * k as f64 / n as f64;
    let values: Vec<f64> = (0..=n).map(|k| sum(at(k))).collect();
    let k = (0..=n).min_by(|a, b| values[*a].total_cmp(&values[*b]))?;
    if values[k] > 2.0 {
        return None;
    }
    let (x, value) = roots::least(sum, at(k.saturating_sub(1)), at((k + 1).min(n)), 1e-5 * outer);
    let (a, share) = if value < values[k] { (x, value) } else { (at(k), values[k]) };
    Some((a, least(a)?, share))
}

/// The least amount that gives room at the goal; one bracket where room grows over the range.
fn crossing_to(c: &Case, kind: Kind, most: f64) -> Option<f64> {
    let f = |amount: f64| room_at_goal(c, &Change { kind, amount });
    let (low, high) = (f(0.0), f(most));
    if low >= 0.0 {
        return Some(0.0);
    }
    if high >= 0.0 {
        return Some(up(&f, (0.0, low), (most, high)));
    }
    let mid = f(0.5 * most);
    if mid >= 0.0 {
        return Some(up(&f, (0.0, low), (0.5 * most, mid)));
    }
    None
}
