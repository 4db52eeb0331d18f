//! Which posture at a depth: each rule against a scan over all allowed shanks.

use plumbfold_core::{Angle, Balance, Case, Rule, Sides, Support, Task, depths, posture, readings};
use proptest::prelude::*;

use crate::{
    brute::{self, LEAN_LOW, Row},
    clients,
    explicit::{self, Inputs},
    near::{case, config, deg, near},
};

/// A scanned posture.
struct Seen {
    shank: f64,
    /// Centre of mass outside the zone, m.
    outside_m: f64,
    /// Centre of mass off the aim, m.
    off_aim_m: f64,
}

/// All allowed shanks on a grid, where each brings the centre of mass.
fn scan(i: &Inputs, row: &Row, step_deg: f64) -> Vec<Seen> {
    let s = explicit::support(i);
    let mut all = Vec::new();
    row.each_shank(i, step_deg.to_radians(), |shank| {
        if let Some(reach) = row.reach(i, shank) {
            let x = brute::brought_to(reach, s[2]);
            all.push(Seen { shank, outside_m: brute::outside(x, s[1], s[3]), off_aim_m: (x - s[2]).abs() });
        }
        false
    });
    all
}

fn least(all: &[Seen], of: impl Fn(&Seen) -> f64) -> f64 {
    all.iter().map(of).fold(f64::INFINITY, f64::min)
}

/// Σ effort² of a balanced posture, by the explicit model.
fn effort(c: &Case, i: &Inputs, row: &Row, shank: f64) -> f64 {
    let Some(lean) = row.lean(i, shank) else { return f64::INFINITY };
    explicit::figure(i, shank, row.thigh, lean)
        .map_or(f64::INFINITY, |f| explicit::efforts(c, i, &f, row.thigh).iter().map(|e| e * e).sum())
}

/// Hip's share of the arms of a balanced posture.
fn hip_share(i: &Inputs, row: &Row, shank: f64) -> Option<f64> {
    let f = explicit::figure(i, shank, row.thigh, row.lean(i, shank)?)?;
    let x = explicit::com(&f.parts).0;
    Some((x - f.leg.hip[0]) / (f.leg.knee[0] - f.leg.hip[0]))
}

/// The posture that core chose and the scan; none where no shank is allowed on either road.
fn both(c: &Case, thigh: f64, step_deg: f64) -> Option<(plumbfold_core::Posture, Inputs, Row, Vec<Seen>)> {
    let i = Inputs::from(c);
    let row = Row::new(&i, thigh);
    let all = if row.lean_high < LEAN_LOW { Vec::new() } else { scan(&i, &row, step_deg) };
    match posture(c, Angle::from_rad(thigh)) {
        Balance::Stands { posture, .. } => Some((posture, i, row, all)),
        Balance::Refused(why) => {
            assert!(all.is_empty(), "refused by {why:?}, but {} shanks are allowed", all.len());
            None
        }
    }
}

fn with_rule(t: &Task, rule: Rule) -> Task {
    Task { rule, ..t.clone() }
}

proptest! {
    #![proptest_config(config(2))]

    /// Usual: no shank on the grid comes nearer the zone, and of those in it none is nearer the wish.
    #[test]
    fn usual_is_nearest_to_its_wish((m, t) in clients::plausible(), thigh in clients::thigh(), slope in 0.0..0.9) {
        let c = case(&m, &with_rule(&t, Rule::Usual { slope: Some(slope) }));
        let Some((p, i, row, all)) = both(&c, thigh, 0.02) else { return Ok(()) };
        let s = explicit::support(&i);
        let x = explicit::figure(&i, p.shank.rad(), thigh, p.trunk.rad()).map(|f| explicit::com(&f.parts).0);
        let outside = brute::outside(x.expect("posture exists"), s[1], s[3]);
        let best = least(&all, |a| a.outside_m);
        prop_assert!(outside <= best + 1e-8, "outside the zone by {} m, the scan {} m", outside, best);
        let wish = (6.0 + slope * thigh.to_degrees()).to_radians().min(c.limits().ankle.rad() + explicit::pitch(&i));
        if best == 0.0 {
            let nearest = all.iter().filter(|a| a.outside_m == 0.0).map(|a| (a.shank - wish).abs()).fold(f64::INFINITY, f64::min);
            prop_assert!((p.shank.rad() - wish).abs() <= nearest + 1e-7, "{} from the wish, the scan {}", (p.shank.rad() - wish).abs(), nearest);
        }
        near("knee flexion allowed", p.knee_flexion.rad().max(c.limits().knee.rad()), c.limits().knee.rad(), 1e-8);
        let _ = row;
    }

    /// LeastEffort: on the aim if anything is, and never above a dense grid.
    #[test]
    fn least_effort_is_never_above_a_dense_grid((m, t) in clients::plausible(), thigh in clients::thigh()) {
        let c = case(&m, &with_rule(&t, Rule::LeastEffort));
        let Some((p, i, row, all)) = both(&c, thigh, 0.1) else { return Ok(()) };
        let off = (p.com.x - explicit::support(&i)[2]).abs();
        let best = least(&all, |a| a.off_aim_m);
        prop_assert!(off <= best + 1e-8, "off the aim by {} m, the scan {} m", off, best);
        if best == 0.0 {
            let ours = effort(&c, &i, &row, p.shank.rad());
            let grid = all.iter().filter(|a| a.off_aim_m == 0.0).map(|a| effort(&c, &i, &row, a.shank)).fold(f64::INFINITY, f64::min);
            prop_assert!(ours <= grid * (1.0 + 1e-7), "Σ effort² {} at {}°, the grid {}", ours, p.shank.deg(), grid);
        }
    }

    /// ArmRatio: nothing on the grid comes nearer to the wished share.
    #[test]
    fn arm_ratio_is_never_further_than_a_dense_grid((m, t) in clients::plausible(), thigh in clients::thigh(), ratio in 0.2..6.0) {
        prop_assume!(thigh > 0.05);
        let c = case(&m, &with_rule(&t, Rule::ArmRatio(ratio)));
        let Some((p, i, row, all)) = both(&c, thigh, 0.1) else { return Ok(()) };
        if least(&all, |a| a.outside_m) > 0.0 {
            return Ok(());
        }
        let off = |shank: f64| hip_share(&i, &row, shank).map_or(f64::INFINITY, |s| (s - ratio / (1.0 + ratio)).abs());
        let grid = all.iter().filter(|a| a.outside_m == 0.0).map(|a| off(a.shank)).fold(f64::INFINITY, f64::min);
        let ours = off(p.shank.rad());
        prop_assert!(ours <= grid + 1e-7, "share off by {}, the grid {}", ours, grid);
    }
}

proptest! {
    #![proptest_config(config(1))]

    /// Moving the goal changes no reading at a fixed depth, and no depth.
    #[test]
    fn the_goal_changes_nothing((m, t) in clients::plausible(), thigh in clients::thigh(), goal in 0.0..140.0) {
        let mut t = t;
        let one = case(&m, &t);
        t.goal = deg(goal);
        let other = case(&m, &t);
        let (a, b) = (posture(&one, Angle::from_rad(thigh)), posture(&other, Angle::from_rad(thigh)));
        prop_assert_eq!(a, b);
        if let (Some(p), Some(q)) = (a.posture(), b.posture()) {
            prop_assert_eq!(readings(&one, p), readings(&other, q));
        }
        prop_assert_eq!(depths(&one), depths(&other));
    }

    /// Depths hold for any shank, whatever the rule; and down to the steady depth every rule but a
    /// held shank is steady.
    #[test]
    fn depths_do_not_know_the_rule((m, t) in clients::plausible(), share in 0.0..1.0, ratio in 0.2..6.0) {
        let rules = [Rule::Usual { slope: None }, Rule::LeastEffort, Rule::ArmRatio(ratio), Rule::HeldShank(deg(20.0))];
        let cases = rules.map(|r| case(&m, &with_rule(&t, r)));
        let d = depths(&cases[0]);
        for c in &cases[1..] {
            prop_assert_eq!(depths(c), d);
        }
        let Some(steady) = d.steady else { return Ok(()) };
        // standing may begin above 0°
        let thigh = Angle::from_deg(10.0 + share * (steady.deg() - 10.0));
        prop_assume!(thigh.deg() >= 10.0);
        for c in &cases[..3] {
            prop_assert!(posture(c, thigh).is_steady(), "{:?} at {}°", c.task().rule, thigh.deg());
        }
    }
}

/// A squat seen gives the client's own slope: the shank seen comes out at the thigh seen. An explicit
/// slope goes before it, a shallow squat seen does not count, the slope stays within 0–0.8.
#[test]
fn a_seen_squat_sets_the_slope() {
    let (m, mut t) = plumbfold_core::sample::average_man();
    let seen =
        |thigh: f64, shank: f64| Some(plumbfold_core::Seen { thigh: deg(thigh), shank: deg(shank), trunk: deg(30.0) });
    let shank = |t: &Task, thigh: f64| posture(&case(&m, t), deg(thigh)).posture().map_or(f64::NAN, |p| p.shank.deg());
    near("usual at 60°", shank(&t, 60.0), 6.0 + 0.33 * 60.0, 1e-9);
    t.seen = seen(60.0, 18.0);
    near("as seen", shank(&t, 60.0), 18.0, 1e-9);
    near("and in proportion", shank(&t, 30.0), 12.0, 1e-9);
    t.rule = Rule::Usual { slope: Some(0.30) };
    near("explicit", shank(&t, 60.0), 24.0, 1e-9);
    t.rule = Rule::Usual { slope: None };
    t.seen = seen(19.9, 18.0);
    near("too shallow to count", shank(&t, 60.0), 25.8, 1e-9);
    t.seen = seen(20.0, 4.0);
    near("no slope below zero", case(&m, &t).usual_slope(), 0.0, 1e-12);
    t.seen = seen(20.0, 40.0);
    near("none above 0.8", case(&m, &t).usual_slope(), 0.8, 1e-12);
    // capped by the ankle
    near("ankle", shank(&t, 60.0), case(&m, &t).limits().ankle.deg(), 1e-9);
}

/// Short thighs on wide hips, feet close together and far turned out: as the shank leans, the centre of
/// mass first goes back and then forward, so that two intervals of shanks reach a zone in front. Usual
/// keeps to the nearer one, a wish for a ratio searches both.
#[test]
fn usual_where_two_intervals_of_shanks_reach_the_zone() {
    let (mut m, mut t) = plumbfold_core::sample::average_man();
    (m.stature_m, m.lengths.shank_m, m.lengths.thigh_m) = (2.30, Some(0.65), Some(0.20));
    m.ankle = plumbfold_core::measures::AnkleRange::Degrees(Sides { left: Some(deg(60.0)), right: None });
    (t.stance_m, t.toe_out, t.lean_limit) = (Some(0.05), deg(60.0), Some(deg(28.0)));
    (t.placement, t.load_kg) = (plumbfold_core::Placement::HighBar, 300.0);
    let thigh = f64::to_radians(90.0);
    // a zone whose rear the furthest lean reaches only from shanks on both sides of the turn
    let i = Inputs::from(&case(&m, &t));
    let row = Row::new(&i, thigh);
    let far: Vec<f64> = scan(&i, &row, 0.02).iter().filter_map(|a| row.reach(&i, a.shank)).map(|r| r.1).collect();
    let turn = far.iter().copied().fold(f64::INFINITY, f64::min);
    let behind = far.last().copied().unwrap_or(f64::NAN);
    let zone_back =
        (0.5 * (turn + behind) - explicit::foot_x(&i, 0.0)) / (explicit::foot_x(&i, 1.0) - explicit::foot_x(&i, 0.0));
    assert!((0.05..0.9).contains(&zone_back) && behind > turn + 0.01);
    t.support = Support { edge_back: None, zone_back, aim: zone_back + 0.05, zone_front: 0.95, edge_front: None };
    let two = |all: &[Seen]| {
        let inside: Vec<f64> = all.iter().filter(|a| a.outside_m == 0.0).map(|a| a.shank).collect();
        let split = inside.windows(2).position(|w| w[0] - w[1] > f64::to_radians(0.1)).expect("two intervals");
        (inside[split], inside[split + 1], inside)
    };
    for slope in [0.0, 0.05, 0.1, 0.2, 0.3] {
        let c = case(&m, &with_rule(&t, Rule::Usual { slope: Some(slope) }));
        let (p, i, _, all) = both(&c, thigh, 0.02).expect("some shank is allowed");
        let s = explicit::support(&i);
        assert!(brute::outside(p.com.x, s[1], s[3]) < 1e-8);
        let wish = f64::to_radians(6.0 + slope * 90.0);
        let nearest = two(&all).2.iter().map(|a| (a - wish).abs()).fold(f64::INFINITY, f64::min);
        assert!((p.shank.rad() - wish).abs() <= nearest + 1e-7, "slope {slope}: {}°", p.shank.deg());
    }
    for ratio in [0.1, 0.5, 1.0, 2.0, 4.0, 10.0] {
        let c = case(&m, &with_rule(&t, Rule::ArmRatio(ratio)));
        let (p, i, row, all) = both(&c, thigh, 0.02).expect("some shank is allowed");
        let (_, _, inside) = two(&all);
        let off = |shank: f64| hip_share(&i, &row, shank).map_or(f64::INFINITY, |s| (s - ratio / (1.0 + ratio)).abs());
        let grid = inside.iter().map(|&a| off(a)).fold(f64::INFINITY, f64::min);
        assert!(off(p.shank.rad()) <= grid + 1e-7, "ratio {ratio}: {}°", p.shank.deg());
    }
}
