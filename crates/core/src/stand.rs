//! Foot, heel raise and stance: what stays fixed while the client squats.

use crate::{
    angle::Angle,
    body::Body,
    bounds::{Field, bounds},
    notice::Invalid,
    task::{Support, Task},
};

/// Support positions forward of the origin, m, in the sagittal plane.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SupportX {
    /// Back of the heel.
    pub heel_m: f64,
    /// Rear edge of support.
    pub edge_back_m: f64,
    /// Rear end of the mid-foot zone.
    pub zone_back_m: f64,
    /// Aim.
    pub aim_m: f64,
    /// Front end of the mid-foot zone.
    pub zone_front_m: f64,
    /// Front edge of support.
    pub edge_front_m: f64,
    /// Tip of the toes.
    pub toe_m: f64,
}

/// The foot as pitched about its ball by the heel raise, and where both feet stand.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stand {
    /// Pitch of the sole about the ball.
    pub pitch: Angle,
    /// Total heel raise, m.
    pub raise_m: f64,
    /// Toe-out.
    pub toe_out: Angle,
    /// Sine of the toe-out.
    pub sin_out: f64,
    /// Cosine of the toe-out.
    pub cos_out: f64,
    /// Ankle along the foot axis, m.
    pub ankle_s_m: f64,
    /// Ankle above the floor, m.
    pub ankle_y_m: f64,
    /// Foot's centre of mass along the foot axis, m.
    pub foot_cm_s_m: f64,
    /// Foot's centre of mass above the floor, m.
    pub foot_cm_y_m: f64,
    /// Ankle from the midline, m.
    pub half_stance_m: f64,
    /// Support along x.
    pub support: SupportX,
}

/// Edges of support as fractions of the foot: 0.15–0.80 to 55 years, 0.26–0.76 from 65, linear
/// between. Functional base of support, Sloot 2025, Millard and Sloot 2025 data sets (derived).
#[must_use]
pub fn edges_by_age(age_years: f64) -> (f64, f64) {
    let t = ((age_years - 55.0) / 10.0).clamp(0.0, 1.0);
    (0.15 + t * (0.26 - 0.15), 0.80 + t * (0.76 - 0.80))
}

impl Stand {
    /// The foot under a task. sin pitch = raise / heel-to-ball.
    ///
    /// # Errors
    /// Where the heel raise is as long as the foot to its ball, so that the foot would stand on end.
    pub fn new(body: &Body, task: &Task) -> Result<Self, Invalid> {
        let raise_m = task.heel_raise_m + task.footwear_drop_m;
        let ball_m = body.heel_to_ball_m;
        let sin_b = raise_m / ball_m;
        // 60°: beyond it no foot stands; also keeps the pitch well away from the vertical
        if sin_b > 0.866 {
            return Err(Invalid {
                name: bounds(Field::HeelRaise).name,
                value: format!("{:.0} mm with footwear", raise_m * 1000.0),
                allowed: format!("0 to {:.0} mm in all for this foot", 866.0 * ball_m),
                hint: "lower the wedge or the footwear drop, or measure the foot again",
            });
        }
        let pitch = Angle::from_rad(sin_b.asin());
        let cos_b = pitch.rad().cos();
        let (sin_out, cos_out) = task.toe_out.sin_cos();
        let d = ball_m - body.heel_to_ankle_m;
        let f = ball_m - body.segments.foot.cm * body.foot_m;
        let q = body.ankle_height_m / 2.0;
        let heel_s = ball_m * (1.0 - cos_b);
        let at = |fraction: f64| (heel_s + fraction * (body.foot_m - heel_s)) * cos_out;
        Ok(Self {
            pitch,
            raise_m,
            toe_out: task.toe_out,
            sin_out,
            cos_out,
            ankle_s_m: ball_m - d * cos_b + body.ankle_height_m * sin_b,
            ankle_y_m: d * sin_b + body.ankle_height_m * cos_b,
            foot_cm_s_m: ball_m - f * cos_b + q * sin_b,
            foot_cm_y_m: f * sin_b + q * cos_b,
            half_stance_m: task.stance_m.map_or(body.hip_half_m, |w| w / 2.0),
            support: support_x(&task.support, body.age_years, at),
        })
    }
}

fn support_x(support: &Support, age_years: f64, at: impl Fn(f64) -> f64) -> SupportX {
    let (by_age_back, by_age_front) = edges_by_age(age_years);
    SupportX {
        heel_m: at(0.0),
        edge_back_m: at(support.edge_back.unwrap_or(by_age_back).min(support.zone_back)),
        zone_back_m: at(support.zone_back),
        aim_m: at(support.aim),
        zone_front_m: at(support.zone_front),
        edge_front_m: at(support.edge_front.unwrap_or(by_age_front).max(support.zone_front)),
        toe_m: at(1.0),
    }
}
