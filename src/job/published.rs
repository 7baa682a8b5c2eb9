//! What the published methods of long-term loss ask of a job.

use super::LongTerm;
use super::reading::Reader;

/// What the published methods ask; each uses a part of it.
#[derive(Debug, Clone)]
pub struct Published {
    /// Cylinder strength of the concrete at 28 days, MPa.
    pub strength_mpa: f64,
    /// Cylinder strength proven at stressing, MPa.
    pub strength_at_stressing_mpa: f64,
    /// Class of cement.
    pub cement: Cement,
    /// Relative humidity, per cent.
    pub humidity: f64,
    /// Where the floor stands.
    pub environment: Environment,
    /// Age at the end of curing, days.
    pub curing_days: f64,
    /// Age at stressing, days.
    pub stressing_days: f64,
    /// Age that counts as final, days.
    pub final_days: f64,
    /// Age at which the service force is asked for, days; `None`: the final age.
    pub asked_days: Option<f64>,
    /// 2 A/u, metres; `None`: the slab's own thickness, which dries from both faces.
    pub notional_thickness_m: Option<f64>,
    /// Relaxation class of the strand.
    pub relaxation_class: RelaxationClass,
    /// Whether the strand is bonded to the concrete.
    pub bonded: bool,
    /// Bonded steel over concrete area.
    pub bonded_steel_ratio: f64,
    /// Share of the permanent load that the tendons' own curvature balances.
    pub balanced_share: f64,
    /// Share of the permanent load that acts at stressing.
    pub load_share_at_stressing: f64,
    /// Basic drying shrinkage of AS 3600.
    pub drying_basic: f64,
    /// Basic relaxation of AS 3600, as a fraction at 1000 hours.
    pub basic_relaxation: Option<f64>,
    /// Factor on the basic relaxation for the stress in the strand (and its warmth), AS 3600.
    pub relaxation_stress_factor: Option<f64>,
}

/// A choice among words of the job file.
macro_rules! words {
    ($kind:ident, $meaning:literal, $($variant:ident = $word:literal, $doc:literal;)+) => {
        #[doc = $meaning]
        #[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
        pub enum $kind {
            $(#[doc = $doc] $variant,)+
        }

        impl $kind {
            /// All, in order.
            pub const ALL: &'static [Self] = &[$(Self::$variant),+];

            /// Their words.
            pub const WORDS: &'static [&'static str] = &[$($word),+];

            /// The word of the job file.
            pub fn word(self) -> &'static str {
                match self {
                    $(Self::$variant => $word,)+
                }
            }

            /// The one that a word stands for.
            pub fn of(word: &str) -> Option<Self> {
                Self::ALL.iter().copied().find(|one| one.word() == word)
            }
        }
    };
}

words! { LongTermMethod, "A long-term method.",
    Direct = "direct", "The job gives strain and coefficients.";
    En1992 = "en1992", "EN 1992-1-1:2004.";
    Aci423 = "aci423", "The ACI-ASCE 423 method.";
    Bs8110 = "bs8110", "BS 8110-1:1997.";
    As3600 = "as3600", "AS 3600:2018.";
}

words! { Cement, "Class of cement, EN 1992-1-1 3.1.2(6).",
    S = "S", "Slow.";
    N = "N", "Normal.";
    R = "R", "Rapid.";
}

words! { RelaxationClass, "Relaxation class of the steel.",
    Ordinary = "ordinary", "Ordinary or stress-relieved strand: class 1.";
    Low = "low", "Low-relaxation strand: class 2 of EN 1992-1-1 and of BS 5896.";
    Bar = "bar", "Hot-rolled bars: class 3 of EN 1992-1-1.";
}

words! { Environment, "Where a floor stands, by the words of AS 3600 3.1.7.2.",
    Arid = "arid", "Arid.";
    Interior = "interior", "Indoors.";
    Temperate = "temperate", "Outdoors, temperate inland.";
    Tropical = "tropical", "Outdoors, tropical, near-coastal or coastal.";
}

impl LongTermMethod {
    /// Whether it gives the loss at any age, not only in the end.
    pub fn knows_time(self) -> bool {
        matches!(self, Self::En1992 | Self::As3600)
    }

    /// Where it is published.
    pub fn standard(self) -> &'static str {
        match self {
            Self::Direct => "the job's own figures",
            Self::En1992 => "EN 1992-1-1:2004",
            Self::Aci423 => "the ACI-ASCE 423 method",
            Self::Bs8110 => "BS 8110-1:1997",
            Self::As3600 => "AS 3600:2018",
        }
    }
}

impl Default for Published {
    /// Every key at its default.
    fn default() -> Self {
        Self {
            strength_mpa: 30.0,
            strength_at_stressing_mpa: 20.0,
            cement: Cement::N,
            humidity: 50.0,
            environment: Environment::Interior,
            curing_days: 3.0,
            stressing_days: 4.0,
            final_days: 18_250.0,
            asked_days: None,
            notional_thickness_m: None,
            relaxation_class: RelaxationClass::Low,
            bonded: true,
            bonded_steel_ratio: 0.0,
            balanced_share: 1.0,
            load_share_at_stressing: 0.7,
            drying_basic: 800e-6,
            basic_relaxation: None,
            relaxation_stress_factor: None,
        }
    }
}

impl LongTerm {
    /// Every method that the job names, the one that is drawn first, each once.
    pub fn all_methods(&self) -> Vec<LongTermMethod> {
        let mut all = vec![self.method];
        for method in self
            .methods
            .iter()
            .filter_map(|word| LongTermMethod::of(word))
        {
            if !all.contains(&method) {
                all.push(method);
            }
        }
        all
    }

    /// When the service force is asked for, in words.
    pub fn asked_words(&self) -> String {
        self.published.asked_days.map_or_else(
            || "in the end".to_owned(),
            |days| format!("at an age of {days} days"),
        )
    }

    /// Whether a method is named that works its figures out by clauses.
    pub fn asks_published(&self) -> bool {
        let direct = LongTermMethod::Direct;
        self.all_methods().iter().any(|&method| method != direct)
    }
}

impl Reader {
    /// Of methods without a method the first is drawn; and AS 3600 asks for what has no default here.
    pub(super) fn methods(&mut self) {
        let span =
            |reader: &Self, name: &str| reader.given.get(&format!("long_term.{name}")).cloned();
        let (method, methods) = (span(self, "method"), span(self, "methods"));
        let long_term = &mut self.job.long_term;
        let first = long_term.methods.first();
        if let (None, Some(first)) = (&method, first.and_then(|word| LongTermMethod::of(word))) {
            long_term.method = first;
        }
        if !long_term.all_methods().contains(&LongTermMethod::As3600) {
            return;
        }
        let published = &long_term.published;
        let lacking: Vec<&str> = [
            ("basic_relaxation", published.basic_relaxation),
            (
                "relaxation_stress_factor",
                published.relaxation_stress_factor,
            ),
        ]
        .into_iter()
        .filter_map(|(name, value)| value.is_none().then_some(name))
        .collect();
        let place = if long_term.method == LongTermMethod::As3600 {
            method.or(methods)
        } else {
            methods
        };
        if let (false, Some(place)) = (lacking.is_empty(), place) {
            self.mistake(
                place,
                format!("as3600 asks for `{}`, which the file does not give", lacking.join("` and `")),
                "expected the relaxation of the strand to be used: the standard's own figures were not at hand",
                "give below [long_term] R_b as `basic_relaxation` (a fraction at 1000 hours) and the factor for stress (and \
                 warmth) as `relaxation_stress_factor`, AS 3600 3.3.4.3, or take as3600 out",
            );
        }
    }
}
