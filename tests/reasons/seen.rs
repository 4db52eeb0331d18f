//! Seen and computed.

use plumbfold_core::{
    Angle, Case, Measures, Seen, Standing, Task, balance, depths, pose, sample,
    seen::{DepthGap, LeanGap, SeenStudy, depth_that_suits, seen_study},
};
use proptest::prelude::*;

use crate::{
    clients,
    near::{case, deg, near},
    put_back::many,
};

/// Tolerance of a seen depth and of a seen lean, degrees.
const EXPLAINED: f64 = 10.0;

fn study(m: &Measures, t: &Task, (thigh, shank, trunk): (f64, f64, f64)) -> SeenStudy {
    let seen = Some(Seen { thigh: deg(thigh), shank: deg(shank), trunk: deg(trunk) });
    seen_study(&case(m, &Task { seen, ..t.clone() })).expect("seen")
}

proptest! {
    #![proptest_config(many())]

    /// Verdicts follow from depth, lean and support with the tolerances told.
    #[test]
    fn verdicts_follow_the_tolerances(
        (m, t) in clients::plausible(),
        seen in (0.0..140.0, -10.0..60.0, -10.0..90.0),
    ) {
        let s = study(&m, &t, seen);
        let (thigh, shank, trunk) = seen;
        let c = case(&m, &t);
        let depth = match depths(&c).steady {
            None => DepthGap::NoDepth,
            Some(d) if (thigh - d.deg()).abs() <= EXPLAINED => DepthGap::Explained,
            Some(d) if thigh < d.deg() => DepthGap::Shallower,
            Some(_) => DepthGap::Deeper,
        };
        prop_assert_eq!(s.depth, depth);
        let needed = balance(&c, deg(shank), deg(thigh)).posture().map(|p| p.trunk.deg());
        let lean = match needed {
            None => LeanGap::Unknown,
            Some(n) if (trunk - n).abs() <= EXPLAINED => LeanGap::Needed,
            Some(n) if trunk > n => LeanGap::More,
            Some(_) => LeanGap::Less,
        };
        prop_assert_eq!(s.lean, lean);
        prop_assert_eq!(s.lean_needed.map(Angle::deg), needed);
        prop_assert_eq!(s.allowed, depths(&c));
        let p = pose(&c, deg(shank), deg(thigh), deg(trunk));
        prop_assert_eq!(s.posture, p);
        prop_assert_eq!(s.standing.is_some(), p.is_some());
        let support = c.stand().support;
        let outside = p.map_or(0.0, |p| (support.edge_back_m - p.com.x).max(p.com.x - support.edge_front_m));
        prop_assert_eq!(s.far_outside(), outside > 0.03, "{} m outside", outside);
    }

    /// A depth that suits is steady by any rule but a held shank, as deep as steady depth or pain mark.
    #[test]
    fn a_depth_that_suits_keeps_within_all((m, t) in clients::plausible(), pain in proptest::option::of(0.0..140.0)) {
        let c = case(&m, &t);
        let Some(s) = depth_that_suits(&c, pain.map(deg)) else { return Ok(()) };
        let steady = depths(&c).steady.map_or(f64::NAN, Angle::deg);
        let p = s.posture;
        near("depth", p.thigh.deg(), pain.map_or(steady, |p| p.min(steady)), 1e-9);
        prop_assert_eq!(s.by_pain, pain.is_some_and(|p| p < steady));
        prop_assert!(p.trunk.deg() <= t.lean_limit.map_or(85.0, Angle::deg) + 1e-6);
        prop_assert!(p.bend.deg() <= t.bend.available().deg() + 1e-6);
    }
}

/// Either side of each tolerance, in steps of a hundredth of a degree.
#[test]
fn either_side_of_ten_degrees() {
    let (m, t) = sample::long_thigh_woman();
    let depth = depths(&case(&m, &t)).steady.map_or(f64::NAN, Angle::deg);
    for (off, verdict) in [
        (-10.01, DepthGap::Shallower),
        (-9.99, DepthGap::Explained),
        (9.99, DepthGap::Explained),
        (10.01, DepthGap::Deeper),
    ] {
        assert_eq!(study(&m, &t, (depth + off, 15.0, 40.0)).depth, verdict, "{off}");
    }
    let needed = study(&m, &t, (40.0, 15.0, 40.0)).lean_needed.map_or(f64::NAN, Angle::deg);
    for (off, verdict) in
        [(-10.01, LeanGap::Less), (-9.99, LeanGap::Needed), (9.99, LeanGap::Needed), (10.01, LeanGap::More)]
    {
        assert_eq!(study(&m, &t, (40.0, 15.0, needed + off)).lean, verdict, "{off}");
    }
    // beyond the ankle there is nothing to compare with
    let beyond = study(&m, &t, (60.0, 58.0, 40.0));
    assert_eq!((beyond.lean, beyond.lean_needed), (LeanGap::Unknown, None));
}

/// The trunk (degrees) at which the seen posture lies so far behind its support, m.
fn trunk_behind(c: &Case, thigh: f64, shank: f64, by_m: f64) -> f64 {
    let target = c.stand().support.edge_back_m - by_m;
    let x = |trunk: f64| pose(c, deg(shank), deg(thigh), deg(trunk)).map_or(f64::NAN, |p| p.com.x);
    let (mut low, mut high) = (-10.0, 60.0);
    assert!(x(low) < target && x(high) > target);
    for _ in 0..60 {
        let mid = 0.5 * (low + high);
        if x(mid) < target { low = mid } else { high = mid }
    }
    low
}

/// Three centimetres outside the support and no more can be a slip of the drawing.
#[test]
fn far_outside_begins_at_three_centimetres() {
    let (m, t) = sample::long_thigh_woman();
    let c = case(&m, &t);
    for (by_m, far) in [(0.001, false), (0.0299, false), (0.0301, true), (0.05, true)] {
        let s = study(&m, &t, (50.0, 12.0, trunk_behind(&c, 50.0, 12.0, by_m)));
        assert_eq!(s.far_outside(), far, "{by_m}");
        match s.standing {
            Some(Standing::Tips { by_m: by, .. }) => near("outside by", by, by_m, 1e-9),
            other => panic!("{by_m}: {other:?}"),
        }
    }
}

/// Nothing seen, nothing told.
#[test]
fn nothing_seen() {
    let (m, t) = sample::average_man();
    assert_eq!(seen_study(&case(&m, &t)), None);
}
