//! Words that say what an anchor is: `LE`, `L.E.`, `live end`, `(DE)`, `INTERMEDIATE ANCHOR`.

use super::super::types::EndKind;
use crate::job::Conventions;
use crate::patterns::folded;

/// The job's words, as they are compared.
#[derive(Debug, Clone)]
pub struct EndWords {
    live: Vec<String>,
    dead: Vec<String>,
    intermediate: Vec<String>,
    /// Whether some word holds a digit; if none does, most labels are passed over at a glance.
    digits: bool,
}

/// What a word says of an anchor.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Said {
    /// It is an end of this kind.
    End(EndKind),
    /// The tendon goes on through it.
    Intermediate,
}

impl EndWords {
    /// The words of a job.
    pub fn new(conventions: &Conventions) -> Self {
        let plain =
            |words: &[String]| -> Vec<String> { words.iter().map(|word| plain(word)).collect() };
        let live = plain(&conventions.live_end_words);
        let dead = plain(&conventions.dead_end_words);
        let intermediate = plain(&conventions.intermediate_words);
        let mut all = live.iter().chain(&dead).chain(&intermediate);
        let digits = all.any(|word| has_digit(word));
        Self {
            live,
            dead,
            intermediate,
            digits,
        }
    }

    /// What one line says of an anchor.
    pub fn said(&self, line: &str) -> Option<Said> {
        if !self.digits && has_digit(line) {
            return None;
        }
        let line = plain(line);
        let short = line.strip_suffix(" END").unwrap_or(&line);
        let among = |words: &[String]| words.iter().any(|word| *word == line || word == short);
        if among(&self.live) {
            Some(Said::End(EndKind::Live))
        } else if among(&self.dead) {
            Some(Said::End(EndKind::Dead))
        } else {
            among(&self.intermediate).then_some(Said::Intermediate)
        }
    }

    /// The kind of end that one line names.
    pub fn kind(&self, line: &str) -> Option<EndKind> {
        match self.said(line)? {
            Said::End(kind) => Some(kind),
            Said::Intermediate => None,
        }
    }

    /// What a text says in one of its lines, and whether it says nothing else.
    pub(super) fn found_in(&self, content: &str) -> Option<(Said, bool)> {
        let mut lines = content.lines().filter(|line| !line.trim().is_empty());
        let said = lines.clone().find_map(|line| self.said(line))?;
        let whole = lines.all(|line| self.said(line).is_some());
        Some((said, whole))
    }
}

fn has_digit(text: &str) -> bool {
    text.bytes().any(|byte| byte.is_ascii_digit())
}

/// Without dots and brackets, hyphens as blanks, single blanks, in one letter case.
fn plain(text: &str) -> String {
    let kept: String = folded(text)
        .chars()
        .filter(|sign| !matches!(sign, '.' | '(' | ')' | '[' | ']'))
        .map(|sign| if sign == '-' { ' ' } else { sign })
        .collect();
    let words: Vec<&str> = kept.split_whitespace().collect();
    words.join(" ")
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::job::Job;

    #[test]
    fn words_are_read_as_drafters_write_them() {
        let mut conventions = Job::default().conventions;
        let words = EndWords::new(&conventions);
        for (text, kind) in [
            ("LE", Some(EndKind::Live)),
            (" l.e. ", Some(EndKind::Live)),
            ("(Stressing-End)", Some(EndKind::Live)),
            ("DE", Some(EndKind::Dead)),
            ("dead  END", Some(EndKind::Dead)),
            ("END", None),
            ("H165", None),
            ("SLE", None),
            ("", None),
        ] {
            assert_eq!(words.kind(text), kind, "{text}");
        }
        assert_eq!(
            words.found_in("D1 5-12.7\nLE"),
            Some((Said::End(EndKind::Live), false))
        );
        let dead = Said::End(EndKind::Dead);
        assert_eq!(words.found_in("DE\n"), Some((dead, true)));
        for text in ["Intermediate Anchor", "(INT. ANCHOR)", "INTERMEDIATE"] {
            assert_eq!(words.said(text), Some(Said::Intermediate), "{text}");
            assert_eq!(words.kind(text), None, "{text}");
        }
        assert_eq!(words.said("INTERMEDIATE ANCHOR BY OTHERS"), None);
        conventions.live_end_words = vec!["J1".to_owned()];
        assert_eq!(EndWords::new(&conventions).kind("j1"), Some(EndKind::Live));
    }
}
