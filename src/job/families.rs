//! Families of label texts: those that the defaults read, and those that a survey offers where a drawing has them.
//!
//! The defaults hold what can be read in one way only on a layer of its kind. What may mean two things (`12T`: twelve
//! tendons, or twelve at the top) is offered, with what it would be taken for, and never taken by itself.

use std::sync::LazyLock;

use regex::Regex;

use super::pattern::{ForceUnit, Pattern, PatternUnit};
use crate::units::LengthUnit;

/// A family that the defaults do not read.
#[derive(Debug)]
pub struct Offer {
    /// The key that its pattern belongs to, such as `labels.mark_patterns`.
    pub key: &'static str,
    /// Its pattern, with a name.
    pub pattern: Pattern,
    /// What it would be taken for.
    pub caution: &'static str,
}

/// A mark: letters, a number, a letter perhaps.
const MARK: &str = r"(?<mark>[A-Z]{1,3}-?\d+[A-Z]?)";
/// A mark as other offices write it: anything with a letter and a digit in it.
const ANY_MARK: &str = r"(?<mark>[A-Z]+(?:[-./]?[A-Z0-9]+)*[-./]?\d+[A-Z]?|\d+[A-Z]+(?:[-./]?[A-Z0-9]+)*|\d+(?:[-./]\d+)?)";
/// Between a mark and what follows it.
const AFTER_MARK: &str = r"(?:\s*[:;,]\s*|\s+(?:[-–]\s+)?)";
/// Between a number of strands and their size.
const OF_SIZE: &str = r"\s*(?:[-–/SØ∅⌀]|NOS?\.?)\s*[Ø∅⌀]?\s*";
/// Inches or millimetres after a size.
const SIZE_SIGN: &str =
    r#"\s*(?:mm|"|″|”|''|in\.?)?\s*[Ø∅⌀]?(?:\s*DIA\.?)?(?:\s*STRANDS?)?"#;
/// A number of tendons before their strands.
const TENDONS: &str = r"(?:(?<tendons>\d+)\s*[x×*]\s*)?";
/// A force, perhaps with the letters that it goes by, and in groups of three.
const FORCE: &str = r"(?:[A-Z]{1,4}\s*=\s*)?(?<force>(?:\d{1,3}(?:,\d{3})+|\d+)(?:\.\d+)?)\s*";
/// Words after a force.
const FORCE_WORDS: &str = r"(?:\s*\(?(?:EFF|EFFECTIVE|FINAL|TOTAL|MIN|REQ'?D)\.?\)?)?";

/// Marks, strands and required forces.
pub(super) fn mark_patterns() -> Vec<Pattern> {
    let mark = format!("(?:{MARK}{AFTER_MARK})?");
    let per_width = FORCE.replace("<force>", "<force_per_width>");
    let force = |unit, name, number: &str, sign: &str| {
        let expression = format!(r"(?i)^{mark}{number}{sign}{FORCE_WORDS}$");
        pattern(name, &expression).map(|mut pattern| {
            pattern.unit = Some(PatternUnit::Force(unit));
            pattern
        })
    };
    [
        pattern(
            "strands and size",
            &format!(
                r"(?i)^{mark}{TENDONS}(?<strands>\d+){OF_SIZE}(?<strand>\d+(?:[.,]\d+)?|[.,]\d+|\d+/\d+|½){SIZE_SIGN}$"
            ),
        ),
        pattern("mark", &format!("(?i)^{MARK}$")),
        pattern(
            "strands x size",
            &format!(
                r"(?i)^{mark}(?<strands>\d+)\s*[x×*]\s*[Ø∅⌀]?\s*(?<strand>\d*[.,]\d+|\d/\d+|½){SIZE_SIGN}$"
            ),
        ),
        pattern(
            "strands in words",
            &format!(r"(?i)^{mark}{TENDONS}(?<strands>\d+)[\s-]*(?:STRANDS?|STRS?\.?)$"),
        ),
        force(ForceUnit::Kn, "required kN", FORCE, "kN"),
        force(ForceUnit::Kip, "required kips", FORCE, r"K(?:IPS?)?\.?"),
        force(ForceUnit::KnPerM, "required kN/m", &per_width, r"kN\s*/\s*m"),
        force(
            ForceUnit::KipPerFt,
            "required kips/ft",
            &per_width,
            r"(?:K(?:IPS?)?\s*/\s*(?:FT|LF|')|K[PL]F)\.?",
        ),
    ]
    .into_iter()
    .flatten()
    .collect()
}

/// Heights whose numbers are in this unit: `H165`, `H 165`, `HP=165`, `165H`, `165 (H)`, `165`.
pub fn height_patterns(unit: LengthUnit) -> Vec<Pattern> {
    let number = number(unit);
    [
        pattern(
            "height",
            &format!(r"(?i)^(?:(?<word>[A-Z][A-Z.\s]*?)\s*[=:]?\s*)?\(?(?<value>{number})\)?$"),
        ),
        pattern(
            "height, word last",
            &format!(r"(?i)^\(?(?<value>{number})\)?\s*\(?(?<word>[A-Z][A-Z.\s]*?)\)?$"),
        ),
    ]
    .into_iter()
    .flatten()
    .collect()
}

/// Slab thickness in this unit: `T350`, `T 350`, `T=350`.
pub fn thickness_patterns(unit: LengthUnit) -> Vec<Pattern> {
    let number = number(unit);
    let expression = format!(r"(?i)^T\s*=?\s*(?<value>{number})$");
    pattern("thickness", &expression).into_iter().collect()
}

/// The family that a line belongs to, of those that a survey offers; the first in their order.
pub fn offered(line: &str) -> Option<&'static Offer> {
    let line = line.trim();
    OFFERS.iter().find(|offer| offer.pattern.is_match(line))
}

/// The family of this name.
pub fn offered_named(name: &str) -> Option<&'static Offer> {
    OFFERS
        .iter()
        .find(|offer| offer.pattern.name.as_deref() == Some(name))
}

static OFFERS: LazyLock<Vec<Offer>> = LazyLock::new(offers);

/// Families that a survey offers, in the order they are tried.
fn offers() -> Vec<Offer> {
    let mark = format!("(?:{MARK}{AFTER_MARK})?");
    let tendons = r"\(?(?<tendons>\d+)\)?\s*(?:T|TENDONS?|MONOSTRANDS?)\.?";
    let single = |pattern: Pattern| Pattern {
        strands: Some(1),
        strand: Some("12.7".to_owned()),
        ..pattern
    };
    let marks = |name, expression: &str, caution| (name, expression.to_owned(), caution);
    let counted = "T is taken for tendons of one strand each, 12.7 mm (0.5 in); it may also be top or thickness. Check it.";
    let families = [
        marks(
            "count of single-strand tendons",
            &format!("(?i)^{mark}{tendons}$"),
            counted,
        ),
        marks(
            "single-strand tendons at a spacing",
            &format!(r#"(?i)^{mark}{tendons}\s*@\s*[\d .'"/-]+(?:mm|cm|m|in)?\s*(?:O\.?\s?C\.?|C/C|CRS\.?|CTRS\.?|CTS\.?)?$"#),
            counted,
        ),
        marks(
            "single-strand tendons and their force",
            &format!(r"(?i)^{mark}{tendons}\s*[,;=@-]?\s*\(?{FORCE}K(?:IPS?)?\.?{FORCE_WORDS}\)?$"),
            counted,
        ),
        marks(
            "count of strands",
            &format!(r"(?i)^{mark}{TENDONS}(?<strands>\d+)\s*S$"),
            "S is taken for strands. Check it.",
        ),
        marks(
            "other mark, strands and size",
            &format!(
                r"(?i)^{ANY_MARK}{AFTER_MARK}{TENDONS}(?<strands>\d+){OF_SIZE}(?<strand>\d+(?:[.,]\d+)?|[.,]\d+|\d+/\d+|½){SIZE_SIGN}$"
            ),
            "What stands before the strands is taken for the tendon's mark.",
        ),
        marks(
            "other mark",
            &format!("(?i)^{}$", ANY_MARK.replace(r"|\d+(?:[-./]\d+)?)", ")")),
            "Any text with a letter and a digit is taken for a tendon's mark. Check it.",
        ),
    ];
    families
        .into_iter()
        .filter_map(|(name, expression, caution)| {
            let mut pattern = pattern(name, &expression)?;
            if pattern.has_group("tendons") && !pattern.has_group("strands") {
                pattern = single(pattern);
            }
            if pattern.has_group("force") {
                pattern.unit = Some(PatternUnit::Force(ForceUnit::Kip));
            }
            Some(Offer {
                key: "labels.mark_patterns",
                pattern,
                caution,
            })
        })
        .collect()
}

/// A number as a drawing in this unit writes it: fractions only where the unit is the inch or the foot, so that
/// `1 1/4` on a metric drawing is never taken for a height.
fn number(unit: LengthUnit) -> &'static str {
    match unit {
        // A comma before three digits may also part thousands.
        LengthUnit::Mm | LengthUnit::Cm => r"-?\d+(?:\.\d+|,\d{1,2})?(?:\s*[cm]m)?",
        LengthUnit::M => r"[-+]?(?:\d+(?:[.,]\d+)?|[.,]\d+)(?:\s*[cm]?m)?",
        LengthUnit::In | LengthUnit::Ft => {
            r#"-?(?:\d+'[\s-]*)?(?:\d+(?:\.\d+)?(?:[\s-]\s*\d+[/⁄]\d+)?|\.\d+|\d+[/⁄]\d+|\d*[\s-]?[¼½¾⅛⅜⅝⅞])\s*(?:"|″|”|''|'|in\.?)?"#
        }
    }
}

/// A named pattern; that all of them compile the tests count.
fn pattern(name: &str, expression: &str) -> Option<Pattern> {
    let expression = Regex::new(expression).ok()?;
    Some(Pattern {
        name: Some(name.to_owned()),
        ..Pattern::new(expression)
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::job::automaton::{group_holds_number, matches_something};

    fn group(patterns: &[Pattern], text: &str, name: &str) -> Option<String> {
        let found = patterns.iter().find_map(|pattern| pattern.captures(text))?;
        found.name(name).map(|part| part.as_str().to_owned())
    }

    #[test]
    fn every_pattern_of_the_house_compiles_and_can_match() {
        assert_eq!(mark_patterns().len(), 8);
        assert_eq!(offers().len(), 6);
        let mut all = mark_patterns();
        all.extend(offers().into_iter().map(|offer| offer.pattern));
        for unit in ["mm", "cm", "m", "in", "ft"] {
            let Some(PatternUnit::Length(unit)) = PatternUnit::named(unit) else {
                panic!("{unit}");
            };
            assert_eq!(height_patterns(unit).len(), 2);
            assert_eq!(thickness_patterns(unit).len(), 1);
            all.extend(height_patterns(unit));
            all.extend(thickness_patterns(unit));
        }
        for pattern in all {
            assert!(matches_something(pattern.as_str()), "{}", pattern.label());
            for group in ["value", "strands", "tendons", "force"] {
                assert!(group_holds_number(pattern.as_str(), group), "{group}");
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
            ["word", "value"]
                .map(|name| group(&height_patterns(unit), text, name).unwrap_or_default())
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
}
