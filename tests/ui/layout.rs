//! No text lies on other text or is cut: all demo clients, on 1280 × 800 and on 1920 × 1080, in light and dark, through
//! the descent.

use egui::{Rect, Vec2, accesskit::Role, pos2, vec2};
use egui_kittest::kittest::{NodeT as _, Queryable as _};
use plumbfold::{
    action::{Action, Edit, Section, Step, ViewChange},
    apply::apply,
    command::Command,
    computed::{Computed, Results},
    document::Document,
    panels::figure,
    sheets,
    state::State,
    theme,
};
use plumbfold_core::Angle;
use plumbfold_records::Client;
use plumbfold_scene::{Look, Theme, figure::Facing, out_of_page, overlaps, theme::Palette};
use plumbfold_tests::{
    clients,
    desk::{Desk, FULL_HD, SMALL},
    drawn,
};

/// Step of the sweeps through the descent, degrees.
const STEP_DEG: f64 = 7.0;

/// What is said where something is wrong.
fn fault(what: &str, texts: &[drawn::Text]) -> Option<String> {
    let on: Vec<String> = drawn::overlaps(texts)
        .iter()
        .map(|(a, b)| format!("“{}” {:?} on “{}” {:?}", a.text, a.ink(), b.text, b.ink()))
        .collect();
    (!on.is_empty()).then(|| format!("{what}: {}", on.join("; ")))
}

// ---------------------------------------------------------------------------------------------------------------------
// the figure alone, through the whole descent in all its states

/// A way of showing a figure.
struct Shown {
    name: &'static str,
    actions: fn(&State) -> Vec<Action>,
}

const WAYS: [Shown; 6] = [
    Shown { name: "with outline", actions: |_| Vec::new() },
    Shown { name: "with usual ranges behind", actions: |_| vec![Action::Run(Command::Outline)] },
    Shown {
        name: "with nothing behind",
        actions: |_| vec![Action::Run(Command::Outline), Action::Run(Command::Outline)],
    },
    Shown { name: "facing left", actions: |_| vec![Action::Run(Command::Face)] },
    Shown {
        name: "trunk held upright",
        actions: |_| vec![Action::View(ViewChange::Straighten(Some(Angle::from_deg(10.0))))],
    },
    Shown {
        name: "matching",
        actions: |s| {
            let deg = s.view.depth_deg;
            let seen = Edit::Seen([deg, (deg * 0.3).min(35.0), (deg * 0.6).min(60.0)]);
            vec![Action::Run(Command::MatchSeen), Action::Edit(seen, Step::Whole)]
        },
    },
];

/// The area that the desk gives to the figure.
fn area(size: Vec2) -> Vec2 {
    Desk::of(clients::demo("demo-shape"), size).figure().rect().size()
}

/// What is wrong with the figure as the desk draws it, in an area.
fn figure_faults(ctx: &egui::Context, state: &State, results: &Results, look: &Look, size: Vec2) -> Vec<String> {
    let now = results.at(state.view.depth_deg);
    let desk = figure::Desk { state, results, shown: &results.study, now: &now, theme: Theme::light() };
    let rect = Rect::from_min_size(pos2(0.0, 0.0), size);
    let input = egui::RawInput { screen_rect: Some(rect), ..egui::RawInput::default() };
    let mut output = ctx.run_ui(input, |ui| figure::draw(ui, &desk, rect, look, &mut Vec::new()));
    output.textures_delta.clear();
    let mut wrong: Vec<String> = fault("overlap", &drawn::texts(&output.shapes)).into_iter().collect();
    wrong.extend(drawn::beyond(&output.shapes, rect).into_iter().map(|b| format!("beyond the area: {b}")));
    wrong
}

/// Sweeps one client through the descent in all ways.
fn sweep(ctx: &egui::Context, client: &Client, size: Vec2, wrong: &mut Vec<String>) {
    for task in 0..client.visits[client.latest_visit()].tasks.len() {
        let mut start = State::new(client.clone(), None);
        let _ = apply(&mut start, Action::Edit(Edit::GoToTask(task), Step::Whole));
        let Some(results) = results(&start.doc) else { panic!("{} cannot be computed", client.code) };
        for way in &WAYS {
            let mut deg = 0.0;
            while deg <= results.deepest_deg {
                let mut state = start.clone();
                state.view.depth_deg = deg;
                for action in (way.actions)(&state) {
                    let _ = apply(&mut state, action);
                }
                let facing = if state.view.facing_left { Facing::Left } else { Facing::Right };
                let look = Look::desk((size.y / 42.0).clamp(11.5, 16.0), facing);
                let own = results_of(&state, &results);
                for w in figure_faults(ctx, &state, own.as_ref().unwrap_or(&results), &look, size) {
                    wrong.push(format!("{} task {task} {} at {deg}°, {size:?}: {w}", client.code, way.name));
                }
                deg += STEP_DEG;
            }
        }
    }
}

fn results(doc: &Document) -> Option<Results> {
    Computed::new(doc)?.results().cloned()
}

/// Results of a changed document, where it was changed.
fn results_of(state: &State, known: &Results) -> Option<Results> {
    (state.doc.visit().task(state.doc.task).as_ref() != Some(known.study.case.task()))
        .then(|| results(&state.doc))
        .flatten()
}

fn context() -> egui::Context {
    let ctx = egui::Context::default();
    theme::install_fonts(&ctx);
    theme::install_style(&ctx, Theme::light());
    let mut output = ctx.run_ui(egui::RawInput::default(), |_| {});
    output.textures_delta.clear();
    ctx
}

fn figures_on(size: Vec2) {
    let (ctx, area) = (context(), area(size));
    let mut wrong = Vec::new();
    for code in clients::DEMO {
        sweep(&ctx, &clients::demo(code), area, &mut wrong);
    }
    assert!(wrong.is_empty(), "{} faults:\n{}", wrong.len(), wrong.join("\n"));
}

#[test]
fn no_text_of_the_figure_overlaps_or_is_cut_on_a_small_screen() {
    figures_on(SMALL);
}

#[test]
fn no_text_of_the_figure_overlaps_or_is_cut_at_full_hd() {
    figures_on(FULL_HD);
}

#[test]
fn no_text_of_the_clients_view_overlaps_or_is_cut() {
    let ctx = context();
    let mut wrong = Vec::new();
    for code in clients::DEMO {
        let mut state = State::new(clients::demo(code), None);
        state.view.client_view = true;
        let results = results(&state.doc).expect("computable");
        for size in [SMALL, FULL_HD] {
            let text = (size.y / 1080.0 * 36.0).clamp(20.0, 60.0);
            for facing in [Facing::Right, Facing::Left] {
                let mut deg = 0.0;
                while deg <= results.deepest_deg {
                    state.view.depth_deg = deg;
                    let found = figure_faults(&ctx, &state, &results, &Look::client(text, facing), size);
                    wrong.extend(found.into_iter().map(|w| format!("{code} {facing:?} at {deg}°, {size:?}: {w}")));
                    deg += STEP_DEG;
                }
            }
        }
    }
    assert!(wrong.is_empty(), "{} faults:\n{}", wrong.len(), wrong.join("\n"));
}

#[test]
fn no_text_of_a_sheet_overlaps_or_is_cut() {
    let mut wrong = Vec::new();
    for code in clients::DEMO {
        let client = clients::demo(code);
        for visit in 0..client.visits.len() {
            for task in 0..client.visits[visit].tasks.len() {
                let doc = Document { client: client.clone(), visit, task };
                let results = results(&doc).expect("computable");
                let mut deg = 0.0;
                while deg <= results.deepest_deg {
                    let scene = sheets::scene(&doc, &results, deg);
                    let what = format!("{code} visit {visit} task {task} at {deg}°");
                    wrong.extend(overlaps(&scene).iter().map(|(a, b)| format!("{what}: “{}” on “{}”", a.text, b.text)));
                    wrong.extend(out_of_page(&scene).iter().map(|i| format!("{what}: beyond the page: {i:?}")));
                    deg += STEP_DEG;
                }
            }
        }
    }
    assert!(wrong.is_empty(), "{} faults:\n{}", wrong.len(), wrong.join("\n"));
}

// ---------------------------------------------------------------------------------------------------------------------
// the whole window

/// What is wrong with the text of the whole window as it stands.
fn window_faults(desk: &Desk) -> Vec<String> {
    let texts = drawn::texts(&desk.harness.output().shapes);
    let window = desk.harness.ctx.content_rect();
    let middle = desk.figure().rect().x_range();
    let mut wrong: Vec<String> = fault("overlap", &texts).into_iter().collect();
    for t in texts.iter().filter(|t| t.is_seen()) {
        let (ink, clip) = (t.ink(), t.clip.intersect(window).expand(0.5));
        // the sides scroll: there a line may be half out of sight above or below, never at its left or right
        let scrolls = !middle.contains(ink.center().x);
        let cut = if scrolls {
            !clip.x_range().contains(ink.left()) || !clip.x_range().contains(ink.right())
        } else {
            !clip.contains_rect(ink)
        };
        if cut {
            wrong.push(format!("cut: “{}” {ink:?} by {clip:?}", t.text));
        }
        if t.shortened {
            wrong.push(format!("shortened: “{}”", t.text));
        }
    }
    wrong.extend(outgrown(desk, &texts));
    wrong
}

/// Text that reaches beyond the button or field it stands in.
fn outgrown(desk: &Desk, texts: &[drawn::Text]) -> Vec<String> {
    let code = desk.harness.get_by_role_and_label(Role::TextInput, "Code");
    let (bar, bar_low) = (panel_of(&code).map(|p| p.accesskit_node().id()), code.rect().bottom() + 6.0);
    // what the sides have scrolled behind the bar is not seen
    let is_seen =
        |n: &egui_kittest::Node<'_>| panel_of(n).map(|p| p.accesskit_node().id()) == bar || n.rect().top() >= bar_low;
    let boxes: Vec<Rect> = [Role::Button, Role::SpinButton, Role::ComboBox]
        .into_iter()
        .flat_map(|role| desk.harness.query_all_by_role(role))
        .filter(|n| !n.accesskit_node().is_hidden())
        .filter(is_seen)
        .map(|n| n.rect())
        .collect();
    texts
        .iter()
        .filter(|t| t.is_seen())
        .filter_map(|t| {
            let ink = t.ink();
            let inside = boxes.iter().find(|b| b.contains(ink.center()))?;
            let fits = inside.left() - 0.5 <= ink.left() && ink.right() <= inside.right() + 0.5;
            (!fits).then(|| format!("outgrown: “{}” {ink:?} in {inside:?}", t.text))
        })
        .collect()
}

/// The panel in which something stands.
fn panel_of<'a>(node: &egui_kittest::Node<'a>) -> Option<egui_kittest::Node<'a>> {
    std::iter::successors(node.parent(), |n| n.parent()).find(|n| n.accesskit_node().role() == Role::Pane)
}

/// Everything the desk can unfold on its sides.
fn unfold(desk: &mut Desk) {
    for change in [ViewChange::Fold(Section::Precautions), ViewChange::MoreLengths, ViewChange::MoreChoices] {
        desk.send(Action::View(change));
    }
}

fn windows_on(size: Vec2) {
    let mut wrong = Vec::new();
    for code in clients::DEMO {
        let mut look = |desk: &Desk, what: &str| {
            wrong.extend(window_faults(desk).into_iter().map(|w| format!("{code} {size:?} {what}: {w}")));
        };
        let mut desk = Desk::of(clients::demo(code), size);
        let hip = desk.grip("Depth, hip");
        let deepest = hip.accesskit_node().max_numeric_value().expect("a range");
        for palette in [Palette::Light, Palette::Dark] {
            desk.palette(palette);
            look(&desk, &format!("{palette:?}"));
        }
        for share in [0.0, 0.3, 0.6, 1.0] {
            desk.depth(deepest * share);
            look(&desk, &format!("at {:.0}°", deepest * share));
        }
        desk.send(Action::Run(Command::Plots));
        look(&desk, "with the plots folded");
        // the sides scroll: on a screen tall enough for all of them, everything on them is looked at
        unfold(&mut desk);
        desk.harness.set_size(vec2(size.x, 3600.0));
        desk.run();
        look(&desk, "unfolded");
        desk.type_in("Shank", "");
        desk.type_in("Stature", "90");
        look(&desk, "with a length estimated and a value refused");
    }
    assert!(wrong.is_empty(), "{} faults:\n{}", wrong.len(), wrong.join("\n"));
}

#[test]
fn no_text_in_the_window_overlaps_or_is_cut_on_a_small_screen() {
    windows_on(SMALL);
}

#[test]
fn no_text_in_the_window_overlaps_or_is_cut_at_full_hd() {
    windows_on(FULL_HD);
}

#[test]
fn an_overlap_and_a_cut_would_be_found() {
    let ctx = context();
    let rect = Rect::from_min_size(pos2(0.0, 0.0), vec2(200.0, 100.0));
    let input = egui::RawInput { screen_rect: Some(rect), ..egui::RawInput::default() };
    let mut output = ctx.run_ui(input, |ui| {
        let ink = plumbfold::painter::color(Theme::light(), plumbfold_scene::Role::Ink);
        for at in [pos2(10.0, 20.0), pos2(30.0, 24.0), pos2(180.0, 60.0)] {
            let font = plumbfold::painter::font(13.0, plumbfold_scene::Weight::Regular);
            ui.painter().text(at, egui::Align2::LEFT_TOP, "thigh level", font, ink);
        }
    });
    output.textures_delta.clear();
    let texts = drawn::texts(&output.shapes);
    assert_eq!(texts.len(), 3);
    assert_eq!(drawn::overlaps(&texts).len(), 1);
    assert_eq!(drawn::beyond(&output.shapes, rect).len(), 1);
}
