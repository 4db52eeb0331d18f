//! Lean ranges, allowed shanks, depths and chosen postures by scanning the explicit model: slow and
//! plain, so that it can be believed.

use std::f64::consts::PI;

use crate::explicit::{self, Inputs};

/// Least lean, radians.
pub const LEAN_LOW: f64 = -5.0 * PI / 180.0;

/// Everything fixed at one thigh angle.
pub struct Row {
    pub thigh: f64,
    /// Highest lean; below [`LEAN_LOW`] the hip refuses.
    pub lean_high: f64,
    /// First moment above the hip about the hip at the lowest and highest lean, kg·m.
    upper: (f64, f64),
    mass_kg: f64,
}

/// First moment above the hip about the hip, kg·m.
fn upper_moment(i: &Inputs, thigh: f64, lean: f64) -> f64 {
    explicit::first_moment(&explicit::upper(i, thigh, lean).parts, 0.0)
}

/// Body and load, kg.
pub fn total_mass(i: &Inputs) -> f64 {
    i.body.mass_kg + i.task.load_kg
}

/// The highest lean: within its limit, within hip and bend, and only as far as leaning another
/// degree still brings the centre of mass 0.2 mm forward.
///
/// Slopes by finite differences on a grid of 2° that holds the corners (where the back starts to bend,
/// where the arms start to follow), the crossing halved. Between corners the slope is a cosine.
pub fn lean_high(i: &Inputs, thigh: f64) -> f64 {
    let most = i.limits.lean.rad().min(i.limits.hip.rad() + i.limits.bend.rad() - thigh);
    if most < LEAN_LOW {
        return most;
    }
    let per_rad = 0.0002 * 180.0 / PI * total_mass(i);
    let u = |lean: f64| upper_moment(i, thigh, lean);
    let h = 1e-6;
    let mut grid: Vec<f64> = (0..=46).map(|k| LEAN_LOW + f64::from(k) * PI / 90.0).collect();
    grid.extend([i.limits.hip.rad() - thigh, i.limits.reach.rad() - PI, most]);
    grid.retain(|&a| a >= LEAN_LOW && a <= most);
    grid.sort_by(f64::total_cmp);
    for pair in grid.windows(2) {
        let (mut a, mut b) = (pair[0], pair[1]);
        if b - a < 4.0 * h {
            continue;
        }
        if (u(a + h) - u(a)) / h < per_rad {
            return a;
        }
        if (u(b) - u(b - h)) / h < per_rad {
            while b - a > 1e-11 {
                let mid = 0.5 * (a + b);
                if (u(mid + h) - u(mid - h)) / (2.0 * h) < per_rad { b = mid } else { a = mid }
            }
            return a;
        }
    }
    most
}

impl Row {
    pub fn new(i: &Inputs, thigh: f64) -> Self {
        let lean_high = lean_high(i, thigh);
        let upper = (upper_moment(i, thigh, LEAN_LOW), upper_moment(i, thigh, lean_high));
        Self { thigh, lean_high, upper, mass_kg: total_mass(i) }
    }

    /// Centre of mass at the ends of the lean range.
    pub fn reach(&self, i: &Inputs, shank: f64) -> Option<(f64, f64)> {
        let f = explicit::figure(i, shank, self.thigh, LEAN_LOW)?;
        let low = explicit::com(&f.parts).0;
        Some((low, low + (self.upper.1 - self.upper.0) / self.mass_kg))
    }

    /// The lean that puts the centre of mass on the aim, by halving; else the nearest end.
    pub fn lean(&self, i: &Inputs, shank: f64) -> Option<f64> {
        let aim = explicit::support(i)[2];
        let (low, high) = self.reach(i, shank)?;
        if low >= aim {
            return Some(LEAN_LOW);
        }
        if high <= aim {
            return Some(self.lean_high);
        }
        let (mut a, mut b) = (LEAN_LOW, self.lean_high);
        while b - a > 1e-13 {
            let mid = 0.5 * (a + b);
            let x = low + (upper_moment(i, self.thigh, mid) - self.upper.0) / self.mass_kg;
            if x < aim {
                a = mid
            } else {
                b = mid
            }
            if mid == a && mid == b {
                break;
            }
        }
        Some(0.5 * (a + b))
    }

    /// Shank range by ankle and standing straight.
    pub fn ankle_range(&self, i: &Inputs) -> (f64, f64) {
        let low = (-10f64).to_radians().max(explicit::straight_shank(i) - self.thigh);
        (low, (i.limits.ankle.rad() + explicit::pitch(i)).min(89f64.to_radians()))
    }

    /// Whether the legs can stand there: stance possible, knee within its limit.
    fn allowed(&self, i: &Inputs, shank: f64) -> bool {
        explicit::leg(i, shank, self.thigh)
            .is_some_and(|l| l.flexion() <= i.limits.knee.rad() + 1e-9 && shank + self.thigh <= PI + 1e-9)
    }

    /// Allowed shanks on a grid that holds both ends, from the highest down, with the places between
    /// where stance or knee begin or cease to allow; of two pieces left by the knee the upper one.
    /// Stops when `found` says so.
    pub fn each_shank(&self, i: &Inputs, step: f64, mut found: impl FnMut(f64) -> bool) {
        let (low, high) = self.ankle_range(i);
        if high < low {
            return;
        }
        // the last allowed shank between an allowed and a forbidden one, by halving
        let edge = |mut yes: f64, mut no: f64| {
            for _ in 0..60 {
                let mid = 0.5 * (yes + no);
                if self.allowed(i, mid) { yes = mid } else { no = mid }
            }
            yes
        };
        let n = ((high - low) / step).ceil().max(1.0) as usize;
        let mut last: Option<(f64, bool)> = None;
        for k in 0..=n {
            let shank = if k == n { low } else { high - k as f64 * step };
            let yes = self.allowed(i, shank);
            match last {
                Some((before, false)) if yes && found(edge(shank, before)) => return,
                Some((before, true)) if !yes => {
                    found(edge(before, shank));
                    return;
                }
                _ => {}
            }
            if yes && found(shank) {
                return;
            }
            last = Some((shank, yes));
        }
    }

    /// A shank on the grid that brings the centre of mass within `[back, front]`. One that did so a
    /// little higher up is tried first.
    fn found(&self, i: &Inputs, (back, front): (f64, f64), step: f64, first: Option<f64>) -> Option<f64> {
        if self.lean_high < LEAN_LOW - 1e-9 {
            return None;
        }
        let within =
            |shank: f64| self.reach(i, shank).is_some_and(|(low, high)| high >= back - 1e-9 && low <= front + 1e-9);
        let (low, high) = self.ankle_range(i);
        if let Some(s) = first.filter(|&s| s >= low && s <= high && self.allowed(i, s) && within(s)) {
            return Some(s);
        }
        let mut found = None;
        self.each_shank(i, step, |shank| {
            found = within(shank).then_some(shank);
            found.is_some()
        });
        found
    }

    /// Whether some shank on the grid brings the centre of mass within `[back, front]`.
    pub fn feasible(&self, i: &Inputs, back: f64, front: f64, step: f64) -> bool {
        self.found(i, (back, front), step, None).is_some()
    }
}

/// Where the centre of mass comes to lie at a shank: the aim where it can be reached.
pub fn brought_to(reach: (f64, f64), aim: f64) -> f64 {
    aim.min(reach.1).max(reach.0)
}

/// How far x lies outside `[back, front]`.
pub fn outside(x: f64, back: f64, front: f64) -> f64 {
    (back - x).max(x - front).max(0.0)
}

/// The deepest thigh angle (degrees) reached from standing without a gap, on a grid of `step` degrees
/// in thigh and shank.
pub fn depth(i: &Inputs, back: f64, front: f64, step: f64) -> Option<f64> {
    let mut last = None;
    let mut ok = |k: u32| {
        let row = Row::new(i, (f64::from(k) * step).to_radians());
        last = row.found(i, (back, front), step.to_radians(), last);
        last.is_some()
    };
    let start = (0..).take_while(|&k| f64::from(k) * step <= 10.0 + 1e-9).find(|&k| ok(k))?;
    let end = (start..).find(|&k| f64::from(k + 1) * step > 180.0 + 1e-9 || !ok(k + 1));
    Some(f64::from(end?) * step)
}

/// Whether the knee limit may leave two pieces of shanks at some depth. In a wide turned-out stance the
/// knee can open again as the shank leans on; where that turn comes within a degree of the limit, the
/// upper piece is a sliver that comes and goes, and which of both counts is a matter of definition.
pub fn knee_may_split_the_shanks(i: &Inputs) -> bool {
    let limit = i.limits.knee.rad();
    if i.task.toe_out.rad() == 0.0 {
        // its cosine is then that of shank + thigh, stretched and shifted: it never turns
        return false;
    }
    (0..=180).any(|k| {
        let thigh = f64::from(k).to_radians();
        let low = (-10f64).to_radians().max(explicit::straight_shank(i) - thigh);
        let high = (i.limits.ankle.rad() + explicit::pitch(i)).min(PI - thigh).min(89f64.to_radians());
        let flexion = |shank: f64| explicit::leg(i, shank, thigh).map(|l| l.flexion());
        let at = |k: u32| low + (high - low).max(0.0) * f64::from(k) / 60.0;
        let Some(first) = (0..=60).find(|&k| flexion(at(k)).is_some()) else { return false };
        let last = (first..=60).take_while(|&k| flexion(at(k)).is_some()).last().unwrap_or(first);
        // to the very end of what the stance allows, where the flexion is steepest
        let mut end = at(last);
        let mut beyond = if last == 60 { end } else { at(last + 1) };
        for _ in 0..40 {
            let mid = 0.5 * (end + beyond);
            if flexion(mid).is_some() { end = mid } else { beyond = mid }
        }
        let peak = (first..=last).filter_map(|k| flexion(at(k))).fold(0.0, f64::max);
        let ends = [flexion(at(first)), flexion(end)].map(|f| f.unwrap_or(f64::INFINITY));
        peak > limit - 1f64.to_radians() && ends.iter().all(|&e| e < limit && e < peak - 1e-9)
    })
}
