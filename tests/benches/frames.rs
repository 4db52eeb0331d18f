//! What a frame costs while the figure is dragged at 1440 × 900: our ui and egui's tessellation, each alone, for every
//! demo client; by the hip, which moves the depth alone, and by the knee, which changes the task, so that everything is
//! computed anew in each frame. No window, no drawing. The pointer does the same on every run, and each frame counts with the quickest of
//! three runs, so that what else the machine does matters little.
//!
//! ```text
//! cargo bench --workspace --bench frames
//! ```

use std::time::{Duration, Instant};

use egui::{Context, Event, Modifiers, PointerButton, Pos2, RawInput, Rect, Vec2, vec2};
use plumbfold::{app::App, theme};
use plumbfold_tests::{clients, desk::Desk};

/// Frames measured for each client.
const FRAMES: usize = 300;
/// Runs, of which each frame's quickest counts.
const RUNS: usize = 3;
/// Frames before the measuring starts: fonts, first layout, the press.
const WARM_UP: usize = 20;
/// The screen, points.
const SCREEN: Vec2 = vec2(1440.0, 900.0);
/// Aim of ui and tessellation together, p95, ms.
const AIM_MS: f64 = 6.0;

fn main() {
    for (grip, way) in [("Depth, hip", vec2(0.0, -90.0)), ("Shank, knee", vec2(-30.0, 0.0))] {
        println!("\ndragging “{grip}” at {} × {}, {FRAMES} frames for each client, ms", SCREEN.x, SCREEN.y);
        println!(
            "{:<18} {:>7} {:>7}   {:>12} {:>7}   {:>8} {:>7}",
            "", "ui p50", "p95", "tessell. p50", "p95", "both p50", "p95"
        );
        let mut worst: f64 = 0.0;
        for code in clients::DEMO {
            let frames = quickest(code, grip, way);
            let parts = [|f: &Frame| f.ui, |f: &Frame| f.tessellation, |f: &Frame| f.ui + f.tessellation];
            let [ui, tessellation, both] = parts.map(|part| sorted(&frames, part));
            worst = worst.max(at(&both, 0.95));
            println!(
                "{code:<18} {:>7.2} {:>7.2}   {:>12.2} {:>7.2}   {:>8.2} {:>7.2}",
                at(&ui, 0.5),
                at(&ui, 0.95),
                at(&tessellation, 0.5),
                at(&tessellation, 0.95),
                at(&both, 0.5),
                at(&both, 0.95)
            );
        }
        println!("worst p95 of both {worst:.2} ms, aim {AIM_MS} ms");
    }
}

/// What one frame cost.
struct Frame {
    ui: Duration,
    tessellation: Duration,
}

/// Each frame's quickest run.
fn quickest(code: &str, grip: &str, way: Vec2) -> Vec<Frame> {
    // where the grip is, from the accessibility tree of a desk of the same size
    let from = Desk::of(clients::demo(code), SCREEN).grip(grip).rect().center();
    let mut best = dragged(code, from, way);
    for _ in 1..RUNS {
        for (b, f) in best.iter_mut().zip(dragged(code, from, way)) {
            *b = Frame { ui: b.ui.min(f.ui), tessellation: b.tessellation.min(f.tessellation) };
        }
    }
    best
}

/// A desk on which a grip is dragged to and fro.
fn dragged(code: &str, from: Pos2, way: Vec2) -> Vec<Frame> {
    let ctx = Context::default();
    theme::install_fonts(&ctx);
    let mut app = App::new(&ctx, clients::demo(code), None);
    let mut frames = Vec::with_capacity(FRAMES);
    for k in 0..WARM_UP + FRAMES {
        let input = RawInput {
            screen_rect: Some(Rect::from_min_size(Pos2::ZERO, SCREEN)),
            time: Some(k as f64 / 60.0),
            events: pointer(k, from, way),
            ..RawInput::default()
        };
        let start = Instant::now();
        let mut output = ctx.run_ui(input, |ui| app.ui(ui));
        let ui = start.elapsed();
        output.textures_delta.clear();
        let start = Instant::now();
        let primitives = ctx.tessellate(output.shapes, output.pixels_per_point);
        let tessellation = start.elapsed();
        assert!(primitives.len() > 5, "a whole desk");
        if k >= WARM_UP {
            frames.push(Frame { ui, tessellation });
        }
    }
    assert!(app.state.view.dragged || app.state.history.can_undo(), "something was dragged");
    frames
}

/// What the pointer does before a frame: it comes, presses, and then moves to and fro.
fn pointer(frame: usize, from: Pos2, way: Vec2) -> Vec<Event> {
    match frame {
        0..8 => vec![Event::PointerMoved(from)],
        8 => {
            let (button, modifiers) = (PointerButton::Primary, Modifiers::NONE);
            vec![Event::PointerButton { pos: from, button, pressed: true, modifiers }]
        }
        _ => vec![Event::PointerMoved(from + way * 0.5 * (1.0 - ((frame - 8) as f32 * 0.05).cos()))],
    }
}

fn sorted(frames: &[Frame], part: impl Fn(&Frame) -> Duration) -> Vec<f64> {
    let mut ms: Vec<f64> = frames.iter().map(|f| part(f).as_secs_f64() * 1e3).collect();
    ms.sort_by(f64::total_cmp);
    ms
}

fn at(sorted: &[f64], share: f64) -> f64 {
    sorted[((sorted.len() - 1) as f64 * share).round() as usize]
}
