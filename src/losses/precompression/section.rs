//! What a line cuts out of the slab.

use std::collections::BTreeSet;

use geo::{Area, Polygon};

use super::direction::Direction;
use crate::floor::Slab;

/// A section of the slab: between two edges of one outline.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Leg {
    /// Where it starts, metres across the direction.
    pub(super) from_m: f64,
    /// Where it ends.
    pub(super) to_m: f64,
    /// Concrete area, without openings, m²; `None` where the thickness of some of it is not known.
    pub(super) area_m2: Option<f64>,
}

/// Least and most distance of the slab along a direction, metres.
pub(super) fn extent(slab: &Slab, direction: Direction) -> Option<(f64, f64)> {
    slab.outlines
        .iter()
        .flat_map(|outline| outline.exterior().coords())
        .map(|&place| direction.along_m(place))
        .fold(None, |held: Option<(f64, f64)>, along_m| {
            let (low_m, high_m) = held.unwrap_or((along_m, along_m));
            Some((low_m.min(along_m), high_m.max(along_m)))
        })
}

/// Zones by size, the smallest first.
pub(super) fn zones_by_size(slab: &Slab) -> Vec<usize> {
    let sizes_m2: Vec<f64> = slab
        .zones
        .iter()
        .map(|zone| zone.outline.unsigned_area())
        .collect();
    let mut zones: Vec<usize> = (0..sizes_m2.len()).collect();
    zones.sort_by(|&a, &b| sizes_m2[a].total_cmp(&sizes_m2[b]));
    zones
}

/// The legs of one line, in order along it.
pub(super) fn legs(
    slab: &Slab,
    zones_by_size: &[usize],
    direction: Direction,
    offset_m: f64,
) -> Vec<Leg> {
    let crossed = |polygon: &Polygon<f64>| crossed_at(polygon, direction, offset_m);
    let mut edges: Vec<Edge> = Vec::new();
    let mut note = |crossings: Vec<f64>, of: Of| {
        for pair in crossings.chunks_exact(2) {
            edges.push(Edge(pair[0], of, true));
            edges.push(Edge(pair[1], of, false));
        }
    };
    for opening in &slab.openings {
        note(crossed(opening), Of::Opening);
    }
    for (rank, &zone) in zones_by_size.iter().enumerate() {
        if let Some(zone) = slab.zones.get(zone) {
            note(crossed(&zone.outline), Of::Zone(rank));
        }
    }
    edges.sort_by(|a, b| a.0.total_cmp(&b.0));

    let mut spans: Vec<(f64, f64)> = slab
        .outlines
        .iter()
        .flat_map(|outline| {
            crossed(outline)
                .chunks_exact(2)
                .map(|pair| (pair[0], pair[1]))
                .collect::<Vec<_>>()
        })
        .collect();
    spans.sort_by(|a, b| a.0.total_cmp(&b.0));
    let thickness_m = |rank: Option<&usize>| match rank.and_then(|&rank| zones_by_size.get(rank)) {
        Some(&zone) => slab.zones.get(zone).map(|zone| zone.thickness_m),
        None => slab.thickness_m,
    };
    spans
        .into_iter()
        .map(|(from_m, to_m)| Leg {
            from_m,
            to_m,
            area_m2: area_m2(from_m, to_m, &edges, &thickness_m),
        })
        .collect()
}

/// Where the line goes into (`true`) or comes out of something.
#[derive(Debug, Clone, Copy)]
struct Edge(f64, Of, bool);

#[derive(Debug, Clone, Copy)]
enum Of {
    Opening,
    /// A zone by its rank: the smallest comes first, so that a drop within a drop counts.
    Zone(usize),
}

fn area_m2(
    from_m: f64,
    to_m: f64,
    edges: &[Edge],
    thickness_m: &impl Fn(Option<&usize>) -> Option<f64>,
) -> Option<f64> {
    let (mut openings, mut within) = (0_u32, BTreeSet::new());
    let (mut at_m, mut area_m2) = (from_m, 0.0);
    let mut take = |upto_m: f64, openings: u32, within: &BTreeSet<usize>| {
        let upto_m = upto_m.min(to_m);
        if upto_m > at_m {
            if openings == 0 {
                area_m2 += (upto_m - at_m) * thickness_m(within.first())?;
            }
            at_m = upto_m;
        }
        Some(())
    };
    for &Edge(edge_m, of, enters) in edges {
        take(edge_m, openings, &within)?;
        match of {
            Of::Opening if enters => openings += 1,
            Of::Opening => openings = openings.saturating_sub(1),
            Of::Zone(rank) if enters => {
                within.insert(rank);
            }
            Of::Zone(rank) => {
                within.remove(&rank);
            }
        }
    }
    take(to_m, openings, &within)?;
    Some(area_m2)
}

/// Where a line crosses the edges of a polygon, in order, metres across the direction; an even number of places.
fn crossed_at(polygon: &Polygon<f64>, direction: Direction, offset_m: f64) -> Vec<f64> {
    let rings = std::iter::once(polygon.exterior()).chain(polygon.interiors());
    let mut places: Vec<f64> = rings
        .flat_map(geo::LineString::lines)
        .filter_map(|edge| {
            let (start_m, end_m) = (direction.along_m(edge.start), direction.along_m(edge.end));
            // A vertex on the line counts with the edge that lies beyond it, so that the places pair up.
            ((start_m <= offset_m) != (end_m <= offset_m)).then(|| {
                let share = (offset_m - start_m) / (end_m - start_m);
                let (from_m, to_m) = (direction.across_m(edge.start), direction.across_m(edge.end));
                from_m + share * (to_m - from_m)
            })
        })
        .collect();
    places.sort_by(f64::total_cmp);
    places
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::floor::Zone;
    use geo::{Rect, coord};

    fn rectangle(x1: f64, y1: f64, x2: f64, y2: f64) -> Polygon<f64> {
        Rect::new(coord! {x: x1, y: y1}, coord! {x: x2, y: y2}).to_polygon()
    }

    fn along_x() -> Direction {
        let path =
            crate::geometry::Path::through(&[coord! {x: 0.0, y: 0.0}, coord! {x: 9.0, y: 0.0}]);
        super::super::direction::gather(std::iter::once(&path)).0[0]
    }

    fn cut_at_five(slab: &Slab) -> Vec<Leg> {
        legs(slab, &zones_by_size(slab), along_x(), 5.0)
    }

    #[test]
    fn openings_are_taken_out_and_the_smallest_zone_gives_the_thickness() {
        let zone = |outline, thickness_m| Zone {
            outline,
            thickness_m,
            top_m: 0.0,
        };
        let slab = Slab {
            outlines: vec![rectangle(0.0, 0.0, 10.0, 8.0)],
            openings: vec![rectangle(4.0, 1.0, 6.0, 2.0), rectangle(4.0, 1.5, 6.0, 2.5)],
            zones: vec![
                zone(rectangle(4.0, 5.0, 6.0, 6.0), 0.5),
                zone(rectangle(3.0, 4.0, 7.0, 7.0), 0.35),
            ],
            thickness_m: Some(0.2),
            columns: Vec::new(),
        };
        let cut = cut_at_five(&slab);
        assert_eq!(cut.len(), 1);
        let area_m2 = cut[0].area_m2.expect("every thickness is known");
        assert!((area_m2 - (3.5 * 0.2 + 2.0 * 0.35 + 1.0 * 0.5)).abs() < 1e-12);
        let unknown = Slab {
            thickness_m: None,
            ..slab
        };
        assert_eq!(cut_at_five(&unknown)[0].area_m2, None);
    }

    #[test]
    fn a_slab_with_two_arms_has_two_sections() {
        let around = rectangle(0.0, 0.0, 10.0, 8.0);
        let notch = rectangle(2.0, 3.0, 11.0, 5.0);
        let outline = geo::BooleanOps::difference(&around, &notch);
        let slab = Slab {
            outlines: outline.0,
            thickness_m: Some(0.2),
            ..Slab::default()
        };
        let cut = cut_at_five(&slab);
        assert_eq!(cut.len(), 2);
        assert!(
            cut.iter()
                .all(|leg| (leg.area_m2.expect("known") - 0.6).abs() < 1e-9)
        );
    }
}
