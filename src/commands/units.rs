//! Whether a drawing's unit can be right.

use std::path::Path;

use super::Refused;
use crate::drawing::UnitFrom;
use crate::floor::Tendon;
use crate::units::LengthUnit;

/// Median lengths of tendons that a floor may have, metres (common practice, with room to spare).
const SHORTEST_M: f64 = 1.0;
const LONGEST_M: f64 = 300.0;

/// Lengths that most floors have, for advice, metres.
const USUAL_M: std::ops::RangeInclusive<f64> = 4.0..=120.0;

const UNITS: [LengthUnit; 5] = [
    LengthUnit::Mm,
    LengthUnit::M,
    LengthUnit::In,
    LengthUnit::Ft,
    LengthUnit::Cm,
];

/// Lines shorter than this share of the longest are ticks, bars and arrows among tendons.
const SHORT: f64 = 0.1;

/// Median of the tendons' lengths in plan, metres; of what else is drawn among them, short as it is, nothing is counted.
pub(super) fn median_m(lengths_m: impl IntoIterator<Item = f64>) -> Option<f64> {
    let mut lengths_m: Vec<f64> = lengths_m.into_iter().collect();
    let longest_m = lengths_m.iter().copied().fold(0.0, f64::max);
    lengths_m.retain(|length_m| *length_m >= SHORT * longest_m);
    lengths_m.sort_by(f64::total_cmp);
    lengths_m.get(lengths_m.len() / 2).copied()
}

/// Whether half of the tendons are of a length that floors have.
pub(super) fn plausible(median_m: f64) -> bool {
    (SHORTEST_M..=LONGEST_M).contains(&median_m)
}

/// Whether half of the tendons are of a length that most floors have.
pub(super) fn usual(median_m: f64) -> bool {
    USUAL_M.contains(&median_m)
}

/// Units in which this median, read with `unit_m` metres to the unit, would be a usual length: each with that length.
pub(super) fn sensible(median_m: f64, unit_m: f64) -> Vec<(LengthUnit, f64)> {
    UNITS
        .into_iter()
        .map(|unit| (unit, median_m / unit_m * unit.metres()))
        .filter(|(_, median_m)| USUAL_M.contains(median_m))
        .collect()
}

/// Refuses a unit that gives lengths which no floor has.
pub(super) fn check(
    plan: &Path,
    tendons: &[Tendon],
    unit_m: f64,
    from: UnitFrom,
) -> Result<(), Refused> {
    let Some(median_m) = median_m(tendons.iter().map(|tendon| tendon.path.length_m())) else {
        return Ok(());
    };
    // What the job says is the user's own word.
    if plausible(median_m) || from == UnitFrom::Job {
        return Ok(());
    }
    let name = UNITS
        .into_iter()
        .find(|unit| (unit.metres() - unit_m).abs() < 1e-12)
        .map_or_else(
            || format!("units of {unit_m} m"),
            |unit| unit.name().to_owned(),
        );
    let unit = match from {
        UnitFrom::Header => format!("{name} as $INSUNITS of the drawing says"),
        UnitFrom::Assumed(unsaid) => format!("{name}, since {unsaid}"),
        UnitFrom::Job => name,
    };
    let fits: Vec<String> = sensible(median_m, unit_m)
        .into_iter()
        .map(|(unit, median_m)| format!("\"{}\" would make that {median_m:.1} m", unit.name()))
        .collect();
    let advice = if fits.is_empty() {
        "no usual unit makes this a floor: check that the tendon layers hold the tendons at full size, or set unit below [drawing] in the job file".to_owned()
    } else {
        format!(
            "set unit below [drawing] in the job file: {}",
            fits.join(", ")
        )
    };
    Err(Refused::Unit {
        path: plan.to_owned(),
        unit,
        than: if median_m < SHORTEST_M {
            "shorter than"
        } else {
            "longer than"
        },
        median_m: if median_m < SHORTEST_M {
            format!("{median_m:.4}")
        } else {
            format!("{median_m:.0}")
        },
        advice,
    })
}
