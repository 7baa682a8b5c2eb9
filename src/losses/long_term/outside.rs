//! What a clause does not cover is an error that names the clause.

use std::ops::RangeInclusive;

/// A value outside what a clause covers, or one that it asks for and nobody gave.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{symbol} = {value} is outside {clause}, which covers {covered}")]
pub struct Outside {
    /// Symbol of the standard, such as `RH`.
    pub symbol: &'static str,
    /// The value with its unit.
    pub value: String,
    /// Clause, table or equation.
    pub clause: &'static str,
    /// What it covers.
    pub covered: String,
}

/// The value, if the clause covers it.
///
/// # Errors
/// [`Outside`] where the value is out of the range or not a number.
pub(super) fn within(
    symbol: &'static str,
    value: f64,
    range: RangeInclusive<f64>,
    unit: &str,
    clause: &'static str,
) -> Result<f64, Outside> {
    if range.contains(&value) {
        return Ok(value);
    }
    let (least, most) = range.into_inner();
    let [from, to] = [least, most].map(rounded);
    let covered = match (least.is_finite(), most.is_finite()) {
        (true, true) => format!("{from} to {to}{unit}"),
        (true, false) => format!("{from}{unit} and more"),
        (false, _) => format!("{to}{unit} and less"),
    };
    Err(Outside {
        symbol,
        value: format!("{}{unit}", rounded(value)),
        clause,
        covered,
    })
}

/// The value, if it is above zero.
///
/// # Errors
/// [`Outside`] where it is not.
pub(super) fn positive(
    symbol: &'static str,
    value: f64,
    unit: &str,
    clause: &'static str,
) -> Result<f64, Outside> {
    if value > 0.0 && value.is_finite() {
        return Ok(value);
    }
    Err(Outside {
        symbol,
        value: format!("{}{unit}", rounded(value)),
        clause,
        covered: "numbers above zero".to_owned(),
    })
}

/// Four decimals at most: enough to tell a value from the end of its range.
fn rounded(value: f64) -> f64 {
    (value * 1e4).round() / 1e4
}

/// A table's value, straight between its rows; x rises from row to row.
///
/// # Errors
/// [`Outside`] before the first row and beyond the last.
pub(super) fn interpolated(
    rows: &[(f64, f64)],
    symbol: &'static str,
    x: f64,
    unit: &str,
    clause: &'static str,
) -> Result<f64, Outside> {
    let ends = rows.first().zip(rows.last());
    let (least, most) = ends.map_or((0.0, 0.0), |(first, last)| (first.0, last.0));
    within(symbol, x, least..=most, unit, clause)?;
    let between = rows.windows(2).find_map(|pair| {
        let [(x0, y0), (x1, y1)] = [*pair.first()?, *pair.last()?];
        (x <= x1).then(|| y0 + (y1 - y0) * (x - x0) / (x1 - x0))
    });
    Ok(between.unwrap_or_else(|| ends.map_or(0.0, |(first, _)| first.1)))
}
