//! What texts on the slab's layers say: thickness and levels.

use super::lengths::length_m;
use super::readings::length_unit;
use crate::job::{Conventions, Pattern};
use crate::units::LengthUnit;
use crate::units::{SHORT, Units};

/// What a text on a slab layer says, metres; levels as the drawing counts them.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct ZoneText {
    /// Thickness.
    pub thickness_m: Option<f64>,
    /// Level of the top.
    pub top_m: Option<f64>,
    /// Level of the soffit.
    pub soffit_m: Option<f64>,
    /// How far the top lies below the slab around.
    pub down_m: Option<f64>,
}

/// What a text on a slab layer says, line by line, and the lines that speak of a level or a thickness and cannot be read.
pub(super) fn zone_text(content: &str, conventions: &Conventions) -> (Vec<ZoneText>, Vec<Unread>) {
    let (mut said, mut unread) = (Vec::new(), Vec::new());
    for line in content.lines() {
        match zone_text_of_line(line, conventions) {
            Some((text, _)) => said.push(text),
            None => unread.extend(speaks(line)),
        }
    }
    (said, unread)
}

/// A line that speaks of a level or a thickness and cannot be read.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Unread {
    pub(super) line: String,
    /// It says nothing else, so it is no note but the level itself.
    pub(super) alone: bool,
}

/// Words of levels and thicknesses, of the structure or of its finish, and what may stand beside their number.
const LEVEL_WORDS: &[&str] = &[
    "SSL",
    "SFL",
    "FFL",
    "FSL",
    "FGL",
    "RL",
    "EL",
    "LVL",
    "LEVEL",
    "TOS",
    "TOC",
    "BOS",
    "BOC",
    "USL",
    "SOFFIT",
    "SOF",
    "STEP",
    "DROP",
    "RECESS",
    "SETDOWN",
    "SD",
    "SUNK",
    "SUNKEN",
    "LOWERED",
    "RAISED",
    "UPSTAND",
    "DEPRESSION",
    "THK",
    "THICK",
    "THICKNESS",
    "DEEP",
    "DEPTH",
    "OKRD",
    "UKRD",
    "OKFF",
    "OK",
    "UK",
];
const BESIDE_THEM: &[&str] = &[
    "TOP",
    "OF",
    "SLAB",
    "CONCRETE",
    "STRUCTURAL",
    "FINISHED",
    "FLOOR",
    "T",
    "O",
    "S",
    "C",
    "B",
    "U",
    "SET",
    "DOWN",
    "UP",
    "DN",
    "N",
    "UNO",
    "TYP",
    "TYPICAL",
    "MM",
    "CM",
    "M",
    "IN",
    "MIN",
    "MAX",
];

/// A line with a number and a word of levels.
fn speaks(line: &str) -> Option<Unread> {
    let upper = line.to_uppercase();
    let words: Vec<&str> = upper
        .split(|sign: char| !sign.is_alphabetic())
        .filter(|word| !word.is_empty())
        .collect();
    let spelt = words.concat();
    let of_level = words.iter().any(|word| LEVEL_WORDS.contains(word))
        || ["TOS", "TOC", "SETDOWN", "STEPDOWN", "US", "T", "SD"].contains(&spelt.as_str());
    let alone = words
        .iter()
        .all(|word| LEVEL_WORDS.contains(word) || BESIDE_THEM.contains(word));
    (of_level && upper.contains(|sign: char| sign.is_ascii_digit())).then(|| Unread {
        line: line.trim().to_owned(),
        alone,
    })
}

/// What a line says of a slab, and the pattern that read it.
pub fn zone_text_of_line<'c>(
    line: &str,
    conventions: &'c Conventions,
) -> Option<(ZoneText, &'c Pattern)> {
    conventions.thickness_patterns.iter().find_map(|pattern| {
        let groups = pattern.captures(line.trim())?;
        let part = |name: &str| groups.name(name).map(|found| found.as_str());
        let own = length_unit(pattern);
        let unit = own.unwrap_or(conventions.thickness_unit);
        let length = |name: &str| length_m(part(name)?, unit).filter(|&length_m| length_m > 0.0);
        let level = |name: &str| match own {
            Some(unit) => length_m(&signed(part(name)?), unit),
            None => level_m(part(name)?, unit),
        };
        let said = ZoneText {
            thickness_m: length("value"),
            top_m: level("top"),
            soffit_m: level("soffit"),
            down_m: length("down"),
        };
        (said != ZoneText::default()).then_some((said, pattern))
    })
}

/// The thickness that a line gives, metres, and the pattern that read it.
pub fn thickness_of_line<'c>(
    line: &str,
    conventions: &'c Conventions,
) -> Option<(f64, &'c Pattern)> {
    let (said, pattern) = zone_text_of_line(line, conventions)?;
    Some((said.thickness_m?, pattern))
}

/// A level as drafters write it, metres: `-50`, `+0.05`, `±0.00`, `- 50 mm`. On a drawing in millimetres one with two
/// decimals or more and no unit of its own is in metres.
fn level_m(text: &str, unit: LengthUnit) -> Option<f64> {
    let text = signed(text);
    let decimals = text
        .rsplit_once(['.', ','])
        .map_or(0, |(_, after)| after.len());
    let bare = text.ends_with(|c: char| c.is_ascii_digit());
    if unit == LengthUnit::Mm && bare && decimals >= 2 {
        length_m(&text, LengthUnit::M)
    } else {
        // With one decimal and below ten nobody knows whether it is tenths of a metre or of a millimetre.
        let level_m = length_m(&text, unit)?;
        let vague = unit == LengthUnit::Mm && bare && decimals == 1 && level_m.abs() < 0.010;
        Some(level_m).filter(|level_m| !vague || *level_m == 0.0)
    }
}

/// A level's text with signs that a length has.
fn signed(text: &str) -> String {
    text.trim().trim_start_matches('±').replace('–', "-")
}

/// A height for a reader, to a tenth of a millimetre where it has one.
pub(super) fn short(length_m: f64, units: Units) -> String {
    units.of(SHORT).brief(length_m * 1000.0, 1)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Thickness, top, soffit, down, millimetres, each line after the other.
    fn read(text: &str) -> Vec<[Option<i64>; 4]> {
        let conventions = crate::job::Job::default().conventions;
        let (said, _) = zone_text(text, &conventions);
        #[expect(clippy::cast_possible_truncation, reason = "small numbers")]
        let mm = |part: Option<f64>| part.map(|m| (m * 1000.0).round() as i64);
        let parts =
            |said: &ZoneText| [said.thickness_m, said.top_m, said.soffit_m, said.down_m].map(mm);
        said.iter().map(parts).collect()
    }

    #[test]
    fn texts_of_zones_give_thickness_and_levels() {
        for (text, expected) in [
            ("T350", [Some(350), None, None, None]),
            ("TOS -50", [None, Some(-50), None, None]),
            ("T.O.S. = - 50", [None, Some(-50), None, None]),
            ("SSL +0.05", [None, Some(50), None, None]),
            ("+0,050", [None, Some(50), None, None]),
            ("-100", [None, Some(-100), None, None]),
            ("\u{2212}100", [None, Some(-100), None, None]),
            ("±0.00", [None, Some(0), None, None]),
            ("TOS -0.1 m", [None, Some(-100), None, None]),
            ("-50.00 mm", [None, Some(-50), None, None]),
            ("SOFFIT -400", [None, None, Some(-400), None]),
            ("T300 / TOS -50", [Some(300), Some(-50), None, None]),
            ("t300 +25", [Some(300), Some(25), None, None]),
            ("SD 50", [None, None, None, Some(50)]),
            ("50 SET DOWN", [None, None, None, Some(50)]),
            ("-50 SSL", [None, Some(-50), None, None]),
            ("+0.05 TOS", [None, Some(50), None, None]),
            ("TOS -50 U.N.O.", [None, Some(-50), None, None]),
            ("SLAB 350 THICK U.N.O.", [Some(350), None, None, None]),
            ("T200 (TYP.)", [Some(200), None, None, None]),
            ("STEP 50", [None, None, None, Some(50)]),
            ("RECESS 50", [None, None, None, Some(50)]),
            ("50 RECESS UNO", [None, None, None, Some(50)]),
        ] {
            assert_eq!(read(text), [expected], "{text}");
        }
        // Each line for itself: two of one thing are a contradiction, told where they are put together.
        assert_eq!(read("T200\nPT\nT300").len(), 2);
        assert_eq!(read("T300\nTOS -50").len(), 2);
    }

    #[test]
    fn what_speaks_of_a_level_and_cannot_be_read_is_kept_to_be_said() {
        let conventions = crate::job::Job::default().conventions;
        for (text, alone) in [
            ("FFL -0.050", Some(true)),
            ("50 DROP", Some(true)),
            ("SSL -0.1", Some(true)),
            ("T.O.S. 12.5.1", Some(true)),
            ("STEP 50 SEE DETAIL", Some(false)),
            ("T-50", Some(true)),
            ("50", None),
            ("STEP", None),
            ("TOS", None),
            ("SEE DETAIL 4", None),
            ("GRID 4", None),
        ] {
            let (said, unread) = zone_text(text, &conventions);
            assert!(said.is_empty(), "{text}");
            assert_eq!(unread.first().map(|unread| unread.alone), alone, "{text}");
        }
    }
}
