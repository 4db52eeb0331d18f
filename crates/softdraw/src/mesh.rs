//! A mesh on a picture: each triangle by the cheapest way that gives its colours.

use egui::epaint::{Mesh, Vertex as MeshVertex};
use egui::{Rect, TextureFilter};

use crate::Picture;
use crate::blend::{self, Pixel};
use crate::guard::{self, Vertex};
use crate::scan::{self, Corner, PixelRect, STEPS};
use crate::texture::Texture;

/// Binary places of a colour channel followed over a triangle: across the largest picture (2¹⁴ pixels each way) the
/// rounding of the steps adds up to 1/64 of a byte's unit at most.
const FINE_BITS: u32 = 20;
const FINE: f64 = (1_u32 << FINE_BITS) as f64;

/// Draws all triangles of a mesh within `clip` (points).
pub(crate) fn draw(picture: &mut Picture, mesh: &Mesh, texture: &Texture, clip: Rect, pixels_per_point: f32) {
    if !(pixels_per_point.is_finite() && pixels_per_point > 0.0) {
        return;
    }
    let clip = clip_px(clip, pixels_per_point, picture.size());
    if clip.left >= clip.right || clip.top >= clip.bottom {
        return;
    }
    let scale = f64::from(pixels_per_point);
    let texels = texture.size().map(|side| side as f64);
    // what egui calls its white place: where everything without a texture takes its texel from
    let corner = sample(texture, TextureFilter::Linear, [0.0, 0.0]);
    for triple in mesh.indices.chunks_exact(3) {
        let vertex = |i: usize| vertex(mesh.vertices.get(triple[i] as usize)?, scale, texels);
        let (Some(a), Some(b), Some(c)) = (vertex(0), vertex(1), vertex(2)) else { continue };
        let triangle = [a, b, c];
        if outside(&triangle, clip) {
            continue;
        }
        if triangle.iter().all(guard::inside) {
            draw_triangle(picture, texture, corner, triangle, clip);
        } else {
            let polygon = guard::cut(triangle);
            for i in 2..polygon.len() {
                draw_triangle(picture, texture, corner, [polygon[0], polygon[i - 1], polygon[i]], clip);
            }
        }
    }
}

/// The clip rectangle in whole pixels of the picture, rounded as egui's own painters do.
fn clip_px(clip: Rect, pixels_per_point: f32, [width, height]: [u32; 2]) -> PixelRect {
    // a cast from float saturates, and takes NaN to 0
    let px = |points: f32, side: u32| ((points * pixels_per_point).round() as i64).clamp(0, i64::from(side));
    PixelRect {
        left: px(clip.min.x, width),
        top: px(clip.min.y, height),
        right: px(clip.max.x, width),
        bottom: px(clip.max.y, height),
    }
}

/// A mesh vertex in pixels and texels; `None` if it is not finite.
fn vertex(v: &MeshVertex, scale: f64, texels: [f64; 2]) -> Option<Vertex> {
    let finite = v.pos.x.is_finite() && v.pos.y.is_finite() && v.uv.x.is_finite() && v.uv.y.is_finite();
    finite.then(|| Vertex {
        at: [f64::from(v.pos.x) * scale, f64::from(v.pos.y) * scale],
        uv: [f64::from(v.uv.x) * texels[0], f64::from(v.uv.y) * texels[1]],
        colour: v.color.to_array().map(f64::from),
    })
}

/// Whether a triangle lies wholly on one side of the clip rectangle.
fn outside(triangle: &[Vertex; 3], clip: PixelRect) -> bool {
    let beyond = |axis: usize, low: i64, high: i64| {
        triangle.iter().all(|v| v.at[axis] < low as f64) || triangle.iter().all(|v| v.at[axis] > high as f64)
    };
    beyond(0, clip.left, clip.right) || beyond(1, clip.top, clip.bottom)
}

/// Draws one triangle inside the guard band; `corner` is the texture's sample at its top left corner.
fn draw_triangle(picture: &mut Picture, texture: &Texture, corner: Pixel, triangle: [Vertex; 3], clip: PixelRect) {
    let corners = triangle.map(|v| Corner { x: fixed(v.at[0]), y: fixed(v.at[1]) });
    if scan::doubled_area(corners) == 0 {
        return;
    }
    let Some(area) = scan::bounds(corners, clip) else { return };
    let [a, b, c] = triangle;
    let one_colour = (a.colour == b.colour && a.colour == c.colour).then(|| bytes(a.colour.map(|v| v as f32)));
    let one_texel = a.uv == b.uv && a.uv == c.uv;
    if one_texel {
        let texel = match a.uv {
            [0.0, 0.0] => corner,
            uv => sample(texture, TextureFilter::Linear, uv.map(|v| v as f32)),
        };
        if let Some(colour) = one_colour {
            solid(picture, corners, area, blend::tint(colour, texel));
        } else {
            let colour = Plane::new(corners, triangle.map(|v| v.colour));
            if texel == [255; 4] {
                shaded(picture, corners, area, &colour, |source| source);
            } else {
                shaded(picture, corners, area, &colour, |source| blend::tint(source, texel));
            }
        }
        return;
    }
    let place = Plane::new(corners, triangle.map(|v| v.uv));
    let filter = texture.filter(place.steepest());
    if let Some(colour) = one_colour {
        textured(picture, corners, area, texture, filter, &place, |_, _| colour);
    } else {
        let plane = Plane::new(corners, triangle.map(|v| v.colour));
        textured(picture, corners, area, texture, filter, &place, |x, y| bytes(plane.at(x, y)));
    }
}

/// One colour everywhere.
fn solid(picture: &mut Picture, corners: [Corner; 3], area: PixelRect, source: Pixel) {
    if source == [0; 4] {
        return;
    }
    scan::runs(corners, area, |y, from, to| {
        let span = picture.span(y as usize, from as usize, to as usize);
        if source[3] == 255 {
            span.fill(source);
        } else {
            for pixel in span {
                *pixel = blend::over(*pixel, source);
            }
        }
    });
}

/// A colour that changes from corner to corner; `tint` multiplies it with the one texel.
fn shaded(
    picture: &mut Picture,
    corners: [Corner; 3],
    area: PixelRect,
    colour: &Plane<4>,
    tint: impl Fn(Pixel) -> Pixel,
) {
    // The feathered edge of every line and shape goes this way, so in whole numbers, which may wrap around on the way:
    // at a covered pixel the sum is near 0–255 again.
    let whole = |c: f64| (c * FINE).round() as i64 as i32;
    let (right, down) = (colour.right.map(whole), colour.down.map(whole));
    let (x0, y0) = (area.left, area.top);
    let origin = colour.exactly_at(x0, y0).map(|c| whole(c + 0.5));
    scan::runs(corners, area, |y, from, to| {
        let (dx, dy) = ((from - x0) as i32, (y - y0) as i32);
        let mut now: [i32; 4] = std::array::from_fn(|i| {
            origin[i].wrapping_add(right[i].wrapping_mul(dx)).wrapping_add(down[i].wrapping_mul(dy))
        });
        for pixel in picture.span(y as usize, from as usize, to as usize) {
            let source = now.map(|c| (c >> FINE_BITS).clamp(0, 255) as u8);
            *pixel = blend::over(*pixel, tint(source));
            now = std::array::from_fn(|i| now[i].wrapping_add(right[i]));
        }
    });
}

/// A texture, tinted with the colour at each pixel.
fn textured(
    picture: &mut Picture,
    corners: [Corner; 3],
    area: PixelRect,
    texture: &Texture,
    filter: TextureFilter,
    place: &Plane<2>,
    colour: impl Fn(i64, i64) -> Pixel,
) {
    scan::runs(corners, area, |y, from, to| {
        let start = place.at(from, y);
        let span = picture.span(y as usize, from as usize, to as usize);
        let count = span.len();
        let put = |i: usize, pixel: &mut Pixel, texel: Pixel| {
            // most of a glyph's rectangle is empty
            if texel != [0; 4] {
                *pixel = blend::over(*pixel, blend::tint(colour(from + i as i64, y), texel));
            }
        };
        let run = texel_on_pixel(start, place.beside(start, count - 1), count);
        if let Some(texels) = run.and_then(|[u, v]| texture.run(u, v, count)) {
            for (i, (pixel, texel)) in span.iter_mut().zip(texels).enumerate() {
                put(i, pixel, texel.to_array());
            }
        } else {
            for (i, pixel) in span.iter_mut().enumerate() {
                put(i, pixel, sample(texture, filter, place.beside(start, i)));
            }
        }
    });
}

/// One sample of a texture at a place in texels.
fn sample(texture: &Texture, filter: TextureFilter, [u, v]: [f32; 2]) -> Pixel {
    match filter {
        TextureFilter::Nearest => texture.nearest(u, v),
        TextureFilter::Linear => texture.bilinear(u, v),
    }
}

/// The first texel of a span whose pixels lie on texel centres, one after the other: there both filters give the
/// texel itself. `None` for every other span.
fn texel_on_pixel(first: [f32; 2], last: [f32; 2], count: usize) -> Option<[i64; 2]> {
    // within the fineness of the bilinear filter
    let centre = |t: f32| {
        let whole = (t - 0.5).round();
        ((t - 0.5 - whole).abs() < 1.0 / 512.0).then_some(whole as i64)
    };
    let [u, v] = [centre(first[0])?, centre(first[1])?];
    let steps = i64::try_from(count).ok()? - 1;
    (centre(last[0])?.checked_sub(u)? == steps && centre(last[1])? == v).then_some([u, v])
}

/// Pixels to 1/256 pixel, rounded to the nearest (halves up).
fn fixed(px: f64) -> i64 {
    // a cast truncates towards nought: made positive first, it rounds down, and no library call is needed
    const SHIFT: i64 = 2 * scan::GUARD;
    (px * STEPS as f64 + (SHIFT as f64 + 0.5)) as i64 - SHIFT
}

/// Channels 0–255 to bytes; a cast from float saturates.
fn bytes(colour: [f32; 4]) -> Pixel {
    colour.map(|c| (c + 0.5) as u8)
}

/// N values that change linearly over a triangle.
struct Plane<const N: usize> {
    /// The values at `origin_px`.
    value: [f64; N],
    origin_px: [f64; 2],
    /// Change a pixel to the right, and down.
    right: [f64; N],
    down: [f64; N],
}

impl<const N: usize> Plane<N> {
    /// From the values at three corners that have an area.
    fn new(corners: [Corner; 3], values: [[f64; N]; 3]) -> Self {
        let px = |v: i64| v as f64 / STEPS as f64;
        let [o, p, q] = corners;
        let (px_x, px_y) = (px(p.x - o.x), px(p.y - o.y));
        let (qx_x, qx_y) = (px(q.x - o.x), px(q.y - o.y));
        let per_area = 1.0 / (px_x * qx_y - qx_x * px_y);
        let [first, second, third] = values;
        let slope = |i: usize, from_p: f64, from_q: f64| {
            ((second[i] - first[i]) * from_p + (third[i] - first[i]) * from_q) * per_area
        };
        Self {
            value: first,
            origin_px: [px(o.x), px(o.y)],
            right: std::array::from_fn(|i| slope(i, qx_y, -px_y)),
            down: std::array::from_fn(|i| slope(i, -qx_x, px_x)),
        }
    }

    /// The values at the centre of pixel (x, y).
    fn at(&self, x: i64, y: i64) -> [f32; N] {
        self.exactly_at(x, y).map(|v| v as f32)
    }

    /// As [`Self::at`], in double precision.
    fn exactly_at(&self, x: i64, y: i64) -> [f64; N] {
        let dx = x as f64 + 0.5 - self.origin_px[0];
        let dy = y as f64 + 0.5 - self.origin_px[1];
        std::array::from_fn(|i| self.value[i] + self.right[i] * dx + self.down[i] * dy)
    }

    /// The values `i` pixels to the right of where they are `start`.
    fn beside(&self, start: [f32; N], i: usize) -> [f32; N] {
        let i = i as f32;
        std::array::from_fn(|k| start[k] + self.right[k] as f32 * i)
    }

    /// The length of the change from pixel to pixel, the larger of both ways.
    fn steepest(&self) -> f32 {
        let length = |d: &[f64; N]| d.iter().map(|v| v * v).sum::<f64>().sqrt();
        length(&self.right).max(length(&self.down)) as f32
    }
}
