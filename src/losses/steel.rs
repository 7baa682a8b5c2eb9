//! The strands of a tendon, as the job knows them.

use super::Steel;
use crate::floor::Tendon;
use crate::job::{StrandSize, TendonJob};

/// The steel of one tendon; `None` where the count of strands is not known, or the size is not among the job's.
/// A mark without a size has the job's default size, if there is one.
pub fn steel(tendon: &Tendon, known: &TendonJob) -> Option<Steel> {
    let strands = tendon.strands.filter(|&strands| strands > 0)?;
    let size = strand_size(tendon, known)?;
    Some(Steel {
        area_mm2: f64::from(strands) * size.area_mm2,
        strength_mpa: size.strength_mpa,
        modulus_mpa: known.strand_modulus_mpa,
    })
}

/// The size that a tendon with strands is worked out with: the drawing's, or the job's default where the drawing gives none.
/// `None` as for [`steel`].
pub fn strand_size<'a>(tendon: &Tendon, known: &'a TendonJob) -> Option<&'a StrandSize> {
    tendon.strands.filter(|&strands| strands > 0)?;
    let name = tendon.strand.as_ref().or(known.default_strand.as_ref())?;
    known.strands.iter().find(|size| size.name == *name)
}

impl Steel {
    /// Force at the jack at this fraction of strength, kN.
    pub fn jacking_kn(&self, ratio: f64) -> f64 {
        ratio * self.strength_mpa * self.area_mm2 * 1e-3
    }

    /// E A, kN.
    pub fn stiffness_kn(&self) -> f64 {
        self.modulus_mpa * self.area_mm2 * 1e-3
    }

    /// The force that makes this stress, kN.
    pub fn force_kn(&self, stress_mpa: f64) -> f64 {
        stress_mpa * self.area_mm2 * 1e-3
    }

    /// The stress that this force makes, MPa.
    pub fn stress_mpa(&self, force_kn: f64) -> f64 {
        force_kn * 1e3 / self.area_mm2
    }
}
