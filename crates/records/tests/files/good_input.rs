//! What is read from files that are in order.

use std::path::Path;

use plumbfold_core::{
    measures::{PerJoint, Scope, Sex, Sides},
    tables::SegmentTable,
    task::Placement,
};
use plumbfold_records::{
    Ankle, Bend, Build, Caps, Client, Code, Date, Hip, Joints, Knee, Opened, Rule, Seen, StoppedBy, Support, Task,
    Visit, read,
};

use crate::{FULL, client, with};

fn both(left: f64, right: f64) -> Sides<f64> {
    Sides { left: Some(left), right: Some(right) }
}

fn code(text: &str) -> Code {
    Code::new(text).expect("a code that holds")
}

#[test]
fn every_field_of_format_1_is_read() {
    let main = Task {
        name: "main".to_owned(),
        placement: Placement::Goblet,
        load_kg: 8.0,
        footwear_drop_mm: 10.0,
        heel_raise_mm: 15.0,
        stance_width_cm: Some(32.0),
        toe_out_deg: 12.0,
        bend: Bend::Degrees(25.0),
        lean_limit_deg: Some(55.0),
        goal_thigh_deg: 80.0,
        weight_left_percent: Some(47.5),
        rule: Rule::Usual { slope: Some(0.41) },
        seen: Some(Seen {
            thigh_deg: 60.0,
            shank_deg: 22.0,
            trunk_deg: 50.0,
            heels_lifted: true,
            pain_0_10: Some(3.0),
            pain_from_thigh_deg: Some(52.0),
            pain_at: None,
            stopped_by: Some(StoppedBy::Stiffness),
        }),
        felt: None,
        support: Support { edge_back: Some(0.2), zone_back: 0.35, aim: 0.45, zone_front: 0.55, edge_front: Some(0.75) },
    };
    let held = Task {
        placement: Placement::HighBar,
        load_kg: 40.0,
        bend: Bend::KeepSmall,
        goal_thigh_deg: 90.0,
        rule: Rule::HeldShank(25.0),
        ..Task::new("held shank")
    };
    let visit = Visit {
        date: Date::constant(2024, 2, 29),
        sex_model: Sex::Female,
        age_years: Some(34.0),
        stature_cm: 168.25,
        mass_kg: 61.5,
        scope: Scope::ALL.to_vec(),
        build: Build {
            shank_cm: Some(39.8),
            thigh_cm: Some(42.4),
            trunk_cm: Some(48.1),
            foot_cm: Some(24.5),
            ankle_height_cm: Some(6.9),
            heel_to_ankle_cm: Some(6.2),
            upper_arm_cm: Some(31.7),
            forearm_cm: Some(24.3),
            hand_cm: Some(18.1),
        },
        joints: Joints {
            ankle: Ankle::KneeToWall(both(-1.5, 8.0)),
            hip: Hip::KneeToChest(both(112.0, 118.0)),
            knee: Knee::Degrees(both(128.0, 131.0)),
            reach_limit_deg: 185.0,
        },
        caps: Caps {
            knee_deg: Some(100.0),
            hip_deg: Some(95.0),
            load_kg: Some(20.0),
            source: "surgeon's letter, week 12".to_owned(),
        },
        tasks: vec![main, held],
        note: "two lines:\nthe second".to_owned(),
        segments: SegmentTable::Dumas,
        strength: PerJoint { ankle: 0.8, knee: 1.2, hip: 1.1, low_back: 0.9 },
    };
    assert_eq!(client(FULL), Client::new(code("fixture-full"), visit));
}

#[test]
fn what_may_be_left_out_is_as_in_a_new_client() {
    let least = client(include_str!("fixtures/v1-least.ron"));
    let mut visit = Visit::new(Date::constant(2026, 11, 3), Sex::Male, 176.0, 80.0);
    visit.joints.ankle = Ankle::Degrees(Sides { left: None, right: None });
    assert_eq!(least, Client::new(code("fixture-least"), visit));
}

#[test]
fn a_byte_order_mark_windows_line_ends_and_comments_change_nothing() {
    assert_eq!(client(&format!("\u{feff}{FULL}")), client(FULL));
    assert_eq!(client(&FULL.replace('\n', "\r\n")), client(FULL));
    assert_eq!(client(&with("note:", "/* a /* nested */ remark */ note:")), client(FULL));
}

#[test]
fn a_newer_file_comes_back_as_its_text_whatever_else_it_holds() {
    for text in [
        with("format: 1", "format: 3"),
        with("format: 1", "format: 4294967295"),
        "(format: 3, something: [Else(1, 2), {\"a\": 1}])".to_owned(),
        "(before: Else(there: [((1))]), format: 3)".to_owned(),
        "(format: 3, cut sho".to_owned(),
    ] {
        match read(format!("\u{feff}{text}").as_bytes(), Path::new("x.ron")) {
            Ok(Opened::Newer { format, text: kept }) => {
                assert!(format >= 3);
                assert_eq!(kept, text);
            }
            other => panic!("{text}: {other:?}"),
        }
    }
}

#[test]
fn the_latest_visit_is_that_of_the_latest_day() {
    let day = |d| Visit::new(Date::constant(2026, 11, d), Sex::Male, 176.0, 80.0);
    let mut client = Client::new(code("days"), day(3));
    client.visits.extend([day(9), day(9), day(1)]);
    assert_eq!(client.latest_visit(), 2);
    client.visits.clear();
    assert_eq!(client.latest_visit(), 0);
}

#[test]
fn a_task_is_found_by_its_name() {
    let client = client(FULL);
    assert_eq!(client.visits[0].task_named("held shank"), Some(1));
    assert_eq!(client.visits[0].task_named("Main"), None);
}
