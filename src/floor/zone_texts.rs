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

/// What a text on a slab layer says, gathered over its lines.
pub(super) fn zone_text(content: &str, conventions: &Conventions) -> Option<ZoneText> {
    let mut whole = ZoneText::default();
    for (said, _) in content
        .lines()
        .filter_map(|line| zone_text_of_line(line, conventions))
    {
        whole.thickness_m = whole.thickness_m.or(said.thickness_m);
        whole.top_m = whole.top_m.or(said.top_m);
        whole.soffit_m = whole.soffit_m.or(said.soffit_m);
        whole.down_m = whole.down_m.or(said.down_m);
    }
    (whole != ZoneText::default()).then_some(whole)
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
        length_m(&text, unit)
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

    #[test]
    fn texts_of_zones_give_thickness_and_levels() {
        let conventions = crate::job::Job::default().conventions;
        // Thickness, top, soffit, down, millimetres.
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
            ("T300\nTOS -50", [Some(300), Some(-50), None, None]),
            ("T300 / TOS -50", [Some(300), Some(-50), None, None]),
            ("t300 +25", [Some(300), Some(25), None, None]),
            ("SD 50", [None, None, None, Some(50)]),
            ("50 SET DOWN", [None, None, None, Some(50)]),
        ] {
            let read = zone_text(text, &conventions).unwrap_or_default();
            let found = [read.thickness_m, read.top_m, read.soffit_m, read.down_m];
            #[expect(clippy::cast_possible_truncation, reason = "small numbers")]
            let found = found.map(|part| part.map(|m| (m * 1000.0).round() as i64));
            assert_eq!(found, expected, "{text}");
        }
        for text in ["50", "STEP", "TOS", "SEE DETAIL 4", "T0", "T-50"] {
            assert_eq!(zone_text(text, &conventions), None, "{text}");
        }
    }
}
