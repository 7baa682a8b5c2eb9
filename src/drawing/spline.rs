//! SPLINE entities: rational B-splines by their control points, or a smooth curve through fit points.

mod fitted;
#[cfg(test)]
mod tests;

use geo::Coord;

use crate::geometry::Segment;

use super::curves::arcs_along;
use super::placing::Placing;

/// A spline in its own units.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Spline {
    degree: usize,
    knots: Vec<f64>,
    /// Homogeneous control points: weight·x, weight·y, weight.
    poles: Vec<[f64; 3]>,
}

impl Spline {
    /// A spline from what the entity holds; `None` where that is no curve.
    pub(super) fn new(
        degree: usize,
        knots: &[f64],
        points: &[Coord<f64>],
        weights: &[f64],
    ) -> Option<Self> {
        let order = degree + 1;
        let rising = knots.windows(2).all(|pair| pair[0] <= pair[1]);
        let sound = (1..=11).contains(&degree)
            && points.len() >= order
            && knots.len() == points.len() + order
            && rising
            && knots.get(degree) < knots.get(points.len());
        let weighed = weights.len() == points.len() && weights.iter().all(|weight| *weight > 0.0);
        if !sound || !(weights.is_empty() || weighed) {
            return None;
        }
        let weights = weights.iter().copied().chain(std::iter::repeat(1.0));
        let poles = points
            .iter()
            .zip(weights)
            .map(|(point, weight)| [point.x * weight, point.y * weight, weight]);
        Some(Self {
            degree,
            knots: knots.to_vec(),
            poles: poles.collect(),
        })
    }

    /// Whether the curve ends where it starts.
    pub(super) fn is_closed(&self) -> bool {
        let (from, to) = self.domain();
        let (start, end) = (self.at(from).0, self.at(to).0);
        let reach = self.poles.iter().fold(0.0_f64, |reach, pole| {
            let weight = pole[2];
            reach.max((pole[0] / weight - start.x).hypot(pole[1] / weight - start.y))
        });
        (end.x - start.x).hypot(end.y - start.y) <= 1e-9 * reach
    }

    /// The curve as arcs in plan, within `tolerance_m`.
    pub(super) fn segments(&self, placing: &Placing, tolerance_m: f64, out: &mut Vec<Segment>) {
        let (from, to) = self.domain();
        let mut breaks = vec![from];
        for &knot in &self.knots {
            if knot < to && breaks.last().is_some_and(|last| knot > *last) {
                breaks.push(knot);
            }
        }
        breaks.push(to);
        let along = |t: f64| {
            let (point, slope) = self.at(t);
            (placing.place(point), placing.carry(slope))
        };
        arcs_along(&along, &breaks, tolerance_m, out);
    }

    fn domain(&self) -> (f64, f64) {
        (self.knots[self.degree], self.knots[self.poles.len()])
    }

    /// Point and derivative at a parameter (de Boor; the derivative from the last two points of the scheme).
    fn at(&self, t: f64) -> (Coord<f64>, Coord<f64>) {
        let degree = self.degree;
        let last = self.poles.len() - 1;
        let span = self
            .knots
            .partition_point(|knot| *knot <= t)
            .saturating_sub(1)
            .clamp(degree, last);
        // At the far end step back over knots of length zero.
        let span = (degree..=span)
            .rev()
            .find(|&at| self.knots[at] < self.knots[at + 1])
            .unwrap_or(span);
        let mut row: Vec<[f64; 3]> = self.poles[span - degree..=span].to_vec();
        let mut slope = [0.0; 3];
        for level in 1..=degree {
            if level == degree {
                let width = self.knots[span + 1] - self.knots[span];
                for (axis, part) in slope.iter_mut().enumerate() {
                    *part = (row[degree][axis] - row[degree - 1][axis]) * to_f64(degree) / width;
                }
            }
            for index in (level..=degree).rev() {
                let left = self.knots[span + index - degree];
                let right = self.knots[span + 1 + index - level];
                let share = if right > left {
                    (t - left) / (right - left)
                } else {
                    0.0
                };
                let before = row[index - 1];
                for (own, before) in row[index].iter_mut().zip(before) {
                    *own = (1.0 - share) * before + share * *own;
                }
            }
        }
        let [wx, wy, weight] = row[degree];
        let point = Coord {
            x: wx / weight,
            y: wy / weight,
        };
        let slope = Coord {
            x: (slope[0] - point.x * slope[2]) / weight,
            y: (slope[1] - point.y * slope[2]) / weight,
        };
        (point, slope)
    }
}

#[expect(clippy::cast_precision_loss, reason = "a degree of at most 11")]
fn to_f64(degree: usize) -> f64 {
    degree as f64
}
