//! What the desk can show: the client's view, palettes, plots, the list of keys, visits, playing.

use egui::{Key, accesskit::Role};
use egui_kittest::kittest::{NodeT as _, Queryable as _};
use plumbfold_scene::{theme::Palette, words};
use plumbfold_tests::{
    clients,
    desk::{Desk, FULL_HD, SMALL},
    drawn,
};

#[test]
fn the_clients_view_shows_figure_rail_and_one_sentence_in_large_type() {
    for code in clients::DEMO {
        let mut desk = Desk::of(clients::demo(code), FULL_HD);
        desk.key(Key::F5);
        for role in [Role::SpinButton, Role::Button, Role::ComboBox, Role::TextInput, Role::Link] {
            assert_eq!(desk.harness.query_all_by_role(role).count(), 0, "{code}: {role:?}");
        }
        let texts = drawn::texts(&desk.harness.output().shapes);
        let smallest = texts.iter().map(|t| t.size).fold(f32::INFINITY, f32::min);
        assert!(smallest >= 34.0, "{code}: {smallest}");
        let all: Vec<String> = texts.iter().map(|t| t.text.to_lowercase()).collect();
        for never in words::NEVER {
            let word = |t: &String| t.split(|c: char| !c.is_alphanumeric()).any(|w| w == never);
            assert!(!all.iter().any(word), "{code}: {never} in {all:?}");
        }
        let numbers = all.iter().flat_map(|t| t.split(|c: char| !c.is_ascii_digit())).filter(|n| !n.is_empty()).count();
        assert!(numbers <= 5, "{code}: {numbers} numbers in {all:?}");
        desk.key(Key::Escape);
        assert!(desk.says("At this depth"));
    }
}

#[test]
fn the_clients_view_can_be_squatted_in() {
    let mut desk = Desk::demo("demo-shape");
    desk.key(Key::F5);
    desk.drag_grip("Depth, hip", egui::vec2(0.0, -80.0));
    assert!(desk.grip_value("Depth, hip") < 85.0);
    desk.key(Key::F5);
    assert!(desk.number("Thigh angle") < 85.0);
}

#[test]
fn palettes_follow_each_other() {
    let mut desk = Desk::demo("demo-shape");
    let mut grounds = Vec::new();
    for palette in [Palette::Light, Palette::Dark, Palette::HighContrast] {
        assert_eq!(desk.app().state.view.palette, palette);
        grounds.push(desk.harness.ctx.global_style().visuals.panel_fill);
        desk.button("Light or dark");
    }
    assert_eq!(desk.app().state.view.palette, Palette::Light);
    grounds.dedup();
    assert_eq!(grounds.len(), 3, "three grounds");
}

#[test]
fn plots_fold_and_move_the_figure() {
    const ARMS: &str = "Lever arms, cm";
    let mut desk = Desk::demo("demo-shape");
    let plot = desk.harness.get_by_role_and_label(Role::Slider, ARMS).rect();
    let mut depths = Vec::new();
    for to in [-30.0, 0.0] {
        desk.drag(plot.center() + egui::vec2(20.0, 0.0), egui::vec2(to - 20.0, 0.0), 3);
        depths.push(desk.grip_value("Depth, hip"));
    }
    // 30 points of a plot that shows 120°
    let want = 30.0 / f64::from(plot.width()) * 120.0;
    assert!((depths[1] - depths[0] - want).abs() < 8.0, "{depths:?}, {want} apart by the plot's width");
    let told = desk.harness.get_by_role_and_label(Role::Slider, ARMS).value().unwrap_or_default();
    assert!(told.contains("hip") && told.contains("knee"), "a plot says what it shows: {told}");
    let low = desk.figure().rect().bottom();
    desk.button("Plots");
    assert!(desk.harness.query_by_role_and_label(Role::Slider, ARMS).is_none());
    assert!(desk.figure().rect().bottom() > low + 80.0, "the figure takes the room");
    desk.key(Key::F7);
    assert!(desk.harness.query_by_role_and_label(Role::Slider, ARMS).is_some());
}

#[test]
fn the_list_of_keys_names_every_command_and_closes() {
    let mut desk = Desk::demo("demo-shape");
    desk.key(Key::F1);
    for command in plumbfold::command::Command::ALL {
        let (label, hint, _) = command.about();
        assert!(desk.says(label) && desk.says(hint), "{label}");
    }
    desk.button("Close");
    assert!(!desk.says("Move the handle that has the focus"));
}

#[test]
fn playing_goes_down_to_the_goal_and_stops() {
    let mut desk = Desk::demo("demo-shape");
    desk.harness.key_press(Key::F8);
    desk.harness.step();
    let mut last = -1.0;
    let mut frames = 0;
    while desk.app().state.view.playing {
        let deg = desk.app().state.view.depth_deg;
        assert!(deg >= last, "never upward");
        last = deg;
        desk.harness.step();
        frames += 1;
        assert!(frames < 200, "it must end");
    }
    assert!(frames > 10, "{frames}");
    assert_eq!(desk.app().state.view.depth_deg, 90.0);
    assert!(!desk.app().state.history.can_undo());
}

#[test]
fn sections_fold_by_their_heads() {
    let mut desk = Desk::demo("demo-shape");
    desk.button("Build");
    assert!(desk.harness.query_by_role_and_label(Role::SpinButton, "Stature").is_none());
    desk.button("Precautions");
    assert!(desk.harness.query_by_role_and_label(Role::SpinButton, "Knee at most").is_some());
}

#[test]
fn an_earlier_visit_can_be_looked_at() {
    let mut desk = Desk::demo("demo-ankle");
    assert_eq!(desk.shown("Mass"), "81.5 kg", "the latest visit is on the desk");
    desk.click(Role::ComboBox, "Visit");
    desk.button("2026-03-02 · visit 1");
    assert_eq!(desk.shown("Mass"), "82.0 kg");
    desk.click(Role::ComboBox, "Visit");
    desk.button("2026-05-11 · visit 2");
    desk.click(Role::ComboBox, "Set-up");
    desk.button("on a wedge");
    assert_eq!(desk.shown("Wedge"), "25 mm");
}

#[test]
fn a_set_up_can_be_added_and_removed() {
    let mut desk = Desk::demo("demo-shape");
    desk.button("+");
    desk.type_in("Wedge", "20");
    assert_eq!(desk.doc().visit().tasks.len(), 2);
    assert_eq!(desk.doc().visit().tasks[0].heel_raise_mm, 0.0, "the first stays as it was");
    desk.button("−");
    assert_eq!(desk.doc().visit().tasks.len(), 1);
    assert_eq!(desk.shown("Wedge"), "0 mm");
}

#[test]
fn a_circumstance_withholds_the_demands_and_says_so() {
    let mut desk = Desk::demo("demo-shape");
    assert!(desk.says("Work required, N·m"));
    desk.button("Precautions");
    desk.harness.get_by_role_and_label(Role::CheckBox, "Pregnant").scroll_to_me();
    desk.run();
    desk.click(Role::CheckBox, "Pregnant");
    assert!(!desk.says("Work required, N·m"));
    assert!(desk.says("not a diagnosis"), "cautions stand where results stand");
}

#[test]
fn a_change_is_tried_on_the_figure_put_back_and_kept() {
    let mut desk = Desk::demo("demo-shape");
    let before = desk.doc().clone();
    let shank = desk.grip_value("Shank, knee");
    desk.button("Try heel raise");
    assert!(desk.grip_value("Heel wedge") > 0.0, "the wedge is under the heel");
    assert!(desk.grip_value("Shank, knee") > shank + 0.1, "which lets the shank lean further");
    assert_eq!(*desk.doc(), before, "trying changes nothing");
    desk.key(Key::Escape);
    assert_eq!(desk.grip_value("Heel wedge"), 0.0);
    desk.button("Try heel raise");
    desk.button("keep");
    assert_eq!(desk.doc().visit().tasks.len(), before.visit().tasks.len() + 1);
    assert!(desk.doc().task().heel_raise_mm > 0.0);
    desk.command(egui::Modifiers::NONE, Key::Z);
    assert_eq!(*desk.doc(), before, "one step");
}

#[test]
fn the_picture_is_described_for_those_who_do_not_see_it() {
    let desk = Desk::of(clients::demo("demo-hip"), SMALL);
    let said = desk.figure().accesskit_node().label().unwrap_or_default();
    for part in ["Thigh 90°", "lean", "knee", "hip arm", "seat height"] {
        assert!(said.contains(part), "{part}: {said}");
    }
}
