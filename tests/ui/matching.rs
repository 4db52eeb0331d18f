//! "Match what I saw": the handles write the squat seen and nothing else.

use egui::{Key, vec2};
use egui_kittest::kittest::NodeT as _;
use plumbfold::document::Document;
use plumbfold_core::tables::USUAL_SHANK_AT_STANDING_DEG;
use plumbfold_tests::desk::Desk;

/// The document without the squat seen.
fn rest(doc: &Document) -> Document {
    let mut rest = doc.clone();
    rest.task_mut().seen = None;
    rest
}

#[test]
fn three_drags_store_the_squat_seen_and_the_personal_slope_follows() {
    let mut desk = Desk::demo("demo-overhead");
    desk.depth(70.0);
    let before = desk.doc().clone();
    assert!(before.task().seen.is_none());
    let assumed = desk.grip_value("More knee or more hip and back");
    desk.key(Key::F2);
    assert!(desk.says("Matching") || desk.app().state.view.matching);
    desk.drag_grip("Depth, hip", vec2(0.0, -20.0));
    desk.drag_grip("Shank, knee", vec2(-12.0, 0.0));
    desk.drag_grip("Trunk lean, shoulder", vec2(18.0, 8.0));
    let seen = desk.doc().task().seen.expect("stored");
    assert_eq!(rest(desk.doc()), rest(&before), "only the squat seen changed");
    for (grip, deg) in
        [("Depth, hip", seen.thigh_deg), ("Shank, knee", seen.shank_deg), ("Trunk lean, shoulder", seen.trunk_deg)]
    {
        assert!((desk.grip_value(grip) - deg).abs() < 0.01, "{grip}: {} {deg}", desk.grip_value(grip));
    }
    desk.key(Key::F2);
    let slope = desk.grip_value("More knee or more hip and back");
    let own = (seen.shank_deg - USUAL_SHANK_AT_STANDING_DEG) / seen.thigh_deg;
    assert!((slope - own.clamp(0.0, 0.8)).abs() < 1e-9, "{slope} {own}");
    assert!((slope - assumed).abs() > 0.02, "{slope} {assumed}");
    assert!(desk.says("Seen and computed"));
}

#[test]
fn each_drag_while_matching_is_one_step() {
    let mut desk = Desk::demo("demo-overhead");
    desk.depth(70.0);
    let before = desk.doc().clone();
    desk.key(Key::F2);
    desk.drag_grip("Depth, hip", vec2(0.0, -20.0));
    let first = desk.doc().clone();
    desk.drag_grip("Shank, knee", vec2(-12.0, 0.0));
    desk.command(egui::Modifiers::NONE, Key::Z);
    assert_eq!(*desk.doc(), first);
    desk.command(egui::Modifiers::NONE, Key::Z);
    assert_eq!(*desk.doc(), before);
}

#[test]
fn other_handles_are_still_while_matching() {
    let mut desk = Desk::demo("demo-shape");
    let before = desk.doc().clone();
    desk.key(Key::F2);
    desk.drag_grip("Heel wedge", vec2(0.0, -10.0));
    desk.drag_grip("Load", vec2(0.0, 30.0));
    let at = desk.figure().rect().left_top() + vec2(40.0, 120.0);
    let depth = desk.app().state.view.depth_deg;
    desk.wheel(at, 100.0);
    assert_eq!(rest(desk.doc()), rest(&before));
    assert_eq!(desk.app().state.view.depth_deg, depth);
    desk.key(Key::Escape);
    assert!(!desk.app().state.view.matching);
}

#[test]
fn arrow_keys_match_by_whole_degrees() {
    let mut desk = Desk::demo("demo-shape");
    desk.key(Key::F2);
    desk.grip("Trunk lean, shoulder").focus();
    desk.run();
    desk.key(Key::ArrowUp);
    let seen = desk.doc().task().seen.expect("there was one");
    assert_eq!((seen.thigh_deg, seen.shank_deg, (seen.trunk_deg - 63.0).abs()), (80.0, 34.0, 1.0));
}

#[test]
fn the_rail_matches_by_seat_heights() {
    let mut desk = Desk::demo("demo-shape");
    desk.key(Key::F2);
    let (seat, rail) = (desk.grip_value("Seat height"), desk.grip("Seat height"));
    let node = rail.accesskit_node();
    let (low, high) = (node.min_numeric_value().expect("low"), node.max_numeric_value().expect("high"));
    let rect = rail.rect();
    // where the marker stands on the rail; pressed there, nothing changes but by rounding to half degrees
    let share = (high - seat) / (high - low);
    let at = egui::pos2(rect.center().x, rect.top() + 7.0 + (rect.height() - 14.0) * share as f32);
    desk.drag(at, vec2(0.0, 0.0), 1);
    let seen = desk.doc().task().seen.expect("there was one");
    assert!((seen.thigh_deg - 80.0).abs() < 4.0, "{}", seen.thigh_deg);
}

#[test]
fn the_angles_of_the_squat_seen_can_be_typed() {
    let mut desk = Desk::demo("demo-overhead");
    desk.type_in("Seen thigh", "72");
    desk.type_in("Seen shank", "31");
    desk.type_in("Seen trunk", "40");
    let seen = desk.doc().task().seen.expect("stored");
    assert_eq!((seen.thigh_deg, seen.shank_deg, seen.trunk_deg), (72.0, 31.0, 40.0));
    assert!(desk.says("seen 72°") || desk.says("seen 70°"), "{:?}", desk.texts());
}
