//! Which layers are to be read.

use super::names::is_own;
use crate::patterns::{PatternRefused, Selectors, tails};

/// Layers to read: all, or those on which some pattern may pick something; never this tool's own, nor those that came
/// with a reference that this tool had marked.
#[derive(Debug, Clone)]
pub struct Wanted {
    patterns: Option<Selectors>,
}

impl Wanted {
    /// Every layer.
    pub fn everything() -> Self {
        Self { patterns: None }
    }

    /// Layers on which one of the patterns may pick something; all that lies on them is read.
    ///
    /// # Errors
    /// A pattern that cannot be understood, with the reason.
    pub fn layers<S: AsRef<str>>(
        patterns: impl IntoIterator<Item = S>,
    ) -> Result<Self, PatternRefused> {
        Ok(Self {
            patterns: Some(Selectors::new(patterns)?),
        })
    }

    /// Whether layers are chosen by name.
    pub(super) fn chooses(&self) -> bool {
        self.patterns.is_some()
    }

    /// Whether a layer of this name is to be read.
    pub fn has(&self, layer: &str) -> bool {
        let fits = |patterns: &Selectors| patterns.may_pick(layer);
        !tails(layer).any(is_own) && self.patterns.as_ref().is_none_or(fits)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn patterns_fit_in_any_letter_case_and_never_our_own_layers() {
        let wanted = Wanted::layers(["Tendon-*", "КОЛОННА?", "T*"]).expect("patterns");
        assert!(wanted.has("TENDON-BANDED") && wanted.has("tendon-mark") && wanted.has("колонна1"));
        assert!(!wanted.has("SLAB-EDGE") && !wanted.has("TAUT-TABLE"));
        assert!(!Wanted::everything().has("taut-finding") && Wanted::everything().has("0"));
        assert!(Wanted::layers(["a[b"]).is_err());
    }

    #[test]
    fn references_are_read_and_earlier_marks_in_them_are_not() {
        let wanted = Wanted::layers(["T*", "0@colour=1"]).expect("patterns");
        assert!(wanted.has("L2$0$TENDON-BANDED") && wanted.has("L2|TENDON-BANDED"));
        assert!(!wanted.has("L2$0$TAUT-PROFILE") && !wanted.has("SLAB"));
        assert!(wanted.has("0"));
    }
}
