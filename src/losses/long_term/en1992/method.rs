//! The method put together: what a tendon loses at a place.

use super::super::case::{Case, Lost, NoLoss, Place, When};
use super::super::stress::Compression;
use super::{combined, concrete, creep, relaxation, shrinkage};
use crate::job::{LongTerm, Published};
use crate::losses::shortening::shortening_mpa;

/// Everything of EN 1992-1-1 that is the same along a tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct En1992 {
    pub(super) case: Case,
    pub(super) compression: Compression,
    pub(super) concrete: Concrete,
    pub(super) creep: Creep,
    pub(super) shrinkage: Shrinkage,
    pub(super) relaxation: Relaxation,
    /// Share of elastic shortening: j, or by the order of stressing.
    pub(super) share: f64,
}

/// Strengths and moduli, MPa.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Concrete {
    pub(super) f_ck: f64,
    pub(super) f_ck_t0: f64,
    pub(super) f_cm: f64,
    pub(super) f_cm_t0: f64,
    pub(super) e_cm: f64,
    pub(super) e_cm_t0: f64,
}

/// Creep's factors.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Creep {
    pub(super) humidity: f64,
    pub(super) h_0: f64,
    pub(super) t_0: f64,
    pub(super) t: f64,
    pub(super) phi_rh: f64,
    pub(super) beta_fcm: f64,
    pub(super) alpha: f64,
    pub(super) t_0_adjusted: f64,
    pub(super) beta_t0: f64,
    pub(super) phi_0: f64,
    pub(super) beta_h: f64,
    pub(super) beta_c: f64,
    pub(super) phi: f64,
}

/// Shrinkage from stressing on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Shrinkage {
    pub(super) t_s: f64,
    pub(super) beta_rh: f64,
    pub(super) alpha_ds: [f64; 2],
    pub(super) eps_cd_0: f64,
    pub(super) k_h: f64,
    /// At stressing, and when asked.
    pub(super) beta_ds: [f64; 2],
    pub(super) eps_ca_inf: f64,
    pub(super) beta_as: [f64; 2],
    pub(super) eps_cs: [f64; 2],
}

/// Relaxation's class, ρ1000 and time.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Relaxation {
    pub(super) class: crate::job::RelaxationClass,
    pub(super) rho_1000: f64,
    pub(super) hours: f64,
}

impl En1992 {
    pub(in super::super) fn new(job: &LongTerm, case: &Case, when: When) -> Result<Self, NoLoss> {
        let job = &job.published;
        let clause = "EN 1992-1-1 (B.6)";
        let h_0 = case
            .notional_thickness_mm
            .ok_or(NoLoss::ThicknessUnknown(clause))?;
        let t = match when {
            When::Final => job.final_days,
            When::Age(days) => days,
        };
        let concrete = Concrete::of(job)?;
        let method = Self {
            case: *case,
            compression: Compression::of(job, case),
            concrete,
            creep: Creep::of(job, &concrete, h_0, t)?,
            shrinkage: Shrinkage::of(job, &concrete, h_0, t)?,
            relaxation: Relaxation {
                class: job.relaxation_class,
                rho_1000: relaxation::rho_1000(job.relaxation_class),
                hours: match when {
                    When::Final => relaxation::FINAL_HOURS,
                    When::Age(days) => {
                        (24.0 * (days - job.stressing_days)).clamp(0.0, relaxation::FINAL_HOURS)
                    }
                },
            },
            share: case.turn.share(combined::j(case.turn.tendons)?),
        };
        // What holds where concrete and strand are stressed most holds along the whole tendon.
        for eccentricity in [0.0, case.most_eccentricity] {
            let [_, sigma_c] = method.compression.stresses_mpa(eccentricity);
            creep::phi_nl(method.creep.phi, sigma_c, concrete.f_ck_t0)?;
        }
        Ok(method)
    }

    /// Elastic shortening at a place, MPa.
    pub(super) fn shortening_mpa(&self, place: Place) -> f64 {
        let [sigma_c, _] = self.compression.stresses_mpa(place.eccentricity);
        let steel_mpa = self.case.steel.modulus_mpa;
        shortening_mpa(self.share, steel_mpa, self.concrete.e_cm_t0, sigma_c)
    }

    /// Relaxation alone, as a fraction of the stress after elastic shortening.
    pub(super) fn relaxed(&self, sigma_pi_mpa: f64) -> f64 {
        let Relaxation {
            class,
            rho_1000,
            hours,
        } = self.relaxation;
        let mu = sigma_pi_mpa / self.case.steel.strength_mpa;
        relaxation::delta_sigma_pr(class, rho_1000, mu, hours).unwrap_or(f64::NAN)
    }

    /// Expression (5.46) at a place.
    pub(super) fn combined(&self, place: Place) -> combined::Combined {
        let [_, sigma_c_mpa] = self.compression.stresses_mpa(place.eccentricity);
        let sigma_pi_mpa = place.lockoff_mpa - self.shortening_mpa(place);
        let phi = creep::phi_nl(self.creep.phi, sigma_c_mpa, self.concrete.f_ck_t0);
        combined::Combined {
            eps_cs: self.shrinkage.eps_cs[1] - self.shrinkage.eps_cs[0],
            e_p_mpa: self.case.steel.modulus_mpa,
            e_cm_mpa: self.concrete.e_cm,
            delta_sigma_pr_mpa: self.relaxed(sigma_pi_mpa) * sigma_pi_mpa,
            phi: phi.unwrap_or(f64::NAN),
            sigma_c_mpa,
            a_p_over_a_c: self.case.steel_ratio,
            eccentricity: place.eccentricity,
        }
    }

    pub(in super::super) fn at(&self, place: Place) -> Lost {
        let [shrinkage_mpa, creep_mpa, relaxation_mpa] = self.combined(place).parts_mpa();
        Lost {
            shortening_mpa: self.shortening_mpa(place),
            shrinkage_mpa,
            creep_mpa,
            relaxation_mpa,
        }
    }
}

impl Concrete {
    fn of(job: &Published) -> Result<Self, NoLoss> {
        let f_cm = concrete::f_cm(job.strength_mpa)?;
        let f_cm_t0 = concrete::f_cm_t(job.strength_at_stressing_mpa, job.strength_mpa)?;
        let e_cm = concrete::e_cm(f_cm)?;
        Ok(Self {
            f_ck: job.strength_mpa,
            f_ck_t0: job.strength_at_stressing_mpa,
            f_cm,
            f_cm_t0,
            e_cm,
            e_cm_t0: concrete::e_cm_t(f_cm_t0, f_cm, e_cm),
        })
    }
}

impl Creep {
    fn of(job: &Published, concrete: &Concrete, h_0: f64, t: f64) -> Result<Self, NoLoss> {
        let (humidity, t_0, f_cm) = (job.humidity, job.stressing_days, concrete.f_cm);
        let phi_rh = creep::phi_rh(humidity, h_0, f_cm)?;
        let beta_fcm = creep::beta_fcm(f_cm);
        let t_0_adjusted = creep::t_0_adjusted(t_0, job.cement)?;
        let beta_t0 = creep::beta_t0(t_0_adjusted);
        let phi_0 = creep::phi_0(phi_rh, beta_fcm, beta_t0);
        let beta_h = creep::beta_h(humidity, h_0, f_cm)?;
        let beta_c = creep::beta_c(t, t_0, beta_h)?;
        Ok(Self {
            humidity,
            h_0,
            t_0,
            t,
            phi_rh,
            beta_fcm,
            alpha: creep::alpha(job.cement),
            t_0_adjusted,
            beta_t0,
            phi_0,
            beta_h,
            beta_c,
            phi: creep::phi(phi_0, beta_c),
        })
    }
}

impl Shrinkage {
    fn of(job: &Published, concrete: &Concrete, h_0: f64, t: f64) -> Result<Self, NoLoss> {
        let (t_s, cement) = (job.curing_days, job.cement);
        let beta_rh = shrinkage::beta_rh(job.humidity)?;
        let eps_cd_0 = shrinkage::eps_cd_0(cement, concrete.f_cm, beta_rh);
        let k_h = shrinkage::k_h(h_0)?;
        let eps_ca_inf = shrinkage::eps_ca_inf(concrete.f_ck)?;
        let at = |age: f64| -> Result<[f64; 3], NoLoss> {
            let beta_ds = shrinkage::beta_ds(age, t_s, h_0)?;
            let beta_as = shrinkage::beta_as(age)?;
            let drying = shrinkage::eps_cd(beta_ds, k_h, eps_cd_0);
            let autogenous = shrinkage::eps_ca(beta_as, eps_ca_inf);
            Ok([beta_ds, beta_as, shrinkage::eps_cs(drying, autogenous)])
        };
        let (before, after) = (at(job.stressing_days)?, at(t)?);
        Ok(Self {
            t_s,
            beta_rh,
            alpha_ds: [shrinkage::alpha_ds1(cement), shrinkage::alpha_ds2(cement)],
            eps_cd_0,
            k_h,
            beta_ds: [before[0], after[0]],
            eps_ca_inf,
            beta_as: [before[1], after[1]],
            eps_cs: [before[2], after[2]],
        })
    }
}
