//! The desk as a plain function of egui: state in, actions out, effects to the shell. eframe is a
//! thin shell around it, so tests can run the whole of it.

use std::sync::mpsc::{Receiver, Sender, channel};

use egui::{CentralPanel, Context, Frame, Margin, Panel, ScrollArea, Ui};
use plumbfold_core::{Angle, Step};
use plumbfold_records::Client;
use plumbfold_scene::Role;

use crate::{
    action::{Action, Arrived, Effect, ViewChange},
    apply::apply,
    command::Command,
    computed::Computed,
    outside,
    painter::color,
    panels,
    state::{Dialog, State},
    theme,
};

/// The desk with what it has computed and its line to the outside.
pub struct App {
    /// Everything the desk holds.
    pub state: State,
    computed: Option<Computed>,
    answers: Receiver<Arrived>,
    line: Sender<Arrived>,
    styled: Option<plumbfold_scene::theme::Palette>,
    closing: bool,
}

impl App {
    /// A client on the desk; `path` where it came from a file of the user's.
    #[must_use]
    pub fn new(ctx: &Context, client: Client, path: Option<std::path::PathBuf>) -> Self {
        theme::install_fonts(ctx);
        let (line, answers) = channel();
        Self { state: State::new(client, path), computed: None, answers, line, styled: None, closing: false }
    }

    /// One frame.
    pub fn ui(&mut self, ui: &mut Ui) {
        let ctx = ui.ctx().clone();
        self.style(&ctx);
        let mut actions: Vec<Action> = self.answers.try_iter().map(Action::Arrived).collect();
        actions.extend(asked_by_keys(&ctx, &self.state));
        actions.extend(asked_by_window(&ctx, self.closing));
        self.recompute(ctx.input(|i| i.pointer.any_down()));
        if self.state.view.playing {
            let seconds = ctx.input(|i| f64::from(i.stable_dt)).min(0.1);
            actions.push(Action::View(ViewChange::PlayOn(seconds)));
            ctx.request_repaint();
        }
        self.lay_out(ui, &mut actions);
        panels::dialogs::show(&ctx, &self.state, &mut actions);
        let acted = !actions.is_empty();
        for action in actions {
            for effect in apply(&mut self.state, action) {
                self.carry_out(&ctx, effect);
            }
        }
        if acted {
            ctx.request_repaint();
        }
    }

    fn style(&mut self, ctx: &Context) {
        let palette = self.state.view.palette;
        if self.styled != Some(palette) {
            theme::install_style(ctx, theme::of(palette));
            self.styled = Some(palette);
        }
    }

    /// Computes anew where the document changed: during a drag only what moves, the rest at its end.
    fn recompute(&mut self, dragging: bool) {
        let now = self.computed.as_ref();
        let holds = now.is_some_and(|c| c.holds_for(&self.state.doc));
        if holds && (dragging || !now.is_some_and(Computed::waits)) {
            return;
        }
        let old = now.and_then(Computed::results).filter(|_| dragging);
        self.computed = match old {
            Some(old) => Computed::during_drag(&self.state.doc, old),
            None => Computed::new(&self.state.doc),
        };
    }

    fn lay_out(&self, ui: &mut Ui, out: &mut Vec<Action>) {
        let theme = theme::of(self.state.view.palette);
        let state = &self.state;
        let results = self.computed.as_ref().and_then(Computed::results);
        let panel = |m: i8| Frame::new().fill(color(theme, Role::Panel)).inner_margin(Margin::symmetric(m, 6));
        if state.view.client_view
            && let Some(r) = results
        {
            CentralPanel::default().frame(Frame::new().fill(color(theme, Role::Paper))).show(ui, |ui| {
                panels::client::show(ui, state, r, theme, out);
            });
            return;
        }
        Panel::top("bar").frame(panel(12)).resizable(false).show(ui, |ui| panels::top::show(ui, state, theme, out));
        Panel::left("measured").frame(panel(12)).resizable(false).exact_size(300.0).show(ui, |ui| {
            ScrollArea::vertical().auto_shrink(false).show(ui, |ui| {
                panels::measured::show(ui, &panels::measured::Measured { state, results, theme }, out);
            });
        });
        let Some(results) = results else {
            let why = self.computed.as_ref().and_then(|c| c.outcome.as_ref().err().map(ToString::to_string));
            CentralPanel::default().frame(panel(20)).show(ui, |ui| {
                ui.label(why.unwrap_or_else(|| "Nothing to compute.".to_owned()));
            });
            return;
        };
        let tried = state.view.trying.as_ref().and_then(|changes| results.tried(changes));
        let (shown, now) = match &tried {
            Some(study) => (study, Step::at(&study.case, Angle::from_deg(state.view.depth_deg))),
            None => (&results.study, results.at(state.view.depth_deg)),
        };
        Panel::right("meaning").frame(panel(12)).resizable(false).exact_size(296.0).show(ui, |ui| {
            ScrollArea::vertical().auto_shrink(false).show(ui, |ui| {
                let m = panels::meaning::Meaning { state, results, shown, now: &now, theme };
                panels::meaning::show(ui, &m, out);
            });
        });
        let paper = Frame::new().fill(color(theme, Role::Paper)).inner_margin(Margin::symmetric(10, 6));
        Panel::bottom("plots").frame(paper).resizable(false).show(ui, |ui| {
            panels::plots::show(ui, &panels::plots::Plots { state, results, shown, now: &now, theme }, out);
        });
        CentralPanel::default().frame(paper).show(ui, |ui| {
            panels::figure::show(ui, &panels::figure::Desk { state, results, shown, now: &now, theme }, out);
        });
    }

    fn carry_out(&mut self, ctx: &Context, effect: Effect) {
        if effect == Effect::Close {
            self.closing = true;
            ctx.send_viewport_cmd(egui::ViewportCommand::Close);
            return;
        }
        let sheet = || {
            let results = self.computed.as_ref().and_then(Computed::results)?;
            Some(outside::Sheet { png: crate::sheets::png_of(&self.state.doc, results, self.state.view.depth_deg) })
        };
        outside::carry_out(ctx, &self.line, effect, sheet);
    }
}

/// Commands asked for by keys; none while a question waits.
fn asked_by_keys(ctx: &Context, state: &State) -> Vec<Action> {
    if state.dialog.is_some() {
        return Vec::new();
    }
    let mut out = Vec::new();
    // the longer chord first, so that Ctrl+Shift+Z is not taken for Ctrl+Z
    let mut commands = Command::ALL;
    commands.sort_by_key(|c| !c.about().2.modifiers.shift);
    for command in commands {
        if ctx.input_mut(|i| i.consume_shortcut(&command.about().2)) {
            out.push(Action::Run(command));
        }
    }
    let escape = ctx.input(|i| i.key_pressed(egui::Key::Escape));
    if escape && state.view.client_view {
        out.push(Action::Run(Command::ClientView));
    } else if escape && state.view.straighten.is_some() {
        out.push(Action::View(ViewChange::Straighten(None)));
    } else if escape && state.view.trying.is_some() {
        out.push(Action::View(ViewChange::Try(None)));
    } else if escape && state.view.matching {
        out.push(Action::Run(Command::MatchSeen));
    }
    out
}

/// Files dropped on the window, and the window asked to close.
fn asked_by_window(ctx: &Context, closing: bool) -> Vec<Action> {
    let mut out: Vec<Action> =
        ctx.input(|i| i.raw.dropped_files.iter().map(|f| Action::Dropped(f.path().to_path_buf())).collect());
    if ctx.input(|i| i.viewport().close_requested()) && !closing {
        // close only after the guard agreed
        ctx.send_viewport_cmd(egui::ViewportCommand::CancelClose);
        out.push(Action::CloseAsked);
    }
    out
}

impl eframe::App for App {
    fn ui(&mut self, ui: &mut Ui, _frame: &mut eframe::Frame) {
        Self::ui(self, ui);
    }
}

impl App {
    /// Whether a question waits; for tests.
    #[must_use]
    pub const fn asks(&self) -> Option<&Dialog> {
        self.state.dialog.as_ref()
    }
}
