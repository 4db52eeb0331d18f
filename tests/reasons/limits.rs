//! What stops the squat: each limit lifted anew, and precautions.

use plumbfold_core::{
    Angle, Case, Limits, Origin, depths,
    measures::Caps,
    posture, sample,
    stops::{Edge, Limit, Stop, stopped},
    takes::{Change, takes},
};
use proptest::prelude::*;

use crate::{
    clients::{self, Client},
    near::{case, deg, near},
    put_back::{asking, entered, many, put_back},
};

/// Limits that are angles, by their own names.
const ANGLES: [Limit; 5] = [Limit::Ankle, Limit::Hip, Limit::Knee, Limit::Bend, Limit::Lean];

fn depth(c: &Case, edge: Edge) -> Option<f64> {
    let d = depths(c);
    match edge {
        Edge::Steady => d.steady,
        Edge::Balance => d.balance,
    }
    .map(Angle::deg)
}

/// One limit set to another value.
fn with(c: &Case, limit: Limit, to: impl Fn(Angle) -> Angle) -> Case {
    let mut l: Limits = *c.limits();
    let one = match limit {
        Limit::Ankle => &mut l.ankle,
        Limit::Hip | Limit::CapHip => &mut l.hip,
        Limit::Knee | Limit::CapKnee => &mut l.knee,
        Limit::Bend => &mut l.bend,
        Limit::Lean => &mut l.lean,
        Limit::Support | Limit::Stance => return c.clone(),
    };
    *one = to(*one);
    c.with_limits(l)
}

/// The value that no longer limits.
fn lifted(limit: Limit) -> Angle {
    deg(match limit {
        Limit::Ankle | Limit::Lean => 89.0,
        Limit::Knee | Limit::CapKnee => 180.0,
        _ => 179.0,
    })
}

/// The name a limit goes by: that of the precaution where one is in force.
fn name(c: &Case, limit: Limit) -> Limit {
    match limit {
        Limit::Hip if c.limits().hip_from == Origin::Precaution => Limit::CapHip,
        Limit::Knee if c.limits().knee_from == Origin::Precaution => Limit::CapKnee,
        other => other,
    }
}

/// The depth with a limit lifted alone; the support to the back of the heel and the tip of the toes.
fn without((m, t): &Client, c: &Case, limit: Limit, edge: Edge) -> Option<f64> {
    if limit != Limit::Support {
        return depth(&with(c, limit, |_| lifted(limit)), edge);
    }
    let mut whole = t.clone();
    (whole.support.edge_back, whole.support.edge_front) = (Some(0.0), Some(1.0));
    depth(&case(m, &whole), edge)
}

fn told(stops: &[Stop], limit: Limit) -> Option<&Stop> {
    stops.iter().find(|s| s.limit == limit)
}

fn lifting_agrees(client: &Client, edge: Edge) {
    let c = case(&client.0, &client.1);
    let s = stopped(&c, edge);
    let now = depth(&c, edge);
    assert_eq!(s.depth.map(Angle::deg), now);
    let Some(now) = now else {
        assert!(s.stops.is_empty());
        return;
    };
    let mut all = ANGLES.to_vec();
    if edge == Edge::Balance {
        all.push(Limit::Support);
    }
    let gains = |limit: Limit| without(client, &c, limit, edge).map_or(0.0, |w| w - now);
    let any_alone = all.iter().any(|&l| gains(l) >= 0.5);
    for limit in all {
        let stop = told(&s.stops, name(&c, limit));
        let gain = gains(limit);
        match stop {
            Some(stop) if stop.alone => assert!(gain >= 0.5, "{limit:?} is named and gives {gain}° more"),
            _ => assert!(gain < 0.5, "{limit:?} is not named by itself and gives {gain}° more"),
        }
        if let Some(w) = stop.and_then(|s| s.without) {
            near("without", w.deg() - now, gain, 1e-6);
        }
    }
    for stop in &s.stops {
        assert_eq!(stop.alone, any_alone, "alone where one by itself gives more, else together: {:?}", s.stops);
        let lifts = stop.alone && !stop.limit.is_precaution();
        assert_eq!(stop.without.is_some(), lifts, "{stop:?}");
        assert!(stop.worth.is_finite());
    }
    assert!(s.stops.windows(2).all(|w| w[0].worth >= w[1].worth), "worth most first: {:?}", s.stops);
}

/// What one degree is worth, between a twentieth less and a twentieth more.
fn worth_agrees(client: &Client, edge: Edge) {
    let c = case(&client.0, &client.1);
    for stop in stopped(&c, edge).stops.iter().filter(|s| !matches!(s.limit, Limit::Support | Limit::Stance)) {
        let moved = |by: f64| depth(&with(&c, stop.limit, |a| deg(a.deg() + by)), edge);
        if let (Some(less), Some(more)) = (moved(-0.05), moved(0.05)) {
            near("worth of a degree", stop.worth, (more - less) / 0.1, 1e-5);
        }
    }
}

proptest! {
    #![proptest_config(many())]

    /// Each limit that is named gives half a degree or more once lifted, no other does; where none
    /// does by itself those named act together.
    #[test]
    fn named_limits_and_no_others_give_more(client in clients::plausible()) {
        lifting_agrees(&client, Edge::Steady);
        lifting_agrees(&client, Edge::Balance);
    }

    #[test]
    fn worth_is_a_slope(client in clients::plausible()) {
        worth_agrees(&client, Edge::Steady);
        worth_agrees(&client, Edge::Balance);
    }

    /// No suggestion bends knee or hip at the goal past a precaution, or loads more than one allows.
    #[test]
    fn no_suggestion_passes_a_precaution(
        client in asking(),
        (knee, hip, load) in (60.0..140.0, 60.0..130.0, 0.0..12.0),
    ) {
        let (mut m, t) = client;
        m.caps = Caps { knee: Some(deg(knee)), hip: Some(deg(hip)), load_kg: Some(load) };
        let client = (m, t);
        let all = takes(&case(&client.0, &client.1));
        let within = |c: &Case, what: &dyn std::fmt::Debug| {
            assert!(c.task().load_kg <= load + 1e-9, "{what:?}");
            assert!(c.limits().knee.deg() <= knee + 1e-9 && c.limits().hip.deg() <= hip + 1e-9, "{what:?}");
            if let Some(p) = posture(c, client.1.goal).held() {
                assert!(p.knee_flexion.deg() <= knee + 1e-6, "{what:?}: knee {}°", p.knee_flexion.deg());
                assert!(p.hip_flexion.deg() <= hip + 1e-6, "{what:?}: hip {}°", p.hip_flexion.deg());
            }
        };
        for take in &all.single {
            let change = Change { kind: take.kind, amount: take.outcome.amount() };
            // entered as they are, and as the program itself would keep them
            let by_program = case(&client.0, &client.1).changed(&change);
            for c in [put_back(&client, change), by_program].into_iter().flatten() {
                within(&c, take);
            }
        }
        if let Some(pair) = all.pair {
            let both = put_back(&entered(&client, pair.changes[0]), pair.changes[1]);
            within(&both.expect("the pair can be set up"), &pair);
        }
    }
}

/// The random clients do meet every limit, alone and together.
#[test]
fn every_limit_is_met() {
    use proptest::{strategy::ValueTree, test_runner::TestRunner};
    let mut runner = TestRunner::new(many());
    let mut met = std::collections::HashSet::new();
    let mut together = 0;
    for _ in 0..400 {
        let (m, t) = clients::plausible().new_tree(&mut runner).expect("a client").current();
        for edge in [Edge::Steady, Edge::Balance] {
            let s = stopped(&case(&m, &t), edge);
            together += usize::from(s.stops.iter().any(|s| !s.alone));
            met.extend(s.stops.into_iter().map(|s| s.limit));
        }
    }
    for limit in ANGLES.into_iter().chain([Limit::Support, Limit::CapKnee, Limit::CapHip]) {
        assert!(met.contains(&limit), "{limit:?} of {met:?}");
    }
    assert!(together > 0);
}

/// A knee cap stops the average man: it is named as such, and the depth without it is not told.
#[test]
fn a_precaution_is_named_and_never_lifted() {
    let (mut m, t) = sample::average_man();
    m.caps.knee = Some(deg(90.0));
    let c = case(&m, &t);
    for edge in [Edge::Steady, Edge::Balance] {
        let s = stopped(&c, edge);
        let cap = told(&s.stops, Limit::CapKnee).expect("named");
        assert!(cap.alone && cap.without.is_none() && told(&s.stops, Limit::Knee).is_none(), "{s:?}");
    }
    // measured below the precaution, it is the range that stops, and that can be lifted
    m.knee = plumbfold_core::measures::KneeRange::Degrees(plumbfold_core::Sides { left: Some(deg(80.0)), right: None });
    let s = stopped(&case(&m, &t), Edge::Steady);
    let knee = told(&s.stops, Limit::Knee).expect("named");
    assert!(knee.without.is_some() && !knee.assumed && told(&s.stops, Limit::CapKnee).is_none(), "{s:?}");
}
