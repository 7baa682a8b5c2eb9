//! Labels that point: by a plain line, by a stroke across a bundle, by a tick or dot on their tendon.

use tautplan::drawing::{Dot, Look, ShapeKind};
use tautplan::finding::Finding;
use tautplan::floor::{Floor, PointKind};
use tautplan::geometry::{Path, Segment};

use crate::kit::{Board, at};
use crate::sketch::{DISTRIBUTED, HEIGHT, MARK, mm, only, tendon, told};

/// Three tendons along x, 1.2 m apart, each with two lows; what the test adds are high points between them.
fn three(apart_m: f64) -> Board {
    let mut board = Board::slab();
    for (mark, number) in [("D1", 0.0), ("D2", 1.0), ("D3", 2.0)] {
        let y = 5.0 + number * apart_m;
        board.bare_tendon(DISTRIBUTED, mark, [0.0, 20.0], y);
        board.height("L40", (5.0, y));
        board.height("L40", (15.0, y));
    }
    board
}

/// Station and height in millimetres of a tendon's high points.
fn highs(floor: &Floor, mark: &str) -> Vec<(i64, i64)> {
    let points = tendon(floor, mark).points.iter();
    let highs = points.filter(|p| p.kind == PointKind::High && p.height_m.is_some());
    highs
        .map(|p| (mm(p.station_m), mm(p.height_m.unwrap_or_default())))
        .collect()
}

fn silent(findings: &[Finding]) {
    for rule in ["label-ambiguous", "label-unclaimed", "leader-astray"] {
        assert!(told(findings, rule).is_empty(), "{findings:?}");
    }
}

#[test]
fn a_plain_line_from_a_text_to_a_tendon_is_its_leader() {
    let board = |lines: &[&[(f64, f64)]]| {
        let mut board = three(1.2);
        board.write(HEIGHT, "H170", (9.0, 6.32));
        for line in lines {
            board.line(HEIGHT, line);
        }
        board.read()
    };
    // Beside D2, and without more its height; a line from the text's edge to D1 says otherwise.
    let (floor, _) = board(&[]);
    assert_eq!(
        (highs(&floor, "D2"), highs(&floor, "D1")),
        (vec![(9000, 170)], vec![])
    );
    let ways: [&[&[(f64, f64)]]; 4] = [
        &[&[(9.2, 6.3), (10.2, 5.0)]],
        &[&[(10.2, 5.0), (9.2, 6.3)]],
        &[&[(9.2, 6.3), (9.5, 6.3), (10.2, 5.0)]],
        // A landing and a leg, drawn as two lines.
        &[&[(9.2, 6.3), (9.5, 6.3)], &[(10.2, 5.0), (9.5, 6.3)]],
    ];
    for way in ways {
        let (floor, findings) = board(way);
        assert_eq!(highs(&floor, "D1"), vec![(10_200, 170)], "{way:?}");
        assert!(highs(&floor, "D2").is_empty(), "{way:?}");
        silent(&findings);
    }
    // An underline, a line that ends nowhere, and one whose both ends are far from the text, say nothing.
    for line in [
        [(8.83, 6.25), (9.17, 6.25)],
        [(9.2, 6.3), (9.8, 5.6)],
        [(12.0, 6.3), (12.5, 5.0)],
    ] {
        let (floor, _) = board(&[&line]);
        assert_eq!(highs(&floor, "D2"), vec![(9000, 170)], "{line:?}");
    }
}

#[test]
fn a_stroke_across_a_bundle_gives_its_label_to_every_tendon_of_it() {
    let board = |stroke: &[(f64, f64)]| {
        let mut board = three(0.3);
        board.write(HEIGHT, "H170", (10.0, 6.4));
        board.line(HEIGHT, stroke);
        board.read()
    };
    let (floor, findings) = board(&[(10.0, 6.3), (10.0, 4.7)]);
    for mark in ["D1", "D2", "D3"] {
        assert_eq!(highs(&floor, mark), vec![(10_000, 170)], "{mark}");
    }
    silent(&findings);
    // A stroke that passes two of them, and one that stops at the last so that it may mean that one or all.
    let (floor, _) = board(&[(10.0, 6.3), (10.0, 5.15)]);
    assert_eq!(highs(&floor, "D1"), vec![]);
    assert_eq!(
        (highs(&floor, "D2").len(), highs(&floor, "D3").len()),
        (1, 1)
    );
    let (floor, findings) = board(&[(10.0, 6.3), (10.0, 5.0)]);
    for mark in ["D1", "D2", "D3"] {
        assert!(highs(&floor, mark).is_empty(), "{mark}");
    }
    let text = &only(&findings, "leader-astray").text;
    assert!(
        text.contains("\"H170\"") && text.contains("3 tendons"),
        "{text}"
    );
}

#[test]
fn a_stroke_numbers_the_mark_of_a_bundle() {
    let mut board = Board::slab();
    for y in [5.0, 5.3, 5.6] {
        board.line(DISTRIBUTED, &[(0.0, y), (20.0, y)]);
    }
    board.write(MARK, "D4 3x5-12.7", (3.0, 6.4));
    board.line(MARK, &[(3.0, 6.3), (3.0, 4.7)]);
    let (floor, findings) = board.read();
    let marks: Vec<(&str, u32, Option<u32>)> = floor
        .tendons
        .iter()
        .map(|t| (t.mark.as_str(), t.tendons, t.strands))
        .collect();
    assert_eq!(
        marks,
        [
            ("D4.1", 1, Some(5)),
            ("D4.2", 1, Some(5)),
            ("D4.3", 1, Some(5))
        ]
    );
    assert_eq!(told(&findings, "label-shared").len(), 1);
}

/// Ways to mark a place on a tendon.
type Tick = fn(&mut Board, f64, f64);

fn circle(board: &mut Board, x: f64, y: f64) {
    let ring = Segment::Arc {
        centre: at(x, y),
        radius_m: 0.05,
        start_rad: 0.0,
        sweep_rad: std::f64::consts::TAU,
    };
    board.shape(HEIGHT, Path::new([ring]), true);
    if let Some(shape) = board.drawing.shapes.last_mut() {
        shape.kind = ShapeKind::Circle;
    }
}

fn slash(board: &mut Board, x: f64, y: f64) {
    board.line(HEIGHT, &[(x - 0.05, y - 0.08), (x + 0.05, y + 0.08)]);
}

fn point(board: &mut Board, x: f64, y: f64) {
    board.drawing.dots.push(Dot {
        handle: "9A".to_owned(),
        layer: HEIGHT.to_owned(),
        look: Look::default(),
        place: at(x, y),
    });
}

fn block(board: &mut Board, x: f64, y: f64) {
    board.insert(HEIGHT, "Tick-3", at(x, y));
}

const TICKS: [Tick; 4] = [circle, slash, point, block];

#[test]
fn a_tick_gives_its_tendon_and_station_to_the_label_beside_it() {
    for (way, tick) in TICKS.iter().enumerate() {
        let mut board = three(0.5);
        // Nearer to D2 than to D1.
        board.write(HEIGHT, "H170", (9.7, 5.29));
        let (floor, _) = board.read();
        assert_eq!(highs(&floor, "D2"), vec![(9700, 170)], "{way}");
        tick(&mut board, 10.0, 5.0);
        let (floor, findings) = board.read();
        assert_eq!(highs(&floor, "D1"), vec![(10_000, 170)], "{way}");
        assert!(highs(&floor, "D2").is_empty(), "{way}");
        silent(&findings);
    }
}

#[test]
fn each_tick_has_one_label_and_all_are_matched_together() {
    for (way, tick) in TICKS.iter().enumerate() {
        let mut board = three(0.4);
        for (x, y) in [(10.0, 5.0), (10.1, 5.4), (10.2, 5.8)] {
            tick(&mut board, x, y);
        }
        // A column of labels pushed up: two of three are nearest to the tick of the next tendon.
        board.write(HEIGHT, "H170", (10.4, 5.22));
        board.write(HEIGHT, "H175", (10.4, 5.62));
        board.write(HEIGHT, "H180", (10.4, 6.02));
        let (floor, findings) = board.read();
        assert_eq!(highs(&floor, "D1"), vec![(10_000, 170)], "{way}");
        assert_eq!(highs(&floor, "D2"), vec![(10_100, 175)], "{way}");
        assert_eq!(highs(&floor, "D3"), vec![(10_200, 180)], "{way}");
        silent(&findings);
    }
}

#[test]
fn what_stands_on_no_tendon_or_on_another_layer_is_no_tick() {
    let mut board = three(0.5);
    board.write(HEIGHT, "H170", (9.7, 5.29));
    circle(&mut board, 10.0, 5.15);
    block(&mut board, 10.0, 5.2);
    board.insert("NOTES", "TICK", at(10.0, 5.0));
    let (floor, _) = board.read();
    assert_eq!(highs(&floor, "D2"), vec![(9700, 170)]);
}

#[test]
fn a_label_midway_between_two_tendons_is_said_and_an_arrow_settles_it() {
    let mut board = Board::slab();
    board.bare_tendon(DISTRIBUTED, "D1", [0.0, 20.0], 5.0);
    board.bare_tendon(DISTRIBUTED, "D2", [0.0, 20.0], 5.4);
    board.write(HEIGHT, "H170", (10.0, 5.2));
    let (floor, findings) = board.read();
    assert_eq!(highs(&floor, "D1").len() + highs(&floor, "D2").len(), 0);
    let text = &only(&findings, "label-ambiguous").text;
    assert!(text.contains("neither was given it"), "{text}");
    // An arrow settles it.
    board.line(HEIGHT, &[(10.2, 5.2), (10.6, 5.4)]);
    let (floor, findings) = board.read();
    assert_eq!(highs(&floor, "D2"), vec![(10_600, 170)]);
    silent(&findings);
}
