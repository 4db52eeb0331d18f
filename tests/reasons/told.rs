//! `plumbfold reasons FILE`: the shape of what another program reads, and what a person reads.

use std::{ffi::OsStr, fs, path::Path};

use plumbfold::cli::{Exit, Outcome, run};
use plumbfold_core::Placement;
use serde_json::{Map, Value};
use tempfile::tempdir;

/// What the command prints; it must go well.
#[track_caller]
fn printed(file: &Path, options: &[&str]) -> String {
    let (mut out, mut err) = (Vec::new(), Vec::new());
    let args = ["plumbfold".as_ref(), "reasons".as_ref(), file.as_os_str()];
    let all = args.into_iter().chain(options.iter().map(OsStr::new)).map(OsStr::to_owned);
    let outcome = run(all, &mut out, &mut err);
    let said = String::from_utf8_lossy(&err).into_owned();
    assert_eq!((&outcome, said.as_str()), (&Outcome::Done(Exit::Fine), ""), "{}", file.display());
    String::from_utf8(out).expect("UTF-8")
}

#[track_caller]
fn reasons(file: &Path) -> Value {
    serde_json::from_str(&printed(file, &["--json"])).expect("one JSON object")
}

fn worked() -> Vec<std::path::PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("worked");
    let files = fs::read_dir(folder).expect("shipped with the tests").map(|entry| entry.expect("readable").path());
    files.filter(|path| path.extension().is_some_and(|e| e == "ron")).collect()
}

/// One of the worked clients with a piece of its file text replaced, printed both ways.
fn with(client: &str, changes: &[(&str, &str)]) -> (Value, String) {
    let file = Path::new(env!("CARGO_MANIFEST_DIR")).join("worked").join(format!("{client}.ron"));
    let mut text = fs::read_to_string(file).expect("shipped with the tests");
    for (from, to) in changes {
        assert!(text.contains(from), "{from}");
        text = text.replace(from, to);
    }
    let folder = tempdir().expect("a folder");
    let file = folder.path().join("client.ron");
    fs::write(&file, text).expect("written");
    (reasons(&file), printed(&file, &[]))
}

const WOMAN: &str = "long-thigh-woman";
/// As that client's file says it.
const NOT_SEEN: &str = "seen: None";
const SEEN: &str = "seen: Some((thigh_deg: 60.0, shank_deg: 15.0, trunk_deg: 50.0, heels_lifted: false))";

fn object(v: &Value) -> &Map<String, Value> {
    v.as_object().unwrap_or_else(|| panic!("no object: {v}"))
}

/// Exactly these keys.
#[track_caller]
fn keys(v: &Value, expected: &[&str]) {
    let (mut ours, mut theirs): (Vec<&str>, _) = (object(v).keys().map(String::as_str).collect(), expected.to_vec());
    ours.sort_unstable();
    theirs.sort_unstable();
    assert_eq!(ours, theirs);
}

fn list<'a>(v: &'a Value, key: &str) -> &'a [Value] {
    v[key].as_array().unwrap_or_else(|| panic!("{key}: no list in {v}"))
}

fn text<'a>(v: &'a Value, key: &str) -> &'a str {
    v[key].as_str().unwrap_or_else(|| panic!("{key}: no text in {v}"))
}

/// A number, or nothing.
#[track_caller]
fn number_or_null(v: &Value, key: &str) {
    assert!(v[key].is_null() || v[key].as_f64().is_some_and(f64::is_finite), "{key} in {v}");
}

/// Keys, types and names, from top to bottom.
fn has_its_shape(r: &Value) {
    keys(r, &["steady", "balance", "by_bend", "shape_or_range", "takes", "pair", "seen"]);
    for depth in [&r["steady"], &r["balance"]] {
        keys(depth, &["depth_deg", "stops"]);
        number_or_null(depth, "depth_deg");
        for stop in list(depth, "stops") {
            // `measured` beside what was asked for: "possibly, not measured" is said of such a range
            keys(stop, &["limit", "alone", "without_deg", "deg_per_unit", "unit", "measured"]);
            let limits = ["Ankle", "Hip", "Knee", "Bend", "Lean", "Support", "Stance", "Cap:Knee", "Cap:Hip"];
            assert!(limits.contains(&text(stop, "limit")), "{stop}");
            assert!(stop["alone"].is_boolean() && stop["measured"].is_boolean() && stop["deg_per_unit"].is_f64());
            number_or_null(stop, "without_deg");
            let unit = if text(stop, "limit") == "Support" { "cm" } else { "deg" };
            assert_eq!(text(stop, "unit"), unit);
        }
    }
    keys(&r["by_bend"], &["small_deg", "some_deg", "free_deg"]);
    keys(&r["shape_or_range"], &["now_deg", "average_lengths_deg", "usual_ranges_deg", "both_deg"]);
    for part in [&r["by_bend"], &r["shape_or_range"]] {
        object(part).keys().for_each(|key| number_or_null(part, key));
    }
    list(r, "takes").iter().for_each(take_has_its_shape);
}

fn take_has_its_shape(t: &Value) {
    keys(t, &["change", "group", "amount", "unit", "depth_deg", "lean_deg", "knee_nm", "hip_nm", "back_nm"]);
    for key in ["amount", "depth_deg", "lean_deg", "knee_nm", "hip_nm", "back_nm"] {
        number_or_null(t, key);
    }
    let change = text(t, "change");
    let (group, unit) = match change {
        "HeelRaise" => ("Today", "mm"),
        "WiderStance" => ("Today", "cm"),
        "Counterweight" => ("Today", "kg"),
        "Ankle" | "Hip" => ("Weeks", "deg"),
        "Bend" | "Lean" => ("Choices", "deg"),
        other => {
            let name = other.strip_prefix("Placement:").unwrap_or_else(|| panic!("change {other}"));
            assert!(Placement::ALL.iter().any(|p| p.key() == name), "{other}");
            ("Today", "")
        }
    };
    assert_eq!((text(t, "group"), text(t, "unit")), (group, unit), "{change}");
    // what a client reads at the goal comes whole or not at all
    let parts = ["lean_deg", "knee_nm", "hip_nm", "back_nm"];
    assert!(parts.iter().all(|k| t[k].is_null()) || parts.iter().all(|k| t[k].is_f64()), "{t}");
}

#[test]
fn every_worked_client_in_the_shape_told() {
    let files = worked();
    assert!(files.len() >= 7);
    files.iter().for_each(|file| has_its_shape(&reasons(file)));
}

/// The numbers of one client as another program would read them.
#[test]
fn numbers_in_the_units_told() {
    let (r, _) = with(WOMAN, &[]);
    let near = |v: &Value, expected: f64, tol: f64| {
        let ours = v.as_f64().unwrap_or(f64::NAN);
        assert!((ours - expected).abs() <= tol, "{ours} against {expected}");
    };
    near(&r["steady"]["depth_deg"], 76.47, 0.1);
    near(&r["balance"]["depth_deg"], 99.99, 0.1);
    near(&r["by_bend"]["small_deg"], 66.12, 0.1);
    near(&r["shape_or_range"]["both_deg"], 110.15, 0.1);
    let one = |change: &str| list(&r, "takes").iter().find(|t| t["change"] == change).expect("offered").clone();
    // exact, not rounded up to a wedge that people buy
    near(&one("HeelRaise")["amount"], 18.53, 0.005);
    near(&one("WiderStance")["amount"], 32.5, 0.05);
    near(&one("Counterweight")["amount"], 3.757, 0.0005);
    near(&one("Ankle")["amount"], 7.085, 0.0005);
    assert!(one("Hip")["amount"].is_null() && one("Placement:Goblet")["amount"].is_null());
    near(&one("Ankle")["depth_deg"], 90.0, 1e-6);
    assert!(r["pair"].is_null() && r["seen"].is_null());
    let limits: Vec<&str> = list(&r["steady"], "stops").iter().map(|s| text(s, "limit")).collect();
    assert_eq!(limits.len(), 3);
    for stop in list(&r["steady"], "stops") {
        let without = match text(stop, "limit") {
            "Hip" => 128.26,
            "Ankle" => 100.92,
            _ => 82.46,
        };
        near(&stop["without_deg"], without, 0.1);
        assert_eq!(stop["alone"], true);
    }
}

#[test]
fn a_pair_and_a_seen_squat() {
    let (r, said) = with(WOMAN, &[("goal_thigh_deg: 90.0", "goal_thigh_deg: 118.0"), (NOT_SEEN, SEEN)]);
    has_its_shape(&r);
    keys(&r["pair"], &["changes", "share", "depth_deg", "lean_deg", "knee_nm", "hip_nm", "back_nm"]);
    let changes = list(&r["pair"], "changes");
    assert_eq!(changes.len(), 2);
    for change in changes {
        keys(change, &["change", "amount", "unit"]);
        assert!(change["amount"].is_f64());
    }
    assert!(r["pair"]["depth_deg"].as_f64().is_some_and(|d| d >= 118.0 - 1e-6));
    assert!(r["seen"].is_object());
    for title in ["Seen and computed", "What is used up first, on mid-foot", "Shape or range", "Together"] {
        assert!(said.contains(title), "{title} in {said}");
    }
}

/// Everything else is told where one thing has no answer.
fn tells_the_rest(said: &str) {
    for title in [
        "What is used up first, on mid-foot",
        "What is used up first, in balance at all",
        "How much the back may bend",
        "Shape or range",
        "What it would take",
    ] {
        assert!(said.contains(title), "{title} in {said}");
    }
    assert!(!said.contains("NaN") && !said.contains("inf"), "{said}");
}

#[test]
fn a_goal_that_nothing_reaches_is_said() {
    let (r, said) = with(
        WOMAN,
        &[
            ("goal_thigh_deg: 90.0", "goal_thigh_deg: 140.0"),
            ("left: Some(98.0), right: Some(101.0)", "left: Some(60.0), right: None"),
            ("left_cm: Some(5.0)", "left_cm: Some(0.0)"),
        ],
    );
    has_its_shape(&r);
    assert!(list(&r, "takes").iter().all(|t| t["amount"].is_null() && t["depth_deg"].is_f64()), "{r}");
    assert!(r["pair"].is_null() && !list(&r["steady"], "stops").is_empty());
    tells_the_rest(&said);
    assert!(said.contains("No single change here and no two together reach this goal"), "{said}");
    assert!(said.contains("Heel raise · not by itself"), "{said}");
}

#[test]
fn a_client_who_does_not_balance_standing_is_said() {
    let (r, said) = with(
        WOMAN,
        &[
            (
                "ankle: KneeToWall(left_cm: Some(5.0), right_cm: Some(6.0))",
                "ankle: Degrees(left: Some(-10.0), right: None)",
            ),
            ("lean_limit_deg: None", "lean_limit_deg: Some(10.0)"),
            (
                NOT_SEEN,
                "seen: None, support: (edge_back: Some(0.97), zone_back: 0.98, aim: 0.99, zone_front: 1.0, edge_front: Some(1.0))",
            ),
        ],
    );
    has_its_shape(&r);
    for depth in [&r["steady"], &r["balance"]] {
        assert!(depth["depth_deg"].is_null() && list(depth, "stops").is_empty());
    }
    assert!(!list(&r, "takes").is_empty());
    tells_the_rest(&said);
    assert!(said.contains("not balanced even standing"), "{said}");
}

#[test]
fn limits_that_contradict_each_other_are_said() {
    // hip and back that fold 40° in all, and knees that may bend 20°
    let (r, said) = with(
        WOMAN,
        &[
            ("caps: (knee_deg: None, hip_deg: None", "caps: (knee_deg: Some(20.0), hip_deg: Some(40.0)"),
            ("source: \"\"", "source: \"after surgery\""),
            ("bend: Free", "bend: Degrees(0.0)"),
        ],
    );
    has_its_shape(&r);
    let stops = list(&r["steady"], "stops");
    assert!(stops.iter().any(|s| text(s, "limit").starts_with("Cap:")), "{r}");
    assert!(stops.iter().all(|s| !text(s, "limit").starts_with("Cap:") || s["without_deg"].is_null()), "{r}");
    tells_the_rest(&said);
    assert!(said.contains("precaution on the"), "{said}");
    // a stance wider than the legs
    let (r, said) = with(
        WOMAN,
        &[
            ("stature_cm: 168.0", "stature_cm: 105.0"),
            ("shank_cm: Some(39.8), thigh_cm: Some(42.4)", "shank_cm: Some(20.0), thigh_cm: Some(20.0)"),
            ("trunk_cm: Some(48.0), foot_cm: Some(24.5)", "trunk_cm: None, foot_cm: None"),
            ("ankle: KneeToWall(left_cm: Some(5.0), right_cm: Some(6.0))", "ankle: NotMeasured"),
            ("stance_width_cm: None, toe_out_deg: 0.0", "stance_width_cm: Some(120.0), toe_out_deg: 60.0"),
        ],
    );
    has_its_shape(&r);
    assert!(r["steady"]["depth_deg"].is_null() && r["pair"].is_null());
    tells_the_rest(&said);
}
