//! Writes pictures of several figures into a folder, to be looked at:
//! `cargo run -p plumbfold-sheet --example gallery -- FOLDER`.

use std::{error::Error, fs, path::PathBuf};

use plumbfold_core::{
    Angle, Bend, Case, Measures, Placement, Seen, Sex, Study, Task,
    measures::{AnkleRange, Lengths, Sides},
    posture, sample, study,
};
use plumbfold_scene::{
    Facing, Look, Page, Scene, Show, Size, Theme, figure,
    figure::{Frame, Outline},
    sheet_page,
};

fn cases() -> Vec<(&'static str, Measures, Task)> {
    let (man, plain) = sample::average_man();
    let (woman, _) = sample::long_thigh_woman();
    let mut out = vec![("average", man.clone(), plain.clone()), ("long-thigh", woman.clone(), plain.clone())];
    let mut seen = plain.clone();
    seen.seen = Some(Seen { thigh: Angle::from_deg(58.0), shank: Angle::from_deg(22.0), trunk: Angle::from_deg(49.0) });
    out.push(("seen", woman, seen));
    let with = |placement, load_kg| Task { placement, load_kg, ..plain.clone() };
    out.push(("high-bar", man.clone(), with(Placement::HighBar, 60.0)));
    out.push(("overhead", man.clone(), with(Placement::Overhead, 10.0)));
    out.push((
        "goblet",
        man.clone(),
        Task { heel_raise_m: 0.02, footwear_drop_m: 0.015, ..with(Placement::Goblet, 16.0) },
    ));
    let wide = Task {
        stance_m: Some(0.5),
        toe_out: Angle::from_deg(30.0),
        bend: Bend::KeepSmall,
        ..with(Placement::ArmsCrossed, 0.0)
    };
    out.push(("wide", man.clone(), wide));
    let mut tall = sample::measures(Sex::Male, 2.02, 104.0);
    tall.lengths = Lengths { thigh_m: Some(0.53), shank_m: Some(0.47), upper_arm_m: Some(0.4), ..Lengths::default() };
    tall.ankle = AnkleRange::KneeToWall(Sides { left: Some(0.02), right: Some(0.03) });
    out.push(("tall-stiff", tall, with(Placement::FrontRack, 40.0)));
    let small = sample::measures(Sex::Female, 1.46, 44.0);
    out.push(("small", small, with(Placement::AtSides, 8.0)));
    out
}

fn show<'a>(s: &'a Study, now: &'a plumbfold_core::Balance, thigh: Angle) -> Show<'a> {
    Show::plain(s, thigh, now)
}

fn main() -> Result<(), Box<dyn Error>> {
    let folder = PathBuf::from(std::env::args().nth(1).ok_or("give a folder to write into")?);
    fs::create_dir_all(&folder)?;
    let write = |name: &str, scene: &Scene, theme: Theme, width: u32| -> Result<(), Box<dyn Error>> {
        let png = plumbfold_sheet::png(&plumbfold_sheet::svg(scene, &theme), width)?;
        fs::write(folder.join(format!("{name}.png")), png)?;
        for (a, b) in plumbfold_scene::overlaps(scene) {
            println!("{name}: overlap {:?} {:?}", a.text, b.text);
        }
        println!("{name}: {} items leave the page", plumbfold_scene::out_of_page(scene).len());
        Ok(())
    };
    for (name, m, t) in cases() {
        let (case, notices) = Case::new(&m, &t)?;
        let s = study(&case);
        let average = case.with_average_lengths();
        for deg in [0.0, 45.0, 75.0, 100.0] {
            let thigh = Angle::from_deg(deg);
            let now = posture(&case, thigh);
            let other = posture(&average, thigh);
            let outline = other.posture().map(|posture| Outline {
                case: &average,
                posture,
                what: "average lengths for this stature, same ranges",
            });
            let full = Show { outline, pain_from: t.seen.map(|_| Angle::from_deg(50.0)), ..show(&s, &now, thigh) };
            let desk = figure(&full, Size::new(746.0, 560.0), &Look::desk(13.0, Facing::Right)).0;
            write(&format!("{name}-{deg}"), &desk, Theme::light(), 1119)?;
        }
        let thigh = Angle::from_deg(90.0);
        let now = posture(&case, thigh);
        let large = figure(&show(&s, &now, thigh), Size::new(1180.0, 760.0), &Look::desk(14.0, Facing::Right)).0;
        write(&format!("{name}-contrast"), &large, Theme::high_contrast(), 1180)?;
        let thigh = Angle::from_deg(75.0);
        let now = posture(&case, thigh);
        let page = Page {
            code: name,
            date: "3 Nov 2026",
            visit: 1,
            task: "main",
            show: show(&s, &now, thigh),
            notices: &notices,
        };
        write(&format!("{name}-page"), &sheet_page(&page), Theme::light(), 1800)?;
        let client = figure(&show(&s, &now, thigh), Size::new(1920.0, 1080.0), &Look::client(34.0, Facing::Right)).0;
        write(&format!("{name}-client"), &client, Theme::light(), 1280)?;
        if let Some(p) = now.posture() {
            let held = plumbfold_core::pose(&case, p.shank, p.thigh, Angle::from_deg(15.0));
            let full = Show { straightened: held.as_ref(), ..show(&s, &now, thigh) };
            let left = Look { frame: Frame::ThisPosture, ..Look::desk(13.0, Facing::Left) };
            write(&format!("{name}-held"), &figure(&full, Size::new(746.0, 560.0), &left).0, Theme::dark(), 1119)?;
        }
    }
    Ok(())
}
