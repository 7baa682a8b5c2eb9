//! When each tendon's turn to be stressed comes: the later ones shorten the concrete around it.

use std::collections::BTreeMap;

use super::long_term::Turn;
use crate::floor::{Run, Tendon};
use crate::patterns::Patterns;

/// The turn of each tendon among those of its run; a line that stands for several counts as many. `order`: marks or shell
/// patterns; tendons of one entry are stressed in turn, those that no entry names after all others.
pub fn turns(tendons: &[Tendon], order: &[String]) -> Vec<Turn> {
    // The job's patterns were tried when it was read: none is broken here.
    let entries: Vec<Patterns> = order
        .iter()
        .map(|entry| Patterns::new([entry]).unwrap_or_default())
        .collect();
    let stage = |tendon: &Tendon| {
        let named = entries.iter().position(|entry| entry.fit(&tendon.mark));
        named.unwrap_or(entries.len())
    };
    let mut counts: BTreeMap<(Run, usize), f64> = BTreeMap::new();
    for tendon in tendons {
        *counts.entry((tendon.run, stage(tendon))).or_default() += f64::from(tendon.tendons);
    }
    let of_run = |run: Run, stages: std::ops::RangeInclusive<usize>| -> f64 {
        counts
            .range((run, *stages.start())..=(run, *stages.end()))
            .map(|(_, count)| count)
            .sum()
    };
    tendons
        .iter()
        .map(|tendon| {
            let (run, stage) = (tendon.run, stage(tendon));
            let all = of_run(run, 0..=entries.len());
            let own = of_run(run, stage..=stage);
            let before = of_run(run, 0..=stage) - own;
            Turn {
                tendons: all,
                // In turn within the entry: (own - 1)/2 of its tendons come after this one, on average.
                after: (!entries.is_empty())
                    .then(|| (all - before - own + 0.5 * (own - 1.0)) / all),
            }
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::floor::End;
    use crate::geometry::{Coord, Path};

    fn tendon(mark: &str, run: Run, tendons: u32) -> Tendon {
        let place = Coord { x: 0.0, y: 0.0 };
        let end = End { kind: None, place };
        Tendon {
            mark: mark.to_owned(),
            mark_drawn: true,
            made: false,
            handle: String::new(),
            layer: String::new(),
            run,
            path: Path::through(&[place, Coord { x: 9.0, y: 0.0 }]),
            tendons,
            strands: None,
            strand: None,
            required_kn: None,
            required_kn_per_m: None,
            joints: Vec::new(),
            ends: [end, end],
            points: Vec::new(),
        }
    }

    #[test]
    fn shares_by_order_have_the_mean_of_stressing_in_turn() {
        let floor = [
            tendon("D1", Run::Distributed, 1),
            tendon("D2", Run::Distributed, 3),
            tendon("D3", Run::Distributed, 2),
            tendon("B1", Run::Banded, 4),
        ];
        let order = ["d2".to_owned(), "D1".to_owned()];
        let turns = turns(&floor, &order);
        // Of six: three at first, then one, and two that no entry names.
        let after: Vec<f64> = turns.iter().filter_map(|turn| turn.after).collect();
        for (found, expected) in after
            .iter()
            .zip([2.0 / 6.0, 4.0 / 6.0, 0.5 / 6.0, 1.5 / 4.0])
        {
            assert!((found - expected).abs() < 1e-12, "{after:?}");
        }
        let mean = (after[0] + 3.0 * after[1] + 2.0 * after[2]) / 6.0;
        assert!((mean - 5.0 / 12.0).abs() < 1e-12);
        assert!(
            super::turns(&floor, &[])
                .iter()
                .all(|turn| turn.after.is_none())
        );
    }
}
