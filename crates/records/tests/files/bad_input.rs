//! Bytes that cannot be read, and the problem each one makes.

use std::path::Path;

use plumbfold_records::{Code, Compared, Felt, Problem, SIZE_LIMIT_BYTES, read, write};

use crate::{FULL, FULL_2, client, problem, with, with_2};

fn of_bytes(bytes: &[u8]) -> Problem {
    read(bytes, Path::new("x.ron")).expect_err("these bytes are no client file")
}

/// Text, line, field, value, allowed.
type Row = (String, Option<u32>, Option<&'static str>, &'static str, &'static str);

fn row(
    text: String,
    line: u32,
    field: impl Into<Option<&'static str>>,
    value: &'static str,
    allowed: &'static str,
) -> Row {
    (text, Some(line), field.into(), value, allowed)
}

const CUT: &str = "the rest of it, up to the last closing bracket";
const END: &str = "the end of the file";

fn rows() -> Vec<Row> {
    let build_names = "shank_cm, thigh_cm, trunk_cm, foot_cm, ankle_height_cm, heel_to_ankle_cm, upper_arm_cm, \
                       forearm_cm or hand_cm";
    vec![
        // Numbers.
        row(with("shank_cm: Some(39.8)", "shank_cm: Some(399)"), 11, "visits[0].build.shank_cm", "399", "20 to 65 cm"),
        row(with("stature_cm: 168.25", "stature_cm: NaN"), 9, "visits[0].stature_cm", "NaN", "100 to 230 cm"),
        row(with("stature_cm: 168.25", "stature_cm: 1e400"), 9, "visits[0].stature_cm", "1e400", "100 to 230 cm"),
        row(
            with("stature_cm: 168.25", "stature_cm: \"tall\""),
            9,
            "visits[0].stature_cm",
            "the string \"tall\"",
            "100 to 230 cm",
        ),
        row(with("stature_cm: 168.25", "stature_cm: 168,25"), 9, "visits[0]", "25", "the name of a field"),
        row(with("mass_kg: 61.5", "mass_kg: Some(61.5)"), 9, "visits[0].mass_kg", "Some(…)", "25 to 250 kg"),
        row(with("foot_cm: Some(24.5)", "foot_cm: 24.5"), 11, "visits[0].build.foot_cm", "24.5", "None or Some(…)"),
        row(with("Some(-1.5)", "Some( -16 )"), 14, "visits[0].joints.ankle.left_cm", "-16", "-15 to 25 cm"),
        // Words.
        row(with("sex_model: Female", "sex_model: Woman"), 7, "visits[0].sex_model", "Woman", "Male or Female"),
        row(
            with("placement: Goblet", "placement: Backpack"),
            20,
            "visits[0].tasks[0].placement",
            "Backpack",
            "ArmsCrossed, ArmsForward, AtSides, HighBar, LowBar, FrontRack, Goblet or Overhead",
        ),
        row(
            with("segments: Dumas", "segments: Zatsiorsky"),
            31,
            "visits[0].segments",
            "Zatsiorsky",
            "DeLeva, DempsterWinter or Dumas",
        ),
        row(
            with("heels_lifted: true", "heels_lifted: yes"),
            23,
            "visits[0].tasks[0].seen.heels_lifted",
            "yes",
            "true or false",
        ),
        row(with("note: \"two", "note: two"), 30, "visits[0].note", "two", "text in double quotes"),
        row(with("scope: [Under18,", "scope: (Under18,"), 10, "visits[0].scope", "(Under18", "a list in [ ]"),
        row(with("build: (", "build: ["), 11, "visits[0].build", "[shank_cm", "fields in ( )"),
        // Fields.
        row(
            with("shank_cm: Some(39.8)", "shin_cm: Some(39.8)"),
            11,
            "visits[0].build.shin_cm",
            "a field not known here",
            build_names,
        ),
        row(
            with("left_cm: Some(-1.5)", "links_cm: Some(-1.5)"),
            14,
            "visits[0].joints.ankle.links_cm",
            "a field not known here",
            "left_cm or right_cm",
        ),
        row(
            with("mass_kg: 61.5", "stature_cm: 170.0"),
            9,
            "visits[0].stature_cm",
            "the field twice",
            "each field once",
        ),
        row(with("    format: 1,", "    format: 1, format: 1,"), 3, "format", "the field twice", "each field once"),
        row(with(" mass_kg: 61.5,", ""), 33, "visits[0].mass_kg", "no value", "one"),
        row(with("    format: 1,\n", ""), 33, "format", "no value", "one"),
        row(with("heels_lifted: true, ", ""), 24, "visits[0].tasks[0].seen.heels_lifted", "no value", "one"),
        // Format.
        row(with("format: 1", "format: 0"), 3, "format", "0", "format 1 or 2"),
        row(with("format: 1", "format: -1"), 3, "format", "-1", "format 1 or 2"),
        row(with("format: 1", "format: \"1\""), 3, "format", "\"1\"", "format 1 or 2"),
        row(with("format: 1", "format: 5000000000"), 3, "format", "5000000000", "format 1 or 2"),
        // Texts and dates.
        row(with("code: \"fixture-full\"", "code: \"\""), 4, "code", "an empty text", CODE),
        row(with("code: \"fixture-full\"", "code: \"a/b\""), 4, "code", "\"a/b\"", CODE),
        row(with("code: \"fixture-full\"", "code: \"..\""), 4, "code", "\"..\"", CODE),
        row(with("code: \"fixture-full\"", "code: \"a\\nb\""), 4, "code", "\"a\u{fffd}b\"", CODE),
        row(with("2024-02-29", "2023-02-29"), 6, "visits[0].date", "\"2023-02-29\"", DATE),
        row(with("2024-02-29", "2024-2-29"), 6, "visits[0].date", "\"2024-2-29\"", DATE),
        row(with("2024-02-29", "20240229"), 6, "visits[0].date", "\"20240229\"", DATE),
        row(with("2024-02-29", "2024-02-29T10:00"), 6, "visits[0].date", "\"2024-02-29T10:00\"", DATE),
        row(
            with("name: \"held shank\"", "name: \" \""),
            26,
            "visits[0].tasks[1].name",
            "\" \"",
            "1 to 60 characters on one line, not only spaces",
        ),
        // What hangs together.
        row(
            with("name: \"held shank\"", "name: \"main\""),
            29,
            "visits[0].tasks",
            "two tasks named \"main\"",
            "a name of its own for each task",
        ),
        row(
            with("aim: 0.45", "aim: 0.3"),
            25,
            "visits[0].tasks[0].support",
            "0.35 followed by 0.3",
            "fractions in rising order from heel to toe",
        ),
        row(
            with("edge_front: Some(0.75)", "edge_front: Some(0.5)"),
            25,
            "visits[0].tasks[0].support",
            "0.55 followed by 0.5",
            "fractions in rising order from heel to toe",
        ),
        row("(format: 1, code: \"x\", visits: [])".to_owned(), 1, "visits", "no visit", "at least one visit"),
        row(
            format!("{}tasks: [], note: \"\")])", before("tasks: [", include_str!("fixtures/v1-least.ron"))),
            13,
            "visits[0].tasks",
            "no task",
            "at least one task",
        ),
        // Whole files.
        row(FULL.trim_end().trim_end_matches(')').to_owned(), 34, None, END, CUT),
        row(before("mass_kg", FULL).to_owned(), 9, "visits[0]", END, CUT),
        row(before("34)", FULL).to_owned(), 8, "visits[0].age_years", END, CUT),
        row(
            before(" the second", &FULL.replace("\\nthe second", " the second")).to_owned(),
            30,
            "visits[0].note",
            END,
            CUT,
        ),
        row(format!("{FULL} (more)"), 35, None, "(more", "nothing after the last closing bracket"),
        row("visits".to_owned(), 1, None, "visits", "fields in ( )"),
        row("{\"format\": 1}".to_owned(), 1, None, "{", "fields in ( )"),
        row("(format: 1; code: 2)".to_owned(), 1, None, ";", "comma"),
    ]
}

const CODE: &str = "1 to 40 characters, none of / \\ : * ? \" < > | and no control character, \
                    not starting or ending with a space or a full stop";
const DATE: &str = "a date of the calendar, year-month-day, such as 2026-11-03";

/// The text up to a piece that stands once in it.
fn before<'a>(piece: &str, text: &'a str) -> &'a str {
    assert_eq!(text.matches(piece).count(), 1, "{piece:?} must stand once");
    text.split(piece).next().unwrap_or_default()
}

/// What format 2 adds, where it is not as it should be.
fn rows_2() -> Vec<Row> {
    let felt = "felt: Some((compared: Easier, depth_thigh_deg: Some(84.0), pain_0_10: Some(2)))";
    let at_felt = |line, field, instead, value, allowed| row(with_2(felt, instead), line, field, value, allowed);
    vec![
        row(with_2("Some(84.0)", "Some(141)"), 25, "visits[0].tasks[0].felt.depth_thigh_deg", "141", "0 to 140°"),
        row(with_2("Some(84.0)", "84.0"), 25, "visits[0].tasks[0].felt.depth_thigh_deg", "84.0", "None or Some(…)"),
        row(with_2("Some(2))", "Some(10.5))"), 25, "visits[0].tasks[0].felt.pain_0_10", "10.5", "0 to 10"),
        row(with_2("Easier", "Better"), 25, "visits[0].tasks[0].felt.compared", "Better", "Easier, Same or Harder"),
        row(
            with_2("pain_at: Some(Knee)", "pain_at: Some(Back)"),
            24,
            "visits[0].tasks[0].seen.pain_at",
            "Back",
            "Ankle, Knee, Hip or LowBack",
        ),
        row(
            with_2("pain_at: Some(Knee)", "pain_at: Knee"),
            24,
            "visits[0].tasks[0].seen.pain_at",
            "Knee",
            "None or Some(…)",
        ),
        row(
            with_2("pain_at: Some(Knee)", "pain_at: Some(Knee), pain_at: None"),
            24,
            "visits[0].tasks[0].seen.pain_at",
            "the field twice",
            "each field once",
        ),
        at_felt(25, "visits[0].tasks[0].felt.compared", "felt: Some((pain_0_10: Some(2)))", "no value", "one"),
        at_felt(25, "visits[0].tasks[0].felt", "felt: (compared: Easier)", "(compared", "None or Some(…)"),
        at_felt(25, "visits[0].tasks[0].felt", "felt: Some(Easier)", "Easier", "fields in ( )"),
        at_felt(
            25,
            "visits[0].tasks[0].felt.depth_deg",
            "felt: Some((compared: Same, depth_deg: Some(84.0)))",
            "a field not known here",
            "compared, depth_thigh_deg or pain_0_10",
        ),
        at_felt(25, "visits[0].tasks[0].felt", "felt: None, felt: None", "the field twice", "each field once"),
        // Format 1 does not know them.
        row(
            with("stopped_by: Some(Stiffness)", "pain_at: Some(Knee)"),
            24,
            "visits[0].tasks[0].seen.pain_at",
            "a field not known here",
            "thigh_deg, shank_deg, trunk_deg, heels_lifted, pain_0_10, pain_from_thigh_deg or stopped_by",
        ),
        row(
            with("rule: HeldShank(25.0)", "rule: HeldShank(25.0), felt: None"),
            28,
            "visits[0].tasks[1].felt",
            "a field not known here",
            "name, placement, load_kg, footwear_drop_mm, heel_raise_mm, stance_width_cm, toe_out_deg, bend, \
             lean_limit_deg, goal_thigh_deg, weight_left_percent, rule, seen or support",
        ),
    ]
}

#[test]
fn every_bad_text_names_line_field_value_and_what_is_allowed() {
    let mut wrong = Vec::new();
    for (text, line, field, value, allowed) in rows().into_iter().chain(rows_2()) {
        let found = problem(&text);
        assert_one_sentence(&found);
        let parts = (found.line, found.field.as_deref(), found.value.as_str(), found.allowed.as_str());
        let expected = (line, field, value, allowed);
        if parts != expected {
            wrong.push(format!("{found}\n   found {parts:?}\nexpected {expected:?}"));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn what_format_1_refuses_format_2_refuses_in_the_same_words() {
    let mut compared = 0;
    for (text, ..) in rows() {
        let in_2 = text.replace("format: 1", "format: 2");
        if in_2 != text {
            assert_eq!(problem(&in_2), problem(&text), "{text}");
            compared += 1;
        }
    }
    assert!(compared > 30, "{compared}");
}

fn assert_one_sentence(problem: &Problem) {
    let sentence = problem.to_string();
    assert!(sentence.starts_with("x.ron") && sentence.ends_with('.'), "{sentence}");
    assert!(!sentence.contains('\n') && !sentence.contains("; ."), "{sentence}");
    assert!(!problem.value.is_empty() && !problem.allowed.is_empty() && !problem.hint.is_empty(), "{problem:?}");
}

#[test]
fn the_sentence_reads_as_one() {
    let found = problem(&with("shank_cm: Some(39.8)", "shank_cm: Some(399.0)"));
    assert_eq!(
        found.to_string(),
        "x.ron, line 11, visits[0].build.shank_cm: found 399.0, needs 20 to 65 cm; check the number and its unit."
    );
}

#[test]
fn bytes_that_are_no_text_are_refused() {
    for (bytes, line, value) in [
        (&b""[..], None, "an empty file"),
        (b" \r\n\t\n", None, "an empty file"),
        (b"\xef\xbb\xbf", None, "an empty file"),
        (b"(\nformat: 1, code: \"\xff\")", Some(2), "bytes that are not UTF-8 text"),
        (b"\xff\xfe(\0f\0", Some(1), "bytes that are not UTF-8 text"),
        (b"\x89PNG\r\n\x1a\n", Some(1), "bytes that are not UTF-8 text"),
    ] {
        let found = of_bytes(bytes);
        assert_eq!((found.line, found.value.as_str()), (line, value));
        assert_one_sentence(&found);
    }
}

#[test]
fn every_prefix_of_a_file_is_a_problem() {
    for full in [FULL, FULL_2] {
        for (length, _) in full.trim_end().char_indices() {
            assert_one_sentence(&of_bytes(&full.as_bytes()[..length]));
        }
    }
}

#[test]
fn floods_of_brackets_are_refused_without_a_deep_stack_or_going_over_them_again() {
    let mut texts = Vec::new();
    for open in ["(", "[", "{", "[(", "(a:", "Some(", "{1:", "/*", "\""] {
        for start in ["", "(a: ", "(format: 1, code: ", "(format: 1, x: ", "(format: 2, x: ", "(format: 3, x: "] {
            for size in [10_000_000, SIZE_LIMIT_BYTES - 64] {
                texts.push(format!("{start}{}", open.repeat(size / open.len())));
            }
        }
    }
    for text in texts {
        // Going over the text again for every bracket would take hours: then this test never ends.
        let opened = read(text.as_bytes(), Path::new("x.ron"));
        let head: String = text.chars().take(30).collect();
        if text.len() > SIZE_LIMIT_BYTES {
            assert_eq!(opened.expect_err("too large").value, "more than 4 MB", "{head}…");
        } else if let Err(problem) = opened {
            assert_one_sentence(&problem);
        } else {
            assert!(head.starts_with("(format: 3"), "{head}…");
        }
    }
}

#[test]
fn what_could_not_be_read_is_not_written() {
    for (change, field, value) in [
        (
            (|client| client.visits[0].stature_cm = f64::NAN) as fn(&mut plumbfold_records::Client),
            "visits[0].stature_cm",
            "NaN",
        ),
        (|client| client.visits[0].mass_kg = f64::INFINITY, "visits[0].mass_kg", "inf"),
        (|client| client.visits[0].build.hand_cm = Some(9.9), "visits[0].build.hand_cm", "9.9"),
        (|client| client.visits[0].age_years = Some(1e9), "visits[0].age_years", "1000000000"),
        (|client| client.visits[0].age_years = Some(1e19), "visits[0].age_years", "1e19"),
        (|client| client.visits[0].tasks[1].name = "main".to_owned(), "visits[0].tasks", "two tasks named \"main\""),
        (|client| client.visits[0].tasks[1].name.clear(), "visits[0].tasks[1].name", "an empty text"),
        (|client| client.visits[0].tasks.clear(), "visits[0].tasks", "no task"),
        (|client| client.visits.clear(), "visits", "no visit"),
        (|client| client.visits[0].note = "ä".repeat(20_001), "visits[0].note", "20001 characters"),
        (|client| client.visits[0].caps.source = "ä".repeat(201), "visits[0].caps.source", "201 characters"),
        (|client| client.visits[0].tasks[0].support.aim = 0.1, "visits[0].tasks[0].support", "0.35 followed by 0.1"),
        (
            |client| client.visits[0].tasks[1].felt = Some(felt(Some(f64::NAN), None)),
            "visits[0].tasks[1].felt.depth_thigh_deg",
            "NaN",
        ),
        (
            |client| client.visits[0].tasks[1].felt = Some(felt(Some(140.5), None)),
            "visits[0].tasks[1].felt.depth_thigh_deg",
            "140.5",
        ),
        (
            |client| client.visits[0].tasks[1].felt = Some(felt(None, Some(-1.0))),
            "visits[0].tasks[1].felt.pain_0_10",
            "-1.0",
        ),
    ] {
        let mut client = client(FULL);
        change(&mut client);
        let found = write(&client).expect_err("unfit");
        assert_eq!((found.field.as_deref(), found.value.as_str(), found.line), (Some(field), value, None), "{found}");
        assert_eq!(found.file, Path::new("fixture-full.ron"));
    }
}

fn felt(depth_thigh_deg: Option<f64>, pain_0_10: Option<f64>) -> Felt {
    Felt { compared: Compared::Same, depth_thigh_deg, pain_0_10 }
}

#[test]
fn a_code_is_something_any_file_system_can_hold() {
    for good in ["a", "demo-1", "Käse 7", "x.y", &"ü".repeat(40)] {
        assert!(Code::new(good).is_ok(), "{good}");
    }
    for bad in
        ["", " ", ".", "..", "a ", " a", "a.", ".a", "a/b", "a\\b", "c:", "a\tb", "a\0b", "a*", "<a>", &"u".repeat(41)]
    {
        assert!(Code::new(bad).is_err(), "{bad:?}");
    }
}
