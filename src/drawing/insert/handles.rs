//! Supply for new records: which numbers are free, and what `$HANDSEED` must say afterwards.

use std::ops::Range;

use crate::drawing::handles::{names_a_handle, parse_handle};
use crate::drawing::tags::Tags;

/// Gives out handles in ascending order; or none, for a drawing that has none.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Supply {
    next: Option<u64>,
}

impl Supply {
    /// For a drawing without handles.
    pub(super) fn none() -> Self {
        Self { next: None }
    }

    /// From `first` on.
    pub(super) fn from(first: u64) -> Self {
        Self { next: Some(first) }
    }

    /// A new handle.
    pub(super) fn take(&mut self) -> Option<u64> {
        let handle = self.next?;
        self.next = handle.checked_add(1);
        Some(handle)
    }

    /// The first handle that was not given out.
    pub(super) fn next(self) -> Option<u64> {
        self.next
    }
}

/// What a drawing says about its handles. Earlier marks of ours count only as `own`.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Known {
    /// The greatest handle or pointer, 0 if there is none. A pointer to nothing counts: nothing new may stand there.
    pub(super) greatest: u64,
    /// `$HANDSEED`.
    pub(super) seed: Option<u64>,
    /// Least and greatest handle of earlier marks.
    pub(super) own: Option<(u64, u64)>,
}

impl Known {
    /// The first of `count` handles above everything there is; `None` where 64 bits end before that.
    ///
    /// Earlier marks make room for the new ones, so that the same marks get the same handles again.
    pub(super) fn first_above(self, count: u64) -> Option<u64> {
        let above = self.greatest.checked_add(1)?;
        let fits = |first: u64| first.checked_add(count).map(|_| first);
        let wished = match self.own {
            Some((least, _)) => least,
            None => self.seed.unwrap_or(0),
        };
        // A seed at the very end of the numbers says nothing that would help: what counts is what is used.
        fits(wished.max(above)).or_else(|| fits(above))
    }

    /// The `$HANDSEED` that must be written once `next` is the first handle not given out.
    pub(super) fn seed_after(self, next: u64) -> u64 {
        match (self.seed, self.own) {
            // It was we who raised it, as far as our earlier marks needed.
            (Some(seed), Some((_, greatest))) if seed <= greatest.saturating_add(1) => next,
            (Some(seed), _) => seed.max(next),
            (None, _) => next,
        }
    }
}

/// The first of `count` free handles in a gap between those that are used or pointed at, for a drawing whose greatest
/// handle leaves no room above it; what may be handles in damaged places counts as used. Where earlier marks of ours stood
/// is tried first. Reads the drawing once more.
pub(super) fn first_in_gap(
    bytes: &[u8],
    own_marks: &[Range<usize>],
    passed_over: &[u64],
    own_least: Option<u64>,
    count: u64,
) -> Option<u64> {
    let mut used: Vec<u64> = Tags::new(bytes)
        .forgiving()
        .map_while(Result::ok)
        .filter(|tag| names_a_handle(tag.code))
        .filter(|tag| !stands_in(own_marks, tag.start))
        .filter_map(|tag| parse_handle(tag.word()))
        .chain(passed_over.iter().copied())
        .collect();
    used.sort_unstable();
    let starts = used.iter().filter_map(|handle| handle.checked_add(1));
    own_least
        .into_iter()
        .chain(std::iter::once(1))
        .chain(starts)
        .find(|&first| is_free(&used, first, count))
}

/// Whether an offset lies in one of the ranges, which are in order.
fn stands_in(ranges: &[Range<usize>], at: usize) -> bool {
    let next = ranges.partition_point(|range| range.end <= at);
    ranges.get(next).is_some_and(|range| range.contains(&at))
}

/// Whether `count` numbers from `first` on are free, and one more, so that they do not end at the last number of all.
fn is_free(used: &[u64], first: u64, count: u64) -> bool {
    let Some(last) = first.checked_add(count) else {
        return false;
    };
    let from = used.partition_point(|&handle| handle < first);
    used.get(from).is_none_or(|&handle| handle >= last)
}

#[cfg(test)]
mod tests {
    use super::*;

    const PLAIN: Known = Known {
        greatest: 0x50,
        seed: Some(0x60),
        own: None,
    };

    #[test]
    fn new_handles_stand_above_handles_and_seed() {
        assert_eq!(PLAIN.first_above(5), Some(0x60));
        let behind = Known {
            seed: Some(0x20),
            ..PLAIN
        };
        assert_eq!(behind.first_above(5), Some(0x51));
        assert_eq!(behind.seed_after(0x56), 0x56);
    }

    #[test]
    fn earlier_marks_are_stood_in_for() {
        let marked = Known {
            greatest: 0x6A,
            seed: Some(0x80),
            own: Some((0x6B, 0x7F)),
        };
        assert_eq!(marked.first_above(0x15), Some(0x6B));
        assert_eq!(marked.seed_after(0x80), 0x80);
        // A smaller sheet lowers what we raised, never what somebody else has raised since.
        assert_eq!(marked.seed_after(0x70), 0x70);
        let raised = Known {
            seed: Some(0x90),
            ..marked
        };
        assert_eq!(raised.seed_after(0x70), 0x90);
    }

    #[test]
    fn the_end_of_the_numbers_is_not_overrun() {
        let full = Known {
            greatest: u64::MAX - 3,
            ..PLAIN
        };
        assert_eq!(full.first_above(2), Some(u64::MAX - 2));
        assert_eq!(full.first_above(3), None);
        let seed_at_end = Known {
            seed: Some(u64::MAX),
            ..PLAIN
        };
        assert_eq!(seed_at_end.first_above(3), Some(0x51));
        let mut supply = Supply::from(u64::MAX);
        assert_eq!((supply.take(), supply.take()), (Some(u64::MAX), None));
    }

    #[test]
    fn a_gap_is_found_between_what_is_used_and_pointed_at() {
        let text = b"0\nA\n5\n1\n330\n5\n0\nB\n5\nFFFFFFFFFFFFFFFE\n0\nC\n5\n3\n";
        assert_eq!(first_in_gap(text, &[], &[], None, 1), Some(2));
        assert_eq!(first_in_gap(text, &[], &[], None, 2), Some(6));
        assert_eq!(first_in_gap(text, &[], &[], Some(0x20), 2), Some(0x20));
        assert_eq!(first_in_gap(text, &[], &[], Some(0x5), 2), Some(6));
        assert_eq!(first_in_gap(text, &[], &[7], None, 2), Some(8));
    }
}
