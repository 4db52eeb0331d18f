//! The desk's look: the theme's roles as egui's visuals, and the bundled fonts.

use std::sync::Arc;

use egui::{
    Color32, CornerRadius, FontData, FontDefinitions, FontFamily, FontId, Stroke, TextStyle, Visuals,
    style::WidgetVisuals,
};
use plumbfold_scene::{Role, Theme, fonts, theme::Palette};

use crate::painter::{SEMIBOLD, color};

/// Bundled fonts first; egui's own behind them, for whatever a person types.
#[must_use]
pub fn font_definitions() -> FontDefinitions {
    let mut defs = FontDefinitions::default();
    defs.font_data.insert("inter".to_owned(), Arc::new(FontData::from_static(fonts::INTER_REGULAR)));
    defs.font_data.insert("inter-semibold".to_owned(), Arc::new(FontData::from_static(fonts::INTER_SEMIBOLD)));
    let fallback = defs.families.get(&FontFamily::Proportional).cloned().unwrap_or_default();
    let with = |first: &str| {
        let mut list = vec![first.to_owned()];
        list.extend(fallback.iter().cloned());
        list
    };
    defs.families.insert(FontFamily::Proportional, with("inter"));
    defs.families.insert(FontFamily::Name(SEMIBOLD.into()), with("inter-semibold"));
    defs
}

/// Sets fonts once, and lines to stand where the scene puts them: as on the sheet, not snapped to
/// pixels.
pub fn install_fonts(ctx: &egui::Context) {
    ctx.set_fonts(font_definitions());
    ctx.tessellation_options_mut(|o| o.round_line_segments_to_pixels = false);
}

/// The theme of a palette.
#[must_use]
pub const fn of(palette: Palette) -> Theme {
    Theme::new(palette)
}

/// Sets colours, sizes and spacings.
pub fn install_style(ctx: &egui::Context, theme: Theme) {
    let base = match theme.palette() {
        Palette::Dark => egui::Theme::Dark,
        Palette::Light | Palette::HighContrast => egui::Theme::Light,
    };
    ctx.set_theme(base);
    ctx.style_mut_of(base, |style| {
        style.visuals = visuals(theme);
        style.text_styles = [
            (TextStyle::Small, FontId::new(11.5, FontFamily::Proportional)),
            (TextStyle::Body, FontId::new(13.0, FontFamily::Proportional)),
            (TextStyle::Button, FontId::new(13.0, FontFamily::Proportional)),
            (TextStyle::Monospace, FontId::new(12.5, FontFamily::Proportional)),
            (TextStyle::Heading, FontId::new(14.0, FontFamily::Name(SEMIBOLD.into()))),
        ]
        .into();
        style.spacing.item_spacing = egui::vec2(6.0, 5.0);
        style.spacing.button_padding = egui::vec2(8.0, 3.0);
        style.spacing.interact_size = egui::vec2(34.0, 22.0);
        style.spacing.combo_width = 60.0;
        style.spacing.scroll = egui::style::ScrollStyle::solid();
        style.spacing.scroll.bar_width = 7.0;
        style.interaction.tooltip_delay = 0.4;
        style.animation_time = 0.0;
    });
}

fn visuals(theme: Theme) -> Visuals {
    let c = |role| color(theme, role);
    let mut v = match theme.palette() {
        Palette::Dark => Visuals::dark(),
        Palette::Light | Palette::HighContrast => Visuals::light(),
    };
    v.panel_fill = c(Role::Panel);
    v.window_fill = c(Role::Panel);
    v.window_stroke = Stroke::new(1.0, c(Role::Border));
    v.extreme_bg_color = c(Role::FieldBg);
    v.text_edit_bg_color = Some(c(Role::FieldBg));
    v.faint_bg_color = c(Role::FieldBg);
    v.hyperlink_color = c(Role::Accent);
    v.warn_fg_color = c(Role::Warn);
    v.error_fg_color = c(Role::Pain);
    v.selection.bg_fill = c(Role::DriftingBg);
    v.selection.stroke = Stroke::new(1.5, c(Role::Accent));
    v.weak_text_color = Some(c(Role::InkSoft));
    let widget = |fill: Color32, edge: Role, ink: Role| WidgetVisuals {
        bg_fill: fill,
        weak_bg_fill: fill,
        bg_stroke: Stroke::new(1.0, c(edge)),
        corner_radius: CornerRadius::same(4),
        fg_stroke: Stroke::new(1.2, c(ink)),
        expansion: 0.0,
    };
    v.widgets.noninteractive = widget(c(Role::Panel), Role::Border, Role::Ink);
    v.widgets.inactive = widget(c(Role::FieldBg), Role::Border, Role::Ink);
    v.widgets.hovered = widget(c(Role::FieldBg), Role::Accent, Role::Ink);
    v.widgets.active = widget(c(Role::DriftingBg), Role::Accent, Role::Ink);
    v.widgets.open = widget(c(Role::FieldBg), Role::Accent, Role::Ink);
    v
}
