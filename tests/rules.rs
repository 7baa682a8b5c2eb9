//! The catalogue of rules holds every rule that the source declares, under one name each.

use std::fs;
use std::path::Path;

fn declared(folder: &Path, found: &mut usize) {
    for entry in fs::read_dir(folder).expect("src is readable") {
        let path = entry.expect("entry is readable").path();
        if path.is_dir() {
            declared(&path, found);
        } else if path.extension().is_some_and(|ending| ending == "rs") {
            let text = fs::read_to_string(&path).expect("source is text");
            *found += text.matches(": Rule = Rule").count();
        }
    }
}

#[test]
fn every_declared_rule_is_in_the_catalogue() {
    let mut count = 0;
    for stage in ["drawing", "checks"] {
        let folder = Path::new(env!("CARGO_MANIFEST_DIR"))
            .join("src")
            .join(stage);
        declared(&folder, &mut count);
    }
    assert_eq!(tautplan::checks::rules().len(), count);
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
