//! Limiting cases worked out by hand.

use plumbfold_core::{
    Case, Measures, PerJoint, Placement, Sex, Task, measures::Lengths, pose, readings, sample, tables::GRAVITY,
};

use crate::near::{case, deg, near};

/// A man of 80 kg with round lengths: shank 40, thigh 40, trunk 52 with an upper arm of 30 cm, so
/// that the shoulder centre is 48.88 cm above the hip; foot 26, ankle 8 cm high and 6 forward.
fn round() -> (Measures, Task) {
    let mut m = sample::measures(Sex::Male, 1.75, 80.0);
    m.lengths = Lengths {
        shank_m: Some(0.40),
        thigh_m: Some(0.40),
        trunk_m: Some(0.52),
        foot_m: Some(0.26),
        ankle_height_m: Some(0.08),
        heel_to_ankle_m: Some(0.06),
        upper_arm_m: Some(0.30),
        forearm_m: Some(0.25),
        hand_m: Some(0.19),
    };
    m.age_years = Some(25.0);
    let mut t = sample::plain_task();
    t.placement = Placement::AtSides;
    (m, t)
}

fn round_case() -> Case {
    let (m, t) = round();
    case(&m, &t)
}

#[test]
fn straight_standing_stacks_every_joint_over_the_ankle() {
    let c = round_case();
    let p = pose(&c, deg(0.0), deg(0.0), deg(0.0)).expect("standing");
    let j = &p.joints;
    for (what, point, height) in [
        ("ankle", j.ankle, 0.08),
        ("knee", j.knee, 0.48),
        ("hip", j.hip, 0.88),
        ("lumbosacral joint", j.lumbosacral, 0.88 + 0.18 * 0.4888),
        ("shoulder", j.shoulder, 0.88 + 0.4888),
        ("elbow", j.elbow, 0.88 + 0.4888 - 0.2688),
        ("wrist", j.wrist, 0.88 + 0.4888 - 0.2688 - 0.25),
    ] {
        near(what, point.x, 0.06, 1e-12);
        near(what, point.y, height, 1e-12);
    }
    let r = readings(&c, &p).moments_nm;
    for m in [r.ankle, r.knee, r.hip, r.low_back] {
        near("nothing to hold", m, 0.0, 1e-9);
    }
    // only the feet, 2 · 0.0137 of the mass, have their centre 0.4415 · 26 cm from the heel
    near("centre of mass", p.com.x, 0.06 + 0.0274 * (0.4415 * 0.26 - 0.06), 1e-12);
    near("flexion", p.knee_flexion.rad() + p.hip_flexion.rad() + p.twist.rad(), 0.0, 1e-12);
    near("seat", p.seat_height_m, 0.79, 1e-12);
}

/// Shank and trunk upright, thigh level: everything above the hips hangs over the hips, 40 cm behind
/// the knee. Above the hips is 0.6028 of the mass; each thigh 0.1416 with its centre 0.4095 from the
/// hip.
#[test]
fn thigh_level_shank_and_trunk_upright() {
    let c = round_case();
    let p = pose(&c, deg(0.0), deg(90.0), deg(0.0)).expect("level");
    near("hip behind the knee", p.joints.knee.x - p.joints.hip.x, 0.40, 1e-12);
    near("hip as high as the knee", p.joints.hip.y, p.joints.knee.y, 1e-12);
    near("knee flexion", p.knee_flexion.deg(), 90.0, 1e-9);
    near("hip flexion", p.hip_flexion.deg(), 90.0, 1e-9);
    let r = readings(&c, &p).moments_nm;
    let knee = 40.0 * GRAVITY * (0.6028 * 0.40 + 0.2832 * (1.0 - 0.4095) * 0.40);
    near("knee", r.knee, knee, 1e-9);
    near("knee in numbers", r.knee, 120.82, 0.01);
    near("hip", r.hip, 0.0, 1e-9);
    near("low back", r.low_back, 0.0, 1e-9);
    // the ankle stands under the knee; all above it is behind
    near("ankle", r.ankle, -knee, 1e-9);
}

/// Thigh level, trunk level: the hip holds pelvis, thorax, head and hanging arms at their distances.
#[test]
fn trunk_level_over_a_level_thigh() {
    let (mut m, t) = round();
    m.hip =
        plumbfold_core::measures::HipRange::PelvisHeld(plumbfold_core::Sides { left: Some(deg(170.0)), right: None });
    let c = case(&m, &t);
    let p = pose(&c, deg(0.0), deg(80.0), deg(90.0)).expect("folded");
    near("no bend", p.bend.deg(), 0.0, 1e-12);
    let (trunk, arms) = (0.4888, 2.0 * (0.0271 + 0.0162 + 0.0061));
    let along = 0.1117 * 0.1098 * trunk + 0.3229 * 0.7278 * trunk + 0.0694 * (trunk + 0.1202 * 1.75) + arms * trunk;
    near("hip", readings(&c, &p).moments_nm.hip, 40.0 * GRAVITY * along, 1e-9);
}

/// Ten degrees more than the hip allows are taken by pelvis and back, and the pelvis stays behind.
#[test]
fn what_the_hip_lacks_the_back_bends() {
    let (m, t) = round();
    let c = case(&m, &t);
    // not measured: 95° for men
    let p = pose(&c, deg(20.0), deg(70.0), deg(35.0)).expect("legs span");
    near("bend", p.bend.deg(), 10.0, 1e-9);
    near("pelvis", p.pelvis.deg(), 25.0, 1e-9);
    near("hip flexion", p.hip_flexion.deg(), 95.0, 1e-9);
    let j = &p.joints;
    near("pelvis line", (j.lumbosacral.x - j.hip.x).atan2(j.lumbosacral.y - j.hip.y).to_degrees(), 25.0, 1e-9);
    near("trunk line", (j.shoulder.x - j.lumbosacral.x).atan2(j.shoulder.y - j.lumbosacral.y).to_degrees(), 35.0, 1e-9);
    let q = pose(&c, deg(20.0), deg(60.0), deg(35.0)).expect("legs span");
    near("not before", q.bend.deg(), 0.0, 1e-12);
}

/// Without a load its place is nothing: bars, front rack and crossed arms differ only by the arms.
#[test]
fn no_load_no_matter_where() {
    let (m, mut t) = round();
    t.placement = Placement::HighBar;
    let high = case(&m, &t);
    t.placement = Placement::LowBar;
    let low = case(&m, &t);
    let at = |c: &Case| pose(c, deg(20.0), deg(60.0), deg(35.0)).expect("legs span");
    let (p, q) = (at(&high), at(&low));
    // the upper arms hang 10° further back under a low bar: 2·(0.0271·0.5772 + 0.0223)·0.2688 m of body mass
    let arm = 2.0 * (0.0271 * 0.5772 + 0.0162 + 0.0061) * 0.2688;
    let back = |a: f64| deg(35.0 + a).rad().sin();
    near("centre of mass", p.com.x - q.com.x, arm * (back(190.0) - back(200.0)), 1e-12);
}

/// Overhead the arms stay upright until the reach limit takes them along.
#[test]
fn arms_overhead_stay_upright_within_their_reach() {
    let (mut m, mut t) = round();
    t.placement = Placement::Overhead;
    m.reach_limit = deg(200.0);
    let c = case(&m, &t);
    let arm = |lean: f64| {
        let p = pose(&c, deg(20.0), deg(60.0), deg(lean)).expect("legs span");
        let j = p.joints;
        ((j.wrist.x - j.shoulder.x).atan2(j.wrist.y - j.shoulder.y).to_degrees(), p.arms_short.deg())
    };
    for (lean, out) in [(0.0, 0.0), (10.0, 0.0), (20.0, 0.0), (35.0, 15.0), (60.0, 40.0)] {
        let (arm, short) = arm(lean);
        near("arms from the vertical", arm, out, 1e-9);
        near("said to be short by", short, out, 1e-9);
    }
}

/// Capacity and effort worked out by hand: knee of a man of 25 at 90°, and at 42.5 years, half way
/// between 25 and 60.
#[test]
fn capacity_by_hand() {
    let (mut m, t) = round();
    m.strength = PerJoint { ankle: 1.0, knee: 2.0, hip: 1.0, low_back: 0.5 };
    let scale = 80.0 * GRAVITY * 1.75;
    let quarter = std::f64::consts::FRAC_PI_2;
    let young = 0.163 * (1.258 * (quarter - 1.133)).cos();
    let older = 0.156 * (1.225 * (quarter - 1.173)).cos();
    for (age, share) in [(10.0, young), (25.0, young), (42.5, 0.5 * (young + older)), (60.0, older)] {
        m.age_years = Some(age);
        let c = case(&m, &t);
        let p = pose(&c, deg(0.0), deg(90.0), deg(0.0)).expect("level");
        let r = readings(&c, &p);
        near("knee capacity", r.capacity_nm.knee, scale * share, 1e-9);
        near("knee effort", r.effort.knee, r.moments_nm.knee / (2.0 * scale * share), 1e-9);
        near("low back capacity", r.capacity_nm.low_back, 0.18 * scale, 1e-9);
        near("ankle capacity", r.capacity_nm.ankle, 0.095 * scale, 1e-9);
        // hip at 90° is past the fit's 1.3 rad, knee at 90° within its 1.8 rad
        assert!(r.stretched.hip && !r.stretched.knee);
    }
    // eldest rows from 70 on, held at 1.3 rad for the hip
    m.age_years = Some(85.0);
    let c = case(&m, &t);
    let p = pose(&c, deg(0.0), deg(90.0), deg(0.0)).expect("level");
    let hip = 0.144 * (0.896_f64 * (1.3 - 1.125)).cos();
    near("hip capacity", readings(&c, &p).capacity_nm.hip, scale * hip, 1e-9);
}

/// A leg that carries 70 % is asked 1.4 times the even share at ankle, knee and hip; the back is one.
#[test]
fn an_uneven_weight_asks_more_of_one_leg() {
    let (m, mut t) = round();
    let even = case(&m, &t);
    t.weight_left = Some(0.70);
    let uneven = case(&m, &t);
    let at = |c: &Case| readings(c, &pose(c, deg(25.0), deg(70.0), deg(40.0)).expect("legs span")).moments_nm;
    let (a, b) = (at(&even), at(&uneven));
    near("ankle", b.ankle, 1.4 * a.ankle, 1e-9);
    near("knee", b.knee, 1.4 * a.knee, 1e-9);
    near("hip", b.hip, 1.4 * a.hip, 1e-9);
    near("low back", b.low_back, a.low_back, 1e-12);
}

/// The heel raised by 30 mm: the sole pitches about the ball by asin(30 / (0.74 · 260)), every point
/// of the foot keeps its distance from the ball, the heel's edge is as high as the wedge.
#[test]
fn a_raised_heel_turns_the_foot_about_its_ball() {
    let (m, mut t) = round();
    let flat = case(&m, &t);
    t.heel_raise_m = 0.02;
    t.footwear_drop_m = 0.01;
    let c = case(&m, &t);
    let s = c.stand();
    near("pitch", s.pitch.rad(), (0.03_f64 / 0.1924).asin(), 1e-12);
    let at = |c: &Case| pose(c, deg(15.0), deg(20.0), deg(10.0)).expect("legs span");
    let (p, q) = (at(&c), at(&flat));
    let span = |j: &plumbfold_core::Joints, a: plumbfold_core::Point| (a.x - j.ball.x).hypot(a.y - j.ball.y);
    near("ankle to ball", span(&p.joints, p.joints.ankle), span(&q.joints, q.joints.ankle), 1e-12);
    near("heel to ball", span(&p.joints, p.joints.heel), 0.1924, 1e-12);
    near("heel's edge", p.joints.heel.y, 0.03, 1e-12);
    near("toe stays", p.joints.toe.x, q.joints.toe.x, 1e-12);
    let foot = |c: &Case| (c.stand().foot_cm_s_m - 0.1924).hypot(c.stand().foot_cm_y_m);
    near("foot's centre of mass to ball", foot(&c), foot(&flat), 1e-12);
    // sole against shank: the pitch is taken off the dorsiflexion
    near("dorsiflexion", p.ankle.deg(), 15.0 - s.pitch.deg(), 1e-9);
    // fractions of the support count from the heel's edge, which has moved forward
    let heel = 0.1924 * (1.0 - s.pitch.rad().cos());
    near("heel's edge forward", s.support.heel_m, heel, 1e-12);
    near("aim", s.support.aim_m, heel + 0.5 * (0.26 - heel), 1e-12);
    near("rear edge", s.support.edge_back_m, heel + 0.15 * (0.26 - heel), 1e-12);
}

/// Edges move in from 55 to 65 years, linearly.
#[test]
fn the_support_narrows_with_age() {
    let (mut m, t) = round();
    for (age, back, front) in [
        (None, 0.15, 0.80),
        (Some(55.0), 0.15, 0.80),
        (Some(60.0), 0.205, 0.78),
        (Some(65.0), 0.26, 0.76),
        (Some(90.0), 0.26, 0.76),
    ] {
        m.age_years = age;
        let c = case(&m, &t);
        near("rear edge", c.stand().support.edge_back_m, back * 0.26, 1e-12);
        near("front edge", c.stand().support.edge_front_m, front * 0.26, 1e-12);
    }
}
