//! Distances to the nearer face: a high point's is from the top, a low point's from the soffit, and a bare number is
//! what the words beside it leave.

use super::heights::SUPPORTS_M;
use super::readings::Word;
use super::rules::{FACE_BY_NEIGHBOURS, FACE_UNKNOWN};
use super::zone_texts::short;
use crate::finding::{Finding, Level, Wording};
use crate::units::{LONG, Units};

/// A height between the anchors.
#[derive(Debug, Clone, Copy)]
pub(super) struct Bare {
    pub(super) station_m: f64,
    pub(super) value_m: f64,
    pub(super) word: Option<Word>,
}

/// So many are named in a finding, the rest are counted.
const NAMED: usize = 5;

/// Words of heights in order of station: one between two of a kind is of the other kind, and highs and lows that stand
/// apart by more than supports do take turns. What that does not decide stays bare; at error level unless it is a support.
pub(super) fn words_by_neighbours(heights: &[Bare]) -> (Vec<Option<Word>>, Vec<Finding>) {
    let mut words: Vec<Option<Word>> = heights.iter().map(|height| height.word).collect();
    let (mut read, mut supports, mut open) = (Vec::new(), Vec::new(), Vec::new());
    let mut from = 0;
    while from < heights.len() {
        if heights[from].word.is_some() {
            from += 1;
            continue;
        }
        let bare = |height: &&Bare| height.word.is_none();
        let to = from + heights[from..].iter().take_while(bare).count();
        let before = from.checked_sub(1);
        let after = (to < heights.len()).then_some(to);
        let apart = (before.unwrap_or(from) + 1..=after.unwrap_or(to - 1))
            .all(|at| heights[at].station_m - heights[at - 1].station_m >= SUPPORTS_M);
        let word = |at: Option<usize>| at.and_then(|at| heights[at].word);
        // Words taken in turn, from the one before or from the one after.
        let turn = |at: usize| match (word(before), word(after)) {
            (Some(word), _) => Some(in_turn(word, at - from + 1)),
            (None, Some(word)) => Some(in_turn(word, to - at)),
            (None, None) => None,
        };
        let fits = match (word(before), word(after)) {
            (Some(first), Some(last)) => in_turn(first, to - from + 1) == last,
            (None, None) => false,
            _ => true,
        };
        let between_two = before.is_some() && after.is_some() && to - from == 1;
        let decided = fits && (apart || between_two);
        for (at, here) in words.iter_mut().enumerate().take(to).skip(from) {
            if decided {
                *here = turn(at);
                read.push(at);
            } else if between_two {
                supports.push(at);
            } else {
                open.push(at);
            }
        }
        from = to;
    }
    let named = |list: &[usize], units: Units| {
        let each = |&at: &usize| {
            let what = match words[at] {
                Some(Word::High) => " as a high point from the top",
                Some(Word::Low) => " as a low point from the soffit",
                None => "",
            };
            let height = heights[at];
            format!(
                "{} at station {}{what}",
                short(height.value_m, units),
                units.of(LONG).said(height.station_m, 2)
            )
        };
        let mut names: Vec<String> = list.iter().take(NAMED).map(each).collect();
        if list.len() > NAMED {
            names.push(format!("{} more", list.len() - NAMED));
        }
        names.join(", ")
    };
    let mut findings = Vec::new();
    let mut say = |list: &[usize], rule, level, before: &str, after: &str| {
        if let Some(&first) = list.first() {
            let text = Wording::of(|units| format!("{before}: {}{after}", named(list, units)));
            let remedy = "write H or L with each distance to the nearer face (height.high_words, height.low_words)";
            let finding = Finding::new(rule, level, text, remedy);
            findings.push(finding.at_station(heights[first].station_m));
        }
    };
    let read_as = "distances to the nearer face without a word were read by their neighbours";
    say(&read, &FACE_BY_NEIGHBOURS, Level::Note, read_as, "");
    let between = "a distance to the nearer face between a high and a low point may be from either";
    let unused = "; it was not used";
    say(&supports, &FACE_UNKNOWN, Level::Warning, between, unused);
    let unknown = "nothing tells which face these distances to the nearer face are from";
    let unbuilt = "; the tendon has no curve without them";
    say(&open, &FACE_UNKNOWN, Level::Error, unknown, unbuilt);
    (words, findings)
}

/// Said of an anchor whose distance has no word.
pub(super) fn unknown_at_anchor(value_m: f64) -> Finding {
    Finding::new(
        &FACE_UNKNOWN,
        Level::Error,
        Wording::of(|units| {
            format!(
                "the anchor's distance of {} to the nearer face may be from the top or from the soffit; the tendon has no \
                 curve without it",
                short(value_m, units)
            )
        }),
        "write H before a distance from the top, L before one from the soffit (height.high_words, height.low_words)",
    )
}

/// The word so many turns on.
fn in_turn(word: Word, turns: usize) -> Word {
    match (word, turns % 2) {
        (word, 0) => word,
        (Word::High, _) => Word::Low,
        (Word::Low, _) => Word::High,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// `H`, `L` and `-` for bare, so many metres apart: the words after, and the levels of findings.
    fn read(words: &str, apart_m: f64) -> (String, Vec<Level>) {
        let word = |sign| match sign {
            'H' => Some(Word::High),
            'L' => Some(Word::Low),
            _ => None,
        };
        let heights: Vec<Bare> = words
            .chars()
            .zip(1_u8..)
            .map(|(sign, at)| Bare {
                station_m: f64::from(at) * apart_m,
                value_m: 0.035,
                word: word(sign),
            })
            .collect();
        let (words, findings) = words_by_neighbours(&heights);
        let sign = |word: Option<Word>| match word {
            Some(Word::High) => 'H',
            Some(Word::Low) => 'L',
            None => '-',
        };
        let levels = findings.iter().map(|finding| finding.level).collect();
        (words.into_iter().map(sign).collect(), levels)
    }

    #[test]
    fn a_bare_number_is_what_its_neighbours_leave() {
        for (words, expected) in [
            ("H-H", "HLH"),
            ("L-L", "LHL"),
            ("L---L", "LHLHL"),
            ("L--", "LHL"),
            ("--H-", "HLHL"),
        ] {
            assert_eq!(
                read(words, 4.0),
                (expected.to_owned(), vec![Level::Note]),
                "{words}"
            );
        }
        assert_eq!(read("LHL", 4.0), ("LHL".to_owned(), vec![]));
    }

    #[test]
    fn what_they_leave_open_stays_open() {
        for words in ["---", "-", "H--H", "L--L"] {
            assert_eq!(
                read(words, 4.0),
                (words.to_owned(), vec![Level::Error]),
                "{words}"
            );
        }
        // Near enough to be supports; between a high and a low it can be nothing else.
        assert_eq!(read("H---H", 1.0), ("H---H".to_owned(), vec![Level::Error]));
        assert_eq!(read("H-L", 1.0), ("H-L".to_owned(), vec![Level::Warning]));
    }
}
