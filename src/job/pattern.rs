//! A pattern of label texts: what is looked for, and what the numbers in it mean where the text does not say.

use regex::{Captures, Regex};
use serde_json::{Map, Value, json};

use super::{Datum, FromFace};
use crate::units::{KIP_KN, LengthUnit};

/// A named pattern. What it leaves open, the job's own keys (`height.unit`, `height.from`, ...) decide.
#[derive(Debug, Clone)]
pub struct Pattern {
    /// Name, as surveys and messages show it.
    pub name: Option<String>,
    /// The expression; its named groups say what was found.
    pub expression: Regex,
    /// Unit of the number.
    pub unit: Option<PatternUnit>,
    /// The face that a height is measured from.
    pub from: Option<FromFace>,
    /// What a height is measured to.
    pub datum: Option<Datum>,
    /// High or low, where the text has no word.
    pub word: Option<Word>,
    /// Strands in each tendon, where the text counts only tendons.
    pub strands: Option<u32>,
    /// Strand size, where the text gives none.
    pub strand: Option<String>,
}

/// Which way a height is said to be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Word {
    /// A high point.
    High,
    /// A low point.
    Low,
}

/// Unit of a pattern's number.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum PatternUnit {
    /// Of a height or a thickness.
    Length(LengthUnit),
    /// Of a required force.
    Force(ForceUnit),
}

/// Unit of a required force; the last two per width of slab.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum ForceUnit {
    /// Kilonewton.
    Kn,
    /// Kip, 1000 pounds-force (4.448 221 615 260 5 kN exactly, by the pound and standard gravity).
    Kip,
    /// Kilonewton per metre.
    KnPerM,
    /// Kip per foot.
    KipPerFt,
}

/// Words of lengths, then of forces.
pub(super) const LENGTH_WORDS: &[&str] = &["mm", "cm", "m", "in", "ft"];
pub(super) const FORCE_WORDS: &[&str] = &["kN", "kip", "kN/m", "kip/ft"];

impl ForceUnit {
    /// Kilonewtons, or kilonewtons per metre, in one of this unit.
    pub fn kilonewtons(self) -> f64 {
        match self {
            Self::Kn | Self::KnPerM => 1.0,
            Self::Kip => KIP_KN,
            Self::KipPerFt => KIP_KN / LengthUnit::Ft.metres(),
        }
    }

    /// Whether it is a force per width.
    pub fn per_width(self) -> bool {
        matches!(self, Self::KnPerM | Self::KipPerFt)
    }

    fn word(self) -> &'static str {
        match self {
            Self::Kn => "kN",
            Self::Kip => "kip",
            Self::KnPerM => "kN/m",
            Self::KipPerFt => "kip/ft",
        }
    }
}

impl PatternUnit {
    /// The unit of this name.
    pub fn named(word: &str) -> Option<Self> {
        use ForceUnit::{Kip, KipPerFt, Kn, KnPerM};
        use LengthUnit::{Cm, Ft, In, M, Mm};
        let lengths = [Mm, Cm, M, In, Ft].map(Self::Length);
        let forces = [Kn, Kip, KnPerM, KipPerFt].map(Self::Force);
        let mut all = lengths.into_iter().chain(forces);
        all.find(|unit| unit.word() == word)
    }

    /// Its name.
    pub fn word(self) -> &'static str {
        match self {
            Self::Length(unit) => unit.name(),
            Self::Force(unit) => unit.word(),
        }
    }
}

impl Pattern {
    /// A pattern that says nothing beyond its expression.
    pub fn new(expression: Regex) -> Self {
        Self {
            name: None,
            expression,
            unit: None,
            from: None,
            datum: None,
            word: None,
            strands: None,
            strand: None,
        }
    }

    /// The expression as written.
    pub fn as_str(&self) -> &str {
        self.expression.as_str()
    }

    /// Its name, or else its expression.
    pub fn label(&self) -> &str {
        self.name.as_deref().unwrap_or(self.as_str())
    }

    /// What it finds in a line.
    pub fn captures<'t>(&self, line: &'t str) -> Option<Captures<'t>> {
        self.expression.captures(line)
    }

    /// Whether it fits a line.
    pub fn is_match(&self, line: &str) -> bool {
        self.expression.is_match(line)
    }

    /// Whether it has a group of this name.
    pub fn has_group(&self, name: &str) -> bool {
        self.expression.capture_names().flatten().any(|g| g == name)
    }

    /// As a job file writes it: a string where it says nothing beyond its expression, else a table.
    pub fn written(&self) -> Value {
        let mut table = Map::new();
        let words = [
            ("name", self.name.as_deref()),
            ("expression", Some(self.as_str())),
            ("unit", self.unit.map(PatternUnit::word)),
            ("from", self.from.map(FromFace::word)),
            ("datum", self.datum.map(Datum::word)),
            ("word", self.word.map(Word::word)),
        ];
        for (key, word) in words {
            table.extend(word.map(|word| (key.to_owned(), json!(word))));
        }
        table.extend(
            self.strands
                .map(|count| ("strands".to_owned(), json!(count))),
        );
        let strand = self.strand.as_ref();
        table.extend(strand.map(|size| ("strand".to_owned(), json!(size))));
        if table.len() == 1 {
            json!(self.as_str())
        } else {
            Value::Object(table)
        }
    }
}

impl Word {
    /// `high` or `low`.
    pub fn word(self) -> &'static str {
        match self {
            Self::High => "high",
            Self::Low => "low",
        }
    }
}

impl Datum {
    /// Words of the job file.
    pub(super) const WORDS: &'static [&'static str] = &["centroid", "duct-underside", "chair"];

    /// Its word in the job file.
    pub fn word(self) -> &'static str {
        match self {
            Self::Centroid => "centroid",
            Self::DuctUnderside => "duct-underside",
            Self::Chair => "chair",
        }
    }

    /// What the word of the job file stands for; anything unknown is the default.
    pub(super) fn of(word: &str) -> Self {
        match word {
            "duct-underside" => Self::DuctUnderside,
            "chair" => Self::Chair,
            _ => Self::Centroid,
        }
    }
}

impl FromFace {
    /// Words of the job file.
    pub(super) const WORDS: &'static [&'static str] = &["soffit", "top", "nearer-face"];

    /// Its word in the job file.
    pub fn word(self) -> &'static str {
        match self {
            Self::Soffit => "soffit",
            Self::Top => "top",
            Self::NearerFace => "nearer-face",
        }
    }

    /// What the word of the job file stands for; anything unknown is the default.
    pub(super) fn of(word: &str) -> Self {
        match word {
            "top" => Self::Top,
            "nearer-face" => Self::NearerFace,
            _ => Self::Soffit,
        }
    }
}
