//! Heights at and near the ends of a tendon, and what stays unknown there.

use tautplan::finding::Finding;
use tautplan::floor::{Floor, PointKind, read};
use tautplan::job::Job;

use crate::kit::{Board, at};

/// A tendon of 20 m along x, live at the left, with these heights: text, place, height of the text.
fn tendon(forwards: bool, heights: &[(&str, f64, f64)]) -> Board {
    let mut board = Board::new();
    let ends = [(0.0, 0.0), (20.0, 0.0)];
    let drawn = if forwards { ends } else { [ends[1], ends[0]] };
    board.line("TENDON-DISTRIBUTED", &drawn);
    board.insert("TENDON-END", "LIVE-END", at(0.0, 0.0));
    board.insert("TENDON-END", "DEAD-END", at(20.0, 0.0));
    board.text("TENDON-MARK", "D001 5-12.7", at(4.0, 0.2), 0.15, 0.0, true);
    board.rectangle("SLAB-EDGE", (0.0, -5.0), (20.0, 5.0));
    for &(text, x, size_m) in heights {
        board.text("TENDON-HEIGHT", text, at(x, 0.3), size_m, 0.0, true);
    }
    board
}

fn floor(board: &Board) -> (Floor, Vec<Finding>) {
    let mut job = Job::default();
    job.slab.thickness_m = Some(0.250);
    read(&board.drawing, &job)
}

/// Kind, metres from the live end, millimetres; from the live end on, whichever way the line was drawn.
fn points(board: &Board) -> Vec<(PointKind, f64, Option<f64>)> {
    let (floor, _) = floor(board);
    let mut points: Vec<_> = floor.tendons[0]
        .points
        .iter()
        .map(|p| {
            let millimetres = p.height_m.map(|h| (h * 1000.0).round());
            (p.kind, (p.place.x * 100.0).round() / 100.0, millimetres)
        })
        .collect();
    points.sort_by(|a, b| a.1.total_cmp(&b.1));
    points
}

#[test]
fn of_two_heights_near_an_end_the_nearer_is_the_anchors() {
    for forwards in [true, false] {
        let board = tendon(
            forwards,
            &[("H200", 19.56, 0.3), ("100", 20.0, 0.3), ("L40", 10.0, 0.3)],
        );
        let found = points(&board);
        assert_eq!(
            found.last(),
            Some(&(PointKind::Anchor, 20.0, Some(100.0))),
            "{found:?}"
        );
        assert!(
            found.contains(&(PointKind::High, 19.56, Some(200.0))),
            "{found:?}"
        );
    }
}

#[test]
fn a_number_written_from_within_to_the_end_is_the_anchors_and_a_word_is_not() {
    for forwards in [true, false] {
        // Texts by their left end, 0.15 m high: about 0.4 m long.
        for (text, anchor_mm, points_found) in
            [("110", 110.0, 3), ("T/2", 125.0, 3), ("H200", 125.0, 4)]
        {
            let mut board = tendon(forwards, &[("L40", 10.0, 0.15)]);
            board.text("TENDON-HEIGHT", text, at(19.55, 0.1), 0.15, 0.0, false);
            let found = points(&board);
            assert_eq!(
                found.last(),
                Some(&(PointKind::Anchor, 20.0, Some(anchor_mm))),
                "{text}: {found:?}"
            );
            assert_eq!(found.len(), points_found, "{text}: {found:?}");
        }
        // A chair farther in is no anchor.
        let mut board = tendon(forwards, &[("L40", 10.0, 0.15)]);
        board.text("TENDON-HEIGHT", "110", at(19.1, 0.1), 0.15, 0.0, false);
        let found = points(&board);
        assert_eq!(
            found.last(),
            Some(&(PointKind::Anchor, 20.0, Some(125.0))),
            "{found:?}"
        );
    }
}

#[test]
fn a_level_line_at_the_anchor_is_not_that_of_a_label_farther_in() {
    for forwards in [true, false] {
        let mut board = tendon(forwards, &[("165", 0.46, 0.1), ("L40", 10.0, 0.1)]);
        board.line("TENDON-LEVEL-LINE", &[(0.02, -3.0), (0.02, 3.0)]);
        board.text("TENDON-LEVEL-LINE", "165", at(0.12, 2.5), 0.1, 0.0, true);
        let found = points(&board);
        assert_eq!(
            found.first(),
            Some(&(PointKind::Anchor, 0.0, Some(165.0))),
            "{found:?}"
        );
    }
}

#[test]
fn an_anchor_that_two_level_lines_contradict_has_no_height() {
    let mut board = tendon(true, &[("L40", 10.0, 0.1)]);
    for (x, text) in [(0.02, "165"), (0.05, "125")] {
        board.line("TENDON-LEVEL-LINE", &[(x, -3.0), (x, 3.0)]);
        let y = if text == "165" { 2.7 } else { -2.7 };
        board.text("TENDON-LEVEL-LINE", text, at(x + 0.1, y), 0.1, 0.0, true);
    }
    let (floor, _) = floor(&board);
    let tendon = &floor.tendons[0];
    assert_eq!(tendon.points[0].height_m, None, "{:?}", tendon.points);
    assert!(tautplan::profile::build(tendon, &Job::default().profile).is_err());
}

#[test]
fn without_any_height_there_is_no_curve() {
    let (floor, findings) = floor(&tendon(true, &[]));
    let tendon = &floor.tendons[0];
    assert!(tendon.points.iter().all(|p| p.height_m.is_none()));
    assert!(tautplan::profile::build(tendon, &Job::default().profile).is_err());
    assert!(
        findings.iter().any(|f| f.rule.name == "height-missing"),
        "{findings:?}"
    );
}

#[test]
fn two_strand_sizes_are_not_both_one_tendons() {
    let mut board = tendon(true, &[("L40", 10.0, 0.15)]);
    board.text("TENDON-MARK", "D001 5-15.2", at(14.0, 0.2), 0.15, 0.0, true);
    let (_, findings) = floor(&board);
    assert!(
        findings.iter().any(|f| f.text.contains("5-15.2")),
        "{findings:?}"
    );
}

#[test]
fn a_zone_of_two_thicknesses_has_none() {
    let mut board = tendon(true, &[("L40", 10.0, 0.15)]);
    board.rectangle("SLAB-ZONE", (8.0, -2.0), (12.0, 2.0));
    board.text("SLAB-ZONE", "T350", at(9.0, 1.0), 0.2, 0.0, true);
    board.text("SLAB-ZONE", "T400", at(9.0, 1.0), 0.2, 0.0, true);
    let (floor, findings) = floor(&board);
    assert!(floor.slab.zones.is_empty());
    assert!(findings.iter().any(|f| f.rule.name == "thickness-differs"));
    let low = floor.tendons[0]
        .points
        .iter()
        .find(|p| p.kind == PointKind::Low);
    assert_eq!(low.expect("the low point").thickness_m, None);
}

#[test]
fn a_stub_is_called_a_stub() {
    let mut board = tendon(true, &[("L40", 10.0, 0.15)]);
    board.line("TENDON-DISTRIBUTED", &[(3.0, 3.0), (3.008, 3.0)]);
    let (floor, findings) = floor(&board);
    assert_eq!(floor.tendons.len(), 1);
    assert!(
        findings.iter().any(|f| f.rule.name == "tendon-stub"),
        "{findings:?}"
    );
}

#[test]
fn lengths_that_differ_by_less_than_the_tolerance_put_no_sorting_out() {
    let mut board = Board::new();
    for line in 0..40_u32 {
        // Handles in an order that has nothing to do with the lengths.
        let at = f64::from(line * 17 % 40);
        board.line("TENDON-DISTRIBUTED", &[(0.0, at), (20.0 + 0.009 * at, at)]);
    }
    assert_eq!(floor(&board).0.tendons.len(), 40);
}

#[test]
fn mid_depth_written_some_way_in_is_the_anchors_and_another_bare_height_is_in_doubt() {
    for forwards in [true, false] {
        for (text, inside_m, anchor_mm, own_points, doubted) in [
            ("125", 0.45, 125.0, 1, false),
            ("125", 0.95, 125.0, 1, false),
            ("110", 0.45, 125.0, 2, true),
            ("H205", 0.45, 125.0, 2, false),
            ("205", 1.0, 125.0, 2, false),
        ] {
            let board = tendon(forwards, &[(text, inside_m, 0.12), ("L40", 10.0, 0.12)]);
            let found = points(&board);
            let case = format!("{text} at {inside_m}, {forwards}: {found:?}");
            assert_eq!(
                found[0],
                (PointKind::Anchor, 0.0, Some(anchor_mm)),
                "{case}"
            );
            assert_eq!(found.len(), 2 + own_points, "{case}");
            let (_, findings) = floor(&board);
            let said = findings
                .iter()
                .filter(|f| f.rule.name == "anchor-height-inside");
            assert_eq!(said.count(), usize::from(doubted), "{case}");
        }
    }
}
