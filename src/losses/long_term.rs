//! Elastic shortening, shrinkage, creep and relaxation by published method: one folder a method, one pure function an equation.
//!
//! A method is made for a tendon ([`Method::new`]) and then asked at a place along it ([`Method::at`]); its working, equation
//! by equation with the numbers in, comes from the same value ([`Method::equations`]). A bonded tendon is asked at each place;
//! an unbonded one has the mean of its places everywhere.

pub mod aci423;
pub mod as3600;
pub mod bs8110;
mod case;
mod direct;
pub mod en1992;
mod equation;
mod outside;
mod recalled;
mod stress;

pub use case::{Case, Lost, NoLoss, Place, Turn, When};
pub use equation::Equation;
pub use outside::Outside;
pub use recalled::recalled;
pub use stress::at_level_mpa;

use crate::job::{LongTerm, LongTermMethod};

/// A method, made for one tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Method {
    /// The job gives strain and coefficients.
    Direct(direct::Direct),
    /// EN 1992-1-1:2004.
    En1992(en1992::En1992),
    /// The ACI-ASCE 423 method.
    Aci423(aci423::Aci423),
    /// BS 8110-1:1997.
    Bs8110(bs8110::Bs8110),
    /// AS 3600:2018.
    As3600(as3600::As3600),
}

impl Method {
    /// Makes a method for a tendon.
    ///
    /// # Errors
    /// [`NoLoss`]: what a clause does not cover, or what it asks for and nobody gave.
    pub fn new(
        method: LongTermMethod,
        job: &LongTerm,
        case: &Case,
        when: When,
    ) -> Result<Self, NoLoss> {
        Ok(match method {
            LongTermMethod::Direct => Self::Direct(direct::Direct::new(job, case, when)?),
            LongTermMethod::En1992 => Self::En1992(en1992::En1992::new(job, case, when)?),
            LongTermMethod::Aci423 => Self::Aci423(aci423::Aci423::new(job, case, when)?),
            LongTermMethod::Bs8110 => Self::Bs8110(bs8110::Bs8110::new(job, case, when)?),
            LongTermMethod::As3600 => Self::As3600(as3600::As3600::new(job, case, when)?),
        })
    }

    /// What the strand loses at a place.
    pub fn at(&self, place: Place) -> Lost {
        match self {
            Self::Direct(method) => method.at(place),
            Self::En1992(method) => method.at(place),
            Self::Aci423(method) => method.at(place),
            Self::Bs8110(method) => method.at(place),
            Self::As3600(method) => method.at(place),
        }
    }

    /// The working at a place.
    pub fn equations(&self, place: Place) -> Vec<Equation> {
        match self {
            Self::Direct(method) => method.equations(place),
            Self::En1992(method) => method.equations(place),
            Self::Aci423(method) => method.equations(place),
            Self::Bs8110(method) => method.equations(place),
            Self::As3600(method) => method.equations(place),
        }
    }

    /// Whether the loss is linear in stress after lock-off and eccentricity, so that the mean place has the mean loss.
    pub(super) fn is_linear(&self) -> bool {
        matches!(self, Self::Direct(_))
    }
}
