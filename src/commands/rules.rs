//! What is looked for: every rule of every stage under the name that findings use.

use super::{Outcome, print};
use crate::finding::Rule;
use crate::terminal::Terminal;
use crate::{analysis, checks, floor};

/// A name less like the one asked for than this is not offered.
const LIKE: f64 = 0.8;

/// Prints every rule, or the one of this name.
pub fn run(name: Option<&str>, terminal: &mut Terminal) -> Outcome {
    let rules = catalogue();
    let Some(name) = name else {
        let page: Vec<String> = rules
            .iter()
            .map(|rule| format!("{}\n    {}\n", rule.name, rule.meaning))
            .collect();
        return print(&page.concat(), terminal);
    };
    if let Some(rule) = rules.iter().find(|rule| rule.name == name) {
        return print(&format!("{}\n{}\n", rule.name, rule.meaning), terminal);
    }
    let near = rules
        .iter()
        .map(|rule| {
            (
                strsim::jaro_winkler(&name.to_lowercase(), rule.name),
                rule.name,
            )
        })
        .filter(|(likeness, _)| *likeness > LIKE)
        .max_by(|one, other| one.0.total_cmp(&other.0))
        .map_or(String::new(), |(_, near)| format!("did you mean {near}? "));
    terminal.error(&format!(
        "no rule is named {name}; {near}`tautplan rules` lists them"
    ));
    Outcome::NotDone
}

/// Every rule, by name.
fn catalogue() -> Vec<&'static Rule> {
    let mut rules: Vec<&'static Rule> = checks::rules()
        .iter()
        .chain(floor::RULES)
        .chain(analysis::rules())
        .copied()
        .collect();
    rules.sort_by_key(|rule| rule.name);
    rules.dedup_by_key(|rule| rule.name);
    rules
}
