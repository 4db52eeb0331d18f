//! Facts of the trade: common practice, no source. Each compares one change and leaves the rest.

use plumbfold_core::{
    Angle, Measures, Placement, Posture, Readings, Sex, Sides, Standing, Task, Toward, balance, depths,
    measures::AnkleRange, pose, posture, readings, sample, standing,
};

use crate::near::{case, deg};

/// A man of average lengths whose ankle is an angle, so that it stays when his shank changes.
fn man() -> (Measures, Task) {
    let (mut m, t) = sample::average_man();
    m.ankle = AnkleRange::Degrees(Sides { left: Some(deg(36.0)), right: None });
    (m, t)
}

/// The same with shank, thigh and trunk times these.
fn built(shank: f64, thigh: f64, trunk: f64) -> (Measures, Task) {
    let (mut m, t) = man();
    let l = case(&m, &t).body().landmarks;
    m.lengths.shank_m = Some(shank * l.shank_m);
    m.lengths.thigh_m = Some(thigh * l.thigh_m);
    m.lengths.trunk_m = Some(trunk * l.trunk_m);
    (m, t)
}

/// Posture and readings of a steady squat at a depth, by the usual rule.
#[track_caller]
fn squat(m: &Measures, t: &Task, thigh: f64) -> (Posture, Readings) {
    let c = case(m, t);
    let b = posture(&c, deg(thigh));
    assert!(b.is_steady(), "meant to compare steady squats: {b:?}");
    let p = *b.posture().expect("steady");
    (p, readings(&c, &p))
}

fn lean((m, t): &(Measures, Task), thigh: f64) -> f64 {
    squat(m, t, thigh).0.trunk.deg()
}

fn steady((m, t): &(Measures, Task)) -> f64 {
    depths(&case(m, t)).steady.map_or(f64::NAN, Angle::deg)
}

#[test]
fn knees_in_front_of_and_hips_behind_the_plumb_line() {
    for (sex, stature_m) in [(Sex::Male, 1.65), (Sex::Male, 1.90), (Sex::Female, 1.52), (Sex::Female, 1.78)] {
        for placement in Placement::ALL {
            let m = sample::measures(sex, stature_m, 22.0 * stature_m * stature_m);
            let t = Task { placement, ..sample::plain_task() };
            let c = case(&m, &t);
            let end = depths(&c).steady.map_or(0.0, Angle::deg);
            assert!(end > 60.0, "{sex:?} {placement:?} only gets to {end}°");
            let mut thigh = 45.0;
            while thigh < end {
                let p = *posture(&c, deg(thigh)).held().expect("down to the steady depth it holds");
                let r = readings(&c, &p);
                assert!(r.knee_arm_m > 0.02 && r.hip_arm_m > 0.02, "{sex:?} {placement:?} {thigh}°: {r:?}");
                thigh += 5.0;
            }
        }
    }
}

#[test]
fn a_shorter_shank_leans_more() {
    let leans = [1.0, 0.95, 0.90].map(|k| lean(&built(k, 1.0, 1.0), 75.0));
    assert!(leans[1] > leans[0] + 1.0 && leans[2] > leans[1] + 1.0, "{leans:?}");
}

#[test]
fn a_longer_thigh_leans_more() {
    let leans = [1.0, 1.05, 1.10].map(|k| lean(&built(1.0, k, 1.0), 75.0));
    assert!(leans[1] > leans[0] + 1.0 && leans[2] > leans[1] + 1.0, "{leans:?}");
}

#[test]
fn a_short_trunk_on_a_long_thigh_leans_even_more() {
    let (long, short) = (lean(&built(1.0, 1.06, 1.0), 70.0), lean(&built(1.0, 1.06, 0.93), 70.0));
    assert!(short > long + 1.0, "long thigh {long}°, and a short trunk {short}°");
}

/// Shank, thigh and trunk all a twelfth longer on the same feet: still deep, with the lean of the
/// average build; the thigh alone that much longer is neither.
#[test]
fn all_long_in_proportion_goes_deep() {
    let k = 13.0 / 12.0;
    let (average, long, thigh) = (built(1.0, 1.0, 1.0), built(k, k, k), built(1.0, k, 1.0));
    assert!(steady(&long) > 95.0, "only {}°", steady(&long));
    assert!((lean(&long, 90.0) - lean(&average, 90.0)).abs() < 5.0);
    assert!(steady(&thigh) < steady(&long) - 5.0, "{} and {}", steady(&thigh), steady(&long));
    assert!(lean(&thigh, 75.0) > lean(&long, 75.0) + 5.0);
    // shared load: hip and knee asked about as the average build
    let share = |(m, t): &(Measures, Task)| {
        let r = squat(m, t, 90.0).1.moments_nm;
        r.hip / (r.hip + r.knee)
    };
    assert!((share(&long) - share(&average)).abs() < 0.06);
}

#[test]
fn a_heel_raise_leans_less() {
    for (m, t) in [man(), sample::long_thigh_woman()] {
        let leans =
            [0.0, 0.015, 0.030].map(|heel_raise_m| lean(&(m.clone(), Task { heel_raise_m, ..t.clone() }), 65.0));
        assert!(leans[1] < leans[0] - 0.5 && leans[2] < leans[1] - 0.5, "{leans:?}");
    }
}

#[test]
fn a_load_in_front_leans_less() {
    let (m, t) = man();
    let with = |placement, load_kg| lean(&(m.clone(), Task { placement, load_kg, ..t.clone() }), 70.0);
    // arms alone
    assert!(with(Placement::ArmsForward, 0.0) < with(Placement::ArmsCrossed, 0.0) - 1.0);
    // a weight held forward, more of it
    assert!(with(Placement::ArmsForward, 5.0) < with(Placement::ArmsForward, 0.0) - 2.0);
    assert!(with(Placement::ArmsForward, 10.0) < with(Placement::ArmsForward, 5.0) - 2.0);
    // the same bar in front or behind
    assert!(with(Placement::FrontRack, 60.0) < with(Placement::HighBar, 60.0) - 3.0);
}

#[test]
fn a_lower_bar_leans_more() {
    let (m, t) = man();
    for load_kg in [20.0, 60.0, 100.0] {
        let with = |placement| lean(&(m.clone(), Task { placement, load_kg, ..t.clone() }), 75.0);
        let (high, low) = (with(Placement::HighBar), with(Placement::LowBar));
        assert!(low > high + 1.0, "{load_kg} kg: high {high}°, low {low}°");
    }
}

/// A short knee arm goes with a long hip arm, more lean and more back load; a long knee arm the reverse.
#[test]
fn a_short_knee_arm_is_a_long_hip_arm() {
    let (m, t) = man();
    let c = case(&m, &t);
    let at = |shank: f64| {
        let p = *balance(&c, deg(shank), deg(70.0)).held().expect("in balance");
        (p.trunk.deg(), readings(&c, &p))
    };
    let shanks = [24.0, 28.0, 32.0];
    for pair in shanks.windows(2) {
        let ((lean, r), (lean2, r2)) = (at(pair[0]), at(pair[1]));
        assert!(r.knee_arm_m < r2.knee_arm_m - 0.01 && r.hip_arm_m > r2.hip_arm_m + 0.01);
        assert!(lean > lean2 + 2.0 && r.moments_nm.low_back > r2.moments_nm.low_back + 2.0);
        assert!(r.moments_nm.knee < r2.moments_nm.knee - 2.0 && r.moments_nm.hip > r2.moments_nm.hip + 2.0);
    }
}

/// Long thighs on short shanks fall back when straightened up; so does anyone, less.
#[test]
fn straightened_up_it_falls_back() {
    let (m, t) = sample::long_thigh_woman();
    let c = case(&m, &t);
    let p = *posture(&c, deg(70.0)).held().expect("in balance");
    let up = |lean: f64| pose(&c, p.shank, p.thigh, deg(lean)).expect("the legs stay");
    let Standing::Tips { toward: Toward::Heels, by_m } = standing(&c, &up(20.0)) else {
        panic!("{:?}", standing(&c, &up(20.0)));
    };
    let Standing::Tips { toward: Toward::Heels, by_m: further } = standing(&c, &up(5.0)) else {
        panic!("{:?}", standing(&c, &up(5.0)));
    };
    assert!(by_m > 0.01 && further > by_m + 0.01, "{by_m} m, then {further} m");
}

/// The same squat to the same depth is felt in different muscles by different builds.
#[test]
fn builds_share_the_load_differently() {
    let hip_to_knee = |(m, t): (Measures, Task)| {
        let r = squat(&m, &t, 70.0).1.moments_nm;
        r.hip / r.knee
    };
    let (hippy, kneeish) = (hip_to_knee(built(0.93, 1.07, 1.0)), hip_to_knee(built(1.07, 0.93, 1.0)));
    assert!(hippy > 1.4 * kneeish, "{hippy} and {kneeish}");
}
