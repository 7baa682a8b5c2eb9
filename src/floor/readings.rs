//! What labels say: texts turned into heights, marks and thicknesses by the job's patterns.

use regex::Regex;

use crate::job::{Conventions, FromFace};
use crate::units::LengthUnit;

/// Which way a height is said to be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Word {
    /// A high point.
    High,
    /// A low point.
    Low,
}

/// A height as written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct HeightText {
    /// High or low; `None` where the label is a bare number.
    pub(super) word: Option<Word>,
    /// High or low as far as the number alone tells, by the middle of the slab; only settling looks at it.
    pub(super) likely: Option<Word>,
    /// The number, metres, from whatever face and to whatever part of the tendon the job says.
    pub(super) value_m: f64,
}

/// A mark as written; each part may be absent.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub(super) struct MarkText {
    /// Mark of the tendon.
    pub(super) mark: Option<String>,
    /// Tendons that the line stands for.
    pub(super) tendons: Option<u32>,
    /// Strands in each.
    pub(super) strands: Option<u32>,
    /// Strand size.
    pub(super) strand: Option<String>,
}

/// The height that a text gives: of its lines, the first that is one.
pub(super) fn height(content: &str, conventions: &Conventions) -> Option<HeightText> {
    content.lines().find_map(|line| {
        let line = line.trim();
        conventions.height_patterns.iter().find_map(|pattern| {
            let groups = pattern.captures(line)?;
            let value_m = length_m(groups.name("value")?.as_str(), conventions.height.unit)?;
            let word = match groups.name("word").map(|word| word.as_str().trim()) {
                None | Some("") => None,
                Some(word) if among(word, &conventions.high_words) => Some(Word::High),
                Some(word) if among(word, &conventions.low_words) => Some(Word::Low),
                Some(_) => return None,
            };
            Some(HeightText {
                word,
                likely: word,
                value_m,
            })
        })
    })
}

impl HeightText {
    /// Says whether a bare number is likely a high or a low point of a slab of this thickness.
    pub(super) fn weigh(&mut self, thickness_m: Option<f64>, from: FromFace) {
        if let (None, Some(thickness_m)) = (self.word, thickness_m) {
            let above = self.value_m > 0.5 * thickness_m;
            self.likely = Some(if above == (from == FromFace::Soffit) {
                Word::High
            } else {
                Word::Low
            });
        }
    }
}

/// The mark and strand count that a text gives, gathered over its lines.
pub(super) fn mark(content: &str, patterns: &[Regex]) -> Option<MarkText> {
    let mut whole = MarkText::default();
    for line in content.lines().map(str::trim).filter(|l| !l.is_empty()) {
        let Some(groups) = patterns.iter().find_map(|pattern| pattern.captures(line)) else {
            continue;
        };
        let part = |name: &str| {
            groups
                .name(name)
                .map(|found| found.as_str().trim().to_owned())
                .filter(|found| !found.is_empty())
        };
        whole.mark = whole.mark.or_else(|| part("mark"));
        whole.tendons = whole.tendons.or_else(|| count(part("tendons")));
        // None is a count too, if a wrong one: what the label says is told.
        whole.strands = whole.strands.or_else(|| part("strands")?.parse().ok());
        whole.strand = whole.strand.or_else(|| part("strand"));
    }
    (whole != MarkText::default()).then_some(whole)
}

/// The thickness that a text gives, metres.
pub(super) fn thickness_m(content: &str, conventions: &Conventions) -> Option<f64> {
    content.lines().find_map(|line| {
        conventions.thickness_patterns.iter().find_map(|pattern| {
            let groups = pattern.captures(line.trim())?;
            length_m(groups.name("value")?.as_str(), conventions.thickness_unit)
                .filter(|&value_m| value_m > 0.0)
        })
    })
}

fn count(text: Option<String>) -> Option<u32> {
    text?.parse().ok().filter(|&number| number > 0)
}

fn among(word: &str, words: &[String]) -> bool {
    words.iter().any(|known| known.eq_ignore_ascii_case(word))
}

/// A length as drafters write it: `165`, `30.5`, `30,5`, `1 1/4"`, `1-1/4`, `7/8`, `1¼`, `10 mm`; metres.
pub(super) fn length_m(text: &str, unit: LengthUnit) -> Option<f64> {
    let mut text = text.trim();
    let mut unit = unit;
    for (sign, said) in [
        ("\"", LengthUnit::In),
        ("″", LengthUnit::In),
        ("”", LengthUnit::In),
        ("in", LengthUnit::In),
        ("mm", LengthUnit::Mm),
        ("cm", LengthUnit::Cm),
    ] {
        if let Some(number) = text.strip_suffix(sign) {
            text = number.trim_end();
            unit = said;
            break;
        }
    }
    // The sign is that of the whole, fraction included.
    let (sign, text) = match text.strip_prefix(['-', '−']) {
        Some(rest) => (-1.0, rest.trim_start()),
        None => (1.0, text.strip_prefix('+').unwrap_or(text)),
    };
    let value = sign * number(text)?;
    let length_m = value * unit.metres();
    length_m.is_finite().then_some(length_m)
}

fn number(text: &str) -> Option<f64> {
    if let Some(whole) = plain(text) {
        return Some(whole);
    }
    // A whole number and a fraction, joined by a blank, a hyphen or nothing (one-character fractions).
    let single = text.char_indices().next_back().and_then(|(at, sign)| {
        let (_, eighths) = SINGLES.iter().find(|(known, _)| *known == sign)?;
        Some((text.get(..at)?, f64::from(*eighths) / 24.0))
    });
    let (whole, fraction) = if let Some(found) = single {
        found
    } else {
        let (head, below) = text.rsplit_once(['/', '⁄'])?;
        let head = head.trim_end();
        let start = head
            .rfind(|c: char| !c.is_ascii_digit())
            .map_or(0, |at| at + head.get(at..).map_or(1, first_length));
        let below = plain(below.trim())?;
        if below <= 0.0 {
            return None;
        }
        (head.get(..start)?, plain(head.get(start..)?)? / below)
    };
    let whole = whole.trim_end_matches([' ', '-', '\u{a0}']).trim();
    if whole.is_empty() {
        return Some(fraction);
    }
    Some(plain(whole)? + fraction)
}

fn first_length(text: &str) -> usize {
    text.chars().next().map_or(1, char::len_utf8)
}

/// One-character fractions, in 24ths.
const SINGLES: &[(char, u8)] = &[
    ('¼', 6),
    ('½', 12),
    ('¾', 18),
    ('⅛', 3),
    ('⅜', 9),
    ('⅝', 15),
    ('⅞', 21),
    ('⅓', 8),
    ('⅔', 16),
];

fn plain(text: &str) -> Option<f64> {
    let fits = text.starts_with(|c: char| c.is_ascii_digit())
        && text
            .chars()
            .all(|c| c.is_ascii_digit() || c == '.' || c == ',');
    if !fits {
        return None;
    }
    text.replace(',', ".").parse().ok()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lengths_are_read_as_drafters_write_them() {
        for (text, unit, expected_m) in [
            ("165", LengthUnit::Mm, 0.165),
            ("30.5", LengthUnit::Mm, 0.0305),
            ("30,5", LengthUnit::Mm, 0.0305),
            ("1 1/4\"", LengthUnit::In, 0.03175),
            ("1-1/4", LengthUnit::In, 0.03175),
            ("7/8", LengthUnit::In, 0.022_225),
            ("7/8\"", LengthUnit::Mm, 0.022_225),
            ("1¼", LengthUnit::In, 0.03175),
            ("½\"", LengthUnit::In, 0.0127),
            ("10 mm", LengthUnit::In, 0.01),
            ("-5", LengthUnit::Mm, -0.005),
            ("+5", LengthUnit::Mm, 0.005),
            ("-1/4", LengthUnit::In, -0.00635),
            ("-1 1/4", LengthUnit::In, -0.03175),
            ("-1-1/4\"", LengthUnit::In, -0.03175),
            ("−1¼", LengthUnit::In, -0.03175),
            ("16.5", LengthUnit::Cm, 0.165),
        ] {
            let found = length_m(text, unit);
            assert!(
                found.is_some_and(|found_m| (found_m - expected_m).abs() < 1e-12),
                "{text}: {found:?}"
            );
        }
        for text in [
            "", "H", "1/0", "12a", "1/", "/8", "--3", "-+3", "1/-4", "NaN", "inf", "1.2.3",
        ] {
            assert_eq!(length_m(text, LengthUnit::Mm), None, "{text}");
        }
    }
}
