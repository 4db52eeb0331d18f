//! The figure on the desk: paints the scene, turns drags, wheel and arrow keys on its grips into
//! actions.

use egui::{Event, EventFilter, Key, Rect, Response, Sense, Ui, pos2, vec2};
use plumbfold_core::{Angle, Balance, Posture, Step, Study};
use plumbfold_scene::{
    Grip, Handle, Hit, Role, Scene, Size, Theme,
    figure::{Facing, Look, Outline, Show, View, figure},
};

use crate::{
    action::{Action, Edit, Step as Undo, ViewChange},
    command::Command,
    computed::Results,
    drag::{Drag, depth_of_seat, drag, nudge, slope_to},
    entry::Entry,
    fields::gesture,
    painter::{color, paint, to_page, to_rect},
    state::{Behind, State},
};

/// What the figure needs.
pub struct Desk<'a> {
    /// The desk.
    pub state: &'a State,
    /// What was computed.
    pub results: &'a Results,
    /// The study drawn: the client's, or that of a change tried.
    pub shown: &'a Study,
    /// The posture of that study at the depth shown.
    pub now: &'a Step,
    /// Colours.
    pub theme: Theme,
}

/// Degrees of thigh angle for one point of the wheel.
const WHEEL: f64 = 0.12;
/// Shown until something on the figure was dragged.
const FIRST_USE: &str = "Drag the hip to squat, the knee to shift work, the shoulder to straighten the trunk.";
/// Shown from then on.
const LATER: &str = "Wheel and arrow keys move it too; F1 lists the keys.";
/// Shown while matching.
const MATCHING: &str = "Matching: drag hip, knee and shoulder onto the squat you saw. Nothing else changes.";

/// Shows the figure with its bar of buttons.
pub fn show(ui: &mut Ui, d: &Desk<'_>, out: &mut Vec<Action>) {
    buttons(ui, d, out);
    let area = ui.available_rect_before_wrap();
    if area.width() < 120.0 || area.height() < 120.0 {
        return;
    }
    let facing = if d.state.view.facing_left { Facing::Left } else { Facing::Right };
    let look = Look::desk((area.height() / 42.0).clamp(11.5, 16.0), facing);
    draw(ui, d, area, &look, out);
}

/// Shows the figure in an area with a look, with its grips at work. Also the client's view.
pub fn draw(ui: &mut Ui, d: &Desk<'_>, area: Rect, look: &Look, out: &mut Vec<Action>) {
    let (scene, view) = scene(d, Size::new(area.width(), area.height()), look);
    let back = ui.allocate_rect(area, Sense::hover());
    back.widget_info(|| egui::WidgetInfo::labeled(egui::Role::Image, true, &scene.alt));
    paint(&ui.painter_at(area), area.min, &scene, d.theme);
    grips(ui, d, area, &scene, &view, out);
    wheel(ui, d, &back, out);
}

/// The scene of what is on the desk.
fn scene(d: &Desk<'_>, size: Size, look: &Look) -> (Scene, View) {
    let v = &d.state.view;
    let seen = v.matching.then(|| d.results.seen()).flatten();
    let now: Balance = seen.unwrap_or(d.now.balance);
    let thigh = now.posture().map_or(d.now.thigh, |p| p.thigh);
    let held =
        v.straighten.and_then(|lean| d.results.straightened(now.posture()?, lean)).filter(|_| v.trying.is_none());
    let outline = outline(d, now.posture());
    let seen_pain = d.results.study.case.task().seen.is_some();
    let pain = d.state.doc.task().seen.filter(|_| seen_pain).and_then(|s| s.pain_from_thigh_deg);
    let note = if v.matching {
        Some(MATCHING)
    } else if v.dragged {
        // one line in every state, so that the figure keeps its place
        Some(LATER)
    } else {
        Some(FIRST_USE)
    };
    let show = Show {
        study: d.shown,
        thigh,
        now: &now,
        straightened: held.as_ref().map(|h| &h.0),
        outline: outline.as_ref().map(|(case, posture, what)| Outline { case, posture, what }),
        pain_from: pain.map(Angle::from_deg),
        deepest: Angle::from_deg(d.results.deepest_deg).max(thigh),
        note: note.filter(|_| look.style == plumbfold_scene::figure::Style::Annotated),
    };
    figure(&show, size, look)
}

type Outlined<'a> = (&'a plumbfold_core::Case, Posture, &'static str);

/// What stands behind: the computed posture while matching, the present one while a change is tried,
/// else what was chosen. The client never sees another person's outline.
fn outline<'a>(d: &Desk<'a>, now: Option<&Posture>) -> Option<Outlined<'a>> {
    let v = &d.state.view;
    if v.client_view {
        return None;
    }
    if v.matching {
        return d.now.balance.posture().map(|p| (&d.shown.case, *p, "as computed at the depth set"));
    }
    let at = |case: &'a plumbfold_core::Case, what| {
        let balance = plumbfold_core::posture(case, now?.thigh);
        balance.held().map(|p| (case, *p, what))
    };
    if v.trying.is_some() {
        return at(&d.results.study.case, "as set up now");
    }
    match v.outline {
        Behind::Nothing => None,
        Behind::AverageLengths => at(&d.results.average.case, "average lengths for this stature, same ranges"),
        Behind::UsualRanges => at(&d.results.usual.case, "same lengths, usual ranges"),
    }
}

fn buttons(ui: &mut Ui, d: &Desk<'_>, out: &mut Vec<Action>) {
    ui.horizontal(|ui| {
        for (command, on) in [
            (Command::Play, d.state.view.playing),
            (Command::MatchSeen, d.state.view.matching),
            (Command::Outline, d.state.view.outline != Behind::Nothing),
            (Command::Face, d.state.view.facing_left),
        ] {
            let label = if command == Command::Play && on { "Stop" } else { command.label() };
            if ui.selectable_label(on, label).on_hover_text(command.hint(ui.ctx())).clicked() {
                out.push(Action::Run(command));
            }
        }
        pain_button(ui, d, out);
    });
}

/// Sets the pain mark at the depth shown; it belongs to a squat that was seen.
fn pain_button(ui: &mut Ui, d: &Desk<'_>, out: &mut Vec<Action>) {
    let seen = d.state.doc.task().seen.is_some();
    let hint = if seen {
        "Set the pain mark on the rail at this depth"
    } else {
        "Match or type the squat you saw first; the pain mark belongs to it"
    };
    let button = ui.add_enabled(seen, egui::Button::new("Pain starts here"));
    if button.on_hover_text(hint).on_disabled_hover_text(hint).clicked() {
        let deg = d.state.view.depth_deg.min(d.results.deepest_deg).round();
        out.push(Action::Edit(Edit::Number(Entry::PainFrom, Some(deg)), Undo::Whole));
    }
}

fn grips(ui: &mut Ui, d: &Desk<'_>, area: Rect, scene: &Scene, view: &View, out: &mut Vec<Action>) {
    for grip in &scene.grips {
        let rect = to_rect(area.min, grip.hit.bounds()).intersect(area);
        let id = ui.scope_id().with(("grip", grip.handle as u32));
        let response = ui.interact(rect, id, Sense::click_and_drag());
        response.widget_info(|| egui::WidgetInfo::slider(true, grip.value, &grip.name));
        ui.ctx().accesskit_node_builder(id, |node| {
            node.set_min_numeric_value(grip.range.0);
            node.set_max_numeric_value(grip.range.1);
            node.set_numeric_value_step(1.0);
            node.add_action(egui::accesskit::Action::Increment);
            node.add_action(egui::accesskit::Action::Decrement);
        });
        halo(ui, d.theme, area, grip, &response);
        if response.dragged() || response.drag_started() || response.clicked() {
            out.extend(dragged(ui, d, area, grip, view, &response));
        }
        keys(ui, d, grip, &response, out);
        let response = response.on_hover_cursor(egui::CursorIcon::Grab);
        if !response.dragged() {
            response.on_hover_text(&grip.name);
        }
    }
}

/// A ring around the grip that is held, hovered or has the focus.
pub(super) fn halo(ui: &Ui, theme: Theme, area: Rect, grip: &Grip, response: &Response) {
    if !(response.hovered() || response.dragged() || response.has_focus()) {
        return;
    }
    let width = if response.has_focus() { 2.0 } else { 1.2 };
    let stroke = egui::Stroke::new(width, color(theme, Role::Accent));
    match grip.hit {
        Hit::Circle { at, radius } => {
            ui.painter().circle_stroke(area.min + vec2(at.x, at.y), radius, stroke);
        }
        Hit::Rect(r) => {
            ui.painter().rect_stroke(to_rect(area.min, r), 4.0, stroke, egui::StrokeKind::Outside);
        }
    }
}

/// Where a drag began, kept while it lasts.
#[derive(Clone, Copy)]
struct Held {
    value: f64,
    y: f32,
    /// From the grip's middle to the pointer, so that nothing jumps when it is grabbed.
    offset: egui::Vec2,
}

fn dragged(ui: &Ui, d: &Desk<'_>, area: Rect, grip: &Grip, view: &View, response: &Response) -> Option<Action> {
    let pointer = response.interact_pointer_pos()?;
    let middle = to_rect(area.min, grip.hit.bounds()).center();
    let on_track = grip.track.is_some();
    // a drag is known as one only after some points of movement: it began at the press
    let pressed = ui.input(|i| i.pointer.press_origin()).unwrap_or(pointer);
    let offset = if on_track { egui::Vec2::ZERO } else { pressed - middle };
    let fresh = Held { value: grip.value, y: pressed.y, offset };
    let held = if response.drag_started() {
        ui.data_mut(|data| data.insert_temp(response.id, fresh));
        fresh
    } else {
        ui.data(|data| data.get_temp(response.id)).unwrap_or(fresh)
    };
    if !on_track && !response.dragged() {
        // a click on a joint only takes the focus
        return None;
    }
    let at = to_page(area.min, pointer - held.offset);
    if let (Handle::KneeHipSlider, Some((low, high))) = (grip.handle, grip.track) {
        let share = f64::from(((at.x - low.x) / (high.x - low.x)).clamp(0.0, 1.0));
        let value = grip.range.0 + share * (grip.range.1 - grip.range.0);
        return Some(slope_to(value, gesture(ui, response)));
    }
    let to = view.to_world(at);
    if grip.handle == Handle::Rail && !d.state.view.matching {
        return Some(Action::View(ViewChange::Depth(depth_of_seat(d.results, to.y))));
    }
    let risen_m = view.to_world(to_page(area.min, pos2(0.0, pointer.y))).y
        - view.to_world(to_page(area.min, pos2(0.0, held.y))).y;
    let step = Drag { handle: grip.handle, to, risen_m, from_value: held.value, undo: gesture(ui, response) };
    drag(d.state, d.results, d.now, &step)
}

/// Arrow keys on the grip that has the focus: up is up.
fn keys(ui: &Ui, d: &Desk<'_>, grip: &Grip, response: &Response, out: &mut Vec<Action>) {
    let increments = ui.input(|i| {
        i.num_accesskit_action_requests(response.id, egui::accesskit::Action::Increment) as f64
            - i.num_accesskit_action_requests(response.id, egui::accesskit::Action::Decrement) as f64
    });
    // the rail's value is a height, its steps are degrees downward
    let sign = if grip.handle == Handle::Rail { -1.0 } else { 1.0 };
    let mut steps = increments * sign;
    if response.has_focus() {
        let filter = EventFilter { horizontal_arrows: true, vertical_arrows: true, ..EventFilter::default() };
        ui.memory_mut(|m| m.set_focus_lock_filter(response.id, filter));
        let pressed = |key: Key| {
            ui.input(|i| {
                i.events.iter().filter(|e| matches!(e, Event::Key { key: k, pressed: true, .. } if *k == key)).count()
            }) as f64
        };
        let (up, down) = (pressed(Key::ArrowUp), pressed(Key::ArrowDown));
        let (left, right) = (pressed(Key::ArrowLeft), pressed(Key::ArrowRight));
        steps += match grip.handle {
            // deeper is downward
            Handle::Hip | Handle::Rail | Handle::MapDot | Handle::PainMark => down - up + right - left,
            // the trunk rises with up
            Handle::Shoulder => up - down + right - left,
            Handle::KneeHipSlider => left - right + up - down,
            Handle::Knee | Handle::Heel | Handle::Load => up - down + right - left,
        };
    }
    if steps != 0.0 {
        out.extend(nudge(d.state, d.results, d.now, grip.handle, steps));
    }
}

/// The wheel squats.
fn wheel(ui: &Ui, d: &Desk<'_>, back: &Response, out: &mut Vec<Action>) {
    if !back.contains_pointer() || d.state.view.matching {
        return;
    }
    let scrolled = ui.input(|i| i.smooth_scroll_delta().y);
    if scrolled != 0.0 {
        let deg = d.state.view.depth_deg.min(d.results.deepest_deg) - f64::from(scrolled) * WHEEL;
        out.push(Action::View(ViewChange::Depth(deg.clamp(0.0, d.results.deepest_deg))));
    }
}
