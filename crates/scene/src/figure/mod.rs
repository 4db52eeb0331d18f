//! The figure on its floor: a drawn body in one posture, its plumb line and support, the two arms
//! as a measuring rule, angles, and the seat-height rail.

mod angles;
mod body;
mod frame;
mod gear;
mod ground;
mod handles;
mod rail;
mod view;

use plumbfold_core::{Angle, Balance, Case, Posture, Readings, Standing, Study, readings, standing};

pub use angles::UsedUp;
pub use frame::Frame;
pub use rail::{Reached, seat_at, stretches};
pub use view::{Facing, View};

use crate::{
    fonts, format,
    geometry::{Pt, RectPt, Size},
    place::{self, Block, Placer, Wanted},
    scene::{Anchor, Label, Scene, Weight},
    shapes,
    theme::Role,
    words,
};
use frame::Layout;
use ground::Levels;

/// For whom it is drawn.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Style {
    /// With angles, arms and their numbers.
    Annotated,
    /// Large and quiet: figure, rail, one sentence.
    Client,
}

/// Whether things to grab are drawn and listed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Controls {
    /// On the desk.
    Shown,
    /// On paper.
    Hidden,
}

/// How a figure is drawn.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Look {
    /// For whom.
    pub style: Style,
    /// Which way the client faces.
    pub facing: Facing,
    /// Base font size, page units.
    pub text: f32,
    /// What must fit.
    pub frame: Frame,
    /// Things to grab.
    pub controls: Controls,
}

impl Look {
    /// For the desk: annotated, framed for the whole descent, with handles.
    #[must_use]
    pub const fn desk(text: f32, facing: Facing) -> Self {
        Self { style: Style::Annotated, facing, text, frame: Frame::WholeDescent, controls: Controls::Shown }
    }

    /// For a sheet: annotated, framed for this posture.
    #[must_use]
    pub const fn sheet(text: f32) -> Self {
        Self {
            style: Style::Annotated,
            facing: Facing::Right,
            text,
            frame: Frame::ThisPosture,
            controls: Controls::Hidden,
        }
    }

    /// For the client's view. At full HD a `text` of 34 or more.
    #[must_use]
    pub const fn client(text: f32, facing: Facing) -> Self {
        Self { style: Style::Client, facing, text, frame: Frame::WholeDescent, controls: Controls::Shown }
    }
}

/// An outline behind the figure.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Outline<'a> {
    /// Whose body.
    pub case: &'a Case,
    /// In which posture.
    pub posture: &'a Posture,
    /// What it is, such as `average lengths for this stature, same ranges`.
    pub what: &'a str,
}

/// What a figure shows.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Show<'a> {
    /// The client's case with its depths and descent.
    pub study: &'a Study,
    /// The thigh angle asked for.
    pub thigh: Angle,
    /// Its verdict.
    pub now: &'a Balance,
    /// The trunk held at another lean, in place of the balanced posture, which becomes the outline.
    pub straightened: Option<&'a Posture>,
    /// An outline behind; left out while the trunk is straightened.
    pub outline: Option<Outline<'a>>,
    /// Thigh angle from which pain starts.
    pub pain_from: Option<Angle>,
    /// Deepest thigh angle that can be shown: the end of the hip's and the rail's range.
    pub deepest: Angle,
    /// A line under the title, such as what to drag first.
    pub note: Option<&'a str>,
}

impl<'a> Show<'a> {
    /// A posture of a study with nothing beside it.
    #[must_use]
    pub fn plain(study: &'a Study, thigh: Angle, now: &'a Balance) -> Self {
        let deepest = study.descent.last().map_or(thigh, |s| s.thigh.max(thigh));
        Self { study, thigh, now, straightened: None, outline: None, pain_from: None, deepest, note: None }
    }

    /// The posture drawn: the straightened one, else the balanced one, else the deepest there is.
    #[must_use]
    pub fn shown(&self) -> Option<&'a Posture> {
        let deepest = || self.study.descent.iter().rev().find_map(|s| s.balance.posture());
        self.straightened.or_else(|| self.now.posture()).or_else(deepest)
    }

    /// How the posture drawn stands.
    fn standing(&self, p: &Posture) -> Standing {
        standing(&self.study.case, p)
    }

    /// The title for the clinician.
    #[must_use]
    pub fn title(&self) -> String {
        match self.straightened {
            Some(p) => words::clinician::straightened(p.trunk, &self.standing(p)),
            None => words::clinician::headline(self.now, self.thigh, self.study.depths.steady),
        }
    }

    /// What it means, for the clinician: how deep, as thigh angles and seat heights.
    #[must_use]
    pub fn meaning(&self) -> String {
        let case = &self.study.case;
        let with_seat = |a: Option<Angle>| a.map(|a| (a, seat_at(case, a)));
        let d = &self.study.depths;
        words::capital(&words::clinician::depths(with_seat(d.steady), with_seat(d.balance)))
    }

    /// The client's sentence.
    #[must_use]
    pub fn sentence(&self) -> String {
        match self.straightened {
            Some(p) => words::client::straightened(&self.standing(p)).to_owned(),
            None => words::client::sentence(self.now, self.now.posture().map_or(Angle::ZERO, |p| p.bend)),
        }
    }

    /// Captions under the title: what the outline is, what is estimated.
    fn captions(&self) -> Vec<String> {
        let mut out: Vec<String> = Vec::new();
        if self.straightened.is_some() {
            out.push("outline: the balanced posture".to_owned());
        } else if self.now.posture().is_none() {
            out.push("shown: the deepest posture these measures allow".to_owned());
        }
        if let Some(o) = self.outline.filter(|_| self.straightened.is_none()) {
            out.push(format!("outline: {}", o.what));
        }
        out.extend(words::clinician::estimated(&estimated_lengths(&self.study.case)).map(|s| lower_first(&s)));
        out.iter_mut().for_each(|s| *s = words::capital(s));
        out
    }
}

fn lower_first(s: &str) -> String {
    let mut c = s.chars();
    c.next().map_or_else(String::new, |f| f.to_lowercase().chain(c).collect())
}

/// Lengths of a case that come from the stature, in words.
#[must_use]
pub fn estimated_lengths(case: &Case) -> Vec<&'static str> {
    let l = &case.measures().lengths;
    let arms = [l.upper_arm_m, l.forearm_m, l.hand_m];
    let main = [("shank", l.shank_m), ("thigh", l.thigh_m), ("trunk", l.trunk_m), ("foot", l.foot_m)];
    if main.iter().all(|m| m.1.is_none()) && arms.iter().all(Option::is_none) {
        return vec!["all lengths"];
    }
    let mut out: Vec<&'static str> = main.iter().filter(|m| m.1.is_none()).map(|m| m.0).collect();
    if l.ankle_height_m.is_none() || l.heel_to_ankle_m.is_none() {
        out.push("place of the ankle");
    }
    if arms.iter().all(Option::is_none) {
        out.push("arms");
    } else {
        let part = [("upper arm", l.upper_arm_m), ("forearm", l.forearm_m), ("hand", l.hand_m)];
        out.extend(part.iter().filter(|p| p.1.is_none()).map(|p| p.0));
    }
    out
}

/// Draws the figure for an area. The view tells where the world lies on the page.
#[must_use]
pub fn figure(show: &Show<'_>, area: Size, look: &Look) -> (Scene, View) {
    let case = &show.study.case;
    let mut scene = Scene::new(area, alt(show, look));
    let layout = Layout::new(show, area, look);
    let view = layout.view;
    let t = look.text;
    for label in &layout.heading {
        scene.text(label.clone());
    }
    let Some(p) = show.shown() else {
        return (scene, view);
    };
    let edge = (t * 0.13).clamp(1.4, 5.0);
    let stands = show.standing(p);
    let r = readings(case, p);

    let levels = Levels::new(view.floor(), t);
    floor(&mut scene, &layout, edge);
    behind(&mut scene, show, &view, edge);
    ground::strip(&mut scene, &view, case, &levels);
    gear::behind(&mut scene, &view, case, p, edge);
    gear::under_foot(&mut scene, &view, case, p, edge);
    let parts = body::parts(case, p);
    let parts = if look.style == Style::Client { parts.solid() } else { parts };
    let paint = |fill| body::Paint { edge: Role::BodyEdge, edge_width: edge, fill, estimated: Role::Estimated };
    body::draw(&mut scene, &view, &parts.body, paint(Role::Body));
    let pad = seat(&mut scene, &layout, p, look);
    body::draw(&mut scene, &view, &parts.arm, paint(Role::BodyNear));
    gear::before(&mut scene, &view, case, p, edge);

    let mut placer = Placer::new(layout.labels, t * 0.25);
    for part in parts.body.iter().chain(&parts.arm) {
        placer.avoid_area(&part.area(&view, edge + 1.5), 7.0);
    }
    for part in outlined(show).iter().flat_map(|o| o.body.iter().chain(&o.arm)) {
        placer.avoid_area(&part.area(&view, edge), 3.0);
    }
    if let Some((pad, line)) = pad {
        placer.take(pad);
        placer.avoid_line(&line, 8.0);
    }
    if let Some((l, r, top)) = gear::extent(case, p) {
        let low = 2.0 * p.joints.load.y - top;
        let area = RectPt::new(Pt::new(view.x(l), view.y(top)), Pt::new(view.x(r), view.y(low)));
        placer.avoid_area(&shapes::rect(area), 25.0);
    }
    let com = view.to_page(p.com);
    ground::plumb(&mut scene, &view, p, layout.labels.min.y, &levels, (t * 0.13).clamp(1.6, 4.0));
    placer.avoid_line(&[Pt::new(com.x, layout.labels.min.y), Pt::new(com.x, view.floor())], 40.0);
    let named = match look.style {
        Style::Annotated => {
            spine(&mut scene, &view, p, edge);
            placer.avoid_line(&[view.to_page(p.joints.hip), Pt::new(view.x(p.joints.hip.x), view.floor())], 10.0);
            placer.avoid_line(&[view.to_page(p.joints.knee), Pt::new(view.x(p.joints.knee.x), view.floor())], 10.0);
            angles::draw(&mut scene, &view, case, p, t)
        }
        Style::Client => Vec::new(),
    };
    if look.style == Style::Annotated {
        ground::rule(&mut scene, &view, p, &r, &levels, t, RectPt::page(area).grown(-t * 0.6));
        under_rule(&mut scene, show, &layout, p, &r, &levels);
    }
    handles::draw(&mut scene, show, &view, p, look, &mut placer);
    let radius = (t * 0.62).max(view.length(0.022));
    ground::com_mark(&mut scene, com, radius);
    placer.take(RectPt { min: com, max: com }.grown(radius + 1.5));

    let (bar, pain) = layout.rail.draw(&mut scene, &view, layout.column, look);
    handles::rail(&mut scene, show, &view, bar, pain, look);
    for n in &named {
        write(&mut scene, &mut placer, n);
    }
    load_name(&mut scene, &mut placer, show, &view, p, look);
    let gap = ground::gap(&mut scene, &view, case, p, &stands, &levels, t);
    if let (Some((wanted, at)), Style::Annotated) = (gap, look.style) {
        let away = (at.x - view.x(case.stand().support.aim_m)).signum();
        let anchor = if away < 0.0 { Anchor::End } else { Anchor::Start };
        let label = wanted.at(at + Pt::new(away * t * 0.9, t * 0.34), anchor);
        let page = RectPt::page(area);
        if page.holds(&label.bounds()) && !scene.labels().any(|l| l.bounds().meets(&label.bounds())) {
            scene.text(label);
        }
    }
    captions(&mut scene, &layout);
    (scene, view)
}

/// Captions in their corner, each line moved down past anything that already stands there.
fn captions(scene: &mut Scene, layout: &Layout) {
    let mut down = 0.0;
    for caption in &layout.captions {
        let mut label = caption.clone();
        label.baseline.y += down;
        while let Some(under) =
            scene.labels().map(Label::bounds).filter(|b| b.meets(&label.bounds())).reduce(|a, b| a.around(&b))
        {
            let step = under.max.y + 1.0 - label.bounds().min.y;
            label.baseline.y += step;
            down += step;
        }
        if RectPt::page(scene.size).holds(&label.bounds()) {
            scene.text(label);
        }
    }
}

fn floor(scene: &mut Scene, layout: &Layout, edge: f32) {
    let y = layout.view.floor();
    scene.line([Pt::new(layout.floor.0, y), Pt::new(layout.floor.1, y)], edge, Role::BodyEdge);
}

/// The seat that touches at this depth: a pad under the hip and a thin line to the rail. Returns
/// where it lies.
fn seat(scene: &mut Scene, layout: &Layout, p: &Posture, look: &Look) -> Option<(RectPt, [Pt; 2])> {
    let (view, t) = (&layout.view, look.text);
    if p.seat_height_m <= 0.0 || p.thigh.deg() < 15.0 {
        return None;
    }
    let y = view.y(p.seat_height_m);
    let middle = view.x(p.joints.hip.x - 0.04);
    let half = view.length(0.13);
    let pad = RectPt::at(middle - half, y, 2.0 * half, (t * 0.36).max(view.length(0.014)));
    let near = if view.forward() > 0.0 { pad.max.x } else { pad.min.x };
    let far = if view.forward() > 0.0 { layout.column.min.x } else { layout.column.max.x };
    let line = [Pt::new(near, y + 1.0), Pt::new(far, y + 1.0)];
    let k = t / 13.0;
    for d in shapes::dashes(&line, 2.0 * k, 5.0 * k) {
        scene.line(d, 1.2 * k, Role::Gear);
    }
    scene.fill(shapes::rounded(pad, 3.0), Role::Gear);
    Some((pad, line))
}

/// The body of the outline, where there is one.
fn outlined(show: &Show<'_>) -> Option<body::Figure> {
    let balanced = show.straightened.and_then(|_| show.now.posture()).map(|p| (&show.study.case, p));
    let other = show.outline.filter(|_| show.straightened.is_none()).map(|o| (o.case, o.posture));
    let (case, p) = balanced.or(other)?;
    Some(body::parts(case, p).solid())
}

/// The outline behind the figure.
fn behind(scene: &mut Scene, show: &Show<'_>, view: &View, edge: f32) {
    let balanced = show.straightened.and_then(|_| show.now.posture()).map(|p| (&show.study.case, p));
    let other = show.outline.filter(|_| show.straightened.is_none()).map(|o| (o.case, o.posture));
    let Some((case, p)) = balanced.or(other) else { return };
    let parts = body::parts(case, p).solid();
    let paint = body::Paint { edge: Role::Outline, edge_width: edge * 0.85, fill: Role::Paper, estimated: Role::Paper };
    body::draw(scene, view, &parts.body, paint);
    body::draw(scene, view, &parts.arm, paint);
}

/// Bone lines of legs and trunk, on which the angles are read.
fn spine(scene: &mut Scene, view: &View, p: &Posture, edge: f32) {
    let j = &p.joints;
    let legs = [j.ankle, j.knee, j.hip].map(|q| view.to_page_above_floor(q));
    scene.line(legs, edge * 0.6, Role::BodyEdge);
    let back = [j.hip, j.lumbosacral, j.shoulder].map(|q| view.to_page_above_floor(q));
    scene.line(back, edge * 0.9, Role::Back);
    scene.fill(shapes::circle(view.to_page(j.lumbosacral), edge * 1.7), Role::Back);
}

/// The line under the rule: ratio of the arms and how the work is shared.
fn under_rule(scene: &mut Scene, show: &Show<'_>, layout: &Layout, p: &Posture, r: &Readings, levels: &Levels) {
    let t = layout.text;
    let mut said: Vec<String> = Vec::new();
    if let Some(ratio) = r.ratio.filter(|q| *q > 0.0 && *q < 20.0) {
        said.push(format!("arms {}", format::ratio(Some(ratio))));
    }
    if !show.study.case.figure_only() {
        said.extend(words::clinician::work_shared(&r.moments_nm));
    }
    if said.is_empty() {
        return;
    }
    let wanted = Wanted { text: said.join(" · "), size: t, weight: Weight::Regular, role: Role::Ink };
    let names = ground::names(&layout.view, p, r, levels, t, RectPt::page(scene.size).grown(-t * 0.6));
    let low = names.iter().map(|n| n.1.max.y).fold(levels.rule.1, f32::max);
    let half = fonts::text_width(&wanted.text, t, Weight::Regular) / 2.0;
    let x = layout.view.x(p.com.x).max(half + t).min(scene.size.w - half - t);
    scene.text(wanted.at(Pt::new(x, low + t * 1.35), Anchor::Middle));
}

/// Places a label; where it had to go far, a thin line leads back.
fn write(scene: &mut Scene, placer: &mut Placer, n: &angles::Named) {
    let Some(labels) = placer.place(place::around(&n.text, n.target, n.wish, n.near)) else { return };
    let (Some(b), Some(first)) = (labels.iter().map(Label::bounds).reduce(|a, b| a.around(&b)), labels.first()) else {
        return;
    };
    if placer.wants_plate(&b) {
        scene.fill(shapes::rect(b.grown(1.5)), Role::Paper);
    }
    let nearest = Pt::new(n.target.x.clamp(b.min.x, b.max.x), n.target.y.clamp(b.min.y, b.max.y));
    if nearest.distance(n.target) > n.near + first.size * 1.6 {
        let start = n.target.toward(nearest, (n.near * 0.9 / nearest.distance(n.target)).min(0.8));
        scene.line([start, nearest.toward(start, 0.1)], 1.0, first.role);
    }
    for label in labels {
        scene.text(label);
    }
}

/// Names of load and wedge, where there are any.
fn load_name(scene: &mut Scene, placer: &mut Placer, show: &Show<'_>, view: &View, p: &Posture, look: &Look) {
    if look.style == Style::Client {
        return;
    }
    let (task, t) = (show.study.case.task(), look.text);
    let wanted = |text: String| Wanted { text, size: t, weight: Weight::Regular, role: Role::InkSoft };
    let raise: Vec<Wanted> = [("wedge", task.heel_raise_m), ("shoe heel", task.footwear_drop_m)]
        .into_iter()
        .filter(|w| w.1 > 0.0)
        .map(|(what, m)| wanted(format!("{what} {}", format::mm(m))))
        .collect();
    if task.load_kg > 0.0 {
        let text = Block::line(wanted(format::kg(task.load_kg)));
        let target = view.to_page(p.joints.load);
        let wish = Pt::new(view.forward(), -0.8);
        let reach = gear::extent(&show.study.case, p).map_or(0.05, |(l, r, _)| (r - l) / 2.0);
        write(scene, placer, &angles::Named { text, target, wish, near: view.length(reach) + t * 0.5 });
    }
    if !raise.is_empty() {
        let target = view.to_page(p.joints.heel);
        let wish = Pt::new(-view.forward(), -0.15);
        write(scene, placer, &angles::Named { text: Block { lines: raise }, target, wish, near: t * 1.2 });
    }
}

/// The picture in words.
fn alt(show: &Show<'_>, look: &Look) -> String {
    let Some(p) = show.shown() else { return show.title() };
    let seat = format::cm(p.seat_height_m.max(0.0));
    match look.style {
        Style::Client => format!("{} Seat height {seat}.", show.sentence()),
        Style::Annotated => {
            let r = readings(&show.study.case, p);
            format!(
                "{}. Thigh {}, shank {}, lean {}, knee {}, hip {}; hip arm {}, knee arm {}; seat height {seat}. {}.",
                show.title().trim_end_matches('.'),
                format::deg(p.thigh),
                format::deg(p.shank),
                format::deg(p.trunk),
                format::deg(p.knee_flexion),
                format::deg(p.hip_flexion),
                format::cm(r.hip_arm_m),
                format::cm(r.knee_arm_m),
                show.meaning(),
            )
        }
    }
}
