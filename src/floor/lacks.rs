//! What a tendon ought to have and lacks: told by its neighbours, by labels that nobody claims, by columns.

use geo::Intersects;

use super::candidates::BESIDE_M;
use super::columns::{Columns, WALL_M};
use super::index::Index;
use super::types::{Point, PointKind, Tendon};
use crate::geometry::Path;

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
pub(super) struct Lack {
    pub(super) kind: PointKind,
    pub(super) station_m: f64,
    pub(super) because: String,
}

/// A point this near to one that is there is that one, drawn a little elsewhere, metres.
const APART_M: f64 = 0.8;
/// Neighbours on either side agree on a point within this, metres.
const AGREE_M: f64 = 1.0;
/// A column this near to an anchor is where the tendon ends, metres.
const AT_EDGE_M: f64 = 1.5;

/// What one tendon lacks, in order of station.
pub(super) fn lacks(
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
