//! What several texts say of one thing, taken together: the one rule for all that is said twice.

/// Nothing is said, one thing is (once or more often), or things that contradict one another, of which none counts.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub(super) enum Heard<T> {
    #[default]
    Nothing,
    One(T),
    Torn,
}

impl<T: PartialEq> Heard<T> {
    /// Hears one text more; what says nothing changes nothing.
    pub(super) fn hear(&mut self, said: Option<T>) {
        if let Some(said) = said {
            self.join(Self::One(said));
        }
    }

    /// Hears what others have heard.
    pub(super) fn join(&mut self, other: Self) {
        *self = match (std::mem::take(self), other) {
            (Self::Nothing, any) | (any, Self::Nothing) => any,
            (Self::One(a), Self::One(b)) if a == b => Self::One(a),
            _ => Self::Torn,
        };
    }

    /// Whether each says something, and not the same.
    pub(super) fn differs(&self, other: &Self) -> bool {
        matches!((self, other), (Self::One(a), Self::One(b)) if a != b)
    }

    /// Hears only that another says otherwise.
    pub(super) fn tear(&mut self, other: &Self) {
        if self.differs(other) {
            *self = Self::Torn;
        }
    }

    /// What counts.
    pub(super) fn one(&self) -> Option<&T> {
        match self {
            Self::One(said) => Some(said),
            Self::Nothing | Self::Torn => None,
        }
    }

    /// Whether anything was said at all.
    pub(super) fn is_said(&self) -> bool {
        !matches!(self, Self::Nothing)
    }

    /// Whether it was contradicted.
    pub(super) fn is_torn(&self) -> bool {
        matches!(self, Self::Torn)
    }
}

impl<T> From<Option<T>> for Heard<T> {
    fn from(said: Option<T>) -> Self {
        said.map_or(Self::Nothing, Self::One)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_repeat_changes_nothing_and_a_contradiction_leaves_nothing_that_counts() {
        let mut heard = Heard::Nothing;
        for said in [None, Some(5), None, Some(5)] {
            heard.hear(said);
        }
        assert_eq!(heard.one(), Some(&5));
        heard.tear(&Heard::One(5));
        heard.tear(&Heard::Nothing);
        assert_eq!(heard, Heard::One(5));
        // Whichever comes first, and whatever comes after.
        for [first, second] in [[5, 4], [4, 5]] {
            let mut heard = Heard::One(first);
            heard.hear(Some(second));
            heard.hear(Some(first));
            assert!(heard.is_torn() && heard.is_said() && heard.one().is_none());
        }
        heard.tear(&Heard::One(4));
        assert!(heard.is_torn());
    }
}
