//! Where everything is: the solver's posture against the explicit sum over all segments.

use plumbfold_core::{Case, Posture, pose, readings, sample, tables};
use proptest::prelude::*;

use crate::{
    clients,
    explicit::{self, Figure, Inputs},
    near::{case, config, deg, near},
};

/// Positions agree to this much, m: rounding of a few sums of metres.
const M: f64 = 1e-12;

fn agree(c: &Case, i: &Inputs, p: &Posture, f: &Figure) {
    let j = &p.joints;
    let pairs = [
        ("ankle", j.ankle, (f.leg.ankle[0], f.leg.ankle[1])),
        ("knee", j.knee, (f.leg.knee[0], f.leg.knee[1])),
        ("hip", j.hip, (f.leg.hip[0], f.leg.hip[1])),
        ("lumbosacral joint", j.lumbosacral, f.lumbosacral),
        ("shoulder", j.shoulder, f.shoulder),
        ("elbow", j.elbow, f.elbow),
        ("wrist", j.wrist, f.wrist),
        ("load", j.load, f.load),
        ("centre of mass", p.com, explicit::com(&f.parts)),
    ];
    for (what, ours, theirs) in pairs {
        near(what, ours.x, theirs.0, M);
        near(what, ours.y, theirs.1, M);
    }
    near("knee off the midline", p.knee_z_m, f.leg.knee[2], M);
    near("knee flexion", p.knee_flexion.rad(), f.leg.flexion(), 1e-9);
    near("pelvis", p.pelvis.rad(), f.pelvis, M);
    near("hip flexion", p.hip_flexion.rad(), p.thigh.rad() + f.pelvis, M);
    near("bend", p.bend.rad(), p.trunk.rad() - f.pelvis, M);
    near("dorsiflexion", p.ankle.rad(), p.shank.rad() - explicit::pitch(i), M);
    near("seat", p.seat_height_m, f.leg.hip[1] - 0.09, M);
    near("head", j.head.y, f.parts[explicit::ABOVE_HIP + 2].y, M);
    near("mass", c.mass_kg(), explicit::mass(&f.parts), 1e-10);
    near("mass", c.mass_kg(), c.body().mass_kg + c.task().load_kg, 1e-10);
    let r = readings(c, p);
    let m = &r.moments_nm;
    let theirs = explicit::moments(i, f);
    for ((what, ours), theirs) in
        [("ankle", m.ankle), ("knee", m.knee), ("hip", m.hip), ("low back", m.low_back)].into_iter().zip(theirs)
    {
        near(what, ours, theirs, 1e-9 * (1.0 + c.mass_kg() * tables::GRAVITY / c.stand().cos_out));
    }
    let e = &r.effort;
    for (ours, theirs) in
        [e.ankle, e.knee, e.hip, e.low_back].into_iter().zip(explicit::efforts(c, i, f, p.thigh.rad()))
    {
        near("effort", ours, theirs, 1e-9 * (1.0 + theirs.abs()));
    }
    let x = explicit::com(&f.parts).0;
    let s = explicit::support(i);
    near("knee arm", r.knee_arm_m, f.leg.knee[0] - x, M);
    near("hip arm", r.hip_arm_m, x - f.leg.hip[0], M);
    near("to the rear edge", r.heel_margin_m, x - s[0], M);
    near("to the front edge", r.toe_margin_m, s[4] - x, M);
    near("to the zone's rear", r.zone_m.0, x - s[1], M);
    near("to the zone's front", r.zone_m.1, s[3] - x, M);
    match r.ratio {
        Some(ratio) => near("ratio", ratio * r.knee_arm_m, r.hip_arm_m, 1e-9),
        None => assert!(r.knee_arm_m.abs() < 1e-3),
    }
}

proptest! {
    #![proptest_config(config(1))]

    /// Every point, the centre of mass, every reading: closed form against the plain sum, for any
    /// client whatever and any three angles.
    #[test]
    fn any_posture_is_the_sum_of_its_parts(
        (m, t) in clients::any_valid(),
        (shank, thigh, trunk) in (-10.0..89.0, 0.0..180.0, -5.0..85.0),
    ) {
        let Ok((c, _)) = Case::new(&m, &t) else { return Ok(()) };
        let i = Inputs::from(&c);
        let (ours, theirs) = (
            pose(&c, deg(shank), deg(thigh), deg(trunk)),
            explicit::figure(&i, f64::to_radians(shank), f64::to_radians(thigh), f64::to_radians(trunk)),
        );
        match (ours, theirs) {
            (Some(p), Some(f)) => agree(&c, &i, &p, &f),
            (None, None) => {}
            (ours, _) => panic!("only one of both finds the stance possible; ours: {}", ours.is_some()),
        }
    }

    /// Segments keep their length in space, the shank its inclination in the foot's plane, the knee
    /// its side offset: turned out, wide or narrow.
    #[test]
    fn legs_keep_their_lengths_in_space(
        (m, t) in clients::plausible(),
        shank in -10.0..50.0_f64,
        thigh in clients::thigh(),
    ) {
        let c = case(&m, &t);
        let Some(p) = pose(&c, deg(shank), plumbfold_core::Angle::from_rad(thigh), deg(20.0)) else { return Ok(()) };
        let half = t.stance_m.map_or(0.0485 * m.stature_m, |w| w / 2.0);
        let (hip_z, j) = (0.0485 * m.stature_m, &p.joints);
        let shank_v = [j.knee.x - j.ankle.x, j.knee.y - j.ankle.y, p.knee_z_m - half];
        let thigh_v = [j.hip.x - j.knee.x, j.hip.y - j.knee.y, hip_z - p.knee_z_m];
        near("shank", explicit::length(shank_v), c.body().shank_m, 1e-12);
        near("thigh", explicit::length(thigh_v), c.body().thigh_m, 1e-12);
        near("knee flexion", p.knee_flexion.rad(), explicit::angle_between(shank_v, thigh_v), 1e-9);
        let (sin, cos) = t.toe_out.rad().sin_cos();
        let along = shank_v[0] * cos + shank_v[2] * sin;
        near("inclination in the foot's plane", along.atan2(shank_v[1]), deg(shank).rad(), 1e-9);
        // the thigh seen from the side
        near("thigh angle", (-thigh_v[0]).atan2(thigh_v[1]), thigh, 1e-9);
        if thigh >= std::f64::consts::FRAC_PI_2 {
            near("knee over the foot", -shank_v[0] * sin + shank_v[2] * cos, 0.0, 1e-12);
        }
    }
}

/// Left and right measured the other way round, weight on the other leg: nothing changes.
#[test]
fn a_mirrored_client_is_the_same_client() {
    use plumbfold_core::{
        Sides,
        measures::{AnkleRange, HipRange, KneeRange},
    };
    let (mut m, mut t) = sample::long_thigh_woman();
    t.weight_left = Some(0.35);
    m.ankle = AnkleRange::KneeToWall(Sides { left: Some(0.05), right: Some(0.08) });
    m.hip = HipRange::RockBack(Sides { left: Some(deg(104.0)), right: Some(deg(98.0)) });
    m.knee = KneeRange::Degrees(Sides { left: Some(deg(131.0)), right: None });
    let one = case(&m, &t);
    m.ankle = AnkleRange::KneeToWall(Sides { left: Some(0.08), right: Some(0.05) });
    m.hip = HipRange::RockBack(Sides { left: Some(deg(98.0)), right: Some(deg(104.0)) });
    m.knee = KneeRange::Degrees(Sides { left: None, right: Some(deg(131.0)) });
    t.weight_left = Some(0.65);
    let other = case(&m, &t);
    assert_eq!(one.limits(), other.limits());
    for thigh in [0.0, 40.0, 80.0] {
        let (a, b) = (plumbfold_core::posture(&one, deg(thigh)), plumbfold_core::posture(&other, deg(thigh)));
        assert_eq!(a, b);
        let p = a.posture().expect("a shallow squat exists");
        let (a, b) = (readings(&one, p).moments_nm, readings(&other, p).moments_nm);
        near("hip", a.hip, b.hip, 1e-9);
        near("knee", a.knee, b.knee, 1e-9);
    }
}

/// The frame has no preferred direction: bent the other way at every joint, a body with hanging arms
/// is its own mirror image about the ankle. Fails if any segment's centre of mass sits on the wrong
/// side of its line.
#[test]
fn bent_backwards_it_is_its_own_mirror_image() {
    let (m, mut t) = sample::average_man();
    t.placement = plumbfold_core::Placement::AtSides;
    t.load_kg = 12.0;
    t.stance_m = Some(0.40);
    let c = case(&m, &t);
    let ahead = pose(&c, deg(20.0), deg(50.0), deg(30.0)).expect("stance possible");
    let back = pose(&c, deg(-20.0), deg(-50.0), deg(-30.0)).expect("stance possible");
    assert_eq!(ahead.bend.deg(), 0.0);
    let x0 = ahead.joints.ankle.x;
    let (a, b) = (&ahead.joints, &back.joints);
    for (p, q) in [(a.knee, b.knee), (a.hip, b.hip), (a.shoulder, b.shoulder), (a.head, b.head), (a.load, b.load)] {
        near("x", p.x - x0, x0 - q.x, 1e-12);
        near("y", p.y, q.y, 1e-12);
    }
    // the feet do not turn with the rest
    let feet = 2.0 * c.body().masses.foot_kg * (c.stand().foot_cm_s_m - x0);
    let moved = |x: f64| c.mass_kg() * (x - x0) - feet;
    near("centre of mass", moved(ahead.com.x), -moved(back.com.x), 1e-10);
    let (r, s) = (readings(&c, &ahead).moments_nm, readings(&c, &back).moments_nm);
    for (p, q) in [(r.ankle, s.ankle), (r.knee, s.knee), (r.hip, s.hip), (r.low_back, s.low_back)] {
        near("moment", p, -q, 1e-9);
    }
}

/// Bodies of every table and sex weigh what they should, limb by limb.
#[test]
fn masses_add_up() {
    for table in plumbfold_core::SegmentTable::ALL {
        for (sex, stature_m) in [(plumbfold_core::Sex::Male, 1.8), (plumbfold_core::Sex::Female, 1.6)] {
            let mut m = sample::measures(sex, stature_m, 73.0);
            m.table = table;
            let c = case(&m, &sample::plain_task());
            let b = &c.body().masses;
            let limbs = [b.thigh_kg, b.shank_kg, b.foot_kg, b.upper_arm_kg, b.forearm_kg, b.hand_kg];
            let sum = b.pelvis_kg + b.thorax_kg + b.head_kg + 2.0 * limbs.iter().sum::<f64>();
            near("body", sum, 73.0, 1e-12);
            // tables are scaled as a whole: proportions within one stay
            let s = tables::segments(table, sex);
            near("thigh to shank", b.thigh_kg / b.shank_kg, s.thigh.mass / s.shank.mass, 1e-12);
        }
    }
}

/// Lengths that were not measured, worked out by hand from the fit of the survey.
#[test]
fn lengths_from_stature_and_joint_centres_from_landmarks() {
    let (m, t) = sample::average_man();
    let c = case(&m, &t);
    let b = c.body();
    let mm = |a: f64, k: f64| (a + k * 1760f64.ln()).exp() / 1000.0;
    near("shank", b.shank_m, mm(-3.22822, 1.24011), 1e-12);
    near("thigh", b.thigh_m, mm(-2.78974, 1.17829), 1e-12);
    let (arm, trunk) = (mm(-2.15584, 1.06683), mm(-0.62162, 0.92516));
    near("hip to shoulder", b.trunk_m, trunk - 0.104 * arm, 1e-12);
    near("shoulder to elbow", b.upper_arm_m, 0.896 * arm, 1e-12);
    near("lumbosacral joint", b.lumbosacral_m, 0.18 * b.trunk_m, 1e-12);
    let foot = mm(-1.06613, 0.89258);
    near("heel to ankle", b.heel_to_ankle_m, 0.25 * foot, 1e-12);
    near("heel to ball", b.heel_to_ball_m, 0.74 * foot, 1e-12);
    near("hips", b.hip_half_m, 0.0485 * 1.76, 1e-12);
    let mut measured = m.clone();
    measured.lengths.thigh_m = Some(0.45);
    measured.lengths.heel_to_ankle_m = Some(0.05);
    let c = case(&measured, &t);
    near("measured as it is", c.body().thigh_m, 0.45, 0.0);
    near("measured as it is", c.body().heel_to_ankle_m, 0.05, 0.0);
    near("the others stay", c.body().shank_m, b.shank_m, 0.0);
}
