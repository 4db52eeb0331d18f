//! The machine-readable figures as another program reads them: which keys, in which order, and
//! where there is `null`.

use std::{
    ffi::OsStr,
    fs,
    path::{Path, PathBuf},
    sync::LazyLock,
};

use plumbfold_core::Scope;
use plumbfold_records::{Client, Code, Date, Opened, Rule, Task, Visit, open, save};
use serde_json::Value;
use tempfile::{TempDir, tempdir};

use crate::{
    TESTS,
    compare::{fields, number, text},
    ordered::Shape,
    run::{figures, printed, said},
};

/// Every key, in order; those below another after a full stop.
const KEYS: [&str; 48] = [
    "code",
    "visit",
    "task",
    "thigh_deg",
    "kind",
    "refused_by",
    "shank_deg",
    "trunk_deg",
    "pelvis_deg",
    "bend_deg",
    "ankle_deg",
    "knee_flexion_deg",
    "hip_flexion_deg",
    "com",
    "heel_margin",
    "toe_margin",
    "knee_arm",
    "hip_arm",
    "ratio",
    "moments",
    "moments.ankle",
    "moments.knee",
    "moments.hip",
    "moments.lumbosacral",
    "effort",
    "effort.ankle",
    "effort.knee",
    "effort.hip",
    "effort.lumbosacral",
    "joints",
    "joints.ankle",
    "joints.knee",
    "joints.hip",
    "joints.lumbosacral",
    "joints.shoulder",
    "seat_height",
    "steady_depth_deg",
    "balance_depth_deg",
    "body",
    "body.shank",
    "body.thigh",
    "body.trunk",
    "body.foot",
    "body.ankle_limit_deg",
    "body.hip_limit_deg",
    "body.mass",
    "body.stature",
    "notices",
];

/// The keys of the object itself.
pub fn top_keys() -> impl Iterator<Item = &'static str> {
    KEYS.into_iter().filter(|key| !key.contains('.'))
}

/// The keys that belong to a posture.
fn of_posture() -> impl Iterator<Item = &'static str> {
    top_keys().skip_while(|key| *key != "shank_deg").take_while(|key| *key != "steady_depth_deg")
}

fn paths(shape: &Shape, path: &str, found: &mut Vec<String>) {
    if let Shape::Object(fields) = shape {
        for (key, below) in fields {
            let path = if path.is_empty() { key.clone() } else { format!("{path}.{key}") };
            found.push(path.clone());
            paths(below, &path, found);
        }
    }
}

fn at<'a>(shape: &'a Shape, path: &str) -> &'a Shape {
    path.split('.').fold(shape, |shape, key| match shape {
        Shape::Object(fields) => fields.iter().find(|(name, _)| name == key).map(|(_, below)| below).expect("a key"),
        other => panic!("{path}: {other:?}"),
    })
}

/// A folder with files that a test wrote.
struct Files(TempDir);

impl Files {
    fn new() -> Self {
        Self(tempdir().expect("a folder"))
    }

    fn text(&self, name: &str, text: &str) -> PathBuf {
        let file = self.0.path().join(name);
        fs::write(&file, text).expect("written");
        file
    }

    fn client(&self, name: &str, client: &Client) -> PathBuf {
        let file = self.0.path().join(name);
        save(client, &file).expect("saved");
        file
    }
}

fn worked(name: &str) -> PathBuf {
    Path::new(TESTS).join("worked").join(format!("{name}.ron"))
}

fn client(file: &Path) -> Client {
    match open(file) {
        Ok(Opened::Current(client)) => client,
        other => panic!("{}: {other:?}", file.display()),
    }
}

/// Clients of the reference by what refuses one of their postures, with the thigh angle.
static REFUSED: LazyLock<Vec<(String, String, f64)>> = LazyLock::new(|| {
    let file = Path::new(TESTS).join("reference/clients.json");
    let all: Value = serde_json::from_str(&fs::read_to_string(file).expect("there")).expect("JSON");
    let mut found: Vec<(String, String, f64)> = Vec::new();
    for client in all["clients"].as_array().expect("a list") {
        for result in client["results"].as_array().expect("a list") {
            if let Some(by) = result["refused_by"].as_str()
                && result["loose"] != true
                && !client["steady_depth_deg"].is_null()
                && found.iter().all(|(other, ..)| other != by)
            {
                found.push((by.to_owned(), text(&client["ron"]).to_owned(), number(&result["thigh_deg"])));
            }
        }
    }
    found
});

#[test]
fn keys_stand_in_their_order_and_one_object_in_one_line() {
    let printed = printed(&worked("average-man"), &["--thigh", "20"]);
    assert_eq!(printed.lines().count(), 1);
    assert!(printed.starts_with('{') && printed.ends_with("}\n"), "{printed}");
    let shape: Shape = serde_json::from_str(&printed).expect("JSON");
    let mut found = Vec::new();
    paths(&shape, "", &mut found);
    assert_eq!(found, KEYS);
    let point = Shape::List(vec![Shape::Number, Shape::Number]);
    for key in KEYS {
        let expected = match key {
            "code" | "task" | "kind" => &Shape::Text,
            "refused_by" => &Shape::Null,
            "com" => &point,
            "notices" => &Shape::List(Vec::new()),
            "moments" | "effort" | "joints" | "body" => continue,
            joint if joint.starts_with("joints.") => &point,
            _ => &Shape::Number,
        };
        assert_eq!(at(&shape, key), expected, "{key}");
    }
}

#[test]
fn every_refusal_leaves_the_posture_null_and_the_depths_standing() {
    let files = Files::new();
    let mut reasons: Vec<&str> = REFUSED.iter().map(|(by, ..)| by.as_str()).collect();
    reasons.sort_unstable();
    assert_eq!(reasons, ["Ankle", "Hip", "Knee", "Stance", "TipsBack", "TipsForward"]);
    for (by, ron, thigh_deg) in REFUSED.iter() {
        let file = files.text(&format!("{by}.ron"), ron);
        let printed = printed(&file, &["--thigh", &thigh_deg.to_string()]);
        let shape: Shape = serde_json::from_str(&printed).expect("JSON");
        let found: Value = serde_json::from_str(&printed).expect("JSON");
        assert_eq!((&found["kind"], &found["refused_by"]), (&"refused".into(), &by.as_str().into()));
        let mut nulls = 0;
        for key in of_posture() {
            assert_eq!(at(&shape, key), &Shape::Null, "{by}: {key}");
            nulls += 1;
        }
        assert_eq!(nulls, 17);
        for key in ["thigh_deg", "steady_depth_deg", "balance_depth_deg", "body.trunk", "body.hip_limit_deg"] {
            assert_eq!(at(&shape, key), &Shape::Number, "{by}: {key}");
        }
        assert!(found["notices"].is_array());
    }
}

#[test]
fn a_client_who_cannot_stand_has_no_depth_and_is_told() {
    let files = Files::new();
    let mut far = client(&worked("average-man"));
    // the middle of the foot moved to its very tip, where no shank angle brings the centre of mass
    let support = &mut far.visits[0].tasks[0].support;
    (support.zone_back, support.aim, support.zone_front, support.edge_front) = (1.0, 1.0, 1.0, Some(1.0));
    support.edge_back = Some(1.0);
    far.visits[0].tasks[0].placement = plumbfold_core::Placement::ArmsCrossed;
    far.visits[0].joints.ankle =
        plumbfold_records::Ankle::Degrees(plumbfold_core::Sides { left: Some(-10.0), right: None });
    let found = figures(&files.client("far.ron", &far), &[]);
    assert!(found["steady_depth_deg"].is_null() && found["balance_depth_deg"].is_null(), "{found}");
    let notices = found["notices"].as_array().expect("a list");
    assert!(notices.iter().any(|notice| text(notice).starts_with("No balanced standing")), "{notices:?}");
}

#[test]
fn the_ratio_is_null_where_the_knee_arm_is_under_a_millimetre() {
    let file = worked("average-man");
    let at = |thigh_deg: f64| figures(&file, &["--thigh", &thigh_deg.to_string()]);
    // the knee goes from behind the plumb line, standing, to in front of it
    let (mut behind, mut in_front) = (0.0, 30.0);
    assert!(number(&at(behind)["knee_arm"]) < 0.0 && number(&at(in_front)["knee_arm"]) > 0.0);
    let mut seen_null = 0;
    let mut seen_number = 0;
    for _ in 0..24 {
        let middle = f64::midpoint(behind, in_front);
        let found = at(middle);
        let knee_arm = number(&found["knee_arm"]);
        let hip_arm = number(&found["hip_arm"]);
        if knee_arm.abs() < 1e-3 {
            assert!(found["ratio"].is_null(), "{found}");
            seen_null += 1;
        } else {
            let ratio = number(&found["ratio"]);
            assert!((ratio - hip_arm / knee_arm).abs() < 1e-9 * ratio.abs(), "{found}");
            seen_number += 1;
        }
        if knee_arm < 0.0 { behind = middle } else { in_front = middle }
    }
    assert!(seen_null > 0 && seen_number > 0, "{seen_null} {seen_number}");
}

#[test]
fn effort_is_null_where_it_does_not_apply_and_the_rest_stands() {
    let files = Files::new();
    for (scope, age_years) in [
        (vec![Scope::Under18], None),
        (vec![Scope::Pregnant], Some(30.0)),
        (vec![Scope::LimbDifference], Some(30.0)),
        (vec![], Some(17.0)),
    ] {
        let mut young = client(&worked("average-man"));
        young.visits[0].scope.clone_from(&scope);
        young.visits[0].age_years = age_years;
        let found = figures(&files.client("young.ron", &young), &["--thigh", "20"]);
        assert!(found["effort"].is_null(), "{scope:?} {found}");
        assert!(found["moments"]["knee"].is_number() && found["kind"] == "steady", "{scope:?} {found}");
    }
    for scope in [Scope::HighBmi, Scope::RecentSurgery, Scope::Osteoporosis] {
        let mut careful = client(&worked("average-man"));
        careful.visits[0].scope = vec![scope];
        let found = figures(&files.client("careful.ron", &careful), &["--thigh", "20"]);
        assert!(found["effort"]["knee"].is_number(), "{scope:?} {found}");
        assert_eq!(found["notices"].as_array().map(Vec::len), Some(1), "{scope:?} {found}");
    }
}

/// Three visits, the latest in the middle of the list, the last of them with two tasks.
fn three_visits() -> Client {
    let visit = |day: i8, mass_kg: f64| {
        let date = Date::new(2026, 5, day).expect("a day in May");
        Visit::new(date, plumbfold_core::Sex::Female, 168.0, mass_kg)
    };
    let mut client = Client::new(Code::new("three visits").expect("a code"), visit(2, 61.0));
    client.visits.push(visit(20, 62.0));
    client.visits.push(visit(9, 63.0));
    client.visits[2].tasks[0].goal_thigh_deg = 40.0;
    client.visits[2].tasks.push(Task { rule: Rule::HeldShank(12.0), goal_thigh_deg: 50.0, ..Task::new("shank held") });
    client
}

#[test]
fn visits_count_from_one_the_latest_is_the_default_and_so_are_the_first_task_and_its_goal() {
    let files = Files::new();
    let file = files.client("three.ron", &three_visits());
    for (options, visit, task, thigh_deg, mass) in [
        (&[][..], 2, "main", 90.0, 62.0),
        (&["--visit", "1"], 1, "main", 90.0, 61.0),
        (&["--visit", "2"], 2, "main", 90.0, 62.0),
        (&["--visit", "3"], 3, "main", 40.0, 63.0),
        (&["--visit", "3", "--task", "shank held"], 3, "shank held", 50.0, 63.0),
        (&["--visit", "3", "--task", "shank held", "--thigh", "33.5"], 3, "shank held", 33.5, 63.0),
        (&["--thigh", "0"], 2, "main", 0.0, 62.0),
    ] {
        let found = figures(&file, options);
        let expected: [Value; 5] = ["three visits".into(), visit.into(), task.into(), thigh_deg.into(), mass.into()];
        let got = [&found["code"], &found["visit"], &found["task"], &found["thigh_deg"], &found["body"]["mass"]];
        assert!(got.into_iter().eq(&expected), "{options:?}: {found}");
    }
    assert_eq!(
        figures(&file, &["--visit", "3", "--task", "shank held"])["shank_deg"].as_f64().map(f64::round),
        Some(12.0)
    );
}

#[test]
fn a_visit_or_task_that_is_not_there_is_one_sentence_with_what_there_is() {
    let files = Files::new();
    let file = files.client("three.ron", &three_visits());
    for (options, needs) in [
        (["--visit", "0"], "found no visit 0, needs a visit from 1 to 3;"),
        (["--visit", "4"], "found no visit 4, needs a visit from 1 to 3;"),
        (["--task", "shank held"], "visits[1].tasks: found no task \"shank held\", needs \"main\";"),
    ] {
        for format in [&["--json"][..], &[]] {
            let mut args = vec![OsStr::new("figures"), file.as_os_str()];
            args.extend(options.iter().chain(format).map(OsStr::new));
            let said = said(&args);
            assert_eq!((said.code(), said.out.as_str()), (Some(1), ""), "{options:?}");
            assert!(said.err.contains(needs) && said.err.lines().count() == 1, "{}", said.err);
        }
    }
}

#[test]
fn what_is_printed_is_one_figure_whose_numbers_hang_together() {
    for entry in fs::read_dir(Path::new(TESTS).join("worked")).expect("a folder") {
        let file = entry.expect("an entry").path();
        if file.extension() != Some(OsStr::new("ron")) {
            continue;
        }
        let found = figures(&file, &["--thigh", "45"]);
        assert_eq!(found["kind"], "steady", "{}", file.display());
        let x = |point: &Value| number(&point[0]);
        let (joints, com) = (&found["joints"], x(&found["com"]));
        for (what, off) in [
            ("knee arm", x(&joints["knee"]) - com - number(&found["knee_arm"])),
            ("hip arm", com - x(&joints["hip"]) - number(&found["hip_arm"])),
            ("lean", number(&found["pelvis_deg"]) + number(&found["bend_deg"]) - number(&found["trunk_deg"])),
            ("hip flexion", 45.0 + number(&found["pelvis_deg"]) - number(&found["hip_flexion_deg"])),
            ("seat", number(&joints["hip"][1]) - 0.09 - number(&found["seat_height"])),
        ] {
            assert!(off.abs() < 1e-9, "{}: {what} is off by {off}", file.display());
        }
        assert!(fields(&found["effort"]).all(|(_, effort)| number(effort).is_finite()));
    }
}
