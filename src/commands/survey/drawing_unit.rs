//! The drawing's unit, where its own gives tendons or labels of a size that no floor has.

use serde_json::json;

use super::contents::Contents;
use super::labels::unit_of;
use super::picked::Picked;
use crate::commands::units;
use crate::drawing::{Drawing, UnitFrom};
use crate::job::Proposal;
use crate::units::LengthUnit;

/// Heights of label texts on a floor, metres (common practice: 2 to 5 mm on paper at 1:50 to 1:200, with room to spare).
const TEXT_M: std::ops::RangeInclusive<f64> = 0.04..=1.2;
/// Floors seldom have longer tendons, metres: with texts of a strange size, doubt enough.
const LONG_M: f64 = 100.0;

/// A unit, where the drawing's own gives tendons of a length that no floor has, or labels that nobody draws.
pub(super) fn proposal(
    drawing: &Drawing,
    contents: &Contents,
    tendons: &Picked,
) -> Option<Proposal> {
    let lines = drawing.shapes.iter().enumerate().filter(|(number, shape)| {
        !shape.closed && tendons.picks(drawing, shape) && !contents.grids.draw(*number, shape)
    });
    let lengths_m = lines.map(|(_, shape)| shape.path.length_m());
    let median_m = units::median_m(lengths_m)?;
    let text_m = middle(drawing.texts.iter().map(|text| text.height_m).collect());
    let large = text_m.is_some_and(|text_m| text_m > *TEXT_M.end());
    // What the drawing says is doubted where it cannot be; what is assumed already where it would be strange.
    let fits = match drawing.unit_from {
        UnitFrom::Job => true,
        UnitFrom::Header => units::plausible(median_m) && !(large && median_m > LONG_M),
        UnitFrom::Assumed(_) => units::usual(median_m),
    };
    if fits {
        return None;
    }
    let mut fits = units::sensible(median_m, drawing.unit_m);
    let written = |unit: LengthUnit| {
        text_m.is_none_or(|text_m| TEXT_M.contains(&(text_m / drawing.unit_m * unit.metres())))
    };
    if fits.iter().any(|(unit, _)| written(*unit)) {
        fits.retain(|(unit, _)| written(*unit));
    }
    // Of units that would do, one of the office's own system.
    let inch = |unit: LengthUnit| matches!(unit, LengthUnit::In | LengthUnit::Ft);
    let drawn = (drawing.unit_from == UnitFrom::Header).then(|| !inch(unit_of(drawing)));
    let metric = drawn.or(drawing.metric);
    let own = |(unit, _): &&(LengthUnit, f64)| metric.is_some_and(|metric| metric != inch(*unit));
    let (unit, would_m) = *fits.iter().find(own).or(fits.first())?;
    Some(Proposal {
        value: json!(unit.name()),
        why: format!(
            "As the drawing says it, half of the tendon lines would be {} than {median_m:.4} m; in {} that is {would_m:.1} m. Check it.",
            if median_m < 1.0 { "shorter" } else { "longer" },
            unit.name()
        ),
    })
}

fn middle(mut values: Vec<f64>) -> Option<f64> {
    values.sort_by(f64::total_cmp);
    values.get(values.len() / 2).copied()
}
