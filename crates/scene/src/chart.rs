//! A plot as data, and its drawing for a sheet. The window hands the same [`Chart`] to its plot
//! widget; ticks and their labels come from [`Axis::ticks`] for both.

use crate::{
    fonts, format,
    geometry::{Pt, RectPt, Size},
    place::{Block, Placer, Wanted},
    scene::{Anchor, Cells, Item, Scene, Weight},
    shapes,
    theme::Role,
};

/// What an axis counts in; decides steps and labels.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Scale {
    /// Degrees: steps of 5, 10, 15, 30, 45, 90.
    Degrees,
    /// Plain numbers: steps of 1, 2, 5 times a power of ten.
    Number,
}

/// One axis.
#[derive(Clone, Debug, PartialEq)]
pub struct Axis {
    /// What and in which unit, such as `thigh angle` or `arms, cm`.
    pub title: String,
    /// Value at the near end.
    pub from: f64,
    /// Value at the far end.
    pub to: f64,
    /// Steps and labels.
    pub scale: Scale,
}

impl Axis {
    /// Ticks in rising order with their labels, at most `most` of them (at least two steps' worth).
    #[must_use]
    pub fn ticks(&self, most: usize) -> Vec<(f64, String)> {
        let span = (self.to - self.from).abs();
        if !(span.is_finite() && span > 0.0) {
            return Vec::new();
        }
        let least = span / most.max(2) as f64;
        let step = match self.scale {
            Scale::Degrees => {
                [1.0, 2.0, 5.0, 10.0, 15.0, 30.0, 45.0, 90.0].into_iter().find(|&s| s >= least).unwrap_or(180.0)
            }
            Scale::Number => {
                let power = 10_f64.powf(least.log10().floor());
                [1.0, 2.0, 5.0, 10.0].into_iter().map(|k| k * power).find(|&s| s >= least * 0.999).unwrap_or(power)
            }
        };
        let decimals = (-step.log10().floor()).clamp(0.0, 6.0) as usize;
        let (low, high) = (self.from.min(self.to), self.from.max(self.to));
        let (first, last) = ((low / step - 1e-9).ceil() as i64, (high / step + 1e-9).floor() as i64);
        (first..=last)
            .map(|k| {
                let value = k as f64 * step;
                let text = match self.scale {
                    Scale::Degrees => format!("{}°", format::number(value, decimals)),
                    Scale::Number => format::number(value, decimals),
                };
                (value, text)
            })
            .collect()
    }

    /// Share of the way from the near to the far end.
    fn share(&self, value: f64) -> f32 {
        ((value - self.from) / (self.to - self.from)) as f32
    }
}

/// How a series is drawn.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stroke {
    /// A full line.
    Solid,
    /// A dashed line.
    Dashed,
}

/// One curve; a point that is not finite breaks it.
#[derive(Clone, Debug, PartialEq)]
pub struct Series {
    /// Name, written at the curve.
    pub name: String,
    /// Points in axis values.
    pub points: Vec<(f64, f64)>,
    /// Colour role.
    pub role: Role,
    /// Line style.
    pub stroke: Stroke,
}

/// What a band means.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum BandKind {
    /// Balanced near the heels or toes: hatched.
    Drifting,
    /// Out of balance unaided: open ground.
    NeedsHold,
    /// Beyond a range.
    Beyond,
}

/// A stretch of the x axis with a meaning of its own.
#[derive(Clone, Debug, PartialEq)]
pub struct Band {
    /// From, x axis value.
    pub from: f64,
    /// To, x axis value.
    pub to: f64,
    /// Meaning.
    pub kind: BandKind,
    /// Written in it, may be empty.
    pub label: String,
}

/// A marked point with a name.
#[derive(Clone, Debug, PartialEq)]
pub struct Mark {
    /// x axis value.
    pub x: f64,
    /// y axis value.
    pub y: f64,
    /// Colour role.
    pub role: Role,
    /// Written beside it, may be empty.
    pub text: String,
}

/// A map of cells under the curves, row by row from the top left.
#[derive(Clone, Debug, PartialEq)]
pub struct Map {
    /// Its extent along x, axis values.
    pub x: (f64, f64),
    /// Its extent along y, axis values.
    pub y: (f64, f64),
    /// Cells in a row.
    pub columns: usize,
    /// Colour of each cell.
    pub roles: Vec<Option<Role>>,
}

/// A plot as data.
#[derive(Clone, Debug, PartialEq)]
pub struct Chart {
    /// What it shows.
    pub title: String,
    /// Horizontal axis.
    pub x: Axis,
    /// Vertical axis.
    pub y: Axis,
    /// Cells under everything.
    pub map: Option<Map>,
    /// Curves.
    pub series: Vec<Series>,
    /// Bands behind the curves.
    pub bands: Vec<Band>,
    /// Marked points.
    pub marks: Vec<Mark>,
    /// A vertical line, x axis value.
    pub cursor: Option<f64>,
    /// The plot in one sentence, for those who do not see it.
    pub summary: String,
}

/// How large it is written.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Look {
    /// Font size of ticks and names, page units.
    pub text: f32,
}

impl Default for Look {
    fn default() -> Self {
        Self { text: 12.0 }
    }
}

/// Draws a chart for an area.
#[must_use]
pub fn chart(c: &Chart, area: Size, look: &Look) -> Scene {
    let mut s = Scene::new(area, c.summary.clone());
    let t = look.text;
    let wish = |text: &str, weight, role| Wanted { text: text.to_owned(), size: t, weight, role };
    let y_ticks = c.y.ticks(((area.h / (t * 3.5)) as usize).clamp(2, 8));
    let left = y_ticks.iter().map(|(_, l)| fonts::text_width(l, t, Weight::Regular)).fold(0.0, f32::max) + t * 1.1;
    let top = if c.title.is_empty() { t } else { t * 2.2 };
    let plot = RectPt { min: Pt::new(left, top), max: Pt::new(area.w - t, area.h - t * 3.0) };
    if plot.w() < t * 4.0 || plot.h() < t * 3.0 {
        return s;
    }
    let x_of = |v: f64| plot.min.x + plot.w() * c.x.share(v);
    let y_of = |v: f64| plot.max.y - plot.h() * c.y.share(v);
    let mut placer = Placer::new(plot.grown(-2.0), 2.0);

    s.fill(shapes::rect(plot), Role::FieldBg);
    if let Some(m) = &c.map {
        let cells = RectPt::new(Pt::new(x_of(m.x.0), y_of(m.y.0)), Pt::new(x_of(m.x.1), y_of(m.y.1)));
        s.push(Item::Cells(Cells { area: cells, columns: m.columns, roles: m.roles.clone() }));
    }
    for band in &c.bands {
        let r = RectPt::new(Pt::new(x_of(band.from), plot.min.y), Pt::new(x_of(band.to), plot.max.y));
        let r =
            RectPt { min: Pt::new(r.min.x.max(plot.min.x), r.min.y), max: Pt::new(r.max.x.min(plot.max.x), r.max.y) };
        if r.w() <= 0.0 {
            continue;
        }
        let area = shapes::rect(r);
        match band.kind {
            BandKind::Drifting => {
                s.fill(area.clone(), Role::DriftingBg);
                for l in shapes::hatch(&area, 7.0) {
                    s.line(l, 1.0, Role::Drifting);
                }
            }
            BandKind::NeedsHold => s.fill(area, Role::NeedsHold),
            BandKind::Beyond => s.fill(area, Role::Panel),
        }
    }
    for (v, label) in &y_ticks {
        let y = y_of(*v);
        s.line([Pt::new(plot.min.x, y), Pt::new(plot.max.x, y)], 1.0, Role::Grid);
        s.text(
            wish(label, Weight::Regular, Role::InkSoft).at(Pt::new(plot.min.x - t * 0.4, y + t * 0.28), Anchor::End),
        );
    }
    let x_ticks = c.x.ticks(((plot.w() / (t * 4.5)) as usize).clamp(2, 10));
    let mut free_from = f32::MIN;
    for (v, label) in &x_ticks {
        let x = x_of(*v);
        s.line([Pt::new(x, plot.max.y), Pt::new(x, plot.max.y + t * 0.3)], 1.0, Role::Border);
        let l = wish(label, Weight::Regular, Role::InkSoft).at(Pt::new(x, plot.max.y + t * 1.3), Anchor::Middle);
        let b = l.bounds();
        if b.min.x >= free_from && b.max.x <= area.w && b.min.x >= 0.0 {
            free_from = b.max.x + t * 0.4;
            s.text(l);
        }
    }
    s.text(wish(&c.x.title, Weight::Regular, Role::InkSoft).at(Pt::new(plot.max.x, area.h - t * 0.4), Anchor::End));
    s.line(shapes::outline(&shapes::rect(plot)), 1.0, Role::Border);
    if !c.title.is_empty() {
        s.text(wish(&c.title, Weight::SemiBold, Role::Ink).at(Pt::new(plot.min.x, t * 1.2), Anchor::Start));
    }
    for series in &c.series {
        let pts: Vec<Pt> = series.points.iter().map(|&(x, y)| Pt::new(x_of(x), y_of(y))).collect();
        for piece in clipped(&pts, &plot) {
            placer.avoid_line(&piece, 12.0);
            match series.stroke {
                Stroke::Solid => s.line(piece, 2.0, series.role),
                Stroke::Dashed => {
                    for d in shapes::dashes(&piece, 10.0, 5.0) {
                        s.line(d, 2.0, series.role);
                    }
                }
            }
        }
    }
    if let Some(x) = c.cursor.map(x_of).filter(|x| (plot.min.x..=plot.max.x).contains(x)) {
        let line = [Pt::new(x, plot.min.y), Pt::new(x, plot.max.y)];
        placer.avoid_line(&line, 12.0);
        s.line(line, 1.5, Role::Ink);
    }
    for m in &c.marks {
        let at = Pt::new(x_of(m.x), y_of(m.y));
        if !plot.contains(at) {
            continue;
        }
        s.fill(shapes::circle(at, t * 0.45), m.role);
        s.fill(shapes::circle(at, t * 0.28), Role::FieldBg);
        placer.take(RectPt { min: at, max: at }.grown(t * 0.5));
        let w = wish(&m.text, Weight::Regular, m.role);
        for l in
            placer.place(crate::place::around(&Block::line(w), at, Pt::new(1.0, -1.0), t * 0.8)).unwrap_or_default()
        {
            s.text(l);
        }
    }
    for series in &c.series {
        let inside: Vec<Pt> =
            series.points.iter().map(|&(x, y)| Pt::new(x_of(x), y_of(y))).filter(|p| plot.contains(*p)).collect();
        let w = wish(&series.name, Weight::SemiBold, series.role);
        let along = [0.5, 0.35, 0.65, 0.2, 0.8, 0.05, 0.95];
        let spots = along.into_iter().filter_map(|f| inside.get((f * inside.len() as f32) as usize).copied());
        let both = spots.flat_map(|p| [Pt::new(0.0, -1.0), Pt::new(0.0, 1.0)].map(|up| vec![w.beside(p, up, t * 0.5)]));
        for l in placer.place(both).unwrap_or_default() {
            s.text(l);
        }
    }
    for band in c.bands.iter().filter(|b| !b.label.is_empty()) {
        let x = (x_of(band.from).max(plot.min.x) + x_of(band.to).min(plot.max.x)) / 2.0;
        let w = wish(&band.label, Weight::Regular, Role::InkSoft);
        let heights = [0.08_f32, 0.92, 0.3, 0.7, 0.5];
        let fits = heights.into_iter().map(|f| vec![w.centred(Pt::new(x, plot.min.y + plot.h() * f))]);
        for l in placer.place(fits).unwrap_or_default() {
            s.text(l);
        }
    }
    s
}

/// The parts of a polyline inside a rectangle; points that are not finite break it.
fn clipped(pts: &[Pt], within: &RectPt) -> Vec<Vec<Pt>> {
    let mut out: Vec<Vec<Pt>> = Vec::new();
    for pair in pts.windows(2) {
        let whole = pair.iter().all(|p| p.x.is_finite() && p.y.is_finite());
        let Some((a, b)) = whole.then(|| within.clip(pair[0], pair[1])).flatten() else { continue };
        match out.last_mut() {
            Some(piece) if piece.last().is_some_and(|l| l.distance(a) < 1e-3) => piece.push(b),
            _ => out.push(vec![a, b]),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::measure::{out_of_page, overlaps};

    fn axis(from: f64, to: f64, scale: Scale) -> Axis {
        Axis { title: "thigh angle".to_owned(), from, to, scale }
    }

    #[test]
    fn ticks_are_round_and_within() {
        let deg = axis(0.0, 130.0, Scale::Degrees).ticks(6);
        assert_eq!(deg.iter().map(|t| t.1.as_str()).collect::<Vec<_>>(), ["0°", "30°", "60°", "90°", "120°"]);
        let num = axis(-0.12, 0.31, Scale::Number).ticks(5);
        assert_eq!(num.iter().map(|t| t.1.as_str()).collect::<Vec<_>>(), ["−0.1", "0.0", "0.1", "0.2", "0.3"]);
        assert!(axis(1.0, 1.0, Scale::Number).ticks(5).is_empty());
        assert!(axis(0.0, f64::NAN, Scale::Number).ticks(5).is_empty());
    }

    fn arms() -> Chart {
        let curve =
            |k: f64| (0..=24).map(|i| (f64::from(i) * 5.0, k * (f64::from(i) * 5.0).to_radians().sin())).collect();
        Chart {
            title: "Arms through the descent, cm".to_owned(),
            x: axis(0.0, 120.0, Scale::Degrees),
            y: Axis { title: "cm".to_owned(), from: 0.0, to: 40.0, scale: Scale::Number },
            map: None,
            series: vec![
                Series { name: "hip".to_owned(), points: curve(30.0), role: Role::Hip, stroke: Stroke::Solid },
                Series { name: "knee".to_owned(), points: curve(16.0), role: Role::Knee, stroke: Stroke::Dashed },
            ],
            bands: vec![Band { from: 76.0, to: 101.0, kind: BandKind::Drifting, label: "near the heels".to_owned() }],
            marks: vec![Mark { x: 72.0, y: 28.5, role: Role::Ink, text: "now".to_owned() }],
            cursor: Some(72.0),
            summary: "Arms against thigh angle".to_owned(),
        }
    }

    #[test]
    fn a_drawn_chart_keeps_to_its_area_and_its_labels_apart() {
        for (w, h) in [(320.0, 180.0), (480.0, 240.0), (900.0, 420.0)] {
            let s = chart(&arms(), Size::new(w, h), &Look::default());
            assert!(overlaps(&s).is_empty(), "{:?}", overlaps(&s));
            assert!(out_of_page(&s).is_empty(), "{:?}", out_of_page(&s));
            for name in ["hip", "knee", "now", "Arms through the descent, cm"] {
                assert!(s.labels().any(|l| l.text == name), "{name} missing at {w}×{h}");
            }
        }
    }

    #[test]
    fn curves_are_drawn_where_their_numbers_say() {
        let s = chart(&arms(), Size::new(480.0, 240.0), &Look::default());
        let line = s.items.iter().find_map(|i| match i {
            Item::Line { pts, role: Role::Hip, .. } => Some(pts),
            _ => None,
        });
        let pts = line.expect("the hip curve");
        // 90° is the 19th point and the highest
        let top = pts.iter().map(|p| p.y).fold(f32::MAX, f32::min);
        assert!((pts[18].y - top).abs() < 1e-3);
    }

    #[test]
    fn a_gap_breaks_the_line() {
        let pts = [Pt::new(0.0, 0.0), Pt::new(5.0, 5.0), Pt::new(f32::NAN, 5.0), Pt::new(8.0, 5.0), Pt::new(9.0, 6.0)];
        assert_eq!(clipped(&pts, &RectPt::at(0.0, 0.0, 10.0, 10.0)).len(), 2);
    }
}
