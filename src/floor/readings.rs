//! What labels say: texts turned into heights, marks and thicknesses by the job's patterns.

use regex::Match;

use super::lengths::length_m;
use crate::job::{Conventions, Datum, FromFace, Pattern, PatternUnit};
use crate::units::LengthUnit;

pub use crate::job::Word;

/// Heights that differ by less are equal, metres.
const SAME_M: f64 = 0.0005;

/// What a height goes by in an equation, `z = 165`, and is neither high nor low by; `e` is not among them, which is an
/// eccentricity as well (common practice).
const SIGNS: &[&str] = &[
    "z", "Z", "y", "Y", "v", "V", "cg", "CG", "cgs", "CGS", "C.G.", "C.G.S.",
];

/// A height as written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HeightText {
    /// High or low; `None` where the label is a bare number.
    pub word: Option<Word>,
    /// High or low as far as the number alone tells, by the middle of the slab; only settling looks at it.
    pub(super) likely: Option<Word>,
    /// The number, metres, from `from` to `datum`. For mid-depth half the slab's thickness, once that is known.
    pub value_m: f64,
    /// Mid-depth is said, in place of a number.
    pub middle: bool,
    /// The face it is measured from.
    pub from: FromFace,
    /// What it is measured to.
    pub datum: Datum,
    /// Another text contradicts it, or its own does: the number does not count.
    pub(super) torn: bool,
    /// It is written as in `H = 165`, where the letter may be the sign of every height.
    pub(super) by_equals: bool,
}

/// A mark as written; each part may be absent.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct MarkText {
    /// Mark of the tendon.
    pub mark: Option<String>,
    /// Tendons that the line stands for.
    pub tendons: Option<u32>,
    /// Strands in each.
    pub strands: Option<u32>,
    /// Strand size as written.
    pub strand: Option<String>,
    /// Force that the line's tendons together are required to have, kN.
    pub required_kn: Option<f64>,
    /// The same per width of slab, kN/m.
    pub required_kn_per_m: Option<f64>,
}

/// The height that a line gives, and the pattern that read it; none where a word did.
pub fn height_of_line<'c>(
    line: &str,
    conventions: &'c Conventions,
) -> Option<(HeightText, Option<&'c Pattern>)> {
    let line = line.trim();
    if among(line, &conventions.middle_words) {
        let middle = HeightText {
            word: None,
            likely: None,
            value_m: 0.0,
            middle: true,
            from: FromFace::Soffit,
            datum: Datum::Centroid,
            torn: false,
            by_equals: false,
        };
        return Some((middle, None));
    }
    conventions.height_patterns.iter().find_map(|pattern| {
        let groups = pattern.captures(line)?;
        let unit = length_unit(pattern).unwrap_or(conventions.height.unit);
        let value = groups.name("value")?;
        let value_m = length_m(value.as_str(), unit)?;
        let written = groups.name("word");
        let by_equals = equals(line, written, value, &["H", "h"]);
        let signed = equals(line, written, value, SIGNS);
        let word = match written.map(|word| word.as_str().trim()) {
            None | Some("") => pattern.word,
            // The sign of a height, `h = 30`, says neither high nor low.
            Some("h") if by_equals => None,
            Some(word) if among(word, &conventions.high_words) => Some(Word::High),
            Some(word) if among(word, &conventions.low_words) => Some(Word::Low),
            Some(word) if signed || among(word, &conventions.middle_words) => None,
            Some(_) => return None,
        };
        let height = HeightText {
            word,
            likely: word,
            value_m,
            middle: false,
            from: pattern.from.unwrap_or(conventions.height.from),
            datum: pattern.datum.unwrap_or(conventions.height.datum),
            torn: false,
            by_equals,
        };
        Some((height, Some(pattern)))
    })
}

/// Whether an equals sign or a colon stands between one of these letters and a number.
fn equals(line: &str, word: Option<Match<'_>>, value: Match<'_>, letters: &[&str]) -> bool {
    let letter = word.filter(|word| letters.contains(&word.as_str().trim()));
    let between = letter.and_then(|letter| line.get(letter.end()..value.start()));
    between.is_some_and(|between| between.contains(['=', ':']))
}

impl HeightText {
    /// Says what only the slab's thickness tells: where mid-depth is, and whether a bare number is likely a high or a
    /// low point.
    pub(super) fn weigh(&mut self, thickness_m: Option<f64>) {
        let Some(thickness_m) = thickness_m else {
            return;
        };
        if self.middle {
            self.value_m = 0.5 * thickness_m;
            return;
        }
        let above = self.value_m > 0.5 * thickness_m;
        if self.word.is_none() {
            self.likely = match self.from {
                FromFace::Soffit => Some(if above { Word::High } else { Word::Low }),
                FromFace::Top => Some(if above { Word::Low } else { Word::High }),
                FromFace::NearerFace => None,
            };
        }
    }

    /// Whether the text says by itself that it is a height.
    pub(super) fn plain(&self) -> bool {
        self.word.is_some() || self.middle
    }

    /// Whether another says the same, or leaves open what this one says.
    pub(super) fn agrees(&self, other: &Self) -> bool {
        (self.value_m - other.value_m).abs() < SAME_M
            && (self.word == other.word || self.word.is_none() || other.word.is_none())
    }
}

/// What a line says of marks, strands and required force, and the pattern that read it.
pub fn mark_of_line<'p>(line: &str, patterns: &'p [Pattern]) -> Option<(MarkText, &'p Pattern)> {
    let line = line.trim();
    let found = patterns.iter().find_map(|pattern| {
        let groups = pattern.captures(line)?;
        let part = |name: &str| {
            groups
                .name(name)
                .map(|found| found.as_str().trim().to_owned())
                .filter(|found| !found.is_empty())
        };
        if is_fraction(line, groups.name("mark"), groups.name("strands")) {
            return Some(None);
        }
        let force = |name: &str| {
            let number = part(name)?.replace([',', ' '], "").parse::<f64>().ok()?;
            let Some(PatternUnit::Force(unit)) = pattern.unit else {
                return None;
            };
            Some(number * unit.kilonewtons()).filter(|kn| kn.is_finite() && *kn > 0.0)
        };
        // A line that counts no tendons, or more than anyone can, is not read at all. That it counts no strands is told of
        // its tendon.
        let (tendons, strands) = (part("tendons"), part("strands"));
        let tendons = match tendons.map(|count| count.parse().ok().filter(|&count| count > 0)) {
            Some(None) => return Some(None),
            said => said.flatten(),
        };
        let strands: Option<u32> = match strands.map(|count| count.parse().ok()) {
            Some(None) => return Some(None),
            said => said.flatten(),
        };
        // A pattern that looks for no number and gives one says it of every text that it reads.
        let by_pattern = pattern.strands.is_some() && !pattern.has_group("tendons");
        let counted = tendons.is_some() || strands.is_some() || by_pattern;
        let said = MarkText {
            mark: part("mark"),
            tendons,
            strands: strands.or(pattern.strands.filter(|_| counted)),
            strand: part("strand").or(pattern.strand.clone().filter(|_| counted)),
            required_kn: force("force"),
            required_kn_per_m: force("force_per_width"),
        };
        (said != MarkText::default()).then_some(Some((said, pattern)))
    });
    found.flatten()
}

/// Whether mark and number of strands meet in what may as well be a size in inches, as in `D1/2-12.7`.
fn is_fraction(line: &str, mark: Option<Match<'_>>, strands: Option<Match<'_>>) -> bool {
    let (Some(mark), Some(strands)) = (mark, strands) else {
        return false;
    };
    let digits = mark
        .as_str()
        .trim_start_matches(|sign: char| !sign.is_ascii_digit());
    line.get(mark.end()..strands.start()) == Some("/")
        && matches!((digits, strands.as_str()), ("1", "2") | ("3" | "5", "8"))
}

impl MarkText {
    /// Whether strands, tendons or a force are in it.
    pub(super) fn counts(&self) -> bool {
        self.strands.is_some() || self.tendons.is_some() || self.requires()
    }

    /// Whether a force is in it.
    pub(super) fn requires(&self) -> bool {
        self.required_kn.is_some() || self.required_kn_per_m.is_some()
    }
}

/// The unit that a pattern gives its lengths.
pub(super) fn length_unit(pattern: &Pattern) -> Option<LengthUnit> {
    match pattern.unit {
        Some(PatternUnit::Length(unit)) => Some(unit),
        _ => None,
    }
}

/// Whether a word is in a list; blanks, full stops and hyphens do not matter, nor does letter case.
fn among(word: &str, words: &[String]) -> bool {
    fn bare(word: &str) -> String {
        let letters = word
            .chars()
            .filter(|c| !c.is_whitespace() && !matches!(c, '.' | '-'));
        letters.flat_map(char::to_uppercase).collect()
    }
    let word = bare(word);
    !word.is_empty() && words.iter().any(|known| bare(known) == word)
}
