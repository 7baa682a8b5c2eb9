//! A regular expression of the job file: sound, able to match, and with the groups that its key reads.

use std::ops::Range;

use regex::Regex;

use super::automaton::{
    Sought, group_holds_number, group_takes_part, matches_something, words_of_group,
};
use super::key::{Key, Kind, quoted};
use super::reading::{Reader, nearest, plain};

/// Groups that hold a number, and what kind.
const NUMBERS: [(&str, Sought); 9] = [
    ("value", Sought::Length),
    ("tendons", Sought::Count),
    ("strands", Sought::Count),
    ("force", Sought::Length),
    ("force_per_width", Sought::Length),
    ("top", Sought::Length),
    ("soffit", Sought::Length),
    ("down", Sought::Length),
    ("number", Sought::Count),
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
            Err(regex::Error::CompiledTooBig(_)) => {
                self.too_large(key, span);
                return None;
            }
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
        if self.budget.is_spent() {
            self.too_large(key, span);
            return None;
        }
        if !matches_something(text, &mut self.budget) {
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
        self.groups_can_be_read(key, text, &names, span)
            .then_some(regex)
    }

    /// Whether each group stands where some line leads, and what is a number can be one.
    fn groups_can_be_read(
        &mut self,
        key: &Key,
        text: &str,
        names: &[&str],
        span: &Range<usize>,
    ) -> bool {
        let apart = names
            .iter()
            .find(|name| !group_takes_part(text, name, &mut self.budget));
        if let Some(apart) = apart {
            self.mistake(
                span.clone(),
                format!(
                    "the group `{apart}` of this pattern of `{}` stands where no line of text leads",
                    key.name
                ),
                "expected some text that fits the pattern and fills the group",
                "look for ^ behind a text, $ before one, or \\b inside a word in the group's branch",
            );
            return false;
        }
        let empty = NUMBERS.iter().find(|(name, sought)| {
            names.contains(name) && !group_holds_number(text, name, *sought, &mut self.budget)
        });
        if let Some((empty, sought)) = empty {
            let (found, expected) = match sought {
                Sought::Count => ("whole number", "digits alone, no more than ten"),
                Sought::Line | Sought::Length => (
                    "number",
                    "digits with one decimal point at most, and no letter before them",
                ),
            };
            self.mistake(
                span.clone(),
                format!("this pattern of `{}` can never match a {found}: what its group `{empty}` takes is none", key.name),
                format!("expected {expected} inside (?<{empty}>...)"),
                format!("write the part that is the number as (?<{empty}>\\d+)"),
            );
            return false;
        }
        if let Some(words) = words_of_group(text, "word").filter(|words| !words.is_empty()) {
            self.pattern_words.push((words, span.clone()));
        }
        true
    }

    /// A pattern that takes too much to compile, or the first for which nothing is left.
    fn too_large(&mut self, key: &Key, span: &Range<usize>) {
        self.mistake(
            span.clone(),
            format!("this pattern of `{}`, after those before it, is too large to be checked", key.name),
            "expected patterns that stay small when their repetitions are written out",
            "write + or * for counted repetitions such as {1,100}, [A-Z] for \\p{L} and [0-9A-Z] for \\w, or give fewer patterns",
        );
    }

    /// Words that patterns take for high or low and no list of the job holds.
    pub(super) fn pattern_words(&mut self) {
        let conventions = &self.job.conventions;
        let known: Vec<String> = [
            &conventions.high_words,
            &conventions.low_words,
            &conventions.middle_words,
        ]
        .into_iter()
        .flatten()
        .map(|word| bare(word))
        .collect();
        for (words, span) in std::mem::take(&mut self.pattern_words) {
            let read = |word: &String| bare(word).is_empty() || known.contains(&bare(word));
            if words.iter().any(read) {
                continue;
            }
            let words: Vec<&str> = words.iter().map(String::as_str).collect();
            let words = plain(&quoted(&words));
            self.mistake(
                span,
                format!("this pattern of `patterns` can never give a height: its group `word` takes {words}, and no list holds one of them"),
                "expected a word of high_words, low_words or middle_words",
                "add the words to the lists of [height], or write `word = \"high\"` in the pattern's table and take the group out",
            );
        }
    }
}

/// A word as labels are compared with lists: letters and digits alone, in one case.
fn bare(word: &str) -> String {
    let letters = word
        .chars()
        .filter(|sign| !sign.is_whitespace() && !matches!(sign, '.' | '-'));
    letters.collect::<String>().to_uppercase()
}
