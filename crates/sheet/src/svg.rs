//! Scene → SVG.

use std::fmt::Write as _;

use plumbfold_scene::{Anchor, Item, Pt, Role, Scene, Theme, Weight, fonts};

/// A scene as a whole SVG document on the theme's paper.
#[must_use]
pub fn svg(s: &Scene, t: &Theme) -> String {
    let mut out = String::with_capacity(64 * s.items.len() + 512);
    let (w, h) = (short(s.size.w), short(s.size.h));
    // writing into a String cannot fail
    let _ = write!(
        out,
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{w}\" height=\"{h}\" viewBox=\"0 0 {w} {h}\" role=\"img\">\n<title>{}</title>\n<rect width=\"{w}\" height=\"{h}\" {}/>\n<g font-family=\"{}\" stroke-linejoin=\"round\">\n",
        escaped(&s.alt),
        paint("fill", t, Role::Paper),
        fonts::FAMILY,
    );
    for item in &s.items {
        write_item(&mut out, item, t);
    }
    out.push_str("</g>\n</svg>\n");
    out
}

fn write_item(out: &mut String, item: &Item, t: &Theme) {
    match item {
        Item::Fill(area, role) => {
            let _ = writeln!(out, "<path d=\"{}Z\" {}/>", path(area.points()), paint("fill", t, *role));
        }
        Item::Line { pts, width, role } => {
            let _ = writeln!(
                out,
                "<path d=\"{}\" fill=\"none\" stroke-width=\"{}\" {}/>",
                path(pts),
                short(*width),
                paint("stroke", t, *role)
            );
        }
        Item::Cells(cells) => {
            out.push_str("<g shape-rendering=\"crispEdges\">\n");
            for (r, role) in cells.runs() {
                let _ = writeln!(
                    out,
                    "<rect x=\"{}\" y=\"{}\" width=\"{}\" height=\"{}\" {}/>",
                    short(r.min.x),
                    short(r.min.y),
                    short(r.w()),
                    short(r.h()),
                    paint("fill", t, role)
                );
            }
            out.push_str("</g>\n");
        }
        Item::Text(l) => {
            let anchor = match l.anchor {
                Anchor::Start => "",
                Anchor::Middle => " text-anchor=\"middle\"",
                Anchor::End => " text-anchor=\"end\"",
            };
            let weight = match l.weight {
                Weight::Regular => "",
                Weight::SemiBold => " font-weight=\"600\"",
            };
            let _ = writeln!(
                out,
                "<text x=\"{}\" y=\"{}\" font-size=\"{}\"{anchor}{weight} {}>{}</text>",
                short(l.baseline.x),
                short(l.baseline.y),
                short(l.size),
                paint("fill", t, l.role),
                escaped(&l.text)
            );
        }
    }
}

fn paint(what: &str, t: &Theme, role: Role) -> String {
    let c = t.rgba(role);
    let mut s = format!("{what}=\"#{:02x}{:02x}{:02x}\"", c.r, c.g, c.b);
    if c.a < 255 {
        let _ = write!(s, " {what}-opacity=\"{}\"", short(f32::from(c.a) / 255.0));
    }
    s
}

fn path(pts: &[Pt]) -> String {
    let mut d = String::with_capacity(pts.len() * 12);
    for (i, p) in pts.iter().enumerate() {
        let _ = write!(d, "{}{} {}", if i == 0 { "M" } else { "L" }, short(p.x), short(p.y));
    }
    d
}

/// A coordinate to 1/100 page unit without trailing zeros; what is not finite is written as 0.
fn short(v: f32) -> String {
    if !v.is_finite() {
        return "0".to_owned();
    }
    let s = format!("{v:.2}");
    let s = s.trim_end_matches('0').trim_end_matches('.');
    if s == "-0" { "0".to_owned() } else { s.to_owned() }
}

/// Text for XML: markup escaped, control characters dropped.
fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\'' => out.push_str("&apos;"),
            c if c.is_control() => out.push(' '),
            c => out.push(c),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;
    use plumbfold_scene::{Cells, Label, RectPt, Size, shapes};

    #[test]
    fn numbers_are_short() {
        assert_eq!(short(1.0), "1");
        assert_eq!(short(1.5), "1.5");
        assert_eq!(short(-0.001), "0");
        assert_eq!(short(100.0), "100");
        assert_eq!(short(f32::NAN), "0");
    }

    #[test]
    fn markup_in_text_stays_text() {
        assert_eq!(escaped("a<b & \"c\"\u{7}'>"), "a&lt;b &amp; &quot;c&quot; &apos;&gt;");
    }

    #[test]
    fn every_kind_of_item_is_written_in_order() {
        let mut s = Scene::new(Size::new(100.0, 50.0), "x < y");
        s.fill(shapes::rect(RectPt::at(1.0, 2.0, 3.0, 4.0)), Role::Steady);
        s.line([Pt::new(0.0, 0.0), Pt::new(10.25, 5.0)], 1.5, Role::Ink);
        s.push(Item::Cells(Cells {
            area: RectPt::at(0.0, 0.0, 20.0, 10.0),
            columns: 2,
            roles: vec![Some(Role::Steady), None],
        }));
        s.text(Label {
            baseline: Pt::new(5.0, 20.0),
            anchor: Anchor::End,
            size: 12.0,
            weight: Weight::SemiBold,
            role: Role::Ink,
            text: "A&B".to_owned(),
        });
        let svg = svg(&s, &Theme::light());
        let at = |needle: &str| svg.find(needle).unwrap_or_else(|| panic!("{needle} missing in {svg}"));
        let order = [
            at("<title>x &lt; y</title>"),
            at("<path d=\"M1 2L4 2L4 6L1 6Z\" fill=\"#3c5874\"/>"),
            at("M0 0L10.25 5\" fill=\"none\" stroke-width=\"1.5\""),
            at("<rect x=\"0\" y=\"0\" width=\"10\" height=\"10\""),
            at("<text x=\"5\" y=\"20\" font-size=\"12\" text-anchor=\"end\" font-weight=\"600\""),
        ];
        assert!(order.windows(2).all(|w| w[0] < w[1]), "{order:?}");
    }
}
