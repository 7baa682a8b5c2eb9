//! A regular expression of the job file: sound, able to match, and with the groups that its key reads.

use std::ops::Range;

use regex::Regex;

use super::automaton::{group_holds_number, matches_something};
use super::key::{Key, Kind};
use super::reading::{Reader, nearest, plain};

/// Groups that hold a number.
const NUMBERS: [&str; 8] = [
    "value",
    "tendons",
    "strands",
    "force",
    "force_per_width",
    "top",
    "soffit",
    "number",
];

impl Reader {
    /// A regular expression that can match, with the groups of its key.
    pub(super) fn expression(
        &mut self,
        key: &Key,
        text: &str,
        span: &Range<usize>,
    ) -> Option<Regex> {
        let (groups, also): (&[&str], &[&str]) = match &key.kind {
            Kind::Expressions { groups, also, .. } => (groups, also),
            _ => (&[], &[]),
        };
        let first = groups.first().copied().unwrap_or("value");
        let regex = match Regex::new(text) {
            Ok(regex) => regex,
            Err(error) => {
                let reason = error.to_string();
                let reason = reason.lines().last().unwrap_or_default();
                self.mistake(
                    span.clone(),
                    format!("`{}` holds a broken regular expression: {}", key.name, plain(reason.trim_start_matches("error: "))),
                    format!("expected {}", key.expected()),
                    "put the pattern in 'single quotes', where a backslash needs no doubling, and close every bracket",
                );
                return None;
            }
        };
        let names: Vec<&str> = regex.capture_names().flatten().collect();
        let known = |name: &&str| groups.contains(name) || also.contains(name);
        if let Some(strange) = names.iter().find(|name| !known(name)) {
            let all = [groups, also].concat();
            let near = nearest(strange, all.iter().copied()).unwrap_or(first);
            self.mistake(
                span.clone(),
                format!(
                    "this pattern of `{}` has an unknown group `{strange}`",
                    key.name
                ),
                format!("the groups are {}", all.join(", ")),
                format!("did you mean (?<{near}>...)? A group without a name is (?:...)"),
            );
            return None;
        }
        if !names.iter().any(|name| groups.contains(name)) {
            self.mistake(
                span.clone(),
                format!(
                    "this pattern of `{}` has no group that says what it found",
                    key.name
                ),
                format!("expected {}", key.expected()),
                format!("put the part that is wanted in (?<{first}>...)"),
            );
            return None;
        }
        if !matches_something(text) {
            self.mistake(
                span.clone(),
                format!(
                    "this pattern of `{}` can never match: no line of text fits it",
                    key.name
                ),
                "expected a pattern of a single line, without blanks at its ends",
                "look for text before ^ or after $, a blank next to them, or \\b inside a word",
            );
            return None;
        }
        let empty = names
            .iter()
            .find(|name| NUMBERS.contains(name) && !group_holds_number(text, name));
        if let Some(empty) = empty {
            self.mistake(
                span.clone(),
                format!("this pattern of `{}` can never match a number: its group `{empty}` takes no digit", key.name),
                format!("expected the digits inside (?<{empty}>...)"),
                format!("write the part that is the number as (?<{empty}>\\d+)"),
            );
            return None;
        }
        Some(regex)
    }
}
