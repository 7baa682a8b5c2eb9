//! A finding is data: which rule, how grave, where, what was found, what to do. Every output renders this same value.

use std::fmt;
use std::ops::Deref;

use geo::Coord;

use crate::units::Units;

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

/// What a finding says, in each of the units that results may be written in; read as a text, it is in SI.
#[derive(Debug, Clone, PartialEq)]
pub struct Wording {
    si: String,
    /// `None` where nothing said has a unit.
    us: Option<String>,
}

impl Wording {
    /// Written once for each units.
    pub fn of(write: impl Fn(Units) -> String) -> Self {
        let (si, us) = (write(Units::Si), write(Units::Us));
        let us = (us != si).then_some(us);
        Self { si, us }
    }

    /// The text in SI.
    pub fn as_str(&self) -> &str {
        &self.si
    }

    /// The text in these units.
    pub fn in_units(&self, units: Units) -> &str {
        match (units, &self.us) {
            (Units::Us, Some(us)) => us,
            _ => &self.si,
        }
    }
}

impl<T: Into<String>> From<T> for Wording {
    fn from(text: T) -> Self {
        Self {
            si: text.into(),
            us: None,
        }
    }
}

impl fmt::Display for Wording {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self)
    }
}

impl Deref for Wording {
    type Target = str;

    fn deref(&self) -> &str {
        self.as_str()
    }
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
    pub text: Wording,
    /// What to do next.
    pub remedy: String,
}

impl Finding {
    /// A finding without a place; add what is known with the `at_` and `on_` methods.
    pub fn new(
        rule: &'static Rule,
        level: Level,
        text: impl Into<Wording>,
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
