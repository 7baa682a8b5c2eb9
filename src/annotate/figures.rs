//! Force figures at anchors, highs and lows, set beside their tendon where nothing else is written. A figure has the
//! same place at every stage. What fits nowhere is left out: the table and the other results have it.

use std::f64::consts::FRAC_PI_2;

use super::lanes::Lane;
use super::place::{Room, Spot, readable_rad};
use super::{layers, words};
use crate::analysis::{Analysis, TendonResult, pair};
use crate::drawing::{Align, Drawn, Mark};
use crate::floor::{PointKind, Tendon};
use crate::geometry::{Path, step};

/// Tendon lines that a figure may lie on if there is no clear place.
const MOST_CROSSED: usize = 1;

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
    path: &'a Path,
    station_m: f64,
    /// As far as they are known.
    forces_kn: [Option<f64>; 4],
    lane: Lane,
}

/// The figures of all tendons that have forces, stage by stage.
pub(super) fn figures(analysis: &Analysis, lanes: &[Lane], room: &mut Room) -> Vec<Mark> {
    let mut figures: Vec<Figure> = pair(analysis)
        .zip(lanes)
        .filter(|((_, result), _)| result.forces.is_some())
        .flat_map(|((tendon, result), lane)| of_tendon(tendon, result, *lane))
        .collect();
    figures.sort_by_key(|figure| figure.worth);
    let placed: Vec<(Figure, Spot)> = figures
        .into_iter()
        .filter_map(|figure| {
            let spot = find(&figure, room)?;
            room.take(&spot);
            Some((figure, spot))
        })
        .collect();
    let stages = layers::FORCE_TEXT.into_iter().enumerate();
    stages
        .flat_map(|(stage, layer)| {
            placed.iter().filter_map(move |(figure, spot)| {
                let drawn = Drawn::Text {
                    place: spot.centre,
                    height_m: spot.height_m,
                    rotation_rad: spot.rotation_rad,
                    align: Align::Middle,
                    content: number((*figure.forces_kn.get(stage)?)?),
                };
                Some(layers::mark(layer, drawn))
            })
        })
        .collect()
}

fn number(force_kn: f64) -> String {
    format!("{force_kn:.0}")
}

/// The force at the last stage that is known.
fn latest_kn(forces_kn: &[Option<f64>; 4]) -> Option<f64> {
    forces_kn.iter().rev().find_map(|force_kn| *force_kn)
}

fn of_tendon<'a>(tendon: &'a Tendon, result: &TendonResult, lane: Lane) -> Vec<Figure<'a>> {
    let figure = |worth, station_m, forces_kn: [Option<f64>; 4]| Figure {
        worth,
        path: &tendon.path,
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

/// The first clear place in a fixed order: in full size before smaller, near before far, left of the reading direction
/// before right (in a band, that tells whose figure it is), beside the point before along the tendon. Texts are never
/// touched; lines only as a last resort.
fn find(figure: &Figure, room: &Room) -> Option<Spot> {
    let letters: Vec<String> = figure.forces_kn.into_iter().flatten().map(number).collect();
    let longest = letters.iter().max_by_key(|text| text.len())?;
    if !figure.forces_kn.iter().flatten().all(|kn| kn.is_finite()) {
        return None;
    }
    let length_m = figure.path.length_m();
    let mut second: Option<(usize, Spot)> = None;
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
                    let along_m = widths * width_m + heights * height_m;
                    let station_m = figure.station_m + along_m;
                    if station_m < -1e-9 || station_m > length_m + 1e-9 {
                        continue;
                    }
                    let on_line = figure.path.place_at(station_m);
                    let rotation_rad = readable_rad(figure.path.heading_at(station_m));
                    let spot = Spot {
                        centre: step(on_line, rotation_rad + FRAC_PI_2, side * across_m),
                        width_m,
                        height_m,
                        rotation_rad,
                    };
                    if !room.clear_of_texts(&spot) {
                        continue;
                    }
                    let crossed = room.lines_hit(&spot);
                    if crossed == 0 {
                        return Some(spot);
                    }
                    if crossed <= MOST_CROSSED && second.is_none_or(|(least, _)| crossed < least) {
                        second = Some((crossed, spot));
                    }
                }
            }
        }
    }
    second.map(|(_, spot)| spot)
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
