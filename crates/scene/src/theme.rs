//! Colours by meaning. The only place with raw colours.

/// What a colour means.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Role {
    /// The page.
    Paper,
    /// Side panels and quiet plates.
    Panel,
    /// Thin lines around things.
    Border,
    /// Background of a field.
    FieldBg,
    /// Text and strong lines.
    Ink,
    /// Quieter text.
    InkSoft,
    /// Lines of a plot's grid and the like.
    Grid,
    /// Text on a strongly coloured ground.
    OnStrong,
    /// The body drawn.
    Body,
    /// The near arm and what lies before the body.
    BodyNear,
    /// Edge of the body.
    BodyEdge,
    /// A segment whose length is estimated.
    Estimated,
    /// The outline compared with.
    Outline,
    /// The shoe.
    Shoe,
    /// A wedge or plate under the heel, and loads.
    Gear,
    /// The hip: arm, label.
    Hip,
    /// The knee: arm, label.
    Knee,
    /// Trunk, lean and low back.
    Back,
    /// The ankle.
    Ankle,
    /// The plumb line and the centre of mass.
    Plumb,
    /// On mid-foot.
    Steady,
    /// Near the heels or toes: hatching.
    Drifting,
    /// Ground under that hatching.
    DriftingBg,
    /// Beyond balance unaided: open ground.
    NeedsHold,
    /// The goal.
    Goal,
    /// What was seen.
    Seen,
    /// Where pain starts.
    Pain,
    /// Links, the focused thing, what can be grabbed.
    Accent,
    /// Something to be careful of.
    Warn,
}

impl Role {
    /// Every role.
    pub const ALL: [Self; 29] = [
        Self::Paper,
        Self::Panel,
        Self::Border,
        Self::FieldBg,
        Self::Ink,
        Self::InkSoft,
        Self::Grid,
        Self::OnStrong,
        Self::Body,
        Self::BodyNear,
        Self::BodyEdge,
        Self::Estimated,
        Self::Outline,
        Self::Shoe,
        Self::Gear,
        Self::Hip,
        Self::Knee,
        Self::Back,
        Self::Ankle,
        Self::Plumb,
        Self::Steady,
        Self::Drifting,
        Self::DriftingBg,
        Self::NeedsHold,
        Self::Goal,
        Self::Seen,
        Self::Pain,
        Self::Accent,
        Self::Warn,
    ];

    /// Roles in which text is written on paper, panel and field grounds.
    pub const TEXT: [Self; 12] = [
        Self::Ink,
        Self::InkSoft,
        Self::Hip,
        Self::Knee,
        Self::Back,
        Self::Ankle,
        Self::Steady,
        Self::Goal,
        Self::Seen,
        Self::Pain,
        Self::Accent,
        Self::Warn,
    ];
}

/// Red, green, blue, opacity; sRGB, not premultiplied.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Rgba {
    /// Red.
    pub r: u8,
    /// Green.
    pub g: u8,
    /// Blue.
    pub b: u8,
    /// Opacity; 255 hides what is behind.
    pub a: u8,
}

const fn hex(rgb: u32) -> Rgba {
    Rgba { r: (rgb >> 16) as u8, g: (rgb >> 8) as u8, b: rgb as u8, a: 255 }
}

/// The palettes.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub enum Palette {
    /// Warm paper; the default and always the sheet's.
    #[default]
    Light,
    /// Dim room.
    Dark,
    /// Black and white with few, strong colours.
    HighContrast,
}

/// Resolves roles to colours.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Theme {
    palette: Palette,
}

impl Theme {
    /// The theme of a palette.
    #[must_use]
    pub const fn new(palette: Palette) -> Self {
        Self { palette }
    }

    /// Warm paper.
    #[must_use]
    pub const fn light() -> Self {
        Self::new(Palette::Light)
    }

    /// Dim room.
    #[must_use]
    pub const fn dark() -> Self {
        Self::new(Palette::Dark)
    }

    /// Black and white with few, strong colours.
    #[must_use]
    pub const fn high_contrast() -> Self {
        Self::new(Palette::HighContrast)
    }

    /// Which palette.
    #[must_use]
    pub const fn palette(self) -> Palette {
        self.palette
    }

    /// The colour of a role.
    #[must_use]
    pub const fn rgba(self, role: Role) -> Rgba {
        let [light, dark, contrast] = match role {
            Role::Paper => [0xFB_F8F1, 0x1C_2227, 0xFF_FFFF],
            Role::Panel => [0xF3_EEE3, 0x23_2A30, 0xFF_FFFF],
            Role::Border => [0xDB_D3C2, 0x3C_454D, 0x00_0000],
            Role::FieldBg => [0xFF_FDF8, 0x15_1A1E, 0xFF_FFFF],
            Role::Ink => [0x22_2B33, 0xEC_E8DF, 0x00_0000],
            Role::InkSoft => [0x58_626B, 0xAE_B4B8, 0x26_2626],
            Role::Grid => [0xE6_DFD0, 0x31_3940, 0xB4_B4B4],
            Role::OnStrong => [0xFF_FDF8, 0x14_191D, 0xFF_FFFF],
            Role::Body => [0xCB_D4DB, 0x4C_5A65, 0xDC_DCDC],
            Role::BodyNear => [0xD8_DFE4, 0x5A_6974, 0xEE_EEEE],
            Role::BodyEdge => [0x38_4753, 0xB9_C4CC, 0x00_0000],
            Role::Estimated => [0xE4_E8E8, 0x39_434B, 0xFF_FFFF],
            Role::Outline => [0xA9_A294, 0x76_7F86, 0x60_6060],
            Role::Shoe => [0xF4_F1EA, 0x6B_7781, 0xFF_FFFF],
            Role::Gear => [0x8A_8373, 0x9A_9484, 0x50_5050],
            Role::Hip => [0x1F_6096, 0x7F_BEEF, 0x00_3E9C],
            Role::Knee => [0x9A_5606, 0xF0_AC55, 0x7A_3C00],
            Role::Back => [0x7B_3B73, 0xD9_9FD0, 0x6A_006A],
            Role::Ankle => [0x2F_6B4F, 0x8C_CFAB, 0x00_5A2B],
            Role::Plumb => [0x22_2B33, 0xEC_E8DF, 0x00_0000],
            Role::Steady => [0x3C_5874, 0x8F_B3D6, 0x00_2B5C],
            Role::Drifting => [0x76_8DA5, 0x67_86A5, 0x00_2B5C],
            Role::DriftingBg => [0xE9_EDF0, 0x29_333C, 0xFF_FFFF],
            Role::NeedsHold => [0xFF_FDF8, 0x15_1A1E, 0xFF_FFFF],
            Role::Goal => [0x22_2B33, 0xEC_E8DF, 0x00_0000],
            Role::Seen => [0x7B_3B73, 0xD9_9FD0, 0x6A_006A],
            Role::Pain => [0x9B_2F2B, 0xF1_9A90, 0x9C_0000],
            Role::Accent => [0x1F_6096, 0x7F_BEEF, 0x00_3E9C],
            Role::Warn => [0x86_5400, 0xE8_BC62, 0x6B_3A00],
        };
        match self.palette {
            Palette::Light => hex(light),
            Palette::Dark => hex(dark),
            Palette::HighContrast => hex(contrast),
        }
    }
}

/// Contrast of two colours by WCAG 2.2: 1 to 21.
#[must_use]
pub fn contrast(a: Rgba, b: Rgba) -> f64 {
    let light = |c: Rgba| {
        let part = |v: u8| {
            let s = f64::from(v) / 255.0;
            if s <= 0.040_45 { s / 12.92 } else { ((s + 0.055) / 1.055).powf(2.4) }
        };
        0.2126 * part(c.r) + 0.7152 * part(c.g) + 0.0722 * part(c.b)
    };
    let (x, y) = (light(a), light(b));
    (x.max(y) + 0.05) / (x.min(y) + 0.05)
}

#[cfg(test)]
mod tests {
    use super::*;

    const THEMES: [Theme; 3] = [Theme::light(), Theme::dark(), Theme::high_contrast()];

    #[test]
    fn text_is_legible_on_every_ground_of_every_theme() {
        for theme in THEMES {
            for ground in [Role::Paper, Role::Panel, Role::FieldBg, Role::NeedsHold] {
                for text in Role::TEXT {
                    let c = contrast(theme.rgba(text), theme.rgba(ground));
                    assert!(c >= 4.5, "{:?} {text:?} on {ground:?}: {c:.2}", theme.palette());
                }
            }
            for (text, ground) in [
                (Role::Ink, Role::Body),
                (Role::Ink, Role::BodyNear),
                (Role::Ink, Role::Estimated),
                (Role::OnStrong, Role::Steady),
                (Role::OnStrong, Role::Hip),
                (Role::OnStrong, Role::Knee),
                (Role::OnStrong, Role::Back),
            ] {
                let c = contrast(theme.rgba(text), theme.rgba(ground));
                assert!(c >= 4.5, "{:?} {text:?} on {ground:?}: {c:.2}", theme.palette());
            }
        }
    }

    #[test]
    fn lines_that_carry_meaning_stand_out_from_the_page() {
        for theme in THEMES {
            for line in [Role::BodyEdge, Role::Plumb, Role::Drifting, Role::Hip, Role::Knee, Role::Back, Role::Gear] {
                let c = contrast(theme.rgba(line), theme.rgba(Role::Paper));
                assert!(c >= 3.0, "{:?} {line:?}: {c:.2}", theme.palette());
            }
            assert!(contrast(theme.rgba(Role::BodyEdge), theme.rgba(Role::Body)) >= 3.0);
        }
    }

    #[test]
    fn contrast_of_black_and_white_is_21() {
        assert!((contrast(hex(0), hex(0xFF_FFFF)) - 21.0).abs() < 1e-9);
        assert!((contrast(hex(0x77_7777), hex(0xFF_FFFF)) - 4.478).abs() < 1e-2);
    }

    #[test]
    fn every_role_is_listed_once() {
        for (i, a) in Role::ALL.iter().enumerate() {
            assert!(!Role::ALL[i + 1..].contains(a), "{a:?}");
        }
    }
}
