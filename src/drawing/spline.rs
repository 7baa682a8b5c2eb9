//! SPLINE entities: rational B-splines by their control points, or a smooth curve through fit points.

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

    /// The curve through fit points: piecewise cubic, curvature continuous, spaced by chord length; straight ends
    /// where no end direction is given.
    pub(super) fn through(
        points: &[Coord<f64>],
        leaving: Option<Coord<f64>>,
        arriving: Option<Coord<f64>>,
    ) -> Option<Self> {
        let kept = apart(points);
        let spans = spans_of(&kept);
        let slopes = slopes(&kept, &spans, leaving, arriving)?;
        Self::of_cubics(&kept, &spans, &slopes)
    }

    /// The same around and back to the first point, curvature continuous there too.
    pub(super) fn around(points: &[Coord<f64>]) -> Option<Self> {
        let mut ring = apart(points);
        if ring.len() > 1 && ring.first() == ring.last() {
            ring.pop();
        }
        let count = ring.len();
        if count < 3 {
            return Self::through(points, None, None);
        }
        // What the ends of an open curve do fades by a factor of some four from point to point: so many more on either
        // side leave nothing of it.
        let turns = FADING.div_ceil(count);
        let long: Vec<_> = ring
            .iter()
            .cycle()
            .take((2 * turns + 1) * count + 1)
            .copied()
            .collect();
        let slopes = slopes(&long, &spans_of(&long), None, None)?;
        let from = turns * count;
        let own = from..=from + count;
        let kept = long.get(own.clone())?;
        Self::of_cubics(kept, &spans_of(kept), slopes.get(own)?)
    }

    fn of_cubics(kept: &[Coord<f64>], spans: &[f64], slopes: &[Coord<f64>]) -> Option<Self> {
        // Each cubic by its Bézier points; knots of multiplicity three join them.
        let first = *kept.first()?;
        let mut poles = vec![[first.x, first.y, 1.0]];
        let mut knots = vec![0.0; 4];
        let mut length = 0.0;
        for (index, span) in spans.iter().enumerate() {
            let (from, to) = (kept[index], kept[index + 1]);
            let third = span / 3.0;
            let (leave, arrive) = (slopes[index], slopes[index + 1]);
            poles.push([from.x + third * leave.x, from.y + third * leave.y, 1.0]);
            poles.push([to.x - third * arrive.x, to.y - third * arrive.y, 1.0]);
            poles.push([to.x, to.y, 1.0]);
            length += span;
            knots.extend([length; 3]);
        }
        knots.push(length);
        Some(Self {
            degree: 3,
            knots,
            poles,
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

/// Points beyond the ends of a curve that its middle no longer feels: 4⁻²⁴ is 4e-15.
const FADING: usize = 24;

/// The points without those that stand on the one before.
fn apart(points: &[Coord<f64>]) -> Vec<Coord<f64>> {
    let mut kept = points.to_vec();
    kept.dedup();
    kept
}

fn spans_of(points: &[Coord<f64>]) -> Vec<f64> {
    let pairs = points.windows(2);
    pairs
        .map(|pair| (pair[1].x - pair[0].x).hypot(pair[1].y - pair[0].y))
        .collect()
}

#[expect(clippy::cast_precision_loss, reason = "a degree of at most 11")]
fn to_f64(degree: usize) -> f64 {
    degree as f64
}

/// Slopes at the points of a curvature-continuous cubic (tridiagonal system, Thomas's elimination).
fn slopes(
    points: &[Coord<f64>],
    spans: &[f64],
    leaving: Option<Coord<f64>>,
    arriving: Option<Coord<f64>>,
) -> Option<Vec<Coord<f64>>> {
    let count = points.len();
    if count < 2 {
        return None;
    }
    let chord = |at: usize| (points[at + 1] - points[at]) / spans[at];
    let unit = |v: Coord<f64>| {
        let length = v.x.hypot(v.y);
        (length > 0.0).then(|| v / length)
    };
    // Rows: lower·m[i−1] + main·m[i] + upper·m[i+1] = right.
    let mut main = vec![0.0; count];
    let mut upper = vec![0.0; count];
    let mut right = vec![Coord { x: 0.0, y: 0.0 }; count];
    if let Some(direction) = leaving.and_then(unit) {
        (main[0], right[0]) = (1.0, direction);
    } else {
        (main[0], upper[0], right[0]) = (2.0, 1.0, chord(0) * 3.0);
    }
    for at in 1..count {
        let (lower, own, above, wanted) = if at + 1 < count {
            let (before, after) = (spans[at - 1], spans[at]);
            let wanted = (chord(at - 1) * after + chord(at) * before) * 3.0;
            (after, 2.0 * (before + after), before, wanted)
        } else {
            match arriving.and_then(unit) {
                Some(direction) => (0.0, 1.0, 0.0, direction),
                None => (1.0, 2.0, 0.0, chord(at - 1) * 3.0),
            }
        };
        let factor = lower / main[at - 1];
        main[at] = own - factor * upper[at - 1];
        upper[at] = above;
        right[at] = wanted - right[at - 1] * factor;
    }
    let mut slopes = right;
    slopes[count - 1] = slopes[count - 1] / main[count - 1];
    for at in (0..count - 1).rev() {
        slopes[at] = (slopes[at] - slopes[at + 1] * upper[at]) / main[at];
    }
    Some(slopes)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::geometry::{Path, distance_m};

    fn at(x: f64, y: f64) -> Coord<f64> {
        Coord { x, y }
    }

    fn path(spline: &Spline) -> Path {
        let mut out = Vec::new();
        spline.segments(&Placing::scaled(1.0), 1e-3, &mut out);
        Path::new(out)
    }

    #[test]
    fn a_rational_quadratic_is_an_exact_quarter_circle() {
        let spline = Spline::new(
            2,
            &[0.0, 0.0, 0.0, 1.0, 1.0, 1.0],
            &[at(1.0, 0.0), at(1.0, 1.0), at(0.0, 1.0)],
            &[1.0, std::f64::consts::FRAC_1_SQRT_2, 1.0],
        )
        .expect("a spline");
        for step in 0..=20 {
            let (point, slope) = spline.at(f64::from(step) / 20.0);
            assert!((point.x.hypot(point.y) - 1.0).abs() < 1e-12);
            assert!((point.x * slope.x + point.y * slope.y).abs() < 1e-12);
        }
        assert!((path(&spline).length_m() - std::f64::consts::FRAC_PI_2).abs() < 1e-6);
    }

    #[test]
    fn a_uniform_cubic_has_no_corners() {
        let points = [(0.0, 0.0), (3.0, 4.0), (6.0, -4.0), (9.0, 0.0), (12.0, 3.0)];
        let points: Vec<_> = points.iter().map(|&(x, y)| at(x, y)).collect();
        let knots = [0.0, 0.0, 0.0, 0.0, 1.0, 2.0, 2.0, 2.0, 2.0];
        let spline = Spline::new(3, &knots, &points, &[]).expect("a spline");
        let path = path(&spline);
        assert!(
            path.start()
                .is_some_and(|p| distance_m(p, points[0]) < 1e-12)
        );
        assert!(path.end().is_some_and(|p| distance_m(p, points[4]) < 1e-12));
        assert!(
            path.corners()
                .iter()
                .all(|corner| corner.turn_rad.abs() < 1e-6)
        );
        for step in 0..=200 {
            let point = spline.at(2.0 * f64::from(step) / 200.0).0;
            assert!(path.project(point).is_some_and(|p| p.distance_m < 1.2e-3));
        }
    }

    #[test]
    fn a_degree_of_one_keeps_its_corners() {
        let points = [at(0.0, 0.0), at(4.0, 0.0), at(4.0, 3.0)];
        let spline = Spline::new(1, &[0.0, 0.0, 1.0, 2.0, 2.0], &points, &[]).expect("a spline");
        let path = path(&spline);
        assert!((path.length_m() - 7.0).abs() < 1e-9);
        let turns: Vec<_> = path
            .corners()
            .iter()
            .filter(|c| c.turn_rad.abs() > 1e-6)
            .copied()
            .collect();
        assert_eq!(turns.len(), 1);
    }

    #[test]
    fn fit_points_are_passed_through() {
        let points = [at(0.0, 0.0), at(4.0, 1.0), at(7.0, -1.0), at(12.0, 0.0)];
        let spline = Spline::through(&points, None, None).expect("a spline");
        let path = path(&spline);
        for point in points {
            assert!(path.project(point).is_some_and(|p| p.distance_m < 1e-9));
        }
        assert!(
            path.corners()
                .iter()
                .all(|corner| corner.turn_rad.abs() < 1e-6)
        );
        let level =
            Spline::through(&points, Some(at(2.0, 0.0)), Some(at(1.0, 0.0))).expect("a spline");
        assert!(level.at(0.0).1.y.abs() < 1e-12);
        assert!(!level.is_closed());
    }

    #[test]
    fn a_closed_curve_comes_back_without_a_corner_or_a_jump_of_curvature() {
        let ring = [
            at(0.0, 0.0),
            at(9.0, 1.0),
            at(8.0, 6.0),
            at(3.0, 9.0),
            at(-1.0, 4.0),
        ];
        let with_first_again = [&ring[..], &ring[..1]].concat();
        for points in [&ring[..], &with_first_again] {
            let spline = Spline::around(points).expect("a spline");
            assert!(spline.is_closed());
            let path = path(&spline);
            for point in ring {
                assert!(path.project(point).is_some_and(|p| p.distance_m < 1e-9));
            }
            let (from, to) = spline.domain();
            let curvature = |t: f64, step: f64| (spline.at(t + step).1 - spline.at(t).1) / step;
            let (leaving, arriving) = (spline.at(from).1, spline.at(to).1);
            assert!(distance_m(leaving, arriving) < 1e-9);
            let jump = curvature(from, 1e-5) - curvature(to, -1e-5);
            assert!(jump.x.hypot(jump.y) < 1e-4, "{jump:?}");
        }
    }

    #[test]
    fn weights_are_whole_or_none() {
        let points = [at(1.0, 0.0), at(1.0, 1.0), at(0.0, 1.0)];
        let knots = [0.0, 0.0, 0.0, 1.0, 1.0, 1.0];
        let with = |weights: &[f64]| Spline::new(2, &knots, &points, weights);
        assert!(with(&[]).is_some() && with(&[1.0, 0.7, 1.0]).is_some());
        for weights in [
            &[1.0, 0.0, 1.0][..],
            &[1.0, -1.0, 1.0],
            &[1.0, 0.7],
            &[1.0; 4],
        ] {
            assert_eq!(with(weights), None);
        }
    }

    #[test]
    fn nonsense_is_no_spline() {
        assert_eq!(Spline::new(3, &[0.0, 1.0], &[at(0.0, 0.0)], &[]), None);
        assert_eq!(
            Spline::through(&[at(1.0, 1.0), at(1.0, 1.0)], None, None),
            None
        );
    }
}
