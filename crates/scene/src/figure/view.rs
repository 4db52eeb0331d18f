//! The one function between the model's world and the page.

use plumbfold_core::Point;

use crate::geometry::Pt;

/// Which way the client faces on the page.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub enum Facing {
    /// To the right.
    #[default]
    Right,
    /// To the left.
    Left,
}

/// Where the world's origin stands on the page, and how large a metre is there.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct View {
    origin: Pt,
    scale: f32,
    facing: Facing,
}

impl View {
    /// World origin at `origin`, `scale` page units to the metre.
    #[must_use]
    pub const fn new(origin: Pt, scale: f32, facing: Facing) -> Self {
        Self { origin, scale, facing }
    }

    /// +1 where forward is to the right, −1 where it is to the left.
    #[must_use]
    pub const fn forward(&self) -> f32 {
        match self.facing {
            Facing::Right => 1.0,
            Facing::Left => -1.0,
        }
    }

    /// A place of the world (m) on the page.
    #[must_use]
    pub fn to_page(&self, p: Point) -> Pt {
        Pt::new(self.x(p.x), self.y(p.y))
    }

    /// The same, but not under the floor: where a handle is drawn.
    #[must_use]
    pub fn to_page_above_floor(&self, p: Point) -> Pt {
        let at = self.to_page(p);
        Pt::new(at.x, at.y.min(self.floor()))
    }

    /// A place on the page in the world, m.
    #[must_use]
    pub fn to_world(&self, p: Pt) -> Point {
        let x = (p.x - self.origin.x) / (self.scale * self.forward());
        Point::new(f64::from(x), f64::from((self.origin.y - p.y) / self.scale))
    }

    /// Page x of a distance forward of the origin, m.
    #[must_use]
    pub fn x(&self, forward_m: f64) -> f32 {
        self.origin.x + self.forward() * self.scale * forward_m as f32
    }

    /// Page y of a height above the floor, m.
    #[must_use]
    pub fn y(&self, height_m: f64) -> f32 {
        self.origin.y - self.scale * height_m as f32
    }

    /// Page units of a length, m.
    #[must_use]
    pub fn length(&self, m: f64) -> f32 {
        self.scale * m as f32
    }

    /// The direction of an inclination (rad from the vertical, forward positive) on the page.
    #[must_use]
    pub fn direction(&self, inclination_rad: f64) -> Pt {
        let (s, c) = inclination_rad.sin_cos();
        Pt::new(self.forward() * s as f32, -c as f32)
    }

    /// The floor's page y.
    #[must_use]
    pub const fn floor(&self) -> f32 {
        self.origin.y
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn there_and_back_is_the_same_place_facing_either_way() {
        for facing in [Facing::Right, Facing::Left] {
            let v = View::new(Pt::new(300.0, 500.0), 240.0, facing);
            let p = Point::new(0.31, 0.84);
            let q = v.to_world(v.to_page(p));
            assert!((p.x - q.x).abs() < 1e-6 && (p.y - q.y).abs() < 1e-6, "{facing:?} {q}");
        }
    }

    #[test]
    fn facing_left_mirrors_about_the_origin() {
        let [a, b] = [Facing::Right, Facing::Left]
            .map(|f| View::new(Pt::new(300.0, 500.0), 240.0, f).to_page(Point::new(0.2, 0.5)));
        assert!((a.x - 300.0 + b.x - 300.0).abs() < 1e-4 && (a.y - b.y).abs() < 1e-6 && a.x > b.x);
    }
}
