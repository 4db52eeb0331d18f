//! SVG → PNG, on the bundled fonts alone.

use std::sync::{Arc, LazyLock};

use plumbfold_scene::fonts;
use resvg::{
    tiny_skia::{Pixmap, Transform},
    usvg::{ImageHrefResolver, Options, Tree, fontdb::Database},
};

/// Why a picture could not be made.
#[derive(Debug, thiserror::Error)]
pub enum SheetError {
    /// The text is not an SVG document.
    #[error("the sheet is not valid SVG: {0}")]
    Svg(String),
    /// The width asked for, or the height that follows, is no picture we make.
    #[error("a picture {0} pixels wide cannot be made: allowed is 16 to {WIDEST_PX}; choose another width")]
    Width(u32),
    /// Encoding failed.
    #[error("the picture could not be encoded: {0}")]
    Encode(String),
}

/// The widest (and highest) picture made, pixels.
pub const WIDEST_PX: u32 = 12_000;

static FONTS: LazyLock<Arc<Database>> = LazyLock::new(|| {
    let mut db = Database::new();
    db.load_font_data(fonts::INTER_REGULAR.to_vec());
    db.load_font_data(fonts::INTER_SEMIBOLD.to_vec());
    Arc::new(db)
});

fn parse(svg: &str) -> Result<Tree, SheetError> {
    let options = Options {
        font_family: fonts::FAMILY.to_owned(),
        fontdb: Arc::clone(&FONTS),
        // a sheet holds no images, and nothing it says may read a file
        image_href_resolver: ImageHrefResolver {
            resolve_data: Box::new(|_, _, _| None),
            resolve_string: Box::new(|_, _| None),
        },
        ..Options::default()
    };
    Tree::from_str(svg, &options).map_err(|e| SheetError::Svg(e.to_string()))
}

/// An SVG as a PNG of a width, its height in proportion; opaque RGB, no metadata.
///
/// # Errors
/// Where the text is no SVG, or the picture would be smaller than 16 or larger than [`WIDEST_PX`]
/// pixels on a side.
pub fn png(svg: &str, width_px: u32) -> Result<Vec<u8>, SheetError> {
    let tree = parse(svg)?;
    let scale = width_px as f32 / tree.size().width();
    let height = (tree.size().height() * scale).round();
    if !(16..=WIDEST_PX).contains(&width_px) || !(1.0..=WIDEST_PX as f32).contains(&height) {
        return Err(SheetError::Width(width_px));
    }
    let mut pixels = Pixmap::new(width_px, height as u32).ok_or(SheetError::Width(width_px))?;
    resvg::render(&tree, Transform::from_scale(scale, scale), &mut pixels.as_mut());
    // what is left transparent is white paper
    let rgb: Vec<u8> = pixels
        .pixels()
        .iter()
        .flat_map(|p| {
            let white = 255 - p.alpha();
            [p.red() + white, p.green() + white, p.blue() + white]
        })
        .collect();
    encode(&rgb, width_px, height as u32).map_err(|e| SheetError::Encode(e.to_string()))
}

/// Whether bytes are a PNG such as [`png`] makes of a page of this width on paper of this colour: opaque
/// RGB whose first rows, the page's margin, are bare paper. A photograph or a screenshot is not.
#[must_use]
pub fn is_page(bytes: &[u8], width_px: u32, paper: [u8; 3]) -> bool {
    let Ok(mut reader) = png::Decoder::new(std::io::Cursor::new(bytes)).read_info() else { return false };
    let info = reader.info();
    let like_ours = (info.width, info.color_type, info.bit_depth)
        == (width_px, png::ColorType::Rgb, png::BitDepth::Eight)
        && !info.interlaced
        && info.height > BARE_ROWS;
    like_ours
        && (0..BARE_ROWS).all(
            |_| matches!(reader.next_row(), Ok(Some(row)) if row.data().chunks_exact(3).all(|pixel| pixel == paper)),
        )
}

/// Rows of a page's upper margin that hold nothing.
const BARE_ROWS: u32 = 12;

fn encode(rgb: &[u8], width: u32, height: u32) -> Result<Vec<u8>, png::EncodingError> {
    let mut out = Vec::with_capacity(rgb.len() / 8);
    let mut encoder = png::Encoder::new(&mut out, width, height);
    encoder.set_color(png::ColorType::Rgb);
    encoder.set_depth(png::BitDepth::Eight);
    encoder.set_compression(png::Compression::Fast);
    let mut writer = encoder.write_header()?;
    writer.write_image_data(rgb)?;
    writer.finish()?;
    Ok(out)
}

#[cfg(test)]
mod tests {
    use super::*;
    use plumbfold_scene::{Anchor, Label, Pt, Role, Scene, Size, Theme, Weight};

    fn words(text: &str, weight: Weight, size: f32) -> Scene {
        let mut s = Scene::new(Size::new(400.0, 100.0), text);
        s.text(Label {
            baseline: Pt::new(20.0, 60.0),
            anchor: Anchor::Start,
            size,
            weight,
            role: Role::Ink,
            text: text.to_owned(),
        });
        s
    }

    #[test]
    fn a_page_of_ours_is_known_again_and_another_picture_is_not() {
        let theme = Theme::light();
        let c = theme.rgba(Role::Paper);
        let paper = [c.r, c.g, c.b];
        let page = png(&crate::svg(&words("knee", Weight::Regular, 20.0), &theme), 400).expect("a picture");
        assert!(is_page(&page, 400, paper));
        assert!(!is_page(&page, 401, paper) && !is_page(&page, 400, [0, 0, 0]));
        assert!(
            !is_page(&page[..60], 400, paper)
                && !is_page(b"", 400, paper)
                && !is_page(b"\x89PNG\r\n\x1a\n", 400, paper)
        );
        let high = png(&crate::svg(&words("knee", Weight::Regular, 90.0), &theme), 400).expect("a picture");
        assert!(!is_page(&high, 400, paper), "ink in the margin");
    }

    fn decoded(bytes: &[u8]) -> (u32, u32, Vec<u8>) {
        let mut reader = png::Decoder::new(std::io::Cursor::new(bytes)).read_info().expect("a PNG");
        let mut pixels = vec![0; reader.output_buffer_size().expect("a size")];
        let info = reader.next_frame(&mut pixels).expect("pixels");
        assert_eq!(info.color_type, png::ColorType::Rgb);
        (info.width, info.height, pixels)
    }

    #[test]
    fn text_leaves_pixels_in_both_weights_and_the_bold_more() {
        let paper = Theme::light().rgba(Role::Paper);
        let ink = |text: &str, weight| {
            let bytes = png(&crate::svg(&words(text, weight, 30.0), &Theme::light()), 800).expect("a picture");
            let (w, h, px) = decoded(&bytes);
            assert_eq!((w, h), (800, 200));
            px.chunks(3).map(|c| f64::from(paper.r.abs_diff(c[0])) / 255.0).sum::<f64>()
        };
        let (regular, bold) = (ink("lean 71° → 46°", Weight::Regular), ink("lean 71° → 46°", Weight::SemiBold));
        assert!(regular > 500.0, "{regular}");
        assert!(bold > regular * 1.1, "{bold} {regular}");
        assert!(ink(" ", Weight::Regular) < 1.0);
    }

    #[test]
    fn a_family_that_is_not_bundled_would_vanish_so_the_test_above_can_fail() {
        let svg = crate::svg(&words("lean", Weight::Regular, 30.0), &Theme::light()).replace("Inter", "Nowhere");
        let (_, _, px) = decoded(&png(&svg, 400).expect("a picture"));
        assert!(px.chunks(3).all(|c| c == &px[..3]));
    }

    #[test]
    fn measured_widths_are_those_of_the_drawn_text() {
        for (text, weight) in [
            ("knee arm 13 cm", Weight::Regular),
            ("Balanced on mid-foot, just above where it runs out", Weight::SemiBold),
            ("AVATAR · 71° (−5°)", Weight::Regular),
        ] {
            let svg = crate::svg(&words(text, weight, 14.0), &Theme::light());
            let tree = parse(&svg).expect("an SVG");
            let drawn = width_of_text(tree.root()).expect("text");
            let ours = fonts::text_width(text, 14.0, weight);
            // ink and advance differ by the side bearings of the first and last sign
            assert!((drawn - ours).abs() < 2.0, "{text}: {drawn} {ours}");
        }
    }

    fn width_of_text(group: &resvg::usvg::Group) -> Option<f32> {
        group.children().iter().find_map(|n| match n {
            resvg::usvg::Node::Text(t) => Some(t.bounding_box().width()),
            resvg::usvg::Node::Group(g) => width_of_text(g),
            _ => None,
        })
    }

    #[test]
    fn a_picture_says_nothing_but_its_size_and_pixels() {
        let bytes = png(&crate::svg(&words("x", Weight::Regular, 30.0), &Theme::light()), 400).expect("a picture");
        let mut chunks = Vec::new();
        let mut at = 8;
        while at + 8 <= bytes.len() {
            let length = u32::from_be_bytes(bytes[at..at + 4].try_into().expect("four bytes")) as usize;
            chunks.push(String::from_utf8_lossy(&bytes[at + 4..at + 8]).into_owned());
            at += 12 + length;
        }
        chunks.dedup();
        assert_eq!(chunks, ["IHDR", "IDAT", "IEND"]);
    }

    #[test]
    fn nonsense_is_refused_in_a_sentence() {
        assert!(matches!(png("no picture", 800), Err(SheetError::Svg(_))));
        let svg = crate::svg(&words("x", Weight::Regular, 30.0), &Theme::light());
        let said = png(&svg, 4).expect_err("too small").to_string();
        assert!(said.contains("4 pixels") && said.contains("16 to 12000"), "{said}");
        assert!(matches!(png(&svg, u32::MAX), Err(SheetError::Width(_))));
    }
}
