//! What a text is taken for by the job's patterns, when only the text itself speaks.

use crate::floor::{Word, height_of_line, mark_of_line, thickness_of_line, zone_text_of_line};
use crate::job::families::{self, Offer, offered};
use crate::job::{Job, Pattern};
use crate::units::LengthUnit;

/// What a text says.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Reading {
    /// Slab thickness.
    Thickness(String),
    /// A height, and its word if it has one.
    Height(String),
    /// A mark, strands, a required force, or some of them; whether strands or a force are in it.
    Mark {
        /// In words.
        words: String,
        /// Whether strands are counted or a force required.
        strands: bool,
    },
    /// None of the job's patterns fits, but one of a known family does, of this name.
    Offered(&'static str),
    /// None of the job's patterns fits.
    Unread,
}

/// Reads a text: of its lines, the first that says something; as a thickness, else a height, else a mark.
pub(super) fn reading(text: &str, job: &Job) -> Reading {
    let said = text.lines().map(|line| of_line(line, job));
    let mut lines: Vec<Reading> = said.collect();
    lines.sort_by_key(|reading| match reading {
        Reading::Unread => 2,
        Reading::Offered(_) => 1,
        _ => 0,
    });
    // What is read comes first; among that, what is not a bare mark says more of what its layer is for.
    let counts = |reading: &Reading| matches!(reading, Reading::Mark { strands: true, .. });
    let at = lines.iter().position(counts).unwrap_or(0);
    if at < lines.len() {
        lines.swap_remove(at)
    } else {
        Reading::Unread
    }
}

fn of_line(line: &str, job: &Job) -> Reading {
    let read = &job.conventions;
    let millimetres = |value_m: f64| (value_m * 1e4).round() / 10.0;
    if let Some((said, by)) = zone_text_of_line(line, read) {
        let part = |what: &str, value_m: Option<f64>| {
            value_m.map(|value_m| format!("{what} {} mm", millimetres(value_m)))
        };
        let parts = [
            part("slab thickness", said.thickness_m),
            part("slab top at", said.top_m),
            part("slab soffit at", said.soffit_m),
            part("slab top down by", said.down_m),
        ];
        let words: Vec<String> = parts.into_iter().flatten().collect();
        // A bare signed number may as well be a height.
        if line.chars().any(char::is_alphabetic) {
            return Reading::Thickness(named(words.join(", "), Some(by)));
        }
    }
    if let Some((height, by)) = height_of_line(line, read) {
        let what = match (height.word, height.middle) {
            (_, true) => return Reading::Height("mid-depth".to_owned()),
            (Some(Word::High), _) => "high point",
            (Some(Word::Low), _) => "low point",
            (None, _) => "height",
        };
        let words = format!("{what} {} mm", millimetres(height.value_m));
        return Reading::Height(named(words, by));
    }
    if let Some((said, by)) = mark_of_line(line, &read.mark_patterns) {
        let strands = said.strands.is_some() || said.tendons.is_some();
        let required = said
            .required_kn
            .map(|kn| format!("required {kn:.0} kN"))
            .or_else(|| {
                let per_m = said.required_kn_per_m?;
                Some(format!("required {per_m:.0} kN/m"))
            });
        let parts: Vec<String> = [
            said.mark.map(|mark| format!("mark {mark}")),
            said.tendons.map(|count| format!("{count} tendons")),
            said.strands.map(|count| format!("{count} strands")),
            said.strand.map(|size| format!("of {size}")),
            required.clone(),
        ]
        .into_iter()
        .flatten()
        .collect();
        return Reading::Mark {
            words: named(parts.join(" "), Some(by)),
            strands: strands || required.is_some(),
        };
    }
    offered(line)
        .and_then(name)
        .map_or(Reading::Unread, Reading::Offered)
}

fn name(offer: &'static Offer) -> Option<&'static str> {
    offer.pattern.name.as_deref()
}

/// What was read, with the pattern that read it.
fn named(words: String, by: Option<&Pattern>) -> String {
    match by {
        Some(by) => format!("{words} ({})", by.label()),
        None => words,
    }
}

/// What a text says beyond how it is read.
#[derive(Debug, Default, PartialEq)]
pub(super) struct Hint {
    /// Its height or thickness, millimetres.
    pub(super) height_mm: Option<f64>,
    pub(super) thickness_mm: Option<f64>,
    /// It counts strands, and may as well be inches with a fraction, `7-1/2"`; whether its size is none of strands.
    pub(super) either: Option<bool>,
    /// It would be a height, or a thickness, in inches.
    pub(super) inched: bool,
    pub(super) inched_thickness: bool,
    /// A word of heights that the job does not know, beside a number.
    pub(super) word: Option<String>,
    /// A word that nobody knows, beside the number of what would be a height.
    pub(super) unknown: Option<(String, f64)>,
}

/// What a text hints at.
pub(super) fn hint(text: &str, said: &Reading, job: &Job) -> Hint {
    let read = &job.conventions;
    let heights = || text.lines().filter_map(|line| height_of_line(line, read));
    let mut hint = Hint::default();
    match said {
        Reading::Height(_) => {
            let first = heights().find(|(height, _)| !height.middle);
            hint.height_mm = first.map(|(height, _)| height.value_m * 1000.0);
        }
        Reading::Thickness(_) => {
            let mut thicknesses = text
                .lines()
                .filter_map(|line| thickness_of_line(line, read));
            hint.thickness_mm = thicknesses.next().map(|(value_m, _)| value_m * 1000.0);
        }
        // A mark by the default patterns may be the word and number of another office's heights.
        Reading::Mark { strands: false, .. } | Reading::Offered(_) | Reading::Unread => {
            let mut lines = text.lines();
            let line = lines.next().unwrap_or_default().trim();
            if lines.next().is_some() {
                return hint;
            }
            let inched = |patterns: &[Pattern]| patterns.iter().any(|p| p.is_match(line));
            let signed =
                line.contains(['"', '″', '”', '/', '⁄', '¼', '½', '¾', '⅛', '⅜', '⅝', '⅞']);
            hint.inched_thickness = signed && inched(&families::thickness_patterns(LengthUnit::In));
            let is_height =
                !hint.inched_thickness && inched(&families::height_patterns(LengthUnit::In));
            let word: String = line.chars().filter(|c| c.is_alphabetic()).collect();
            let word = word.to_uppercase();
            let strange = high_word(&word) || low_word(&word);
            let bare = ["", "H", "HP", "HIGH", "L", "LP", "LOW", "IN"].contains(&word.as_str());
            hint.inched = is_height && signed && (bare || strange);
            hint.word = (is_height && strange).then_some(word);
            if *said == Reading::Unread && hint.word.is_none() {
                hint.unknown = unknown_word(line, &read.height_patterns);
            }
        }
        Reading::Mark { .. } => {
            let line = text.trim();
            let inches = families::height_patterns(LengthUnit::In);
            let marked = mark_of_line(line, &read.mark_patterns).map(|(said, _)| said);
            hint.either = marked
                .filter(|said| said.mark.is_none() && said.tendons.is_none())
                .and_then(|said| {
                    let size = said.strand?;
                    let inched =
                        line.contains(['"', '″', '”']) && inches.iter().any(|p| p.is_match(line));
                    inched.then(|| job.tendon.strand_named(&size).is_none())
                });
        }
    }
    hint
}

/// The word and the number of a line that one of these patterns fits in all but the word.
fn unknown_word(line: &str, patterns: &[Pattern]) -> Option<(String, f64)> {
    patterns.iter().find_map(|pattern| {
        let groups = pattern.captures(line)?;
        let word = groups.name("word")?.as_str().trim();
        let number = groups.name("value")?.as_str().replace(',', ".");
        let number = number.parse().ok()?;
        (!word.is_empty()).then(|| (word.to_uppercase(), number))
    })
}

/// Words that other offices write at high points.
pub(super) fn high_word(word: &str) -> bool {
    [
        "HI",
        "HPT",
        "HIGHPT",
        "HIGHPOINT",
        "TOP",
        "T",
        "UP",
        "CREST",
        "PEAK",
    ]
    .contains(&word)
}

/// Words that other offices write at low points.
pub(super) fn low_word(word: &str) -> bool {
    [
        "LO", "LPT", "LOWPT", "LOWPOINT", "BOT", "BOTTOM", "B", "BTM", "DN", "DOWN", "SAG",
    ]
    .contains(&word)
}

impl Reading {
    /// In words.
    pub(super) fn words(&self) -> &str {
        match self {
            Self::Thickness(words) | Self::Height(words) | Self::Mark { words, .. } => words,
            Self::Offered(_) | Self::Unread => "not read",
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn texts_are_taken_for_what_they_say() {
        let job = Job::default();
        for (text, words) in [
            ("T350", "slab thickness 350 mm (thickness)"),
            ("H165", "high point 165 mm (height)"),
            (" 30L ", "low point 30 mm (height, word last)"),
            ("165", "height 165 mm (height)"),
            ("T/2", "mid-depth"),
            (
                "D012 5-12.7",
                "mark D012 5 strands of 12.7 (strands and size)",
            ),
            ("D012\n5-12.7", "5 strands of 12.7 (strands and size)"),
            (
                "B03 4x5-12.7",
                "mark B03 4 tendons 5 strands of 12.7 (strands and size)",
            ),
            ("5-12.7", "5 strands of 12.7 (strands and size)"),
            ("324 KIPS", "required 1441 kN (required kips)"),
            ("12T", "not read"),
            ("SEE DETAIL FOUR", "not read"),
        ] {
            assert_eq!(reading(text, &job).words(), words, "{text}");
        }
    }
}
