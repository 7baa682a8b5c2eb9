//! Columns by place.

use geo::{BoundingRect, Centroid, Coord, Polygon};
use rstar::primitives::GeomWithData;
use rstar::{AABB, RTree};

use crate::geometry::{Path, distance_m};

/// Longer than this it is a wall, which a tendon may cross anywhere, metres.
pub(super) const WALL_M: f64 = 3.0;

/// Columns (not walls) by place.
pub(super) struct Columns<'a> {
    columns: Vec<&'a Polygon<f64>>,
    tree: RTree<GeomWithData<[f64; 2], usize>>,
}

impl<'a> Columns<'a> {
    /// Columns by their middles.
    pub(super) fn new(columns: &'a [Polygon<f64>]) -> Self {
        let columns: Vec<&Polygon<f64>> = columns
            .iter()
            .filter(|column| {
                let rect = column.bounding_rect();
                rect.is_some_and(|rect| rect.width().hypot(rect.height()) <= WALL_M)
            })
            .collect();
        let middles = columns.iter().enumerate().filter_map(|(at, column)| {
            let middle = column.centroid()?;
            Some(GeomWithData::new([middle.x(), middle.y()], at))
        });
        Self {
            tree: RTree::bulk_load(middles.collect()),
            columns,
        }
    }

    /// The middle of the column nearest to a place, within a distance.
    pub(super) fn nearest(&self, place: Coord<f64>, reach_m: f64) -> Option<Coord<f64>> {
        let found = self.tree.nearest_neighbor(&[place.x, place.y])?.geom();
        let middle = Coord {
            x: found[0],
            y: found[1],
        };
        (distance_m(middle, place) <= reach_m).then_some(middle)
    }

    /// Columns near to a stretch of line, with their middles, in order of place.
    pub(super) fn along(
        &self,
        path: &Path,
        from_m: f64,
        to_m: f64,
    ) -> Vec<(Coord<f64>, &'a Polygon<f64>)> {
        let (mut low, mut high) = ([f64::INFINITY; 2], [f64::NEG_INFINITY; 2]);
        for eighth in 0..=8 {
            let place = path.place_at(from_m + (to_m - from_m) * f64::from(eighth) / 8.0);
            low = [low[0].min(place.x - WALL_M), low[1].min(place.y - WALL_M)];
            high = [high[0].max(place.x + WALL_M), high[1].max(place.y + WALL_M)];
        }
        let mut found: Vec<usize> = self
            .tree
            .locate_in_envelope(&AABB::from_corners(low, high))
            .map(|column| column.data)
            .collect();
        found.sort_unstable();
        found
            .into_iter()
            .filter_map(|at| {
                let column = self.columns.get(at)?;
                Some((column.centroid()?.into(), *column))
            })
            .collect()
    }
}
