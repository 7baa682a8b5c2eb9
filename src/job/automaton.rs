//! What a pattern can match at all, decided on its automaton: every state that some text leads to is visited, so the
//! answer does not depend on samples.

use std::collections::BTreeSet;

use regex_automata::dfa::{Automaton, StartKind, dense};
use regex_automata::nfa::thompson;
use regex_automata::util::primitives::StateID;
use regex_automata::{Anchored, Input, MatchKind};
use regex_syntax::hir::literal::Extractor;
use regex_syntax::hir::{Capture, Class, ClassUnicode, Hir, HirKind, Repetition};

/// Bytes that an automaton may take; a pattern beyond this is taken as it is, undecided.
const SIZE_LIMIT: usize = 2 << 20;
/// Bytes that the automata of all patterns of a file may take together: a few seconds' work.
const ALL_LIMIT: usize = 64 << 20;
/// Bytes that a visited state counts for.
const VISIT: usize = 64;

/// What is left to be spent on the patterns of a file. Counted in bytes, not by the clock, so that a file that passes
/// once always does.
#[derive(Debug)]
pub(super) struct Budget(usize);

impl Default for Budget {
    fn default() -> Self {
        Self(ALL_LIMIT)
    }
}

impl Budget {
    pub(super) fn is_spent(&self) -> bool {
        self.0 == 0
    }

    fn spend(&mut self, bytes: usize) {
        self.0 = self.0.saturating_sub(bytes);
    }
}

/// Whether some line of text matches: one without a line break, and without blanks at its ends, since that is how
/// labels are read. `true` also where the automaton would be too large to tell.
pub(super) fn matches_something(expression: &str, budget: &mut Budget) -> bool {
    regex_syntax::parse(expression)
        .is_ok_and(|hir| some_text(&hir, StartKind::Unanchored, Seen::of(Sought::Line), budget))
}

/// Whether some line of text matches so that a named group takes part. `true` also where the automaton would be too
/// large to tell, or where there is no such group.
pub(super) fn group_takes_part(expression: &str, group: &str, budget: &mut Budget) -> bool {
    let Ok(hir) = regex_syntax::parse(expression) else {
        return true;
    };
    // Where the group stands in every match, what holds of the whole holds of it.
    with_group(&hir, group).is_none_or(|with| {
        with == hir || some_text(&with, StartKind::Unanchored, Seen::of(Sought::Line), budget)
    })
}

/// Whether what a named group holds may be a number of this kind. `true` also where the automaton would be too large
/// to tell, or where there is no such group.
pub(super) fn group_holds_number(
    expression: &str,
    group: &str,
    sought: Sought,
    budget: &mut Budget,
) -> bool {
    let Ok(hir) = regex_syntax::parse(expression) else {
        return true;
    };
    let mut groups = Vec::new();
    named(&hir, group, &mut groups);
    groups.is_empty()
        || groups
            .into_iter()
            .any(|group| some_text(group, StartKind::Anchored, Seen::of(sought), budget))
}

/// All that a named group can hold, where it stands in every match and that is a short list.
pub(super) fn words_of_group(expression: &str, name: &str) -> Option<Vec<String>> {
    let hir = regex_syntax::parse(expression).ok()?;
    let mut groups = Vec::new();
    named(&hir, name, &mut groups);
    let [group] = groups[..] else {
        return None;
    };
    if with_group(&hir, name)? != hir {
        return None;
    }
    let words = Extractor::new().extract(group);
    if !words.is_exact() {
        return None;
    }
    let words = words.literals()?;
    let written = words
        .iter()
        .map(|word| str::from_utf8(word.as_bytes()).ok());
    written.map(|word| word.map(str::to_owned)).collect()
}

/// The expression with one of the branches taken in which a named group stands; `None` where none is. Around a repeated
/// one, any others may stand.
fn with_group(hir: &Hir, name: &str) -> Option<Hir> {
    match hir.kind() {
        HirKind::Capture(capture) if capture.name.as_deref() == Some(name) => Some(hir.clone()),
        HirKind::Capture(capture) => {
            let sub = Box::new(with_group(&capture.sub, name)?);
            Some(Hir::capture(Capture {
                sub,
                ..capture.clone()
            }))
        }
        HirKind::Repetition(repetition) => {
            let one = with_group(&repetition.sub, name)?;
            match (repetition.min, repetition.max) {
                (_, Some(0)) => None,
                (1, Some(1)) => Some(Hir::repetition(Repetition {
                    sub: Box::new(one),
                    ..repetition.clone()
                })),
                (_, Some(1)) => Some(one),
                _ => {
                    let others = Hir::repetition(Repetition {
                        min: 0,
                        max: None,
                        ..repetition.clone()
                    });
                    Some(Hir::concat(vec![others.clone(), one, others]))
                }
            }
        }
        HirKind::Concat(parts) => {
            let at = parts.iter().position(|part| has_group(part, name))?;
            let mut parts = parts.clone();
            let part = parts.get_mut(at)?;
            *part = with_group(part, name)?;
            Some(Hir::concat(parts))
        }
        HirKind::Alternation(parts) => {
            let with: Vec<Hir> = parts.iter().filter_map(|p| with_group(p, name)).collect();
            (!with.is_empty()).then(|| Hir::alternation(with))
        }
        HirKind::Empty | HirKind::Literal(_) | HirKind::Class(_) | HirKind::Look(_) => None,
    }
}

fn has_group(hir: &Hir, name: &str) -> bool {
    let mut groups = Vec::new();
    named(hir, name, &mut groups);
    !groups.is_empty()
}

/// Whether some text leads to a match.
fn some_text(hir: &Hir, start: StartKind, seen: Seen, budget: &mut Budget) -> bool {
    if budget.is_spent() {
        return true;
    }
    // Automata know word boundaries between ASCII alone. They decide where ASCII can stand for everything else.
    let bounded = hir.properties().look_set().contains_word_unicode();
    if bounded && !ascii_stands_for_all(hir) {
        return true;
    }
    let greatest = if bounded { 0x7F } else { u8::MAX };
    let Some(dfa) = automaton(hir, start) else {
        budget.spend(SIZE_LIMIT);
        return true;
    };
    budget.spend(dfa.memory_usage());
    reaches_match(&dfa, start, seen, greatest, budget)
}

/// Whether each character that the expression may take has one of ASCII in its place that is a word character like it.
fn ascii_stands_for_all(hir: &Hir) -> bool {
    match hir.kind() {
        HirKind::Literal(literal) => literal.0.is_ascii(),
        HirKind::Class(Class::Unicode(class)) => [
            (r"[\w--[:ascii:]]", r"[\w&&[:ascii:]]"),
            (r"[\W--[:ascii:]]", r"[\W&&[:ascii:]]"),
        ]
        .into_iter()
        .all(|(beyond, within)| !meets(class, beyond) || meets(class, within)),
        HirKind::Class(Class::Bytes(_)) | HirKind::Empty | HirKind::Look(_) => true,
        HirKind::Capture(capture) => ascii_stands_for_all(&capture.sub),
        HirKind::Repetition(repetition) => ascii_stands_for_all(&repetition.sub),
        HirKind::Concat(parts) | HirKind::Alternation(parts) => {
            parts.iter().all(ascii_stands_for_all)
        }
    }
}

/// Whether two classes share a character.
fn meets(class: &ClassUnicode, other: &str) -> bool {
    let other = regex_syntax::parse(other).map(Hir::into_kind);
    let Ok(HirKind::Class(Class::Unicode(mut other))) = other else {
        return false;
    };
    other.intersect(class);
    !other.ranges().is_empty()
}

fn named<'h>(hir: &'h Hir, name: &str, found: &mut Vec<&'h Hir>) {
    match hir.kind() {
        HirKind::Capture(capture) if capture.name.as_deref() == Some(name) => {
            found.push(&capture.sub);
        }
        HirKind::Capture(capture) => named(&capture.sub, name, found),
        HirKind::Repetition(repetition) => named(&repetition.sub, name, found),
        HirKind::Concat(parts) | HirKind::Alternation(parts) => {
            for part in parts {
                named(part, name, found);
            }
        }
        HirKind::Empty | HirKind::Literal(_) | HirKind::Class(_) | HirKind::Look(_) => {}
    }
}

fn automaton(hir: &Hir, start: StartKind) -> Option<dense::DFA<Vec<u32>>> {
    let nfa = thompson::Compiler::new()
        .configure(thompson::Config::new().nfa_size_limit(Some(SIZE_LIMIT)))
        .build_from_hir(hir)
        .ok()?;
    dense::Builder::new()
        .configure(
            dense::Config::new()
                // All matches, so that a preferred alternative does not hide what another would take.
                .match_kind(MatchKind::All)
                .start_kind(start)
                .accelerate(false)
                .unicode_word_boundary(true)
                .dfa_size_limit(Some(SIZE_LIMIT))
                .determinize_size_limit(Some(SIZE_LIMIT)),
        )
        .build_from_nfa(&nfa)
        .ok()
}

/// What is remembered of the text that led to a state.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
struct Seen {
    sought: Sought,
    /// Nothing has been read yet.
    nothing: bool,
    /// Line: the last byte is a blank. Number: no digit so far, or none but 0 where it counts something.
    lacking: bool,
    /// Length: 1 within the digits after a point. Count: how many digits so far.
    run: u8,
}

/// What a text is sought to be.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Sought {
    /// A line of text.
    Line,
    /// A length or force: digits, one point or comma in a row of them, no letters but those of a unit behind.
    Length,
    /// A whole number above 0 with no more digits than 32 bits hold.
    Count,
}

/// Letters that may follow the digits of a length (in, mm, cm, m) or of a power of ten.
const LETTERS: &[u8] = b"INMCE";
/// Digits of the greatest whole number of 32 bits.
const MOST_DIGITS: u8 = 10;

impl Seen {
    fn of(sought: Sought) -> Self {
        Self {
            sought,
            nothing: true,
            lacking: sought != Sought::Line,
            run: 0,
        }
    }

    /// After one more byte; `None` where nothing that is sought has it there.
    fn then(self, byte: u8) -> Option<Self> {
        let blank = byte.is_ascii_whitespace() || byte == 0x0B;
        let digit = byte.is_ascii_digit();
        if byte == b'\n' {
            return None;
        }
        let (lacking, run) = match self.sought {
            Sought::Line if self.nothing && blank => return None,
            Sought::Line => (blank, 0),
            Sought::Length => {
                let unit = !self.lacking && LETTERS.contains(&byte.to_ascii_uppercase());
                let point = byte == b'.';
                if (byte.is_ascii_alphabetic() && !unit) || (point && self.run == 1) {
                    return None;
                }
                let lacking = self.lacking && byte.is_ascii() && !digit;
                let within = self.run == 1 && (digit || !byte.is_ascii());
                (lacking, u8::from(point || within))
            }
            Sought::Count => {
                let run = self.run + u8::from(digit);
                if !(digit || blank || byte == b'+') || run > MOST_DIGITS {
                    return None;
                }
                (self.lacking && !matches!(byte, b'1'..=b'9'), run)
            }
        };
        Some(Self {
            nothing: false,
            lacking,
            run,
            ..self
        })
    }
}

/// Visits every state that can be reached. A match is known one byte late: the state after that byte tells of the text
/// before it, which for a whole line may then go on in any way.
fn reaches_match(
    dfa: &dense::DFA<Vec<u32>>,
    start: StartKind,
    seen: Seen,
    greatest: u8,
    budget: &mut Budget,
) -> bool {
    let anchored = match start {
        StartKind::Anchored => Anchored::Yes,
        _ => Anchored::No,
    };
    let Ok(start) = dfa.start_state_forward(&Input::new("").anchored(anchored)) else {
        return true;
    };
    let mut visited: BTreeSet<(StateID, Seen)> = BTreeSet::from([(start, seen)]);
    let mut open = vec![(start, seen)];
    while let Some((state, seen)) = open.pop() {
        budget.spend(VISIT);
        if budget.is_spent() {
            return true;
        }
        if !seen.lacking && dfa.is_match_state(dfa.next_eoi_state(state)) {
            return true;
        }
        for byte in 0..=greatest {
            let Some(after) = seen.then(byte) else {
                continue;
            };
            let next = dfa.next_state(state, byte);
            let told = dfa.is_match_state(next) && (seen.sought == Sought::Line || !seen.lacking);
            if told || dfa.is_quit_state(next) {
                return true;
            }
            if !dfa.is_dead_state(next) && visited.insert((next, after)) {
                open.push((next, after));
            }
        }
    }
    false
}

#[cfg(test)]
mod tests;
