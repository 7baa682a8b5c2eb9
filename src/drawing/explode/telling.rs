//! What is said of records that are left out: each thing once, and not without end.

use super::{Frame, Gatherer, Place};
use crate::drawing::caps::NAME_COPIES;
use crate::drawing::rules::{BLOCK_TOO_MANY, ENTITY_DAMAGED, ENTITY_INVISIBLE};
use crate::finding::{Finding, Level, Rule};

/// Findings of one rule that are told one by one; of the rest only the number is.
pub(in crate::drawing) const MOST_TOLD: usize = 20;

impl Gatherer<'_> {
    /// Leaves out what is not shown. Blocks keep the parts of their other states so, which nobody misses.
    pub(super) fn invisible(&mut self, layer: u32, frame: &Frame<'_>) {
        if frame.handle.is_none() && self.book.wants(layer) {
            self.unseen += 1;
        }
    }

    /// Says that an entity is left out, and why.
    pub(super) fn damaged(&mut self, layer: u32, handle: &str, reason: &str) {
        let layer = self.book.layer_name(layer);
        self.say(&ENTITY_DAMAGED, Level::Error, || {
            (
                format!("entity {handle} on layer {layer} is left out: {reason}"),
                "redraw the entity, or export the drawing again".to_owned(),
            )
        });
    }

    /// Takes one entity of a block from what may still be expanded.
    pub(super) fn spend(&mut self, handle: &str) -> bool {
        let left = self.expansion.spend();
        self.say_if_not(left, handle)
    }

    /// Takes room for something that is kept, with these bytes beyond what any entity takes, and its layer's name.
    pub(super) fn afford(&mut self, place: Place, handle: &str, bytes: usize) -> bool {
        let name = NAME_COPIES.saturating_mul(self.book.layer_name(place.layer).len());
        let left = self
            .expansion
            .take(bytes.saturating_add(name), place.counted);
        self.say_if_not(left, handle)
    }

    fn say_if_not(&mut self, left: bool, handle: &str) -> bool {
        if !left {
            let (grown, remedy) = self.expansion.words();
            self.tell(&BLOCK_TOO_MANY, Level::Error, 0, || {
                (
                    format!("{grown} (at {handle}); the rest is left out"),
                    remedy,
                )
            });
        }
        left
    }

    /// Says something once for each `about`.
    pub(super) fn tell(
        &mut self,
        rule: &'static Rule,
        level: Level,
        about: usize,
        words: impl FnOnce() -> (String, String),
    ) {
        if self.told.insert((rule.name, about)) {
            self.say(rule, level, words);
        }
    }

    /// Says something, or counts it once that rule has spoken often enough.
    pub(super) fn say(
        &mut self,
        rule: &'static Rule,
        level: Level,
        words: impl FnOnce() -> (String, String),
    ) {
        let (.., count) = self.spoken.entry(rule.name).or_insert((rule, level, 0));
        *count += 1;
        if *count <= MOST_TOLD {
            let (text, remedy) = words();
            self.findings.push(Finding::new(rule, level, text, remedy));
        }
    }
}

/// A finding for entities that are not shown.
pub(super) fn unseen(count: usize) -> Option<Finding> {
    let (them, are) = match count {
        0 => return None,
        1 => ("entity", "is"),
        _ => ("entities", "are"),
    };
    Some(Finding::new(
        &ENTITY_INVISIBLE,
        Level::Warning,
        format!(
            "{count} {them} on layers that are read {are} invisible (group 60 of the entity) and left out"
        ),
        "make what is current visible (in most programs: end object isolation) and save the drawing again; delete the rest",
    ))
}

/// A finding for what is not told one by one.
pub(in crate::drawing) fn and_more(
    rule: &'static Rule,
    level: Level,
    count: usize,
) -> Option<Finding> {
    let more = count.checked_sub(MOST_TOLD).filter(|more| *more > 0)?;
    Some(Finding::new(
        rule,
        level,
        format!("and {more} more like the {MOST_TOLD} before, {count} in all"),
        "mend the first ones and run again",
    ))
}
