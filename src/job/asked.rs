//! Which keys of `[long_term]` each method looks at: only those are assumed, and shown, for a job that names it.

use super::key::Key;
use super::keys::of_table;
use super::{LongTerm, LongTermMethod, Resolved};

/// Table of the keys that methods ask.
const TABLE: &str = "long_term";

/// What every method looks at.
const ALL: &[&str] = &["method", "methods", "concrete_stress_mpa"];

const DIRECT: &[&str] = &[
    "concrete_modulus_transfer_mpa",
    "concrete_modulus_mpa",
    "shortening_share",
    "shrinkage_strain",
    "creep_coefficient",
    "relaxation_1000h",
    "relaxation_factor",
];

/// What every published method looks at.
const PUBLISHED: &[&str] = &[
    "strength_mpa",
    "strength_at_stressing_mpa",
    "stressing_days",
    "bonded",
];

/// What a bonded tendon's place asks beside.
const AT_LEVEL: &[&str] = &["balanced_share", "load_share_at_stressing"];

const EN1992: &[&str] = &[
    "cement_class",
    "humidity_percent",
    "curing_days",
    "final_days",
    "asked_days",
    "notional_thickness_mm",
    "relaxation_class",
];

const ACI423: &[&str] = &[
    "humidity_percent",
    "curing_days",
    "notional_thickness_mm",
    "relaxation_class",
];

const BS8110: &[&str] = &["environment", "relaxation_class"];

const AS3600: &[&str] = &[
    "environment",
    "curing_days",
    "final_days",
    "asked_days",
    "notional_thickness_mm",
    "bonded_steel_ratio",
    "drying_basic",
    "basic_relaxation",
    "relaxation_stress_factor",
];

impl LongTermMethod {
    /// Whether the method looks at a key of `[long_term]`, the strand being bonded or not.
    pub fn asks(self, key: &str, bonded: bool) -> bool {
        let own = match self {
            Self::Direct => DIRECT,
            Self::En1992 => EN1992,
            Self::Aci423 => ACI423,
            Self::Bs8110 => BS8110,
            Self::As3600 => AS3600,
        };
        let published =
            self != Self::Direct && (PUBLISHED.contains(&key) || bonded && AT_LEVEL.contains(&key));
        ALL.contains(&key) || own.contains(&key) || published
    }
}

impl LongTerm {
    /// Whether one of the job's methods looks at a key of `[long_term]`.
    fn asks(&self, key: &str) -> bool {
        let bonded = self.published.bonded;
        let methods = self.all_methods();
        methods.iter().any(|method| method.asks(key, bonded))
    }
}

impl Resolved {
    /// Whether a key is one that no method of the job looks at.
    pub(super) fn is_idle(&self, key: &Key) -> bool {
        key.table == TABLE && !self.job.long_term.asks(key.name)
    }

    /// A sentence where the file gives keys that no method of the job looks at.
    pub fn idle(&self) -> Option<String> {
        let idle: Vec<&str> = of_table(TABLE)
            .filter(|key| self.given.contains(&key.path()) && self.is_idle(key))
            .map(|key| key.name)
            .collect();
        let methods = self.job.long_term.all_methods();
        let words: Vec<&str> = methods.iter().map(|method| method.word()).collect();
        (!idle.is_empty()).then(|| {
            format!(
                "Given below [long_term] and not looked at by {}: {}.",
                words.join(", "),
                idle.join(", ")
            )
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_key_of_the_table_is_asked_by_some_method_and_every_name_is_a_key() {
        let asked = |key: &str| {
            let asks = |method: &LongTermMethod| method.asks(key, true);
            LongTermMethod::ALL.iter().any(asks)
        };
        let keys: Vec<&str> = of_table(TABLE).map(|key| key.name).collect();
        assert!(keys.iter().all(|key| asked(key)), "{keys:?}");
        let lists = [
            ALL, DIRECT, PUBLISHED, AT_LEVEL, EN1992, ACI423, BS8110, AS3600,
        ];
        for name in lists.concat() {
            assert!(keys.contains(&name), "{name} is no key");
        }
    }
}
