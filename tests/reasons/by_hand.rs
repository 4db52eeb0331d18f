//! A woman with long thighs and stiff ankles, whose numbers two independent solvers agree on.

use plumbfold_core::{
    Angle, Case, reasons, sample,
    stops::{Limit, Stopped},
    takes::{Kind, Outcome, Take},
};

use crate::near::{case, near};

/// Degrees.
const TOL: f64 = 0.1;

fn woman() -> Case {
    let (m, t) = sample::long_thigh_woman();
    case(&m, &t)
}

fn told(a: Option<Angle>) -> f64 {
    a.map_or(f64::NAN, Angle::deg)
}

/// The limits named, each by itself, and the depth without each.
fn stops_are(s: &Stopped, depth: f64, each: &[(Limit, f64)]) {
    near("depth", told(s.depth), depth, TOL);
    for &(limit, without) in each {
        let stop = s.stops.iter().find(|s| s.limit == limit);
        assert!(stop.is_some_and(|s| s.alone), "{limit:?} in {:?}", s.stops);
        near(limit.key(), told(stop.and_then(|s| s.without)), without, TOL);
    }
}

#[test]
fn what_is_used_up_first() {
    let r = reasons(&woman());
    stops_are(&r.steady, 76.47, &[(Limit::Hip, 128.26), (Limit::Ankle, 100.92), (Limit::Bend, 82.46)]);
    // neither lean nor knee changes anything
    assert_eq!(r.steady.stops.len(), 3, "{:?}", r.steady.stops);
    stops_are(&r.balance, 99.99, &[(Limit::Hip, 147.84), (Limit::Bend, 125.74), (Limit::Ankle, 109.90)]);
    assert!(r.balance.stops.iter().all(|s| !matches!(s.limit, Limit::Lean | Limit::Knee)));
}

#[test]
fn shape_or_range_and_bend() {
    let r = reasons(&woman());
    let s = r.shape_or_range;
    near("now", told(s.now), 76.47, TOL);
    near("average lengths", told(s.average_lengths), 89.54, TOL);
    near("usual ranges", told(s.usual_ranges), 104.69, TOL);
    near("both", told(s.both), 110.15, TOL);
    for (ours, theirs) in r.by_bend.into_iter().zip([66.12, 71.45, 76.47]) {
        near("by bend", told(ours), theirs, TOL);
    }
}

#[test]
fn what_it_would_take() {
    let takes = reasons(&woman()).takes;
    let one = |kind: Kind| -> &Take { takes.single.iter().find(|t| t.kind == kind).expect("offered") };
    for (kind, amount, last_digit) in [
        (Kind::HeelRaise, 18.53, 0.01),
        (Kind::WiderStance, 32.5, 0.1),
        (Kind::Counterweight, 3.757, 0.001),
        (Kind::Ankle, 7.085, 0.001),
    ] {
        near(&kind.key(), one(kind).outcome.enough().unwrap_or(f64::NAN), amount, 0.5 * last_digit + 1e-9);
    }
    assert_eq!(one(Kind::Hip).outcome, Outcome::NotByItself { amount: 10.0 });
    let placements: Vec<&Take> = takes.single.iter().filter(|t| matches!(t.kind, Kind::Placement(_))).collect();
    assert_eq!(placements.len(), 7);
    assert!(placements.iter().all(|t| t.outcome.enough().is_none()));
    // the back may bend freely already and no lean was chosen
    assert!(takes.single.iter().all(|t| !matches!(t.kind, Kind::Bend | Kind::Lean)));
    assert_eq!(takes.pair, None);
}
