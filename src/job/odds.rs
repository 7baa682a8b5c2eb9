//! Lists of the job file that exclude one another, and what stands in both of two.

use std::ops::Range;

use super::key::{Kind, quoted};
use super::keys::find;
use super::reading::{Reader, plain};
use crate::patterns::folded;

/// Table, and two of its lists in which one pattern or word cannot stand: what it picks would be two things at once.
/// `layers.tendons` is of either run, so that a layer may be in it and in the list of one run.
pub(crate) const AT_ODDS: &[(&str, &str, &str)] = &[
    ("ends", "live_blocks", "dead_blocks"),
    ("ends", "live_words", "dead_words"),
    ("ends", "live_shapes", "dead_shapes"),
    ("height", "high_words", "low_words"),
    ("height", "high_words", "middle_words"),
    ("height", "low_words", "middle_words"),
    ("layers", "banded", "distributed"),
    ("layers", "banded", "level_lines"),
    ("layers", "distributed", "level_lines"),
    ("layers", "tendons", "level_lines"),
    ("layers", "banded", "slab_edge"),
    ("layers", "distributed", "slab_edge"),
    ("layers", "tendons", "slab_edge"),
    ("layers", "banded", "slab_zone"),
    ("layers", "distributed", "slab_zone"),
    ("layers", "tendons", "slab_zone"),
    ("layers", "slab_edge", "slab_opening"),
    ("layers", "slab_edge", "column"),
    ("layers", "slab_opening", "slab_zone"),
    ("layers", "slab_opening", "column"),
    ("layers", "slab_zone", "column"),
];

impl Reader {
    /// Words and patterns that stand in both of two lists, at least one of them given by the file.
    pub(super) fn at_odds(&mut self) {
        for &(table, one, other) in AT_ODDS {
            let lists = [one, other].map(|name| self.list(table, name));
            let [Some(first), Some(second)] = lists else {
                continue;
            };
            for word in &second {
                if !first.iter().any(|held| same(held, word)) {
                    continue;
                }
                let places = [other, one].map(|name| self.place(table, name, word));
                let Some(span) = places.into_iter().flatten().next() else {
                    continue;
                };
                self.mistake(
                    span,
                    format!("\"{}\" stands in `{one}` and in `{other}`", plain(word)),
                    format!("expected it in one of {}: nothing is both", quoted(&[one, other])),
                    "take it out of one of them; a list that is not given holds its defaults, so give both",
                );
            }
        }
    }

    fn list(&self, table: &str, name: &str) -> Option<Vec<String>> {
        match &find(table, name)?.kind {
            Kind::Words(place) | Kind::Shell(place) | Kind::Choices { place, .. } => {
                Some((place.get)(&self.job).clone())
            }
            _ => None,
        }
    }

    /// Where a word of a list stands in the file, if the file gives the list.
    fn place(&self, table: &str, name: &str, word: &str) -> Option<Range<usize>> {
        let path = format!("{table}.{name}");
        let mut held = self.word_spans.iter();
        let item = held.find(|(list, item, _)| *list == path && same(item, word));
        let item = item.map(|(_, _, span)| span.clone());
        item.or_else(|| self.given.get(&path).cloned())
    }
}

fn same(one: &str, other: &str) -> bool {
    let plain = |word: &str| folded(word).replace('.', "");
    plain(one) == plain(other)
}
