//! How long the solver takes: `cargo bench -p plumbfold-core`.
//!
//! Aims: a balance 0.3 µs, a posture 10 µs, both depths 60 µs, a whole study 3 ms. Inputs vary from call
//! to call, so that nothing is computed once and remembered.

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use plumbfold_core::{
    Angle, Case, Measures, Placement, Reasons, Rule, Step, Task, balance, depths,
    map::{Map, map},
    posture, readings, reasons, sample, study,
};

/// A client in the plane, one turned out and wide, one overhead with a wedge.
fn clients() -> [(&'static str, Measures, Task); 3] {
    let (m, t) = sample::average_man();
    let (w, u) = sample::long_thigh_woman();
    let wide = Task { stance_m: Some(0.45), toe_out: Angle::from_deg(25.0), ..u };
    let overhead = Task { placement: Placement::Overhead, load_kg: 20.0, heel_raise_m: 0.02, ..t.clone() };
    [("plane", m.clone(), t), ("turned_out", w, wide), ("overhead", m, overhead)]
}

fn case(m: &Measures, t: &Task) -> Case {
    match Case::new(m, t) {
        Ok((case, _)) => case,
        Err(why) => panic!("an invented client is valid: {why}"),
    }
}

/// Thigh angles all over the descent, a new one at each call.
fn depths_in_turn() -> impl FnMut() -> Angle {
    let mut k = 0_u32;
    move || {
        k = (k + 37) % 101;
        Angle::from_deg(5.0 + 0.85 * f64::from(k))
    }
}

fn benches(c: &mut Criterion) {
    for (name, m, t) in clients() {
        let usual = case(&m, &t);
        c.bench_function(&format!("case/{name}"), |b| b.iter(|| Case::new(black_box(&m), black_box(&t))));
        let mut thigh = depths_in_turn();
        c.bench_function(&format!("balance/{name}"), |b| {
            b.iter(|| balance(black_box(&usual), Angle::from_deg(22.0), thigh()));
        });
        let rules = [
            ("usual", Rule::Usual { slope: None }),
            ("least_effort", Rule::LeastEffort),
            ("arm_ratio", Rule::ArmRatio(2.0)),
        ];
        for (rule_name, rule) in rules {
            let ruled = case(&m, &Task { rule, ..t.clone() });
            let mut thigh = depths_in_turn();
            c.bench_function(&format!("posture_{rule_name}/{name}"), |b| {
                b.iter(|| posture(black_box(&ruled), thigh()));
            });
        }
        let mut thigh = depths_in_turn();
        c.bench_function(&format!("posture_and_readings/{name}"), |b| {
            b.iter(|| posture(black_box(&usual), thigh()).posture().map(|p| readings(&usual, p)));
        });
        c.bench_function(&format!("depths/{name}"), |b| b.iter(|| depths(black_box(&usual))));
        c.bench_function(&format!("study/{name}"), |b| b.iter(|| study(black_box(&usual))));
        c.bench_function(&format!("reasons/{name}"), |b| b.iter(|| reasons(black_box(&usual))));
    }
}

/// The whole study of one client: a descent of 60 postures with readings, the map of 96 × 64 cells, what
/// stops the squat, what it would take. At 118° no single change is enough, so that pairs are searched.
/// Aim: 3 ms in one thread on a quiet core.
fn whole_study(c: &mut Criterion) {
    let (m, t) = sample::long_thigh_woman();
    for (name, goal) in [("single", 90.0), ("pair", 118.0)] {
        let client = case(&m, &Task { goal: Angle::from_deg(goal), ..t.clone() });
        assert_eq!(reasons(&client).takes.pair.is_some(), name == "pair");
        c.bench_function(&format!("whole_study/{name}"), |b| b.iter(|| all_of(black_box(&client))));
        c.bench_function(&format!("whole_study/{name}/descent"), |b| b.iter(|| descent(black_box(&client))));
        c.bench_function(&format!("whole_study/{name}/map"), |b| b.iter(|| whole_map(black_box(&client))));
        c.bench_function(&format!("whole_study/{name}/reasons"), |b| b.iter(|| reasons(black_box(&client))));
    }
}

fn all_of(c: &Case) -> (Vec<Step>, Map, Reasons) {
    (descent(c), whole_map(c), reasons(c))
}

/// From standing to 118°.
fn descent(c: &Case) -> Vec<Step> {
    (0..60).map(|k| Step::at(c, Angle::from_deg(2.0 * f64::from(k)))).collect()
}

fn whole_map(c: &Case) -> Map {
    map(c, (Angle::ZERO, Angle::from_deg(140.0)), (Angle::from_deg(-10.0), Angle::from_deg(60.0)))
}

criterion_group!(core, benches, whole_study);
criterion_main!(core);
