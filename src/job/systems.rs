//! Systems of tendon by name: each a set of defaults that its own keys override one by one.

use super::Job;
use super::key::{Key, Kind};
use super::keys::KEYS;

/// A system of tendon (names of this program).
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum System {
    /// Several strands in a flat duct that is grouted after stressing.
    BondedFlatDuct,
    /// Single strands, greased, each in its own sheathing.
    GreasedSingleStrand,
}

/// What a system sets otherwise than the table of keys says.
#[derive(Debug)]
struct Standing {
    /// The key's path.
    path: &'static str,
    /// Its value, in the key's own unit.
    value: Value,
    /// Where the value comes from.
    source: &'static str,
}

/// What a key of a system may be.
#[derive(Debug)]
enum Value {
    Number(f64),
    Switch(bool),
}

const fn standing(path: &'static str, value: f64, source: &'static str) -> Standing {
    Standing {
        path,
        value: Value::Number(value),
        source,
    }
}

/// The defaults in the table of keys are those of a bonded flat duct.
const BONDED_FLAT_DUCT: &[Standing] = &[];

const GREASED_SINGLE_STRAND: &[Standing] = &[
    standing(
        "height.strand_in_duct_low_mm",
        8.0,
        "half the sheathing, which is tight around its strand",
    ),
    standing(
        "height.strand_in_duct_high_mm",
        8.0,
        "half the sheathing, which is tight around its strand",
    ),
    standing(
        "tendon.duct_height_mm",
        16.0,
        "sheathing of a 12.7 mm strand, common practice, from memory",
    ),
    standing(
        "stressing.mu_per_rad",
        0.07,
        "common practice, 0.05 to 0.07",
    ),
    standing(
        "stressing.wobble_per_m",
        0.0046,
        "common practice, 0.0010 to 0.0014 per foot",
    ),
    standing("stressing.draw_in_mm", 6.35, "common practice, 1/4 inch"),
    standing(
        "limits.cover_mm",
        19.0,
        "3/4 inch for a slab indoors, ACI 318-19 20.5.1.3.2, from memory; the project's durability rules decide",
    ),
    standing("limits.plan_radius_m", 3.0, "common practice"),
    Standing {
        path: "long_term.bonded",
        value: Value::Switch(false),
        source: "a strand in grease is free along its whole length",
    },
];

impl System {
    /// Every system, the default first.
    pub const ALL: [Self; 2] = [Self::BondedFlatDuct, Self::GreasedSingleStrand];

    /// The word of the job file.
    pub fn name(self) -> &'static str {
        match self {
            Self::BondedFlatDuct => "bonded-flat-duct",
            Self::GreasedSingleStrand => "greased-single-strand",
        }
    }

    /// The system of this name.
    pub fn named(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|system| system.name() == word)
    }

    /// The job that a file gives which names this system and nothing else.
    pub fn job(self) -> Job {
        let mut job = Job::default();
        self.set(&mut job);
        job
    }

    /// Sets what this system sets; keys that a file gives come after.
    pub(super) fn set(self, job: &mut Job) {
        job.system = self;
        for standing in self.standing() {
            let key = KEYS.iter().find(|key| key.path() == standing.path);
            match (key.map(|key| &key.kind), &standing.value) {
                (Some(Kind::Number { set, .. }), Value::Number(number)) => set(job, *number),
                (Some(Kind::Switch { set, .. }), Value::Switch(on)) => set(job, *on),
                _ => {}
            }
        }
    }

    /// Where this system's own default of a key comes from; `None` where the table of keys has the default.
    pub(super) fn source(self, key: &Key) -> Option<&'static str> {
        let path = key.path();
        self.standing()
            .iter()
            .find(|standing| standing.path == path)
            .map(|standing| standing.source)
    }

    fn standing(self) -> &'static [Standing] {
        match self {
            Self::BondedFlatDuct => BONDED_FLAT_DUCT,
            Self::GreasedSingleStrand => GREASED_SINGLE_STRAND,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_key_knows_every_system() {
        let key = KEYS.iter().find(|key| key.path() == "system");
        let Some(Kind::Choice { words, .. }) = key.map(|key| &key.kind) else {
            panic!("`system` is no choice");
        };
        assert_eq!(System::ALL.map(System::name), **words);
    }

    #[test]
    fn every_standing_value_is_that_of_its_key_and_within_its_range() {
        for system in System::ALL {
            let job = system.job();
            for standing in system.standing() {
                let key = KEYS.iter().find(|key| key.path() == standing.path);
                let key = key.unwrap_or_else(|| panic!("{} is no key", standing.path));
                let value = match (&key.kind, &standing.value) {
                    (Kind::Number { least, most, .. }, Value::Number(number)) => {
                        assert!((least..=most).contains(&number), "{}", key.path());
                        serde_json::json!(number)
                    }
                    (Kind::Switch { .. }, Value::Switch(on)) => serde_json::json!(on),
                    _ => panic!("{} is of another kind", standing.path),
                };
                assert_eq!(key.value(&job), Some(value));
            }
        }
    }
}
