//! One Scene, drawn by the screen's painter and written on a sheet: shapes agree by the means of 8 × 8 blocks, text by
//! its boxes.

use egui::{Context, FullOutput, RawInput, Rect, pos2, vec2};
use image::RgbaImage;
use plumbfold::{
    computed::Computed,
    document::Document,
    painter::{color, paint},
    theme,
};
use plumbfold_core::Angle;
use plumbfold_scene::{
    Item, Label, Look, Pt, Role, Scene, Show, Size, Theme, chart,
    figure::{Facing, figure},
    plots,
};
use plumbfold_softdraw::SoftDraw;
use plumbfold_tests::{
    clients, drawn,
    picture::{ALIKE, ink, worst_block},
};

/// The figure of a demo client, with everything that a desk shows on it.
fn demo_figure(code: &str, thigh_deg: f64, size: Size) -> Scene {
    let doc = Document::new(clients::demo(code));
    let computed = Computed::new(&doc).expect("a task");
    let results = computed.results().expect("computable");
    let step = results.at(thigh_deg);
    let show = Show::plain(&results.study, step.thigh, &step.balance);
    figure(&show, size, &Look::desk(14.0, Facing::Right)).0
}

fn demo_chart(code: &str, size: Size) -> Scene {
    let doc = Document::new(clients::demo(code));
    let computed = Computed::new(&doc).expect("a task");
    let results = computed.results().expect("computable");
    let c = plots::angles(&results.study, Some(Angle::from_deg(60.0)));
    chart::chart(&c, size, &chart::Look::default())
}

/// The scene as the screen shows it.
fn on_screen(scene: &Scene, theme: Theme) -> (RgbaImage, FullOutput) {
    let ctx = Context::default();
    theme::install_fonts(&ctx);
    let mut soft = SoftDraw::new();
    let rect = Rect::from_min_size(pos2(0.0, 0.0), vec2(scene.size.w, scene.size.h));
    let input = || RawInput { screen_rect: Some(rect), ..RawInput::default() };
    let draw = |ui: &mut egui::Ui| paint(&ui.painter_at(rect), rect.min, scene, theme);
    // a first pass for the fonts, a second for the picture
    let mut first = ctx.run_ui(input(), draw);
    soft.apply(&mut first.textures_delta);
    let mut output = ctx.run_ui(input(), draw);
    soft.apply(&mut output.textures_delta);
    let picture = soft.draw_output(&ctx, &output, color(theme, Role::Paper)).expect("small");
    let [w, h] = picture.size();
    (RgbaImage::from_raw(w, h, picture.straight_rgba()).expect("whole"), output)
}

/// The scene as a sheet shows it.
fn on_sheet(scene: &Scene, theme: Theme) -> RgbaImage {
    let bytes = plumbfold_sheet::png(&plumbfold_sheet::svg(scene, &theme), scene.size.w as u32).expect("a picture");
    let mut reader = png::Decoder::new(std::io::Cursor::new(&bytes)).read_info().expect("a PNG");
    let mut rgb = vec![0; reader.output_buffer_size().expect("a size")];
    let info = reader.next_frame(&mut rgb).expect("pixels");
    let rgba = rgb.chunks_exact(3).flat_map(|c| [c[0], c[1], c[2], 255]).collect();
    RgbaImage::from_raw(info.width, info.height, rgba).expect("whole")
}

fn without_text(scene: &Scene) -> Scene {
    let items = scene.items.iter().filter(|i| !matches!(i, Item::Text(_))).cloned().collect();
    Scene { items, ..scene.clone() }
}

#[test]
fn shapes_of_the_figure_agree() {
    for (code, deg) in [("demo-shape", 90.0), ("demo-older", 40.0), ("demo-loaded", 75.0), ("demo-hip", 0.0)] {
        let scene = without_text(&demo_figure(code, deg, Size::new(640.0, 480.0)));
        assert!(scene.items.len() > 60, "{code}: a figure");
        for theme in [Theme::light(), Theme::dark()] {
            let worst = worst_block(&on_screen(&scene, theme).0, &on_sheet(&scene, theme));
            assert!(worst.by <= ALIKE, "{code} {:?}: {worst:?}", theme.palette());
        }
    }
}

#[test]
fn shapes_of_a_plot_agree() {
    let scene = without_text(&demo_chart("demo-shape", Size::new(400.0, 240.0)));
    let worst = worst_block(&on_screen(&scene, Theme::light()).0, &on_sheet(&scene, Theme::light()));
    assert!(worst.by <= ALIKE, "{worst:?}");
}

#[test]
fn a_figure_moved_by_one_page_unit_would_not_agree() {
    let scene = without_text(&demo_figure("demo-shape", 90.0, Size::new(640.0, 480.0)));
    let items = scene.items.iter().cloned().map(|i| i.moved(Pt::new(1.0, 0.0))).collect();
    let moved = Scene { items, ..scene.clone() };
    let worst = worst_block(&on_screen(&scene, Theme::light()).0, &on_sheet(&moved, Theme::light()));
    assert!(worst.by > ALIKE, "{worst:?}");
}

/// All labels of the scenes under test.
fn labels() -> Vec<Label> {
    let mut all: Vec<Label> = ["demo-shape", "demo-older", "demo-loaded"]
        .iter()
        .flat_map(|code| demo_figure(code, 75.0, Size::new(640.0, 480.0)).labels().cloned().collect::<Vec<_>>())
        .collect();
    all.extend(demo_chart("demo-shape", Size::new(400.0, 240.0)).labels().cloned());
    all
}

#[test]
fn text_on_the_screen_stands_where_the_scene_says() {
    for code in ["demo-shape", "demo-older", "demo-loaded"] {
        let scene = demo_figure(code, 75.0, Size::new(640.0, 480.0));
        let (_, output) = on_screen(&scene, Theme::light());
        let texts = drawn::texts(&output.shapes);
        let labels: Vec<&Label> = scene.labels().collect();
        assert_eq!(texts.len(), labels.len(), "{code}");
        for (t, l) in texts.iter().zip(labels) {
            assert_eq!(t.text, l.text);
            let near = |a: f32, b: f32| (a - b).abs() <= 1.0;
            assert!(near(t.baseline.y, l.baseline.y), "{l:?}: baseline {}", t.baseline.y);
            assert!(near(t.ink().left(), l.bounds().min.x), "{l:?}: left {}", t.ink().left());
            assert!(near(t.width, l.width()), "{l:?}: width {}", t.width);
        }
    }
}

#[test]
fn text_on_screen_and_sheet_has_the_same_box() {
    let labels = labels();
    assert!(labels.len() > 50, "{}", labels.len());
    for label in labels {
        // each alone on a page of its own, at the same fraction of a pixel
        let at = label.bounds();
        let (x, y) = (at.min.x.floor() - 8.0, at.min.y.floor() - 8.0);
        let size = Size::new((at.w() + 20.0).ceil(), (at.h() + 20.0).ceil());
        let mut page = Scene::new(size, "");
        page.text(Label { baseline: label.baseline + Pt::new(-x, -y), ..label.clone() });
        let screen = ink(&on_screen(&page, Theme::light()).0).expect("ink on the screen");
        let sheet = ink(&on_sheet(&page, Theme::light())).expect("ink on the sheet");
        let near = |a: f64, b: f64| (a - b).abs() <= 1.0;
        let agree =
            near(screen.left, sheet.left) && near(screen.right, sheet.right) && near(screen.height, sheet.height);
        assert!(agree, "“{}”: {screen:?} on the screen, {sheet:?} on the sheet", label.text);
    }
}
