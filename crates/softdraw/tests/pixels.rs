//! Known pixels: what meshes, textures, clip rectangles and text look like once drawn.
#![expect(clippy::disallowed_methods, reason = "colours of a test picture are raw numbers on purpose")]

use std::sync::Arc;

use egui::epaint::{ClippedPrimitive, ImageDelta, Mesh, Primitive, Vertex};
use egui::{Color32, ColorImage, Rect, TextureId, TextureOptions, TexturesDelta, pos2, vec2};
use plumbfold_softdraw::{MAX_SIDE_PX, Picture, SoftDraw, TooLarge};

const WHITE: [u8; 4] = [255; 4];
const BLACK: [u8; 4] = [0, 0, 0, 255];

/// A drawer whose default texture is one white texel, as the corner of egui's font atlas is.
fn drawer() -> SoftDraw {
    let mut soft = SoftDraw::new();
    set(&mut soft, TextureId::default(), ImageDelta::full(ColorImage::filled([1, 1], Color32::WHITE), LINEAR));
    soft
}

const LINEAR: TextureOptions = TextureOptions::LINEAR;
const NEAREST: TextureOptions = TextureOptions::NEAREST;

fn set(soft: &mut SoftDraw, id: TextureId, image: ImageDelta) {
    let mut delta = TexturesDelta::default();
    delta.push(id, image);
    soft.apply(&mut delta);
    assert!(delta.is_empty(), "apply takes everything");
}

fn rect(left: f32, top: f32, right: f32, bottom: f32) -> Rect {
    Rect::from_min_max(pos2(left, top), pos2(right, bottom))
}

/// Corners with their colours, and triangles as indices.
fn mesh(corners: &[(f32, f32, Color32)], indices: &[u32]) -> Mesh {
    let vertices = corners.iter().map(|&(x, y, colour)| Vertex::untextured(pos2(x, y), colour)).collect();
    Mesh { indices: indices.to_vec(), vertices, texture_id: TextureId::default() }
}

fn filled(area: Rect, colour: Color32) -> Mesh {
    let mut mesh = Mesh::default();
    mesh.add_colored_rect(area, colour);
    mesh
}

/// A mesh that shows the whole of a texture in `area`.
fn textured(id: TextureId, area: Rect, tint: Color32) -> Mesh {
    let mut mesh = Mesh::with_texture(id);
    mesh.add_rect_with_uv(area, rect(0.0, 0.0, 1.0, 1.0), tint);
    mesh
}

fn clipped(clip_rect: Rect, mesh: Mesh) -> ClippedPrimitive {
    ClippedPrimitive { clip_rect, primitive: Primitive::Mesh(mesh) }
}

/// One mesh on an 8 × 8 picture at one pixel per point.
fn on_eight(soft: &SoftDraw, mesh: Mesh, background: Color32) -> Picture {
    soft.draw(&[clipped(Rect::EVERYTHING, mesh)], 1.0, [8, 8], background).expect("eight pixels are not too many")
}

/// The pixels that differ from `from`, as (x, y).
fn changed(picture: &Picture, from: [u8; 4]) -> Vec<(u32, u32)> {
    let [width, height] = picture.size();
    let all = (0..height).flat_map(|y| (0..width).map(move |x| (x, y)));
    all.filter(|&(x, y)| picture.pixel(x, y) != Some(from)).collect()
}

#[test]
fn a_filled_rectangle_has_its_colour_inside_and_nothing_outside() {
    let picture = on_eight(&drawer(), filled(rect(2.0, 3.0, 5.0, 7.0), Color32::from_rgb(10, 20, 30)), Color32::WHITE);
    for y in 0..8 {
        for x in 0..8 {
            let inside = (2..5).contains(&x) && (3..7).contains(&y);
            let want = if inside { [10, 20, 30, 255] } else { WHITE };
            assert_eq!(picture.pixel(x, y), Some(want), "pixel {x}, {y}");
        }
    }
}

#[test]
fn points_become_pixels_by_the_scale() {
    let soft = drawer();
    let primitive = [clipped(rect(0.0, 0.0, 2.6, 9.0), filled(rect(1.0, 1.0, 3.0, 2.0), Color32::BLACK))];
    let picture = soft.draw(&primitive, 1.5, [8, 8], Color32::WHITE).unwrap();
    // 1.5–4.5 px across (centres 2–4 after the left one at 1.5 is owned), cut by the clip at 3.9 → 4; 1.5–3 px down
    assert_eq!(changed(&picture, WHITE), [(1, 1), (2, 1), (3, 1), (1, 2), (2, 2), (3, 2)]);
}

#[test]
fn half_alpha_is_mixed_on_the_encoded_bytes() {
    let soft = drawer();
    let half_black = Color32::from_rgba_premultiplied(0, 0, 0, 128);
    let picture = on_eight(&soft, filled(rect(0.0, 0.0, 4.0, 8.0), half_black), Color32::from_rgb(200, 100, 50));
    // 200 · 127/255 = 99.6, 100 · 127/255 = 49.8, 50 · 127/255 = 24.9
    assert_eq!(picture.pixel(1, 1), Some([100, 50, 25, 255]));
    assert_eq!(picture.pixel(5, 1), Some([200, 100, 50, 255]));

    // on a transparent picture the premultiplied colour stays, and comes out straight
    let half_red = Color32::from_rgba_premultiplied(128, 0, 0, 128);
    let picture = on_eight(&soft, filled(rect(0.0, 0.0, 8.0, 8.0), half_red), Color32::TRANSPARENT);
    assert_eq!(picture.pixel(1, 1), Some([128, 0, 0, 128]));
    assert_eq!(picture.straight_rgba()[..4], [255, 0, 0, 128]);
}

#[test]
fn alpha_nought_with_colour_adds_light() {
    let glow = Color32::from_rgba_premultiplied(100, 40, 0, 0);
    let picture = on_eight(
        &drawer(),
        filled(rect(0.0, 0.0, 8.0, 8.0), glow),
        Color32::from_rgba_premultiplied(200, 100, 50, 255),
    );
    assert_eq!(picture.pixel(3, 3), Some([255, 140, 50, 255]));
}

#[test]
fn later_meshes_lie_over_earlier_ones() {
    let soft = drawer();
    let primitives = [
        clipped(Rect::EVERYTHING, filled(rect(0.0, 0.0, 6.0, 6.0), Color32::RED)),
        clipped(Rect::EVERYTHING, filled(rect(4.0, 4.0, 8.0, 8.0), Color32::BLUE)),
    ];
    let picture = soft.draw(&primitives, 1.0, [8, 8], Color32::WHITE).unwrap();
    assert_eq!(picture.pixel(5, 5), Some([0, 0, 255, 255]));
    assert_eq!(picture.pixel(3, 3), Some([255, 0, 0, 255]));
}

#[test]
fn two_triangles_sharing_an_edge_leave_no_seam_and_blend_once() {
    let half = Color32::from_rgba_premultiplied(0, 0, 0, 128);
    // edges through pixel centres (whole and half numbers), and one at an odd slope
    for (x, y) in [(4.0, 4.0), (4.5, 3.5), (2.5, 6.5), (3.3, 1.7)] {
        let corners = [(0.0, 0.0, half), (8.0, 0.0, half), (8.0, 8.0, half), (0.0, 8.0, half), (x, y, half)];
        let fan = mesh(&corners, &[0, 1, 4, 2, 1, 4, 2, 3, 4, 3, 0, 4]);
        let picture = on_eight(&drawer(), fan, Color32::WHITE);
        assert!(picture.pixels().iter().all(|&p| p == [127, 127, 127, 255]), "hub {x}, {y}: {:?}", picture.pixels());
    }
}

#[test]
fn clip_rectangles_cut() {
    let soft = drawer();
    let clip = rect(2.0, 1.0, 4.0, 3.0);
    let primitive = [clipped(clip, filled(rect(-9.0, -9.0, 90.0, 90.0), Color32::BLACK))];
    let picture = soft.draw(&primitive, 1.0, [8, 8], Color32::WHITE).unwrap();
    assert_eq!(changed(&picture, WHITE), [(2, 1), (3, 1), (2, 2), (3, 2)]);
}

#[test]
fn clip_rectangles_without_area_show_nothing() {
    let soft = drawer();
    for clip in [rect(3.0, 3.0, 3.0, 9.0), rect(5.0, 5.0, 2.0, 2.0), Rect::NOTHING, Rect::NAN] {
        let primitive = [clipped(clip, filled(rect(0.0, 0.0, 8.0, 8.0), Color32::BLACK))];
        let picture = soft.draw(&primitive, 1.0, [8, 8], Color32::WHITE).unwrap();
        assert_eq!(changed(&picture, WHITE), [], "{clip:?}");
    }
}

#[test]
fn colours_run_evenly_from_corner_to_corner() {
    let (left, right) = (Color32::BLACK, Color32::from_rgb(160, 80, 0));
    let corners = [(0.0, 0.0, left), (8.0, 0.0, right), (8.0, 8.0, right), (0.0, 8.0, left)];
    let picture = on_eight(&drawer(), mesh(&corners, &[0, 1, 2, 0, 2, 3]), Color32::WHITE);
    for y in 0..8 {
        for x in 0..8_u8 {
            // pixel centres at 1/16, 3/16 …
            let want = [10 + 20 * x, 5 + 10 * x, 0, 255];
            assert_eq!(picture.pixel(x.into(), y), Some(want), "pixel {x}, {y}");
        }
    }
}

/// Four texels: red, green over blue, white.
fn four() -> ColorImage {
    ColorImage::new([2, 2], vec![Color32::RED, Color32::GREEN, Color32::BLUE, Color32::WHITE])
}

#[test]
fn a_texture_texel_on_pixel_is_copied_by_either_filter() {
    for options in [LINEAR, NEAREST] {
        let mut soft = drawer();
        set(&mut soft, TextureId::User(1), ImageDelta::full(four(), options));
        let picture =
            on_eight(&soft, textured(TextureId::User(1), rect(3.0, 4.0, 5.0, 6.0), Color32::WHITE), Color32::BLACK);
        assert_eq!(picture.pixel(3, 4), Some([255, 0, 0, 255]));
        assert_eq!(picture.pixel(4, 4), Some([0, 255, 0, 255]));
        assert_eq!(picture.pixel(3, 5), Some([0, 0, 255, 255]));
        assert_eq!(picture.pixel(4, 5), Some(WHITE));
        assert_eq!(changed(&picture, BLACK).len(), 4);
    }
}

#[test]
fn an_enlarged_texture_is_blocky_or_smooth_as_it_asks() {
    let mut soft = drawer();
    let picture = |soft: &SoftDraw| {
        on_eight(soft, textured(TextureId::User(1), rect(0.0, 0.0, 8.0, 8.0), Color32::WHITE), Color32::BLACK)
    };
    set(&mut soft, TextureId::User(1), ImageDelta::full(four(), NEAREST));
    let blocky = picture(&soft);
    assert_eq!(blocky.pixel(3, 0), Some([255, 0, 0, 255]));
    assert_eq!(blocky.pixel(4, 0), Some([0, 255, 0, 255]));
    set(&mut soft, TextureId::User(1), ImageDelta::full(four(), LINEAR));
    let smooth = picture(&soft);
    // pixel 3's centre is 3.5/4 = 0.875 texel from the left: 3/8 of the way from the first centre to the second
    assert_eq!(smooth.pixel(3, 0), Some([159, 96, 0, 255]));
    assert_eq!(smooth.pixel(0, 0), Some([255, 0, 0, 255]));
}

#[test]
fn a_shrunken_texture_uses_the_other_filter() {
    let columns = ColorImage::new([4, 1], vec![Color32::BLACK, Color32::WHITE, Color32::BLACK, Color32::WHITE]);
    let minified =
        |minification| TextureOptions { minification, magnification: egui::TextureFilter::Nearest, ..NEAREST };
    let mut soft = drawer();
    let area = rect(0.0, 0.0, 2.0, 1.0);
    set(&mut soft, TextureId::User(1), ImageDelta::full(columns.clone(), minified(egui::TextureFilter::Linear)));
    let smooth = on_eight(&soft, textured(TextureId::User(1), area, Color32::WHITE), Color32::RED);
    assert_eq!(smooth.pixel(0, 0), Some([128, 128, 128, 255]));
    set(&mut soft, TextureId::User(1), ImageDelta::full(columns, minified(egui::TextureFilter::Nearest)));
    let crisp = on_eight(&soft, textured(TextureId::User(1), area, Color32::WHITE), Color32::RED);
    assert_eq!(crisp.pixel(0, 0), Some(WHITE));
}

#[test]
fn textures_are_tinted_by_the_vertices() {
    let mut soft = drawer();
    set(&mut soft, TextureId::User(1), ImageDelta::full(four(), LINEAR));
    let tint = Color32::from_rgba_premultiplied(64, 128, 32, 128);
    let picture = on_eight(&soft, textured(TextureId::User(1), rect(0.0, 0.0, 2.0, 2.0), tint), Color32::TRANSPARENT);
    assert_eq!(picture.pixel(1, 1), Some([64, 128, 32, 128]));
    assert_eq!(picture.pixel(1, 0), Some([0, 128, 0, 128]));
    // each corner its own tint: black on the left, white on the right
    let mut mesh = textured(TextureId::User(1), rect(0.0, 0.0, 2.0, 2.0), Color32::WHITE);
    for vertex in &mut mesh.vertices {
        vertex.color = if vertex.pos.x < 1.0 { Color32::BLACK } else { Color32::WHITE };
    }
    let picture = on_eight(&soft, mesh, Color32::RED);
    assert_eq!(picture.pixel(0, 1), Some([0, 0, 64, 255]));
    assert_eq!(picture.pixel(1, 1), Some([191, 191, 191, 255]));
}

#[test]
fn a_patch_changes_its_part_of_the_texture_and_leaves_the_owner_alone() {
    let mut soft = drawer();
    let owner = Arc::new(four());
    set(&mut soft, TextureId::User(1), ImageDelta::full(Arc::clone(&owner), LINEAR));
    set(&mut soft, TextureId::User(1), ImageDelta::partial([1, 0], ColorImage::filled([1, 1], Color32::BLACK), LINEAR));
    let picture =
        on_eight(&soft, textured(TextureId::User(1), rect(0.0, 0.0, 2.0, 2.0), Color32::WHITE), Color32::TRANSPARENT);
    assert_eq!(picture.pixel(0, 0), Some([255, 0, 0, 255]));
    assert_eq!(picture.pixel(1, 0), Some(BLACK));
    assert_eq!(picture.pixel(1, 1), Some(WHITE));
    assert_eq!(*owner, four());
}

#[test]
fn a_freed_texture_serves_the_pass_that_frees_it_and_no_later_one() {
    let mut soft = drawer();
    let id = TextureId::User(1);
    let mut delta = TexturesDelta::default();
    delta.push(id, ImageDelta::full(four(), LINEAR));
    delta.free(id);
    soft.apply(&mut delta);
    let show = |soft: &SoftDraw| {
        let picture = on_eight(soft, textured(id, rect(0.0, 0.0, 8.0, 8.0), Color32::WHITE), Color32::TRANSPARENT);
        changed(&picture, [0; 4]).len()
    };
    assert_eq!((soft.texture_count(), show(&soft)), (2, 64));
    soft.apply(&mut TexturesDelta::default());
    assert_eq!((soft.texture_count(), show(&soft)), (1, 0));
}

#[test]
fn triangles_that_reach_far_outside_keep_their_edges() {
    // the slanted edge passes the picture along y = x, its ends ten thousand million pixels away
    let far = 1e10;
    let corners = [(-far, -far, Color32::BLACK), (far, far, Color32::BLACK), (far, -far, Color32::BLACK)];
    let picture = on_eight(&drawer(), mesh(&corners, &[0, 1, 2]), Color32::WHITE);
    for y in 0..8 {
        for x in 0..8 {
            assert_eq!(picture.pixel(x, y), Some(if x >= y { BLACK } else { WHITE }), "pixel {x}, {y}");
        }
    }
}

#[test]
fn odd_input_is_skipped_and_the_rest_is_drawn() {
    let soft = drawer();
    let black = Color32::BLACK;
    let corners = [
        (0.0, 0.0, black),
        (4.0, 0.0, black),
        (0.0, 4.0, black),
        (f32::NAN, 1.0, black),
        (f32::INFINITY, 1.0, black),
        (f32::MAX, f32::MIN, black),
    ];
    let good = changed(&on_eight(&soft, mesh(&corners, &[0, 1, 2]), Color32::WHITE), WHITE);
    assert_eq!(good.len(), 6);
    // not finite, out of range, no area, a triple cut short
    let odd = [0, 1, 3, 4, 1, 2, 0, 1, 99, u32::MAX, 0, 1, 1, 1, 1, 0, 1, 2, 0, 1];
    assert_eq!(changed(&on_eight(&soft, mesh(&corners, &odd), Color32::WHITE), WHITE), good);

    let mut odd_uv = mesh(&corners, &[0, 1, 2]);
    odd_uv.vertices[0].uv = pos2(f32::NAN, 0.0);
    assert_eq!(changed(&on_eight(&soft, odd_uv, Color32::WHITE), WHITE), []);

    let mut unknown = mesh(&corners, &[0, 1, 2]);
    unknown.texture_id = TextureId::User(77);
    assert_eq!(changed(&on_eight(&soft, unknown, Color32::WHITE), WHITE), []);

    for scale in [0.0, -1.0, f32::NAN, f32::INFINITY] {
        let primitive = [clipped(Rect::EVERYTHING, mesh(&corners, &[0, 1, 2]))];
        let picture = soft.draw(&primitive, scale, [8, 8], Color32::WHITE).unwrap();
        assert_eq!(changed(&picture, WHITE), [], "scale {scale}");
    }
}

#[test]
fn sizes_of_nought_and_beyond_the_longest_side() {
    let soft = drawer();
    let primitive = [clipped(Rect::EVERYTHING, filled(rect(0.0, 0.0, 8.0, 8.0), Color32::BLACK))];
    for size in [[0, 0], [0, 8], [8, 0]] {
        let picture = soft.draw(&primitive, 1.0, size, Color32::WHITE).unwrap();
        assert!(picture.pixels().is_empty() && picture.straight_rgba().is_empty());
    }
    let size_px = [8, MAX_SIDE_PX + 1];
    assert_eq!(soft.draw(&primitive, 1.0, size_px, Color32::WHITE), Err(TooLarge { size_px }));
}

#[test]
fn anything_at_all_can_be_drawn() {
    // numbers a careless program might send, in every place a vertex has
    let pool = [0.0, -0.0, 0.5, 3.0, 7.99, 8.0, -5.0, 1e-30, 1e5, 2e6, -1e9, 1e30, f32::MAX, f32::MIN, f32::NAN];
    let mut seed = 3_u64;
    let mut pick = |n: usize| {
        seed = seed.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        (seed >> 33) as usize % n
    };
    for mode in [TextureOptions::LINEAR, TextureOptions::NEAREST_REPEAT, TextureOptions::LINEAR_MIRRORED_REPEAT] {
        let mut soft = drawer();
        set(&mut soft, TextureId::User(1), ImageDelta::full(four(), mode));
        for _ in 0..20_000 {
            let mut number = || pool[pick(pool.len())];
            let vertices = [0; 3].map(|_| Vertex {
                pos: pos2(number(), number()),
                uv: pos2(number(), number()),
                color: if number() < 3.0 { Color32::WHITE } else { Color32::GRAY },
            });
            let mesh = Mesh { indices: vec![0, 1, 2], vertices: vertices.to_vec(), texture_id: TextureId::User(1) };
            let picture = on_eight(&soft, mesh, Color32::BLACK);
            // everything sent is opaque
            assert!(picture.pixels().iter().all(|p| p[3] == 255), "{vertices:?}");
        }
    }
}

/// A context with the project's own font, one pass already run so that scale and fonts are in force.
fn context(scale: f32, soft: &mut SoftDraw, input: &egui::RawInput) -> egui::Context {
    let ctx = egui::Context::default();
    let mut fonts = egui::FontDefinitions::empty();
    let inter = egui::FontData::from_static(include_bytes!("../../../assets/fonts/Inter-Regular.otf"));
    fonts.font_data.insert("Inter".to_owned(), Arc::new(inter));
    for family in [egui::FontFamily::Proportional, egui::FontFamily::Monospace] {
        fonts.families.insert(family, vec!["Inter".to_owned()]);
    }
    ctx.set_fonts(fonts);
    ctx.set_theme(egui::Theme::Light);
    ctx.set_pixels_per_point(scale);
    let mut first = ctx.run_ui(input.clone(), |_| {});
    soft.apply(&mut first.textures_delta);
    ctx
}

fn screen(width: f32, height: f32) -> egui::RawInput {
    egui::RawInput { screen_rect: Some(Rect::from_min_size(pos2(0.0, 0.0), vec2(width, height))), ..Default::default() }
}

#[test]
fn text_has_dark_pixels_where_it_stands_and_none_elsewhere() {
    for scale in [1.0, 1.25, 2.0] {
        let (mut soft, input) = (SoftDraw::new(), screen(120.0, 40.0));
        let ctx = context(scale, &mut soft, &input);
        let mut place = Rect::NOTHING;
        let mut output = ctx.run_ui(input, |ui| {
            let font = egui::FontId::proportional(16.0);
            place = ui.painter().text(pos2(20.0, 10.0), egui::Align2::LEFT_TOP, "Hip 21 cm", font, Color32::BLACK);
        });
        soft.apply(&mut output.textures_delta);
        let picture = soft.draw_output(&ctx, &output, Color32::WHITE).unwrap();
        assert_eq!(picture.size(), [(120.0 * scale) as u32, (40.0 * scale) as u32]);
        let ink = changed(&picture, WHITE);
        let area = place.expand(1.0) * scale;
        assert!(ink.iter().all(|&(x, y)| area.contains(pos2(x as f32 + 0.5, y as f32 + 0.5))), "scale {scale}");
        // the upright of H: solid black somewhere; letters cover between a tenth and a half of their box
        assert!(picture.pixels().iter().any(|p| p[0] < 40), "scale {scale}");
        let share = ink.len() as f32 / (place.area() * scale * scale);
        assert!((0.1..0.5).contains(&share), "scale {scale}: ink on {share} of the box");
    }
}

#[test]
fn the_same_pass_gives_the_same_picture_and_a_kept_buffer_too() {
    let (mut soft, input) = (SoftDraw::new(), screen(200.0, 120.0));
    let ctx = context(1.0, &mut soft, &input);
    let mut output = ctx.run_ui(input, |ui| {
        ui.heading("Ranges measured");
        let _ = ui.button("Match what I saw");
        ui.add(egui::Slider::new(&mut 0.4, 0.0..=1.0));
    });
    soft.apply(&mut output.textures_delta);
    let picture = soft.draw_output(&ctx, &output, Color32::WHITE).unwrap();
    assert_eq!(soft.draw_output(&ctx, &output, Color32::WHITE).unwrap(), picture);
    let mut kept = Picture::new(picture.size(), Color32::RED).unwrap();
    kept.clear(Color32::WHITE);
    soft.draw_onto(&mut kept, &ctx.tessellate(output.shapes.clone(), 1.0), 1.0);
    assert_eq!(kept, picture);
}

#[test]
fn a_circle_has_the_area_of_a_circle_and_its_mirror_image() {
    let (mut soft, input) = (SoftDraw::new(), screen(64.0, 64.0));
    let ctx = context(1.0, &mut soft, &input);
    for radius in [3.0, 9.5, 24.0_f32] {
        let mut output = ctx.run_ui(input.clone(), |ui| {
            ui.painter().circle_filled(pos2(32.0, 32.0), radius, Color32::BLACK);
        });
        soft.apply(&mut output.textures_delta);
        let picture = soft.draw_output(&ctx, &output, Color32::WHITE).unwrap();
        let ink: f32 = picture.pixels().iter().map(|p| f32::from(255 - p[0]) / 255.0).sum();
        let area = std::f32::consts::PI * radius * radius;
        assert!((ink / area - 1.0).abs() < 0.03, "radius {radius}: {ink} of {area}");
        for (x, y) in changed(&picture, WHITE) {
            let [here, there] = [(x, y), (63 - x, y)].map(|(x, y)| picture.pixel(x, y).map_or(0, |p| i32::from(p[0])));
            assert!((here - there).abs() <= 2, "radius {radius}, pixel {x}, {y}: {here} and {there}");
        }
    }
}
