//! The whole desk without a display, worked and read as a person does: by role and name.

use std::path::PathBuf;

use egui::{Key, Modifiers, MouseWheelSource, MouseWheelUnit, Pos2, TouchPhase, Vec2, accesskit::Role};
use egui_kittest::{Harness, Node, kittest::NodeT as _, kittest::Queryable as _};
use plumbfold::{
    action::{Action, Effect, ViewChange},
    app::App,
    apply::apply,
    document::Document,
    theme,
};
use plumbfold_records::Client;
use plumbfold_scene::theme::Palette;

use crate::{clients, soft::Soft};

/// The smallest screen that everything must fit on, points.
pub const SMALL: Vec2 = Vec2::new(1280.0, 800.0);
/// A full HD screen, points.
pub const FULL_HD: Vec2 = Vec2::new(1920.0, 1080.0);

/// The desk under test.
pub struct Desk {
    /// The harness, for what is not covered here.
    pub harness: Harness<'static, App>,
}

impl Desk {
    /// A demo client on a screen of 1280 × 800.
    #[must_use]
    pub fn demo(code: &str) -> Self {
        Self::of(clients::demo(code), SMALL)
    }

    /// A client on a screen of a size.
    #[must_use]
    pub fn of(client: Client, size: Vec2) -> Self {
        Self::new(client, None, size)
    }

    /// A client that lies in this file.
    #[must_use]
    pub fn opened(client: Client, path: PathBuf) -> Self {
        Self::new(client, Some(path), SMALL)
    }

    fn new(client: Client, path: Option<PathBuf>, size: Vec2) -> Self {
        let harness = Harness::builder()
            .with_size(size)
            .with_theme(egui::Theme::Light)
            .with_max_steps(12)
            .with_render_cursor(false)
            .renderer(Soft::default())
            .with_context_setup(theme::install_fonts)
            .build_eframe(|cc| App::new(&cc.egui_ctx, client, path));
        let mut desk = Self { harness };
        desk.run();
        desk
    }

    /// Frames until nothing asks for another.
    #[track_caller]
    pub fn run(&mut self) {
        self.harness.run();
    }

    /// The desk itself.
    #[must_use]
    pub fn app(&self) -> &App {
        self.harness.state()
    }

    /// What happens when something comes from outside the window; the effects are what the shell would be asked for.
    pub fn send(&mut self, action: Action) -> Vec<Effect> {
        let effects = apply(&mut self.harness.state_mut().state, action);
        self.run();
        effects
    }

    /// The document on the desk.
    #[must_use]
    pub fn doc(&self) -> &Document {
        &self.app().state.doc
    }

    /// Shows a depth, degrees of thigh angle.
    pub fn depth(&mut self, deg: f64) {
        self.send(Action::View(ViewChange::Depth(deg)));
    }

    /// Turns to a palette.
    pub fn palette(&mut self, palette: Palette) {
        self.send(Action::View(ViewChange::Palette(palette)));
    }

    /// Presses a key.
    #[track_caller]
    pub fn key(&mut self, key: Key) {
        self.harness.key_press(key);
        self.run();
    }

    /// Presses a key with Ctrl or ⌘, and what else is named.
    #[track_caller]
    pub fn command(&mut self, also: Modifiers, key: Key) {
        self.harness.key_press_modifiers(Modifiers::COMMAND | also, key);
        self.run();
    }

    /// Clicks what has this role and name, scrolled into sight first.
    #[track_caller]
    pub fn click(&mut self, role: Role, name: &str) {
        self.bring(role, name);
        self.harness.get_by_role_and_label(role, name).click();
        self.run();
    }

    /// Scrolls something into sight where it is not.
    #[track_caller]
    pub fn bring(&mut self, role: Role, name: &str) {
        let window = self.harness.ctx.content_rect();
        let node = self.harness.get_by_role_and_label(role, name);
        if !window.shrink(12.0).contains_rect(node.rect()) {
            node.scroll_to_me();
            self.run();
        }
    }

    /// Clicks a button.
    #[track_caller]
    pub fn button(&mut self, name: &str) {
        self.click(Role::Button, name);
    }

    /// A number field.
    #[track_caller]
    #[must_use]
    pub fn field<'a>(&'a self, name: &'a str) -> Node<'a> {
        self.harness.get_by_role_and_label(Role::SpinButton, name)
    }

    /// What a number field shows.
    #[track_caller]
    #[must_use]
    pub fn shown(&self, name: &str) -> String {
        self.field(name).value().unwrap_or_default()
    }

    /// Clicks a number field, types over what is selected there, and presses Enter.
    #[track_caller]
    pub fn type_in(&mut self, name: &str, text: &str) {
        self.bring(Role::SpinButton, name);
        self.field(name).click();
        self.run();
        self.replace_text(name, text);
        self.key(Key::Enter);
    }

    /// Types over everything that stands in the field that has the focus.
    #[track_caller]
    pub fn replace_text(&mut self, name: &str, text: &str) {
        self.command(Modifiers::NONE, Key::A);
        if text.is_empty() {
            self.key(Key::Delete);
        } else {
            self.field(name).type_text(text);
            self.run();
        }
    }

    /// Something to grab on the figure.
    #[track_caller]
    #[must_use]
    pub fn grip<'a>(&'a self, name: &'a str) -> Node<'a> {
        self.harness.get_by_role_and_label(Role::Slider, name)
    }

    /// The value of something to grab, in its unit.
    #[track_caller]
    #[must_use]
    pub fn grip_value(&self, name: &str) -> f64 {
        self.grip(name).accesskit_node().numeric_value().unwrap_or(f64::NAN)
    }

    /// Drags from one place to another in so many moves; one gesture.
    #[track_caller]
    pub fn drag(&mut self, from: Pos2, by: Vec2, moves: usize) {
        self.harness.hover_at(from);
        self.run();
        self.harness.drag_at(from);
        self.harness.run_steps(2);
        for k in 1..=moves {
            self.harness.hover_at(from + by * (k as f32 / moves as f32));
            self.harness.run_steps(2);
        }
        self.harness.drop_at(from + by);
        self.run();
    }

    /// Drags a grip from its middle.
    #[track_caller]
    pub fn drag_grip(&mut self, name: &str, by: Vec2) {
        let from = self.grip(name).rect().center();
        self.drag(from, by, 4);
    }

    /// Turns the wheel over a place, points downward.
    #[track_caller]
    pub fn wheel(&mut self, at: Pos2, down: f32) {
        self.harness.hover_at(at);
        self.run();
        self.harness.event(egui::Event::MouseWheel {
            unit: MouseWheelUnit::Point,
            delta: Vec2::new(0.0, -down),
            phase: TouchPhase::Move,
            modifiers: Modifiers::NONE,
            source: MouseWheelSource::Wheel,
        });
        self.run();
        self.harness.remove_cursor();
        self.run();
    }

    /// The figure's picture as a node: the largest picture there is.
    ///
    /// # Panics
    /// Where there is none.
    #[track_caller]
    #[must_use]
    pub fn figure(&self) -> Node<'_> {
        let pictures = self.harness.get_all_by_role(Role::Image);
        pictures.max_by(|a, b| a.rect().area().total_cmp(&b.rect().area())).expect("a picture")
    }

    /// All text on the screen, in order: labels, and what fields and buttons show.
    #[must_use]
    pub fn texts(&self) -> Vec<String> {
        self.harness
            .root()
            .children_recursive()
            .filter(|n| n.accesskit_node().role() == Role::Label)
            .filter_map(|n| n.value())
            .collect()
    }

    /// Whether a label holds these words.
    #[must_use]
    pub fn says(&self, words: &str) -> bool {
        self.texts().iter().any(|t| t.contains(words))
    }

    /// The value that stands beside a name on the right side.
    ///
    /// # Panics
    /// Where the name is not there.
    #[track_caller]
    #[must_use]
    pub fn reading(&self, name: &str) -> String {
        let texts = self.texts();
        let at = texts.iter().rposition(|t| t == name);
        at.and_then(|at| texts.get(at + 1)).cloned().unwrap_or_else(|| panic!("{name} is not among {texts:?}"))
    }

    /// A reading as a number, whatever its unit.
    ///
    /// # Panics
    /// Where it is none.
    #[track_caller]
    #[must_use]
    pub fn number(&self, name: &str) -> f64 {
        let text = self.reading(name);
        let digits: String = text
            .chars()
            .skip_while(|c| !c.is_ascii_digit() && *c != '−')
            .take_while(|c| c.is_ascii_digit() || matches!(c, '.' | '−'))
            .map(|c| if c == '−' { '-' } else { c })
            .collect();
        digits.parse().unwrap_or_else(|_| panic!("{name}: {text}"))
    }

    /// Commands given to the window in the last frame.
    #[must_use]
    pub fn window_commands(&self) -> Vec<egui::ViewportCommand> {
        self.harness.output().viewport_output.values().flat_map(|v| v.commands.clone()).collect()
    }
}
