//! From the table of keys to text: the proposed job file and the list of defaults that were used.

use std::collections::BTreeMap;
use std::fmt::Write as _;

use serde_json::Value;

use super::key::{Key, Kind, toml_text};
use super::keys::{ROOT, TABLES, of_table};
use super::{Datum, Fallback, Job, Resolved, System};

/// A value that the drawing itself suggests for a key.
#[derive(Debug, Clone, PartialEq)]
pub struct Proposal {
    /// The value.
    pub value: Value,
    /// Why, in a sentence.
    pub why: String,
}

/// A job file with every key and its meaning. Proposed keys are set; all others stand as comments (`#key = value`)
/// at their defaults, which are those of the system that is proposed. `head` goes on top, as comment lines.
pub fn file(head: &[String], proposals: &BTreeMap<String, Proposal>) -> String {
    let system = proposals
        .get("system")
        .and_then(|proposal| System::named(proposal.value.as_str()?));
    let job = system.map_or_else(Job::default, System::job);
    let mut text = String::new();
    for line in head {
        comment(&mut text, line);
    }
    for (table, meaning) in TABLES {
        text.push('\n');
        if *table != ROOT {
            let _ = writeln!(text, "[{table}]");
        }
        comment(&mut text, meaning);
        for key in of_table(table) {
            text.push('\n');
            let proposal = proposals.get(&key.path());
            describe(&mut text, key, &job);
            if let Some(proposal) = proposal {
                comment(&mut text, &proposal.why);
                let _ = writeln!(text, "{} = {}", key.name, value_text(key, &proposal.value));
            } else if let (Kind::Expressions { .. }, Some(value)) = (&key.kind, key.value(&job)) {
                let lines = value_text(key, &value);
                let _ = writeln!(text, "#{} = {}", key.name, lines.replace('\n', "\n#"));
            } else if matches!(key.kind, Kind::Strands(_)) {
                strands(&mut text, &job);
            } else {
                let _ = writeln!(text, "#{}", key.line(&job));
            }
        }
    }
    text
}

/// A value; patterns one to a line, since they are long.
fn value_text(key: &Key, value: &Value) -> String {
    match (&key.kind, value) {
        (Kind::Expressions { .. }, Value::Array(items)) if items.len() > 1 => {
            let lines: Vec<String> = items
                .iter()
                .map(|item| format!("  {},\n", toml_text(item)))
                .collect();
            format!("[\n{}]", lines.concat())
        }
        _ => toml_text(value),
    }
}

fn describe(text: &mut String, key: &Key, job: &Job) {
    comment(text, key.meaning);
    let source = match key.value(job) {
        Some(_) => match job.system.source(key) {
            Some(source) => format!("Default of {}: {source}.", job.system.name()),
            None => format!("Default: {}.", key.source),
        },
        None => format!("Not given: {}. For example:", key.source),
    };
    let allowed = match &key.kind {
        Kind::Number { .. } | Kind::Count { .. } | Kind::Choice { .. } | Kind::Choices { .. } => {
            format!("{}. ", capital(&key.expected()))
        }
        _ => String::new(),
    };
    comment(text, &format!("{allowed}{source}"));
}

/// As inline tables: a `[[tendon.strand]]` header would take the keys that follow it.
fn strands(text: &mut String, job: &Job) {
    for size in &job.tendon.strands {
        comment(
            text,
            &format!(
                "{}: {} mm2, {} MPa",
                size.name, size.area_mm2, size.strength_mpa
            ),
        );
    }
    text.push_str("#strand = [{ name = \"12.7\", area_mm2 = 98.7, strength_mpa = 1860 }]\n");
}

fn comment(text: &mut String, line: &str) {
    // An empty line is a line too, which `lines` leaves out.
    for line in line.split('\n') {
        let line: String = line.chars().filter(|c| !c.is_control()).collect();
        let _ = writeln!(text, "{}", format!("# {line}").trim_end());
    }
}

fn capital(text: &str) -> String {
    let mut letters = text.chars();
    letters
        .next()
        .map(|first| first.to_uppercase().chain(letters).collect())
        .unwrap_or_default()
}

/// Every key that the file did not give.
pub(super) fn fallbacks(resolved: &Resolved) -> Vec<Fallback> {
    let system = resolved.job.system;
    super::keys::KEYS
        .iter()
        .filter(|key| !resolved.given.contains(&key.path()))
        .filter_map(|key| {
            let value = key.value(&resolved.job).map(|value| toml_text(&value));
            // The one form of wobble that is not used says nothing.
            let silent = value.is_none() && key.name.starts_with("wobble")
                // A method that the job does not name assumes nothing.
                || resolved.is_idle(key)
                // Where in the duct the strand lies matters only to heights of the duct.
                || key.name.starts_with("strand_in_duct")
                    && resolved.job.conventions.height.datum == Datum::Centroid;
            let own = system.source(key);
            (!silent).then(|| Fallback {
                table: key.table,
                name: key.input_name(),
                value,
                source: own.unwrap_or(key.source),
                system: own.map(|_| system),
            })
        })
        .collect()
}
