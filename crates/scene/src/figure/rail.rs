//! The seat-height rail: a rule standing on the floor at the figure's own scale. Solid where the
//! seat is reached on mid-foot, hatched near heels or toes, open where it needs a hold.

use plumbfold_core::{Angle, Case, Step, Study, pose, posture};

use super::{Look, Show, Style, view::View};
use crate::{
    fonts, format,
    geometry::{Pt, RectPt},
    place::{self, Wanted},
    scene::{Anchor, Scene, Weight},
    shapes,
    theme::Role,
    words,
};

/// How a stretch of the rail is reached.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Reached {
    /// On mid-foot.
    Steady,
    /// Near heels or toes.
    Drifting,
    /// Not in balance unaided.
    Hold,
}

impl Reached {
    fn of(step: &Step) -> Self {
        if step.balance.is_steady() {
            Self::Steady
        } else if step.balance.held().is_some() {
            Self::Drifting
        } else {
            Self::Hold
        }
    }

    fn worse(self, other: Self) -> Self {
        match (self, other) {
            (Self::Hold, _) | (_, Self::Hold) => Self::Hold,
            (Self::Drifting, _) | (_, Self::Drifting) => Self::Drifting,
            _ => Self::Steady,
        }
    }
}

/// The stretches of a rail from the top down: seat heights in metres with how they are reached.
/// Neighbours of one kind are joined; from the last step down to the floor it needs a hold.
#[must_use]
pub fn stretches(study: &Study) -> Vec<(f64, f64, Reached)> {
    let seats: Vec<(f64, Reached)> = study
        .descent
        .iter()
        .filter_map(|s| s.balance.posture().map(|p| (p.seat_height_m.max(0.0), Reached::of(s))))
        .collect();
    let mut out: Vec<(f64, f64, Reached)> = Vec::new();
    for pair in seats.windows(2) {
        let (top, bottom) = (pair[0].0, pair[1].0);
        let kind = pair[0].1.worse(pair[1].1);
        // a steady depth is exact: the step at it still counts as steady, the next no more
        match out.last_mut() {
            Some(last) if last.2 == kind => last.1 = bottom,
            _ => out.push((top, bottom, kind)),
        }
    }
    let low = seats.last().map_or(0.0, |s| s.0);
    if low > 0.0 {
        match out.last_mut() {
            Some(last) if last.2 == Reached::Hold => last.1 = 0.0,
            _ => out.push((low, 0.0, Reached::Hold)),
        }
    }
    out
}

/// Seat height at a thigh angle by the task's rule, m. Where no posture is allowed, that of the
/// usual shank, since the seat's height does not ask the trunk. Not below the floor.
#[must_use]
pub fn seat_at(case: &Case, thigh: Angle) -> Option<f64> {
    let seat = match posture(case, thigh).posture() {
        Some(p) => Some(p.seat_height_m),
        None => pose(case, case.usual_shank(thigh), thigh, Angle::ZERO).map(|p| p.seat_height_m),
    };
    seat.map(|m| m.max(0.0))
}

/// One entry beside the rail.
struct Entry {
    seat_m: f64,
    text: Wanted,
    mark: Mark,
}

#[derive(Clone, Copy, PartialEq)]
enum Mark {
    Now,
    Goal,
    Seen,
    Pain,
    Plain,
}

/// What a rail needs to be laid out: widths in page units.
pub(super) struct Rail {
    entries: Vec<Entry>,
    stretches: Vec<(f64, f64, Reached)>,
    top_m: f64,
    bar: f32,
    numerals: f32,
    /// Width of the whole column.
    pub width: f32,
    t: f32,
}

/// Height of the rail: the seat touched when standing, m.
pub(super) fn top_m(study: &Study) -> f64 {
    study.descent.iter().filter_map(|s| s.balance.posture()).map(|p| p.seat_height_m).fold(0.2, f64::max)
}

impl Rail {
    pub fn new(show: &Show<'_>, look: &Look) -> Self {
        let t = look.text;
        let case = &show.study.case;
        let client = look.style == Style::Client;
        let mut entries = Vec::new();
        let mut add = |seat_m: Option<f64>, text: String, weight, role, size: f32, mark| {
            if let Some(seat_m) = seat_m {
                entries.push(Entry { seat_m, text: Wanted { text, size, weight, role }, mark });
            }
        };
        let now = show.shown().map(|p| p.seat_height_m.max(0.0));
        if let Some(m) = now {
            let seat = words::client::seat_now(m);
            let text = match show.shown().filter(|_| !client) {
                Some(p) => format!("{seat} · {}", format::deg(p.thigh)),
                None => seat,
            };
            add(now, text, Weight::SemiBold, Role::Ink, t * 1.15, Mark::Now);
        }
        let deepest = |a: Option<Angle>| a.and_then(|a| seat_at(case, a));
        let (steady, balance) = (show.study.depths.steady, show.study.depths.balance);
        if client {
            if let Some(m) = deepest(steady) {
                let text = format!("weight mid-foot to {}", format::cm(m));
                add(Some(m), text, Weight::Regular, Role::Steady, t, Mark::Plain);
            }
            if let Some(m) = deepest(balance).filter(|m| *m > 0.02) {
                add(
                    Some((m - 0.04).max(0.0)),
                    words::client::RAIL_HOLD.to_owned(),
                    Weight::Regular,
                    Role::InkSoft,
                    t,
                    Mark::Plain,
                );
            }
        } else {
            add(Some(top_m(show.study)), "standing".to_owned(), Weight::Regular, Role::InkSoft, t, Mark::Plain);
            if let Some(a) = steady {
                let text = format!("on mid-foot to {}", format::deg_up_to(a));
                add(deepest(steady), text, Weight::SemiBold, Role::Steady, t, Mark::Plain);
            }
            let same = steady.zip(balance).is_some_and(|(s, b)| (b.deg() - s.deg()).abs() < 0.5);
            if let Some(a) = balance {
                let text = if same {
                    "below, needs a hold".to_owned()
                } else {
                    format!("needs a hold below {}", format::deg_up_to(a))
                };
                add(deepest(balance), text, Weight::Regular, Role::Ink, t, Mark::Plain);
            }
            let task = case.task();
            let goal = format!("goal {}", format::deg(task.goal));
            add(seat_at(case, task.goal), goal, Weight::SemiBold, Role::Goal, t, Mark::Goal);
            if let Some(seen) = task.seen {
                let seat = pose(case, seen.shank, seen.thigh, seen.trunk).map(|p| p.seat_height_m.max(0.0));
                add(seat, format!("seen {}", format::deg(seen.thigh)), Weight::SemiBold, Role::Seen, t, Mark::Seen);
            }
            if let Some(pain) = show.pain_from {
                let text = format!("pain from {}", format::deg(pain));
                add(seat_at(case, pain), text, Weight::SemiBold, Role::Pain, t, Mark::Pain);
            }
        }
        let bar = t * 1.25;
        let numerals = if client { 0.0 } else { fonts::text_width("100", t * 0.85, Weight::Regular) + t * 1.0 };
        let labels =
            entries.iter().map(|e| fonts::text_width(&e.text.text, e.text.size, e.text.weight)).fold(0.0, f32::max);
        let width = numerals + bar + t * 1.7 + labels;
        Self { entries, stretches: stretches(show.study), top_m: top_m(show.study), bar, numerals, width, t }
    }

    /// Draws the rail in a column of the page; returns the bar's rectangle and the place of the pain mark.
    pub fn draw(&self, scene: &mut Scene, view: &View, column: RectPt, look: &Look) -> (RectPt, Option<Pt>) {
        let t = self.t;
        // labels always stand on the outer side, away from the figure
        let outward = view.forward();
        let inner = if outward > 0.0 { column.min.x } else { column.max.x };
        let x_in = inner + outward * self.numerals;
        let x_out = x_in + outward * self.bar;
        let bar = RectPt::new(Pt::new(x_in, view.y(self.top_m)), Pt::new(x_out, view.floor()));
        scene.fill(shapes::rect(bar.grown(t * 0.09)), Role::BodyEdge);
        scene.fill(shapes::rect(bar), Role::NeedsHold);
        for &(top, bottom, kind) in &self.stretches {
            let piece = shapes::rect(RectPt::new(Pt::new(x_in, view.y(top)), Pt::new(x_out, view.y(bottom))));
            match kind {
                Reached::Steady => scene.fill(piece, Role::Steady),
                Reached::Drifting => {
                    scene.fill(piece.clone(), Role::DriftingBg);
                    for l in shapes::hatch(&piece, t * 0.42) {
                        scene.line(l, t * 0.11, Role::Drifting);
                    }
                }
                Reached::Hold => {}
            }
        }
        if look.style == Style::Annotated {
            self.ticks(scene, view, x_in, outward);
        }
        let pain = self.labels(scene, view, (x_in, x_out), outward, column);
        (bar, pain)
    }

    fn ticks(&self, scene: &mut Scene, view: &View, x: f32, outward: f32) {
        let t = self.t;
        let per_10 = view.length(0.1);
        let every = if per_10 >= t * 1.25 { 10 } else { 20 };
        let top_cm = (self.top_m * 100.0).floor() as i32;
        for cm in (5..=top_cm).step_by(5) {
            let y = view.y(f64::from(cm) / 100.0);
            let long = cm % 10 == 0;
            if !long && per_10 < 12.0 {
                continue;
            }
            let length = t * if long { 0.5 } else { 0.28 };
            scene.line([Pt::new(x - outward * 1.2, y), Pt::new(x - outward * (1.2 + length), y)], 1.0, Role::BodyEdge);
            if cm % every == 0 {
                let w = Wanted {
                    text: format::number(f64::from(cm), 0),
                    size: t * 0.85,
                    weight: Weight::Regular,
                    role: Role::InkSoft,
                };
                let anchor = if outward > 0.0 { Anchor::End } else { Anchor::Start };
                scene.text(w.at(Pt::new(x - outward * t * 0.8, y + t * 0.3), anchor));
            }
        }
        let w = Wanted { text: "cm".to_owned(), size: t * 0.85, weight: Weight::Regular, role: Role::InkSoft };
        let anchor = if outward > 0.0 { Anchor::End } else { Anchor::Start };
        let last = f64::from(top_cm / every * every) / 100.0;
        let y = (view.y(last) - t * 1.0).min(view.y(self.top_m) + t * 0.3);
        scene.text(w.at(Pt::new(x - outward * t * 0.8, y), anchor));
    }

    fn labels(
        &self,
        scene: &mut Scene,
        view: &View,
        (x_in, x_out): (f32, f32),
        outward: f32,
        column: RectPt,
    ) -> Option<Pt> {
        let t = self.t;
        let wishes: Vec<f32> = self.entries.iter().map(|e| view.y(e.seat_m)).collect();
        let pitch = self.entries.iter().map(|e| e.text.size).fold(t, f32::max) * 1.3;
        let (low, high) = (column.min.y + t * 0.6, column.max.y - t * 0.6);
        let heights = place::stack(&wishes, pitch, low, high);
        let (mut pain, thin) = (None, t * 0.08);
        for (e, (y, label_y)) in self.entries.iter().zip(wishes.iter().copied().zip(heights)) {
            let text_x = x_out + outward * t * 1.7;
            let anchor = if outward > 0.0 { Anchor::Start } else { Anchor::End };
            let label = e.text.at(Pt::new(text_x, label_y + e.text.size * 0.34), anchor);
            let (from, to) = (Pt::new(x_out + outward * t * 0.35, y), Pt::new(text_x - outward * t * 0.35, label_y));
            let knee = Pt::new(x_out + outward * t * 0.9, label_y);
            let middle = Pt::new(f32::midpoint(x_in, x_out), y);
            match e.mark {
                Mark::Plain => scene.line([Pt::new(x_out, y), from, knee, to], thin, Role::BodyEdge),
                Mark::Now => {
                    let over = t * 0.45;
                    scene.line(
                        [Pt::new(x_in - outward * over, y), Pt::new(x_out + outward * over, y)],
                        t * 0.34,
                        Role::Paper,
                    );
                    scene.line(
                        [Pt::new(x_in - outward * over, y), Pt::new(x_out + outward * over, y)],
                        t * 0.19,
                        Role::Ink,
                    );
                    scene.fill(shapes::pointer(from, Pt::new(-outward, 0.0), t * 0.65, t * 0.75), Role::Ink);
                    scene.line([from + Pt::new(outward * t * 0.3, 0.0), knee, to], thin * 1.4, Role::Ink);
                }
                Mark::Goal => {
                    scene.fill(shapes::diamond(middle, t * 0.62), Role::Goal);
                    scene.fill(shapes::diamond(middle, t * 0.38), Role::Paper);
                    scene.line([Pt::new(x_out, y), from, knee, to], thin, Role::Goal);
                }
                Mark::Seen => {
                    let tip = Pt::new(x_out - outward * t * 0.15, y);
                    scene.fill(shapes::pointer(tip, Pt::new(-outward, 0.0), t * 0.7, t * 0.8), Role::Seen);
                    scene.line([from, knee, to], thin, Role::Seen);
                }
                Mark::Pain => {
                    scene.fill(shapes::circle(middle, t * 0.5), Role::Pain);
                    scene.fill(shapes::circle(middle, t * 0.25), Role::Paper);
                    scene.line([Pt::new(x_out, y), from, knee, to], thin, Role::Pain);
                    pain = Some(middle);
                }
            }
            scene.text(label);
        }
        pain
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use plumbfold_core::{sample, study};

    #[test]
    fn stretches_run_from_standing_to_the_floor_and_change_at_the_depths() {
        let (m, t) = sample::long_thigh_woman();
        let (case, _) = Case::new(&m, &t).expect("valid");
        let s = study(&case);
        let parts = stretches(&s);
        assert_eq!(parts.iter().map(|p| p.2).collect::<Vec<_>>(), [Reached::Steady, Reached::Drifting, Reached::Hold]);
        for pair in parts.windows(2) {
            assert!((pair[0].1 - pair[1].0).abs() < 1e-9);
        }
        let at = |a: Option<Angle>| seat_at(&case, a.expect("a depth")).expect("a seat");
        assert!((parts[0].1 - at(s.depths.steady)).abs() < 1e-6);
        assert!((parts[1].1 - at(s.depths.balance)).abs() < 1e-6);
        assert!(parts[2].1.abs() < 1e-12);
    }
}
