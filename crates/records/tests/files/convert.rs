//! From what was typed to SI.

use plumbfold_core::{
    angle::Angle,
    measures::{AnkleRange, HipRange, KneeRange, Sides},
    task::{Bend, Rule},
};
use plumbfold_records as records;

use crate::{FULL, client};

fn near(found: f64, expected: f64) {
    assert!((found - expected).abs() < 1e-12, "{found} for {expected}");
}

#[test]
fn measures_are_metres_kilograms_and_angles() {
    let client = client(FULL);
    let measures = client.visits[0].measures();
    near(measures.stature_m, 1.6825);
    near(measures.mass_kg, 61.5);
    let lengths = measures.lengths;
    for (found, expected) in [
        (lengths.shank_m, 0.398),
        (lengths.thigh_m, 0.424),
        (lengths.trunk_m, 0.481),
        (lengths.foot_m, 0.245),
        (lengths.ankle_height_m, 0.069),
        (lengths.heel_to_ankle_m, 0.062),
        (lengths.upper_arm_m, 0.317),
        (lengths.forearm_m, 0.243),
        (lengths.hand_m, 0.181),
    ] {
        near(found.expect("given in the fixture"), expected);
    }
    assert_eq!(measures.ankle, AnkleRange::KneeToWall(Sides { left: Some(-0.015), right: Some(0.08) }));
    let degrees = |left, right| Sides { left: Some(Angle::from_deg(left)), right: Some(Angle::from_deg(right)) };
    assert_eq!(measures.hip, HipRange::KneeToChest(degrees(112.0, 118.0)));
    assert_eq!(measures.knee, KneeRange::Degrees(degrees(128.0, 131.0)));
    near(measures.reach_limit.deg(), 185.0);
    near(measures.caps.knee.expect("given").deg(), 100.0);
    near(measures.caps.hip.expect("given").deg(), 95.0);
    assert_eq!(measures.caps.load_kg, Some(20.0));
    assert_eq!(measures.scope.len(), 6);
    near(measures.strength.low_back, 0.9);
}

#[test]
fn a_task_is_metres_shares_and_angles() {
    let client = client(FULL);
    let visit = &client.visits[0];
    let main = visit.task(0).expect("there is a first task");
    near(main.footwear_drop_m, 0.010);
    near(main.heel_raise_m, 0.015);
    near(main.stance_m.expect("given"), 0.32);
    near(main.toe_out.deg(), 12.0);
    near(main.bend.available().deg(), 25.0);
    near(main.lean_limit.expect("given").deg(), 55.0);
    near(main.goal.deg(), 80.0);
    near(main.weight_left.expect("given"), 0.475);
    assert_eq!(main.rule, Rule::Usual { slope: Some(0.41) });
    let seen = main.seen.expect("given");
    near(seen.thigh.deg(), 60.0);
    near(seen.shank.deg(), 22.0);
    near(seen.trunk.deg(), 50.0);
    assert_eq!(main.support.edge_front, Some(0.75));
    let held = visit.task(1).expect("there is a second task");
    assert_eq!(held.rule, Rule::HeldShank(Angle::from_deg(25.0)));
    assert_eq!(held.bend, Bend::KeepSmall);
    assert_eq!(visit.task(2), None);
}

#[test]
fn every_way_of_measuring_and_every_rule_arrives_as_itself() {
    let mut client = client(FULL);
    let visit = &mut client.visits[0];
    let typed = Sides { left: Some(30.0), right: None };
    let angles = Sides { left: Some(Angle::from_deg(30.0)), right: None };
    visit.joints.ankle = records::Ankle::Degrees(typed);
    assert_eq!(visit.measures().ankle, AnkleRange::Degrees(angles));
    visit.joints.ankle = records::Ankle::NotMeasured;
    assert_eq!(visit.measures().ankle, AnkleRange::NotMeasured);
    for (from, to) in [
        (records::Hip::PelvisHeld(typed), HipRange::PelvisHeld(angles)),
        (records::Hip::RockBack(typed), HipRange::RockBack(angles)),
        (records::Hip::NotMeasured, HipRange::NotMeasured),
    ] {
        visit.joints.hip = from;
        assert_eq!(visit.measures().hip, to);
    }
    visit.joints.knee = records::Knee::NotMeasured;
    assert_eq!(visit.measures().knee, KneeRange::NotMeasured);
    for (from, to) in [
        (records::Rule::LeastEffort, Rule::LeastEffort),
        (records::Rule::ArmRatio(2.5), Rule::ArmRatio(2.5)),
        (records::Rule::Usual { slope: None }, Rule::Usual { slope: None }),
    ] {
        visit.tasks[0].rule = from;
        assert_eq!(visit.task(0).expect("there").rule, to);
    }
    for (from, to) in [(records::Bend::KeepSome, Bend::KeepSome), (records::Bend::Free, Bend::Free)] {
        visit.tasks[0].bend = from;
        assert_eq!(visit.task(0).expect("there").bend, to);
    }
}
