//! Measures frames while the figure is dragged through the descent, for developers
//! (`--frame-times`). Prints p50 and p95 of our part (ui) and of the whole frame.

use std::{
    sync::{Arc, Mutex, PoisonError},
    time::Instant,
};

use crate::{
    action::{Action, ViewChange},
    app::App,
    apply::apply,
};

/// Frames measured before the window closes.
const FRAMES: usize = 600;
/// Frames before the measuring starts.
const WARM_UP: usize = 30;

/// Times of one run, milliseconds.
#[derive(Clone, Debug, Default)]
pub struct Times {
    /// The desk's own ui.
    ui_ms: Vec<f64>,
    /// Ui, tessellation and painting as eframe counts them (without waiting for the screen).
    whole_ms: Vec<f64>,
}

impl Times {
    /// p50 and p95 as two lines.
    #[must_use]
    pub fn text(&self) -> String {
        let line = |name: &str, values: &[f64]| {
            let at = |share: f64| percentile(values, share);
            format!("{name}: p50 {:.2} ms, p95 {:.2} ms over {} frames", at(0.5), at(0.95), values.len())
        };
        format!("{}\n{}", line("ui", &self.ui_ms), line("ui, tessellation and painting", &self.whole_ms))
    }
}

fn percentile(values: &[f64], share: f64) -> f64 {
    let mut sorted = values.to_vec();
    sorted.sort_by(f64::total_cmp);
    let at = (share * sorted.len().saturating_sub(1) as f64).round() as usize;
    sorted.get(at).copied().unwrap_or(f64::NAN)
}

/// Where the times are read after the window has closed.
#[derive(Clone, Debug)]
pub struct Report(Arc<Mutex<Times>>);

impl Report {
    /// The times as text.
    #[must_use]
    pub fn text(&self) -> String {
        self.0.lock().unwrap_or_else(PoisonError::into_inner).text()
    }
}

/// What measures.
#[derive(Debug, Default)]
pub struct Timed {
    times: Arc<Mutex<Times>>,
}

impl Timed {
    /// Nothing measured yet.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// Where the times are read later.
    #[must_use]
    pub fn report(&self) -> Report {
        Report(Arc::clone(&self.times))
    }

    /// Around a desk.
    #[must_use]
    pub fn around(self, app: App) -> TimedApp {
        TimedApp { app, times: self.times, frame: 0 }
    }
}

/// A desk that drags itself and closes at the end.
pub struct TimedApp {
    app: App,
    times: Arc<Mutex<Times>>,
    frame: usize,
}

impl eframe::App for TimedApp {
    fn ui(&mut self, ui: &mut egui::Ui, frame: &mut eframe::Frame) {
        let deg = 45.0 + 45.0 * (self.frame as f64 * 0.05).sin();
        let effects = apply(&mut self.app.state, Action::View(ViewChange::Depth(deg)));
        debug_assert!(effects.is_empty(), "a depth asks for nothing outside");
        let start = Instant::now();
        self.app.ui(ui);
        let ms = start.elapsed().as_secs_f64() * 1e3;
        if self.frame > WARM_UP {
            let mut times = self.times.lock().unwrap_or_else(PoisonError::into_inner);
            times.ui_ms.push(ms);
            times.whole_ms.extend(frame.info().cpu_usage.map(|s| f64::from(s) * 1e3));
        }
        self.frame += 1;
        if self.frame > FRAMES + WARM_UP {
            ui.ctx().send_viewport_cmd(egui::ViewportCommand::Close);
        }
        ui.ctx().request_repaint();
    }
}
