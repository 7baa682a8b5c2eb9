//! The method put together: what a tendon loses at a place.

use super::super::case::{Case, Lost, NoLoss, Place, Turn, When};
use super::super::stress::Compression;
use super::{concrete, relaxation};
use crate::job::{Environment, LongTerm, Published, RelaxationClass};

/// Everything of BS 8110 that is the same along a tendon; stresses in MPa.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Bs8110 {
    pub(super) compression: Compression,
    pub(super) turn: Turn,
    pub(super) environment: Environment,
    pub(super) class: RelaxationClass,
    pub(super) e_s: f64,
    /// Cube strength at stressing, and at 28 days.
    pub(super) f_cu: [f64; 2],
    /// Modulus at stressing, and at 28 days.
    pub(super) e_c: [f64; 2],
    pub(super) share: f64,
    pub(super) strain: f64,
    pub(super) stressing_days: f64,
    pub(super) coefficient: f64,
    pub(super) load_over_strength: f64,
    pub(super) loss_1000h: f64,
    pub(super) factor: f64,
}

/// BS 8110-1:1997 4.8.3: half, for tendons stressed in turn. From memory.
const IN_TURN: f64 = 0.5;

impl Bs8110 {
    pub(in super::super) fn new(job: &LongTerm, case: &Case, when: When) -> Result<Self, NoLoss> {
        if when != When::Final {
            return Err(NoLoss::FinalOnly("bs8110"));
        }
        let job: &Published = &job.published;
        let f_cu = [job.strength_at_stressing_mpa, job.strength_mpa].map(concrete::f_cu);
        let e_c_28 = concrete::e_c_28(f_cu[1])?;
        let load_over_strength = case.mean.lockoff_mpa / case.steel.strength_mpa;
        let class = job.relaxation_class;
        let method = Self {
            compression: Compression::of(job, case),
            turn: case.turn,
            environment: job.environment,
            class,
            e_s: case.steel.modulus_mpa,
            f_cu,
            e_c: [concrete::e_c_t(e_c_28, f_cu[0], f_cu[1])?, e_c_28],
            share: case.turn.share(IN_TURN),
            strain: concrete::shrinkage_strain(job.environment),
            stressing_days: job.stressing_days,
            coefficient: concrete::creep_coefficient(job.stressing_days)?,
            load_over_strength,
            loss_1000h: relaxation::loss_1000h(class, load_over_strength)?,
            factor: relaxation::factor(class)?,
        };
        // What holds where the concrete is stressed most holds along the whole tendon.
        for eccentricity in [0.0, case.most_eccentricity] {
            method.creep_mpa(method.stress_mpa(eccentricity))?;
        }
        Ok(method)
    }

    /// Concrete stress at the strand's level at stressing, MPa; for an unbonded strand the mean.
    pub(super) fn stress_mpa(&self, eccentricity: f64) -> f64 {
        self.compression.stresses_mpa(eccentricity)[0]
    }

    fn creep_mpa(&self, stress_mpa: f64) -> Result<f64, NoLoss> {
        let (f_cu_t, e_ci) = (self.f_cu[0], self.e_c[0]);
        Ok(concrete::creep(
            self.coefficient,
            stress_mpa,
            f_cu_t,
            self.e_s,
            e_ci,
        )?)
    }

    pub(in super::super) fn at(&self, place: Place) -> Lost {
        let stress_mpa = self.stress_mpa(place.eccentricity);
        Lost {
            shortening_mpa: concrete::shortening(self.share, self.e_s, self.e_c[0], stress_mpa),
            shrinkage_mpa: concrete::shrinkage(self.strain, self.e_s),
            creep_mpa: self.creep_mpa(stress_mpa).unwrap_or(f64::NAN),
            relaxation_mpa: relaxation::relaxation(self.loss_1000h, self.factor)
                * place.lockoff_mpa,
        }
    }
}
