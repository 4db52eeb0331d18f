//! The map of where it balances; its dot moves depth and shank together.

use egui::{Sense, Ui, Vec2, vec2};
use plumbfold_scene::{
    Size,
    map::{map_of, map_scene},
};

use crate::{
    action::Action,
    drag::{map_to, nudge},
    fields::gesture,
    painter::{paint, to_page, to_rect},
    panels::{figure::halo, plots::Plots},
};

/// Shows the map in a size.
pub fn show(ui: &mut Ui, p: &Plots<'_>, size: Vec2, out: &mut Vec<Action>) {
    let (area, back) = ui.allocate_exact_size(size, Sense::click_and_drag());
    let tried = p.state.view.trying.is_some().then(|| map_of(p.shown));
    let map = tried.as_ref().unwrap_or(&p.results.map);
    let (scene, view) = map_scene(p.shown, map, &p.now.balance, Size::new(size.x, size.y), 11.0);
    back.widget_info(|| egui::WidgetInfo::labeled(egui::Role::Image, true, &scene.alt));
    paint(&ui.painter_at(area), area.min, &scene, p.theme);
    let mut moved = back.clone();
    for grip in &scene.grips {
        let rect = to_rect(area.min, grip.hit.bounds());
        let id = ui.scope_id().with("map dot");
        let response = ui.interact(rect, id, Sense::click_and_drag());
        response.widget_info(|| egui::WidgetInfo::slider(true, grip.value, &grip.name));
        halo(ui, p.theme, area, grip, &response);
        if response.has_focus() {
            let pressed = |key| ui.input(|i| i.key_pressed(key));
            let filter = egui::EventFilter { horizontal_arrows: true, ..egui::EventFilter::default() };
            ui.memory_mut(|m| m.set_focus_lock_filter(response.id, filter));
            let steps = f64::from(i8::from(pressed(egui::Key::ArrowRight)) - i8::from(pressed(egui::Key::ArrowLeft)));
            if steps != 0.0 {
                out.extend(nudge(p.state, p.results, p.now, grip.handle, steps));
            }
        }
        if response.dragged() {
            moved = response;
        }
    }
    if (moved.dragged() || moved.clicked())
        && let Some(pointer) = moved.interact_pointer_pos()
        && area.expand2(vec2(40.0, 40.0)).contains(pointer)
    {
        let (thigh, shank) = view.to_angles(to_page(area.min, pointer));
        out.extend(map_to(thigh, shank, gesture(ui, &moved)));
    }
}
