//! `plumbfold reasons`: what runs out first, what it would take, what the seen squat tells.

use plumbfold_core::{
    Angle, Reasons, Standing, reasons,
    seen::{DepthGap, LeanGap, SeenStudy},
    stops::{Limit, Stop, Stopped},
    takes::{AtGoal, Pair, Take},
};
use plumbfold_records::Problem;
use plumbfold_scene::words;
use serde::Serialize;

use super::{
    args::Selection,
    choose::{self, Chosen},
    figures::Form,
};

pub fn command(of: &Selection, form: Form) -> Result<String, Problem> {
    let chosen = choose::chosen(of)?;
    let (case, _) = chosen.case()?;
    let why = reasons(&case);
    match form {
        Form::Json => json(&chosen, &why),
        Form::Text => Ok(text(&chosen, &case, &why)),
    }
}

fn json(chosen: &Chosen, why: &Reasons) -> Result<String, Problem> {
    serde_json::to_string(&told(why)).map(|object| format!("{object}\n")).map_err(|error| {
        choose::problem(
            &chosen.file,
            None,
            format!("reasons that cannot be told ({error})"),
            "reasons".to_owned(),
            "please report this",
        )
    })
}

/// Reasons in numbers; angles in degrees, moments in N·m.
#[derive(Debug, Serialize)]
struct Told {
    steady: ToldDepth,
    balance: ToldDepth,
    by_bend: ToldBend,
    shape_or_range: ToldShape,
    takes: Vec<ToldTake>,
    pair: Option<ToldPair>,
    seen: Option<ToldSeen>,
}

#[derive(Debug, Serialize)]
struct ToldDepth {
    depth_deg: Option<f64>,
    stops: Vec<ToldStop>,
}

#[derive(Debug, Serialize)]
struct ToldStop {
    limit: &'static str,
    alone: bool,
    without_deg: Option<f64>,
    deg_per_unit: f64,
    unit: &'static str,
    measured: bool,
}

#[derive(Debug, Serialize)]
struct ToldBend {
    small_deg: Option<f64>,
    some_deg: Option<f64>,
    free_deg: Option<f64>,
}

#[derive(Debug, Serialize)]
struct ToldShape {
    now_deg: Option<f64>,
    average_lengths_deg: Option<f64>,
    usual_ranges_deg: Option<f64>,
    both_deg: Option<f64>,
}

#[derive(Debug, Serialize)]
struct ToldTake {
    change: String,
    group: &'static str,
    amount: Option<f64>,
    unit: &'static str,
    depth_deg: Option<f64>,
    lean_deg: Option<f64>,
    knee_nm: Option<f64>,
    hip_nm: Option<f64>,
    back_nm: Option<f64>,
}

#[derive(Debug, Serialize)]
struct ToldPair {
    changes: Vec<ToldChange>,
    share: f64,
    depth_deg: Option<f64>,
    lean_deg: Option<f64>,
    knee_nm: Option<f64>,
    hip_nm: Option<f64>,
    back_nm: Option<f64>,
}

#[derive(Debug, Serialize)]
struct ToldChange {
    change: String,
    amount: f64,
    unit: &'static str,
}

#[derive(Debug, Serialize)]
struct ToldSeen {
    thigh_deg: f64,
    shank_deg: f64,
    trunk_deg: f64,
    depth: &'static str,
    lean: &'static str,
    lean_needed_deg: Option<f64>,
    stands: Option<&'static str>,
    outside_m: Option<f64>,
}

fn deg(a: Option<Angle>) -> Option<f64> {
    a.map(Angle::deg)
}

fn told(r: &Reasons) -> Told {
    let [small_deg, some_deg, free_deg] = r.by_bend.map(deg);
    let s = &r.shape_or_range;
    Told {
        steady: depth(&r.steady),
        balance: depth(&r.balance),
        by_bend: ToldBend { small_deg, some_deg, free_deg },
        shape_or_range: ToldShape {
            now_deg: deg(s.now),
            average_lengths_deg: deg(s.average_lengths),
            usual_ranges_deg: deg(s.usual_ranges),
            both_deg: deg(s.both),
        },
        takes: r.takes.single.iter().map(take).collect(),
        pair: r.takes.pair.as_ref().map(pair),
        seen: r.seen.as_ref().map(seen),
    }
}

fn depth(s: &Stopped) -> ToldDepth {
    ToldDepth { depth_deg: deg(s.depth), stops: s.stops.iter().map(stop).collect() }
}

fn stop(s: &Stop) -> ToldStop {
    ToldStop {
        limit: s.limit.key(),
        alone: s.alone,
        without_deg: deg(s.without),
        deg_per_unit: s.worth,
        unit: if s.limit == Limit::Support { "cm" } else { "deg" },
        measured: !s.assumed,
    }
}

fn demands(at: Option<&AtGoal>) -> [Option<f64>; 4] {
    let nm = |f: fn(&AtGoal) -> f64| at.map(f);
    [
        at.map(|a| a.lean.deg()),
        nm(|a| a.readings.moments_nm.knee),
        nm(|a| a.readings.moments_nm.hip),
        nm(|a| a.readings.moments_nm.low_back),
    ]
}

fn take(t: &Take) -> ToldTake {
    let [lean_deg, knee_nm, hip_nm, back_nm] = demands(t.at_goal.as_ref());
    ToldTake {
        change: t.kind.key(),
        group: t.kind.group().key(),
        amount: t.outcome.enough(),
        unit: t.kind.unit(),
        depth_deg: deg(t.depth),
        lean_deg,
        knee_nm,
        hip_nm,
        back_nm,
    }
}

fn pair(p: &Pair) -> ToldPair {
    let [lean_deg, knee_nm, hip_nm, back_nm] = demands(p.at_goal.as_ref());
    let changes =
        p.changes.iter().map(|c| ToldChange { change: c.kind.key(), amount: c.amount, unit: c.kind.unit() }).collect();
    ToldPair { changes, share: p.share, depth_deg: deg(p.depth), lean_deg, knee_nm, hip_nm, back_nm }
}

fn seen(s: &SeenStudy) -> ToldSeen {
    let (stands, outside_m) = match s.standing {
        None => (None, None),
        Some(Standing::Steady) => (Some("steady"), Some(0.0)),
        Some(Standing::Drifting(_)) => (Some("drifting"), Some(0.0)),
        Some(Standing::Tips { by_m, .. }) => (Some("tips"), Some(by_m)),
    };
    ToldSeen {
        thigh_deg: s.seen.thigh.deg(),
        shank_deg: s.seen.shank.deg(),
        trunk_deg: s.seen.trunk.deg(),
        depth: match s.depth {
            DepthGap::Explained => "Explained",
            DepthGap::Shallower => "Shallower",
            DepthGap::Deeper => "Deeper",
            DepthGap::NoDepth => "NoDepth",
        },
        lean: match s.lean {
            LeanGap::Needed => "Needed",
            LeanGap::More => "More",
            LeanGap::Less => "Less",
            LeanGap::Unknown => "Unknown",
        },
        lean_needed_deg: deg(s.lean_needed),
        stands,
        outside_m,
    }
}

fn text(chosen: &Chosen, case: &plumbfold_core::Case, r: &Reasons) -> String {
    let mut lines = vec![format!("{}, {}", chosen.client.code, chosen.task_name())];
    let mut part = |title: &str, body: Vec<String>| {
        if !body.is_empty() {
            lines.push(String::new());
            lines.push(title.to_owned());
            lines.extend(body.into_iter().map(|l| format!("  {l}")));
        }
    };
    use words::why;
    part("Seen and computed", r.seen.as_ref().map(why::seen).unwrap_or_default());
    part("What is used up first, on mid-foot", why::stops(&r.steady, case));
    part("What is used up first, in balance at all", why::stops(&r.balance, case));
    part("How much the back may bend", vec![why::by_bend(&r.by_bend)]);
    part("Shape or range", vec![why::shape_or_range(&r.shape_or_range)]);
    let goal = case.task().goal;
    let none = why::nothing_reaches(&r.takes).map(str::to_owned);
    let each = r.takes.single.iter().map(|t| why::take(t, case));
    part(&why::takes_title(goal), none.into_iter().chain(each).collect());
    part("Together", r.takes.pair.iter().map(|p| why::pair(p, case)).collect());
    part("Cautions", vec![words::notices::STANDING_CAUTION.to_owned(), words::notices::NET_MOMENTS_CAUTION.to_owned()]);
    lines.push(String::new());
    lines.join("\n")
}
