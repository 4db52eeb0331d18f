//! Angles. Degrees and radians meet here and nowhere else.

use std::ops::{Add, Mul, Neg, Sub};

/// An angle, held in radians.
#[derive(Clone, Copy, Debug, Default, PartialEq, PartialOrd)]
pub struct Angle(f64);

impl Angle {
    /// No angle at all.
    pub const ZERO: Self = Self(0.0);

    /// From radians.
    #[must_use]
    pub const fn from_rad(rad: f64) -> Self {
        Self(rad)
    }

    /// From degrees.
    #[must_use]
    pub const fn from_deg(deg: f64) -> Self {
        Self(deg * (std::f64::consts::PI / 180.0))
    }

    /// In radians.
    #[must_use]
    pub const fn rad(self) -> f64 {
        self.0
    }

    /// In degrees.
    #[must_use]
    pub const fn deg(self) -> f64 {
        self.0 * (180.0 / std::f64::consts::PI)
    }

    /// Sine and cosine.
    #[must_use]
    pub fn sin_cos(self) -> (f64, f64) {
        self.0.sin_cos()
    }

    /// The smaller of two angles; a NaN loses.
    #[must_use]
    pub fn min(self, other: Self) -> Self {
        Self(self.0.min(other.0))
    }

    /// The larger of two angles; a NaN loses.
    #[must_use]
    pub fn max(self, other: Self) -> Self {
        Self(self.0.max(other.0))
    }

    /// Held within `low..=high`; `low` wins where they cross.
    #[must_use]
    pub fn within(self, low: Self, high: Self) -> Self {
        self.min(high).max(low)
    }
}

impl Add for Angle {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self(self.0 + other.0)
    }
}

impl Sub for Angle {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self(self.0 - other.0)
    }
}

impl Neg for Angle {
    type Output = Self;
    fn neg(self) -> Self {
        Self(-self.0)
    }
}

impl Mul<f64> for Angle {
    type Output = Self;
    fn mul(self, by: f64) -> Self {
        Self(self.0 * by)
    }
}

/// The direction at an inclination from the vertical, forward positive: `(sin a, cos a)`.
#[must_use]
pub fn direction(a: Angle) -> nalgebra::Vector2<f64> {
    let (s, c) = a.sin_cos();
    nalgebra::Vector2::new(s, c)
}
