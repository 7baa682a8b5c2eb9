//! Layers of a role, by the job or as proposed.

use std::collections::BTreeMap;

use serde_json::Value;

use super::proposals::patterns;
use crate::drawing::{Drawing, Shape, Text};
use crate::job::{Job, Proposal};
use crate::patterns::Selectors;

/// The layers that some keys below `[layers]` name.
pub(super) struct Picked(Selectors);

impl Picked {
    /// What the job names, and what is proposed in its place.
    pub(super) fn of(roles: &[&str], job: &Job, proposed: &BTreeMap<String, Proposal>) -> Self {
        let mut all = Vec::new();
        for role in roles {
            match proposed
                .get(&format!("layers.{role}"))
                .map(|one| &one.value)
            {
                Some(Value::Array(items)) => {
                    all.extend(items.iter().filter_map(Value::as_str).map(str::to_owned));
                }
                _ => all.extend(patterns(job, role)),
            }
        }
        // A job's patterns were tried when it was read, and those proposed are names.
        Self(Selectors::new(all).unwrap_or_default())
    }

    /// Those of tendons.
    pub(super) fn tendons(job: &Job, proposed: &BTreeMap<String, Proposal>) -> Self {
        Self::of(&["banded", "distributed", "tendons"], job, proposed)
    }

    /// Whether a shape lies on one of them, and is seen as its pattern asks.
    pub(super) fn picks(&self, drawing: &Drawing, shape: &Shape) -> bool {
        let look = shape.look;
        self.0
            .picks(&shape.layer, look.colour, drawing.linetype(look))
    }

    /// Whether a text lies on one of them, and is seen as its pattern asks.
    pub(super) fn writes(&self, drawing: &Drawing, text: &Text) -> bool {
        let look = text.look;
        self.0
            .picks(&text.layer, look.colour, drawing.linetype(look))
    }
}
