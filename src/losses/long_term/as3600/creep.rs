//! Creep, AS 3600:2018 3.1.8 and 3.4.3.3.

use super::super::outside::{Outside, interpolated, within};
use super::concrete::t_h;
use super::shrinkage::in_time;

/// AS 3600:2018 table 3.1.8.2: basic creep coefficient `φ_cc.b` by `f'_c` 20 to 100 MPa, straight between its rows.
///
/// # Errors
/// [`Outside`] the table.
pub fn phi_cc_b(f_c_mpa: f64) -> Result<f64, Outside> {
    const ROWS: [(f64, f64); 8] = [
        (20.0, 5.2),
        (25.0, 4.2),
        (32.0, 3.4),
        (40.0, 2.8),
        (50.0, 2.4),
        (65.0, 2.0),
        (80.0, 1.7),
        (100.0, 1.5),
    ];
    interpolated(&ROWS, "f'c", f_c_mpa, " MPa", "AS 3600 table 3.1.8.2")
}

/// AS 3600:2018 3.1.8.3: α2 = 1 + 1.12 e^(−0.008 `t_h`); `t_h` 50 to 400 mm.
///
/// # Errors
/// [`Outside`] that.
pub fn alpha_2(t_h_mm: f64) -> Result<f64, Outside> {
    Ok(1.0 + 1.12 * (-0.008 * t_h(t_h_mm)?).exp())
}

/// AS 3600:2018 3.1.8.3: `k_2` = α2 t^0.8/(t^0.8 + 0.15 `t_h`), t days after loading, from 0 on; `t_h` 50 to 400 mm.
///
/// # Errors
/// [`Outside`] those ranges.
pub fn k_2(t_days: f64, t_h_mm: f64) -> Result<f64, Outside> {
    Ok(alpha_2(t_h_mm)? * in_time(t_days, t_h_mm)?)
}

/// AS 3600:2018 3.1.8.3: `k_3` = 2.7/(1 + log10 τ), τ the age at loading, 1 day and more.
///
/// # Errors
/// [`Outside`] that.
pub fn k_3(tau_days: f64) -> Result<f64, Outside> {
    let range = 1.0..=f64::INFINITY;
    Ok(2.7 / (1.0 + within("tau", tau_days, range, " days", "AS 3600 3.1.8.3")?.log10()))
}

/// AS 3600:2018 3.1.8.3: α3 = 0.7/(`k_4` α2).
pub fn alpha_3(k_4: f64, alpha_2: f64) -> f64 {
    0.7 / (k_4 * alpha_2)
}

/// AS 3600:2018 3.1.8.3: `k_5` = 1 to 50 MPa, (2 − α3) − 0.02 (1 − α3) `f'_c` above; `f'_c` 20 to 100 MPa.
///
/// # Errors
/// [`Outside`] that.
pub fn k_5(f_c_mpa: f64, alpha_3: f64) -> Result<f64, Outside> {
    let f_c_mpa = super::concrete::f_c(f_c_mpa)?;
    Ok(if f_c_mpa <= 50.0 {
        1.0
    } else {
        (2.0 - alpha_3) - 0.02 * (1.0 - alpha_3) * f_c_mpa
    })
}

/// AS 3600:2018 3.1.8.3: `k_6` = exp(1.5 (`σ_o`/`f_cmi` − 0.45)) where `σ_o` is above 0.45 `f_cmi`, else 1; not above `f_cmi`.
///
/// # Errors
/// [`Outside`] that.
pub fn k_6(sigma_o_mpa: f64, f_cmi_mpa: f64) -> Result<f64, Outside> {
    let range = f64::NEG_INFINITY..=1.0;
    let ratio = sigma_o_mpa / f_cmi_mpa;
    let ratio = within("sigma_o/f_cmi", ratio, range, "", "AS 3600 3.1.8.3")?;
    Ok((1.5 * (ratio - 0.45).max(0.0)).exp())
}

/// AS 3600:2018 3.1.8.3: `φ_cc` = `k_2` `k_3` `k_4` `k_5` `k_6` `φ_cc.b`.
pub fn phi_cc(k: [f64; 5], phi_cc_b: f64) -> f64 {
    k.iter().product::<f64>() * phi_cc_b
}

/// AS 3600:2018 3.4.3.3: loss by creep, `E_p` 0.8 `φ_cc` `σ_ci`/`E_c`, MPa. From memory.
pub fn loss(e_p_mpa: f64, phi_cc: f64, sigma_ci_mpa: f64, e_c_mpa: f64) -> f64 {
    e_p_mpa * 0.8 * phi_cc * sigma_ci_mpa / e_c_mpa
}
