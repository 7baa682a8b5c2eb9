//! Relaxation, EN 1992-1-1:2004 3.3.2: the loss as a fraction of the initial stress `σ_pi`.

use super::super::outside::{Outside, within};
use crate::job::RelaxationClass;

/// EN 1992-1-1:2004 3.3.2(8): the final loss is that at 500 000 hours.
pub const FINAL_HOURS: f64 = 500_000.0;

/// EN 1992-1-1:2004 3.3.2(6): `ρ_1000`, per cent of the initial stress lost at 1000 hours: 8, 2.5, 4 for class 1, 2, 3.
pub fn rho_1000(class: RelaxationClass) -> f64 {
    match class {
        RelaxationClass::Ordinary => 8.0,
        RelaxationClass::Low => 2.5,
        RelaxationClass::Bar => 4.0,
    }
}

/// EN 1992-1-1:2004 (3.28), (3.29), (3.30): `Δσ_pr`/`σ_pi` for class 1, 2, 3 after some hours; `ρ_1000` in per cent,
/// μ = `σ_pi`/`f_pk` 0 to 1, 0 to 500 000 hours.
///
/// # Errors
/// [`Outside`] that.
pub fn delta_sigma_pr(
    class: RelaxationClass,
    rho_1000: f64,
    mu: f64,
    hours: f64,
) -> Result<f64, Outside> {
    let mu = within("mu", mu, 0.0..=1.0, "", "EN 1992-1-1 3.3.2(7)")?;
    let clause = "EN 1992-1-1 3.3.2(8)";
    let hours = within("t", hours, 0.0..=FINAL_HOURS, " hours", clause)?;
    let (factor, growth) = coefficients(class);
    let in_time = (hours / 1000.0).powf(0.75 * (1.0 - mu));
    Ok(factor * rho_1000 * (growth * mu).exp() * in_time * 1e-5)
}

/// EN 1992-1-1:2004 (3.28), (3.29), (3.30): factor and growth with μ.
pub(super) fn coefficients(class: RelaxationClass) -> (f64, f64) {
    match class {
        RelaxationClass::Ordinary => (5.39, 6.7),
        RelaxationClass::Low => (0.66, 9.1),
        RelaxationClass::Bar => (1.98, 8.0),
    }
}

/// Number of the equation for a class.
pub(super) fn equation(class: RelaxationClass) -> &'static str {
    match class {
        RelaxationClass::Ordinary => "EN 1992-1-1 (3.28)",
        RelaxationClass::Low => "EN 1992-1-1 (3.29)",
        RelaxationClass::Bar => "EN 1992-1-1 (3.30)",
    }
}
