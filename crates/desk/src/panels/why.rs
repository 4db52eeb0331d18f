//! Why not lower and what would change it: seen and computed, what is used up first, what it would
//! take with a way to try it.

use egui::{RichText, Ui};
use plumbfold_core::{
    Angle, Readings, Step,
    measures::PerJoint,
    takes::{AtGoal, Change, Group, Kind, Take},
};
use plumbfold_records::PainAt;
use plumbfold_scene::{Role, Weight, words::why};

use crate::{
    action::{Action, Edit, Step as Undo, ViewChange},
    painter::{color, font},
    panels::meaning::{Meaning, heading, pain_from, soft},
};

/// Shows the reasons.
pub fn show(ui: &mut Ui, m: &Meaning<'_>, out: &mut Vec<Action>) {
    if m.results.renewing {
        soft(ui, m, "As before this drag; renewed when you let go.");
    }
    seen(ui, m);
    used_up(ui, m);
    takes(ui, m, out);
}

fn seen(ui: &mut Ui, m: &Meaning<'_>) {
    let Some(s) = &m.results.reasons.seen else { return };
    heading(ui, "Seen and computed");
    for (k, line) in why::seen(s).into_iter().enumerate() {
        if k == 0 {
            ui.label(line);
        } else {
            soft(ui, m, line);
        }
    }
}

fn used_up(ui: &mut Ui, m: &Meaning<'_>) {
    let case = &m.results.study.case;
    let r = &m.results.reasons;
    heading(ui, "What is used up first");
    for (title, stopped) in [("On mid-foot", &r.steady), ("In balance at all", &r.balance)] {
        let mut lines = why::stops(stopped, case).into_iter();
        let first = lines.next().unwrap_or_default();
        ui.label(RichText::new(format!("{title} {first}")).font(font(13.0, Weight::SemiBold)));
        for line in lines {
            ui.label(format!("• {line}"));
        }
    }
    ui.label(format!("Back {}", why::by_bend(&r.by_bend)));
    ui.label(plumbfold_scene::words::capital(&why::shape_or_range(&r.shape_or_range)));
}

fn takes(ui: &mut Ui, m: &Meaning<'_>, out: &mut Vec<Action>) {
    let case = &m.results.study.case;
    heading(ui, &why::takes_title(case.task().goal));
    if m.results.study.depths.steady.is_some_and(|d| d >= case.task().goal) {
        ui.label("The goal is within reach on mid-foot; nothing needs to change.");
    }
    if let Some(sentence) = why::nothing_reaches(&m.results.reasons.takes) {
        ui.label(sentence);
    }
    let single = &m.results.reasons.takes.single;
    let pain = PainLine::of(m);
    for (group, title) in [(Group::Today, "Today"), (Group::Weeks, "Weeks, uncertain"), (Group::Choices, "Choices")] {
        // what needs no change at all says nothing
        let rows: Vec<&Take> =
            single.iter().filter(|t| t.kind.group() == group && t.outcome.enough().is_none_or(|a| a > 0.0)).collect();
        if rows.is_empty() {
            continue;
        }
        ui.add_space(2.0);
        ui.label(RichText::new(title).small().color(color(m.theme, Role::InkSoft)));
        for t in rows.iter().filter(|t| !matches!(t.kind, Kind::Placement(_))) {
            row(ui, m, t, pain.as_ref(), out);
        }
        if group == Group::Today {
            if let Some(p) = &m.results.reasons.takes.pair {
                let changes: Vec<Change> = p.changes.iter().map(|c| c.as_set(case)).collect();
                let text = why::pair_words(p, case);
                line(ui, m, &text, "enough", &changes, p.at_goal.as_ref(), pain.as_ref(), out);
            }
            egui::CollapsingHeader::new("Arms and load another way").id_salt("placements").show(ui, |ui| {
                for t in rows.iter().filter(|t| matches!(t.kind, Kind::Placement(_))) {
                    row(ui, m, t, pain.as_ref(), out);
                }
            });
        }
    }
}

fn row(ui: &mut Ui, m: &Meaning<'_>, t: &Take, pain: Option<&PainLine>, out: &mut Vec<Action>) {
    let case = &m.results.study.case;
    // what is not enough by itself is shown at its best, as computed
    let exact = Change { kind: t.kind, amount: t.outcome.amount() };
    let changes = vec![if t.outcome.enough().is_some() { exact.as_set(case) } else { exact }];
    let at_goal = t.at_goal.as_ref();
    line(ui, m, &why::kind(t.kind), &why::outcome(t, case), &changes, at_goal, pain, out);
}

#[expect(clippy::too_many_arguments, reason = "one row's parts, used twice right here")]
fn line(
    ui: &mut Ui,
    m: &Meaning<'_>,
    name: &str,
    outcome: &str,
    changes: &[Change],
    at_goal: Option<&AtGoal>,
    pain: Option<&PainLine>,
    out: &mut Vec<Action>,
) {
    let above = pain.and_then(|p| p.above(at_goal?));
    let trying = m.state.view.trying.as_deref() == Some(changes);
    let ink = color(m.theme, if above.is_some() { Role::InkSoft } else { Role::Ink });
    let beside = if changes.len() > 1 {
        // two changes need the whole width for their names
        ui.label(RichText::new(name).color(ink));
        "Together"
    } else {
        name
    };
    ui.allocate_ui_with_layout(
        egui::vec2(ui.available_width(), 22.0),
        egui::Layout::right_to_left(egui::Align::Center),
        |ui| {
            if trying {
                let can_keep = changes.iter().any(|c| !matches!(c.kind, Kind::Ankle | Kind::Hip));
                if ui.button("back").on_hover_text("Show the set-up as it is").clicked() {
                    out.push(Action::View(ViewChange::Try(None)));
                }
                if can_keep && ui.button("keep").on_hover_text("Keep it as a set-up of its own").clicked() {
                    out.push(Action::Edit(Edit::Keep(changes.to_vec()), Undo::Whole));
                }
            } else {
                let button = ui.button("try").on_hover_text("Show it on the figure, at the depth shown");
                let spoken = format!("Try {}", name.to_lowercase());
                button.widget_info(|| egui::WidgetInfo::labeled(egui::Role::Button, true, &spoken));
                if button.clicked() {
                    out.push(Action::View(ViewChange::Try(Some(changes.to_vec()))));
                }
            }
            ui.label(RichText::new(outcome).color(ink));
            ui.with_layout(egui::Layout::left_to_right(egui::Align::Center), |ui| {
                ui.add(egui::Label::new(RichText::new(beside).color(ink)).truncate());
            });
        },
    );
    if let Some(a) = at_goal {
        soft(ui, m, why::at_goal(a));
    }
    if let Some(joint) = above {
        soft(ui, m, format!("above the pain mark: asks more of the {joint} at the goal"));
    }
}

/// The work at the pain mark, and whose pain it is where that is known.
struct PainLine {
    moments_nm: PerJoint<f64>,
    at: Option<PainAt>,
}

impl PainLine {
    fn of(m: &Meaning<'_>) -> Option<Self> {
        let from: Angle = pain_from(m)?;
        let at_mark: Readings = Step::at(&m.results.study.case, from).readings?;
        Some(Self { moments_nm: at_mark.moments_nm, at: m.state.doc.task().seen.and_then(|s| s.pain_at) })
    }

    /// The painful joint that works harder at the goal than at the pain mark; any of knee, hip and low
    /// back where the joint is not known.
    fn above(&self, goal: &AtGoal) -> Option<&'static str> {
        let (mark, there) = (&self.moments_nm, &goal.readings.moments_nm);
        let more = |a: f64, b: f64| a > b + 0.5;
        [
            (PainAt::Knee, "knee", more(there.knee, mark.knee)),
            (PainAt::Hip, "hip", more(there.hip, mark.hip)),
            (PainAt::LowBack, "low back", more(there.low_back, mark.low_back)),
            (PainAt::Ankle, "ankle", self.at.is_some() && more(there.ankle, mark.ankle)),
        ]
        .into_iter()
        .find(|(joint, _, harder)| *harder && self.at.is_none_or(|at| at == *joint))
        .map(|found| found.1)
    }
}
