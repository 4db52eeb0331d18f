//! Small helpers: comparing numbers, how many cases, building a case.

use plumbfold_core::{Angle, Case, Measures, Task};
use proptest::test_runner::{Config, RngSeed};

/// Asserts that two numbers agree to an absolute tolerance; a NaN never does.
#[track_caller]
pub fn near(what: &str, ours: f64, theirs: f64, tol: f64) {
    assert!((ours - theirs).abs() <= tol, "{what}: {ours} against {theirs}, more than {tol} apart");
}

/// Degrees to an angle.
pub fn deg(d: f64) -> Angle {
    Angle::from_deg(d)
}

/// A case that must be possible.
#[track_caller]
pub fn case(m: &Measures, t: &Task) -> Case {
    match Case::new(m, t) {
        Ok((case, _)) => case,
        Err(why) => panic!("{why}"),
    }
}

/// How many random clients: 256, or as many as `PLUMBFOLD_CASES` says.
fn count() -> u32 {
    std::env::var("PLUMBFOLD_CASES").ok().and_then(|n| n.parse().ok()).unwrap_or(256)
}

/// Proptest's configuration: seeded, nothing written to disk, one in `share` of the usual number of
/// cases.
pub fn config(share: u32) -> Config {
    seeded((count() / share).max(1))
}

/// For second routes that scan for a tenth of a second: 32 cases of the usual 256, 200 of 10,000.
pub fn slow() -> Config {
    seeded((2.0 * f64::from(count()).sqrt()) as u32)
}

fn seeded(cases: u32) -> Config {
    let seed = std::env::var("PLUMBFOLD_SEED").ok().and_then(|n| n.parse().ok()).unwrap_or(20_261_201);
    Config {
        cases,
        rng_seed: RngSeed::Fixed(seed),
        failure_persistence: None,
        max_global_rejects: 200_000,
        max_shrink_iters: 2_000,
        ..Config::default()
    }
}
