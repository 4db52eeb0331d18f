//! Arithmetic on one pixel: four bytes red, green, blue, alpha, premultiplied.

/// One pixel.
pub(crate) type Pixel = [u8; 4];

/// The product of two fractions of 255, rounded to the nearest (exact for all 65,536 pairs).
pub(crate) fn mul(a: u8, b: u8) -> u8 {
    let t = u32::from(a) * u32::from(b) + 128;
    ((t + (t >> 8)) >> 8) as u8
}

/// A colour multiplied with a texel, channel by channel.
pub(crate) fn tint(colour: Pixel, texel: Pixel) -> Pixel {
    [mul(colour[0], texel[0]), mul(colour[1], texel[1]), mul(colour[2], texel[2]), mul(colour[3], texel[3])]
}

/// `source` laid over `below`. Sums saturate, because a colour may be brighter than its alpha (added light).
pub(crate) fn over(below: Pixel, source: Pixel) -> Pixel {
    // two channels at once, sixteen bits each: as `mul` and a sum, with room for the carry
    const EVEN: u32 = 0x00ff_00ff;
    let (below, source) = (u32::from_le_bytes(below), u32::from_le_bytes(source));
    let rest = 255 - (source >> 24);
    let pair = |below: u32, source: u32| {
        let t = below * rest + 0x0080_0080;
        let sum = (((t + ((t >> 8) & EVEN)) >> 8) & EVEN) + source;
        let carry = sum & 0x0100_0100;
        (sum | (carry - (carry >> 8))) & EVEN
    };
    let even = pair(below & EVEN, source & EVEN);
    let odd = pair((below >> 8) & EVEN, (source >> 8) & EVEN);
    (even | (odd << 8)).to_le_bytes()
}

/// The same pixel with straight alpha.
pub(crate) fn straight(pixel: Pixel) -> Pixel {
    let alpha = u32::from(pixel[3]);
    match alpha {
        0 => [0; 4],
        255 => pixel,
        _ => {
            let one = |i: usize| ((u32::from(pixel[i]) * 255 + alpha / 2) / alpha).min(255) as u8;
            [one(0), one(1), one(2), pixel[3]]
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn products_are_rounded_to_the_nearest_for_every_pair() {
        for a in 0..=255_u8 {
            for b in 0..=255_u8 {
                let exact = (f64::from(a) * f64::from(b) / 255.0).round();
                assert_eq!(f64::from(mul(a, b)), exact, "{a} · {b}");
            }
        }
    }

    #[test]
    fn over_is_product_and_sum_in_each_channel() {
        for alpha in 0..=255_u8 {
            for below in 0..=255_u8 {
                let source = [alpha, 255 - below, below.wrapping_mul(7), alpha];
                let under = [below, 255 - below, alpha.wrapping_mul(5), below ^ alpha];
                let want: Pixel = std::array::from_fn(|i| source[i].saturating_add(mul(under[i], 255 - alpha)));
                assert_eq!(over(under, source), want, "{source:?} over {under:?}");
            }
        }
    }

    #[test]
    fn over_at_the_ends() {
        assert_eq!(over([10, 20, 30, 255], [1, 2, 3, 255]), [1, 2, 3, 255]);
        assert_eq!(over([10, 20, 30, 255], [0; 4]), [10, 20, 30, 255]);
        // added light: alpha 0 keeps what is below, and the sum saturates
        assert_eq!(over([200, 20, 30, 255], [100, 5, 0, 0]), [255, 25, 30, 255]);
    }
}
