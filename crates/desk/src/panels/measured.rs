//! The left side: what was measured, what we chose, what was seen, and the note.

use egui::{Align, ComboBox, Layout, RichText, Ui, vec2};
use plumbfold_core::{Angle, Placement, Scope, SegmentTable, Sex, limits};
use plumbfold_records::{Ankle, Bend, Compared, Felt, Hip, PainAt, Rule, StoppedBy};
use plumbfold_scene::{Role, Theme, Weight, format};

use crate::{
    action::{Action, AnkleWay, Edit, HipWay, Section, Step, ViewChange},
    command::Command,
    computed::Results,
    entry::{Entry, Side, bend_deg},
    fields::{NAME_WIDTH, NumberRow, error_under, name, number, row},
    names,
    painter::{color, font},
    state::State,
};

/// What the left side needs.
pub struct Measured<'a> {
    /// The desk.
    pub state: &'a State,
    /// What was computed, where it could be.
    pub results: Option<&'a Results>,
    /// Colours.
    pub theme: Theme,
}

const FIELD: f32 = 84.0;
const HALF: f32 = 58.0;
const WIDE: f32 = 150.0;

/// Shows the left side.
pub fn show(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    section(ui, m, Section::Build, "Build", out, build);
    section(ui, m, Section::Ranges, "Ranges measured", out, ranges);
    section(ui, m, Section::Choices, "Our choices today", out, choices);
    section(ui, m, Section::Seen, "Seen today", out, seen);
    section(ui, m, Section::Precautions, "Precautions", out, precautions);
    section(ui, m, Section::Note, "Note", out, note);
    ui.add_space(8.0);
    ui.label(
        RichText::new(plumbfold_scene::words::notices::STANDING_CAUTION).small().color(color(m.theme, Role::InkSoft)),
    );
}

fn section(
    ui: &mut Ui,
    m: &Measured<'_>,
    which: Section,
    title: &str,
    out: &mut Vec<Action>,
    body: impl FnOnce(&mut Ui, &Measured<'_>, &mut Vec<Action>),
) {
    let open = !m.state.view.folded.contains(&which);
    ui.add_space(6.0);
    let mark = if open { "▼" } else { "▶" };
    let text = RichText::new(format!("{mark} {title}")).font(font(14.0, Weight::SemiBold));
    let head = ui.add(egui::Button::new(text).frame(false));
    head.widget_info(|| egui::WidgetInfo::selected(egui::Role::Button, true, open, title));
    if head.clicked() {
        out.push(Action::View(ViewChange::Fold(which)));
    }
    if open {
        body(ui, m, out);
    }
}

fn soft(m: &Measured<'_>, text: impl Into<String>) -> RichText {
    RichText::new(text).color(color(m.theme, Role::InkSoft))
}

fn build(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let d = &m.state.doc;
    ui.horizontal(|ui| {
        name(ui, "Tables for");
        for (sex, label) in [(Sex::Female, "women"), (Sex::Male, "men")] {
            if ui.selectable_label(d.visit().sex_model == sex, label).clicked() {
                out.push(Action::Edit(Edit::Sex(sex), Step::Whole));
            }
        }
    });
    let l = m.results.map(|r| r.study.case.body().landmarks);
    let line = |ui: &mut Ui, entry: Entry, name: &str, stand_in: Option<f64>, out: &mut Vec<Action>| {
        let r = NumberRow { entry, name, stand_in, empty: "estimated", width: FIELD };
        let estimated = entry.get(d).is_none() && stand_in.is_some();
        row(ui, m.state, m.theme, &r, out, |ui| {
            if estimated {
                ui.label(soft(m, "estimated").small());
            }
        });
    };
    let cm = |v: fn(&plumbfold_core::body::Landmarks) -> f64| l.as_ref().map(|l| 100.0 * v(l));
    line(ui, Entry::Stature, "Stature", None, out);
    line(ui, Entry::Mass, "Mass", None, out);
    line(ui, Entry::Shank, "Shank", cm(|l| l.shank_m), out);
    line(ui, Entry::Thigh, "Thigh", cm(|l| l.thigh_m), out);
    line(ui, Entry::Trunk, "Trunk", cm(|l| l.trunk_m), out);
    line(ui, Entry::Foot, "Foot", cm(|l| l.foot_m), out);
    if m.state.view.more_lengths {
        age(ui, m, out);
        line(ui, Entry::AnkleHeight, "Ankle height", cm(|l| l.ankle_height_m), out);
        line(ui, Entry::HeelToAnkle, "Heel to ankle", cm(|l| l.heel_to_ankle_m), out);
        line(ui, Entry::UpperArm, "Upper arm", cm(|l| l.upper_arm_m), out);
        line(ui, Entry::Forearm, "Forearm", cm(|l| l.forearm_m), out);
        line(ui, Entry::Hand, "Hand", cm(|l| l.hand_m), out);
        ui.horizontal(|ui| {
            name(ui, "Segment table");
            let now = d.visit().segments;
            combo(ui, "Segment table", names::table(now), WIDE, |ui| {
                for t in SegmentTable::ALL {
                    if ui.selectable_label(now == t, names::table(t)).clicked() {
                        out.push(Action::Edit(Edit::Table(t), Step::Whole));
                    }
                }
            });
        });
    }
    more(ui, m.state.view.more_lengths, "more lengths, age, table", ViewChange::MoreLengths, out);
}

fn age(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let r = NumberRow { entry: Entry::Age, name: "Age", stand_in: Some(30.0), empty: "", width: FIELD };
    let assumed = Entry::Age.get(&m.state.doc).is_none();
    row(ui, m.state, m.theme, &r, out, |ui| {
        if assumed {
            ui.label(soft(m, "assumed").small());
        }
    });
}

fn more(ui: &mut Ui, open: bool, what: &str, change: ViewChange, out: &mut Vec<Action>) {
    let text = if open { format!("fewer {}", what.trim_start_matches("more ")) } else { format!("{what}…") };
    if ui.link(text).clicked() {
        out.push(Action::View(change));
    }
}

/// A combo box with a name for screen readers.
fn combo(ui: &mut Ui, spoken: &str, shown: &str, width: f32, body: impl FnOnce(&mut Ui)) {
    let inner = ComboBox::from_id_salt(spoken).selected_text(shown).width(width).show_ui(ui, body);
    let value = shown.to_owned();
    inner.response.widget_info(|| {
        let mut info = egui::WidgetInfo::labeled(egui::Role::ComboBox, true, spoken);
        info.current_text_value = Some(value.clone());
        info
    });
}

fn ranges(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let v = m.state.doc.visit();
    let limits = m.results.map(|r| *r.study.case.limits());
    ui.horizontal(|ui| {
        ui.add_space(NAME_WIDTH + 4.0);
        for side in ["left", "right"] {
            ui.allocate_ui_with_layout(
                vec2(HALF, 14.0),
                Layout::centered_and_justified(egui::Direction::TopDown),
                |ui| {
                    ui.label(soft(m, side).small());
                },
            );
        }
        ui.label(soft(m, "used").small());
    });
    let used = |angle: Option<Angle>, from: Option<limits::Origin>| match (angle, from) {
        (Some(a), Some(limits::Origin::Measured)) => format::deg(a),
        (Some(a), Some(limits::Origin::Assumed)) => format!("≈ {}", format::deg(a)),
        (Some(a), Some(limits::Origin::Precaution)) => format!("≤ {}", format::deg(a)),
        _ => String::new(),
    };
    let ankle_way = match v.joints.ankle {
        Ankle::KneeToWall(_) => AnkleWay::KneeToWall,
        Ankle::Degrees(_) => AnkleWay::Degrees,
        Ankle::NotMeasured => AnkleWay::NotMeasured,
    };
    pair(
        ui,
        m,
        "Ankle",
        [Entry::Ankle(Side::Left), Entry::Ankle(Side::Right)],
        &used(limits.map(|l| l.ankle), limits.map(|l| l.ankle_from)),
        out,
    );
    ways(ui, "Ankle measured by", names::ankle_way(ankle_way), |ui| {
        for w in [AnkleWay::KneeToWall, AnkleWay::Degrees, AnkleWay::NotMeasured] {
            if ui.selectable_label(w == ankle_way, names::ankle_way(w)).clicked() {
                out.push(Action::Edit(Edit::AnkleWay(w), Step::Whole));
            }
        }
    });
    let hip_way = match v.joints.hip {
        Hip::PelvisHeld(_) => HipWay::PelvisHeld,
        Hip::RockBack(_) => HipWay::RockBack,
        Hip::KneeToChest(_) => HipWay::KneeToChest,
        Hip::NotMeasured => HipWay::NotMeasured,
    };
    pair(
        ui,
        m,
        "Hip",
        [Entry::Hip(Side::Left), Entry::Hip(Side::Right)],
        &used(limits.map(|l| l.hip), limits.map(|l| l.hip_from)),
        out,
    );
    ways(ui, "Hip measured by", names::hip_way(hip_way), |ui| {
        for w in [HipWay::PelvisHeld, HipWay::RockBack, HipWay::KneeToChest, HipWay::NotMeasured] {
            if ui.selectable_label(w == hip_way, names::hip_way(w)).clicked() {
                out.push(Action::Edit(Edit::HipWay(w), Step::Whole));
            }
        }
    });
    pair(
        ui,
        m,
        "Knee",
        [Entry::Knee(Side::Left), Entry::Knee(Side::Right)],
        &used(limits.map(|l| l.knee), limits.map(|l| l.knee_from)),
        out,
    );
}

fn ways(ui: &mut Ui, spoken: &str, shown: &str, body: impl FnOnce(&mut Ui)) {
    ui.horizontal(|ui| {
        ui.add_space(NAME_WIDTH + 4.0);
        combo(ui, spoken, shown, 2.0 * HALF - 10.0, body);
    });
}

fn pair(ui: &mut Ui, m: &Measured<'_>, title: &str, entries: [Entry; 2], used: &str, out: &mut Vec<Action>) {
    ui.horizontal(|ui| {
        name(ui, title);
        for (entry, side) in entries.into_iter().zip(["left", "right"]) {
            let r = NumberRow { entry, name: title, stand_in: None, empty: "–", width: HALF };
            number(ui, m.state, m.theme, &r, &format!("{title} {side}"), out);
        }
        ui.label(soft(m, used));
    });
    for entry in entries {
        error_under(ui, m.state, m.theme, entry);
    }
}

fn choices(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let d = &m.state.doc;
    let t = d.task();
    tasks(ui, m, out);
    let plain = |ui: &mut Ui,
                 entry: Entry,
                 name: &str,
                 empty: &str,
                 stand_in: Option<f64>,
                 out: &mut Vec<Action>,
                 beside: &str| {
        let r = NumberRow { entry, name, stand_in, empty, width: FIELD };
        row(ui, m.state, m.theme, &r, out, |ui| {
            ui.label(soft(m, beside).small());
        });
    };
    let goal_words = if (t.goal_thigh_deg - 90.0).abs() < 0.05 { "thigh level" } else { "thigh angle" };
    plain(ui, Entry::Goal, "Goal", "", None, out, goal_words);
    ui.horizontal(|ui| {
        name(ui, "Arms");
        combo(ui, "Arms", names::placement(t.placement), WIDE, |ui| {
            for p in Placement::ALL {
                if ui.selectable_label(t.placement == p, names::placement(p)).clicked() {
                    out.push(Action::Edit(Edit::Placement(p), Step::Whole));
                }
            }
        });
    });
    plain(ui, Entry::Load, "Load", "", None, out, "");
    ui.horizontal(|ui| {
        name(ui, "Shoe + wedge");
        for (entry, spoken) in [(Entry::Footwear, "Shoe"), (Entry::HeelRaise, "Wedge")] {
            let r = NumberRow { entry, name: spoken, stand_in: None, empty: "", width: HALF };
            number(ui, m.state, m.theme, &r, spoken, out);
        }
    });
    error_under(ui, m.state, m.theme, Entry::Footwear);
    error_under(ui, m.state, m.theme, Entry::HeelRaise);
    let under_hips = m.results.map(|r| 200.0 * r.study.case.body().hip_half_m);
    let stance_words = if t.stance_width_cm.is_none() { "under the hips" } else { "" };
    plain(ui, Entry::Stance, "Stance", "under hips", under_hips, out, stance_words);
    plain(ui, Entry::ToeOut, "Toe-out", "", None, out, "each foot");
    ui.horizontal(|ui| {
        name(ui, "Back may bend");
        combo(ui, "Back may bend", &names::bend(t.bend), WIDE, |ui| {
            for b in [Bend::KeepSmall, Bend::KeepSome, Bend::Free, Bend::Degrees(bend_deg(t.bend))] {
                if ui.selectable_label(t.bend == b, names::bend(b)).clicked() {
                    out.push(Action::Edit(Edit::Bend(b), Step::Whole));
                }
            }
        });
    });
    if matches!(t.bend, Bend::Degrees(_)) {
        plain(ui, Entry::Bend, "…by at most", "", None, out, "beyond the hip");
    }
    plain(
        ui,
        Entry::Lean,
        "Lean limit",
        "none",
        None,
        out,
        if t.lean_limit_deg.is_none() { "none chosen" } else { "" },
    );
    felt(ui, m, out);
    if m.state.view.more_choices {
        posture_rule(ui, m, out);
        plain(ui, Entry::WeightLeft, "Weight, left", "even", None, out, "of both legs");
        plain(ui, Entry::Reach, "Arm reach", "", None, out, "180° is overhead");
    }
    more(ui, m.state.view.more_choices, "more choices", ViewChange::MoreChoices, out);
}

fn tasks(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let d = &m.state.doc;
    ui.horizontal(|ui| {
        name(ui, "Set-up");
        combo(ui, "Set-up", &d.task().name, 80.0, |ui| {
            for (at, t) in d.visit().tasks.iter().enumerate() {
                if ui.selectable_label(at == d.task, &t.name).clicked() {
                    out.push(Action::Edit(Edit::GoToTask(at), Step::Whole));
                }
            }
        });
        if ui.button("+").on_hover_text("Another set-up, starting from this one").clicked() {
            out.push(Action::Edit(Edit::AddTask(format!("{} changed", d.task().name)), Step::Whole));
        }
        let one_only = d.visit().tasks.len() == 1;
        if ui.add_enabled(!one_only, egui::Button::new("−")).on_hover_text("Remove this set-up").clicked() {
            out.push(Action::Edit(Edit::RemoveTask, Step::Whole));
        }
    });
}

/// How the set-up felt when the client tried it.
fn felt(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let now = m.state.doc.task().felt;
    ui.horizontal(|ui| {
        name(ui, "It felt");
        let shown = now.map_or("not tried", |f| names::compared(f.compared));
        combo(ui, "It felt", shown, WIDE - 30.0, |ui| {
            if ui.selectable_label(now.is_none(), "not tried").clicked() {
                out.push(Action::Edit(Edit::Felt(None), Step::Whole));
            }
            for c in Compared::ALL {
                if ui.selectable_label(now.is_some_and(|f| f.compared == c), names::compared(c)).clicked() {
                    let rest = now.unwrap_or(Felt { compared: c, depth_thigh_deg: None, pain_0_10: None });
                    out.push(Action::Edit(Edit::Felt(Some(Felt { compared: c, ..rest })), Step::Whole));
                }
            }
        });
    });
    if now.is_none() {
        return;
    }
    ui.horizontal(|ui| {
        name(ui, "…depth, pain");
        for (entry, spoken) in [(Entry::FeltDepth, "Depth reached"), (Entry::FeltPain, "Pain then, 0 to 10")] {
            let r = NumberRow { entry, name: spoken, stand_in: None, empty: "–", width: HALF };
            number(ui, m.state, m.theme, &r, spoken, out);
        }
    });
    error_under(ui, m.state, m.theme, Entry::FeltDepth);
    error_under(ui, m.state, m.theme, Entry::FeltPain);
}

fn posture_rule(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let t = m.state.doc.task();
    let held = m
        .results
        .map_or(25.0, |r| r.at(m.state.view.depth_deg).balance.posture().map_or(25.0, |p| p.shank.deg().round()));
    ui.horizontal(|ui| {
        name(ui, "Posture");
        combo(ui, "Posture", names::rule(t.rule), WIDE, |ui| {
            for r in [
                Rule::Usual { slope: None },
                Rule::LeastEffort,
                Rule::ArmRatio(2.0),
                Rule::HeldShank(held.clamp(-10.0, 60.0)),
            ] {
                let same = std::mem::discriminant(&r) == std::mem::discriminant(&t.rule);
                if ui.selectable_label(same, names::rule(r)).clicked() && !same {
                    out.push(Action::Edit(Edit::Rule(r), Step::Whole));
                }
            }
        });
    });
    let (entry, name, empty) = match t.rule {
        Rule::Usual { .. } => (Entry::Slope, "…per thigh °", "usual"),
        Rule::ArmRatio(_) => (Entry::Ratio, "…hip to knee", ""),
        Rule::HeldShank(_) => (Entry::HeldShank, "…shank", ""),
        Rule::LeastEffort => return,
    };
    let stand_in =
        matches!(t.rule, Rule::Usual { .. }).then(|| m.results.map(|r| r.study.case.usual_slope())).flatten();
    let r = NumberRow { entry, name, stand_in, empty, width: FIELD };
    row(ui, m.state, m.theme, &r, out, |_| {});
}

fn seen(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let t = m.state.doc.task();
    let matching = m.state.view.matching;
    ui.horizontal(|ui| {
        let about = Command::MatchSeen;
        let label = if matching { "Done matching" } else { about.label() };
        if ui.selectable_label(matching, label).on_hover_text(about.hint(ui.ctx())).clicked() {
            out.push(Action::Run(about));
        }
        if t.seen.is_some() && ui.link("not seen").on_hover_text("Forget what was seen").clicked() {
            out.push(Action::Edit(Edit::NotSeen, Step::Whole));
        }
    });
    if t.seen.is_none() {
        ui.label(soft(m, "No squat noted yet: drag the figure onto it, or type its angles."));
    }
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 4.0;
        for (entry, title) in [(Entry::SeenThigh, "Thigh"), (Entry::SeenShank, "Shank"), (Entry::SeenTrunk, "Trunk")] {
            ui.vertical(|ui| {
                ui.label(soft(m, title).small());
                let r = NumberRow { entry, name: title, stand_in: None, empty: "–", width: 66.0 };
                let before = out.len();
                number(ui, m.state, m.theme, &r, &format!("Seen {}", title.to_lowercase()), out);
                first_seen(m, entry, &mut out[before..]);
            });
        }
    });
    for entry in [Entry::SeenThigh, Entry::SeenShank, Entry::SeenTrunk, Entry::SeenPain, Entry::PainFrom] {
        error_under(ui, m.state, m.theme, entry);
    }
    let Some(seen) = t.seen else { return };
    ui.horizontal(|ui| {
        name(ui, "Pain, from");
        for (entry, spoken, empty) in
            [(Entry::SeenPain, "Pain 0 to 10", "–"), (Entry::PainFrom, "Pain from thigh angle", "–")]
        {
            let r = NumberRow { entry, name: spoken, stand_in: None, empty, width: HALF };
            number(ui, m.state, m.theme, &r, spoken, out);
        }
    });
    ui.horizontal(|ui| {
        name(ui, "Hurts at");
        let shown = seen.pain_at.map_or("not noted", names::pain_at);
        combo(ui, "Hurts at", shown, WIDE - 30.0, |ui| {
            for at in std::iter::once(None).chain(PainAt::ALL.into_iter().map(Some)) {
                if ui.selectable_label(seen.pain_at == at, at.map_or("not noted", names::pain_at)).clicked() {
                    out.push(Action::Edit(Edit::PainAt(at), Step::Whole));
                }
            }
        });
    });
    ui.horizontal(|ui| {
        name(ui, "Stopped by");
        let shown = seen.stopped_by.map_or("not noted", names::stopped_by);
        combo(ui, "Stopped by", shown, WIDE - 30.0, |ui| {
            let choices = std::iter::once(None).chain(StoppedBy::ALL.into_iter().map(Some));
            for why in choices {
                if ui.selectable_label(seen.stopped_by == why, why.map_or("not noted", names::stopped_by)).clicked() {
                    out.push(Action::Edit(Edit::StoppedBy(why), Step::Whole));
                }
            }
        });
    });
    let mut lifted = seen.heels_lifted;
    if ui.checkbox(&mut lifted, "Heels came up").changed() {
        out.push(Action::Edit(Edit::HeelsLifted(lifted), Step::Whole));
    }
}

/// The first number typed of a seen squat: the other two start from the computed posture at the depth
/// shown, to be set right next.
fn first_seen(m: &Measured<'_>, entry: Entry, typed: &mut [Action]) {
    if m.state.doc.task().seen.is_some() {
        return;
    }
    for action in typed {
        let Action::Edit(Edit::Number(_, Some(v)), step) = action else { continue };
        let at = m.results.and_then(|r| r.at(m.state.view.depth_deg).balance.posture().copied());
        let Some(p) = at else { continue };
        let whole = |a: Angle| a.deg().round();
        let mut angles = [whole(p.thigh), whole(p.shank), whole(p.trunk)];
        let which = match entry {
            Entry::SeenThigh => 0,
            Entry::SeenShank => 1,
            _ => 2,
        };
        angles[which] = *v;
        *action = Action::Edit(Edit::Seen(angles), *step);
    }
}

fn precautions(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let v = m.state.doc.visit();
    for s in Scope::ALL {
        let mut on = v.scope.contains(&s);
        if ui.checkbox(&mut on, names::scope(s)).changed() {
            out.push(Action::Edit(Edit::Scope(s), Step::Whole));
        }
    }
    for (entry, title) in
        [(Entry::CapKnee, "Knee at most"), (Entry::CapHip, "Hip at most"), (Entry::CapLoad, "Load at most")]
    {
        let r = NumberRow { entry, name: title, stand_in: None, empty: "no cap", width: FIELD };
        row(ui, m.state, m.theme, &r, out, |_| {});
    }
    ui.horizontal(|ui| {
        let label = name(ui, "Set by");
        let mut text = v.caps.source.clone();
        let edit = ui.add(
            egui::TextEdit::multiline(&mut text)
                .desired_rows(2)
                .desired_width(WIDE)
                .return_key(None)
                .char_limit(plumbfold_records::SOURCE_MAX_CHARS),
        );
        let edit = edit.labelled_by(label.id);
        ui.ctx().accesskit_node_builder(edit.id, |node| node.set_label("Precautions set by"));
        if edit.changed() {
            out.push(Action::Edit(Edit::CapSource(text), typing(&edit)));
        }
    });
}

/// All typing while a text has the focus is one gesture.
fn typing(edit: &egui::Response) -> Step {
    Step::Gesture(crate::action::GestureId(edit.id.value()))
}

fn note(ui: &mut Ui, m: &Measured<'_>, out: &mut Vec<Action>) {
    let mut text = m.state.doc.visit().note.clone();
    let edit = egui::TextEdit::multiline(&mut text)
        .desired_rows(3)
        .desired_width(f32::INFINITY)
        .char_limit(plumbfold_records::NOTE_MAX_CHARS)
        .hint_text("A line for the record");
    let edit = ui.with_layout(Layout::top_down(Align::Min), |ui| ui.add(edit)).inner;
    ui.ctx().accesskit_node_builder(edit.id, |node| node.set_label("Note"));
    if edit.changed() {
        out.push(Action::Edit(Edit::Note(text), typing(&edit)));
    }
}
