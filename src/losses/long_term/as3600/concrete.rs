//! Strength and modulus of concrete, AS 3600:2018 3.1.

use super::super::outside::{Outside, interpolated, within};
use crate::job::Environment;

/// AS 3600:2018 3.1.1.1: characteristic strength `f'_c`, 20 to 100 MPa.
///
/// # Errors
/// [`Outside`] that.
pub(super) fn f_c(f_c_mpa: f64) -> Result<f64, Outside> {
    within("f'c", f_c_mpa, 20.0..=100.0, " MPa", "AS 3600 3.1.1.1")
}

/// AS 3600:2018 table 3.1.2: mean in-situ strength `f_cmi`, MPa, by `f'_c` 20 to 100 MPa, straight between its rows. From memory.
///
/// # Errors
/// [`Outside`] the table.
pub fn f_cmi(f_c_mpa: f64) -> Result<f64, Outside> {
    const ROWS: [(f64, f64); 8] = [
        (20.0, 22.0),
        (25.0, 28.0),
        (32.0, 35.0),
        (40.0, 43.0),
        (50.0, 53.0),
        (65.0, 68.0),
        (80.0, 82.0),
        (100.0, 99.0),
    ];
    interpolated(&ROWS, "f'c", f_c_mpa, " MPa", "AS 3600 table 3.1.2")
}

/// AS 3600:2018 3.1.2: `E_cj` = ρ^1.5 0.043 √`f_cmi` to 40 MPa, ρ^1.5 (0.024 √`f_cmi` + 0.12) above; ρ = 2400 kg/m³; MPa. `f_cmi` above
/// zero, to 99 MPa. From memory.
///
/// # Errors
/// [`Outside`] that range.
pub fn e_cj(f_cmi_mpa: f64) -> Result<f64, Outside> {
    let root = within("f_cmi", f_cmi_mpa, 0.0..=99.0, " MPa", "AS 3600 3.1.2")?.sqrt();
    let by_root = if is_weak(f_cmi_mpa) {
        0.043 * root
    } else {
        0.024 * root + 0.12
    };
    Ok(2400_f64.powf(1.5) * by_root)
}

/// Whether the first branch of [`e_cj`] holds.
pub(super) fn is_weak(f_cmi_mpa: f64) -> bool {
    f_cmi_mpa <= 40.0
}

/// AS 3600:2018 3.1.7.2: `k_4` 0.7 arid, 0.65 interior, 0.6 temperate inland, 0.5 tropical or near-coastal.
pub fn k_4(environment: Environment) -> f64 {
    match environment {
        Environment::Arid => 0.7,
        Environment::Interior => 0.65,
        Environment::Temperate => 0.6,
        Environment::Tropical => 0.5,
    }
}

/// AS 3600:2018 3.1.7.2, 3.1.8.3: hypothetical thickness `t_h` = 2 A/u, 50 to 400 mm: the sizes of the standard's curves. The
/// range from memory.
///
/// # Errors
/// [`Outside`] that.
pub(super) fn t_h(t_h_mm: f64) -> Result<f64, Outside> {
    let clause = "AS 3600 figures 3.1.7.2 and 3.1.8.3";
    within("t_h", t_h_mm, 50.0..=400.0, " mm", clause)
}
