//! Everything can be reached by the Tab key and has a name.

use std::collections::BTreeSet;

use egui::{Key, accesskit::Role};
use egui_kittest::kittest::{NodeT as _, Queryable as _};
use plumbfold::action::{Action, Arrived, Ask, Section, ViewChange};
use plumbfold_tests::{clients, desk::Desk};

/// What takes input. A number field is a spin button that becomes a text input while it has the focus.
const INPUTS: [Role; 8] = [
    Role::SpinButton,
    Role::TextInput,
    Role::MultilineTextInput,
    Role::ComboBox,
    Role::CheckBox,
    Role::Button,
    Role::Link,
    Role::Slider,
];

/// Everything on the left side unfolded, with a squat seen and every rule's own field in turn.
fn unfolded(code: &str) -> Desk {
    let mut desk = Desk::demo(code);
    let folded = desk.app().state.view.folded.clone();
    for section in folded {
        desk.send(Action::View(ViewChange::Fold(section)));
    }
    desk.send(Action::View(ViewChange::MoreLengths));
    desk.send(Action::View(ViewChange::MoreChoices));
    desk
}

/// Names of all inputs that are not dull.
fn inputs(desk: &Desk) -> BTreeSet<String> {
    desk.harness
        .root()
        .children_recursive()
        .map(|n| n.accesskit_node())
        .filter(|n| INPUTS.contains(&n.role()) && !n.is_disabled())
        .map(|n| n.label().unwrap_or_default())
        .collect()
}

/// Names of what has the focus, one after the other, for so many presses of Tab.
fn walk(desk: &mut Desk, presses: usize) -> Vec<String> {
    let mut visited = Vec::new();
    for _ in 0..presses {
        desk.harness.key_press(Key::Tab);
        desk.harness.step();
        let focused = desk.harness.root().children_recursive().find(|n| n.is_focused());
        let name = focused.and_then(|n| n.accesskit_node().label()).unwrap_or_default();
        visited.push(name);
    }
    visited
}

#[test]
fn tab_reaches_every_field_button_and_handle() {
    let mut desk = unfolded("demo-hip");
    let want = inputs(&desk);
    for must in [
        "Stature",
        "Shank",
        "Ankle left",
        "Hip right",
        "Arms",
        "Load",
        "Wedge",
        "Toe-out",
        "Forearm",
        "Knee at most",
        "Pain from thigh angle",
        "Note",
        "Code",
        "Depth, hip",
        "Shank, knee",
        "Seat height",
    ] {
        assert!(want.contains(must), "{must} is not among {want:?}");
    }
    let visited: BTreeSet<String> = walk(&mut desk, 140).into_iter().collect();
    let missed: Vec<&String> = want.difference(&visited).collect();
    assert!(missed.is_empty(), "Tab never came to {missed:?}");
}

#[test]
fn tab_goes_through_build_from_top_to_bottom() {
    let mut desk = Desk::demo("demo-shape");
    desk.field("Stature").focus();
    desk.run();
    assert_eq!(walk(&mut desk, 5), ["Mass", "Shank", "Thigh", "Trunk", "Foot"]);
}

#[test]
fn a_field_left_by_tab_takes_what_was_typed() {
    let mut desk = Desk::demo("demo-shape");
    desk.field("Shank").click();
    desk.run();
    desk.replace_text("Shank", "37,5");
    desk.key(Key::Tab);
    assert_eq!(desk.doc().visit().build.shank_cm, Some(37.5));
}

#[test]
fn nothing_that_takes_input_is_without_a_name() {
    for code in clients::DEMO {
        let desk = unfolded(code);
        assert!(desk.harness.unnamed_widgets().is_empty(), "{code}: {:?}", desk.harness.unnamed_widgets());
    }
    let mut desk = unfolded("demo-shape");
    // with a question, a path to type, the keys, the client's view, and a message
    for ask in [Ask::Open, Ask::SaveAs, Ask::Sheet] {
        desk.send(Action::Arrived(Arrived::Picked(ask, None)));
        assert!(desk.harness.unnamed_widgets().is_empty(), "{:?}", desk.harness.unnamed_widgets());
        desk.key(Key::Escape);
    }
    for key in [Key::F1, Key::F1, Key::F2, Key::F2, Key::F5] {
        desk.key(key);
        assert!(desk.harness.unnamed_widgets().is_empty(), "{key:?} {:?}", desk.harness.unnamed_widgets());
    }
}

#[test]
fn names_are_not_shared_on_the_left_side() {
    let desk = unfolded("demo-hip");
    let fields: Vec<String> =
        desk.harness.get_all_by_role(Role::SpinButton).filter_map(|n| n.accesskit_node().label()).collect();
    let once: BTreeSet<&String> = fields.iter().collect();
    assert_eq!(once.len(), fields.len(), "{fields:?}");
    assert!(fields.len() >= 30, "{fields:?}");
}

#[test]
fn tab_stays_within_a_question() {
    let mut desk = Desk::demo("demo-shape");
    desk.type_in("Mass", "64");
    desk.send(Action::CloseAsked);
    let visited: BTreeSet<String> = walk(&mut desk, 8).into_iter().collect();
    let question = ["Go on without saving", "Save first", "Stay here"];
    assert_eq!(visited.iter().map(String::as_str).collect::<Vec<_>>(), question);
}

#[test]
fn folding_a_section_is_told_to_a_screen_reader() {
    let mut desk = Desk::demo("demo-shape");
    let open = |desk: &Desk| desk.harness.get_by_role_and_label(Role::Button, "Build").accesskit_node().toggled();
    let before = open(&desk);
    desk.send(Action::View(ViewChange::Fold(Section::Build)));
    assert_ne!(before, open(&desk));
}
