//! What is drawn twice counts once, and is said.

use tautplan::finding::Level;
use tautplan::floor::PointKind::{Anchor, High};

use crate::kit::Board;
use crate::sketch::{BANDED, DISTRIBUTED, HEIGHT, only, points_mm, spans_mm, tendon, told};

type Drawn<'a> = (&'a str, &'a [(f64, f64)]);

/// Where the tendons of these lines lie, and the duplicates that are said.
fn lines(drawn: &[Drawn<'_>]) -> (Vec<[i64; 4]>, Vec<String>) {
    let mut board = Board::slab();
    for (layer, points) in drawn {
        board.line(layer, points);
    }
    let (floor, findings) = board.read();
    let mut spans = spans_mm(&floor);
    spans.sort_unstable();
    let said = told(&findings, "duplicate-line").into_iter();
    let said = said.map(|finding| {
        assert_eq!(finding.level, Level::Error);
        finding.text.to_string()
    });
    (spans, said.collect())
}

const FIRST: &[(f64, f64)] = &[(0.0, 5.0), (20.0, 5.0)];

#[test]
fn the_same_line_twice_is_one_tendon() {
    let near: &[(f64, f64)] = &[(0.004, 5.003), (20.0, 5.003)];
    let back: &[(f64, f64)] = &[(20.0, 5.0), (7.0, 5.0), (0.0, 5.0)];
    for (layer, points) in [
        (BANDED, near),
        (BANDED, back),
        (DISTRIBUTED, near),
        (DISTRIBUTED, back),
    ] {
        let (spans, said) = lines(&[(BANDED, FIRST), (layer, points)]);
        assert_eq!(spans, [[0, 5_000, 20_000, 5_000]], "the first drawn stays");
        assert_eq!(said.len(), 1, "{said:?}");
        assert!(said[0].contains("20.00 m of its 20.00 m"), "{}", said[0]);
    }
}

#[test]
fn a_line_beside_or_across_is_no_copy() {
    let beside: &[(f64, f64)] = &[(0.0, 5.012), (20.0, 5.012)];
    let across: &[(f64, f64)] = &[(10.0, 0.0), (10.0, 10.0)];
    let bowed: &[(f64, f64)] = &[(0.0, 5.0), (10.0, 5.6), (20.0, 5.0)];
    for points in [beside, across, bowed] {
        let (spans, said) = lines(&[(BANDED, FIRST), (DISTRIBUTED, points)]);
        assert_eq!((spans.len(), said.len()), (2, 0), "{said:?}");
    }
}

#[test]
fn a_part_that_lies_on_another_tendon_is_said_and_more_than_half_is_left_out() {
    let (spans, said) = lines(&[(BANDED, FIRST), (BANDED, &[(16.0, 5.0), (26.0, 5.0)])]);
    assert_eq!((spans.len(), said.len()), (2, 1));
    assert!(said[0].contains("3.94 m of its 10.00 m"), "{}", said[0]);
    let (spans, said) = lines(&[(BANDED, FIRST), (DISTRIBUTED, &[(12.0, 5.0), (22.0, 5.0)])]);
    assert_eq!((spans.len(), said.len()), (1, 1));
}

#[test]
fn a_line_that_lies_half_on_one_tendon_and_half_on_the_next_is_left_out() {
    let next: &[(f64, f64)] = &[(20.2, 5.0), (40.0, 5.0)];
    let (spans, said) = lines(&[
        (BANDED, FIRST),
        (BANDED, next),
        (BANDED, &[(15.1, 5.0), (25.1, 5.0)]),
    ]);
    assert_eq!(
        spans,
        [[0, 5_000, 20_000, 5_000], [20_200, 5_000, 40_000, 5_000]]
    );
    assert_eq!(said.len(), 1);
    assert!(
        said[0].contains("lies on that of handle 103 and 104 for"),
        "{}",
        said[0]
    );
}

#[test]
fn a_tendon_that_crosses_at_a_flat_angle_does_not_hide_one_that_lies_on_the_line() {
    // 2 of 33 places lie on the first tendon, and 2 within 10 mm of the one that crosses midway between them.
    let across_m = 20.0 + 10.0 / 33.0 * 17.0;
    let (spans, said) = lines(&[
        (BANDED, &[(0.0, 5.0), (20.6, 5.0)]),
        (BANDED, &[(20.0, 5.0), (30.0, 5.0)]),
        (BANDED, &[(across_m - 4.0, 4.76), (across_m + 20.0, 6.2)]),
    ]);
    assert_eq!(spans.len(), 3);
    assert!(
        said.len() == 1 && said[0].contains("0.61 m of its 10.00 m"),
        "{said:?}"
    );
}

#[test]
fn without_handles_the_order_of_entities_decides_nothing() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (20.0, 5.0)]);
    board.line(BANDED, &[(20.0, 5.0), (0.0, 5.0)]);
    // Two arms of one mirrored shape: the same ends, the same length.
    board.line(BANDED, &[(2.0, 8.0), (9.0, 9.0), (16.0, 8.0)]);
    board.line(BANDED, &[(16.0, 8.0), (9.0, 7.0), (2.0, 8.0)]);
    let read = |board: &mut Board| {
        for (number, shape) in board.drawing.shapes.iter_mut().enumerate() {
            shape.handle = format!("#{number}");
        }
        let paths: Vec<_> = board
            .read()
            .0
            .tendons
            .into_iter()
            .map(|t| (t.mark, t.path))
            .collect();
        paths
    };
    let first = read(&mut board);
    assert_eq!(first.len(), 3);
    for _ in 0..board.drawing.shapes.len() {
        board.drawing.shapes.rotate_left(1);
        assert_eq!(read(&mut board), first);
        let mut reversed = board.clone();
        reversed.drawing.shapes.reverse();
        assert_eq!(read(&mut reversed), first);
    }
}

#[test]
fn a_label_written_twice_is_one_also_where_others_stand_level_with_it() {
    let mut board = Board::slab();
    board.bare_tendon(BANDED, "B01", [0.0, 20.0], 5.0);
    board.bare_tendon(BANDED, "B02", [0.0, 20.0], 8.0);
    board.height("H165", (10.0, 5.0));
    board.height("H170", (10.001, 8.0));
    board.height("H165", (10.002, 5.0));
    let (floor, findings) = board.read();
    let high = (High, 10_000, Some(165));
    let anchors = [0, 20_000].map(|station| (Anchor, station, Some(125)));
    assert_eq!(
        points_mm(tendon(&floor, "B01")),
        [anchors[0], high, anchors[1]]
    );
    assert!(
        told(&findings, "label-unclaimed").is_empty(),
        "{findings:#?}"
    );
    // Another text at that place is no copy, but a contradiction.
    board.write(HEIGHT, "L165", (10.001, 5.12));
    let (_, findings) = board.read();
    let text = &only(&findings, "label-contradicted").text;
    assert!(text.contains("\"H165\" and \"L165\""), "{text}");
}
