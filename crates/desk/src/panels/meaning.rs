//! The right side: what it means, in the order a clinician asks.

use egui::{RichText, Sense, Ui, vec2};
use plumbfold_core::{Angle, Balance, Step, Study, posture, posture_notices, seen::depth_that_suits};
use plumbfold_scene::{
    Role, Theme, Weight, format,
    words::{clinician, notices},
};

use crate::{
    action::{Action, ViewChange},
    computed::Results,
    fields::left,
    painter::{color, font},
    panels::why,
    state::State,
};

/// What the right side needs.
pub struct Meaning<'a> {
    /// The desk.
    pub state: &'a State,
    /// What was computed.
    pub results: &'a Results,
    /// The study shown: the client's, or that of a change tried.
    pub shown: &'a Study,
    /// The posture of that study at the depth shown.
    pub now: &'a Step,
    /// Colours.
    pub theme: Theme,
}

/// Shows the right side.
pub fn show(ui: &mut Ui, m: &Meaning<'_>, out: &mut Vec<Action>) {
    demonstration(ui, m, out);
    why::show(ui, m, out);
    depths(ui, m, out);
    at_this_depth(ui, m);
    demands(ui, m);
    told(ui, m);
}

pub(super) fn heading(ui: &mut Ui, title: &str) {
    ui.add_space(8.0);
    ui.label(RichText::new(title).font(font(14.0, Weight::SemiBold)));
}

pub(super) fn soft(ui: &mut Ui, m: &Meaning<'_>, text: impl Into<String>) {
    ui.label(RichText::new(text).small().color(color(m.theme, Role::InkSoft)));
}

fn demonstration(ui: &mut Ui, m: &Meaning<'_>, out: &mut Vec<Action>) {
    let (Some(lean), Some(p)) = (m.state.view.straighten, m.now.balance.posture()) else { return };
    let Some((_, standing)) = m.results.straightened(p, lean) else { return };
    heading(ui, "Trunk held");
    ui.label(clinician::straightened(lean, &standing));
    if ui.button("Back to balance").clicked() {
        out.push(Action::View(ViewChange::Straighten(None)));
    }
}

/// The pain mark of the squat seen.
pub(super) fn pain_from(m: &Meaning<'_>) -> Option<Angle> {
    m.state.doc.task().seen.and_then(|s| s.pain_from_thigh_deg).map(Angle::from_deg)
}

/// Seat height at a depth by the task's rule, m.
fn seat(m: &Meaning<'_>, thigh: Option<Angle>) -> Option<(Angle, Option<f64>)> {
    thigh.map(|a| (a, posture(&m.results.study.case, a).posture().map(|p| p.seat_height_m)))
}

fn depths(ui: &mut Ui, m: &Meaning<'_>, out: &mut Vec<Action>) {
    heading(ui, "How deep");
    let d = &m.results.study.depths;
    ui.label(plumbfold_scene::words::capital(&clinician::depths(seat(m, d.steady), seat(m, d.balance))));
    let goal = m.results.study.case.task().goal;
    ui.horizontal_wrapped(|ui| {
        for (label, deg) in
            [("to mid-foot end", d.steady.map(Angle::deg)), ("to the goal", Some(goal.deg())), ("stand", Some(0.0))]
        {
            let Some(deg) = deg else { continue };
            if ui.link(label).clicked() {
                out.push(Action::View(ViewChange::Depth(deg)));
            }
        }
    });
    if let Some(s) = depth_that_suits(&m.results.study.case, pain_from(m)) {
        let p = &s.posture;
        let why = if s.by_pain { "at the pain mark" } else { "deepest on mid-foot within what we chose" };
        ui.label(format!(
            "A depth that suits: thigh {}, knee {}, seat {}",
            format::deg(p.thigh),
            format::deg(p.knee_flexion),
            format::cm(p.seat_height_m)
        ));
        soft(ui, m, why);
    }
}

fn line(ui: &mut Ui, name: &str, value: &str) {
    ui.horizontal(|ui| {
        ui.label(name);
        ui.with_layout(egui::Layout::right_to_left(egui::Align::Center), |ui| {
            ui.label(RichText::new(value).font(font(13.0, Weight::SemiBold)));
        });
    });
}

fn at_this_depth(ui: &mut Ui, m: &Meaning<'_>) {
    heading(ui, "At this depth");
    let (Some(p), Some(r)) = (m.now.balance.posture(), m.now.readings.as_ref()) else {
        if let Balance::Refused(why) = m.now.balance {
            ui.label(plumbfold_scene::words::capital(notices::refusal(why)));
        }
        return;
    };
    line(ui, "Thigh angle", &format::deg(p.thigh));
    line(ui, "Knee flexion", &format::deg(p.knee_flexion));
    line(ui, "Seat height", &format::cm(p.seat_height_m));
    line(ui, "Trunk lean", &format::deg(p.trunk));
    line(ui, "Shank", &format::deg(p.shank));
    line(ui, "Ankle dorsiflexion", &format::deg(p.ankle));
    line(ui, "Hip flexion", &format::deg(p.hip_flexion));
    line(ui, "Bend beyond the hip", &format::deg(p.bend));
    line(ui, "Hip arm, knee arm", &format!("{}, {}", format::cm(r.hip_arm_m), format::cm(r.knee_arm_m)));
    if let Some(text) = clinician::arms(r.ratio) {
        soft(ui, m, text);
    }
}

fn demands(ui: &mut Ui, m: &Meaning<'_>) {
    let Some(r) = m.now.readings.as_ref() else { return };
    let case = &m.shown.case;
    if case.figure_only() {
        soft(ui, m, notices::FIGURE_ONLY);
        return;
    }
    heading(ui, "Work required, N·m");
    let peak = m
        .shown
        .descent
        .iter()
        .filter_map(|s| s.readings.as_ref())
        .map(|r| r.moments_nm.low_back.max(r.moments_nm.hip).max(r.moments_nm.knee))
        .fold(1.0, f64::max);
    for (name, nm, effort, stretched, role) in [
        ("Knee, each", r.moments_nm.knee, r.effort.knee, r.stretched.knee, Role::Knee),
        ("Hip, each", r.moments_nm.hip, r.effort.hip, r.stretched.hip, Role::Hip),
        ("Low back", r.moments_nm.low_back, r.effort.low_back, false, Role::Back),
        ("Ankle, each", r.moments_nm.ankle, r.effort.ankle, false, Role::Ankle),
    ] {
        ui.horizontal(|ui| {
            left(ui, 74.0, |ui| ui.label(name));
            bar(ui, (nm / peak).clamp(0.0, 1.0) as f32, role, stretched, m.theme);
            ui.label(RichText::new(format::number(nm, 0)).font(font(13.0, Weight::SemiBold)));
            if effort <= 1.0 {
                ui.label(RichText::new(clinician::effort(effort)).small().color(color(m.theme, Role::InkSoft)));
            }
        });
        if effort > 1.0 {
            // too long to stand in the row
            soft(ui, m, format!("{name} {}", clinician::effort(effort)));
        }
    }
    if let Some(text) = clinician::work_shared(&r.moments_nm) {
        ui.label(plumbfold_scene::words::capital(&text));
    }
    if r.stretched.knee || r.stretched.hip {
        soft(ui, m, "Hatched: bent beyond the angles over which strength was measured.");
    }
    soft(ui, m, notices::NET_MOMENTS_CAUTION);
}

fn bar(ui: &mut Ui, share: f32, role: Role, stretched: bool, theme: Theme) {
    let (rect, _) = ui.allocate_exact_size(vec2(80.0, 12.0), Sense::hover());
    let p = ui.painter();
    p.rect_filled(rect, 3.0, color(theme, Role::FieldBg));
    let filled = egui::Rect::from_min_size(rect.min, vec2(rect.width() * share, rect.height()));
    p.rect_filled(filled, 3.0, color(theme, role));
    if stretched {
        let area = plumbfold_scene::shapes::rect(plumbfold_scene::RectPt::at(
            filled.min.x,
            filled.min.y,
            filled.width(),
            filled.height(),
        ));
        for l in plumbfold_scene::shapes::hatch(&area, 5.0) {
            let [a, b] = [l[0], l[1]];
            p.line_segment(
                [egui::pos2(a.x, a.y), egui::pos2(b.x, b.y)],
                egui::Stroke::new(1.2, color(theme, Role::FieldBg)),
            );
        }
    }
}

fn told(ui: &mut Ui, m: &Meaning<'_>) {
    let mut all = m.results.notices.clone();
    if let Some(p) = m.now.balance.posture() {
        all.extend(posture_notices(&m.shown.case, p));
    }
    if m.results.study.depths.steady.is_none() {
        all.push(plumbfold_core::Notice::NoSteadyStanding);
    }
    if !all.is_empty() {
        heading(ui, "To know");
        for n in &all {
            ui.label(RichText::new(format!("• {}", notices::notice(n))).small());
        }
    }
    ui.add_space(8.0);
    soft(ui, m, notices::LEFT_OUT);
}
