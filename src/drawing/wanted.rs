//! Which layers are to be read.

use super::names::is_own;
use crate::patterns::{BrokenPattern, Patterns};

/// Layers to read: all, or those that some shell pattern fits in any letter case; never this tool's own.
#[derive(Debug, Clone)]
pub struct Wanted {
    patterns: Option<Patterns>,
}

impl Wanted {
    /// Every layer.
    pub fn everything() -> Self {
        Self { patterns: None }
    }

    /// Layers that one of the patterns fits.
    ///
    /// # Errors
    /// A pattern that cannot be understood, with the reason.
    pub fn layers<S: AsRef<str>>(
        patterns: impl IntoIterator<Item = S>,
    ) -> Result<Self, BrokenPattern> {
        Ok(Self {
            patterns: Some(Patterns::new(patterns)?),
        })
    }

    /// Whether a layer of this name is to be read.
    pub fn has(&self, layer: &str) -> bool {
        let fits = |patterns: &Patterns| patterns.fit(layer);
        !is_own(layer) && self.patterns.as_ref().is_none_or(fits)
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
}
