//! What is said of labels, by the tendons near to them.

use super::contradicted::Contradiction;
use super::heights::{Doubt, Settled};
use super::index::Index;
use super::lacks::Stray;
use super::lines::Line;
use super::marks::Marks;
use super::points::words;
use super::readings::{HeightText, Word};
use super::rules::{LABEL_AMBIGUOUS, LABEL_CONTRADICTED, LABEL_UNCLAIMED};
use super::types::PointKind;
use crate::drawing::Text;
use crate::finding::{Finding, Level, Wording};
use crate::units::{LONG, Units};

/// A label that nobody claims is told by the nearest tendon within this many times its reach.
const SEEN: f64 = 4.0;
/// It says that a tendon lacks a height within this many times its reach.
const LACKING: f64 = 2.0;
/// Where no tendon is so near, it says that the nearest lacks one, within this many times its reach: a label may have
/// slid off its tendon, and none is written for nothing. As near as the nearest is what this many times as far lies.
const SLID: f64 = 12.0;
const AS_NEAR: f64 = 1.25;

/// Words for labels, by the tendons near to them.
pub(super) struct Near<'a> {
    pub(super) lines: &'a [Line],
    pub(super) index: &'a Index,
    pub(super) names: &'a [String],
    pub(super) reach: f64,
}

impl Near<'_> {
    pub(super) fn marks(&self, texts: &[&Text], marks: &Marks) -> Vec<Finding> {
        let mut findings: Vec<Finding> = marks
            .unclaimed
            .iter()
            .map(|&label| self.unclaimed(texts[label]))
            .collect();
        findings.extend(marks.doubts.iter().map(|doubt| {
            let text = texts[doubt.label];
            let [here, there] = doubt.lines.map(|line| &self.lines[line].handle);
            let (level, tail) = if doubt.tied {
                (
                    Level::Error,
                    format!("fits the lines with handles {here} and {there} equally well; neither was given it"),
                )
            } else {
                (
                    Level::Warning,
                    format!(
                        "was taken for the line with handle {here}, but fits the one with handle {there} about as well"
                    ),
                )
            };
            Finding::new(
                &LABEL_AMBIGUOUS,
                level,
                format!("mark {:?} {tail}", text.content),
                "move the mark nearer to its tendon, along it",
            )
            .on_tendon(&self.names[doubt.lines[0]])
            .at_place(text.place)
        }));
        findings.extend(self.contradicted(texts, &marks.contradicted, "of one tendon"));
        findings
    }

    fn contradicted(&self, texts: &[&Text], found: &[Contradiction], of: &str) -> Vec<Finding> {
        let finding = |found: &Contradiction| {
            let mut said = found.labels.map(|label| texts[label].content.as_str());
            said.sort_unstable();
            Finding::new(
                &LABEL_CONTRADICTED,
                Level::Error,
                format!(
                    "labels {:?} and {:?} {of} contradict one another: neither was used where they differ",
                    said[0], said[1]
                ),
                "delete the one that is wrong, or move it to the tendon that it is meant for",
            )
            .on_tendon(&self.names[found.host])
            .at_station(found.station_m)
            .at_place(texts[found.labels[1]].place)
        };
        found.iter().map(finding).collect()
    }

    pub(super) fn heights(
        &self,
        texts: &[&Text],
        readings: &[HeightText],
        settled: &Settled,
    ) -> Vec<Finding> {
        let unclaimed = settled.unclaimed.iter();
        let mut findings: Vec<Finding> = unclaimed
            .map(|&label| self.unclaimed(texts[label]))
            .collect();
        findings.extend(settled.doubts.iter().map(|doubt| {
            let here = &self.names[doubt.hosts[0]];
            let there = &self.names[doubt.hosts[1]];
            let (level, tail) = if doubt.tied {
                (
                    Level::Error,
                    format!("fits {here} and {there} equally well; neither was given it"),
                )
            } else {
                (
                    Level::Warning,
                    format!("was taken for {here}, but fits {there} about as well"),
                )
            };
            Finding::new(
                &LABEL_AMBIGUOUS,
                level,
                Wording::of(|units| {
                    format!("height {} {tail}", words(readings[doubt.label], units))
                }),
                "move the label nearer to its tendon, or turn it along the tendon",
            )
            .on_tendon(here)
            .at_station(doubt.stations_m[0])
            .at_place(texts[doubt.label].place)
        }));
        findings.extend(self.contradicted(texts, &settled.contradicted, "at one place"));
        findings
    }

    fn unclaimed(&self, text: &Text) -> Finding {
        let reach_m = self.reach * text.height_m;
        let nearest = self
            .index
            .feet(text.place, SEEN * reach_m)
            .into_iter()
            .min_by(|a, b| a.distance_m.total_cmp(&b.distance_m));
        let tail = |units: Units| {
            let long = |length_m: f64| units.of(LONG).said(length_m, 2);
            let Some(foot) = &nearest else {
                return format!("no tendon is within {}", long(SEEN * reach_m));
            };
            let (name, off) = (&self.names[foot.line], long(foot.distance_m));
            if foot.distance_m > reach_m {
                let reach = long(reach_m);
                format!("{name}, the nearest, is {off} off and the reach is {reach}")
            } else {
                format!("{name}, {off} off, has its own label there")
            }
        };
        let finding = Finding::new(
            &LABEL_UNCLAIMED,
            Level::Warning,
            Wording::of(|units| {
                format!(
                    "label {:?} belongs to no tendon: {}",
                    text.content,
                    tail(units)
                )
            }),
            "move the label to its tendon, or delete it",
        )
        .at_place(text.place);
        match nearest {
            Some(foot) => finding
                .on_tendon(&self.names[foot.line])
                .at_station(foot.station_m),
            None => finding,
        }
    }

    /// A label without a tendon, beside each tendon that it is near to.
    pub(super) fn beside(&self, text: &Text, kind: Option<PointKind>) -> Vec<Stray> {
        let reach_m = self.reach * text.height_m;
        let mut feet = self.index.feet(text.place, LACKING * reach_m);
        if feet.is_empty() && kind.is_some() {
            feet = self.index.feet(text.place, SLID * reach_m);
            let nearest_m = feet.iter().map(|foot| foot.distance_m);
            let nearest_m = nearest_m.fold(f64::INFINITY, f64::min);
            feet.retain(|foot| foot.distance_m <= AS_NEAR * nearest_m);
        }
        feet.into_iter()
            .map(|foot| Stray {
                line: foot.line,
                station_m: foot.station_m,
                kind,
                content: text.content.clone(),
            })
            .collect()
    }

    /// Labels without a tendon, beside each tendon that they are near to.
    pub(super) fn strays(
        &self,
        texts: &[&Text],
        readings: &[HeightText],
        settled: &Settled,
        unread: &[&Text],
    ) -> Vec<Stray> {
        let mut strays: Vec<Stray> = Vec::new();
        for &label in &settled.unclaimed {
            strays.extend(self.beside(texts[label], kind(readings[label])));
        }
        strays.extend(unread.iter().flat_map(|text| self.beside(text, None)));
        for Doubt {
            label,
            hosts,
            stations_m,
            ..
        } in settled.doubts.iter().filter(|d| d.tied)
        {
            strays.extend(
                hosts
                    .iter()
                    .zip(stations_m)
                    .map(|(&line, &station_m)| Stray {
                        line,
                        station_m,
                        kind: kind(readings[*label]),
                        content: texts[*label].content.clone(),
                    }),
            );
        }
        strays
    }
}

/// High or low, where the label says so.
pub(super) fn kind(reading: HeightText) -> Option<PointKind> {
    reading.word.map(|word| match word {
        Word::High => PointKind::High,
        Word::Low => PointKind::Low,
    })
}
