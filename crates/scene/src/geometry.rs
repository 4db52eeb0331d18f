//! Points, sizes, rectangles and convex polygons of the page, all in page units, y down.

use std::ops::{Add, Mul, Neg, Sub};

/// A place on the page (or a step on it): x to the right, y down, page units.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Pt {
    /// To the right.
    pub x: f32,
    /// Down.
    pub y: f32,
}

impl Pt {
    /// A place.
    #[must_use]
    pub const fn new(x: f32, y: f32) -> Self {
        Self { x, y }
    }

    /// Length of a step.
    #[must_use]
    pub fn length(self) -> f32 {
        self.x.hypot(self.y)
    }

    /// Distance to another place.
    #[must_use]
    pub fn distance(self, other: Self) -> f32 {
        (self - other).length()
    }

    /// The same direction with length one; no direction stays none.
    #[must_use]
    pub fn unit(self) -> Self {
        let l = self.length();
        if l > 0.0 { self * (1.0 / l) } else { Self::default() }
    }

    /// A quarter turn clockwise as seen on the page.
    #[must_use]
    pub const fn turned(self) -> Self {
        Self { x: -self.y, y: self.x }
    }

    /// Between two places: 0 here, 1 there.
    #[must_use]
    pub fn toward(self, there: Self, share: f32) -> Self {
        self + (there - self) * share
    }

    /// Sum of products.
    #[must_use]
    pub fn dot(self, other: Self) -> f32 {
        self.x * other.x + self.y * other.y
    }
}

impl Add for Pt {
    type Output = Self;
    fn add(self, o: Self) -> Self {
        Self::new(self.x + o.x, self.y + o.y)
    }
}

impl Sub for Pt {
    type Output = Self;
    fn sub(self, o: Self) -> Self {
        Self::new(self.x - o.x, self.y - o.y)
    }
}

impl Mul<f32> for Pt {
    type Output = Self;
    fn mul(self, k: f32) -> Self {
        Self::new(self.x * k, self.y * k)
    }
}

impl Neg for Pt {
    type Output = Self;
    fn neg(self) -> Self {
        Self::new(-self.x, -self.y)
    }
}

/// Width and height, page units.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Size {
    /// Width.
    pub w: f32,
    /// Height.
    pub h: f32,
}

impl Size {
    /// A size.
    #[must_use]
    pub const fn new(w: f32, h: f32) -> Self {
        Self { w, h }
    }
}

/// An upright rectangle, page units.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct RectPt {
    /// Top left corner.
    pub min: Pt,
    /// Bottom right corner.
    pub max: Pt,
}

impl RectPt {
    /// Between two corners in any order.
    #[must_use]
    pub fn new(a: Pt, b: Pt) -> Self {
        Self { min: Pt::new(a.x.min(b.x), a.y.min(b.y)), max: Pt::new(a.x.max(b.x), a.y.max(b.y)) }
    }

    /// From left, top, width and height.
    #[must_use]
    pub fn at(x: f32, y: f32, w: f32, h: f32) -> Self {
        Self { min: Pt::new(x, y), max: Pt::new(x + w, y + h) }
    }

    /// The whole page of a size.
    #[must_use]
    pub fn page(size: Size) -> Self {
        Self::at(0.0, 0.0, size.w, size.h)
    }

    /// Width.
    #[must_use]
    pub fn w(&self) -> f32 {
        self.max.x - self.min.x
    }

    /// Height.
    #[must_use]
    pub fn h(&self) -> f32 {
        self.max.y - self.min.y
    }

    /// The middle.
    #[must_use]
    pub fn middle(&self) -> Pt {
        self.min.toward(self.max, 0.5)
    }

    /// Moved outward by this much on every side.
    #[must_use]
    pub fn grown(&self, by: f32) -> Self {
        Self { min: self.min - Pt::new(by, by), max: self.max + Pt::new(by, by) }
    }

    /// The smallest rectangle around both.
    #[must_use]
    pub fn around(&self, o: &Self) -> Self {
        Self {
            min: Pt::new(self.min.x.min(o.min.x), self.min.y.min(o.min.y)),
            max: Pt::new(self.max.x.max(o.max.x), self.max.y.max(o.max.y)),
        }
    }

    /// Whether a place is inside or on the edge.
    #[must_use]
    pub fn contains(&self, p: Pt) -> bool {
        p.x >= self.min.x && p.x <= self.max.x && p.y >= self.min.y && p.y <= self.max.y
    }

    /// Whether another rectangle is wholly inside.
    #[must_use]
    pub fn holds(&self, o: &Self) -> bool {
        self.contains(o.min) && self.contains(o.max)
    }

    /// Whether two rectangles share an area; touching edges do not count.
    #[must_use]
    pub fn meets(&self, o: &Self) -> bool {
        self.min.x < o.max.x && o.min.x < self.max.x && self.min.y < o.max.y && o.min.y < self.max.y
    }

    /// Its four corners, clockwise from the top left.
    #[must_use]
    pub fn corners(&self) -> [Pt; 4] {
        [self.min, Pt::new(self.max.x, self.min.y), self.max, Pt::new(self.min.x, self.max.y)]
    }

    /// The part of a segment inside (Liang–Barsky), if any.
    #[must_use]
    pub fn clip(&self, a: Pt, b: Pt) -> Option<(Pt, Pt)> {
        let d = b - a;
        let (mut from, mut to) = (0.0_f32, 1.0_f32);
        let edges =
            [(-d.x, a.x - self.min.x), (d.x, self.max.x - a.x), (-d.y, a.y - self.min.y), (d.y, self.max.y - a.y)];
        for (step, room) in edges {
            if step.abs() < 1e-9 {
                if room < 0.0 {
                    return None;
                }
            } else if step < 0.0 {
                from = from.max(room / step);
            } else {
                to = to.min(room / step);
            }
        }
        (from < to).then(|| (a + d * from, a + d * to))
    }
}

/// A filled area: the convex hull of its points, clockwise as seen on the page. Painters that
/// fill only convex areas can rely on it; at least three corners, else it is empty.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Convex(Vec<Pt>);

impl Convex {
    /// The hull of any points (monotone chain). Points on one line or not finite give an empty area.
    #[must_use]
    pub fn hull(points: impl IntoIterator<Item = Pt>) -> Self {
        let mut p: Vec<Pt> = points.into_iter().filter(|p| p.x.is_finite() && p.y.is_finite()).collect();
        p.sort_by(|a, b| a.x.total_cmp(&b.x).then(a.y.total_cmp(&b.y)));
        p.dedup();
        if p.len() < 3 {
            return Self::default();
        }
        // in f64 so that the turn of nearly straight corners has the right sign
        let turn = |o: Pt, a: Pt, b: Pt| {
            (f64::from(a.x) - f64::from(o.x)) * (f64::from(b.y) - f64::from(o.y))
                - (f64::from(a.y) - f64::from(o.y)) * (f64::from(b.x) - f64::from(o.x))
        };
        let chain = |points: &mut dyn Iterator<Item = Pt>| {
            let mut side: Vec<Pt> = Vec::new();
            for q in points {
                while side.len() >= 2 && turn(side[side.len() - 2], side[side.len() - 1], q) <= 0.0 {
                    side.pop();
                }
                side.push(q);
            }
            side.pop();
            side
        };
        let mut hull = chain(&mut p.iter().copied());
        hull.extend(chain(&mut p.iter().rev().copied()));
        if hull.len() < 3 { Self::default() } else { Self(hull) }
    }

    /// The corners, clockwise as seen on the page.
    #[must_use]
    pub fn points(&self) -> &[Pt] {
        &self.0
    }

    /// Whether there is nothing to fill.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.0.is_empty()
    }

    /// The rectangle around it; `None` where empty.
    #[must_use]
    pub fn bounds(&self) -> Option<RectPt> {
        bounds_of(&self.0)
    }

    /// Whether a place is inside or on the edge.
    #[must_use]
    pub fn contains(&self, p: Pt) -> bool {
        let n = self.0.len();
        n >= 3
            && (0..n).all(|i| {
                let (a, b) = (self.0[i], self.0[(i + 1) % n]);
                (b.x - a.x) * (p.y - a.y) - (b.y - a.y) * (p.x - a.x) >= 0.0
            })
    }

    /// The part of a segment inside, if any.
    #[must_use]
    pub fn clip(&self, a: Pt, b: Pt) -> Option<(Pt, Pt)> {
        if self.is_empty() {
            return None;
        }
        let d = b - a;
        let (mut from, mut to) = (0.0_f32, 1.0_f32);
        let n = self.0.len();
        for i in 0..n {
            let (p, q) = (self.0[i], self.0[(i + 1) % n]);
            // inward normal of a clockwise edge on a page with y down
            let normal = (q - p).turned();
            let (room, step) = ((a - p).dot(normal), d.dot(normal));
            if step.abs() < 1e-9 {
                if room < 0.0 {
                    return None;
                }
            } else if step > 0.0 {
                from = from.max(-room / step);
            } else {
                to = to.min(-room / step);
            }
        }
        (from < to).then(|| (a + d * from, a + d * to))
    }
}

impl Convex {
    /// The part with y of at most `low`: what stands above a line across the page.
    #[must_use]
    pub fn above(&self, low: f32) -> Self {
        if self.0.iter().all(|p| p.y <= low) {
            return self.clone();
        }
        let n = self.0.len();
        let mut kept = Vec::with_capacity(n + 2);
        for i in 0..n {
            let (a, b) = (self.0[i], self.0[(i + 1) % n]);
            if a.y <= low {
                kept.push(a);
            }
            if (a.y - low) * (b.y - low) < 0.0 {
                kept.push(a.toward(b, (low - a.y) / (b.y - a.y)));
            }
        }
        Self::hull(kept)
    }
}

/// The rectangle around some points; `None` for none.
#[must_use]
pub fn bounds_of(points: &[Pt]) -> Option<RectPt> {
    let mut it = points.iter();
    let first = *it.next()?;
    Some(it.fold(RectPt { min: first, max: first }, |r, &p| r.around(&RectPt { min: p, max: p })))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_hull_drops_inner_points_and_turns_one_way() {
        let c = Convex::hull(
            [(0.0, 0.0), (4.0, 0.0), (4.0, 4.0), (0.0, 4.0), (2.0, 2.0), (1.0, 3.0)].map(|(x, y)| Pt::new(x, y)),
        );
        assert_eq!(c.points().len(), 4);
        let p = c.points();
        for i in 0..4 {
            let (a, b, c) = (p[i], p[(i + 1) % 4], p[(i + 2) % 4]);
            assert!((b.x - a.x) * (c.y - b.y) - (b.y - a.y) * (c.x - b.x) > 0.0);
        }
        assert!(c.contains(Pt::new(2.0, 2.0)) && !c.contains(Pt::new(5.0, 2.0)));
    }

    #[test]
    fn points_on_a_line_or_not_finite_give_nothing() {
        assert!(Convex::hull([Pt::new(0.0, 0.0), Pt::new(1.0, 1.0), Pt::new(2.0, 2.0)]).is_empty());
        assert!(Convex::hull([Pt::new(0.0, 0.0), Pt::new(f32::NAN, 1.0), Pt::new(2.0, 2.0)]).is_empty());
    }

    #[test]
    fn what_stands_above_a_line_is_kept() {
        let square = Convex::hull(RectPt::at(0.0, 0.0, 10.0, 10.0).corners());
        assert_eq!(square.above(4.0).bounds(), Some(RectPt::at(0.0, 0.0, 10.0, 4.0)));
        assert_eq!(square.above(20.0), square);
        assert!(square.above(-1.0).is_empty());
    }

    #[test]
    fn clipping_keeps_what_is_inside() {
        let square = Convex::hull(RectPt::at(0.0, 0.0, 10.0, 10.0).corners());
        let (a, b) = square.clip(Pt::new(-5.0, 5.0), Pt::new(15.0, 5.0)).expect("crosses");
        assert!((a.x - 0.0).abs() < 1e-4 && (b.x - 10.0).abs() < 1e-4);
        assert!(square.clip(Pt::new(-5.0, 11.0), Pt::new(15.0, 11.0)).is_none());
        let r = RectPt::at(0.0, 0.0, 10.0, 10.0);
        let (a, b) = r.clip(Pt::new(5.0, -5.0), Pt::new(5.0, 25.0)).expect("crosses");
        assert!((a.y - 0.0).abs() < 1e-4 && (b.y - 10.0).abs() < 1e-4);
        assert!(r.clip(Pt::new(11.0, -5.0), Pt::new(11.0, 25.0)).is_none());
    }
}
