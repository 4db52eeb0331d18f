//! Where it balances: the map of shank against thigh angle, with the usual path, lines of equal lean
//! and the dot of the posture shown.

use plumbfold_core::{
    Angle, Balance, Refusal, Study,
    bounds::Unit,
    map::{Ground, Map, map},
};

use crate::{
    chart::{Axis, Scale},
    fonts, format,
    geometry::{Pt, RectPt, Size},
    place::{Placer, Wanted},
    scene::{Anchor, Cells, Grip, Handle, Hit, Item, Scene, Weight},
    shapes,
    theme::Role,
};

/// Lines of equal lean, degrees.
pub const LEANS: [f64; 4] = [15.0, 30.0, 45.0, 60.0];

/// The map of a study, over the angles worth seeing: standing to a little beyond the balance depth,
/// and to a little beyond the ankle range.
#[must_use]
pub fn map_of(study: &Study) -> Map {
    let deepest = study.depths.balance.map_or(90.0, Angle::deg).max(study.case.task().goal.deg());
    let thigh_to = ((deepest + 15.0) / 10.0).ceil() * 10.0;
    let ankle = (study.case.limits().ankle + study.case.stand().pitch).deg();
    let shank_to = ((ankle + 8.0) / 10.0).ceil().clamp(2.0, 8.0) * 10.0;
    map(&study.case, (Angle::ZERO, Angle::from_deg(thigh_to)), (Angle::from_deg(-10.0), Angle::from_deg(shank_to)))
}

/// Where thigh and shank angles lie on the page.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MapView {
    /// The plotted area.
    pub plot: RectPt,
    thigh: (Angle, Angle),
    shank: (Angle, Angle),
}

impl MapView {
    /// The place of a pair of angles.
    #[must_use]
    pub fn to_page(&self, thigh: Angle, shank: Angle) -> Pt {
        let share = |a: Angle, (from, to): (Angle, Angle)| ((a - from).rad() / (to - from).rad()) as f32;
        Pt::new(
            self.plot.min.x + self.plot.w() * share(thigh, self.thigh),
            self.plot.max.y - self.plot.h() * share(shank, self.shank),
        )
    }

    /// The pair of angles (thigh, shank) of a place.
    #[must_use]
    pub fn to_angles(&self, p: Pt) -> (Angle, Angle) {
        let at = |share: f32, (from, to): (Angle, Angle)| from + (to - from) * f64::from(share.clamp(0.0, 1.0));
        (
            at((p.x - self.plot.min.x) / self.plot.w().max(1.0), self.thigh),
            at((self.plot.max.y - p.y) / self.plot.h().max(1.0), self.shank),
        )
    }
}

/// Draws the map for an area. `now` is the posture shown.
#[must_use]
pub fn map_scene(study: &Study, m: &Map, now: &Balance, area: Size, text: f32) -> (Scene, MapView) {
    let mut s = Scene::new(area, alt(study));
    let t = text;
    let axis = |title: &str, (from, to): (Angle, Angle)| Axis {
        title: title.to_owned(),
        from: from.deg(),
        to: to.deg(),
        scale: Scale::Degrees,
    };
    let (x, y) = (axis("thigh", m.thigh), axis("shank", m.shank));
    let left = fonts::text_width("−10°", t, Weight::Regular) + t;
    let plot = RectPt { min: Pt::new(left, t * 0.8), max: Pt::new(area.w - t * 1.2, area.h - t * 1.9) };
    let view = MapView { plot, thigh: m.thigh, shank: m.shank };
    if plot.w() < t * 6.0 || plot.h() < t * 4.0 {
        return (s, view);
    }
    s.fill(shapes::rect(plot), Role::NeedsHold);
    s.push(Item::Cells(cells(m, plot)));
    ticks(&mut s, &x, &y, &view, t);
    let mut placer = Placer::new(plot.grown(-2.0), 2.0);
    contours(&mut s, &mut placer, m, &view, t);
    path(&mut s, &mut placer, study, &view);
    s.line(shapes::outline(&shapes::rect(plot)), 1.0, Role::Border);
    dot(&mut s, &mut placer, now, &view, t, m);
    names(&mut s, &mut placer, m, &view, t);
    (s, view)
}

fn alt(study: &Study) -> String {
    let words = |a: Option<Angle>| a.map_or_else(|| "none".to_owned(), format::deg);
    format!(
        "Where it balances, shank against thigh angle: on mid-foot to {}, in balance to {}.",
        words(study.depths.steady),
        words(study.depths.balance)
    )
}

/// Solid on mid-foot, hatched in the support, open beyond, panel ground where a range refuses.
fn cells(m: &Map, area: RectPt) -> Cells {
    let mut roles = Vec::with_capacity(m.columns * m.rows);
    for row in (0..m.rows).rev() {
        for column in 0..m.columns {
            roles.push(m.cell(column, row).and_then(|c| match c.ground {
                Ground::Steady => Some(Role::Steady),
                // every fourth diagonal: hatching in the size of cells
                Ground::Drifting(_) if (column + row) % 4 == 0 => Some(Role::Drifting),
                Ground::Drifting(_) => Some(Role::DriftingBg),
                Ground::Hold(_) => None,
                Ground::Refused(_) => Some(Role::Panel),
            }));
        }
    }
    Cells { area, columns: m.columns, roles }
}

fn ticks(s: &mut Scene, x: &Axis, y: &Axis, view: &MapView, t: f32) {
    let plot = view.plot;
    let write = |s: &mut Scene, text: &str, at: Pt, anchor: Anchor| {
        let w = Wanted { text: text.to_owned(), size: t, weight: Weight::Regular, role: Role::InkSoft };
        s.text(w.at(at, anchor));
    };
    for (v, label) in y.ticks((plot.h() / (t * 2.4)) as usize) {
        let at = view.to_page(Angle::ZERO, Angle::from_deg(v)).y;
        if at - t > 0.0 {
            write(s, &label, Pt::new(plot.min.x - t * 0.4, at + t * 0.3), Anchor::End);
        }
    }
    let last = plot.max.x - fonts::text_width(&x.title, t, Weight::Regular) - t;
    for (v, label) in x.ticks((plot.w() / (t * 4.5)) as usize) {
        let at = view.to_page(Angle::from_deg(v), Angle::ZERO).x;
        s.line([Pt::new(at, plot.max.y), Pt::new(at, plot.max.y + t * 0.3)], 1.0, Role::Border);
        if at + t * 1.2 < last {
            write(s, &label, Pt::new(at, plot.max.y + t * 1.3), Anchor::Middle);
        }
    }
    write(s, &x.title, Pt::new(plot.max.x, plot.max.y + t * 1.3), Anchor::End);
}

/// Lines of equal lean by marching squares over the middles of the cells.
fn contours(s: &mut Scene, placer: &mut Placer, m: &Map, view: &MapView, t: f32) {
    for deg in LEANS {
        let level = Angle::from_deg(deg).rad();
        let mut longest: Option<Pt> = None;
        for column in 0..m.columns.saturating_sub(1) {
            for row in 0..m.rows.saturating_sub(1) {
                if let Some([a, b]) = crossing(m, column, row, level) {
                    let place = |(thigh, shank): (Angle, Angle)| view.to_page(thigh, shank);
                    s.line([place(a), place(b)], 1.0, Role::Outline);
                    if longest.is_none_or(|l| place(a).y < l.y) {
                        longest = Some(place(a));
                    }
                }
            }
        }
        if let Some(at) = longest {
            let name = Wanted {
                text: format::deg(Angle::from_deg(deg)),
                size: t * 0.9,
                weight: Weight::Regular,
                role: Role::InkSoft,
            };
            let below = [1.2_f32, 2.4].map(|d| name.centred(at + Pt::new(0.0, -d * t * 0.7)));
            for l in placer.place(below.map(|l| vec![l])).into_iter().flatten() {
                s.text(l);
            }
        }
    }
}

type Corner = (Angle, Angle);

/// The segment on which the lean takes a level within one square of four cells.
fn crossing(m: &Map, column: usize, row: usize, level: f64) -> Option<[Corner; 2]> {
    let corners = [(0, 0), (1, 0), (1, 1), (0, 1)];
    let mut value = [0.0; 4];
    for (v, (dc, dr)) in value.iter_mut().zip(corners) {
        *v = m.cell(column + dc, row + dr)?.lean_rad - level;
        if !v.is_finite() {
            return None;
        }
    }
    let mut found: Vec<Corner> = Vec::with_capacity(2);
    for k in 0..4 {
        let (a, b) = (k, (k + 1) % 4);
        if (value[a] > 0.0) != (value[b] > 0.0) {
            let share = value[a] / (value[a] - value[b]);
            let at = |(dc, dr): (usize, usize)| (m.thigh_at(column + dc), m.shank_at(row + dr));
            let ((ta, sa), (tb, sb)) = (at(corners[a]), at(corners[b]));
            found.push((ta + (tb - ta) * share, sa + (sb - sa) * share));
        }
    }
    match found[..] {
        [a, b] => Some([a, b]),
        _ => None,
    }
}

/// The path of the descent by the rule in force.
fn path(s: &mut Scene, placer: &mut Placer, study: &Study, view: &MapView) {
    let pts: Vec<Pt> =
        study.descent.iter().filter_map(|d| d.balance.posture()).map(|p| view.to_page(p.thigh, p.shank)).collect();
    placer.avoid_line(&pts, 12.0);
    s.line(pts.clone(), 4.0, Role::Ink);
    s.line(pts, 2.0, Role::NeedsHold);
}

fn dot(s: &mut Scene, placer: &mut Placer, now: &Balance, view: &MapView, t: f32, m: &Map) {
    let Some(p) = now.posture() else { return };
    let at = view.to_page(p.thigh, p.shank);
    let r = t * 0.55;
    s.fill(shapes::circle(at, r), Role::Ink);
    s.fill(shapes::circle(at, r * 0.65), Role::FieldBg);
    placer.take(RectPt { min: at, max: at }.grown(r));
    s.grips.push(Grip {
        handle: Handle::MapDot,
        hit: Hit::Circle { at, radius: t * 1.2 },
        name: "Depth and shank on the map".to_owned(),
        value: p.thigh.deg(),
        range: (m.thigh.0.deg(), m.thigh.1.deg()),
        unit: Unit::Deg,
        track: None,
    });
}

/// What a region is called.
fn region(g: Ground) -> (&'static str, Role) {
    match g {
        Ground::Steady => ("on mid-foot", Role::OnStrong),
        Ground::Drifting(_) => ("", Role::Ink),
        Ground::Hold(_) => ("needs a hold", Role::InkSoft),
        Ground::Refused(Refusal::Ankle) => ("beyond ankle range", Role::InkSoft),
        Ground::Refused(Refusal::Knee) => ("beyond knee range", Role::InkSoft),
        Ground::Refused(Refusal::Hip) => ("beyond hip and back", Role::InkSoft),
        Ground::Refused(Refusal::Stance) => ("stance too wide", Role::InkSoft),
    }
}

/// Each region's name where it has the most room: the middle of its widest run of cells whose
/// neighbours above and below are of the same kind.
fn names(s: &mut Scene, placer: &mut Placer, m: &Map, view: &MapView, t: f32) {
    let kinds = [
        "on mid-foot",
        "needs a hold",
        "beyond ankle range",
        "beyond knee range",
        "beyond hip and back",
        "stance too wide",
    ];
    let cell = Size::new(view.plot.w() / m.columns as f32, view.plot.h() / m.rows as f32);
    let half = ((t * 1.3 / cell.h).ceil() as usize).max(1) / 2;
    let runs = Runs::of(m, &kinds);
    for (which, name) in kinds.into_iter().enumerate() {
        let width = fonts::text_width(name, t, Weight::SemiBold) + t;
        let mut spots: Vec<(usize, Pt)> = Vec::new();
        for row in half..m.rows.saturating_sub(half) {
            let mut start = None;
            for column in 0..=m.columns {
                let inside = column < m.columns && runs.covers(column, row, half, which);
                match (inside, start) {
                    (true, None) => start = Some(column),
                    (false, Some(from)) => {
                        let run = column - from;
                        if run as f32 * cell.w >= width {
                            let middle = Pt::new(
                                view.plot.min.x + (from as f32 + run as f32 / 2.0) * cell.w,
                                view.plot.max.y - (row as f32 + 0.5) * cell.h,
                            );
                            spots.push((run, middle));
                        }
                        start = None;
                    }
                    _ => {}
                }
            }
        }
        spots.sort_by_key(|spot| std::cmp::Reverse(spot.0));
        let role = match name {
            "on mid-foot" => Role::OnStrong,
            _ => Role::InkSoft,
        };
        let wanted = Wanted { text: name.to_owned(), size: t, weight: Weight::SemiBold, role };
        for l in placer.place(spots.iter().map(|s| vec![wanted.centred(s.1)])).into_iter().flatten() {
            s.text(l);
        }
    }
}

/// For each cell its kind, and how many cells of that kind end there counted along the shank.
struct Runs {
    rows: usize,
    kind: Vec<usize>,
    run: Vec<usize>,
}

impl Runs {
    fn of(m: &Map, kinds: &[&str]) -> Self {
        let mut all = Self { rows: m.rows, kind: Vec::new(), run: Vec::new() };
        for column in 0..m.columns {
            for row in 0..m.rows {
                let name = m.cell(column, row).map_or("", |c| region(c.ground).0);
                let kind = kinds.iter().position(|k| *k == name).unwrap_or(kinds.len());
                let goes_on = row > 0 && all.kind.last() == Some(&kind);
                let before = all.run.last().copied().filter(|_| goes_on).unwrap_or(0);
                all.kind.push(kind);
                all.run.push(before + 1);
            }
        }
        all
    }

    /// Whether a cell and so many above and below it are of a kind.
    fn covers(&self, column: usize, row: usize, half: usize, kind: usize) -> bool {
        let end = column * self.rows + row + half;
        self.kind[end] == kind && self.run[end] > 2 * half
    }
}

#[cfg(test)]
mod tests {
    use plumbfold_core::{Case, posture, sample, study};

    use super::*;
    use crate::measure::{out_of_page, overlaps};

    #[test]
    fn the_page_and_the_angles_lead_back_to_each_other_and_names_keep_apart() {
        for (m, t) in [sample::long_thigh_woman(), sample::average_man()] {
            let (case, _) = Case::new(&m, &t).expect("valid");
            let st = study(&case);
            let map = map_of(&st);
            let now = posture(&case, Angle::from_deg(60.0));
            for (w, h) in [(320.0, 150.0), (420.0, 190.0), (900.0, 420.0)] {
                let (s, view) = map_scene(&st, &map, &now, Size::new(w, h), 11.5);
                assert!(overlaps(&s).is_empty(), "{:?}", overlaps(&s));
                assert!(out_of_page(&s).is_empty(), "{:?}", out_of_page(&s));
                let p = view.to_page(Angle::from_deg(60.0), Angle::from_deg(20.0));
                let (thigh, shank) = view.to_angles(p);
                assert!((thigh.deg() - 60.0).abs() < 0.01 && (shank.deg() - 20.0).abs() < 0.01);
                assert!(s.labels().any(|l| l.text == "on mid-foot"), "{w}×{h}");
            }
        }
    }
}
