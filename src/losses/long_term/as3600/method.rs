//! The method put together: what a tendon loses at a place.

use super::super::case::{Case, Lost, NoLoss, Place, When};
use super::super::stress::Compression;
use super::{concrete, creep, relaxation, shrinkage};
use crate::job::{Environment, LongTerm, Published};
use crate::losses::long_term::en1992::combined::j;
use crate::losses::shortening::shortening_mpa;

/// Everything of AS 3600 that is the same along a tendon; stresses in MPa.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct As3600 {
    pub(super) case: Case,
    pub(super) compression: Compression,
    pub(super) environment: Environment,
    pub(super) share: f64,
    pub(super) f_c: f64,
    /// Mean strength at stressing (the job's, on the safe side), and at 28 days.
    pub(super) f_cmi: [f64; 2],
    pub(super) e_c: [f64; 2],
    pub(super) t_h: f64,
    /// Ages: end of curing, stressing, asked.
    pub(super) ages: [f64; 3],
    pub(super) k_4: f64,
    pub(super) creep: Creep,
    pub(super) shrinkage: Shrinkage,
    pub(super) steel_ratio: f64,
    /// `k_4`, `k_5`, `R_b` of relaxation.
    pub(super) relaxation: [f64; 3],
}

/// Creep's factors but `k_6`, which depends on the place.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Creep {
    pub(super) phi_cc_b: f64,
    pub(super) alpha_2: f64,
    pub(super) k_2: f64,
    pub(super) k_3: f64,
    pub(super) k_5: f64,
}

/// Shrinkage from stressing on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Shrinkage {
    pub(super) eps_cse_final: f64,
    /// Basic drying shrinkage: the job's, and of this strength.
    pub(super) basic: [f64; 2],
    /// At stressing, and when asked.
    pub(super) eps_cse: [f64; 2],
    pub(super) k_1: [f64; 2],
    pub(super) eps_cs: [f64; 2],
}

impl As3600 {
    pub(in super::super) fn new(job: &LongTerm, case: &Case, when: When) -> Result<Self, NoLoss> {
        let job = &job.published;
        let not_given = |key| NoLoss::NotGiven(key, "AS 3600 3.3.4.3");
        let r_b = job.basic_relaxation.ok_or(not_given("basic_relaxation"))?;
        let k_5 = job
            .relaxation_stress_factor
            .ok_or(not_given("relaxation_stress_factor"))?;
        let t_h = case
            .notional_thickness_mm
            .ok_or(NoLoss::ThicknessUnknown("AS 3600 3.1.7.2"))?;
        let asked = match when {
            When::Final => job.final_days,
            When::Age(days) => days,
        };
        let k_4 = concrete::k_4(job.environment);
        let f_cmi = [
            job.strength_at_stressing_mpa,
            concrete::f_cmi(job.strength_mpa)?,
        ];
        let method = Self {
            case: *case,
            compression: Compression::of(job, case),
            environment: job.environment,
            share: case.turn.share(j(case.turn.tendons)?),
            f_c: job.strength_mpa,
            f_cmi,
            e_c: [concrete::e_cj(f_cmi[0])?, concrete::e_cj(f_cmi[1])?],
            t_h,
            ages: [job.curing_days, job.stressing_days, asked],
            k_4,
            creep: Creep::of(job, t_h, asked, k_4)?,
            shrinkage: Shrinkage::of(job, t_h, asked, k_4)?,
            steel_ratio: job.bonded_steel_ratio,
            relaxation: [relaxation::k_4(asked - job.stressing_days)?, k_5, r_b],
        };
        // What holds where the concrete is stressed most holds along the whole tendon.
        for eccentricity in [0.0, case.most_eccentricity] {
            creep::k_6(method.compression.stresses_mpa(eccentricity)[1], f_cmi[0])?;
        }
        Ok(method)
    }

    /// `k_6` and φ at a sustained stress.
    pub(super) fn phi_cc(&self, sigma_o: f64) -> [f64; 2] {
        let k_6 = creep::k_6(sigma_o, self.f_cmi[0]).unwrap_or(f64::NAN);
        let Creep {
            phi_cc_b,
            k_2,
            k_3,
            k_5,
            ..
        } = self.creep;
        [k_6, creep::phi_cc([k_2, k_3, self.k_4, k_5, k_6], phi_cc_b)]
    }

    /// Shrinkage after stressing.
    pub(super) fn eps_cs(&self) -> f64 {
        self.shrinkage.eps_cs[1] - self.shrinkage.eps_cs[0]
    }

    pub(in super::super) fn at(&self, place: Place) -> Lost {
        let e_p = self.case.steel.modulus_mpa;
        let [at_stressing, sustained] = self.compression.stresses_mpa(place.eccentricity);
        let [_, phi_cc] = self.phi_cc(sustained);
        let [k_4, k_5, r_b] = self.relaxation;
        let shortening_mpa = shortening_mpa(self.share, e_p, self.e_c[0], at_stressing);
        let shrinkage_mpa = shrinkage::loss(e_p, self.eps_cs(), self.steel_ratio);
        let creep_mpa = creep::loss(e_p, phi_cc, sustained, self.e_c[1]);
        Lost {
            shortening_mpa,
            shrinkage_mpa,
            creep_mpa,
            relaxation_mpa: relaxation::loss(
                relaxation::r(k_4, k_5, r_b),
                place.lockoff_mpa - shortening_mpa,
                shrinkage_mpa + creep_mpa,
            ),
        }
    }
}

impl Creep {
    fn of(job: &Published, t_h: f64, asked: f64, k_4: f64) -> Result<Self, NoLoss> {
        let alpha_2 = creep::alpha_2(t_h)?;
        Ok(Self {
            phi_cc_b: creep::phi_cc_b(job.strength_mpa)?,
            alpha_2,
            k_2: creep::k_2(asked - job.stressing_days, t_h)?,
            k_3: creep::k_3(job.stressing_days)?,
            k_5: creep::k_5(job.strength_mpa, creep::alpha_3(k_4, alpha_2))?,
        })
    }
}

impl Shrinkage {
    fn of(job: &Published, t_h: f64, asked: f64, k_4: f64) -> Result<Self, NoLoss> {
        let eps_cse_final = shrinkage::eps_cse_final(job.strength_mpa)?;
        let basic = shrinkage::eps_csd_basic(job.strength_mpa, job.drying_basic)?;
        let at = |age: f64| -> Result<[f64; 3], NoLoss> {
            let eps_cse = shrinkage::eps_cse(eps_cse_final, age)?;
            let k_1 = shrinkage::k_1((age - job.curing_days).max(0.0), t_h)?;
            let eps_csd = shrinkage::eps_csd(k_1, k_4, basic);
            Ok([eps_cse, k_1, shrinkage::eps_cs(eps_cse, eps_csd)])
        };
        let (before, after) = (at(job.stressing_days)?, at(asked)?);
        Ok(Self {
            eps_cse_final,
            basic: [job.drying_basic, basic],
            eps_cse: [before[0], after[0]],
            k_1: [before[1], after[1]],
            eps_cs: [before[2], after[2]],
        })
    }
}
