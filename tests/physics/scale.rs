//! Scale laws: a body twice as heavy, a body a tenth larger.

use plumbfold_core::{
    Angle, Case, Measures, Placement, Standing, Task, balance, depths, measures::Lengths, pose, posture, readings,
};
use proptest::prelude::*;

use crate::{
    brute::{self, LEAN_LOW},
    clients,
    explicit::Inputs,
    near::{case, config, deg, near},
};

/// All lengths, the stature, wedge, stance and every distance measured, times k.
fn larger(c: &Case, m: &Measures, t: &Task, k: f64) -> (Measures, Task) {
    let l = &c.body().landmarks;
    let lengths = Lengths {
        shank_m: Some(k * l.shank_m),
        thigh_m: Some(k * l.thigh_m),
        trunk_m: Some(k * l.trunk_m),
        foot_m: Some(k * l.foot_m),
        ankle_height_m: Some(k * l.ankle_height_m),
        heel_to_ankle_m: Some(k * l.heel_to_ankle_m),
        upper_arm_m: Some(k * l.upper_arm_m),
        forearm_m: Some(k * l.forearm_m),
        hand_m: Some(k * l.hand_m),
    };
    let mut m = Measures { stature_m: k * m.stature_m, lengths, ..m.clone() };
    let mut t = t.clone();
    t.heel_raise_m *= k;
    t.footwear_drop_m *= k;
    t.stance_m = Some(k * 2.0 * c.stand().half_stance_m);
    // the ankle as the angle it is
    let same = plumbfold_core::Sides { left: Some(c.limits().ankle), right: None };
    m.ankle = plumbfold_core::measures::AnkleRange::Degrees(same);
    (m, t)
}

/// The end of the lean range follows from "0.2 mm per degree", a length that does not grow with the
/// body: the law holds where that does not decide.
fn lean_ends_by_its_limits(c: &Case, thigh: f64) -> bool {
    let i = Inputs::from(c);
    let most = i.limits.lean.rad().min(i.limits.hip.rad() + i.limits.bend.rad() - thigh);
    most < LEAN_LOW || (brute::lean_high(&i, thigh) - most).abs() < 1e-9
}

proptest! {
    #![proptest_config(config(1))]

    /// k times the mass and load: the same postures and depths, k times the moments.
    #[test]
    fn all_masses_times_k((m, t) in clients::plausible(), thigh in clients::thigh(), k in 0.5..1.6_f64) {
        prop_assume!((25.0..=250.0).contains(&(k * m.mass_kg)));
        let c = case(&m, &t);
        let mut heavy = m.clone();
        heavy.mass_kg *= k;
        let mut task = t.clone();
        task.load_kg *= k;
        let h = case(&heavy, &task);
        let (a, b) = (posture(&c, Angle::from_rad(thigh)), posture(&h, Angle::from_rad(thigh)));
        let (Some(p), Some(q)) = (a.posture(), b.posture()) else {
            prop_assert_eq!(a, b);
            return Ok(());
        };
        // the least of squared efforts is flat: its place is found to about 1e-8 only
        near("shank", q.shank.rad(), p.shank.rad(), 1e-6);
        let p = pose(&h, p.shank, p.thigh, p.trunk).expect("the same legs");
        let q = pose(&c, p.shank, p.thigh, p.trunk).expect("the same legs");
        near("centre of mass", p.com.x, q.com.x, 1e-12);
        let (r, s) = (readings(&c, &q), readings(&h, &p));
        let tol = 1e-9 * (1.0 + 10.0 * c.mass_kg());
        near("ankle", s.moments_nm.ankle, k * r.moments_nm.ankle, tol);
        near("knee", s.moments_nm.knee, k * r.moments_nm.knee, tol);
        near("hip", s.moments_nm.hip, k * r.moments_nm.hip, tol);
        near("low back", s.moments_nm.low_back, k * r.moments_nm.low_back, tol);
        near("effort", s.effort.hip, r.effort.hip, 1e-9 * (1.0 + r.effort.hip.abs()));
        let (d, e) = (depths(&c), depths(&h));
        prop_assert_eq!(d.steady.is_some(), e.steady.is_some());
        near("steady depth", d.steady.map_or(0.0, Angle::rad), e.steady.map_or(0.0, Angle::rad), 1e-7);
        near("balance depth", d.balance.map_or(0.0, Angle::rad), e.balance.map_or(0.0, Angle::rad), 1e-7);
    }

    /// k times every length: the same angles at the same shank and thigh, points and moments times k.
    #[test]
    fn all_lengths_times_k(
        (m, t) in clients::plausible(),
        shank in 0.0..35.0_f64,
        thigh in clients::thigh(),
        k in 0.85..1.15_f64,
    ) {
        let mut t = t;
        t.lean_limit = Some(t.lean_limit.unwrap_or(deg(50.0)).min(deg(50.0)));
        let c = case(&m, &t);
        let (m2, t2) = larger(&c, &m, &t, k);
        let Ok((l, _)) = Case::new(&m2, &t2) else { return Ok(()) };
        prop_assume!(lean_ends_by_its_limits(&c, thigh) && lean_ends_by_its_limits(&l, thigh));
        let at = |c: &Case| balance(c, deg(shank), Angle::from_rad(thigh));
        let (a, b) = (at(&c), at(&l));
        let (Some(p), Some(q)) = (a.posture(), b.posture()) else {
            prop_assert_eq!(a, b);
            return Ok(());
        };
        near("lean", q.trunk.rad(), p.trunk.rad(), 1e-9);
        near("centre of mass", q.com.x, k * p.com.x, 1e-12);
        near("centre of mass", q.com.y, k * p.com.y, 1e-12);
        near("hip", q.joints.hip.y, k * p.joints.hip.y, 1e-12);
        let (r, s) = (readings(&c, p), readings(&l, q));
        let tol = 1e-9 * (1.0 + 10.0 * c.mass_kg());
        near("hip moment", s.moments_nm.hip, k * r.moments_nm.hip, tol);
        near("knee moment", s.moments_nm.knee, k * r.moments_nm.knee, tol);
        near("ankle moment", s.moments_nm.ankle, k * r.moments_nm.ankle, tol);
        near("low-back moment", s.moments_nm.low_back, k * r.moments_nm.low_back, tol);
        near("effort", s.effort.hip, r.effort.hip, 1e-9 * (1.0 + r.effort.hip.abs()));
        near("knee arm", s.knee_arm_m, k * r.knee_arm_m, 1e-12);
    }

    /// A larger body of the same proportions and ranges gets exactly as deep.
    #[test]
    fn depth_does_not_know_size((m, t) in clients::plausible(), k in 0.85..1.15_f64) {
        let mut t = t;
        t.lean_limit = Some(t.lean_limit.unwrap_or(deg(50.0)).min(deg(50.0)));
        let c = case(&m, &t);
        let (m2, t2) = larger(&c, &m, &t, k);
        let Ok((l, _)) = Case::new(&m2, &t2) else { return Ok(()) };
        let (d, e) = (depths(&c), depths(&l));
        for (a, b) in [(d.steady, e.steady), (d.balance, e.balance)] {
            let (Some(a), Some(b)) = (a, b) else {
                prop_assert_eq!(a.is_some(), b.is_some());
                continue;
            };
            prop_assume!(lean_ends_by_its_limits(&c, a.rad()) && lean_ends_by_its_limits(&l, a.rad()));
            near("depth", b.rad(), a.rad(), 1e-7);
        }
    }
}

/// The laws have content: a heavier load alone, a longer thigh alone do change the posture.
#[test]
fn one_mass_or_one_length_alone_is_no_scaling() {
    let (m, mut t) = plumbfold_core::sample::average_man();
    t.placement = Placement::Goblet;
    t.load_kg = 10.0;
    let lean = |m: &Measures, t: &Task| {
        let b = balance(&case(m, t), deg(25.0), deg(60.0));
        assert!(matches!(b, plumbfold_core::Balance::Stands { standing: Standing::Steady, .. }));
        b.posture().map_or(f64::NAN, |p| p.trunk.deg())
    };
    let before = lean(&m, &t);
    t.load_kg = 20.0;
    assert!((lean(&m, &t) - before).abs() > 1.0);
    t.load_kg = 10.0;
    let mut longer = m.clone();
    longer.lengths.thigh_m = Some(0.46);
    assert!((lean(&longer, &t) - before).abs() > 1.0);
}
