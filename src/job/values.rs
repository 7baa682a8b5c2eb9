//! What stands behind a key, checked against what may be typed there.

use std::ops::Range;

use toml::de::{DeArray, DeValue};

use crate::job::StrandSize;
use crate::job::key::{Key, Kind, quoted};
use crate::job::patterns::whole;
use crate::job::reading::{Entry, Reader, kind_word, nearest, plain};
use crate::patterns::{Names, PatternRefused, Selectors};

impl Reader {
    pub(super) fn value(&mut self, key: &Key, entry: &Entry<'_>) {
        match (&key.kind, entry.get_ref()) {
            (
                Kind::Number {
                    least, most, set, ..
                },
                DeValue::Integer(_) | DeValue::Float(_),
            ) => {
                if let Some(number) = self.number(key.name, (*least, *most), &key.example(), entry)
                {
                    set(&mut self.job, number);
                }
            }
            (Kind::Count { .. }, DeValue::Integer(_) | DeValue::Float(_)) => {
                self.count(key, entry);
            }
            (Kind::Choice { words, set, .. }, DeValue::String(word)) => {
                if words.contains(&word.as_ref()) {
                    set(&mut self.job, word);
                } else {
                    let near = nearest(word, words.iter().copied());
                    let example = near.map_or_else(
                        || key.example(),
                        |near| format!("{} = \"{near}\"", key.name),
                    );
                    self.mistake(
                        entry.span(),
                        format!("`{}` does not know \"{}\"", key.name, plain(word)),
                        format!("expected one of {}", quoted(words)),
                        format!("type `{example}`"),
                    );
                }
            }
            (Kind::Switch { set, .. }, DeValue::Boolean(on)) => set(&mut self.job, *on),
            (Kind::StrandName { set, .. }, DeValue::String(name)) => set(&mut self.job, name),
            (Kind::Words(place), DeValue::Array(items)) => {
                if let Some(words) = self.words(key, entry, items) {
                    (place.set)(
                        &mut self.job,
                        words.into_iter().map(|(word, _)| word).collect(),
                    );
                }
            }
            (Kind::Shell(place), DeValue::Array(items)) => {
                if let Some(words) = self.words(key, entry, items) {
                    for (pattern, span) in &words {
                        self.shell(key, pattern, span);
                    }
                    (place.set)(
                        &mut self.job,
                        words.into_iter().map(|(word, _)| word).collect(),
                    );
                }
            }
            (Kind::Choices { words, place }, DeValue::Array(items)) => {
                let chosen = self.choices(key, words, entry, items);
                (place.set)(&mut self.job, chosen);
            }
            (Kind::Expressions { place, .. }, DeValue::Array(items)) => {
                if let Some(patterns) = self.patterns(key, entry, items) {
                    (place.set)(&mut self.job, patterns);
                }
            }
            (Kind::Strands(place), DeValue::Array(items)) => {
                let given = self.strands(entry, items);
                let mut all = (place.get)(&self.job).clone();
                for size in given {
                    match all.iter_mut().find(|known| known.name == size.name) {
                        // Who replaces a size and names no aliases keeps those that it has.
                        Some(known) if size.aliases.is_empty() => {
                            *known = StrandSize {
                                aliases: std::mem::take(&mut known.aliases),
                                ..size
                            };
                        }
                        Some(known) => *known = size,
                        None => all.push(size),
                    }
                }
                (place.set)(&mut self.job, all);
            }
            _ => self.mistake(
                entry.span(),
                format!("`{}` cannot be {}", key.name, kind_word(entry.get_ref())),
                format!("expected {}", key.expected()),
                format!("type for example `{}`", key.example()),
            ),
        }
    }

    fn count(&mut self, key: &Key, entry: &Entry<'_>) {
        let Kind::Count {
            least, most, set, ..
        } = key.kind
        else {
            return;
        };
        let range = (f64::from(least), f64::from(most));
        let Some(number) = self.number(key.name, range, &key.example(), entry) else {
            return;
        };
        match whole(number) {
            Some(count) => set(&mut self.job, count),
            None => self.mistake(
                entry.span(),
                format!("`{}` is not a whole number", key.name),
                format!("expected {}", key.expected()),
                format!("type for example `{}`", key.example()),
            ),
        }
    }

    /// Words of a list, each one of those that are known.
    fn choices(
        &mut self,
        key: &Key,
        known: &[&str],
        entry: &Entry<'_>,
        items: &DeArray<'_>,
    ) -> Vec<String> {
        let mut chosen = Vec::new();
        for (word, span) in self.words(key, entry, items).unwrap_or_default() {
            if known.contains(&word.as_str()) {
                chosen.push(word);
                continue;
            }
            let near = nearest(&word, known.iter().copied());
            let example = near.or(known.first().copied()).unwrap_or_default();
            self.mistake(
                span,
                format!("`{}` does not know \"{}\"", key.name, plain(&word)),
                format!("expected some of {}", quoted(known)),
                format!("type for example `{} = [\"{example}\"]`", key.name),
            );
        }
        chosen
    }

    /// Whether a shell pattern, or a pattern of layers, can be understood.
    fn shell(&mut self, key: &Key, pattern: &str, span: &Range<usize>) {
        let layers = key.table == "layers";
        let refused = if layers {
            Selectors::new([pattern]).err()
        } else {
            Names::new([pattern]).err().map(PatternRefused::from)
        };
        match refused {
            None => {}
            Some(PatternRefused::Shell(reason)) => self.mistake(
                span.clone(),
                format!(
                    "`{}` holds a broken shell pattern: {}",
                    key.name,
                    plain(&reason.to_string())
                ),
                "expected *, ?, [abc] or {this,that}",
                "close every [ and {; put [ ] around a bracket that is meant as itself: [[]",
            ),
            Some(refused) => self.mistake(
                span.clone(),
                format!(
                    "`{}` holds a broken layer pattern: {}",
                    key.name,
                    plain(&refused.to_string())
                ),
                "expected NAME, NAME@colour=1 to 255, NAME@linetype=DASHED*, or both",
                format!("type for example `{} = [\"NAME*@colour=1\"]`", key.name),
            ),
        }
    }

    /// A number within its range.
    pub(super) fn number(
        &mut self,
        name: &str,
        (least, most): (f64, f64),
        example: &str,
        entry: &Entry<'_>,
    ) -> Option<f64> {
        let number = match entry.get_ref() {
            DeValue::Integer(whole) => i64::from_str_radix(whole.as_str(), whole.radix())
                .ok()
                .map(as_float),
            DeValue::Float(float) => float.as_str().parse::<f64>().ok(),
            other => {
                self.mistake(
                    entry.span(),
                    format!("`{name}` cannot be {}", kind_word(other)),
                    format!("expected a number from {least} to {most}"),
                    format!("type for example `{example}`"),
                );
                return None;
            }
        };
        match number {
            Some(number) if (least..=most).contains(&number) => Some(number),
            Some(number) => {
                let hundredth = number / 100.0;
                // What is given per metre or per radian is no percentage of anything.
                let ratio = most <= 1.0 && !name.contains("_per_");
                let remedy = if ratio && number > 1.0 && (least..=most).contains(&hundredth) {
                    format!("this is a ratio, not a percentage: type `{name} = {hundredth}`")
                } else {
                    format!("type for example `{example}`")
                };
                self.mistake(
                    entry.span(),
                    format!("`{name}` cannot be {number}"),
                    format!("expected a number from {least} to {most}"),
                    remedy,
                );
                None
            }
            None => {
                self.mistake(
                    entry.span(),
                    format!("`{name}` is not a number that can be read"),
                    format!("expected a number from {least} to {most}"),
                    format!("type for example `{example}`"),
                );
                None
            }
        }
    }

    /// Says that a list of this key cannot hold this.
    pub(super) fn no_item(&mut self, key: &Key, item: &DeValue<'_>, span: Range<usize>) {
        let found = match item {
            DeValue::String(_) => format!("`{}` holds an empty word", key.name),
            _ => format!("`{}` cannot hold {}", key.name, kind_word(item)),
        };
        self.mistake(
            span,
            found,
            format!("expected {}", key.expected()),
            format!("type for example `{}`", key.example()),
        );
    }

    /// A list of words that is not empty (unless the default is), each with its place.
    pub(super) fn words(
        &mut self,
        key: &Key,
        entry: &Entry<'_>,
        items: &DeArray<'_>,
    ) -> Option<Vec<(String, Range<usize>)>> {
        let mut words = Vec::new();
        let before = self.problems.len();
        for item in items {
            match item.get_ref() {
                DeValue::String(word) if !word.is_empty() => {
                    words.push((word.to_string(), item.span()));
                }
                other => self.no_item(key, other, item.span()),
            }
        }
        if items.iter().next().is_none() && !key.may_be_empty() {
            self.mistake(
                entry.span(),
                format!("`{}` is an empty list, which nothing matches", key.name),
                format!("expected {}", key.expected()),
                format!("take the line out for the default, `{}`", key.example()),
            );
        }
        let spans = words.iter().cloned();
        self.word_spans
            .extend(spans.map(|(word, span)| (key.path(), word, span)));
        (self.problems.len() == before).then_some(words)
    }
}

#[expect(
    clippy::cast_precision_loss,
    reason = "beyond 2^53 a float rounds, far outside every range: the range check still speaks truly"
)]
fn as_float(whole: i64) -> f64 {
    whole as f64
}
