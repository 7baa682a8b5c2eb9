//! What the texts of a group of like tendons say: marks, number, spacing, strands.

use super::heard::Heard;
use super::label_text::label;
use super::lengths::length_m;
use super::marking::Marking;
use super::readings::length_unit;
use crate::job::Job;

/// What the texts of a group say.
#[derive(Debug, Clone, Default, PartialEq)]
pub(super) struct GroupText {
    pub(super) first: Heard<String>,
    pub(super) last: Heard<String>,
    pub(super) number: Heard<u32>,
    /// Tendons at each place.
    pub(super) each: Heard<u32>,
    pub(super) spacing_m: Heard<f64>,
    /// Strands, written in the same text.
    pub(super) strands: Marking,
}

impl GroupText {
    /// Hears what another text of the group says.
    pub(super) fn join(&mut self, other: Self) {
        self.first.join(other.first);
        self.last.join(other.last);
        self.number.join(other.number);
        self.each.join(other.each);
        self.spacing_m.join(other.spacing_m);
        self.strands.join(other.strands);
    }

    /// What its texts say two of, in words.
    pub(super) fn torn(&self) -> Option<String> {
        let own = [
            (self.first.is_torn() || self.last.is_torn(), "rows of marks"),
            (self.number.is_torn(), "numbers"),
            (self.each.is_torn(), "numbers of tendons at each place"),
            (self.spacing_m.is_torn(), "spacings"),
        ];
        let own = own
            .into_iter()
            .filter_map(|(torn, what)| torn.then_some(what));
        let torn: Vec<&str> = own.chain(self.strands.torn()).collect();
        (!torn.is_empty()).then(|| torn.join(", "))
    }
}

/// What a text says of a group: each pattern tried on each line, and what they leave of it read as a mark; and what is
/// left over of that.
pub(super) fn group_text(content: &str, job: &Job) -> Option<(GroupText, Vec<String>)> {
    let conventions = &job.conventions;
    let mut said = GroupText::default();
    let (mut rest, mut counted): (Vec<String>, Vec<String>) = Default::default();
    for line in content.lines() {
        let mut left: Vec<Option<char>> = line.chars().map(Some).collect();
        for pattern in &conventions.group_patterns {
            let unit = length_unit(pattern).unwrap_or(conventions.height.unit);
            for found in pattern.expression.captures_iter(line) {
                let part = |name: &str| {
                    let part = found.name(name)?.as_str().trim();
                    (!part.is_empty()).then(|| part.to_owned())
                };
                // A number beyond counting is one that nobody knows.
                let count = |name: &str| match part(name).map(|part| part.parse()) {
                    None => Heard::Nothing,
                    Some(Ok(count)) => Heard::One(count),
                    Some(Err(_)) => Heard::Torn,
                };
                said.first.hear(part("first"));
                said.last.hear(part("last"));
                said.number.join(count("number"));
                said.each.join(count("each"));
                let spacing_m = part("spacing").and_then(|spacing| length_m(&spacing, unit));
                said.spacing_m.hear(spacing_m.map(to_tenth_mm));
                let whole = found.get(0).map_or(0..0, |whole| whole.range());
                // A job may read `2T` for more than a number.
                if found.name("each").is_some() {
                    let text = line.get(whole).unwrap_or_default();
                    let before = text.split('@').next().unwrap_or_default();
                    counted.push(before.trim_matches([' ', ',', ';', '(']).to_owned());
                    continue;
                }
                for ((at, _), sign) in line.char_indices().zip(&mut left) {
                    if whole.contains(&at) {
                        *sign = None;
                    }
                }
            }
        }
        let left: String = left.into_iter().flatten().collect();
        rest.push(left.trim_matches([' ', ',', ';', '(', ')']).to_owned());
    }
    if said == GroupText::default() {
        return None;
    }
    let mut rest = label(&rest.join("\n"), false, true, job);
    rest.left.retain(|line| !counted.contains(line));
    said.strands = rest.mark.unwrap_or_default();
    Some((said, rest.left))
}

/// A length to a tenth of a millimetre, so that `1200` and `1.2 m` are the same one.
fn to_tenth_mm(length_m: f64) -> f64 {
    (length_m * 1e4).round() / 1e4
}
