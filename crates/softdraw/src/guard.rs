//! Corners far outside the picture: triangles are cut to a guard band, so that the scan's integers cannot overflow.

use crate::scan::{GUARD, STEPS};

/// A corner with what is interpolated between corners.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Vertex {
    /// Right and down, pixels.
    pub(crate) at: [f64; 2],
    /// Texture place, texels.
    pub(crate) uv: [f64; 2],
    /// Premultiplied red, green, blue, alpha, 0–255.
    pub(crate) colour: [f64; 4],
}

/// Half the side of the guard band, pixels: one pixel less than what the scan can hold.
const LIMIT: f64 = ((GUARD / STEPS) - 1) as f64;

/// Whether the scan takes this vertex as it is.
pub(crate) fn inside(vertex: &Vertex) -> bool {
    vertex.at.iter().all(|c| c.abs() <= LIMIT)
}

/// The part of a triangle inside the guard band: a convex polygon of 0 or 3–7 corners.
///
/// A cut edge is always followed from its inner to its outer end. Two triangles that share the edge therefore get the
/// same new corner to the last bit, and stay without a seam.
pub(crate) fn cut(triangle: [Vertex; 3]) -> Vec<Vertex> {
    let mut polygon = triangle.to_vec();
    for axis in 0..2 {
        for sign in [1.0, -1.0] {
            let room = |v: &Vertex| LIMIT - sign * v.at[axis];
            let mut kept = Vec::with_capacity(polygon.len() + 1);
            for (i, &here) in polygon.iter().enumerate() {
                let next = polygon[(i + 1) % polygon.len()];
                let (a, b) = (room(&here), room(&next));
                if a >= 0.0 {
                    kept.push(here);
                }
                if a >= 0.0 && b < 0.0 {
                    kept.push(between(here, next, a / (a - b)));
                } else if a < 0.0 && b >= 0.0 {
                    kept.push(between(next, here, b / (b - a)));
                }
            }
            polygon = kept;
        }
    }
    polygon
}

/// The vertex at the fraction `t` of the way.
fn between(from: Vertex, to: Vertex, t: f64) -> Vertex {
    let mix = |a: f64, b: f64| a + (b - a) * t;
    Vertex {
        at: std::array::from_fn(|i| mix(from.at[i], to.at[i]).clamp(-LIMIT, LIMIT)),
        uv: std::array::from_fn(|i| mix(from.uv[i], to.uv[i])),
        colour: std::array::from_fn(|i| mix(from.colour[i], to.colour[i])),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn vertex(x: f64, y: f64, red: f64) -> Vertex {
        Vertex { at: [x, y], uv: [0.0; 2], colour: [red, 0.0, 0.0, 255.0] }
    }

    #[test]
    fn a_triangle_inside_is_unchanged() {
        let triangle = [vertex(0.0, 0.0, 1.0), vertex(9.0, 0.0, 2.0), vertex(0.0, 9.0, 3.0)];
        assert!(triangle.iter().all(inside));
        assert_eq!(cut(triangle), triangle);
    }

    #[test]
    fn a_corner_far_to_the_right_is_cut_off_in_proportion() {
        let far = 4.0 * LIMIT;
        let triangle = [vertex(0.0, 0.0, 0.0), vertex(far, 0.0, 200.0), vertex(0.0, 8.0, 0.0)];
        let polygon = cut(triangle);
        assert_eq!(polygon.len(), 4);
        assert!(polygon.iter().all(inside));
        // a quarter of the way: a quarter of the colour; the slanted edge has come down by a quarter
        assert_eq!(polygon[1], vertex(LIMIT, 0.0, 50.0));
        assert_eq!(polygon[2], vertex(LIMIT, 6.0, 50.0));
    }

    #[test]
    fn a_triangle_wholly_outside_vanishes() {
        let far = 2.0 * LIMIT;
        assert!(cut([vertex(far, 0.0, 0.0), vertex(far + 9.0, 0.0, 0.0), vertex(far, 9.0, 0.0)]).is_empty());
    }
}
