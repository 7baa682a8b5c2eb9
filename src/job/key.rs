//! What a key of the job file is: where it stands, what may be typed there, and where in the job its value lives.

use serde_json::{Value, json};

use super::keys::ROOT;
use super::{Job, Pattern, StrandSize};

/// A key of the job file. Reading, range checks, help, the proposed file, the result's `inputs` and the list of
/// assumptions all come from this one description.
#[derive(Debug)]
pub struct Key {
    /// Table, such as `stressing`; [`ROOT`] for a key before every table.
    pub table: &'static str,
    /// Name within its table, with its unit, such as `draw_in_mm`.
    pub name: &'static str,
    /// What may be typed.
    pub kind: Kind,
    /// What the key decides, in one sentence.
    pub meaning: &'static str,
    /// Where the default comes from; for a key without a default, what happens when it is not given.
    pub source: &'static str,
}

/// What may be typed for a key, and the value's place in a [`Job`]. Numbers are as typed, in the key's own unit.
#[derive(Debug)]
pub enum Kind {
    /// A number within a range, ends included.
    Number {
        /// Least.
        least: f64,
        /// Most.
        most: f64,
        /// What a file may show where there is no default.
        example: f64,
        /// Reads it, if the job has one.
        get: fn(&Job) -> Option<f64>,
        /// Sets it.
        set: fn(&mut Job, f64),
    },
    /// A whole number within a range, ends included.
    Count {
        /// Least.
        least: u32,
        /// Most.
        most: u32,
        /// Reads it, if the job has one.
        get: fn(&Job) -> Option<u32>,
        /// Sets it.
        set: fn(&mut Job, u32),
    },
    /// One of these words.
    Choice {
        /// The words.
        words: &'static [&'static str],
        /// Reads it, if the job has one.
        get: fn(&Job) -> Option<&'static str>,
        /// Sets it to a word of the list.
        set: fn(&mut Job, &str),
    },
    /// `true` or `false`.
    Switch {
        /// Reads it.
        get: fn(&Job) -> bool,
        /// Sets it.
        set: fn(&mut Job, bool),
    },
    /// A list of shell patterns (`*`, `?`, `[...]`, `{a,b}`), any letter case.
    Shell(Place<String>),
    /// A list of words.
    Words(Place<String>),
    /// A list of some of these words.
    Choices {
        /// The words.
        words: &'static [&'static str],
        /// Its place.
        place: Place<String>,
    },
    /// A list of patterns: regular expressions with named groups, bare or in tables that say more.
    Expressions {
        /// The groups of which each has at least one.
        groups: &'static [&'static str],
        /// Groups that it may have besides.
        also: &'static [&'static str],
        /// What a table may say besides `name` and `expression`.
        says: &'static [&'static str],
        /// Its place.
        place: Place<Pattern>,
    },
    /// The name of a strand.
    StrandName {
        /// Reads it, if the job has one.
        get: fn(&Job) -> Option<&str>,
        /// Sets it.
        set: fn(&mut Job, &str),
    },
    /// A list of strand sizes, one table each.
    Strands(Place<StrandSize>),
}

/// Where a list lives in a [`Job`].
#[derive(Debug)]
pub struct Place<T> {
    /// Reads it.
    pub get: fn(&Job) -> &Vec<T>,
    /// Sets it.
    pub set: fn(&mut Job, Vec<T>),
}

impl Key {
    /// `table.name`; the bare name for a key before every table.
    pub fn path(&self) -> String {
        match self.table {
            ROOT => self.name.to_owned(),
            table => format!("{table}.{}", self.name),
        }
    }

    /// Where in a file the key belongs, in words.
    pub fn place(&self) -> String {
        match self.table {
            ROOT => "before the first [table]".to_owned(),
            table => format!("below the line `[{table}]`"),
        }
    }

    /// Name in the result's `inputs`: the bare name for what enters the arithmetic, with the table first for how the
    /// drawing is read (`height_unit`, `layers_banded`).
    pub fn input_name(&self) -> String {
        match self.table {
            ROOT | "tendon" | "stressing" | "profile" | "long_term" | "limits" => {
                self.name.to_owned()
            }
            table => format!("{table}_{}", self.name),
        }
    }

    /// The job's value for this key, in the key's unit; `None` where the job has none.
    pub fn value(&self, job: &Job) -> Option<Value> {
        match &self.kind {
            Kind::Number { get, .. } => get(job).map(|number| json!(number)),
            Kind::Count { get, .. } => get(job).map(|count| json!(count)),
            Kind::Choice { get, .. } => get(job).map(|word| json!(word)),
            Kind::Switch { get, .. } => Some(json!(get(job))),
            Kind::Shell(place) | Kind::Words(place) | Kind::Choices { place, .. } => {
                Some(json!((place.get)(job)))
            }
            Kind::Expressions { place, .. } => {
                let patterns = (place.get)(job).iter().map(Pattern::written);
                Some(Value::Array(patterns.collect()))
            }
            Kind::StrandName { get, .. } => get(job).map(|name| json!(name)),
            Kind::Strands(place) => {
                let sizes = (place.get)(job).iter().map(|size| {
                    json!({"name": size.name, "aliases": size.aliases, "area_mm2": size.area_mm2, "strength_mpa": size.strength_mpa})
                });
                Some(Value::Array(sizes.collect()))
            }
        }
    }

    /// What may be typed, in words.
    pub fn expected(&self) -> String {
        match &self.kind {
            Kind::Number { least, most, .. } => format!("a number from {least} to {most}"),
            Kind::Count { least, most, .. } => format!("a whole number from {least} to {most}"),
            Kind::Choice { words, .. } => format!("one of {}", quoted(words)),
            Kind::Switch { .. } => "true or false".to_owned(),
            Kind::Shell(_) => "a list of shell patterns, such as [\"NAME*\"]".to_owned(),
            Kind::Words(_) => "a list of words, such as [\"H\", \"HIGH\"]".to_owned(),
            Kind::Choices { words, .. } => format!("a list of some of {}", quoted(words)),
            Kind::Expressions { groups, .. } => format!(
                "a list of regular expressions or of tables {{ name, expression, ... }}, each with the named group {}",
                groups
                    .iter()
                    .map(|group| format!("(?<{group}>...)"))
                    .collect::<Vec<_>>()
                    .join(" or ")
            ),
            Kind::StrandName { .. } => "the name of a strand, such as \"12.7\"".to_owned(),
            Kind::Strands(_) => "tables [[tendon.strand]]".to_owned(),
        }
    }

    /// Whether a list with nothing in it may be typed: where that is the default.
    pub fn may_be_empty(&self) -> bool {
        self.value(&Job::default()) == Some(json!([]))
    }

    /// A line that may be typed: the default, or an example where there is none.
    pub fn example(&self) -> String {
        self.line(&Job::default())
    }

    /// A line that may be typed: the value in this job, or an example where it has none.
    pub(super) fn line(&self, job: &Job) -> String {
        let text = match (&self.kind, self.value(job)) {
            (Kind::Strands(_), _) => {
                return "[[tendon.strand]] name = \"12.7\", area_mm2 = 98.7, strength_mpa = 1860"
                    .to_owned();
            }
            // The first says how such a list looks; all of them would hide it.
            (Kind::Expressions { .. }, Some(Value::Array(mut patterns))) => {
                patterns.truncate(1);
                toml_text(&Value::Array(patterns))
            }
            (_, Some(value)) => toml_text(&value),
            (Kind::Number { example, .. }, None) => toml_text(&json!(example)),
            (Kind::Count { most, .. }, None) => toml_text(&json!(most.min(&5))),
            (Kind::Choice { words, .. }, None) => toml_text(&json!(words.first())),
            (_, None) => "\"12.7\"".to_owned(),
        };
        format!("{} = {text}", self.name)
    }
}

/// `"a", "b"`.
pub(super) fn quoted(words: &[&str]) -> String {
    let quoted: Vec<String> = words.iter().map(|word| format!("\"{word}\"")).collect();
    quoted.join(", ")
}

/// A value as TOML writes it on one line; words with a backslash or a quote in single quotes where that is possible.
pub(super) fn toml_text(value: &Value) -> String {
    match value {
        Value::String(text) => {
            let plain = !text.chars().any(|c| c.is_control() || c == '\'');
            if plain && text.contains(['\\', '"']) {
                format!("'{text}'")
            } else {
                toml::Value::String(text.clone()).to_string()
            }
        }
        Value::Array(items) => {
            let items: Vec<String> = items.iter().map(toml_text).collect();
            format!("[{}]", items.join(", "))
        }
        Value::Number(number) => match number.as_f64() {
            Some(number) => format!("{number}"),
            None => number.to_string(),
        },
        Value::Object(entries) => {
            // What it is called comes first.
            let named = entries.iter().filter(|(name, _)| *name == "name");
            let others = entries.iter().filter(|(name, _)| *name != "name");
            let entries: Vec<String> = named
                .chain(others)
                .map(|(name, value)| format!("{name} = {}", toml_text(value)))
                .collect();
            format!("{{ {} }}", entries.join(", "))
        }
        Value::Bool(on) => on.to_string(),
        Value::Null => "\"\"".to_owned(),
    }
}
