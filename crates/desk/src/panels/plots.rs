//! The plots below, tied to the depth: a click or a drag in a plot moves the figure.

use egui::{Color32, RichText, Stroke, Ui, vec2};
use egui_plot::{Line, LineStyle, Plot, PlotPoint, PlotPoints, Polygon, Text, VLine};
use plumbfold_core::{Step, Study};
use plumbfold_scene::{Axis, BandKind, Chart, Role, Theme, Weight, chart, plots, text_width};

use crate::{
    action::{Action, ViewChange},
    command::Command,
    computed::Results,
    painter::{color, font},
    state::State,
};

/// Font size of the curves' names.
const NAME: f32 = 11.5;
/// Width of the labels at the left of a plot, at most.
const AXIS: f64 = 36.0;
/// Height of the plots.
pub const HEIGHT: f32 = 188.0;

/// What the plots need.
pub struct Plots<'a> {
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

/// Shows the plots, or the line that unfolds them.
pub fn show(ui: &mut Ui, p: &Plots<'_>, out: &mut Vec<Action>) {
    let open = p.state.view.plots;
    let label = if open { "▼ Plots" } else { "▶ Plots" };
    let head = ui.add(egui::Button::new(RichText::new(label).small()).frame(false));
    head.widget_info(|| egui::WidgetInfo::selected(egui::Role::Button, true, open, "Plots"));
    if head.clicked() {
        out.push(Action::Run(Command::Plots));
    }
    if !open {
        return;
    }
    let now = Some(p.now.balance.posture().map_or(p.now.thigh, |q| q.thigh));
    let mut charts = vec![plots::arms(p.shown, now), plots::angles(p.shown, now)];
    if !p.shown.case.figure_only() {
        charts.push(plots::demands(p.shown, now));
    }
    let gap = 10.0;
    let n = charts.len() as f32 + 1.0;
    let w = ((ui.available_width() - gap * (n - 1.0)) / n).floor() - 2.0;
    ui.horizontal_top(|ui| {
        ui.spacing_mut().item_spacing.x = gap;
        for c in &charts {
            ui.vertical(|ui| {
                ui.set_width(w);
                ui.label(RichText::new(&c.title).font(font(12.5, Weight::SemiBold)));
                one(ui, c, vec2(w, HEIGHT - 46.0), p.theme, out);
            });
        }
        ui.vertical(|ui| {
            ui.set_width(w);
            ui.label(RichText::new("Where it balances").font(font(12.5, Weight::SemiBold)));
            super::map::show(ui, p, vec2(w, HEIGHT - 46.0), out);
        });
    });
}

fn grid<'a>(axis: &Axis, most: usize) -> impl Fn(egui_plot::GridInput) -> Vec<egui_plot::GridMark> + use<'a> {
    let ticks = axis.ticks(most);
    let step = ticks.windows(2).map(|t| t[1].0 - t[0].0).next().unwrap_or(1.0);
    move |_| ticks.iter().map(|(value, _)| egui_plot::GridMark { value: *value, step_size: step }).collect()
}

/// Ticks and their labels as the sheet has them, in full strength at any distance.
fn ticks<'a>(hints: egui_plot::AxisHints<'a>, axis: &Axis, most: usize, theme: Theme) -> egui_plot::AxisHints<'a> {
    let ticks = axis.ticks(most);
    let text = move |mark: egui_plot::GridMark, _: &std::ops::RangeInclusive<f64>| {
        ticks.iter().find(|(v, _)| (v - mark.value).abs() < 1e-9).map_or_else(String::new, |(_, text)| text.clone())
    };
    hints
        .formatter(text)
        .label_spacing(2.0..=4.0)
        .tick_label_color(color(theme, Role::InkSoft))
        .tick_label_font(font(11.0, Weight::Regular))
}

fn one(ui: &mut Ui, c: &Chart, size: egui::Vec2, theme: Theme, out: &mut Vec<Action>) {
    let shown = Plot::new(c.title.clone())
        .width(size.x)
        .height(size.y)
        .default_x_bounds(c.x.from, c.x.to)
        .default_y_bounds(c.y.from, c.y.to)
        .allow_zoom(false)
        .allow_scroll(false)
        .allow_drag(false)
        .allow_boxed_zoom(false)
        .allow_double_click_reset(false)
        .set_margin_fraction(vec2(0.0, 0.0))
        .show_crosshair(false)
        .grid_spacing(2.0..=8.0)
        .label_formatter(|_| None)
        .x_grid_spacer(grid(&c.x, 6))
        .y_grid_spacer(grid(&c.y, 4))
        .custom_x_axes(vec![ticks(egui_plot::AxisHints::new_x(), &c.x, 6, theme)])
        .custom_y_axes(vec![ticks(egui_plot::AxisHints::new_y(), &c.y, 4, theme)])
        .grid_color(color(theme, Role::Grid))
        .sense(egui::Sense::click_and_drag())
        .show(ui, |plot| {
            plot.set_plot_bounds_x(c.x.from..=c.x.to);
            plot.set_plot_bounds_y(c.y.from..=c.y.to);
            bands(plot, c, theme);
            for s in &c.series {
                let points: PlotPoints<'_> = s.points.iter().map(|&(x, y)| [x, y]).collect();
                let style = match s.stroke {
                    chart::Stroke::Solid => LineStyle::Solid,
                    chart::Stroke::Dashed => LineStyle::dashed_loose(),
                };
                plot.line(Line::new(s.name.clone(), points).color(color(theme, s.role)).width(2.0).style(style));
            }
            names(plot, c, f64::from(size.x) - AXIS, theme);
            if let Some(x) = c.cursor {
                plot.vline(VLine::new("depth", x).color(color(theme, Role::Ink)).width(1.5));
            }
            plot.pointer_coordinate()
        });
    let response = shown.response;
    response.widget_info(|| {
        let mut info = egui::WidgetInfo::slider(true, c.cursor.unwrap_or(0.0), &c.title);
        info.current_text_value = Some(c.summary.clone());
        info
    });
    if (response.dragged() || response.clicked())
        && let Some(PlotPoint { x, .. }) = shown.inner
    {
        out.push(Action::View(ViewChange::Depth(x)));
    }
}

fn bands(plot: &mut egui_plot::PlotUi<'_>, c: &Chart, theme: Theme) {
    let (low, high) = (c.y.from, c.y.to);
    for b in &c.bands {
        let fill = match b.kind {
            BandKind::Drifting => Role::DriftingBg,
            BandKind::NeedsHold => Role::NeedsHold,
            BandKind::Beyond => Role::Panel,
        };
        let corners = PlotPoints::from(vec![[b.from, low], [b.to, low], [b.to, high], [b.from, high]]);
        plot.polygon(
            Polygon::new("", corners).fill_color(color(theme, fill)).stroke(Stroke::new(0.0, Color32::TRANSPARENT)),
        );
        if b.kind == BandKind::Drifting {
            // hatching at 45° on the screen: both axes span the same share
            let (w, h) = (c.x.to - c.x.from, high - low);
            let lean = w * 0.25;
            let mut x = b.from - lean;
            while x < b.to {
                let at = |x: f64, part: f64| [x + lean * part, low + h * part];
                let (from, to) = (((b.from - x) / lean).max(0.0), ((b.to - x) / lean).min(1.0));
                if to > from {
                    let line = PlotPoints::from(vec![at(x, from), at(x, to)]);
                    plot.line(Line::new("", line).color(color(theme, Role::Drifting)).width(1.0));
                }
                x += w * 0.025;
            }
        }
    }
}

/// Each curve's name above or below it, where it is farthest from every other curve and name.
fn names(plot: &mut egui_plot::PlotUi<'_>, c: &Chart, inner: f64, theme: Theme) {
    let (width, height) = (c.x.to - c.x.from, c.y.to - c.y.from);
    let curve_at = |s: &chart::Series, x: f64| {
        s.points.iter().min_by(|a, b| (a.0 - x).abs().total_cmp(&(b.0 - x).abs())).map(|p| p.1)
    };
    let mut taken: Vec<(f64, f64, f64)> = Vec::new();
    for s in &c.series {
        let half = (f64::from(text_width(&s.name, NAME, Weight::SemiBold)) / 2.0 + 4.0) / inner * width;
        let mut best: Option<(f64, (f64, f64))> = None;
        for share in [0.18, 0.28, 0.38, 0.48, 0.58, 0.68] {
            let x = c.x.from + share * width;
            if x - half < c.x.from || x + half > c.x.to {
                continue;
            }
            let Some(at) = curve_at(s, x) else { continue };
            for offset in [0.10, -0.10, 0.16, -0.16] {
                let y = at + offset * height;
                if y < c.y.from + 0.06 * height || y > c.y.to - 0.06 * height {
                    continue;
                }
                // the name covers some width: look along it
                let along = [-1.0, -0.5, 0.0, 0.5, 1.0].map(|d| x + d * half);
                let to_curves = c
                    .series
                    .iter()
                    .flat_map(|o| along.iter().filter_map(move |&x| curve_at(o, x)))
                    .map(|v| (v - y).abs() / height)
                    .fold(f64::INFINITY, f64::min);
                let meets = |t: &&(f64, f64, f64)| (t.0 - x).abs() < half + t.2;
                let to_names =
                    taken.iter().filter(meets).map(|t| (t.1 - y).abs() / height).fold(f64::INFINITY, f64::min);
                let off = if to_names < 0.14 { 1.0 } else { 0.0 };
                let free = to_curves.min(0.12) - 0.1 * offset.abs() - off;
                if best.is_none_or(|b| free > b.0 + 1e-9) {
                    best = Some((free, (x, y)));
                }
            }
        }
        let Some((_, (x, y))) = best else { continue };
        taken.push((x, y, half));
        let text = RichText::new(&s.name).font(font(NAME, Weight::SemiBold)).color(color(theme, s.role));
        plot.text(Text::new("", PlotPoint::new(x, y), text));
    }
}
