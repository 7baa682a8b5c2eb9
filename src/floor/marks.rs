//! Marks and strand counts settled on their tendons, and names for tendons that have none.

mod doubts;

use std::collections::{BTreeMap, BTreeSet};

use self::doubts::{MarkDoubt, doubts};
use super::aims::AIMED;
use super::candidates::Lie;
use super::contradicted::{self, Contradiction};
use super::even::even;
use super::habits::Habits;
use super::lines::{Line, axis_rad};
use super::marking::Marking;
use super::rules::{MARK_TWICE, STRAND_COUNT_MISSING};
use super::settle::{Pairing, Settlement, Stakes};
use super::types::{Run, Tendon};
use crate::finding::{Finding, Level};

/// Marks settled.
pub(super) struct Marks {
    /// What each line's labels say together.
    pub(super) of_line: Vec<Marking>,
    /// Labels that went to nobody.
    pub(super) unclaimed: Vec<usize>,
    /// Labels that fit another line about as well.
    pub(super) doubts: Vec<MarkDoubt>,
    /// Labels that contradict one that their line has.
    pub(super) contradicted: Vec<Contradiction>,
}

/// Rounds of settling and learning.
const ROUNDS: usize = 3;
/// Settles marks.
pub(super) fn settle(texts: &[Marking], lies: &[Lie], lines: &[Line]) -> Marks {
    let pairings: Vec<Pairing> = lies.iter().map(|lie| lie.pairing).collect();
    let mut taken: Vec<Option<usize>> = vec![None; texts.len()];
    let even = even(lies, lines);
    let mut stakes = MarkStakes {
        own: Vec::new(),
        texts,
        lies,
    };
    for round in 0..ROUNDS {
        stakes.own = costs(texts, lies, lines, &taken, &even, round > 0);
        let mut settlement = Settlement::new(&pairings, texts.len(), lines.len(), &stakes, &taken);
        taken = settlement.settle();
    }
    let mut settlement = Settlement::new(&pairings, texts.len(), lines.len(), &stakes, &taken);
    let doubts = doubts(&mut settlement, &taken, &even, texts, lies);
    let tied: BTreeSet<usize> = doubts
        .iter()
        .filter(|doubt| doubt.tied)
        .map(|doubt| doubt.label)
        .collect();
    let mut marks = Marks {
        of_line: vec![Marking::default(); lines.len()],
        unclaimed: Vec::new(),
        doubts,
        contradicted: Vec::new(),
    };
    for &label in &tied {
        taken[label] = None;
    }
    for (label, said) in texts.iter().enumerate() {
        match taken[label] {
            Some(now) => marks.of_line[lies[now].pairing.host].join(said.clone()),
            None if tied.contains(&label) => {}
            None => marks.unclaimed.push(label),
        }
    }
    contradicted::marks(&mut marks, texts, lies, &stakes.own, &taken);
    marks
}

fn costs(
    texts: &[Marking],
    lies: &[Lie],
    lines: &[Line],
    taken: &[Option<usize>],
    even: &[Option<usize>],
    learned: bool,
) -> Vec<f64> {
    let mut choices = vec![0_u32; texts.len()];
    for lie in lies {
        choices[lie.pairing.label] += 1;
    }
    let sure = |label: usize| if choices[label] == 1 { 1.0 } else { 0.2 };
    let held = || {
        let telling = taken
            .iter()
            .flatten()
            .filter(|&&pairing| even[pairing].is_none());
        telling.map(|&pairing| &lies[pairing])
    };
    let habits = Habits::learn(held().map(|lie| {
        let run = lines[lie.pairing.host].run;
        (run, lie, sure(lie.pairing.label))
    }));
    let mut letters: BTreeMap<(Run, String), f64> = BTreeMap::new();
    for lie in held() {
        let key = (
            lines[lie.pairing.host].run,
            prefix(&texts[lie.pairing.label]),
        );
        *letters.entry(key).or_default() += sure(lie.pairing.label);
    }
    lies.iter()
        .map(|lie| {
            let run = lines[lie.pairing.host].run;
            // Marks are written along their tendon.
            let turned = if lie.turn == 0 || lie.aimed { 0.0 } else { 0.5 };
            let aimed = if lie.aimed { -AIMED } else { 0.0 };
            let near = aimed + 0.6 * lie.gap_h + 0.02 * lie.off_h.abs().min(6.0) + turned;
            if !learned {
                return near;
            }
            let count = |run| {
                let key = (run, prefix(&texts[lie.pairing.label]));
                letters.get(&key).copied().unwrap_or(0.0) + 0.5
            };
            let both = count(Run::Banded).max(count(Run::Distributed));
            near + habits.cost(run, lie) + (both / count(run)).ln().min(3.0)
        })
        .collect()
}

/// The letters that a mark begins with.
fn prefix(text: &Marking) -> String {
    let mark = text.mark.one().map_or("", String::as_str);
    let letters = mark.chars().take_while(|c| c.is_alphabetic());
    letters.flat_map(char::to_uppercase).collect()
}

/// Costs of marks.
struct MarkStakes<'a> {
    own: Vec<f64>,
    texts: &'a [Marking],
    lies: &'a [Lie],
}

impl Stakes for MarkStakes<'_> {
    fn own(&self, pairing: usize) -> f64 {
        self.own[pairing]
    }

    fn shared(&self, _: usize, pairings: impl Iterator<Item = usize> + Clone) -> f64 {
        let mut texts = pairings.map(|pairing| &self.texts[self.lies[pairing].pairing.label]);
        let Some(mut text) = texts.next() else {
            return 1.0;
        };
        let mut cost = 0.0;
        loop {
            for other in texts.clone() {
                if clash(text, other) {
                    cost += 8.0;
                }
            }
            match texts.next() {
                Some(next) => text = next,
                None => return cost,
            }
        }
    }

    /// A tendon has one mark, wherever along it another is written.
    fn apart_m(&self) -> f64 {
        f64::INFINITY
    }
}

/// Whether two texts cannot both belong to one tendon.
fn clash(a: &Marking, b: &Marking) -> bool {
    a.mark.differs(&b.mark)
        || a.counts_otherwise(b)
        // Two counts without a mark are those of two tendons, even if they are equal; a count and a force are not.
        || (!a.mark.is_said() && !b.mark.is_said() && alike(a, b))
}

/// Whether two texts say the same kind of thing.
fn alike(a: &Marking, b: &Marking) -> bool {
    let counts = |text: &Marking| text.strands.is_said() || text.tendons.is_said();
    (counts(a) && counts(b)) || (a.requires() && b.requires()) || (!a.counts() && !b.counts())
}

/// Lines whose middles are no farther apart across their run than this lie in one row, metres. It is no multiple of a
/// unit that drawings are drawn to, so rounding does not decide which of two rows is first.
const ROW_M: f64 = 0.0007;
/// Runs steeper than this are counted by x, radians: a hair over 45°, so that rounding does not decide on a plan drawn at 45°.
const UPRIGHT_RAD: f64 = std::f64::consts::FRAC_PI_4 + 0.001;

/// Names for lines without a mark: `B001`, `D001`, ... by place across the run, then along it.
/// Nobody is called by a mark that is reserved.
pub(super) fn names(lines: &[Line], drawn: &[Marking], reserved: &[Marking]) -> Vec<String> {
    let used: BTreeSet<String> = drawn
        .iter()
        .chain(reserved)
        .filter_map(|text| text.mark.one())
        .map(|mark| mark.to_uppercase())
        .collect();
    let mut names: Vec<String> = drawn
        .iter()
        .map(|text| text.mark.one().cloned().unwrap_or_default())
        .collect();
    for (run, letter) in [(Run::Banded, 'B'), (Run::Distributed, 'D')] {
        let of_run = || (0..lines.len()).filter(|&line| lines[line].run == run);
        let axis_rad = axis_rad(of_run().map(|line| &lines[line]));
        let (sin, cos) = axis_rad.sin_cos();
        // Runs along y are counted by x, and runs along x by y.
        let across_sign = if axis_rad > UPRIGHT_RAD { -1.0 } else { 1.0 };
        let mut order: Vec<(f64, f64, usize)> = of_run()
            .filter(|&line| names[line].is_empty())
            .map(|line| {
                let path = &lines[line].path;
                let middle = path.place_at(path.length_m() / 2.0);
                let across_m = across_sign * (cos * middle.y - sin * middle.x);
                let along_m = cos * middle.x + sin * middle.y;
                (across_m, along_m, line)
            })
            .collect();
        order.sort_by(|a, b| a.0.total_cmp(&b.0));
        for row in order.chunk_by_mut(|a, b| b.0 - a.0 <= ROW_M) {
            row.sort_by(|a, b| a.1.total_cmp(&b.1).then(a.2.cmp(&b.2)));
        }
        let free = (1_u32..)
            .map(|number| format!("{letter}{number:03}"))
            .filter(|name| !used.contains(name));
        for ((_, _, line), name) in order.into_iter().zip(free) {
            names[line] = name;
        }
    }
    names
}

/// Findings on marks and strand counts; of the lines in `torn`, by handle, it is said elsewhere why they have no count.
pub(super) fn findings(tendons: &[Tendon], torn: &BTreeSet<&str>) -> Vec<Finding> {
    let mut findings = Vec::new();
    let mut first: BTreeMap<String, &Tendon> = BTreeMap::new();
    for tendon in tendons {
        let middle_m = tendon.path.length_m() / 2.0;
        let required = tendon.required_kn.is_some() || tendon.required_kn_per_m.is_some();
        let no_count = match tendon.strands {
            None if torn.contains(tendon.handle.as_str()) => None,
            None if required => Some((
                "a label gives the force that is required here, but none the number of strands, which is not worked out from it",
                "write mark and strands beside the tendon, on the layer of marks",
            )),
            None => Some((
                "no label within reach gives the number of strands; expected a text such as D012 5-12.7",
                "write mark and strands beside the tendon, on the layer of marks; or, where a note gives them for all others, set \
                 default_strands below [tendon]",
            )),
            Some(0) => Some((
                "the tendon's label says 0 strands; expected at least one, as in D012 5-12.7",
                "correct the number of strands in the label",
            )),
            Some(_) => None,
        };
        if let Some((text, remedy)) = no_count {
            findings.push(
                Finding::new(&STRAND_COUNT_MISSING, Level::Error, text, remedy)
                    .on_tendon(&tendon.mark)
                    .at_place(tendon.path.place_at(middle_m)),
            );
        }
        if let Some(before) = first.get(&tendon.mark.to_uppercase()) {
            findings.push(
                Finding::new(
                    &MARK_TWICE,
                    Level::Warning,
                    format!(
                        "mark {} stands on the lines with handles {} and {}; expected each mark once",
                        tendon.mark, before.handle, tendon.handle
                    ),
                    "give one of the two tendons its own mark",
                )
                .on_tendon(&tendon.mark)
                .at_place(tendon.path.place_at(middle_m)),
            );
        } else {
            first.insert(tendon.mark.to_uppercase(), tendon);
        }
    }
    findings
}
