//! Pieces put together to tendons, and kept apart where tendons end.

use tautplan::finding::Level;
use tautplan::floor::EndKind::{Dead, Live};

use crate::kit::Board;
use crate::sketch::{BANDED, DISTRIBUTED, kinds, only, rules, spans_mm, told};

#[test]
fn pieces_that_meet_are_one_tendon_from_the_first_drawn_vertex() {
    let mut board = Board::slab();
    board.line(BANDED, &[(20.0, 5.0), (10.0, 5.0)]);
    board.line(BANDED, &[(0.0, 5.0), (9.991, 5.0)]);
    board.line(BANDED, &[(30.0, 6.0), (20.005, 5.0)]);
    let first = board.drawing.shapes[1].handle.clone();
    board.drawing.shapes.rotate_left(2);
    let (floor, findings) = board.read();
    assert_eq!(spans_mm(&floor), [[30_000, 6_000, 0, 5_000]]);
    assert_eq!(floor.tendons[0].handle, first, "the piece drawn first");
    assert!(told(&findings, "pieces-meet").is_empty());
}

#[test]
fn a_gap_wider_than_the_joining_gap_parts_two_tendons() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (10.0, 5.0)]);
    board.line(BANDED, &[(10.011, 5.0), (20.0, 5.0)]);
    assert_eq!(board.read().0.tendons.len(), 2);
}

#[test]
fn pieces_on_two_layers_are_two_tendons() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (10.0, 5.0)]);
    board.line(DISTRIBUTED, &[(10.0, 5.0), (20.0, 5.0)]);
    board.line("TENDON-DISTRIBUTED-2", &[(20.0, 5.0), (30.0, 5.0)]);
    assert_eq!(board.read().0.tendons.len(), 3);
}

#[test]
fn of_three_ends_that_meet_the_smooth_pair_goes_on_and_the_third_is_said() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (10.0, 5.0)]);
    board.line(BANDED, &[(10.0, 5.0), (20.0, 5.3)]);
    board.line(BANDED, &[(10.0, 5.0), (11.0, 9.0)]);
    let (floor, findings) = board.read();
    let mut spans = spans_mm(&floor);
    spans.sort_unstable();
    let (through, branch) = ([0, 5_000, 20_000, 5_300], [10_000, 5_000, 11_000, 9_000]);
    assert_eq!(spans, [through, branch]);
    let finding = only(&findings, "pieces-meet");
    assert!(finding.text.starts_with("3 line ends meet") && finding.text.contains(" 1 of them"));
    assert_eq!(finding.place, Some(geo::Coord { x: 10.0, y: 5.0 }));
}

#[test]
fn of_three_ends_without_a_smooth_pair_beyond_doubt_none_joins() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (10.0, 5.0)]);
    board.line(BANDED, &[(10.0, 5.0), (20.0, 5.5)]);
    board.line(BANDED, &[(10.0, 5.0), (20.0, 4.5)]);
    let (floor, findings) = board.read();
    assert_eq!(floor.tendons.len(), 3);
    let text = &only(&findings, "pieces-meet").text;
    assert!(text.contains(" 3 of them"), "{text}");
}

#[test]
fn at_a_pour_joint_two_tendons_end_face_to_face_each_with_its_symbol() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (9.998, 5.0)]);
    board.line(BANDED, &[(10.002, 5.0), (20.0, 5.0)]);
    board.live((0.0, 5.0));
    board.dead((20.0, 5.0));
    let (floor, _) = board.read();
    assert_eq!(spans_mm(&floor), [[0, 5_000, 20_000, 5_000]]);
    board.dead((9.98, 5.0));
    board.live((10.02, 5.0));
    let (floor, findings) = board.read();
    let halves = [[0, 5_000, 9_998, 5_000], [10_002, 5_000, 20_000, 5_000]];
    assert_eq!(spans_mm(&floor), halves);
    assert_eq!(kinds(&floor.tendons[0]), [Some(Live), Some(Dead)]);
    assert_eq!(kinds(&floor.tendons[1]), [Some(Live), Some(Dead)]);
    let silent = ["end-unclaimed", "end-unknown", "pieces-meet"];
    assert!(rules(&findings).iter().all(|rule| !silent.contains(rule)));
}

#[test]
fn a_ring_of_pieces_is_no_tendon_and_is_said() {
    let mut board = Board::slab();
    board.line(BANDED, &[(2.0, 2.0), (8.0, 2.0), (8.0, 6.0)]);
    board.line(BANDED, &[(2.0, 2.0), (2.0, 6.0), (8.0, 6.0)]);
    let (floor, findings) = board.read();
    assert!(floor.tendons.is_empty());
    assert_eq!(only(&findings, "tendon-closed").level, Level::Warning);
    assert_eq!(only(&findings, "tendons-missing").level, Level::Error);
}
