//! A change put back where a person would enter it: into what was measured and what is asked, from
//! which a case is built anew. And the ranges in which amounts are looked for, written once more.

use plumbfold_core::{
    Angle, Bend, Case, Field, Invalid, Limits, Measures, Notice, Placement, Sides, Task, bounds, depths,
    measures::{AnkleRange, HipRange},
    posture, tables,
    takes::{Change, Kind},
};
use proptest::{prelude::*, test_runner::Config};

use crate::{
    brute::knee_may_split_the_shanks,
    clients::{self, Client},
    explicit::Inputs,
    near::{case, config, deg},
};

/// 500 clients, or one in twenty of `PLUMBFOLD_CASES` where that is more.
pub fn many() -> Config {
    let few = config(20);
    Config { cases: few.cases.max(500), max_shrink_iters: 200, ..few }
}

/// A plausible client whose goal lies somewhat above or, more often, below the steady depth: where
/// "what would it take" is asked.
pub fn asking() -> impl Strategy<Value = Client> {
    (clients::plausible(), -5.0..45.0_f64).prop_map(|((m, mut t), beyond)| {
        let depth = Case::new(&m, &t).ok().and_then(|(c, _)| depths(&c).steady);
        if let Some(d) = depth {
            t.goal = deg((d.deg() + beyond).clamp(0.0, 140.0));
        }
        (m, t)
    })
}

/// Steady depth in degrees, −1 where there is none.
pub fn steady(c: &Case) -> f64 {
    depths(c).steady.map_or(-1.0, Angle::deg)
}

/// Width between the ankle centres, m.
fn width_m(m: &Measures, t: &Task) -> f64 {
    t.stance_m.unwrap_or(2.0 * tables::HIP_HALF_SPACING * m.stature_m)
}

fn on_both_sides(a: Angle) -> Sides<Angle> {
    Sides { left: Some(a), right: Some(a) }
}

/// Enters a change.
pub fn entered((m, t): &Client, change: Change) -> Client {
    let (mut m, mut t) = (m.clone(), t.clone());
    let a = change.amount;
    let more = |limit: fn(&Limits) -> Angle| deg(limit(case(&m, &t).limits()).deg() + a);
    match change.kind {
        Kind::HeelRaise => t.heel_raise_m += a / 1000.0,
        Kind::WiderStance => {
            t.stance_m = Some(width_m(&m, &t) + a / 100.0);
            // half a degree a centimetre, up to 35°; toes that point out more already stay
            t.toe_out = deg(t.toe_out.deg().max((t.toe_out.deg() + 0.5 * a).min(35.0)));
        }
        Kind::Counterweight => {
            t.placement = Placement::ArmsForward;
            t.load_kg = a;
        }
        Kind::Placement(p) => {
            t.placement = p;
            if p == Placement::ArmsCrossed {
                t.load_kg = 0.0;
            }
        }
        Kind::Ankle => m.ankle = AnkleRange::Degrees(on_both_sides(more(|l| l.ankle))),
        Kind::Hip => m.hip = HipRange::PelvisHeld(on_both_sides(more(|l| l.hip))),
        Kind::Bend => t.bend = Bend::Degrees(deg(t.bend.available().deg() + a)),
        Kind::Lean => t.lean_limit = t.lean_limit.map(|l| deg(l.deg() + a)),
    }
    (m, t)
}

/// The client with a change entered, built anew. An ankle range beyond what a file holds (60°) goes
/// into the limits instead.
pub fn put_back(client: &Client, change: Change) -> Result<Case, Invalid> {
    let (m, t) = entered(client, change);
    if change.kind == Kind::Ankle {
        let before = case(&client.0, &client.1);
        let ankle = deg(before.limits().ankle.deg() + change.amount);
        if ankle.deg() > bounds(Field::AnkleRange).max {
            let mut limits = *before.limits();
            limits.ankle = ankle;
            return Ok(before.with_limits(limits));
        }
    }
    let (c, notices) = Case::new(&m, &t)?;
    // the last bit of a number may go
    let capped =
        |n: &&Notice| matches!(n, Notice::LoadCapped { asked_kg, used_kg } if *asked_kg > used_kg * (1.0 + 1e-12));
    if matches!(change.kind, Kind::Counterweight) {
        assert_eq!(notices.iter().find(capped), None, "a counterweight within the precaution");
    }
    Ok(c)
}

/// The most of a kind that is looked for, in its unit; a placement is taken whole.
pub fn most(client: &Client, kind: Kind) -> f64 {
    let (m, t) = client;
    let cap = |cap: Option<f64>| cap.unwrap_or(f64::INFINITY);
    match kind {
        Kind::HeelRaise => 50.0,
        Kind::WiderStance => widest(client),
        Kind::Counterweight => cap(m.caps.load_kg).min(10.0),
        Kind::Placement(_) => 1.0,
        Kind::Ankle => 10.0,
        Kind::Hip => {
            let hip = case(m, t).limits().hip.deg();
            (cap(m.caps.hip.map(Angle::deg)) - hip).clamp(0.0, 10.0)
        }
        Kind::Bend => 45.0 - t.bend.available().deg(),
        Kind::Lean => t.lean_limit.map_or(0.0, |l| 85.0 - l.deg()),
    }
}

/// Twist between knee and foot at the goal in degrees, where there is a posture.
pub fn twist_at_goal(c: &Case) -> Option<f64> {
    posture(c, c.task().goal).posture().map(|p| p.twist.deg())
}

/// How much wider the stance may become, cm: to 0.36 of stature; for a goal of 30° and more to the
/// widest whose posture at the goal has a twist of at most 15°, found from the wide end in steps of a
/// hundredth.
fn widest(client: &Client) -> f64 {
    let (m, t) = client;
    let most = (100.0 * (0.36 * m.stature_m - width_m(m, t))).max(0.0);
    if t.goal.deg() < 30.0 {
        return most;
    }
    let good = |amount: f64| {
        put_back(client, Change { kind: Kind::WiderStance, amount })
            .ok()
            .and_then(|c| twist_at_goal(&c))
            .is_some_and(|twist| twist <= 15.0)
    };
    let at = |k: u32| most * f64::from(k) / 100.0;
    match (0..=100).rev().find(|&k| good(at(k))) {
        None => 0.0,
        Some(100) => most,
        Some(k) => {
            let (mut yes, mut no) = (at(k), at(k + 1));
            for _ in 0..60 {
                let mid = 0.5 * (yes + no);
                if good(mid) { yes = mid } else { no = mid }
            }
            yes
        }
    }
}

/// Every kind that is to be offered, in the order of its group.
pub fn to_offer((m, t): &Client) -> Vec<Kind> {
    let mut kinds = vec![Kind::HeelRaise, Kind::WiderStance, Kind::Counterweight];
    // the load as used: a precaution may take it to nothing
    let load_kg = case(m, t).task().load_kg;
    let same = |p: Placement| p == t.placement && (p != Placement::ArmsCrossed || load_kg == 0.0);
    kinds.extend(Placement::ALL.into_iter().filter(|&p| !same(p)).map(Kind::Placement));
    kinds.extend([Kind::Ankle, Kind::Hip]);
    if t.bend.available().deg() < 45.0 {
        kinds.push(Kind::Bend);
    }
    if t.lean_limit.is_some() {
        kinds.push(Kind::Lean);
    }
    kinds
}

/// Whether the knee limit may leave two pieces of shank angles somewhere in the range of a change: the
/// model counts the upper one, which comes into being at a stroke as stance or ankle change, so that
/// depth jumps there and a few samples of an amount do not find its peak.
pub fn knee_may_split(client: &Client, kind: Kind) -> bool {
    if !matches!(kind, Kind::HeelRaise | Kind::WiderStance | Kind::Ankle) {
        return knee_may_split_the_shanks(&Inputs::from(&case(&client.0, &client.1)));
    }
    let most = most(client, kind);
    [0.0, 0.5 * most, most].into_iter().any(|amount| {
        put_back(client, Change { kind, amount }).is_ok_and(|c| knee_may_split_the_shanks(&Inputs::from(&c)))
    })
}
