//! Figures measured without pixels: boxes of text, edges of the page, places of lines.

use plumbfold_core::{
    Angle, Balance, Bend, Case, Measures, Placement, Rule, Seen, Sex, Study, Task,
    limits::LEAN_MAX,
    measures::{AnkleRange, HipRange, Lengths, Scope, Sides},
    pose, posture, readings, sample, study,
};
use plumbfold_scene::{
    Facing, Handle, Hit, Item, Look, Pt, Role, Scene, Show, Size, figure,
    figure::{Frame, Outline},
    measure, out_of_page, overlaps, words,
};

fn clients() -> Vec<(Measures, Task)> {
    let (man, plain) = sample::average_man();
    let (woman, _) = sample::long_thigh_woman();
    let mut out = vec![(man.clone(), plain.clone()), (woman.clone(), plain.clone())];
    let seen = Seen { thigh: Angle::from_deg(58.0), shank: Angle::from_deg(22.0), trunk: Angle::from_deg(49.0) };
    out.push((woman.clone(), Task { seen: Some(seen), goal: Angle::from_deg(60.0), ..plain.clone() }));
    for placement in Placement::ALL {
        for load_kg in [0.0, 12.0, 140.0] {
            out.push((man.clone(), Task { placement, load_kg, ..plain.clone() }));
        }
    }
    out.push((man.clone(), Task { heel_raise_m: 0.08, footwear_drop_m: 0.04, ..plain.clone() }));
    out.push((man.clone(), Task { stance_m: Some(0.7), toe_out: Angle::from_deg(45.0), ..plain.clone() }));
    out.push((
        woman.clone(),
        Task { bend: Bend::Degrees(Angle::ZERO), lean_limit: Some(Angle::from_deg(40.0)), ..plain.clone() },
    ));
    out.push((woman, Task { rule: Rule::HeldShank(Angle::from_deg(5.0)), ..plain.clone() }));
    let mut giant = sample::measures(Sex::Male, 2.20, 150.0);
    giant.lengths = Lengths { thigh_m: Some(0.60), shank_m: Some(0.55), ..Lengths::default() };
    giant.ankle = AnkleRange::Degrees(Sides { left: Some(Angle::from_deg(2.0)), right: None });
    giant.scope = vec![Scope::LimbDifference];
    out.push((giant, Task { placement: Placement::LowBar, load_kg: 200.0, ..plain.clone() }));
    let mut child = sample::measures(Sex::Female, 1.05, 26.0);
    child.hip = HipRange::RockBack(Sides { left: Some(Angle::from_deg(60.0)), right: None });
    out.push((child, Task { placement: Placement::AtSides, ..plain }));
    out
}

const DEPTHS: [f64; 8] = [0.0, 12.0, 37.0, 61.0, 76.0, 90.0, 104.0, 138.0];

fn looks() -> Vec<(Size, Look)> {
    let desk = |w, h, text, facing| (Size::new(w, h), Look::desk(text, facing));
    vec![
        desk(600.0, 460.0, 12.5, Facing::Right),
        desk(746.0, 560.0, 13.0, Facing::Left),
        desk(1180.0, 760.0, 14.0, Facing::Right),
        (Size::new(700.0, 640.0), Look::sheet(13.5)),
        (Size::new(620.0, 900.0), Look { frame: Frame::ThisPosture, ..Look::desk(13.0, Facing::Left) }),
    ]
}

fn each(mut test: impl FnMut(&Study, &Balance, Angle)) {
    for (m, t) in clients() {
        let (case, _) = Case::new(&m, &t).expect("valid");
        let s = study(&case);
        for deg in DEPTHS {
            let thigh = Angle::from_deg(deg);
            test(&s, &posture(&case, thigh), thigh);
        }
    }
}

fn clean(scene: &Scene, what: &str) {
    let texts = |pairs: Vec<(plumbfold_scene::Label, plumbfold_scene::Label)>| -> Vec<(String, String)> {
        pairs.into_iter().map(|(a, b)| (a.text, b.text)).collect()
    };
    let found = texts(overlaps(scene));
    assert!(found.is_empty(), "{what}: {found:?}");
    let out = out_of_page(scene);
    assert!(out.is_empty(), "{what}: {out:?}");
    assert_eq!(measure::not_finite(scene), 0, "{what}");
    for l in scene.labels() {
        assert!(plumbfold_scene::fonts::has_glyphs(&l.text), "{what}: {}", l.text);
    }
}

#[test]
fn no_label_overlaps_or_leaves_the_page_at_any_depth() {
    each(|s, now, thigh| {
        let average = s.case.with_average_lengths();
        let other = posture(&average, thigh);
        let outline = other.posture().map(|posture| Outline {
            case: &average,
            posture,
            what: "average lengths for this stature, same ranges",
        });
        let show = Show { outline, pain_from: Some(Angle::from_deg(50.0)), ..Show::plain(s, thigh, now) };
        for (area, look) in looks() {
            let (scene, _) = figure(&show, area, &look);
            let what =
                format!("{:?} {} kg at {}° in {area:?}", s.case.task().placement, s.case.task().load_kg, thigh.deg());
            clean(&scene, &what);
            for needed in ["lean ", "knee ", "hip ", "shank ", "hip arm ", "knee arm ", "seat ", "goal ", "pain from "]
            {
                assert!(scene.labels().any(|l| l.text.starts_with(needed)), "{what}: no {needed}");
            }
        }
    });
}

#[test]
fn a_straightened_trunk_is_drawn_clean_and_says_by_how_much() {
    each(|s, now, thigh| {
        let Some(p) = now.posture() else { return };
        for lean in [-5.0, 20.0, 85.0] {
            let held = pose(&s.case, p.shank, p.thigh, Angle::from_deg(lean)).expect("legs span");
            let show = Show { straightened: Some(&held), ..Show::plain(s, thigh, now) };
            for (area, look) in [looks()[1], looks()[2]] {
                let (scene, view) = figure(&show, area, &look);
                clean(&scene, &format!("lean {lean} at {}°", thigh.deg()));
                assert!(scene.labels().any(|l| l.text.starts_with("Trunk held at")));
                // the plumb line stands under the straightened trunk's centre of mass
                let x = view.x(held.com.x);
                assert!(vertical(&scene, Role::Plumb).iter().any(|v| (v - x).abs() < 0.01));
            }
        }
    });
}

/// x of the vertical lines of a role.
fn vertical(scene: &Scene, wanted: Role) -> Vec<f32> {
    scene
        .items
        .iter()
        .filter_map(|i| match i {
            Item::Line { pts, role, .. } if *role == wanted && pts.iter().all(|p| (p.x - pts[0].x).abs() < 1e-3) => {
                Some(pts[0].x)
            }
            _ => None,
        })
        .collect()
}

#[test]
fn the_rule_is_as_long_as_the_arms() {
    each(|s, now, thigh| {
        let Some(p) = now.posture() else { return };
        let r = readings(&s.case, p);
        for (area, look) in looks() {
            let (scene, view) = figure(&Show::plain(s, thigh, now), area, &look);
            for (role, arm_m) in [(Role::Hip, r.hip_arm_m), (Role::Knee, r.knee_arm_m)] {
                let length = view.length(arm_m).abs();
                if length < 1.0 {
                    continue;
                }
                // the widest filled area of that role under the floor
                let drawn = scene
                    .items
                    .iter()
                    .filter_map(|i| match i {
                        Item::Fill(a, q) if *q == role => a.bounds().filter(|b| b.min.y > view.floor()),
                        _ => None,
                    })
                    .map(|b| b.w())
                    .fold(0.0, f32::max);
                assert!((drawn - length).abs() < 0.05, "{role:?} {drawn} {length}");
            }
        }
    });
}

#[test]
fn facing_left_mirrors_the_body() {
    let (m, t) = sample::average_man();
    let (case, _) = Case::new(&m, &t).expect("valid");
    let (s, thigh) = (study(&case), Angle::from_deg(75.0));
    let now = posture(&case, thigh);
    let show = Show::plain(&s, thigh, &now);
    let area = Size::new(746.0, 560.0);
    let (_, right) = figure(&show, area, &Look::desk(13.0, Facing::Right));
    let (_, left) = figure(&show, area, &Look::desk(13.0, Facing::Left));
    let p = now.posture().expect("a posture");
    for q in [p.joints.hip, p.joints.knee, p.joints.shoulder] {
        let (a, b) = (right.to_page(q), left.to_page(q));
        assert!((a.x + b.x - area.w).abs() < 0.01 && (a.y - b.y).abs() < 0.01, "{a:?} {b:?}");
    }
}

#[test]
fn the_scale_stays_while_the_client_squats() {
    let (m, t) = sample::long_thigh_woman();
    let (case, _) = Case::new(&m, &t).expect("valid");
    let s = study(&case);
    let area = Size::new(746.0, 560.0);
    let views: Vec<_> = s
        .descent
        .iter()
        .map(|step| figure(&Show::plain(&s, step.thigh, &step.balance), area, &Look::desk(13.0, Facing::Right)).1)
        .collect();
    let first = views[0];
    for v in views {
        // the frame takes every third step, so a step between may widen it by a hair
        assert!((v.length(1.0) - first.length(1.0)).abs() < 1.0, "{} {}", v.length(1.0), first.length(1.0));
    }
}

#[test]
fn every_handle_can_be_hit_where_it_is_drawn_and_holds_its_value() {
    each(|s, now, thigh| {
        let Some(p) = now.posture() else { return };
        let show = Show { pain_from: Some(Angle::from_deg(50.0)), ..Show::plain(s, thigh, now) };
        let area = Size::new(746.0, 560.0);
        let (scene, view) = figure(&show, area, &Look::desk(13.0, Facing::Right));
        let grip = |h: Handle| scene.grips.iter().find(|g| g.handle == h).unwrap_or_else(|| panic!("no {h:?}"));
        for (h, at) in [
            (Handle::Hip, view.to_page(p.joints.hip)),
            (Handle::Knee, view.to_page(p.joints.knee)),
            (Handle::Shoulder, view.to_page(p.joints.shoulder)),
            (Handle::Load, view.to_page_above_floor(p.joints.load)),
        ] {
            assert!(grip(h).hit.contains(at), "{h:?}");
        }
        assert!((grip(Handle::Hip).value - thigh.deg()).abs() < 1e-9);
        assert!((grip(Handle::Shoulder).value - p.trunk.deg()).abs() < 1e-9);
        assert!(grip(Handle::Shoulder).range.1 <= LEAN_MAX.deg() + 1e-9);
        for g in &scene.grips {
            let slack = 1e-6 * (1.0 + g.range.1.abs());
            assert!(
                g.value >= g.range.0 - slack && g.value <= g.range.1 + slack,
                "{:?} {} {:?}",
                g.handle,
                g.value,
                g.range
            );
            assert!(!g.name.is_empty());
            let b = g.hit.bounds();
            assert!(b.max.x > 0.0 && b.min.x < area.w && b.max.y > 0.0 && b.min.y < area.h, "{:?}", g.handle);
            if let (Some((a, z)), Hit::Rect(r)) = (g.track, g.hit) {
                assert!(r.grown(1.0).contains(a) && r.grown(1.0).contains(z), "{:?}", g.handle);
            }
        }
        let rail = grip(Handle::Rail);
        let (low, high) = rail.track.expect("a track");
        let share = ((rail.value - rail.range.0) / (rail.range.1 - rail.range.0)) as f32;
        let y = low.toward(high, share).y;
        assert!((y - view.y(p.seat_height_m.max(0.0))).abs() < 0.05);
        let paper = figure(&show, area, &Look::sheet(13.0)).0;
        assert!(paper.grips.is_empty());
    });
}

#[test]
fn the_clients_view_is_large_and_quiet() {
    each(|s, now, thigh| {
        for (area, text) in [(Size::new(1920.0, 1080.0), 34.0), (Size::new(1280.0, 800.0), 25.0)] {
            for facing in [Facing::Right, Facing::Left] {
                let (scene, _) = figure(&Show::plain(s, thigh, now), area, &Look::client(text, facing));
                clean(&scene, &format!("client at {}°", thigh.deg()));
                let mut numbers = 0;
                for l in scene.labels() {
                    assert!(l.size >= text, "{} {}", l.text, l.size);
                    assert_eq!(words::breaks_never_list(&l.text), None, "{}", l.text);
                    numbers += l.text.split(|c: char| !c.is_ascii_digit()).filter(|p| !p.is_empty()).count();
                }
                assert!(numbers <= 5, "{numbers} numbers");
                assert_eq!(words::breaks_never_list(&scene.alt), None, "{}", scene.alt);
            }
        }
    });
}

#[test]
fn an_area_too_small_gives_no_nonsense() {
    let (m, t) = sample::average_man();
    let (case, _) = Case::new(&m, &t).expect("valid");
    let (s, thigh) = (study(&case), Angle::from_deg(75.0));
    let now = posture(&case, thigh);
    for size in [Size::new(0.0, 0.0), Size::new(40.0, 30.0), Size::new(200.0, 900.0), Size::new(900.0, 120.0)] {
        for look in [Look::desk(13.0, Facing::Right), Look::sheet(13.0), Look::client(34.0, Facing::Left)] {
            let (scene, view) = figure(&Show::plain(&s, thigh, &now), size, &look);
            assert_eq!(measure::not_finite(&scene), 0);
            let p = view.to_world(Pt::new(1.0, 1.0));
            assert!(p.x.is_finite() && p.y.is_finite());
        }
    }
}
