//! Balance at a given shank and thigh.

use plumbfold_core::{Angle, Balance, Case, Placement, Standing, Toward, balance, pose, readings, standing};
use proptest::prelude::*;

use crate::{
    brute::{LEAN_LOW, Row},
    clients,
    explicit::{self, Inputs},
    near::{case, config, deg, near},
};

/// The lean range's end is where a slope crosses a threshold; finite differences place it to this, rad.
const END: f64 = 1e-6;

/// The verdict from the support alone.
fn verdict(i: &Inputs, x: f64) -> Standing {
    let [back, zone_back, _, zone_front, front] = explicit::support(i);
    if x < back - 1e-9 {
        Standing::Tips { toward: Toward::Heels, by_m: back - x }
    } else if x > front + 1e-9 {
        Standing::Tips { toward: Toward::Toes, by_m: x - front }
    } else if x < zone_back - 1e-4 {
        Standing::Drifting(Toward::Heels)
    } else if x > zone_front + 1e-4 {
        Standing::Drifting(Toward::Toes)
    } else {
        Standing::Steady
    }
}

proptest! {
    #![proptest_config(config(1))]

    /// The centre of mass is on the aim, or lean is at the end of its range nearest to it; the lean
    /// is the one that halving finds on the explicit model; the verdict follows from the support.
    #[test]
    fn com_on_the_aim_or_lean_at_an_end(
        (m, t) in clients::any_valid(),
        (shank, thigh) in (-10.0..60.0, 0.0..150.0),
    ) {
        let Ok((c, _)) = Case::new(&m, &t) else { return Ok(()) };
        let i = Inputs::from(&c);
        let Balance::Stands { posture: p, standing: how } = balance(&c, deg(shank), deg(thigh)) else {
            return Ok(());
        };
        let row = Row::new(&i, f64::to_radians(thigh));
        let x = explicit::figure(&i, p.shank.rad(), p.thigh.rad(), p.trunk.rad()).map(|f| explicit::com(&f.parts).0);
        let x = x.expect("the posture exists");
        let aim = explicit::support(&i)[2];
        near("centre of mass", p.com.x, x, 1e-12);
        let (low, high) = row.reach(&i, p.shank.rad()).expect("the posture exists");
        if aim > low + 1e-8 && aim < high - 1e-8 {
            near("on the aim", x, aim, 1e-9);
        } else {
            let end = if aim <= low + 1e-8 { LEAN_LOW } else { row.lean_high };
            near("at the end of the lean range", p.trunk.rad(), end, END);
            near("no end brings it nearer", x, if aim <= low { low } else { high }, 1e-7);
        }
        let lean = row.lean(&i, p.shank.rad()).expect("the posture exists");
        near("lean", p.trunk.rad(), lean, END);
        prop_assert!(p.trunk.rad() >= LEAN_LOW - 1e-9 && p.trunk.rad() <= row.lean_high + END);
        prop_assert_eq!(standing(&c, &p), how);
        match (how, verdict(&i, p.com.x)) {
            (Standing::Tips { toward, by_m }, Standing::Tips { toward: other, by_m: miss }) => {
                prop_assert_eq!(toward, other);
                near("tips by", by_m, miss, 1e-12);
            }
            (ours, theirs) => prop_assert_eq!(ours, theirs),
        }
    }

    /// On the aim, arms and the sum of hip and knee demand are set by the legs alone: trunk length,
    /// placement of arms and load, hip range do not matter. With the feet turned out each leg's knee
    /// counts about its own axis.
    #[test]
    fn on_the_aim_the_legs_alone_set_arms_and_demand(
        (m, t) in clients::plausible(),
        (shank, thigh) in (5.0..40.0, 30.0..110.0),
        longer in 0.8..1.2_f64,
        placement in proptest::sample::select(Placement::ALL.to_vec()),
        hip in 80.0..130.0,
    ) {
        let (mut m, mut t) = (m, t);
        // a stance under the hips of both, so that only trunk and arms differ
        t.lean_limit = None;
        t.stance_m = Some(0.097 * m.stature_m);
        m.ankle = plumbfold_core::measures::AnkleRange::Degrees(plumbfold_core::Sides { left: Some(deg(60.0)), right: None });
        m.knee = plumbfold_core::measures::KneeRange::Degrees(plumbfold_core::Sides { left: Some(deg(170.0)), right: None });
        m.caps = plumbfold_core::measures::Caps::default();
        let c = case(&m, &t);
        let mut other = m.clone();
        other.lengths.trunk_m = Some((longer * c.body().landmarks.trunk_m).min(0.75));
        other.lengths.upper_arm_m = Some((longer * c.body().landmarks.upper_arm_m).min(0.50));
        other.hip = plumbfold_core::measures::HipRange::PelvisHeld(plumbfold_core::Sides { left: Some(deg(hip)), right: None });
        let d = case(&other, &plumbfold_core::Task { placement, ..t.clone() });
        let at = |c: &Case| balance(c, deg(shank), deg(thigh));
        let (Some(p), Some(q)) = (at(&c).posture().copied(), at(&d).posture().copied()) else { return Ok(()) };
        let aim = c.stand().support.aim_m;
        prop_assume!((p.com.x - aim).abs() < 1e-9 && (q.com.x - aim).abs() < 1e-9);
        let (r, s) = (readings(&c, &p), readings(&d, &q));
        near("knee arm", s.knee_arm_m, r.knee_arm_m, 1e-9);
        near("hip arm", s.hip_arm_m, r.hip_arm_m, 1e-9);
        let tol = 1e-8 * (1.0 + 10.0 * c.mass_kg());
        near("hip", s.moments_nm.hip, r.moments_nm.hip, tol);
        near("knee", s.moments_nm.knee, r.moments_nm.knee, tol);
        near("hip + knee", s.moments_nm.hip + s.moments_nm.knee, r.moments_nm.hip + r.moments_nm.knee, tol);
        near("ankle", s.moments_nm.ankle, r.moments_nm.ankle, tol);
    }

    /// On the aim the ankle holds the same at every depth and shank: the feet are all that is not
    /// above it.
    #[test]
    fn on_the_aim_the_ankle_demand_is_constant((m, t) in clients::plausible()) {
        let c = case(&m, &t);
        let mut seen: Option<f64> = None;
        for thigh in (0..=14).map(|k| f64::from(k) * 10.0) {
            for shank in [0.0, 12.0, 24.0, 36.0] {
                let Some(p) = balance(&c, deg(shank), deg(thigh)).posture().copied() else { continue };
                if (p.com.x - c.stand().support.aim_m).abs() > 1e-10 {
                    continue;
                }
                let ankle = readings(&c, &p).moments_nm.ankle;
                near("ankle", ankle, *seen.get_or_insert(ankle), 1e-7 * (1.0 + c.mass_kg()));
            }
        }
    }

    /// Leaning further within the range brings the centre of mass forward, never back.
    #[test]
    fn within_its_range_leaning_goes_forward((m, t) in clients::any_valid(), thigh in 0.0..140.0) {
        let Ok((c, _)) = Case::new(&m, &t) else { return Ok(()) };
        let i = Inputs::from(&c);
        let row = Row::new(&i, f64::to_radians(thigh));
        prop_assume!(row.lean_high > LEAN_LOW);
        let mut last = f64::NEG_INFINITY;
        for k in 0..=60 {
            let lean = LEAN_LOW + (row.lean_high - LEAN_LOW) * f64::from(k) / 60.0;
            let Some(p) = pose(&c, deg(0.0), deg(thigh), Angle::from_rad(lean)) else { return Ok(()) };
            prop_assert!(p.com.x > last);
            last = p.com.x;
        }
    }
}

/// Both identities are about the aim: off it, with another placement, arms do differ.
#[test]
fn off_the_aim_the_trunk_does_matter() {
    let (m, mut t) = plumbfold_core::sample::average_man();
    let at = |t: &plumbfold_core::Task| {
        let c = case(&m, t);
        let p = pose(&c, deg(20.0), deg(80.0), deg(30.0)).expect("legs span");
        readings(&c, &p)
    };
    let forward = at(&t);
    t.placement = Placement::AtSides;
    let hanging = at(&t);
    assert!(forward.hip_arm_m - hanging.hip_arm_m > 0.01);
    assert!(forward.moments_nm.ankle - hanging.moments_nm.ankle > 3.0);
}
