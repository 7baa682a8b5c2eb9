//! Pieces that meet end to end, put together: the same for tendons and for outlines.

mod fan;
#[cfg(test)]
mod tests;

use geo::Coord;
use rstar::RTree;
use rstar::primitives::GeomWithData;

use crate::geometry::{Path, distance_m, turn_rad};
use fan::Fan;

/// How ends may be joined.
#[derive(Debug, Clone, Copy)]
pub(super) struct Joint {
    /// Gap that still counts as meeting, metres.
    pub(super) gap_m: f64,
    /// Sharpest turn from one piece into the next, radians.
    pub(super) turn_rad: f64,
}

/// Pieces in order; each with whether it is travelled backwards.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Chain {
    pub(super) pieces: Vec<(usize, bool)>,
    /// Whether the last piece meets the first.
    pub(super) closed: bool,
}

impl Chain {
    /// The chain as one line.
    pub(super) fn path(&self, paths: &[&Path]) -> Path {
        let segments = self.pieces.iter().flat_map(|&(piece, backwards)| {
            let path = paths.get(piece).map_or_else(Path::default, |path| {
                if backwards {
                    path.reversed()
                } else {
                    (*path).clone()
                }
            });
            path.segments().to_vec()
        });
        Path::new(segments)
    }
}

/// A point where ends meet and are not (all) joined.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Meeting {
    pub(super) place: Coord<f64>,
    /// Ends that meet here.
    pub(super) ends: usize,
    /// Of them, ends that were left alone.
    pub(super) left: usize,
}

/// Smooth enough to be told apart from what merely meets, radians.
const SMOOTH_RAD: f64 = 0.26;

/// Joins pieces whose ends meet. Two ends join unless the turn is too sharp or `is_stop` says that something ends here;
/// of more than two, only those that go on smoothly into one another beyond doubt.
pub(super) fn chains(
    paths: &[&Path],
    joint: Joint,
    is_stop: impl Fn(Coord<f64>) -> bool,
) -> (Vec<Chain>, Vec<Meeting>) {
    let ends: Vec<Option<(Coord<f64>, f64)>> = (0..2 * paths.len())
        .map(|end| outward(paths[end / 2], end % 2 == 1, joint.gap_m))
        .collect();
    let mut link: Vec<Option<usize>> = vec![None; ends.len()];
    let mut meetings = Vec::new();
    for node in nodes(&ends, joint.gap_m) {
        let place = node
            .iter()
            .find_map(|&end| ends[end].map(|(place, _)| place))
            .unwrap_or_default();
        if node.len() < 2 || is_stop(place) {
            continue;
        }
        let left = join(&node, &ends, joint, &mut link);
        if left > 0 {
            meetings.push(Meeting {
                place,
                ends: node.len(),
                left,
            });
        }
    }
    meetings.sort_by(|a, b| {
        let by_x = a.place.x.total_cmp(&b.place.x);
        by_x.then(a.place.y.total_cmp(&b.place.y))
    });
    (walk(paths.len(), &link), meetings)
}

/// An end's place, and the direction in which the piece would go on beyond it.
fn outward(path: &Path, at_end: bool, gap_m: f64) -> Option<(Coord<f64>, f64)> {
    if path.length_m() <= gap_m {
        return None;
    }
    if at_end {
        let last = path.segments().last()?;
        Some((path.end()?, last.heading_at(last.length_m())))
    } else {
        let back = path.heading_at(0.0) + std::f64::consts::PI;
        Some((path.start()?, turn_rad(back)))
    }
}

/// Groups of ends that lie within the gap of one another.
fn nodes(ends: &[Option<(Coord<f64>, f64)>], gap_m: f64) -> Vec<Vec<usize>> {
    let mut tree = RTree::bulk_load(
        ends.iter()
            .enumerate()
            .filter_map(|(end, found)| {
                found.map(|(place, _)| GeomWithData::new([place.x, place.y], end))
            })
            .collect(),
    );
    let mut seen = vec![false; ends.len()];
    let mut groups = Vec::new();
    for start in 0..ends.len() {
        if seen[start] || ends[start].is_none() {
            continue;
        }
        seen[start] = true;
        let mut group = vec![start];
        let mut next = 0;
        while let Some(&end) = group.get(next) {
            next += 1;
            let Some((place, _)) = ends[end] else {
                continue;
            };
            // Each end is met once, however many meet in one place.
            for near in tree.drain_within_distance([place.x, place.y], gap_m * gap_m) {
                if !seen[near.data] {
                    seen[near.data] = true;
                    group.push(near.data);
                }
            }
        }
        group.sort_unstable();
        groups.push(group);
    }
    groups
}

/// Joins the ends of one node; says how many stay alone though they meet others.
fn join(
    node: &[usize],
    ends: &[Option<(Coord<f64>, f64)>],
    joint: Joint,
    link: &mut [Option<usize>],
) -> usize {
    let turn = |a: usize, b: usize| match (ends[a], ends[b]) {
        (Some((_, out_a)), Some((_, out_b))) => {
            turn_rad(out_a - out_b - std::f64::consts::PI).abs()
        }
        _ => f64::INFINITY,
    };
    if let [a, b] = *node {
        if turn(a, b) > joint.turn_rad {
            return 2;
        }
        link[a] = Some(b);
        link[b] = Some(a);
        return 0;
    }
    let fan = Fan::of(node, ends);
    let mut left = node.len();
    for at in 0..fan.0.len() {
        let Some((onward, here)) = fan.clear_partner(at, turn) else {
            continue;
        };
        let back = fan.clear_partner(onward, turn);
        let mutual = at < onward && back.is_some_and(|(back, _)| back == at);
        if mutual && here < SMOOTH_RAD && here < joint.turn_rad {
            let ((_, a), (_, b)) = (fan.0[at], fan.0[onward]);
            link[a] = Some(b);
            link[b] = Some(a);
            left -= 2;
        }
    }
    left
}

/// Follows the links from every free end, then around what is left.
fn walk(pieces: usize, link: &[Option<usize>]) -> Vec<Chain> {
    let mut used = vec![false; pieces];
    let mut chains = Vec::new();
    let free = (0..link.len()).filter(|&end| link[end].is_none());
    for start in free.chain(0..link.len()) {
        if used[start / 2] {
            continue;
        }
        let mut chain = Chain {
            pieces: Vec::new(),
            closed: false,
        };
        let mut end = start;
        loop {
            used[end / 2] = true;
            chain.pieces.push((end / 2, end % 2 == 1));
            match link[end ^ 1] {
                None => break,
                Some(next) if used[next / 2] => {
                    chain.closed = true;
                    break;
                }
                Some(next) => end = next,
            }
        }
        chains.push(chain);
    }
    chains
}

/// Whether a line comes back to where it starts.
pub(super) fn returns(path: &Path, gap_m: f64) -> bool {
    match (path.start(), path.end()) {
        (Some(start), Some(end)) => distance_m(start, end) <= gap_m,
        _ => false,
    }
}
