//! Arcs and names of angles, joints that are used up, and the placing of all these labels.

use plumbfold_core::{Case, Origin, Posture, limits::LEAN_MAX};

use super::view::View;
use crate::{
    format,
    geometry::Pt,
    place::{Block, Wanted},
    scene::{Scene, Weight},
    shapes,
    theme::Role,
    words,
};

/// Angles nearer to their limit than this count as used up, degrees.
const AT_LIMIT: f64 = 0.25;

/// What is used up in a posture.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct UsedUp {
    /// Ankle range.
    pub ankle: Option<Origin>,
    /// Knee range.
    pub knee: Option<Origin>,
    /// Hip range: from here on the back bends.
    pub hip: Option<Origin>,
    /// Bend beyond the hip that we allow.
    pub bend: bool,
    /// Lean that we choose to stay within.
    pub lean: bool,
}

impl UsedUp {
    /// Compares a posture with the limits of its case.
    #[must_use]
    pub fn of(case: &Case, p: &Posture) -> Self {
        let l = case.limits();
        let at = |value: plumbfold_core::Angle, limit: plumbfold_core::Angle| value.deg() > limit.deg() - AT_LIMIT;
        Self {
            ankle: at(p.ankle, l.ankle).then_some(l.ankle_from),
            knee: at(p.knee_flexion, l.knee).then_some(l.knee_from),
            hip: at(p.hip_flexion, l.hip).then_some(l.hip_from),
            bend: l.bend.deg() > 0.5 && at(p.bend, l.bend),
            lean: l.lean < LEAN_MAX && at(p.trunk, l.lean),
        }
    }

    /// In words, such as `ankle range and bend used up`; `None` where nothing is.
    #[must_use]
    pub fn words(&self) -> Option<String> {
        let origin = |o: Origin, name: &str| match o {
            Origin::Measured => format!("{name} range"),
            Origin::Assumed => format!("{name} range (assumed, not measured)"),
            Origin::Precaution => format!("{name} to its precaution"),
        };
        let mut parts: Vec<String> = Vec::new();
        parts.extend(self.ankle.map(|o| origin(o, "ankle")));
        parts.extend(self.knee.map(|o| origin(o, "knee")));
        parts.extend(self.hip.map(|o| origin(o, "hip")));
        if self.bend {
            parts.push("bend beyond the hip".to_owned());
        }
        if self.lean {
            parts.push("lean we choose to stay within".to_owned());
        }
        let parts: Vec<&str> = parts.iter().map(String::as_str).collect();
        (!parts.is_empty()).then(|| words::capital(&format!("{} used up", words::list(&parts))))
    }
}

/// Written under an angle that stands at its limit.
const fn reason(used: Option<Origin>) -> &'static str {
    match used {
        None => "",
        Some(Origin::Measured) => "used up",
        Some(Origin::Assumed) => "assumed range used up",
        Some(Origin::Precaution) => "precaution reached",
    }
}

/// A label that wants to stand near a place, in a direction from it.
pub(super) struct Named {
    pub text: Block,
    pub target: Pt,
    pub wish: Pt,
    pub near: f32,
}

/// Draws arcs and returns the labels that name them, the most important first.
pub(super) fn draw(scene: &mut Scene, view: &View, case: &Case, p: &Posture, t: f32) -> Vec<Named> {
    let (j, used, s) = (&p.joints, UsedUp::of(case, p), case.body().stature_m);
    let at = |q| view.to_page(q);
    let mut out = Vec::new();
    let (behind, ahead) = (Pt::new(-view.forward(), 0.0), Pt::new(view.forward(), 0.0));

    // lean: from the vertical to the trunk line, about the lumbosacral joint
    let (low, up) = (at(j.lumbosacral), Pt::new(0.0, -1.0));
    let radius = at(j.shoulder).distance(low) * 0.78;
    dotted(scene, low, low + up * (radius + t * 0.5), 1.3, Role::Back);
    let upright = -std::f32::consts::FRAC_PI_2;
    let to = upright + view.forward() * p.trunk.rad() as f32;
    if p.trunk.deg().abs() > 1.0 {
        scene.line(shapes::arc(low, radius, upright, to), 2.2, Role::Back);
    }
    let top = low + up * (radius + t * 0.5);
    let lean =
        Wanted { text: words::clinician::lean(p.trunk), size: t * 1.35, weight: Weight::SemiBold, role: Role::Back };
    let mut lines = vec![lean];
    if used.lean {
        let text = "chosen to stay within".to_owned();
        lines.push(Wanted { text, size: t * 0.9, weight: Weight::Regular, role: Role::Back });
    }
    if p.bend.deg() >= 0.5 {
        let text = format!("bend beyond the hip {}", format::deg(p.bend));
        lines.push(Wanted { text, size: t * 0.9, weight: Weight::Regular, role: Role::Back });
        if used.bend {
            // a seen squat may show more than was chosen
            let beyond = p.bend.deg() > case.limits().bend.deg() + 0.5;
            let text = if beyond { "beyond what we allow" } else { "all of what we allow" }.to_owned();
            lines.push(Wanted { text, size: t * 0.9, weight: Weight::Regular, role: Role::Back });
        }
    }
    out.push(Named { text: Block { lines }, target: top, wish: behind, near: t * 0.7 });

    let mut joint = |what: &str, angle, used, role, target, wish, near| {
        let (text, why) = (format!("{what} {}", format::deg(angle)), reason(used));
        let weight = if why.is_empty() { Weight::Regular } else { Weight::SemiBold };
        let mut lines = vec![Wanted { text, size: t, weight, role }];
        if !why.is_empty() {
            lines.push(Wanted { text: why.to_owned(), size: t * 0.9, weight: Weight::Regular, role });
        }
        out.push(Named { text: Block { lines }, target, wish, near });
    };
    let (hip_near, knee_near) = (view.length(0.076 * s) + t * 0.3, view.length(0.042 * s) + t * 0.35);
    joint("hip", p.hip_flexion, used.hip, Role::Hip, at(j.hip), behind + Pt::new(0.0, 0.2), hip_near);
    joint("knee", p.knee_flexion, used.knee, Role::Knee, at(j.knee), ahead + Pt::new(0.0, -0.3), knee_near);

    // shank: from the vertical, about the ankle
    let ankle = at(j.ankle);
    let r = at(j.knee).distance(ankle) * 0.42;
    dotted(scene, ankle, ankle + up * (r + t * 0.5), 1.1, Role::Ankle);
    let along = (at(j.knee) - ankle).unit();
    let to = along.y.atan2(along.x);
    if (to - upright).abs() > 0.02 {
        scene.line(shapes::arc(ankle, r, upright, to), 1.6, Role::Ankle);
    }
    let pitched = case.stand().pitch.deg() > 0.5;
    let by_shank = if pitched { None } else { used.ankle };
    let beside = view.length(0.030 * s) + t * 0.3;
    joint("shank", p.shank, by_shank, Role::Ankle, ankle + up * r, behind, beside);
    if pitched {
        joint("ankle", p.ankle, used.ankle, Role::Ankle, ankle, behind + Pt::new(0.0, -0.4), beside);
    }
    out
}

fn dotted(scene: &mut Scene, a: Pt, b: Pt, width: f32, role: Role) {
    for d in shapes::dashes(&[a, b], 3.0, 3.0) {
        scene.line(d, width, role);
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use plumbfold_core::{Angle, posture, sample};

    #[test]
    fn what_is_used_up_is_what_stands_at_its_limit() {
        let (m, t) = sample::long_thigh_woman();
        let (case, _) = Case::new(&m, &t).expect("valid");
        let deep = posture(&case, Angle::from_deg(76.0));
        let p = deep.posture().expect("a posture");
        let used = UsedUp::of(&case, p);
        assert_eq!(used.ankle, Some(Origin::Measured));
        assert_eq!(used.hip, Some(Origin::Measured));
        assert_eq!(used.knee, None);
        assert!(used.words().expect("something").starts_with("Ankle range"));
        let high = posture(&case, Angle::from_deg(10.0));
        assert_eq!(UsedUp::of(&case, high.posture().expect("a posture")).words(), None);
    }
}
