//! Intermediate anchors: which tendon each divides, and where.

use tautplan::finding::Level;
use tautplan::floor::EndKind::{Dead, Live};
use tautplan::floor::{Tendon, read};
use tautplan::job::Job;

use crate::kit::{Board, Dice, at};
use crate::sketch::{BANDED, DISTRIBUTED, MARK, kinds, mm, only, tendon, told};

impl Board {
    fn anchor(&mut self, (x, y): (f64, f64)) {
        self.insert("TENDON-END", "INTERMEDIATE-ANCHOR", at(x, y));
    }
}

fn joints_mm(tendon: &Tendon) -> Vec<i64> {
    let stations = tendon.joints.iter().map(|joint| mm(joint.station_m));
    stations.collect()
}

/// A tendon from 0 to 20 that is drawn by these pieces, with its ends and its mark.
fn pieces(drawn: &[[f64; 2]]) -> Board {
    let mut board = Board::slab();
    for [from, to] in drawn {
        board.line(BANDED, &[(*from, 5.0), (*to, 5.0)]);
    }
    board.live((0.0, 5.0));
    board.dead((20.0, 5.0));
    board.write(MARK, "B07 5-12.7", (17.0, 5.12));
    board
}

#[test]
fn a_block_divides_the_line_it_stands_on_however_the_line_is_drawn() {
    let drawn: [&[[f64; 2]]; 5] = [
        &[[0.0, 20.0]],
        &[[0.0, 8.0], [8.0, 20.0]],
        &[[8.0, 0.0], [20.0, 8.0]],
        // Cut off at the symbol's outline.
        &[[0.0, 7.85], [8.15, 20.0]],
        &[[7.9, 0.0], [8.1, 20.0]],
    ];
    for (case, drawn) in drawn.into_iter().enumerate() {
        let mut board = pieces(drawn);
        board.anchor((8.0, 5.02));
        board.shuffle(&mut Dice(5));
        let (floor, findings) = board.read();
        assert_eq!(floor.tendons.len(), 1, "case {case}");
        let tendon = tendon(&floor, "B07");
        let forwards = tendon.path.start().is_some_and(|start| start.x < 1.0);
        let (station_mm, ends) = if forwards {
            (8000, [Live, Dead])
        } else {
            (12_000, [Dead, Live])
        };
        assert_eq!(joints_mm(tendon), [station_mm], "case {case}");
        assert_eq!(tendon.joints[0].place, at(8.0, 5.0));
        assert_eq!(kinds(tendon), ends.map(Some));
        for rule in ["end-unknown", "end-unclaimed", "joint-unclaimed"] {
            assert!(told(&findings, rule).is_empty(), "case {case}: {rule}");
        }
    }
}

#[test]
fn without_an_anchor_in_it_a_gap_stays_a_gap() {
    for anchor in [None, Some((9.5, 5.0)), Some((8.0, 5.2))] {
        let mut board = pieces(&[[0.0, 7.85], [8.15, 20.0]]);
        if let Some(place) = anchor {
            board.anchor(place);
        }
        assert_eq!(board.read().0.tendons.len(), 2, "{anchor:?}");
    }
}

#[test]
fn a_live_and_a_dead_end_at_a_joint_are_two_tendons() {
    let mut board = pieces(&[[0.0, 8.0], [8.0, 20.0]]);
    board.dead((8.0, 5.0));
    board.live((8.0, 5.0));
    let (floor, _) = board.read();
    assert_eq!(floor.tendons.len(), 2);
    assert!(floor.tendons.iter().all(|tendon| tendon.joints.is_empty()));
}

#[test]
fn several_anchors_stand_in_order_and_two_at_one_place_are_one() {
    let mut board = pieces(&[[0.0, 20.0]]);
    board.anchor((14.0, 5.0));
    board.anchor((6.0, 5.0));
    board.anchor((6.2, 5.0));
    board.write("TENDON-END", "INTERMEDIATE ANCHOR", (14.3, 5.2));
    let (floor, findings) = board.read();
    assert_eq!(joints_mm(&floor.tendons[0]), [6000, 14_000]);
    assert!(told(&findings, "joint-unclaimed").is_empty());
    assert!(told(&findings, "label-unread").is_empty());
}

#[test]
fn a_word_alone_divides_too_and_an_attribute_tells() {
    let mut board = pieces(&[[0.0, 20.0]]);
    board.write("TENDON-END", "(Int. Anchor)", (9.0, 5.2));
    let (floor, _) = board.read();
    assert_eq!(joints_mm(&floor.tendons[0]), [9000]);

    let mut board = pieces(&[[0.0, 20.0]]);
    board.insert("TENDON-END", "PT-ANCHOR", at(12.0, 5.0));
    let told = ("TYPE".to_owned(), "intermediate".to_owned());
    board.drawing.inserts[2].attributes = vec![told];
    let mut job = Job::default();
    job.conventions.end_blocks = vec!["PT-ANCHOR".to_owned()];
    let (floor, findings) = read(&board.drawing, &job);
    assert_eq!(joints_mm(&floor.tendons[0]), [12_000]);
    assert!(crate::sketch::told(&findings, "end-unclaimed").is_empty());
}

#[test]
fn at_an_end_the_tendon_goes_on_elsewhere_and_nobody_knows_its_kind() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (12.0, 5.0)]);
    board.live((0.0, 5.0));
    board.anchor((12.1, 5.0));
    let (floor, findings) = board.read();
    assert_eq!(kinds(&floor.tendons[0]), [Some(Live), None]);
    assert!(floor.tendons[0].joints.is_empty());
    let end = only(&findings, "end-unknown");
    assert_eq!((end.level, end.station_m), (Level::Error, Some(12.0)));
    assert!(end.text.contains("INTERMEDIATE-ANCHOR") && end.text.contains("another pour"));
    assert!(told(&findings, "joint-unclaimed").is_empty());

    board.dead((12.0, 5.0));
    let (floor, findings) = board.read();
    assert_eq!(kinds(&floor.tendons[0]), [Some(Live), Some(Dead)]);
    assert!(floor.tendons[0].joints.is_empty());
    let symbol = only(&findings, "joint-unclaimed");
    assert_eq!(symbol.tendon.as_ref(), Some(&floor.tendons[0].mark));
    assert!(told(&findings, "end-unknown").is_empty());
}

#[test]
fn pieces_on_two_layers_both_go_on_at_the_anchor_between_them() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (8.0, 5.0)]);
    board.line("TENDON-BANDED-POUR-2", &[(8.0, 5.0), (20.0, 5.0)]);
    board.live((0.0, 5.0));
    board.dead((20.0, 5.0));
    board.anchor((8.0, 5.0));
    let (floor, findings) = board.read();
    assert_eq!(floor.tendons.len(), 2);
    assert_eq!(told(&findings, "end-unknown").len(), 2);
    assert!(told(&findings, "joint-unclaimed").is_empty());
}

#[test]
fn far_from_every_tendon_it_is_told() {
    let mut board = pieces(&[[0.0, 20.0]]);
    board.anchor((8.0, 6.0));
    let (floor, findings) = board.read();
    assert!(floor.tendons[0].joints.is_empty());
    let astray = only(&findings, "joint-unclaimed");
    assert_eq!(
        (astray.level, astray.place),
        (Level::Warning, Some(at(8.0, 6.0)))
    );
}

#[test]
fn where_tendons_cross_the_nearest_is_divided_and_a_tie_is_told() {
    // Across at 8, and a second of the band 0.3 m off: the block is as wide as both.
    for (place, divided) in [
        ((8.2, 5.0), Some("B07")),
        ((8.0, 5.2), Some("D01")),
        ((8.0, 5.0), None),
    ] {
        let mut board = pieces(&[[0.0, 20.0]]);
        board.bare_tendon(BANDED, "B08", [0.0, 20.0], 5.3);
        board.line(DISTRIBUTED, &[(8.0, 0.0), (8.0, 18.0)]);
        board.live((8.0, 0.0));
        board.dead((8.0, 18.0));
        board.text(
            MARK,
            "D01 5-12.7",
            at(7.88, 10.0),
            0.1,
            std::f64::consts::FRAC_PI_2,
            true,
        );
        board.anchor(place);
        let (floor, findings) = board.read();
        for one in &floor.tendons {
            let own = Some(one.mark.as_str()) == divided;
            assert_eq!(
                one.joints.len(),
                usize::from(own),
                "{} at {place:?}",
                one.mark
            );
        }
        let tied = told(&findings, "joint-unclaimed");
        assert_eq!(tied.len(), usize::from(divided.is_none()));
        assert!(tied.iter().all(|one| one.level == Level::Error));
    }
}

#[test]
fn turning_and_moving_the_plan_moves_the_anchors_with_it() {
    let mut board = pieces(&[[0.0, 9.9], [10.1, 20.0]]);
    board.anchor((10.0, 5.0));
    board.anchor((15.0, 5.1));
    let here = joints_mm(&board.read().0.tendons[0]);
    assert_eq!(here, [10_000, 15_000]);
    for turn_rad in [0.4, 1.9, -2.7] {
        let (floor, _) = board.moved(turn_rad, at(130.0, -40.0)).read();
        assert_eq!(joints_mm(&floor.tendons[0]), here);
    }
}
