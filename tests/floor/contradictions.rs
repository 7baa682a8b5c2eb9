//! What is said twice: contradictions count for nothing and are errors, repeats change nothing, and neither depends on how
//! the plan lies.

use tautplan::finding::{Finding, Level};
use tautplan::floor::PointKind::{High, Low};
use tautplan::floor::{Floor, Tendon};

use crate::kit::{Board, at};
use crate::sketch::{BANDED, DISTRIBUTED, HEIGHT, MARK, mm, only, points_mm, tendon, told};

/// A tendon of 16 m with lows at quarters, these heights between and these marks, each at its station.
fn board(heights: &[(f64, &str)], marks: &[(f64, &str)]) -> Board {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (16.0, 5.0)]);
    board.live((0.0, 5.0));
    board.dead((16.0, 5.0));
    for &(x, text) in [(4.0, "L30"), (12.0, "L30")].iter().chain(heights) {
        board.height(text, (x, 5.0));
    }
    for &(x, text) in marks {
        board.text(MARK, text, at(x, 5.12), 0.1, 0.0, true);
    }
    board
}

fn between(tendon: &Tendon) -> Vec<(tautplan::floor::PointKind, Option<i64>)> {
    let points = points_mm(tendon);
    let inner = points.get(1..points.len() - 1).unwrap_or_default();
    inner.iter().map(|point| (point.0, point.2)).collect()
}

fn turned(board: &Board) -> [(Floor, Vec<Finding>); 2] {
    [0.0, std::f64::consts::PI].map(|turn_rad| board.moved(turn_rad, at(0.0, 0.0)).read())
}

#[test]
fn of_two_heights_at_one_place_neither_counts_however_the_plan_lies() {
    let board = board(&[(7.95, "H165"), (8.05, "H120")], &[(1.0, "D01 5-12.7")]);
    for (floor, findings) in turned(&board) {
        let lows = (Low, Some(30));
        assert_eq!(between(tendon(&floor, "D01")), [lows, (High, None), lows]);
        let found = only(&findings, "label-contradicted");
        assert_eq!(
            (found.level, found.tendon.as_deref()),
            (Level::Error, Some("D01"))
        );
        assert!(
            found.text.contains("\"H120\" and \"H165\""),
            "{}",
            found.text
        );
        assert!(told(&findings, "label-unclaimed").is_empty());
    }
    let same = self::board(&[(7.95, "H165"), (8.05, "H165")], &[(1.0, "D01 5-12.7")]);
    for (floor, findings) in turned(&same) {
        assert_eq!(between(tendon(&floor, "D01"))[1], (High, Some(165)));
        assert!(told(&findings, "label-contradicted").is_empty());
    }
}

#[test]
fn of_two_strand_counts_of_one_tendon_neither_counts_however_the_plan_lies() {
    for (first, second) in [
        ("D01 5-12.7", "D01 4-12.7"),
        ("D01 5-12.7", "4-12.7"),
        ("D01 5-12.7", "D01 5-15.2"),
        ("D01 2x5-12.7", "D01 3x5-12.7"),
    ] {
        let board = board(&[(8.0, "H165")], &[(1.5, first), (14.0, second)]);
        for (floor, findings) in turned(&board) {
            assert_eq!(tendon(&floor, "D01").strands, None, "{second}");
            let found = only(&findings, "label-contradicted");
            assert_eq!(found.level, Level::Error);
            assert!(told(&findings, "strand-count-missing").is_empty());
        }
    }
    // The same count, also under another name of its size.
    for second in ["D01 5-12.7", "D01 5-1/2\""] {
        let board = board(&[(8.0, "H165")], &[(1.5, "D01 5-12.7"), (14.0, second)]);
        for (floor, findings) in turned(&board) {
            assert_eq!(tendon(&floor, "D01").strands, Some(5));
            assert!(told(&findings, "label-contradicted").is_empty());
        }
    }
}

#[test]
fn lines_of_one_label_that_contradict_one_another_count_for_nothing() {
    for (height, mark, why) in [
        ("H165\nH170", "D01 5-12.7", "two heights"),
        ("165\nFROM TOP", "D01 5-12.7", "another face"),
        ("H165", "D01 5-12.7\n4-12.7", "two numbers of strands"),
    ] {
        let (floor, findings) = board(&[(8.0, height)], &[(1.5, mark)]).read();
        let tendon = tendon(&floor, "D01");
        let known = (between(tendon)[1].1, tendon.strands);
        assert!(known.0.is_none() || known.1.is_none(), "{known:?}");
        let found = only(&findings, "label-contradicted");
        assert!(
            found.level == Level::Error && found.text.contains(why),
            "{}",
            found.text
        );
    }
}

#[test]
fn a_line_left_over_is_said_and_what_was_read_stands() {
    for (height, mark, line, changing) in [
        ("H165\n+10 SAG", "D01 5-12.7", "+10 SAG", true),
        ("H165", "D01 5-12.7\n2x", "2x", true),
        ("H165", "D01\n2 NO\n5-12.7", "2 NO", true),
        ("H165\nSEE S-201", "D01 5-12.7", "SEE S-201", false),
    ] {
        let (floor, findings) = board(&[(8.0, height)], &[(1.5, mark)]).read();
        let tendon = tendon(&floor, "D01");
        assert_eq!((between(tendon)[1].1, tendon.strands), (Some(165), Some(5)));
        let found = only(&findings, "label-unread");
        assert_eq!(found.level, Level::Warning);
        assert!(found.text.contains(&format!("{line:?}")), "{}", found.text);
        assert_eq!(
            found.text.contains("may change"),
            changing,
            "{}",
            found.text
        );
    }
    let (_, findings) = board(&[(8.0, "H165\nTYP.")], &[(1.5, "D01 5-12.7\nU.N.O.")]).read();
    assert!(told(&findings, "label-unread").is_empty(), "{findings:#?}");
}

#[test]
fn h_equals_is_a_height_where_nothing_is_called_low_and_a_dash_parts_where_all_have_one() {
    for [low, high] in [
        ["h=30", "h=165"],
        ["H=30", "H=165"],
        ["L-30", "H-165"],
        ["L=30", "H=165"],
    ] {
        let mut board = Board::slab();
        board.bare_tendon(BANDED, "B01", [0.0, 16.0], 5.0);
        for (x, text) in [(4.0, low), (8.0, high), (12.0, low)] {
            board.write(HEIGHT, text, (x, 5.12));
        }
        let (floor, _) = board.read();
        let low = (Low, Some(30));
        let found = between(tendon(&floor, "B01"));
        assert_eq!(found, [low, (High, Some(165)), low], "{high}");
    }
    // A minus where others have none.
    let mut board = Board::slab();
    board.bare_tendon(BANDED, "B01", [0.0, 16.0], 5.0);
    for (x, text) in [(4.0, "L-30"), (8.0, "H165"), (12.0, "L-30")] {
        board.write(HEIGHT, text, (x, 5.12));
    }
    assert_eq!(between(tendon(&board.read().0, "B01"))[0], (Low, Some(-30)));
}

#[test]
fn a_number_of_tendons_is_shared_out_among_lines_or_is_not_known() {
    for (text, expected) in [
        ("4x5-12.7", Some((2, Some(5)))),
        ("2x5-12.7", Some((1, Some(5)))),
        ("5-12.7", Some((1, Some(5)))),
        ("3x5-12.7", None),
    ] {
        let mut board = Board::slab();
        for y in [5.0, 5.5] {
            board.line(DISTRIBUTED, &[(0.0, y), (16.0, y)]);
        }
        board.text(MARK, text, at(8.0, 6.6), 0.1, 0.0, false);
        board.drawing.leaders.push(tautplan::drawing::Leader {
            handle: "L1".to_owned(),
            layer: MARK.to_owned(),
            arrows: vec![at(7.0, 5.0), at(7.5, 5.5)],
            tails: vec![at(7.9, 6.6), at(7.9, 6.6)],
            texts: vec![board.drawing.texts.len() - 1],
            look: tautplan::drawing::Look::default(),
        });
        let (floor, findings) = board.read();
        let errors = told(&findings, "label-shared");
        let errors = errors.iter().filter(|f| f.level == Level::Error).count();
        for tendon in &floor.tendons {
            let at_mm = mm(tendon.path.place_at(0.0).y);
            match expected {
                Some(counts) => {
                    assert_eq!((tendon.tendons, tendon.strands), counts, "{text} {at_mm}");
                }
                None => assert_eq!(tendon.strands, None, "{text} {at_mm}"),
            }
        }
        assert_eq!(
            errors,
            usize::from(expected.is_none()),
            "{text}: {findings:#?}"
        );
    }
}
