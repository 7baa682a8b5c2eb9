//! What labels say: texts turned into heights, marks and thicknesses by the job's patterns.

use super::lengths::length_m;
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
    let lines: Vec<&str> = content
        .lines()
        .filter(|line| !line.trim().is_empty())
        .collect();
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
        // None is a count too, if a wrong one: what the label says is told.
        let strands = part("strands").and_then(|count| count.parse().ok());
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

/// The unit that a pattern gives its lengths.
pub(super) fn length_unit(pattern: &Pattern) -> Option<LengthUnit> {
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
        let letters = word
            .chars()
            .filter(|c| !c.is_whitespace() && !matches!(c, '.' | '-'));
        letters.flat_map(char::to_uppercase).collect()
    }
    let word = bare(word);
    !word.is_empty() && words.iter().any(|known| bare(known) == word)
}
