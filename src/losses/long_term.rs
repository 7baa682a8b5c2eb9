//! Shrinkage, creep and relaxation; one file per published method.

mod direct;

use crate::job::{LongTerm, LongTermMethod};

/// Long-term losses of a tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LongTermLoss {
    /// Shrinkage, MPa.
    pub shrinkage_mpa: f64,
    /// Creep, MPa.
    pub creep_mpa: f64,
    /// Relaxation as a fraction of the stress after lock-off at each point.
    pub relaxation_ratio: f64,
}

/// Long-term losses by the job's method, at this mean concrete stress.
pub fn long_term_loss(
    job: &LongTerm,
    steel_modulus_mpa: f64,
    concrete_stress_mpa: f64,
) -> LongTermLoss {
    match job.method {
        LongTermMethod::Direct => direct::loss(job, steel_modulus_mpa, concrete_stress_mpa),
    }
}
