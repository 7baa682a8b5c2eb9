//! Level lines: one height for every tendon that they cross.

use tautplan::finding::{Finding, Level};
use tautplan::floor::Floor;
use tautplan::floor::PointKind::{Anchor, High, Low};

use crate::kit::Board;
use crate::sketch::{BANDED, LEVEL_LINE, only, points_mm, rules, tendon};

/// Three tendons under level lines, with lows of their own.
fn crossed(draw: impl FnOnce(&mut Board)) -> (Floor, Vec<Finding>) {
    let mut board = Board::slab();
    for (mark, y) in [("B01", 5.0), ("B02", 8.0), ("B03", 13.0)] {
        board.bare_tendon(BANDED, mark, [0.0, 20.0], y);
        board.height("L30", (5.0, y));
        board.height("L30", (15.0, y));
    }
    draw(&mut board);
    board.read()
}

const ACROSS: &[(f64, f64)] = &[(10.0, 4.0), (10.0, 9.0)];

/// The middle point, if there is one.
fn middle(floor: &Floor, mark: &str) -> Option<(i64, Option<i64>)> {
    let points = points_mm(tendon(floor, mark));
    let mut middle = points.into_iter().filter(|point| point.0 == High);
    middle.next().map(|(_, station, height)| (station, height))
}

#[test]
fn a_level_line_gives_its_height_where_it_crosses_and_nowhere_else() {
    let (floor, findings) = crossed(|board| {
        board.line(LEVEL_LINE, ACROSS);
        board.write(LEVEL_LINE, "H165", (10.3, 6.5));
    });
    assert_eq!(middle(&floor, "B01"), Some((10_000, Some(165))));
    assert_eq!(middle(&floor, "B02"), Some((10_000, Some(165))));
    assert_eq!(middle(&floor, "B03"), None);
    let lows = [5_000, 15_000].map(|station| (Low, station, Some(30)));
    let high = (High, 10_000, Some(165));
    let [first, last] = [0, 20_000].map(|station| (Anchor, station, Some(125)));
    let expected = [first, lows[0], high, lows[1], last];
    assert_eq!(points_mm(tendon(&floor, "B02")), expected);
    assert!(!rules(&findings).contains(&"level-line-unread"));
}

#[test]
fn a_label_at_the_same_place_outweighs_the_line_and_a_difference_is_said() {
    for (label, height_mm) in [("H165", 165), ("H150", 150)] {
        let (floor, findings) = crossed(|board| {
            board.line(LEVEL_LINE, ACROSS);
            board.write(LEVEL_LINE, "H165", (10.3, 6.5));
            board.height(label, (10.2, 8.0));
        });
        assert_eq!(middle(&floor, "B01"), Some((10_000, Some(165))));
        assert_eq!(middle(&floor, "B02"), Some((10_200, Some(height_mm))));
        if height_mm == 165 {
            assert!(!rules(&findings).contains(&"level-line-differs"));
            continue;
        }
        let finding = only(&findings, "level-line-differs");
        assert_eq!(
            (finding.level, finding.tendon.as_deref()),
            (Level::Warning, Some("B02"))
        );
        assert!(finding.text.contains("H150") && finding.text.contains("the label was used"));
    }
}

#[test]
fn a_level_line_without_a_text_gives_nothing_and_is_said() {
    let (floor, findings) = crossed(|board| {
        board.line(LEVEL_LINE, ACROSS);
        board.write(LEVEL_LINE, "H165", (10.9, 6.5));
    });
    assert_eq!(middle(&floor, "B01"), None);
    let finding = only(&findings, "level-line-unread");
    assert_eq!(finding.level, Level::Error);
    assert!(
        finding.text.contains("5.00 m has no height within reach"),
        "{}",
        finding.text
    );
    assert!(
        only(&findings, "label-unread")
            .text
            .contains("no level line is within reach")
    );
}

#[test]
fn of_two_heights_beside_one_level_line_none_is_taken_whichever_was_drawn_first() {
    let read = |texts: [(&str, f64); 2]| {
        crossed(|board| {
            board.line(LEVEL_LINE, ACROSS);
            for (text, y) in texts {
                board.write(LEVEL_LINE, text, (10.3, y));
            }
        })
    };
    let (floor, findings) = read([("H165", 6.5), ("H160", 7.0)]);
    assert_eq!(middle(&floor, "B01"), Some((10_000, None)));
    assert!(
        only(&findings, "level-line-unread")
            .text
            .contains("more than one")
    );
    assert_eq!(findings, read([("H160", 7.0), ("H165", 6.5)]).1);
}

#[test]
fn of_two_level_lines_that_contradict_one_another_neither_is_used() {
    let (floor, findings) = crossed(|board| {
        board.line(LEVEL_LINE, ACROSS);
        board.write(LEVEL_LINE, "H165", (9.7, 6.5));
        board.line(LEVEL_LINE, &[(10.3, 6.0), (10.3, 9.0)]);
        board.write(LEVEL_LINE, "H150", (10.6, 6.5));
    });
    assert_eq!(middle(&floor, "B01"), Some((10_000, Some(165))));
    assert_eq!(middle(&floor, "B02"), Some((10_000, None)));
    let finding = only(&findings, "level-line-differs");
    assert_eq!(
        (finding.level, finding.tendon.as_deref()),
        (Level::Error, Some("B02"))
    );
}
