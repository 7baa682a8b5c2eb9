//! Smooth curves as arcs that follow one another without corners (biarcs), within a stated distance.

use geo::Coord;

use crate::geometry::{Segment, distance_m};

/// A curve at a parameter: point and direction of travel (of any length).
pub(super) type Curve<'a> = dyn Fn(f64) -> (Coord<f64>, Coord<f64>) + 'a;

/// Halvings of one stretch between breaks, at most.
const HALVINGS: u32 = 12;
/// Arcs for a curve, and more for each of its stretches, beyond which it is no longer halved: no drawn curve comes near.
const MOST_ARCS: usize = 4096;
const MOST_ARCS_A_STRETCH: usize = 32;
/// How far arcs may leave a large curve, of its size: a millimetre in a kilometre.
const OF_SIZE: f64 = 1e-6;

/// Draws a curve by arcs no further from it than `tolerance_m` or a millionth of its size, whichever is more. `breaks` are parameters in rising order, the first and
/// last being the curve's ends; between them the curve must be smooth, and at them its direction may jump.
pub(super) fn arcs_along(
    curve: &Curve<'_>,
    breaks: &[f64],
    tolerance_m: f64,
    out: &mut Vec<Segment>,
) {
    let tolerance_m = tolerance_m.max(OF_SIZE * size_m(curve, breaks));
    let mut held: Option<Coord<f64>> = None;
    let most = out.len() + MOST_ARCS + MOST_ARCS_A_STRETCH * breaks.len();
    for (index, pair) in breaks.windows(2).enumerate() {
        let &[from, to] = pair else { continue };
        // A hair inside, so that the direction is this stretch's own where it jumps at a break.
        let inside = (to - from) * 1e-9;
        let leaving = held.take().unwrap_or_else(|| curve(from + inside).1);
        let mut arriving = curve(to - inside).1;
        if let Some(next) = breaks.get(index + 2) {
            let onward = curve(to + (next - to) * 1e-9).1;
            if same_direction(arriving, onward) {
                // One direction for both stretches, or rounding would leave a corner.
                arriving = onward;
                held = Some(onward);
            }
        }
        let (start, end) = (curve(from).0, curve(to).0);
        stretch(
            curve,
            (from, (start, leaving)),
            (to, (end, arriving)),
            tolerance_m,
            if out.len() < most { HALVINGS } else { 0 },
            out,
        );
    }
}

/// The larger side of a box around points at the breaks and midway between them, metres.
fn size_m(curve: &Curve<'_>, breaks: &[f64]) -> f64 {
    let midway = breaks.windows(2).filter_map(|pair| match *pair {
        [from, to] => Some(f64::midpoint(from, to)),
        _ => None,
    });
    let places = breaks.iter().copied().chain(midway).map(|t| curve(t).0);
    let (mut low, mut high) = ([f64::INFINITY; 2], [f64::NEG_INFINITY; 2]);
    for place in places {
        for (axis, value) in [place.x, place.y].into_iter().enumerate() {
            low[axis] = low[axis].min(value);
            high[axis] = high[axis].max(value);
        }
    }
    let size = (high[0] - low[0]).max(high[1] - low[1]);
    if size.is_finite() { size } else { 0.0 }
}

fn same_direction(a: Coord<f64>, b: Coord<f64>) -> bool {
    (a.x * b.y - a.y * b.x).atan2(dot(a, b)).abs() < 1e-6
}

type At = (f64, (Coord<f64>, Coord<f64>));

fn stretch(
    curve: &Curve<'_>,
    from: At,
    to: At,
    tolerance_m: f64,
    halvings: u32,
    out: &mut Vec<Segment>,
) {
    let pieces = biarc(from.1, to.1);
    let near = |pieces: &[Segment]| {
        (1..8).all(|eighth| {
            let t = from.0 + (to.0 - from.0) * f64::from(eighth) / 8.0;
            let point = curve(t).0;
            let off =
                |piece: &Segment| distance_m(piece.place_at(piece.nearest_along_m(point)), point);
            pieces.iter().any(|piece| off(piece) <= tolerance_m)
        })
    };
    match pieces {
        Some(pieces) if halvings == 0 || near(&pieces) => out.extend(pieces),
        None if halvings == 0 => out.push(Segment::Line {
            from: from.1.0,
            to: to.1.0,
        }),
        _ => {
            let middle = f64::midpoint(from.0, to.0);
            let middle = (middle, curve(middle));
            stretch(curve, from, middle, tolerance_m, halvings - 1, out);
            stretch(curve, middle, to, tolerance_m, halvings - 1, out);
        }
    }
}

/// Two arcs that leave `from` and reach `to` in the given directions and meet without a corner, with tangents of equal
/// length (the usual choice); `None` where they would turn back on themselves.
fn biarc(from: (Coord<f64>, Coord<f64>), to: (Coord<f64>, Coord<f64>)) -> Option<[Segment; 2]> {
    let (start, leaving) = (from.0, unit(from.1)?);
    let (end, arriving) = (to.0, unit(to.1)?);
    let v = end - start;
    let both = leaving + arriving;
    let along = dot(v, both);
    let apart = 2.0 * (1.0 - dot(leaving, arriving));
    let span = dot(v, v);
    // |start + d·leaving − (end − d·arriving)| = 2d, solved for the tangent length d without cancellation.
    let tangent = span / (along + (along * along + apart * span).sqrt());
    if !(tangent.is_finite() && tangent > 0.0) || along <= 0.0 {
        return None;
    }
    let joint = Coord {
        x: f64::midpoint(start.x + tangent * leaving.x, end.x - tangent * arriving.x),
        y: f64::midpoint(start.y + tangent * leaving.y, end.y - tangent * arriving.y),
    };
    let first = Segment::from_bulge(start, joint, bulge_leaving(leaving, joint - start));
    let second = Segment::from_bulge(joint, end, -bulge_leaving(reversed(arriving), joint - end));
    Some([first, second])
}

/// Bulge of the arc over `chord` that leaves in direction `leaving`: the chord lies half the sweep to the left of it.
fn bulge_leaving(leaving: Coord<f64>, chord: Coord<f64>) -> f64 {
    let half_sweep = (leaving.x * chord.y - leaving.y * chord.x).atan2(dot(leaving, chord));
    (half_sweep / 2.0).tan()
}

fn reversed(v: Coord<f64>) -> Coord<f64> {
    Coord { x: -v.x, y: -v.y }
}

fn dot(a: Coord<f64>, b: Coord<f64>) -> f64 {
    a.x * b.x + a.y * b.y
}

fn unit(v: Coord<f64>) -> Option<Coord<f64>> {
    let length = v.x.hypot(v.y);
    (length > 0.0 && length.is_finite()).then(|| Coord {
        x: v.x / length,
        y: v.y / length,
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::geometry::Path;
    use std::f64::consts::TAU;

    #[test]
    fn a_sine_wave_is_followed_within_the_tolerance_and_without_corners() {
        let curve = |t: f64| (Coord { x: t, y: t.sin() }, Coord { x: 1.0, y: t.cos() });
        for tolerance_m in [1e-2, 1e-3, 1e-4] {
            let mut out = Vec::new();
            arcs_along(&curve, &[0.0, 12.0], tolerance_m, &mut out);
            let path = Path::new(out);
            for corner in path.corners() {
                assert!(corner.turn_rad.abs() < 1e-7, "{}", corner.turn_rad);
            }
            for step in 0..=1000 {
                let point = curve(12.0 * f64::from(step) / 1000.0).0;
                let off = path.project(point).map_or(f64::MAX, |p| p.distance_m);
                assert!(off <= 1.2 * tolerance_m, "{off}");
            }
            assert!(path.segments().len() < 400);
        }
    }

    #[test]
    fn a_curve_of_the_size_of_the_moon_is_few_arcs() {
        let curve = |t: f64| {
            let (sin, cos) = t.sin_cos();
            let point = Coord {
                x: 4e8 * cos,
                y: 2e8 * sin,
            };
            let slope = Coord {
                x: -4e8 * sin,
                y: 2e8 * cos,
            };
            (point, slope)
        };
        let breaks: Vec<f64> = (0..=8).map(|n| f64::from(n) * TAU / 8.0).collect();
        let mut out = Vec::new();
        arcs_along(&curve, &breaks, 1e-3, &mut out);
        assert!((16..512).contains(&out.len()), "{}", out.len());
    }

    #[test]
    fn a_circle_comes_back_as_itself() {
        let curve = |t: f64| {
            let (sin, cos) = t.sin_cos();
            (
                Coord {
                    x: 5.0 * cos,
                    y: 5.0 * sin,
                },
                Coord { x: -sin, y: cos },
            )
        };
        let mut out = Vec::new();
        arcs_along(&curve, &[0.0, 1.5], 1e-3, &mut out);
        assert_eq!(out.len(), 2);
        assert!(
            out.iter()
                .all(|piece| (piece.curvature_per_m() - 0.2).abs() < 1e-9)
        );
    }
}
