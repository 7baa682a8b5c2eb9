//! Which size of strand a drawing names: by its name or an alias, in millimetres or inches, in any form of number.

use super::{StrandSize, TendonJob};

impl TendonJob {
    /// The size that is written so: `12.7`, `0.5"`, `.5`, `1/2"`, `Ø12,7 mm`. A name goes before another size's alias.
    pub fn strand_named(&self, written: &str) -> Option<&StrandSize> {
        let written = Form::of(written);
        let fits = |name: &String| Form::of(name) == written;
        let by_name = self.strands.iter().find(|size| fits(&size.name));
        by_name.or_else(|| {
            self.strands
                .iter()
                .find(|size| size.aliases.iter().any(fits))
        })
    }
}

/// A size without its signs: a number where it is one.
#[derive(Debug, PartialEq)]
enum Form {
    /// In ten-thousandths.
    Number(String),
    Word(String),
}

impl Form {
    fn of(written: &str) -> Self {
        let bare: String = written
            .chars()
            .filter(|c| !c.is_whitespace() && !matches!(c, 'Ø' | 'ø' | '∅' | '⌀'))
            .flat_map(char::to_lowercase)
            .collect();
        let bare = ["\"", "″", "”", "''", "in.", "in", "mm"]
            .into_iter()
            .find_map(|sign| bare.strip_suffix(sign))
            .unwrap_or(&bare);
        match number(bare) {
            Some(number) if number.is_finite() => Self::Number(format!("{number:.4}")),
            _ => Self::Word(bare.to_owned()),
        }
    }
}

fn number(bare: &str) -> Option<f64> {
    let decimal = |text: &str| text.replace(',', ".").parse::<f64>().ok();
    match bare.split_once('/') {
        Some((above, below)) => Some(decimal(above)? / decimal(below)?),
        None if bare == "½" => Some(0.5),
        None => decimal(bare),
    }
}

#[cfg(test)]
mod tests {
    use crate::job::Job;

    #[test]
    fn a_size_is_known_in_any_form_of_its_name() {
        let tendon = Job::default().tendon;
        let name = |written: &str| tendon.strand_named(written).map(|size| size.name.clone());
        for (written, known) in [
            ("12.7", Some("12.7")),
            ("12,70 mm", Some("12.7")),
            ("0.5\"", Some("12.7")),
            (".5", Some("12.7")),
            ("1/2\"", Some("12.7")),
            ("½", Some("12.7")),
            ("Ø15.24mm", Some("15.2")),
            ("0.6 in", Some("15.2")),
            (".62", Some("15.7")),
            ("12", None),
            ("1/0", None),
            ("", None),
            ("NaN", None),
        ] {
            assert_eq!(name(written).as_deref(), known, "{written}");
        }
    }

    #[test]
    fn a_name_goes_before_an_alias() {
        let mut tendon = Job::default().tendon;
        let mut own = tendon.strands[0].clone();
        own.name = "0.6".to_owned();
        own.area_mm2 = 144.0;
        tendon.strands.push(own);
        let found = tendon.strand_named("0.6\"").map(|size| size.area_mm2);
        assert_eq!(found, Some(144.0));
    }
}
