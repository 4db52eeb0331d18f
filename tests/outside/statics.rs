//! Centre of mass and static joint torques of a two-legged body in space, by two rigid-body engines
//! (Pinocchio and MuJoCo, which agree to 1e-9 between themselves), for any three angles.

use std::sync::LazyLock;

use plumbfold_core::{Angle, Case, PerJoint, Posture, pose, readings};
use serde_json::Value;

use crate::reference::{Report, case, cases, file, number, text};

static FILE: LazyLock<Value> = LazyLock::new(|| file("statics.json"));

/// Share of a number by which it may be off.
const SHARE: f64 = 1e-6;
/// Numbers near zero are held against these sizes: a metre for places, a newton metre for torques.
const SIZE: f64 = 1.0;

fn angle(line: &Value, key: &str) -> Angle {
    Angle::from_deg(number(&line[key]))
}

#[track_caller]
fn posed(case: &Case, line: &Value) -> Posture {
    let shank = angle(line, "shank_deg");
    pose(case, shank, angle(line, "thigh_deg"), angle(line, "trunk_deg")).expect("the engines' legs could span it")
}

fn near(report: &mut Report, what: &str, ours: f64, theirs: &Value) {
    let theirs = number(theirs);
    report.near(what, ours, theirs, SHARE * theirs.abs().max(SIZE));
}

/// The program's posture, centre of mass and moments of a case against the engines'.
fn compare(report: &mut Report, case: &Case, line: &Value) {
    let p = posed(case, line);
    let PerJoint { ankle, knee, hip, low_back } = readings(case, &p).moments_nm;
    for (what, ours, theirs) in [
        ("com x", p.com.x, &line["com"][0]),
        ("com y", p.com.y, &line["com"][1]),
        // both legs alike
        ("com z", 0.0, &line["com"][2]),
        ("knee x", p.joints.knee.x, &line["knee"][0]),
        ("knee y", p.joints.knee.y, &line["knee"][1]),
        ("knee z", p.knee_z_m, &line["knee"][2]),
        ("knee flexion", p.knee_flexion.rad(), &line["knee_flexion"]),
        ("ankle torque", ankle, &line["moments"]["ankle"]),
        ("knee torque", knee, &line["moments"]["knee"]),
        ("hip torque", hip, &line["moments"]["hip"]),
        ("low-back torque", low_back, &line["moments"]["lumbosacral"]),
    ] {
        near(report, &format!("{} {what}", text(&line["code"])), ours, theirs);
    }
}

#[test]
fn centre_of_mass_and_torques_are_those_of_two_rigid_body_engines() {
    let mut report = Report::default();
    for line in cases(&FILE) {
        compare(&mut report, &case(line), line);
    }
    report.finish(400 * 11);
}

/// The comparison sees a tenth of a millimetre and a tenth of a degree: a case with another
/// client's angle, or with a thigh 0.1 mm longer, disagrees.
#[test]
fn the_comparison_would_see_a_tenth_of_a_degree() {
    let line = &cases(&FILE)[0];
    for key in ["shank_deg", "thigh_deg", "trunk_deg"] {
        let mut other = line.clone();
        other[key] = (number(&line[key]) + 0.1).into();
        let mut report = Report::default();
        compare(&mut report, &case(line), &other);
        assert!(report.over() >= 4, "{key}: only {} of 11 numbers changed", report.over());
    }
    let mut longer = case(line).measures().clone();
    longer.lengths.thigh_m = Some(case(line).body().thigh_m + 1e-4);
    let (changed, _) = Case::new(&longer, case(line).task()).expect("a thigh 0.1 mm longer");
    let mut report = Report::default();
    compare(&mut report, &changed, line);
    assert!(report.over() >= 4, "only {} of 11 numbers changed", report.over());
}

/// The file holds what it is said to hold: as counted by the script, and again from what it wrote.
#[test]
fn every_kind_of_body_and_task_is_among_them() {
    let covered = &FILE["header"]["covered"];
    for (kind, least) in [
        ("m", 100.0),
        ("f", 100.0),
        ("DeLeva", 100.0),
        ("DempsterWinter", 100.0),
        ("Dumas", 100.0),
        ("heel raised", 100.0),
        ("toes out", 150.0),
        ("shank out of the foot's plane", 100.0),
        ("bend beyond the hip", 100.0),
        ("overhead short of vertical", 20.0),
        ("uneven weight", 30.0),
        ("ArmsCrossed, loaded", 10.0),
        ("ArmsForward, loaded", 10.0),
        ("AtSides, loaded", 10.0),
        ("HighBar, loaded", 10.0),
        ("LowBar, loaded", 10.0),
        ("FrontRack, loaded", 10.0),
        ("Goblet, loaded", 10.0),
        ("Overhead, loaded", 10.0),
    ] {
        assert!(number(&covered[kind]) >= least, "{kind}: {}", covered[kind]);
    }
    let counted = |whether: fn(&Case, &Posture) -> bool| {
        cases(&FILE).iter().map(|line| (case(line), line)).filter(|(c, line)| whether(c, &posed(c, line))).count()
            as f64
    };
    assert!((counted(|_, p| p.bend.deg() > 1e-6) - number(&covered["bend beyond the hip"])).abs() < 0.5);
    assert!(
        (counted(|_, p| p.arms_short.deg().abs() > 1e-6) - number(&covered["overhead short of vertical"])).abs() < 0.5
    );
    assert!((counted(|c, _| c.stand().pitch.deg() > 0.0) - number(&covered["heel raised"])).abs() < 0.5);
}
