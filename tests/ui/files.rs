//! Files through the desk: opening, what is wrong with one, saving, and the guard over changes.

use std::{
    fs,
    path::{Path, PathBuf},
    sync::Arc,
};

use egui::{DroppedFile, Key, Modifiers, ViewportCommand, ViewportEvent, ViewportId, accesskit::Role};
use egui_kittest::kittest::Queryable as _;
use plumbfold::action::{Action, Arrived, Ask};
use plumbfold_records::{Opened, open, save};
use plumbfold_tests::{clients, desk::Desk};

/// A file as the window system hands it over.
#[derive(Debug)]
struct Dropped(PathBuf);

impl DroppedFile for Dropped {
    fn path(&self) -> &Path {
        &self.0
    }

    fn bytes(&self) -> Result<Vec<u8>, String> {
        fs::read(&self.0).map_err(|e| e.to_string())
    }
}

/// A file dropped on the window.
fn drop_on(desk: &mut Desk, path: &Path) {
    desk.harness.input_mut().dropped_files.push(Arc::new(Dropped(path.to_owned())));
    desk.run();
}

/// The window's close button; the commands the window then gets, over all frames until it rests.
fn close(desk: &mut Desk) -> Vec<ViewportCommand> {
    let viewport = desk.harness.input_mut().viewports.entry(ViewportId::ROOT).or_default();
    viewport.events.push(ViewportEvent::Close);
    desk.harness.step();
    let mut commands = desk.window_commands();
    desk.harness.input_mut().viewports.entry(ViewportId::ROOT).or_default().events.clear();
    desk.run();
    commands.extend(desk.window_commands());
    commands
}

/// Clicks a button of the question; while one is asked, its buttons are the last in the tree.
fn answer(desk: &mut Desk, name: &str) -> Vec<ViewportCommand> {
    desk.harness.get_all_by_role_and_label(Role::Button, name).last().expect("at least one").click();
    let mut commands = Vec::new();
    for _ in 0..6 {
        desk.harness.step();
        commands.extend(desk.window_commands());
    }
    commands
}

/// No file dialog can be shown here: the path is typed.
fn type_path(desk: &mut Desk, ask: Ask, path: &Path) {
    desk.send(Action::Arrived(Arrived::Picked(ask, None)));
    desk.harness.get_by_role_and_label(Role::TextInput, "Path").focus();
    desk.run();
    desk.harness.get_by_role_and_label(Role::TextInput, "Path").type_text(&path.display().to_string());
    desk.run();
    desk.key(Key::Enter);
}

#[test]
fn a_broken_file_is_told_in_one_sentence_and_the_desk_keeps_what_it_had() {
    let folder = tempfile::tempdir().expect("a folder");
    let sound = fs::read_to_string(clients::folder().join("demo-hip.ron")).expect("shipped");
    let newer = sound.replacen("format: 1", "format: 99", 1);
    let cases: [(&str, Vec<u8>, &str); 9] = [
        ("empty.ron", Vec::new(), "empty"),
        ("cut.ron", sound.as_bytes()[..sound.len() / 2].to_vec(), "line"),
        ("nan.ron", sound.replacen("165.0", "NaN", 1).into_bytes(), "stature_cm"),
        ("huge.ron", sound.replacen("165.0", "1e400", 1).into_bytes(), "stature_cm"),
        ("range.ron", sound.replacen("165.0", "16.5", 1).into_bytes(), "100 to 230"),
        ("unknown.ron", sound.replacen("Female", "Woman", 1).into_bytes(), "sex_model"),
        ("twice.ron", sound.replacen("mass_kg: 69.0", "mass_kg: 69.0, mass_kg: 70.0", 1).into_bytes(), "mass_kg"),
        ("deep.ron", vec![b'['; 100_000], "line"),
        ("newer.ron", newer.into_bytes(), "newer"),
    ];
    let mut desk = Desk::demo("demo-shape");
    desk.type_in("Mass", "64");
    desk.command(Modifiers::NONE, Key::Z);
    let before = desk.doc().clone();
    for (name, bytes, part) in cases {
        let path = folder.path().join(name);
        fs::write(&path, &bytes).expect("written");
        drop_on(&mut desk, &path);
        let told: Vec<String> = desk.texts().into_iter().filter(|t| t.contains(name)).collect();
        let [told] = told.as_slice() else { panic!("{name}: {told:?}") };
        assert!(told.contains(part), "{name}: {told}");
        assert!(told.ends_with('.') && !told.contains('\n'), "{name}: {told}");
        assert_eq!(*desk.doc(), before, "{name}");
        assert_eq!(fs::read(&path).expect("still there"), bytes, "{name} was not touched");
        desk.button("Read");
        assert!(!desk.says(name), "read and put away");
    }
    desk.command(Modifiers::SHIFT, Key::Z);
    assert_eq!(desk.shown("Mass"), "64.0 kg", "history outlives a file that could not be opened");
}

#[test]
fn a_folder_and_a_file_that_is_not_there_are_told_too() {
    let folder = tempfile::tempdir().expect("a folder");
    let mut desk = Desk::demo("demo-shape");
    drop_on(&mut desk, folder.path());
    assert!(desk.says("folder") || desk.says("directory"), "{:?}", desk.texts());
    drop_on(&mut desk, &folder.path().join("nowhere.ron"));
    assert!(desk.says("nowhere.ron"));
    assert_eq!(desk.doc().client.code.as_str(), "demo-shape");
}

#[test]
fn a_dropped_client_is_opened_and_its_depth_is_its_goal() {
    let mut desk = Desk::demo("demo-shape");
    drop_on(&mut desk, &clients::folder().join("demo-roomy.ron"));
    assert_eq!(desk.doc().client, clients::demo("demo-roomy"));
    assert_eq!(desk.reading("Thigh angle"), "110°");
    assert!(desk.says("· saved"));
}

#[test]
fn an_unsaved_client_is_not_dropped_over_unasked() {
    let mut desk = Desk::demo("demo-shape");
    desk.type_in("Mass", "64");
    let path = clients::folder().join("demo-roomy.ron");
    drop_on(&mut desk, &path);
    assert!(desk.says("Changes are not saved"));
    answer(&mut desk, "Stay here");
    assert_eq!(desk.shown("Mass"), "64.0 kg");
    drop_on(&mut desk, &path);
    answer(&mut desk, "Go on without saving");
    assert_eq!(desk.doc().client.code.as_str(), "demo-roomy");
}

#[test]
fn closing_asks_where_changes_would_be_lost() {
    let mut desk = Desk::demo("demo-shape");
    let closes = |commands: &[ViewportCommand]| commands.contains(&ViewportCommand::Close);
    desk.type_in("Mass", "64");
    let commands = close(&mut desk);
    assert!(commands.contains(&ViewportCommand::CancelClose) && !closes(&commands), "{commands:?}");
    assert!(desk.says("Changes are not saved") && desk.says("demo-shape was changed since it was saved."));
    assert!(!closes(&answer(&mut desk, "Stay here")));
    assert!(!desk.says("Changes are not saved"));
    close(&mut desk);
    desk.key(Key::Escape);
    assert!(!desk.says("Changes are not saved"), "Esc stays");
    close(&mut desk);
    assert!(closes(&answer(&mut desk, "Go on without saving")));
}

#[test]
fn closing_without_changes_asks_nothing() {
    let mut desk = Desk::demo("demo-shape");
    let commands = close(&mut desk);
    assert!(commands.contains(&ViewportCommand::Close), "{commands:?}");
    assert!(!desk.says("Changes are not saved"));
}

#[test]
fn save_first_saves_and_then_closes() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().join("demo-hip.ron");
    save(&clients::demo("demo-hip"), &path).expect("saved");
    let mut desk = Desk::opened(clients::demo("demo-hip"), path.clone());
    desk.type_in("Mass", "70.5");
    close(&mut desk);
    let commands = answer(&mut desk, "Save first");
    assert!(commands.contains(&ViewportCommand::Close), "{commands:?}");
    let Ok(Opened::Current(client)) = open(&path) else { panic!("saved file") };
    assert_eq!(client.visits[0].mass_kg, 70.5);
}

#[test]
fn save_first_that_fails_stays_open_and_says_why() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().join("gone").join("demo-hip.ron");
    let mut desk = Desk::opened(clients::demo("demo-hip"), path);
    desk.type_in("Mass", "70.5");
    close(&mut desk);
    let commands = answer(&mut desk, "Save first");
    assert!(!commands.contains(&ViewportCommand::Close), "{commands:?}");
    assert!(desk.says("demo-hip.ron") && desk.says("not saved"), "{:?}", desk.texts());
    assert_eq!(desk.shown("Mass"), "70.5 kg");
}

#[test]
fn saved_under_a_typed_path_it_opens_again_as_it_was() {
    let folder = tempfile::tempdir().expect("a folder");
    let mut desk = Desk::demo("demo-shape");
    desk.type_in("Shank", "39,83");
    desk.type_in("Seen trunk", "58");
    let client = desk.doc().client.clone();
    type_path(&mut desk, Ask::SaveAs, &folder.path().join("our client"));
    let path = folder.path().join("our client.ron");
    assert!(desk.says("Saved in") && desk.says("· saved"), "{:?}", desk.texts());
    assert!(path.is_file(), "the ending was put behind it");
    let mut again = Desk::demo("demo-roomy");
    type_path(&mut again, Ask::Open, &path);
    assert_eq!(again.doc().client, client);
    assert_eq!(again.shown("Shank"), "39.83 cm");
    // from now on Ctrl+S writes there
    again.type_in("Mass", "63");
    again.command(Modifiers::NONE, Key::S);
    assert!(again.says("· saved"));
    let Ok(Opened::Current(saved)) = open(&path) else { panic!("saved file") };
    assert_eq!(saved.visits[0].mass_kg, 63.0);
}

#[test]
fn another_file_is_not_written_over_unasked() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().join("there.ron");
    fs::write(&path, "something else").expect("written");
    let mut desk = Desk::demo("demo-shape");
    type_path(&mut desk, Ask::SaveAs, &path);
    assert!(desk.says("The file is there already"));
    answer(&mut desk, "Cancel");
    assert_eq!(fs::read_to_string(&path).expect("there"), "something else");
    type_path(&mut desk, Ask::SaveAs, &path);
    answer(&mut desk, "Write over it");
    assert!(matches!(open(&path), Ok(Opened::Current(c)) if c == desk.doc().client));
}

#[test]
fn a_sheet_is_written_where_its_path_says() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().join("sheet.png");
    let mut desk = Desk::demo("demo-shape");
    type_path(&mut desk, Ask::Sheet, &path);
    assert!(desk.says("Sheet written to"), "{:?}", desk.texts());
    let picture = image_size(&fs::read(&path).expect("written"));
    assert!(picture.0 >= 1600, "{picture:?}");
}

/// Width and height from a PNG's header.
fn image_size(png: &[u8]) -> (u32, u32) {
    let info = png::Decoder::new(std::io::Cursor::new(png)).read_info().expect("a PNG").info().clone();
    (info.width, info.height)
}

#[test]
fn no_question_is_answered_behind_its_back() {
    let mut desk = Desk::demo("demo-shape");
    desk.type_in("Mass", "64");
    close(&mut desk);
    desk.command(Modifiers::NONE, Key::Z);
    assert_eq!(desk.shown("Mass"), "64.0 kg", "keys wait while a question is asked");
    answer(&mut desk, "Stay here");
    desk.command(Modifiers::NONE, Key::Z);
    assert_eq!(desk.shown("Mass"), "62.0 kg");
}
