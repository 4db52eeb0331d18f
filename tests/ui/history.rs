//! Undo and redo: one gesture, one step.

use egui::{Key, Modifiers, accesskit::Role, vec2};
use egui_kittest::kittest::Queryable as _;
use plumbfold_tests::desk::Desk;

fn undo(desk: &mut Desk) {
    desk.command(Modifiers::NONE, Key::Z);
}

fn redo(desk: &mut Desk) {
    desk.command(Modifiers::SHIFT, Key::Z);
}

#[test]
fn each_kind_of_gesture_is_one_step_back_and_one_forth() {
    let mut desk = Desk::demo("demo-shape");
    desk.depth(60.0);
    let mut states = vec![desk.doc().clone()];
    desk.type_in("Shank", "40");
    states.push(desk.doc().clone());
    desk.drag_grip("Shank, knee", vec2(-16.0, 0.0));
    states.push(desk.doc().clone());
    let at = desk.field("Goal").rect().center();
    desk.drag(at, vec2(30.0, 0.0), 6);
    states.push(desk.doc().clone());
    desk.click(Role::ComboBox, "Arms");
    desk.button("goblet");
    states.push(desk.doc().clone());
    desk.harness.get_by_role_and_label(Role::CheckBox, "Heels came up").scroll_to_me();
    desk.run();
    desk.click(Role::CheckBox, "Heels came up");
    states.push(desk.doc().clone());
    for pair in states.windows(2) {
        assert_ne!(pair[0], pair[1], "each gesture changed something");
    }
    for want in states.iter().rev().skip(1) {
        undo(&mut desk);
        assert_eq!(desk.doc(), want);
    }
    assert!(!desk.app().state.history.can_undo(), "five gestures, five steps");
    for want in &states[1..] {
        redo(&mut desk);
        assert_eq!(desk.doc(), want);
    }
}

#[test]
fn the_buttons_undo_and_redo_and_are_dull_where_there_is_nothing() {
    let mut desk = Desk::demo("demo-shape");
    let dull = |desk: &Desk, name| {
        use egui_kittest::kittest::NodeT as _;
        desk.harness.get_by_role_and_label(Role::Button, name).accesskit_node().is_disabled()
    };
    assert!(dull(&desk, "Undo") && dull(&desk, "Redo"));
    desk.type_in("Mass", "65");
    assert!(!dull(&desk, "Undo") && dull(&desk, "Redo"));
    assert!(desk.says("not saved"));
    desk.button("Undo");
    assert_eq!(desk.shown("Mass"), "62.0 kg");
    assert!(dull(&desk, "Undo") && !dull(&desk, "Redo"));
    assert!(!desk.says("not saved"), "undone is as saved");
    desk.button("Redo");
    assert_eq!(desk.shown("Mass"), "65.0 kg");
}

#[test]
fn a_new_change_after_undo_drops_what_was_undone() {
    let mut desk = Desk::demo("demo-shape");
    desk.type_in("Mass", "65");
    undo(&mut desk);
    desk.type_in("Mass", "70");
    redo(&mut desk);
    assert_eq!(desk.shown("Mass"), "70.0 kg");
    undo(&mut desk);
    assert_eq!(desk.shown("Mass"), "62.0 kg");
}

#[test]
fn view_changes_are_no_steps() {
    let mut desk = Desk::demo("demo-shape");
    desk.drag_grip("Depth, hip", vec2(0.0, -40.0));
    desk.drag_grip("Trunk lean, shoulder", vec2(-30.0, -30.0));
    for key in [Key::F3, Key::F4, Key::F6, Key::F7] {
        desk.key(key);
    }
    assert!(!desk.app().state.history.can_undo());
    assert!(desk.says("· saved"), "{:?}", desk.texts());
}

#[test]
fn a_line_of_the_note_is_one_step() {
    let mut desk = Desk::demo("demo-shape");
    let before = desk.doc().clone();
    let note = || (Role::MultilineTextInput, "Note");
    desk.harness.get_by_role_and_label(note().0, note().1).focus();
    desk.run();
    for word in ["Tried", " a", " wedge."] {
        desk.harness.get_by_role_and_label(note().0, note().1).type_text(word);
        desk.run();
    }
    assert!(desk.doc().visit().note.contains("Tried a wedge."));
    undo(&mut desk);
    assert_eq!(*desk.doc(), before);
}
