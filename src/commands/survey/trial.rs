//! Keys that only the floor as read by the other proposals suggests: from which face heights are counted and to what, and
//! how far labels and symbols reach.

use std::collections::BTreeMap;

use geo::{BoundingRect, Coord};
use rstar::primitives::Rectangle;
use rstar::{AABB, RTree};
use serde_json::json;

use super::{notes, reaches};
use crate::drawing::Drawing;
use crate::floor::{self, Floor, Point, PointKind, height_of_line};
use crate::job::{self, Datum, FromFace, Job, Proposal, Soffit};

/// So many points tell something.
const SOME: usize = 3;
/// Points at most this far from a column are at it, metres.
const AT_COLUMN_M: f64 = 1.0;
/// What is longer is a wall, metres.
const COLUMN_M: f64 = 3.0;
/// A high point nearer to the soffit than this share of the thickness is counted from the top (common practice: high
/// points lie as high as cover allows).
const NEAR_FACE: f64 = 0.3;
/// Highs and lows that differ by less than this share of the thickness drape no tendon.
const NO_DRAPE: f64 = 0.15;
/// A zone this much thicker than the slab changes the heights of its high points, unless they are counted from the slab's
/// soffit.
const THICKER: f64 = 1.2;
/// Of the difference in thickness, the share that heights may differ by without following it.
const UNMOVED: f64 = 0.25;
/// No spacer holds a duct nearer to the form than this, metres (common practice: 20 mm and more; three quarters of an inch to a
/// bare strand).
const LEAST_COVER_M: f64 = 0.005;
/// What the floor suggests once it is read by these proposals, by path of the key.
pub(super) fn proposals(
    drawing: &Drawing,
    proposed: &BTreeMap<String, Proposal>,
) -> Vec<(String, Proposal)> {
    let Ok(resolved) = job::read("survey", &job::file(&[], proposed)) else {
        return Vec::new();
    };
    let job = resolved.job;
    let (floor, findings) = floor::read(drawing, &job);
    let mut found = Vec::new();
    found.extend(face(drawing, &floor, &job));
    found.extend(soffit(&floor, &job));
    found.extend(datum(&floor, &job));
    let mut counted = floor
        .tendons
        .iter()
        .filter(|tendon| tendon.strands.is_some());
    if counted.any(|tendon| tendon.strand.is_none()) {
        found.extend(notes::strand(drawing, &job));
    }
    found.extend(reaches::proposals(drawing, &floor, &job, &findings));
    found
}

pub(super) fn said(key: &str, value: serde_json::Value, why: String) -> (String, Proposal) {
    let proposal = Proposal { value, why };
    (key.to_owned(), proposal)
}

/// The drawing's own numbers at points of a kind, metres, in order.
fn numbers<'f>(floor: &'f Floor, fits: impl Fn(&Point) -> bool + 'f) -> Vec<f64> {
    let points = floor.tendons.iter().flat_map(|tendon| &tendon.points);
    let mut numbers: Vec<f64> = points
        .filter(|point| fits(point))
        .filter_map(|point| point.drawn_m)
        .collect();
    numbers.sort_by(f64::total_cmp);
    numbers
}

fn middle(sorted: &[f64]) -> Option<f64> {
    sorted.get(sorted.len() / 2).copied()
}

/// The top, or the nearer face, where tendons would otherwise lie low at columns, or not drape at all.
fn face(drawing: &Drawing, floor: &Floor, job: &Job) -> Option<(String, Proposal)> {
    if job.conventions.height.from != FromFace::Soffit {
        return None;
    }
    let at = |kind: PointKind| numbers(floor, move |point| point.kind == kind);
    let (highs, lows) = (at(PointKind::High), at(PointKind::Low));
    if highs.len().min(lows.len()) < SOME {
        return None;
    }
    let (high_m, low_m) = (middle(&highs)?, middle(&lows)?);
    if bare(drawing, job) {
        let columns = columns(floor);
        let is_low = |point: &Point| point.kind == PointKind::Low;
        let bends = |point: &Point| is_low(point) || point.kind == PointKind::High;
        let there = numbers(floor, |point| bends(point) && at_column(&columns, point)).len();
        let low = numbers(floor, |point| is_low(point) && at_column(&columns, point)).len();
        if there >= SOME && 5 * low >= 4 * there {
            let why = format!(
                "At {low} of {there} points at columns the number is less than its neighbours': counted from the soffit, the \
                 tendons would be lowest there. Check it."
            );
            return Some(said("height.from", json!("top"), why));
        }
    }
    if high_m < low_m {
        let why = "The numbers at high points are less than at low points. Check it.".to_owned();
        return Some(said("height.from", json!("top"), why));
    }
    let thickness_m = floor.slab.thickness_m?;
    (high_m < NEAR_FACE * thickness_m && high_m - low_m < NO_DRAPE * thickness_m).then(|| {
        let why = "Counted from the soffit, high points would lie hardly above low ones and near the soffit. Check it.";
        said("height.from", json!("nearer-face"), why.to_owned())
    })
}

/// Whether most heights have no word that says high or low.
fn bare(drawing: &Drawing, job: &Job) -> bool {
    let lines = drawing.texts.iter().flat_map(|text| text.content.lines());
    let heights = lines.filter_map(|line| height_of_line(line, &job.conventions));
    let (worded, bare): (Vec<_>, Vec<_>) = heights.partition(|(height, _)| height.word.is_some());
    bare.len() > worded.len()
}

/// Boxes of columns by place. Walls are none: tendons run along them.
fn columns(floor: &Floor) -> RTree<Rectangle<[f64; 2]>> {
    let boxes = floor
        .slab
        .columns
        .iter()
        .filter_map(BoundingRect::bounding_rect);
    let compact = boxes.filter(|column| column.width().max(column.height()) <= COLUMN_M);
    let corners = |at: Coord<f64>| [at.x, at.y];
    let boxes =
        compact.map(|column| Rectangle::from_corners(corners(column.min()), corners(column.max())));
    RTree::bulk_load(boxes.collect())
}

fn at_column(columns: &RTree<Rectangle<[f64; 2]>>, point: &Point) -> bool {
    let Coord { x, y } = point.place;
    let around = AABB::from_corners(
        [x - AT_COLUMN_M, y - AT_COLUMN_M],
        [x + AT_COLUMN_M, y + AT_COLUMN_M],
    );
    columns
        .locate_in_envelope_intersecting(&around)
        .next()
        .is_some()
}

/// The general slab's soffit, where heights are negative, or do not follow a zone's thickness.
fn soffit(floor: &Floor, job: &Job) -> Option<(String, Proposal)> {
    let reading = &job.conventions.height;
    if reading.from != FromFace::Soffit || reading.soffit != Soffit::Local {
        return None;
    }
    let slab_m = floor.slab.thickness_m?;
    let high = |point: &Point| point.kind == PointKind::High;
    let thicker = |point: &Point| {
        point
            .thickness_m
            .is_some_and(|zone_m| zone_m > THICKER * slab_m)
    };
    let below = |point: &Point| point.drawn_m.is_some_and(|drawn_m| drawn_m < 0.0);
    let negative = numbers(floor, below).len();
    if negative > 0 && negative == numbers(floor, |point| below(point) && thicker(point)).len() {
        let why = format!(
            "{negative} heights in thicker zones are negative: they lie below the general soffit. Check it."
        );
        return Some(said("height.soffit", json!("general"), why));
    }
    let outside = middle(&numbers(floor, |point| high(point) && !thicker(point)))?;
    let points = floor.tendons.iter().flat_map(|tendon| &tendon.points);
    let inside: Vec<(f64, f64)> = points
        .filter(|point| high(point) && thicker(point))
        .filter_map(|point| Some((point.drawn_m?, point.thickness_m? - slab_m)))
        .collect();
    let unmoved = |(drawn_m, more_m): &(f64, f64)| (drawn_m - outside).abs() <= UNMOVED * more_m;
    (!inside.is_empty() && inside.iter().all(unmoved)).then(|| {
        let why = format!(
            "At {} high points in thicker zones the number is that of high points outside. Check it.",
            inside.len()
        );
        said("height.soffit", json!("general"), why)
    })
}

/// The chair or the duct's underside, where strands at these heights would put the duct on the form.
fn datum(floor: &Floor, job: &Job) -> Option<(String, Proposal)> {
    let reading = &job.conventions.height;
    if reading.from != FromFace::Soffit || reading.datum != Datum::Centroid {
        return None;
    }
    let lows = numbers(floor, |point| point.kind == PointKind::Low);
    let bends = lows.len() + numbers(floor, |point| point.kind == PointKind::High).len();
    let supports = numbers(floor, |point| point.kind == PointKind::Support).len();
    let under_m = middle(&lows)? - reading.strand_in_duct_low_m;
    if lows.len() < SOME || under_m >= LEAST_COVER_M {
        return None;
    }
    let word = if supports >= bends {
        "chair"
    } else {
        "duct-underside"
    };
    let why = format!(
        "Were these the strands' heights, the duct's underside would lie {:.0} mm above the soffit at half of the low points. \
         Check it.",
        under_m * 1000.0
    );
    Some(said("height.datum", json!(word), why))
}
