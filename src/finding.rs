//! A finding is data: which rule, how grave, where, what was found, what to do. Every output renders this same value.

use geo::Coord;

/// How grave a finding is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Level {
    /// The drawing cannot be built or worked out as drawn.
    Error,
    /// Outside usual practice: the engineer looks at it.
    Warning,
    /// Worth knowing.
    Note,
}

impl Level {
    /// The word printed for this level.
    pub fn word(self) -> &'static str {
        match self {
            Self::Error => "error",
            Self::Warning => "warning",
            Self::Note => "note",
        }
    }
}

/// One thing tautplan looks for, under the name that every output uses.
#[derive(Debug, PartialEq, Eq)]
pub struct Rule {
    /// Kebab-case name, never changed once published.
    pub name: &'static str,
    /// What the rule looks for, and by which source, in one sentence.
    pub meaning: &'static str,
}

/// Something found on the drawing.
#[derive(Debug, Clone, PartialEq)]
pub struct Finding {
    /// The rule that speaks.
    pub rule: &'static Rule,
    /// How grave this instance is.
    pub level: Level,
    /// Mark of the tendon concerned, if one is.
    pub tendon: Option<String>,
    /// Station along that tendon's plan line, metres.
    pub station_m: Option<f64>,
    /// Place on the plan, metres.
    pub place: Option<Coord<f64>>,
    /// What was found and what was expected, with numbers.
    pub text: String,
    /// What to do next.
    pub remedy: String,
}

impl Finding {
    /// A finding without a place; add what is known with the `at_` and `on_` methods.
    pub fn new(
        rule: &'static Rule,
        level: Level,
        text: impl Into<String>,
        remedy: impl Into<String>,
    ) -> Self {
        Self {
            rule,
            level,
            tendon: None,
            station_m: None,
            place: None,
            text: text.into(),
            remedy: remedy.into(),
        }
    }

    /// Names the tendon.
    #[must_use]
    pub fn on_tendon(mut self, mark: &str) -> Self {
        self.tendon = Some(mark.to_owned());
        self
    }

    /// Says where along the tendon, metres of plan line from its first drawn vertex.
    #[must_use]
    pub fn at_station(mut self, station_m: f64) -> Self {
        self.station_m = Some(station_m);
        self
    }

    /// Says where on the plan, metres.
    #[must_use]
    pub fn at_place(mut self, place: Coord<f64>) -> Self {
        self.place = Some(place);
        self
    }
}
