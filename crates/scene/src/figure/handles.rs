//! Joints and handles, drawn and listed as grips.

use plumbfold_core::{Field, Posture, Rule, bounds, bounds::Unit, limits::LEAN_MAX};

use super::{Controls, Look, Show, Style, UsedUp, view::View};
use crate::{
    geometry::{Pt, RectPt},
    place::{Placer, Wanted},
    scene::{Anchor, Grip, Handle, Hit, Scene, Weight},
    shapes,
    theme::Role,
};

/// Greatest slope on the slider between more knee and more hip (the range a seen squat is taken in).
pub const SLOPE_MAX: f64 = 0.8;

fn ring(scene: &mut Scene, at: Pt, radius: f32, edge: Role, full: Option<Role>) {
    scene.fill(shapes::circle(at, radius), edge);
    scene.fill(shapes::circle(at, radius * 0.68), Role::Paper);
    if let Some(role) = full {
        scene.fill(shapes::circle(at, radius * 0.40), role);
    }
}

/// Joints: rings, with a full middle where the joint's range is used up. Adds the grips.
pub(super) fn draw(scene: &mut Scene, show: &Show<'_>, view: &View, p: &Posture, look: &Look, placer: &mut Placer) {
    let (case, t, j) = (&show.study.case, look.text, &p.joints);
    let used = UsedUp::of(case, p);
    let large = (t * 0.58).max(view.length(0.020));
    let shows = look.controls == Controls::Shown;
    let annotated = look.style == Style::Annotated;
    let joints = [
        (j.ankle, large * 0.75, Role::Ankle, used.ankle.is_some()),
        (j.knee, large, Role::Knee, used.knee.is_some()),
        (j.hip, large, Role::Hip, used.hip.is_some()),
        (j.shoulder, large, Role::Back, used.lean),
    ];
    for (at, radius, role, full) in joints {
        let at = view.to_page_above_floor(at);
        let edge = if annotated { role } else { Role::BodyEdge };
        ring(scene, at, radius, edge, (full && annotated).then_some(role));
        placer.take(RectPt { min: at, max: at }.grown(radius));
    }
    if !shows {
        return;
    }
    let heel = view.to_page(j.heel) + Pt::new(-view.forward() * t * 0.55, -t * 0.1);
    let load = view.to_page_above_floor(j.load);
    if annotated {
        for at in [heel, load] {
            ring(scene, at, large * 0.62, Role::Gear, None);
            placer.take(RectPt { min: at, max: at }.grown(large * 0.62));
        }
    }
    let reach = (t * 1.1).max(large * 1.3);
    let stand = case.stand();
    let highest = (case.limits().ankle + stand.pitch).deg().min(89.0);
    let mut grip = |handle, at: Pt, name: &str, value: f64, range: (f64, f64), unit| {
        scene.grips.push(Grip {
            handle,
            hit: Hit::Circle { at, radius: reach },
            name: name.to_owned(),
            value,
            range,
            unit,
            track: None,
        });
    };
    let hip = view.to_page_above_floor(j.hip);
    grip(Handle::Hip, hip, "Depth, hip", p.thigh.deg(), (0.0, show.deepest.deg()), Unit::Deg);
    grip(Handle::Knee, view.to_page_above_floor(j.knee), "Shank, knee", p.shank.deg(), (-10.0, highest), Unit::Deg);
    if annotated {
        let lean = (-5.0, LEAN_MAX.deg());
        grip(
            Handle::Shoulder,
            view.to_page_above_floor(j.shoulder),
            "Trunk lean, shoulder",
            p.trunk.deg(),
            lean,
            Unit::Deg,
        );
        let (raise, kg) = (bounds(Field::HeelRaise), bounds(Field::Load));
        let task = case.task();
        grip(Handle::Heel, heel, "Heel wedge", task.heel_raise_m * 1000.0, (raise.min, raise.max), Unit::Mm);
        grip(Handle::Load, load, "Load", task.load_kg, (kg.min, kg.max), Unit::Kg);
        slider(scene, show, view, look);
    }
}

/// The slider between more knee and more hip and back, under the rule. Only where the usual shank
/// rules, since it moves that slope.
fn slider(scene: &mut Scene, show: &Show<'_>, view: &View, look: &Look) {
    let (case, t) = (&show.study.case, look.text);
    if !matches!(case.task().rule, Rule::Usual { .. }) {
        return;
    }
    let y = scene.size.h - t * 1.3;
    let half = t * 6.5;
    let middle =
        view.x(case.stand().support.aim_m).clamp(half + t * 9.0, (scene.size.w - half - t * 13.0).max(half + t * 9.0));
    let (left, right) = (Pt::new(middle - half, y), Pt::new(middle + half, y));
    let slope = case.usual_slope().clamp(0.0, SLOPE_MAX);
    // more knee is the greater slope, on the left
    let at = right.toward(left, (slope / SLOPE_MAX) as f32);
    scene.fill(shapes::capsule(left, t * 0.2, right, t * 0.2), Role::Border);
    ring(scene, at, t * 0.55, Role::Ink, None);
    let word = |text: &str, role| Wanted { text: text.to_owned(), size: t, weight: Weight::SemiBold, role };
    scene.text(word("more knee", Role::Knee).at(left + Pt::new(-t * 0.9, t * 0.34), Anchor::End));
    scene.text(word("more hip and back", Role::Hip).at(right + Pt::new(t * 0.9, t * 0.34), Anchor::Start));
    scene.grips.push(Grip {
        handle: Handle::KneeHipSlider,
        hit: Hit::Rect(RectPt::new(left, right).grown(t * 0.8)),
        name: "More knee or more hip and back".to_owned(),
        value: slope,
        range: (0.0, SLOPE_MAX),
        unit: Unit::One,
        track: Some((right, left)),
    });
}

/// Grips of the rail and the pain mark.
pub(super) fn rail(scene: &mut Scene, show: &Show<'_>, view: &View, bar: RectPt, pain: Option<Pt>, look: &Look) {
    if look.controls == Controls::Hidden {
        return;
    }
    let t = look.text;
    let (Some(first), Some(p)) = (show.study.descent.first().and_then(|s| s.balance.posture()), show.shown()) else {
        return;
    };
    let low = super::seat_at(&show.study.case, show.deepest).unwrap_or(0.0).min(first.seat_height_m);
    let x = bar.middle().x;
    scene.grips.push(Grip {
        handle: Handle::Rail,
        hit: Hit::Rect(bar.grown(t * 0.5)),
        name: "Seat height".to_owned(),
        value: p.seat_height_m.max(0.0) * 100.0,
        range: (low * 100.0, first.seat_height_m * 100.0),
        unit: Unit::Cm,
        track: Some((Pt::new(x, view.y(low)), Pt::new(x, view.y(first.seat_height_m)))),
    });
    if let (Some(at), Some(pain)) = (pain, show.pain_from) {
        scene.grips.push(Grip {
            handle: Handle::PainMark,
            hit: Hit::Circle { at, radius: t * 0.9 },
            name: "Pain from, thigh angle".to_owned(),
            value: pain.deg(),
            range: (0.0, show.deepest.deg()),
            unit: Unit::Deg,
            track: None,
        });
    }
}
