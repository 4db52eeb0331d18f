//! Draws egui's tessellated output on the CPU: for windows on machines without OpenGL, and for pictures in tests
//! (the same picture on every machine and every run, no graphics driver).
//!
//! # Coordinates
//! Pictures are in physical pixels, x to the right, y down, the first pixel's centre at (0.5, 0.5). egui's meshes and
//! clip rectangles are in points; `pixels_per_point` takes them to pixels. Vertices are rounded to 1/256 pixel, as
//! graphics cards do; a pixel belongs to a triangle when its centre does, and a centre on a shared edge belongs to
//! exactly one of the two triangles (top-left rule), so neither seams nor double blending occur.
//!
//! # Colours
//! As egui's own painters: vertex colour times texel, both sRGB-encoded with premultiplied alpha, blended as
//! `source + (1 − source alpha) · destination` on the encoded bytes. Alpha 0 with colour therefore adds light.
//! Graphics cards also dither; this crate does not, so that flat areas stay flat.
//!
//! # Textures
//! Filter (nearest or bilinear) and wrapping are those the texture asks for in its
//! [`TextureOptions`](egui::TextureOptions): magnification when a texel covers at least one pixel, else minification.
//! Bilinear is what egui asks for in its font atlas and needs for its small discs and scaled images; where a texture
//! lies texel on pixel, as whole-pixel glyphs do, texels are copied, which is the same result. Mipmaps are not made.
//!
//! # What is skipped
//! Paint callbacks (they need a graphics card), meshes whose texture is unknown, triangles with a vertex that is not
//! finite or an index out of range. Nothing here panics on odd input; the only error is [`TooLarge`].
//!
//! # Example
//! ```
//! use egui::{Color32, Rect, pos2, vec2};
//! use plumbfold_softdraw::SoftDraw;
//!
//! let ctx = egui::Context::default();
//! ctx.set_pixels_per_point(2.0);
//! let input = egui::RawInput {
//!     screen_rect: Some(Rect::from_min_size(pos2(0.0, 0.0), vec2(40.0, 20.0))),
//!     ..Default::default()
//! };
//! let draw_square = |ui: &mut egui::Ui| {
//!     let square = Rect::from_min_size(pos2(10.0, 5.0), vec2(10.0, 10.0));
//!     ui.painter().rect_filled(square, 0.0, Color32::RED);
//! };
//! // a first pass for egui to take over the scale, a second for the picture
//! let mut soft = SoftDraw::new();
//! let mut first = ctx.run_ui(input.clone(), draw_square);
//! soft.apply(&mut first.textures_delta);
//! let mut output = ctx.run_ui(input, draw_square);
//! soft.apply(&mut output.textures_delta);
//! let picture = soft.draw_output(&ctx, &output, Color32::WHITE)?;
//! assert_eq!(picture.size(), [80, 40]);
//! assert_eq!(picture.pixel(30, 20), Some([255, 0, 0, 255]));
//! assert_eq!(picture.pixel(5, 20), Some([255, 255, 255, 255]));
//! # Ok::<(), plumbfold_softdraw::TooLarge>(())
//! ```
//!
//! # Under egui_kittest
//! A test renderer is a few lines in the tests that want one (this crate depends on egui only):
//! ```text
//! struct Soft(plumbfold_softdraw::SoftDraw);
//!
//! impl egui_kittest::TestRenderer for Soft {
//!     fn handle_delta(&mut self, delta: &mut egui::TexturesDelta) {
//!         self.0.apply(delta);
//!     }
//!
//!     fn render(&mut self, ctx: &egui::Context, output: &egui::FullOutput) -> Result<image::RgbaImage, String> {
//!         let picture =
//!             self.0.draw_output(ctx, output, ctx.global_style().visuals.panel_fill).map_err(|e| e.to_string())?;
//!         let [width, height] = picture.size();
//!         image::RgbaImage::from_raw(width, height, picture.straight_rgba()).ok_or("picture of a wrong size".to_owned())
//!     }
//! }
//!
//! let harness = egui_kittest::Harness::builder().renderer(Soft(Default::default())).build_ui(|ui| …);
//! ```

mod blend;
mod guard;
mod mesh;
mod picture;
mod scan;
mod texture;

pub use picture::{MAX_SIDE_PX, Picture, TooLarge};

use std::collections::HashMap;

use egui::epaint::{ClippedPrimitive, Primitive};
use egui::{Color32, Context, FullOutput, TextureId, TexturesDelta};

use texture::Texture;

/// Owns the textures and draws tessellated egui output with them.
#[derive(Default)]
pub struct SoftDraw {
    textures: HashMap<TextureId, Texture>,
    /// Textures egui no longer wants after the picture that came with the same delta.
    to_free: Vec<TextureId>,
}

impl SoftDraw {
    /// A drawer without textures; the first [`Self::apply`] brings the font atlas.
    pub fn new() -> Self {
        Self::default()
    }

    /// Takes over what egui says about textures, and empties `delta` (a `TexturesDelta` dropped with content panics
    /// in debug builds). Call it once for each pass of egui, before drawing that pass.
    ///
    /// Patches reaching outside their texture are cut to it; a patch for an unknown texture and an image whose pixel
    /// count differs from its size are ignored. Textures to be freed stay until the next `apply`, because the pass
    /// that frees them may still show them.
    pub fn apply(&mut self, delta: &mut TexturesDelta) {
        for id in self.to_free.drain(..) {
            self.textures.remove(&id);
        }
        // the order of textures does not matter; the order of patches within one is kept
        for (id, patches) in delta.set.drain() {
            for patch in patches {
                if patch.pos.is_some() {
                    if let Some(texture) = self.textures.get_mut(&id) {
                        texture.patch(patch);
                    }
                } else if let Some(texture) = Texture::whole(patch) {
                    self.textures.insert(id, texture);
                }
            }
        }
        self.to_free.extend(delta.free.drain());
    }

    /// How many textures are held, the font atlas among them.
    pub fn texture_count(&self) -> usize {
        self.textures.len()
    }

    /// Draws primitives (from [`Context::tessellate`] with the same `pixels_per_point`) on a new picture of `size_px`
    /// (width, height) filled with `background`.
    ///
    /// # Errors
    /// [`TooLarge`] when a side is longer than [`MAX_SIDE_PX`]. A size with a zero gives an empty picture.
    pub fn draw(
        &self,
        primitives: &[ClippedPrimitive],
        pixels_per_point: f32,
        size_px: [u32; 2],
        background: Color32,
    ) -> Result<Picture, TooLarge> {
        let mut picture = Picture::new(size_px, background)?;
        self.draw_onto(&mut picture, primitives, pixels_per_point);
        Ok(picture)
    }

    /// Draws primitives over what `picture` shows already: for a window that keeps its buffer between frames
    /// ([`Picture::clear`] first, unless the former frame should shine through).
    pub fn draw_onto(&self, picture: &mut Picture, primitives: &[ClippedPrimitive], pixels_per_point: f32) {
        for ClippedPrimitive { clip_rect, primitive } in primitives {
            if let Primitive::Mesh(mesh) = primitive
                && let Some(texture) = self.textures.get(&mesh.texture_id)
            {
                mesh::draw(picture, mesh, texture, *clip_rect, pixels_per_point);
            }
        }
    }

    /// Tessellates and draws one pass of egui on a picture as large as the context's content, at the context's scale.
    ///
    /// # Errors
    /// [`TooLarge`] as in [`Self::draw`].
    pub fn draw_output(&self, ctx: &Context, output: &FullOutput, background: Color32) -> Result<Picture, TooLarge> {
        let pixels_per_point = ctx.pixels_per_point();
        let size = ctx.content_rect().size() * pixels_per_point;
        // a cast from float saturates: negative and NaN sizes become 0
        let size_px = [size.x.round() as u32, size.y.round() as u32];
        let primitives = ctx.tessellate(output.shapes.clone(), pixels_per_point);
        self.draw(&primitives, pixels_per_point, size_px, background)
    }
}
