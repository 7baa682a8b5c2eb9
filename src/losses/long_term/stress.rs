//! Concrete stress at the level of a tendon.

use super::case::{Case, Place};
use super::equation::{Equation, n};
use crate::job::Published;

/// What compresses the concrete at the level of one tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Compression {
    /// Mean compression of the floor along the tendon, MPa.
    pub(super) mean_mpa: f64,
    /// An unbonded strand sees the mean only.
    pub(super) bonded: bool,
    /// Permanent load over the load that the tendons' curvature balances, λ: at stressing, and in the end.
    pub(super) load_ratios: [f64; 2],
}

impl Compression {
    /// Of a tendon, by the job's shares of load.
    pub(super) fn of(job: &Published, case: &Case) -> Self {
        let whole = 1.0 / job.balanced_share;
        Self {
            mean_mpa: case.concrete_stress_mpa,
            bonded: job.bonded,
            load_ratios: [job.load_share_at_stressing * whole, whole],
        }
    }

    /// Stress at the strand's level, at stressing and in the end, MPa; for an unbonded strand the mean.
    pub(super) fn stresses_mpa(&self, eccentricity: f64) -> [f64; 2] {
        if !self.bonded {
            return [self.mean_mpa; 2];
        }
        self.load_ratios
            .map(|load_ratio| at_level_mpa(self.mean_mpa, eccentricity, load_ratio))
    }

    /// The line of that stress, at stressing (0) or in the end (1); nothing to show for an unbonded strand.
    pub(super) fn line(&self, symbol: &'static str, place: Place, when: usize) -> Option<Equation> {
        let stress_mpa = self.stresses_mpa(place.eccentricity);
        let (value, ratio) = (*stress_mpa.get(when)?, *self.load_ratios.get(when)?);
        let formula = match when {
            0 => "sigma_cp [1 + (A/I) z^2 (1 - load at stressing/balanced load)]",
            _ => "sigma_cp [1 + (A/I) z^2 (1 - permanent load/balanced load)]",
        };
        self.bonded.then(|| {
            Equation::new(symbol, value, "MPa", "load balancing").by(
                formula,
                format!(
                    "{} [1 + {} (1 - {})]",
                    n(self.mean_mpa),
                    n(place.eccentricity),
                    n(ratio)
                ),
            )
        })
    }
}

/// Stress at the strand's level, MPa: `σ_cp` [1 + (A/I) z² (1 − λ)], from the prestress's own eccentricity and a load that bends
/// the slab λ times as much as the strand's curvature bends it back (load balancing). No less than 0: tension creeps nothing
/// here.
pub fn at_level_mpa(mean_mpa: f64, eccentricity: f64, load_ratio: f64) -> f64 {
    (mean_mpa * (1.0 + eccentricity * (1.0 - load_ratio))).max(0.0)
}
