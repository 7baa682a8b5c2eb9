//! Whether tendons of one layer go two ways, and which of them are banded.

use geo::Coord;

use super::contents::Contents;
use super::held::Held;
use crate::geometry::turn_rad;
use crate::patterns::Selectors;

/// Lines drawn for whole bands lie this far apart, metres.
const BANDS_M: f64 = 3.0;
/// Of two spacings, the one this much smaller is within bands.
const CLOSER: f64 = 0.6;

/// Two ways at right angles.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct TwoWays {
    /// Direction of the lines that look banded, whole degrees from the x axis; `None` where spacing does not tell.
    pub(super) banded_deg: Option<f64>,
}

/// Whether lines that the patterns pick go two ways, each with at least a fifth of them.
pub(super) fn two_ways(contents: &Contents, patterns: &Selectors) -> Option<TwoWays> {
    let picked = contents
        .layers
        .iter()
        .filter(|(name, _)| patterns.may_pick(name));
    let spans: Vec<[Coord<f64>; 2]> = picked.flat_map(|(_, held)| long_spans(held)).collect();
    let (mut sin, mut cos) = (0.0, 0.0);
    for [from, to] in &spans {
        let four_rad = 4.0 * (to.y - from.y).atan2(to.x - from.x);
        let length_m = (to.x - from.x).hypot(to.y - from.y);
        sin += length_m * four_rad.sin();
        cos += length_m * four_rad.cos();
    }
    let axis_rad = f64::atan2(sin, cos) / 4.0;
    let (along, across): (Vec<_>, Vec<_>) = spans.iter().copied().partition(|[from, to]| {
        let turn = turn_rad((to.y - from.y).atan2(to.x - from.x) - axis_rad);
        turn.cos().abs() > turn.sin().abs()
    });
    let fewer = along.len().min(across.len());
    if fewer < 2 || 5 * fewer < spans.len() {
        return None;
    }
    let across_rad = axis_rad + std::f64::consts::FRAC_PI_2;
    let apart_m =
        [(along, axis_rad), (across, across_rad)].map(|(spans, axis)| spacing_m(&spans, axis));
    let closer = |one: f64, other: f64| one < CLOSER * other;
    let banded_rad = match apart_m {
        [one, other] if one > BANDS_M && other <= BANDS_M => Some(axis_rad),
        [one, other] if other > BANDS_M && one <= BANDS_M => Some(across_rad),
        [one, other] if closer(one, other) => Some(axis_rad),
        [one, other] if closer(other, one) => Some(across_rad),
        _ => None,
    };
    Some(TwoWays {
        // Minus zero is written as zero.
        banded_deg: banded_rad.map(|rad| rad.to_degrees().round() + 0.0),
    })
}

fn long_spans(held: &Held) -> Vec<[Coord<f64>; 2]> {
    let spans = held.spans.iter().zip(&held.open_m);
    spans
        .filter(|(_, length_m)| **length_m > 2.0)
        .map(|(span, _)| *span)
        .collect()
}

/// Median distance from a line to its neighbour, square to their direction, metres.
fn spacing_m(spans: &[[Coord<f64>; 2]], axis_rad: f64) -> f64 {
    let (sin, cos) = axis_rad.sin_cos();
    let mut offsets: Vec<f64> = spans
        .iter()
        .map(|[from, to]| {
            let (x, y) = (f64::midpoint(from.x, to.x), f64::midpoint(from.y, to.y));
            cos * y - sin * x
        })
        .collect();
    offsets.sort_by(f64::total_cmp);
    let mut gaps: Vec<f64> = offsets.windows(2).map(|pair| pair[1] - pair[0]).collect();
    // Pieces in one line are no neighbours.
    gaps.retain(|gap_m| *gap_m > 0.05);
    gaps.sort_by(f64::total_cmp);
    gaps.get(gaps.len() / 2).copied().unwrap_or(f64::INFINITY)
}
