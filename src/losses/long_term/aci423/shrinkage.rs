//! Shrinkage by the ACI-ASCE 423 method.

use super::super::outside::{Outside, interpolated, within};

/// ACI-ASCE 423 method, table 1: `K_sh` by days from the end of moist curing to stressing, 1 to 60, straight between its rows.
/// From memory.
///
/// # Errors
/// [`Outside`] the table.
pub fn k_sh(days: f64) -> Result<f64, Outside> {
    const ROWS: [(f64, f64); 8] = [
        (1.0, 0.92),
        (3.0, 0.85),
        (5.0, 0.80),
        (7.0, 0.77),
        (10.0, 0.73),
        (20.0, 0.64),
        (30.0, 0.58),
        (60.0, 0.45),
    ];
    let symbol = "days from end of curing to stressing";
    interpolated(&ROWS, symbol, days, "", "ACI-ASCE 423 method, table 1")
}

/// ACI-ASCE 423 method: SH = 8.2e-6 `K_sh` `E_s` (1 − 0.06 V/S)(100 − RH), psi; V/S in inches, 0 to 1/0.06, RH 0 to 100 %.
///
/// # Errors
/// [`Outside`] those ranges.
pub fn sh(k_sh: f64, e_s: f64, v_over_s_in: f64, humidity: f64) -> Result<f64, Outside> {
    let clause = "ACI-ASCE 423 method, SH";
    let v_over_s_in = within("V/S", v_over_s_in, 0.0..=1.0 / 0.06, " in", clause)?;
    let humidity = within("RH", humidity, 0.0..=100.0, " %", clause)?;
    Ok(8.2e-6 * k_sh * e_s * (1.0 - 0.06 * v_over_s_in) * (100.0 - humidity))
}
