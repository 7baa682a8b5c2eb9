//! The extension at each jack: at an end written outwards along the tendon, at an intermediate anchor beside it.

use std::f64::consts::{FRAC_PI_2, PI};

use geo::Coord;

use super::lanes::Lane;
use super::place::{Room, Spot, readable_rad};
use super::{layers, words};
use crate::analysis::{Analysis, pair};
use crate::drawing::{Align, Drawn, Mark};
use crate::floor::Tendon;
use crate::geometry::{step, turn_rad};
use crate::losses::{EndForces, Pull};
use crate::profile::SAME_PLACE_M;
use crate::units::{SHORT, Unit, Units};

/// Clear of the end symbol: from the end to the text, in text heights.
const LEAD: f64 = 2.5;

/// Where a figure at an intermediate anchor may stand: its near edge from the line, in text heights.
const BESIDE: [f64; 4] = [0.8, 2.2, 3.6, 5.0];

/// One text a jack, in the floor's order.
pub(super) fn texts(
    analysis: &Analysis,
    lanes: &[Lane],
    units: Units,
    room: &mut Room,
) -> Vec<Mark> {
    let mut marks = Vec::new();
    for ((tendon, result), lane) in pair(analysis).zip(lanes) {
        let Some(forces) = &result.forces else {
            continue;
        };
        let short = units.of(SHORT);
        let length_m = tendon.path.length_m();
        let ends = if forces.pulls.is_empty() {
            let ends = [0.0, length_m].into_iter().zip(&forces.ends);
            ends.map(|(station_m, end)| (station_m, content(end, short)))
                .collect()
        } else {
            in_turn(&forces.pulls, short)
        };
        for (station_m, content) in ends {
            let Some(content) = content else { continue };
            let end = if station_m <= 0.0 {
                Some(0)
            } else {
                (station_m >= length_m - SAME_PLACE_M).then_some(1)
            };
            marks.push(match end {
                Some(at) => {
                    let height_m = lane.end_text_m.get(at).copied().unwrap_or(lane.text_m);
                    outwards(tendon, at, height_m, content, room)
                }
                None => beside(tendon, station_m, lane.text_m, content, room),
            });
        }
    }
    marks
}

/// `pull 2: ext 180 (net 174) mm` at each jack, in the order of stressing.
fn in_turn(pulls: &[Pull], short: Unit) -> Vec<(f64, Option<String>)> {
    let numbered = pulls.iter().zip(1_usize..);
    numbered
        .flat_map(|(pull, order)| {
            pull.jacks().map(move |(station_m, end)| {
                let content = content(end, short);
                (station_m, content.map(|said| in_pull(order, &said)))
            })
        })
        .collect()
}

/// A figure of one of several pulls, as the drawing shows it and the legend explains it.
pub(super) fn in_pull(order: usize, said: &str) -> String {
    format!("pull {order}: {said}")
}

/// `ext 180 (net 174) mm`: before and after draw-in.
fn content(end: &EndForces, short: Unit) -> Option<String> {
    let gross = short.figure(end.extension_mm?, 0);
    Some(match end.extension_net_mm {
        Some(net_mm) => said(&gross, &short.figure(net_mm, 0), short.name),
        None => format!("ext {gross} {}", short.name),
    })
}

/// An extension before and after draw-in, as the drawing shows it and the legend explains it.
pub(super) fn said(gross: &str, net: &str, unit: &str) -> String {
    format!("ext {gross} (net {net}) {unit}")
}

/// Steps outwards until no text is in the way; this figure is needed, so it is written in any case.
fn outwards(tendon: &Tendon, at: usize, height_m: f64, content: String, room: &mut Room) -> Mark {
    let (station_m, turn) = match at {
        0 => (0.0, PI),
        _ => (tendon.path.length_m(), 0.0),
    };
    let end = tendon.path.place_at(station_m);
    let outward_rad = turn_rad(tendon.path.heading_at(station_m) + turn);
    let rotation_rad = readable_rad(outward_rad);
    let width_m = words::width_m(&content, height_m);
    let mut best: Option<(usize, f64)> = None;
    for tenth in 0..30_u32 {
        let lead_m = LEAD * height_m + width_m * f64::from(tenth) / 10.0;
        let hit = room.texts_hit(&spot(end, outward_rad, lead_m, width_m, height_m));
        if best.is_none_or(|(least, _)| hit < least) {
            best = Some((hit, lead_m));
        }
        if hit == 0 {
            break;
        }
    }
    let lead_m = best.map_or(LEAD * height_m, |(_, lead_m)| lead_m);
    room.take(&spot(end, outward_rad, lead_m, width_m, height_m));
    let reads_outwards = turn_rad(outward_rad - rotation_rad).abs() < 1.0;
    let drawn = Drawn::Text {
        place: step(end, outward_rad, lead_m),
        height_m,
        rotation_rad,
        // The near end of the text stays put, however wide the font comes out.
        align: if reads_outwards {
            Align::MiddleLeft
        } else {
            Align::MiddleRight
        },
        content,
    };
    layers::mark(layers::EXTENSION, drawn)
}

/// On the side, as near and as level with the anchor as no text and no line is in the way; it is written in any case.
fn beside(
    tendon: &Tendon,
    station_m: f64,
    height_m: f64,
    content: String,
    room: &mut Room,
) -> Mark {
    let rotation_rad = readable_rad(tendon.path.heading_at(station_m));
    let anchor = tendon.path.place_at(station_m);
    let width_m = words::width_m(&content, height_m);
    let off = |away: f64, side: f64| {
        let across_m = side * (away + 0.5) * height_m;
        step(anchor, rotation_rad + FRAC_PI_2, across_m)
    };
    // The near end of a text that stands before or behind the anchor stays put, however wide the font comes out.
    let along = [
        (0.0, Align::Middle),
        (0.6, Align::MiddleLeft),
        (-0.6, Align::MiddleRight),
    ];
    let stands = BESIDE.into_iter().flat_map(|away| {
        let sides = [off(away, 1.0), off(away, -1.0)];
        sides.into_iter().flat_map(move |level| {
            along.map(|(widths, align)| {
                let spot = Spot {
                    centre: step(level, rotation_rad, widths * width_m),
                    width_m,
                    height_m,
                    rotation_rad,
                };
                (spot, align)
            })
        })
    });
    let hit = |(spot, _): &(Spot, Align)| (room.texts_hit(spot), room.lines_hit(spot));
    let level = Spot {
        centre: off(BESIDE[0], 1.0),
        width_m,
        height_m,
        rotation_rad,
    };
    let (spot, align) = stands.min_by_key(hit).unwrap_or((level, Align::Middle));
    room.take(&spot);
    let near_m = match align {
        Align::MiddleLeft => -width_m / 2.0,
        Align::MiddleRight => width_m / 2.0,
        _ => 0.0,
    };
    let drawn = Drawn::Text {
        place: step(spot.centre, rotation_rad, near_m),
        height_m,
        rotation_rad,
        align,
        content,
    };
    layers::mark(layers::EXTENSION, drawn)
}

fn spot(end: Coord<f64>, outward_rad: f64, lead_m: f64, width_m: f64, height_m: f64) -> Spot {
    Spot {
        centre: step(end, outward_rad, lead_m + width_m / 2.0),
        width_m,
        height_m,
        rotation_rad: outward_rad,
    }
}
