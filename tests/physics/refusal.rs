//! What refuses a posture or a depth, and in which order.

use plumbfold_core::{
    Balance, Case, Measures, Refusal, Rule, Sides, Standing, Task, Toward, balance,
    measures::{AnkleRange, HipRange, KneeRange},
    posture, sample,
};

use crate::near::{case, deg};

fn client() -> (Measures, Task) {
    let (mut m, t) = sample::average_man();
    m.ankle = AnkleRange::Degrees(Sides { left: Some(deg(30.0)), right: None });
    m.knee = KneeRange::Degrees(Sides { left: Some(deg(100.0)), right: None });
    m.hip = HipRange::PelvisHeld(Sides { left: Some(deg(60.0)), right: None });
    (m, t)
}

fn refused(b: Balance) -> Option<Refusal> {
    match b {
        Balance::Refused(why) => Some(why),
        Balance::Stands { .. } => None,
    }
}

fn at(c: &Case, shank: f64, thigh: f64) -> Option<Refusal> {
    refused(balance(c, deg(shank), deg(thigh)))
}

/// Stance, ankle, knee, hip: with all of them beyond their limits, each in turn made possible.
#[test]
fn refusals_are_named_in_order() {
    let (m, mut t) = client();
    t.stance_m = Some(1.20);
    t.toe_out = deg(60.0);
    // hip 60° and 45° of bend: no fold at 115°, and the legs of 1.76 m do not span 1.2 m there
    let c = case(&m, &t);
    assert_eq!(at(&c, 50.0, 115.0), Some(Refusal::Stance));
    let (m, t) = client();
    let c = case(&m, &t);
    assert_eq!(at(&c, 50.0, 115.0), Some(Refusal::Ankle));
    assert_eq!(at(&c, 25.0, 115.0), Some(Refusal::Knee));
    let (mut m, t) = client();
    m.knee = KneeRange::NotMeasured;
    let c = case(&m, &t);
    assert_eq!(at(&c, 20.0, 115.0), Some(Refusal::Hip));
    assert_eq!(at(&c, 20.0, 100.0), None);
}

/// Exactly at each limit the posture exists, a hair beyond it does not.
#[test]
fn limits_are_met_exactly() {
    let (mut m, mut t) = client();
    let c = case(&m, &t);
    assert_eq!(at(&c, 30.0, 60.0), None);
    assert_eq!(at(&c, 30.001, 60.0), Some(Refusal::Ankle));
    assert_eq!(at(&c, 20.0, 80.0), None);
    assert_eq!(at(&c, 20.001, 80.0), Some(Refusal::Knee));
    m.knee = KneeRange::Degrees(Sides { left: Some(deg(170.0)), right: None });
    let c = case(&m, &t);
    // hip 60° + bend 45° + 5° of leaning back: 110° of thigh is the last
    assert_eq!(at(&c, 20.0, 110.0), None);
    assert_eq!(at(&c, 20.0, 110.001), Some(Refusal::Hip));
    // shank and thigh folded flat onto each other: 180° whatever the knee allows
    let mut free = *c.limits();
    (free.ankle, free.hip, free.knee) = (deg(89.0), deg(179.0), deg(190.0));
    let c = c.with_limits(free);
    assert_eq!(at(&c, 60.0, 120.0), None);
    assert_eq!(at(&c, 60.0, 120.001), Some(Refusal::Knee));
    // a wedge adds its pitch to what the shank may do
    t.heel_raise_m = 0.04;
    let (m, _) = client();
    let c = case(&m, &t);
    let most = 30.0 + c.stand().pitch.deg();
    assert_eq!(at(&c, most - 0.001, 50.0), None);
    assert_eq!(at(&c, most + 0.001, 50.0), Some(Refusal::Ankle));
}

/// Leaning back with the knee overstretched: below −10°, or behind the straight leg.
#[test]
fn a_shank_behind_the_straight_leg_is_refused_by_the_knee() {
    let (m, t) = client();
    let c = case(&m, &t);
    assert_eq!(at(&c, -10.0, 30.0), None);
    assert_eq!(at(&c, -10.001, 30.0), Some(Refusal::Knee));
    assert_eq!(at(&c, -5.0, 5.0), None);
    assert_eq!(at(&c, -5.001, 5.0), Some(Refusal::Knee));
    assert_eq!(at(&c, 0.0, 0.0), None);
}

/// A knee turned out under a wide stance leans its straight shank by sin θs0 = o tan φ / L.
#[test]
fn the_straight_leg_of_a_wide_stance_leans() {
    let (m, mut t) = client();
    t.stance_m = Some(0.60);
    t.toe_out = deg(30.0);
    let c = case(&m, &t);
    let b = c.body();
    let (sin, cos) = (0.5, 0.75f64.sqrt());
    let o = (0.0485 * 1.76 - 0.30) * cos * b.shank_m / (b.shank_m + b.thigh_m);
    let straight = (o * sin / cos / (b.shank_m.powi(2) - o * o).sqrt()).asin().to_degrees();
    assert!(straight < -3.0);
    assert_eq!(at(&c, straight + 1e-6, 0.0), None);
    assert_eq!(at(&c, straight - 1e-3, 0.0), Some(Refusal::Knee));
    let p = plumbfold_core::pose(&c, deg(straight), deg(0.0), deg(0.0)).expect("standing");
    // that leg is straight: knee flexion none, the hip as far above the ankle as the leg allows
    assert!(p.knee_flexion.deg() < 1e-5, "{}", p.knee_flexion.deg());
}

/// A depth is refused by the hip before the stance, the stance before the ankle, the ankle before the knee.
#[test]
fn depths_are_refused_in_order() {
    let why = |m: &Measures, t: &Task, thigh: f64| refused(posture(&case(m, t), deg(thigh)));
    let (m, t) = client();
    assert_eq!(why(&m, &t, 115.0), Some(Refusal::Hip));
    // hip free, ankle shut, stance impossible: the stance speaks first
    let (mut m, mut t) = client();
    m.hip = HipRange::PelvisHeld(Sides { left: Some(deg(150.0)), right: None });
    m.stature_m = 1.2;
    m.ankle = AnkleRange::Degrees(Sides { left: Some(deg(-10.0)), right: None });
    t.stance_m = Some(1.2);
    assert_eq!(why(&m, &t, 100.0), Some(Refusal::Stance));
    t.stance_m = None;
    // an ankle that does not even reach the straight leg
    assert_eq!(why(&m, &t, 5.0), Some(Refusal::Ankle));
    assert_eq!(why(&m, &t, 10.0), None);
    // the least flexion at thigh 115° is 105° with the shank at −10°
    assert_eq!(why(&m, &t, 115.0), Some(Refusal::Knee));
    assert_eq!(why(&m, &t, 109.9), None);
}

/// A held shank below the range is refused by the knee, above it by the ankle.
#[test]
fn a_held_shank_out_of_range() {
    let (m, mut t) = client();
    t.rule = Rule::HeldShank(deg(-9.0));
    let why = |t: &Task, thigh: f64| refused(posture(&case(&m, t), deg(thigh)));
    assert_eq!(why(&t, 5.0), Some(Refusal::Knee));
    assert_eq!(why(&t, 40.0), None);
    t.rule = Rule::HeldShank(deg(35.0));
    assert_eq!(why(&t, 40.0), Some(Refusal::Ankle));
    t.rule = Rule::HeldShank(deg(25.0));
    assert_eq!(why(&t, 80.0), Some(Refusal::Knee));
    assert_eq!(why(&t, 70.0), None);
}

/// Nothing refuses, but stiff ankles tip a deep squat over the heels: a result, with its centimetres.
#[test]
fn tipping_is_a_result() {
    let (mut m, t) = client();
    m.ankle = AnkleRange::Degrees(Sides { left: Some(deg(0.0)), right: None });
    m.knee = KneeRange::NotMeasured;
    let c = case(&m, &t);
    let b = posture(&c, deg(100.0));
    let Balance::Stands { posture: p, standing: Standing::Tips { toward: Toward::Heels, by_m } } = b else {
        panic!("{b:?}");
    };
    let miss = c.stand().support.edge_back_m - p.com.x;
    assert!((miss - by_m).abs() < 1e-12 && by_m > 0.01, "{by_m}");
    assert!(b.held().is_none() && b.posture().is_some());
}
