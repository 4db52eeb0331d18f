//! The model a second time, plainly: where every joint and segment is, the sum over all of them,
//! static moments joint by joint, capacities. Written from the description of the model; of the
//! program it uses the public values of body, limits and task, and the constants.
//!
//! Angles are bare radians here, points are (x, y) or (x, y, z) with z to the client's right.

use plumbfold_core::{
    Body, Case, Limits, Task,
    tables::{self, ArmFrame, CapacityRow, CapacityRows, LoadSite},
};

/// A point mass, kg and m.
#[derive(Clone, Copy, Debug)]
pub struct Part {
    pub kg: f64,
    pub x: f64,
    pub y: f64,
}

/// Both feet, shanks, thighs, pelvis, thorax, head, both upper arms, forearms, hands, the load.
pub const PARTS: usize = 10;
/// The first part above the ankles.
pub const ABOVE_ANKLE: usize = 1;
/// The first part above the knees.
pub const ABOVE_KNEE: usize = 2;
/// The first part above the hips.
pub const ABOVE_HIP: usize = 3;
/// The first part above the lumbosacral joint.
pub const ABOVE_LOW_BACK: usize = 4;

pub type P2 = (f64, f64);
pub type P3 = [f64; 3];

/// The right leg in space.
#[derive(Clone, Copy, Debug)]
pub struct Leg {
    pub ankle: P3,
    pub knee: P3,
    pub hip: P3,
}

/// Joints above the hip and the parts, relative to the hip centre.
#[derive(Clone, Copy, Debug)]
pub struct Upper {
    pub lumbosacral: P2,
    pub shoulder: P2,
    pub elbow: P2,
    pub wrist: P2,
    pub load: P2,
    /// Pelvis inclination.
    pub pelvis: f64,
    pub parts: [Part; PARTS - ABOVE_HIP],
}

/// One posture.
#[derive(Clone, Copy, Debug)]
pub struct Figure {
    pub leg: Leg,
    pub lumbosacral: P2,
    pub shoulder: P2,
    pub elbow: P2,
    pub wrist: P2,
    pub load: P2,
    pub pelvis: f64,
    pub parts: [Part; PARTS],
}

/// What of a case the model is about; a test may alter any of them.
#[derive(Clone, Debug)]
pub struct Inputs {
    pub body: Body,
    pub limits: Limits,
    pub task: Task,
}

impl From<&Case> for Inputs {
    fn from(c: &Case) -> Self {
        Self { body: c.body().clone(), limits: *c.limits(), task: c.task().clone() }
    }
}

/// Pitch of the sole about the ball of the foot.
pub fn pitch(i: &Inputs) -> f64 {
    ((i.task.heel_raise_m + i.task.footwear_drop_m) / i.body.heel_to_ball_m).asin()
}

/// A point of the flat foot (forward of the heel, above the sole) after the heel is raised: turned
/// about the ball.
pub fn raised(i: &Inputs, (s, y): P2) -> P2 {
    let (sin, cos) = pitch(i).sin_cos();
    let from_ball = s - i.body.heel_to_ball_m;
    (i.body.heel_to_ball_m + from_ball * cos + y * sin, -from_ball * sin + y * cos)
}

/// A fraction of the foot, from the raised heel's edge to the toe tip, as x.
pub fn foot_x(i: &Inputs, fraction: f64) -> f64 {
    let heel = raised(i, (0.0, 0.0)).0;
    (heel + fraction * (i.body.foot_m - heel)) * i.task.toe_out.rad().cos()
}

/// Rear edge, zone, aim, zone, front edge as x.
pub fn support(i: &Inputs) -> [f64; 5] {
    let s = &i.task.support;
    let old = ((i.body.age_years - 55.0) / 10.0).clamp(0.0, 1.0);
    let back = s.edge_back.unwrap_or(0.15 * (1.0 - old) + 0.26 * old).min(s.zone_back);
    let front = s.edge_front.unwrap_or(0.80 * (1.0 - old) + 0.76 * old).max(s.zone_front);
    [back, s.zone_back, s.aim, s.zone_front, front].map(|f| foot_x(i, f))
}

/// Ankles from the midline.
fn half_stance(i: &Inputs) -> f64 {
    i.task.stance_m.map_or(tables::HIP_HALF_SPACING * i.body.stature_m, |w| w / 2.0)
}

/// Side offset of the knee out of the foot's plane.
pub fn side_offset(i: &Inputs, thigh: f64) -> f64 {
    if thigh >= std::f64::consts::FRAC_PI_2 {
        return 0.0;
    }
    let (shank, thigh_m) = (i.body.shank_m, i.body.thigh_m);
    let whole = tables::HIP_HALF_SPACING * i.body.stature_m - half_stance(i);
    whole * i.task.toe_out.rad().cos() * shank / (shank + thigh_m) * thigh.cos().powi(2)
}

/// Shank angle of the straight leg.
pub fn straight_shank(i: &Inputs) -> f64 {
    let o = side_offset(i, 0.0);
    let length2 = i.body.shank_m.powi(2) - o * o;
    if length2 <= 0.0 {
        return 0.0;
    }
    (o * i.task.toe_out.rad().tan() / length2.sqrt()).clamp(-1.0, 1.0).asin()
}

/// The right leg; none where the stance is impossible.
pub fn leg(i: &Inputs, shank: f64, thigh: f64) -> Option<Leg> {
    let o = side_offset(i, thigh);
    if o.abs() >= i.body.shank_m {
        return None;
    }
    let length = (i.body.shank_m.powi(2) - o * o).sqrt();
    let (sin_out, cos_out) = i.task.toe_out.rad().sin_cos();
    let (s, y) = raised(i, (i.body.heel_to_ankle_m, i.body.ankle_height_m));
    let ankle = [s * cos_out, y, half_stance(i)];
    // along the foot, up, and out of the foot's plane
    let (ahead, up) = (length * shank.sin(), length * shank.cos());
    let knee = [ankle[0] + ahead * cos_out - o * sin_out, ankle[1] + up, ankle[2] + ahead * sin_out + o * cos_out];
    let hip_z = tables::HIP_HALF_SPACING * i.body.stature_m;
    let dz = hip_z - knee[2];
    if dz.abs() >= i.body.thigh_m {
        return None;
    }
    let seen = (i.body.thigh_m.powi(2) - dz * dz).sqrt();
    let hip = [knee[0] - seen * thigh.sin(), knee[1] + seen * thigh.cos(), hip_z];
    Some(Leg { ankle, knee, hip })
}

fn minus(a: P3, b: P3) -> P3 {
    [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}

/// Length of a vector.
pub fn length(a: P3) -> f64 {
    (a[0] * a[0] + a[1] * a[1] + a[2] * a[2]).sqrt()
}

/// Angle between two vectors from the sides of their triangle (Kahan), good near 0 and π.
pub fn angle_between(a: P3, b: P3) -> f64 {
    let (la, lb) = (length(a), length(b));
    let (p, q) = (a.map(|v| v * lb), b.map(|v| v * la));
    2.0 * length(minus(p, q)).atan2(length([p[0] + q[0], p[1] + q[1], p[2] + q[2]]))
}

impl Leg {
    /// Ankle to knee.
    pub fn shank(&self) -> P3 {
        minus(self.knee, self.ankle)
    }

    /// Knee to hip.
    pub fn thigh(&self) -> P3 {
        minus(self.hip, self.knee)
    }

    /// Knee flexion in space.
    pub fn flexion(&self) -> f64 {
        angle_between(self.shank(), self.thigh())
    }
}

fn go(from: P2, inclination: f64, by: f64) -> P2 {
    (from.0 + by * inclination.sin(), from.1 + by * inclination.cos())
}

/// Everything above the hip centre, which is put at (0, 0).
pub fn upper(i: &Inputs, thigh: f64, trunk: f64) -> Upper {
    let (b, s, m) = (&i.body, i.body.segments, &i.body.masses);
    let beyond = (thigh + trunk - i.limits.hip.rad()).max(0.0);
    let pelvis = trunk - beyond;
    let hip = (0.0, 0.0);
    let lumbosacral = go(hip, pelvis, b.lumbosacral_m);
    let shoulder = go(lumbosacral, trunk, b.trunk_m - b.lumbosacral_m);
    let hold = tables::hold(i.task.placement);
    let base = match hold.frame {
        ArmFrame::Trunk => trunk,
        ArmFrame::World => 0.0,
        ArmFrame::Overhead => trunk + (-trunk).max(std::f64::consts::PI - i.limits.reach.rad()),
    };
    let (arm, fore) = (base + hold.upper_arm_deg.to_radians(), base + hold.forearm_deg.to_radians());
    let elbow = go(shoulder, arm, b.upper_arm_m);
    let wrist = go(elbow, fore, b.forearm_m);
    let load = match hold.load {
        LoadSite::Hands => go(wrist, fore, tables::GRIP * b.hand_m),
        LoadSite::Trunk { along, forward } => {
            let up = go(shoulder, trunk, along * b.stature_m);
            go(up, trunk + std::f64::consts::FRAC_PI_2, forward * b.stature_m)
        }
    };
    let part = |kg: f64, (x, y): P2| Part { kg, x, y };
    let parts = [
        part(m.pelvis_kg, go(hip, pelvis, s.pelvis.cm * b.trunk_m)),
        part(m.thorax_kg, go(lumbosacral, trunk, s.thorax.cm * b.trunk_m - b.lumbosacral_m)),
        part(m.head_kg, go(shoulder, trunk, s.head.cm * b.stature_m)),
        part(2.0 * m.upper_arm_kg, go(shoulder, arm, s.upper_arm.cm * b.upper_arm_m)),
        part(2.0 * m.forearm_kg, go(elbow, fore, s.forearm.cm * b.forearm_m)),
        part(2.0 * m.hand_kg, go(wrist, fore, s.hand.cm * b.hand_m)),
        part(i.task.load_kg, load),
    ];
    Upper { lumbosacral, shoulder, elbow, wrist, load, pelvis, parts }
}

/// The feet, shanks and thighs of a leg.
fn lower(i: &Inputs, l: &Leg) -> [Part; ABOVE_HIP] {
    let (s, m) = (i.body.segments, &i.body.masses);
    let (foot_s, foot_y) = raised(i, (s.foot.cm * i.body.foot_m, i.body.ankle_height_m / 2.0));
    let on = |near: P3, far: P3, f: f64| (near[0] + f * (far[0] - near[0]), near[1] + f * (far[1] - near[1]));
    let shank = on(l.knee, l.ankle, s.shank.cm);
    let thigh = on(l.hip, l.knee, s.thigh.cm);
    [
        Part { kg: 2.0 * m.foot_kg, x: foot_s * i.task.toe_out.rad().cos(), y: foot_y },
        Part { kg: 2.0 * m.shank_kg, x: shank.0, y: shank.1 },
        Part { kg: 2.0 * m.thigh_kg, x: thigh.0, y: thigh.1 },
    ]
}

/// One posture; none where the stance is impossible.
pub fn figure(i: &Inputs, shank: f64, thigh: f64, trunk: f64) -> Option<Figure> {
    let leg = leg(i, shank, thigh)?;
    let u = upper(i, thigh, trunk);
    let mut parts = [Part { kg: 0.0, x: 0.0, y: 0.0 }; PARTS];
    parts[..ABOVE_HIP].copy_from_slice(&lower(i, &leg));
    for (to, from) in parts[ABOVE_HIP..].iter_mut().zip(&u.parts) {
        *to = Part { kg: from.kg, x: from.x + leg.hip[0], y: from.y + leg.hip[1] };
    }
    let at = |p: P2| (p.0 + leg.hip[0], p.1 + leg.hip[1]);
    Some(Figure {
        leg,
        lumbosacral: at(u.lumbosacral),
        shoulder: at(u.shoulder),
        elbow: at(u.elbow),
        wrist: at(u.wrist),
        load: at(u.load),
        pelvis: u.pelvis,
        parts,
    })
}

/// Sum of masses, kg.
pub fn mass(parts: &[Part]) -> f64 {
    parts.iter().map(|p| p.kg).sum()
}

/// Centre of mass of parts.
pub fn com(parts: &[Part]) -> P2 {
    let kg = mass(parts);
    (parts.iter().map(|p| p.kg * p.x).sum::<f64>() / kg, parts.iter().map(|p| p.kg * p.y).sum::<f64>() / kg)
}

/// `Σ m (x − at)`, kg·m.
pub fn first_moment(parts: &[Part], at: f64) -> f64 {
    parts.iter().map(|p| p.kg * (p.x - at)).sum()
}

/// Moments as reported: ankle, knee, hip of the leg that carries more, low back whole, N·m.
pub fn moments(i: &Inputs, f: &Figure) -> [f64; 4] {
    let g = tables::GRAVITY;
    let heavier = i.task.weight_left.map_or(1.0, |p| 2.0 * p.max(1.0 - p));
    let cos_out = i.task.toe_out.rad().cos();
    [
        heavier * g * first_moment(&f.parts[ABOVE_ANKLE..], f.leg.ankle[0]) / (2.0 * cos_out),
        -heavier * g * first_moment(&f.parts[ABOVE_KNEE..], f.leg.knee[0]) / (2.0 * cos_out),
        heavier * g * first_moment(&f.parts[ABOVE_HIP..], f.leg.hip[0]) / 2.0,
        g * first_moment(&f.parts[ABOVE_LOW_BACK..], f.lumbosacral.0),
    ]
}

/// Capacities: ankle, knee, hip, low back, N·m.
pub fn capacities(i: &Inputs, knee_flexion: f64, hip_flexion: f64) -> [f64; 4] {
    let t = tables::capacity(i.body.sex);
    let scale = i.body.mass_kg * tables::GRAVITY * i.body.stature_m;
    let at = |r: &CapacityRow, q: f64| r.c1 * (r.c2 * (q.min(r.to_rad) - r.c3)).cos();
    let aged = |r: &CapacityRows, q: f64| {
        let knots = [(25.0, at(&r.young, q)), (60.0, at(&r.older, q)), (70.0, at(&r.eldest, q))];
        let age = i.body.age_years.clamp(25.0, 70.0);
        let k = usize::from(age > 60.0);
        let ((a0, v0), (a1, v1)) = (knots[k], knots[k + 1]);
        v0 + (v1 - v0) * (age - a0) / (a1 - a0)
    };
    [
        scale * aged(&t.ankle, 0.0),
        scale * aged(&t.knee, knee_flexion),
        scale * aged(&t.hip, hip_flexion),
        scale * t.lumbosacral,
    ]
}

/// Demand over capacity by the client's strength factors, in the order of [`moments`].
pub fn efforts(c: &Case, i: &Inputs, f: &Figure, thigh: f64) -> [f64; 4] {
    let can = capacities(i, f.leg.flexion(), thigh + f.pelvis);
    let s = &c.measures().strength;
    let asked = moments(i, f);
    let factor = [s.ankle, s.knee, s.hip, s.low_back];
    std::array::from_fn(|k| asked[k] / (can[k] * factor[k]))
}
