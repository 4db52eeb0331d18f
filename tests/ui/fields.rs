//! Fields: typing, arrow keys, dragging, and what is refused.

use egui::{Key, accesskit::Role, vec2};
use egui_kittest::kittest::Queryable as _;
use plumbfold_core::Placement;
use plumbfold_tests::desk::Desk;

#[test]
fn a_shorter_shank_typed_in_leans_the_trunk_further() {
    let mut desk = Desk::demo("demo-shape");
    desk.depth(60.0);
    let (lean, seat) = (desk.number("Trunk lean"), desk.number("Seat height"));
    desk.type_in("Shank", "34");
    assert_eq!(desk.doc().visit().build.shank_cm, Some(34.0));
    assert!(desk.number("Trunk lean") >= lean + 1.0, "{} after {lean}", desk.number("Trunk lean"));
    // the shank that stands 15° from upright got 4.6 cm shorter, and the thigh keeps its angle
    let sunk = seat - desk.number("Seat height");
    assert!((3.0..=6.0).contains(&sunk), "{sunk}");
}

#[test]
fn comma_point_unit_and_spaces_are_understood() {
    let mut desk = Desk::demo("demo-shape");
    for (typed, value, shown) in [
        ("39,8 cm", 39.8, "39.8 cm"),
        ("40.25", 40.25, "40.25 cm"),
        (" 37 ", 37.0, "37.0 cm"),
        ("41cm", 41.0, "41.0 cm"),
    ] {
        desk.type_in("Shank", typed);
        assert_eq!(desk.doc().visit().build.shank_cm, Some(value), "typed {typed}");
        assert_eq!(desk.shown("Shank"), shown, "typed {typed}");
    }
    desk.type_in("Ankle left", "−2,5");
    assert_eq!(desk.shown("Ankle left"), "−2.5 cm");
}

#[test]
fn arrow_keys_move_a_field_by_one_step() {
    let mut desk = Desk::demo("demo-shape");
    desk.field("Thigh").focus();
    desk.run();
    desk.key(Key::ArrowUp);
    assert_eq!(desk.doc().visit().build.thigh_cm, Some(44.7));
    desk.key(Key::ArrowDown);
    desk.key(Key::ArrowDown);
    assert_eq!(desk.doc().visit().build.thigh_cm, Some(44.5));
    desk.field("Goal").focus();
    desk.run();
    desk.key(Key::ArrowUp);
    assert_eq!(desk.doc().task().goal_thigh_deg, 91.0);
}

#[test]
fn a_field_dragged_sideways_changes_in_whole_steps_and_stays_in_range() {
    let mut desk = Desk::demo("demo-shape");
    let at = desk.field("Goal").rect().center();
    desk.drag(at, vec2(40.0, 0.0), 5);
    let goal = desk.doc().task().goal_thigh_deg;
    assert!((95.0..=105.0).contains(&goal) && goal.fract() == 0.0, "{goal}");
    let at = desk.field("Goal").rect().center();
    desk.drag(at, vec2(1000.0, 0.0), 5);
    assert_eq!(desk.doc().task().goal_thigh_deg, 140.0);
    assert!(!desk.says("outside"));
}

#[test]
fn a_value_out_of_range_says_why_under_its_field_and_changes_nothing() {
    let mut desk = Desk::demo("demo-shape");
    let before = desk.doc().clone();
    for (typed, why) in [
        ("90", "90.0 cm is outside 20 to 65 cm"),
        ("-4", "−4.0 cm is outside 20 to 65 cm"),
        ("nan", "“nan” is not a number"),
        ("1e400", "“1e400” is not a number"),
        ("long", "“long” is not a number"),
    ] {
        desk.type_in("Shank", typed);
        let said = desk.harness.get_by_label(why).rect();
        let field = desk.field("Shank").rect();
        assert!(
            said.top() >= field.bottom() && said.top() < field.bottom() + 12.0,
            "{typed}: {said:?} under {field:?}"
        );
        assert_eq!(*desk.doc(), before, "{typed}");
        assert_eq!(desk.shown("Shank"), "38.6 cm");
    }
    assert!(!desk.app().state.history.can_undo());
    desk.type_in("Shank", "38");
    assert!(!desk.says("not a number"), "the reason goes with a value that holds");
    desk.type_in("Stature", "");
    assert!(desk.says("Stature is needed"));
    assert_eq!(desk.doc().visit().stature_cm, 170.0);
}

#[test]
fn a_length_taken_out_is_estimated_and_says_so() {
    let mut desk = Desk::demo("demo-roomy");
    assert!(!desk.says("estimated"));
    desk.type_in("Shank", "");
    assert_eq!(desk.doc().visit().build.shank_cm, None);
    assert!(desk.shown("Shank").starts_with("≈ "), "{}", desk.shown("Shank"));
    assert!(desk.says("estimated"));
}

#[test]
fn a_range_typed_on_one_side_counts() {
    let mut desk = Desk::demo("demo-roomy");
    desk.depth(60.0);
    let before = desk.reading("Shank");
    desk.type_in("Ankle left", "2");
    assert_ne!(desk.reading("Shank"), before, "the stiffer ankle holds the shank back");
    assert_eq!(desk.doc().visit().joints.reach_limit_deg, 215.0);
}

#[test]
fn choices_are_made_from_lists_by_name() {
    let mut desk = Desk::demo("demo-shape");
    desk.click(Role::ComboBox, "Arms");
    desk.button("goblet");
    assert_eq!(desk.doc().task().placement, Placement::Goblet);
    desk.type_in("Load", "12");
    assert_eq!(desk.doc().task().load_kg, 12.0);
    assert_eq!(desk.harness.get_by_role_and_label(Role::ComboBox, "Arms").value().as_deref(), Some("goblet"));
}

#[test]
fn more_lengths_and_choices_come_when_asked_for() {
    let mut desk = Desk::demo("demo-shape");
    assert!(desk.harness.query_by_role_and_label(Role::SpinButton, "Forearm").is_none());
    desk.click(Role::Link, "more lengths, age, table…");
    desk.type_in("Forearm", "26,5");
    assert_eq!(desk.doc().visit().build.forearm_cm, Some(26.5));
    desk.type_in("Age", "71");
    assert_eq!(desk.doc().visit().age_years, Some(71.0));
    desk.click(Role::ComboBox, "Segment table");
    desk.button("Dempster, Winter 2009");
    desk.depth(60.0);
    assert_eq!(desk.doc().visit().segments, plumbfold_core::SegmentTable::DempsterWinter);
}
