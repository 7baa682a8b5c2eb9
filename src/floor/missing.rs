//! Heights that the drawing ought to give: told by the neighbours in a run, by columns, by labels that nobody claims.

use geo::{BoundingRect, Centroid, Coord, Intersects, Polygon};
use rstar::primitives::GeomWithData;
use rstar::{AABB, RTree};

use super::index::Index;
use super::rules::HEIGHT_MISSING;
use super::slab::Thickness;
use super::types::{Point, PointKind, Tendon};
use crate::finding::{Finding, Level};
use crate::geometry::{Path, distance_m};

/// A label or unreadable text without a tendon, near to one.
#[derive(Debug, Clone)]
pub(super) struct Stray {
    /// Line that it is near to.
    pub(super) line: usize,
    pub(super) station_m: f64,
    /// What it says it is, if it does.
    pub(super) kind: Option<PointKind>,
    pub(super) content: String,
}

/// What a tendon ought to have.
struct Lack {
    kind: PointKind,
    station_m: f64,
    because: String,
}

/// Neighbours farther off than this say nothing, metres.
const BESIDE_M: f64 = 3.2;
/// A point this near to one that is there is that one, drawn a little elsewhere, metres.
const APART_M: f64 = 0.8;
/// Neighbours on either side agree on a point within this, metres.
const AGREE_M: f64 = 1.0;
/// A column this near to an anchor is where the tendon ends, metres.
const AT_EDGE_M: f64 = 1.5;
/// Longer than this it is a wall, which a tendon may cross anywhere, metres.
const WALL_M: f64 = 3.0;

/// Adds points without a height where one belongs, tendon by tendon, and says why.
pub(super) fn complete(
    tendons: &mut [Tendon],
    index: &Index,
    columns: &Columns<'_>,
    strays: &[Stray],
    thickness: &Thickness<'_>,
) -> Vec<Finding> {
    let mut findings = Vec::new();
    let lacks: Vec<Vec<Lack>> = (0..tendons.len())
        .map(|line| lacks(line, tendons, index, columns, strays))
        .collect();
    for (tendon, lacks) in tendons.iter_mut().zip(lacks) {
        let silent = tendon.points.iter().all(|point| point.height_m.is_none());
        if silent {
            findings.push(no_height(tendon));
        }
        for lack in lacks {
            let place = tendon.path.place_at(lack.station_m);
            if !silent {
                findings.push(missing(tendon, &lack, place));
            }
            let at = tendon
                .points
                .partition_point(|point| point.station_m <= lack.station_m)
                .min(tendon.points.len().saturating_sub(1));
            let faces = thickness.faces_at(place);
            let point = Point {
                kind: lack.kind,
                station_m: lack.station_m,
                place,
                drawn_m: None,
                height_m: None,
                other_soffit_m: None,
                thickness_m: faces.thickness_m,
                top_m: faces.top_m,
            };
            tendon.points.insert(at, point);
        }
    }
    findings
}

fn no_height(tendon: &Tendon) -> Finding {
    let middle_m = tendon.path.length_m() / 2.0;
    Finding::new(
        &HEIGHT_MISSING,
        Level::Error,
        "no label and no level line gives this tendon any height; expected highs and lows such as H165 and L30",
        "write the heights beside the tendon, or check that their layer and reach are those of the job file",
    )
    .on_tendon(&tendon.mark)
    .at_station(middle_m)
    .at_place(tendon.path.place_at(middle_m))
}

fn missing(tendon: &Tendon, lack: &Lack, place: Coord<f64>) -> Finding {
    let what = match lack.kind {
        PointKind::High => "high point",
        PointKind::Low => "low point",
        PointKind::Anchor | PointKind::Support => "height",
    };
    Finding::new(
        &HEIGHT_MISSING,
        Level::Error,
        format!("no {what} is given here; expected one: {}", lack.because),
        format!("write the height of the {what} beside the tendon"),
    )
    .on_tendon(&tendon.mark)
    .at_station(lack.station_m)
    .at_place(place)
}

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
    fn along(&self, path: &Path, from_m: f64, to_m: f64) -> Vec<(Coord<f64>, &'a Polygon<f64>)> {
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

/// What one tendon lacks, in order of station.
fn lacks(
    line: usize,
    tendons: &[Tendon],
    index: &Index,
    columns: &Columns<'_>,
    strays: &[Stray],
) -> Vec<Lack> {
    let tendon = &tendons[line];
    let shape: Vec<&Point> = tendon
        .points
        .iter()
        .filter(|point| point.kind != PointKind::Support)
        .collect();
    let mut lacks: Vec<Lack> = Vec::new();
    for pair in shape.windows(2) {
        let [before, after] = [pair[0], pair[1]];
        let Some(needed) = needed(before.kind, after.kind) else {
            continue;
        };
        let room = (before.station_m + APART_M, after.station_m - APART_M);
        if room.0 >= room.1 {
            continue;
        }
        let mut here = beside(line, tendons, index, room, needed);
        if here.is_empty() {
            here = stray(line, strays, before, after, needed);
        }
        if here.is_empty() && needed == [PointKind::High] {
            here = over_columns(&tendon.path, columns, before, after);
        }
        lacks.extend(here);
    }
    lacks.sort_by(|a, b| a.station_m.total_cmp(&b.station_m));
    lacks
}

/// Kinds of which at least those have to be found between two points before anything is called missing there.
fn needed(before: PointKind, after: PointKind) -> Option<&'static [PointKind]> {
    use PointKind::{Anchor, High, Low, Support};
    match (before, after) {
        (High, High | Anchor) | (Anchor, High) => Some(&[Low]),
        (Low, Low | Anchor) | (Anchor, Low) => Some(&[High]),
        (High, Low) | (Low, High) => Some(&[High, Low]),
        (Anchor, Anchor) => Some(&[]),
        (Support, _) | (_, Support) => None,
    }
}

/// Points that the nearest neighbours on both sides (or on the only side) have and this tendon lacks.
fn beside(
    line: usize,
    tendons: &[Tendon],
    index: &Index,
    room: (f64, f64),
    needed: &[PointKind],
) -> Vec<Lack> {
    let tendon = &tendons[line];
    let middle_m = f64::midpoint(room.0, room.1);
    let place = tendon.path.place_at(middle_m);
    let heading_rad = tendon.path.heading_at(middle_m);
    let (sin, cos) = heading_rad.sin_cos();
    let mut sides: [Option<(f64, usize)>; 2] = [None, None];
    for foot in index.feet(place, BESIDE_M) {
        let Some(other) = tendons.get(foot.line) else {
            continue;
        };
        let parallel = (foot.heading_rad - heading_rad).sin().abs() < 0.2;
        let heard = other.points.iter().any(|point| point.height_m.is_some());
        if foot.line == line || other.run != tendon.run || !parallel || !heard {
            continue;
        }
        let left = cos * (foot.place.y - place.y) - sin * (foot.place.x - place.x) > 0.0;
        let side = &mut sides[usize::from(left)];
        if side.is_none_or(|(held_m, _)| foot.distance_m < held_m) {
            *side = Some((foot.distance_m, foot.line));
        }
    }
    let mut near: Vec<(f64, usize)> = sides.into_iter().flatten().collect();
    near.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
    let inside = |other: usize| -> Vec<(PointKind, f64)> {
        tendons[other]
            .points
            .iter()
            .filter(|p| matches!(p.kind, PointKind::High | PointKind::Low) && p.height_m.is_some())
            .filter_map(|p| {
                let foot = tendon.path.project(p.place)?;
                let fits = foot.station_m >= room.0 && foot.station_m <= room.1;
                (fits && foot.distance_m <= BESIDE_M).then_some((p.kind, foot.station_m))
            })
            .collect()
    };
    let Some((&(_, first), rest)) = near.split_first() else {
        return Vec::new();
    };
    let mut agreed = inside(first);
    let mut names = vec![tendons[first].mark.clone()];
    for &(_, other) in rest {
        let also = inside(other);
        agreed.retain(|&(kind, station_m)| {
            also.iter().any(|&(other_kind, other_m)| {
                other_kind == kind && (other_m - station_m).abs() <= AGREE_M
            })
        });
        names.push(tendons[other].mark.clone());
    }
    if !needed
        .iter()
        .all(|&kind| agreed.iter().any(|&(k, _)| k == kind))
    {
        return Vec::new();
    }
    let because = format!("{} beside it has one here", names.join(" and "));
    agreed
        .into_iter()
        .map(|(kind, station_m)| Lack {
            kind,
            station_m,
            because: because.clone(),
        })
        .collect()
}

/// A label that nobody claims, near to where its kind is needed.
fn stray(
    line: usize,
    strays: &[Stray],
    before: &Point,
    after: &Point,
    needed: &[PointKind],
) -> Vec<Lack> {
    let [kind] = needed else {
        return Vec::new();
    };
    let fits = strays.iter().filter(|stray| {
        stray.line == line
            && stray.kind.is_none_or(|said| said == *kind)
            && stray.station_m > before.station_m + APART_M
            && stray.station_m < after.station_m - APART_M
    });
    fits.take(1)
        .map(|stray| Lack {
            kind: *kind,
            station_m: stray.station_m,
            because: format!(
                "the text {:?} near to it belongs to no tendon",
                stray.content
            ),
        })
        .collect()
}

/// Columns between two points, over which a tendon ought to be high.
fn over_columns(path: &Path, columns: &Columns<'_>, before: &Point, after: &Point) -> Vec<Lack> {
    let clear = |point: &Point| match point.kind {
        PointKind::Anchor => AT_EDGE_M,
        _ => AT_EDGE_M.min((after.station_m - before.station_m) / 4.0),
    };
    let (from_m, to_m) = (
        before.station_m + clear(before),
        after.station_m - clear(after),
    );
    let mut lacks: Vec<Lack> = Vec::new();
    for (middle, column) in columns.along(path, from_m, to_m) {
        let Some(foot) = path.project(middle) else {
            continue;
        };
        let over = foot.distance_m <= WALL_M && column.intersects(&geo::Point::from(foot.place));
        if over && foot.station_m >= from_m && foot.station_m <= to_m {
            lacks.push(Lack {
                kind: PointKind::High,
                station_m: foot.station_m,
                because: "it passes over a column here".to_owned(),
            });
        }
    }
    lacks
}
