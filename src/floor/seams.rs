//! Pieces of one tendon that were drawn a little aside of one another, brought together without a bend of their own.

use geo::Coord;

use crate::geometry::{Path, Segment, distance_m, step, turn_rad};

/// One line through pieces that go on into one another in turn. `ahead_m` says of each but the first how far ahead of
/// the one before it starts; negative where the two overlap. An overlap is cut in its middle, a gap longer than
/// `meet_m` filled; what one piece lies aside of the other is spread over the length of both, so that straight pieces
/// give one straight line between their outer ends. No place moves by more than the pieces lay aside.
pub(super) fn sewn(pieces: &[Path], ahead_m: &[f64], meet_m: f64) -> Path {
    let overlap_m = |seam: Option<usize>| {
        let ahead_m = seam.and_then(|seam| ahead_m.get(seam));
        (-ahead_m.copied().unwrap_or(0.0)).max(0.0)
    };
    let cut: Vec<Path> = pieces
        .iter()
        .enumerate()
        .map(|(at, path)| {
            let from_m = 0.5 * overlap_m(at.checked_sub(1));
            path.between(from_m, path.length_m() - 0.5 * overlap_m(Some(at)))
        })
        .collect();
    let mut moves = vec![[Coord::default(); 2]; cut.len()];
    let mut fills = vec![false; cut.len()];
    for (seam, pair) in cut.windows(2).enumerate() {
        let fill = ahead_m.get(seam).is_some_and(|&ahead_m| ahead_m > meet_m);
        let Some((aside, gap_m)) = aside(&pair[0], &pair[1], fill) else {
            continue;
        };
        let (before_m, after_m) = (pair[0].length_m(), pair[1].length_m());
        let whole_m = before_m + gap_m + after_m;
        moves[seam][1] = scaled(aside, before_m / whole_m);
        moves[seam + 1][0] = scaled(aside, -after_m / whole_m);
        fills[seam + 1] = fill;
    }
    let mut segments: Vec<Segment> = Vec::new();
    for ((path, ends), fill) in cut.iter().zip(moves).zip(fills) {
        let moved = leant(path, ends);
        if let (true, Some(last), Some(next)) = (fill, segments.last(), moved.first()) {
            let (from, to) = (last.end(), next.start());
            segments.push(Segment::Line { from, to });
        }
        segments.extend(moved);
    }
    Path::new(segments)
}

/// How far the second of two pieces lies aside of where the first goes on, and the length of what fills the gap. A gap
/// between pieces that turn from one to the other is filled in a direction between theirs.
fn aside(before: &Path, after: &Path, fill: bool) -> Option<(Coord<f64>, f64)> {
    let (end, start) = (before.end()?, after.start()?);
    let between = Coord {
        x: start.x - end.x,
        y: start.y - end.y,
    };
    if !fill {
        return Some((between, 0.0));
    }
    let last = before.segments().last()?;
    let out_rad = last.heading_at(last.length_m());
    let turn = turn_rad(after.heading_at(0.0) - out_rad);
    let drawn = turn_rad(between.y.atan2(between.x) - out_rad);
    let along_rad = out_rad + drawn.clamp(turn.min(0.0), turn.max(0.0));
    let (sin, cos) = along_rad.sin_cos();
    let gap_m = (between.x * cos + between.y * sin).max(0.0);
    let filled = step(Coord::default(), along_rad, gap_m);
    let aside = Coord {
        x: between.x - filled.x,
        y: between.y - filled.y,
    };
    Some((aside, gap_m))
}

/// A piece whose ends are moved, and every place between in proportion. Arcs keep the angle they sweep.
fn leant(path: &Path, [start, end]: [Coord<f64>; 2]) -> Vec<Segment> {
    let length_m = path.length_m();
    let moved = |place: Coord<f64>, station_m: f64| {
        let share = (station_m / length_m).clamp(0.0, 1.0);
        Coord {
            x: place.x + start.x + share * (end.x - start.x),
            y: place.y + start.y + share * (end.y - start.y),
        }
    };
    path.pieces()
        .map(|(station_m, segment)| {
            let from = moved(segment.start(), station_m);
            let to = moved(segment.end(), station_m + segment.length_m());
            segment.carried(from, to)
        })
        .collect()
}

fn scaled(by: Coord<f64>, factor: f64) -> Coord<f64> {
    Coord {
        x: factor * by.x,
        y: factor * by.y,
    }
}

/// A line without pieces shorter than `least_m`: what a slip of the pencil leaves at a vertex turns by any angle and
/// bends no tendon. Its ends stay, and what a row of short pieces turns in all.
pub(super) fn without_slips(path: &Path, least_m: f64) -> Path {
    if path.segments().iter().all(|s| s.length_m() >= least_m) {
        return path.clone();
    }
    let mut kept: Vec<Segment> = Vec::new();
    for segment in path.segments() {
        let behind = kept.last().map(Segment::end).or(path.start());
        let from = behind
            .filter(|&end| distance_m(end, segment.start()) < least_m)
            .unwrap_or(segment.start());
        if segment.length_m() >= least_m || distance_m(from, segment.end()) >= least_m {
            kept.push(segment.carried(from, segment.end()));
        }
    }
    // What is left over at the end belongs to the last piece.
    if let (Some(last), Some(end)) = (kept.last_mut(), path.end()) {
        *last = last.carried(last.start(), end);
    }
    Path::new(kept)
}

#[cfg(test)]
mod tests {
    use super::*;

    const MEET_M: f64 = 0.01;

    fn line(points: &[(f64, f64)]) -> Path {
        let points: Vec<Coord<f64>> = points.iter().map(|&(x, y)| Coord { x, y }).collect();
        Path::through(&points)
    }

    fn turned_rad(path: &Path) -> f64 {
        path.corners().iter().map(|c| c.turn_rad.abs()).sum()
    }

    #[test]
    fn straight_pieces_give_one_straight_line_between_their_outer_ends() {
        for (ahead_m, aside_m) in [(-0.2, 0.015), (-0.2, 1e-16), (0.02, 0.015), (0.0, -0.015)] {
            let pieces = [
                line(&[(0.0, 0.0), (8.0, 0.0)]),
                line(&[(8.0 + ahead_m, aside_m), (16.0, aside_m)]),
            ];
            let whole = sewn(&pieces, &[ahead_m], MEET_M);
            assert!(turned_rad(&whole) < 1e-9, "{ahead_m} {aside_m}");
            let wanted_m = 16.0_f64.hypot(aside_m);
            assert!((whole.length_m() - wanted_m).abs() < 1e-9, "{ahead_m}");
        }
    }

    #[test]
    fn a_bend_that_was_drawn_stays_and_no_other_comes() {
        let bent = 0.04_f64;
        let pieces = [
            line(&[(0.0, 0.0), (8.0, 0.0)]),
            line(&[
                (8.4, 0.015),
                (8.4 + 8.0 * bent.cos(), 0.015 + 8.0 * bent.sin()),
            ]),
        ];
        let whole = sewn(&pieces, &[0.4], MEET_M);
        assert!(
            (turned_rad(&whole) - bent).abs() < 0.1 * bent,
            "{}",
            turned_rad(&whole)
        );
    }

    #[test]
    fn slips_go_and_what_was_drawn_stays() {
        let slip = line(&[(0.0, 0.0), (8.0, 0.0), (8.0, 0.004), (16.0, 0.004)]);
        assert!(turned_rad(&slip) > 3.0);
        let clean = without_slips(&slip, 0.01);
        assert!(turned_rad(&clean) < 0.001);
        assert_eq!((clean.start(), clean.end()), (slip.start(), slip.end()));
        let bend = line(&[(0.0, 0.0), (4.0, 0.0), (8.0, 1.0)]);
        assert_eq!(without_slips(&bend, 0.01), bend);
        let last = line(&[(0.0, 0.0), (8.0, 0.0), (8.0, 0.005)]);
        let clean = without_slips(&last, 0.01);
        assert_eq!((clean.end(), clean.segments().len()), (last.end(), 1));
        // A quarter circle in chords shorter than the least.
        let fine: Vec<(f64, f64)> = (0..=100)
            .map(|step| (f64::from(step) * std::f64::consts::FRAC_PI_2 / 100.0).sin_cos())
            .map(|(sin, cos)| (0.5 * sin, 0.5 - 0.5 * cos))
            .collect();
        let whole = turned_rad(&without_slips(&line(&fine), 0.01));
        assert!(
            (whole - std::f64::consts::FRAC_PI_2).abs() < 0.05,
            "{whole}"
        );
    }
}
