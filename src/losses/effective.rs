//! A stressed tendon after the concrete has shortened and after the long-term losses: transfer and service.

use super::long_term::{LongTermLoss, long_term_loss};
use super::shortening::shortening_mpa;
use super::{CannotStress, Forces, LaterLosses, Stressed};
use crate::job::LongTerm;

/// A stressed tendon with its later losses: force at all four stages, anywhere.
#[derive(Debug, Clone, Copy)]
pub struct Effective<'s, 'p> {
    stressed: &'s Stressed<'p>,
    shortening_mpa: f64,
    long_term: LongTermLoss,
}

impl<'s, 'p> Effective<'s, 'p> {
    /// Later losses at this mean concrete stress, MPa, compression positive.
    ///
    /// # Errors
    /// [`CannotStress::LossesTakeAll`] where no force would be left somewhere.
    pub fn new(
        stressed: &'s Stressed<'p>,
        job: &LongTerm,
        concrete_stress_mpa: f64,
    ) -> Result<Self, CannotStress> {
        let modulus_mpa = stressed.steel().modulus_mpa;
        let effective = Self {
            stressed,
            shortening_mpa: shortening_mpa(
                job.shortening_share,
                modulus_mpa,
                job.concrete_modulus_transfer_mpa,
                concrete_stress_mpa,
            ),
            long_term: long_term_loss(job, modulus_mpa, concrete_stress_mpa),
        };
        let [_, service_kn] = effective.later_kn(stressed.least_lockoff_kn());
        if service_kn > 0.0 {
            Ok(effective)
        } else {
            Err(CannotStress::LossesTakeAll)
        }
    }

    /// Force at jacking, lock-off, transfer and service, kN; at a bend, the least in it.
    pub fn forces_kn(&self, station_m: f64) -> [f64; 4] {
        let [jacking_kn, lockoff_kn] = self.stressed.both_kn(station_m);
        let [transfer_kn, service_kn] = self.later_kn(lockoff_kn);
        [jacking_kn, lockoff_kn, transfer_kn, service_kn]
    }

    /// Transfer and service from the force after lock-off at the same place, kN.
    fn later_kn(&self, lockoff_kn: f64) -> [f64; 2] {
        let steel = self.stressed.steel();
        let transfer_kn = lockoff_kn - steel.force_kn(self.shortening_mpa);
        let constant_mpa = self.long_term.shrinkage_mpa + self.long_term.creep_mpa;
        let relaxation_kn = self.long_term.relaxation_ratio * lockoff_kn;
        let service_kn = transfer_kn - steel.force_kn(constant_mpa) - relaxation_kn;
        [transfer_kn, service_kn]
    }

    /// What is reported of the tendon as a whole.
    pub fn forces(&self) -> Forces {
        let mean_lockoff_kn = self.stressed.mean_lockoff_kn();
        let mean_lockoff_mpa = self.stressed.steel().stress_mpa(mean_lockoff_kn);
        Forces {
            later: Some(LaterLosses {
                shortening_mpa: self.shortening_mpa,
                shrinkage_mpa: self.long_term.shrinkage_mpa,
                creep_mpa: self.long_term.creep_mpa,
                relaxation_mpa: self.long_term.relaxation_ratio * mean_lockoff_mpa,
                // The later losses are linear in the force after lock-off, so the mean goes through them as a force does.
                mean_service_kn: self.later_kn(mean_lockoff_kn)[1],
            }),
            ..self.stressed.forces()
        }
    }
}
