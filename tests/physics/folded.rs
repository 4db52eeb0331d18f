//! Wide, turned-out stances in which the knee opens again as the shank leans on, so that a knee limit
//! leaves two pieces of shanks, of which the upper one counts.

use plumbfold_core::{Angle, Balance, Measures, Refusal, Rule, Sex, Sides, Task, measures::KneeRange, posture};
use proptest::prelude::*;

use crate::near::{case, config, deg};

/// A client whose knee is asked about in a wide turned-out stance.
fn wide() -> impl Strategy<Value = (Measures, Task)> {
    let body = (prop_oneof![Just(Sex::Male), Just(Sex::Female)], 1.5..1.9, 20.0..32.0);
    (body, 85.0..145.0, 0.26..0.44, 15.0..48.0, 25.0..60.0).prop_map(
        |((sex, stature_m, bmi), knee, width, toe_out, ankle): ((Sex, f64, f64), f64, f64, f64, f64)| {
            let mut m = plumbfold_core::sample::measures(sex, stature_m, bmi * stature_m * stature_m);
            m.knee = KneeRange::Degrees(Sides { left: Some(deg(knee)), right: None });
            m.ankle = plumbfold_core::measures::AnkleRange::Degrees(Sides { left: Some(deg(ankle)), right: None });
            let mut t = plumbfold_core::sample::plain_task();
            (t.stance_m, t.toe_out) = (Some(width * stature_m), deg(toe_out));
            (m, t)
        },
    )
}

proptest! {
    #![proptest_config(config(1))]

    /// A depth is never refused by the knee where a shank is allowed.
    #[test]
    fn not_refused_by_the_knee_while_it_allows_a_shank((m, t) in wide(), thigh in 40.0..120.0) {
        let c = case(&m, &Task { rule: Rule::Usual { slope: None }, ..t });
        let allowed = (-10..60).any(|a| !matches!(
            plumbfold_core::balance(&c, Angle::from_deg(f64::from(a)), deg(thigh)),
            Balance::Refused(_)
        ));
        let refused = matches!(posture(&c, deg(thigh)), Balance::Refused(Refusal::Knee));
        prop_assert!(!(allowed && refused));
    }
}

/// A stance of 0.69 m on 1.70 m, feet 30° out, knee to 102°: at a thigh angle of 79° the knee is over
/// its limit between shanks of 23.0 and 23.9°, under it on both sides.
#[test]
fn a_narrow_hump_of_the_knee_is_seen() {
    let mut m = plumbfold_core::sample::measures(Sex::Female, 1.697_822_931_948_513_2, 68.414_495_402_035_9);
    m.age_years = Some(18.0);
    m.lengths.thigh_m = Some(0.345_044_191_976_498_44);
    m.knee = KneeRange::Degrees(Sides { left: Some(deg(102.085_004)), right: None });
    m.hip = plumbfold_core::measures::HipRange::PelvisHeld(Sides { left: Some(deg(63.3687)), right: None });
    let mut t = plumbfold_core::sample::plain_task();
    t.placement = plumbfold_core::Placement::AtSides;
    (t.stance_m, t.toe_out) = (Some(0.688_158_996_946_615_5), deg(29.852_236));
    let c = case(&m, &t);
    let refused =
        |shank: f64| matches!(plumbfold_core::balance(&c, deg(shank), deg(79.0)), Balance::Refused(Refusal::Knee));
    assert!(!refused(22.0) && refused(23.4) && !refused(24.1));
    assert!(!matches!(posture(&c, deg(79.0)), Balance::Refused(_)), "{:?}", posture(&c, deg(79.0)));
}
