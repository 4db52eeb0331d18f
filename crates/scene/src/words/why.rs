//! Why not lower, and what would change it: the clinician's lines.

use plumbfold_core::{
    Angle, Balance, Case, Refusal, posture,
    seen::{DepthGap, LeanGap, SeenStudy},
    stops::{Limit, ShapeOrRange, Stop, Stopped},
    takes::{AtGoal, Change, Kind, Outcome, Pair, Take, Takes},
};

use super::{clinician, names, notices};
use crate::format;

/// A limit with its value: `hip range, 98°`.
#[must_use]
pub fn limit(limit: Limit, case: &Case) -> String {
    let l = case.limits();
    match limit {
        Limit::Ankle => format!("ankle range, {}", format::deg(l.ankle)),
        Limit::Hip => format!("hip range, {}", format::deg(l.hip)),
        Limit::Knee => format!("knee range, {}", format::deg(l.knee)),
        Limit::Bend => format!("bend beyond the hip, {}", format::deg(l.bend)),
        Limit::Lean => format!("lean we choose to stay within, {}", format::deg(l.lean)),
        Limit::Support => "support under the feet".to_owned(),
        Limit::Stance => "stance, the legs do not reach wider".to_owned(),
        Limit::CapKnee => format!("precaution on the knee, {}", format::deg(l.knee)),
        Limit::CapHip => format!("precaution on the hip, {}", format::deg(l.hip)),
    }
}

/// A stop as a line: what, and the depth without it.
#[must_use]
pub fn stop(s: &Stop, case: &Case) -> String {
    let possibly = if s.assumed { "possibly, not measured: " } else { "" };
    let mut line = format!("{possibly}{}", limit(s.limit, case));
    if let Some(w) = s.without {
        line = format!("{line} · without it {}", format::deg(w));
    }
    if !s.alone {
        line.push_str(" · together");
    }
    if let Some(text) = worth(s) {
        line = format!("{line} · {text}");
    }
    line
}

/// What one more unit is worth.
#[must_use]
pub fn worth(s: &Stop) -> Option<String> {
    if s.limit.is_precaution() || s.worth < 0.05 {
        return None;
    }
    let unit = if s.limit == Limit::Support { "cm" } else { "degree" };
    Some(format!("each {unit} {}°", format::number(s.worth, 1)))
}

/// The stops of a depth, one line each.
#[must_use]
pub fn stops(s: &Stopped, case: &Case) -> Vec<String> {
    let Some(depth) = s.depth else {
        return vec![match posture(case, Angle::ZERO) {
            Balance::Refused(why @ Refusal::Stance) => format!("no depth: {}", notices::refusal(why)),
            _ => "no depth: not balanced even standing; check lengths, load and heel".to_owned(),
        }];
    };
    let mut lines = vec![format!("to {}", format::deg(depth))];
    lines.extend(s.stops.iter().map(|x| stop(x, case)));
    if s.stops.is_empty() {
        lines.push("nothing measured stops it".to_owned());
    }
    lines
}

fn depth_words(a: Option<Angle>) -> String {
    a.map_or_else(|| "none".to_owned(), format::deg)
}

/// Steady depth by how much the back may bend.
#[must_use]
pub fn by_bend(b: &[Option<Angle>; 3]) -> String {
    format!("kept small {}, some {}, free {}", depth_words(b[0]), depth_words(b[1]), depth_words(b[2]))
}

/// The four depths of shape and range.
#[must_use]
pub fn shape_or_range(s: &ShapeOrRange) -> String {
    format!(
        "now {} · with average lengths {} · with usual ranges {} · both {}",
        depth_words(s.now),
        depth_words(s.average_lengths),
        depth_words(s.usual_ranges),
        depth_words(s.both)
    )
}

/// Title over what it would take.
#[must_use]
pub fn takes_title(goal: Angle) -> String {
    let to = if (goal.deg() - 90.0).abs() < 0.05 { "thigh level".to_owned() } else { format::deg(goal) };
    format!("What it would take, to {to} on mid-foot")
}

/// Where nothing on offer reaches the goal: no single change and no pair.
#[must_use]
pub fn nothing_reaches(t: &Takes) -> Option<&'static str> {
    let none = t.pair.is_none() && t.single.iter().all(|x| x.outcome.enough().is_none());
    none.then_some(
        "No single change here and no two together reach this goal: choose another depth, or another exercise.",
    )
}

/// What a kind of change is called.
#[must_use]
pub fn kind(k: Kind) -> String {
    match k {
        Kind::HeelRaise => "Heel raise".to_owned(),
        Kind::WiderStance => "Wider stance".to_owned(),
        Kind::Counterweight => "Counterweight".to_owned(),
        Kind::Placement(p) => super::capital(names::placement(p)),
        Kind::Ankle => "Ankle range".to_owned(),
        Kind::Hip => "Hip range".to_owned(),
        Kind::Bend => "More bend allowed".to_owned(),
        Kind::Lean => "More lean allowed".to_owned(),
    }
}

/// An amount as people set it: wedges up to the next 5 mm, stances as a width with their toe-out.
#[must_use]
pub fn amount(change: &Change, case: &Case) -> String {
    let set = change.as_set(case);
    match change.kind {
        Kind::HeelRaise => format!("{} mm more", format::number(set.amount, 0)),
        Kind::WiderStance => case.changed(&set).map_or_else(
            |_| format!("{} cm more", format::number(set.amount, 0)),
            |c| {
                let stand = c.stand();
                format!("{}, toes out {}", format::cm(2.0 * stand.half_stance_m), format::deg(stand.toe_out))
            },
        ),
        Kind::Counterweight => format!("near {}", format::kg(set.amount)),
        Kind::Placement(_) => "enough".to_owned(),
        Kind::Ankle | Kind::Hip | Kind::Bend | Kind::Lean => format!("+{}°", format::number(set.amount, 0)),
    }
}

/// The right-hand side of a row: the amount, or how far it gets.
#[must_use]
pub fn outcome(t: &Take, case: &Case) -> String {
    match t.outcome {
        Outcome::Enough { amount: 0.0 } => "already there".to_owned(),
        Outcome::Enough { amount: a } => amount(&Change { kind: t.kind, amount: a }, case),
        Outcome::NotByItself { .. } => match t.depth {
            Some(d) => format!("not by itself, {}", format::deg(d)),
            None => "not by itself".to_owned(),
        },
    }
}

/// What a change does at the goal.
#[must_use]
pub fn at_goal(a: &AtGoal) -> String {
    let r = &a.readings;
    let m = &r.moments_nm;
    format!(
        "lean {} · arms hip {}, knee {} · work knee {}, hip {}, low back {} N·m",
        format::deg(a.lean),
        format::cm(r.hip_arm_m),
        format::cm(r.knee_arm_m),
        format::number(m.knee, 0),
        format::number(m.hip, 0),
        format::number(m.low_back, 0)
    )
}

/// One change as a line.
#[must_use]
pub fn take(t: &Take, case: &Case) -> String {
    let mut line = format!("{} · {}", kind(t.kind), outcome(t, case));
    if let (Some(_), Some(a)) = (t.outcome.enough(), &t.at_goal) {
        line = format!("{line} · {}", at_goal(a));
    }
    if t.kind == Kind::Counterweight && t.outcome.enough().is_some_and(|a| a > 0.0) {
        line.push_str(" (computed)");
    }
    line
}

/// The two changes of a pair with their amounts.
#[must_use]
pub fn pair_words(p: &Pair, case: &Case) -> String {
    let part = |c: &Change| match c.kind {
        Kind::Placement(_) => kind(c.kind),
        _ => format!("{} {}", kind(c.kind), amount(c, case)),
    };
    let [a, b] = [part(&p.changes[0]), part(&p.changes[1])];
    format!("{a} and {}", b.to_lowercase())
}

/// The pair as a line.
#[must_use]
pub fn pair(p: &Pair, case: &Case) -> String {
    let together = pair_words(p, case);
    match &p.at_goal {
        Some(a) => format!("{together} · {}", at_goal(a)),
        None => together,
    }
}

/// Seen and computed: one sentence first, figures behind it.
#[must_use]
pub fn seen(s: &SeenStudy) -> Vec<String> {
    let mut lines = vec![clinician::seen_and_computed(s.allowed.steady, s.seen.thigh)];
    debug_assert!(
        s.depth != DepthGap::Shallower || lines[0].contains("do not explain"),
        "sentence and verdict use one tolerance"
    );
    if let Some(needed) = s.lean_needed {
        let (seen, needed) = (format::deg(s.seen.trunk), format::deg(needed));
        lines.push(match s.lean {
            LeanGap::Needed => format!("Lean seen {seen}: what balance needs at that shank and thigh ({needed})."),
            LeanGap::More => format!("Lean seen {seen}, balance needs {needed} there: look why the trunk goes further."),
            LeanGap::Less => format!("Lean seen {seen}, balance needs {needed} there: more upright than the model balances; look at arms, heels and what was drawn."),
            LeanGap::Unknown => format!("Lean seen {seen}."),
        });
    } else {
        lines.push("The seen legs are outside what the measures allow: measure the ranges again.".to_owned());
    }
    match s.standing {
        Some(st) if s.far_outside() => lines
            .push(format!("The squat as seen is {}: the drawing or the measures are off.", clinician::standing(&st))),
        Some(st) => lines.push(format!("The squat as seen is {}.", clinician::standing(&st))),
        None => {}
    }
    lines
}

#[cfg(test)]
mod tests {
    use plumbfold_core::{Case, Seen, reasons, sample};

    use super::*;

    fn deg(d: f64) -> Angle {
        Angle::from_deg(d)
    }

    #[test]
    fn lines_carry_the_numbers_they_are_made_of() {
        let (m, t) = sample::long_thigh_woman();
        let (case, _) = Case::new(&m, &t).expect("valid");
        let r = reasons(&case);
        let lines = stops(&r.steady, &case);
        assert_eq!(lines[0], "to 76°");
        assert!(lines.iter().any(|l| l.starts_with("hip range, 98° · without it 128°")), "{lines:?}");
        assert_eq!(by_bend(&r.by_bend), "kept small 66°, some 71°, free 76°");
        assert_eq!(
            shape_or_range(&r.shape_or_range),
            "now 76° · with average lengths 90° · with usual ranges 105° · both 110°"
        );
        let line = |k: Kind| r.takes.single.iter().find(|x| x.kind == k).map(|x| take(x, &case)).expect("offered");
        assert!(line(Kind::HeelRaise).starts_with("Heel raise · 20 mm more · lean 53°"), "{}", line(Kind::HeelRaise));
        assert!(line(Kind::Counterweight).contains("near 4 kg") && line(Kind::Counterweight).ends_with("(computed)"));
        assert!(line(Kind::WiderStance).contains("49 cm, toes out 16°"), "{}", line(Kind::WiderStance));
        assert!(line(Kind::Ankle).contains("+8°"));
        assert!(line(Kind::Hip).contains("not by itself, 83°"));
        assert_eq!(takes_title(deg(90.0)), "What it would take, to thigh level on mid-foot");
    }

    #[test]
    fn a_stance_that_the_legs_cannot_span_is_named() {
        let (mut m, mut t) = sample::average_man();
        (m.lengths.thigh_m, m.lengths.shank_m) = (Some(0.22), Some(0.22));
        t.stance_m = Some(1.2);
        let (case, _) = Case::new(&m, &t).expect("within bounds");
        let r = reasons(&case);
        assert_eq!(stops(&r.steady, &case), ["no depth: the legs do not reach this stance"]);
    }

    #[test]
    fn a_range_not_measured_is_only_possibly_the_reason() {
        let (m, t) = sample::average_man();
        let (case, _) = Case::new(&m, &t).expect("valid");
        let r = reasons(&case);
        assert!(stops(&r.steady, &case)[1..].iter().any(|l| l.starts_with("possibly, not measured")));
    }

    #[test]
    fn the_seen_squat_is_spoken_of_in_the_order_depth_lean_stand() {
        let (m, mut t) = sample::long_thigh_woman();
        t.seen = Some(Seen { thigh: deg(50.0), shank: deg(10.0), trunk: deg(5.0) });
        let (case, _) = Case::new(&m, &t).expect("valid");
        let s = reasons(&case).seen.expect("seen");
        let lines = seen(&s);
        assert!(lines[0].contains("do not explain"), "{lines:?}");
        assert!(lines[1].contains("more upright than the model balances"), "{lines:?}");
        assert!(s.far_outside() && lines[2].contains("the drawing or the measures are off"), "{lines:?}");
    }
}
