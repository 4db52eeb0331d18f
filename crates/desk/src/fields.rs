//! The number field: typing, arrow keys and dragging over one bounded entry.
//!
//! An empty entry shows what stands in for it (estimated or assumed), in a dashed frame and with
//! "≈" before it, so that it never looks measured. What is typed may use comma or point and its
//! unit. What is not understood or out of range leaves the value as it was and says why under the
//! field.

use std::cell::RefCell;

use egui::{DragValue, Response, Stroke, Ui, vec2};
use plumbfold_core::bounds::Bounds;
use plumbfold_scene::{Role, Theme, format};

use crate::{
    action::{Action, Edit, GestureId, Step, ViewChange},
    entry::Entry,
    painter::color,
    state::State,
};

/// What was typed into a field.
#[derive(Clone, Debug, PartialEq)]
enum Typed {
    Nothing,
    Empty,
    Value(f64),
    Wrong(String),
}

/// Reads what was typed against its bounds: comma or point, the unit or none.
fn read(text: &str, shown: &str, b: &Bounds, may_be_empty: bool) -> Typed {
    let text = text.trim();
    if text == shown {
        return Typed::Nothing;
    }
    if text.is_empty() {
        return if may_be_empty { Typed::Empty } else { Typed::Wrong(format!("{} is needed", b.name)) };
    }
    let plain: String = text
        .trim_start_matches('≈')
        .chars()
        .filter(|c| !c.is_whitespace())
        .map(|c| match c {
            ',' => '.',
            '−' => '-',
            other => other,
        })
        .collect();
    let unit: String = b.unit.suffix().chars().filter(|c| !c.is_whitespace()).collect();
    let number = plain.strip_suffix(unit.as_str()).unwrap_or(&plain);
    match number.parse::<f64>() {
        Ok(v) if b.holds(v) => Typed::Value(v),
        Ok(v) if v.is_finite() => Typed::Wrong(format!("{} is outside {}", format::value(v, b.unit), b.allowed())),
        _ => Typed::Wrong(format!("“{text}” is not a number")),
    }
}

/// Decimals shown, from the step.
fn decimals(step: f64) -> usize {
    if step < 0.1 {
        2
    } else if step < 1.0 {
        1
    } else {
        0
    }
}

/// How a value stands in its field, never shorter than it was typed (up to four decimals).
fn shown_value(v: f64, b: &Bounds) -> String {
    let least = decimals(b.step);
    let needed = (least..4).find(|&d| (v * 10f64.powi(d as i32)).fract().abs() < 1e-6).unwrap_or(4);
    format!("{}{}", format::number(v, needed), b.unit.suffix())
}

/// A field in a row of its own: name, field, and what stands beside it.
pub struct NumberRow<'a> {
    /// Which number.
    pub entry: Entry,
    /// Name as shown and as spoken.
    pub name: &'a str,
    /// What stands in where it is empty, in the entry's unit.
    pub stand_in: Option<f64>,
    /// Text for an empty field that nothing stands in for.
    pub empty: &'a str,
    /// Width of the field.
    pub width: f32,
}

/// Shows a field alone; `spoken` names it for screen readers.
pub fn number(
    ui: &mut Ui,
    state: &State,
    theme: Theme,
    row: &NumberRow<'_>,
    spoken: &str,
    out: &mut Vec<Action>,
) -> Response {
    let b = row.entry.bounds(&state.doc);
    let value = row.entry.get(&state.doc);
    let stands_in = value.is_none();
    let start = value.or(row.stand_in).unwrap_or(b.default);
    let text = match (value, row.stand_in) {
        (Some(v), _) => shown_value(v, b),
        (None, Some(v)) => format!("≈ {}{}", format::number(v, decimals(b.step)), b.unit.suffix()),
        (None, None) => row.empty.to_owned(),
    };
    let typed = RefCell::new(Typed::Nothing);
    let mut v = start;
    let response = ui
        .scope(|ui| {
            if stands_in {
                let ink = color(theme, Role::InkSoft);
                let w = &mut ui.visuals_mut().widgets;
                w.inactive.fg_stroke.color = ink;
                w.inactive.bg_stroke = Stroke::NONE;
                w.inactive.weak_bg_fill = color(theme, Role::Panel);
            }
            ui.spacing_mut().interact_size = vec2(row.width, 22.0);
            let drag = DragValue::new(&mut v)
                .speed(b.step * 0.25)
                .range(b.min..=b.max)
                .update_while_editing(false)
                .clamp_existing_to_range(false)
                .custom_formatter(|_, _| text.clone())
                .custom_parser(|s| {
                    let read = read(s, &text, b, row.entry.may_be_empty());
                    if read != Typed::Nothing {
                        *typed.borrow_mut() = read;
                    }
                    None
                });
            ui.add_sized(vec2(row.width, 22.0), drag)
        })
        .inner;
    if stands_in && !response.has_focus() {
        dashed_frame(ui, response.rect, theme);
    }
    let error = state.view.field_errors.get(&row.entry);
    if error.is_some() {
        ui.painter().rect_stroke(
            response.rect,
            4.0,
            Stroke::new(1.5, color(theme, Role::Pain)),
            egui::StrokeKind::Inside,
        );
    }
    match typed.into_inner() {
        Typed::Nothing => {
            let step = v - start;
            if step != 0.0 {
                let next = nudged(start, v, b, ui, &response);
                let gesture = gesture(ui, &response);
                out.push(Action::Edit(Edit::Number(row.entry, Some(next)), gesture));
                clear_error(state, row.entry, out);
            }
        }
        Typed::Empty => {
            out.push(Action::Edit(Edit::Number(row.entry, None), Step::Whole));
            clear_error(state, row.entry, out);
        }
        Typed::Value(v) => {
            out.push(Action::Edit(Edit::Number(row.entry, Some(v)), Step::Whole));
            clear_error(state, row.entry, out);
        }
        Typed::Wrong(why) => out.push(Action::View(ViewChange::FieldError(row.entry, Some(why)))),
    }
    let response = response.on_hover_text(format!("{}. {}", b.help, b.allowed()));
    ui.ctx().accesskit_node_builder(response.id, |node| node.set_label(spoken));
    response
}

/// An arrow key moves by a whole step, a drag by what was dragged, in whole steps.
fn nudged(start: f64, v: f64, b: &Bounds, ui: &Ui, response: &Response) -> f64 {
    let step = if response.dragged() {
        b.step
    } else if ui.input(|i| i.key_down(egui::Key::ArrowUp) || i.key_down(egui::Key::ArrowDown)) {
        return (((start + b.step * (v - start).signum()) / b.step).round() * b.step).clamp(b.min, b.max);
    } else {
        return v.clamp(b.min, b.max);
    };
    ((v / step).round() * step).clamp(b.min, b.max)
}

fn clear_error(state: &State, entry: Entry, out: &mut Vec<Action>) {
    if state.view.field_errors.contains_key(&entry) {
        out.push(Action::View(ViewChange::FieldError(entry, None)));
    }
}

/// The gesture a response belongs to: one press of the pointer.
#[must_use]
pub fn gesture(ui: &Ui, response: &Response) -> Step {
    if response.dragged() || response.drag_stopped() {
        let pressed = ui.input(|i| i.pointer.press_start_time()).unwrap_or(0.0);
        Step::Gesture(GestureId(pressed.to_bits() ^ response.id.value()))
    } else {
        Step::Whole
    }
}

/// A row: name left, field right; an error under it.
pub fn row(
    ui: &mut Ui,
    state: &State,
    theme: Theme,
    row: &NumberRow<'_>,
    out: &mut Vec<Action>,
    after: impl FnOnce(&mut Ui),
) {
    ui.horizontal(|ui| {
        name(ui, row.name);
        number(ui, state, theme, row, row.name, out);
        after(ui);
    });
    error_under(ui, state, theme, row.entry);
}

/// What was wrong with an entry, under its field.
pub fn error_under(ui: &mut Ui, state: &State, theme: Theme, entry: Entry) {
    if let Some(why) = state.view.field_errors.get(&entry) {
        ui.label(egui::RichText::new(why).small().color(color(theme, Role::Pain)));
    }
}

/// Width of the names at the left of fields.
pub const NAME_WIDTH: f32 = 98.0;

/// A name at the left of a field.
pub fn name(ui: &mut Ui, text: &str) -> Response {
    left(ui, NAME_WIDTH, |ui| ui.add(egui::Label::new(text).truncate()))
}

/// A cell of a fixed width with its content at the left.
pub fn left(ui: &mut Ui, width: f32, content: impl FnOnce(&mut Ui) -> Response) -> Response {
    let layout = egui::Layout::left_to_right(egui::Align::Center);
    ui.allocate_ui_with_layout(vec2(width, 22.0), layout, |ui| {
        ui.set_min_width(width);
        content(ui)
    })
    .inner
}

/// A dashed frame: what stands inside is not measured.
pub fn dashed_frame(ui: &Ui, rect: egui::Rect, theme: Theme) {
    let r = rect.shrink(0.5);
    let points = [r.left_top(), r.right_top(), r.right_bottom(), r.left_bottom(), r.left_top()];
    let stroke = Stroke::new(1.0, color(theme, Role::Outline));
    ui.painter().extend(egui::Shape::dashed_line(&points, stroke, 3.0, 3.0));
}

#[cfg(test)]
mod tests {
    use plumbfold_core::bounds::{Field, bounds};

    use super::*;

    #[test]
    fn typing_is_read_as_a_person_means_it() {
        let b = bounds(Field::Shank);
        let read = |t| read(t, "≈ 41.2 cm", b, true);
        assert_eq!(read("39,8"), Typed::Value(39.8));
        assert_eq!(read(" 39.8 cm "), Typed::Value(39.8));
        assert_eq!(read("41.2"), Typed::Value(41.2));
        assert_eq!(read("≈ 41.2 cm"), Typed::Nothing);
        assert_eq!(read(""), Typed::Empty);
        assert!(matches!(read("90"), Typed::Wrong(w) if w.contains("20 to 65 cm")));
        assert!(matches!(read("nan"), Typed::Wrong(_)));
        assert!(matches!(read("1e400"), Typed::Wrong(_)));
        assert!(matches!(read("long"), Typed::Wrong(_)));
        assert!(matches!(super::read("", "168 cm", bounds(Field::Stature), false), Typed::Wrong(_)));
    }

    #[test]
    fn a_value_is_shown_as_precisely_as_it_was_typed() {
        let b = bounds(Field::Shank);
        assert_eq!(shown_value(39.8, b), "39.8 cm");
        assert_eq!(shown_value(39.83, b), "39.83 cm");
        assert_eq!(shown_value(40.0, b), "40.0 cm");
        assert_eq!(shown_value(-2.5, bounds(Field::KneeToWall)), "−2.5 cm");
    }
}
