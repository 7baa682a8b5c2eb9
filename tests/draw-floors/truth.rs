//! What was drawn, as JSON beside the drawing: the figures a reader of the drawing ought to find.

use std::fmt::Write as _;

use crate::slab::Slab;
use crate::tendon::{DrawnAs, End, Kind, Shown, Tendon};

/// One tendon a line, in order of their marks as given.
pub(crate) fn to_json(drawing: &str, slab: &Slab, tendons: &[Tendon]) -> String {
    let mut text = format!("{{\"drawing\": \"{drawing}\", \"unit_m\": 0.001, \"tendons\": [\n");
    for (index, tendon) in tendons.iter().enumerate() {
        let comma = if index + 1 < tendons.len() { "," } else { "" };
        // Writing into a string cannot fail.
        let _ = writeln!(text, "{}{comma}", tendon_json(slab, tendon));
    }
    text + "]}\n"
}

fn tendon_json(slab: &Slab, tendon: &Tendon) -> String {
    let Tendon {
        mark,
        tendons,
        strands,
        strand,
        ..
    } = tendon;
    let run = tendon.run.name();
    let ends = tendon.ends.map(|end| match end {
        End::Live => "\"live\"",
        End::Dead => "\"dead\"",
        End::Unknown => "null",
    });
    let drawn_as = match tendon.drawn_as {
        DrawnAs::Polyline => "LWPOLYLINE",
        DrawnAs::HeavyPolyline => "POLYLINE",
        DrawnAs::Pieces => "LINE and ARC",
        DrawnAs::Spline(_) => "SPLINE",
    };
    let plan = tendon
        .path
        .corners
        .iter()
        .map(|(at, bulge)| format!("[{}, {}, {}]", metres(at[0]), metres(at[1]), fine(*bulge)))
        .collect::<Vec<_>>()
        .join(", ");
    let points = tendon
        .points
        .iter()
        .map(|point| {
            let at = tendon.place(point);
            let kind = match point.kind {
                Kind::Anchor => "anchor",
                Kind::High => "high",
                Kind::Low => "low",
                Kind::Support => "support",
            };
            let shown = match point.shown {
                Shown::Label | Shown::Bare => "label",
                Shown::LevelLine => "level-line",
                Shown::Nothing => "none",
            };
            format!(
                "{{\"kind\": \"{kind}\", \"station_m\": {}, \"x_m\": {}, \"y_m\": {}, \"height_mm\": {}, \"thickness_mm\": {}, \"shown\": \"{shown}\"}}",
                metres(point.station_mm),
                metres(at[0]),
                metres(at[1]),
                point.height_mm,
                slab.thickness_at(at),
            )
        })
        .collect::<Vec<_>>()
        .join(", ");
    format!(
        "{{\"mark\": \"{mark}\", \"run\": \"{run}\", \"tendons\": {tendons}, \"strands\": {strands}, \"strand\": \"{strand}\", \
         \"ends\": [{}, {}], \"drawn_as\": \"{drawn_as}\", \"plan\": [{plan}], \"points\": [{points}]}}",
        ends[0], ends[1],
    )
}

fn metres(value_mm: f64) -> String {
    format!("{:.6}", value_mm / 1000.0)
}

fn fine(value: f64) -> String {
    if value == 0.0 {
        "0".to_owned()
    } else {
        format!("{value:.9}")
    }
}
