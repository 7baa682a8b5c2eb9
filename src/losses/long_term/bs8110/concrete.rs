//! Strength and modulus of concrete, and what shortens it, BS 8110. Stresses in MPa.

use super::super::outside::{Outside, positive, within};
use crate::job::Environment;

/// EN 206-1 table 7: cube strength over cylinder strength of the usual classes, 1/0.8 (C20/25 to C40/50). From memory.
pub fn f_cu(f_ck_mpa: f64) -> f64 {
    f_ck_mpa / 0.8
}

/// BS 8110-2:1985 7.2: `E_c,28` = 20 000 + 200 `f_cu,28`, MPa; cube strength 20 to 60 MPa. From memory.
///
/// # Errors
/// [`Outside`] table 7.2.
pub fn e_c_28(f_cu_28_mpa: f64) -> Result<f64, Outside> {
    let clause = "BS 8110-2 table 7.2";
    let f_cu_mpa = within("f_cu", f_cu_28_mpa, 20.0..=60.0, " MPa", clause)?;
    Ok(20_000.0 + 200.0 * f_cu_mpa)
}

/// BS 8110-2:1985 7.2: `E_c,t` = `E_c,28` (0.4 + 0.6 `f_cu,t`/`f_cu,28`), MPa; strength then above zero and not above that at
/// 28 days. From memory.
///
/// # Errors
/// [`Outside`] that range.
pub fn e_c_t(e_c_28_mpa: f64, f_cu_t_mpa: f64, f_cu_28_mpa: f64) -> Result<f64, Outside> {
    let clause = "BS 8110-2 7.2";
    positive("f_cu,t", f_cu_t_mpa, " MPa", clause)?;
    let ratio = within(
        "f_cu,t/f_cu,28",
        f_cu_t_mpa / f_cu_28_mpa,
        0.0..=1.0,
        "",
        clause,
    )?;
    Ok(e_c_28_mpa * (0.4 + 0.6 * ratio))
}

/// BS 8110-1:1997 4.8.3: loss by elastic shortening of tendons stressed in turn, half of modular ratio × mean concrete stress
/// at the tendon, MPa. From memory.
pub fn shortening(share: f64, e_s_mpa: f64, e_ci_mpa: f64, stress_mpa: f64) -> f64 {
    share * modular_stress(e_s_mpa, e_ci_mpa, stress_mpa)
}

/// BS 8110-1:1997 4.8.3: modular ratio × concrete stress at the tendon, MPa: the whole, as for a pretensioned tendon.
pub fn modular_stress(e_s_mpa: f64, e_ci_mpa: f64, stress_mpa: f64) -> f64 {
    e_s_mpa / e_ci_mpa * stress_mpa
}

/// BS 8110-1:1997 4.8.4: shrinkage of the concrete, 300e-6 indoors, 100e-6 outdoors. From memory.
pub fn shrinkage_strain(environment: Environment) -> f64 {
    match environment {
        Environment::Interior => 300e-6,
        Environment::Arid | Environment::Temperate | Environment::Tropical => 100e-6,
    }
}

/// BS 8110-1:1997 4.8.4: loss by shrinkage, strain × `E_s`, MPa.
pub fn shrinkage(strain: f64, e_s_mpa: f64) -> f64 {
    strain * e_s_mpa
}

/// BS 8110-1:1997 4.8.5: creep coefficient, 1.8 for stressing at 3 days, 1.4 at 28 days, straight between. From memory.
///
/// # Errors
/// [`Outside`] those ages.
pub fn creep_coefficient(stressing_days: f64) -> Result<f64, Outside> {
    const ROWS: [(f64, f64); 2] = [(3.0, 1.8), (28.0, 1.4)];
    let (symbol, clause) = ("age at stressing", "BS 8110-1 4.8.5");
    super::super::outside::interpolated(&ROWS, symbol, stressing_days, " days", clause)
}

/// BS 8110-1:1997 4.8.5: loss by creep, coefficient × stress × `E_s`/`E_ci`, MPa, the modulus that at stressing; the stress at most a
/// third of the cube strength there. From memory.
///
/// # Errors
/// [`Outside`] where the stress is higher.
pub fn creep(
    coefficient: f64,
    stress_mpa: f64,
    f_cu_t_mpa: f64,
    e_s_mpa: f64,
    e_ci_mpa: f64,
) -> Result<f64, Outside> {
    let (symbol, clause) = ("stress/f_cu,t", "BS 8110-1 4.8.5");
    let range = f64::NEG_INFINITY..=1.0 / 3.0;
    within(symbol, stress_mpa / f_cu_t_mpa, range, "", clause)?;
    Ok(coefficient * modular_stress(e_s_mpa, e_ci_mpa, stress_mpa))
}
