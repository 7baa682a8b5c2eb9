//! What must not matter: where the plan lies, how it is turned, in which order and direction it was drawn.

use geo::Coord;
use tautplan::floor::read;
use tautplan::job::Job;

use crate::kit::{Board, Dice, Grid, Style, Turn, floor};

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
fn lines_on_other_layers_are_no_tendons() {
    let mut dice = Dice(13);
    let mut board = floor(GRID, style(Turn::Level, false), &mut dice);
    for step in 0..40 {
        let y = f64::from(step) * 0.6;
        board.line("WALLS", &[(0.0, y), (30.0, y)]);
    }
    right(&board);
}
