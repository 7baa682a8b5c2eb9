//! Shrinkage, EN 1992-1-1:2004 3.1.4(6) and Annex B.2. Strains are positive where the concrete shortens.

use super::super::outside::{Outside, positive, within};
use super::creep::rh;
use crate::job::Cement;

/// EN 1992-1-1:2004 table 3.3: `k_h`, straight between its rows; `h_0` 100 mm and more, 0.70 from 500 mm on.
///
/// # Errors
/// [`Outside`] the table.
pub fn k_h(h_0_mm: f64) -> Result<f64, Outside> {
    const ROWS: [(f64, f64); 4] = [(100.0, 1.0), (200.0, 0.85), (300.0, 0.75), (500.0, 0.70)];
    let clause = "EN 1992-1-1 table 3.3";
    let h_0_mm = within("h_0", h_0_mm, 100.0..=f64::INFINITY, " mm", clause)?;
    super::super::outside::interpolated(&ROWS, "h_0", h_0_mm.min(500.0), " mm", clause)
}

/// EN 1992-1-1:2004 (B.12): `β_RH` = 1.55 [1 − (RH/100)³]; RH 40 to 100 %; nothing dries at 100 %.
///
/// # Errors
/// [`Outside`] the humidity of 3.1.4(2).
pub fn beta_rh(humidity: f64) -> Result<f64, Outside> {
    Ok(1.55 * (1.0 - (rh(humidity)? / 100.0).powi(3)))
}

/// EN 1992-1-1:2004 B.2(1): `α_ds1` 3, 4, 6 for cement S, N, R.
pub fn alpha_ds1(cement: Cement) -> f64 {
    match cement {
        Cement::S => 3.0,
        Cement::N => 4.0,
        Cement::R => 6.0,
    }
}

/// EN 1992-1-1:2004 B.2(1): `α_ds2` 0.13, 0.12, 0.11 for cement S, N, R.
pub fn alpha_ds2(cement: Cement) -> f64 {
    match cement {
        Cement::S => 0.13,
        Cement::N => 0.12,
        Cement::R => 0.11,
    }
}

/// EN 1992-1-1:2004 (B.11): `ε_cd,0` = 0.85 [(220 + 110 `α_ds1`) exp(−`α_ds2` `f_cm`/10)] 1e-6 `β_RH`.
pub fn eps_cd_0(cement: Cement, f_cm_mpa: f64, beta_rh: f64) -> f64 {
    let strong = (-alpha_ds2(cement) * f_cm_mpa / 10.0).exp();
    0.85 * (220.0 + 110.0 * alpha_ds1(cement)) * strong * 1e-6 * beta_rh
}

/// EN 1992-1-1:2004 (3.10): `β_ds(t, t_s)` = (t − `t_s`)/((t − `t_s`) + 0.04 √`h_0`³); 0 until curing ends at `t_s`.
///
/// # Errors
/// [`Outside`] where the size is not above zero.
pub fn beta_ds(t_days: f64, t_s_days: f64, h_0_mm: f64) -> Result<f64, Outside> {
    let h_0_mm = positive("h_0", h_0_mm, " mm", "EN 1992-1-1 (3.10)")?;
    if t_days.is_infinite() {
        return Ok(1.0);
    }
    let drying_days = (t_days - t_s_days).max(0.0);
    Ok(drying_days / (drying_days + 0.04 * h_0_mm.powf(1.5)))
}

/// EN 1992-1-1:2004 (3.9): drying shrinkage `ε_cd` = `β_ds` `k_h` `ε_cd,0`.
pub fn eps_cd(beta_ds: f64, k_h: f64, eps_cd_0: f64) -> f64 {
    beta_ds * k_h * eps_cd_0
}

/// EN 1992-1-1:2004 (3.12): autogenous shrinkage in the end, 2.5 (`f_ck` − 10) 1e-6; `f_ck` 12 to 90 MPa.
///
/// # Errors
/// [`Outside`] table 3.1.
pub fn eps_ca_inf(f_ck_mpa: f64) -> Result<f64, Outside> {
    let clause = "EN 1992-1-1 table 3.1";
    let f_ck_mpa = within("f_ck", f_ck_mpa, 12.0..=90.0, " MPa", clause)?;
    Ok(2.5 * (f_ck_mpa - 10.0) * 1e-6)
}

/// EN 1992-1-1:2004 (3.13): `β_as(t)` = 1 − exp(−0.2 √t), t in days from 0 on.
///
/// # Errors
/// [`Outside`] where the age is below zero.
pub fn beta_as(t_days: f64) -> Result<f64, Outside> {
    let t_days = within(
        "t",
        t_days,
        0.0..=f64::INFINITY,
        " days",
        "EN 1992-1-1 (3.13)",
    )?;
    Ok(-(-0.2 * t_days.sqrt()).exp_m1())
}

/// EN 1992-1-1:2004 (3.11): autogenous shrinkage `ε_ca` = `β_as` `ε_ca`(∞).
pub fn eps_ca(beta_as: f64, eps_ca_inf: f64) -> f64 {
    beta_as * eps_ca_inf
}

/// EN 1992-1-1:2004 (3.8): `ε_cs` = `ε_cd` + `ε_ca`.
pub fn eps_cs(eps_cd: f64, eps_ca: f64) -> f64 {
    eps_cd + eps_ca
}
