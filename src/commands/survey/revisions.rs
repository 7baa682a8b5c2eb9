//! Hidden layers: a frozen or switched-off layer beside a visible one of the same kind holds an older state.

use std::collections::BTreeSet;

use super::roles::Guesses;
use crate::commands::work;
use crate::drawing::Drawing;

/// Takes hidden layers from guesses that have visible ones too; gives what was taken, by role.
pub(super) fn leave_out(drawing: &Drawing, guesses: &mut Guesses) -> Guesses {
    let hidden = |pattern: &String| {
        let named = work::wanted([pattern.clone()]);
        let mut layers = drawing
            .layers
            .iter()
            .filter(|layer| named.has(&layer.name))
            .peekable();
        layers.peek().is_some() && layers.all(|layer| layer.off || layer.frozen)
    };
    let mut out = Guesses::new();
    for (role, patterns) in guesses {
        let old: BTreeSet<String> = patterns.iter().filter(|p| hidden(p)).cloned().collect();
        if old.len() < patterns.len() {
            patterns.retain(|pattern| !old.contains(pattern));
            if !old.is_empty() {
                out.insert(role, old);
            }
        }
    }
    out
}
