//! Arcs and names of angles, joints that are used up, and the placing of all these labels.

use plumbfold_core::{Case, Origin, Posture, limits::LEAN_MAX};

use super::view::View;
use crate::{
    format,
    geometry::Pt,
    place::Wanted,
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

fn suffix(used: Option<Origin>) -> &'static str {
    match used {
        None => "",
        Some(Origin::Measured) => " · used up",
        Some(Origin::Assumed) => " · assumed range used up",
        Some(Origin::Precaution) => " · precaution reached",
    }
}

/// A label that wants to stand near a place, in a direction from it.
pub(super) struct Named {
    pub text: Wanted,
    pub target: Pt,
    pub wish: Pt,
    pub near: f32,
}

/// Draws arcs and returns the labels that name them, the most important first.
pub(super) fn draw(scene: &mut Scene, view: &View, case: &Case, p: &Posture, t: f32) -> Vec<Named> {
    let (j, used) = (&p.joints, UsedUp::of(case, p));
    let at = |q| view.to_page(q);
    let joint = view.length(0.045 * case.body().stature_m);
    let mut out = Vec::new();
    let mut name = |text: String, size: f32, strong: bool, role, target, wish: Pt, near| {
        let weight = if strong { Weight::SemiBold } else { Weight::Regular };
        out.push(Named { text: Wanted { text, size, weight, role }, target, wish, near });
    };

    // lean: from the vertical to the trunk line, about the lumbosacral joint
    let (low, up) = (at(j.lumbosacral), Pt::new(0.0, -1.0));
    let radius = at(j.shoulder).distance(low) * 0.78;
    for d in shapes::dashes(&[low, low + up * (radius + t * 0.8)], 3.0, 3.0) {
        scene.line(d, 1.3, Role::Back);
    }
    let (from, to) = (up.y.atan2(up.x), up.y.atan2(up.x) + view.forward() * p.trunk.rad() as f32);
    if p.trunk.deg().abs() > 1.0 {
        scene.line(shapes::arc(low, radius, from, to), 2.2, Role::Back);
    }
    let middle = shapes::on_circle(low, radius, f32::midpoint(from, to) - view.forward() * 0.15);
    let lean = format!("{}{}", words::clinician::lean(p.trunk), if used.lean { " · chosen limit" } else { "" });
    let outward = (middle - low).unit() + Pt::new(-view.forward() * 0.5, 0.0);
    name(lean, t * 1.35, true, Role::Back, middle, outward, t * 0.5);

    let behind = Pt::new(-view.forward(), 0.0);
    let ahead = Pt::new(view.forward(), 0.0);
    let knee = format!("knee {}{}", format::deg(p.knee_flexion), suffix(used.knee));
    name(knee, t, used.knee.is_some(), Role::Knee, at(j.knee), ahead + Pt::new(0.0, -0.25), joint);
    let hip = format!("hip {}{}", format::deg(p.hip_flexion), suffix(used.hip));
    name(hip, t, used.hip.is_some(), Role::Hip, at(j.hip), behind + Pt::new(0.0, 0.25), joint * 1.45);

    // shank: from the vertical, about the ankle
    let ankle = at(j.ankle);
    let r = at(j.knee).distance(ankle) * 0.42;
    for d in shapes::dashes(&[ankle, ankle + up * (r + t * 0.5)], 3.0, 3.0) {
        scene.line(d, 1.1, Role::Ankle);
    }
    let sweep = (at(j.knee) - ankle).unit();
    let (from, to) = (-std::f32::consts::FRAC_PI_2, sweep.y.atan2(sweep.x));
    if (to - from).abs() > 0.02 {
        scene.line(shapes::arc(ankle, r, from, to), 1.6, Role::Ankle);
    }
    let pitched = case.stand().pitch.deg() > 0.5;
    let shank = format!("shank {}{}", format::deg(p.shank), if pitched { "" } else { suffix(used.ankle) });
    let strong = used.ankle.is_some() && !pitched;
    let arc_end = ankle + up * r;
    name(shank, t, strong, Role::Ankle, arc_end, behind, t * 0.5);
    if pitched {
        let text = format!("ankle {}{}", format::deg(p.ankle), suffix(used.ankle));
        name(text, t, used.ankle.is_some(), Role::Ankle, ankle, behind, joint);
    }
    if p.bend.deg() >= 0.5 {
        let text = format!("bends {} beyond the hip{}", format::deg(p.bend), if used.bend { " · used up" } else { "" });
        name(text, t, used.bend, Role::Back, low, behind + Pt::new(0.0, -0.5), joint * 1.35);
    }
    out
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
