//! What a text is taken for by the job's patterns, when only the text itself speaks.

use regex::Regex;

use crate::job::Job;

/// What a text says.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Reading {
    /// Slab thickness.
    Thickness(String),
    /// A height, and its word if it has one.
    Height(String),
    /// A mark, strands, or both; whether strands are in it.
    Mark {
        /// In words.
        words: String,
        /// Whether strands are counted.
        strands: bool,
    },
    /// None of the job's patterns fits.
    Unread,
}

/// Reads a text: as a thickness, else a height, else a mark.
pub(super) fn reading(text: &str, job: &Job) -> Reading {
    let read = &job.conventions;
    let text = text.trim();
    let group = |patterns: &[Regex], name: &str| {
        let found = patterns.iter().find_map(|pattern| pattern.captures(text))?;
        found.name(name).map(|part| part.as_str().to_owned())
    };
    if let Some(value) = group(&read.thickness_patterns, "value") {
        return Reading::Thickness(format!(
            "slab thickness {value} {}",
            read.thickness_unit.name()
        ));
    }
    if let Some(value) = group(&read.height_patterns, "value") {
        let word = group(&read.height_patterns, "word");
        let is = |words: &[String]| {
            let fits = |word: &String| words.iter().any(|known| known.eq_ignore_ascii_case(word));
            word.as_ref().is_some_and(fits)
        };
        let unit = read.height.unit.name();
        if is(&read.high_words) {
            return Reading::Height(format!("high point {value} {unit}"));
        }
        if is(&read.low_words) {
            return Reading::Height(format!("low point {value} {unit}"));
        }
        if word.is_none() {
            return Reading::Height(format!("height {value} {unit}"));
        }
    }
    let part = |name, before: &str, after: &str| {
        group(&read.mark_patterns, name).map(|part| format!("{before}{part}{after}"))
    };
    let strands = part("strands", "", " strands");
    let parts: Vec<String> = [
        part("mark", "mark ", ""),
        part("tendons", "", " tendons"),
        strands.clone(),
        part("strand", "of ", ""),
    ]
    .into_iter()
    .flatten()
    .collect();
    if parts.is_empty() {
        return Reading::Unread;
    }
    Reading::Mark {
        words: parts.join(" "),
        strands: strands.is_some(),
    }
}

impl Reading {
    /// In words.
    pub(super) fn words(&self) -> &str {
        match self {
            Self::Thickness(words) | Self::Height(words) | Self::Mark { words, .. } => words,
            Self::Unread => "not read",
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
            ("T350", "slab thickness 350 mm"),
            ("H165", "high point 165 mm"),
            (" 30L ", "low point 30 mm"),
            ("165", "height 165 mm"),
            ("D012 5-12.7", "mark D012 5 strands of 12.7"),
            ("B03 4x5-12.7", "mark B03 4 tendons 5 strands of 12.7"),
            ("5-12.7", "5 strands of 12.7"),
            ("SEE DETAIL 4", "not read"),
        ] {
            assert_eq!(reading(text, &job).words(), words, "{text}");
        }
    }
}
