//! Force figures at anchors, highs and lows, set beside their tendon where nothing else is written. A figure has the
//! same place at every stage. The figures of a tendon follow one another as their points do; one that stands off its
//! point is led there by a thin line. What fits nowhere is left out: the table and the other results have it.

use std::f64::consts::FRAC_PI_2;

use geo::Coord;

use super::lanes::Lane;
use super::place::{Room, Spot, readable_rad};
use super::{layers, words};
use crate::analysis::{Analysis, TendonResult, pair};
use crate::drawing::{Align, Drawn, Mark};
use crate::floor::{PointKind, Tendon};
use crate::geometry::{distance_m, step};
use crate::units::{FORCE, Unit, Units};

/// Tendon lines that a figure may lie on if there is no clear place.
const MOST_CROSSED: usize = 1;

/// How far from its point a figure needs no leader, in text widths, where no other point of the tendon is nearer.
const UNLED: f64 = 1.5;

/// What a figure stands for, the most needed first.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
enum Worth {
    Anchor,
    Least,
    High,
    Low,
}

#[derive(Debug, Clone, Copy)]
struct Figure<'a> {
    worth: Worth,
    /// Index of the tendon in the floor.
    index: usize,
    tendon: &'a Tendon,
    station_m: f64,
    /// As far as they are known.
    forces_kn: [Option<f64>; 4],
    lane: Lane,
}

/// Where a figure stands.
#[derive(Debug, Clone, Copy)]
struct Stand {
    spot: Spot,
    /// Station of its centre, metres.
    along_m: f64,
    /// From the figure to its point, if it stands off it.
    leader: Option<[Coord<f64>; 2]>,
}

/// The figures of all tendons that have forces, stage by stage.
pub(super) fn figures(
    analysis: &Analysis,
    lanes: &[Lane],
    units: Units,
    room: &mut Room,
) -> Vec<Mark> {
    let force = units.of(FORCE);
    let mut figures: Vec<Figure> = pair(analysis)
        .zip(lanes)
        .enumerate()
        .filter(|(_, ((_, result), _))| result.forces.is_some())
        .flat_map(|(index, ((tendon, result), lane))| of_tendon(index, tendon, result, *lane))
        .collect();
    figures.sort_by_key(|figure| figure.worth);
    let mut of_tendon: Vec<Vec<(f64, f64)>> = vec![Vec::new(); analysis.results.len()];
    let mut placed: Vec<(Figure, Stand)> = Vec::with_capacity(figures.len());
    for figure in figures {
        let Some(before) = of_tendon.get_mut(figure.index) else {
            continue;
        };
        let Some(stand) = find(&figure, before, force, room) else {
            continue;
        };
        before.push((figure.station_m, stand.along_m));
        room.take(&stand.spot);
        if let Some([from, to]) = stand.leader {
            room.take_line(from, to);
        }
        placed.push((figure, stand));
    }
    let stages = layers::FORCE_TEXT.into_iter().enumerate();
    stages
        .flat_map(|(stage, layer)| {
            placed.iter().flat_map(move |(figure, stand)| {
                let known = figure.forces_kn.get(stage).copied().flatten();
                let text = known.map(|force_kn| Drawn::Text {
                    place: stand.spot.centre,
                    height_m: stand.spot.height_m,
                    rotation_rad: stand.spot.rotation_rad,
                    align: Align::Middle,
                    content: force.figure(force_kn, 0),
                });
                let leader = stand.leader.filter(|_| known.is_some());
                let leader = leader.map(|points| Drawn::Line {
                    points: points.to_vec(),
                    width_m: 0.0,
                    closed: false,
                });
                let drawn = text.into_iter().chain(leader);
                drawn.map(move |drawn| layers::mark(layer, drawn))
            })
        })
        .collect()
}

/// The force at the last stage that is known.
fn latest_kn(forces_kn: &[Option<f64>; 4]) -> Option<f64> {
    forces_kn.iter().rev().find_map(|force_kn| *force_kn)
}

fn of_tendon<'a>(
    index: usize,
    tendon: &'a Tendon,
    result: &TendonResult,
    lane: Lane,
) -> Vec<Figure<'a>> {
    let figure = |worth, station_m, forces_kn: [Option<f64>; 4]| Figure {
        worth,
        index,
        tendon,
        station_m,
        forces_kn,
        lane,
    };
    let mut figures: Vec<Figure> = tendon
        .points
        .iter()
        .zip(&result.points)
        .filter_map(|(point, found)| {
            let worth = match point.kind {
                PointKind::Anchor => Worth::Anchor,
                PointKind::High => Worth::High,
                PointKind::Low => Worth::Low,
                PointKind::Support => return None,
            };
            latest_kn(&found.forces_kn)?;
            Some(figure(worth, point.station_m, found.forces_kn))
        })
        .collect();
    let last = |forces_kn: &[Option<f64>; 4]| latest_kn(forces_kn).unwrap_or(f64::INFINITY);
    let least = result
        .samples
        .iter()
        .filter(|sample| latest_kn(&sample.forces_kn).is_some())
        .map(|sample| (sample.station_m, sample.forces_kn))
        .min_by(|a, b| last(&a.1).total_cmp(&last(&b.1)));
    if let Some((station_m, forces_kn)) = least {
        let nearest = figures
            .iter_mut()
            .min_by(|a, b| last(&a.forces_kn).total_cmp(&last(&b.forces_kn)));
        match nearest {
            // Between two points, where the curves from two jacks meet, say, and lower than at either.
            Some(at_point) if last(&at_point.forces_kn) > last(&forces_kn) + 0.5 => {
                figures.push(figure(Worth::Least, station_m, forces_kn));
            }
            Some(at_point) => at_point.worth = at_point.worth.min(Worth::Least),
            None => figures.push(figure(Worth::Least, station_m, forces_kn)),
        }
    }
    if lane.dense {
        figures.retain(|figure| figure.worth <= Worth::Least);
    }
    figures
}

/// The first place in a fixed order that is clear and needs no leader: in full size before smaller, near before far,
/// left of the reading direction before right (in a band, that tells whose figure it is), beside the point before along
/// the tendon. Failing that, the first that crosses fewest lines. Texts are never touched, and no figure passes another
/// of its tendon: `before` has their stations, and where they stand.
fn find(figure: &Figure, before: &[(f64, f64)], force: Unit, room: &Room) -> Option<Stand> {
    let known = figure.forces_kn.into_iter().flatten();
    let letters: Vec<String> = known.map(|force_kn| force.figure(force_kn, 0)).collect();
    let longest = letters.iter().max_by_key(|text| text.len())?;
    if !figure.forces_kn.iter().flatten().all(|kn| kn.is_finite()) {
        return None;
    }
    let path = &figure.tendon.path;
    let length_m = path.length_m();
    let mut second: Option<((usize, bool), Stand)> = None;
    for shrink in [1.0, 0.75] {
        let height_m = figure.lane.text_m * shrink;
        let width_m = words::width_m(longest, height_m);
        for away in [0.3, 1.5] {
            let across_m = figure.lane.width_m / 2.0 + height_m * (away + 0.5);
            if across_m + height_m / 2.0 > figure.lane.spacing_m {
                // Beyond the neighbour it would pass for the neighbour's.
                continue;
            }
            for side in [1.0, -1.0] {
                for (widths, heights) in shifts(figure.station_m, length_m) {
                    let along_m = figure.station_m + widths * width_m + heights * height_m;
                    if along_m < -1e-9
                        || along_m > length_m + 1e-9
                        || !in_order(figure.station_m, along_m, height_m, before)
                    {
                        continue;
                    }
                    let on_line = path.place_at(along_m);
                    let rotation_rad = readable_rad(path.heading_at(along_m));
                    let spot = Spot {
                        centre: step(on_line, rotation_rad + FRAC_PI_2, side * across_m),
                        width_m,
                        height_m,
                        rotation_rad,
                    };
                    if !room.clear_of_texts(&spot) {
                        continue;
                    }
                    let leader = leader(figure, along_m, &spot);
                    if leader.is_some_and(|[from, to]| !room.line_clear_of_texts(from, to)) {
                        continue;
                    }
                    let stand = Stand {
                        spot,
                        along_m,
                        leader,
                    };
                    let rank = (room.lines_hit(&spot), leader.is_some());
                    if rank == (0, false) {
                        return Some(stand);
                    }
                    if rank.0 <= MOST_CROSSED && second.is_none_or(|(least, _)| rank < least) {
                        second = Some((rank, stand));
                    }
                }
            }
        }
    }
    second.map(|(_, stand)| stand)
}

/// Whether a figure would stand to the others of its tendon as its point does to theirs, and clearly so.
fn in_order(station_m: f64, along_m: f64, clearly_m: f64, before: &[(f64, f64)]) -> bool {
    before.iter().all(|&(other_m, other_along_m)| {
        let apart_m = along_m - other_along_m;
        let ahead = if station_m < other_m {
            -apart_m
        } else {
            apart_m
        };
        ahead >= clearly_m
    })
}

/// The line from a figure to its point, unless it stands beside it and nearer to it than to any other of the tendon's.
fn leader(figure: &Figure, along_m: f64, spot: &Spot) -> Option<[Coord<f64>; 2]> {
    let off_m = (along_m - figure.station_m).abs();
    let others = figure.tendon.points.iter().map(|point| point.station_m);
    let nearest = others
        .filter(|other_m| (other_m - figure.station_m).abs() > 1e-6)
        .all(|other_m| off_m <= (along_m - other_m).abs());
    if nearest && off_m <= UNLED * spot.width_m + spot.height_m {
        return None;
    }
    let to = figure.tendon.path.place_at(figure.station_m);
    let sides = [-1.0, 1.0].map(|side| {
        let clear_m = spot.width_m / 2.0 + 0.3 * spot.height_m;
        step(spot.centre, spot.rotation_rad, side * clear_m)
    });
    let from = sides
        .into_iter()
        .min_by(|a, b| distance_m(*a, to).total_cmp(&distance_m(*b, to)))?;
    Some([from, to])
}

/// Shifts along the tendon, in text widths and heights: inwards from an end, to both sides elsewhere.
fn shifts(station_m: f64, length_m: f64) -> [(f64, f64); 5] {
    if station_m < 1e-6 {
        [0.5, 1.1, 1.7, 2.3, 2.9].map(|widths| (widths, 0.8))
    } else if station_m > length_m - 1e-6 {
        [0.5, 1.1, 1.7, 2.3, 2.9].map(|widths| (-widths, -0.8))
    } else {
        [0.0, 0.65, -0.65, 1.3, -1.3].map(|widths| (widths, 0.0))
    }
}
