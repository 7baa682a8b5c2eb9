//! End symbols matched to ends, one to one.

use tautplan::finding::Level;
use tautplan::floor::EndKind::{Dead, Live};

use crate::kit::{Board, Dice, at};
use crate::sketch::{BANDED, kinds, only, spans_mm, told};

/// A band of six tendons 0.3 m apart; live and dead ends by turns, drawn a little off.
fn band(off: (f64, f64)) -> Board {
    let mut board = Board::slab();
    for place in 0..6_u8 {
        let y = 5.0 + 0.3 * f64::from(place);
        board.line(BANDED, &[(0.0, y), (20.0, y)]);
        let (left, right) = ((off.0, y + off.1), (20.0 + off.0, y + off.1));
        if place % 2 == 0 {
            board.live(left);
            board.dead(right);
        } else {
            board.dead(left);
            board.live(right);
        }
    }
    board
}

#[test]
fn in_a_band_each_end_takes_its_own_symbol_though_the_neighbours_is_nearer() {
    // 0.16 m across, each symbol is nearer to the next tendon's end than to its own.
    for off in [(0.0, 0.0), (-0.2, 0.0), (0.0, 0.16), (0.1, -0.16)] {
        let mut board = band(off);
        board.shuffle(&mut Dice(3));
        let (floor, findings) = board.read();
        assert_eq!(floor.tendons.len(), 6);
        let mut rows: Vec<(i64, _)> = spans_mm(&floor)
            .iter()
            .zip(&floor.tendons)
            .map(|(span, tendon)| (span[1], kinds(tendon)))
            .collect();
        rows.sort_by_key(|row| row.0);
        for (place, (_, found)) in rows.into_iter().enumerate() {
            let meant = if place % 2 == 0 {
                [Live, Dead]
            } else {
                [Dead, Live]
            };
            assert_eq!(found, meant.map(Some), "row {place}, off {off:?}");
        }
        assert!(told(&findings, "end-unclaimed").is_empty());
        assert!(told(&findings, "end-unknown").is_empty());
    }
}

#[test]
fn a_symbol_out_of_reach_is_said_at_the_end_and_at_the_symbol() {
    for (off_m, reached) in [(0.49, true), (0.51, false)] {
        let mut board = Board::slab();
        board.line(BANDED, &[(0.0, 5.0), (20.0, 5.0)]);
        board.live((0.0, 5.0));
        board.dead((20.0 + off_m, 5.0));
        let (floor, findings) = board.read();
        assert_eq!(
            kinds(&floor.tendons[0]),
            [Some(Live), reached.then_some(Dead)]
        );
        if reached {
            assert!(told(&findings, "end-unknown").is_empty());
            continue;
        }
        let end = only(&findings, "end-unknown");
        assert_eq!((end.level, end.station_m), (Level::Error, Some(20.0)));
        assert_eq!(end.tendon.as_ref(), Some(&floor.tendons[0].mark));
        let symbol = only(&findings, "end-unclaimed");
        assert_eq!(symbol.place, Some(at(20.0 + off_m, 5.0)));
    }
}

#[test]
fn an_end_takes_one_symbol_the_nearer() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (20.0, 5.0)]);
    board.live((0.0, 5.1));
    board.dead((0.0, 5.3));
    board.dead((20.0, 5.0));
    let (floor, findings) = board.read();
    assert_eq!(kinds(&floor.tendons[0]), [Some(Live), Some(Dead)]);
    assert_eq!(only(&findings, "end-unclaimed").place, Some(at(0.0, 5.3)));
}

#[test]
fn symbols_go_by_the_name_of_their_block_whatever_their_layer() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (20.0, 5.0)]);
    board.insert("0", "live-end-15.2", at(20.0, 5.0));
    board.insert("NOTES", "Dead-End", at(0.0, 5.0));
    board.insert("TENDON-END", "NORTH-ARROW", at(0.0, 5.0));
    let (floor, findings) = board.read();
    assert_eq!(kinds(&floor.tendons[0]), [Some(Dead), Some(Live)]);
    assert!(told(&findings, "end-unclaimed").is_empty());
}

#[test]
fn a_live_and_a_dead_symbol_at_one_point_are_taken_for_neither() {
    // At the end of one tendon, and where two meet.
    for second in [false, true] {
        let mut board = Board::slab();
        board.line(BANDED, &[(0.0, 5.0), (10.0, 5.0)]);
        board.live((0.0, 5.0));
        board.live((10.0, 5.0));
        board.dead((10.0, 5.0));
        if second {
            board.line(BANDED, &[(10.0, 5.0), (20.0, 5.0)]);
            board.dead((20.0, 5.0));
        }
        for seed in 0..4 {
            board.shuffle(&mut Dice(seed));
            let (floor, findings) = board.read();
            let mut found: Vec<_> = floor.tendons.iter().flat_map(kinds).collect();
            found.retain(Option::is_some);
            assert_eq!(found.len(), 1 + usize::from(second), "{findings:#?}");
            let contradicted = told(&findings, "end-contradicted");
            assert_eq!(contradicted.len(), floor.tendons.len());
            assert_eq!(contradicted[0].place, Some(at(10.0, 5.0)));
            assert!(told(&findings, "end-unclaimed").is_empty());
        }
    }
}

#[test]
fn two_symbols_where_two_tendons_end_apart_go_to_one_each() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (9.9, 5.0)]);
    board.line(BANDED, &[(10.1, 5.0), (20.0, 5.0)]);
    board.live((0.0, 5.0));
    board.dead((9.95, 5.0));
    board.live((10.05, 5.0));
    board.dead((20.0, 5.0));
    let (floor, findings) = board.read();
    for tendon in &floor.tendons {
        assert_eq!(kinds(tendon), [Some(Live), Some(Dead)]);
    }
    assert!(told(&findings, "end-contradicted").is_empty());
}
