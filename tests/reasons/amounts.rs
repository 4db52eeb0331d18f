//! The least amount of each single change, put back into what was measured and asked.

use plumbfold_core::{
    Angle, Case, Measures, Rule, Task, posture, readings, sample,
    takes::{Change, Group, Kind, Outcome, Take, takes},
};
use proptest::prelude::*;

use crate::{
    clients::Client,
    near::{case, deg, near},
    put_back::{asking, knee_may_split, many, most, put_back, steady, to_offer},
};

/// Steady depth with an amount put back, degrees; −1 where there is none or the set-up is refused.
fn depth_with(client: &Client, kind: Kind, amount: f64) -> f64 {
    put_back(client, Change { kind, amount }).map_or(-1.0, |c| steady(&c))
}

/// A least amount is enough, and 2 % less is not.
fn is_enough_and_least(client: &Client, take: &Take, amount: f64) {
    let (kind, goal) = (take.kind, client.1.goal.deg());
    let depth = depth_with(client, kind, amount);
    assert!(depth >= goal - 1e-6, "{kind:?} {amount} gives {depth}°, goal {goal}°");
    near("depth as told", take.depth.map_or(-1.0, Angle::deg), depth, 1e-5);
    if amount > 0.0 && !matches!(kind, Kind::Placement(_)) {
        let less = depth_with(client, kind, 0.98 * amount);
        assert!(less < goal, "{kind:?} {amount} is not least: 2 % less gives {less}°, goal {goal}°");
    }
}

/// None of 200 amounts and both ends reaches the goal, and none goes deeper than told where depth has no
/// jumps.
fn is_not_by_itself(client: &Client, take: &Take, at: f64) {
    let (kind, goal) = (take.kind, client.1.goal.deg());
    let told = take.depth.map_or(-1.0, Angle::deg);
    near("depth as told", told, depth_with(client, kind, at), 1e-5);
    let most = most(client, kind);
    assert!(at >= 0.0 && at <= most + 1e-6, "{kind:?} {at} outside 0 to {most}");
    let amounts: Vec<f64> = match kind {
        Kind::Placement(_) => vec![1.0],
        _ => (0..=200).map(|k| most * f64::from(k) / 200.0).collect(),
    };
    let depths: Vec<(f64, f64)> = amounts.into_iter().map(|a| (a, depth_with(client, kind, a))).collect();
    for &(a, depth) in &depths {
        assert!(depth < goal, "{kind:?} {a} gives {depth}°, goal {goal}°: it is enough by itself");
    }
    let deeper = depths.into_iter().find(|(_, depth)| *depth > told + 0.02);
    assert!(
        deeper.is_none() || knee_may_split(client, kind),
        "{kind:?} gives {deeper:?} (amount, depth), told {told}° at {at}"
    );
}

proptest! {
    #![proptest_config(many())]

    /// Every amount makes the goal steady once entered, and 2 % less does not; what is told about the
    /// goal is what the client would read there.
    #[test]
    fn amounts_are_enough_and_least(client in asking()) {
        let c = case(&client.0, &client.1);
        for take in takes(&c).single {
            if let Outcome::Enough { amount } = take.outcome {
                is_enough_and_least(&client, &take, amount);
                prop_assert!(amount >= 0.0 && amount <= most(&client, take.kind) + 1e-6, "{:?}", take);
            }
        }
    }

    /// "Not by itself" holds over the whole range, and nothing in it goes deeper than told.
    #[test]
    fn not_by_itself_over_the_whole_range(client in asking()) {
        let c = case(&client.0, &client.1);
        for take in takes(&c).single {
            if let Outcome::NotByItself { amount } = take.outcome {
                is_not_by_itself(&client, &take, amount);
            }
        }
    }

    /// Each change is offered once, in the order today, weeks, choices.
    #[test]
    fn every_change_is_offered(client in asking()) {
        let single = takes(&case(&client.0, &client.1)).single;
        let kinds: Vec<Kind> = single.iter().map(|t| t.kind).collect();
        prop_assert_eq!(kinds, to_offer(&client));
        let order = |g: Group| match g { Group::Today => 0, Group::Weeks => 1, Group::Choices => 2 };
        prop_assert!(single.windows(2).all(|w| order(w[0].kind.group()) <= order(w[1].kind.group())));
    }

    /// Lean, arms and moments told beside a change are those of the posture at the goal, built anew.
    #[test]
    fn what_is_told_at_the_goal_is_read_there(client in asking()) {
        // the least effort can jump from one posture to another on a rounding
        prop_assume!(client.1.rule != Rule::LeastEffort);
        let c = case(&client.0, &client.1);
        for take in takes(&c).single {
            let change = Change { kind: take.kind, amount: take.outcome.amount() };
            let Ok(changed) = put_back(&client, change) else {
                prop_assert_eq!(take.at_goal, None);
                continue;
            };
            let Some(told) = take.at_goal else {
                // enough, but not told: only a shank held elsewhere
                let held = matches!(client.1.rule, Rule::HeldShank(_));
                prop_assert!(held || take.outcome.enough().is_none(), "{:?}", take);
                continue;
            };
            let there = posture(&changed, client.1.goal);
            let p = there.held().expect("told at the goal");
            let r = readings(&changed, p);
            near("lean", told.lean.deg(), p.trunk.deg(), 1e-4);
            for (what, told, read) in [
                ("knee arm", told.readings.knee_arm_m, r.knee_arm_m),
                ("hip arm", told.readings.hip_arm_m, r.hip_arm_m),
                ("knee", told.readings.moments_nm.knee, r.moments_nm.knee),
                ("hip", told.readings.moments_nm.hip, r.moments_nm.hip),
                ("low back", told.readings.moments_nm.low_back, r.moments_nm.low_back),
            ] {
                near(what, told, read, 1e-4 * (1.0 + read.abs()));
            }
        }
    }
}

/// The properties above would hold of nothing if nothing were ever enough: of these clients each kind
/// is enough for some and not for others, by more than nothing.
#[test]
fn each_kind_is_sometimes_enough() {
    use proptest::{strategy::ValueTree, test_runner::TestRunner};
    let mut runner = TestRunner::new(many());
    let (mut enough, mut not) = (std::collections::HashSet::new(), std::collections::HashSet::new());
    for _ in 0..300 {
        let (m, t) = asking().new_tree(&mut runner).expect("a client").current();
        for take in takes(&case(&m, &t)).single {
            let kind = std::mem::discriminant(&take.kind);
            match take.outcome {
                Outcome::Enough { amount } if amount > 0.0 => enough.insert(kind),
                Outcome::Enough { .. } => false,
                Outcome::NotByItself { .. } => not.insert(kind),
            };
        }
    }
    assert_eq!((enough.len(), not.len()), (8, 8));
}

/// A goal already reached takes nothing of anything that comes in amounts.
#[test]
fn what_is_there_already_takes_nothing() {
    let (m, t): (Measures, Task) = sample::long_thigh_woman();
    let c: Case = case(&m, &Task { goal: deg(70.0), ..t });
    let all = takes(&c);
    assert_eq!(all.pair, None);
    for take in all.single {
        if !matches!(take.kind, Kind::Placement(_)) {
            assert_eq!(take.outcome, Outcome::Enough { amount: 0.0 }, "{:?}", take.kind);
        }
    }
}
