//! What a pattern can match at all, decided on its automaton: every state that some text leads to is visited, so the
//! answer does not depend on samples.

use std::collections::BTreeSet;

use regex_automata::dfa::{Automaton, StartKind, dense};
use regex_automata::nfa::thompson;
use regex_automata::util::primitives::StateID;
use regex_automata::{Anchored, Input, MatchKind};
use regex_syntax::hir::{Class, ClassUnicode, Hir, HirKind};

/// Bytes that an automaton may take; a pattern beyond this is taken as it is, undecided.
const SIZE_LIMIT: usize = 8 << 20;

/// Whether some line of text matches: one without a line break, and without blanks at its ends, since that is how
/// labels are read. `true` also where the automaton would be too large to tell.
pub(super) fn matches_something(expression: &str) -> bool {
    regex_syntax::parse(expression)
        .is_ok_and(|hir| some_text(&hir, StartKind::Unanchored, Seen::line()))
}

/// Whether what a named group holds may have a digit in it (or a sign that is no ASCII, such as ½). `true` also where
/// the automaton would be too large to tell, or where there is no such group.
pub(super) fn group_holds_number(expression: &str, group: &str) -> bool {
    let Ok(hir) = regex_syntax::parse(expression) else {
        return true;
    };
    let mut groups = Vec::new();
    named(&hir, group, &mut groups);
    groups.is_empty()
        || groups
            .into_iter()
            .any(|group| some_text(group, StartKind::Anchored, Seen::number()))
}

/// Whether some text leads to a match.
fn some_text(hir: &Hir, start: StartKind, seen: Seen) -> bool {
    // Automata know word boundaries between ASCII alone. They decide where ASCII can stand for everything else.
    let bounded = hir.properties().look_set().contains_word_unicode();
    if bounded && !ascii_stands_for_all(hir) {
        return true;
    }
    let greatest = if bounded { 0x7F } else { u8::MAX };
    automaton(hir, start).is_none_or(|dfa| reaches_match(&dfa, start, seen, greatest))
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
    /// Blanks count, rather than digits.
    line: bool,
    /// Nothing has been read yet.
    nothing: bool,
    /// Line: the last byte is a blank. Number: no digit so far.
    lacking: bool,
}

impl Seen {
    fn line() -> Self {
        Self {
            line: true,
            nothing: true,
            lacking: false,
        }
    }

    fn number() -> Self {
        Self {
            line: false,
            nothing: true,
            lacking: true,
        }
    }

    /// After one more byte; `None` where no line has it there.
    fn then(self, byte: u8) -> Option<Self> {
        let blank = byte.is_ascii_whitespace() || byte == 0x0B;
        if byte == b'\n' || (self.line && self.nothing && blank) {
            return None;
        }
        let lacking = if self.line {
            blank
        } else {
            self.lacking && byte.is_ascii() && !byte.is_ascii_digit()
        };
        Some(Self {
            nothing: false,
            lacking,
            ..self
        })
    }
}

/// Visits every state that can be reached. A match is known one byte late: the state after that byte tells of the text
/// before it, which for a whole line may then go on in any way.
fn reaches_match(dfa: &dense::DFA<Vec<u32>>, start: StartKind, seen: Seen, greatest: u8) -> bool {
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
        if !seen.lacking && dfa.is_match_state(dfa.next_eoi_state(state)) {
            return true;
        }
        for byte in 0..=greatest {
            let Some(after) = seen.then(byte) else {
                continue;
            };
            let next = dfa.next_state(state, byte);
            let told = dfa.is_match_state(next) && (seen.line || !seen.lacking);
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
mod tests {
    use super::*;

    #[test]
    fn what_no_line_can_be_is_told_from_what_some_line_is() {
        for (expression, possible) in [
            (r"^H(?<value>\d+)$", true),
            (r"(?<value>\d+)", true),
            (r"(?i)^(?<word>[A-Z]+)?\s*(?<value>\d+)$", true),
            (r"\bH\d+\b", true),
            (r"^(?:|x)$", true),
            // Text after the end, or before the start.
            (r"^H$(?<value>\d+)", false),
            (r"(?<value>\d+)^", false),
            (r"$\d", false),
            // A word boundary inside a word.
            (r"^H\b(?<value>\d+)$", false),
            (r"^(?<value>\d+)\b°$", true),
            (r"^Ø\b(?<value>\d+)$", true),
            // An empty class.
            (r"[^\s\S]\d+", false),
            // Lines hold no line break, and their ends no blanks.
            (r"^H\n(?<value>\d+)$", false),
            (r"^ (?<value>\d+)$", false),
            (r"^(?<value>\d+) +$", false),
            // Blanks beyond ASCII count as characters here.
            (r"^(?<value>\d+)\s+$", true),
            (r"^(?<value>\d+)\s*$", true),
            (r"(?<value>\d+) ", true),
        ] {
            assert_eq!(matches_something(expression), possible, "{expression}");
        }
    }

    #[test]
    fn a_pattern_too_large_to_tell_is_taken_as_it_is() {
        assert!(matches_something(
            r"^(?:[\p{L}\d]{0,40}x){1,30}(?<value>\d+)$"
        ));
    }

    #[test]
    fn a_group_that_holds_no_digit_is_told() {
        for (expression, possible) in [
            (r"^H(?<value>\d+)$", true),
            (r"^H(?<value>.*)$", true),
            (r"^H(?<value>|5)$", true),
            (r"^H(?<value>[½¾])$", true),
            (r"^H(?<other>\d+)$", true),
            (r"^(?<value>H)\d+$", false),
            (r"^\d+(?<value>)$", false),
            (r"^\d+(?:a(?<value>[A-Z-]+)|b)$", false),
        ] {
            assert_eq!(
                group_holds_number(expression, "value"),
                possible,
                "{expression}"
            );
        }
    }
}
