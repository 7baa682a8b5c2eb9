//! A label of one or several lines, each read for what it is, and what its lines say against one another.

use super::heard::Heard;
use super::marking::Marking;
use super::readings::{HeightText, height_of_line, mark_of_line};
use crate::job::{FromFace, Job};

/// A label, its lines taken together.
#[derive(Debug, Clone, Default)]
pub(super) struct LabelText {
    /// Its height; torn where the label says another too.
    pub(super) height: Option<HeightText>,
    /// Mark, strands, required force, gathered over the lines.
    pub(super) mark: Option<Marking>,
    /// What in it contradicts itself, in words.
    pub(super) against: Vec<String>,
    /// Lines that say nothing that could be read.
    pub(super) left: Vec<String>,
}

/// Reads a label on a layer of heights, of marks, or of both. Where both lie on one layer a line is a height before it
/// is a mark. A label of several lines may hold both whatever its layer is for; then what is not of its layer counts
/// only where it speaks for itself: a height with a word, a mark with strands or a force.
pub(super) fn label(content: &str, heights: bool, marks: bool, job: &Job) -> LabelText {
    let conventions = &job.conventions;
    let mut whole = LabelText::default();
    let mut height: Heard<HeightText> = Heard::Nothing;
    let mut mark = Marking::default();
    let lines: Vec<&str> = content
        .lines()
        .filter(|line| !line.trim().is_empty())
        .collect();
    for line in &lines {
        let as_height = height_of_line(line, conventions).map(|(height, _)| height);
        let as_mark = mark_of_line(line, &conventions.mark_patterns).map(|(mark, _)| mark);
        let (said, named) = match (as_height, as_mark) {
            (Some(height), _) if heights => (Some(height), None),
            (Some(height), Some(name)) if lines.len() > 1 && height.plain() => {
                // On a layer of marks alone, `H165` below another mark is no second mark.
                if mark.mark.is_said() && !name.counts() {
                    (Some(height), None)
                } else {
                    (None, Some(name))
                }
            }
            (Some(height), None) if lines.len() > 1 && height.plain() => (Some(height), None),
            (_, Some(said)) if marks || (lines.len() > 1 && said.counts()) => (None, Some(said)),
            _ => (None, None),
        };
        if said.is_none() && named.is_none() && !empty(line) {
            whole.left.push(line.trim().to_owned());
        }
        if let Some(said) = said {
            height.hear(Some(said));
            whole.height.get_or_insert(said);
        }
        if let Some(mut named) = named {
            // One size may be written in several ways.
            let written = named.strand.take();
            named.strand = written.map(|written| match job.tendon.strand_named(&written) {
                Some(size) => size.name.clone(),
                None => written,
            });
            mark.join(named.into());
        }
    }
    let torn = height.is_torn();
    if torn {
        whole.against.push("it gives two heights".to_owned());
    }
    whole.against.extend(
        mark.torn()
            .iter()
            .map(|what| format!("it gives two {what}")),
    );
    if let Some(height) = &mut whole.height {
        height.torn = torn;
        let from = height.from;
        whole.left.retain(|line| match face(line) {
            Some(said) if said == from => false,
            None => true,
            Some(_) if from == FromFace::NearerFace => true,
            Some(_) => {
                height.torn = true;
                whole.against.push(format!(
                    "{line:?} names another face than the one that the job file takes heights from"
                ));
                false
            }
        });
    }
    whole.mark = (mark != Marking::default()).then_some(mark);
    whole
}

/// Words of a line, letters and digits only.
fn words(line: &str) -> Vec<String> {
    let words = line.split(|sign: char| !sign.is_alphanumeric());
    words
        .filter(|word| !word.is_empty())
        .map(str::to_uppercase)
        .collect()
}

/// Whether a line says nothing of the label itself: that it holds for others too, or unless noted otherwise.
fn empty(line: &str) -> bool {
    let words = words(line);
    let words: Vec<&str> = words.iter().map(String::as_str).collect();
    matches!(
        words.as_slice(),
        [] | ["TYP" | "TYPICAL" | "UNO" | "SIM"] | ["U", "N", "O"]
    )
}

/// The face that a line of its own names, as in `FROM TOP`, `(BTM)` or `TO U/S`.
fn face(line: &str) -> Option<FromFace> {
    let words = words(line);
    let small = ["MEASURED", "FROM", "THE", "OF", "SLAB", "FACE"];
    let named: Vec<&str> = words
        .iter()
        .map(String::as_str)
        .filter(|word| !small.contains(word))
        .collect();
    match named.as_slice() {
        ["TOP" | "TOS" | "TOC" | "SSL"] => Some(FromFace::Top),
        ["BOTTOM" | "BTM" | "BOT" | "SOFFIT" | "UNDERSIDE" | "FORM" | "FORMWORK"] | ["U", "S"] => {
            Some(FromFace::Soffit)
        }
        _ => None,
    }
}

/// Whether a line looks as if it changed what the label says: a face, a part, or a number of them.
pub(super) fn changes(line: &str) -> bool {
    const CHANGING: &[&str] = &[
        "FROM",
        "ABOVE",
        "BELOW",
        "TOP",
        "BOTTOM",
        "BTM",
        "BOT",
        "SOFFIT",
        "UNDERSIDE",
        "FACE",
        "COVER",
        "CLEAR",
        "CLR",
        "DUCT",
        "CHAIR",
        "SAG",
        "NO",
        "NOS",
        "OFF",
        "EACH",
        "X",
        "TWO",
        "PAIR",
        "BUNDLE",
    ];
    let counts = |word: &str| {
        let number = word.strip_prefix('X').or_else(|| word.strip_suffix('X'));
        number.is_some_and(|number| number.chars().all(|sign| sign.is_ascii_digit()))
    };
    let words = words(line);
    words
        .iter()
        .any(|word| CHANGING.contains(&word.as_str()) || counts(word))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Height in millimetres, mark, tendons, strands, each if it counts.
    type Read = (Option<i64>, Option<String>, Option<u32>, Option<u32>);

    fn read(content: &str) -> (Read, LabelText) {
        let label = label(content, true, true, &Job::default());
        let height = label.height.filter(|height| !height.torn);
        let mark = label.mark.clone().unwrap_or_default();
        #[expect(clippy::cast_possible_truncation, reason = "small numbers")]
        let height = height.map(|height| (height.value_m * 1000.0).round() as i64);
        let one = (
            height,
            mark.mark.one().cloned(),
            mark.tendons.one().copied(),
            mark.strands.one().copied(),
        );
        (one, label)
    }

    #[test]
    fn lines_that_contradict_one_another_leave_nothing_that_counts() {
        let named = || Some("D01".to_owned());
        for (content, expected) in [
            ("H165\nH170", (None, None, None, None)),
            ("D01 5-12.7\n4-12.7", (None, named(), None, None)),
            ("D01\nD02\n5-12.7", (None, None, None, Some(5))),
            ("3x5-12.7\n2x5-12.7", (None, None, None, Some(5))),
            ("35\nFROM TOP", (None, None, None, None)),
        ] {
            let (found, label) = read(content);
            assert_eq!(found, expected, "{content}");
            assert_eq!(label.against.len(), 1, "{content}: {:?}", label.against);
        }
    }

    #[test]
    fn repeats_and_what_says_nothing_leave_the_reading_as_it_is() {
        for content in [
            "D01 5-12.7\nH165",
            "D01 5-1/2\"\n5-12.7\nH165\nH165",
            "D01 5-12.7\nH165\nTYP.",
            "D01 5-12.7\n(TYP.)\nH165\nU.N.O.",
            "D01 5-12.7\nH165\nFROM SOFFIT",
        ] {
            let (found, label) = read(content);
            let expected = (Some(165), Some("D01".to_owned()), None, Some(5));
            assert_eq!(found, expected, "{content}");
            assert!(
                label.against.is_empty() && label.left.is_empty(),
                "{content}"
            );
        }
        for (line, changing) in [
            ("2x", true),
            ("2 NO", true),
            ("+10 SAG", true),
            ("TO U/S DUCT", true),
            ("SEE S-201", false),
            ("2026-11-30", false),
        ] {
            let (found, label) = read(&format!("D01 5-12.7\nH165\n{line}"));
            assert_eq!((found.0, found.3), (Some(165), Some(5)), "{line}");
            assert_eq!(label.left, [line]);
            assert_eq!(changes(line), changing, "{line}");
        }
    }
}
