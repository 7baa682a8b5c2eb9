//! What patterns can and cannot match.

use super::*;

#[test]
fn what_no_line_can_be_is_told_from_what_some_line_is() {
    for (expression, possible) in [
        (r"^H(?<value>\d+)$", true),
        (r"(?<value>\d+)", true),
        (r"(?i)^(?<word>[A-Z]+)?\s*(?<value>\d+)$", true),
        (r"\bH\d+\b", true),
        (r"^(?:|x)$", true),
        // Text after the end, or before the start.
        (r"^H$(?<value>\d+)", false),
        (r"(?<value>\d+)^", false),
        (r"$\d", false),
        // A word boundary inside a word.
        (r"^H\b(?<value>\d+)$", false),
        (r"^(?<value>\d+)\b°$", true),
        (r"^Ø\b(?<value>\d+)$", true),
        // An empty class.
        (r"[^\s\S]\d+", false),
        // Lines hold no line break, and their ends no blanks.
        (r"^H\n(?<value>\d+)$", false),
        (r"^ (?<value>\d+)$", false),
        (r"^(?<value>\d+) +$", false),
        // Blanks beyond ASCII count as characters here.
        (r"^(?<value>\d+)\s+$", true),
        (r"^(?<value>\d+)\s*$", true),
        (r"(?<value>\d+) ", true),
    ] {
        let found = matches_something(expression, &mut Budget::default());
        assert_eq!(found, possible, "{expression}");
    }
}

#[test]
fn a_pattern_too_large_to_tell_is_taken_as_it_is() {
    let mut budget = Budget::default();
    let large = r"^(?:[\p{L}\d]{0,40}x){1,30}(?<value>\d+)$";
    assert!(matches_something(large, &mut budget));
    for _ in 0..32 {
        assert!(matches_something(large, &mut budget));
    }
    assert!(budget.is_spent());
}

#[test]
fn a_group_that_holds_no_digit_is_told() {
    for (expression, possible) in [
        (r"^H(?<value>\d+)$", true),
        (r"^H(?<value>.*)$", true),
        (r"^H(?<value>|5)$", true),
        (r"^H(?<value>[½¾])$", true),
        (r"^H(?<other>\d+)$", true),
        (r"^(?<value>H)\d+$", false),
        (r"^(?<value>\d+\.\d+\.\d+)$", false),
        (r"^(?<value>\d+\.\d+)$", true),
        (r"^(?<value>[A-Z]\d+)$", false),
        (r"^(?<value>-?\d+'-\d+\.5\x22)$", true),
        (r"^(?<value>\d+ *mm)$", true),
        (r"^\d+(?<value>)$", false),
        (r"^\d+(?:a(?<value>[A-Z-]+)|b)$", false),
    ] {
        let mut budget = Budget::default();
        let found = group_holds_number(expression, "value", Sought::Length, &mut budget);
        assert_eq!(found, possible, "{expression}");
    }
}

#[test]
fn a_group_that_no_line_leads_to_is_told() {
    for (expression, possible) in [
        (r"^(?:a^(?<value>\d+)|H\d+)$", false),
        (r"^(?:a(?<value>\d+)|H\d+)$", true),
        (r"^H(?:$(?<value>\d))?$", false),
        (r"^(?:a|(?<value>\d))+$", true),
        (r"^H(?<value>\d+)?$", true),
    ] {
        let found = group_takes_part(expression, "value", &mut Budget::default());
        assert_eq!(found, possible, "{expression}");
    }
}

#[test]
fn the_words_of_a_group_are_listed_where_they_are_few_and_always_there() {
    let words = |expression: &str| words_of_group(expression, "word");
    let found = words(r"^(?<word>OBEN|UNTEN) (?<value>\d+)$");
    assert_eq!(found, Some(vec!["OBEN".to_owned(), "UNTEN".to_owned()]));
    assert_eq!(words(r"^(?<word>OBEN)?(?<value>\d+)$"), None);
    assert_eq!(words(r"^(?<word>[A-Z]+)(?<value>\d+)$"), None);
}

#[test]
fn counts_are_whole_and_fit() {
    for (expression, possible) in [
        (r"^(?<value>\d+)-", true),
        (r"^(?<value>0|12)-", true),
        (r"^(?<value>\d+\.\d)-", false),
        (r"^(?<value>[1-9]\d{12})-", false),
        (r"^(?<value>0+)-", false),
    ] {
        let mut budget = Budget::default();
        let found = group_holds_number(expression, "value", Sought::Count, &mut budget);
        assert_eq!(found, possible, "{expression}");
    }
}
