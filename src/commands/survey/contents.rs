//! What a drawing holds, counted: layers, blocks at line ends, texts by what they say.

use std::collections::BTreeMap;
use std::collections::BTreeSet;

use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::readings::{Reading, hint, reading};
use crate::drawing::{Drawing, Shape};
use crate::job::Job;

/// Texts shown of each layer.
const SAMPLES: usize = 4;

/// What a drawing holds.
#[derive(Debug, Default)]
pub(super) struct Contents {
    /// By layer.
    pub(super) layers: BTreeMap<String, LayerContents>,
    /// Line ends at which a block of this name stands.
    pub(super) blocks_at_ends: BTreeMap<String, usize>,
}

/// What lies on a layer.
#[derive(Debug, Default)]
pub(super) struct LayerContents {
    /// Lengths of its open lines, metres.
    pub(super) open_m: Vec<f64>,
    /// Closed lines.
    pub(super) closed: usize,
    /// Ends of its open lines at which some block stands.
    pub(super) ends_with_block: usize,
    /// Its blocks that stand at line ends of other layers or its own.
    pub(super) blocks_at_ends: usize,
    /// Texts.
    pub(super) texts: usize,
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
    /// Texts of families that a survey offers, by the family's name.
    pub(super) offered: BTreeMap<&'static str, usize>,
    /// A few different texts, with what each says.
    pub(super) samples: BTreeMap<String, Reading>,
}

impl Contents {
    /// Counts what a drawing holds; texts are read by the job's patterns.
    pub(super) fn of(drawing: &Drawing, job: &Job) -> Self {
        let mut contents = Self::default();
        contents.lines(drawing, job.conventions.end_reach_m);
        for text in &drawing.texts {
            let said = reading(&text.content, job);
            let layer = contents.layers.entry(text.layer.clone()).or_default();
            layer.texts += 1;
            match &said {
                Reading::Thickness(_) => layer.thicknesses += 1,
                Reading::Height(_) => layer.heights += 1,
                Reading::Mark { strands: true, .. } => layer.strands += 1,
                Reading::Offered(family) => *layer.offered.entry(family).or_default() += 1,
                Reading::Mark { .. } | Reading::Unread => {}
            }
            layer.hints(&text.content, &said, job);
            keep_sample(&mut layer.samples, &text.content, said);
        }
        contents.layers.values_mut().for_each(LayerContents::settle);
        contents
    }

    fn lines(&mut self, drawing: &Drawing, reach_m: f64) {
        let inserts: Vec<GeomWithData<[f64; 2], usize>> = drawing
            .inserts
            .iter()
            .enumerate()
            .map(|(index, insert)| GeomWithData::new([insert.place.x, insert.place.y], index))
            .collect();
        let index = RTree::bulk_load(inserts);
        // Lines of a block lie at their own insert: they are no tendons that it marks.
        let of_blocks: BTreeSet<&str> = drawing
            .inserts
            .iter()
            .map(|insert| insert.handle.as_str())
            .collect();
        let mut at_ends: BTreeSet<usize> = BTreeSet::new();
        for shape in &drawing.shapes {
            if of_blocks.contains(shape.handle.as_str()) {
                continue;
            }
            let layer = self.layers.entry(shape.layer.clone()).or_default();
            if shape.closed {
                layer.closed += 1;
                continue;
            }
            layer.open_m.push(shape.path.length_m());
            for place in ends(shape) {
                let near = index
                    .locate_within_distance(place, reach_m * reach_m)
                    .min_by(|one, other| {
                        let key = |entry: &GeomWithData<[f64; 2], usize>| {
                            let [x, y] = *entry.geom();
                            (x - place[0]).hypot(y - place[1])
                        };
                        key(one)
                            .total_cmp(&key(other))
                            .then(one.data.cmp(&other.data))
                    });
                let Some(insert) = near.and_then(|entry| drawing.inserts.get(entry.data)) else {
                    continue;
                };
                layer.ends_with_block += 1;
                *self.blocks_at_ends.entry(insert.block.clone()).or_default() += 1;
                at_ends.extend(near.map(|entry| entry.data));
            }
        }
        for insert in at_ends
            .iter()
            .filter_map(|&index| drawing.inserts.get(index))
        {
            self.layers
                .entry(insert.layer.clone())
                .or_default()
                .blocks_at_ends += 1;
        }
    }
}

impl LayerContents {
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
    }

    /// `T165` beside `B30` is no thickness but a top.
    fn settle(&mut self) {
        if self.thicknesses > 0 && self.words.keys().any(|word| word == "B") {
            self.words.insert("T".to_owned(), self.thicknesses);
            self.heights_mm.append(&mut self.thicknesses_mm);
            self.inched += std::mem::take(&mut self.inched_thicknesses);
            self.thicknesses = 0;
        }
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
}

fn ends(shape: &Shape) -> impl Iterator<Item = [f64; 2]> {
    [shape.path.start(), shape.path.end()]
        .into_iter()
        .flatten()
        .map(|place| [place.x, place.y])
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
