//! What a height number measures: from which face, to which part of the tendon.

use super::readings::{HeightText, Word};
use super::types::{Faces, PointKind};
use super::zones::SAME_M;
use crate::job::{Datum, FromFace, HeightReading, Soffit};

/// A height above the local soffit, and what it would be from the other soffit; see [`super::types::Point`].
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub(super) struct Measured {
    pub(super) height_m: Option<f64>,
    pub(super) other_soffit_m: Option<f64>,
}

/// How the job measures, over the general slab.
pub(super) struct Measures<'a> {
    pub(super) job: &'a HeightReading,
    pub(super) general: Faces,
}

impl Measured {
    /// A height that does not depend on which soffit is meant.
    pub(super) fn height(height_m: Option<f64>) -> Self {
        Self {
            height_m,
            other_soffit_m: None,
        }
    }
}

impl Measures<'_> {
    /// Strand centroid above the local soffit.
    pub(super) fn height(&self, reading: HeightText, kind: PointKind, faces: Faces) -> Measured {
        if reading.middle {
            return Measured::height(faces.thickness_m.map(|t| t / 2.0));
        }
        let (value_m, in_duct_m) = (reading.value_m, self.in_duct_m(reading.datum, kind));
        let from_soffit = Some(value_m + in_duct_m);
        let from_top = faces.thickness_m.map(|t| t - value_m + in_duct_m);
        match (reading.from, reading.word) {
            (FromFace::Top, _) | (FromFace::NearerFace, Some(Word::High)) => {
                Measured::height(from_top)
            }
            (FromFace::Soffit, _) | (FromFace::NearerFace, Some(Word::Low)) => {
                self.above_a_soffit(value_m + in_duct_m, faces)
            }
            // At mid-depth no face is the nearer.
            (FromFace::NearerFace, None) => Measured::height(from_soffit.filter(|soffit_m| {
                from_top.is_some_and(|top_m| (soffit_m - top_m).abs() <= SAME_M)
            })),
        }
    }

    fn above_a_soffit(&self, value_m: f64, faces: Faces) -> Measured {
        let step_m = self
            .general
            .soffit_m()
            .and_then(|general_m| Some(general_m - faces.soffit_m()?));
        let from_general = step_m.map(|step_m| value_m + step_m);
        let stepped = step_m.is_some_and(|step_m| step_m.abs() > SAME_M);
        match self.job.soffit {
            Soffit::Local => Measured {
                height_m: Some(value_m),
                other_soffit_m: from_general.filter(|_| stepped),
            },
            Soffit::General => Measured {
                height_m: from_general,
                other_soffit_m: stepped.then_some(value_m),
            },
        }
    }

    /// A chair stands on the form and carries the duct: its height is that of the duct's underside. From there the strand
    /// lies higher in the duct at a low point than at a high one; between, and at an anchor, it is taken midway.
    fn in_duct_m(&self, datum: Datum, kind: PointKind) -> f64 {
        let job = self.job;
        match (datum, kind) {
            (Datum::Centroid, _) => 0.0,
            (Datum::DuctUnderside | Datum::Chair, PointKind::Low) => job.strand_in_duct_low_m,
            (Datum::DuctUnderside | Datum::Chair, PointKind::High) => job.strand_in_duct_high_m,
            (Datum::DuctUnderside | Datum::Chair, PointKind::Anchor | PointKind::Support) => {
                f64::midpoint(job.strand_in_duct_low_m, job.strand_in_duct_high_m)
            }
        }
    }
}
