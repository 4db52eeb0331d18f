//! The whole of core on any client: only finite numbers, everything within its limits, no panic.

use plumbfold_core::{
    Angle, Balance, Case, Standing, balance, depths, pose, posture, posture_notices, readings, reasons,
    seen::depth_that_suits, study,
};
use proptest::prelude::*;

use crate::{
    brute::LEAN_LOW,
    clients::{self, Client},
    explicit::{self, Inputs},
    near::{config, deg},
};

/// No NaN and no infinity anywhere in a value, new fields included: what Debug prints holds none.
fn finite(what: &str, value: &impl std::fmt::Debug) {
    let text = format!("{value:?}");
    for bad in ["NaN", "(inf", "(-inf", " inf", " -inf"] {
        assert!(!text.contains(bad), "{what} holds {bad}: {text}");
    }
}

/// Limits hold to this much, rad.
const A: f64 = 1e-8;

fn within_limits(c: &Case, b: &Balance) {
    let Balance::Stands { posture: p, standing } = b else { return };
    let (l, i) = (c.limits(), Inputs::from(c));
    assert!(p.ankle.rad() <= l.ankle.rad() + A, "ankle {}° over {}°", p.ankle.deg(), l.ankle.deg());
    assert!(p.knee_flexion.rad() <= l.knee.rad() + A, "knee {}° over {}°", p.knee_flexion.deg(), l.knee.deg());
    assert!(p.hip_flexion.rad() <= l.hip.rad() + A, "hip {}° over {}°", p.hip_flexion.deg(), l.hip.deg());
    assert!(p.bend.rad() >= 0.0 && p.bend.rad() <= l.bend.rad() + A, "bend {}° over {}°", p.bend.deg(), l.bend.deg());
    assert!(p.trunk.rad() <= l.lean.rad() + A && p.trunk.rad() >= LEAN_LOW - A, "lean {}°", p.trunk.deg());
    for cap in [c.measures().caps.knee].into_iter().flatten() {
        assert!(p.knee_flexion.rad() <= cap.rad() + A, "knee over its precaution");
    }
    for cap in [c.measures().caps.hip].into_iter().flatten() {
        assert!(p.hip_flexion.rad() <= cap.rad() + A, "hip over its precaution");
    }
    if let Some(cap_kg) = c.measures().caps.load_kg {
        assert!(c.mass_kg() <= c.body().mass_kg + cap_kg + 1e-9, "load over its precaution");
    }
    let x = explicit::figure(&i, p.shank.rad(), p.thigh.rad(), p.trunk.rad()).map(|f| explicit::com(&f.parts).0);
    let x = x.expect("a posture can span its stance");
    let s = explicit::support(&i);
    match standing {
        Standing::Steady => assert!(x >= s[1] - 1.0001e-4 && x <= s[3] + 1.0001e-4, "steady at {x}"),
        Standing::Drifting(_) => assert!(x >= s[0] - 1e-8 && x <= s[4] + 1e-8, "drifting at {x}"),
        Standing::Tips { by_m, .. } => {
            assert!(*by_m > 0.0 && (x < s[0] || x > s[4]), "tips at {x}");
        }
    }
}

fn everything((m, t): &Client, thighs: &[f64], shank: f64) {
    let Ok((c, notices)) = Case::new(m, t) else {
        // malformed is said in words
        let why = Case::new(m, t).map_or_else(|e| e.to_string(), |_| String::new());
        assert!(why.contains("allowed is"), "{why}");
        return;
    };
    finite("case", &c);
    finite("notices", &notices);
    let d = depths(&c);
    finite("depths", &d);
    for depth in [d.steady, d.balance].into_iter().flatten() {
        assert!(depth.deg() >= 0.0 && depth.deg() <= 180.0);
    }
    let depth_angles = [d.steady, d.balance].into_iter().flatten().map(Angle::deg);
    for thigh in thighs.iter().copied().chain(depth_angles) {
        for b in [posture(&c, deg(thigh)), balance(&c, deg(shank), deg(thigh))] {
            finite("balance", &b);
            within_limits(&c, &b);
            if let Some(p) = b.posture() {
                finite("readings", &readings(&c, p));
                finite("notices", &posture_notices(&c, p));
            }
        }
        if let Some(p) = pose(&c, deg(shank), deg(thigh), deg(40.0)) {
            finite("posture", &p);
            finite("readings", &readings(&c, &p));
        }
    }
    let average = c.with_average_lengths();
    finite("average", &depths(&average));
    let s = study(&c);
    finite("study", &s);
    assert_eq!(s.depths, d);
    for pair in s.descent.windows(2) {
        assert!(pair[1].thigh.deg() > pair[0].thigh.deg() && pair[1].thigh.deg() - pair[0].thigh.deg() <= 3.0 + 1e-9);
    }
}

proptest! {
    #![proptest_config(config(1))]

    #[test]
    fn any_client_whatever(
        client in clients::any_valid(),
        thighs in proptest::collection::vec(0.0..180.0_f64, 4),
        shank in -10.0..89.0_f64,
    ) {
        everything(&client, &thighs, shank);
    }

    #[test]
    fn any_plausible_client(
        client in clients::plausible(),
        thighs in proptest::collection::vec(0.0..150.0_f64, 4),
        shank in -10.0..50.0_f64,
    ) {
        everything(&client, &thighs, shank);
    }

    /// What follows from a study is finite too: stops, shape or range, what it would take, the map.
    #[test]
    fn reasons_are_finite(which in any::<bool>(), plausible in clients::plausible(), odd in clients::any_valid()) {
        let (m, t) = if which { plausible } else { odd };
        let Ok((c, _)) = Case::new(&m, &t) else { return Ok(()) };
        finite("reasons", &reasons(&c));
        finite("suits", &depth_that_suits(&c, t.seen.map(|s| s.thigh)));
    }

    /// The lean at the steady depth is a posture too: an end is not outside.
    #[test]
    fn the_steady_depth_itself_is_steady(client in clients::plausible()) {
        let (m, mut t) = client;
        t.rule = plumbfold_core::Rule::Usual { slope: None };
        let Ok((c, _)) = Case::new(&m, &t) else { return Ok(()) };
        prop_assume!(!crate::brute::knee_may_split_the_shanks(&Inputs::from(&c)));
        if let Some(depth) = depths(&c).steady {
            let at = posture(&c, Angle::from_rad(depth.rad() - 1e-8));
            prop_assert!(at.is_steady() || depth.deg() < 10.0, "{:?}", at);
        }
    }
}

/// What is malformed is refused in words, and by value: each slip of the keyboard names its field.
#[test]
fn slips_of_the_keyboard_are_refused() {
    use plumbfold_core::sample;
    let (m, t) = sample::average_man();
    let refused = |m: &plumbfold_core::Measures, t: &plumbfold_core::Task, name: &str| {
        let why = Case::new(m, t).err().unwrap_or_else(|| panic!("{name} was accepted"));
        assert_eq!(why.name, name);
        assert!(why.to_string().contains(&why.value));
    };
    for stature_m in [176.0, f64::NAN, f64::INFINITY, 0.0] {
        refused(&plumbfold_core::Measures { stature_m, ..m.clone() }, &t, "Stature");
    }
    refused(&plumbfold_core::Measures { mass_kg: -1.0, ..m.clone() }, &t, "Mass");
    refused(&m, &plumbfold_core::Task { load_kg: f64::NAN, ..t.clone() }, "Load");
    refused(&m, &plumbfold_core::Task { toe_out: deg(61.0), ..t.clone() }, "Toe-out");
    let mut wall = m.clone();
    wall.lengths.shank_m = Some(0.20);
    wall.ankle =
        plumbfold_core::measures::AnkleRange::KneeToWall(plumbfold_core::Sides { left: Some(0.20), right: None });
    refused(&wall, &t, "Knee to wall");
    let mut small = m.clone();
    small.lengths.foot_m = Some(0.14);
    refused(&small, &plumbfold_core::Task { heel_raise_m: 0.08, footwear_drop_m: 0.02, ..t.clone() }, "Wedge");
    let mut order = t.clone();
    order.support.aim = 0.7;
    refused(&m, &order, "Support fraction");
}
