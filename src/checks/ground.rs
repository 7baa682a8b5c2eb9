//! The slab prepared once for all tendons: edges and outlines in spatial indices, so that a floor's cost grows with its
//! tendons and edges, not with their product.

use geo::coordinate_position::{CoordPos, CoordinatePosition};
use geo::line_intersection::{LineIntersection, line_intersection};
use geo::{Area, BoundingRect, Coord, Line, Point, Polygon};
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, RTree};

use super::chords::Chords;
use crate::floor::{Faces, Slab};
use crate::geometry::Path;

/// Pieces of plan line shorter than this are no piece, metres.
const SLIVER_M: f64 = 1e-6;

/// Zones that end this near to an edge or to one another are meant to meet there, metres.
const DRAFTING_GAP_M: f64 = 0.010;

/// Outlines, openings and zones of a floor, each with its index.
#[derive(Debug)]
pub struct Ground<'a> {
    /// Outlines of the slab.
    pub(super) outlines: Rings<'a>,
    /// Openings.
    pub(super) openings: Rings<'a>,
    zones: Rings<'a>,
    /// Area of each zone, m², and where its concrete lies.
    zone_facts: Vec<(f64, Faces)>,
    general: Faces,
}

/// A stretch of plan line with something that holds all along it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Stretch<T> {
    /// First station, metres.
    pub(super) from_m: f64,
    /// Last station, metres.
    pub(super) to_m: f64,
    /// What holds.
    pub(super) holds: T,
}

/// Polygons with their edges and boxes indexed.
#[derive(Debug)]
pub(super) struct Rings<'a> {
    polygons: Vec<&'a Polygon<f64>>,
    edges: RTree<GeomWithData<Line<f64>, usize>>,
    boxes: RTree<GeomWithData<Rectangle<Point<f64>>, usize>>,
}

impl<'a> Ground<'a> {
    /// Prepares a slab.
    pub fn of(slab: &'a Slab) -> Self {
        Self {
            outlines: Rings::of(slab.outlines.iter()),
            openings: Rings::of(slab.openings.iter()),
            zones: Rings::of(slab.zones.iter().map(|zone| &zone.outline)),
            zone_facts: slab
                .zones
                .iter()
                .map(|zone| (zone.outline.unsigned_area(), zone.faces()))
                .collect(),
            general: Faces::general(slab.thickness_m),
        }
    }

    /// Where the concrete lies along a plan line, from each station on.
    pub fn faces_from(&self, path: &Path) -> Vec<(f64, Faces)> {
        let stretches = self.faces_along(&Chords::of(path)).into_iter();
        stretches
            .map(|stretch| (stretch.from_m, stretch.holds))
            .collect()
    }

    /// Where the concrete lies outside every zone.
    pub(super) fn general(&self) -> Faces {
        self.general
    }

    /// Where the concrete lies along a plan line, stretch by stretch; where zones overlap, the smallest speaks.
    pub(super) fn faces_along(&self, chords: &Chords) -> Vec<Stretch<Faces>> {
        let faces = |place| {
            self.zones
                .holding(place, false)
                .into_iter()
                .filter_map(|zone| self.zone_facts.get(zone))
                .min_by(|a, b| a.0.total_cmp(&b.0))
                .map_or(self.general, |facts| facts.1)
        };
        without_slivers(self.zones.stretches(chords, faces))
    }
}

/// Stretches shorter than a drafting gap joined to the one before them, or after: where a zone stops just short of the
/// slab edge, no anchor stands in the slab beyond it.
fn without_slivers<T>(stretches: Vec<Stretch<T>>) -> Vec<Stretch<T>> {
    let mut kept: Vec<Stretch<T>> = Vec::new();
    let mut from_m = None;
    for mut stretch in stretches {
        if stretch.to_m - stretch.from_m < DRAFTING_GAP_M {
            match kept.last_mut() {
                Some(last) => last.to_m = stretch.to_m,
                None => from_m = from_m.or(Some(stretch.from_m)),
            }
        } else {
            stretch.from_m = from_m.take().unwrap_or(stretch.from_m);
            kept.push(stretch);
        }
    }
    kept
}

impl<'a> Rings<'a> {
    fn of(polygons: impl Iterator<Item = &'a Polygon<f64>>) -> Self {
        let polygons: Vec<&Polygon<f64>> = polygons.collect();
        let mut edges = Vec::new();
        let mut boxes = Vec::new();
        for (index, polygon) in polygons.iter().enumerate() {
            let rings = || std::iter::once(polygon.exterior()).chain(polygon.interiors());
            // An index has no place for a coordinate that is no number.
            if !rings()
                .flat_map(geo::LineString::coords)
                .all(|c| c.x.is_finite() && c.y.is_finite())
            {
                continue;
            }
            edges.extend(
                rings()
                    .flat_map(geo::LineString::lines)
                    .map(|line| GeomWithData::new(line, index)),
            );
            if let Some(rect) = polygon.bounding_rect() {
                let corners =
                    Rectangle::from_corners(Point::from(rect.min()), Point::from(rect.max()));
                boxes.push(GeomWithData::new(corners, index));
            }
        }
        Self {
            polygons,
            edges: RTree::bulk_load(edges),
            boxes: RTree::bulk_load(boxes),
        }
    }

    /// Whether there is no polygon.
    pub(super) fn is_empty(&self) -> bool {
        self.polygons.is_empty()
    }

    /// Indices of the polygons that hold a place, ascending; a place on an edge counts unless `inside` asks for more.
    pub(super) fn holding(&self, place: Coord<f64>, inside: bool) -> Vec<usize> {
        let mut held: Vec<usize> = self
            .boxes
            .locate_all_at_point(&Point::from(place))
            .map(|boxed| boxed.data)
            .filter(|&index| {
                self.polygons.get(index).is_some_and(|polygon| {
                    match polygon.coordinate_position(&place) {
                        CoordPos::Inside => true,
                        CoordPos::OnBoundary => !inside,
                        CoordPos::Outside => false,
                    }
                })
            })
            .collect();
        held.sort_unstable();
        held
    }

    /// Edges whose box comes within a distance of a chord's, with the index of their polygon.
    pub(super) fn edges_near(
        &self,
        chord: Line<f64>,
        within_m: f64,
    ) -> impl Iterator<Item = (Line<f64>, usize)> {
        let rect = chord.bounding_rect();
        let grown = AABB::from_corners(
            Point::new(rect.min().x - within_m, rect.min().y - within_m),
            Point::new(rect.max().x + within_m, rect.max().y + within_m),
        );
        self.edges
            .locate_in_envelope_intersecting(&grown)
            .map(|edge| (*edge.geom(), edge.data))
    }

    /// Distance from a place to the nearest edge, metres.
    pub(super) fn edge_distance_m(&self, place: Coord<f64>) -> Option<f64> {
        self.edges
            .nearest_neighbor_iter_with_distance_2(&Point::from(place))
            .next()
            .map(|(_, squared)| squared.sqrt())
    }

    /// Cuts a plan line where it crosses an edge and says of each piece what `holds` at its middle; neighbours that
    /// hold the same are one stretch.
    pub(super) fn stretches<T: PartialEq>(
        &self,
        chords: &Chords,
        holds: impl Fn(Coord<f64>) -> T,
    ) -> Vec<Stretch<T>> {
        let mut found: Vec<Stretch<T>> = Vec::new();
        for chord in &chords.0 {
            let mut cuts_m = vec![0.0, chord.length_m];
            for (edge, _) in self.edges_near(chord.line, 0.0) {
                let mut cut = |place: Coord<f64>| {
                    let share = share_along(chord.line, place);
                    cuts_m.push(share * chord.length_m);
                };
                match line_intersection(chord.line, edge) {
                    Some(LineIntersection::SinglePoint { intersection, .. }) => cut(intersection),
                    Some(LineIntersection::Collinear { intersection }) => {
                        cut(intersection.start);
                        cut(intersection.end);
                    }
                    None => {}
                }
            }
            cuts_m.sort_by(f64::total_cmp);
            for pair in cuts_m.windows(2) {
                if pair[1] - pair[0] < SLIVER_M {
                    continue;
                }
                let middle = f64::midpoint(pair[0], pair[1]) / chord.length_m;
                let value = holds(chord.line.start + chord.line.delta() * middle);
                let (from_m, to_m) = (chord.start_m + pair[0], chord.start_m + pair[1]);
                match found.last_mut() {
                    Some(last) if last.holds == value => last.to_m = to_m,
                    _ => found.push(Stretch {
                        from_m,
                        to_m,
                        holds: value,
                    }),
                }
            }
        }
        found
    }
}

/// Where a place lies along a line, 0 at its start and 1 at its end.
pub(super) fn share_along(line: Line<f64>, place: Coord<f64>) -> f64 {
    let delta = line.delta();
    let squared = delta.x * delta.x + delta.y * delta.y;
    if squared <= 0.0 {
        return 0.0;
    }
    let offset = place - line.start;
    ((offset.x * delta.x + offset.y * delta.y) / squared).clamp(0.0, 1.0)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::floor::Zone;
    use geo::polygon;

    #[test]
    fn thickness_changes_where_the_line_enters_a_zone_and_the_smallest_zone_speaks() {
        let slab = Slab {
            zones: vec![
                Zone {
                    outline: polygon![(x: 4.0, y: -5.0), (x: 12.0, y: -5.0), (x: 12.0, y: 5.0), (x: 4.0, y: 5.0)],
                    thickness_m: 0.3,
                    top_m: 0.0,
                },
                Zone {
                    outline: polygon![(x: 6.0, y: -1.0), (x: 8.0, y: -1.0), (x: 8.0, y: 1.0), (x: 6.0, y: 1.0)],
                    thickness_m: 0.5,
                    top_m: 0.0,
                },
            ],
            thickness_m: Some(0.2),
            ..Slab::default()
        };
        let path = Path::through(&[Coord { x: 0.0, y: 0.0 }, Coord { x: 20.0, y: 0.0 }]);
        let found = Ground::of(&slab).faces_along(&Chords::of(&path));
        let seen: Vec<(f64, f64, Option<f64>)> = found
            .iter()
            .map(|stretch| (stretch.from_m, stretch.to_m, stretch.holds.thickness_m))
            .collect();
        assert_eq!(
            seen,
            vec![
                (0.0, 4.0, Some(0.2)),
                (4.0, 6.0, Some(0.3)),
                (6.0, 8.0, Some(0.5)),
                (8.0, 12.0, Some(0.3)),
                (12.0, 20.0, Some(0.2)),
            ]
        );
    }

    #[test]
    fn a_zone_drawn_just_short_of_an_end_reaches_it() {
        let zone = |thickness_m, x0, x1| Zone {
            outline: geo::Rect::new(Coord { x: x0, y: -5.0 }, Coord { x: x1, y: 5.0 }).to_polygon(),
            thickness_m,
            top_m: 0.0,
        };
        let slab = Slab {
            zones: vec![zone(0.6, 0.004, 3.0), zone(0.3, 3.005, 9.0)],
            thickness_m: Some(0.2),
            ..Slab::default()
        };
        let path = Path::through(&[Coord { x: 0.0, y: 0.0 }, Coord { x: 20.0, y: 0.0 }]);
        let found = Ground::of(&slab).faces_along(&Chords::of(&path));
        let seen: Vec<(f64, f64, Option<f64>)> = found
            .iter()
            .map(|stretch| (stretch.from_m, stretch.to_m, stretch.holds.thickness_m))
            .collect();
        assert_eq!(
            seen,
            vec![
                (0.0, 3.005, Some(0.6)),
                (3.005, 9.0, Some(0.3)),
                (9.0, 20.0, Some(0.2))
            ]
        );
    }

    #[test]
    fn a_polygon_with_a_coordinate_that_is_no_number_is_left_out() {
        let slab = Slab {
            openings: vec![polygon![(x: 4.0, y: -5.0), (x: f64::NAN, y: -5.0), (x: 12.0, y: 5.0)]],
            ..Slab::default()
        };
        assert!(
            Ground::of(&slab)
                .openings
                .holding(Coord { x: 8.0, y: 0.0 }, false)
                .is_empty()
        );
    }
}
