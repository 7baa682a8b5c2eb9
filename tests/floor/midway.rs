//! Labels midway between two tendons: where nothing tells the two apart, nobody gets them.

use tautplan::finding::{Finding, Level};
use tautplan::floor::Floor;

use crate::kit::Board;
use crate::sketch::{BANDED, HEIGHT, MARK, tendon, told};

/// Two tendons near enough for one label to stand between them.
const Y: [f64; 2] = [5.0, 5.4];
const MIDDLE: f64 = 5.2;
const DRAPED: [(f64, &str); 3] = [(5.0, "L30"), (10.0, "H165"), (15.0, "L30")];

fn two() -> Board {
    let mut board = Board::slab();
    for (mark, y) in ["B01", "B02"].into_iter().zip(Y) {
        board.bare_tendon(BANDED, mark, [0.0, 20.0], y);
    }
    board
}

/// Heights that a tendon was given.
fn heights(floor: &Floor, mark: &str) -> usize {
    let points = &tendon(floor, mark).points;
    points
        .iter()
        .filter(|point| point.drawn_m.is_some())
        .count()
}

/// All of them are said to be ambiguous and neither tendon has any.
fn nobody_gets(board: &Board, labels: usize) {
    let (floor, findings) = board.read();
    assert_eq!(["B01", "B02"].map(|mark| heights(&floor, mark)), [0, 0]);
    said(&findings, labels);
}

fn said(findings: &[Finding], labels: usize) {
    let ambiguous = told(findings, "label-ambiguous");
    assert_eq!(ambiguous.len(), labels, "{ambiguous:#?}");
    for finding in ambiguous {
        assert_eq!(finding.level, Level::Error);
        assert!(
            finding.text.contains("equally well; neither was given it"),
            "{}",
            finding.text
        );
    }
}

#[test]
fn one_height_between_two_tendons_teaches_no_habit_by_which_it_is_settled() {
    let mut board = two();
    board.write(HEIGHT, "H165", (10.0, MIDDLE));
    nobody_gets(&board, 1);
}

#[test]
fn a_whole_drape_between_two_tendons_goes_to_neither() {
    let mut board = two();
    for (x, content) in DRAPED {
        board.write(HEIGHT, content, (x, MIDDLE));
    }
    nobody_gets(&board, 3);
    // Two drapes, one for each, and nothing that says which is whose.
    for (x, content) in [(5.8, "L40"), (10.8, "H155"), (15.8, "L40")] {
        board.write(HEIGHT, content, (x, MIDDLE));
    }
    nobody_gets(&board, 6);
}

#[test]
fn what_the_other_labels_tell_settles_it() {
    // Labels of these tendons stand above them.
    let mut board = two();
    for y in Y {
        board.height("L30", (5.0, y));
        board.height("L30", (15.0, y));
    }
    board.write(HEIGHT, "H165", (10.0, MIDDLE));
    let (floor, findings) = board.read();
    assert_eq!(["B01", "B02"].map(|mark| heights(&floor, mark)), [3, 2]);
    let ambiguous = told(&findings, "label-ambiguous");
    assert_eq!(ambiguous.len(), 1);
    assert_eq!(ambiguous[0].level, Level::Warning);
    // One that its tendon lacks goes there, wherever it stands between the two.
    let mut board = two();
    for (x, content) in DRAPED {
        board.write(HEIGHT, content, (x, Y[0] - 0.1));
        if content == "L30" {
            board.write(HEIGHT, content, (x, Y[1] + 0.1));
        }
    }
    board.write(HEIGHT, "H165", (10.0, MIDDLE));
    let (floor, _) = board.read();
    assert_eq!(["B01", "B02"].map(|mark| heights(&floor, mark)), [3, 3]);
}

fn bare(marks: &[(&str, f64)]) -> (Floor, Vec<Finding>) {
    let mut board = Board::slab();
    for y in Y {
        board.line(BANDED, &[(0.0, y), (20.0, y)]);
    }
    for &(content, x) in marks {
        board.write(MARK, content, (x, MIDDLE));
    }
    board.read()
}

#[test]
fn a_mark_between_two_tendons_goes_to_neither() {
    for marks in [
        &[("B07 5-12.7", 5.0)][..],
        &[("B07 5-12.7", 5.0), ("B08 7-12.7", 12.0)],
        // Mark and strands in texts of their own.
        &[("B07", 5.0), ("5-12.7", 7.0)],
    ] {
        let (floor, findings) = bare(marks);
        assert!(
            floor
                .tendons
                .iter()
                .all(|t| !t.mark_drawn && t.strands.is_none()),
            "{marks:?}"
        );
        said(&findings, marks.len());
    }
}

#[test]
fn what_is_the_same_for_both_is_no_doubt() {
    let (floor, findings) = bare(&[("5-12.7", 5.0), ("5-12.7", 12.0)]);
    assert!(floor.tendons.iter().all(|tendon| tendon.strands == Some(5)));
    assert!(
        told(&findings, "label-ambiguous").is_empty(),
        "{findings:#?}"
    );
}
