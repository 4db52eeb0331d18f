//! One invented client studied whole, with how long it takes:
//! `cargo run --release -p plumbfold-core --example study`.
//!
//! A study here is a descent of 60 postures with their readings from standing to the steady depth,
//! both depths, and what stops each of them. Prints the answers and the time, a name and a number a
//! line; `tests/reference/speed.py` reads them and does the same in another way.

use std::{
    hint::black_box,
    time::{Duration, Instant},
};

use plumbfold_core::{
    Angle, Case, Depths, Invalid, Step, depths, sample,
    stops::{Edge, Stopped, stopped},
};

/// Postures of the descent.
const POSTURES: u32 = 60;

struct Studied {
    depths: Depths,
    descent: Vec<Step>,
    steady: Stopped,
    balance: Stopped,
}

/// The study that is timed.
fn studied(c: &Case) -> Studied {
    let depths = depths(c);
    let end = depths.steady.unwrap_or(Angle::ZERO);
    let descent = (0..POSTURES).map(|k| Step::at(c, end * (f64::from(k) / f64::from(POSTURES - 1)))).collect();
    Studied { depths, descent, steady: stopped(c, Edge::Steady), balance: stopped(c, Edge::Balance) }
}

fn print(s: &Studied) {
    for (name, depth) in [("steady_depth_deg", s.depths.steady), ("balance_depth_deg", s.depths.balance)] {
        println!("{name} {}", depth.map_or(f64::NAN, Angle::deg));
    }
    for (edge, found) in [("steady", &s.steady), ("balance", &s.balance)] {
        for stop in &found.stops {
            println!("{edge}_without_{} {}", stop.limit.key(), stop.without.map_or(f64::NAN, Angle::deg));
            println!("{edge}_worth_{} {}", stop.limit.key(), stop.worth);
        }
    }
    for (at, step) in s.descent.iter().enumerate() {
        if let (Some(p), Some(r)) = (step.balance.held(), step.readings) {
            println!("posture_{at}_shank_deg {}", p.shank.deg());
            println!("posture_{at}_trunk_deg {}", p.trunk.deg());
            println!("posture_{at}_knee_nm {}", r.moments_nm.knee);
            println!("posture_{at}_hip_nm {}", r.moments_nm.hip);
        }
    }
}

/// Seconds a study: the least of batches over about a second, whatever else the machine does.
fn seconds(c: &Case) -> f64 {
    let mut least = f64::INFINITY;
    let start = Instant::now();
    while start.elapsed() < Duration::from_secs(1) {
        let batch = Instant::now();
        for _ in 0..10 {
            black_box(studied(black_box(c)));
        }
        least = least.min(batch.elapsed().as_secs_f64() / 10.0);
    }
    least
}

fn main() -> Result<(), Invalid> {
    let (measures, task) = sample::long_thigh_woman();
    let (case, _) = Case::new(&measures, &task)?;
    print(&studied(&case));
    println!("seconds {}", seconds(&case));
    Ok(())
}
