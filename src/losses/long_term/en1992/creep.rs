//! Creep, EN 1992-1-1:2004 Annex B.1 and 3.1.4(4). Relative humidity in per cent, notional size in mm, ages in days.

use super::super::outside::{Outside, positive, within};
use crate::job::Cement;

/// EN 1992-1-1:2004 (B.8c): α1 = (35/`f_cm`)^0.7 where `f_cm` > 35 MPa; 1 below, where (B.3a) has none.
pub fn alpha_1(f_cm_mpa: f64) -> f64 {
    weakened(f_cm_mpa).powf(0.7)
}

/// EN 1992-1-1:2004 (B.8c): α2 = (35/`f_cm`)^0.2 where `f_cm` > 35 MPa; 1 below.
pub fn alpha_2(f_cm_mpa: f64) -> f64 {
    weakened(f_cm_mpa).powf(0.2)
}

/// EN 1992-1-1:2004 (B.8c): α3 = (35/`f_cm`)^0.5 where `f_cm` > 35 MPa; 1 below.
pub fn alpha_3(f_cm_mpa: f64) -> f64 {
    weakened(f_cm_mpa).sqrt()
}

fn weakened(f_cm_mpa: f64) -> f64 {
    (35.0 / f_cm_mpa).min(1.0)
}

/// EN 1992-1-1:2004 (B.3a), (B.3b): `φ_RH` = [1 + α1 (1 − RH/100)/(0.1 `h_0`^(1/3))] α2; RH 40 to 100 %, `h_0` above zero.
///
/// # Errors
/// [`Outside`] the humidity of 3.1.4(2), or a size of nothing.
pub fn phi_rh(humidity: f64, h_0_mm: f64, f_cm_mpa: f64) -> Result<f64, Outside> {
    let humidity = rh(humidity)?;
    let h_0_mm = positive("h_0", h_0_mm, " mm", "EN 1992-1-1 (B.6)")?;
    let dry = (1.0 - humidity / 100.0) / (0.1 * h_0_mm.cbrt());
    Ok((1.0 + alpha_1(f_cm_mpa) * dry) * alpha_2(f_cm_mpa))
}

/// EN 1992-1-1:2004 3.1.4(2): relative humidity, 40 to 100 %.
///
/// # Errors
/// [`Outside`] that.
pub(super) fn rh(humidity: f64) -> Result<f64, Outside> {
    within("RH", humidity, 40.0..=100.0, " %", "EN 1992-1-1 3.1.4(2)")
}

/// EN 1992-1-1:2004 (B.4): β(`f_cm`) = 16.8/√`f_cm`, `f_cm` in MPa.
pub fn beta_fcm(f_cm_mpa: f64) -> f64 {
    16.8 / f_cm_mpa.sqrt()
}

/// EN 1992-1-1:2004 (B.5): β(`t_0`) = 1/(0.1 + `t_0`^0.2), of the age that (B.9) adjusts.
pub fn beta_t0(t_0_adjusted_days: f64) -> f64 {
    1.0 / (0.1 + t_0_adjusted_days.powf(0.2))
}

/// EN 1992-1-1:2004 (B.9): age at loading adjusted for cement, `t_0` (9/(2 + `t_0`^1.2) + 1)^α ≥ 0.5 days; α −1, 0, 1 for S, N, R.
///
/// # Errors
/// [`Outside`] where the age is not above zero.
pub fn t_0_adjusted(t_0_days: f64, cement: Cement) -> Result<f64, Outside> {
    let t_0_days = positive("t_0", t_0_days, " days", "EN 1992-1-1 (B.9)")?;
    let sped = 9.0 / (2.0 + t_0_days.powf(1.2)) + 1.0;
    Ok((t_0_days * sped.powf(alpha(cement))).max(0.5))
}

/// EN 1992-1-1:2004 B.1(2): α −1, 0, 1 for cement S, N, R.
pub fn alpha(cement: Cement) -> f64 {
    match cement {
        Cement::S => -1.0,
        Cement::N => 0.0,
        Cement::R => 1.0,
    }
}

/// EN 1992-1-1:2004 (B.2): notional creep coefficient φ0 = `φ_RH` β(`f_cm`) β(`t_0`).
pub fn phi_0(phi_rh: f64, beta_fcm: f64, beta_t0: f64) -> f64 {
    phi_rh * beta_fcm * beta_t0
}

/// EN 1992-1-1:2004 (B.8a), (B.8b): `β_H` = 1.5 [1 + (0.012 RH)^18] `h_0` + 250 α3 ≤ 1500 α3, days; RH 40 to 100 %.
///
/// # Errors
/// [`Outside`] the humidity of 3.1.4(2).
pub fn beta_h(humidity: f64, h_0_mm: f64, f_cm_mpa: f64) -> Result<f64, Outside> {
    let alpha_3 = alpha_3(f_cm_mpa);
    let damp = 1.0 + (0.012 * rh(humidity)?).powi(18);
    Ok((1.5 * damp * h_0_mm + 250.0 * alpha_3).min(1500.0 * alpha_3))
}

/// EN 1992-1-1:2004 (B.7): `β_c(t, t_0)` = [(t − `t_0`)/(`β_H` + t − `t_0`)]^0.3; the age at loading unadjusted, t from `t_0` on.
///
/// # Errors
/// [`Outside`] where the age is before loading.
pub fn beta_c(t_days: f64, t_0_days: f64, beta_h_days: f64) -> Result<f64, Outside> {
    let clause = "EN 1992-1-1 (B.7)";
    let t_days = within("t", t_days, t_0_days..=f64::INFINITY, " days", clause)?;
    if t_days.is_infinite() {
        return Ok(1.0);
    }
    let loaded_days = t_days - t_0_days;
    Ok((loaded_days / (beta_h_days + loaded_days)).powf(0.3))
}

/// EN 1992-1-1:2004 (B.1): creep coefficient φ(t, `t_0`) = φ0 `β_c(t, t_0)`.
pub fn phi(phi_0: f64, beta_c: f64) -> f64 {
    phi_0 * beta_c
}

/// EN 1992-1-1:2004 (3.7): where the stress is above 0.45 `f_ck(t_0)`, φ exp(1.5 (`k_σ` − 0.45)), `k_σ` = `σ_c`/`f_ck(t_0)`; φ below.
/// From memory.
///
/// # Errors
/// [`Outside`] where the stress is above the strength.
pub fn phi_nl(phi: f64, sigma_c_mpa: f64, f_ck_t0_mpa: f64) -> Result<f64, Outside> {
    let clause = "EN 1992-1-1 (3.7)";
    let k_sigma = within(
        "sigma_c/f_ck(t_0)",
        sigma_c_mpa / f_ck_t0_mpa,
        f64::NEG_INFINITY..=1.0,
        "",
        clause,
    )?;
    Ok(phi * (1.5 * (k_sigma - 0.45).max(0.0)).exp())
}
