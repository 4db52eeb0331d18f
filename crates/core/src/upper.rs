//! The first moment of everything above the hips, as a function of trunk lean.
//!
//! About the hip centre, forward: `U = P sin(pelvis) + A sin θ + B cos θ + C + R sin(arms)`, with
//! the pelvis line at `min(θ, hip limit − thigh)` and, overhead, the arms at
//! `max(0, θ − (reach − 180°))`. So U is at most three pieces `a sin θ + b cos θ + c`, each
//! inverted by one arcsine.

use crate::{
    angle::Angle,
    body::Body,
    tables::{ArmFrame, LoadSite, hold},
    task::Placement,
};

/// Directions of the arm from the shoulder centre.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ArmDirections {
    /// Shoulder to elbow.
    pub upper_arm: Angle,
    /// Elbow to wrist and on to the fingertip.
    pub forearm: Angle,
}

/// Coefficients of U, kg·m, and of its height.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Upper {
    /// Body and load above the hips, kg.
    pub mass_kg: f64,
    /// Of that, above the lumbosacral joint, kg.
    pub above_lumbosacral_kg: f64,
    /// Along the pelvis line.
    pelvis: f64,
    /// Of `pelvis`, the pelvis's own share.
    pelvis_own: f64,
    /// Along the trunk line.
    along: f64,
    /// Across the trunk line, forward.
    across: f64,
    /// Level part of arms that keep to the vertical.
    level: f64,
    /// Upright part of arms that keep to the vertical.
    upright: f64,
    /// Along arms held overhead.
    overhead: f64,
    /// Reach limit beyond the trunk line.
    spare: Angle,
}

/// One piece: `a sin θ + b cos θ + c` from `from` up to the next piece.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Piece {
    /// Lean at which it begins.
    pub from: f64,
    a: f64,
    b: f64,
    c: f64,
}

/// The pieces in rising order of lean.
#[derive(Clone, Copy, Debug)]
pub struct Pieces {
    piece: [Piece; 3],
    len: usize,
}

impl Upper {
    /// For a body with its arms and load placed.
    #[must_use]
    pub fn new(body: &Body, placement: Placement, load_kg: f64, reach: Angle) -> Self {
        let m = &body.masses;
        let s = body.segments;
        let hold = hold(placement);
        let to_shoulder = body.trunk_m - body.lumbosacral_m;
        // both arms: first moments about the shoulder along each direction, kg·m
        let in_hands_kg = if hold.load == LoadSite::Hands { load_kg } else { 0.0 };
        let upper_arm = 2.0 * m.upper_arm_kg * s.upper_arm.cm * body.upper_arm_m
            + (2.0 * (m.forearm_kg + m.hand_kg) + in_hands_kg) * body.upper_arm_m;
        let forearm = 2.0 * m.forearm_kg * s.forearm.cm * body.forearm_m
            + 2.0 * m.hand_kg * (body.forearm_m + s.hand.cm * body.hand_m)
            + in_hands_kg * (body.forearm_m + crate::tables::GRIP * body.hand_m);
        let at_shoulder_kg = m.head_kg + m.arms_kg() + load_kg;
        let mut up = Self {
            mass_kg: m.above_hips_kg() + load_kg,
            above_lumbosacral_kg: m.thorax_kg + at_shoulder_kg,
            pelvis: m.pelvis_kg * s.pelvis.cm * body.trunk_m + (m.thorax_kg + at_shoulder_kg) * body.lumbosacral_m,
            pelvis_own: m.pelvis_kg * s.pelvis.cm * body.trunk_m,
            along: m.thorax_kg * (s.thorax.cm * body.trunk_m - body.lumbosacral_m)
                + at_shoulder_kg * to_shoulder
                + m.head_kg * body.head_m,
            across: 0.0,
            level: 0.0,
            upright: 0.0,
            overhead: 0.0,
            spare: reach - Angle::from_deg(180.0),
        };
        if let LoadSite::Trunk { along, forward } = hold.load {
            up.along += load_kg * along * body.stature_m;
            up.across += load_kg * forward * body.stature_m;
        }
        let (su, cu) = Angle::from_deg(hold.upper_arm_deg).sin_cos();
        let (sf, cf) = Angle::from_deg(hold.forearm_deg).sin_cos();
        match hold.frame {
            ArmFrame::Trunk => {
                up.along += upper_arm * cu + forearm * cf;
                up.across += upper_arm * su + forearm * sf;
            }
            ArmFrame::World => {
                up.level = upper_arm * su + forearm * sf;
                up.upright = upper_arm * cu + forearm * cf;
            }
            ArmFrame::Overhead => up.overhead = upper_arm + forearm,
        }
        up
    }

    /// Inclination of arms held overhead: vertical unless that exceeds the reach.
    #[must_use]
    pub fn overhead_arms(&self, trunk: Angle) -> Angle {
        (trunk - self.spare).max(Angle::ZERO)
    }

    /// First moment about the hip centre, forward and up, kg·m.
    #[must_use]
    pub fn moment(&self, trunk: Angle, pelvis: Angle) -> (f64, f64) {
        let (st, ct) = trunk.sin_cos();
        let (sp, cp) = pelvis.sin_cos();
        let (sa, ca) = if self.overhead > 0.0 { self.overhead_arms(trunk).sin_cos() } else { (0.0, 0.0) };
        (
            self.pelvis * sp + self.along * st + self.across * ct + self.level + self.overhead * sa,
            self.pelvis * cp + self.along * ct - self.across * st + self.upright + self.overhead * ca,
        )
    }

    /// Of a first moment about the hip centre, the part of what is above the lumbosacral joint.
    #[must_use]
    pub fn moment_above_lumbosacral(&self, forward: f64, pelvis: Angle) -> f64 {
        forward - self.pelvis_own * pelvis.rad().sin()
    }

    /// The pieces of U over leans from `low`, where the pelvis stops following at `bend_from`.
    #[must_use]
    pub fn pieces(&self, low: Angle, bend_from: Angle) -> Pieces {
        let (low, bend_from, reach_from) = (low.rad(), bend_from.rad(), self.spare.rad());
        let (bent, arms_follow) = (bend_from <= low, self.overhead > 0.0 && reach_from <= low);
        let at = |from: f64, bent: bool, follow: bool| {
            let (mut a, mut b, mut c) = (self.along, self.across, self.level);
            if bent {
                c += self.pelvis * bend_from.sin();
            } else {
                a += self.pelvis;
            }
            if follow {
                let (s, k) = reach_from.sin_cos();
                a += self.overhead * k;
                b -= self.overhead * s;
            }
            Piece { from, a, b, c }
        };
        let first = at(low, bent, arms_follow);
        let mut p = Pieces { piece: [first; 3], len: 1 };
        let mut push = |from: f64, bent: bool, follow: bool| {
            p.piece[p.len] = at(from, bent, follow);
            p.len += 1;
        };
        let arms_turn = self.overhead > 0.0 && !arms_follow;
        match (!bent, arms_turn) {
            (true, true) if bend_from <= reach_from => {
                push(bend_from, true, false);
                push(reach_from, true, true);
            }
            (true, true) => {
                push(reach_from, false, true);
                push(bend_from, true, true);
            }
            (true, false) => push(bend_from, true, arms_follow),
            (false, true) => push(reach_from, bent, true),
            (false, false) => {}
        }
        p
    }
}

impl Piece {
    fn value(&self, lean: f64) -> f64 {
        let (s, c) = lean.sin_cos();
        self.a * s + self.b * c + self.c
    }

    fn amplitude_phase(&self) -> (f64, f64) {
        (self.a.hypot(self.b), self.b.atan2(self.a))
    }
}

/// Brings an angle into (−π, π].
fn wrap(rad: f64) -> f64 {
    use std::f64::consts::{PI, TAU};
    let r = rad.rem_euclid(TAU);
    if r > PI { r - TAU } else { r }
}

impl Pieces {
    fn all(&self) -> &[Piece] {
        &self.piece[..self.len]
    }

    /// U at a lean, kg·m. Below the first piece, that piece goes on.
    #[must_use]
    pub fn value(&self, lean: Angle) -> f64 {
        let at = self.all().iter().rposition(|p| p.from <= lean.rad()).unwrap_or(0);
        self.piece[at].value(lean.rad())
    }

    /// The first lean, up to `end`, from which U rises by less than `rate` (kg·m per rad); `end` where
    /// it does not. Each piece's slope is `R cos(θ + δ)`, falling from its start or rising to its peak.
    #[must_use]
    pub fn rises_until(&self, rate: f64, end: Angle) -> Angle {
        let end = end.rad();
        for (k, p) in self.all().iter().enumerate() {
            let stop = self.all().get(k + 1).map_or(end, |next| next.from.min(end));
            if p.from >= stop {
                continue;
            }
            let (s, c) = p.from.sin_cos();
            if p.a * c - p.b * s < rate {
                return Angle::from_rad(p.from);
            }
            let (r, phase) = p.amplitude_phase();
            // the slope at the start reaches the rate, so r >= rate
            let peak_end = (rate / r).clamp(-1.0, 1.0).acos();
            let turn = p.from + (peak_end - wrap(p.from + phase)).max(0.0);
            if turn < stop {
                return Angle::from_rad(turn);
            }
        }
        Angle::from_rad(end)
    }

    /// The lean at which a rising U takes a value between its values at `low` and `high`.
    #[must_use]
    pub fn invert(&self, target: f64, low: Angle, high: Angle) -> Angle {
        let mut at = &self.piece[0];
        for p in self.all() {
            if p.from < high.rad() && p.value(p.from) <= target {
                at = p;
            }
        }
        let (r, phase) = at.amplitude_phase();
        if r <= 0.0 {
            return low;
        }
        let lean = ((target - at.c) / r).clamp(-1.0, 1.0).asin() - phase;
        Angle::from_rad(wrap(lean)).within(low, high)
    }
}
