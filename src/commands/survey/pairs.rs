//! Two kinds of sign at line ends: where one is told by its name, or both by letters, what the other must be.

use std::collections::BTreeMap;

use super::trade_words::{coded, hinted};
use crate::floor::EndKind;

/// Signs at fewer than this share of the ends of the most frequent one are by chance.
const SHARE: usize = 5;

/// What signs at line ends stand for.
#[derive(Debug, Default)]
pub(super) struct Pairs<'n> {
    /// By name.
    pub(super) kinds: BTreeMap<&'n str, EndKind>,
    /// Names that nothing tells: taken for the other kind.
    pub(super) guessed: Vec<&'n str>,
}

impl<'n> Pairs<'n> {
    /// Of these names, each at so many ends: by `told`, else by words of the trade, else by letters whose other kind is met
    /// too, else as what is left of two.
    pub(super) fn of(
        found: &BTreeMap<&'n str, usize>,
        told: impl Fn(&str) -> Option<EndKind>,
    ) -> Self {
        let known = |name: &str| told(name).or_else(|| hinted(name));
        let mut pairs = Self::default();
        pairs
            .kinds
            .extend(found.keys().filter_map(|name| Some((*name, known(name)?))));
        let most = found.values().copied().max().unwrap_or(0);
        let often = found
            .iter()
            .filter(|(_, count)| **count > 1 && SHARE * **count >= most);
        let often: Vec<&'n str> = often.map(|(name, _)| *name).collect();
        let meets = |kind: EndKind, pairs: &Self| {
            let mut others = often
                .iter()
                .filter_map(|name| pairs.kinds.get(name).copied().or_else(|| coded(name)));
            others.any(|other| other != kind)
        };
        let letters: Vec<(&'n str, EndKind)> = often
            .iter()
            .filter(|name| !pairs.kinds.contains_key(*name))
            .filter_map(|name| Some((*name, coded(name).filter(|kind| meets(*kind, &pairs))?)))
            .collect();
        pairs.kinds.extend(letters);
        if let [one, other] = often[..] {
            let kinds = [
                pairs.kinds.get(one).copied(),
                pairs.kinds.get(other).copied(),
            ];
            let left = match kinds {
                [Some(kind), None] => Some((other, kind)),
                [None, Some(kind)] => Some((one, kind)),
                _ => None,
            };
            if let Some((left, kind)) = left {
                pairs.kinds.insert(left, opposite(kind));
                pairs.guessed.push(left);
            }
        }
        pairs
    }

    /// Names of a kind.
    pub(super) fn names(&self, kind: EndKind) -> impl Iterator<Item = &'n str> {
        self.kinds
            .iter()
            .filter(move |(_, one)| **one == kind)
            .map(|(name, _)| *name)
    }

    /// Words on which of these names are guesses; nothing where none is.
    pub(super) fn caution(&self, kind: EndKind) -> String {
        let guessed: Vec<&str> = self
            .names(kind)
            .filter(|name| self.guessed.contains(name))
            .collect();
        match guessed[..] {
            [] => String::new(),
            _ => format!(
                " A GUESS: {} is only the other of two at line ends; look at the legend.",
                guessed.join(", ")
            ),
        }
    }
}

/// The other kind.
pub(super) fn opposite(kind: EndKind) -> EndKind {
    match kind {
        EndKind::Live => EndKind::Dead,
        EndKind::Dead => EndKind::Live,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn kinds(found: &[(&'static str, usize)]) -> (Vec<(&'static str, EndKind)>, Vec<&'static str>) {
        let found: BTreeMap<&str, usize> = found.iter().copied().collect();
        let pairs = Pairs::of(&found, |_| None);
        (pairs.kinds.into_iter().collect(), pairs.guessed)
    }

    #[test]
    fn one_known_tells_the_other_of_two() {
        use EndKind::{Dead, Live};
        assert_eq!(
            kinds(&[("ANCHOR-2", 9), ("STRESSING", 8)]),
            (
                vec![("ANCHOR-2", Dead), ("STRESSING", Live)],
                vec!["ANCHOR-2"]
            )
        );
        assert_eq!(
            kinds(&[("D.E.", 9), ("S.E.", 8)]),
            (vec![("D.E.", Dead), ("S.E.", Live)], vec![])
        );
    }

    #[test]
    fn two_unknown_or_three_are_left_open() {
        assert_eq!(kinds(&[("A1", 9), ("A2", 8)]).0, vec![]);
        assert_eq!(
            kinds(&[("LIVE", 9), ("X", 8), ("Y", 7)]).1,
            Vec::<&str>::new()
        );
        // A stray letter is no kind, nor is a code without its other.
        assert_eq!(kinds(&[("S", 9), ("Q", 1)]).0, vec![]);
    }
}
