//! Intermediate anchors: each divides the tendon that it stands on.

use super::ends::{Around, Told};
use super::index::{Foot, Index};
use super::lines::Line;
use super::rules::JOINT_UNCLAIMED;
use super::symbols::{Sign, Symbol};
use super::types::PourJoint;
use crate::finding::{Finding, Level, Wording};
use crate::geometry::distance_m;
use crate::units::LONG;

/// Of two tendons whose distances from a symbol differ by less, nothing tells whose it is, metres.
const TIED_M: f64 = 0.010;

/// A symbol that is drawn stands on its tendon within this share of the ends' reach.
const ON: f64 = 0.5;

/// Where the intermediate anchors stand.
#[derive(Debug)]
pub(super) struct Joints<'a> {
    /// By line, in order of station.
    pub(super) of_line: Vec<Vec<PourJoint>>,
    /// By line and end, the symbol that stands there: the tendon goes on beyond what is drawn.
    pub(super) at_ends: Vec<[Option<&'a Symbol<'a>>; 2]>,
}

/// Gives each symbol to the nearest line within reach; findings for those that stand on none. Two symbols within reach of
/// one another on one line, a block and its word say, are one anchor; a block's place goes before a word's.
pub(super) fn joints<'a>(
    lines: &[Line],
    index: &Index,
    symbols: &'a [Symbol<'a>],
    reach_m: f64,
) -> (Joints<'a>, Vec<Finding>) {
    let mut joints = Joints {
        of_line: vec![Vec::new(); lines.len()],
        at_ends: vec![[None; 2]; lines.len()],
    };
    let mut findings = Vec::new();
    let (words, drawn): (Vec<_>, Vec<_>) = symbols.iter().partition(|one| one.sign == Sign::Word);
    let lettered = |word: &Symbol<'_>| {
        let around = Around::new(word);
        drawn.iter().any(|one| around.gap_m(one.place) <= reach_m)
    };
    for symbol in drawn.iter().chain(&words).copied() {
        // A symbol is drawn on its tendon; a word is written beside it.
        let on_m = match symbol.sign {
            Sign::Word => reach_m,
            _ => ON * reach_m,
        };
        let mut feet = index.feet(symbol.place, reach_m);
        feet.retain(|foot| foot.distance_m <= on_m || end_at(lines, foot, reach_m).is_some());
        let least_m = feet
            .iter()
            .map(|foot| foot.distance_m)
            .fold(f64::INFINITY, f64::min);
        let nearest: Vec<&Foot> = feet
            .iter()
            .filter(|foot| foot.distance_m <= least_m + TIED_M)
            .collect();
        let ends: Vec<Option<usize>> = nearest
            .iter()
            .map(|foot| end_at(lines, foot, reach_m))
            .collect();
        match nearest.as_slice() {
            [] if symbol.sign == Sign::Word && lettered(symbol) => {}
            [] => findings.push(unclaimed(symbol, reach_m)),
            // Where several lines end, each goes on into what is drawn elsewhere, or on another layer.
            several if ends.iter().all(Option::is_some) => {
                for (foot, end) in several.iter().zip(&ends) {
                    let held = joints.at_ends.get_mut(foot.line);
                    if let Some(held) = held.zip(*end).and_then(|(ends, end)| ends.get_mut(end)) {
                        held.get_or_insert(symbol);
                    }
                }
            }
            [foot] => {
                let Some(held) = joints.of_line.get_mut(foot.line) else {
                    continue;
                };
                let same = |joint: &PourJoint| (joint.station_m - foot.station_m).abs() <= reach_m;
                if !held.iter().any(same) {
                    held.push(PourJoint {
                        station_m: foot.station_m,
                        place: foot.place,
                    });
                }
            }
            several => findings.push(tied(symbol, lines, several)),
        }
    }
    for of_line in &mut joints.of_line {
        of_line.sort_by(|a, b| a.station_m.total_cmp(&b.station_m));
    }
    (joints, findings)
}

/// The end of its line that a foot belongs to: 0 or 1.
fn end_at(lines: &[Line], foot: &Foot, reach_m: f64) -> Option<usize> {
    let path = &lines.get(foot.line)?.path;
    [path.start(), path.end()]
        .into_iter()
        .position(|end| end.is_some_and(|end| distance_m(end, foot.place) <= reach_m))
}

/// Intermediate anchors at a tendon's ends: an end with a symbol of its own keeps that, and another goes on.
pub(super) fn at_ends(
    anchors: [Option<&Symbol<'_>>; 2],
    told: &mut [Told; 2],
    mark: &str,
) -> Vec<Finding> {
    let ends = told.iter_mut().zip(anchors);
    ends.filter_map(|(told, anchor)| {
        let anchor = anchor.filter(|anchor| told.known_or_goes_on(anchor.name))?;
        Some(at_an_end(anchor, mark))
    })
    .collect()
}

/// Said of an intermediate anchor at an end that has a symbol of its own.
fn at_an_end(symbol: &Symbol<'_>, mark: &str) -> Finding {
    said(
        symbol,
        Level::Warning,
        format!(
            "intermediate anchor {} ({}) stands at an end that another symbol marks: the end's own symbol was taken, and the \
             tendon ends there",
            symbol.handle, symbol.name
        ),
        "delete the symbol that does not belong there: an intermediate anchor stands between the ends of one tendon, live and \
         dead ends where two tendons meet",
    )
    .on_tendon(mark)
}

fn unclaimed(symbol: &Symbol<'_>, reach_m: f64) -> Finding {
    said(
        symbol,
        Level::Warning,
        Wording::of(|units| {
            format!(
                "intermediate anchor {} ({}) stands on no tendon within {}",
                symbol.handle,
                symbol.name,
                units.of(LONG).said(reach_m, 2)
            )
        }),
        "move the symbol onto its tendon, or delete it",
    )
}

fn tied(symbol: &Symbol<'_>, lines: &[Line], feet: &[&Foot]) -> Finding {
    let handles: Vec<&str> = feet
        .iter()
        .filter_map(|foot| Some(lines.get(foot.line)?.handle.as_str()))
        .collect();
    said(
        symbol,
        Level::Error,
        format!(
            "intermediate anchor {} ({}) stands on the lines of handles {} equally well: none of them was given it, and their \
             forces are those of tendons without it",
            symbol.handle,
            symbol.name,
            handles.join(" and ")
        ),
        "move the symbol along its own tendon, away from the crossing",
    )
}

fn said(symbol: &Symbol<'_>, level: Level, text: impl Into<Wording>, remedy: &str) -> Finding {
    Finding::new(&JOINT_UNCLAIMED, level, text, remedy).at_place(symbol.place)
}
