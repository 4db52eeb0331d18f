//! Where it balances: the map against balance at one shank and thigh, against depths and stops.

use plumbfold_core::{
    Angle, Balance, Case, Posture, Refusal, Sides, Standing, Toward, balance, depths,
    map::{COLUMNS, Cell, Ground, Map, ROWS, map},
    measures::KneeRange,
    sample,
    stops::{Edge, Limit, stopped},
};
use proptest::prelude::*;

use crate::{
    brute::knee_may_split_the_shanks,
    clients,
    explicit::Inputs,
    near::{case, deg, near},
    put_back::many,
};

/// As far as anyone goes.
fn whole(c: &Case) -> Map {
    map(c, (Angle::ZERO, deg(160.0)), (deg(-10.0), deg(62.0)))
}

fn column_width(m: &Map) -> f64 {
    (m.thigh.1 - m.thigh.0).deg() / COLUMNS as f64
}

fn row_height(m: &Map) -> f64 {
    (m.shank.1 - m.shank.0).deg() / ROWS as f64
}

fn cells(m: &Map) -> impl Iterator<Item = (Angle, Angle, &Cell)> {
    let all = (0..COLUMNS).flat_map(|column| (0..ROWS).map(move |row| (column, row)));
    all.map(|(column, row)| (m.thigh_at(column), m.shank_at(row), m.cell(column, row).expect("inside")))
}

/// How a posture stands by the exact ends of zone and support, as depths are told and the map is drawn.
fn stands(c: &Case, p: &Posture) -> Ground {
    let (s, x) = (c.stand().support, p.com.x);
    let toward = if x < s.aim_m { Toward::Heels } else { Toward::Toes };
    if x >= s.zone_back_m - ROUNDING_M && x <= s.zone_front_m + ROUNDING_M {
        Ground::Steady
    } else if x >= s.edge_back_m - ROUNDING_M && x <= s.edge_front_m + ROUNDING_M {
        Ground::Drifting(toward)
    } else {
        Ground::Hold(toward)
    }
}

/// The last bits of a centre of mass, m.
const ROUNDING_M: f64 = 1e-12;

fn holds(edge: Edge, g: Ground) -> bool {
    match edge {
        Edge::Steady => g == Ground::Steady,
        Edge::Balance => matches!(g, Ground::Steady | Ground::Drifting(_)),
    }
}

/// The shanks (degrees, a fiftieth apart) at which one balance after the other holds.
fn holding(c: &Case, m: &Map, edge: Edge, thigh: Angle) -> Vec<f64> {
    let (from, to) = (m.shank.0.deg(), m.shank.1.deg());
    let n = ((to - from) * 50.0) as u32;
    let at = |k: u32| from + (to - from) * f64::from(k) / f64::from(n);
    let one = |s: f64| balance(c, deg(s), thigh).posture().is_some_and(|p| holds(edge, stands(c, p)));
    (0..=n).map(at).filter(|&s| one(s)).collect()
}

/// A cell against balance at its middle. Balance calls steady what is outside the zone by less than
/// 0.1 mm; where the legs cannot span the stance it says so, whatever else refuses too.
fn is_balance_at_its_middle(c: &Case, (thigh, shank, cell): (Angle, Angle, &Cell)) {
    let told = || format!("shank {}°, thigh {}°: {cell:?}", shank.deg(), thigh.deg());
    match balance(c, shank, thigh) {
        Balance::Refused(Refusal::Stance) => assert!(matches!(cell.ground, Ground::Refused(_)), "{}", told()),
        Balance::Refused(why) => {
            assert_eq!(cell.ground, Ground::Refused(why), "{}", told());
            assert!(cell.lean_rad.is_nan());
        }
        Balance::Stands { posture: p, standing } => {
            near("lean", cell.lean_rad, p.trunk.rad(), 1e-9);
            let s = c.stand().support;
            let out_by = (s.zone_back_m - p.com.x).max(p.com.x - s.zone_front_m);
            match (standing, cell.ground) {
                (Standing::Steady, Ground::Steady) => {}
                (Standing::Steady, Ground::Drifting(_)) => assert!(out_by > 0.0 && out_by <= 1e-4, "{}", told()),
                (Standing::Drifting(a), Ground::Drifting(b)) => assert_eq!(a, b, "{}", told()),
                (Standing::Tips { toward, .. }, Ground::Hold(b)) => assert_eq!(toward, b, "{}", told()),
                _ => panic!("{} against {standing:?}", told()),
            }
        }
    }
}

/// Along the thigh the cells that hold end where the depth does.
fn ends_with_the_depth(c: &Case, m: &Map, edge: Edge) {
    let depth = match edge {
        Edge::Steady => depths(c).steady,
        Edge::Balance => depths(c).balance,
    };
    let width = column_width(m);
    for column in 0..COLUMNS {
        let thigh = m.thigh_at(column);
        let mut rows = (0..ROWS).filter_map(|row| m.cell(column, row));
        let some = rows.any(|cell| holds(edge, cell.ground));
        let Some(d) = depth else {
            // none up to 10°: standing itself does not hold
            assert!(!some || thigh.deg() > 10.0, "{edge:?}: {thigh:?} holds, but there is no depth");
            continue;
        };
        if some && thigh.deg() > d.deg() + width {
            // only beyond a gap: right after the depth nothing holds
            let after = holding(c, m, edge, deg(d.deg() + 0.02));
            assert!(after.is_empty(), "{edge:?}: {}° holds, depth {}°", thigh.deg(), d.deg());
        }
        // standing may begin at any thigh angle up to 10°
        if !some && thigh.deg() > 10.0 && thigh.deg() < d.deg() - width {
            // only where what holds is so narrow that it falls between two rows
            let between = holding(c, m, edge, thigh);
            let (first, last) = (between.first().map_or(f64::NAN, |b| *b), between.last().map_or(f64::NAN, |b| *b));
            assert!(
                (0..ROWS).map(|row| m.shank_at(row).deg()).all(|s| s < first || s > last),
                "{edge:?}: nothing holds at {}°, depth {}°, balance {} to {}",
                thigh.deg(),
                d.deg(),
                first,
                last
            );
        }
    }
}

proptest! {
    #![proptest_config(many())]

    /// A cell is what balance says at its middle; lean is the same to rounding.
    #[test]
    fn a_cell_is_balance_at_its_middle((m, t) in clients::plausible()) {
        let c = case(&m, &t);
        prop_assume!(!knee_may_split_the_shanks(&Inputs::from(&c)));
        for cell in cells(&whole(&c)) {
            is_balance_at_its_middle(&c, cell);
        }
    }

    /// Cells that hold reach as deep as steady and balance depth, within one cell.
    #[test]
    fn edges_agree_with_the_depths((m, t) in clients::plausible()) {
        let c = case(&m, &t);
        prop_assume!(!knee_may_split_the_shanks(&Inputs::from(&c)));
        let all = whole(&c);
        ends_with_the_depth(&c, &all, Edge::Steady);
        ends_with_the_depth(&c, &all, Edge::Balance);
    }

    /// Where the ankle ends the squat by itself, the region that holds at the depth touches the cells
    /// that the ankle refuses, within one cell.
    #[test]
    fn the_ankle_that_stops_is_the_ankle_that_refuses((m, t) in clients::plausible()) {
        let c = case(&m, &t);
        let s = stopped(&c, Edge::Steady);
        let alone = s.stops.len() == 1 && s.stops[0].limit == Limit::Ankle && s.stops[0].alone;
        let (true, Some(depth)) = (alone, s.depth) else { return Ok(()) };
        let all = whole(&c);
        let column = (depth.deg() / column_width(&all) - 1.0).max(0.0) as usize;
        let mut refused = (0..ROWS).filter(|&r| all.cell(column, r).is_some_and(|x| x.ground == Ground::Refused(Refusal::Ankle)));
        let Some(first) = refused.next() else { return Ok(()) };
        let held = holding(&c, &all, Edge::Steady, all.thigh_at(column));
        let top = held.last().copied().unwrap_or(f64::NAN);
        prop_assert!((top - all.shank_at(first).deg()).abs() <= row_height(&all), "{} against {}", top, all.shank_at(first).deg());
    }
}

/// All three grounds and the refusing ranges lie where a hand would draw them.
#[test]
fn a_map_read_by_hand() {
    let (mut m, t) = sample::long_thigh_woman();
    m.knee = KneeRange::Degrees(Sides { left: Some(deg(160.0)), right: None });
    let c = case(&m, &t);
    let all = whole(&c);
    let at = |thigh: f64, shank: f64| {
        let column = (thigh / column_width(&all)) as usize;
        let row = ((shank + 10.0) / row_height(&all)) as usize;
        all.cell(column, row).expect("inside").ground
    };
    let ankle = c.limits().ankle.deg();
    // over the ankle limit, folded beyond hip and back, behind standing straight
    assert_eq!(at(60.0, ankle + 3.0), Ground::Refused(Refusal::Ankle));
    assert_eq!(at(150.0, 5.0), Ground::Refused(Refusal::Hip));
    assert_eq!(at(1.0, -8.0), Ground::Refused(Refusal::Knee));
    // half way down it is steady with the shank well forward and tips back with the shank upright
    assert_eq!(at(50.0, ankle - 3.0), Ground::Steady);
    assert!(matches!(at(95.0, -8.0), Ground::Hold(Toward::Heels)));
    // between steady and balance depth, drifting
    assert!(matches!(at(95.0, ankle - 1.0), Ground::Drifting(Toward::Heels)));
    assert_eq!((all.cell(COLUMNS, 0), all.cell(0, ROWS)), (None, None));
}
