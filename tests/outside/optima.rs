//! Depths, least effort and what it would take, against SciPy's general optimisers, which look for
//! them with all angles and amounts free at once.

use std::sync::LazyLock;

use plumbfold_core::{
    Angle, Case, Rule, Task, depths, posture, readings,
    takes::{Kind, Outcome, Take, takes},
};
use serde_json::{Map, Value};

use crate::reference::{Report, case, cases, file, number, text};

static FILE: LazyLock<Value> = LazyLock::new(|| file("optima.json"));

/// Depths, degrees: a hundred times closer than what matters.
const DEPTH_TOL_DEG: f64 = 1e-3;
/// The greatest depth in a range, degrees: ours is looked for to 0.0001 of the range, and the depth may
/// end there at an amount with which not even standing is steady.
const GREATEST_TOL_DEG: f64 = 0.01;
/// Share by which our least effort may be above theirs.
const EFFORT_SHARE: f64 = 1e-6;
/// Amounts, as a share of the range they lie in: 0.5 µm of wedge, 0.1 g, 0.0001°.
const AMOUNT_SHARE: f64 = 1e-5;

fn firm(value: &Value) -> bool {
    value["loose"].as_array().expect("a list").is_empty()
}

fn compare_depths(report: &mut Report, case: &Case, line: &Value) {
    let ours = depths(case);
    for (key, ours) in [("steady_depth_deg", ours.steady), ("balance_depth_deg", ours.balance)] {
        // no depth is far from every depth
        let ours = ours.map_or(f64::NAN, Angle::deg);
        report.near(&format!("{} {key}", text(&line["code"])), ours, number(&line[key]), DEPTH_TOL_DEG);
    }
}

#[test]
fn steady_and_balance_depth_are_those_of_general_optimisers() {
    let mut report = Report::default();
    for line in cases(&FILE) {
        compare_depths(&mut report, &case(line), line);
    }
    report.finish(2 * 64);
}

/// Σ effort² of our least-effort posture, and how far its centre of mass is from the aim.
fn least_effort(case: &Case, thigh: Angle) -> (f64, f64) {
    let case = case.with_task(&Task { rule: Rule::LeastEffort, ..case.task().clone() }).expect("the same task");
    let balance = posture(&case, thigh);
    let p = balance.held().expect("the optimiser found one");
    let e = readings(&case, p).effort;
    let sum = e.ankle.powi(2) + e.knee.powi(2) + e.hip.powi(2) + e.low_back.powi(2);
    (sum, (p.com.x - case.stand().support.aim_m).abs())
}

#[test]
fn least_effort_is_no_more_than_general_optimisers_find() {
    let mut report = Report::default();
    for line in cases(&FILE) {
        let case = case(line);
        for theirs in line["least_effort"].as_array().expect("a list") {
            let thigh_deg = number(&theirs["thigh_deg"]);
            let what = format!("{} least effort at {thigh_deg}°", text(&line["code"]));
            let (ours, off_aim_m) = least_effort(&case, Angle::from_deg(thigh_deg));
            let theirs = number(&theirs["effort"]);
            // a posture off the aim could be easier: it would be no answer to the same question
            report.near(&format!("{what}: aim"), off_aim_m, 0.0, 1e-9);
            report.no_more(&what, ours, theirs * (1.0 + EFFORT_SHARE));
            // nor can both searches be far apart the other way
            report.no_more(&format!("{what}: theirs"), theirs, ours * (1.0 + EFFORT_SHARE));
        }
    }
    report.finish(3 * 175);
}

fn kind(name: &str) -> Kind {
    match name {
        "HeelRaise" => Kind::HeelRaise,
        "WiderStance" => Kind::WiderStance,
        "Counterweight" => Kind::Counterweight,
        "Ankle" => Kind::Ankle,
        "Hip" => Kind::Hip,
        other => panic!("{other} is no change"),
    }
}

fn compare_take(report: &mut Report, what: &str, ours: &Take, theirs: &Value) {
    let most = number(&theirs["most"]);
    let tol = AMOUNT_SHARE * most.max(1.0);
    match (ours.outcome, theirs["enough"].as_f64()) {
        (Outcome::Enough { amount }, Some(enough)) => report.near(what, amount, enough, tol),
        (Outcome::NotByItself { amount }, None) => {
            report.no_more(&format!("{what}: amount of the greatest depth"), amount, most + tol);
            // standing nowhere in the range counts as no depth on both sides
            let (ours, theirs) = (ours.depth.map_or(0.0, Angle::deg), theirs["depth_deg"].as_f64().unwrap_or(0.0));
            report.near(&format!("{what}: greatest depth"), ours, theirs, GREATEST_TOL_DEG);
        }
        (ours, theirs) => report.differ(what, &format!("{ours:?} against {theirs:?}")),
    }
}

fn changes(line: &Value) -> &Map<String, Value> {
    line["takes"].as_object().expect("changes by name")
}

#[test]
fn least_amounts_are_those_of_general_optimisers() {
    let mut report = Report::default();
    for line in cases(&FILE) {
        let ours = takes(&case(line)).single;
        for (name, theirs) in changes(line) {
            let what = format!("{} {name}", text(&line["code"]));
            let ours = ours.iter().find(|t| t.kind == kind(name)).expect("every change is offered");
            compare_take(&mut report, &what, ours, theirs);
        }
    }
    report.finish(5 * 64);
}

/// The comparisons would see a body a centimetre longer in the thigh.
#[test]
fn the_comparisons_would_see_a_longer_thigh() {
    let (mut by_depth, mut by_amount, mut by_effort) = (Report::default(), Report::default(), Report::default());
    for line in cases(&FILE).iter().take(8) {
        let same = case(line);
        let mut measures = same.measures().clone();
        measures.lengths.thigh_m = Some(same.body().thigh_m + 0.01);
        let (longer, _) = Case::new(&measures, same.task()).expect("a thigh a centimetre longer");
        compare_depths(&mut by_depth, &longer, line);
        let ours = takes(&longer).single;
        for (name, theirs) in changes(line) {
            let ours = ours.iter().find(|t| t.kind == kind(name)).expect("every change is offered");
            compare_take(&mut by_amount, name, ours, theirs);
        }
        for theirs in line["least_effort"].as_array().expect("a list").iter().take(2) {
            let (ours, _) = least_effort(&longer, Angle::from_deg(number(&theirs["thigh_deg"])));
            by_effort.no_more("effort", ours, number(&theirs["effort"]) * (1.0 + EFFORT_SHARE));
        }
    }
    assert!(by_depth.over() >= 8, "only {} of 16 depths changed", by_depth.over());
    assert!(by_amount.over() >= 10, "only {} of 40 amounts changed", by_amount.over());
    assert!(by_effort.over() >= 8, "only {} of 16 efforts rose", by_effort.over());
}

/// The script found nothing loose, and every kind of answer is there.
#[test]
fn none_is_set_aside_and_every_kind_of_answer_is_there() {
    let lines = cases(&FILE);
    assert!(lines.iter().all(firm), "a depth of which the script itself is not sure");
    for name in ["HeelRaise", "WiderStance", "Counterweight", "Ankle", "Hip"] {
        let answers = || lines.iter().map(|line| &line["takes"][name]);
        assert!(answers().all(firm), "{name}: an amount of which the script itself is not sure");
        let some = answers().filter(|t| t["enough"].as_f64().is_some_and(|a| a > 0.0)).count();
        let none = answers().filter(|t| t["enough"].is_null()).count();
        assert!(some >= 10 && none >= 10, "{name}: {some} enough, {none} not by themselves");
    }
}
