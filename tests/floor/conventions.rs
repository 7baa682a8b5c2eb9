//! Other offices' habits: references, runs by direction, ends by word, attribute and shape, layers by what is seen.

use tautplan::drawing::{Insert, Look, Shape, ShapeKind};
use tautplan::finding::Finding;
use tautplan::floor::{EndKind, Floor, Run};
use tautplan::geometry::{Coord, Path};
use tautplan::job::Job;

use crate::kit::{Board, at};

/// Two tendons along x and two along y, on one layer, no symbol at their ends.
fn board(layer: &str) -> Board {
    let mut board = Board::new();
    board.line(layer, &[(0.0, 1.0), (20.0, 1.0)]);
    board.line(layer, &[(0.0, 5.0), (20.0, 5.5)]);
    board.line(layer, &[(3.0, -2.0), (3.0, 18.0)]);
    board.line(layer, &[(9.0, -2.0), (9.0, 18.0)]);
    board
}

fn one(layer: &str) -> Board {
    let mut board = Board::new();
    board.line(layer, &[(0.0, 0.0), (20.0, 0.0)]);
    board
}

fn read(board: &Board, job: &Job) -> (Floor, Vec<Finding>) {
    tautplan::floor::read(&board.drawing, job)
}

fn kinds(floor: &Floor) -> Vec<[Option<EndKind>; 2]> {
    let tendons = floor.tendons.iter();
    tendons.map(|t| t.ends.map(|end| end.kind)).collect()
}

fn rules(findings: &[Finding]) -> Vec<&str> {
    let mut rules: Vec<&str> = findings.iter().map(|finding| finding.rule.name).collect();
    rules.retain(|rule| rule.starts_with("end-") || rule.starts_with("label-"));
    rules
}

fn words(words: &[&str]) -> Vec<String> {
    words.iter().map(|&word| word.to_owned()).collect()
}

const LIVE_DEAD: [Option<EndKind>; 2] = [Some(EndKind::Live), Some(EndKind::Dead)];

#[test]
fn layers_and_blocks_of_a_bound_reference_are_read_though_all_of_it_lies_in_one_insert() {
    let mut board = one("L2$0$TENDON-BANDED");
    board.insert("0", "L2", at(0.0, 0.0));
    board.insert("L2$0$TENDON-END", "L2$0$LIVE-END", at(0.0, 0.0));
    board.insert("L2$0$TENDON-END", "L2$0$DEAD-END", at(20.0, 0.0));
    // A symbol's own line, on the tendons' layer.
    board.line("L2$0$TENDON-BANDED", &[(0.0, -0.1), (0.0, 0.1)]);
    let outer = board.drawing.inserts[0].handle.clone();
    for insert in &mut board.drawing.inserts[1..] {
        insert.handle.clone_from(&outer);
        insert.within = Some(0);
    }
    for (shape, within) in board.drawing.shapes.iter_mut().zip([0, 1]) {
        shape.handle.clone_from(&outer);
        shape.within = Some(within);
    }
    let (floor, findings) = read(&board, &Job::default());
    assert_eq!(floor.tendons.len(), 1, "{findings:?}");
    assert_eq!(floor.tendons[0].run, Run::Banded);
    assert_eq!(kinds(&floor), [LIVE_DEAD]);
}

#[test]
fn runs_of_one_layer_are_told_apart_by_direction() {
    let board = board("PT");
    let mut job = Job::default();
    job.conventions.layers.tendons = words(&["pt"]);
    let said = |findings: &[Finding]| findings.iter().any(|f| f.rule.name == "run-assumed");
    let (floor, findings) = read(&board, &job);
    assert!(floor.tendons.iter().all(|t| t.run == Run::Distributed));
    assert!(floor.tendons.len() == 4 && said(&findings));
    for (along_deg, banded_along_x) in [(0.0, true), (-170.0, true), (100.0, false), (-90.0, false)]
    {
        job.conventions.banded_along_rad = Some(f64::to_radians(along_deg));
        let (floor, findings) = read(&board, &job);
        assert!(!said(&findings));
        for tendon in &floor.tendons {
            let (start, end) = (
                tendon.path.start().expect("a start"),
                tendon.path.end().expect("an end"),
            );
            let along_x = (end.x - start.x).abs() > (end.y - start.y).abs();
            assert_eq!(
                tendon.run == Run::Banded,
                along_x == banded_along_x,
                "{along_deg}"
            );
        }
    }
}

#[test]
fn a_word_at_an_end_tells_its_kind_and_is_no_label() {
    let mut board = one("TENDON-BANDED");
    board.text("TENDON-MARK", "L.E.", at(-0.3, 0.2), 0.2, 0.0, false);
    board.text("TENDON-END", "dead end", at(19.8, 0.15), 0.2, 0.0, false);
    board.text("TENDON-MARK", "B01 5-12.7", at(8.0, 0.1), 0.2, 0.0, false);
    let (floor, findings) = read(&board, &Job::default());
    assert_eq!(kinds(&floor), [LIVE_DEAD]);
    assert!(rules(&findings).is_empty(), "{findings:?}");
    let mut job = Job::default();
    job.conventions.live_end_words = words(&["X"]);
    let (floor, findings) = read(&board, &job);
    assert_eq!(kinds(&floor), [[None, Some(EndKind::Dead)]]);
    assert_eq!(rules(&findings), ["label-unread", "end-unknown"]);
}

#[test]
fn words_go_to_ends_one_to_one_and_a_far_one_is_said() {
    let mut board = one("TENDON-BANDED");
    board.line("TENDON-BANDED", &[(0.0, 0.4), (20.0, 0.4)]);
    // Both words lie nearer to the upper end.
    board.text("TENDON-END", "LE", at(-0.2, 0.4), 0.1, 0.0, true);
    board.text("TENDON-END", "DE", at(-0.2, 0.25), 0.1, 0.0, true);
    board.text("TENDON-END", "LE", at(10.0, 3.0), 0.1, 0.0, true);
    let (floor, findings) = read(&board, &Job::default());
    let mut starts: Vec<_> = floor
        .tendons
        .iter()
        .map(|t| (t.ends[0].place.y > 0.2, t.ends[0].kind))
        .collect();
    starts.sort_by_key(|(upper, _)| *upper);
    assert_eq!(
        starts,
        [(false, Some(EndKind::Dead)), (true, Some(EndKind::Live))]
    );
    assert!(rules(&findings).contains(&"end-unclaimed"), "{findings:?}");
}

#[test]
fn a_block_is_told_by_its_attribute_by_a_word_beside_it_or_not_at_all() {
    let mut board = one("TENDON-BANDED");
    board.line("TENDON-BANDED", &[(0.0, 4.0), (20.0, 4.0)]);
    let anchor = |place: Coord<f64>, tag: &str, value: &str| Insert {
        handle: "F1".to_owned(),
        layer: "TENDON-END".to_owned(),
        block: "ANCHOR".to_owned(),
        place,
        attributes: vec![(tag.to_owned(), value.to_owned())],
        ..Insert::default()
    };
    board.drawing.inserts = vec![
        anchor(at(0.0, 0.0), "KIND", "Live"),
        anchor(at(20.0, 0.0), "NOTE", "Live"),
        anchor(at(0.0, 4.0), "NOTE", ""),
        anchor(at(20.0, 4.0), "KIND", "see detail"),
    ];
    board.text("TENDON-END", "DE", at(20.2, 0.2), 0.2, 0.0, false);
    let mut job = Job::default();
    job.conventions.end_blocks = words(&["anch*"]);
    job.conventions.end_attributes = words(&["kind"]);
    let (floor, findings) = read(&board, &job);
    assert_eq!(kinds(&floor), [LIVE_DEAD, [None, None]]);
    let unknown: Vec<_> = findings
        .iter()
        .filter(|f| f.rule.name == "end-unknown")
        .collect();
    assert_eq!(unknown.len(), 2);
    assert!(
        unknown
            .iter()
            .all(|f| f.text.contains("block ANCHOR marks this end"))
    );
}

#[test]
fn an_end_that_is_said_to_be_both_is_neither() {
    let mut board = one("TENDON-BANDED");
    board.insert("TENDON-END", "LIVE-END", at(0.0, 0.0));
    board.text("TENDON-END", "LE", at(0.0, 0.1), 0.2, 0.0, false);
    board.insert("TENDON-END", "LIVE-END", at(20.0, 0.0));
    board.text("TENDON-END", "DE", at(20.0, 0.1), 0.2, 0.0, false);
    let (floor, findings) = read(&board, &Job::default());
    assert_eq!(kinds(&floor), [[Some(EndKind::Live), None]]);
    assert_eq!(rules(&findings), ["end-contradicted"]);
}

/// Live ends: triangles of three lines, each with a bar behind; dead ends: bars.
fn with_shapes(board: &mut Board, y: f64) {
    for pair in [
        [(0.0, 0.0), (-0.2, 0.1)],
        [(-0.2, 0.1), (-0.2, -0.1)],
        [(-0.2, -0.1), (0.0, 0.0)],
        [(-0.25, 0.1), (-0.25, -0.1)],
    ] {
        board.line("SYM", &pair.map(|(x, dy)| (x, y + dy)));
    }
    board.line("SYM", &[(20.0, y - 0.1), (20.0, y + 0.1)]);
}

#[test]
fn shapes_mark_ends_whatever_they_are_drawn_with() {
    let mut board = one("TENDON-BANDED");
    with_shapes(&mut board, 0.0);
    board.line("TENDON-BANDED", &[(0.0, 0.25), (20.0, 0.25)]);
    with_shapes(&mut board, 0.25);
    let mut job = Job::default();
    job.conventions.layers.ends = words(&["SYM"]);
    assert_eq!(kinds(&read(&board, &job).0), [[None; 2]; 2]);
    job.conventions.live_end_shapes = words(&["triangle"]);
    job.conventions.dead_end_shapes = words(&["bar"]);
    let (floor, findings) = read(&board, &job);
    assert_eq!(kinds(&floor), [LIVE_DEAD; 2]);
    assert!(rules(&findings).is_empty(), "{findings:?}");
}

#[test]
fn a_closed_symbol_on_the_tendons_own_layer_is_told_from_a_tendon() {
    let mut board = one("PT");
    for (x, kind) in [(0.0, ShapeKind::Solid), (20.0, ShapeKind::Polyline)] {
        let points = [(x, 0.0), (x + 0.2, 0.1), (x + 0.2, -0.1), (x, 0.0)].map(|(x, y)| at(x, y));
        board.drawing.shapes.push(Shape {
            layer: "PT".to_owned(),
            kind,
            path: Path::through(&points),
            closed: true,
            ..Shape::default()
        });
    }
    let mut job = Job::default();
    job.conventions.layers.banded = words(&["PT"]);
    job.conventions.layers.ends = words(&["PT"]);
    job.conventions.live_end_shapes = words(&["solid"]);
    job.conventions.dead_end_shapes = words(&["triangle"]);
    let (floor, findings) = read(&board, &job);
    assert_eq!(kinds(&floor), [LIVE_DEAD]);
    assert!(
        !findings.iter().any(|f| f.rule.name == "tendon-closed"),
        "{findings:?}"
    );
}

#[test]
fn one_layer_is_told_apart_by_colour_and_linetype() {
    let mut board = board("0");
    board.rectangle("0", (-1.0, -3.0), (21.0, 19.0));
    board.drawing.linetypes = words(&["Continuous", "DASHED2"]);
    let looks = [(1, 0), (1, 1), (2, 0), (2, 1), (4, 0)];
    for (shape, (colour, linetype)) in board.drawing.shapes.iter_mut().zip(looks) {
        shape.look = Look {
            colour: Some(colour),
            linetype,
        };
    }
    let mut job = Job::default();
    job.conventions.layers.banded = words(&["0@colour=1"]);
    job.conventions.layers.distributed = words(&["0@colour=2@linetype=dash*"]);
    job.conventions.layers.slab_edge = words(&["0@colour=4"]);
    let (floor, _) = read(&board, &job);
    let runs: Vec<Run> = floor.tendons.iter().map(|t| t.run).collect();
    assert_eq!(runs, [Run::Banded, Run::Banded, Run::Distributed]);
    assert_eq!(floor.slab.outlines.len(), 1);
}
