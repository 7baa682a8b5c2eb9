//! Smooth curves through fit points.

use geo::Coord;

use super::Spline;

impl Spline {
    /// The curve through fit points: piecewise cubic, curvature continuous, spaced by chord length; straight ends
    /// where no end direction is given.
    pub(in crate::drawing) fn through(
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
    pub(in crate::drawing) fn around(points: &[Coord<f64>]) -> Option<Self> {
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
