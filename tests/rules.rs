//! The catalogue of rules holds every rule that the source declares, under one name each.

use std::collections::BTreeSet;
use std::fs;
use std::path::Path;
use std::process::Command;

/// Names of the rules that the source declares, without those that tests make up.
fn declared(folder: &Path, found: &mut BTreeSet<String>) {
    for entry in fs::read_dir(folder).expect("src is readable") {
        let path = entry.expect("entry is readable").path();
        if path.is_dir() {
            declared(&path, found);
        } else if path.extension().is_some_and(|ending| ending == "rs")
            && path.file_stem().is_none_or(|stem| stem != "trials")
        {
            let text = fs::read_to_string(&path).expect("source is text");
            let text = text.split("#[cfg(test)]\nmod tests").next().unwrap_or("");
            let rules = text.split(": Rule = Rule {").skip(1);
            found.extend(rules.map(|rule| {
                let name = rule.split("name: \"").nth(1).expect("a rule has a name");
                name.split('"').next().expect("a name").to_owned()
            }));
        }
    }
}

#[test]
fn every_declared_rule_is_in_the_catalogue() {
    let mut wanted = BTreeSet::new();
    let source = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    declared(&source, &mut wanted);
    let output = Command::new(env!("CARGO_BIN_EXE_tautplan"))
        .arg("rules")
        .output()
        .expect("the program runs");
    let page = String::from_utf8(output.stdout).expect("text");
    let named: BTreeSet<String> = page
        .lines()
        .filter(|line| !line.starts_with(' ') && !line.is_empty())
        .map(str::to_owned)
        .collect();
    assert_eq!(named, wanted);
    assert!(wanted.contains("no-force-left") && wanted.len() > 30);
}

#[test]
fn only_a_near_name_is_offered() {
    let asked = |name: &str| {
        let output = Command::new(env!("CARGO_BIN_EXE_tautplan"))
            .args(["rules", name])
            .output()
            .expect("the program runs");
        String::from_utf8(output.stderr).expect("text")
    };
    assert!(!asked("nosuch").contains("did you mean"));
    assert!(asked("mark-twise").contains("did you mean mark-twice?"));
}

#[test]
fn names_are_kebab_case_in_order_and_used_once() {
    let names: Vec<&str> = tautplan::checks::rules()
        .iter()
        .map(|rule| rule.name)
        .collect();
    assert!(names.windows(2).all(|pair| pair[0] < pair[1]), "{names:?}");
    for rule in tautplan::checks::rules() {
        assert!(
            rule.name
                .chars()
                .all(|c| c.is_ascii_lowercase() || c == '-')
        );
        assert!(rule.meaning.ends_with('.'));
    }
}
