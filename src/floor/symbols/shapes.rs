//! Shapes that may mark an end: circles, triangles, squares, bars and solids, told by their geometry, whatever entities
//! they are drawn with.

use geo::Coord;

use super::super::layers::sound;
use super::super::order::{by_handle, by_place};
use super::super::pieces::{Joint, chains, returns};
use crate::drawing::{Drawing, Shape, ShapeKind};
use crate::geometry::{Path, Segment, distance_m, turn_rad};

/// A small shape that may mark an end.
#[derive(Debug, Clone)]
pub struct Figure {
    /// What it may be called, of [`crate::job::END_SHAPES`], the most telling word first.
    pub words: Vec<&'static str>,
    /// Corners of its box, upright in the plan, metres.
    pub corners: [Coord<f64>; 4],
    /// Numbers of the drawing's shapes that it is drawn with.
    pub pieces: Vec<usize>,
}

/// How far sides, radii and angles may differ and still count as equal, of their size.
const ALIKE: f64 = 0.1;
/// A quadrangle longer than this many times its width is a bar.
const BAR: f64 = 3.0;
/// A vertex that turns by less lies on a side, radians.
const CORNER_RAD: f64 = 0.1;
/// Rings of this many corners at one distance from their middle are circles.
const ROUND: usize = 8;

/// Circles, triangles, squares, bars and solids no larger than `largest_m` that `fits` lets through; pieces that meet end
/// to end within `gap_m` are one.
pub fn figures(
    drawing: &Drawing,
    gap_m: f64,
    largest_m: f64,
    fits: impl Fn(&Shape) -> bool,
) -> Vec<Figure> {
    let mut small: Vec<(usize, &Shape)> = drawing
        .shapes
        .iter()
        .enumerate()
        .filter(|(_, shape)| sound(shape) && shape.path.length_m() <= 4.0 * largest_m)
        .filter(|(_, shape)| span_m(&shape.path) <= largest_m && fits(shape))
        .collect();
    small.sort_by(|(_, a), (_, b)| {
        by_place(&a.path, &b.path).then_with(|| by_handle(&a.handle, &b.handle))
    });
    let closed = |shape: &Shape| shape.closed || returns(&shape.path, gap_m);
    let mut figures = Vec::new();
    let mut open: Vec<(usize, &Path)> = Vec::new();
    for (at, shape) in small {
        if closed(shape) {
            let filled = shape.kind == ShapeKind::Solid;
            figures.extend(figure(&shape.path, true, filled, vec![at]));
        } else {
            open.push((at, &shape.path));
        }
    }
    let paths: Vec<&Path> = open.iter().map(|(_, path)| *path).collect();
    let joint = Joint {
        gap_m,
        turn_rad: std::f64::consts::PI,
    };
    let (chains, _) = chains(&paths, joint, |_| false);
    for chain in chains {
        let numbers = chain
            .pieces
            .iter()
            .filter_map(|(piece, _)| open.get(*piece));
        let pieces = numbers.map(|(at, _)| *at).collect();
        let path = chain.path(&paths);
        let closed = chain.closed || returns(&path, gap_m);
        if span_m(&path) <= largest_m {
            figures.extend(figure(&path, closed, false, pieces));
        }
    }
    figures
}

/// What a line may be called; nothing where it is none of the shapes.
fn words_of(path: &Path, closed: bool, filled: bool) -> Vec<&'static str> {
    let outline = if closed {
        outline(path)
    } else {
        let (Some(start), Some(end)) = (path.start(), path.end()) else {
            return Vec::new();
        };
        let straight = distance_m(start, end) >= 0.99 * path.length_m();
        straight.then_some("bar")
    };
    let solid = filled.then_some("solid");
    solid.into_iter().chain(outline).collect()
}

fn figure(path: &Path, closed: bool, filled: bool, pieces: Vec<usize>) -> Option<Figure> {
    let words = words_of(path, closed, filled);
    let [low, high] = bounds(path)?;
    (!words.is_empty()).then_some(Figure {
        words,
        corners: [
            low,
            Coord {
                x: high.x,
                y: low.y,
            },
            high,
            Coord {
                x: low.x,
                y: high.y,
            },
        ],
        pieces,
    })
}

fn outline(path: &Path) -> Option<&'static str> {
    if is_round(path) {
        return Some("circle");
    }
    let corners = corners(path)?;
    match *corners.as_slice() {
        [_, _, _] => Some("triangle"),
        [a, b, c, d] => {
            let (along_m, across_m) = (
                distance_m(a, b) + distance_m(c, d),
                distance_m(b, c) + distance_m(d, a),
            );
            let longer = along_m.max(across_m) > BAR * along_m.min(across_m);
            Some(if longer { "bar" } else { "square" })
        }
        _ if corners.len() >= ROUND && at_one_distance(&corners) => Some("circle"),
        _ => None,
    }
}

/// Whether a line is arcs about one centre.
fn is_round(path: &Path) -> bool {
    let mut first: Option<(Coord<f64>, f64)> = None;
    !path.segments().is_empty()
        && path.segments().iter().all(|segment| match *segment {
            Segment::Line { .. } => false,
            Segment::Arc {
                centre, radius_m, ..
            } => {
                let (about, held_m) = *first.get_or_insert((centre, radius_m));
                distance_m(about, centre) <= ALIKE * held_m
                    && (held_m - radius_m).abs() <= ALIKE * held_m
            }
        })
}

fn at_one_distance(corners: &[Coord<f64>]) -> bool {
    let count = u32::try_from(corners.len()).map_or(1.0, f64::from);
    let sum = corners
        .iter()
        .fold(Coord { x: 0.0, y: 0.0 }, |sum, corner| sum + *corner);
    let middle = sum / count;
    let radii = corners.iter().map(|corner| distance_m(*corner, middle));
    let (least_m, most_m) = radii.fold((f64::INFINITY, 0.0_f64), |(least_m, most_m), radius_m| {
        (least_m.min(radius_m), most_m.max(radius_m))
    });
    most_m - least_m <= ALIKE * most_m
}

/// Corners of a ring of straight sides; `None` where a side is bent.
fn corners(path: &Path) -> Option<Vec<Coord<f64>>> {
    let mut sides: Vec<(Coord<f64>, f64)> = Vec::new();
    for segment in path.segments() {
        let Segment::Line { from, to } = *segment else {
            return None;
        };
        if distance_m(from, to) > ALIKE * ALIKE * path.length_m() {
            sides.push((from, segment.heading_at(0.0)));
        }
    }
    let before = sides.iter().cycle().skip(sides.len().saturating_sub(1));
    let corners = sides
        .iter()
        .zip(before)
        .filter(|((_, heading), (_, last))| turn_rad(heading - last).abs() > CORNER_RAD);
    Some(corners.map(|((corner, _), _)| *corner).collect())
}

fn span_m(path: &Path) -> f64 {
    bounds(path).map_or(f64::INFINITY, |[low, high]| distance_m(low, high))
}

/// Lower left and upper right, by places along the line.
fn bounds(path: &Path) -> Option<[Coord<f64>; 2]> {
    let mut bounds: Option<[Coord<f64>; 2]> = None;
    for segment in path.segments() {
        for eighth in 0..=8_u32 {
            let place = segment.place_at(segment.length_m() * f64::from(eighth) / 8.0);
            let [low, high] = bounds.unwrap_or([place, place]);
            bounds = Some([
                Coord {
                    x: low.x.min(place.x),
                    y: low.y.min(place.y),
                },
                Coord {
                    x: high.x.max(place.x),
                    y: high.y.max(place.y),
                },
            ]);
        }
    }
    bounds
}

#[cfg(test)]
mod tests {
    use super::*;

    fn called(points: &[(f64, f64)], closed: bool) -> Vec<&'static str> {
        let points: Vec<Coord<f64>> = points.iter().map(|&(x, y)| Coord { x, y }).collect();
        words_of(&Path::through(&points), closed, false)
    }

    #[test]
    fn shapes_are_told_by_their_geometry() {
        let triangle = [(0.0, 0.0), (0.2, 0.1), (0.0, 0.2), (0.0, 0.1), (0.0, 0.0)];
        assert_eq!(called(&triangle, true), ["triangle"]);
        let diamond = [(0.0, 0.0), (0.1, 0.1), (0.2, 0.0), (0.1, -0.1), (0.0, 0.0)];
        assert_eq!(called(&diamond, true), ["square"]);
        let plate = [(0.0, 0.0), (0.02, 0.0), (0.02, 0.3), (0.0, 0.3), (0.0, 0.0)];
        assert_eq!(called(&plate, true), ["bar"]);
        assert_eq!(called(&[(0.0, -0.1), (0.0, 0.1)], false), ["bar"]);
        assert!(called(&[(0.0, -0.1), (0.1, 0.0), (0.0, 0.1)], false).is_empty());
        let house = [
            (0.0, 0.0),
            (0.2, 0.0),
            (0.2, 0.1),
            (0.1, 0.2),
            (0.0, 0.1),
            (0.0, 0.0),
        ];
        assert!(called(&house, true).is_empty());
        let ring: Vec<(f64, f64)> = (0..=12)
            .map(|part| (f64::from(part) * std::f64::consts::TAU / 12.0).sin_cos())
            .collect();
        assert_eq!(called(&ring, true), ["circle"]);
    }

    #[test]
    fn a_dot_of_two_half_circles_is_a_circle_and_a_solid_is_both() {
        let (a, b) = (Coord { x: 0.0, y: 0.0 }, Coord { x: 0.1, y: 0.0 });
        let dot = Path::new([
            Segment::from_bulge(a, b, 1.0),
            Segment::from_bulge(b, a, 1.0),
        ]);
        assert_eq!(words_of(&dot, true, false), ["circle"]);
        let points = [a, b, Coord { x: 0.0, y: 0.1 }, a];
        let words = words_of(&Path::through(&points), true, true);
        assert_eq!(words, ["solid", "triangle"]);
    }
}
