//! Height labels one by one: at anchors, without a word, in inches, out of reach, unreadable, missing.

use tautplan::drawing::Layer;
use tautplan::finding::{Finding, Level};
use tautplan::floor::PointKind::{Anchor, High, Low, Support};
use tautplan::floor::{Floor, PointKind, read};
use tautplan::job::{self, Job};

use crate::kit::Board;
use crate::sketch::{BANDED, HEIGHT, only, points_mm, rules, tendon, told};

/// One tendon of 20 m with these texts at these stations.
fn labelled(texts: &[(f64, &str)]) -> Board {
    let mut board = Board::slab();
    board.bare_tendon(BANDED, "B01", [0.0, 20.0], 5.0);
    for &(x, content) in texts {
        board.height(content, (x, 5.0));
    }
    board
}

type Mm = (PointKind, i64, Option<i64>);

fn found(board: &Board, job: &Job) -> (Vec<Mm>, Vec<Finding>) {
    let (floor, findings): (Floor, _) = read(&board.drawing, job);
    (points_mm(tendon(&floor, "B01")), findings)
}

fn given(kind: PointKind, station_mm: i64, height_mm: i64) -> Mm {
    (kind, station_mm, Some(height_mm))
}

#[test]
fn an_anchor_takes_its_own_height_or_mid_depth() {
    let board = labelled(&[(0.1, "100"), (10.0, "L30")]);
    let expected = [
        given(Anchor, 0, 100),
        given(Low, 10_000, 30),
        given(Anchor, 20_000, 125),
    ];
    let (points, findings) = found(&board, &Job::default());
    assert_eq!(points, expected);
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
}

#[test]
fn a_bare_number_is_what_its_neighbours_make_it() {
    let texts = [
        (5.0, "30"),
        (7.0, "80"),
        (10.0, "165"),
        (13.0, "80"),
        (15.0, "30"),
    ];
    let (points, _) = found(&labelled(&texts), &Job::default());
    let expected = [
        given(Anchor, 0, 125),
        given(Low, 5_000, 30),
        given(Support, 7_000, 80),
        given(High, 10_000, 165),
        given(Support, 13_000, 80),
        given(Low, 15_000, 30),
        given(Anchor, 20_000, 125),
    ];
    assert_eq!(points, expected);
    // A word outweighs the neighbours; of equals the one with the word is the point.
    let texts = [
        (5.0, "L30"),
        (9.0, "165"),
        (10.5, "H165"),
        (11.5, "165"),
        (15.0, "L30"),
    ];
    let (points, _) = found(&labelled(&texts), &Job::default());
    let kinds: Vec<PointKind> = points.iter().map(|point| point.0).collect();
    assert_eq!(kinds, [Anchor, Low, Support, High, Support, Low, Anchor]);
}

#[test]
fn inches_with_fractions_are_read_where_the_job_says_inches() {
    let job = job::read("tautplan.toml", "[height]\nunit = \"in\"\n").expect("a sound job");
    let texts = [(5.0, "L1-1/4"), (10.0, "H 6 1/2\""), (15.0, "1½ L")];
    let (points, findings) = found(&labelled(&texts), &job.job);
    let expected = [
        given(Anchor, 0, 125),
        given(Low, 5_000, 32),
        given(High, 10_000, 165),
        given(Low, 15_000, 38),
        given(Anchor, 20_000, 125),
    ];
    assert_eq!(points, expected);
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    let (_, findings) = found(&labelled(&texts), &Job::default());
    assert_eq!(
        told(&findings, "label-unread").len(),
        3,
        "no fractions of a millimetre"
    );
}

#[test]
fn what_lies_on_a_hidden_layer_is_read_and_said() {
    for (off, frozen, state) in [(true, false, "off"), (false, true, "frozen")] {
        let mut board = labelled(&[(5.0, "L30")]);
        for name in [HEIGHT, "WALLS"] {
            board.drawing.layers.push(Layer {
                name: name.to_owned(),
                off,
                frozen,
                counts: Vec::new(),
            });
        }
        let (points, findings) = found(&board, &Job::default());
        assert_eq!(points[1], given(Low, 5_000, 30));
        let text = &only(&findings, "layer-hidden").text;
        assert!(
            text.starts_with(&format!(
                "layer {HEIGHT} is {state} and holds 0 lines and 1 texts"
            )),
            "{text}"
        );
    }
}

#[test]
fn a_label_out_of_reach_belongs_to_nobody_and_says_how_far_off_it_is() {
    // The text's near edge counts; its middle is half its height farther off.
    for (middle_m, claimed) in [(0.349, true), (0.351, false)] {
        let mut board = labelled(&[(5.0, "L30"), (15.0, "L30")]);
        board.write(HEIGHT, "H165", (10.0, 5.0 + middle_m));
        let (points, findings) = found(&board, &Job::default());
        assert_eq!(points.contains(&given(High, 10_000, 165)), claimed);
        if claimed {
            assert_eq!(rules(&findings), [""; 0]);
            continue;
        }
        let finding = only(&findings, "label-unclaimed");
        assert!(
            finding.text.contains("0.35 m off and the reach is 0.30 m"),
            "{}",
            finding.text
        );
        assert_eq!(
            (finding.tendon.as_deref(), finding.station_m),
            (Some("B01"), Some(10.0))
        );
        // It is what the tendon lacks between two lows.
        let missing = only(&findings, "height-missing");
        assert!(missing.text.contains("no high point") && missing.text.contains("\"H165\""));
        assert!(points.contains(&(High, 10_000, None)));
    }
}

#[test]
fn a_text_that_is_no_height_is_said_and_never_guessed() {
    for content in ["SEE NOTE 4", "H16S", "X165", "H"] {
        let (points, findings) =
            found(&labelled(&[(5.0, "L30"), (10.0, content)]), &Job::default());
        assert_eq!(points[2], (High, 10_000, None), "{content}");
        assert!(only(&findings, "height-missing").text.contains(content));
        let finding = only(&findings, "label-unread");
        assert!(finding.text.contains(content) && finding.text.contains("H165, L30 or 165"));
    }
}

#[test]
fn a_tendon_without_heights_has_none_and_is_said_once() {
    let (points, findings) = found(&labelled(&[]), &Job::default());
    assert_eq!(points, [(Anchor, 0, None), (Anchor, 20_000, None)]);
    let finding = only(&findings, "height-missing");
    assert_eq!(
        (finding.level, finding.tendon.as_deref()),
        (Level::Error, Some("B01"))
    );
}

#[test]
fn a_tendon_over_a_column_between_two_lows_lacks_a_high() {
    let mut board = labelled(&[(5.0, "L30"), (15.0, "L30")]);
    let (points, findings) = found(&board, &Job::default());
    assert_eq!(
        (points.len(), told(&findings, "height-missing").len()),
        (4, 0)
    );
    board.rectangle("COLUMN", (9.75, 4.75), (10.25, 5.25));
    let (points, findings) = found(&board, &Job::default());
    assert!(points.contains(&(High, 10_000, None)));
    assert!(
        only(&findings, "height-missing")
            .text
            .contains("over a column")
    );
}

#[test]
fn a_tendon_lacks_what_both_its_neighbours_have() {
    let mut board = Board::slab();
    for (mark, y) in [("B01", 5.0), ("B02", 6.0), ("B03", 7.0)] {
        board.bare_tendon(BANDED, mark, [0.0, 20.0], y);
        board.height("L30", (5.0, y));
        if mark != "B02" {
            board.height("H165", (10.0, y));
        }
        board.height("L30", (15.0, y));
    }
    let (floor, findings) = board.read();
    let finding = only(&findings, "height-missing");
    assert_eq!(finding.tendon.as_deref(), Some("B02"));
    assert!(
        finding.text.contains("B01 and B03 beside it"),
        "{}",
        finding.text
    );
    assert!(points_mm(tendon(&floor, "B02")).contains(&(High, 10_000, None)));
}

#[test]
fn a_height_that_slid_far_off_its_tendon_holds_the_forces_back() {
    for off_m in [0.7, 1.0, 1.3, 2.5] {
        let mut board = labelled(&[(5.0, "L30"), (15.0, "L30")]);
        board.write(HEIGHT, "H165", (10.0, 5.0 + off_m));
        let (points, findings) = found(&board, &Job::default());
        assert!(
            points.iter().any(|p| p.0 == High && p.2.is_none()),
            "{off_m}: {points:?}"
        );
        assert_eq!(only(&findings, "height-missing").level, Level::Error);
    }
    // One whose kind the tendon does not lack says nothing.
    let mut board = labelled(&[(5.0, "L30"), (10.0, "H165"), (15.0, "L30")]);
    board.write(HEIGHT, "H170", (10.0, 6.3));
    let (_, findings) = found(&board, &Job::default());
    assert!(told(&findings, "height-missing").is_empty());
}

#[test]
fn a_hidden_height_holds_where_nothing_is_seen_and_gives_way_where_something_is() {
    let hide = |board: &mut Board| {
        board.drawing.layers.push(Layer {
            name: "TENDON-HEIGHT-OLD".to_owned(),
            frozen: true,
            ..Layer::default()
        });
    };
    for x in [9.9, 10.1] {
        let mut board = labelled(&[(5.0, "L30"), (10.0, "H165"), (15.0, "L30")]);
        hide(&mut board);
        board.write("TENDON-HEIGHT-OLD", "H120", (x, 5.1));
        let (points, findings) = found(&board, &Job::default());
        assert!(points.contains(&given(High, 10_000, 165)), "{points:?}");
        assert!(
            only(&findings, "layer-hidden")
                .text
                .as_str()
                .contains("what is seen holds")
        );
    }
    let mut board = labelled(&[(5.0, "L30"), (15.0, "L30")]);
    hide(&mut board);
    board.write("TENDON-HEIGHT-OLD", "H120", (10.0, 5.1));
    let (points, findings) = found(&board, &Job::default());
    assert!(
        points.iter().any(|p| p.0 == High && p.2 == Some(120)),
        "{points:?}"
    );
    assert_eq!(only(&findings, "layer-hidden").level, Level::Warning);
}
