//! The method put together: what a tendon loses at a place. Its own units inside, psi and inches.

use super::super::case::{Case, Lost, NoLoss, Place, Turn, When};
use super::super::stress::Compression;
use super::units::{inches, mpa, psi};
use super::{elastic, relaxation, shrinkage};
use crate::job::{LongTerm, RelaxationClass};

/// Everything of the method that is the same along a tendon; stresses in psi.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Aci423 {
    pub(super) compression: Compression,
    pub(super) turn: Turn,
    pub(super) class: RelaxationClass,
    pub(super) f_cpa: f64,
    pub(super) k_es: f64,
    pub(super) e_s: f64,
    pub(super) f_c: [f64; 2],
    /// At stressing, and at 28 days.
    pub(super) e_c: [f64; 2],
    pub(super) days: f64,
    pub(super) k_sh: f64,
    pub(super) v_over_s: f64,
    pub(super) humidity: f64,
    pub(super) sh: f64,
    pub(super) k_re: f64,
    pub(super) j: f64,
    pub(super) f_pi_over_f_pu: f64,
    pub(super) c: f64,
}

/// What bends a section at a place, psi.
#[expect(clippy::struct_field_names, reason = "the method's own symbols")]
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Bending {
    pub(super) f_cpi: f64,
    pub(super) f_g: f64,
    pub(super) f_cir: f64,
    pub(super) f_cds: f64,
}

impl Aci423 {
    pub(in super::super) fn new(job: &LongTerm, case: &Case, when: When) -> Result<Self, NoLoss> {
        if when != When::Final {
            return Err(NoLoss::FinalOnly("aci423"));
        }
        let job = &job.published;
        let clause = "the ACI-ASCE 423 method, SH";
        let v_over_s_mm = case
            .notional_thickness_mm
            .ok_or(NoLoss::ThicknessUnknown(clause))?
            / 2.0;
        let f_c = [job.strength_at_stressing_mpa, job.strength_mpa].map(psi);
        let days = job.stressing_days - job.curing_days;
        let (e_s, v_over_s) = (psi(case.steel.modulus_mpa), inches(v_over_s_mm));
        let k_sh = shrinkage::k_sh(days)?;
        let f_pu_ksi = psi(case.steel.strength_mpa) / 1000.0;
        let (k_re, j) = relaxation::k_re_and_j(job.relaxation_class, f_pu_ksi)?;
        let f_pi_over_f_pu = case.mean.lockoff_mpa / case.steel.strength_mpa;
        Ok(Self {
            compression: Compression::of(job, case),
            turn: case.turn,
            class: job.relaxation_class,
            f_cpa: psi(case.concrete_stress_mpa),
            k_es: case.turn.share(elastic::K_ES),
            e_s,
            f_c,
            e_c: [elastic::e_c(f_c[0])?, elastic::e_c(f_c[1])?],
            days,
            k_sh,
            v_over_s,
            humidity: job.humidity,
            sh: shrinkage::sh(k_sh, e_s, v_over_s, job.humidity)?,
            k_re,
            j,
            f_pi_over_f_pu,
            c: relaxation::c(job.relaxation_class, f_pi_over_f_pu)?,
        })
    }

    /// The stresses of a bonded strand's place, psi; the balanced part of each load bends against the strand.
    pub(super) fn bending(&self, place: Place) -> Bending {
        let [at_stressing, whole] = self.compression.load_ratios;
        let by_strand = self.f_cpa * place.eccentricity;
        let (f_cpi, f_g) = (self.f_cpa + by_strand, by_strand * at_stressing);
        Bending {
            f_cpi,
            f_g,
            f_cir: elastic::f_cir(elastic::K_CIR, f_cpi, f_g).max(0.0),
            f_cds: by_strand * (whole - at_stressing),
        }
    }

    /// ES and CR at a place, psi; no less than 0.
    pub(super) fn elastic(&self, place: Place) -> [f64; 2] {
        let [e_ci, e_c] = self.e_c;
        let (k_es, k_cr, e_s) = (self.k_es, elastic::K_CR, self.e_s);
        if !self.compression.bonded {
            return [
                elastic::es_unbonded(k_es, e_s, e_ci, self.f_cpa),
                elastic::cr_unbonded(k_cr, e_s, e_c, self.f_cpa),
            ];
        }
        let Bending { f_cir, f_cds, .. } = self.bending(place);
        [
            elastic::es_bonded(k_es, e_s, e_ci, f_cir),
            elastic::cr_bonded(k_cr, e_s, e_c, f_cir, f_cds).max(0.0),
        ]
    }

    pub(in super::super) fn at(&self, place: Place) -> Lost {
        let [es, cr] = self.elastic(place);
        Lost {
            shortening_mpa: mpa(es),
            shrinkage_mpa: mpa(self.sh),
            creep_mpa: mpa(cr),
            relaxation_mpa: mpa(relaxation::re(self.k_re, self.j, self.sh, cr, es, self.c)),
        }
    }
}
