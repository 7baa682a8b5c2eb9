//! The job: what the office, the system and the standard say, resolved. No option with a default is left open here.
//!
//! One table, [`keys::KEYS`], describes every key of `tautplan.toml`: where it stands, what may be typed, what it means
//! and where its default comes from. [`read`] walks a file against it, [`file()`] writes a file from it.

use std::collections::BTreeSet;
use std::fmt;

mod asked;
mod automaton;
mod default;
mod expressions;
pub mod families;
pub mod key;
pub mod keys;
mod pattern;
mod patterns;
mod problems;
mod published;
mod reading;
mod resolved;
mod strand_names;
mod strands;
mod systems;
mod values;
mod writing;

pub use pattern::{ForceUnit, Pattern, PatternUnit, Word};
pub use problems::{Problem, Problems};
pub use published::{Cement, Environment, LongTermMethod, Published, RelaxationClass};
pub use reading::read;
pub use resolved::{
    Conventions, Datum, END_SHAPES, FromFace, HeightReading, Job, Layers, Limits, LongTerm,
    Profiling, SIDES, SlabJob, Soffit, StepKeeps, StrandSize, Stressing, TendonJob, Wobble,
};
pub use systems::System;
pub use writing::{Proposal, file};

/// A job file read: the whole job, and which of its keys the file gave.
#[derive(Debug, Clone, Default)]
pub struct Resolved {
    /// The job, every value present.
    pub job: Job,
    /// Paths of the keys that the file gave, such as `stressing.mu_per_rad`.
    pub given: BTreeSet<String>,
}

impl Resolved {
    /// Every key that the file did not give, with what holds in its place.
    pub fn fallbacks(&self) -> Vec<Fallback> {
        writing::fallbacks(self)
    }

    /// A sentence for every default that is used, with its source.
    pub fn assumptions(&self) -> Vec<String> {
        self.fallbacks().iter().map(Fallback::to_string).collect()
    }
}

/// A key that the job file did not give.
#[derive(Debug, Clone, PartialEq)]
pub struct Fallback {
    /// Table of the key, such as `stressing`.
    pub table: &'static str,
    /// Its name in the result, such as `draw_in_mm`.
    pub name: String,
    /// Its default, as a job file would write it; `None` where there is none.
    pub value: Option<String>,
    /// Where the default comes from, or what happens without one.
    pub source: &'static str,
    /// The system whose own default it is; `None`: the default of all.
    pub system: Option<System>,
}

impl fmt::Display for Fallback {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match &self.value {
            Some(value) => {
                let of = self.system.map(|system| format!(" of {}", system.name()));
                let of = of.unwrap_or_default();
                write!(f, "{} = {value} (default{of}: {})", self.name, self.source)
            }
            None => write!(f, "{} not given: {}", self.name, self.source),
        }
    }
}

impl Job {
    /// Every value used, under its name in the result, in the order of the keys.
    pub fn inputs(&self) -> Vec<(String, serde_json::Value)> {
        keys::inputs(self)
    }
}
