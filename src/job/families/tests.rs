//! The house's own patterns: that they compile, can match, and read what they always read.

use super::*;
use crate::job::automaton::{Budget, Sought, group_holds_number, matches_something};

fn group(patterns: &[Pattern], text: &str, name: &str) -> Option<String> {
    let found = patterns.iter().find_map(|pattern| pattern.captures(text))?;
    found.name(name).map(|part| part.as_str().to_owned())
}

#[test]
fn every_pattern_of_the_house_compiles_and_can_match() {
    assert_eq!(mark_patterns().len(), 11);
    assert_eq!(offers().len(), 7);
    let mut all = mark_patterns();
    all.extend(offers().into_iter().map(|offer| offer.pattern));
    for unit in ["mm", "cm", "m", "in", "ft"] {
        let Some(PatternUnit::Length(unit)) = PatternUnit::named(unit) else {
            panic!("{unit}");
        };
        assert_eq!(height_patterns(unit).len(), 2);
        assert_eq!(thickness_patterns(unit).len(), 12);
        all.extend(height_patterns(unit));
        all.extend(thickness_patterns(unit));
    }
    for pattern in all {
        assert!(
            matches_something(pattern.as_str(), &mut Budget::default()),
            "{}",
            pattern.label()
        );
        for (group, sought) in [
            ("value", Sought::Length),
            ("strands", Sought::Count),
            ("tendons", Sought::Count),
            ("force", Sought::Length),
        ] {
            let mut budget = Budget::default();
            let number = group_holds_number(pattern.as_str(), group, sought, &mut budget);
            assert!(number, "{group} of {}", pattern.label());
        }
    }
}

#[test]
fn marks_are_read_with_their_strands() {
    let patterns = mark_patterns();
    let all = |text: &str| {
        ["mark", "tendons", "strands", "strand"]
            .map(|name| group(&patterns, text, name).unwrap_or_default())
    };
    assert_eq!(all("D012 5-12.7"), ["D012", "", "5", "12.7"]);
    assert_eq!(all("B03 4x5-12.7"), ["B03", "4", "5", "12.7"]);
    assert_eq!(all("b03\n4 x 5S12.7"), ["b03", "4", "5", "12.7"]);
    assert_eq!(all("5-12.7"), ["", "", "5", "12.7"]);
    assert_eq!(all("3x5-15.2"), ["", "3", "5", "15.2"]);
    assert_eq!(all("D7"), ["D7", "", "", ""]);
    assert_eq!(all("SEE NOTE 4"), ["", "", "", ""]);
}

#[test]
fn heights_are_read_with_their_word_on_either_side() {
    let both = |unit, text: &str| {
        ["word", "value"].map(|name| group(&height_patterns(unit), text, name).unwrap_or_default())
    };
    let metric = LengthUnit::Mm;
    assert_eq!(both(metric, "H165"), ["H", "165"]);
    assert_eq!(both(metric, "H 165"), ["H", "165"]);
    assert_eq!(both(metric, "165H"), ["H", "165"]);
    assert_eq!(both(metric, "L30"), ["L", "30"]);
    assert_eq!(both(metric, "-20"), ["", "-20"]);
    assert_eq!(both(metric, "165"), ["", "165"]);
    assert_eq!(both(metric, "1 1/4\""), ["", ""]);
    let inch = LengthUnit::In;
    assert_eq!(both(inch, "1 1/4\""), ["", "1 1/4\""]);
    assert_eq!(both(inch, "H 1-1/4"), ["H", "1-1/4"]);
    assert_eq!(both(inch, "7/8\" L"), ["L", "7/8\""]);
    assert_eq!(both(inch, "1½"), ["", "1½"]);
    assert_eq!(both(inch, "½\""), ["", "½\""]);
    assert_eq!(both(inch, "5.25"), ["", "5.25"]);
}
