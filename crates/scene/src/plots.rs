//! The plots of a descent, as charts: arms, lean and angles, demands.

use plumbfold_core::{Angle, Step, Study};

use crate::{
    chart::{Axis, Band, BandKind, Chart, Scale, Series, Stroke},
    format,
    theme::Role,
};

/// Lever arms through the descent, cm.
#[must_use]
pub fn arms(study: &Study, now: Option<Angle>) -> Chart {
    let arm = |f: fn(&plumbfold_core::Readings) -> f64| move |s: &Step| s.readings.as_ref().map(|r| 100.0 * f(r));
    build(
        study,
        now,
        "Lever arms, cm",
        "cm",
        vec![
            curve(study, "hip", Role::Hip, Stroke::Solid, arm(|r| r.hip_arm_m)),
            curve(study, "knee", Role::Knee, Stroke::Dashed, arm(|r| r.knee_arm_m)),
        ],
    )
}

/// Lean and joint angles through the descent, degrees.
#[must_use]
pub fn angles(study: &Study, now: Option<Angle>) -> Chart {
    let angle = |f: fn(&plumbfold_core::Posture) -> Angle| move |s: &Step| s.balance.posture().map(|p| f(p).deg());
    let mut c = build(
        study,
        now,
        "Lean and joint angles",
        "degrees",
        vec![
            curve(study, "lean", Role::Back, Stroke::Solid, angle(|p| p.trunk)),
            curve(study, "hip", Role::Hip, Stroke::Dashed, angle(|p| p.hip_flexion)),
            curve(study, "knee", Role::Knee, Stroke::Dashed, angle(|p| p.knee_flexion)),
            curve(study, "ankle", Role::Ankle, Stroke::Dashed, angle(|p| p.ankle)),
        ],
    );
    c.y.scale = Scale::Degrees;
    c
}

/// Net moments through the descent, N·m: knee and hip of one leg, low back whole.
#[must_use]
pub fn demands(study: &Study, now: Option<Angle>) -> Chart {
    let moment = |f: fn(&plumbfold_core::Readings) -> f64| move |s: &Step| s.readings.as_ref().map(f);
    build(
        study,
        now,
        "Work required, N·m",
        "N·m",
        vec![
            curve(study, "low back", Role::Back, Stroke::Solid, moment(|r| r.moments_nm.low_back)),
            curve(study, "hip, each", Role::Hip, Stroke::Solid, moment(|r| r.moments_nm.hip)),
            curve(study, "knee, each", Role::Knee, Stroke::Dashed, moment(|r| r.moments_nm.knee)),
        ],
    )
}

fn curve(study: &Study, name: &str, role: Role, stroke: Stroke, value: impl Fn(&Step) -> Option<f64>) -> Series {
    let points = study.descent.iter().filter_map(|s| value(s).map(|v| (s.thigh.deg(), v))).collect();
    Series { name: name.to_owned(), points, role, stroke }
}

fn build(study: &Study, now: Option<Angle>, title: &str, unit: &str, series: Vec<Series>) -> Chart {
    let end = study.descent.last().map_or(90.0, |s| s.thigh.deg());
    // room beyond the last posture, so that "needs a hold" is seen
    let far = ((end + 10.0) / 10.0).ceil() * 10.0;
    let values = || series.iter().flat_map(|s| s.points.iter().map(|p| p.1));
    let (low, high) = (values().fold(0.0, f64::min), values().fold(1.0, f64::max));
    let mut bands = Vec::new();
    if let (Some(s), Some(b)) = (study.depths.steady, study.depths.balance)
        && b > s
    {
        bands.push(Band { from: s.deg(), to: b.deg(), kind: BandKind::Drifting, label: String::new() });
    }
    bands.push(Band { from: end, to: far, kind: BandKind::NeedsHold, label: String::new() });
    let summary = format!(
        "{title} from standing to a thigh angle of {}°: {}",
        format::number(end, 0),
        series
            .iter()
            .filter_map(|s| s.points.last().map(|p| format!("{} {}", s.name, format::number(p.1, 0))))
            .collect::<Vec<_>>()
            .join(", ")
    );
    Chart {
        title: title.to_owned(),
        x: Axis { title: "thigh angle".to_owned(), from: 0.0, to: far, scale: Scale::Degrees },
        y: Axis {
            title: unit.to_owned(),
            from: low - 0.1 * (high - low),
            to: high + 0.12 * (high - low),
            scale: Scale::Number,
        },
        map: None,
        series,
        bands,
        marks: Vec::new(),
        cursor: now.map(Angle::deg),
        summary,
    }
}

#[cfg(test)]
mod tests {
    use plumbfold_core::{Case, sample, study};

    use super::*;

    #[test]
    fn curves_hold_the_readings_of_the_descent() {
        let (m, t) = sample::long_thigh_woman();
        let (case, _) = Case::new(&m, &t).expect("valid");
        let s = study(&case);
        let c = arms(&s, Some(Angle::from_deg(60.0)));
        let (hip, knee) = (&c.series[0].points, &c.series[1].points);
        assert_eq!(hip.len(), s.descent.len());
        for (k, step) in s.descent.iter().enumerate() {
            let p = step.balance.posture().expect("a posture to the balance depth");
            // both arms add up to the thigh's span
            let span = 100.0 * (p.joints.knee.x - p.joints.hip.x);
            assert!((hip[k].1 + knee[k].1 - span).abs() < 1e-9);
        }
        assert_eq!(c.bands.len(), 2);
        assert!(demands(&s, None).summary.contains("low back"));
        assert!(angles(&s, None).series.iter().any(|s| s.name == "lean"));
    }
}
