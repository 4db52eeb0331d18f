//! From what was measured to the angles a squat must stay within.

use plumbfold_core::{
    Angle, Case, Limits, Measures, Origin, Placement, Sex, Sides,
    limits::{dorsiflexion_of_knee_to_wall, knee_to_wall_of_dorsiflexion},
    measures::{AnkleRange, Caps, HipRange, KneeRange},
    sample,
};
use proptest::prelude::*;

use crate::{
    clients,
    near::{case, config, deg, near},
};

fn limits(m: &Measures) -> Limits {
    *case(m, &sample::plain_task()).limits()
}

fn sides(left: f64, right: f64) -> Sides<Angle> {
    Sides { left: Some(deg(left)), right: Some(deg(right)) }
}

/// Ten centimetres, worked by hand: a foot of 26, ankle 6.5 from the heel, knee front 3 % of 1.70 m,
/// shank 40 cm: (26 + 10 − 5.1 − 6.5) / 40 = 0.61.
#[test]
fn knee_to_wall_of_ten_centimetres_by_hand() {
    let mut m = sample::measures(Sex::Male, 1.70, 70.0);
    m.lengths.foot_m = Some(0.26);
    m.lengths.shank_m = Some(0.40);
    let body = plumbfold_core::Body::new(&m);
    let angle = dorsiflexion_of_knee_to_wall(&body, 0.10).expect("reachable");
    near("sine", angle.rad().sin(), 0.61, 1e-12);
    near("and back", knee_to_wall_of_dorsiflexion(&body, angle), 0.10, 1e-12);
    // one centimetre more is 1 / (40 · cos) rad
    let at = |wall_m: f64| dorsiflexion_of_knee_to_wall(&body, wall_m).expect("reachable").deg();
    let slope = (0.01 / 0.40 / (1.0 - 0.61f64.powi(2)).sqrt()).to_degrees();
    near("slope per cm", (at(0.101) - at(0.099)) / 0.2, slope, 1e-4);
    near("slope per cm in numbers", slope, 1.81, 0.01);
    // toes at the wall, knee 4 cm short
    let short = dorsiflexion_of_knee_to_wall(&body, -0.04).expect("reachable");
    near("short of the wall", short.rad().sin(), 0.26, 1e-12);
}

/// Not measured is 10 cm, said to be assumed; for the average man that is the same as 10 cm measured.
#[test]
fn not_measured_is_assumed() {
    let (mut m, _) = sample::average_man();
    let assumed = limits(&m);
    assert_eq!(
        (assumed.ankle_from, assumed.knee_from, assumed.hip_from),
        (Origin::Assumed, Origin::Assumed, Origin::Assumed)
    );
    near("hip of men", assumed.hip.deg(), 95.0, 1e-12);
    near("knee", assumed.knee.deg(), 140.0, 1e-12);
    near("lean", assumed.lean.deg(), 85.0, 1e-12);
    near("bend", assumed.bend.deg(), 45.0, 1e-12);
    near("hip of women", limits(&sample::measures(Sex::Female, 1.65, 60.0)).hip.deg(), 107.0, 1e-12);
    m.ankle = AnkleRange::KneeToWall(Sides { left: Some(0.10), right: Some(0.14) });
    let measured = limits(&m);
    near("ten centimetres", measured.ankle.rad(), assumed.ankle.rad(), 1e-12);
    assert_eq!(measured.ankle_from, Origin::Measured);
}

/// The lesser side counts; a test of knee to chest is less by the pelvis's roll; a precaution lowers
/// and is named, and does nothing above the range.
#[test]
fn lesser_side_pelvic_roll_and_precautions() {
    let (mut m, _) = sample::average_man();
    m.ankle = AnkleRange::Degrees(sides(33.0, 28.0));
    m.knee = KneeRange::Degrees(sides(141.0, 138.0));
    m.hip = HipRange::KneeToChest(sides(120.0, 118.0));
    let l = limits(&m);
    near("ankle", l.ankle.deg(), 28.0, 1e-12);
    near("knee", l.knee.deg(), 138.0, 1e-12);
    near("hip of men, knee to chest", l.hip.deg(), 101.0, 1e-12);
    m.hip = HipRange::RockBack(sides(99.0, 104.0));
    near("rocked back", limits(&m).hip.deg(), 99.0, 1e-12);
    m.caps = Caps { knee: Some(deg(90.0)), hip: Some(deg(110.0)), load_kg: None };
    let l = limits(&m);
    near("capped knee", l.knee.deg(), 90.0, 1e-12);
    near("cap above the range", l.hip.deg(), 99.0, 1e-12);
    assert_eq!((l.knee_from, l.hip_from), (Origin::Precaution, Origin::Measured));
    m.sex = Sex::Female;
    m.hip = HipRange::KneeToChest(Sides { left: None, right: Some(deg(118.0)) });
    near("hip of women, knee to chest", limits(&m).hip.deg(), 104.0, 1e-12);
}

/// A load above its precaution is not carried.
#[test]
fn a_capped_load_is_what_is_carried() {
    let (mut m, mut t) = sample::average_man();
    t.placement = Placement::Goblet;
    t.load_kg = 30.0;
    m.caps.load_kg = Some(12.0);
    let c = case(&m, &t);
    near("carried", c.mass_kg(), 80.0 + 12.0, 1e-12);
}

proptest! {
    #![proptest_config(config(1))]

    /// Knee to wall is a triangle: with the shank at the limit the front of the knee touches the wall.
    #[test]
    fn at_its_limit_the_knee_touches_the_wall((m, t) in clients::plausible(), wall_cm in -10.0..20.0) {
        let mut m = m;
        m.ankle = AnkleRange::KneeToWall(Sides { left: Some(wall_cm / 100.0), right: None });
        // barefoot, feet straight ahead
        let t = plumbfold_core::Task {
            heel_raise_m: 0.0, footwear_drop_m: 0.0, toe_out: Angle::ZERO, stance_m: None, ..t
        };
        let Ok((c, _)) = Case::new(&m, &t) else { return Ok(()) };
        let p = plumbfold_core::pose(&c, c.limits().ankle, deg(60.0), deg(20.0)).expect("legs span");
        near("wall", p.joints.knee.x + 0.03 * m.stature_m, c.body().foot_m + wall_cm / 100.0, 1e-12);
    }
}
