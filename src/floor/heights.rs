//! Height labels settled on their tendons: what a pairing costs, round after round, as more is known of the floor.

mod ties;

use std::collections::BTreeSet;

use self::ties::{Texts, tied};
use super::aims::AIMED;
use super::candidates::Lie;
use super::contradicted::{self, Contradiction};
use super::even::even;
use super::habits::Habits;
use super::lines::Line;
use super::readings::{HeightText, Word};
use super::settle::{Pairing, Settlement, Stakes};

/// A height that a tendon has at a station, from a label or a level line.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Height {
    pub(super) station_m: f64,
    pub(super) at_end: bool,
    pub(super) reading: HeightText,
    /// The label that gives it; `None` for a level line.
    pub(super) label: Option<usize>,
}

/// A label that fits elsewhere about as well.
#[derive(Debug, Clone)]
pub(super) struct Doubt {
    pub(super) label: usize,
    /// Where it went, and where it might have gone.
    pub(super) hosts: [usize; 2],
    pub(super) stations_m: [f64; 2],
    /// Whether nothing at all tells the two apart.
    pub(super) tied: bool,
}

/// Labels settled.
pub(super) struct Settled {
    /// Heights of each tendon, in order of station.
    pub(super) of_line: Vec<Vec<Height>>,
    /// Labels that went to nobody.
    pub(super) unclaimed: Vec<usize>,
    pub(super) doubts: Vec<Doubt>,
    /// Labels that contradict one that their tendon has at the same place.
    pub(super) contradicted: Vec<Contradiction>,
}

/// Rounds of settling and learning.
const ROUNDS: usize = 6;
/// Costs that differ by less are told apart by nothing; by less than `DOUBT`, by too little to be silent.
const TIE: f64 = 0.02;
const DOUBT: f64 = 0.5;
/// Two heights nearer than this are at one place, metres and text heights.
pub(super) const SAME_PLACE_M: f64 = 0.5;
/// Supports stand nearer to one another than this, metres (common practice: 0.8 to 1.2 m).
const SUPPORTS_M: f64 = 2.5;
/// Steeper than this no strand runs between two heights, metre per metre.
pub(super) const STEEP: f64 = 0.08;

/// A text without a word whose edge is this near to an end, in text heights, speaks of the anchor; mid-depth from
/// farther in, since it is said of hardly any other point.
const EDGE: f64 = 1.0;
const EDGE_OF_MIDDLE: f64 = 3.0;

/// Counts labels to anchors that are written from within towards an end, wherever their first letter stands. A label with
/// a word speaks of its own place.
pub(super) fn written_to_ends(lies: &mut [Lie], readings: &[HeightText]) {
    for lie in lies {
        let Some(reading) = readings.get(lie.pairing.label) else {
            continue;
        };
        let near = if reading.middle { EDGE_OF_MIDDLE } else { EDGE };
        lie.at_end |= reading.word.is_none() && lie.edge_h <= near;
    }
}

/// Settles labels; `fixed` are heights from level lines, by line.
pub(super) fn settle(
    readings: &[HeightText],
    lies: &[Lie],
    lines: &[Line],
    fixed: &[Vec<Height>],
) -> Settled {
    let pairings: Vec<Pairing> = lies.iter().map(|lie| lie.pairing).collect();
    let mut taken: Vec<Option<usize>> = vec![None; readings.len()];
    let even = even(lies, lines);
    let mut known = None;
    let mut stakes = HeightStakes {
        own: Vec::new(),
        told: lies.iter().map(|lie| told(lie, readings)).collect(),
        fixed: in_order(fixed),
    };
    for _ in 0..ROUNDS {
        let floor = Known {
            heights: by_line(readings, lies, lines.len(), fixed, &taken),
            sides: sides(lies, lines.len(), &taken, &even),
            habits: known.as_ref(),
        };
        let own = lies.iter().map(|lie| cost(readings, lie, lines, &floor));
        stakes.own = own.collect();
        let mut settlement =
            Settlement::new(&pairings, readings.len(), lines.len(), &stakes, &taken);
        let next = settlement.settle();
        let steady = next == taken && known.is_some();
        taken = next;
        known = Some(learn(lies, lines, &taken, &even, readings.len()));
        if steady {
            break;
        }
    }
    let mut settlement = Settlement::new(&pairings, readings.len(), lines.len(), &stakes, &taken);
    let mut doubts = doubts(&mut settlement, readings, lies);
    let floor = Known {
        heights: by_line(readings, lies, lines.len(), fixed, &taken),
        sides: sides(lies, lines.len(), &taken, &even),
        habits: known.as_ref(),
    };
    let texts = Texts {
        readings,
        lies,
        lines,
        fixed,
    };
    let tied = tied(floor, &texts, &taken, &even, &stakes);
    let of_tie: BTreeSet<usize> = tied
        .iter()
        .map(|&(now, _)| lies[now].pairing.label)
        .collect();
    doubts.retain(|doubt| !of_tie.contains(&doubt.label));
    doubts.extend(tied.iter().map(|&(now, other)| Doubt {
        label: lies[now].pairing.label,
        hosts: [now, other].map(|pairing| lies[pairing].pairing.host),
        stations_m: [now, other].map(|pairing| lies[pairing].pairing.station_m),
        tied: true,
    }));
    doubts.sort_by_key(|doubt| doubt.label);
    for doubt in doubts.iter().filter(|doubt| doubt.tied) {
        settlement.release(doubt.label);
    }
    let taken = settlement.taken();
    let mut settled = Settled {
        of_line: by_line(readings, lies, lines.len(), fixed, taken),
        unclaimed: (0..readings.len())
            .filter(|&label| taken[label].is_none())
            .filter(|&label| !doubts.iter().any(|d| d.label == label))
            .collect(),
        doubts,
        contradicted: Vec::new(),
    };
    contradicted::heights(&mut settled, readings, lies, &stakes.own);
    settled
}

/// The height that a label gives if it belongs to this tendon.
fn told(lie: &Lie, readings: &[HeightText]) -> Height {
    Height {
        station_m: lie.pairing.station_m,
        at_end: lie.at_end,
        reading: readings[lie.pairing.label],
        label: Some(lie.pairing.label),
    }
}

/// Heights of each line in order of station.
fn in_order(heights: &[Vec<Height>]) -> Vec<Vec<Height>> {
    let mut ordered = heights.to_vec();
    for heights in &mut ordered {
        heights.sort_by(|a, b| a.station_m.total_cmp(&b.station_m));
    }
    ordered
}

/// Heights by line, in order of station.
fn by_line(
    readings: &[HeightText],
    lies: &[Lie],
    lines: usize,
    fixed: &[Vec<Height>],
    taken: &[Option<usize>],
) -> Vec<Vec<Height>> {
    let mut of_line: Vec<Vec<Height>> = vec![Vec::new(); lines];
    for (heights, fixed) in of_line.iter_mut().zip(fixed) {
        heights.extend(fixed);
    }
    for &pairing in taken.iter().flatten() {
        let lie = &lies[pairing];
        of_line[lie.pairing.host].push(told(lie, readings));
    }
    for heights in &mut of_line {
        heights.sort_by(|a, b| {
            a.station_m
                .total_cmp(&b.station_m)
                .then(a.label.cmp(&b.label))
        });
    }
    of_line
}

fn learn(
    lies: &[Lie],
    lines: &[Line],
    taken: &[Option<usize>],
    even: &[Option<usize>],
    labels: usize,
) -> Habits {
    let mut choices = vec![0_u32; labels];
    for lie in lies {
        choices[lie.pairing.label] += 1;
    }
    let telling = taken
        .iter()
        .flatten()
        .filter(|&&pairing| even[pairing].is_none());
    Habits::learn(telling.map(|&pairing| {
        let lie = &lies[pairing];
        let sure = choices[lie.pairing.label] == 1;
        (
            lines[lie.pairing.host].run,
            lie,
            if sure { 1.0 } else { 0.2 },
        )
    }))
}

/// What is known of the floor while a label is judged.
struct Known<'h> {
    /// Heights of each tendon.
    heights: Vec<Vec<Height>>,
    /// See [`sides`].
    sides: Vec<Vec<(usize, f64)>>,
    /// What is usual, once something was learned.
    habits: Option<&'h Habits>,
}

/// Cost of a pairing by itself.
fn cost(readings: &[HeightText], lie: &Lie, lines: &[Line], known: &Known<'_>) -> f64 {
    let reading = readings[lie.pairing.label];
    let run = lines[lie.pairing.host].run;
    let mut cost = 0.05 * lie.off_h.abs().min(6.0) + at_column(reading, lie);
    if lie.aimed {
        cost -= AIMED;
    }
    match known.habits {
        None => {
            let struck = if lie.gap_h <= 0.0 { 0.2 } else { 0.0 };
            cost += 0.6 * lie.gap_h + struck;
        }
        Some(habits) => {
            cost += 0.4 * lie.gap_h
                + habits.cost(run, lie)
                + resemblance(reading, lie, &known.heights)
                + if lie.aimed {
                    0.0
                } else {
                    side(lie, &known.sides[lie.pairing.host])
                };
        }
    }
    cost
}

/// High points stand over the middle of columns.
fn at_column(reading: HeightText, lie: &Lie) -> f64 {
    match (reading.likely, lie.column_m) {
        (Some(Word::High), Some(off_m)) => 0.6 * (off_m / 0.15).min(1.0),
        (Some(Word::High), None) => 0.3,
        _ => 0.0,
    }
}

/// Offsets of the labels that each tendon holds, with the label; those midway between two tendons tell nothing.
fn sides(
    lies: &[Lie],
    lines: usize,
    taken: &[Option<usize>],
    even: &[Option<usize>],
) -> Vec<Vec<(usize, f64)>> {
    let mut sides = vec![Vec::new(); lines];
    for &pairing in taken.iter().flatten() {
        let lie = &lies[pairing];
        if lie.aimed || even[pairing].is_some() {
            continue;
        }
        sides[lie.pairing.host].push((lie.pairing.label, lie.off_h));
    }
    sides
}

/// A tendon's labels mostly stand on one side of it, at one distance.
fn side(lie: &Lie, held: &[(usize, f64)]) -> f64 {
    let mut others: Vec<f64> = held
        .iter()
        .filter(|(label, _)| *label != lie.pairing.label)
        .map(|&(_, off_h)| off_h)
        .collect();
    if others.len() < 2 {
        return 0.3;
    }
    others.sort_by(f64::total_cmp);
    let middle = others.len() / 2;
    let median = f64::midpoint(others[(others.len() - 1) / 2], others[middle]);
    0.6 * (lie.off_h - median).abs().min(1.0)
}

/// Neighbours in a run have like heights at like stations.
fn resemblance(reading: HeightText, lie: &Lie, known: &[Vec<Height>]) -> f64 {
    let mut matches: Vec<f64> = Vec::new();
    for &(line, station_m) in &lie.beside {
        let heights = &known[line];
        let from = heights.partition_point(|h| h.station_m < station_m - 1.0);
        let like = heights[from..]
            .iter()
            .take_while(|h| h.station_m <= station_m + 1.0)
            .filter(|h| h.label != Some(lie.pairing.label))
            .filter(|h| h.at_end == lie.at_end && (lie.at_end || h.reading.word == reading.word))
            .map(|h| {
                let along = 0.8 * ((h.station_m - station_m).abs() / 0.3).min(1.0);
                along + unlike(h.reading.value_m - reading.value_m)
            })
            .min_by(f64::total_cmp);
        matches.extend(like);
    }
    matches.sort_by(f64::total_cmp);
    match (lie.beside.len(), matches.as_slice()) {
        (0, _) => 0.8,
        (_, []) => 2.6,
        (1 | 2, [one]) => *one,
        (_, [one]) => one + 0.4,
        (_, [one, two, ..]) => f64::midpoint(*one, *two),
    }
}

fn unlike(difference_m: f64) -> f64 {
    let millimetres = difference_m.abs() * 1000.0;
    if millimetres < 1.5 {
        0.0
    } else if millimetres <= 11.0 {
        0.3
    } else if millimetres <= 26.0 {
        0.6
    } else {
        1.0
    }
}

/// Costs of height labels.
struct HeightStakes {
    own: Vec<f64>,
    /// By pairing, the height that it stands for.
    told: Vec<Height>,
    /// Heights from level lines, by line, in order of station.
    fixed: Vec<Vec<Height>>,
}

impl Stakes for HeightStakes {
    fn own(&self, pairing: usize) -> f64 {
        self.own[pairing]
    }

    fn shared(&self, host: usize, pairings: impl Iterator<Item = usize> + Clone) -> f64 {
        let fixed = &self.fixed[host];
        let told = pairings.map(|pairing| &self.told[pairing]);
        if !fixed.is_empty() {
            return sequence(Merged {
                told: told.peekable(),
                fixed,
            });
        }
        if told.clone().next().is_none() {
            return 1.0;
        }
        sequence(told)
    }

    fn apart_m(&self) -> f64 {
        SUPPORTS_M
    }
}

/// Heights of labels and of level lines in order of station; of two at one station, the label's goes first.
#[derive(Clone)]
struct Merged<'a, I: Iterator<Item = &'a Height>> {
    told: std::iter::Peekable<I>,
    fixed: &'a [Height],
}

impl<'a, I: Iterator<Item = &'a Height>> Iterator for Merged<'a, I> {
    type Item = &'a Height;

    fn next(&mut self) -> Option<&'a Height> {
        let Some((fixed, rest)) = self.fixed.split_first() else {
            return self.told.next();
        };
        let not_behind = |told: &&Height| told.station_m.total_cmp(&fixed.station_m).is_le();
        self.told.next_if(not_behind).or_else(|| {
            self.fixed = rest;
            Some(fixed)
        })
    }
}

/// Cost of a tendon's heights together, given in order of station.
fn sequence<'a>(heights: impl Iterator<Item = &'a Height> + Clone) -> f64 {
    let mut cost = 0.0;
    let mut before: Option<&Height> = None;
    for height in heights.clone() {
        if let Some(before) = before {
            cost += neighbours(before, height) + bare(before, height);
        }
        before = Some(height);
    }
    // Two of a kind in a row; numbers without a word between them may be the missing other kind.
    let mut last: Option<&Height> = None;
    let mut between: Option<f64> = None;
    for height in heights {
        let Some(word) = height.reading.word.filter(|_| !height.at_end) else {
            if !height.at_end {
                between = Some(height.reading.value_m);
            }
            continue;
        };
        // A label beside a level line speaks of the line's place: one point told twice, not two in a row.
        let retold = |before: &Height| {
            let one_label = before.label.is_some() != height.label.is_some();
            one_label && height.station_m - before.station_m < SAME_PLACE_M
        };
        if let Some(before) =
            last.filter(|before| before.reading.word == Some(word) && !retold(before))
        {
            let gap_m = height.station_m - before.station_m;
            let (low_m, high_m) = (
                before.reading.value_m.min(height.reading.value_m),
                before.reading.value_m.max(height.reading.value_m),
            );
            let relieved = between.is_some_and(|value_m| value_m < low_m || value_m > high_m);
            cost += if relieved {
                0.3
            } else {
                2.0 + 3.0 * (-gap_m / 2.5).exp()
            };
        }
        last = Some(height);
        between = None;
    }
    cost
}

/// Cost of two bare numbers that follow one another on the same side of mid-depth, farther apart than supports stand:
/// a tendon that spans has its other kind between them.
fn bare(a: &Height, b: &Height) -> f64 {
    let bare = |height: &Height| height.reading.word.is_none() && !height.at_end;
    let alike = a.reading.likely.is_some() && a.reading.likely == b.reading.likely;
    if bare(a) && bare(b) && alike && b.station_m - a.station_m > SUPPORTS_M {
        2.0
    } else {
        0.0
    }
}

/// Cost of two heights that follow one another.
fn neighbours(a: &Height, b: &Height) -> f64 {
    let gap_m = b.station_m - a.station_m;
    let rise_m = (b.reading.value_m - a.reading.value_m).abs();
    if gap_m < SAME_PLACE_M {
        return match (a.label, b.label) {
            (None, None) => 0.0,
            (Some(_), Some(_)) => 8.0 - 4.0 * (gap_m / SAME_PLACE_M),
            _ if rise_m < 0.0005 => 0.5,
            _ => 3.0,
        };
    }
    (30.0 * (rise_m / gap_m - STEEP)).clamp(0.0, 4.0)
}

/// Labels that would fit elsewhere about as well, where it matters.
fn doubts<S: Stakes>(
    settlement: &mut Settlement<'_, S>,
    readings: &[HeightText],
    lies: &[Lie],
) -> Vec<Doubt> {
    let mut doubts = Vec::new();
    for label in 0..readings.len() {
        let Some(now) = settlement.taken()[label] else {
            continue;
        };
        if settlement.choices(label).len() < 2 {
            continue;
        }
        let Some((more, changes)) = settlement.second_best(label, DOUBT) else {
            continue;
        };
        let Some(&(_, Some(then))) = changes.iter().find(|(changed, _)| *changed == label) else {
            continue;
        };
        if !matters(settlement.taken(), &changes, readings, lies) {
            continue;
        }
        doubts.push(Doubt {
            label,
            hosts: [lies[now].pairing.host, lies[then].pairing.host],
            stations_m: [lies[now].pairing.station_m, lies[then].pairing.station_m],
            tied: more < TIE,
        });
    }
    doubts
}

/// Whether a change gives some tendon another height somewhere.
fn matters(
    taken: &[Option<usize>],
    changes: &[(usize, Option<usize>)],
    readings: &[HeightText],
    lies: &[Lie],
) -> bool {
    let gone = changes.iter().filter_map(|&(label, _)| taken[label]);
    let mut gone: Vec<usize> = gone.collect();
    for come in changes.iter().filter_map(|&(_, pairing)| pairing) {
        let like = gone.iter().position(|&old| {
            let (a, b) = (&lies[old], &lies[come]);
            a.pairing.host == b.pairing.host
                && a.at_end == b.at_end
                && (a.pairing.station_m - b.pairing.station_m).abs() < 0.3
                && readings[a.pairing.label].word == readings[b.pairing.label].word
                && (readings[a.pairing.label].value_m - readings[b.pairing.label].value_m).abs()
                    < 1e-6
        });
        match like {
            Some(at) => {
                gone.swap_remove(at);
            }
            None => return true,
        }
    }
    !gone.is_empty()
}
