//! Profile points of a tendon from the heights that were settled on it.

use super::heights::{Height, SAME_PLACE_M};
use super::inward::Inside;
use super::lines::Line;
use super::measured::{Measured, Measures};
use super::nearer_face::{Bare, unknown_at_anchor, words_by_neighbours};
use super::readings::{HeightText, Word};
use super::rules::LEVEL_LINE_DIFFERS;
use super::slab::Thickness;
use super::types::{Faces, Point, PointKind};
use crate::finding::{Finding, Level, Wording};
use crate::job::{FromFace, HeightReading, Soffit};
use crate::units::{SHORT, Units};

/// Heights that differ by less are equal, metres.
const SAME_M: f64 = 0.0005;

/// One height of a tendon, on its way to a point.
#[derive(Debug, Clone, Copy)]
struct Mark {
    station_m: f64,
    reading: HeightText,
    at_end: bool,
    faces: Faces,
    /// Two level lines, or two labels, contradict one another here.
    torn: bool,
}

impl Mark {
    /// The number that stands on the drawing; a word such as MID is none, and of two that contradict neither counts.
    fn drawn_m(&self) -> Option<f64> {
        (!self.torn && !self.reading.middle).then_some(self.reading.value_m)
    }

    /// Whether its number is to the nearer face.
    fn is_to_nearer_face(&self) -> bool {
        self.reading.from == FromFace::NearerFace && !self.reading.middle && !self.torn
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
    let (mut marks, mut findings) = merged(mark, line, heights, thickness);
    let length_m = line.path.length_m();
    findings.extend(anchored(mark, line, &mut marks));
    // The mark nearest to an end is the anchor's; another that stands near is a point of its own.
    let first_is_anchor = marks
        .first()
        .is_some_and(|m| m.at_end && m.station_m <= length_m / 2.0);
    let last_is_anchor = marks
        .last()
        .is_some_and(|m| m.at_end && m.station_m > length_m / 2.0);
    let inner = usize::from(first_is_anchor)..marks.len() - usize::from(last_is_anchor);
    let mut faceless = false;
    if marks.iter().any(Mark::is_to_nearer_face) {
        let found = by_neighbours(mark, line, marks.get_mut(inner.clone()).unwrap_or_default());
        faceless = found.iter().any(|finding| finding.level == Level::Error);
        findings.extend(found);
    }
    let measures = Measures {
        job,
        general: thickness.general(),
    };
    let start = marks.first().filter(|_| first_is_anchor);
    let end = marks.last().filter(|_| last_is_anchor);
    let anchor = |station_m: f64, said: Option<&Mark>| {
        let place = line.path.place_at(station_m);
        let faces = thickness.faces_at(place);
        let measured = match said {
            Some(said) if said.torn => Measured::default(),
            Some(said) => measures.height(said.reading, PointKind::Anchor, faces),
            None if marks.is_empty() || faceless => Measured::default(),
            None => Measured::height(faces.thickness_m.map(|t| t / 2.0)),
        };
        Point {
            kind: PointKind::Anchor,
            station_m,
            place,
            drawn_m: said.and_then(Mark::drawn_m),
            height_m: measured.height_m,
            other_soffit_m: measured.other_soffit_m,
            thickness_m: faces.thickness_m,
            top_m: faces.top_m,
        }
    };
    let first = anchor(0.0, start);
    let last = anchor(length_m, end);
    for (said, anchor) in [(start, &first), (end, &last)] {
        let open =
            |said: &&Mark| !said.torn && said.is_to_nearer_face() && anchor.height_m.is_none();
        if let Some(said) = said.filter(open) {
            findings.push(
                unknown_at_anchor(said.reading.value_m)
                    .on_tendon(mark)
                    .at_station(anchor.station_m)
                    .at_place(anchor.place),
            );
        }
    }
    let between: Vec<Mark> = marks.get(inner).unwrap_or_default().to_vec();
    let kinds = kinds(line, &between, [&first, &last], &measures);
    let mut points = vec![first];
    points.extend(between.iter().zip(kinds).map(|(mark, kind)| {
        let measured = if mark.torn {
            Measured::default()
        } else {
            measures.height(mark.reading, kind, mark.faces)
        };
        Point {
            kind,
            station_m: mark.station_m,
            place: line.path.place_at(mark.station_m),
            drawn_m: mark.drawn_m(),
            height_m: measured.height_m,
            other_soffit_m: measured.other_soffit_m,
            thickness_m: mark.faces.thickness_m,
            top_m: mark.faces.top_m,
        }
    }));
    points.push(last);
    (points, findings)
}

/// Gives an anchor the height that is written a little way in from it, and says where that is in doubt.
fn anchored(mark: &str, line: &Line, marks: &mut [Mark]) -> Vec<Finding> {
    let length_m = line.path.length_m();
    let from_start_m: Vec<f64> = marks.iter().map(|mark| mark.station_m).collect();
    let from_end_m: Vec<f64> = from_start_m.iter().map(|at_m| length_m - at_m).collect();
    let last = marks.len().saturating_sub(1);
    let mut findings = Vec::new();
    for (at, next, in_m) in [
        (0, 1, &from_start_m),
        (last, last.wrapping_sub(1), &from_end_m),
    ] {
        let Some((held, &in_m, &next_m)) = marks
            .get_mut(at)
            .zip(in_m.get(at))
            .map(|(held, own_m)| (held, own_m, in_m.get(next).unwrap_or(&length_m)))
        else {
            continue;
        };
        let inside = Inside {
            in_m,
            reading: held.reading,
            next_m,
            thickness_m: held.faces.thickness_m,
        };
        if held.at_end || held.torn {
            continue;
        }
        held.at_end = inside.is_of_anchor();
        let place = line.path.place_at(held.station_m);
        findings.extend(inside.doubt().map(|finding| {
            finding
                .on_tendon(mark)
                .at_station(held.station_m)
                .at_place(place)
        }));
    }
    findings
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
            faces: thickness.faces_at(place),
            torn: height.reading.torn,
        };
        new.reading.weigh(new.faces.thickness_m);
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
        let counted = !held.reading.torn && !new.reading.torn;
        if counted && !held.reading.agrees(&new.reading) {
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
                Wording::of(|units| {
                    format!(
                        "{} and {} at one place; {}",
                        said(held.reading, *by_label, units),
                        said(new.reading, labelled, units),
                        if both_lines {
                            "neither was used"
                        } else {
                            "the label was used"
                        }
                    )
                }),
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

fn said(reading: HeightText, by_label: bool, units: Units) -> String {
    let source = if by_label { "a label" } else { "a level line" };
    format!("{source} says {}", words(reading, units))
}

/// A height as one would write it.
pub(super) fn words(reading: HeightText, units: Units) -> String {
    let word = match reading.word {
        Some(Word::High) => "H",
        Some(Word::Low) => "L",
        None => "",
    };
    let height = units.of(SHORT).brief(reading.value_m * 1000.0, 1);
    format!("{word}{height}")
}

/// Gives bare numbers to the nearer face the words that their neighbours leave them, and says so.
fn by_neighbours(mark: &str, line: &Line, marks: &mut [Mark]) -> Vec<Finding> {
    let mut marks: Vec<&mut Mark> = marks
        .iter_mut()
        .filter(|mark| mark.reading.word.is_some() || mark.is_to_nearer_face())
        .collect();
    let bare: Vec<Bare> = marks
        .iter()
        .map(|mark| Bare {
            station_m: mark.station_m,
            value_m: mark.reading.value_m,
            word: mark.reading.word,
        })
        .collect();
    let (words, findings) = words_by_neighbours(&bare);
    for (mark, word) in marks.iter_mut().zip(words) {
        mark.reading.word = word;
    }
    let on_tendon = |finding: Finding| {
        let place = line.path.place_at(finding.station_m.unwrap_or_default());
        finding.on_tendon(mark).at_place(place)
    };
    findings.into_iter().map(on_tendon).collect()
}

/// What each height is: by its word, or by its neighbours.
fn kinds(
    line: &Line,
    marks: &[Mark],
    anchors: [&Point; 2],
    measures: &Measures<'_>,
) -> Vec<PointKind> {
    let general_m = measures.general.soffit_m();
    let from_general = measures.job.soffit == Soffit::General;
    // Where the slab's thickness is known everywhere, levels are compared; otherwise heights as written.
    let by_level = marks.iter().all(|mark| mark.faces.thickness_m.is_some())
        && anchors.iter().all(|anchor| anchor.thickness_m.is_some())
        && (general_m.is_some() || !from_general);
    let level = |mark: &Mark| {
        let soffit_m = if from_general && !mark.reading.middle {
            general_m
        } else {
            mark.faces.soffit_m()
        };
        match (mark.reading.from, mark.reading.word) {
            (FromFace::Top, _) | (FromFace::NearerFace, Some(Word::High)) => {
                Some(mark.faces.top_m - mark.reading.value_m)
            }
            (FromFace::NearerFace, None) => None,
            _ if by_level => Some(mark.reading.value_m + soffit_m?),
            _ => Some(mark.reading.value_m),
        }
    };
    let from_soffit = |mark: &Mark| mark.reading.from == FromFace::Soffit;
    let anchor = |point: &Point| {
        if !by_level && marks.iter().all(from_soffit) {
            point.height_m
        } else {
            point.level_m()
        }
    };
    // Anchor, heights, anchor; an anchor without a level does not count.
    let mut levels: Vec<Option<f64>> = vec![anchor(anchors[0])];
    levels.extend(marks.iter().map(level));
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
