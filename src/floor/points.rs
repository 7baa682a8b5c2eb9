//! Profile points of a tendon from the heights that were settled on it.

use super::heights::Height;
use super::lines::Line;
use super::readings::{HeightText, Word};
use super::rules::LEVEL_LINE_DIFFERS;
use super::slab::Thickness;
use super::types::{Point, PointKind};
use crate::finding::{Finding, Level};
use crate::job::{Datum, FromFace, HeightReading};

/// A level line and a label nearer than this speak of one place, metres.
const SAME_PLACE_M: f64 = 0.5;
/// Heights that differ by less are equal, metres.
const SAME_M: f64 = 0.0005;

/// One height of a tendon, on its way to a point.
#[derive(Debug, Clone, Copy)]
struct Mark {
    station_m: f64,
    reading: HeightText,
    at_end: bool,
    thickness_m: Option<f64>,
    /// Two level lines contradict one another here.
    torn: bool,
}

impl Mark {
    /// The number that stands on the drawing; a word such as MID is none, and of two that contradict neither counts.
    fn drawn_m(&self) -> Option<f64> {
        (!self.torn && !self.reading.middle).then_some(self.reading.value_m)
    }
}

/// Points of one tendon: anchor, what the drawing gives between, anchor. Without any height all are `None`.
pub(super) fn points(
    mark: &str,
    line: &Line,
    heights: &[Height],
    thickness: &Thickness<'_>,
    job: &HeightReading,
) -> (Vec<Point>, Vec<Finding>) {
    let (marks, findings) = merged(mark, line, heights, thickness);
    let length_m = line.path.length_m();
    // The mark nearest to an end is the anchor's; another that stands near is a point of its own.
    let first_is_anchor = marks
        .first()
        .is_some_and(|m| m.at_end && m.station_m <= length_m / 2.0);
    let last_is_anchor = marks
        .last()
        .is_some_and(|m| m.at_end && m.station_m > length_m / 2.0);
    let start = marks.first().filter(|_| first_is_anchor);
    let end = marks.last().filter(|_| last_is_anchor);
    let anchor = |station_m: f64, said: Option<&Mark>| {
        let place = line.path.place_at(station_m);
        let thickness_m = thickness.at(place);
        let height_m = match said {
            Some(said) if said.torn => None,
            Some(said) => height_m(said.reading, PointKind::Anchor, thickness_m, job),
            None if marks.is_empty() => None,
            None => thickness_m.map(|t| t / 2.0),
        };
        Point {
            kind: PointKind::Anchor,
            station_m,
            place,
            drawn_m: said.and_then(Mark::drawn_m),
            height_m,
            thickness_m,
        }
    };
    let first = anchor(0.0, start);
    let last = anchor(length_m, end);
    let inner = usize::from(first_is_anchor)..marks.len() - usize::from(last_is_anchor);
    let between: Vec<Mark> = marks.get(inner).unwrap_or_default().to_vec();
    let kinds = kinds(line, &between, [&first, &last]);
    let mut points = vec![first];
    points.extend(between.iter().zip(kinds).map(|(mark, kind)| Point {
        kind,
        station_m: mark.station_m,
        place: line.path.place_at(mark.station_m),
        drawn_m: mark.drawn_m(),
        height_m: if mark.torn {
            None
        } else {
            height_m(mark.reading, kind, mark.thickness_m, job)
        },
        thickness_m: mark.thickness_m,
    }));
    points.push(last);
    (points, findings)
}

/// Heights of which no two are at one place: a label outweighs a level line, and that they differ is said.
fn merged(
    mark: &str,
    line: &Line,
    heights: &[Height],
    thickness: &Thickness<'_>,
) -> (Vec<Mark>, Vec<Finding>) {
    let mut findings = Vec::new();
    let mut marks: Vec<(Mark, bool)> = Vec::new();
    for height in heights {
        let place = line.path.place_at(height.station_m);
        let mut new = Mark {
            station_m: height.station_m,
            reading: height.reading,
            at_end: height.at_end,
            thickness_m: thickness.at(place),
            torn: false,
        };
        new.reading.weigh(new.thickness_m);
        let labelled = height.label.is_some();
        let held = marks.last_mut().filter(|(held, by_label)| {
            // A label farther in does not speak for the anchor that a level line gives.
            let same_point = match (*by_label, labelled) {
                (true, true) => false,
                (false, false) => true,
                _ => held.at_end == height.at_end,
            };
            same_point && height.station_m - held.station_m < SAME_PLACE_M
        });
        let Some((held, by_label)) = held else {
            marks.push((new, labelled));
            continue;
        };
        if !agree(held.reading, new.reading) {
            let both_lines = !*by_label && !labelled;
            held.torn |= both_lines;
            held.at_end |= both_lines && new.at_end;
            let found = Finding::new(
                &LEVEL_LINE_DIFFERS,
                if both_lines {
                    Level::Error
                } else {
                    Level::Warning
                },
                format!(
                    "{} and {} at one place; {}",
                    said(held.reading, *by_label),
                    said(new.reading, labelled),
                    if both_lines {
                        "neither was used"
                    } else {
                        "the label was used"
                    }
                ),
                "correct the level line or the label",
            );
            findings.push(
                found
                    .on_tendon(mark)
                    .at_station(height.station_m)
                    .at_place(place),
            );
        }
        if labelled {
            *held = new;
            *by_label = true;
        }
    }
    (marks.into_iter().map(|(mark, _)| mark).collect(), findings)
}

fn agree(a: HeightText, b: HeightText) -> bool {
    (a.value_m - b.value_m).abs() < SAME_M
        && (a.word == b.word || a.word.is_none() || b.word.is_none())
}

fn said(reading: HeightText, by_label: bool) -> String {
    let source = if by_label { "a label" } else { "a level line" };
    format!("{source} says {}", words(reading))
}

/// A height as one would write it.
pub(super) fn words(reading: HeightText) -> String {
    let word = match reading.word {
        Some(Word::High) => "H",
        Some(Word::Low) => "L",
        None => "",
    };
    let millimetres = (reading.value_m * 10_000.0).round() / 10.0;
    format!("{word}{millimetres} mm")
}

/// Strand centroid above the local soffit. To the duct's underside, the strand lies higher in the duct at a low point
/// than at a high one; between, and at an anchor, it is taken midway.
fn height_m(
    reading: HeightText,
    kind: PointKind,
    thickness_m: Option<f64>,
    job: &HeightReading,
) -> Option<f64> {
    if reading.middle {
        return thickness_m.map(|thickness_m| thickness_m / 2.0);
    }
    let value_m = reading.value_m;
    // A chair stands on the form and carries the duct: its height is that of the duct's underside.
    let in_duct_m = match (reading.datum, kind) {
        (Datum::Centroid, _) => 0.0,
        (Datum::DuctUnderside | Datum::Chair, PointKind::Low) => job.strand_in_duct_low_m,
        (Datum::DuctUnderside | Datum::Chair, PointKind::High) => job.strand_in_duct_high_m,
        (Datum::DuctUnderside | Datum::Chair, PointKind::Anchor | PointKind::Support) => {
            f64::midpoint(job.strand_in_duct_low_m, job.strand_in_duct_high_m)
        }
    };
    match (reading.from, kind) {
        (FromFace::Soffit, _) | (FromFace::NearerFace, PointKind::Low) => Some(value_m + in_duct_m),
        (FromFace::Top, _) | (FromFace::NearerFace, PointKind::High) => {
            Some(thickness_m? - value_m + in_duct_m)
        }
        (FromFace::NearerFace, PointKind::Anchor | PointKind::Support) => None,
    }
}

/// What each height is: by its word, or by its neighbours.
fn kinds(line: &Line, marks: &[Mark], anchors: [&Point; 2]) -> Vec<PointKind> {
    // Where the slab's thickness is known everywhere, levels are compared; otherwise heights as written.
    let by_level = marks.iter().all(|mark| mark.thickness_m.is_some())
        && anchors.iter().all(|anchor| anchor.thickness_m.is_some());
    let from_soffit = |mark: &Mark| mark.reading.from == FromFace::Soffit;
    let level = |mark: &Mark| match mark.reading.from {
        FromFace::Top => -mark.reading.value_m,
        FromFace::NearerFace if mark.reading.word != Some(Word::Low) => -mark.reading.value_m,
        _ if by_level => mark.reading.value_m - mark.thickness_m.unwrap_or(0.0),
        _ => mark.reading.value_m,
    };
    let anchor = |point: &Point| {
        if !by_level && marks.iter().all(from_soffit) {
            point.height_m
        } else {
            point.level_m()
        }
    };
    // Anchor, heights, anchor; an anchor without a level does not count.
    let mut levels: Vec<Option<f64>> = vec![anchor(anchors[0])];
    levels.extend(marks.iter().map(|mark| Some(level(mark))));
    levels.push(anchor(anchors[1]));
    let ends = [0.0, line.path.length_m()];
    let stations: Vec<f64> = std::iter::once(ends[0])
        .chain(marks.iter().map(|mark| mark.station_m))
        .chain(std::iter::once(ends[1]))
        .collect();
    (1..=marks.len())
        .map(|at| match marks[at - 1].reading.word {
            Some(Word::High) => PointKind::High,
            Some(Word::Low) => PointKind::Low,
            None => bare(at, &levels, &stations, marks, line),
        })
        .collect()
}

/// A bare number: higher than what is around it, lower, or between.
fn bare(
    at: usize,
    levels: &[Option<f64>],
    stations: &[f64],
    marks: &[Mark],
    line: &Line,
) -> PointKind {
    let Some(here) = levels[at] else {
        return PointKind::Support;
    };
    let differs = |other: usize| levels[other].is_some_and(|l| (l - here).abs() > SAME_M);
    let equal = |other: usize| levels[other].is_some_and(|l| (l - here).abs() <= SAME_M);
    let before = (0..at).rev().find(|&other| differs(other));
    let after = (at + 1..levels.len()).find(|&other| differs(other));
    let up = |other: Option<usize>| other.and_then(|o| levels[o]).map(|l| l < here);
    let kind = match (up(before), up(after)) {
        (Some(true), Some(true) | None) | (None, Some(true)) => PointKind::High,
        (Some(false), Some(false) | None) | (None, Some(false)) => PointKind::Low,
        _ => return PointKind::Support,
    };
    // Of several equal ones in a row the one that says so, or else the middlemost, is the point itself.
    let first = before.map_or(1, |b| b + 1).max(1);
    let last = after.map_or(levels.len() - 2, |a| a - 1).min(marks.len());
    let flat = (first..=last).filter(|&other| equal(other));
    let middle_m = f64::midpoint(
        before.map_or(stations[0], |b| stations[b]),
        after.map_or(stations[stations.len() - 1], |a| stations[a]),
    );
    let off = |other: usize| (stations[other] - middle_m).abs();
    let chosen = flat.min_by(|&a, &b| {
        let worded = |o: usize| marks[o - 1].reading.word.is_none();
        let place = |o: usize| line.path.place_at(stations[o]);
        worded(a)
            .cmp(&worded(b))
            .then_with(|| {
                let (a, b) = (off(a), off(b));
                if (a - b).abs() < 1e-6 {
                    std::cmp::Ordering::Equal
                } else {
                    a.total_cmp(&b)
                }
            })
            .then_with(|| place(a).x.total_cmp(&place(b).x))
            .then_with(|| place(a).y.total_cmp(&place(b).y))
    });
    if chosen == Some(at) {
        kind
    } else {
        PointKind::Support
    }
}
