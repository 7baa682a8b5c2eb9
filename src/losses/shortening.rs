//! Loss by the concrete's elastic shortening.

/// Share × (Ep/Eci) σc, MPa: share 0.5 for tendons stressed in turn, 0 where all are stressed at once (common practice).
pub fn shortening_mpa(
    share: f64,
    steel_modulus_mpa: f64,
    concrete_modulus_transfer_mpa: f64,
    concrete_stress_mpa: f64,
) -> f64 {
    share * steel_modulus_mpa / concrete_modulus_transfer_mpa * concrete_stress_mpa
}
