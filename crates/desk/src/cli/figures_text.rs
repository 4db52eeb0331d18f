//! The figures as aligned lines for a person.

use std::fmt::Write as _;

use plumbfold_core::{Angle, Case, Step};
use plumbfold_scene::{
    format,
    words::{
        clinician,
        notices::{NET_MOMENTS_CAUTION, STANDING_CAUTION},
    },
};

use super::{choose::Chosen, figures::Figures};

/// Width of the first column, characters.
const LABEL: usize = 22;
/// Width of a number with its unit, characters.
const VALUE: usize = 12;

/// Lines of a label and what it says.
#[derive(Default)]
struct Lines(String);

impl Lines {
    fn title(&mut self, title: &str) {
        if !self.0.is_empty() {
            self.0.push('\n');
        }
        self.add(format_args!("{title}"));
    }

    fn says(&mut self, label: &str, what: &str) {
        self.add(format_args!("  {label:<LABEL$}{what}"));
    }

    fn number(&mut self, label: &str, value: &str) {
        self.add(format_args!("  {label:<LABEL$}{value:>VALUE$}"));
    }

    fn add(&mut self, line: std::fmt::Arguments<'_>) {
        // Writing to a String cannot fail.
        let _ = writeln!(self.0, "{line}");
    }
}

fn degrees(deg: f64) -> String {
    format!("{}°", format::number(deg, 1))
}

/// All figures, in the order a clinician asks.
pub fn text(chosen: &Chosen, case: &Case, figures: &Figures) -> String {
    let mut lines = Lines::default();
    let visits = chosen.client.visits.len();
    let date = chosen.client.visits.get(chosen.visit).map(|visit| visit.date.to_string()).unwrap_or_default();
    lines.title(&format!("{}, visit {} of {visits} ({date}), task {}", figures.code, figures.visit, figures.task));
    let step = Step::at(case, Angle::from_deg(chosen.thigh_deg));
    let steady = figures.steady_depth_deg.map(Angle::from_deg);
    lines.says(
        &format!("at thigh {}", degrees(figures.thigh_deg)),
        &clinician::headline(&step.balance, step.thigh, steady),
    );
    lines.says("steady on mid-foot", &depth(case, figures.steady_depth_deg));
    lines.says("in balance", &depth(case, figures.balance_depth_deg));
    posture(&mut lines, figures);
    demands(&mut lines, figures);
    body(&mut lines, figures);
    if !figures.notices.is_empty() {
        lines.title("To know");
        for notice in &figures.notices {
            lines.add(format_args!("  {notice}"));
        }
    }
    lines.title(STANDING_CAUTION);
    lines.0
}

fn depth(case: &Case, deg: Option<f64>) -> String {
    let Some(deg) = deg else { return "to no depth".to_owned() };
    let seat = Step::at(case, Angle::from_deg(deg)).balance.posture().map(|posture| posture.seat_height_m);
    let seat = seat.map(|m| format!(", seat {}", format::cm(m))).unwrap_or_default();
    format!("to thigh {}{seat}", degrees(deg))
}

fn posture(lines: &mut Lines, figures: &Figures) {
    let angles = [
        ("shank", figures.shank_deg),
        ("trunk lean", figures.trunk_deg),
        ("pelvis line", figures.pelvis_deg),
        ("bend beyond the hip", figures.bend_deg),
        ("ankle dorsiflexion", figures.ankle_deg),
        ("knee flexion", figures.knee_flexion_deg),
        ("hip-joint flexion", figures.hip_flexion_deg),
    ];
    let lengths = [
        ("seat height", figures.seat_height),
        ("knee arm", figures.knee_arm),
        ("hip arm", figures.hip_arm),
        ("to the heel edge", figures.heel_margin),
        ("to the toe edge", figures.toe_margin),
    ];
    if figures.refused_by.is_some() {
        return;
    }
    lines.title("Posture");
    for (label, deg) in angles {
        lines.number(label, &deg.map(degrees).unwrap_or_default());
    }
    for (label, m) in lengths {
        lines.number(label, &m.map(format::cm_fine).unwrap_or_default());
    }
    lines.number("hip arm : knee arm", &format::ratio(figures.ratio));
}

fn demands(lines: &mut Lines, figures: &Figures) {
    let Some(moments) = figures.moments else { return };
    lines.title("Demand (net moment, share of what a typical untrained adult can)");
    let effort = figures.effort;
    for (label, nm, share) in [
        ("ankle, one leg", moments.ankle, effort.map(|effort| effort.ankle)),
        ("knee, one leg", moments.knee, effort.map(|effort| effort.knee)),
        ("hip, one leg", moments.hip, effort.map(|effort| effort.hip)),
        ("low back", moments.lumbosacral, effort.map(|effort| effort.lumbosacral)),
    ] {
        let share = share.map(format::percent).unwrap_or_default();
        lines.number(label, &format!("{:>VALUE$}{share:>VALUE$}", format::nm(nm)));
    }
    lines.add(format_args!("  {NET_MOMENTS_CAUTION}"));
}

fn body(lines: &mut Lines, figures: &Figures) {
    let body = &figures.body;
    lines.title("Body");
    for (label, m) in [
        ("shank", body.shank),
        ("thigh", body.thigh),
        ("hip to shoulder", body.trunk),
        ("foot", body.foot),
        ("stature", body.stature),
    ] {
        lines.number(label, &format::cm_fine(m));
    }
    lines.number("mass", &format::kg(body.mass));
    lines.number("ankle range", &degrees(body.ankle_limit_deg));
    lines.number("hip-joint range", &degrees(body.hip_limit_deg));
}
