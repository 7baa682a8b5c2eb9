//! Labels settled on tendons: none wrong, over many floors and ways of lettering.

use tautplan::finding::Level;
use tautplan::floor::read;
use tautplan::job::Job;

use crate::kit::{Dice, Grid, Style, Turn, floor};

const GRID: Grid = Grid {
    bays: [4, 3],
    band: 6,
    spacing_m: 1.3,
    over_columns: true,
};

fn count(name: &str, grid: Grid, style: Style, seeds: u64) -> [usize; 3] {
    let job = Job::default();
    let (mut wrong, mut said, mut labels, mut doubts, mut others) = (0, 0, 0, 0, 0);
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
        // What is wrong but told at the tendon is no silent choice.
        let told = |error: &String| {
            findings.iter().any(|f| {
                let mark = f.tendon.as_deref().unwrap_or_default();
                f.level == Level::Error && error.starts_with(&format!("{mark}:"))
            })
        };
        said += errors.iter().filter(|error| told(error)).count();
        wrong += errors.iter().filter(|error| !told(error)).count();
        labels += board.labels();
        let doubt = findings
            .iter()
            .filter(|f| f.rule.name == "label-ambiguous")
            .count();
        doubts += doubt;
        others += findings.len() - doubt;
    }
    eprintln!(
        "{name}: {wrong} wrong of {labels}, {said} wrong and said so, {doubts} in doubt, {others} other findings"
    );
    [wrong, said, labels]
}

#[test]
fn whatever_the_style_no_label_is_settled_wrongly_in_silence() {
    let mut sums = [0; 3];
    for turn in [Turn::Along, Turn::Level, Turn::Mixed] {
        for sides_mixed in [false, true] {
            for centred in [true, false] {
                for (height_m, far) in [(0.08, 0.8), (0.1, 0.8), (0.125, 0.5)] {
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
                        for (sum, more) in sums.iter_mut().zip(count(&name, GRID, style, 6)) {
                            *sum += more;
                        }
                    }
                }
            }
        }
    }
    let [wrong, said, labels] = sums;
    assert!(labels > 130_000, "only {labels} labels were drawn");
    assert_eq!(wrong, 0, "labels settled wrongly and silently");
    assert!(
        said * 10_000 <= labels,
        "{said} of {labels} labels given up"
    );
}
