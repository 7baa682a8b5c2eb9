//! From the file's text to a job: walks the TOML against the table of keys and gathers every mistake.

use std::collections::BTreeMap;
use std::ops::Range;

use toml::Spanned;
use toml::de::{DeString, DeTable, DeValue};

use super::automaton::Budget;
use super::key::Key;
use super::keys::{KEYS, ROOT, TABLES, find, of_table};
use super::problems::{Problem, Problems};
use super::{Job, Resolved};

pub(super) type Entry<'t> = Spanned<DeValue<'t>>;

/// Reads a job file; `file_name` is only for messages.
///
/// # Errors
/// Every mistake in the file, each with its place.
pub fn read(file_name: &str, text: &str) -> Result<Resolved, Problems> {
    let (root, broken) = DeTable::parse_recoverable(text);
    let mut reader = Reader::default();
    for error in &broken {
        let span = error.span().unwrap_or(0..0);
        reader.mistake(
            span,
            format!("this is not TOML: {}", plain(error.message())),
            "here the file cannot be read on",
            "write `key = value` lines below a `[table]` line; words in \"quotes\", lists in [brackets]",
        );
    }
    let syntax = reader.problems.len();
    // A system's defaults come first, so that the keys of the tables override them.
    reader.root(root.get_ref());
    reader.tables(root.get_ref());
    reader.contradictions();
    reader.at_odds();
    reader.pattern_words();
    reader.methods();
    // After a broken line what follows it on that line is guesswork: the mistake itself is enough.
    let (broken, mut found) = {
        let found = reader.problems.split_off(syntax);
        (reader.problems, found)
    };
    let line = |at: usize| {
        text.get(..at)
            .map_or(0, |before| before.matches('\n').count())
    };
    found.retain(|problem| {
        !broken
            .iter()
            .any(|other| line(other.span.start) == line(problem.span.start))
    });
    found.extend(broken);
    if found.is_empty() {
        return Ok(Resolved {
            job: reader.job,
            given: reader.given.into_keys().collect(),
        });
    }
    Err(Problems::new(file_name, text, found))
}

#[derive(Default)]
pub(super) struct Reader {
    pub(super) job: Job,
    /// Path of each given key, with its place.
    pub(super) given: BTreeMap<String, Range<usize>>,
    pub(super) problems: Vec<Problem>,
    /// Sizes of strand that patterns name, with their places.
    pub(super) strand_names: Vec<(String, Range<usize>)>,
    /// What patterns take for high or low, with their places.
    pub(super) pattern_words: Vec<(Vec<String>, Range<usize>)>,
    /// What is left for checking patterns.
    pub(super) budget: Budget,
    /// Words of lists: path of the key, word, place.
    pub(super) word_spans: Vec<(String, String, Range<usize>)>,
}

impl Reader {
    pub(super) fn mistake(
        &mut self,
        span: Range<usize>,
        found: impl Into<String>,
        expected: impl Into<String>,
        remedy: impl Into<String>,
    ) {
        self.problems.push(Problem {
            span,
            found: found.into(),
            expected: expected.into(),
            remedy: remedy.into(),
        });
    }

    /// The keys before every table: the system, then the others, since a system sets a whole job.
    fn root(&mut self, root: &DeTable<'_>) {
        let mut keys: Vec<&Key> = of_table(ROOT).collect();
        keys.sort_by_key(|key| key.name != "system");
        for key in keys {
            let Some((name, value)) = root.get_key_value(key.name) else {
                continue;
            };
            if key.name == "system" && matches!(value.get_ref(), DeValue::Table(_)) {
                self.mistake(
                    name.span(),
                    "strand and duct stand in the table `[tendon]`; `system` is a key, the name of a system",
                    format!("expected {}", key.expected()),
                    "write `[tendon]` for `[system]`, and `[[tendon.strand]]` for `[[system.strand]]`",
                );
                continue;
            }
            self.given.insert(key.path(), name.span());
            self.value(key, value);
        }
    }

    fn tables(&mut self, root: &DeTable<'_>) {
        for (name, value) in root {
            if find(ROOT, name.get_ref()).is_some() {
                continue;
            }
            let known = TABLES
                .iter()
                .any(|(table, _)| *table != ROOT && *table == name.get_ref());
            match value.get_ref() {
                DeValue::Table(entries) if known => self.keys(name.get_ref(), entries),
                _ if known => self.mistake(
                    value.span(),
                    format!("`{}` is a table, not a value", name.get_ref()),
                    "expected a table",
                    format!(
                        "write `[{}]` on a line of its own, and its keys below",
                        name.get_ref()
                    ),
                ),
                _ => self.unknown_table(name),
            }
        }
    }

    fn unknown_table(&mut self, name: &Spanned<DeString<'_>>) {
        let word = plain(name.get_ref());
        let tables: Vec<&str> = TABLES
            .iter()
            .map(|(table, _)| *table)
            .filter(|table| *table != ROOT)
            .collect();
        let root: Vec<&str> = of_table(ROOT).map(|key| key.name).collect();
        let remedy = if let Some(key) = KEYS.iter().find(|key| key.name == word) {
            format!("`{word}` belongs {}", key.place())
        } else {
            match nearest(&word, tables.iter().chain(&root).copied()) {
                Some(near) if root.contains(&near) => format!("did you mean `{near}`?"),
                Some(near) => format!("did you mean `[{near}]`?"),
                None => "take the line out, or use one of these tables".to_owned(),
            }
        };
        self.mistake(
            name.span(),
            format!("unknown table `{word}`"),
            format!(
                "the tables are {}; the keys before them {}",
                tables.join(", "),
                root.join(", ")
            ),
            remedy,
        );
    }

    fn keys(&mut self, table: &str, entries: &DeTable<'_>) {
        for (name, value) in entries {
            match find(table, name.get_ref()) {
                Some(key) => {
                    self.given.insert(key.path(), name.span());
                    self.value(key, value);
                }
                None => self.unknown_key(table, name),
            }
        }
    }

    fn unknown_key(&mut self, table: &str, name: &Spanned<DeString<'_>>) {
        let word = plain(name.get_ref());
        let here: Vec<&str> = of_table(table).map(|key| key.name).collect();
        let elsewhere = KEYS.iter().find(|key| key.name == word);
        let remedy = match (nearest(&word, here.iter().copied()), elsewhere) {
            (_, Some(key)) => format!("`{word}` belongs {}", key.place()),
            (Some(near), None) => match find(table, near) {
                Some(key) => format!(
                    "did you mean `{near}`? Type for example `{}`",
                    key.example()
                ),
                None => format!("did you mean `{near}`?"),
            },
            (None, None) => match nearest(&word, KEYS.iter().map(|key| key.name))
                .and_then(|near| KEYS.iter().find(|key| key.name == near))
            {
                Some(key) => format!("did you mean `{}` {}?", key.name, key.place()),
                None => "take the line out, or use one of these keys".to_owned(),
            },
        };
        self.mistake(
            name.span(),
            format!("unknown key `{word}` in [{table}]"),
            format!("the keys of [{table}] are {}", here.join(", ")),
            remedy,
        );
    }
}

/// What a value is, in words.
pub(super) fn kind_word(value: &DeValue<'_>) -> String {
    match value {
        DeValue::String(text) => format!("the text \"{}\"", plain(text)),
        DeValue::Integer(number) => format!("the number {}", plain(number.as_str())),
        DeValue::Float(number) => format!("the number {}", plain(number.as_str())),
        DeValue::Boolean(on) => format!("{on}"),
        DeValue::Datetime(_) => "a date".to_owned(),
        DeValue::Array(_) => "a list".to_owned(),
        DeValue::Table(_) => "a table".to_owned(),
    }
}

/// The word that was probably meant, if one is near enough.
pub(super) fn nearest<'w>(word: &str, known: impl IntoIterator<Item = &'w str>) -> Option<&'w str> {
    let word = word.to_lowercase();
    known
        .into_iter()
        .map(|candidate| {
            let likeness = strsim::jaro_winkler(&word, candidate);
            (likeness, candidate)
        })
        .filter(|(likeness, _)| *likeness > 0.75)
        .max_by(|one, other| one.0.total_cmp(&other.0))
        .map(|(_, candidate)| candidate)
}

/// Text of the file inside a message: no control characters, and not endless.
pub(super) fn plain(text: &str) -> String {
    const LONGEST: usize = 60;
    let mut short: String = text
        .chars()
        .take(LONGEST)
        .map(|c| if c.is_control() { '\u{fffd}' } else { c })
        .collect();
    if text.chars().nth(LONGEST).is_some() {
        short.push_str("...");
    }
    short
}
