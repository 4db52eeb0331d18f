//! The plots below, tied to the depth: a click or a drag in a plot moves the figure.

use egui::{Color32, RichText, Stroke, Ui, vec2};
use egui_plot::{Line, LineStyle, Plot, PlotPoint, PlotPoints, Polygon, Text, VLine};
use plumbfold_core::{Step, Study};
use plumbfold_scene::{Axis, BandKind, Chart, Role, Theme, Weight, chart, plots};

use crate::{
    action::{Action, ViewChange},
    command::Command,
    computed::Results,
    painter::{color, font},
    state::State,
};

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

fn tick_labels<'a>(
    axis: &Axis,
    most: usize,
) -> impl Fn(egui_plot::GridMark, &std::ops::RangeInclusive<f64>) -> String + use<'a> {
    let ticks = axis.ticks(most);
    move |mark, _| {
        ticks.iter().find(|(v, _)| (v - mark.value).abs() < 1e-9).map_or_else(String::new, |(_, text)| text.clone())
    }
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
        .x_axis_formatter(tick_labels(&c.x, 6))
        .y_axis_formatter(tick_labels(&c.y, 4))
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
            names(plot, c, theme);
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

/// Each curve's name beside it, at the height where it ends nearest to no other.
fn names(plot: &mut egui_plot::PlotUi<'_>, c: &Chart, theme: Theme) {
    let span = c.y.to - c.y.from;
    let mut taken: Vec<(f64, f64)> = Vec::new();
    for s in &c.series {
        let spot = [0.30, 0.5, 0.65, 0.8, 0.2].into_iter().find_map(|f| {
            let &(x, y) = s.points.get((f * s.points.len() as f64) as usize)?;
            let y = y + span * 0.09;
            let free =
                taken.iter().all(|t| (t.0 - x).abs() > (c.x.to - c.x.from) * 0.24 || (t.1 - y).abs() > span * 0.13);
            (free && y < c.y.to - span * 0.04).then_some((x, y))
        });
        let Some((x, y)) = spot else { continue };
        taken.push((x, y));
        let text = RichText::new(&s.name).font(font(11.5, Weight::SemiBold)).color(color(theme, s.role));
        plot.text(Text::new("", PlotPoint::new(x, y), text));
    }
}
