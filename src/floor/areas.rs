//! Outlines by place.

use geo::{Area, BoundingRect, Contains, Coord, Polygon};
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, RTree};

use crate::geometry::{Segment, distance_m};

type Boxed = GeomWithData<Rectangle<[f64; 2]>, usize>;

/// Outlines by place.
pub(super) struct Areas<'a> {
    outlines: Vec<&'a Polygon<f64>>,
    tree: RTree<Boxed>,
}

impl<'a> Areas<'a> {
    /// Outlines, known by their place in the sequence.
    pub(super) fn new(outlines: impl Iterator<Item = &'a Polygon<f64>>) -> Self {
        let outlines: Vec<&Polygon<f64>> = outlines.collect();
        let boxes = outlines.iter().enumerate().filter_map(|(at, outline)| {
            let rect = outline.bounding_rect()?;
            let (min, max) = (rect.min(), rect.max());
            let rect = Rectangle::from_corners([min.x, min.y], [max.x, max.y]);
            Some(GeomWithData::new(rect, at))
        });
        Self {
            tree: RTree::bulk_load(boxes.collect()),
            outlines,
        }
    }

    /// The smallest outline that holds a place, or has it within `edge_m` of its edge.
    pub(super) fn smallest(&self, place: Coord<f64>, edge_m: f64) -> Option<usize> {
        self.smallest_of(place, edge_m, |_| true)
    }

    /// The same among outlines that meet a condition.
    pub(super) fn smallest_of(
        &self,
        place: Coord<f64>,
        edge_m: f64,
        meets: impl Fn(&Polygon<f64>) -> bool,
    ) -> Option<usize> {
        let envelope = AABB::from_corners(
            [place.x - edge_m, place.y - edge_m],
            [place.x + edge_m, place.y + edge_m],
        );
        self.tree
            .locate_in_envelope_intersecting(&envelope)
            .map(|found| found.data)
            .filter(|&at| holds(self.outlines[at], place, edge_m) && meets(self.outlines[at]))
            .min_by(|&a, &b| {
                let area = |at: usize| self.outlines[at].unsigned_area();
                area(a).total_cmp(&area(b)).then(a.cmp(&b))
            })
    }
}

/// Whether an outline holds a place, or has it within `edge_m` of its edge.
pub(super) fn holds(outline: &Polygon<f64>, place: Coord<f64>, edge_m: f64) -> bool {
    outline.contains(&place)
        || outline.exterior().lines().any(|line| {
            let side = Segment::Line {
                from: line.start,
                to: line.end,
            };
            distance_m(side.place_at(side.nearest_along_m(place)), place) <= edge_m
        })
}
