//! Grid lines: they look like tendons, carry bubbles at their ends and run beyond the slab.

use std::collections::{BTreeMap, BTreeSet};

use geo::{Contains, Coord, Distance, Euclidean, Line, LineString, Point, Polygon};
use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::trade_words::{Trade, named};
use crate::drawing::{Drawing, Look, Shape, Text};
use crate::geometry::distance_m;

/// A bubble is this many text heights across (common practice: two to four).
const BUBBLE: std::ops::RangeInclusive<f64> = 1.2..=8.0;
/// A line reaches a bubble that it ends this near to, of the bubble's size.
const NEAR: f64 = 0.15;
/// Closed lines at least this share of the longest may be a slab's edge; so many of them are looked at.
const LARGE: f64 = 0.4;
const OUTLINES: usize = 12;
/// Lines that end this far beyond an outline they meet leave it, of its length around.
const BEYOND: f64 = 0.01;
/// Curves are taken as chords within this, metres.
const CHORD_M: f64 = 0.05;

/// Lines of a grid, their bubbles and the texts in these.
#[derive(Debug, Default)]
pub(super) struct Grids {
    shapes: BTreeSet<usize>,
    texts: BTreeSet<usize>,
    /// Layers, and looks on them, whose lines are mostly grid lines.
    looks: BTreeSet<(String, Look)>,
}

struct Bubble {
    shape: usize,
    text: usize,
    middle: Coord<f64>,
    size_m: f64,
}

impl Grids {
    /// Finds them by what is drawn; layers named for grids are grids whatever lies on them.
    pub(super) fn of(drawing: &Drawing) -> Self {
        let bubbles = bubbles(drawing);
        let tree = RTree::bulk_load(
            bubbles
                .iter()
                .map(|bubble| GeomWithData::new([bubble.middle.x, bubble.middle.y], bubble))
                .collect(),
        );
        let largest_m = bubbles.iter().map(|b| b.size_m).fold(0.0, f64::max);
        let carries = |end: Coord<f64>| {
            let reach_m = (0.5 + NEAR) * largest_m;
            tree.locate_within_distance([end.x, end.y], reach_m * reach_m)
                .map(|found| found.data)
                .find(|b| {
                    (distance_m(end, b.middle) - 0.5 * b.size_m).abs() <= NEAR * b.size_m
                        || distance_m(end, b.middle) <= NEAR * b.size_m
                })
        };
        let outlines = outlines(drawing);
        let mut found = Self::default();
        let mut counts = BTreeMap::<(&str, Look), [usize; 2]>::new();
        for (number, shape) in drawing.shapes.iter().enumerate() {
            let Some(ends) = ends(shape) else { continue };
            let carried = ends.map(carries);
            let is_grid = if carried.iter().any(Option::is_some) {
                let out =
                    |end: Coord<f64>, b: &Bubble| beyond(&outlines, ends, end, 0.5 * b.size_m);
                let mut told = ends.into_iter().zip(carried);
                outlines.is_empty()
                    || is_centre(drawing.linetype(shape.look))
                    || told.any(|(end, bubble)| bubble.is_some_and(|bubble| out(end, bubble)))
            } else {
                outlines.iter().any(|outline| outline.is_left(ends))
            };
            let [all, grid] = counts.entry((&shape.layer, shape.look)).or_default();
            *all += 1;
            if is_grid {
                *grid += 1;
                found.shapes.insert(number);
                for bubble in carried.into_iter().flatten() {
                    found.shapes.insert(bubble.shape);
                    found.texts.insert(bubble.text);
                }
            }
        }
        let mostly = counts
            .into_iter()
            .filter(|(_, [all, grid])| *grid > 1 && 3 * grid >= 2 * all);
        found.looks = mostly
            .map(|((layer, look), _)| (layer.to_owned(), look))
            .collect();
        found
    }

    /// Whether a shape is a grid line, or lies among them.
    pub(super) fn draw(&self, number: usize, shape: &Shape) -> bool {
        self.shapes.contains(&number) || self.has(&shape.layer, shape.look)
    }

    /// Whether a text names a grid line, or lies among them.
    pub(super) fn write(&self, number: usize, text: &Text) -> bool {
        self.texts.contains(&number) || self.has(&text.layer, text.look)
    }

    fn has(&self, layer: &str, look: Look) -> bool {
        named(Trade::Grid, layer) || self.looks.contains(&(layer.to_owned(), look))
    }
}

/// Small closed lines round one short text.
fn bubbles(drawing: &Drawing) -> Vec<Bubble> {
    let names = drawing
        .texts
        .iter()
        .enumerate()
        .filter(|(_, text)| is_name(&text.content));
    let names = names.map(|(number, text)| {
        let [a, b, c, d] = text.corners;
        let middle = (a + b + c + d) / 4.0;
        GeomWithData::new([middle.x, middle.y], (number, text.height_m))
    });
    let finite = names.filter(|name| name.geom().iter().all(|x| x.is_finite()));
    let names = RTree::bulk_load(finite.collect());
    let round = drawing
        .shapes
        .iter()
        .enumerate()
        .filter(|(_, shape)| shape.closed);
    round
        .filter_map(|(shape, ring)| {
            let (start, across) = (
                ring.path.start()?,
                ring.path.place_at(0.5 * ring.path.length_m()),
            );
            let (middle, size_m) = ((start + across) / 2.0, distance_m(start, across));
            let name = names.nearest_neighbor(&[middle.x, middle.y])?;
            let [x, y] = *name.geom();
            let (text, height_m) = name.data;
            let inside = (x - middle.x).hypot(y - middle.y) <= 0.25 * size_m;
            let fits = inside && BUBBLE.contains(&(size_m / height_m));
            fits.then_some(Bubble {
                shape,
                text,
                middle,
                size_m,
            })
        })
        .collect()
}

/// `A`, `AA`, `A1`, `12`, `3'`, `B.2`: what grid lines are called.
fn is_name(text: &str) -> bool {
    let signs: Vec<char> = text.trim().chars().collect();
    let kept: Vec<&char> = signs
        .iter()
        .filter(|sign| !matches!(sign, '.' | '\'' | '/' | '-' | '*'))
        .collect();
    let digits = kept.iter().filter(|sign| sign.is_ascii_digit()).count();
    (1..=2).contains(&kept.len()) && kept.iter().all(|sign| sign.is_alphanumeric()) && (digits <= 2)
}

/// Linetypes that draw axes.
fn is_centre(linetype: &str) -> bool {
    let linetype = linetype.to_uppercase();
    [
        "CENTER",
        "CENTRE",
        "DASHDOT",
        "STRICHPUNKT",
        "AXES",
        "ISO04",
        "ISO10",
    ]
    .iter()
    .any(|word| linetype.contains(word))
}

/// Both ends of a straight line.
fn ends(shape: &Shape) -> Option<[Coord<f64>; 2]> {
    let ends = [shape.path.start()?, shape.path.end()?];
    let straight = distance_m(ends[0], ends[1]) >= 0.999 * shape.path.length_m();
    (!shape.closed && straight).then_some(ends)
}

struct Outline {
    area: Polygon<f64>,
    around_m: f64,
}

impl Outline {
    fn off_m(&self, place: Coord<f64>) -> f64 {
        if self.area.contains(&Point::from(place)) {
            return 0.0;
        }
        Euclidean.distance(&Point::from(place), self.area.exterior())
    }

    /// Whether a line comes from outside, crosses it and leaves it again.
    fn is_left(&self, ends: [Coord<f64>; 2]) -> bool {
        ends.iter()
            .all(|end| self.off_m(*end) > BEYOND * self.around_m)
            && self.gap_m(ends) == 0.0
    }

    fn gap_m(&self, ends: [Coord<f64>; 2]) -> f64 {
        Euclidean.distance(&Line::new(ends[0], ends[1]), self.area.exterior())
    }
}

/// Whether this end of a line lies outside all outlines that the line comes near to, and there is one.
fn beyond(outlines: &[Outline], ends: [Coord<f64>; 2], end: Coord<f64>, least_m: f64) -> bool {
    let mut near = outlines
        .iter()
        .filter(|outline| outline.gap_m(ends) <= least_m)
        .peekable();
    near.peek().is_some() && near.all(|outline| outline.off_m(end) > least_m)
}

/// The largest closed lines: one of them is the slab's edge, others may be a sheet's frame.
fn outlines(drawing: &Drawing) -> Vec<Outline> {
    let closed = drawing
        .shapes
        .iter()
        .filter(|shape| shape.closed && shape.path.length_m().is_finite());
    let mut rings: Vec<(f64, &Shape)> =
        closed.map(|shape| (shape.path.length_m(), shape)).collect();
    rings.sort_by(|(a, _), (b, _)| b.total_cmp(a));
    let longest_m = rings.first().map_or(0.0, |(around_m, _)| *around_m);
    rings.retain(|(around_m, _)| *around_m >= LARGE * longest_m && *around_m > 0.0);
    rings.truncate(OUTLINES);
    let outline = |(around_m, shape): (f64, &Shape)| {
        let ring: LineString<f64> = shape.path.to_line_string(CHORD_M);
        Outline {
            area: Polygon::new(ring, Vec::new()),
            around_m,
        }
    };
    rings.into_iter().map(outline).collect()
}
