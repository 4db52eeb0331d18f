//! Pictures of a test's screen, drawn on the CPU: the same on every machine, no graphics driver.

use egui::{Context, FullOutput, TexturesDelta};
use egui_kittest::TestRenderer;
use image::RgbaImage;
use plumbfold_softdraw::SoftDraw;

/// Draws for `egui_kittest`.
#[derive(Default)]
pub struct Soft(SoftDraw);

impl TestRenderer for Soft {
    fn handle_delta(&mut self, delta: &mut TexturesDelta) {
        self.0.apply(delta);
    }

    fn render(&mut self, ctx: &Context, output: &FullOutput) -> Result<RgbaImage, String> {
        let ground = ctx.global_style().visuals.panel_fill;
        let picture = self.0.draw_output(ctx, output, ground).map_err(|e| e.to_string())?;
        let [width, height] = picture.size();
        RgbaImage::from_raw(width, height, picture.straight_rgba()).ok_or_else(|| "not as many bytes as pixels".into())
    }
}
