//! The view for the client: figure, rail, one sentence. Nothing else.

use egui::Ui;
use plumbfold_scene::{
    Theme,
    figure::{Facing, Look},
};

use crate::{
    action::Action,
    computed::Results,
    panels::figure::{Desk, draw},
    state::State,
};

/// Shows the view for the client.
pub fn show(ui: &mut Ui, state: &State, results: &Results, theme: Theme, out: &mut Vec<Action>) {
    let area = ui.available_rect_before_wrap();
    let facing = if state.view.facing_left { Facing::Left } else { Facing::Right };
    // 34 points at full HD, as legible on a smaller screen held as near
    let text = (area.height() / 1080.0 * 36.0).clamp(20.0, 60.0);
    let now = results.at(state.view.depth_deg);
    draw(ui, &Desk { state, results, shown: &results.study, now: &now, theme }, area, &Look::client(text, facing), out);
}
