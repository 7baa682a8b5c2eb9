//! What labels say: texts turned into heights, marks and thicknesses by the job's patterns.

use crate::job::{Conventions, Datum, FromFace, Pattern, PatternUnit};
use crate::units::LengthUnit;

pub use crate::job::Word;

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

/// A label, each of its lines read for what it is.
#[derive(Debug, Clone, Default)]
pub(super) struct LabelText {
    /// The first height.
    pub(super) height: Option<HeightText>,
    /// A second height that differs from the first.
    pub(super) other_height: Option<HeightText>,
    /// Mark, strands, required force, gathered over the lines.
    pub(super) mark: Option<MarkText>,
}

/// The height that a text gives: of its lines, the first that is one.
pub(super) fn height(content: &str, conventions: &Conventions) -> Option<HeightText> {
    let mut lines = content.lines();
    lines.find_map(|line| height_of_line(line, conventions).map(|(height, _)| height))
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
        };
        return Some((middle, None));
    }
    conventions.height_patterns.iter().find_map(|pattern| {
        let groups = pattern.captures(line)?;
        let unit = length_unit(pattern).unwrap_or(conventions.height.unit);
        let value_m = length_m(groups.name("value")?.as_str(), unit)?;
        let word = match groups.name("word").map(|word| word.as_str().trim()) {
            None | Some("") => pattern.word,
            Some(word) if among(word, &conventions.high_words) => Some(Word::High),
            Some(word) if among(word, &conventions.low_words) => Some(Word::Low),
            Some(word) if among(word, &conventions.middle_words) => None,
            Some(_) => return None,
        };
        let height = HeightText {
            word,
            likely: word,
            value_m,
            middle: false,
            from: pattern.from.unwrap_or(conventions.height.from),
            datum: pattern.datum.unwrap_or(conventions.height.datum),
        };
        Some((height, Some(pattern)))
    })
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
    fn plain(&self) -> bool {
        self.word.is_some() || self.middle
    }
}

/// Reads a label on a layer of heights, of marks, or of both. Where both lie on one layer a line is a height before it
/// is a mark. A label of several lines may hold both whatever its layer is for; then what is not of its layer counts
/// only where it speaks for itself: a height with a word, a mark with strands or a force.
pub(super) fn label(
    content: &str,
    heights: bool,
    marks: bool,
    conventions: &Conventions,
) -> LabelText {
    let mut whole = LabelText::default();
    let mut mark = MarkText::default();
    let lines: Vec<&str> = content.lines().filter(|line| !line.trim().is_empty()).collect();
    for line in &lines {
        let as_height = height_of_line(line, conventions).map(|(height, _)| height);
        let as_mark = mark_of_line(line, &conventions.mark_patterns).map(|(mark, _)| mark);
        let (height, said) = match (as_height, as_mark) {
            (Some(height), _) if heights => (Some(height), None),
            (Some(height), Some(name)) if lines.len() > 1 && height.plain() => {
                // On a layer of marks alone, `H165` below another mark is no second mark.
                if mark.mark.is_some() && !name.counts() {
                    (Some(height), None)
                } else {
                    (None, Some(name))
                }
            }
            (Some(height), None) if lines.len() > 1 && height.plain() => (Some(height), None),
            (_, Some(said)) if marks || (lines.len() > 1 && said.counts()) => (None, Some(said)),
            _ => (None, None),
        };
        if let Some(height) = height {
            match whole.height {
                None => whole.height = Some(height),
                Some(first) if first != height && whole.other_height.is_none() => {
                    whole.other_height = Some(height);
                }
                Some(_) => {}
            }
        }
        if let Some(said) = said {
            mark.add(&said);
        }
    }
    whole.mark = (mark != MarkText::default()).then_some(mark);
    whole
}

/// What a line says of marks, strands and required force, and the pattern that read it.
pub fn mark_of_line<'p>(line: &str, patterns: &'p [Pattern]) -> Option<(MarkText, &'p Pattern)> {
    let line = line.trim();
    patterns.iter().find_map(|pattern| {
        let groups = pattern.captures(line)?;
        let part = |name: &str| {
            groups
                .name(name)
                .map(|found| found.as_str().trim().to_owned())
                .filter(|found| !found.is_empty())
        };
        let force = |name: &str| {
            let number = part(name)?.replace([',', ' '], "").parse::<f64>().ok()?;
            let Some(PatternUnit::Force(unit)) = pattern.unit else {
                return None;
            };
            Some(number * unit.kilonewtons()).filter(|kn| kn.is_finite() && *kn > 0.0)
        };
        let tendons = count(part("tendons"));
        let strands = count(part("strands"));
        let counted = tendons.is_some() || strands.is_some();
        let said = MarkText {
            mark: part("mark"),
            tendons,
            strands: strands.or(pattern.strands.filter(|_| counted)),
            strand: part("strand").or(pattern.strand.clone().filter(|_| counted)),
            required_kn: force("force"),
            required_kn_per_m: force("force_per_width"),
        };
        (said != MarkText::default()).then_some((said, pattern))
    })
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

    /// Takes what this one leaves open from another.
    pub(super) fn add(&mut self, other: &Self) {
        self.mark = self.mark.take().or_else(|| other.mark.clone());
        self.tendons = self.tendons.or(other.tendons);
        self.strands = self.strands.or(other.strands);
        self.strand = self.strand.take().or_else(|| other.strand.clone());
        self.required_kn = self.required_kn.or(other.required_kn);
        self.required_kn_per_m = self.required_kn_per_m.or(other.required_kn_per_m);
    }
}

/// The thickness that a text gives, metres.
pub(super) fn thickness_m(content: &str, conventions: &Conventions) -> Option<f64> {
    let mut lines = content.lines();
    lines.find_map(|line| thickness_of_line(line, conventions).map(|(value_m, _)| value_m))
}

/// The thickness that a line gives, metres, and the pattern that read it.
pub fn thickness_of_line<'c>(
    line: &str,
    conventions: &'c Conventions,
) -> Option<(f64, &'c Pattern)> {
    conventions.thickness_patterns.iter().find_map(|pattern| {
        let groups = pattern.captures(line.trim())?;
        let unit = length_unit(pattern).unwrap_or(conventions.thickness_unit);
        length_m(groups.name("value")?.as_str(), unit)
            .filter(|&value_m| value_m > 0.0)
            .map(|value_m| (value_m, pattern))
    })
}

fn length_unit(pattern: &Pattern) -> Option<LengthUnit> {
    match pattern.unit {
        Some(PatternUnit::Length(unit)) => Some(unit),
        _ => None,
    }
}

fn count(text: Option<String>) -> Option<u32> {
    text?.parse().ok().filter(|&number| number > 0)
}

/// Whether a word is in a list; blanks, full stops and hyphens do not matter, nor does letter case.
fn among(word: &str, words: &[String]) -> bool {
    fn bare(word: &str) -> String {
        let letters = word.chars().filter(|c| !c.is_whitespace() && !matches!(c, '.' | '-'));
        letters.flat_map(char::to_uppercase).collect()
    }
    let word = bare(word);
    !word.is_empty() && words.iter().any(|known| bare(known) == word)
}

/// A length as drafters write it: `165`, `30.5`, `30,5`, `.165`, `1 1/4"`, `1-1/4`, `7/8`, `1¼`, `1'-2 1/2"`, `10 mm`;
/// metres.
pub(super) fn length_m(text: &str, unit: LengthUnit) -> Option<f64> {
    let text = text.trim().to_lowercase();
    let mut text = text.as_str();
    let mut unit = unit;
    for (sign, said) in [
        ("''", LengthUnit::In),
        ("\"", LengthUnit::In),
        ("″", LengthUnit::In),
        ("”", LengthUnit::In),
        ("in.", LengthUnit::In),
        ("in", LengthUnit::In),
        ("'", LengthUnit::Ft),
        ("mm", LengthUnit::Mm),
        ("cm", LengthUnit::Cm),
        ("m", LengthUnit::M),
    ] {
        if let Some(number) = text.strip_suffix(sign) {
            text = number.trim_end();
            unit = said;
            break;
        }
    }
    let value_m = if let Some((feet, inches)) = text.split_once('\'') {
        let feet_m = plain(feet.trim())? * LengthUnit::Ft.metres();
        let inches = inches.trim_start_matches([' ', '-']);
        let inches_m = number(inches)?.abs() * LengthUnit::In.metres();
        feet_m + if feet_m < 0.0 { -inches_m } else { inches_m }
    } else {
        number(text)? * unit.metres()
    };
    value_m.is_finite().then_some(value_m)
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
    // The fraction goes on in the direction of the whole number, which minus zero has too.
    let whole_number = plain(whole)?;
    let below = whole.starts_with('-');
    Some(whole_number + if below { -fraction } else { fraction })
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
    let digits = text.strip_prefix(['-', '+']).unwrap_or(text);
    let led = digits.strip_prefix(['.', ',']).unwrap_or(digits);
    let fits = led.starts_with(|c: char| c.is_ascii_digit())
        && digits
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
            ("16.5", LengthUnit::Cm, 0.165),
            (".165", LengthUnit::M, 0.165),
            ("0,165 m", LengthUnit::Mm, 0.165),
            ("16.5CM", LengthUnit::Mm, 0.165),
            ("1'-2 1/2\"", LengthUnit::In, 0.3683),
            ("-1 1/4\"", LengthUnit::In, -0.03175),
            ("1 ¼ in.", LengthUnit::Ft, 0.03175),
            ("2'", LengthUnit::In, 0.6096),
        ] {
            let found = length_m(text, unit);
            assert!(
                found.is_some_and(|found_m| (found_m - expected_m).abs() < 1e-12),
                "{text}: {found:?}"
            );
        }
        for text in [
            "", "H", "1/0", "12a", "1/", "/8", "--3", "NaN", "inf", "1.2.3",
        ] {
            assert_eq!(length_m(text, LengthUnit::Mm), None, "{text}");
        }
    }
}
