//! The picture that is drawn on.

use egui::Color32;

use crate::blend;

/// The longest side of a picture, in pixels.
pub const MAX_SIDE_PX: u32 = 16_384;

/// A picture of more than [`MAX_SIDE_PX`] pixels on a side was asked for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct TooLarge {
    /// Width and height asked for, pixels.
    pub size_px: [u32; 2],
}

impl std::fmt::Display for TooLarge {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        let [width, height] = self.size_px;
        write!(
            f,
            "The picture size {width}×{height} px is out of range (each side 0–{MAX_SIDE_PX} px); \
             ask for a smaller window or a smaller scale."
        )
    }
}

impl std::error::Error for TooLarge {}

/// Pixels row by row from the top, each red, green, blue, alpha: sRGB-encoded, premultiplied.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Picture {
    size: [u32; 2],
    pixels: Vec<[u8; 4]>,
}

impl Picture {
    /// A picture of `size_px` (width, height) filled with `background`.
    ///
    /// # Errors
    /// [`TooLarge`] when a side is longer than [`MAX_SIDE_PX`].
    pub fn new(size_px: [u32; 2], background: Color32) -> Result<Self, TooLarge> {
        if size_px.iter().any(|&side| side > MAX_SIDE_PX) {
            return Err(TooLarge { size_px });
        }
        let count = size_px[0] as usize * size_px[1] as usize;
        Ok(Self { size: size_px, pixels: vec![background.to_array(); count] })
    }

    /// Fills the whole picture with one colour, replacing what was there.
    pub fn clear(&mut self, background: Color32) {
        self.pixels.fill(background.to_array());
    }

    /// Width and height, pixels.
    pub fn size(&self) -> [u32; 2] {
        self.size
    }

    /// One pixel, premultiplied; `None` outside the picture.
    pub fn pixel(&self, x: u32, y: u32) -> Option<[u8; 4]> {
        let [width, height] = self.size;
        (x < width && y < height).then(|| self.pixels[y as usize * width as usize + x as usize])
    }

    /// All pixels, premultiplied, row by row from the top.
    pub fn pixels(&self) -> &[[u8; 4]] {
        &self.pixels
    }

    /// All bytes, premultiplied, without a copy.
    pub fn premultiplied_rgba(&self) -> &[u8] {
        self.pixels.as_flattened()
    }

    /// All bytes with straight (not premultiplied) alpha, as PNG and image libraries want them. Opaque pixels are
    /// unchanged; a fully transparent pixel becomes four zeros.
    pub fn straight_rgba(&self) -> Vec<u8> {
        self.pixels.iter().flat_map(|&pixel| blend::straight(pixel)).collect()
    }

    /// The pixels `from..to` of row `y`; the caller keeps the three inside the picture.
    pub(crate) fn span(&mut self, y: usize, from: usize, to: usize) -> &mut [[u8; 4]] {
        let row = y * self.size[0] as usize;
        &mut self.pixels[row + from..row + to]
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn straight_bytes_of_a_half_transparent_pixel() {
        let mut picture = Picture::new([2, 1], Color32::TRANSPARENT).unwrap();
        picture.span(0, 1, 2)[0] = [64, 0, 128, 128];
        assert_eq!(picture.straight_rgba(), [0, 0, 0, 0, 128, 0, 255, 128]);
        assert_eq!(picture.premultiplied_rgba(), [0, 0, 0, 0, 64, 0, 128, 128]);
    }

    #[test]
    fn a_picture_beyond_the_longest_side_is_refused_in_a_sentence() {
        let error = Picture::new([MAX_SIDE_PX + 1, 1], Color32::WHITE).unwrap_err();
        assert!(error.to_string().contains("16385×1 px"), "{error}");
        assert!(Picture::new([MAX_SIDE_PX, 1], Color32::WHITE).is_ok());
    }

    #[test]
    fn pixels_outside_are_none() {
        let picture = Picture::new([3, 2], Color32::BLACK).unwrap();
        assert_eq!(picture.pixel(2, 1), Some([0, 0, 0, 255]));
        assert_eq!(picture.pixel(3, 0), None);
        assert_eq!(picture.pixel(0, 2), None);
    }
}
