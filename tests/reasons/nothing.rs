//! A goal nothing reaches, standing that does not balance, limits that leave nothing: results, not errors.

use plumbfold_core::{
    Angle, Case, Measures, Reasons, Sides, Support, Task, depths,
    map::{Ground, map},
    measures::{AnkleRange, HipRange},
    posture, reasons, sample,
    stops::Limit,
    study,
};
use proptest::prelude::*;

use crate::{
    clients,
    near::{case, deg},
    put_back::{many, to_offer},
};

/// Everything there is to say of a client, however little holds.
fn told((m, t): &(Measures, Task)) -> (Case, Reasons) {
    let c = case(m, t);
    let r = reasons(&c);
    let kinds: Vec<_> = r.takes.single.iter().map(|t| t.kind).collect();
    assert_eq!(kinds, to_offer(&(m.clone(), t.clone())));
    for stop in r.steady.stops.iter().chain(&r.balance.stops) {
        assert!(stop.worth.is_finite(), "{stop:?}");
    }
    for take in &r.takes.single {
        assert!(take.outcome.amount().is_finite(), "{take:?}");
    }
    assert!(!study(&c).descent.is_empty());
    let all = map(&c, (Angle::ZERO, deg(160.0)), (deg(-10.0), deg(62.0)));
    for cell in (0..all.columns).flat_map(|k| (0..all.rows).map(move |r| (k, r))).filter_map(|(k, r)| all.cell(k, r)) {
        assert_eq!(matches!(cell.ground, Ground::Refused(_)), cell.lean_rad.is_nan());
    }
    (c, r)
}

fn both(a: f64) -> Sides<Angle> {
    Sides { left: Some(deg(a)), right: Some(deg(a)) }
}

#[test]
fn a_goal_that_nothing_reaches() {
    let (mut m, mut t) = sample::long_thigh_woman();
    m.ankle = AnkleRange::Degrees(both(5.0));
    m.hip = HipRange::PelvisHeld(both(60.0));
    t.goal = deg(140.0);
    let (c, r) = told(&(m, t));
    assert!(r.takes.single.iter().all(|t| t.outcome.enough().is_none()), "{:?}", r.takes.single);
    assert_eq!(r.takes.pair, None);
    // where it does go, and why no further, is told all the same
    let depth = r.steady.depth.map_or(f64::NAN, Angle::deg);
    assert!(depth > 10.0 && depth < 140.0 && !r.steady.stops.is_empty());
    assert!(r.takes.single.iter().all(|t| t.depth.is_some()));
    assert!(posture(&c, deg(140.0)).held().is_none());
}

/// The weight wanted over the toes: not even standing is.
fn on_the_toes() -> (Measures, Task) {
    let (mut m, mut t) = sample::average_man();
    m.ankle = AnkleRange::Degrees(both(-10.0));
    t.lean_limit = Some(deg(10.0));
    t.support = Support { edge_back: Some(0.97), zone_back: 0.98, aim: 0.99, zone_front: 1.0, edge_front: Some(1.0) };
    (m, t)
}

#[test]
fn a_client_who_does_not_balance_standing() {
    let (c, r) = told(&on_the_toes());
    assert_eq!((depths(&c).steady, depths(&c).balance), (None, None));
    for s in [&r.steady, &r.balance] {
        assert!(s.depth.is_none() && s.stops.is_empty());
    }
    assert_eq!(r.by_bend, [None; 3]);
    assert_eq!(r.shape_or_range.now, None);
    // what helps, helps: more lean and more ankle are looked for all the same
    assert!(r.takes.single.iter().any(|t| t.outcome.enough().is_none()));
}

#[test]
fn a_cap_below_what_standing_needs() {
    // leaning 40° to balance, with hip and back folding 40° at most: standing is refused for good at 45°
    let (mut m, mut t) = sample::average_man();
    m.caps.hip = Some(deg(40.0));
    m.caps.knee = Some(deg(20.0));
    t.bend = plumbfold_core::Bend::Degrees(deg(0.0));
    let (c, r) = told(&(m.clone(), t.clone()));
    let depth = depths(&c).steady.map_or(f64::NAN, Angle::deg);
    assert!(depth <= 45.0, "{depth}");
    assert!(r.steady.stops.iter().any(|s| s.limit.is_precaution()), "{:?}", r.steady.stops);
    assert!(r.steady.stops.iter().all(|s| !s.limit.is_precaution() || s.without.is_none()));
    // and where the straight leg's shank is beyond the ankle
    m.ankle = AnkleRange::Degrees(both(-10.0));
    m.caps.knee = Some(deg(20.0));
    t.toe_out = deg(45.0);
    t.stance_m = Some(0.08);
    let _ = told(&(m, t));
}

#[test]
fn a_stance_the_legs_cannot_span() {
    let (mut m, mut t) = sample::average_man();
    (m.stature_m, m.mass_kg) = (1.05, 25.0);
    t.stance_m = Some(1.2);
    t.toe_out = deg(60.0);
    let (_, r) = told(&(m.clone(), t.clone()));
    assert!(r.steady.depth.is_none() && r.balance.depth.is_none(), "{:?}", r.steady);
    assert_eq!(r.takes.pair, None);
    // spanned standing, lost deeper: named as the stance
    t.stance_m = Some(1.0);
    for width_cm in (20..120).step_by(5) {
        t.stance_m = Some(f64::from(width_cm) / 100.0);
        let (_, r) = told(&(m.clone(), t.clone()));
        for s in r.steady.stops.iter().filter(|s| s.limit == Limit::Stance) {
            assert!(!s.alone && s.without.is_none(), "{s:?}");
        }
    }
}

proptest! {
    #![proptest_config(many())]

    /// Whatever a client file can hold, there is an answer.
    #[test]
    fn any_client_gets_an_answer((m, t) in clients::any_valid()) {
        if Case::new(&m, &t).is_ok() {
            let _ = told(&(m, t));
        }
    }
}
