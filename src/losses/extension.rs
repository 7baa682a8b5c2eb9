//! Extension of the strand at a live end.

/// Elastic extension under a force integrated along the tendon, ∫ P ds / (E A), mm.
pub fn extension_mm(area_kn_m: f64, stiffness_kn: f64) -> f64 {
    1e3 * area_kn_m / stiffness_kn
}
