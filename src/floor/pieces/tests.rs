//! Pieces joined, and pieces left alone.

use super::fan::CLEARLY_RAD;
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
