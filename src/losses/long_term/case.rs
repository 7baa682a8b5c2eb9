//! What a method of long-term loss is given of one tendon, and what it gives back.

use super::Outside;
use super::equation::{Equation, n};
use crate::losses::Steel;

/// One tendon, as a method sees it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Case {
    /// Its strands.
    pub steel: Steel,
    /// Mean compression of the floor along it, MPa.
    pub concrete_stress_mpa: f64,
    /// `A_p`/`A_c`: its strands over the concrete that they compress to that stress.
    pub steel_ratio: f64,
    /// 2 A/u, mm; `None` where no thickness is known.
    pub notional_thickness_mm: Option<f64>,
    /// Whether the job gives it.
    pub thickness_given: bool,
    /// When its turn to be stressed comes.
    pub turn: Turn,
    /// The mean of its places.
    pub mean: Place,
    /// Greatest (A/I) z² on the way.
    pub most_eccentricity: f64,
}

impl Case {
    /// Where the notional thickness comes from, in words.
    pub(super) fn thickness_from(&self) -> &'static str {
        if self.thickness_given {
            "2 A/u as the job gives it"
        } else {
            "2 A/u: the slab's mean thickness along the tendon, which dries from both faces"
        }
    }
}

/// When a tendon's turn to be stressed comes among those that run its way.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Turn {
    /// How many tendons run its way.
    pub tendons: f64,
    /// By the job's order of stressing, the part of them that is stressed after it; `None` where the order does not say.
    pub after: Option<f64>,
}

impl Turn {
    /// One of a great many stressed in turn, in no order known.
    pub fn of_many() -> Self {
        Self {
            tendons: f64::INFINITY,
            after: None,
        }
    }

    /// The share of the whole elastic shortening: by the order of stressing, else the method's own.
    pub(super) fn share(&self, of_method: f64) -> f64 {
        self.after.unwrap_or(of_method)
    }

    /// The line of that share where it goes by the job's order of stressing.
    pub(super) fn ordered(&self, symbol: &'static str) -> Option<Equation> {
        let after = self.after?;
        let clause = "the job's order of stressing";
        Some(Equation::new(symbol, after, "", clause).by(
            "tendons of its run stressed after it/n",
            format!("{}/{}", n(after * self.tendons), n(self.tendons)),
        ))
    }
}

/// A place along a tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// Stress in the strand after lock-off, MPa.
    pub lockoff_mpa: f64,
    /// (A/I) z² of the strand's level in the slab: 12 z²/h², z from mid-depth.
    pub eccentricity: f64,
}

/// Stress lost after lock-off, MPa.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Lost {
    /// Elastic shortening.
    pub shortening_mpa: f64,
    /// Shrinkage.
    pub shrinkage_mpa: f64,
    /// Creep.
    pub creep_mpa: f64,
    /// Relaxation.
    pub relaxation_mpa: f64,
}

impl Lost {
    /// Shrinkage, creep and relaxation together, MPa.
    pub fn long_term_mpa(&self) -> f64 {
        self.shrinkage_mpa + self.creep_mpa + self.relaxation_mpa
    }

    /// Everything after lock-off, MPa.
    pub fn all_mpa(&self) -> f64 {
        self.shortening_mpa + self.long_term_mpa()
    }
}

/// When the loss is asked for.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum When {
    /// In the end.
    Final,
    /// At an age of the concrete, days.
    Age(f64),
}

/// Why a method gives no loss.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum NoLoss {
    /// A clause does not cover a value.
    #[error(transparent)]
    Outside(#[from] Outside),
    /// The thickness of the slab is not known.
    #[error("the slab's thickness along the tendon is not known, which {0} asks for")]
    ThicknessUnknown(&'static str),
    /// The job gives no value that has no default.
    #[error("the job gives no {0}, for which {1} has no default here")]
    NotGiven(&'static str, &'static str),
    /// The method knows no time.
    #[error("the method {0} gives the final loss only, none at another age")]
    FinalOnly(&'static str),
}
