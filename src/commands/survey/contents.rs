//! What a drawing holds, counted: by layer, and by colour and linetype where these differ on a layer.

use std::collections::{BTreeMap, BTreeSet};

use geo::Coord;

use super::at_ends::AtEnds;
use super::grids::Grids;
use super::readings::{Reading, hint, reading};
use crate::drawing::{Drawing, Look, ShapeKind};
use crate::job::Job;

/// Texts shown of each layer.
const SAMPLES: usize = 4;
/// Lines up to this many text heights long are ticks, leaders and symbols.
const SMALL: f64 = 15.0;
/// A word beside so many numbers is no chance.
const OFTEN: usize = 3;

/// What a drawing holds.
#[derive(Debug, Default)]
pub(super) struct Contents {
    /// By layer.
    pub(super) layers: BTreeMap<String, Held>,
    /// By layer, then by look.
    pub(super) looks: BTreeMap<String, BTreeMap<Look, Held>>,
    /// What stands at line ends.
    pub(super) at_ends: AtEnds,
    /// Grid lines: no tendons, and their names are no heights.
    pub(super) grids: Grids,
}

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
    /// Texts.
    pub(super) texts: usize,
    /// Heights of their capitals, metres.
    pub(super) text_m: Vec<f64>,
    /// Texts that are a mark and no more, each with its number of times.
    pub(super) bare_marks: BTreeMap<String, usize>,
    /// Texts that say a thickness.
    pub(super) thicknesses: usize,
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

impl Contents {
    /// Counts what a drawing holds; texts are read by the job's patterns.
    pub(super) fn of(drawing: &Drawing, job: &Job) -> Self {
        let grids = Grids::of(drawing);
        let mut contents = Self {
            at_ends: AtEnds::of(drawing, job, &grids),
            grids,
            ..Self::default()
        };
        for (number, shape) in drawing.shapes.iter().enumerate() {
            let grid = contents.grids.draw(number, shape);
            if grid || shape.kind == ShapeKind::Solid || contents.at_ends.draws(drawing, shape) {
                continue;
            }
            let marked = contents.at_ends.marked.get(&number).copied().unwrap_or(0);
            let held = contents.held(&shape.layer, shape.look);
            if shape.closed {
                held.closed_m.push(shape.path.length_m());
                continue;
            }
            held.open_m.push(shape.path.length_m());
            held.ends_marked += marked;
            if let (Some(start), Some(end)) = (shape.path.start(), shape.path.end()) {
                held.spans.push([start, end]);
            }
        }
        for (number, text) in drawing.texts.iter().enumerate() {
            if contents.grids.write(number, text) {
                continue;
            }
            let said = reading(&text.content, job);
            let held = contents.held(&text.layer, text.look);
            held.texts += 1;
            held.text_m.push(text.height_m);
            match &said {
                Reading::Thickness(_) => held.thicknesses += 1,
                Reading::Height(_) => held.heights += 1,
                Reading::Mark { strands: true, .. } => held.strands += 1,
                Reading::Offered(family) => *held.offered.entry(family).or_default() += 1,
                Reading::Mark { .. } => {
                    let mark = text.content.trim().to_owned();
                    *held.bare_marks.entry(mark).or_default() += 1;
                }
                Reading::Unread => {}
            }
            held.hints(&text.content, &said, job);
            keep_sample(&mut held.samples, &text.content, said);
        }
        let at_ends: Vec<usize> = contents.at_ends.insert_layers.keys().copied().collect();
        for insert in at_ends.iter().filter_map(|&at| drawing.inserts.get(at)) {
            contents.held(&insert.layer, insert.look).blocks_at_ends += 1;
        }
        for (layer, looks) in &contents.looks {
            let mut whole = Held::default();
            for held in looks.values() {
                whole.add(held);
            }
            contents.layers.insert(layer.clone(), whole);
        }
        let looks = contents.looks.values_mut().flat_map(BTreeMap::values_mut);
        contents
            .layers
            .values_mut()
            .chain(looks)
            .for_each(Held::settle);
        contents
    }

    fn held(&mut self, layer: &str, look: Look) -> &mut Held {
        let looks = self.looks.entry(layer.to_owned()).or_default();
        looks.entry(look).or_default()
    }
}

impl Held {
    /// What a text says beyond how it is read: how large its number is, and what it might be.
    fn hints(&mut self, text: &str, said: &Reading, job: &Job) {
        let hint = hint(text, said, job);
        self.heights_mm.extend(hint.height_mm);
        self.thicknesses_mm.extend(hint.thickness_mm);
        self.inched += usize::from(hint.inched);
        self.inched_thicknesses += usize::from(hint.inched_thickness);
        if let Some(word) = hint.word {
            *self.words.entry(word).or_default() += 1;
        }
        if let Some((word, number)) = hint.unknown {
            self.unknown.entry(word).or_default().push(number);
        }
    }

    /// `T165` beside `B30` is no thickness but a top.
    fn settle(&mut self) {
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
        self.tell_words();
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

    /// Whether what might be marks or heights, as `B01` or `B30`, is marks: nearly all different, or numbered from 0 on.
    pub(super) fn counts_marks(&self) -> bool {
        let all: usize = self.bare_marks.values().sum();
        let nought = |mark: &String| {
            mark.trim_start_matches(|sign: char| !sign.is_ascii_digit())
                .starts_with('0')
        };
        let noughts = self.bare_marks.keys().filter(|mark| nought(mark)).count();
        all > 0 && (5 * self.bare_marks.len() >= 4 * all || 2 * noughts > self.bare_marks.len())
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

    fn add(&mut self, other: &Self) {
        self.open_m.extend(&other.open_m);
        self.spans.extend(&other.spans);
        self.closed_m.extend(&other.closed_m);
        self.ends_marked += other.ends_marked;
        self.blocks_at_ends += other.blocks_at_ends;
        self.texts += other.texts;
        self.text_m.extend(&other.text_m);
        for (mark, count) in &other.bare_marks {
            *self.bare_marks.entry(mark.clone()).or_default() += count;
        }
        self.thicknesses += other.thicknesses;
        self.heights += other.heights;
        self.strands += other.strands;
        self.heights_mm.extend(&other.heights_mm);
        self.thicknesses_mm.extend(&other.thicknesses_mm);
        self.inched += other.inched;
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
