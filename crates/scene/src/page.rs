//! The annotated page for the record: the figure with its rail, and beside it what it means, the
//! angles and demands at this depth, what was measured, the set-up, and the cautions.

use plumbfold_core::{Bend, Case, Notice, Origin, Posture, Rule, balance::Balance, posture_notices, readings};

use crate::{
    figure::{Look, Show, UsedUp, figure},
    fonts, format,
    geometry::{Pt, RectPt, Size},
    place::Wanted,
    scene::{Anchor, Scene, Weight},
    shapes,
    theme::Role,
    words,
};

/// What a page shows.
#[derive(Clone, Copy, Debug)]
pub struct Page<'a> {
    /// The client's code; never a name.
    pub code: &'a str,
    /// Date of the visit, as it is to be read.
    pub date: &'a str,
    /// Which visit, from 1.
    pub visit: usize,
    /// Name of the task.
    pub task: &'a str,
    /// The figure.
    pub show: Show<'a>,
    /// Notices of the case; those of the posture are added.
    pub notices: &'a [Notice],
}

/// Width of a landscape A4 page, page units.
pub const WIDTH: f32 = 1123.0;
/// Its height; a page with much to say is taller.
pub const HEIGHT: f32 = 794.0;
/// Margin on all sides.
const MARGIN: f32 = 36.0;
/// Width of the text column.
const COLUMN: f32 = 336.0;
/// Font size of the text column.
const TEXT: f32 = 11.5;

/// How a value came to be; each kind looks different.
#[derive(Clone, Copy, PartialEq)]
enum Kind {
    Measured,
    Estimated,
    Assumed,
    Precaution,
    Plain,
}

struct Row {
    name: String,
    value: String,
    kind: Kind,
    role: Role,
}

fn row(name: &str, value: String) -> Row {
    Row { name: name.to_owned(), value, kind: Kind::Plain, role: Role::Ink }
}

/// Draws the page on light paper.
#[must_use]
pub fn sheet_page(page: &Page<'_>) -> Scene {
    let show = &page.show;
    let mut column = Column { scene: Scene::new(Size::default(), ""), y: 0.0 };
    means(&mut column, show);
    let case = &show.study.case;
    if let Some(p) = show.shown() {
        column.head_pair("At this depth", "Measured");
        let measured: Vec<Row> = measured_rows(case).into_iter().chain(range_rows(case)).collect();
        column.tables(&depth_rows(case, p), &measured);
        if !case.figure_only() {
            column.head("Work required at this depth, N·m");
            column.work(case, p);
        }
    }
    column.head("Set-up");
    column.paragraph(&setup(case), Role::Ink);
    let mut notices: Vec<String> = page.notices.iter().map(words::notices::notice).collect();
    notices
        .extend(show.shown().map(|p| posture_notices(case, p)).unwrap_or_default().iter().map(words::notices::notice));
    if !notices.is_empty() {
        column.head("Good to know");
        for n in &notices {
            column.paragraph(n, Role::Ink);
        }
    }
    let foot = foot_lines(case);
    let foot_h = foot.len() as f32 * 14.0 + 10.0;
    let top = MARGIN + 26.0;
    let height = HEIGHT.max(top + column.y + foot_h + MARGIN);
    let size = Size::new(WIDTH, height);

    let body = Size::new(WIDTH - 2.0 * MARGIN - COLUMN - 22.0, height - top - foot_h - MARGIN + 6.0);
    let (drawn, _) = figure(show, body, &Look::sheet(13.5));
    let mut scene = Scene::new(size, format!("{} {}: {}", page.code, page.date, drawn.alt));
    head(&mut scene, page);
    scene.place(drawn, Pt::new(MARGIN - 10.0, top - 8.0));
    let x = WIDTH - MARGIN - COLUMN;
    scene.line([Pt::new(x - 14.0, top), Pt::new(x - 14.0, height - foot_h - MARGIN)], 1.0, Role::Border);
    scene.place(column.scene, Pt::new(x, top));
    for (i, line) in foot.iter().rev().enumerate() {
        let w = Wanted { text: line.clone(), size: 10.5, weight: Weight::Regular, role: Role::InkSoft };
        scene.text(w.at(Pt::new(MARGIN, height - MARGIN + 4.0 - 14.0 * i as f32), Anchor::Start));
    }
    scene
}

fn head(scene: &mut Scene, page: &Page<'_>) {
    let y = MARGIN + 4.0;
    let code = Wanted { text: page.code.to_owned(), size: 14.0, weight: Weight::SemiBold, role: Role::Ink };
    let code = code.at(Pt::new(MARGIN, y), Anchor::Start);
    let after = code.bounds().max.x + 12.0;
    scene.text(code);
    let text = format!("{} · visit {} · {}", page.date, page.visit, page.task);
    let said = Wanted { text, size: 12.0, weight: Weight::Regular, role: Role::InkSoft };
    scene.text(said.at(Pt::new(after, y), Anchor::Start));
    let name = Wanted { text: "Plumbfold".to_owned(), size: 12.0, weight: Weight::SemiBold, role: Role::InkSoft };
    scene.text(name.at(Pt::new(WIDTH - MARGIN, y), Anchor::End));
    scene.line([Pt::new(MARGIN, y + 9.0), Pt::new(WIDTH - MARGIN, y + 9.0)], 1.0, Role::Border);
}

fn foot_lines(case: &Case) -> Vec<String> {
    let mut said = vec![words::CAUTION];
    if !case.figure_only() {
        said.push(words::notices::NET_MOMENTS_CAUTION);
    }
    said.push(words::notices::LEFT_OUT);
    fonts::wrap(&said.join(" "), 10.5, Weight::Regular, WIDTH - 2.0 * MARGIN)
}

/// What it means, in sentences.
fn means(column: &mut Column, show: &Show<'_>) {
    column.head("What it means");
    column.paragraph(&format!("{}.", show.meaning()), Role::Ink);
    let case = &show.study.case;
    if let (Some(p), Balance::Stands { .. }) = (show.shown(), show.now) {
        if let Some(used) = UsedUp::of(case, p).words() {
            column.paragraph(&format!("{used} at this depth."), Role::Ink);
        }
        if let Some(arms) = words::clinician::arms(readings(case, p).ratio) {
            column.paragraph(&format!("{}.", words::capital(&arms)), Role::Ink);
        }
    }
    if let Some(seen) = case.task().seen {
        let said = words::clinician::seen_and_computed(show.study.depths.steady, seen.thigh);
        column.paragraph(&said, Role::Ink);
    }
}

fn depth_rows(case: &Case, p: &Posture) -> Vec<Row> {
    let coloured = |name, value, role| Row { role, ..row(name, value) };
    let r = readings(case, p);
    vec![
        row("Thigh", format::deg(p.thigh)),
        row("Seat height", format::cm(p.seat_height_m.max(0.0))),
        coloured("Trunk lean", format::deg(p.trunk), Role::Back),
        coloured("Bend beyond the hip", format::deg(p.bend), Role::Back),
        coloured("Shank", format::deg(p.shank), Role::Ankle),
        coloured("Ankle", format::deg(p.ankle), Role::Ankle),
        coloured("Knee flexion", format::deg(p.knee_flexion), Role::Knee),
        coloured("Hip flexion", format::deg(p.hip_flexion), Role::Hip),
        coloured("Knee arm", format::cm(r.knee_arm_m), Role::Knee),
        coloured("Hip arm", format::cm(r.hip_arm_m), Role::Hip),
    ]
}

fn measured_rows(case: &Case) -> Vec<Row> {
    let (m, l, body) = (case.measures(), &case.measures().lengths, &case.body().landmarks);
    let length = |name: &str, measured: Option<f64>, used: f64| Row {
        kind: if measured.is_some() { Kind::Measured } else { Kind::Estimated },
        ..row(name, format::cm_fine(used))
    };
    let given = |name, value| Row { kind: Kind::Measured, ..row(name, value) };
    vec![
        given("Stature", format::cm_fine(m.stature_m)),
        given("Mass", format::kg(m.mass_kg)),
        length("Shank", l.shank_m, body.shank_m),
        length("Thigh", l.thigh_m, body.thigh_m),
        length("Trunk", l.trunk_m, body.trunk_m),
        length("Foot", l.foot_m, body.foot_m),
        length("Upper arm", l.upper_arm_m, body.upper_arm_m),
        length("Forearm", l.forearm_m, body.forearm_m),
    ]
}

fn range_rows(case: &Case) -> Vec<Row> {
    let l = case.limits();
    let range = |name: &str, a, from| Row {
        kind: match from {
            Origin::Measured => Kind::Measured,
            Origin::Assumed => Kind::Assumed,
            Origin::Precaution => Kind::Precaution,
        },
        ..row(name, format::deg(a))
    };
    vec![
        range("Ankle range", l.ankle, l.ankle_from),
        range("Hip range", l.hip, l.hip_from),
        range("Knee range", l.knee, l.knee_from),
    ]
}

/// The set-up as one sentence.
fn setup(case: &Case) -> String {
    let t = case.task();
    let mut said = vec![words::capital(words::names::placement(t.placement))];
    said.push(if t.load_kg > 0.0 { format::kg(t.load_kg) } else { "no load".to_owned() });
    if t.footwear_drop_m > 0.0 {
        said.push(format!("shoe heel {}", format::mm(t.footwear_drop_m)));
    }
    if t.heel_raise_m > 0.0 {
        said.push(format!("wedge {}", format::mm(t.heel_raise_m)));
    }
    said.push(format!("stance {}", format::cm(2.0 * case.stand().half_stance_m)));
    if t.toe_out.deg().abs() >= 0.5 {
        said.push(format!("toes out {}", format::deg(t.toe_out)));
    }
    said.push(match t.bend {
        Bend::KeepSmall => "back kept nearly still".to_owned(),
        Bend::KeepSome => "back may bend some".to_owned(),
        Bend::Free => "back may bend freely".to_owned(),
        Bend::Degrees(a) => format!("back may bend {}", format::deg(a)),
    });
    if let Some(a) = t.lean_limit {
        said.push(format!("lean we choose to stay within {}", format::deg(a)));
    }
    match t.rule {
        Rule::Usual { .. } => {}
        Rule::LeastEffort => said.push("posture of least effort".to_owned()),
        Rule::ArmRatio(r) => said.push(format!("arms nearest to {}", format::ratio(Some(r)))),
        Rule::HeldShank(a) => said.push(format!("shank held at {}", format::deg(a))),
    }
    format!("{}; goal {}.", said.join(", "), format::deg(t.goal))
}

/// The text column, filled from the top.
struct Column {
    scene: Scene,
    y: f32,
}

impl Column {
    fn write(&mut self, text: &str, x: f32, weight: Weight, role: Role, anchor: Anchor, size: f32) {
        let w = Wanted { text: text.to_owned(), size, weight, role };
        self.scene.text(w.at(Pt::new(x, self.y), anchor));
    }

    fn head(&mut self, text: &str) {
        self.y += TEXT * 1.75;
        self.write(text, 0.0, Weight::SemiBold, Role::Ink, Anchor::Start, TEXT * 1.1);
        self.y += TEXT * 0.35;
    }

    fn head_pair(&mut self, left: &str, right: &str) {
        self.y += TEXT * 1.75;
        self.write(left, 0.0, Weight::SemiBold, Role::Ink, Anchor::Start, TEXT * 1.1);
        self.write(right, SECOND, Weight::SemiBold, Role::Ink, Anchor::Start, TEXT * 1.1);
        self.y += TEXT * 0.35;
    }

    fn paragraph(&mut self, text: &str, role: Role) {
        for line in fonts::wrap(text, TEXT, Weight::Regular, COLUMN) {
            self.y += TEXT * 1.32;
            self.write(&line, 0.0, Weight::Regular, role, Anchor::Start, TEXT);
        }
        self.y += TEXT * 0.25;
    }

    /// Two tables side by side.
    fn tables(&mut self, left: &[Row], right: &[Row]) {
        for i in 0..left.len().max(right.len()) {
            self.y += TEXT * 1.36;
            for (rows, x) in [(left, 0.0), (right, SECOND)] {
                if let Some(r) = rows.get(i) {
                    self.row(r, x);
                }
            }
        }
    }

    /// Demands with a bar against what a typical untrained adult can do; hatched where the fit of
    /// that capacity is stretched.
    fn work(&mut self, case: &Case, p: &Posture) {
        let r = readings(case, p);
        let (m, e, s) = (r.moments_nm, r.effort, r.stretched);
        for (name, nm, effort, stretched, role) in [
            ("Ankle, each", m.ankle, e.ankle, s.ankle, Role::Ankle),
            ("Knee, each", m.knee, e.knee, s.knee, Role::Knee),
            ("Hip, each", m.hip, e.hip, s.hip, Role::Hip),
            ("Low back", m.low_back, e.low_back, s.low_back, Role::Back),
        ] {
            self.y += TEXT * 1.42;
            self.write(name, 0.0, Weight::Regular, role, Anchor::Start, TEXT);
            let track = RectPt::at(BAR.0, self.y - TEXT * 0.72, BAR.1 - BAR.0, TEXT * 0.72);
            self.scene.fill(shapes::rect(track), Role::FieldBg);
            let full = (effort.clamp(0.0, 1.0) as f32) * track.w();
            let bar = shapes::rect(RectPt::at(track.min.x, track.min.y, full, track.h()));
            if stretched {
                for l in shapes::hatch(&bar, 4.0) {
                    self.scene.line(l, 1.6, role);
                }
                self.scene.line(shapes::outline(&bar), 1.0, role);
            } else {
                self.scene.fill(bar, role);
            }
            self.scene.line(shapes::outline(&shapes::rect(track)), 0.8, Role::Border);
            self.write(&format::number(nm, 0), BAR.1 + 36.0, Weight::SemiBold, Role::Ink, Anchor::End, TEXT);
            // a demand the other way asks nothing of the extensors
            let word = if nm > 0.0 { words::clinician::effort(effort) } else { "none" };
            self.write(word, BAR.1 + 46.0, Weight::Regular, Role::Ink, Anchor::Start, TEXT);
        }
        self.y += TEXT * 0.2;
        self.paragraph(
            "Bars: share of what a typical untrained adult can do; hatched where that is stretched.",
            Role::InkSoft,
        );
    }

    fn row(&mut self, r: &Row, x: f32) {
        self.write(&r.name, x, Weight::Regular, r.role, Anchor::Start, TEXT);
        let (value, weight, role) = match r.kind {
            Kind::Measured => (r.value.clone(), Weight::SemiBold, Role::Ink),
            Kind::Estimated => (format!("{} estimated", r.value), Weight::Regular, Role::InkSoft),
            Kind::Assumed => (format!("{} assumed", r.value), Weight::Regular, Role::InkSoft),
            Kind::Precaution => (format!("{} precaution", r.value), Weight::SemiBold, Role::Warn),
            Kind::Plain => (r.value.clone(), Weight::Regular, Role::Ink),
        };
        let right = if x > 0.0 { COLUMN } else { FIRST };
        self.write(&value, right, weight, role, Anchor::End, TEXT);
    }
}

/// Right edge of the first of two tables side by side.
const FIRST: f32 = 150.0;
/// Left edge of the second.
const SECOND: f32 = 166.0;
/// Ends of the bars of work required.
const BAR: (f32, f32) = (74.0, 148.0);

#[cfg(test)]
mod tests {
    use super::*;
    use crate::measure::{out_of_page, overlaps};
    use plumbfold_core::{Angle, Scope, posture, sample, study};

    #[test]
    fn nothing_overlaps_or_leaves_the_page_and_cautions_stand_there() {
        let (mut m, mut t) = sample::long_thigh_woman();
        t.load_kg = 12.0;
        for scope in [Vec::new(), vec![Scope::Osteoporosis, Scope::RecentSurgery], vec![Scope::Pregnant]] {
            m.scope = scope;
            m.age_years = None;
            let (case, notices) = Case::new(&m, &t).expect("valid");
            let s = study(&case);
            for deg in [0.0, 30.0, 76.0, 95.0, 120.0] {
                let thigh = Angle::from_deg(deg);
                let now = posture(&case, thigh);
                let page = Page {
                    code: "demo-long-thigh",
                    date: "3 Nov 2026",
                    visit: 2,
                    task: "main",
                    show: Show::plain(&s, thigh, &now),
                    notices: &notices,
                };
                let scene = sheet_page(&page);
                assert!(overlaps(&scene).is_empty(), "{deg}: {:?}", overlaps(&scene));
                assert!(out_of_page(&scene).is_empty(), "{deg}: {:?}", out_of_page(&scene));
                let all: String = scene.labels().map(|l| format!("{} ", l.text)).collect();
                for part in ["demo-long-thigh", "3 Nov 2026", "not a diagnosis", "hip arm", "seat"] {
                    assert!(all.contains(part), "{part}");
                }
                assert_eq!(all.contains("N·m"), !case.figure_only());
            }
        }
    }
}
