//! What is said of records that are left out: each thing once, and not without end.

use super::Gatherer;
use crate::drawing::rules::{BLOCK_TOO_MANY, ENTITY_DAMAGED};
use crate::finding::{Finding, Level, Rule};

/// Findings of one rule that are told one by one; of the rest only the number is.
pub(in crate::drawing) const MOST_TOLD: usize = 20;

impl Gatherer<'_> {
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

    /// Takes one entity, with what weighs beyond it, from what may still be expanded.
    pub(super) fn spend(&mut self, handle: &str, weight: usize) -> bool {
        let room = self.expansion.spend(weight);
        if !room {
            let (cap, remedy) = self.expansion.words();
            self.tell(&BLOCK_TOO_MANY, Level::Error, 0, || {
                (
                    format!(
                        "block inserts expand to {cap} (at insert {handle}); the rest is left out"
                    ),
                    remedy,
                )
            });
        }
        room
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
