//! The job gives strain and coefficients.

use super::case::{Case, Lost, NoLoss, Place, Turn, When};
use super::equation::{Equation, n};
use crate::job::LongTerm;
use crate::losses::shortening::shortening_mpa;

/// Ep εsh, Ep φ σc/Ec, and ρ1000 × factor of the stress after lock-off.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Direct {
    steel_modulus_mpa: f64,
    concrete_stress_mpa: f64,
    share: f64,
    turn: Turn,
    e_ci_mpa: f64,
    e_c_mpa: f64,
    strain: f64,
    coefficient: f64,
    relaxation: [f64; 2],
}

impl Direct {
    pub(super) fn new(job: &LongTerm, case: &Case, when: When) -> Result<Self, NoLoss> {
        if when != When::Final {
            return Err(NoLoss::FinalOnly("direct"));
        }
        Ok(Self {
            steel_modulus_mpa: case.steel.modulus_mpa,
            concrete_stress_mpa: case.concrete_stress_mpa,
            share: case.turn.share(job.shortening_share),
            turn: case.turn,
            e_ci_mpa: job.concrete_modulus_transfer_mpa,
            e_c_mpa: job.concrete_modulus_mpa,
            strain: job.shrinkage_strain,
            coefficient: job.creep_coefficient,
            relaxation: [job.relaxation_1000h, job.relaxation_factor],
        })
    }

    pub(super) fn at(&self, place: Place) -> Lost {
        let (modulus_mpa, stress_mpa) = (self.steel_modulus_mpa, self.concrete_stress_mpa);
        let [at_1000h, factor] = self.relaxation;
        Lost {
            shortening_mpa: shortening_mpa(self.share, modulus_mpa, self.e_ci_mpa, stress_mpa),
            shrinkage_mpa: modulus_mpa * self.strain,
            creep_mpa: modulus_mpa * self.coefficient * stress_mpa / self.e_c_mpa,
            relaxation_mpa: at_1000h * factor * place.lockoff_mpa,
        }
    }

    pub(super) fn equations(&self, place: Place) -> Vec<Equation> {
        let lost = self.at(place);
        let (modulus, stress) = (n(self.steel_modulus_mpa), n(self.concrete_stress_mpa));
        let [at_1000h, factor] = self.relaxation.map(n);
        let mut lines: Vec<Equation> = self.turn.ordered("share").into_iter().collect();
        lines.extend([
            Equation::new("shortening", lost.shortening_mpa, "MPa", "common practice").by(
                "share (Ep/Eci) sigma_c",
                format!(
                    "{} ({modulus}/{}) {stress}",
                    n(self.share),
                    n(self.e_ci_mpa)
                ),
            ),
            Equation::new("shrinkage", lost.shrinkage_mpa, "MPa", "the job's strain")
                .by("Ep strain", format!("{modulus} x {}", n(self.strain))),
            Equation::new("creep", lost.creep_mpa, "MPa", "the job's coefficient").by(
                "(Ep/Ec) coefficient sigma_c",
                format!(
                    "({modulus}/{}) {} x {stress}",
                    n(self.e_c_mpa),
                    n(self.coefficient)
                ),
            ),
            Equation::new(
                "relaxation",
                lost.relaxation_mpa,
                "MPa",
                "the job's figures",
            )
            .by(
                "rho_1000 x factor x stress after lock-off",
                format!("{at_1000h} x {factor} x {}", n(place.lockoff_mpa)),
            ),
        ]);
        lines
    }
}
