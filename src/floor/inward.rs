//! Bare heights that are written some way in from an end and may speak of its anchor.

use super::readings::HeightText;
use super::rules::ANCHOR_HEIGHT_INSIDE;
use super::zone_texts::short;
use crate::finding::{Finding, Level, Wording};
use crate::units::{LONG, Units};

/// A height farther in than this is of a point of its own, metres; mid-depth, than this.
const INSIDE_M: f64 = 0.6;
const MIDDLE_INSIDE_M: f64 = 1.0;
/// The next height is this many times as far from the end: among supports, which stand close together, it is one of them.
const ALONE: f64 = 4.0;
/// Written to the millimetre, mid-depth is this near to half the thickness, metres.
const ROUNDED_M: f64 = 0.001;

/// The height that is nearest to an end without standing at it.
#[derive(Debug, Clone, Copy)]
pub(super) struct Inside {
    /// From the end, metres.
    pub(super) in_m: f64,
    pub(super) reading: HeightText,
    /// From the end to the next height, or to the other end, metres.
    pub(super) next_m: f64,
    /// Slab thickness there, metres.
    pub(super) thickness_m: Option<f64>,
}

impl Inside {
    /// Whether it is the anchor's height, said beside the end: mid-depth, where anchors lie unless otherwise said and no
    /// point of a curve has a reason to.
    pub(super) fn is_of_anchor(&self) -> bool {
        let middle = self.thickness_m.is_some_and(|thickness_m| {
            (self.reading.value_m - 0.5 * thickness_m).abs() <= ROUNDED_M
        });
        self.is_alone(MIDDLE_INSIDE_M) && (middle || self.reading.middle)
    }

    /// What is said of one that may be the anchor's or a point of its own.
    pub(super) fn doubt(&self) -> Option<Finding> {
        (self.is_alone(INSIDE_M) && !self.is_of_anchor()).then(|| {
            Finding::new(
                &ANCHOR_HEIGHT_INSIDE,
                Level::Warning,
                Wording::of(|units: Units| {
                    format!(
                        "height {} stands {} in from the end, and nothing gives the anchor a height: it was taken as a point \
                         of the curve, and the anchor as lying at mid-depth",
                        short(self.reading.value_m, units),
                        units.of(LONG).said(self.in_m, 2)
                    )
                }),
                "write it at the end if it is the anchor's, with its word for high or low if it is a point of its own",
            )
        })
    }

    fn is_alone(&self, inside_m: f64) -> bool {
        let near = self.in_m <= inside_m && self.next_m >= ALONE * self.in_m;
        near && self.reading.word.is_none()
    }
}
