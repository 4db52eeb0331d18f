//! The best pair of today's changes.

use plumbfold_core::{
    Case,
    takes::{Change, Group, Kind, Pair, Takes, takes},
};
use proptest::prelude::*;

use crate::{
    clients::Client,
    near::{case, near},
    put_back::{asking, entered, knee_may_split, many, most, put_back, steady, twist_at_goal},
};

/// The client with two changes entered one after the other, built anew.
fn with_both(client: &Client, changes: [Change; 2]) -> Option<Case> {
    put_back(client, changes[0]).ok()?;
    put_back(&entered(client, changes[0]), changes[1]).ok()
}

fn widens(changes: &[Change; 2]) -> bool {
    changes.iter().any(|c| c.kind == Kind::WiderStance && c.amount > 0.0)
}

/// Whether two changes make the goal steady with knees and feet pointing together; of the first it is
/// known what it makes of the client.
fn suffices(with_first: &Client, changes: [Change; 2]) -> bool {
    let goal = with_first.1.goal.deg();
    put_back(with_first, changes[1]).is_ok_and(|c| {
        let together = || goal < 30.0 || !widens(&changes) || twist_at_goal(&c).is_some_and(|twist| twist <= 15.0);
        steady(&c) >= goal && together()
    })
}

/// Used share of a change's range; a placement counts 1.
fn share(change: Change, most: f64) -> f64 {
    match change.kind {
        Kind::Placement(_) => 1.0,
        _ if change.amount > 0.0 => change.amount / most,
        _ => 0.0,
    }
}

/// The least share sum on a coarse grid of pairs below a limit.
fn best_on_a_grid(client: &Client, single: &Takes, below: f64) -> Option<(f64, [Change; 2])> {
    let steps = |kind: Kind| {
        let most = most(client, kind);
        (0..=20).map(move |k| Change { kind, amount: most * f64::from(k) / 20.0 }).collect::<Vec<_>>()
    };
    let (heel, stance, weight) = (steps(Kind::HeelRaise), steps(Kind::WiderStance), steps(Kind::Counterweight));
    let held: Vec<Change> = single
        .single
        .iter()
        .filter(|t| matches!(t.kind, Kind::Placement(_)))
        .map(|t| Change { kind: t.kind, amount: 1.0 })
        .collect();
    let mut best: Option<(f64, [Change; 2])> = None;
    for (first, second) in [(&stance, &heel), (&weight, &heel), (&stance, &weight), (&held, &heel), (&held, &stance)] {
        let top = |all: &[Change]| all.last().map_or(0.0, |c| c.amount);
        for &a in first {
            if put_back(client, a).is_err() {
                continue;
            }
            let with_first = entered(client, a);
            for &b in second {
                let sum = share(a, top(first)) + share(b, top(second));
                if sum < best.map_or(below, |b| b.0) && suffices(&with_first, [a, b]) {
                    best = Some((sum, [a, b]));
                }
            }
        }
    }
    best
}

fn holds(client: &Client, pair: &Pair) {
    let goal = client.1.goal.deg();
    let c = with_both(client, pair.changes).expect("the pair can be set up");
    let depth = steady(&c);
    assert!(depth >= goal - 1e-6, "{pair:?} gives {depth}°, goal {goal}°");
    near("depth as told", pair.depth.map_or(-1.0, plumbfold_core::Angle::deg), depth, 1e-5);
    let shares: f64 = pair.changes.iter().map(|&c| share(c, most(client, c.kind))).sum();
    near("share", pair.share, shares, 1e-6);
    for change in pair.changes {
        assert_eq!(change.kind.group(), Group::Today);
        assert!(change.amount >= 0.0 && change.amount <= most(client, change.kind) + 1e-6, "{change:?}");
    }
    let placed = pair.changes.iter().any(|c| matches!(c.kind, Kind::Placement(_)));
    let weighted = pair.changes.iter().any(|c| c.kind == Kind::Counterweight);
    assert!(!(placed && weighted) && pair.changes[0].kind != pair.changes[1].kind, "{pair:?}");
    if goal >= 30.0 && widens(&pair.changes) {
        let twist = twist_at_goal(&c).expect("a posture at the goal");
        assert!(twist <= 15.0 + 1e-6, "{pair:?}: twist {twist}°");
    }
}

proptest! {
    #![proptest_config(many())]

    /// A pair is given only where no single change of today's is enough; it is enough itself, and no
    /// pair on a grid does with a summed share smaller by more than 1 %.
    #[test]
    fn the_best_pair(client in asking()) {
        let all = takes(&case(&client.0, &client.1));
        let alone = all.single.iter().any(|t| t.kind.group() == Group::Today && t.outcome.enough().is_some());
        if alone {
            prop_assert_eq!(all.pair, None);
            return Ok(());
        }
        if let Some(pair) = &all.pair {
            holds(&client, pair);
        }
        let ours = all.pair.as_ref().map_or(f64::INFINITY, |p| 0.99 * p.share);
        let other = best_on_a_grid(&client, &all, ours);
        prop_assert!(
            other.is_none() || knee_may_split(&client, Kind::WiderStance),
            "{:?} against {:?}", other, all.pair
        );
    }
}

/// Pairs do occur among these clients, of each sort.
#[test]
fn pairs_occur() {
    use proptest::{strategy::ValueTree, test_runner::TestRunner};
    let mut runner = TestRunner::new(many());
    let mut kinds = std::collections::HashSet::new();
    for _ in 0..400 {
        let (m, t) = asking().new_tree(&mut runner).expect("a client").current();
        if let Some(pair) = takes(&case(&m, &t)).pair {
            kinds.insert(pair.changes.map(|c| std::mem::discriminant(&c.kind)));
        }
    }
    assert!(kinds.len() >= 3, "{kinds:?}");
}
