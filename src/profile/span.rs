//! One piece's level, slope, length and angle, in closed form.

use super::Span;
use crate::numerics::integrate;

/// Below this change of slope the closed forms lose digits by cancellation; the rule of degree 11 is then exact to the
/// last bit, its error being of the order of this number to the 12th power.
const SLIGHT: f64 = 1e-3;

impl Span {
    /// Plan station of the end, metres.
    pub fn end_m(&self) -> f64 {
        self.start_m + self.length_m
    }

    /// Level at plan distance `x_m` from the start, metres above the top of the slab.
    pub fn level_at(&self, x_m: f64) -> f64 {
        self.level_m + x_m * (self.slope + 0.5 * self.curvature_per_m * x_m)
    }

    /// dz/dx at plan distance `x_m` from the start.
    pub fn slope_at(&self, x_m: f64) -> f64 {
        self.slope + self.curvature_per_m * x_m
    }

    /// Length in space of the first `x_m` of plan, metres: ∫ √(1 + m²) dx, with m = dz/dx.
    pub fn arc_length_to(&self, x_m: f64) -> f64 {
        let (m1, m2) = (self.slope, self.slope_at(x_m));
        if self.curvature_per_m == 0.0 {
            return x_m * m1.hypot(1.0);
        }
        if (m2 - m1).abs() < SLIGHT {
            return integrate(&|x| [self.slope_at(x).hypot(1.0)], 0.0, x_m)[0];
        }
        let primitive = |m: f64| 0.5 * (m * m.hypot(1.0) + m.asinh());
        (primitive(m2) - primitive(m1)) / self.curvature_per_m
    }

    /// Angle turned in space over the first `x_m` of plan, radians: ∫ |dT/dx| dx, T the unit tangent.
    ///
    /// With c = d²z/dx² and plan curvature κ, |dT/dx| = √(c² + κ² (1 + m²)) / (1 + m²). In a straight plan that is the
    /// change of atan m; on a level strand κ x; where both bend, the closed form over m is
    /// |κ/c| asinh(κ m / A) + atan(c m / √(A² + κ² m²)) with A² = c² + κ².
    pub fn angle_to(&self, x_m: f64) -> f64 {
        let (c, k) = (self.curvature_per_m.abs(), self.plan_curvature_per_m.abs());
        let (m1, m2) = (self.slope, self.slope_at(x_m));
        if k == 0.0 {
            return (m2 - m1).abs().atan2(1.0 + m1 * m2);
        }
        if c == 0.0 {
            return k * x_m / m1.hypot(1.0);
        }
        if (m2 - m1).abs() < SLIGHT {
            let rate = |x: f64| {
                let squared = 1.0 + self.slope_at(x).powi(2);
                [(c * c + k * k * squared).sqrt() / squared]
            };
            return integrate(&rate, 0.0, x_m)[0];
        }
        let both = c.hypot(k);
        let primitive =
            |m: f64| k / c * (k * m / both).asinh() + (c * m / both.hypot(k * m)).atan();
        (primitive(m2) - primitive(m1)).abs()
    }

    /// The piece between two plan distances from its start.
    #[must_use]
    pub fn cut(&self, from_m: f64, to_m: f64) -> Self {
        Self {
            start_m: self.start_m + from_m,
            length_m: to_m - from_m,
            level_m: self.level_at(from_m),
            slope: self.slope_at(from_m),
            ..*self
        }
    }

    /// Least vertical radius on the piece and its plan distance from the start: (1 + m²)^(3/2) / |c| where the slope is
    /// least; `None` on a straight piece.
    pub fn vertical_radius_min(&self) -> Option<(f64, f64)> {
        let c = self.curvature_per_m;
        if c == 0.0 {
            return None;
        }
        let x_m = (-self.slope / c).clamp(0.0, self.length_m);
        let steepness = self.slope_at(x_m).hypot(1.0);
        Some((steepness.powi(3) / c.abs(), x_m))
    }
}
