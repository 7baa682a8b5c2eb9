//! Tendons broken off at a label or a crossing, or drawn in pieces that overlap, put together.

use geo::Coord;
use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::lines::Line;
use super::rules::{PIECES_BRIDGED, PIECES_OVERLAP};
use crate::finding::{Finding, Level, Wording};
use crate::geometry::{Path, Segment, turn_rad};
use crate::units::SHORT;

/// Two ends face one another where each line would run into the other: within this angle, radians.
const FACING_RAD: f64 = 0.05;

/// How far apart, along and across, two ends may be that face one another.
#[derive(Debug, Clone, Copy)]
#[expect(
    clippy::struct_field_names,
    reason = "a name that holds a length says its unit"
)]
pub(super) struct Reach {
    /// Longest gap that is bridged, metres; zero: none is.
    pub(super) gap_m: f64,
    /// Longest overlap that makes two pieces one, metres; zero: none does.
    pub(super) overlap_m: f64,
    /// Ends this close meet: what becomes of them was decided where pieces were joined. Metres.
    pub(super) meet_m: f64,
    /// How far one line may run beside the other, metres.
    pub(super) aside_m: f64,
    /// Longest gap that is bridged where an intermediate anchor stands in it, metres: its symbol is drawn there instead.
    pub(super) anchor_m: f64,
}

/// An end of a line, and where the line would go on from it.
#[derive(Debug, Clone, Copy)]
struct Tip {
    place: Coord<f64>,
    out_rad: f64,
    length_m: f64,
}

/// Lines of one layer, in drawn order, with those put together that face one another over a gap, or overlap end to end
/// without one containing the other. Nothing is bridged where `is_stop` says that a tendon ends; `is_anchor` says whether an
/// intermediate anchor stands within a distance of a place.
pub(super) fn bridged(
    lines: Vec<Line>,
    reach: Reach,
    is_stop: impl Fn(Coord<f64>) -> bool,
    is_anchor: impl Fn(Coord<f64>, f64) -> bool,
    findings: &mut Vec<Finding>,
) -> Vec<Line> {
    let tips: Vec<Option<Tip>> = (0..2 * lines.len())
        .map(|end| tip(&lines[end / 2].path, end % 2 == 1))
        .collect();
    let best = nearest(&tips, reach, &is_stop, &is_anchor);
    // Only where each is the other's nearest: a third end in line is left alone, and remains an end to be found.
    let partner = |end: usize| best[end].filter(|&(other, _)| mutual(&best, end, other));
    if (0..tips.len()).all(|end| partner(end).is_none()) {
        return lines;
    }
    let mut used = vec![false; lines.len()];
    let mut whole = Vec::new();
    let free = (0..tips.len()).filter(|&end| partner(end).is_none());
    for start in free {
        if used[start / 2] {
            continue;
        }
        let mut chain: Vec<(usize, f64)> = vec![(start, 0.0)];
        used[start / 2] = true;
        let mut end = start;
        while let Some((next, ahead_m)) = partner(end ^ 1).filter(|&(next, _)| !used[next / 2]) {
            used[next / 2] = true;
            chain.push((next, ahead_m));
            end = next;
        }
        whole.push(run_through(&lines, &chain, reach.gap_m, findings));
    }
    // A ring of facing ends has no free end: its lines stay as they were drawn.
    let left = lines.into_iter().zip(used);
    whole.extend(left.filter_map(|(line, used)| (!used).then_some((usize::MAX, line))));
    whole.sort_by_key(|(first, _)| *first);
    whole.into_iter().map(|(_, line)| line).collect()
}

fn mutual(best: &[Option<(usize, f64)>], end: usize, other: usize) -> bool {
    best[other].is_some_and(|(back, _)| back == end)
}

fn tip(path: &Path, at_end: bool) -> Option<Tip> {
    let length_m = path.length_m();
    let (place, out_rad) = if at_end {
        let last = path.segments().last()?;
        (path.end()?, last.heading_at(last.length_m()))
    } else {
        (path.start()?, path.heading_at(0.0) + std::f64::consts::PI)
    };
    Some(Tip {
        place,
        out_rad,
        length_m,
    })
}

/// For each end the nearest one that faces it, with how far ahead that one lies: negative where the two overlap.
fn nearest(
    tips: &[Option<Tip>],
    reach: Reach,
    is_stop: impl Fn(Coord<f64>) -> bool,
    is_anchor: impl Fn(Coord<f64>, f64) -> bool,
) -> Vec<Option<(usize, f64)>> {
    let tree = RTree::bulk_load(
        tips.iter()
            .enumerate()
            .filter_map(|(end, tip)| Some(((*tip)?, end)))
            .filter(|(tip, _)| !is_stop(tip.place))
            .map(|(tip, end)| GeomWithData::new([tip.place.x, tip.place.y], end))
            .collect(),
    );
    let facing = |end: usize| {
        let tip = tips[end]?;
        if is_stop(tip.place) {
            return None;
        }
        let far_m = reach.gap_m.max(reach.overlap_m).max(reach.anchor_m) + reach.aside_m;
        tree.locate_within_distance([tip.place.x, tip.place.y], far_m * far_m)
            .filter(|found| found.data / 2 != end / 2)
            .filter_map(|found| {
                Some((
                    found.data,
                    ahead_m(tip, tips[found.data]?, reach, &is_anchor)?,
                ))
            })
            .min_by(|a, b| a.1.abs().total_cmp(&b.1.abs()).then(a.0.cmp(&b.0)))
    };
    (0..tips.len()).map(facing).collect()
}

/// How far `other` lies ahead of `tip`, if the two face one another; negative where they overlap.
fn ahead_m(
    tip: Tip,
    other: Tip,
    reach: Reach,
    is_anchor: impl Fn(Coord<f64>, f64) -> bool,
) -> Option<f64> {
    let facing = turn_rad(tip.out_rad - other.out_rad - std::f64::consts::PI).abs();
    let (sin, cos) = tip.out_rad.sin_cos();
    let (dx, dy) = (other.place.x - tip.place.x, other.place.y - tip.place.y);
    let (ahead_m, aside_m) = (cos * dx + sin * dy, (cos * dy - sin * dx).abs());
    // A piece inside another is a copy of it.
    let most_m = (tip.length_m.min(other.length_m) - reach.aside_m).min(reach.overlap_m);
    let in_line = aside_m <= reach.aside_m && facing <= FACING_RAD;
    if !in_line || ahead_m.abs() <= reach.meet_m {
        return None;
    }
    let in_reach = (-most_m..=reach.gap_m).contains(&ahead_m);
    let at_anchor = || {
        let middle = (tip.place + other.place) / 2.0;
        (0.0..=reach.anchor_m).contains(&ahead_m)
            && is_anchor(middle, ahead_m / 2.0 + reach.aside_m)
    };
    (in_reach || at_anchor()).then_some(ahead_m)
}

/// One line through a chain of ends at which its pieces are entered, each with what lies between it and the one before.
fn run_through(
    lines: &[Line],
    chain: &[(usize, f64)],
    allowed_m: f64,
    findings: &mut Vec<Finding>,
) -> (usize, Line) {
    let mut pieces: Vec<Segment> = Vec::new();
    for &(entered, ahead_m) in chain {
        let line = &lines[entered / 2];
        let path = if entered % 2 == 0 {
            line.path.clone()
        } else {
            line.path.reversed()
        };
        let path = path.between((-ahead_m).max(0.0), path.length_m());
        if let (Some(last), Some(next)) = (pieces.last(), path.start()) {
            let from = last.end();
            pieces.push(Segment::Line { from, to: next });
            findings.push(said(line, from, ahead_m, allowed_m));
        }
        pieces.extend(path.segments());
    }
    // Lines stand in drawn order, so the lowest index is the one drawn first; the whole runs as it was drawn.
    let (first, backwards) = chain
        .iter()
        .map(|&(entered, _)| (entered / 2, entered % 2 == 1))
        .min()
        .unwrap_or_default();
    let path = Path::new(pieces);
    let line = Line {
        path: if backwards { path.reversed() } else { path },
        ..lines[first].clone()
    };
    (first, line)
}

fn said(line: &Line, place: Coord<f64>, ahead_m: f64, allowed_m: f64) -> Finding {
    let gap_mm = ahead_m.abs() * 1000.0;
    let (layer, handle) = (&line.layer, &line.handle);
    let finding = if ahead_m < 0.0 {
        Finding::new(
            &PIECES_OVERLAP,
            Level::Warning,
            Wording::of(|units| {
                format!(
                    "line {handle} on layer {layer} overlaps the piece it goes on from by {}; the two were taken for one tendon",
                    units.of(SHORT).said(gap_mm, 0)
                )
            }),
            "draw the tendon as one line, or put end symbols where two tendons end",
        )
    } else {
        Finding::new(
            &PIECES_BRIDGED,
            Level::Note,
            Wording::of(|units| {
                let why = if ahead_m > allowed_m {
                    "since an intermediate anchor stands in it"
                } else {
                    "as the job file allows"
                };
                format!(
                    "a gap of {} before line {handle} on layer {layer} was bridged, {why}",
                    units.of(SHORT).said(gap_mm, 0)
                )
            }),
            "draw the tendon as one line if it is one; put end symbols at the gap if it is two",
        )
    };
    finding.at_place(place)
}
