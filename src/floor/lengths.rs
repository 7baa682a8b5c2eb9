//! Lengths as drafters write them, in text.

use crate::units::LengthUnit;

/// A length as drafters write it: `165`, `30.5`, `30,5`, `.165`, `1 1/4"`, `1-1/4`, `7/8`, `1¼`, `1'-2 1/2"`, `10 mm`;
/// metres.
pub(super) fn length_m(text: &str, unit: LengthUnit) -> Option<f64> {
    let text = text.trim().to_lowercase();
    let mut text = text.as_str();
    let mut unit = unit;
    for (sign, said) in [
        ("''", LengthUnit::In),
        ("\"", LengthUnit::In),
        ("″", LengthUnit::In),
        ("”", LengthUnit::In),
        ("in.", LengthUnit::In),
        ("in", LengthUnit::In),
        ("'", LengthUnit::Ft),
        ("mm", LengthUnit::Mm),
        ("cm", LengthUnit::Cm),
        ("m", LengthUnit::M),
    ] {
        if let Some(number) = text.strip_suffix(sign) {
            text = number.trim_end();
            unit = said;
            break;
        }
    }
    // The sign is that of the whole, fraction and inches included.
    let (sign, text) = match text.strip_prefix(['-', '−']) {
        Some(rest) => (-1.0, rest.trim_start()),
        None => (1.0, text.strip_prefix('+').unwrap_or(text)),
    };
    let size_m = if let Some((feet, inches)) = text.split_once('\'') {
        let inches = inches.trim_start_matches([' ', '-']);
        plain(feet.trim())? * LengthUnit::Ft.metres() + number(inches)? * LengthUnit::In.metres()
    } else {
        number(text)? * unit.metres()
    };
    let value_m = sign * size_m;
    value_m.is_finite().then_some(value_m)
}

fn number(text: &str) -> Option<f64> {
    if let Some(whole) = plain(text) {
        return Some(whole);
    }
    // A whole number and a fraction, joined by a blank, a hyphen or nothing (one-character fractions).
    let single = text.char_indices().next_back().and_then(|(at, sign)| {
        let (_, eighths) = SINGLES.iter().find(|(known, _)| *known == sign)?;
        Some((text.get(..at)?, f64::from(*eighths) / 24.0))
    });
    let (whole, fraction) = if let Some(found) = single {
        found
    } else {
        let (head, below) = text.rsplit_once(['/', '⁄'])?;
        let head = head.trim_end();
        let start = head
            .rfind(|c: char| !c.is_ascii_digit())
            .map_or(0, |at| at + head.get(at..).map_or(1, first_length));
        let below = plain(below.trim())?;
        if below <= 0.0 {
            return None;
        }
        (head.get(..start)?, plain(head.get(start..)?)? / below)
    };
    let whole = whole.trim_end_matches([' ', '-', '\u{a0}']).trim();
    if whole.is_empty() {
        return Some(fraction);
    }
    Some(plain(whole)? + fraction)
}

fn first_length(text: &str) -> usize {
    text.chars().next().map_or(1, char::len_utf8)
}

/// One-character fractions, in 24ths.
const SINGLES: &[(char, u8)] = &[
    ('¼', 6),
    ('½', 12),
    ('¾', 18),
    ('⅛', 3),
    ('⅜', 9),
    ('⅝', 15),
    ('⅞', 21),
    ('⅓', 8),
    ('⅔', 16),
];

fn plain(text: &str) -> Option<f64> {
    let led = text.strip_prefix(['.', ',']).unwrap_or(text);
    let fits = led.starts_with(|c: char| c.is_ascii_digit())
        && led
            .chars()
            .all(|c| c.is_ascii_digit() || c == '.' || c == ',');
    if !fits {
        return None;
    }
    text.replace(',', ".").parse().ok()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lengths_are_read_as_drafters_write_them() {
        for (text, unit, expected_m) in [
            ("165", LengthUnit::Mm, 0.165),
            ("30.5", LengthUnit::Mm, 0.0305),
            ("30,5", LengthUnit::Mm, 0.0305),
            ("1 1/4\"", LengthUnit::In, 0.03175),
            ("1-1/4", LengthUnit::In, 0.03175),
            ("7/8", LengthUnit::In, 0.022_225),
            ("7/8\"", LengthUnit::Mm, 0.022_225),
            ("1¼", LengthUnit::In, 0.03175),
            ("½\"", LengthUnit::In, 0.0127),
            ("10 mm", LengthUnit::In, 0.01),
            ("-5", LengthUnit::Mm, -0.005),
            ("+5", LengthUnit::Mm, 0.005),
            ("-1/4", LengthUnit::In, -0.00635),
            ("-1 1/4", LengthUnit::In, -0.03175),
            ("-1-1/4\"", LengthUnit::In, -0.03175),
            ("−1¼", LengthUnit::In, -0.03175),
            ("-1'-6\"", LengthUnit::In, -0.4572),
            ("16.5", LengthUnit::Cm, 0.165),
            (".165", LengthUnit::M, 0.165),
            ("0,165 m", LengthUnit::Mm, 0.165),
            ("16.5CM", LengthUnit::Mm, 0.165),
            ("1'-2 1/2\"", LengthUnit::In, 0.3683),
            ("-1 1/4\"", LengthUnit::In, -0.03175),
            ("1 ¼ in.", LengthUnit::Ft, 0.03175),
            ("2'", LengthUnit::In, 0.6096),
        ] {
            let found = length_m(text, unit);
            assert!(
                found.is_some_and(|found_m| (found_m - expected_m).abs() < 1e-12),
                "{text}: {found:?}"
            );
        }
        for text in [
            "", "H", "1/0", "12a", "1/", "/8", "--3", "-+3", "1/-4", "NaN", "inf", "1.2.3",
        ] {
            assert_eq!(length_m(text, LengthUnit::Mm), None, "{text}");
        }
    }
}
