//! Which pixels belong to a triangle: exact integer arithmetic, one run of pixels for each row.

/// Fixed-point steps in a pixel.
pub(crate) const STEPS: i64 = 256;
/// Coordinates (fixed-point) up to this are scanned without overflow: ± 2²⁰ pixels.
pub(crate) const GUARD: i64 = STEPS << 20;

/// A corner, in 1/256 pixel.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Corner {
    /// To the right.
    pub(crate) x: i64,
    /// Down.
    pub(crate) y: i64,
}

/// A rectangle of whole pixels: `left ≤ x < right`, `top ≤ y < bottom`.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct PixelRect {
    pub(crate) left: i64,
    pub(crate) top: i64,
    pub(crate) right: i64,
    pub(crate) bottom: i64,
}

/// Twice the signed area, positive when the corners run clockwise on the screen.
pub(crate) fn doubled_area([a, b, c]: [Corner; 3]) -> i64 {
    (b.x - a.x) * (c.y - a.y) - (c.x - a.x) * (b.y - a.y)
}

/// The pixels of `clip` whose centres lie in the triangle's bounding box; `None` if there are none.
///
/// As in [`runs`], centres on the left or top side count, centres on the right or bottom side do not.
pub(crate) fn bounds([a, b, c]: [Corner; 3], clip: PixelRect) -> Option<PixelRect> {
    let area = PixelRect {
        left: first_centre(a.x.min(b.x).min(c.x)).max(clip.left),
        top: first_centre(a.y.min(b.y).min(c.y)).max(clip.top),
        right: first_centre(a.x.max(b.x).max(c.x)).min(clip.right),
        bottom: first_centre(a.y.max(b.y).max(c.y)).min(clip.bottom),
    };
    (area.left < area.right && area.top < area.bottom).then_some(area)
}

/// Calls `run(y, from, to)` for each row of `area` (from [`bounds`]) in which the triangle covers the pixels
/// `from..to` (not empty).
///
/// A pixel is covered when its centre is inside, or on a top or left edge: of two triangles on either side of an edge
/// exactly one has the centres on it. Corners run either way; they must lie within ± [`GUARD`]. A triangle without
/// area covers nothing.
pub(crate) fn runs(mut corners: [Corner; 3], area: PixelRect, mut run: impl FnMut(i64, i64, i64)) {
    corners.sort_by_key(|corner| corner.y);
    let [high, middle, low] = corners;
    // a row is bounded by the edge from the highest to the lowest corner and by one of the other two
    let turn = first_centre(middle.y);
    for (upper, lower, top, bottom) in
        [(high, middle, area.top, area.bottom.min(turn)), (middle, low, area.top.max(turn), area.bottom)]
    {
        if top >= bottom {
            continue;
        }
        let mut long = Edge::new(high, low, top);
        let mut short = Edge::new(upper, lower, top);
        let (left, right) = if doubled_area(corners) > 0 { (&mut long, &mut short) } else { (&mut short, &mut long) };
        for y in top..bottom {
            let (from, to) = (left.first.max(area.left), right.first.min(area.right));
            if from < to {
                run(y, from, to);
            }
            left.next_row();
            right.next_row();
        }
    }
}

/// The first pixel (from the left or the top) whose centre is at or beyond a coordinate in 1/256 pixel.
fn first_centre(at: i64) -> i64 {
    (at + STEPS / 2 - 1).div_euclid(STEPS)
}

/// An edge that is not horizontal, followed from row to row without dividing.
///
/// In each row it knows the first pixel whose centre is on the edge or to the right of it: where a run begins if the
/// edge is a left one, and one past where it ends if it is a right one. Hence centres on an edge belong to the
/// triangle on its right.
struct Edge {
    /// ⌈n / size⌉, the pixel.
    first: i64,
    /// first · size − n, in 0..size.
    over: i64,
    /// How n changes from row to row, as whole sizes (rounded up) and what they are too much.
    step_first: i64,
    step_over: i64,
    size: i64,
}

impl Edge {
    /// The edge from its upper to its lower end at `row`; the ends differ in y.
    fn new(upper: Corner, lower: Corner, row: i64) -> Self {
        let (dx, dy) = (lower.x - upper.x, lower.y - upper.y);
        let centre_y = row * STEPS + STEPS / 2;
        // the edge is at x = upper.x + dx · (centre_y − upper.y) / dy, pixel i has its centre at i · STEPS + STEPS / 2
        let n = (upper.x - STEPS / 2) * dy + dx * (centre_y - upper.y);
        let size = STEPS * dy;
        let ceil = |n: i64| {
            let whole = -(-n).div_euclid(size);
            (whole, whole * size - n)
        };
        let (first, over) = ceil(n);
        let (step_first, step_over) = ceil(dx * STEPS);
        Self { first, over, step_first, step_over, size }
    }

    fn next_row(&mut self) {
        self.first += self.step_first;
        self.over += self.step_over;
        if self.over >= self.size {
            self.over -= self.size;
            self.first -= 1;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const CLIP: PixelRect = PixelRect { left: 0, top: 0, right: 24, bottom: 24 };

    /// How often each pixel of `CLIP` is covered.
    fn count(triangles: &[[Corner; 3]]) -> Vec<u32> {
        let mut hits = vec![0; 24 * 24];
        for &corners in triangles {
            let Some(area) = bounds(corners, CLIP) else { continue };
            runs(corners, area, |y, from, to| {
                for x in from..to {
                    hits[(y * 24 + x) as usize] += 1;
                }
            });
        }
        hits
    }

    fn corner(x_px: f64, y_px: f64) -> Corner {
        Corner { x: (x_px * 256.0).round() as i64, y: (y_px * 256.0).round() as i64 }
    }

    /// A small generator of our own, so that the fans below are the same on every run.
    fn noise(seed: &mut u64) -> f64 {
        *seed = seed.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        (*seed >> 40) as f64 / (1_u64 << 24) as f64
    }

    #[test]
    fn two_halves_of_a_square_cover_each_pixel_once() {
        let [a, b, c, d] = [corner(2.0, 3.0), corner(12.0, 3.0), corner(12.0, 13.0), corner(2.0, 13.0)];
        // the diagonal runs exactly through pixel centres
        for pair in [[[a, b, c], [a, c, d]], [[a, c, b], [d, a, c]], [[a, b, d], [b, c, d]]] {
            let hits = count(&pair);
            for (i, &n) in hits.iter().enumerate() {
                let (x, y) = (i % 24, i / 24);
                let inside = (2..12).contains(&x) && (3..13).contains(&y);
                assert_eq!(n, u32::from(inside), "pixel {x}, {y}");
            }
        }
    }

    #[test]
    fn fans_around_a_point_cover_each_pixel_once() {
        let mut seed = 7;
        for round in 0..400 {
            // every fourth round on half pixels, where centres lie on edges and corners
            let snap = |v: f64| if round % 4 == 0 { (v * 2.0).round() / 2.0 } else { v };
            let hub = corner(snap(2.0 + 20.0 * noise(&mut seed)), snap(2.0 + 20.0 * noise(&mut seed)));
            let rim = [(0.0, 0.0), (10.5, 0.0), (24.0, 0.0), (24.0, 9.5), (24.0, 24.0), (3.0, 24.0), (0.0, 24.0)]
                .map(|(x, y)| corner(x, y));
            let fan: Vec<_> = (0..7)
                .map(|i| {
                    let [p, q] = [rim[i], rim[(i + 1) % 7]];
                    if noise(&mut seed) < 0.5 { [hub, p, q] } else { [q, p, hub] }
                })
                .collect();
            assert!(count(&fan).iter().all(|&n| n == 1), "round {round}, hub {hub:?}");
        }
    }

    #[test]
    fn runs_agree_with_the_edge_functions_tried_pixel_by_pixel() {
        let mut seed = 11;
        for _ in 0..400 {
            let [a, b, c] = [0; 3].map(|_| corner(40.0 * noise(&mut seed) - 8.0, 40.0 * noise(&mut seed) - 8.0));
            let hits = count(&[[a, b, c]]);
            for (i, &n) in hits.iter().enumerate() {
                let centre = corner((i % 24) as f64 + 0.5, (i / 24) as f64 + 0.5);
                let signs = [[a, b, centre], [b, c, centre], [c, a, centre]].map(doubled_area);
                // no centre lies on an edge here, or it is left out
                if signs.iter().all(|&s| s != 0) {
                    let inside = signs.iter().all(|&s| s > 0) || signs.iter().all(|&s| s < 0);
                    assert_eq!(n, u32::from(inside), "{a:?} {b:?} {c:?} pixel {}, {}", i % 24, i / 24);
                }
            }
        }
    }

    #[test]
    fn the_largest_triangle_does_not_overflow() {
        let far = GUARD;
        let corners = [Corner { x: -far, y: -far }, Corner { x: far, y: -far }, Corner { x: far, y: far }];
        let hits = count(&[corners]);
        // right of and above the diagonal y = x, which is a left edge and so owned
        for (i, &n) in hits.iter().enumerate() {
            assert_eq!(n, u32::from(i % 24 >= i / 24));
        }
    }

    #[test]
    fn without_area_nothing_is_covered() {
        assert_eq!(count(&[[corner(1.0, 1.0), corner(9.0, 9.0), corner(5.0, 5.0)]]), vec![0; 576]);
    }
}
