//! How alike two pictures are: by the means of blocks of 8 × 8 pixels, never pixel by pixel, since two rasterisers
//! shade edges a little differently.

use image::{Rgba, RgbaImage};

/// Side of a block, pixels.
const BLOCK: u32 = 8;
/// Largest difference of the means of two blocks that are alike, of 255. A shift by one pixel gives about 17.
pub const ALIKE: f64 = 10.0;

/// Where two pictures differ most.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Worst {
    /// Difference of the means of a block, in its worst colour channel, of 255.
    pub by: f64,
    /// Left top pixel of the block.
    pub at: (u32, u32),
}

/// The block in which two pictures of the same size differ most.
///
/// # Panics
/// Where their sizes differ.
#[must_use]
pub fn worst_block(a: &RgbaImage, b: &RgbaImage) -> Worst {
    assert_eq!(a.dimensions(), b.dimensions(), "pictures of one size");
    let (w, h) = a.dimensions();
    let mut worst = Worst { by: 0.0, at: (0, 0) };
    for y in (0..h).step_by(BLOCK as usize) {
        for x in (0..w).step_by(BLOCK as usize) {
            let (ma, mb) = (mean(a, x, y), mean(b, x, y));
            let by = ma.iter().zip(mb).map(|(p, q)| (p - q).abs()).fold(0.0, f64::max);
            if by > worst.by {
                worst = Worst { by, at: (x, y) };
            }
        }
    }
    worst
}

/// Mean red, green and blue of a block, cut at the picture's edge.
fn mean(p: &RgbaImage, x: u32, y: u32) -> [f64; 3] {
    let (right, low) = ((x + BLOCK).min(p.width()), (y + BLOCK).min(p.height()));
    let mut sum = [0.0; 3];
    for yy in y..low {
        for xx in x..right {
            let Rgba([r, g, b, _]) = *p.get_pixel(xx, yy);
            for (s, v) in sum.iter_mut().zip([r, g, b]) {
                *s += f64::from(v);
            }
        }
    }
    sum.map(|s| s / f64::from((right - x) * (low - y)))
}

/// Where the ink of a line of text lies, pixels.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ink {
    /// Left end.
    pub left: f64,
    /// Right end.
    pub right: f64,
    /// Mean height of all ink from the top: moves exactly as the baseline does, however edges are shaded.
    pub height: f64,
}

/// Measures the ink on a plain ground. An end lies as far into its outermost column as that is inked, measured against
/// the darkest column. `None` where there is no ink.
#[must_use]
pub fn ink(p: &RgbaImage) -> Option<Ink> {
    let ground = *p.get_pixel(0, 0);
    let at = |x: u32, y: u32| {
        let Rgba(c) = *p.get_pixel(x, y);
        c.iter().zip(ground.0).map(|(a, b)| f64::from(a.abs_diff(b))).fold(0.0, f64::max)
    };
    let (w, h) = p.dimensions();
    let columns: Vec<f64> = (0..w).map(|x| (0..h).map(|y| at(x, y)).fold(0.0, f64::max)).collect();
    let rows: Vec<f64> = (0..h).map(|y| (0..w).map(|x| at(x, y)).sum()).collect();
    let darkest = columns.iter().copied().fold(0.0, f64::max);
    if darkest < 1.0 {
        return None;
    }
    let inked = |v: &f64| *v > darkest * 0.1;
    let (first, last) = (columns.iter().position(inked)?, columns.iter().rposition(inked)?);
    let moment: f64 = rows.iter().enumerate().map(|(y, v)| (y as f64 + 0.5) * v).sum();
    Some(Ink {
        left: first as f64 + 1.0 - columns[first] / darkest,
        right: last as f64 + columns[last] / darkest,
        height: moment / rows.iter().sum::<f64>(),
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn square(left: u32) -> RgbaImage {
        RgbaImage::from_fn(64, 64, |x, y| {
            let inside = (left..left + 20).contains(&x) && (12..40).contains(&y);
            Rgba(if inside { [60, 80, 100, 255] } else { [250, 250, 250, 255] })
        })
    }

    #[test]
    fn a_shift_by_one_pixel_is_not_alike_and_a_grey_edge_is() {
        assert!(worst_block(&square(10), &square(10)).by < 1e-9);
        assert!(worst_block(&square(10), &square(11)).by > ALIKE, "{:?}", worst_block(&square(10), &square(11)));
        let mut softer = square(10);
        for y in 12..40 {
            // an edge drawn a quarter of a pixel wider
            softer.put_pixel(9, y, Rgba([202, 207, 212, 255]));
        }
        assert!(worst_block(&square(10), &softer).by < ALIKE, "{:?}", worst_block(&square(10), &softer));
    }

    #[test]
    fn ink_is_measured_to_a_fraction_of_a_pixel() {
        let measured = ink(&square(10)).expect("ink");
        assert!((measured.left - 10.0).abs() < 1e-9 && (measured.right - 30.0).abs() < 1e-9, "{measured:?}");
        assert!((measured.height - 26.0).abs() < 1e-9, "{measured:?}");
        let mut half = square(10);
        for y in 12..40 {
            half.put_pixel(9, y, Rgba([155, 165, 175, 255]));
        }
        assert!((ink(&half).expect("ink").left - 9.5).abs() < 0.01);
        assert_eq!(ink(&RgbaImage::from_pixel(8, 8, Rgba([250, 250, 250, 255]))), None);
    }
}
