//! The bar on top: who is on the desk, whether it is saved, and the commands.

use egui::{Align, Layout, RichText, Ui};
use plumbfold_scene::{Role, Theme, Weight};

use crate::{
    action::{Action, Edit, Step, ViewChange},
    command::Command,
    painter::{color, font},
    state::{Message, State},
};

/// Shows the bar.
pub fn show(ui: &mut Ui, state: &State, theme: Theme, out: &mut Vec<Action>) {
    ui.horizontal(|ui| {
        ui.label(RichText::new("Plumbfold").font(font(16.0, Weight::SemiBold)));
        ui.add_space(8.0);
        who(ui, state, theme, out);
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            for command in [
                Command::Keys,
                Command::Palette,
                Command::SheetPicture,
                Command::ClientView,
                Command::SaveAs,
                Command::Save,
                Command::Open,
                Command::NewClient,
                Command::Redo,
                Command::Undo,
            ] {
                let enabled = match command {
                    Command::Undo => state.history.can_undo(),
                    Command::Redo => state.history.can_redo(),
                    _ => true,
                };
                let button = ui.add_enabled(enabled, egui::Button::new(command.label()));
                if button.on_hover_text(command.hint(ui.ctx())).clicked() {
                    out.push(Action::Run(command));
                }
            }
        });
    });
    if let Some(message) = &state.message {
        ui.horizontal(|ui| {
            let (text, role) = match message {
                Message::Good(t) => (t, Role::Ankle),
                Message::Bad(t) => (t, Role::Pain),
            };
            if ui.button("Read").on_hover_text("Put the message away").clicked() {
                out.push(Action::View(ViewChange::MessageRead));
            }
            ui.add(egui::Label::new(RichText::new(text).color(color(theme, role))).wrap());
        });
    }
}

fn who(ui: &mut Ui, state: &State, theme: Theme, out: &mut Vec<Action>) {
    let d = &state.doc;
    let id = ui.scope_id().with("code");
    let mut code: String = ui.data(|data| data.get_temp(id)).unwrap_or_else(|| d.client.code.as_str().to_owned());
    let edit = ui.add(
        egui::TextEdit::singleline(&mut code)
            .desired_width(156.0)
            .font(font(14.0, Weight::SemiBold))
            .char_limit(plumbfold_records::CODE_MAX_CHARS),
    );
    ui.ctx().accesskit_node_builder(edit.id, |node| node.set_label("Code"));
    let edit = edit.on_hover_text("The client's code, never a name");
    if edit.has_focus() {
        ui.data_mut(|data| data.insert_temp(id, code.clone()));
    } else {
        ui.data_mut(|data| data.remove::<String>(id));
    }
    if edit.lost_focus() && code != d.client.code.as_str() {
        out.push(Action::Edit(Edit::Code(code), Step::Whole));
    }
    let visits = d.client.visits.len();
    let saved = if state.unsaved() { "not saved" } else { "saved" };
    if visits > 1 {
        let shown = format!("{} · visit {} of {visits}", d.visit().date, d.visit + 1);
        let inner = egui::ComboBox::from_id_salt("visit").selected_text(&shown).show_ui(ui, |ui| {
            for (at, v) in d.client.visits.iter().enumerate() {
                if ui.selectable_label(at == d.visit, format!("{} · visit {}", v.date, at + 1)).clicked() {
                    out.push(Action::Edit(Edit::GoToVisit(at), Step::Whole));
                }
            }
        });
        inner.response.widget_info(|| egui::WidgetInfo::labeled(egui::Role::ComboBox, true, "Visit"));
        ui.label(RichText::new(saved).color(color(theme, Role::InkSoft)));
    } else {
        let text = format!("{} · visit 1 · {saved}", d.visit().date);
        ui.label(RichText::new(text).color(color(theme, Role::InkSoft)));
    }
}
