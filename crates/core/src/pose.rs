//! A posture: geometry alone. It exists for any shank, thigh and trunk that the legs can span, so it
//! also serves the squat that was seen and the trunk held straight; whether it balances is another
//! question.

use nalgebra::{Point2, Vector2};

use crate::{
    angle::{Angle, direction},
    case::{Case, side_offset},
    tables::{ArmFrame, GRIP, HIP_ABOVE_SEAT_M, LoadSite, hold},
    upper::ArmDirections,
};

/// A point of the sagittal plane, metres: x forward, y up, origin under the back of the flat heel.
pub type Point = Point2<f64>;

/// Where joints and landmarks are, m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Joints {
    /// Back edge of the heel.
    pub heel: Point,
    /// Ball of the foot.
    pub ball: Point,
    /// Tip of the toes.
    pub toe: Point,
    /// Ankle centre.
    pub ankle: Point,
    /// Knee centre.
    pub knee: Point,
    /// Hip centre.
    pub hip: Point,
    /// Lumbosacral joint.
    pub lumbosacral: Point,
    /// Shoulder centre.
    pub shoulder: Point,
    /// Centre of mass of head and neck.
    pub head: Point,
    /// Elbow.
    pub elbow: Point,
    /// Wrist.
    pub wrist: Point,
    /// Fingertip.
    pub fingertip: Point,
    /// Where a load sits.
    pub load: Point,
}

/// All angles and points of one posture.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Posture {
    /// Shank from the vertical, in the foot's plane.
    pub shank: Angle,
    /// Thigh: 0 standing, 90° level.
    pub thigh: Angle,
    /// Trunk lean from the vertical.
    pub trunk: Angle,
    /// Pelvis line from the vertical.
    pub pelvis: Angle,
    /// Bend beyond the hip, pelvis and low back together.
    pub bend: Angle,
    /// Ankle dorsiflexion, relative to the sole.
    pub ankle: Angle,
    /// Knee flexion, in space.
    pub knee_flexion: Angle,
    /// Flexion of the hip joint.
    pub hip_flexion: Angle,
    /// How far the knee points apart from the foot.
    pub twist: Angle,
    /// Joints and landmarks.
    pub joints: Joints,
    /// Knee centre from the midline, m.
    pub knee_z_m: f64,
    /// Centre of mass of body and load.
    pub com: Point,
    /// Seat that touches at this depth, m above the floor.
    pub seat_height_m: f64,
    /// How far the arms stay short of the vertical overhead.
    pub arms_short: Angle,
}

/// The legs at a shank and a thigh angle.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Legs {
    pub ankle: Point,
    pub knee: Point,
    pub hip: Point,
    pub knee_z_m: f64,
    pub knee_flexion: f64,
    pub twist: f64,
}

/// Legs in space; `None` where the stance is impossible.
pub(crate) fn legs(c: &Case, shank: Angle, thigh: Angle) -> Option<Legs> {
    let (body, stand) = (&c.body, &c.stand);
    let side = side_offset(body, stand, thigh);
    let reach2 = body.shank_m * body.shank_m - side * side;
    if reach2 <= 0.0 {
        return None;
    }
    let l = reach2.sqrt();
    let (ss, cs) = shank.sin_cos();
    let (st, ct) = thigh.sin_cos();
    let ankle = Point::new(stand.ankle_s_m * stand.cos_out, stand.ankle_y_m);
    // shank in space: forward, up, to the side
    let (fx, fy, fz) =
        (l * ss * stand.cos_out - side * stand.sin_out, l * cs, l * ss * stand.sin_out + side * stand.cos_out);
    let knee = ankle + Vector2::new(fx, fy);
    let knee_z_m = stand.half_stance_m + fz;
    let dz = body.hip_half_m - knee_z_m;
    let level2 = body.thigh_m * body.thigh_m - dz * dz;
    if level2 <= 0.0 {
        return None;
    }
    let lt = level2.sqrt();
    let (tx, ty) = (-lt * st, lt * ct);
    let hip = knee + Vector2::new(tx, ty);
    // angle between shank and thigh by atan2, accurate also near straight
    let dot = fx * tx + fy * ty + fz * dz;
    let (cx, cy, cz) = (fy * dz - fz * ty, fz * tx - fx * dz, fx * ty - fy * tx);
    let knee_flexion = (cx * cx + cy * cy + cz * cz).sqrt().atan2(dot);
    let twist =
        if stand.sin_out == 0.0 && dz == 0.0 { 0.0 } else { ((-dz).atan2(lt * st) - stand.toe_out.rad()).abs() };
    Some(Legs { ankle, knee, hip, knee_z_m, knee_flexion, twist })
}

/// Pelvis line at a thigh angle and a lean: the hip joint bends first, then the back.
pub(crate) fn pelvis_line(c: &Case, thigh: Angle, trunk: Angle) -> Angle {
    trunk.min(c.limits.hip - thigh)
}

/// The posture of three angles; `None` where the stance is impossible.
///
/// Source: chain of rigid segments, pin joints; masses and places as in [`crate::tables`].
#[must_use]
pub fn pose(c: &Case, shank: Angle, thigh: Angle, trunk: Angle) -> Option<Posture> {
    let legs = legs(c, shank, thigh)?;
    let pelvis = pelvis_line(c, thigh, trunk);
    let bend = trunk - pelvis;
    let (ux, uy) = c.upper.moment(trunk, pelvis);
    let k = &c.chain;
    let com = Point::new(
        (k.feet_x + k.knee_kg * legs.knee.x + k.hip_kg * legs.hip.x + ux) / k.mass_kg,
        (k.feet_y + k.knee_kg * legs.knee.y + k.hip_kg * legs.hip.y + uy) / k.mass_kg,
    );
    Some(Posture {
        shank,
        thigh,
        trunk,
        pelvis,
        bend,
        ankle: shank - c.stand.pitch,
        knee_flexion: Angle::from_rad(legs.knee_flexion),
        hip_flexion: thigh + trunk - bend,
        twist: Angle::from_rad(legs.twist),
        joints: joints(c, &legs, trunk, pelvis),
        knee_z_m: legs.knee_z_m,
        com,
        seat_height_m: legs.hip.y - HIP_ABOVE_SEAT_M,
        arms_short: if hold(c.task.placement).frame == ArmFrame::Overhead {
            c.upper.overhead_arms(trunk)
        } else {
            Angle::ZERO
        },
    })
}

/// Directions of the arm at a lean.
#[must_use]
pub fn arm_directions(c: &Case, trunk: Angle) -> ArmDirections {
    let h = hold(c.task.placement);
    let base = match h.frame {
        ArmFrame::Trunk => trunk,
        ArmFrame::World => Angle::ZERO,
        ArmFrame::Overhead => c.upper.overhead_arms(trunk),
    };
    ArmDirections { upper_arm: base + Angle::from_deg(h.upper_arm_deg), forearm: base + Angle::from_deg(h.forearm_deg) }
}

fn joints(c: &Case, legs: &Legs, trunk: Angle, pelvis: Angle) -> Joints {
    let (body, stand) = (&c.body, &c.stand);
    let lumbosacral = legs.hip + direction(pelvis) * body.lumbosacral_m;
    let along = direction(trunk);
    let shoulder = lumbosacral + along * (body.trunk_m - body.lumbosacral_m);
    let arms = arm_directions(c, trunk);
    let elbow = shoulder + direction(arms.upper_arm) * body.upper_arm_m;
    let forearm = direction(arms.forearm);
    let wrist = elbow + forearm * body.forearm_m;
    let across = Vector2::new(along.y, -along.x);
    let load = match hold(c.task.placement).load {
        LoadSite::Hands => wrist + forearm * (GRIP * body.hand_m),
        LoadSite::Trunk { along: up, forward } => shoulder + (along * up + across * forward) * body.stature_m,
    };
    Joints {
        heel: Point::new(stand.support.heel_m, heel_height_m(c)),
        ball: Point::new(body.heel_to_ball_m * stand.cos_out, 0.0),
        toe: Point::new(body.foot_m * stand.cos_out, 0.0),
        ankle: legs.ankle,
        knee: legs.knee,
        hip: legs.hip,
        lumbosacral,
        shoulder,
        head: shoulder + along * body.head_m,
        elbow,
        wrist,
        fingertip: wrist + forearm * body.hand_m,
        load,
    }
}

/// The heel's sole above the floor, m.
#[must_use]
pub fn heel_height_m(c: &Case) -> f64 {
    c.body.heel_to_ball_m * c.stand.pitch.rad().sin()
}
