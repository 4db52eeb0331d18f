//! Seven clients whose figures were computed independently by two other solvers.
//!
//! Angles within 0.05°, or 0.3° where the posture drifts; lengths within 0.5 mm, depths within 0.1°,
//! moments within 0.5 %. Each client at the goal, at a thigh angle of 60°, and at 60° with the shank
//! held, for which the client is changed and saved as the desk would save it.

use std::{
    fs,
    path::{Path, PathBuf},
};

use plumbfold_records::{Opened, Rule, open, save};
use serde_json::Value;
use tempfile::tempdir;

use crate::{
    TESTS,
    compare::{Report, fields, number, text},
    run::figures,
};

const LENGTH_TOL_M: f64 = 0.5e-3;
const DEPTH_TOL_DEG: f64 = 0.1;
const SHARE: f64 = 0.005;
/// Half a unit of the last decimal of the expected numbers: the half per cent of a small number is less.
const ROUNDING: f64 = 0.5e-4;

fn folder() -> PathBuf {
    Path::new(TESTS).join("worked")
}

fn expected() -> Value {
    let text = fs::read_to_string(folder().join("figures.json")).expect("shipped with the tests");
    serde_json::from_str(&text).expect("JSON")
}

/// Every expected number against the printed one of the same name.
fn compare(report: &mut Report, at: &str, printed: &Value, expected: &Value, angle_tol_deg: f64) {
    for (key, theirs) in fields(expected) {
        let (what, ours) = (format!("{at} {key}"), &printed[key]);
        match theirs {
            Value::Object(_) => compare(report, &what, ours, theirs, angle_tol_deg),
            Value::Array(point) => {
                assert_eq!(ours.as_array().map(Vec::len), Some(point.len()), "{what}");
                for (axis, theirs) in point.iter().enumerate() {
                    report.near(&format!("{what}[{axis}]"), number(&ours[axis]), number(theirs), LENGTH_TOL_M);
                }
            }
            Value::String(theirs) => report.same(&what, text(ours), theirs.as_str()),
            _ => {
                let (ours, theirs) = (number(ours), number(theirs));
                let tol = if key.ends_with("_depth_deg") {
                    DEPTH_TOL_DEG
                } else if key.ends_with("_deg") {
                    angle_tol_deg
                } else if at.ends_with("moments") || at.ends_with("effort") || key == "ratio" {
                    SHARE * theirs.abs() + ROUNDING
                } else {
                    LENGTH_TOL_M
                };
                report.near(&what, ours, theirs, tol);
            }
        }
    }
}

fn compare_posture(report: &mut Report, at: &str, printed: &Value, expected: &Value) {
    let angle_tol_deg = if expected["kind"] == "drifting" { 0.3 } else { 0.05 };
    compare(report, at, printed, expected, angle_tol_deg);
}

/// The client's first task with the shank held, in a file of its own.
fn with_held_shank(file: &Path, shank_deg: f64, target: &Path) {
    let Ok(Opened::Current(mut client)) = open(file) else { panic!("{} opens", file.display()) };
    client.visits[0].tasks[0].rule = Rule::HeldShank(shank_deg);
    save(&client, target).expect("saved");
}

#[test]
fn figures_are_those_of_the_worked_clients() {
    let folder_of_changed = tempdir().expect("a folder");
    let all = expected();
    let mut report = Report::default();
    for (name, expected) in fields(&all["clients"]) {
        let file = folder().join(format!("{name}.ron"));
        let at_goal = figures(&file, &[]);
        assert_eq!(at_goal["code"], name);
        for key in ["body", "steady_depth_deg", "balance_depth_deg"] {
            compare(&mut report, name, &at_goal, &serde_json::json!({ key: expected[key] }), 0.05);
        }
        compare_posture(&mut report, &format!("{name}, goal,"), &at_goal, &expected["at_goal"]);
        compare_posture(&mut report, &format!("{name}, 60°,"), &figures(&file, &["--thigh", "60"]), &expected["at_60"]);
        let held = &expected["held_shank_at_60"];
        let changed = folder_of_changed.path().join(format!("{name}.ron"));
        with_held_shank(&file, number(&held["shank_deg"]), &changed);
        let at = format!("{name}, 60°, shank held,");
        compare_posture(&mut report, &at, &figures(&changed, &["--thigh", "60"]), held);
    }
    // 7 clients, 3 postures of 33 numbers and names, 5 of the client
    report.finish(7 * (3 * 33 + 5));
}

/// The depths hold for any shank angle: the rule has no part in them.
#[test]
fn holding_the_shank_changes_no_depth() {
    let folder_of_changed = tempdir().expect("a folder");
    for (name, _) in fields(&expected()["clients"]) {
        let file = folder().join(format!("{name}.ron"));
        let changed = folder_of_changed.path().join(format!("{name}.ron"));
        with_held_shank(&file, 20.0, &changed);
        let (by_rule, held) = (figures(&file, &[]), figures(&changed, &[]));
        for key in ["steady_depth_deg", "balance_depth_deg", "body"] {
            assert_eq!(by_rule[key], held[key], "{name} {key}");
        }
    }
}
