//! Concrete stress at the level of a bonded tendon.

use crate::job::Published;

/// Stress at the strand's level, MPa: `σ_cp` [1 + (A/I) z² (1 − λ)], from the prestress's own eccentricity and a load that bends
/// the slab λ times as much as the strand's curvature bends it back (load balancing). No less than 0: tension creeps nothing
/// here.
pub fn at_level_mpa(mean_mpa: f64, eccentricity: f64, load_ratio: f64) -> f64 {
    (mean_mpa * (1.0 + eccentricity * (1.0 - load_ratio))).max(0.0)
}

/// Permanent load over the load that the tendons' curvature balances, λ: at stressing, and in the end.
pub(super) fn load_ratios(job: &Published) -> [f64; 2] {
    let whole = 1.0 / job.balanced_share;
    [job.load_share_at_stressing * whole, whole]
}
