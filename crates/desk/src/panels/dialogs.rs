//! Questions over the desk, and the list of keys.

use egui::{Id, Modal, RichText, Ui};
use plumbfold_scene::Weight;

use crate::{
    action::{Action, Answer, Ask, ViewChange},
    command::Command,
    painter::font,
    state::{Dialog, State},
};

/// Shows the question that waits, if any.
pub fn show(ctx: &egui::Context, state: &State, out: &mut Vec<Action>) {
    if let Some(dialog) = &state.dialog {
        let shown = Modal::new(Id::unique("question")).show(ctx, |ui| {
            ui.set_width(420.0);
            match dialog {
                Dialog::Unsaved(_) => unsaved(ui, state, out),
                Dialog::Path { ask, typed } => path(ui, *ask, typed, out),
                Dialog::Exists { path, .. } => exists(ui, path, out),
            }
        });
        if shown.should_close() {
            out.push(Action::Answer(Answer::Stay));
        }
    } else if state.view.keys {
        let shown = Modal::new(Id::unique("keys")).show(ctx, |ui| keys(ui, out));
        if shown.should_close() {
            out.push(Action::Run(Command::Keys));
        }
    }
}

fn title(ui: &mut Ui, text: &str) {
    ui.label(RichText::new(text).font(font(15.0, Weight::SemiBold)));
    ui.add_space(4.0);
}

fn answers(ui: &mut Ui, list: &[(&str, Answer)], out: &mut Vec<Action>) {
    ui.add_space(8.0);
    ui.horizontal(|ui| {
        for (label, answer) in list {
            if ui.button(*label).clicked() {
                out.push(Action::Answer(answer.clone()));
            }
        }
    });
}

fn unsaved(ui: &mut Ui, state: &State, out: &mut Vec<Action>) {
    title(ui, "Changes are not saved");
    ui.label(format!("{} was changed since it was saved.", state.doc.client.code));
    answers(
        ui,
        &[("Save first", Answer::SaveFirst), ("Go on without saving", Answer::Discard), ("Stay here", Answer::Stay)],
        out,
    );
}

fn path(ui: &mut Ui, ask: Ask, typed: &str, out: &mut Vec<Action>) {
    let (head, action) = match ask {
        Ask::Open => ("Open a client file", "Open"),
        Ask::SaveAs => ("Save the client in a file", "Save"),
        Ask::Sheet => ("Write the sheet as a picture", "Write"),
    };
    title(ui, head);
    ui.label("No file was chosen. If no file dialog appeared, type the path here.");
    let mut text = typed.to_owned();
    let label = ui.label("Path");
    let edit = ui.add(egui::TextEdit::singleline(&mut text).desired_width(f32::INFINITY)).labelled_by(label.id);
    if edit.changed() {
        out.push(Action::View(ViewChange::Path(text)));
    }
    if edit.lost_focus() && ui.input(|i| i.key_pressed(egui::Key::Enter)) {
        out.push(Action::Answer(Answer::UsePath));
    }
    answers(ui, &[(action, Answer::UsePath), ("Cancel", Answer::Stay)], out);
}

fn exists(ui: &mut Ui, path: &std::path::Path, out: &mut Vec<Action>) {
    title(ui, "The file is there already");
    ui.label(format!("{} holds something. Writing puts the new file in its place.", path.display()));
    answers(ui, &[("Write over it", Answer::Overwrite), ("Cancel", Answer::Stay)], out);
}

fn keys(ui: &mut Ui, out: &mut Vec<Action>) {
    ui.set_width(520.0);
    title(ui, "Keys");
    egui::Grid::new("keys").num_columns(3).spacing([16.0, 4.0]).show(ui, |ui| {
        for command in Command::ALL {
            let (label, hint, key) = command.about();
            ui.label(label);
            ui.label(ui.ctx().format_shortcut(&key));
            ui.label(hint);
            ui.end_row();
        }
        for (what, key, hint) in [
            ("Figure", "arrow keys", "Move the handle that has the focus"),
            ("Rail", "wheel", "Deeper and higher"),
            ("Fields", "↑ ↓", "One step; drag sideways for more"),
        ] {
            ui.label(what);
            ui.label(key);
            ui.label(hint);
            ui.end_row();
        }
    });
    ui.add_space(8.0);
    if ui.button("Close").clicked() {
        out.push(Action::Run(Command::Keys));
    }
}
