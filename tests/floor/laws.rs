//! What must not matter: where the plan lies, how it is turned, in which order and direction it was drawn.

use geo::Coord;
use tautplan::floor::read;
use tautplan::geometry::Path;
use tautplan::job::Job;

use crate::kit::{Board, Dice, Grid, Style, Turn, at, floor};
use crate::sketch::{kinds, mm, points_mm};

const GRID: Grid = Grid {
    bays: [3, 3],
    band: 4,
    spacing_m: 1.3,
    over_columns: true,
};

fn style(turn: Turn, sides_mixed: bool) -> Style {
    Style {
        height_m: 0.1,
        off_h: [0.3, 0.8],
        turn,
        sides_mixed,
        centred: true,
        jitter_m: 0.0,
    }
}

fn right(board: &Board) {
    let (found, _) = read(&board.drawing, &Job::default());
    let wrong = board.wrong(&found);
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn turning_and_moving_the_plan_changes_no_reading() {
    let mut dice = Dice(7);
    let board = floor(GRID, style(Turn::Along, false), &mut dice);
    right(&board);
    for (turn_rad, x, y) in [
        (0.3, 0.0, 0.0),
        (1.1, 500.0, -200.0),
        (2.5, -8e4, 3e4),
        (-0.9, 1e6, 1e6),
    ] {
        right(&board.moved(turn_rad, Coord { x, y }));
    }
}

#[test]
fn the_order_of_entities_changes_no_reading() {
    let mut dice = Dice(11);
    let board = floor(GRID, style(Turn::Mixed, true), &mut dice);
    let (first, _) = read(&board.drawing, &Job::default());
    for _ in 0..5 {
        let mut other = board.clone();
        other.shuffle(&mut dice);
        let (found, _) = read(&other.drawing, &Job::default());
        let say = |floor: &tautplan::floor::Floor| {
            let tendons = floor.tendons.iter();
            tendons
                .map(|t| format!("{} {:?} {:?}", t.mark, t.points, t.ends))
                .collect::<Vec<_>>()
        };
        assert_eq!(say(&first), say(&found));
    }
}

#[test]
fn the_direction_in_which_tendons_were_drawn_changes_no_reading() {
    let mut dice = Dice(17);
    let mut board = floor(GRID, style(Turn::Along, true), &mut dice);
    // Of each tendon its mark, and kind, place and height of its points in order along x and y.
    let say = |board: &Board| {
        let (floor, _) = read(&board.drawing, &Job::default());
        let tendons = floor.tendons.into_iter().map(|tendon| {
            let mut points: Vec<_> = tendon
                .points
                .iter()
                .map(|p| {
                    (
                        mm(p.place.x),
                        mm(p.place.y),
                        format!("{:?}", p.kind),
                        p.height_m.map(mm),
                    )
                })
                .collect();
            points.sort_unstable();
            (tendon.handle, tendon.mark, points)
        });
        tendons.collect::<Vec<_>>()
    };
    let first = say(&board);
    assert!(first.len() > 20);
    for shape in &mut board.drawing.shapes {
        shape.path = shape.path.reversed();
    }
    assert_eq!(say(&board), first);
}

#[test]
fn tendons_drawn_in_pieces_are_read_as_if_drawn_whole() {
    let mut dice = Dice(19);
    let mut board = floor(GRID, style(Turn::Along, false), &mut dice);
    let whole = std::mem::take(&mut board.drawing.shapes);
    for shape in whole {
        if !shape.layer.starts_with("TENDON") {
            board.shape(&shape.layer, shape.path, shape.closed);
            continue;
        }
        let third_m = shape.path.length_m() / 3.0;
        let cuts = [0.0, 1.0, 2.0, 3.0].map(|part| shape.path.place_at(part * third_m));
        let mut pieces: Vec<Path> = cuts.windows(2).map(Path::through).collect();
        dice.shuffle(&mut pieces);
        for piece in pieces {
            let turned = dice.below(2) == 0;
            let piece = if turned { piece.reversed() } else { piece };
            board.shape(&shape.layer, piece, false);
        }
    }
    right(&board);
}

#[test]
fn a_plan_moved_by_a_thousand_kilometres_says_the_same() {
    let mut dice = Dice(23);
    let mut board = floor(GRID, style(Turn::Mixed, true), &mut dice);
    // Half of the marks are gone, so that names by place are told too.
    board
        .drawing
        .texts
        .retain(|text| text.layer != "TENDON-MARK" || dice.below(2) == 0);
    let say = |board: &Board| {
        let (floor, findings) = read(&board.drawing, &Job::default());
        let mut stations = Vec::new();
        let mut words = Vec::new();
        for tendon in &floor.tendons {
            stations.extend(tendon.points.iter().map(|point| point.station_m));
            let points = points_mm(tendon).into_iter();
            let heights: Vec<_> = points.map(|(kind, _, height)| (kind, height)).collect();
            words.push(format!("{} {:?} {heights:?}", tendon.mark, kinds(tendon)));
        }
        words.extend(
            findings
                .iter()
                .map(|f| format!("{} {:?}", f.rule.name, f.tendon)),
        );
        (words, stations)
    };
    let (first, stations) = say(&board);
    for (x, y) in [(1e6, 1e6), (-1e6, 0.0), (1e6 + 0.0005, -1e6 + 0.0005)] {
        let (words, moved) = say(&board.moved(0.0, Coord { x, y }));
        assert_eq!(words, first, "by {x}, {y}");
        let off = stations.iter().zip(&moved).map(|(a, b)| (a - b).abs());
        assert!(off.fold(0.0, f64::max) < 1e-6, "by {x}, {y}");
    }
}

#[test]
fn lines_on_other_layers_are_no_tendons() {
    let mut dice = Dice(13);
    let mut board = floor(GRID, style(Turn::Level, false), &mut dice);
    for step in 0..40 {
        let y = f64::from(step) * 0.6;
        board.line("WALLS", &[(0.0, y), (30.0, y)]);
    }
    right(&board);
}

#[test]
fn symbols_on_the_slabs_layers_are_no_edges_and_no_zones() {
    let mut dice = Dice(14);
    let mut board = floor(GRID, style(Turn::Level, false), &mut dice);
    let (_, before) = read(&board.drawing, &Job::default());
    // An end symbol that is drawn as a rectangle of 0.6 m, and loose strokes and rings of other symbols.
    board.insert("SLAB-ZONE", "DEAD-END", at(-40.0, -40.0));
    board.rectangle("SLAB-ZONE", (-40.3, -40.3), (-39.7, -39.7));
    let symbol = board.drawing.inserts.len() - 1;
    if let Some(shape) = board.drawing.shapes.last_mut() {
        shape.within = Some(symbol);
    }
    for layer in ["SLAB-ZONE", "SLAB-EDGE"] {
        board.rectangle(layer, (-30.0, -30.0), (-29.8, -29.8));
        board.line(layer, &[(-20.0, -20.0), (-19.7, -20.0)]);
    }
    let (_, found) = read(&board.drawing, &Job::default());
    let named = |findings: &[tautplan::finding::Finding]| -> Vec<&str> {
        let slab = |name: &&str| name.starts_with("zone") || name.starts_with("outline");
        findings.iter().map(|f| f.rule.name).filter(slab).collect()
    };
    assert_eq!(named(&found), named(&before));
}
