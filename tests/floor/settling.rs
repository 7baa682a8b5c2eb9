//! Labels settled on tendons: none wrong, over many floors and ways of lettering.

use tautplan::floor::read;
use tautplan::job::Job;

use crate::kit::{Dice, Grid, Style, Turn, floor};

const PLAIN: Style = Style {
    height_m: 0.125,
    off_h: [0.4, 0.8],
    turn: Turn::Along,
    sides_mixed: false,
    centred: true,
    jitter_m: 0.0,
};

const GRID: Grid = Grid {
    bays: [4, 3],
    band: 6,
    spacing_m: 1.3,
    over_columns: true,
};

fn count(name: &str, grid: Grid, style: Style, seeds: u64) -> usize {
    let job = Job::default();
    let (mut wrong, mut labels, mut doubts, mut others) = (0, 0, 0, 0);
    for seed in 0..seeds {
        let mut dice = Dice(1000 + seed);
        let mut board = floor(grid, style, &mut dice);
        board.shuffle(&mut dice);
        let (found, findings) = read(&board.drawing, &job);
        let errors = board.wrong(&found);
        for error in errors.iter().take(4) {
            eprintln!("{name} {seed}: {error}");
        }
        for finding in findings
            .iter()
            .filter(|f| f.rule.name != "label-ambiguous")
            .take(3)
        {
            eprintln!(
                "{name} {seed}: {} {:?} {}",
                finding.rule.name, finding.tendon, finding.text
            );
        }
        wrong += errors.len();
        labels += board.labels();
        let doubt = findings
            .iter()
            .filter(|f| f.rule.name == "label-ambiguous")
            .count();
        doubts += doubt;
        others += findings.len() - doubt;
    }
    eprintln!("{name}: {wrong} wrong of {labels}, {doubts} in doubt, {others} other findings");
    wrong
}

#[test]
fn survey_of_styles() {
    let mut wrong = 0;
    for turn in [Turn::Along, Turn::Level, Turn::Mixed] {
        for sides_mixed in [false, true] {
            for centred in [true, false] {
                for (height_m, far) in [(0.1, 0.8), (0.125, 1.2), (0.2, 0.8)] {
                    for jitter_m in [0.0, 0.06] {
                        let style = Style {
                            turn,
                            sides_mixed,
                            centred,
                            height_m,
                            jitter_m,
                            off_h: [0.3, far],
                        };
                        let name = format!(
                            "{turn:?} mixed {sides_mixed} centred {centred} {height_m} far {far} jitter {jitter_m}"
                        );
                        wrong += count(&name, GRID, style, 2);
                    }
                }
            }
        }
    }
    let _ = PLAIN;
    assert_eq!(wrong, 0);
}
