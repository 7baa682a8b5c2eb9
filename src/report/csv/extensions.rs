//! What the crew measures: a table of jacks.

use super::cells::{figure, text, written};
use crate::analysis::{Analysis, pair};
use crate::floor::Tendon;
use crate::profile::SAME_PLACE_M;
use crate::report::record::{LiveRecord, TendonRecord, number};
use crate::units::{FORCE, LONG, SHORT, Units};

/// What an extension at either of two live ends is.
const BOTH_LIVE: &str =
    "both jacks pull together; with one jack moved from end to end the first pull is longer";
/// What no extension holds.
const BEYOND_ANCHOR: &str = "strand between anchor and jack is not included";

/// A row a live end, or, of a tendon stressed in several pulls, a row a jack; empty cells where the extension is not known.
pub fn extensions_csv(analysis: &Analysis, units: Units) -> String {
    let (force, long, short) = (units.of(FORCE), units.of(LONG), units.of(SHORT));
    let header = [
        "mark".to_owned(),
        "handle".to_owned(),
        "end".to_owned(),
        long.column("x"),
        long.column("y"),
        "tendons".to_owned(),
        "strands".to_owned(),
        "strand".to_owned(),
        force.column("jacking"),
        short.column("extension"),
        short.column("extension_net"),
        long.column("draw_in_reach"),
        "note".to_owned(),
        "pull".to_owned(),
    ];
    let rows = pair(analysis).flat_map(|(tendon, result)| {
        let record = TendonRecord::of(tendon, result);
        let (mark, handle) = (text(record.mark), text(record.handle));
        let tendons = record.tendons.to_string();
        let strands = record.strands.map(|n| n.to_string()).unwrap_or_default();
        let strand = text(record.strand.unwrap_or_default());
        jacks(tendon, record).into_iter().map(move |jack| {
            let live = jack.live;
            vec![
                mark.clone(),
                handle.clone(),
                jack.end.to_owned(),
                figure(long, jack.x_m, 3),
                figure(long, jack.y_m, 3),
                tendons.clone(),
                strands.clone(),
                strand.clone(),
                figure(force, live.jacking_kn, 1),
                figure(short, live.extension_mm, 1),
                figure(short, live.extension_net_mm, 1),
                figure(long, live.draw_in_reach_m, 2),
                if jack.in_pair {
                    format!("{BOTH_LIVE}; {BEYOND_ANCHOR}")
                } else {
                    BEYOND_ANCHOR.to_owned()
                },
                jack.pull.map(|order| order.to_string()).unwrap_or_default(),
            ]
        })
    });
    written(&header, rows)
}

/// A jack, or a live end where one would stand.
struct Jack {
    end: &'static str,
    x_m: Option<f64>,
    y_m: Option<f64>,
    live: LiveRecord,
    /// Whether another pulls with it.
    in_pair: bool,
    /// Which of several pulls it does.
    pull: Option<usize>,
}

fn jacks(tendon: &Tendon, record: TendonRecord) -> Vec<Jack> {
    if record.pulls.is_empty() {
        let in_pair = record.ends.iter().all(|end| end.live.is_some());
        let ends = ["start", "end"].into_iter().zip(record.ends);
        let live = ends.filter_map(|(which, end)| {
            Some(Jack {
                end: which,
                x_m: end.x_m,
                y_m: end.y_m,
                live: end.live?,
                in_pair,
                pull: None,
            })
        });
        return live.collect();
    }
    let orders: Vec<usize> = record.pulls.iter().map(|pull| pull.order).collect();
    let pulls = record.pulls.into_iter();
    pulls
        .map(|pull| {
            let at_m = pull.at_m.unwrap_or_default();
            let place = tendon.path.place_at(at_m);
            Jack {
                end: if at_m <= 0.0 {
                    "start"
                } else if at_m >= tendon.path.length_m() - SAME_PLACE_M {
                    "end"
                } else {
                    "joint"
                },
                x_m: number(place.x),
                y_m: number(place.y),
                live: pull.live,
                in_pair: orders.iter().filter(|order| **order == pull.order).count() > 1,
                pull: Some(pull.order),
            }
        })
        .collect()
}
