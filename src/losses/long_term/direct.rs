//! The job gives strain and coefficients.

use super::LongTermLoss;
use crate::job::LongTerm;

/// Ep εsh, Ep φ σc/Ec, and ρ1000 × factor of the stress after lock-off.
pub(super) fn loss(
    job: &LongTerm,
    steel_modulus_mpa: f64,
    concrete_stress_mpa: f64,
) -> LongTermLoss {
    LongTermLoss {
        shrinkage_mpa: steel_modulus_mpa * job.shrinkage_strain,
        creep_mpa: steel_modulus_mpa * job.creep_coefficient * concrete_stress_mpa
            / job.concrete_modulus_mpa,
        relaxation_ratio: job.relaxation_1000h * job.relaxation_factor,
    }
}
