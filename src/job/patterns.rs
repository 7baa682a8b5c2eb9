//! Lists of patterns: each entry a regular expression, or a table that says more than its expression does.

use std::ops::Range;

use toml::de::{DeArray, DeTable, DeValue};

use super::key::{Key, Kind, quoted};
use super::pattern::{FORCE_WORDS, LENGTH_WORDS, Pattern, PatternUnit, Word};
use super::reading::{Entry, Reader, kind_word, nearest, plain};
use super::{Datum, FromFace};

impl Reader {
    /// The patterns of a list; `None` where it is empty.
    pub(super) fn patterns(
        &mut self,
        key: &Key,
        entry: &Entry<'_>,
        items: &DeArray<'_>,
    ) -> Option<Vec<Pattern>> {
        if items.iter().next().is_none() {
            self.mistake(
                entry.span(),
                format!("`{}` is an empty list, which nothing matches", key.name),
                format!("expected {}", key.expected()),
                "take the line out for the defaults",
            );
            return None;
        }
        let mut patterns: Vec<Pattern> = Vec::new();
        for item in items {
            match item.get_ref() {
                DeValue::String(text) if !text.is_empty() => {
                    patterns.extend(self.expression(key, text, &item.span()).map(Pattern::new));
                }
                DeValue::Table(fields) => {
                    patterns.extend(self.pattern(key, &item.span(), fields));
                }
                other => self.no_item(key, other, item.span()),
            }
        }
        Some(patterns)
    }

    /// A pattern in a table.
    fn pattern(&mut self, key: &Key, span: &Range<usize>, fields: &DeTable<'_>) -> Option<Pattern> {
        let says = match &key.kind {
            Kind::Expressions { says, .. } => *says,
            _ => &[],
        };
        let known = [&["name", "expression"], says].concat();
        for name in fields.keys() {
            let word = plain(name.get_ref());
            if !known.contains(&word.as_str()) {
                let near = nearest(&word, known.iter().copied());
                self.mistake(
                    name.span(),
                    format!("unknown key `{word}` in a pattern of `{}`", key.name),
                    format!("the keys of such a pattern are {}", known.join(", ")),
                    near.map_or("take it out".to_owned(), |near| {
                        format!("did you mean `{near}`?")
                    }),
                );
            }
        }
        let Some(expression) = fields.get("expression") else {
            self.mistake(
                span.clone(),
                format!("this pattern of `{}` has no `expression`", key.name),
                format!("expected {}", key.expected()),
                "type for example `{ name = \"...\", expression = '...' }`",
            );
            return None;
        };
        let DeValue::String(text) = expression.get_ref() else {
            self.mistake(
                expression.span(),
                format!("`expression` cannot be {}", kind_word(expression.get_ref())),
                "expected a regular expression in 'single quotes'",
                format!("type for example `{}`", key.example()),
            );
            return None;
        };
        let mut pattern = Pattern::new(self.expression(key, text, &expression.span())?);
        for (name, value) in fields {
            if known.contains(&name.get_ref().as_ref()) {
                self.said(&mut pattern, name.get_ref(), value);
            }
        }
        self.unit_of_force(&pattern, span);
        Some(pattern)
    }

    /// What a table says besides its expression.
    fn said(&mut self, pattern: &mut Pattern, name: &str, value: &Entry<'_>) {
        match (name, value.get_ref()) {
            ("name", DeValue::String(word)) if !word.trim().is_empty() => {
                pattern.name = Some(word.to_string());
            }
            ("unit", DeValue::String(_)) => {
                let forces = pattern.has_group("force") || pattern.has_group("force_per_width");
                let words = if forces { FORCE_WORDS } else { LENGTH_WORDS };
                let word = self.one_of(name, words, value);
                pattern.unit = word.and_then(PatternUnit::named);
            }
            ("from", DeValue::String(_)) => {
                pattern.from = self.one_of(name, FromFace::WORDS, value).map(FromFace::of);
            }
            ("datum", DeValue::String(_)) => {
                pattern.datum = self.one_of(name, Datum::WORDS, value).map(Datum::of);
            }
            ("word", DeValue::String(_)) => {
                pattern.word = match self.one_of(name, &["high", "low"], value) {
                    Some("high") => Some(Word::High),
                    Some(_) => Some(Word::Low),
                    None => None,
                };
            }
            ("strand", DeValue::String(size)) => {
                self.strand_names.push((size.to_string(), value.span()));
                pattern.strand = Some(size.to_string());
            }
            ("strands", _) => {
                let count = self.number(name, (1.0, 1000.0), "strands = 1", value);
                pattern.strands = count.and_then(whole);
                if count.is_some() && pattern.strands.is_none() {
                    self.mistake(
                        value.span(),
                        "`strands` is not a whole number",
                        "expected the strands in each tendon",
                        "type for example `strands = 1`",
                    );
                }
            }
            ("expression", _) => {}
            (_, other) => self.mistake(
                value.span(),
                format!("`{name}` cannot be {}", kind_word(other)),
                "expected a word in quotes",
                format!("type for example `{name} = \"{}\"`", sample(name)),
            ),
        }
    }

    /// The word of a list that stands here.
    fn one_of(
        &mut self,
        name: &str,
        words: &'static [&'static str],
        value: &Entry<'_>,
    ) -> Option<&'static str> {
        let DeValue::String(word) = value.get_ref() else {
            return None;
        };
        let found = words.iter().copied().find(|known| known == word);
        if found.is_none() {
            let near = nearest(word, words.iter().copied())
                .or(words.first().copied())
                .unwrap_or_default();
            self.mistake(
                value.span(),
                format!("`{name}` does not know \"{}\"", plain(word)),
                format!("expected one of {}", quoted(words)),
                format!("type `{name} = \"{near}\"`"),
            );
        }
        found
    }

    /// A force has a unit of its own, and one of its kind.
    fn unit_of_force(&mut self, pattern: &Pattern, span: &Range<usize>) {
        let unit = match pattern.unit {
            Some(PatternUnit::Force(unit)) => Some(unit),
            _ => None,
        };
        for (group, per_width, words) in [
            ("force", false, "\"kN\" or \"kip\""),
            ("force_per_width", true, "\"kN/m\" or \"kip/ft\""),
        ] {
            if pattern.has_group(group) && unit.is_none_or(|unit| unit.per_width() != per_width) {
                self.mistake(
                    span.clone(),
                    format!("the group `{group}` of this pattern has no unit that fits"),
                    format!("expected `unit` to be {words}"),
                    format!(
                        "type for example `unit = \"{}\"` in the pattern's table",
                        if per_width { "kN/m" } else { "kN" }
                    ),
                );
            }
        }
    }
}

/// What one may type for a key of a table.
fn sample(name: &str) -> &'static str {
    match name {
        "unit" => "in",
        "from" => "soffit",
        "datum" => "centroid",
        "word" => "high",
        "strand" => "12.7",
        _ => "strands and size",
    }
}

/// A whole number; the range has been checked.
pub(super) fn whole(count: f64) -> Option<u32> {
    format!("{count}").parse().ok()
}
