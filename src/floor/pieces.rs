//! Pieces that meet end to end, put together: the same for tendons and for outlines.

use geo::Coord;
use rstar::RTree;
use rstar::primitives::GeomWithData;

use crate::geometry::{Path, distance_m, turn_rad};

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

/// Smooth enough to be told apart from what merely meets, and how much better it must be than the next best, radians.
const SMOOTH_RAD: f64 = 0.26;
const CLEARLY_RAD: f64 = 0.35;

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

/// The ends of one node by their headings, so that what goes on from an end is found without trying all others.
struct Fan(Vec<(f64, usize)>);

impl Fan {
    fn of(node: &[usize], ends: &[Option<(Coord<f64>, f64)>]) -> Self {
        let headings = node.iter().filter_map(|&end| Some((ends[end]?.1, end)));
        let mut fan: Vec<(f64, usize)> = headings.map(|(out, end)| (turn_rad(out), end)).collect();
        fan.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        Self(fan)
    }

    /// The place in the fan of the end that the one at a place goes on into with the least turn, and that turn, where
    /// every other turn is clearly greater.
    fn clear_partner(&self, at: usize, turn: impl Fn(usize, usize) -> f64) -> Option<(usize, f64)> {
        let fan = &self.0;
        let count = fan.len();
        let onward = turn_rad(fan[at].0 + std::f64::consts::PI);
        let there = fan.partition_point(|(heading, _)| *heading < onward);
        // The end itself may be among the three on either side, and two must be left to be compared.
        let reach = 3.min(count);
        let mut near: Vec<(f64, usize)> = (0..2 * reach)
            .map(|step| (there + count + step - reach) % count)
            .filter(|&other| other != at)
            .map(|other| (turn(fan[at].1, fan[other].1), other))
            .collect();
        near.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        near.dedup_by_key(|(_, other)| *other);
        let &(here, partner) = near.first()?;
        let next = near.get(1).map_or(f64::INFINITY, |(turn, _)| *turn);
        (next > here + CLEARLY_RAD).then_some((partner, here))
    }
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

#[cfg(test)]
mod tests {
    use super::*;

    const JOINT: Joint = Joint {
        gap_m: 0.01,
        turn_rad: 1.6,
    };

    fn line(points: &[(f64, f64)]) -> Path {
        let points: Vec<Coord<f64>> = points.iter().map(|&(x, y)| Coord { x, y }).collect();
        Path::through(&points)
    }

    fn lengths(paths: &[Path]) -> (Vec<i64>, usize) {
        let refs: Vec<&Path> = paths.iter().collect();
        let (chains, meetings) = chains(&refs, JOINT, |_| false);
        let mut lengths: Vec<i64> = chains
            .iter()
            .map(|chain| {
                #[expect(clippy::cast_possible_truncation, reason = "lengths of a few metres")]
                let rounded = chain.path(&refs).length_m().round() as i64;
                rounded
            })
            .collect();
        lengths.sort_unstable();
        (lengths, meetings.len())
    }

    #[test]
    fn pieces_join_in_any_order_and_direction() {
        let (found, meetings) = lengths(&[
            line(&[(10.0, 0.0), (5.0, 0.0)]),
            line(&[(10.005, 0.0), (17.0, 1.0)]),
            line(&[(0.0, 0.0), (5.0, 0.0)]),
        ]);
        assert_eq!((found, meetings), (vec![17], 0));
    }

    #[test]
    fn neighbours_that_stand_apart_stay_apart() {
        let (found, _) = lengths(&[
            line(&[(0.0, 0.0), (5.0, 0.0)]),
            line(&[(5.3, 0.0), (10.3, 0.0)]),
        ]);
        assert_eq!(found, vec![5, 5]);
    }

    #[test]
    fn of_three_ends_only_the_smooth_pair_joins() {
        let (found, meetings) = lengths(&[
            line(&[(0.0, 0.0), (5.0, 0.0)]),
            line(&[(5.0, 0.0), (12.0, 0.1)]),
            line(&[(5.0, 0.0), (5.0, 3.0)]),
        ]);
        assert_eq!((found, meetings), (vec![3, 12], 1));
        let (found, meetings) = lengths(&[
            line(&[(0.0, 0.0), (5.0, 0.0)]),
            line(&[(5.0, 0.0), (12.0, 0.1)]),
            line(&[(5.0, 0.0), (9.0, -0.1)]),
        ]);
        assert_eq!((found, meetings), (vec![4, 5, 7], 1));
    }

    #[test]
    fn a_crossing_of_four_ends_gives_two_lines() {
        let (found, meetings) = lengths(&[
            line(&[(0.0, 0.0), (5.0, 0.0)]),
            line(&[(5.0, 0.0), (12.0, 0.0)]),
            line(&[(5.0, 0.0), (5.0, 3.0)]),
            line(&[(5.0, -4.0), (5.0, 0.0)]),
        ]);
        assert_eq!((found, meetings), (vec![7, 12], 0));
    }

    #[test]
    fn of_thousands_of_ends_in_one_place_pairs_are_found_without_trying_all() {
        let spoke = |turn: f64| {
            let (sin, cos) = turn.to_radians().sin_cos();
            line(&[(0.0, 0.0), (9.0 * cos, 9.0 * sin)])
        };
        let few = [0.0, 60.0, 120.0, 180.0, 225.0].map(spoke);
        assert_eq!(lengths(&few), (vec![9, 9, 9, 18], 1));
        let many: Vec<Path> = (0..20_000).map(|n| spoke(f64::from(n) * 0.018)).collect();
        let begun = std::time::Instant::now();
        let (found, meetings) = lengths(&many);
        // At the hub, and all around the rim.
        assert_eq!((found.len(), meetings), (20_000, 2));
        assert!(begun.elapsed().as_secs() < 30, "{:?}", begun.elapsed());
    }

    #[test]
    fn the_partners_are_those_that_trying_all_would_find() {
        let mut seed = 1_u32;
        let mut roll = |below: u32| {
            seed = seed.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
            (seed >> 8) % below
        };
        let mut joined = 0;
        for _ in 0..500 {
            let count = 3 + roll(7);
            let ends: Vec<_> = (0..count)
                .map(|_| Some((Coord::default(), f64::from(roll(72)) * 0.0873)))
                .collect();
            let node: Vec<usize> = (0..ends.len()).collect();
            let mut link = vec![None; ends.len()];
            join(&node, &ends, JOINT, &mut link);
            let turn = |a: usize, b: usize| {
                let [a, b] = [a, b].map(|end| ends[end].map_or(0.0, |(_, out)| out));
                turn_rad(a - b - std::f64::consts::PI).abs()
            };
            for &a in &node {
                let partner = node.iter().copied().find(|&b| {
                    let others = node.iter().filter(|&&other| other != a && other != b);
                    let rivals = others.flat_map(|&other| [turn(a, other), turn(b, other)]);
                    let next = rivals.fold(f64::INFINITY, f64::min);
                    a != b && turn(a, b) < SMOOTH_RAD && next > turn(a, b) + CLEARLY_RAD
                });
                assert_eq!(link[a], partner, "{ends:?}");
                joined += usize::from(partner.is_some());
            }
        }
        assert!(joined > 100, "{joined}");
    }

    #[test]
    fn a_line_does_not_double_back() {
        let (found, meetings) = lengths(&[
            line(&[(0.0, 0.0), (5.0, 0.0)]),
            line(&[(5.0, 0.0), (0.0, 0.1)]),
        ]);
        assert_eq!((found, meetings), (vec![5, 5], 1));
    }

    #[test]
    fn a_ring_closes() {
        let paths = [
            line(&[(0.0, 0.0), (5.0, 0.0)]),
            line(&[(5.0, 4.0), (5.0, 0.0)]),
            line(&[(5.0, 4.0), (0.0, 4.0), (0.0, 0.0)]),
        ];
        let refs: Vec<&Path> = paths.iter().collect();
        let (chains, _) = chains(&refs, JOINT, |_| false);
        assert_eq!(chains.len(), 1);
        assert!(chains[0].closed);
        assert!((chains[0].path(&refs).length_m() - 18.0).abs() < 1e-9);
    }
}
