//! The extension at each live end, written outwards along the tendon.

use std::f64::consts::PI;

use geo::Coord;

use super::lanes::Lane;
use super::place::{Room, Spot, readable_rad};
use super::{layers, words};
use crate::analysis::{Analysis, pair};
use crate::drawing::{Align, Drawn, Mark};
use crate::floor::Tendon;
use crate::geometry::{step, turn_rad};
use crate::losses::EndForces;
use crate::units::{SHORT, Unit, Units};

/// Clear of the end symbol: from the end to the text, in text heights.
const LEAD: f64 = 2.5;

/// One text a live end, in the floor's order.
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
        for (end, at) in forces.ends.iter().zip(0_usize..) {
            let Some(content) = content(end, units.of(SHORT)) else {
                continue;
            };
            let height_m = lane.end_text_m.get(at).copied().unwrap_or(lane.text_m);
            marks.push(outwards(tendon, at, height_m, content, room));
        }
    }
    marks
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

fn spot(end: Coord<f64>, outward_rad: f64, lead_m: f64, width_m: f64, height_m: f64) -> Spot {
    Spot {
        centre: step(end, outward_rad, lead_m + width_m / 2.0),
        width_m,
        height_m,
        rotation_rad: outward_rad,
    }
}
