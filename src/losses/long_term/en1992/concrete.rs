//! Strength and modulus of concrete, EN 1992-1-1:2004 3.1.

use super::super::outside::{Outside, within};

/// EN 1992-1-1:2004 table 3.1: mean strength `f_cm` = `f_ck` + 8, MPa; `f_ck` 12 to 90 MPa.
///
/// # Errors
/// [`Outside`] the table.
pub fn f_cm(f_ck_mpa: f64) -> Result<f64, Outside> {
    let clause = "EN 1992-1-1 table 3.1";
    Ok(within("f_ck", f_ck_mpa, 12.0..=90.0, " MPa", clause)? + 8.0)
}

/// EN 1992-1-1:2004 3.1.2(5): mean strength at an age from the characteristic strength proven there, `f_ck(t)` + 8, MPa;
/// above zero and not above `f_ck`.
///
/// # Errors
/// [`Outside`] that range.
pub fn f_cm_t(f_ck_t_mpa: f64, f_ck_mpa: f64) -> Result<f64, Outside> {
    let clause = "EN 1992-1-1 3.1.2(5)";
    Ok(within("f_ck(t)", f_ck_t_mpa, 0.0..=f_ck_mpa, " MPa", clause)? + 8.0)
}

/// EN 1992-1-1:2004 table 3.1: secant modulus `E_cm` = 22 (`f_cm`/10)^0.3, in MPa here; `f_cm` 20 to 98 MPa.
///
/// # Errors
/// [`Outside`] the table.
pub fn e_cm(f_cm_mpa: f64) -> Result<f64, Outside> {
    let clause = "EN 1992-1-1 table 3.1";
    let f_cm_mpa = within("f_cm", f_cm_mpa, 20.0..=98.0, " MPa", clause)?;
    Ok(22_000.0 * (f_cm_mpa / 10.0).powf(0.3))
}

/// EN 1992-1-1:2004 (3.5): modulus at an age, `E_cm(t)` = (`f_cm(t)`/`f_cm`)^0.3 `E_cm`, MPa.
pub fn e_cm_t(f_cm_t_mpa: f64, f_cm_mpa: f64, e_cm_mpa: f64) -> f64 {
    (f_cm_t_mpa / f_cm_mpa).powf(0.3) * e_cm_mpa
}
