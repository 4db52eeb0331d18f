//! The command line from arguments to text and exit code.

use std::{
    ffi::OsString,
    fs,
    io::{self, Write},
    path::{Path, PathBuf},
};

use serde_json::Value;
use tempfile::tempdir;

use super::{Exit, Launch, Outcome, run};

fn demo(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../../demo-profiles").join(format!("{name}.ron"))
}

/// The text of a demo client with one piece, which must be there once, replaced.
fn demo_with(name: &str, piece: &str, instead: &str) -> String {
    let text = fs::read_to_string(demo(name)).expect("a demo client");
    assert_eq!(text.matches(piece).count(), 1, "{piece:?} must stand once in {name}");
    text.replace(piece, instead)
}

/// Outcome, standard output, standard error.
fn said(args: &[&str]) -> (Outcome, String, String) {
    let (mut out, mut err) = (Vec::new(), Vec::new());
    let args = ["plumbfold"].iter().chain(args).map(OsString::from);
    let outcome = run(args, &mut out, &mut err);
    (outcome, String::from_utf8(out).expect("text"), String::from_utf8(err).expect("text"))
}

fn fine(args: &[&str]) -> String {
    let (outcome, out, err) = said(args);
    assert_eq!((outcome, err.as_str()), (Outcome::Done(Exit::Fine), ""), "{args:?}");
    out
}

/// The one sentence of a refusal.
fn refused(args: &[&str], file: &Path) -> String {
    let (outcome, out, err) = said(args);
    assert_eq!((outcome, out.as_str()), (Outcome::Done(Exit::BadInput), ""), "{args:?}");
    assert!(err.starts_with(&file.display().to_string()) && err.ends_with(".\n") && err.lines().count() == 1, "{err}");
    err
}

fn figures(args: &[&str]) -> Value {
    serde_json::from_str(&fine(args)).expect("one JSON object")
}

fn text(path: &Path) -> &str {
    path.to_str().expect("a path of this test")
}

const KEYS: [&str; 27] = [
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
    "effort",
    "joints",
    "seat_height",
    "steady_depth_deg",
    "balance_depth_deg",
    "body",
    "notices",
];

#[test]
fn json_has_its_keys_in_their_order() {
    let out = fine(&["figures", text(&demo("demo-shape")), "--json"]);
    let mut at = 0;
    for key in KEYS {
        let found = out[at..].find(&format!("\"{key}\":"));
        at += found.unwrap_or_else(|| panic!("{key} is not in its place: {out}"));
    }
    let object: Value = serde_json::from_str(&out).expect("JSON");
    assert_eq!(object.as_object().map(serde_json::Map::len), Some(KEYS.len()));
    let keys = |key: &str| {
        let mut keys: Vec<String> = object[key].as_object().expect(key).keys().cloned().collect();
        keys.sort();
        keys
    };
    for key in ["moments", "effort"] {
        assert_eq!(keys(key), ["ankle", "hip", "knee", "lumbosacral"]);
    }
    assert_eq!(keys("joints"), ["ankle", "hip", "knee", "lumbosacral", "shoulder"]);
    let body = ["ankle_limit_deg", "foot", "hip_limit_deg", "mass", "shank", "stature", "thigh", "trunk"];
    assert_eq!(keys("body"), body);
}

#[test]
fn visit_task_and_thigh_have_defaults_and_can_be_chosen() {
    let file = demo("demo-ankle");
    let file = text(&file);
    let latest = figures(&["figures", file, "--json"]);
    assert_eq!((&latest["visit"], &latest["task"], &latest["thigh_deg"]), (&2.into(), &"flat".into(), &90.0.into()));
    let chosen = figures(&["figures", file, "--visit", "2", "--task", "on a wedge", "--thigh", "40.5", "--json"]);
    assert_eq!((&chosen["task"], &chosen["thigh_deg"]), (&"on a wedge".into(), &40.5.into()));
    assert_eq!(figures(&["figures", file, "--visit", "1", "--json"])["task"], "main");
}

#[test]
fn a_refused_posture_is_null_and_the_depths_still_stand() {
    let deep = figures(&["figures", text(&demo("demo-older")), "--thigh", "139", "--json"]);
    assert_eq!(deep["kind"], "refused");
    assert!(deep["refused_by"].is_string());
    for key in KEYS.iter().skip(6).take(17) {
        assert!(deep[key].is_null(), "{key}");
    }
    assert!(deep["steady_depth_deg"].is_number() && deep["body"]["trunk"].is_number());
    let text = fine(&["figures", text(&demo("demo-older")), "--thigh", "139"]);
    assert!(!text.contains("Posture") && text.contains("steady on mid-foot"), "{text}");
}

#[test]
fn every_demo_stands_and_has_its_sum_of_readings() {
    for entry in fs::read_dir(demo("x").parent().expect("a folder")).expect("listed") {
        let file = entry.expect("listed").path();
        let figures = figures(&["figures", text(&file), "--thigh", "45", "--json"]);
        assert_eq!(figures["kind"], "steady", "{figures}");
        let number = |key: &str| figures[key].as_f64().expect("a number");
        // Pelvis, bend and trunk; arms and joints; margins and the strip between the edges.
        assert!((number("pelvis_deg") + number("bend_deg") - number("trunk_deg")).abs() < 1e-9);
        let x = |of: &Value| of[0].as_f64().expect("a number");
        let joints = &figures["joints"];
        assert!((x(&joints["knee"]) - x(&joints["hip"]) - number("knee_arm") - number("hip_arm")).abs() < 1e-9);
        assert!(number("heel_margin") > 0.0 && number("toe_margin") > 0.0);
    }
}

#[test]
fn the_text_shows_what_json_holds() {
    let file = demo("demo-shape");
    let figures = figures(&["figures", text(&file), "--thigh", "60", "--json"]);
    let out = fine(&["figures", text(&file), "--thigh", "60"]);
    assert!(out.starts_with("demo-shape, visit 1 of 1 (2026-06-09), task main\n"), "{out}");
    for (label, key) in [("trunk lean", "trunk_deg"), ("shank", "shank_deg"), ("knee flexion", "knee_flexion_deg")] {
        let line = out.lines().find(|line| line.trim_start().starts_with(label)).unwrap_or_default();
        let shown = format!(" {:.1}°", figures[key].as_f64().expect("a number"));
        assert!(line.ends_with(&shown), "{line} for {shown}");
    }
    assert!(out.ends_with("stop if pain is more than agreed.\n"));
}

#[test]
fn those_for_whom_effort_does_not_apply_have_none() {
    let folder = tempdir().expect("a folder");
    let file = folder.path().join("young.ron");
    fs::write(&file, demo_with("demo-roomy", "age_years: Some(22)", "age_years: Some(15)")).expect("written");
    let young = figures(&["figures", text(&file), "--json"]);
    assert!(young["effort"].is_null() && young["moments"]["knee"].is_number(), "{young}");
    assert!(!fine(&["figures", text(&file)]).contains(" %\n"));
}

#[test]
fn bad_input_is_one_sentence_that_names_the_file() {
    let folder = tempdir().expect("a folder");
    let broken = folder.path().join("broken.ron");
    fs::write(&broken, demo_with("demo-hip", "mass_kg: 69.0", "mass_kg: 690.0")).expect("written");
    let newer = folder.path().join("newer.ron");
    fs::write(&newer, "(format: 9)").expect("written");
    let missing = folder.path().join("missing.ron");
    for file in [&broken, &newer, &missing, &folder.path().to_owned()] {
        let of = text(file);
        for args in [
            &["figures", of][..],
            &["figures", of, "--json"],
            &["check", of],
            &["open", of],
            &["sheet", of, "-o", "out.png"],
        ] {
            refused(args, file);
        }
    }
    assert!(refused(&["check", text(&broken)], &broken).contains("visits[0].mass_kg: found 690.0, needs 25 to 250 kg"));
    let hip = demo("demo-hip");
    assert!(refused(&["figures", text(&hip), "--visit", "0"], &hip).contains("found no visit 0, needs visit 1"));
    assert!(refused(&["figures", text(&hip), "--visit", "2"], &hip).contains("found no visit 2"));
    assert!(refused(&["figures", text(&hip), "--task", "x"], &hip).contains("found no task \"x\", needs \"main\""));
}

#[test]
fn values_that_make_no_possible_body_together_are_refused() {
    let folder = tempdir().expect("a folder");
    let file = folder.path().join("a.ron");
    let far = demo_with("demo-shape", "left_cm: Some(9.5), right_cm: Some(10.0)", "left_cm: Some(25)");
    fs::write(&file, far.replace("shank_cm: Some(38.6)", "shank_cm: Some(20)")).expect("written");
    for args in [&["figures", text(&file)][..], &["check", text(&file)], &["sheet", text(&file), "-o", "a.png"]] {
        assert!(refused(args, &file).contains("visits[0]: found knee to wall 25.0 cm"));
    }
}

#[test]
fn check_tells_each_file_in_its_turn() {
    let (hip, missing) = (demo("demo-hip"), demo("none"));
    let (outcome, out, err) = said(&["check", text(&hip), text(&missing), text(&demo("demo-ankle"))]);
    assert_eq!(outcome, Outcome::Done(Exit::BadInput));
    assert_eq!(out.lines().count(), 2);
    assert!(out.contains("demo-hip.ron: in order, demo-hip, 1 visit, 1 task\n"), "{out}");
    assert!(out.ends_with("demo-ankle.ron: in order, demo-ankle, 2 visits, 3 tasks\n"), "{out}");
    assert_eq!(err.lines().count(), 1);
}

#[test]
fn wrong_usage_is_told_on_standard_error() {
    let hip = demo("demo-hip");
    let hip = text(&hip);
    for args in [
        &["fly"][..],
        &["figures"],
        &["check"],
        &["figures", hip, "--thigh", "141"],
        &["figures", hip, "--thigh", "-1"],
        &["figures", hip, "--thigh", "NaN"],
        &["figures", hip, "--visit", "first"],
        &["figures", hip, "--jason"],
        &["sheet", hip],
        &["sheet", hip, "-o", "out.ron"],
    ] {
        let (outcome, out, err) = said(args);
        assert_eq!((outcome, out.as_str()), (Outcome::Done(Exit::WrongUsage), ""), "{args:?}");
        assert!(!err.is_empty(), "{args:?}");
    }
}

#[test]
fn help_and_version_are_fine() {
    assert!(fine(&["--help"]).contains("figures"));
    assert!(fine(&["figures", "--help"]).contains("--thigh"));
    assert_eq!(fine(&["--version"]), format!("plumbfold {}\n", env!("CARGO_PKG_VERSION")));
}

#[test]
fn the_window_and_the_sheet_are_left_to_the_caller_with_the_client_read() {
    let (outcome, ..) = said(&[]);
    assert_eq!(outcome, Outcome::Window(Launch { opened: None, frame_times: false }));
    let hip = demo("demo-hip");
    match said(&["open", text(&hip), "--frame-times"]).0 {
        Outcome::Window(Launch { opened: Some((file, client)), frame_times: true }) => {
            assert_eq!((file, client.code.as_str()), (hip.clone(), "demo-hip"));
        }
        other => panic!("{other:?}"),
    }
    let folder = tempdir().expect("a folder");
    let output = folder.path().join("out.PNG");
    let Outcome::Sheet(job) = said(&["sheet", text(&hip), "--thigh", "30", "-o", text(&output)]).0 else {
        panic!("a sheet to draw");
    };
    assert_eq!((job.of.visit, job.of.task, job.of.thigh_deg), (0, 0, 30.0));
    job.write(b"picture").expect("written");
    assert_eq!(fs::read(&output).expect("there"), b"picture");
    let nowhere = super::SheetJob { output: folder.path().join("none/out.png"), ..job };
    assert_eq!(nowhere.write(b"").expect_err("no folder").file, nowhere.output);
}

#[test]
fn a_reader_that_had_enough_is_no_fault_and_a_full_disk_is() {
    struct Ends(io::ErrorKind);
    impl Write for Ends {
        fn write(&mut self, _: &[u8]) -> io::Result<usize> {
            Err(self.0.into())
        }
        fn flush(&mut self) -> io::Result<()> {
            Ok(())
        }
    }
    let args = || ["plumbfold", "--version"].map(OsString::from);
    let mut err = Vec::new();
    assert_eq!(run(args(), &mut Ends(io::ErrorKind::BrokenPipe), &mut err), Outcome::Done(Exit::Fine));
    assert!(err.is_empty());
    assert_eq!(run(args(), &mut Ends(io::ErrorKind::StorageFull), &mut err), Outcome::Done(Exit::BadInput));
    assert!(!err.is_empty());
}
