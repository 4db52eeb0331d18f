//! Textures: kept as egui sends them, and sampled.

use std::sync::Arc;

use egui::epaint::ImageDelta;
use egui::{ColorImage, ImageData, TextureFilter, TextureOptions, TextureWrapMode};

use crate::blend::Pixel;

/// One texture. Never empty: width, height ≥ 1 and as many pixels as their product.
pub(crate) struct Texture {
    /// Shared with egui until the first patch, which copies it.
    image: Arc<ColorImage>,
    options: TextureOptions,
}

/// Texel coordinates beyond this are outside every texture by far; clamping keeps the integer arithmetic safe.
const FAR_TEXEL: f32 = 1e8;

impl Texture {
    /// A texture from a whole image; `None` if it is empty or its pixel count is not width × height.
    pub(crate) fn whole(delta: ImageDelta) -> Option<Self> {
        let ImageData::Color(image) = delta.image;
        let count = image.size[0].checked_mul(image.size[1])?;
        // i32 holds every coordinate below
        let fits = image.size.iter().all(|&side| side > 0 && i32::try_from(side).is_ok());
        (fits && image.pixels.len() == count).then_some(Self { image, options: delta.options })
    }

    /// Replaces a rectangle; what reaches outside the texture is cut off.
    pub(crate) fn patch(&mut self, delta: ImageDelta) {
        let ImageData::Color(patch) = delta.image;
        let [left, top] = delta.pos.unwrap_or([0, 0]);
        let [width, height] = patch.size;
        self.options = delta.options;
        if width.checked_mul(height) != Some(patch.pixels.len()) {
            return;
        }
        let [full_width, full_height] = self.image.size;
        let columns = width.min(full_width.saturating_sub(left));
        let rows = height.min(full_height.saturating_sub(top));
        if columns == 0 {
            return;
        }
        let image = Arc::make_mut(&mut self.image);
        for row in 0..rows {
            let to = (top + row) * full_width + left;
            let from = row * width;
            image.pixels[to..to + columns].copy_from_slice(&patch.pixels[from..from + columns]);
        }
    }

    /// Width and height, texels.
    pub(crate) fn size(&self) -> [usize; 2] {
        self.image.size
    }

    /// The filter for a triangle that steps `texels_per_px` texels from pixel to pixel (the larger of both ways).
    pub(crate) fn filter(&self, texels_per_px: f32) -> TextureFilter {
        if texels_per_px > 1.0 { self.options.minification } else { self.options.magnification }
    }

    /// A run of `count` texels from texel (x, y) rightwards, if it lies inside the texture.
    pub(crate) fn run(&self, x: i64, y: i64, count: usize) -> Option<&[egui::Color32]> {
        let [width, height] = self.image.size;
        let (x, y) = (usize::try_from(x).ok()?, usize::try_from(y).ok()?);
        let end = x.checked_add(count)?;
        (y < height && end <= width).then(|| &self.image.pixels[y * width + x..y * width + end])
    }

    /// The texel nearest to (`u`, `v`), in texels from the texture's top left corner.
    pub(crate) fn nearest(&self, u: f32, v: f32) -> Pixel {
        let whole = |t: f32| t.clamp(-FAR_TEXEL, FAR_TEXEL).floor() as i32;
        self.at(whole(u), whole(v))
    }

    /// The four texels around (`u`, `v`) mixed by distance, in texels from the texture's top left corner.
    pub(crate) fn bilinear(&self, u: f32, v: f32) -> Pixel {
        // 1/256 texel, texel centres on whole numbers; the same fineness as graphics cards
        let fixed = |t: f32| ((t.clamp(-FAR_TEXEL, FAR_TEXEL) - 0.5) * 256.0).round() as i64;
        let (u, v) = (fixed(u), fixed(v));
        let (x, y) = ((u >> 8) as i32, (v >> 8) as i32);
        let (fx, fy) = ((u & 255) as u32, (v & 255) as u32);
        let first = self.at(x, y);
        if fx == 0 && fy == 0 {
            return first;
        }
        let (right, below, last) = (self.at(x + 1, y), self.at(x, y + 1), self.at(x + 1, y + 1));
        let one = |i: usize| {
            let upper = u32::from(first[i]) * (256 - fx) + u32::from(right[i]) * fx;
            let lower = u32::from(below[i]) * (256 - fx) + u32::from(last[i]) * fx;
            ((upper * (256 - fy) + lower * fy + (1 << 15)) >> 16) as u8
        };
        [one(0), one(1), one(2), one(3)]
    }

    /// The texel at whole coordinates, wrapped as the texture asks for.
    fn at(&self, x: i32, y: i32) -> Pixel {
        let [width, height] = self.image.size;
        let x = wrap(x, width as i32, self.options.wrap_mode);
        let y = wrap(y, height as i32, self.options.wrap_mode);
        self.image.pixels[y * width + x].to_array()
    }
}

/// A coordinate brought into `0..side`.
fn wrap(i: i32, side: i32, mode: TextureWrapMode) -> usize {
    let inside = match mode {
        TextureWrapMode::ClampToEdge => i.clamp(0, side - 1),
        TextureWrapMode::Repeat => i.rem_euclid(side),
        TextureWrapMode::MirroredRepeat => {
            let turn = i.div_euclid(side);
            let i = i.rem_euclid(side);
            if turn % 2 == 0 { i } else { side - 1 - i }
        }
    };
    inside as usize
}

#[cfg(test)]
mod tests {
    use super::*;
    use egui::Color32;

    /// Two texels: black, white.
    fn two(options: TextureOptions) -> Texture {
        let image = ColorImage::new([2, 1], vec![Color32::BLACK, Color32::WHITE]);
        Texture::whole(ImageDelta::full(image, options)).unwrap()
    }

    #[test]
    fn bilinear_hits_centres_and_the_middle() {
        let texture = two(TextureOptions::LINEAR);
        assert_eq!(texture.bilinear(0.5, 0.5), [0, 0, 0, 255]);
        assert_eq!(texture.bilinear(1.5, 0.5), [255, 255, 255, 255]);
        assert_eq!(texture.bilinear(1.0, 0.5), [128, 128, 128, 255]);
        assert_eq!(texture.bilinear(0.75, 0.5), [64, 64, 64, 255]);
        // beyond the last centre the edge goes on
        assert_eq!(texture.bilinear(9.0, -3.0), [255, 255, 255, 255]);
    }

    #[test]
    fn wrapping() {
        let columns = |mode| (-3..5).map(|i| wrap(i, 2, mode)).collect::<Vec<_>>();
        assert_eq!(columns(TextureWrapMode::ClampToEdge), [0, 0, 0, 0, 1, 1, 1, 1]);
        assert_eq!(columns(TextureWrapMode::Repeat), [1, 0, 1, 0, 1, 0, 1, 0]);
        assert_eq!(columns(TextureWrapMode::MirroredRepeat), [1, 1, 0, 0, 1, 1, 0, 0]);
    }

    #[test]
    fn far_and_odd_coordinates_give_some_texel() {
        for options in [TextureOptions::LINEAR_REPEAT, TextureOptions::LINEAR_MIRRORED_REPEAT, TextureOptions::LINEAR] {
            for u in [f32::MAX, f32::MIN, f32::INFINITY, f32::NEG_INFINITY, f32::NAN] {
                assert_eq!(two(options).nearest(u, u)[3], 255);
                assert_eq!(two(options).bilinear(u, u)[3], 255);
            }
        }
    }

    #[test]
    fn images_of_a_wrong_pixel_count_are_refused() {
        let mut image = ColorImage::new([2, 1], vec![Color32::BLACK, Color32::WHITE]);
        image.pixels.pop();
        assert!(Texture::whole(ImageDelta::full(image, TextureOptions::LINEAR)).is_none());
        let empty = ColorImage::new([0, 0], Vec::new());
        assert!(Texture::whole(ImageDelta::full(empty, TextureOptions::LINEAR)).is_none());
    }

    #[test]
    fn patches_are_cut_to_the_texture() {
        let image = ColorImage::filled([3, 3], Color32::BLACK);
        let mut texture = Texture::whole(ImageDelta::full(image, TextureOptions::NEAREST)).unwrap();
        let patch = ColorImage::filled([2, 2], Color32::WHITE);
        texture.patch(ImageDelta::partial([2, 2], patch.clone(), TextureOptions::NEAREST));
        texture.patch(ImageDelta::partial([usize::MAX, 0], patch, TextureOptions::NEAREST));
        let white = texture.image.pixels.iter().map(|&p| p == Color32::WHITE).collect::<Vec<_>>();
        assert_eq!(white, [false, false, false, false, false, false, false, false, true]);
    }
}
