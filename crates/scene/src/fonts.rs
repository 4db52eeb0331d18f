//! The one bundled family, Inter, and its measures, by the shaper the window's text uses too.

use std::{cell::RefCell, collections::HashMap, sync::LazyLock};

use harfrust::{Direction, FontRef, ShapeOptions, ShapePlan, ShaperData, UnicodeBuffer, script};
use skrifa::MetadataProvider;

use crate::scene::Weight;

/// Inter Regular, the whole font file.
pub const INTER_REGULAR: &[u8] = include_bytes!("../../../assets/fonts/Inter-Regular.otf");
/// Inter SemiBold, the whole font file.
pub const INTER_SEMIBOLD: &[u8] = include_bytes!("../../../assets/fonts/Inter-SemiBold.otf");
/// The family name of both, as a sheet must write it.
pub const FAMILY: &str = "Inter";
/// Font size over which the design's ascender reaches, em.
pub const ASCENT: f32 = 2728.0 / 2816.0;
/// Depth of the design's descender below the baseline, em.
pub const DESCENT: f32 = 680.0 / 2816.0;
/// The tallest ink of letters, digits and signs of running text above the baseline, em (measured
/// by a test; brackets and drawn signs such as ◆ reach 0.1 em farther).
pub const INK_ABOVE: f32 = 0.78;
/// The lowest ink of the same below the baseline, em.
pub const INK_BELOW: f32 = 0.22;
/// Height of a capital, em.
pub const CAP: f32 = 2048.0 / 2816.0;
/// Distance between baselines of running text, em.
pub const LINE: f32 = 1.35;

struct Face {
    font: FontRef<'static>,
    data: ShaperData,
    plan: ShapePlan,
    per_em: f32,
}

impl Face {
    fn new(bytes: &'static [u8]) -> Option<Self> {
        let font = FontRef::new(bytes).ok()?;
        let data = ShaperData::new(&font);
        let (plan, per_em) = {
            let shaper = data.shaper(&font).build();
            let plan = ShapePlan::new(&shaper, Direction::LeftToRight, Some(script::LATIN), None, &[]);
            (plan, shaper.units_per_em() as f32)
        };
        Some(Self { font, data, plan, per_em })
    }
}

// Bundled bytes: `None` cannot happen in a program that passed its tests, and nothing here panics.
static REGULAR: LazyLock<Option<Face>> = LazyLock::new(|| Face::new(INTER_REGULAR));
static SEMIBOLD: LazyLock<Option<Face>> = LazyLock::new(|| Face::new(INTER_SEMIBOLD));

fn face(weight: Weight) -> Option<&'static Face> {
    match weight {
        Weight::Regular => REGULAR.as_ref(),
        Weight::SemiBold => SEMIBOLD.as_ref(),
    }
}

/// Width of one line of text in page units, kerning and ligatures included.
///
/// Remembered per thread, since a layout asks for the same few words many times.
#[must_use]
pub fn text_width(text: &str, size: f32, weight: Weight) -> f32 {
    let em = KNOWN.with_borrow_mut(|known| {
        let of_weight = &mut known[weight as usize];
        if let Some(&em) = of_weight.get(text) {
            return em;
        }
        if of_weight.len() >= REMEMBERED {
            of_weight.clear();
        }
        let em = shaped_width(text, weight);
        of_weight.insert(text.to_owned(), em);
        em
    });
    em * size
}

/// Words remembered before starting over.
const REMEMBERED: usize = 4096;

thread_local! {
    static KNOWN: RefCell<[HashMap<String, f32>; 2]> = RefCell::default();
}

/// Width in em by the shaper.
fn shaped_width(text: &str, weight: Weight) -> f32 {
    let Some(face) = face(weight) else { return text.chars().count() as f32 };
    let mut buffer = UnicodeBuffer::new();
    buffer.push_str(text);
    buffer.set_direction(Direction::LeftToRight);
    buffer.set_script(script::LATIN);
    let shaped = face.data.shaper(&face.font).build().shape(buffer, ShapeOptions::new().plan(Some(&face.plan)));
    let units: i64 = shaped.glyph_positions().iter().map(|p| i64::from(p.x_advance)).sum();
    units as f32 / face.per_em
}

/// Whether the bundled family has a glyph for every character.
#[must_use]
pub fn has_glyphs(text: &str) -> bool {
    [Weight::Regular, Weight::SemiBold].into_iter().all(|w| {
        face(w).is_some_and(|f| {
            let map = f.font.charmap();
            text.chars().all(|c| map.map(c).is_some())
        })
    })
}

/// Breaks running text at spaces so that no line is wider than `width`, unless one word is.
#[must_use]
pub fn wrap(text: &str, size: f32, weight: Weight, width: f32) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    let mut line = String::new();
    for word in text.split(' ') {
        if line.is_empty() {
            line.push_str(word);
            continue;
        }
        let longer = format!("{line} {word}");
        if text_width(&longer, size, weight) <= width {
            line = longer;
        } else {
            lines.push(std::mem::replace(&mut line, word.to_owned()));
        }
    }
    if !line.is_empty() {
        lines.push(line);
    }
    lines
}

#[cfg(test)]
mod tests {
    use super::*;
    use skrifa::instance::{LocationRef, Size};

    /// Everything we write: printable ASCII and the signs our sentences use.
    fn written() -> String {
        (' '..='~').chain("°·→←↑↓Δ≤≥−×½✓…–•▲▼◆●○■□▶±θ’".chars()).collect()
    }

    #[test]
    fn every_sign_we_write_is_in_both_weights() {
        assert!(has_glyphs(&written()));
        assert!(!has_glyphs("∠"), "a sign that Inter lacks must be found missing");
    }

    #[test]
    fn no_ink_of_running_text_leaves_the_measured_box() {
        for weight in [Weight::Regular, Weight::SemiBold] {
            let font = &face(weight).expect("bundled").font;
            let metrics = font.glyph_metrics(Size::new(1.0), LocationRef::default());
            let running = ('a'..='z').chain('A'..='Z').chain('0'..='9').chain(".,:;°·→≤≥−×½±–…’ θΔ%+=&#*".chars());
            for c in running {
                let b = metrics.bounds(font.charmap().map(c).expect("present")).unwrap_or_default();
                assert!(b.y_max <= INK_ABOVE && b.y_min >= -INK_BELOW, "{c} {} {}", b.y_min, b.y_max);
            }
        }
    }

    #[test]
    fn widths_scale_and_add() {
        let w = text_width("knee arm 13 cm", 10.0, Weight::Regular);
        assert!((text_width("knee arm 13 cm", 20.0, Weight::Regular) - 2.0 * w).abs() < 1e-3);
        assert!(text_width("knee arm 13 cm", 10.0, Weight::SemiBold) > w);
        assert!(text_width("", 10.0, Weight::Regular).abs() < 1e-6);
        // advance of a lone H by the font's own table
        let font = &face(Weight::Regular).expect("bundled").font;
        let own = font
            .glyph_metrics(Size::new(10.0), LocationRef::default())
            .advance_width(font.charmap().map('H').expect("H"));
        assert!((text_width("H", 10.0, Weight::Regular) - own.expect("advance")).abs() < 1e-3);
    }

    #[test]
    fn wrapped_lines_fit_and_lose_nothing() {
        let text = "Balanced on mid-foot; the hip range is used up first, at a thigh angle near 75°.";
        let lines = wrap(text, 14.0, Weight::Regular, 180.0);
        assert!(lines.len() > 2);
        assert_eq!(lines.join(" "), text);
        for l in &lines {
            assert!(text_width(l, 14.0, Weight::Regular) <= 180.0, "{l}");
        }
    }
}
