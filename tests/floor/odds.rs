//! Patterns of a job that are at odds on the drawing, and findings in the job's units.

use tautplan::drawing::{Dot, Look};
use tautplan::finding::{Finding, Level};
use tautplan::floor::read;
use tautplan::job::Job;
use tautplan::units::Units;

use crate::kit::{Board, at};
use crate::sketch::{DISTRIBUTED, HEIGHT, MARK, only, told};

#[test]
fn a_block_that_is_live_and_dead_by_its_name_is_neither() {
    let mut job = Job::default();
    job.conventions.live_end_blocks = vec!["*-END".to_owned()];
    job.conventions.dead_end_blocks = vec!["DEAD-*".to_owned()];
    let mut board = Board::slab();
    board.bare_tendon(DISTRIBUTED, "D1", [0.0, 20.0], 5.0);
    let (floor, findings) = read(&board.drawing, &job);
    let finding = only(&findings, "patterns-at-odds");
    assert_eq!(finding.level, Level::Error);
    assert!(
        finding.text.as_str().contains("block DEAD-END"),
        "{}",
        finding.text.as_str()
    );
    let kinds = floor.tendons[0].ends.map(|end| end.kind);
    assert!(kinds.contains(&None), "{kinds:?}");
}

#[test]
fn a_layer_in_two_roles_that_exclude_one_another_is_an_error() {
    let mut job = Job::default();
    job.conventions.layers.banded = vec!["TENDON-D*".to_owned()];
    let mut board = Board::slab();
    board.bare_tendon(DISTRIBUTED, "D1", [0.0, 20.0], 5.0);
    let (_, findings) = read(&board.drawing, &job);
    let text = only(&findings, "patterns-at-odds").text.as_str();
    assert!(
        text.contains("`layers.banded` and `layers.distributed`"),
        "{text}"
    );
    let (_, findings) = read(&board.drawing, &Job::default());
    assert!(told(&findings, "patterns-at-odds").is_empty());
}

#[test]
fn dots_are_picked_by_a_colour_that_nothing_else_has() {
    let mut job = Job::default();
    job.conventions.layers.heights = vec!["PT@colour=3".to_owned(), "PT@colour=4".to_owned()];
    let mut board = Board::slab();
    for y in [5.0, 5.5] {
        board.bare_tendon(
            DISTRIBUTED,
            if y < 5.2 { "D1" } else { "D2" },
            [0.0, 20.0],
            y,
        );
    }
    let look = |colour| Look {
        colour: Some(colour),
        linetype: 0,
    };
    // Nearer to D2, and beside a dot on D1.
    board.write("PT", "H170", (10.1, 5.3));
    if let Some(text) = board.drawing.texts.last_mut() {
        text.look = look(4);
    }
    board.drawing.dots.push(Dot {
        handle: "F00".to_owned(),
        layer: "PT".to_owned(),
        look: look(3),
        place: at(10.0, 5.0),
    });
    let (floor, _) = read(&board.drawing, &job);
    let given = |mark: &str| {
        let tendon = floor.tendons.iter().find(|t| t.mark == mark);
        tendon.is_some_and(|t| t.points.iter().any(|p| p.height_m == Some(0.17)))
    };
    assert!(given("D1") && !given("D2"));
}

/// Words of SI in a text.
fn is_si(finding: &Finding) -> bool {
    let text = finding.text.in_units(Units::Us);
    let mut words = text.split([' ', ',', ';', ':', ')']);
    let sizes = ["mm", "m", "kN", "MPa"];
    words.any(|word| sizes.contains(&word))
}

#[test]
fn in_us_units_no_finding_speaks_of_metres() {
    let mut job = Job::default();
    job.conventions.bridge_gap_m = 0.5;
    let mut board = Board::slab();
    for (y, line, text) in [
        (3.0, [3.0, 7.0], "5 @ 1000"),
        (12.0, [12.0, 16.0], "7 @ 1000"),
    ] {
        board.line(DISTRIBUTED, &[(0.0, y), (20.0, y)]);
        board.live((0.0, y));
        board.dead((20.0, y));
        board.write(MARK, "5-12.7", (1.5, y + 0.12));
        board.height("H170", (10.0, y));
        board.line("TENDON-EXTENT", &[(8.0, line[0]), (8.0, line[1])]);
        board.text(MARK, text, at(8.1, line[0] + 2.4), 0.1, 0.0, false);
    }
    // Pieces that overlap, that gape, a stub, a leader that goes astray, a label that slid.
    board.line(DISTRIBUTED, &[(0.0, 18.0), (10.0, 18.0)]);
    board.line(DISTRIBUTED, &[(9.8, 18.012), (15.0, 18.012)]);
    board.line(DISTRIBUTED, &[(15.3, 18.0), (20.0, 18.0)]);
    board.line(DISTRIBUTED, &[(1.0, 19.0), (1.006, 19.0)]);
    board.write(HEIGHT, "H165", (9.0, 20.0));
    board.line(HEIGHT, &[(9.2, 19.98), (10.0, 18.5)]);
    board.write(HEIGHT, "L30", (5.0, 19.0));
    let (_, findings) = read(&board.drawing, &job);
    for rule in [
        "tendon-made",
        "group-misfit",
        "pieces-overlap",
        "pieces-bridged",
        "tendon-stub",
        "label-unclaimed",
    ] {
        assert!(!told(&findings, rule).is_empty(), "{rule}: {findings:#?}");
    }
    for finding in &findings {
        assert!(!is_si(finding), "{}", finding.text.in_units(Units::Us));
    }
}
