//! Pictures to look at, one idea each; `UPDATE_SNAPSHOTS=1 cargo test --workspace --test ui pictures` writes them.

use egui::{Key, Rect, Vec2, pos2, vec2};
use egui_kittest::Harness;
use plumbfold::{
    action::{Action, Edit, Step, ViewChange},
    apply::apply,
    command::Command,
    computed::Computed,
    painter::color,
    panels::figure,
    state::State,
    theme,
};
use plumbfold_core::Angle;
use plumbfold_scene::{Look, Role, Theme, figure::Facing, theme::Palette};
use plumbfold_tests::{
    clients,
    desk::{Desk, SMALL},
    soft::Soft,
};

/// Size of a picture of the figure alone.
const FIGURE: Vec2 = vec2(620.0, 460.0);

/// The figure alone after some actions.
fn figure_picture(name: &str, code: &str, palette: Palette, actions: Vec<Action>) {
    let mut state = State::new(clients::demo(code), None);
    state.view.palette = palette;
    for action in actions {
        let _ = apply(&mut state, action);
    }
    let computed = Computed::new(&state.doc).expect("a task");
    let theme = Theme::new(palette);
    let mut harness = Harness::builder()
        .with_size(FIGURE)
        .with_render_cursor(false)
        .renderer(Soft::default())
        .with_context_setup(move |ctx| {
            theme::install_fonts(ctx);
            theme::install_style(ctx, theme);
        })
        .build_ui(move |ui| {
            let results = computed.results().expect("computable");
            let now = results.at(state.view.depth_deg);
            let desk = figure::Desk { state: &state, results, shown: &results.study, now: &now, theme };
            let area = Rect::from_min_size(pos2(0.0, 0.0), FIGURE);
            ui.painter().rect_filled(area, 0.0, color(theme, Role::Paper));
            let facing = if state.view.facing_left { Facing::Left } else { Facing::Right };
            figure::draw(ui, &desk, area, &Look::desk(12.0, facing), &mut Vec::new());
        });
    harness.run();
    harness.snapshot(name);
}

fn depth(deg: f64) -> Action {
    Action::View(ViewChange::Depth(deg))
}

#[test]
fn figure_light() {
    figure_picture("figure-light", "demo-shape", Palette::Light, vec![depth(80.0)]);
}

#[test]
fn figure_dark_with_a_loaded_bar_facing_left() {
    figure_picture("figure-dark-bar", "demo-loaded", Palette::Dark, vec![depth(85.0), Action::Run(Command::Face)]);
}

#[test]
fn figure_in_high_contrast_with_a_pain_mark() {
    figure_picture("figure-high-contrast", "demo-precautions", Palette::HighContrast, vec![depth(55.0)]);
}

#[test]
fn trunk_held_upright_tips_back() {
    let held = Action::View(ViewChange::Straighten(Some(Angle::from_deg(15.0))));
    figure_picture("figure-trunk-held", "demo-shape", Palette::Light, vec![depth(85.0), held]);
}

#[test]
fn matching_a_squat_seen() {
    let seen = Action::Edit(Edit::Seen([70.0, 26.0, 40.0]), Step::Whole);
    figure_picture("figure-matching", "demo-hip", Palette::Light, vec![Action::Run(Command::MatchSeen), seen]);
}

#[test]
fn the_clients_view() {
    let mut desk = Desk::of(clients::demo("demo-older"), vec2(960.0, 540.0));
    desk.key(Key::F5);
    desk.harness.snapshot("client-view");
}

#[test]
fn the_whole_desk_light() {
    let mut desk = Desk::demo("demo-shape");
    desk.harness.snapshot("desk-light");
}

#[test]
fn the_whole_desk_dark() {
    let mut desk = Desk::of(clients::demo("demo-precautions"), SMALL);
    desk.palette(Palette::Dark);
    desk.harness.snapshot("desk-dark");
}
