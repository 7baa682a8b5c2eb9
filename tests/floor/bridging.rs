//! Tendons that are drawn in pieces with gaps or overlaps between them.

use tautplan::finding::Finding;
use tautplan::floor::{Floor, read};
use tautplan::job::Job;

use crate::kit::{Board, at};

fn floor(board: &Board, bridge_gap_m: f64) -> (Floor, Vec<Finding>) {
    let mut job = Job::default();
    job.conventions.bridge_gap_m = bridge_gap_m;
    read(&board.drawing, &job)
}

/// Lengths in whole centimetres, in order.
fn lengths_cm(floor: &Floor) -> Vec<f64> {
    let lengths = floor
        .tendons
        .iter()
        .map(|t| (t.path.length_m() * 100.0).round());
    let mut lengths: Vec<f64> = lengths.collect();
    lengths.sort_by(f64::total_cmp);
    lengths
}

fn pieces(pieces: &[[(f64, f64); 2]]) -> Board {
    let mut board = Board::new();
    for piece in pieces {
        board.line("TENDON-DISTRIBUTED", piece);
    }
    board
}

/// Three tendons 0.3 m apart, each broken at two labels and drawn every which way.
fn broken_band() -> Board {
    let mut board = Board::new();
    for row in 0..3_u32 {
        let y = 0.3 * f64::from(row);
        board.line("TENDON-BANDED", &[(8.4, y), (16.0, y)]);
        board.line("TENDON-BANDED", &[(8.0, y), (0.0, y)]);
        board.line("TENDON-BANDED", &[(24.0, y), (16.45, y)]);
    }
    board
}

#[test]
fn gaps_at_labels_are_bridged_when_the_job_says_so_and_never_unasked() {
    let (floor_of, findings) = floor(&broken_band(), 0.5);
    assert_eq!(lengths_cm(&floor_of), [2400.0; 3]);
    let said = findings.iter().filter(|f| f.rule.name == "pieces-bridged");
    assert_eq!(said.count(), 6);
    let (floor, _) = floor(&broken_band(), 0.0);
    assert_eq!(floor.tendons.len(), 9);
}

#[test]
fn a_bridged_line_runs_as_its_first_piece_was_drawn() {
    let (floor, _) = floor(&broken_band(), 0.5);
    for tendon in &floor.tendons {
        assert!(tendon.path.start().expect("a line").x < 1.0);
    }
}

#[test]
fn a_gap_longer_than_the_jobs_stays() {
    let (floor, _) = floor(&broken_band(), 0.42);
    assert_eq!(
        lengths_cm(&floor),
        [755.0, 755.0, 755.0, 1600.0, 1600.0, 1600.0]
    );
}

#[test]
fn no_gap_is_bridged_at_an_end_symbol() {
    let mut board = pieces(&[[(0.0, 0.0), (10.0, 0.0)], [(10.4, 0.0), (20.0, 0.0)]]);
    board.insert("TENDON-END", "DEAD-END", at(10.0, 0.0));
    let (floor, _) = floor(&board, 1.0);
    assert_eq!(lengths_cm(&floor), [960.0, 1000.0]);
}

#[test]
fn pieces_beside_one_another_or_at_an_angle_are_not_in_line() {
    let beside = pieces(&[[(0.0, 0.0), (10.0, 0.0)], [(10.2, 0.1), (20.0, 0.1)]]);
    assert_eq!(floor(&beside, 1.0).0.tendons.len(), 2);
    let turned = pieces(&[[(0.0, 0.0), (10.0, 0.0)], [(10.2, 0.0), (20.0, 2.0)]]);
    assert_eq!(floor(&turned, 1.0).0.tendons.len(), 2);
}

#[test]
fn pieces_that_overlap_are_one_tendon_as_long_as_what_they_cover() {
    for overlap_m in [0.05, 0.2, 0.49] {
        let board = pieces(&[
            [(0.0, 0.0), (10.0, 0.0)],
            [(20.0, 0.0), (10.0 - overlap_m, 0.0)],
        ]);
        let (floor, findings) = floor(&board, 0.0);
        assert_eq!(lengths_cm(&floor), [2000.0], "overlap {overlap_m}");
        assert!(findings.iter().any(|f| f.rule.name == "pieces-overlap"));
    }
}

#[test]
fn a_longer_overlap_is_a_line_drawn_twice() {
    let board = pieces(&[[(0.0, 0.0), (10.0, 0.0)], [(20.0, 0.0), (9.0, 0.0)]]);
    let (floor, findings) = floor(&board, 0.0);
    assert_eq!(floor.tendons.len(), 2);
    assert!(findings.iter().any(|f| f.rule.name == "duplicate-line"));
}

#[test]
fn a_piece_inside_another_is_a_copy() {
    let board = pieces(&[[(0.0, 0.0), (20.0, 0.0)], [(5.0, 0.0), (12.0, 0.0)]]);
    let (floor, findings) = floor(&board, 0.0);
    assert_eq!(lengths_cm(&floor), [2000.0]);
    assert!(findings.iter().any(|f| f.rule.name == "duplicate-line"));
}

#[test]
fn two_tendons_that_lap_with_ends_of_their_own_stay_two() {
    let mut board = pieces(&[[(0.0, 0.0), (12.0, 0.0)], [(9.0, 0.0), (20.0, 0.0)]]);
    board.insert("TENDON-END", "DEAD-END", at(12.0, 0.0));
    board.insert("TENDON-END", "DEAD-END", at(9.0, 0.0));
    assert_eq!(lengths_cm(&floor(&board, 0.5).0), [1100.0, 1200.0]);
}

/// Angle that the only tendon turns in plan, radians: what friction sees of it.
fn turned_rad(board: &Board, bridge_gap_m: f64) -> f64 {
    let (floor, _) = floor(board, bridge_gap_m);
    assert_eq!(floor.tendons.len(), 1);
    let path = &floor.tendons[0].path;
    let corners = path.corners();
    let arcs = path.segments().iter();
    let arcs: f64 = arcs.map(|s| s.length_m() * s.curvature_per_m().abs()).sum();
    arcs + corners.iter().map(|c| c.turn_rad.abs()).sum::<f64>()
}

#[test]
fn pieces_a_little_aside_of_one_another_bend_no_tendon_however_they_lie_and_run() {
    for ahead_m in [-0.4, -0.2, -0.012, 0.0, 0.02, 0.4] {
        for aside_m in [1e-16, 0.001, 0.0149, -0.0149] {
            if f64::abs(ahead_m) <= 0.01 && f64::abs(aside_m) < 0.01 {
                continue;
            }
            for turn_rad in [
                0.0,
                0.3,
                std::f64::consts::FRAC_PI_2,
                2.0,
                std::f64::consts::PI,
                5.0,
            ] {
                for turned in [[false, false], [true, false], [false, true], [true, true]] {
                    let mut board = pieces(&[
                        [(0.0, 0.0), (8.0, 0.0)],
                        [(8.0 + ahead_m, aside_m), (20.0, aside_m)],
                    ]);
                    for (shape, turned) in board.drawing.shapes.iter_mut().zip(turned) {
                        if turned {
                            shape.path = shape.path.reversed();
                        }
                    }
                    let found = turned_rad(&board.moved(turn_rad, at(3.0, -7.0)), 0.5);
                    assert!(
                        found < 1e-6,
                        "{ahead_m} ahead, {aside_m} aside, turned by {turn_rad}: {found}"
                    );
                }
            }
        }
    }
}

#[test]
fn a_row_of_pieces_that_step_aside_bends_by_next_to_nothing() {
    let row = [
        [(0.0, 0.0), (8.0, 0.0)],
        [(7.8, 0.012), (12.0, 0.012)],
        [(12.3, 0.0), (12.9, 0.0)],
        [(13.2, 0.012), (24.0, 0.012)],
    ];
    assert!(turned_rad(&pieces(&row), 0.5) < 0.025);
}

#[test]
fn a_slip_of_the_pencil_at_a_vertex_bends_no_tendon() {
    let mut board = Board::new();
    let slip = [
        (0.0, 0.0),
        (8.0, 0.0),
        (8.0, 0.004),
        (8.001, 0.0),
        (16.0, 0.0),
    ];
    board.line("TENDON-DISTRIBUTED", &slip);
    assert!(turned_rad(&board, 0.0) < 0.002);
}
