//! Relaxation, AS 3600:2018 3.3.4.3 and 3.4.3.4. Basic relaxation and stress factor are the job's: the standard's figures were
//! not at hand.

use super::super::outside::{Outside, within};

/// AS 3600:2018 3.3.4.3: `k_4` = log10(5.4 j^(1/6)), j days after stressing, from 1 on; 1 at 1000 hours. From memory.
///
/// # Errors
/// [`Outside`] that.
pub fn k_4(j_days: f64) -> Result<f64, Outside> {
    let range = 1.0..=f64::INFINITY;
    let j_days = within("j", j_days, range, " days", "AS 3600 3.3.4.3")?;
    Ok((5.4 * j_days.powf(1.0 / 6.0)).log10())
}

/// AS 3600:2018 3.3.4.3: design relaxation R = `k_4` `k_5` `R_b`, as a part of the initial stress; `k_6`, for warmth, is left in the
/// job's `k_5`. From memory.
pub fn r(k_4: f64, k_5: f64, r_b: f64) -> f64 {
    k_4 * k_5 * r_b
}

/// AS 3600:2018 3.4.3.4: loss by relaxation, R `σ_pi` (1 − (shrinkage and creep loss)/`σ_pi`), MPa; not below zero. From memory.
pub fn loss(r: f64, sigma_pi_mpa: f64, shrinkage_and_creep_mpa: f64) -> f64 {
    r * (sigma_pi_mpa - shrinkage_and_creep_mpa).max(0.0)
}
