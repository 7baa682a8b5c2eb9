//! Shrinkage, AS 3600:2018 3.1.7.2 and 3.4.3.2. Strains are positive where the concrete shortens.

use super::super::outside::{Outside, within};
use super::concrete::{f_c, t_h};

/// AS 3600:2018 3.1.7.2: autogenous shrinkage in the end, (0.07 `f'_c` − 0.5) 50e-6 to 50 MPa, (0.08 `f'_c` − 1.0) 50e-6 above;
/// `f'_c` 20 to 100 MPa.
///
/// # Errors
/// [`Outside`] that.
pub fn eps_cse_final(f_c_mpa: f64) -> Result<f64, Outside> {
    let f_c_mpa = f_c(f_c_mpa)?;
    Ok(50e-6
        * if f_c_mpa <= 50.0 {
            0.07 * f_c_mpa - 0.5
        } else {
            0.08 * f_c_mpa - 1.0
        })
}

/// AS 3600:2018 3.1.7.2: `ε_cse` = `ε*_cse` (1 − e^(−0.07 t)), t days after setting, from 0 on.
///
/// # Errors
/// [`Outside`] where the age is below zero.
pub fn eps_cse(eps_cse_final: f64, t_days: f64) -> Result<f64, Outside> {
    let clause = "AS 3600 3.1.7.2";
    let t_days = within("t", t_days, 0.0..=f64::INFINITY, " days", clause)?;
    Ok(-eps_cse_final * (-0.07 * t_days).exp_m1())
}

/// AS 3600:2018 3.1.7.2: α1 = 0.8 + 1.2 e^(−0.005 `t_h`); `t_h` 50 to 400 mm.
///
/// # Errors
/// [`Outside`] that.
pub fn alpha_1(t_h_mm: f64) -> Result<f64, Outside> {
    Ok(0.8 + 1.2 * (-0.005 * t_h(t_h_mm)?).exp())
}

/// AS 3600:2018 3.1.7.2: `k_1` = α1 t^0.8/(t^0.8 + 0.15 `t_h`), t days of drying, from 0 on; `t_h` 50 to 400 mm.
///
/// # Errors
/// [`Outside`] those ranges.
pub fn k_1(t_days: f64, t_h_mm: f64) -> Result<f64, Outside> {
    Ok(alpha_1(t_h_mm)? * in_time(t_days, t_h_mm)?)
}

/// AS 3600:2018 3.1.7.2, 3.1.8.3: t^0.8/(t^0.8 + 0.15 `t_h`).
pub(super) fn in_time(t_days: f64, t_h_mm: f64) -> Result<f64, Outside> {
    let clause = "AS 3600 3.1.7.2 and 3.1.8.3";
    let t_days = within("t", t_days, 0.0..=f64::INFINITY, " days", clause)?;
    if t_days.is_infinite() {
        return Ok(1.0);
    }
    let grown = t_days.powf(0.8);
    Ok(grown / (grown + 0.15 * t_h_mm))
}

/// AS 3600:2018 3.1.7.2: basic drying shrinkage, (0.9 − 0.005 `f'_c`) `ε*_csd.b`; `f'_c` 20 to 100 MPa; `ε*_csd.b` 800e-6 (Sydney,
/// Brisbane), 900e-6 (Melbourne) or 1000e-6 (elsewhere), the larger two from memory.
///
/// # Errors
/// [`Outside`] that.
pub fn eps_csd_basic(f_c_mpa: f64, eps_csd_b_final: f64) -> Result<f64, Outside> {
    Ok((0.9 - 0.005 * f_c(f_c_mpa)?) * eps_csd_b_final)
}

/// AS 3600:2018 3.1.7.2: drying shrinkage `ε_csd` = `k_1` `k_4` `ε_csd.b`.
pub fn eps_csd(k_1: f64, k_4: f64, eps_csd_basic: f64) -> f64 {
    k_1 * k_4 * eps_csd_basic
}

/// AS 3600:2018 3.1.7.2: `ε_cs` = `ε_cse` + `ε_csd`.
pub fn eps_cs(eps_cse: f64, eps_csd: f64) -> f64 {
    eps_cse + eps_csd
}

/// AS 3600:2018 3.4.3.2: loss by shrinkage, `E_p` `ε_cs`/(1 + 15 `A_s`/`A_g`), MPa; `A_s` the bonded steel. From memory.
pub fn loss(e_p_mpa: f64, eps_cs: f64, a_s_over_a_g: f64) -> f64 {
    e_p_mpa * eps_cs / (1.0 + 15.0 * a_s_over_a_g)
}
