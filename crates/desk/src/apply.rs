//! The only place that changes the state. No input or output: what is to be done outside comes back
//! as effects.

use std::path::PathBuf;

use plumbfold_core::{
    Angle, Placement,
    bounds::{Field, bounds},
    measures::{Sex, Sides},
    tables,
    takes::{self, Change, Kind},
};
use plumbfold_records::{Ankle, Client, Code, Hip, Visit};
use plumbfold_scene::{theme::Palette, words::why};

use crate::{
    action::{Action, AnkleWay, Answer, Arrived, Ask, Edit, Effect, HipWay, Over, Step, Then, ViewChange},
    command::Command,
    document::Document,
    entry::{UNSEEN, bend_deg},
    state::{Dialog, Message, State},
};

/// Seconds for a whole descent when it plays.
const DESCENT_S: f64 = 3.0;

/// Applies an action.
#[must_use]
pub fn apply(state: &mut State, action: Action) -> Vec<Effect> {
    match action {
        Action::Edit(change, step) => {
            edit(state, change, step);
            Vec::new()
        }
        Action::View(change) => {
            view(state, change);
            Vec::new()
        }
        Action::Run(command) => run(state, command),
        Action::Answer(a) => answer(state, a),
        Action::Dropped(path) => guarded(state, Then::OpenFile(path)),
        Action::CloseAsked => guarded(state, Then::Close),
        Action::Arrived(what) => arrived(state, what),
    }
}

fn edit(state: &mut State, change: Edit, step: Step) {
    let before = state.doc.clone();
    let goes_elsewhere = matches!(change, Edit::GoToVisit(_) | Edit::GoToTask(_));
    if let Err(why) = edit_document(&mut state.doc, change) {
        state.message = Some(Message::Bad(why));
        return;
    }
    if state.doc == before {
        return;
    }
    state.view.trying = None;
    if goes_elsewhere {
        state.view.depth_deg = state.doc.task().goal_thigh_deg;
        state.view.straighten = None;
        state.view.field_errors.clear();
    }
    let gesture = match step {
        Step::Whole => None,
        Step::Gesture(id) => Some(id),
    };
    state.history.keep(&before, gesture);
    state.history.drop_if_unchanged(&state.doc);
}

fn edit_document(doc: &mut Document, change: Edit) -> Result<(), String> {
    match change {
        Edit::Number(entry, value) => {
            if let Some(v) = value {
                let b = entry.bounds(doc);
                if !b.holds(v) {
                    return Err(format!("{} {v}{} is outside {}", b.name, b.unit.suffix(), b.allowed()));
                }
            }
            entry.put(doc, value);
        }
        Edit::Sex(sex) => doc.visit_mut().sex_model = sex,
        Edit::AnkleWay(way) => {
            let ankle = &mut doc.visit_mut().joints.ankle;
            *ankle = match (way, *ankle) {
                (AnkleWay::KneeToWall, Ankle::KneeToWall(s)) => Ankle::KneeToWall(s),
                (AnkleWay::Degrees, Ankle::Degrees(s)) => Ankle::Degrees(s),
                (AnkleWay::KneeToWall, _) => Ankle::KneeToWall(Sides::default()),
                (AnkleWay::Degrees, _) => Ankle::Degrees(Sides::default()),
                (AnkleWay::NotMeasured, _) => Ankle::NotMeasured,
            };
        }
        Edit::HipWay(way) => {
            let hip = &mut doc.visit_mut().joints.hip;
            let sides = match *hip {
                Hip::PelvisHeld(s) | Hip::RockBack(s) | Hip::KneeToChest(s) => s,
                Hip::NotMeasured => Sides::default(),
            };
            *hip = match way {
                HipWay::PelvisHeld => Hip::PelvisHeld(sides),
                HipWay::RockBack => Hip::RockBack(sides),
                HipWay::KneeToChest => Hip::KneeToChest(sides),
                HipWay::NotMeasured => Hip::NotMeasured,
            };
        }
        Edit::Placement(p) => doc.task_mut().placement = p,
        Edit::Bend(b) => doc.task_mut().bend = b,
        Edit::Rule(r) => doc.task_mut().rule = r,
        Edit::Table(t) => doc.visit_mut().segments = t,
        Edit::Scope(s) => {
            let scope = &mut doc.visit_mut().scope;
            match scope.iter().position(|have| *have == s) {
                Some(at) => drop(scope.remove(at)),
                None => scope.push(s),
            }
        }
        Edit::HeelsLifted(lifted) => doc.task_mut().seen.get_or_insert(UNSEEN).heels_lifted = lifted,
        Edit::StoppedBy(why) => doc.task_mut().seen.get_or_insert(UNSEEN).stopped_by = why,
        Edit::Seen([thigh, shank, trunk]) => {
            let hold = |field: Field, v: f64| {
                let b = bounds(field);
                if v.is_finite() { v.clamp(b.min, b.max) } else { b.default }
            };
            let seen = doc.task_mut().seen.get_or_insert(UNSEEN);
            seen.thigh_deg = hold(Field::SeenThigh, thigh);
            seen.shank_deg = hold(Field::SeenShank, shank);
            seen.trunk_deg = hold(Field::SeenTrunk, trunk);
        }
        Edit::NotSeen => doc.task_mut().seen = None,
        Edit::Note(text) => doc.visit_mut().note = text,
        Edit::CapSource(text) => doc.visit_mut().caps.source = text,
        Edit::Code(text) => doc.client.code = Code::new(text).map_err(|fault| fault.to_string())?,
        Edit::GoToVisit(at) => {
            if at < doc.client.visits.len() {
                doc.visit = at;
                doc.task = 0;
            }
        }
        Edit::GoToTask(at) => {
            if at < doc.visit().tasks.len() {
                doc.task = at;
            }
        }
        Edit::AddTask(name) => {
            let name = free_name(doc.visit(), &name);
            let mut task = doc.task().clone();
            task.name = name;
            let at = doc.task + 1;
            doc.visit_mut().tasks.insert(at, task);
            doc.task = at;
        }
        Edit::Keep(changes) => keep(doc, &changes),
        Edit::Felt(felt) => doc.task_mut().felt = felt,
        Edit::PainAt(joint) => {
            if let Some(seen) = &mut doc.task_mut().seen {
                seen.pain_at = joint;
            }
        }
        Edit::RemoveTask => {
            if doc.visit().tasks.len() > 1 {
                let at = doc.task;
                doc.visit_mut().tasks.remove(at);
                doc.task = at.min(doc.visit().tasks.len() - 1);
            }
        }
    }
    Ok(())
}

/// A task after the present one with changes made. Ranges gained in weeks are no set-up and are left
/// out.
fn keep(doc: &mut Document, changes: &[Change]) {
    let mut task = doc.task().clone();
    let under_hips_cm = 200.0 * tables::HIP_HALF_SPACING * doc.visit().stature_cm / 100.0;
    let tenth = |v: f64| (v * 10.0).round() / 10.0;
    let mut names = Vec::new();
    for c in changes {
        match c.kind {
            Kind::HeelRaise => {
                let most = bounds(Field::HeelRaise).max;
                task.heel_raise_mm = tenth(task.heel_raise_mm + c.amount).min(most);
            }
            Kind::WiderStance => {
                let now = task.stance_width_cm.unwrap_or(under_hips_cm);
                let toes = takes::toe_out_with(Angle::from_deg(task.toe_out_deg), c.amount);
                task.toe_out_deg = tenth(toes.deg());
                task.stance_width_cm = Some(tenth(now + c.amount));
            }
            Kind::Counterweight => {
                task.placement = Placement::ArmsForward;
                task.load_kg = tenth(c.amount);
            }
            Kind::Placement(p) => {
                task.placement = p;
                if p == Placement::ArmsCrossed {
                    task.load_kg = 0.0;
                }
            }
            Kind::Bend => {
                let most = bounds(Field::Bend).max;
                task.bend = plumbfold_records::Bend::Degrees(tenth(bend_deg(task.bend) + c.amount).min(most));
            }
            Kind::Lean => {
                let most = bounds(Field::Lean).max;
                task.lean_limit_deg = task.lean_limit_deg.map(|l| tenth(l + c.amount).min(most));
            }
            Kind::Ankle | Kind::Hip => continue,
        }
        names.push(why::kind(c.kind).to_lowercase());
    }
    if names.is_empty() {
        return;
    }
    task.name = free_name(doc.visit(), &names.join(" and "));
    task.seen = None;
    task.felt = None;
    let at = doc.task + 1;
    doc.visit_mut().tasks.insert(at, task);
    doc.task = at;
}

/// A task name that is not taken at this visit.
fn free_name(visit: &Visit, wish: &str) -> String {
    let taken = |name: &str| visit.tasks.iter().any(|t| t.name == name);
    if !taken(wish) {
        return wish.to_owned();
    }
    (2..).map(|k| format!("{wish} {k}")).find(|name| !taken(name)).unwrap_or_else(|| wish.to_owned())
}

fn view(state: &mut State, change: ViewChange) {
    let v = &mut state.view;
    match change {
        ViewChange::Depth(deg) => {
            let b = bounds(Field::Goal);
            v.depth_deg = if deg.is_finite() { deg.clamp(b.min, b.max) } else { v.depth_deg };
            v.straighten = None;
            v.playing = false;
            v.dragged = true;
        }
        ViewChange::Straighten(lean) => {
            v.straighten = lean;
            v.playing = false;
            v.dragged = true;
        }
        ViewChange::Try(changes) => {
            v.trying = changes;
            v.straighten = None;
            v.matching = false;
        }
        ViewChange::MoreLengths => v.more_lengths = !v.more_lengths,
        ViewChange::MoreChoices => v.more_choices = !v.more_choices,
        ViewChange::Fold(s) => match v.folded.iter().position(|f| *f == s) {
            Some(at) => drop(v.folded.remove(at)),
            None => v.folded.push(s),
        },
        ViewChange::FieldError(entry, Some(why)) => drop(v.field_errors.insert(entry, why)),
        ViewChange::FieldError(entry, None) => drop(v.field_errors.remove(&entry)),
        ViewChange::PlayOn(seconds) => {
            let goal = state.doc.task().goal_thigh_deg.max(1.0);
            v.depth_deg += goal * seconds / DESCENT_S;
            if v.depth_deg >= goal {
                v.depth_deg = goal;
                v.playing = false;
            }
        }
        ViewChange::MessageRead => state.message = None,
        ViewChange::Path(text) => {
            if let Some(Dialog::Path { typed, .. }) = &mut state.dialog {
                *typed = text;
            }
        }
        ViewChange::Cancel => {
            state.dialog = None;
            state.after_save = None;
        }
        ViewChange::Palette(p) => v.palette = p,
    }
}

fn run(state: &mut State, command: Command) -> Vec<Effect> {
    match command {
        Command::Undo => {
            if let Some(doc) = state.history.undo(&state.doc) {
                state.doc = doc;
                state.view.field_errors.clear();
            }
        }
        Command::Redo => {
            if let Some(doc) = state.history.redo(&state.doc) {
                state.doc = doc;
                state.view.field_errors.clear();
            }
        }
        Command::Open => return guarded(state, Then::Open),
        Command::NewClient => return guarded(state, Then::New),
        Command::Save => return save(state),
        Command::SaveAs => return vec![Effect::Ask(Ask::SaveAs)],
        Command::SheetPicture => return vec![Effect::Ask(Ask::Sheet)],
        Command::ClientView => state.view.client_view = !state.view.client_view,
        Command::Play => {
            state.view.playing = !state.view.playing;
            state.view.straighten = None;
            if state.view.playing && state.view.depth_deg >= state.doc.task().goal_thigh_deg - 0.5 {
                state.view.depth_deg = 0.0;
            }
        }
        Command::MatchSeen => {
            state.view.matching = !state.view.matching;
            state.view.trying = None;
            state.view.playing = false;
            state.view.straighten = None;
        }
        Command::Outline => state.view.outline = state.view.outline.next(),
        Command::Face => state.view.facing_left = !state.view.facing_left,
        Command::Plots => state.view.plots = !state.view.plots,
        Command::Palette => {
            state.view.palette = match state.view.palette {
                Palette::Light => Palette::Dark,
                Palette::Dark => Palette::HighContrast,
                Palette::HighContrast => Palette::Light,
            }
        }
        Command::Keys => state.view.keys = !state.view.keys,
    }
    Vec::new()
}

fn save(state: &State) -> Vec<Effect> {
    match &state.file.path {
        Some(path) => vec![Effect::Save(path.clone(), state.doc.client.clone(), Over::Write)],
        None => vec![Effect::Ask(Ask::SaveAs)],
    }
}

/// Goes on at once, or asks first where changes would be lost.
fn guarded(state: &mut State, then: Then) -> Vec<Effect> {
    if state.unsaved() {
        state.dialog = Some(Dialog::Unsaved(then));
        return Vec::new();
    }
    go(state, then)
}

fn go(state: &mut State, then: Then) -> Vec<Effect> {
    match then {
        Then::Close => vec![Effect::Close],
        Then::Open => vec![Effect::Ask(Ask::Open)],
        Then::OpenFile(path) => vec![Effect::Open(path)],
        Then::New => {
            if let Some(client) = blank_client(state) {
                renew(state, client, None);
                state.file.saved = None;
            }
            Vec::new()
        }
    }
}

/// A new client: stature, mass and sex give a figure at once.
fn blank_client(state: &State) -> Option<Client> {
    let code = Code::new("new-client").ok()?;
    let today = state.doc.visit().date;
    Some(Client::new(code, Visit::new(today, Sex::Female, bounds(Field::Stature).default, bounds(Field::Mass).default)))
}

/// Puts another client on the desk; how the desk looks stays.
fn renew(state: &mut State, client: Client, path: Option<PathBuf>) {
    let mut fresh = State::new(client, path);
    let old = &state.view;
    fresh.view.palette = old.palette;
    fresh.view.facing_left = old.facing_left;
    fresh.view.plots = old.plots;
    fresh.view.outline = old.outline;
    fresh.view.folded.clone_from(&old.folded);
    *state = fresh;
}

fn answer(state: &mut State, a: Answer) -> Vec<Effect> {
    let Some(dialog) = state.dialog.take() else { return Vec::new() };
    match (a, dialog) {
        (Answer::Stay, _) => {
            state.after_save = None;
            Vec::new()
        }
        (Answer::Discard, Dialog::Unsaved(then)) => {
            // what is thrown away was asked about
            state.file.saved = Some(state.doc.client.clone());
            go(state, then)
        }
        (Answer::SaveFirst, Dialog::Unsaved(then)) => {
            state.after_save = Some(then);
            save(state)
        }
        (Answer::UsePath, Dialog::Path { ask, typed }) => {
            let typed = typed.trim();
            if typed.is_empty() {
                state.dialog = Some(Dialog::Path { ask, typed: String::new() });
                return Vec::new();
            }
            picked(state, ask, PathBuf::from(typed))
        }
        (Answer::Overwrite, Dialog::Exists { ask, path }) => write_to(state, ask, path, Over::Write),
        (_, dialog) => {
            state.dialog = Some(dialog);
            Vec::new()
        }
    }
}

/// A path with the ending its kind needs.
fn with_ending(path: PathBuf, ask: Ask) -> PathBuf {
    let ending = match ask {
        Ask::Open => return path,
        Ask::SaveAs => "ron",
        Ask::Sheet => "png",
    };
    if path.extension().is_some_and(|e| e.eq_ignore_ascii_case(ending)) {
        return path;
    }
    let mut name = path.into_os_string();
    name.push(".");
    name.push(ending);
    PathBuf::from(name)
}

fn picked(state: &State, ask: Ask, path: PathBuf) -> Vec<Effect> {
    let path = with_ending(path, ask);
    let own = state.file.path.as_ref() == Some(&path);
    write_to(state, ask, path, if own { Over::Write } else { Over::Ask })
}

fn write_to(state: &State, ask: Ask, path: PathBuf, over: Over) -> Vec<Effect> {
    vec![match ask {
        Ask::Open => Effect::Open(path),
        Ask::SaveAs => Effect::Save(path, state.doc.client.clone(), over),
        Ask::Sheet => Effect::WriteSheet(path, over),
    }]
}

fn arrived(state: &mut State, what: Arrived) -> Vec<Effect> {
    match what {
        Arrived::Picked(ask, Some(path)) => return picked(state, ask, path),
        Arrived::Picked(ask, None) => {
            // cancelled, or no dialog can be shown here: a path can be typed either way
            state.dialog = Some(Dialog::Path { ask, typed: String::new() });
        }
        Arrived::Opened(path, client) => renew(state, client, Some(path)),
        Arrived::Newer(path, format) => {
            state.message = Some(Message::Bad(format!(
                "{}: written by a newer version (format {format}); update the program to open it. Nothing was changed.",
                path.display()
            )));
        }
        Arrived::Failed(problem) => {
            state.after_save = None;
            state.message = Some(Message::Bad(problem.to_string()));
        }
        Arrived::Trouble(sentence) => {
            state.after_save = None;
            state.message = Some(Message::Bad(sentence));
        }
        Arrived::Exists(ask, path) => state.dialog = Some(Dialog::Exists { ask, path }),
        Arrived::Saved(path, client) => {
            state.message = Some(Message::Good(format!("Saved in {}", path.display())));
            state.file.path = Some(path);
            state.file.saved = Some(client);
            if let Some(then) = state.after_save.take() {
                return guarded(state, then);
            }
        }
        Arrived::SheetWritten(path) => {
            state.message = Some(Message::Good(format!("Sheet written to {}", path.display())));
        }
    }
    Vec::new()
}
