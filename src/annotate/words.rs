//! Words on a drawing: how wide they come out, how long lines break, what a plain font can show.

use super::place::Extent;

/// Width of a text, metres. The plainest CAD font advances by about the height of its capitals; others are narrower.
pub(super) fn width_m(content: &str, height_m: f64) -> f64 {
    let letters = u32::try_from(content.chars().count()).unwrap_or(u32::MAX);
    f64::from(letters) * height_m
}

/// Letter height of legend and table: readable when the whole floor fills a sheet, metres.
pub(super) fn table_letter_m(floor: &Extent) -> f64 {
    let (width_m, height_m) = floor.size_m();
    (height_m.max(width_m / 2.0) / 150.0).clamp(0.15, 0.6)
}

/// A sentence broken into lines of at most `most` letters, at blanks; a longer word stands alone.
pub(super) fn wrap(sentence: &str, most: usize) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    for word in sentence.split_whitespace() {
        match lines.last_mut() {
            Some(line) if line.chars().count() + 1 + word.chars().count() <= most => {
                line.push(' ');
                line.push_str(word);
            }
            _ => lines.push(word.to_owned()),
        }
    }
    lines
}

/// A sentence of ours in plain ASCII, which every reader of every version shows the same way.
pub(super) fn plain(sentence: &str) -> String {
    let mut plain = String::with_capacity(sentence.len());
    for letter in sentence.chars() {
        match letter {
            ' '..='~' => plain.push(letter),
            '\t' | '\n' | '\u{a0}' => plain.push(' '),
            'μ' | 'µ' => plain.push_str("mu"),
            'α' => plain.push_str("alpha"),
            'φ' => plain.push_str("phi"),
            'Δ' => plain.push_str("delta"),
            '°' => plain.push_str(" deg"),
            '²' => plain.push('2'),
            '³' => plain.push('3'),
            '×' => plain.push('x'),
            '·' => plain.push('.'),
            '–' | '—' | '−' => plain.push('-'),
            '±' => plain.push_str("+/-"),
            '≤' => plain.push_str("<="),
            '≥' => plain.push_str(">="),
            '‘' | '’' => plain.push('\''),
            '“' | '”' => plain.push('"'),
            _ => plain.push('?'),
        }
    }
    plain
}

/// A name from the drawing, kept in its own letters: it must be found again there. Only what is no letter at all goes,
/// and a very long one is cut.
pub(super) fn name(mark: &str) -> String {
    const MOST: usize = 24;
    let clean: String = mark.chars().filter(|c| !c.is_control()).collect();
    if clean.chars().count() <= MOST {
        return clean;
    }
    let mut cut: String = clean.chars().take(MOST - 2).collect();
    cut.push_str("..");
    cut
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sentences_break_at_blanks_and_lose_no_word() {
        let lines = wrap("one two three four", 9);
        assert_eq!(lines, ["one two", "three", "four"]);
        assert_eq!(
            wrap("incomprehensible word", 4),
            ["incomprehensible", "word"]
        );
        assert!(wrap("  ", 10).is_empty());
    }

    #[test]
    fn signs_become_words_and_nothing_leaves_ascii() {
        assert_eq!(plain("μ 0.19 ± 2°"), "mu 0.19 +/- 2 deg");
        assert!(plain("żółw ☃ x²").is_ascii());
    }

    #[test]
    fn marks_keep_their_letters_and_lose_their_length() {
        assert_eq!(name("Б12"), "Б12");
        assert_eq!(name("D\u{7}1"), "D1");
        assert_eq!(name(&"x".repeat(80)).len(), 24);
    }
}
