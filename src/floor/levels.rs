//! Level lines: lines that give one height to every tendon that they cross.

use std::collections::BTreeSet;

use geo::Coord;

use super::heights::Height;
use super::index::Index;
use super::label_text::label;
use super::layers::{Roles, sound};
use super::lines::Line;
use super::order::{by_handle, by_place};
use super::pieces::{Joint, chains};
use super::points::words;
use super::readings::{HeightText, height_of_line};
use super::rules::LEVEL_LINE_UNREAD;
use super::writing::Writing;
use crate::drawing::{Drawing, Shape, ShapeKind};
use crate::finding::{Finding, Level, Wording};
use crate::geometry::{Path, Segment, distance_m};
use crate::job::Job;
use crate::units::{LONG, Units};

/// Heights that level lines give, and the texts that they took.
pub(super) struct Levels {
    /// By tendon line.
    pub(super) of_line: Vec<Vec<Height>>,
    /// Texts, by place in the drawing's list, that belong to level lines.
    pub(super) texts: BTreeSet<usize>,
}

/// A level line that stops this short of a tendon crosses it, metres.
const SHORT_M: f64 = 0.005;
/// Pieces of one level line go on about straight, radians.
const STRAIGHT_RAD: f64 = 0.2;
/// Level lines leave arcs by no more than this, metres.
const CHORD_M: f64 = 0.002;
/// Crossings nearer than this are one, metres.
const ONE_M: f64 = 0.05;

/// Reads level lines; `index` holds the tendon lines.
pub(super) fn levels(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    lines: &[Line],
    index: &Index,
) -> (Levels, Vec<Finding>) {
    let paths = level_paths(drawing, job, roles);
    let mut levels = Levels {
        of_line: vec![Vec::new(); lines.len()],
        texts: BTreeSet::new(),
    };
    let readings = readings(drawing, job, roles, &paths, index, &mut levels.texts);
    let mut findings = Vec::new();
    for (path, said) in paths.iter().zip(readings) {
        match said.as_slice() {
            [] => findings.push(unread(path, |_| "has no height within reach".to_owned())),
            [first, rest @ ..] => {
                // Of a height that is contradicted the tendons know only that one belongs here.
                let one = rest.iter().all(|other| other == first);
                let reading = HeightText {
                    torn: first.torn || !one,
                    word: first
                        .word
                        .filter(|_| rest.iter().all(|other| other.word == first.word)),
                    ..*first
                };
                cross(path, reading, lines, index, &mut levels.of_line);
                if !one {
                    findings.push(unread(path, |units| {
                        let numbers: BTreeSet<String> =
                            said.iter().map(|&said| words(said, units)).collect();
                        let numbers: Vec<String> = numbers.into_iter().collect();
                        format!("has more than one height beside it: {}", numbers.join(", "))
                    }));
                } else if first.torn {
                    findings.push(unread(path, |_| {
                        "has a text that contradicts itself".to_owned()
                    }));
                }
            }
        }
    }
    for heights in &mut levels.of_line {
        heights.sort_by(|a, b| a.station_m.total_cmp(&b.station_m));
    }
    (levels, findings)
}

fn level_paths(drawing: &Drawing, job: &Job, roles: &Roles) -> Vec<Path> {
    let mut shapes: Vec<&Shape> = drawing
        .shapes
        .iter()
        .filter(|shape| roles.of(&shape.layer, shape.look).label.level_lines && sound(shape))
        .filter(|shape| shape.kind != ShapeKind::Solid)
        .collect();
    shapes.sort_by(|a, b| by_place(&a.path, &b.path).then_with(|| by_handle(&a.handle, &b.handle)));
    let pieces: Vec<&Path> = shapes.iter().map(|shape| &shape.path).collect();
    let joint = Joint {
        gap_m: job.conventions.join_gap_m,
        turn_rad: STRAIGHT_RAD,
    };
    let (chains, _) = chains(&pieces, joint, |_| false);
    chains.iter().map(|chain| chain.path(&pieces)).collect()
}

fn unread(path: &Path, what: impl Fn(Units) -> String) -> Finding {
    Finding::new(
        &LEVEL_LINE_UNREAD,
        Level::Error,
        Wording::of(|units| {
            format!(
                "a level line of {} {}; expected one, such as L30: no tendon takes a height from it",
                units.of(LONG).said(path.length_m(), 2),
                what(units)
            )
        }),
        "write one height beside the level line, on its layer",
    )
    .at_place(path.place_at(path.length_m() / 2.0))
}

/// What the texts beside each level line say.
fn readings(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    paths: &[Path],
    tendons: &Index,
    taken: &mut BTreeSet<usize>,
) -> Vec<Vec<HeightText>> {
    let level_lines = Index::new(paths.iter());
    let mut said: Vec<Vec<HeightText>> = vec![Vec::new(); paths.len()];
    if paths.is_empty() {
        return said;
    }
    let writing = Writing::of(drawing, job, roles);
    for own_layer in [true, false] {
        let mut found: Vec<(usize, usize, Vec<HeightText>)> = Vec::new();
        for (at, text) in drawing.texts.iter().enumerate() {
            let labels = roles.of(&text.layer, text.look).label;
            if labels.level_lines != own_layer || !(labels.level_lines || labels.heights) {
                continue;
            }
            let Some(whole) = label(&text.content, true, false, job).height else {
                continue;
            };
            let lines = text.content.lines();
            let given: Vec<HeightText> = lines
                .filter_map(|line| height_of_line(line, &job.conventions))
                .map(|(height, _)| HeightText {
                    torn: whole.torn,
                    ..writing.means(height)
                })
                .collect();
            let reach_m = job.conventions.label_reach * text.height_m;
            let Some((gap_m, line)) = nearest(&level_lines, &text.corners, reach_m) else {
                continue;
            };
            // On the layer of heights a text is a tendon's unless the level line is nearer, both of them being seen
            // by the point that was placed: the text's box may well lie across a tendon.
            if !own_layer {
                let Some(path) = paths.get(line) else {
                    continue;
                };
                let to_level_m = path.project(text.place).map_or(gap_m, |p| p.distance_m);
                let feet = tendons.feet(text.place, reach_m + text.height_m);
                let nearer = feet.iter().any(|foot| foot.distance_m < to_level_m);
                let parallel = path.project(text.place).is_some_and(|foot| {
                    (path.heading_at(foot.station_m) - text.rotation_rad)
                        .sin()
                        .abs()
                        < 0.3
                });
                if nearer || !parallel {
                    continue;
                }
            }
            found.push((line, at, given));
        }
        let before: Vec<Option<HeightText>> = said.iter().map(|s| s.first().copied()).collect();
        for (line, at, given) in found {
            // A level line that has its height takes no more than repeats of it from the layer of heights.
            let repeats =
                before[line].is_none_or(|first| given.iter().all(|given| *given == first));
            if own_layer || repeats {
                said[line].extend(given);
                taken.insert(at);
            }
        }
    }
    said
}

/// The line nearest to a text's box.
fn nearest(index: &Index, corners: &[Coord<f64>; 4], reach_m: f64) -> Option<(f64, usize)> {
    index
        .around(corners, reach_m)
        .into_iter()
        .map(|chord| (chord.gap_m(corners), chord.line))
        .filter(|&(gap_m, _)| gap_m <= reach_m)
        .min_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)))
}

/// Gives a level line's height to every tendon that it crosses.
fn cross(
    path: &Path,
    reading: HeightText,
    lines: &[Line],
    index: &Index,
    of_line: &mut [Vec<Height>],
) {
    let chords = path.to_line_string(CHORD_M);
    for chord in chords.lines() {
        let (from, to) = longer(chord.start, chord.end);
        for near in index.around(&[from, to], 0.0) {
            let Some(place) = near.crossing(from, to) else {
                continue;
            };
            let foot = near.foot(place);
            let Some(line) = lines.get(foot.line) else {
                continue;
            };
            let held = &mut of_line[foot.line];
            if held
                .iter()
                .any(|h| (h.station_m - foot.station_m).abs() < ONE_M && h.reading == reading)
            {
                continue;
            }
            let length_m = line.path.length_m();
            held.push(Height {
                station_m: foot.station_m,
                at_end: foot.station_m.min(length_m - foot.station_m) < ONE_M,
                reading,
                label: None,
            });
        }
    }
}

/// A stretch made a little longer at both ends.
fn longer(from: Coord<f64>, to: Coord<f64>) -> (Coord<f64>, Coord<f64>) {
    let stretch = Segment::Line { from, to };
    let length_m = distance_m(from, to);
    (
        stretch.place_at(-SHORT_M),
        stretch.place_at(length_m + SHORT_M),
    )
}
