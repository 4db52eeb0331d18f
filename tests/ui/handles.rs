//! Handles on the figure: dragged, turned by the wheel, moved by arrow keys and by a screen reader.

use egui::{Key, vec2};
use egui_kittest::kittest::NodeT as _;
use plumbfold_core::tables::USUAL_SHANK_AT_STANDING_DEG;
use plumbfold_records::Rule;
use plumbfold_tests::desk::Desk;

const HIP: &str = "Depth, hip";
const KNEE: &str = "Shank, knee";
const SHOULDER: &str = "Trunk lean, shoulder";
const SEAT: &str = "Seat height";

#[test]
fn dragging_the_hip_squats_and_changes_no_document() {
    let mut desk = Desk::demo("demo-shape");
    let before = desk.doc().clone();
    desk.drag_grip(HIP, vec2(0.0, -60.0));
    let higher = desk.grip_value(HIP);
    assert!((50.0..80.0).contains(&higher), "{higher}");
    desk.drag_grip(HIP, vec2(0.0, 30.0));
    let lower = desk.grip_value(HIP);
    assert!(lower > higher + 5.0 && lower < 90.0, "{lower} after {higher}");
    assert_eq!(*desk.doc(), before);
    assert!(!desk.app().state.history.can_undo(), "a depth is nothing to undo");
}

#[test]
fn the_hip_stays_under_the_pointer_that_drags_it() {
    let mut desk = Desk::demo("demo-shape");
    desk.depth(70.0);
    let start = desk.grip(HIP).rect().center();
    // grabbed beside its middle: nothing may jump
    let grabbed = start + vec2(5.0, 4.0);
    desk.drag(grabbed, vec2(0.0, 36.0), 6);
    let end = desk.grip(HIP).rect().center();
    assert!((end.y - start.y - 36.0).abs() < 1.5, "{start:?} {end:?}");
}

#[test]
fn dragging_the_knee_sets_the_slope_of_the_usual_shank() {
    let mut desk = Desk::demo("demo-roomy");
    desk.depth(60.0);
    desk.drag_grip(KNEE, vec2(-14.0, 0.0));
    let Rule::Usual { slope: Some(back) } = desk.doc().task().rule else { panic!("{:?}", desk.doc().task().rule) };
    let (shank_back, lean_back) = (desk.grip_value(KNEE), desk.number("Trunk lean"));
    // the rule goes through the place where the knee was put
    assert!((shank_back - USUAL_SHANK_AT_STANDING_DEG - back * 60.0).abs() < 0.1, "{shank_back} {back}");
    desk.drag_grip(KNEE, vec2(24.0, 0.0));
    let Rule::Usual { slope: Some(fore) } = desk.doc().task().rule else { panic!("{:?}", desk.doc().task().rule) };
    assert!(fore > back + 0.05, "{fore} after {back}");
    assert!(desk.grip_value(KNEE) > shank_back + 5.0);
    assert!(desk.number("Trunk lean") < lean_back, "a knee further forward keeps the trunk more upright");
    assert!((desk.grip_value(HIP) - 60.0).abs() < 1e-6, "the depth stays");
}

#[test]
fn facing_left_the_knee_is_dragged_the_other_way() {
    let mut desk = Desk::demo("demo-shape");
    desk.depth(60.0);
    desk.key(Key::F4);
    let before = desk.grip_value(KNEE);
    desk.drag_grip(KNEE, vec2(14.0, 0.0));
    assert!(desk.grip_value(KNEE) < before - 3.0, "{} after {before}", desk.grip_value(KNEE));
}

#[test]
fn the_wheel_over_the_figure_squats() {
    let mut desk = Desk::demo("demo-shape");
    desk.depth(40.0);
    let at = desk.figure().rect().left_top() + vec2(40.0, 120.0);
    desk.wheel(at, 60.0);
    let deeper = desk.grip_value(HIP);
    assert!(deeper > 43.0, "{deeper}");
    desk.wheel(at, -120.0);
    assert!(desk.grip_value(HIP) < deeper - 6.0);
    desk.wheel(at, -3000.0);
    assert!(desk.grip_value(HIP).abs() < 1e-9, "standing is the top");
}

#[test]
fn the_wheel_over_a_panel_scrolls_and_does_not_squat() {
    let mut desk = Desk::demo("demo-shape");
    let before = desk.grip_value(HIP);
    let at = desk.field("Mass").rect().center();
    desk.wheel(at, 200.0);
    assert!((desk.grip_value(HIP) - before).abs() < 1e-9);
    assert!(desk.field("Mass").rect().center().y < at.y - 50.0, "the left side scrolled");
}

#[test]
fn the_rail_takes_a_click_a_drag_and_arrow_keys() {
    let mut desk = Desk::demo("demo-shape");
    let rail = desk.grip(SEAT).rect();
    desk.drag(rail.center_top() + vec2(0.0, 30.0), vec2(0.0, 60.0), 3);
    let (seat, thigh) = (desk.grip_value(SEAT), desk.grip_value(HIP));
    assert!((20.0..75.0).contains(&seat), "{seat}");
    desk.grip(SEAT).focus();
    desk.run();
    desk.key(Key::ArrowDown);
    assert!((desk.grip_value(HIP) - thigh - 1.0).abs() < 1e-6, "{} after {thigh}", desk.grip_value(HIP));
    assert!(desk.grip_value(SEAT) < seat);
    desk.key(Key::ArrowUp);
    desk.key(Key::ArrowUp);
    assert!((desk.grip_value(HIP) - thigh + 1.0).abs() < 1e-6);
}

#[test]
fn arrow_keys_and_a_screen_reader_move_hip_and_knee() {
    let mut desk = Desk::demo("demo-shape");
    desk.depth(60.0);
    desk.grip(HIP).focus();
    desk.run();
    desk.key(Key::ArrowDown);
    desk.key(Key::ArrowDown);
    assert!((desk.grip_value(HIP) - 62.0).abs() < 1e-6);
    desk.grip(HIP).increment_accesskit();
    desk.run();
    assert!((desk.grip_value(HIP) - 63.0).abs() < 1e-6);
    let shank = desk.grip_value(KNEE);
    desk.grip(KNEE).decrement_accesskit();
    desk.run();
    assert!((desk.grip_value(KNEE) - shank + 1.0).abs() < 0.05, "{} after {shank}", desk.grip_value(KNEE));
}

#[test]
fn the_shoulder_straightens_the_trunk_and_tells_by_how_many_centimetres_it_tips() {
    let mut desk = Desk::demo("demo-shape");
    let before = desk.doc().clone();
    let lean = desk.grip_value(SHOULDER);
    desk.drag_grip(SHOULDER, vec2(-70.0, -60.0));
    let held = desk.grip_value(SHOULDER);
    assert!(held < lean - 20.0, "{held} after {lean}");
    assert!(desk.says("Trunk held"), "{:?}", desk.texts());
    let told = desk.texts().into_iter().find(|t| t.contains("behind the support")).expect("where the COM falls");
    assert!(told.contains(" cm behind the support; unaided, this tips back."), "{told}");
    let shown = desk.figure().accesskit_node().label().unwrap_or_default();
    assert!(shown.contains("behind the support"), "the picture's own words: {shown}");
    assert!((desk.grip_value(HIP) - 90.0).abs() < 0.2, "hip and knee stay where they are");
    assert_eq!(*desk.doc(), before, "a demonstration is not saved");
    desk.button("Back to balance");
    assert!((desk.grip_value(SHOULDER) - lean).abs() < 1e-6);
    assert!(!desk.says("behind the support"));
}

#[test]
fn escape_ends_the_demonstration() {
    let mut desk = Desk::demo("demo-shape");
    let lean = desk.grip_value(SHOULDER);
    desk.grip(SHOULDER).focus();
    desk.run();
    desk.key(Key::ArrowUp);
    assert!((desk.grip_value(SHOULDER) - lean + 1.0).abs() < 0.1, "{}", desk.grip_value(SHOULDER));
    desk.key(Key::Escape);
    assert!((desk.grip_value(SHOULDER) - lean).abs() < 1e-6);
}

#[test]
fn heel_and_load_are_dragged_in_their_own_units() {
    let mut desk = Desk::demo("demo-loaded");
    desk.depth(50.0);
    desk.drag_grip("Heel wedge", vec2(0.0, -5.0));
    let raise = desk.doc().task().heel_raise_mm;
    assert!(raise > 5.0 && raise.fract() == 0.0, "{raise}");
    assert_eq!(desk.grip_value("Heel wedge"), raise);
    desk.drag_grip("Load", vec2(0.0, 40.0));
    let kg = desk.doc().task().load_kg;
    assert!(kg > 81.0, "{kg}");
    assert_eq!(desk.shown("Load"), format!("{kg} kg"));
}

#[test]
fn the_slider_shares_out_between_knee_and_hip() {
    const SLIDER: &str = "More knee or more hip and back";
    let mut desk = Desk::demo("demo-overhead");
    desk.depth(50.0);
    let shank = desk.grip_value(KNEE);
    let at = desk.grip(SLIDER).rect();
    desk.drag(at.center(), vec2(at.width() * 0.4, 0.0), 3);
    assert!(desk.grip_value(SLIDER) < 0.2, "{}", desk.grip_value(SLIDER));
    assert!(desk.grip_value(KNEE) < shank, "more hip and back is the shank more upright");
    assert!(matches!(desk.doc().task().rule, Rule::Usual { slope: Some(_) }));
}

#[test]
fn the_pain_mark_is_dragged_along_the_rail() {
    let mut desk = Desk::demo("demo-hip");
    assert_eq!(desk.grip_value("Pain from, thigh angle"), 62.0);
    desk.drag_grip("Pain from, thigh angle", vec2(0.0, -25.0));
    let from = desk.doc().task().seen.and_then(|s| s.pain_from_thigh_deg).expect("kept");
    assert!((30.0..60.0).contains(&from), "{from}");
}
