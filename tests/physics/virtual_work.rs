//! Static moments a third way: the work of gravity in small turns.

use plumbfold_core::{Angle, Case, Placement, Posture, pose, readings, sample, tables::GRAVITY};
use proptest::prelude::*;

use crate::{
    clients,
    explicit::{self, Inputs, P2, Part},
    near::{case, config, deg, near},
};

/// A small turn, rad; central differences err by its square.
const H: f64 = 1e-5;

/// Potential energy of parts turned forward by `by` about a point, J.
fn energy(parts: &[Part], about: P2, by: f64) -> f64 {
    let (sin, cos) = by.sin_cos();
    parts.iter().map(|p| GRAVITY * p.kg * (about.1 - (p.x - about.0) * sin + (p.y - about.1) * cos)).sum()
}

/// Moment that holds parts against gravity, from the energy lost in a small turn about a point.
fn holding(parts: &[Part], about: P2) -> f64 {
    -(energy(parts, about, H) - energy(parts, about, -H)) / (2.0 * H)
}

proptest! {
    #![proptest_config(config(1))]

    /// Turning all that is above a joint loses the energy that its moment has to hold; with the feet
    /// turned out both legs' moments, each about its own axis, add up to it.
    #[test]
    fn readings_hold_the_energy_of_a_small_turn(
        (m, t) in clients::plausible(),
        (shank, trunk) in (-5.0..45.0, -5.0..85.0),
        thigh in clients::thigh(),
    ) {
        let c = case(&m, &t);
        let i = Inputs::from(&c);
        let Some(f) = explicit::figure(&i, f64::to_radians(shank), thigh, f64::to_radians(trunk)) else { return Ok(()) };
        let p = pose(&c, deg(shank), Angle::from_rad(thigh), deg(trunk)).expect("both find the stance possible");
        let r = readings(&c, &p).moments_nm;
        // both legs even, about the line that both joints' axes make together
        let even = t.weight_left.map_or(1.0, |w| 2.0 * w.max(1.0 - w));
        let tilt = 2.0 * t.toe_out.rad().cos() / even;
        let at = |q: [f64; 3]| (q[0], q[1]);
        let tol = 1e-6 * (1.0 + c.mass_kg() * GRAVITY);
        near("ankles", r.ankle * tilt, holding(&f.parts[explicit::ABOVE_ANKLE..], at(f.leg.ankle)), tol);
        near("knees", r.knee * tilt, -holding(&f.parts[explicit::ABOVE_KNEE..], at(f.leg.knee)), tol);
        near("hips", r.hip * 2.0 / even, holding(&f.parts[explicit::ABOVE_HIP..], at(f.leg.hip)), tol);
        near("low back", r.low_back, holding(&f.parts[explicit::ABOVE_LOW_BACK..], f.lumbosacral), tol);
    }

    /// The solver against itself by two roads: the height of its centre of mass changes with each
    /// segment's inclination as its moments say. Legs in the plane; arms that ride with the trunk, so
    /// that the shoulders do no work.
    #[test]
    fn the_height_of_the_com_falls_as_the_moments_say(
        (m, t) in clients::plane(),
        (shank, trunk) in (0.0..45.0, -5.0..85.0),
        thigh in clients::thigh(),
        placement in proptest::sample::select(vec![
            Placement::ArmsCrossed, Placement::HighBar, Placement::LowBar, Placement::FrontRack, Placement::Goblet,
        ]),
    ) {
        let mut t = t;
        t.placement = placement;
        t.weight_left = None;
        falls_as_moments_say(&case(&m, &t), deg(shank), Angle::from_rad(thigh), deg(trunk));
    }
}

fn falls_as_moments_say(c: &Case, shank: Angle, thigh: Angle, trunk: Angle) {
    let at = |s: f64, t: f64, k: f64| -> Posture {
        let by = |a: Angle, h: f64| Angle::from_rad(a.rad() + h);
        pose(c, by(shank, s), by(thigh, t), by(trunk, k)).expect("legs in the plane always span")
    };
    let height = |s: f64, t: f64, k: f64| GRAVITY * c.mass_kg() * at(s, t, k).com.y;
    let p = at(0.0, 0.0, 0.0);
    // a corner of the pelvis within the small turn has no derivative
    if (thigh.rad() + trunk.rad() - c.limits().hip.rad()).abs() < 3.0 * H {
        return;
    }
    let lost = |up: f64, down: f64| -(up - down) / (2.0 * H);
    let r = readings(c, &p).moments_nm;
    let tol = 1e-6 * (1.0 + c.mass_kg() * GRAVITY);
    near("shank", lost(height(H, 0.0, 0.0), height(-H, 0.0, 0.0)), 2.0 * (r.ankle + r.knee), tol);
    let bent = p.bend.rad() > 0.0;
    // beyond the hip's range the thigh takes the pelvis along, and the back opens instead of the hip
    let (thigh_holds, trunk_holds) =
        if bent { (2.0 * r.knee + r.low_back, r.low_back) } else { (2.0 * (r.knee + r.hip), 2.0 * r.hip) };
    near("thigh", lost(height(0.0, H, 0.0), height(0.0, -H, 0.0)), thigh_holds, tol);
    near("trunk", lost(height(0.0, 0.0, H), height(0.0, 0.0, -H)), trunk_holds, tol);
}

/// Gravity pulls the trunk forward and down with what the back must hold: with nothing above the
/// pelvis but a known weight at the shoulders the moment is weight times arm.
#[test]
fn a_load_on_the_back_adds_its_weight_times_its_arm() {
    let (m, mut t) = sample::average_man();
    t.placement = Placement::HighBar;
    let empty = case(&m, &t);
    t.load_kg = 60.0;
    let loaded = case(&m, &t);
    let at = |c: &Case| pose(c, deg(25.0), deg(80.0), deg(40.0)).expect("legs span");
    let (p, q) = (at(&empty), at(&loaded));
    let (r, s) = (readings(&empty, &p).moments_nm, readings(&loaded, &q).moments_nm);
    let (j, weight) = (&q.joints, 60.0 * GRAVITY);
    near("hip", s.hip - r.hip, weight * (j.load.x - j.hip.x) / 2.0, 1e-9);
    near("knee", s.knee - r.knee, weight * (j.knee.x - j.load.x) / 2.0, 1e-9);
    near("ankle", s.ankle - r.ankle, weight * (j.load.x - j.ankle.x) / 2.0, 1e-9);
    near("low back", s.low_back - r.low_back, weight * (j.load.x - j.lumbosacral.x), 1e-9);
}
