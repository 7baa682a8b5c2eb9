//! Shell patterns by which a job names layers and blocks, in any letter case of any script.

use std::str::Chars;

use regex::{RegexSet, RegexSetBuilder};

mod selectors;

pub use selectors::{Names, PatternRefused, Selectors, folded, tails};

/// Names by shell patterns: `*` is any signs, `?` one sign, `[a-z]` one of these, `[!a-z]` one that is none of these,
/// `{this,that}` either; every other sign stands for itself, `\` too. Letter case does not count (simple case folding of
/// Unicode, sign by sign).
#[derive(Debug, Clone, Default)]
pub struct Patterns(RegexSet);

impl Patterns {
    /// The names that one of the patterns fits as a whole.
    ///
    /// # Errors
    /// The first pattern that cannot be understood.
    pub fn new<S: AsRef<str>>(
        patterns: impl IntoIterator<Item = S>,
    ) -> Result<Self, BrokenPattern> {
        let expressions = patterns
            .into_iter()
            .map(|pattern| expression(pattern.as_ref()))
            .collect::<Result<Vec<_>, _>>()?;
        RegexSetBuilder::new(expressions)
            .case_insensitive(true)
            .dot_matches_new_line(true)
            .build()
            .map(Self)
            .map_err(|_| BrokenPattern::TooLarge)
    }

    /// Whether a pattern fits the name.
    pub fn fit(&self, name: &str) -> bool {
        self.0.is_match(name)
    }
}

/// The pattern that fits this name alone.
pub fn pattern_of(name: &str) -> String {
    let mut pattern = String::with_capacity(name.len());
    for sign in name.chars() {
        if matches!(sign, '*' | '?' | '[' | ']' | '{' | '}') {
            pattern.extend(['[', sign, ']']);
        } else {
            pattern.push(sign);
        }
    }
    pattern
}

/// Why a pattern cannot be understood.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
pub enum BrokenPattern {
    /// A `[` without its `]`.
    #[error("a `[` is not closed")]
    OpenClass,
    /// A range whose end comes before its beginning.
    #[error("the range `{0}-{1}` runs backwards")]
    Backwards(char, char),
    /// A `{` without its `}`.
    #[error("a `{{` is not closed")]
    OpenChoice,
    /// A `}` without its `{`.
    #[error("a `}}` closes nothing")]
    NoChoice,
    /// Longer or deeper than is taken.
    #[error("it is too long or too deep")]
    TooLarge,
}

/// The pattern as a regular expression.
fn expression(pattern: &str) -> Result<String, BrokenPattern> {
    let mut out = String::from("^");
    let mut depth = 0_usize;
    let mut signs = pattern.chars();
    while let Some(sign) = signs.next() {
        match sign {
            '*' => out.push_str(".*"),
            '?' => out.push('.'),
            '[' => class(&mut signs, &mut out)?,
            '{' => {
                depth += 1;
                out.push_str("(?:");
            }
            '}' => {
                depth = depth.checked_sub(1).ok_or(BrokenPattern::NoChoice)?;
                out.push(')');
            }
            ',' if depth > 0 => out.push('|'),
            sign => literal(sign, &mut out),
        }
    }
    if depth > 0 {
        return Err(BrokenPattern::OpenChoice);
    }
    out.push('$');
    Ok(out)
}

/// What follows a `[`, up to its `]`, which stands for itself where it comes first.
fn class(signs: &mut Chars<'_>, out: &mut String) -> Result<(), BrokenPattern> {
    out.push('[');
    if signs.as_str().starts_with(['!', '^']) {
        signs.next();
        out.push('^');
    }
    let mut first = true;
    loop {
        let low = signs.next().ok_or(BrokenPattern::OpenClass)?;
        if low == ']' && !first {
            out.push(']');
            return Ok(());
        }
        first = false;
        literal(low, out);
        let mut ahead = signs.clone();
        if let (Some('-'), Some(high)) = (ahead.next(), ahead.next())
            && high != ']'
        {
            if high < low {
                return Err(BrokenPattern::Backwards(low, high));
            }
            out.push('-');
            literal(high, out);
            *signs = ahead;
        }
    }
}

fn literal(sign: char, out: &mut String) {
    out.push_str(&regex::escape(sign.encode_utf8(&mut [0; 4])));
}

#[cfg(test)]
mod tests {
    use super::*;

    fn fits(pattern: &str, name: &str) -> bool {
        Patterns::new([pattern]).expect(pattern).fit(name)
    }

    #[test]
    fn names_fit_as_a_whole_in_any_letter_case_of_any_script() {
        for (pattern, name) in [
            ("Tendon-*", "TENDON-BANDED"),
            ("SPANNGLIED-LÄNGS*", "Spannglied-längs-1"),
            ("напрягаемая*", "НАПРЯГАЕМАЯ-1"),
            ("КОЛОНН?", "колонна"),
            ("[а-в]1", "Б1"),
            ("[!a-c]1", "D1"),
            ("{PT,ПТ}-*", "пт-7"),
            ("{A,B{1,2}}x", "b2X"),
            ("a.b(c)+", "A.B(C)+"),
            ("REF\\S", "ref\\s"),
            ("[]-]", "-"),
            ("[a-]", "-"),
            ("**", "anything"),
            ("ΟΔΟΣ", "οδος"),
        ] {
            assert!(fits(pattern, name), "{pattern} {name}");
        }
        for (pattern, name) in [
            ("TENDON", "TENDON-1"),
            ("TENDON", "A-TENDON"),
            ("T?", "T"),
            ("T?", "TAB"),
            ("[!a-c]1", "B1"),
            ("a.b", "axb"),
            ("{a,b}", "ab"),
            ("Ä*", "A1"),
        ] {
            assert!(!fits(pattern, name), "{pattern} {name}");
        }
        assert!(!Patterns::default().fit("PT") && !Patterns::default().fit(""));
    }

    #[test]
    fn a_name_has_a_pattern_that_fits_it_alone() {
        for name in ["PT*[1]", "a{b,c}?", "plain", "^$.\\"] {
            let pattern = pattern_of(name);
            assert!(fits(&pattern, name), "{pattern}");
            assert!(!fits(&pattern, &format!("{name}1")), "{pattern}");
        }
        assert!(!fits(&pattern_of("PT*"), "PT1"));
    }

    #[test]
    fn a_broken_pattern_is_refused_in_words() {
        for (pattern, words) in [
            ("a[b", "`[` is not closed"),
            ("a[]", "`[` is not closed"),
            ("[z-a]", "`z-a` runs backwards"),
            ("a{b", "`{` is not closed"),
            ("a}b", "`}` closes nothing"),
            (&"{".repeat(400), "not closed"),
            (&["{".repeat(400), "}".repeat(400)].concat(), "too deep"),
        ] {
            let refused = Patterns::new([pattern]).map(|_| ()).expect_err(pattern);
            assert!(refused.to_string().contains(words), "{pattern}: {refused}");
        }
    }
}
