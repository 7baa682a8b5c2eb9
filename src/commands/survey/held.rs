//! What lies on a layer, or on it in one look: lines, symbols, and what its texts say.

use std::collections::{BTreeMap, BTreeSet};

use geo::Coord;

use super::readings::{Reading, hint};
use crate::drawing::Text;
use crate::floor::height_of_line;
use crate::job::Job;

/// Texts shown of each layer.
const SAMPLES: usize = 4;
/// Lines up to this many text heights long are ticks, leaders and symbols.
const SMALL: f64 = 15.0;
/// So many marks are a series; of these numbers, one in so many is used at least.
const SOME: usize = 3;
/// A word beside so many numbers is no chance.
const OFTEN: usize = 3;

/// What lies on a layer, or on it in one look.
#[derive(Debug, Default, Clone)]
pub(super) struct Held {
    /// Lengths of its open lines, metres.
    pub(super) open_m: Vec<f64>,
    /// The same lines from end to end.
    pub(super) spans: Vec<[Coord<f64>; 2]>,
    /// Lengths of its closed lines, metres.
    pub(super) closed_m: Vec<f64>,
    /// Ends of its open lines at which some block, word or shape stands.
    pub(super) ends_marked: usize,
    /// Its blocks that stand at line ends of other layers or its own.
    pub(super) blocks_at_ends: usize,
    /// Lines, bubbles and texts of grid lines; none of them is counted otherwise.
    pub(super) of_grid: usize,
    /// Texts.
    pub(super) texts: usize,
    /// Heights of their capitals, metres.
    pub(super) text_m: Vec<f64>,
    /// Texts that are a mark and no more, each with its number of times.
    pub(super) bare_marks: BTreeMap<String, usize>,
    /// Texts that say a thickness.
    pub(super) thicknesses: usize,
    /// Of these, texts that would be heights as well: `h=205`.
    or_heights: usize,
    /// Texts that say a height.
    pub(super) heights: usize,
    /// Texts that say strands.
    pub(super) strands: usize,
    /// Numbers of its heights and thicknesses, as millimetres.
    pub(super) heights_mm: Vec<f64>,
    pub(super) thicknesses_mm: Vec<f64>,
    /// Texts that would be heights, or thicknesses, in inches.
    pub(super) inched: usize,
    pub(super) inched_thicknesses: usize,
    /// Texts that count strands and may as well be inches with fractions; whether some size among them is none of strands.
    either: usize,
    strange_size: bool,
    /// Words beside numbers that are words of heights, though not of the job's.
    pub(super) words: BTreeMap<String, usize>,
    /// Of these, words that nobody knows and whose numbers say what they mean.
    pub(super) highs: BTreeSet<String>,
    pub(super) lows: BTreeSet<String>,
    /// Words that nobody knows, with the numbers beside them.
    unknown: BTreeMap<String, Vec<f64>>,
    /// Texts of families that a survey offers, by the family's name.
    pub(super) offered: BTreeMap<&'static str, usize>,
    /// A few different texts, with what each says.
    pub(super) samples: BTreeMap<String, Reading>,
}

impl Held {
    /// Counts a text by what it says.
    pub(super) fn take(&mut self, text: &Text, said: Reading, job: &Job) {
        self.texts += 1;
        self.text_m.push(text.height_m);
        match &said {
            Reading::Thickness(_) => {
                self.thicknesses += 1;
                let as_height = height_of_line(&text.content, &job.conventions);
                self.or_heights += usize::from(as_height.is_some());
            }
            Reading::Height(_) => self.heights += 1,
            Reading::Mark { strands: true, .. } => self.strands += 1,
            Reading::Offered(family) => *self.offered.entry(family).or_default() += 1,
            Reading::Mark { .. } => {
                let mark = text.content.trim().to_owned();
                *self.bare_marks.entry(mark).or_default() += 1;
            }
            Reading::Unread => {}
        }
        self.hints(&text.content, &said, job);
        keep_sample(&mut self.samples, &text.content, said);
    }

    /// What a text says beyond how it is read: how large its number is, and what it might be.
    fn hints(&mut self, text: &str, said: &Reading, job: &Job) {
        let hint = hint(text, said, job);
        self.heights_mm.extend(hint.height_mm);
        self.thicknesses_mm.extend(hint.thickness_mm);
        self.inched += usize::from(hint.inched);
        self.either += usize::from(hint.either.is_some());
        self.strange_size |= hint.either == Some(true);
        self.inched_thicknesses += usize::from(hint.inched_thickness);
        if let Some(word) = hint.word {
            *self.words.entry(word).or_default() += 1;
        }
        if let Some((word, number)) = hint.unknown {
            self.unknown.entry(word).or_default().push(number);
        }
    }

    /// `T165` beside `B30` is no thickness but a top.
    pub(super) fn settle(&mut self) {
        if self.strange_size {
            let inches = std::mem::take(&mut self.either);
            self.strands = self.strands.saturating_sub(inches);
            self.inched += inches;
        }
        if self.counts_marks() {
            for mark in self.bare_marks.keys() {
                let word = mark
                    .chars()
                    .filter(|sign| sign.is_alphabetic())
                    .collect::<String>();
                self.words.remove(&word.to_uppercase());
            }
        }
        if self.thicknesses > 0 && self.words.keys().any(|word| word == "B") {
            self.words.insert("T".to_owned(), self.thicknesses);
            self.heights_mm.append(&mut self.thicknesses_mm);
            self.inched += std::mem::take(&mut self.inched_thicknesses);
            self.thicknesses = 0;
        }
        self.tell_heights();
        self.tell_words();
    }

    /// `h=45` and `h=205` on one layer are heights: slabs of one floor do not differ so.
    fn tell_heights(&mut self) {
        let least_mm = self.thicknesses_mm.iter().copied().reduce(f64::min);
        let most_mm = self.thicknesses_mm.iter().copied().reduce(f64::max);
        let apart = least_mm
            .zip(most_mm)
            .is_some_and(|(least_mm, most_mm)| most_mm > 2.5 * least_mm);
        if self.or_heights >= OFTEN && apart {
            let heights = std::mem::take(&mut self.or_heights);
            self.thicknesses = self.thicknesses.saturating_sub(heights);
            self.heights += heights;
            self.heights_mm.append(&mut self.thicknesses_mm);
        }
    }

    /// Two words that nobody knows, of which one stands beside the larger numbers everywhere, are high and low.
    fn tell_words(&mut self) {
        let often = self
            .unknown
            .iter()
            .filter(|(_, numbers)| numbers.len() >= OFTEN);
        let [(one, of_one), (other, of_other)] = often.collect::<Vec<_>>()[..] else {
            return;
        };
        let above = |a: &[f64], b: &[f64]| {
            let most = b.iter().copied().fold(f64::NEG_INFINITY, f64::max);
            a.iter().all(|number| *number > most)
        };
        let (high, low) = if above(of_one, of_other) {
            (one, other)
        } else if above(of_other, of_one) {
            (other, one)
        } else {
            return;
        };
        self.highs.insert(high.clone());
        self.lows.insert(low.clone());
        for (word, numbers) in [(one, of_one), (other, of_other)] {
            self.words.insert(word.clone(), numbers.len());
            self.heights_mm.extend(numbers);
        }
    }

    /// Whether what might be marks or heights, as `B01` or `B30`, is marks: numbered through, or from nought on.
    pub(super) fn counts_marks(&self) -> bool {
        let all: usize = self.bare_marks.values().sum();
        let different = self.bare_marks.len();
        let number = |mark: &String| {
            let digits: String = mark.chars().filter(char::is_ascii_digit).collect();
            (
                digits.starts_with('0'),
                digits.parse::<usize>().unwrap_or(usize::MAX),
            )
        };
        let noughts = self.bare_marks.keys().filter(|mark| number(mark).0).count();
        let last = self.bare_marks.keys().map(|mark| number(mark).1).max();
        let through = different >= SOME
            && 5 * different >= 4 * all
            && last.is_some_and(|last| last <= SOME * different);
        through || all > 0 && 2 * noughts > different
    }

    /// Whether its lines are no longer than ticks, leaders and symbols beside its texts.
    pub(super) fn lines_are_small(&self) -> bool {
        let text_m = middle(&self.text_m).unwrap_or(0.0);
        middle(&self.open_m).is_none_or(|length_m| length_m <= SMALL * text_m)
    }

    /// Texts that would be heights by another unit or other words.
    pub(super) fn likely_heights(&self) -> usize {
        self.inched + self.words.values().sum::<usize>()
    }

    /// Texts of families that count strands or tendons.
    pub(super) fn offered_counts(&self) -> usize {
        let counting = self
            .offered
            .iter()
            .filter(|(name, _)| **name != "other mark");
        counting.map(|(_, count)| count).sum()
    }

    pub(super) fn add(&mut self, other: &Self) {
        self.open_m.extend(&other.open_m);
        self.spans.extend(&other.spans);
        self.closed_m.extend(&other.closed_m);
        self.ends_marked += other.ends_marked;
        self.blocks_at_ends += other.blocks_at_ends;
        self.of_grid += other.of_grid;
        self.texts += other.texts;
        self.text_m.extend(&other.text_m);
        for (mark, count) in &other.bare_marks {
            *self.bare_marks.entry(mark.clone()).or_default() += count;
        }
        self.thicknesses += other.thicknesses;
        self.or_heights += other.or_heights;
        self.heights += other.heights;
        self.strands += other.strands;
        self.heights_mm.extend(&other.heights_mm);
        self.thicknesses_mm.extend(&other.thicknesses_mm);
        self.inched += other.inched;
        self.either += other.either;
        self.strange_size |= other.strange_size;
        self.inched_thicknesses += other.inched_thicknesses;
        for (word, count) in &other.words {
            *self.words.entry(word.clone()).or_default() += count;
        }
        for (word, numbers) in &other.unknown {
            self.unknown
                .entry(word.clone())
                .or_default()
                .extend(numbers);
        }
        for (family, count) in &other.offered {
            *self.offered.entry(family).or_default() += count;
        }
        for (text, said) in &other.samples {
            keep_sample(&mut self.samples, text, said.clone());
        }
    }
}

fn middle(values: &[f64]) -> Option<f64> {
    let mut sorted = values.to_vec();
    sorted.sort_by(f64::total_cmp);
    sorted.get(sorted.len() / 2).copied()
}

/// The first few in the order of the alphabet, so that the order of the entities does not matter; of those that were
/// not read, not more than half.
fn keep_sample(samples: &mut BTreeMap<String, Reading>, text: &str, said: Reading) {
    samples.insert(text.to_owned(), said);
    if samples.len() <= SAMPLES {
        return;
    }
    let unread = |reading: &Reading| matches!(reading, Reading::Offered(_) | Reading::Unread);
    let many = samples.values().filter(|reading| unread(reading)).count() > SAMPLES / 2;
    let last = samples
        .iter()
        .rev()
        .find(|(_, reading)| unread(reading) == many)
        .map(|(text, _)| text.clone());
    if let Some(last) = last {
        samples.remove(&last);
    }
}
