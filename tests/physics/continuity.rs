//! Dragging is smooth: no jumps of posture with depth.

use plumbfold_core::{Angle, Balance, Case, Posture, Rule, depths, posture, sample};
use proptest::prelude::*;

use crate::{
    clients,
    near::{case, config, deg},
};

/// Angles of the posture at a thigh angle (degrees), in degrees.
fn angles(c: &Case, thigh: f64) -> Option<[f64; 4]> {
    posture(c, deg(thigh)).posture().map(|p: &Posture| [p.shank.deg(), p.trunk.deg(), p.pelvis.deg(), p.bend.deg()])
}

fn apart(a: [f64; 4], b: [f64; 4]) -> f64 {
    a.iter().zip(b).map(|(a, b)| (a - b).abs()).fold(0.0, f64::max)
}

/// Where a step of 0.01° changes an angle by more than 0.05°: halves it until the change has gone
/// below that, or the step is 1e-9° and a jump is proven (thigh angle and size).
fn jump(c: &Case, from: f64, to: f64) -> Option<(f64, f64)> {
    let (a, b) = (angles(c, from)?, angles(c, to)?);
    let change = apart(a, b);
    if change <= 0.05 {
        return None;
    }
    if to - from < 1e-9 {
        return Some((from, change));
    }
    let mid = 0.5 * (from + to);
    jump(c, from, mid).or_else(|| jump(c, mid, to))
}

/// The descent in steps of 0.01° of thigh over a stretch.
fn smooth(c: &Case, from: f64, to: f64) {
    let n = ((to - from) / 0.01).ceil() as usize;
    for k in 0..n {
        let (a, b) = (from + 0.01 * k as f64, (from + 0.01 * (k + 1) as f64).min(to));
        if let Some((at, by)) = jump(c, a, b) {
            panic!("at thigh {at}° the posture jumps by {by}°");
        }
    }
}

/// From standing to the balance depth and beyond into tipping, every 0.01°, for both samples under
/// the usual rule, a held shank and an arm ratio; and down to the steady depth no step turns a
/// segment by more than 0.06° (where the hip's range has run out and the lean nears its end).
#[test]
fn the_whole_descent_of_the_samples() {
    for (m, t) in [sample::average_man(), sample::long_thigh_woman()] {
        for rule in [Rule::Usual { slope: None }, Rule::HeldShank(deg(20.0))] {
            let c = case(&m, &plumbfold_core::Task { rule, ..t.clone() });
            let end = depths(&c).balance.map_or(0.0, Angle::deg);
            smooth(&c, 0.0, end + 5.0);
        }
        let c = case(&m, &t);
        let steady = depths(&c).steady.map_or(0.0, Angle::deg);
        let n = (steady / 0.01) as usize;
        let most = (0..n)
            .filter_map(|k| {
                let x = 0.01 * k as f64;
                Some(apart(angles(&c, x)?, angles(&c, x + 0.01)?))
            })
            .fold(0.0, f64::max);
        assert!(most < 0.06, "a step of 0.01° of depth turns a segment by {most}°");
    }
}

proptest! {
    #![proptest_config(config(4))]

    /// Any client in the plane, any rule but LeastEffort (which may jump) and ArmRatio (whose two
    /// sides of a wish may tie): 5° of descent somewhere.
    #[test]
    fn no_jumps_anywhere((m, t) in clients::plane(), from in 0.0..120.0, held in proptest::option::of(0.0..35.0)) {
        let mut t = t;
        t.rule = held.map_or(Rule::Usual { slope: None }, |a| Rule::HeldShank(deg(a)));
        smooth(&case(&m, &t), from, from + 5.0);
    }

    /// Turned out and wide, down to the steady depth.
    #[test]
    fn no_jumps_turned_out((m, t) in clients::plausible(), share in 0.0..0.95) {
        let mut t = t;
        t.rule = Rule::Usual { slope: None };
        let c = case(&m, &t);
        let Some(steady) = depths(&c).steady else { return Ok(()) };
        let from = share * steady.deg();
        smooth(&c, from, (from + 5.0).min(steady.deg()));
    }
}

/// The test can see a jump: an angle that does jump is found.
#[test]
fn a_refusal_is_no_jump_but_a_jump_is() {
    let (m, t) = sample::average_man();
    let c = case(&m, &t);
    assert!(matches!(posture(&c, deg(178.0)), Balance::Refused(_)));
    assert_eq!(jump(&c, 177.0, 178.0), None);
    let step = |x: f64| if x < 40.123 { 10.0 } else { 12.0 };
    let found = (0..2_000)
        .filter(|k| {
            let x = 30.0 + 0.01 * f64::from(*k);
            f64::abs(step(x + 0.01) - step(x)) > 0.05
        })
        .count();
    assert_eq!(found, 1);
}
