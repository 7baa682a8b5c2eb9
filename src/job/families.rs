//! Families of label texts: those that the defaults read, and those that a survey offers where a drawing has them.
//!
//! The defaults hold what can be read in one way only on a layer of its kind. What may mean two things (`12T`: twelve
//! tendons, or twelve at the top) is offered, with what it would be taken for, and never taken by itself.

use std::sync::{LazyLock, OnceLock};

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
const AFTER_MARK: &str = r"(?:\s*[:;,/]\s*|\s*\(\s*|\s+(?:[-–]\s+)?)";
/// Between a number of strands and their size.
const OF_SIZE: &str = r"\s*(?:[-–/SØ∅⌀]|NOS?\.?)\s*[Ø∅⌀]?\s*";
/// Inches or millimetres after a size.
const SIZE_SIGN: &str = r#"\s*(?:mm|"|″|”|''|in\.?)?\s*[Ø∅⌀]?(?:\s*DIA\.?)?(?:\s*STRANDS?)?"#;
/// What may stand behind a text that holds generally.
const NOTE: &str = r"(?:\s*\(?(?:U\.?N\.?O|TYP(?:ICAL)?)\.?\)?)?";
/// A number of tendons before their strands.
const TENDONS: &str = r"(?:(?<tendons>\d+)\s*(?:[x×*]|TENDONS?(?:\s+OF)?|NOS?\.?)\s*)?";
/// A force, perhaps with the letters that it goes by, and in groups of three.
const FORCE: &str = r"(?:[A-Z]{1,4}\s*=\s*)?(?<force>(?:\d{1,3}(?:,\d{3})+|\d+)(?:\.\d+)?)\s*";
/// Words after a force.
const FORCE_WORDS: &str = r"(?:\s*\(?(?:EFF|EFFECTIVE|FINAL|TOTAL|MIN|REQ'?D)\.?\)?)?";

/// Marks, strands and required forces.
pub(super) fn mark_patterns() -> Vec<Pattern> {
    static PATTERNS: LazyLock<Vec<Pattern>> = LazyLock::new(compiled_marks);
    PATTERNS.clone()
}

fn compiled_marks() -> Vec<Pattern> {
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
        // Before the others, to which 4 x 1/2" would be four tendons of one strand of size 2.
        pattern(
            "strands x fraction",
            &format!(
                r"(?i)^{mark}(?<strands>\d+)\s*(?:[x×*]|NOS?\.?)\s*[Ø∅⌀]?\s*(?<strand>\d/\d|½){SIZE_SIGN}\s*\)?$"
            ),
        ),
        pattern(
            "strands and size",
            &format!(
                r"(?i)^{mark}{TENDONS}(?<strands>\d+){OF_SIZE}(?<strand>\d+(?:[.,]\d+)?|[.,]\d+|\d+/\d+|½){SIZE_SIGN}\s*\)?$"
            ),
        ),
        // Brackets around a number before a size hold the number of strands.
        pattern(
            "(strands) size",
            &format!(
                r"(?i)^{mark}{TENDONS}\((?<strands>\d+)\)\s*[-–x×]?\s*[Ø∅⌀]?\s*(?<strand>\d*[.,]\d+|\d/\d+|½){SIZE_SIGN}$"
            ),
        ),
        pattern("mark", &format!("(?i)^{MARK}$")),
        pattern(
            "strands x size",
            &format!(
                r"(?i)^{mark}(?<strands>\d+)\s*[x×*]\s*[Ø∅⌀]?\s*(?<strand>\d*[.,]\d+|\d/\d+|½){SIZE_SIGN}\s*\)?$"
            ),
        ),
        pattern(
            "strands, letter, size",
            &format!(
                r"(?i)^{mark}{TENDONS}(?<strands>\d+)\s*-?\s*[A-Z]\s*(?<strand>\d+[.,]\d+){SIZE_SIGN}\s*\)?$"
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
    static BY_UNIT: ByUnit = ByUnit::new();
    BY_UNIT.of(
        unit,
        &[
            (
                "height",
                r"(?i)^(?:(?<word>\p{L}[\p{L}.\s]*?)\s*[=:]?\s*)?\(?(?<value>NUMBER)\)?$",
            ),
            (
                "height, word last",
                r"(?i)^\(?(?<value>NUMBER)\)?\s*\(?(?<word>\p{L}[\p{L}.\s]*?)\)?$",
            ),
        ],
    )
}

/// Thickness and levels of slab and zones in this unit: `T350`, `T 350`, `T=350`, `350 THK`, `THK. 350`; `TOS -50`,
/// `SSL +0.05`, `-50 SSL`, `+0.05`; `SOFFIT -400`; `50 SET DOWN`, `STEP 50`, `RECESS 50`. A level may stand behind a
/// thickness, `U.N.O.` behind either. A drop may be one of the top or a panel below the soffit, and a finished level is
/// none of the structure: neither is read.
pub fn thickness_patterns(unit: LengthUnit) -> Vec<Pattern> {
    static BY_UNIT: ByUnit = ByUnit::new();
    BY_UNIT.of(
        unit,
        &[
            ("thickness", r"(?i)^T\s*=?\s*(?<value>NUMBER)NOTE$"),
            // The letters that a depth goes by, and its word in other languages (from memory).
            (
                "thickness, letter",
                r"(?i)^(?:[DHE]|TH|TK)\s*[=:]\s*(?<value>NUMBER)NOTE$",
            ),
            (
                "thickness, foreign word",
                r"(?i)^(?:[EÉ]P|[EÉ]PAISSEUR|ESP|ESPESOR|ESPESSURA|TL|TLOUŠŤKA|DICKE|STÄRKE|DIKTE|SPESSORE|GRUBOŚĆ|TJOCKLEK|TYKKELSE)\b\.?\s*[=:]?\s*(?<value>NUMBER)NOTE$",
            ),
            (
                "thickness, slab",
                r"(?i)^(?:P\.?T\.?\s+)?SLAB\s*[=:]?\s*(?<value>NUMBER)(?:\s*(?:THK|THICK)\.?)?NOTE$",
            ),
            (
                "thickness, word first",
                r"(?i)^(?:SLAB\s+)?(?:THK|THICK(?:NESS)?)\.?\s*[=:]?\s*(?<value>NUMBER)NOTE$",
            ),
            (
                "thickness, word last",
                r"(?i)^(?:SLAB\s+)?(?<value>NUMBER)\s*(?:(?:THK|THICK)\.?(?:\s+(?:P\.?T\.?\s+)?SLAB)?|(?:P\.?T\.?\s+)?SLAB)NOTE$",
            ),
            (
                "top level",
                r"(?i)^BEHIND(?:T\.?O\.?[SC]\.?|SSL|TOP)\s*[=:]?\s*(?<top>LEVEL)NOTE$",
            ),
            (
                "soffit level",
                r"(?i)^BEHIND(?:SOFFIT|SOF|U/S|USL|B\.?O\.?S\.?)\s*[=:]?\s*(?<soffit>LEVEL)NOTE$",
            ),
            (
                "set down, word first",
                r"(?i)^BEHIND(?:S\.?D\.?|(?:SET|STEP)[ -]?DOWN|STEP|RECESS)\s*[=:]?\s*(?<down>NUMBER)NOTE$",
            ),
            (
                "set down, word last",
                r"(?i)^BEHIND(?<down>NUMBER)\s*(?:S\.?D\.?|(?:SET|STEP)[ -]?DOWN|STEP|RECESS)NOTE$",
            ),
            (
                "top level, word last",
                r"(?i)^BEHIND(?<top>[-+−–±]?LEVEL)\s*(?:T\.?O\.?[SC]\.?|SSL)NOTE$",
            ),
            // Without a word a level has its sign.
            ("signed level", r"(?i)^BEHIND(?<top>[-+−–±]LEVEL)NOTE$"),
        ],
    )
}

/// Patterns with a number of each unit in them, each unit's made when it is first asked for.
struct ByUnit([OnceLock<Vec<Pattern>>; 5]);

impl ByUnit {
    const fn new() -> Self {
        Self([const { OnceLock::new() }; 5])
    }

    fn of(&self, unit: LengthUnit, expressions: &[(&str, &str)]) -> Vec<Pattern> {
        use LengthUnit::{Cm, Ft, In, M, Mm};
        let place = match unit {
            Mm => 0,
            Cm => 1,
            M => 2,
            In => 3,
            Ft => 4,
        };
        let made = self.0.get(place);
        made.map(|made| made.get_or_init(|| in_unit(unit, expressions)).clone())
            .unwrap_or_default()
    }
}

fn in_unit(unit: LengthUnit, expressions: &[(&str, &str)]) -> Vec<Pattern> {
    let with_number = |(name, expression): &(&str, &str)| {
        let expression = expression
            .replace("NOTE", NOTE)
            .replace("BEHIND", r"(?:T\s*=?\s*(?<value>NUMBER)[\s,;/]+)?")
            .replace(
                "LEVEL",
                &format!(
                    r"[-+−–±]?\s*(?:\d+[.,]\d+\s*m|\d+[.,]\d{{3}}|{})",
                    number(unit)
                ),
            )
            .replace("NUMBER", number(unit));
        pattern(name, &expression)
    };
    expressions.iter().filter_map(with_number).collect()
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
            &format!(
                r#"(?i)^{mark}{tendons}\s*@\s*[\d .'"/-]+(?:mm|cm|m|in)?\s*(?:O\.?\s?C\.?|C/C|CRS\.?|CTRS\.?|CTS\.?)?$"#
            ),
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
                r"(?i)^{ANY_MARK}{AFTER_MARK}{TENDONS}(?<strands>\d+){OF_SIZE}(?<strand>\d*[.,]\d+|\d/\d|½){SIZE_SIGN}\s*\)?$"
            ),
            "What stands before the strands is taken for the tendon's mark.",
        ),
        marks(
            "other mark and strands in words",
            &format!(
                r"(?i)^{ANY_MARK}{AFTER_MARK}{TENDONS}(?<strands>\d+)[\s-]*(?:STRANDS?|STRS?\.?)$"
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
        LengthUnit::Mm | LengthUnit::Cm => {
            r"[-−]?(?:\d*[.,]\d+\s*m|\d+(?:\.\d+|,\d{1,2})?(?:\s*[cm]m)?)"
        }
        LengthUnit::M => r"[-−+]?(?:\d+(?:[.,]\d+)?|[.,]\d+)(?:\s*[cm]?m)?",
        LengthUnit::In | LengthUnit::Ft => {
            r#"[-−]?(?:\d+'[\s-]*)?(?:\d+(?:\.\d+)?(?:(?:\s*-\s*|\s+)\d+[/⁄]\d+)?|\.\d+|\d+[/⁄]\d+|\d*[\s-]?[¼½¾⅛⅜⅝⅞])\s*(?:"|″|”|''|'|in\.?)?"#
        }
    }
}

/// Groups of like tendons; what each pattern leaves open another may give.
pub(super) fn group_patterns() -> Vec<Pattern> {
    [
        (
            "first and last mark",
            r"(?i)^(?<first>[A-Z]{1,3}-?\d+)\s*(?:-|–|to|\.\.+|…)\s*(?<last>[A-Z]{1,3}-?\d+)\b",
        ),
        (
            "number at a spacing",
            r"(?i)(?:^|[\s,;(])(?<number>\d+)\s*(?:no|nos|x)?\.?\s*@\s*\d",
        ),
        (
            "tendons at each place",
            r"(?i)(?:^|[\s,;(])(?<each>\d+)\s*T(?:ENDONS?)?\.?\s*@\s*\d",
        ),
        (
            "spacing",
            r#"(?i)@\s*(?<spacing>(?:\d+'[ -]?)?\d+(?:[.,]\d+)?(?:[ -]\d+/\d+)?(?:\s?(?:mm|cm|m|in)\b|["'])?)(?:\s*(?:c/c|crs|ctrs?|centres|o\.?c\b\.?))?"#,
        ),
    ]
    .into_iter()
    .filter_map(|(name, expression)| pattern(name, expression))
    .collect()
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
mod tests;
