//! Loss by friction: P = P0 exp(−φ).

use crate::job::{Stressing, Wobble};

/// Friction against angle and length.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Friction {
    /// Coefficient against angle, per radian.
    pub mu_per_rad: f64,
    /// Coefficient against length, per metre: μ k, or K as given.
    pub per_m: f64,
}

impl Friction {
    /// As a job gives it, in either form: φ = μ (α + k s) (EN 1992-1-1:2004 5.10.5.2), or φ = μ α + K s (BS 8110-1:1997 4.9,
    /// ACI practice).
    pub fn of(stressing: &Stressing) -> Self {
        let mu_per_rad = stressing.mu_per_rad;
        let per_m = match stressing.wobble {
            Wobble::RadPerM(k) => mu_per_rad * k,
            Wobble::PerM(k) => k,
        };
        Self { mu_per_rad, per_m }
    }

    /// Exponent φ after this angle and length from the jack.
    pub fn exponent(self, angle_rad: f64, length_m: f64) -> f64 {
        self.mu_per_rad * angle_rad + self.per_m * length_m
    }
}

/// Force left after friction, EN 1992-1-1:2004 (5.45): P0 exp(−φ), kN.
pub fn force_kn(jack_kn: f64, exponent: f64) -> f64 {
    jack_kn * (-exponent).exp()
}

/// Force lost to friction, EN 1992-1-1:2004 (5.45): P0 (1 − exp(−φ)), kN.
pub fn loss_kn(jack_kn: f64, exponent: f64) -> f64 {
    -jack_kn * (-exponent).exp_m1()
}
