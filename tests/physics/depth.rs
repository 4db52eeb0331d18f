//! Depths against a dense scan, and what easing does to them.

use plumbfold_core::{
    Angle, Bend, Case, Limits, Placement, Sides,
    depth::room,
    depths,
    measures::{AnkleRange, KneeRange},
    sample,
};
use proptest::prelude::*;

use crate::{
    brute, clients,
    explicit::{self, Inputs},
    near::{case, config, deg, slow},
};

/// Both depths within 0.1° of a scan of shank and thigh in steps of 0.05°.
fn agree_with_a_scan(c: &Case) {
    let i = Inputs::from(c);
    let s = explicit::support(&i);
    let d = depths(c);
    for (what, ours, (back, front)) in [("steady", d.steady, (s[1], s[3])), ("balance", d.balance, (s[0], s[4]))] {
        let scanned = brute::depth(&i, back, front, 0.05);
        let (a, b) = (ours.map_or(-1.0, Angle::deg), scanned.unwrap_or(-1.0));
        assert!((a - b).abs() <= 0.1, "{what} depth {ours:?} = {a}°, scanned {scanned:?}°");
    }
}

proptest! {
    #![proptest_config(slow())]

    #[test]
    fn depths_agree_with_a_dense_scan((m, t) in clients::plausible()) {
        let c = case(&m, &t);
        prop_assume!(!brute::knee_may_split_the_shanks(&Inputs::from(&c)));
        agree_with_a_scan(&c);
    }

    /// The same for bodies and tasks anywhere in the bounds.
    #[test]
    fn odd_clients_depths_agree_with_a_dense_scan((m, t) in clients::any_valid()) {
        let Ok((c, _)) = Case::new(&m, &t) else { return Ok(()) };
        prop_assume!(!brute::knee_may_split_the_shanks(&Inputs::from(&c)));
        agree_with_a_scan(&c);
    }
}

fn eased(l: &Limits, which: usize, by: Angle) -> Limits {
    let mut l = *l;
    match which {
        0 => l.ankle = l.ankle + by,
        1 => l.knee = l.knee + by,
        2 => l.hip = l.hip + by,
        3 => l.bend = l.bend + by,
        _ => l.lean = (l.lean + by).min(deg(89.0)),
    }
    l
}

/// Whether no depth is lost from one case to another.
fn never_less(what: &str, before: &Case, after: &Case) {
    let (a, b) = (depths(before), depths(after));
    for (a, b) in [(a.steady, b.steady), (a.balance, b.balance)] {
        if let Some(a) = a {
            let b = b.map_or(-1.0, Angle::deg);
            assert!(b >= a.deg() - 1e-6, "{what} eased: {}° became {b}°", a.deg());
        }
    }
}

proptest! {
    #![proptest_config(config(1))]

    /// Easing any limit, alone, never loses depth.
    #[test]
    fn easing_a_limit_never_loses_depth((m, t) in clients::plausible(), which in 0..5_usize, by in 0.1..40.0) {
        let c = case(&m, &t);
        let e = c.with_limits(eased(c.limits(), which, deg(by)));
        prop_assume!(!brute::knee_may_split_the_shanks(&Inputs::from(&e)));
        never_less(["ankle", "knee", "hip", "bend", "lean"][which], &c, &e);
    }

    /// A wider support or zone never loses depth.
    #[test]
    fn a_wider_support_never_loses_depth((m, t) in clients::plausible(), (back, front) in (0.0..1.0, 0.0..1.0)) {
        let c = case(&m, &t);
        let mut wide = t.clone();
        let s = &mut wide.support;
        s.zone_back *= back;
        s.zone_front += front * (1.0 - s.zone_front);
        s.edge_back = Some(s.edge_back.unwrap_or(0.15) * back);
        s.edge_front = Some(1.0);
        s.zone_back = s.zone_back.max(s.edge_back.unwrap_or(0.0));
        never_less("support", &c, &case(&m, &wide));
    }

    /// The balance depth is never less than the steady depth where both start standing straight.
    #[test]
    fn steady_is_never_deeper_than_balance((m, t) in clients::plausible()) {
        let d = depths(&case(&m, &t));
        if let (Some(s), Some(b)) = (d.steady, d.balance) {
            prop_assert!(s.deg() <= b.deg() + 1e-6 || s.deg() <= 10.0, "{:?}", d);
        }
    }
}

/// The ankle lifted to 89°: shanks may lie flat, the knee folds, and nothing of that loses depth.
#[test]
fn an_ankle_lifted_altogether() {
    for (m, t) in [sample::average_man(), sample::long_thigh_woman()] {
        let c = case(&m, &t);
        let mut l = *c.limits();
        l.ankle = deg(89.0);
        never_less("ankle", &c, &c.with_limits(l));
    }
    // the ankle is what stops this woman
    let (m, t) = sample::long_thigh_woman();
    let c = case(&m, &t);
    let mut l = *c.limits();
    l.ankle = deg(89.0);
    let steady = |c: &Case| depths(c).steady.map_or(f64::NAN, Angle::deg);
    assert!(steady(&c.with_limits(l)) > steady(&c) + 5.0);
}

/// At the steady depth something is at its end: a twentieth of a degree deeper nothing is steady, a
/// twentieth above it is.
#[test]
fn a_depth_is_an_end() {
    for (m, t) in [sample::average_man(), sample::long_thigh_woman()] {
        let c = case(&m, &t);
        let i = Inputs::from(&c);
        let s = explicit::support(&i);
        let end = depths(&c).steady.map_or(f64::NAN, Angle::rad);
        let ok = |by_deg: f64| {
            brute::Row::new(&i, end + f64::to_radians(by_deg)).feasible(&i, s[1], s[3], f64::to_radians(0.005))
        };
        assert!(ok(-0.05) && !ok(0.05));
    }
}

/// A man with stiff ankles and a heavy goblet loses the zone at a thigh angle of about 100° and has it
/// again deeper. With a little more ankle that gap closes: a hair before it does, the depth ends at
/// the gap, however narrow; a hair after, it goes on below. Fails if a scan steps over the gap.
#[test]
fn a_narrow_gap_ends_the_depth() {
    let (mut m, mut t) = sample::average_man();
    m.lengths.shank_m = Some(0.45);
    m.lengths.trunk_m = Some(0.463);
    m.lengths.foot_m = Some(0.305);
    m.knee = KneeRange::Degrees(Sides { left: Some(deg(136.0)), right: None });
    t.placement = Placement::Goblet;
    t.load_kg = 95.0;
    t.footwear_drop_m = 0.018;
    t.bend = Bend::Degrees(deg(80.0));
    t.lean_limit = Some(deg(71.0));
    let with = |ankle: f64| {
        let mut m = m.clone();
        m.ankle = AnkleRange::Degrees(Sides { left: Some(deg(ankle)), right: None });
        case(&m, &t)
    };
    let bottom = |c: &Case| {
        let s = c.stand().support;
        (8_500..11_500)
            .map(|k| 0.01 * f64::from(k))
            .map(|x| (room(c, deg(x), s.zone_back_m, s.zone_front_m), x))
            .fold((f64::INFINITY, 0.0), |a, b| if b.0 < a.0 { b } else { a })
    };
    let (mut gap, mut none) = (10.0, 25.0);
    assert!(bottom(&with(gap)).0 < 0.0 && bottom(&with(none)).0 > 0.0);
    while none - gap > 1e-6 {
        let mid = 0.5 * (gap + none);
        if bottom(&with(mid)).0 < 0.0 { gap = mid } else { none = mid }
    }
    let at = bottom(&with(gap)).1;
    for by in [0.3, 0.003, 0.0003] {
        let (closed, open) = (with(gap - by), with(none + by));
        let scan = |c: &Case| {
            let i = Inputs::from(c);
            let s = explicit::support(&i);
            brute::Row::new(&i, at.to_radians()).feasible(&i, s[1], s[3], f64::to_radians(0.01))
        };
        assert!(!scan(&closed) && scan(&open));
        let depth = |c: &Case| depths(c).steady.map_or(f64::NAN, Angle::deg);
        assert!(depth(&closed) < at && depth(&closed) > at - 8.0, "gap at {at}°: {}°", depth(&closed));
        assert!(depth(&open) > at + 3.0, "no gap at {at}°: {}°", depth(&open));
    }
}
