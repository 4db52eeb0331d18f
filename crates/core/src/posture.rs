//! Which of the postures at a depth is shown: the task's rule over all allowed shank angles whose
//! centre of mass comes nearest the mid-foot zone.

use crate::{
    angle::Angle,
    balance::{ANGLE_TOL, Balance, balance_in},
    case::Case,
    measures::PerJoint,
    pose::{legs, pelvis_line},
    readings::{Load, capacities, demands, efforts},
    roots,
    row::{LEAN_MIN, Row, Shanks},
    task::Rule,
};

/// The posture at a thigh angle by the task's rule.
///
/// `Usual` and the choice among sets are closed form; `LeastEffort` and `ArmRatio` sample the set
/// every 2.5° and refine every dip by Brent's method to 1e-8 rad.
pub fn posture(c: &Case, thigh: Angle) -> Balance {
    let row = Row::new(c, thigh);
    if let Rule::HeldShank(held) = c.task.rule {
        // a prescribed shank is refused in the order of a given shank
        return balance_in(&row, held);
    }
    if row.lean_high.rad() < LEAN_MIN.rad() - ANGLE_TOL {
        return Balance::Refused(crate::row::Refusal::Hip);
    }
    let shanks = match row.shanks().0 {
        Ok(s) => s,
        Err(why) => return Balance::Refused(why),
    };
    balance_in(&row, chosen(&row, shanks))
}

fn chosen(row: &Row<'_>, shanks: Shanks) -> Angle {
    let c = row.case;
    let s = &c.stand.support;
    let zone = || row.reaching(shanks, s.zone_back_m, s.zone_front_m);
    match c.task.rule {
        Rule::HeldShank(a) => a,
        Rule::Usual { .. } => zone().nearest_to(c.usual_shank(row.thigh)),
        Rule::LeastEffort => {
            let on_aim = row.reaching(shanks, s.aim_m, s.aim_m);
            least_over(on_aim.parts(), |a| effort_sum(row, a)).unwrap_or(on_aim.nearest)
        }
        Rule::ArmRatio(ratio) => {
            let share = ratio / (1.0 + ratio);
            let set = zone();
            // the share has a corner where the centre of mass reaches the aim
            let on_aim = row.reaching(shanks, s.aim_m, s.aim_m);
            let corners = on_aim.parts().iter().flat_map(|p| [p.low, p.high]);
            let pieces = cut(set.parts(), corners);
            least_over(&pieces, |a| off_share(row, a, share)).unwrap_or(set.nearest)
        }
    }
}

/// Intervals cut at the places given.
fn cut(parts: &[Shanks], at: impl Iterator<Item = Angle>) -> Vec<Shanks> {
    let mut pieces = parts.to_vec();
    for a in at {
        if let Some(k) = pieces.iter().position(|p| p.low < a && a < p.high) {
            let high = pieces[k].high;
            pieces[k].high = a;
            pieces.push(Shanks { low: a, high });
        }
    }
    pieces
}

/// The shank angle of least cost over up to two intervals.
fn least_over(parts: &[Shanks], cost: impl Fn(Angle) -> f64) -> Option<Angle> {
    let f = |a: f64| cost(Angle::from_rad(a));
    let mut best: Option<(f64, f64)> = None;
    let mut offer = |at: (f64, f64)| {
        if best.is_none_or(|b| at.1 < b.1) {
            best = Some(at);
        }
    };
    for part in parts {
        let (low, high) = (part.low.rad(), part.high.rad());
        let n = (((high - low).to_degrees() / 2.5).ceil() as usize).clamp(1, 60);
        let at = |k: usize| if k == n { high } else { low + (high - low) * k as f64 / n as f64 };
        let mut value = [f64::INFINITY; 61];
        for (k, v) in value.iter_mut().enumerate().take(n + 1) {
            *v = f(at(k));
        }
        for k in 0..=n {
            let (before, after) = (k.checked_sub(1), (k < n).then_some(k + 1));
            let dips = before.is_none_or(|i| value[k] <= value[i]) && after.is_none_or(|i| value[k] <= value[i]);
            if dips {
                offer(roots::least(f, at(before.unwrap_or(k)), at(after.unwrap_or(k)), 1e-8));
                offer((at(k), value[k]));
            }
        }
    }
    best.map(|(a, _)| Angle::from_rad(a))
}

/// Efforts at a shank of a row, without building the whole posture; `None` where legs cannot span.
pub(crate) fn efforts_at(row: &Row<'_>, shank: Angle) -> Option<PerJoint<f64>> {
    let c = row.case;
    let l = legs(c, shank, row.thigh)?;
    let trunk = row.lean(shank);
    let pelvis = pelvis_line(c, row.thigh, trunk);
    let demand = demands(
        c,
        &Load { ankle_x: l.ankle.x, knee_x: l.knee.x, hip_x: l.hip.x, upper: c.upper.moment(trunk, pelvis).0, pelvis },
    );
    let capacity = capacities(c, l.knee_flexion, row.thigh.rad() + pelvis.rad());
    Some(efforts(c, &demand, &capacity))
}

/// Σ effort² over ankle, knee, hip and low back.
fn effort_sum(row: &Row<'_>, shank: Angle) -> f64 {
    efforts_at(row, shank)
        .map_or(f64::INFINITY, |e| e.ankle * e.ankle + e.knee * e.knee + e.hip * e.hip + e.low_back * e.low_back)
}

/// How far the hip's share of both arms is from a wish. The arms add up to the thigh's sagittal
/// span; standing straight, where that is nothing, the hip arm alone is measured.
fn off_share(row: &Row<'_>, shank: Angle, share: f64) -> f64 {
    let Some(l) = legs(row.case, shank, row.thigh) else { return f64::INFINITY };
    let (back, front) = row.com_reach(shank);
    let com = row.case.stand.support.aim_m.min(front).max(back);
    let span = l.knee.x - l.hip.x;
    let off = (com - l.hip.x - share * span).abs();
    if span > 1e-9 { off / span } else { off }
}
