//! Elastic shortening and creep by the ACI-ASCE 423 method. Stresses and moduli in psi.

use super::super::outside::{Outside, positive};

/// ACI-ASCE 423 method, ES: `K_es` = 0.5 for post-tensioned tendons stressed in turn to one force.
pub const K_ES: f64 = 0.5;

/// ACI-ASCE 423 method, `f_cir`: `K_cir` = 1.0 for post-tensioned members. From memory.
pub const K_CIR: f64 = 1.0;

/// ACI-ASCE 423 method, CR: `K_cr` = 1.6 for post-tensioned members of normal-weight concrete. From memory.
pub const K_CR: f64 = 1.6;

/// ACI 318-19 19.2.2.1(b): `E_c` = 57 000 √`f'_c` of normal-weight concrete, psi; strength above zero.
/// From memory.
///
/// # Errors
/// [`Outside`] where the strength is not above zero.
pub fn e_c(f_c: f64) -> Result<f64, Outside> {
    Ok(57_000.0 * positive("f'c", f_c, " psi", "ACI 318-19 19.2.2.1(b)")?.sqrt())
}

/// ACI-ASCE 423 method, unbonded: ES = `K_es` (`E_s`/`E_ci`) `f_cpa`, psi.
pub fn es_unbonded(k_es: f64, e_s: f64, e_ci: f64, f_cpa: f64) -> f64 {
    k_es * e_s / e_ci * f_cpa
}

/// ACI-ASCE 423 method, bonded: `f_cir` = `K_cir` `f_cpi` − `f_g`, psi.
pub fn f_cir(k_cir: f64, f_cpi: f64, f_g: f64) -> f64 {
    k_cir * f_cpi - f_g
}

/// ACI-ASCE 423 method, bonded: ES = `K_es` (`E_s`/`E_ci`) `f_cir`, psi.
pub fn es_bonded(k_es: f64, e_s: f64, e_ci: f64, f_cir: f64) -> f64 {
    k_es * e_s / e_ci * f_cir
}

/// ACI-ASCE 423 method, unbonded: CR = `K_cr` (`E_s`/`E_c`) `f_cpa`, psi.
pub fn cr_unbonded(k_cr: f64, e_s: f64, e_c: f64, f_cpa: f64) -> f64 {
    k_cr * e_s / e_c * f_cpa
}

/// ACI-ASCE 423 method, bonded: CR = `K_cr` (`E_s`/`E_c`)(`f_cir` − `f_cds`), psi.
pub fn cr_bonded(k_cr: f64, e_s: f64, e_c: f64, f_cir: f64, f_cds: f64) -> f64 {
    k_cr * e_s / e_c * (f_cir - f_cds)
}
