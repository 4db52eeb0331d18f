//! All postures of one thigh angle: the leans it allows, the shank angles it allows, and where
//! among them the centre of mass can be brought.
//!
//! With v = sin(shank) the first moment at a fixed lean is `α + β v − γ √(τ² − (p − q v)²)`, γ ≥ 0:
//! linear without toe-out, else convex. So every crossing is a quadratic, and each allowed interval
//! falls into at most two pieces on which it is monotone.

use crate::{
    angle::Angle,
    case::{Case, side_offset},
    roots,
    upper::Pieces,
};

/// Least trunk lean considered.
pub const LEAN_MIN: Angle = Angle::from_deg(-5.0);
/// Least shank angle considered.
pub const SHANK_MIN: Angle = Angle::from_deg(-10.0);
/// Greatest shank angle considered.
pub const SHANK_MAX: Angle = Angle::from_deg(89.0);
/// Leaning further helps only while the centre of mass rises by this much per radian of lean, m:
/// 0.2 mm per degree.
const WORTH_LEANING_M_PER_RAD: f64 = 0.2e-3 * 180.0 / std::f64::consts::PI;

/// An interval of shank angles that is empty by less than this is a single angle, rad.
const ROUNDING: f64 = 1e-12;

/// Why a posture does not exist.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Refusal {
    /// Legs cannot span the stance.
    Stance,
    /// Dorsiflexion over its limit.
    Ankle,
    /// Knee flexion over its limit.
    Knee,
    /// Even bent as far as allowed, hip and back do not fold enough.
    Hip,
}

/// The shank angles allowed at one thigh angle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Shanks {
    pub low: Angle,
    pub high: Angle,
}

/// What does not change at one thigh angle.
pub(crate) struct Row<'a> {
    pub case: &'a Case,
    pub thigh: Angle,
    /// Greatest lean; below [`LEAN_MIN`] the hip refuses.
    pub lean_high: Angle,
    pieces: Pieces,
    /// U at the ends of the lean range, kg·m.
    u_low: f64,
    u_high: f64,
    // α + β v − γ √(τ² − (p − q v)²)
    alpha: f64,
    beta: f64,
    gamma: f64,
    tau: f64,
    p: f64,
    q: f64,
    /// Whether shank and thigh can span the side offset at all.
    spans: bool,
}

impl<'a> Row<'a> {
    pub fn new(case: &'a Case, thigh: Angle) -> Self {
        let (body, stand, chain) = (&case.body, &case.stand, &case.chain);
        let side = side_offset(body, stand, thigh);
        let level2 = body.shank_m * body.shank_m - side * side;
        let level = level2.max(0.0).sqrt();
        let bend_from = case.limits.hip - thigh;
        let pieces = case.upper.pieces(LEAN_MIN, bend_from);
        let most = case.limits.lean.min(bend_from + case.limits.bend);
        let lean_high =
            if most < LEAN_MIN { most } else { pieces.rises_until(WORTH_LEANING_M_PER_RAD * chain.mass_kg, most) };
        let both_kg = chain.knee_kg + chain.hip_kg;
        let ankle_x = stand.ankle_s_m * stand.cos_out - side * stand.sin_out;
        Self {
            case,
            thigh,
            lean_high,
            u_low: pieces.value(LEAN_MIN),
            u_high: pieces.value(lean_high),
            pieces,
            alpha: chain.feet_x + both_kg * ankle_x,
            beta: both_kg * level * stand.cos_out,
            gamma: chain.hip_kg * thigh.rad().sin().max(0.0),
            tau: body.thigh_m,
            p: body.hip_half_m - stand.half_stance_m - side * stand.cos_out,
            q: level * stand.sin_out,
            spans: level2 > 0.0,
        }
    }

    /// First moment of all but U at v = sin(shank), kg·m.
    fn legs_moment(&self, v: f64) -> f64 {
        let w = self.p - self.q * v;
        self.alpha + self.beta * v - self.gamma * (self.tau * self.tau - w * w).max(0.0).sqrt()
    }

    /// Centre of mass with the trunk as upright and as far forward as allowed, m.
    pub fn com_reach(&self, shank: Angle) -> (f64, f64) {
        let legs = self.legs_moment(shank.rad().sin());
        ((legs + self.u_low) / self.case.chain.mass_kg, (legs + self.u_high) / self.case.chain.mass_kg)
    }

    /// The lean that puts the centre of mass on the aim, else the end of the range nearest to it.
    ///
    /// Closed form: one arcsine on the piece of U that holds the target.
    pub fn lean(&self, shank: Angle) -> Angle {
        let target = self.case.stand.support.aim_m * self.case.chain.mass_kg - self.legs_moment(shank.rad().sin());
        if target >= self.u_high {
            self.lean_high
        } else if target <= self.u_low {
            LEAN_MIN
        } else {
            self.pieces.invert(target, LEAN_MIN, self.lean_high)
        }
    }

    /// Lowest and highest shank angle by the ankle, whatever stance and knee say.
    pub fn ankle_range(&self) -> (Angle, Angle) {
        let c = self.case;
        (SHANK_MIN.max(c.chain.straight_shank - self.thigh), (c.limits.ankle + c.stand.pitch).min(SHANK_MAX))
    }

    /// Shank angles at which the thigh can span the stance, as v = sin(shank).
    fn spanning(&self) -> Option<(f64, f64)> {
        // a whisker inside, so that the legs exist at the ends
        let tau = self.tau * (1.0 - 1e-12);
        if !self.spans {
            return None;
        }
        if self.q == 0.0 {
            return (self.p.abs() < tau).then_some((-1.0, 1.0));
        }
        let (a, b) = ((self.p - tau) / self.q, (self.p + tau) / self.q);
        let (low, high) = (a.min(b).max(-1.0), a.max(b).min(1.0));
        (low <= high).then_some((low, high))
    }

    /// The shank angles allowed, and how much room they leave (rad; negative where there are none,
    /// continuous in the thigh angle).
    pub fn shanks(&self) -> (Result<Shanks, Refusal>, f64) {
        let (low, high) = self.ankle_range();
        let Some((v_low, v_high)) = self.spanning() else {
            return (Err(Refusal::Stance), -1.0);
        };
        if v_high < low.rad().sin() || v_low > SHANK_MAX.rad().sin() {
            return (Err(Refusal::Stance), -1.0);
        }
        let room = high.rad() - low.rad();
        if room < -ROUNDING {
            return (Err(Refusal::Ankle), room);
        }
        let high = high.max(low);
        let low = low.max(Angle::from_rad(v_low.asin()));
        let high = high.min(Angle::from_rad(v_high.asin()));
        let room = room.min(high.rad() - low.rad());
        if room < -ROUNDING {
            return (Err(Refusal::Stance), room);
        }
        self.within_knee(low, high.max(low), room)
    }

    /// Of an interval of shank angles, the part (the upper one of two) that the knee limit leaves.
    fn within_knee(&self, low: Angle, high: Angle, room: f64) -> (Result<Shanks, Refusal>, f64) {
        let limit = self.case.limits.knee.rad();
        let pi = std::f64::consts::PI;
        let high = high.min(Angle::from_rad(pi - self.thigh.rad()));
        if high.rad() < low.rad() - ROUNDING {
            return (Err(Refusal::Knee), high.rad() - low.rad());
        }
        let high = high.max(low);
        if self.q == 0.0 && self.p == 0.0 && self.beta_is_plain() {
            // both in the sagittal plane: flexion is shank + thigh
            let high = high.min(Angle::from_rad(limit - self.thigh.rad()));
            let left = high.rad() - low.rad();
            let found = if left < -ROUNDING { Err(Refusal::Knee) } else { Ok(Shanks { low, high: high.max(low) }) };
            return (found, left.min(room));
        }
        if self.most_flexion(low, high) <= limit {
            return (Ok(Shanks { low, high }), room);
        }
        match upper_piece(self.flexion_over(limit), low.rad(), high.rad()) {
            Ok((a, b)) => (Ok(Shanks { low: Angle::from_rad(a), high: Angle::from_rad(b) }), (b - a).min(room)),
            Err(least_over) => (Err(Refusal::Knee), -least_over),
        }
    }

    /// How far the knee is bent over a limit at a shank angle (rad), as a difference of cosines: the
    /// same sign as that of the angles, without an arc function.
    fn flexion_over(&self, limit: f64) -> impl Fn(f64) -> f64 {
        let stand = &self.case.stand;
        let side = side_offset(&self.case.body, stand, self.thigh);
        let shank_m = self.case.body.shank_m;
        let level = (shank_m * shank_m - side * side).max(0.0).sqrt();
        let (st, ct) = self.thigh.sin_cos();
        let (sin_out, cos_out) = (stand.sin_out, stand.cos_out);
        let (p, q, tau) = (self.p, self.q, self.tau);
        let cos_limit = limit.cos();
        move |shank: f64| {
            let (ss, cs) = shank.sin_cos();
            let dz = p - q * ss;
            let across = (tau * tau - dz * dz).max(0.0).sqrt();
            let dot = across * (ct * level * cs - st * (level * ss * cos_out - side * sin_out))
                + dz * (level * ss * sin_out + side * cos_out);
            cos_limit - dot / (shank_m * tau)
        }
    }

    fn beta_is_plain(&self) -> bool {
        // no side offset of the shank either
        side_offset(&self.case.body, &self.case.stand, self.thigh) == 0.0
    }

    /// An upper bound of knee flexion over an interval: shank and thigh, each from the vertical.
    fn most_flexion(&self, low: Angle, high: Angle) -> f64 {
        let shank_m = self.case.body.shank_m;
        let (level, level_thigh) = (
            (shank_m * shank_m - side_offset(&self.case.body, &self.case.stand, self.thigh).powi(2)).max(0.0).sqrt(),
            |v: f64| {
                let w = self.p - self.q * v;
                (self.tau * self.tau - w * w).max(0.0).sqrt()
            },
        );
        let tilt = low.rad().abs().max(high.rad().abs());
        let shank = (level * tilt.cos() / shank_m).clamp(-1.0, 1.0).acos();
        let cos_t = self.thigh.rad().cos();
        // the sagittal length is concave in v: least at an end; below level it counts the other way
        let ends = [level_thigh(low.rad().sin()), level_thigh(high.rad().sin())];
        let reach = if cos_t >= 0.0 { ends[0].min(ends[1]) } else { self.tau };
        shank + (reach * cos_t / self.tau).clamp(-1.0, 1.0).acos()
    }

    /// Parts of an interval of v on which the moment is monotone.
    fn monotone(&self, v_low: f64, v_high: f64) -> ([(f64, f64); 2], usize) {
        if self.q != 0.0 && self.gamma > 0.0 {
            let k = self.beta / (self.gamma * self.q);
            let w = self.tau * k / (1.0 + k * k).sqrt();
            let turn = (self.p - w) / self.q;
            if turn > v_low && turn < v_high {
                return ([(v_low, turn), (turn, v_high)], 2);
            }
        }
        ([(v_low, v_high); 2], 1)
    }

    /// Where a monotone part crosses a moment; the end nearest to it where it does not.
    fn crossing(&self, target: f64, (from, to): (f64, f64)) -> f64 {
        let (f, t) = (self.legs_moment(from), self.legs_moment(to));
        let rising = t >= f;
        let (least, most) = if rising { (f, t) } else { (t, f) };
        if target <= least {
            return if rising { from } else { to };
        }
        if target >= most {
            return if rising { to } else { from };
        }
        self.solve(target, from, to)
    }

    /// Root of `legs_moment(v) = target` inside a bracket.
    fn solve(&self, target: f64, from: f64, to: f64) -> f64 {
        let off = self.alpha - target;
        if self.q == 0.0 {
            let drop = self.gamma * (self.tau * self.tau - self.p * self.p).max(0.0).sqrt();
            return ((drop - off) / self.beta).clamp(from.min(to), from.max(to));
        }
        let g2 = self.gamma * self.gamma;
        let a = self.beta * self.beta + g2 * self.q * self.q;
        let half_b = self.beta * off - g2 * self.p * self.q;
        let c = off * off - g2 * (self.tau * self.tau - self.p * self.p);
        let disc = (half_b * half_b - a * c).max(0.0).sqrt();
        let roots = [(-half_b - disc) / a, (-half_b + disc) / a];
        let best = roots
            .into_iter()
            .map(|v| v.clamp(from, to))
            .min_by(|x, y| {
                let miss = |v: f64| (self.legs_moment(v) - target).abs();
                miss(*x).total_cmp(&miss(*y))
            })
            .unwrap_or(from);
        // squaring cost half the digits where the root term is small: one bracketed polish
        roots::polish(|v| self.legs_moment(v) - target, best, from, to)
    }

    /// Within allowed shanks, the parts whose centre of mass can be brought into `[back, front]` (m),
    /// as shank angles; with none, the shank that comes nearest and by how much it misses (m).
    pub fn reaching(&self, s: Shanks, back_m: f64, front_m: f64) -> Reaching {
        let kg = self.case.chain.mass_kg;
        let (parts, n) = self.monotone(s.low.rad().sin(), s.high.rad().sin());
        let mut found = Reaching { parts: [s; 2], len: 0, nearest: s.low, miss_m: f64::INFINITY };
        for &(from, to) in &parts[..n] {
            let (a, b) = (self.legs_moment(from), self.legs_moment(to));
            let rising = b >= a;
            let (least, most) = if rising { (a, b) } else { (b, a) };
            let (need, allow) = (back_m * kg - self.u_high, front_m * kg - self.u_low);
            if most >= need && least <= allow {
                let (x, y) = (self.crossing(need, (from, to)), self.crossing(allow, (from, to)));
                found.push(self.shank_at(x.min(y), s), self.shank_at(x.max(y), s));
            } else {
                let (v, miss) = if most < need {
                    (if rising { to } else { from }, need - most)
                } else {
                    (if rising { from } else { to }, least - allow)
                };
                if miss / kg < found.miss_m {
                    found.miss_m = miss / kg;
                    found.nearest = self.shank_at(v, s);
                }
            }
        }
        if found.len > 0 {
            found.miss_m = 0.0;
        }
        found
    }

    fn shank_at(&self, v: f64, s: Shanks) -> Angle {
        Angle::from_rad(v.clamp(-1.0, 1.0).asin()).within(s.low, s.high)
    }

    /// How far the centre of mass can be brought past the rear and the front of `[back, front]` by
    /// some allowed shank (m, both positive: some posture is within).
    ///
    /// The reach is an interval for each shank and continuous in it, so both suffice.
    pub fn slack(&self, low: Angle, high: Angle, back_m: f64, front_m: f64) -> f64 {
        let kg = self.case.chain.mass_kg;
        let (v_low, v_high) = (low.rad().sin(), high.rad().sin());
        let (a, b) = (self.legs_moment(v_low), self.legs_moment(v_high));
        let (parts, n) = self.monotone(v_low.min(v_high), v_high.max(v_low));
        let least = if n == 2 { self.legs_moment(parts[0].1).min(a.min(b)) } else { a.min(b) };
        let forward = (a.max(b) + self.u_high) / kg - back_m;
        let rearward = front_m - (least + self.u_low) / kg;
        forward.min(rearward)
    }
}

/// The outcome of [`Row::reaching`].
#[derive(Clone, Copy, Debug)]
pub(crate) struct Reaching {
    parts: [Shanks; 2],
    len: usize,
    pub nearest: Angle,
    pub miss_m: f64,
}

impl Reaching {
    fn push(&mut self, low: Angle, high: Angle) {
        self.parts[self.len] = Shanks { low, high };
        self.len += 1;
    }

    /// The parts; empty where the miss is above zero.
    pub fn parts(&self) -> &[Shanks] {
        &self.parts[..self.len]
    }

    /// The shank angle of the parts nearest to a wish.
    pub fn nearest_to(&self, wish: Angle) -> Angle {
        let off = |a: Angle| (a.rad() - wish.rad()).abs();
        self.parts()
            .iter()
            .map(|s| wish.within(s.low, s.high))
            .min_by(|a, b| off(*a).total_cmp(&off(*b)))
            .unwrap_or(self.nearest)
    }
}

/// Of `low..=high`, the upper piece on which `over <= 0`, ends bracketed to 1e-12 rad; else the
/// least of `over` seen. Sampled every 3°: flexion turns at most once over an interval.
fn upper_piece(over: impl Fn(f64) -> f64, low: f64, high: f64) -> Result<(f64, f64), f64> {
    let n = (((high - low).to_degrees() / 3.0).ceil() as usize).clamp(1, 60);
    let at = |k: usize| if k == n { high } else { low + (high - low) * k as f64 / n as f64 };
    let mut least = f64::INFINITY;
    let mut top: Option<f64> = None;
    let mut above = f64::NAN;
    let mut most = (n, f64::NEG_INFINITY);
    for k in (0..=n).rev() {
        let s = at(k);
        let f = over(s);
        least = least.min(f);
        if f > most.1 {
            most = (k, f);
        }
        match top {
            None if f <= 0.0 => top = Some(if k == n { high } else { roots::bracketed(&over, s, at(k + 1), 1e-12) }),
            Some(upper) if f > 0.0 => return Ok((roots::bracketed(&over, s, above, 1e-12), upper)),
            _ => {}
        }
        above = s;
    }
    match top {
        Some(upper) => {
            // a hump between samples, around the largest of them
            let (from, to) = (at(most.0.saturating_sub(1)), at((most.0 + 1).min(n)));
            let (s, minus) = roots::least(|x| -over(x), from, to, 1e-9);
            if minus < 0.0 && s < upper {
                return Ok((roots::bracketed(&over, s, to.min(upper), 1e-12), upper));
            }
            Ok((low, upper))
        }
        None => {
            // a dip between samples
            let (s, f) = roots::least(&over, low, high, 1e-9);
            if f <= 0.0 { Ok((s, s)) } else { Err(least.min(f)) }
        }
    }
}
