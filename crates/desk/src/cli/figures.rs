//! `plumbfold figures`: posture, depths and demands of one squat.

use plumbfold_core::{
    Angle, Balance, Case, Notice, PerJoint, Point, Posture, Readings, Refusal, Standing, Step, Toward, depths,
    posture_notices,
};
use plumbfold_records::Problem;
use plumbfold_scene::words::notices::notice;
use serde::Serialize;

use super::{args::Selection, choose, figures_text};

/// How the figures are printed.
#[derive(Clone, Copy)]
pub enum Form {
    /// One JSON object on one line.
    Json,
    /// Aligned lines for a person.
    Text,
}

pub fn command(of: &Selection, form: Form) -> Result<String, Problem> {
    let chosen = choose::chosen(of)?;
    let (case, notices) = chosen.case()?;
    let figures = figures(&chosen, &case, &notices);
    match form {
        Form::Json => json(&chosen, &figures),
        Form::Text => Ok(figures_text::text(&chosen, &case, &figures)),
    }
}

/// One line; a number that is not finite would be `null`.
fn json(chosen: &choose::Chosen, figures: &Figures) -> Result<String, Problem> {
    match serde_json::to_string(figures) {
        Ok(object) => Ok(format!("{object}\n")),
        Err(error) => Err(choose::problem(
            &chosen.file,
            None,
            format!("figures that cannot be told ({error})"),
            "figures".to_owned(),
            "please report this",
        )),
    }
}

/// One squat in numbers: angles in degrees, lengths in metres, moments in N·m. What belongs to a
/// posture is none where it is refused; effort also where it does not apply to this client.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Figures {
    /// The client's code.
    pub code: String,
    /// The visit, from 1.
    pub visit: usize,
    /// The task.
    pub task: String,
    /// Thigh angle.
    pub thigh_deg: f64,
    /// `steady`, `drifting` or `refused`.
    pub kind: &'static str,
    /// `Ankle`, `Knee`, `Hip`, `Stance`, `TipsBack` or `TipsForward`.
    pub refused_by: Option<&'static str>,
    /// Shank angle.
    pub shank_deg: Option<f64>,
    /// Trunk lean.
    pub trunk_deg: Option<f64>,
    /// Pelvis line from the vertical.
    pub pelvis_deg: Option<f64>,
    /// Bend beyond the hip.
    pub bend_deg: Option<f64>,
    /// Ankle dorsiflexion.
    pub ankle_deg: Option<f64>,
    /// Knee flexion.
    pub knee_flexion_deg: Option<f64>,
    /// Hip-joint flexion.
    pub hip_flexion_deg: Option<f64>,
    /// Centre of mass of body and load.
    pub com: Option<[f64; 2]>,
    /// Centre of mass to the rear edge of support.
    pub heel_margin: Option<f64>,
    /// Centre of mass to the front edge of support.
    pub toe_margin: Option<f64>,
    /// Knee in front of the plumb line.
    pub knee_arm: Option<f64>,
    /// Hip behind the plumb line.
    pub hip_arm: Option<f64>,
    /// Hip arm to knee arm; none where the knee arm is under 1 mm.
    pub ratio: Option<f64>,
    /// Net moments.
    pub moments: Option<Demands>,
    /// Moments over capacities.
    pub effort: Option<Demands>,
    /// Joint centres.
    pub joints: Option<JointPoints>,
    /// Seat that touches at this depth.
    pub seat_height: Option<f64>,
    /// Deepest thigh angle on mid-foot.
    pub steady_depth_deg: Option<f64>,
    /// Deepest thigh angle in balance.
    pub balance_depth_deg: Option<f64>,
    /// The body.
    pub body: BodyFigures,
    /// What must be told, a sentence each.
    pub notices: Vec<String>,
}

/// A number for each joint.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Demands {
    /// Ankle, one leg.
    pub ankle: f64,
    /// Knee, one leg.
    pub knee: f64,
    /// Hip, one leg.
    pub hip: f64,
    /// Lumbosacral joint.
    pub lumbosacral: f64,
}

/// Joint centres, forward and up.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct JointPoints {
    /// Ankle.
    pub ankle: [f64; 2],
    /// Knee.
    pub knee: [f64; 2],
    /// Hip.
    pub hip: [f64; 2],
    /// Lumbosacral joint.
    pub lumbosacral: [f64; 2],
    /// Shoulder.
    pub shoulder: [f64; 2],
}

/// The body that was computed with.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct BodyFigures {
    /// Shank.
    pub shank: f64,
    /// Thigh.
    pub thigh: f64,
    /// Hip centre to shoulder centre.
    pub trunk: f64,
    /// Foot.
    pub foot: f64,
    /// Most dorsiflexion.
    pub ankle_limit_deg: f64,
    /// Most hip-joint flexion.
    pub hip_limit_deg: f64,
    /// Body mass, kg.
    pub mass: f64,
    /// Stature.
    pub stature: f64,
}

/// The figures of one squat; `case` and `told` are those of [`Chosen::case`](choose::Chosen::case).
#[must_use]
pub fn figures(chosen: &choose::Chosen, case: &Case, told: &[Notice]) -> Figures {
    let thigh = Angle::from_deg(chosen.thigh_deg);
    let Step { balance, readings, .. } = Step::at(case, thigh);
    let (kind, refused_by) = verdict(&balance);
    let held: Option<(&Posture, Readings)> = match refused_by {
        None => balance.posture().zip(readings),
        Some(_) => None,
    };
    let depths = depths(case);
    let mut notices = told.to_vec();
    notices.extend(held.iter().flat_map(|(posture, _)| posture_notices(case, posture)));
    match (depths.steady, depths.balance) {
        (_, None) => notices.push(Notice::NoStanding),
        (None, Some(_)) => notices.push(Notice::NoSteadyStanding),
        (Some(_), Some(_)) => {}
    }
    let posture = |of: fn(&Posture) -> Angle| held.map(|(posture, _)| of(posture).deg());
    let reading = |of: fn(&Readings) -> f64| held.map(|(_, readings)| of(&readings));
    Figures {
        code: chosen.client.code.to_string(),
        visit: chosen.visit + 1,
        task: chosen.task_name().to_owned(),
        thigh_deg: chosen.thigh_deg,
        kind,
        refused_by,
        shank_deg: posture(|p| p.shank),
        trunk_deg: posture(|p| p.trunk),
        pelvis_deg: posture(|p| p.pelvis),
        bend_deg: posture(|p| p.bend),
        ankle_deg: posture(|p| p.ankle),
        knee_flexion_deg: posture(|p| p.knee_flexion),
        hip_flexion_deg: posture(|p| p.hip_flexion),
        com: held.map(|(posture, _)| pair(posture.com)),
        heel_margin: reading(|r| r.heel_margin_m),
        toe_margin: reading(|r| r.toe_margin_m),
        knee_arm: reading(|r| r.knee_arm_m),
        hip_arm: reading(|r| r.hip_arm_m),
        ratio: held.and_then(|(_, readings)| readings.ratio),
        moments: held.map(|(_, readings)| demands(readings.moments_nm)),
        effort: held.filter(|_| !case.figure_only()).map(|(_, readings)| demands(readings.effort)),
        joints: held.map(|(posture, _)| {
            let joints = &posture.joints;
            JointPoints {
                ankle: pair(joints.ankle),
                knee: pair(joints.knee),
                hip: pair(joints.hip),
                lumbosacral: pair(joints.lumbosacral),
                shoulder: pair(joints.shoulder),
            }
        }),
        seat_height: held.map(|(posture, _)| posture.seat_height_m),
        steady_depth_deg: depths.steady.map(Angle::deg),
        balance_depth_deg: depths.balance.map(Angle::deg),
        body: body(case),
        notices: notices.iter().map(notice).collect(),
    }
}

fn verdict(balance: &Balance) -> (&'static str, Option<&'static str>) {
    match balance {
        Balance::Stands { standing: Standing::Steady, .. } => ("steady", None),
        Balance::Stands { standing: Standing::Drifting(_), .. } => ("drifting", None),
        Balance::Stands { standing: Standing::Tips { toward: Toward::Heels, .. }, .. } => ("refused", Some("TipsBack")),
        Balance::Stands { standing: Standing::Tips { toward: Toward::Toes, .. }, .. } => {
            ("refused", Some("TipsForward"))
        }
        Balance::Refused(Refusal::Stance) => ("refused", Some("Stance")),
        Balance::Refused(Refusal::Ankle) => ("refused", Some("Ankle")),
        Balance::Refused(Refusal::Knee) => ("refused", Some("Knee")),
        Balance::Refused(Refusal::Hip) => ("refused", Some("Hip")),
    }
}

fn body(case: &Case) -> BodyFigures {
    let (body, limits) = (case.body(), case.limits());
    BodyFigures {
        shank: body.shank_m,
        thigh: body.thigh_m,
        trunk: body.trunk_m,
        foot: body.foot_m,
        ankle_limit_deg: limits.ankle.deg(),
        hip_limit_deg: limits.hip.deg(),
        mass: body.mass_kg,
        stature: body.stature_m,
    }
}

fn pair(point: Point) -> [f64; 2] {
    [point.x, point.y]
}

fn demands(joints: PerJoint<f64>) -> Demands {
    let PerJoint { ankle, knee, hip, low_back } = joints;
    Demands { ankle, knee, hip, lumbosacral: low_back }
}
