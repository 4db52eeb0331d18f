//! Where things go: heading, rail column, floor, and the scale at which the body fits.

use plumbfold_core::{Case, Posture};

use super::{Controls, Look, Show, Style, gear, rail, rail::Rail, view::View};
use crate::{
    fonts,
    geometry::{Pt, RectPt, Size},
    place::Wanted,
    scene::{Anchor, Label, Weight},
    theme::Role,
};

/// What must fit.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Frame {
    /// Every posture from standing down, so that the scale stays while one drags.
    WholeDescent,
    /// The posture shown, as large as it can be.
    ThisPosture,
}

/// The layout of one figure.
pub(super) struct Layout {
    pub view: View,
    pub rail: Rail,
    /// The rail's column, from its top to the floor.
    pub column: RectPt,
    /// Where labels may stand around the body.
    pub labels: RectPt,
    /// Ends of the floor line.
    pub floor: (f32, f32),
    /// Title and what it means.
    pub heading: Vec<Label>,
    /// What the outline is, what is estimated: in the corner under the rail.
    pub captions: Vec<Label>,
    pub text: f32,
}

/// Least x, greatest x, greatest height of a figure, m.
#[derive(Clone, Copy, Debug)]
struct Extent {
    back: f64,
    front: f64,
    top: f64,
    /// Foremost knee or centre of mass.
    knee: f64,
}

impl Extent {
    const NONE: Self = Self { back: f64::MAX, front: f64::MIN, top: f64::MIN, knee: f64::MIN };

    fn with(self, x: f64, y: f64, r: f64) -> Self {
        Self { back: self.back.min(x - r), front: self.front.max(x + r), top: self.top.max(y + r), ..self }
    }

    fn of(self, case: &Case, p: &Posture) -> Self {
        let (j, s) = (&p.joints, case.body().stature_m);
        let discs = [
            (j.hip, 0.072),
            (j.knee, 0.038),
            (j.lumbosacral, 0.056),
            (j.shoulder, 0.05),
            (j.head, 0.078),
            (j.elbow, 0.026),
            (j.wrist, 0.018),
            (j.fingertip, 0.012),
            (j.toe, 0.0),
            (j.heel, 0.0),
        ];
        let body = discs.into_iter().fold(self, |e, (q, r)| e.with(q.x, q.y, r * s));
        let seen = Self { knee: body.knee.max(j.knee.x).max(p.com.x), ..body.with(p.com.x, p.com.y, 0.0) };
        match gear::extent(case, p) {
            Some((l, r, t)) => Self { back: seen.back.min(l), front: seen.front.max(r), top: seen.top.max(t), ..seen },
            None => seen,
        }
    }
}

fn extent(show: &Show<'_>, frame: Frame) -> Extent {
    let mut e = Extent::NONE;
    if let Some(p) = show.shown() {
        e = e.of(&show.study.case, p);
    }
    if let Some(p) = show.straightened.and_then(|_| show.now.posture()) {
        e = e.of(&show.study.case, p);
    }
    if let Some(o) = show.outline {
        e = e.of(o.case, o.posture);
    }
    if frame == Frame::WholeDescent {
        // every third step, and the last: extents change slowly
        let steps = &show.study.descent;
        for s in steps.iter().step_by(3).chain(steps.last()) {
            if let Some(p) = s.balance.posture() {
                e = e.of(&show.study.case, p);
            }
        }
    }
    if e.back > e.front {
        e = Extent { back: -0.3, front: 0.5, top: 1.0, knee: 0.3 };
    }
    e
}

fn heading(show: &Show<'_>, width: f32, look: &Look) -> (Vec<Label>, f32) {
    let t = look.text;
    let mut out = Vec::new();
    let mut y = t * 0.7;
    let mut add = |text: &str, size: f32, weight, role| {
        for line in fonts::wrap(text, size, weight, width - 2.0 * t) {
            y += size * 1.02;
            let w = Wanted { text: line, size, weight, role };
            out.push(w.at(Pt::new(t, y), Anchor::Start));
            y += size * 0.33;
        }
    };
    match look.style {
        Style::Annotated => {
            add(&show.title(), t * 1.5, Weight::SemiBold, Role::Ink);
            if let Some(note) = show.note {
                add(note, t, Weight::SemiBold, Role::Accent);
            }
        }
        Style::Client => add(&show.sentence(), t * 1.25, Weight::SemiBold, Role::Ink),
    }
    (out, y)
}

/// Captions in the corner under the rail, on the side the client faces; smaller where there is little
/// room, and then as many lines as fit.
fn captions(show: &Show<'_>, area: Size, look: &Look, floor: f32, width: f32) -> Vec<Label> {
    if look.style == Style::Client {
        return Vec::new();
    }
    let t = look.text;
    let wrapped = |size: f32| -> Vec<String> {
        show.captions().into_iter().flat_map(|c| fonts::wrap(&c, size, Weight::Regular, width)).collect()
    };
    let fits = |size: f32| floor + size * (1.75 + 1.35 * (wrapped(size).len() as f32 - 1.0)) <= area.h;
    let size = [0.88, 0.8, 0.72].map(|k| k * t).into_iter().find(|&size| fits(size)).unwrap_or(0.72 * t);
    let lines = wrapped(size);
    let x = match look.facing {
        super::Facing::Right => area.w - t - width,
        super::Facing::Left => t,
    };
    let mut y = floor + size * 1.45;
    let mut out = Vec::new();
    for text in lines {
        if y + size * 0.3 > area.h {
            break;
        }
        let w = Wanted { text, size, weight: Weight::Regular, role: Role::InkSoft };
        out.push(w.at(Pt::new(x, y), Anchor::Start));
        y += size * 1.35;
    }
    out
}

impl Layout {
    pub fn new(show: &Show<'_>, area: Size, look: &Look) -> Self {
        let t = look.text;
        let rail = Rail::new(show, look);
        let (heading, head) = heading(show, area.w, look);
        let under = match (look.style, look.controls) {
            (Style::Client, _) => 3.6,
            (Style::Annotated, Controls::Hidden) => 5.8,
            (Style::Annotated, Controls::Shown) => 8.2,
        } * t;
        let e = extent(show, look.frame);
        let top = head + t * 0.6;
        let floor = (area.h - under).max(top + t * 4.0);
        // behind the body there must be room for the names of the hip, the lean and the hip arm
        let behind = match look.style {
            Style::Annotated => t * 10.8,
            Style::Client => t,
        };
        let room = (area.w - rail.width - behind - t * 2.2).max(t * 4.0);
        // what it means stands over the rail it speaks of
        let meaning = match look.style {
            // on paper the page itself says it
            Style::Annotated if look.controls == Controls::Shown => {
                fonts::wrap(&show.meaning(), t, Weight::Regular, rail.width)
            }
            _ => Vec::new(),
        };
        let over_rail = t * (1.38 * meaning.len() as f32 + 2.2);
        let rail_m = rail::top_m(show.study);
        let scale = (room / (e.front - e.back) as f32)
            .min((floor - top) / e.top as f32)
            .min((floor - top - over_rail).max(t) / rail_m as f32);
        // a figure that its width holds small stands a little higher
        let tall = (scale * e.top as f32).max(scale * rail_m as f32 + over_rail);
        let floor = floor - ((floor - top - tall) * 0.45).max(0.0);
        let column_w = rail.width;
        // centred in what is left, with the spare room shared
        let spare = (room - scale * (e.front - e.back) as f32).max(0.0);
        let back_edge = behind + spare * 0.5;
        let forward = match look.facing {
            super::Facing::Right => 1.0,
            super::Facing::Left => -1.0,
        };
        let (mut column, origin_x) = if forward > 0.0 {
            (
                RectPt::new(Pt::new(area.w - t - column_w, top), Pt::new(area.w - t, floor)),
                back_edge - scale * e.back as f32,
            )
        } else {
            (RectPt::new(Pt::new(t, top), Pt::new(t + column_w, floor)), area.w - back_edge + scale * e.back as f32)
        };
        let view = View::new(Pt::new(origin_x, floor), scale, look.facing);
        let labels = if forward > 0.0 {
            RectPt::new(Pt::new(t * 0.6, top), Pt::new(column.min.x - t * 0.3, floor - 2.0))
        } else {
            RectPt::new(Pt::new(column.max.x + t * 0.3, top), Pt::new(area.w - t * 0.6, floor - 2.0))
        };
        // clear of the name of the knee arm and of the line about the arms, wherever a descent takes them
        let arms = fonts::text_width("arms 88.8 : 1 · work shared knee 88 %, hip 88 %", t, Weight::Regular) / 2.0;
        let knee = fonts::text_width("knee arm 88 cm", t * 1.2, Weight::SemiBold) + t * 0.6;
        let aim = view.x(show.study.case.stand().support.aim_m);
        let taken = (forward * (view.x(e.knee) - aim) + knee).max(arms) + t * 0.8;
        let from_aim = if forward > 0.0 { area.w - t - aim } else { aim - t };
        let width = (rail.width + t * 1.5).min(area.w * 0.4).min(from_aim - taken).max(t * 6.0);
        let captions = captions(show, area, look, floor, width);
        let mut heading = heading;
        column.min.y = view.y(rail_m) - t * 1.2;
        for (i, text) in meaning.iter().rev().enumerate() {
            let w = Wanted { text: text.clone(), size: t, weight: Weight::Regular, role: Role::Ink };
            let y = column.min.y - t * (0.95 + 1.38 * i as f32);
            heading.push(w.at(Pt::new(column.min.x, y), Anchor::Start));
        }
        Self { view, rail, column, labels, floor: (t, area.w - t), heading, captions, text: t }
    }
}
