//! Texts that leaders name by handle, found again where they were placed.

use std::collections::{BTreeMap, BTreeSet};
use std::ops::Range;

use super::leaders::{Pointing, What};

/// Texts by the handle of their record; a handle holds within one placed block, or within model space.
#[derive(Debug, Default)]
pub(super) struct Answers {
    called: BTreeSet<String>,
    given: BTreeMap<(usize, String), Range<usize>>,
}

impl Answers {
    /// Waits for the records that these leaders name.
    pub(super) fn to<'p>(leaders: impl Iterator<Item = &'p Pointing>) -> Self {
        let called = leaders.filter_map(|leader| match &leader.what {
            What::Leader(lines) => lines.annotation.clone(),
            What::Dot(_) => None,
        });
        Self {
            called: called.collect(),
            given: BTreeMap::new(),
        }
    }

    /// Notes which texts a record gave, if a leader names it.
    pub(super) fn note(&mut self, expansion: usize, handle: Option<&str>, texts: Range<usize>) {
        if self.called.is_empty() || texts.is_empty() {
            return;
        }
        if let Some(handle) = handle
            && self.called.contains(handle)
        {
            self.given.insert((expansion, handle.to_owned()), texts);
        }
    }

    /// The texts of the record that a leader of the same block names.
    pub(super) fn of(&self, expansion: usize, handle: Option<&str>) -> Range<usize> {
        let found = handle.and_then(|handle| self.given.get(&(expansion, handle.to_owned())));
        found.cloned().unwrap_or(0..0)
    }
}
