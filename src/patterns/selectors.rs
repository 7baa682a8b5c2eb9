//! Patterns by which a job picks things out of a drawing: names also behind the prefix of a bound or attached reference,
//! layers also by the colour and linetype of what lies on them.

use super::{BrokenPattern, Patterns};

/// Layers by patterns such as `PT-*`, `0@colour=1`, `PT@linetype=DASHED*@colour=3`: what lies on a layer whose name fits
/// and, where the pattern says so, is seen in that colour and linetype.
#[derive(Debug, Clone, Default)]
pub struct Selectors {
    plain: Names,
    picky: Vec<Picky>,
}

/// A pattern that looks at more than the layer's name.
#[derive(Debug, Clone)]
struct Picky {
    layers: Names,
    colour: Option<u8>,
    linetypes: Option<Names>,
}

impl Selectors {
    /// The layers that one of the patterns picks.
    ///
    /// # Errors
    /// The first pattern that cannot be understood.
    pub fn new<S: AsRef<str>>(
        patterns: impl IntoIterator<Item = S>,
    ) -> Result<Self, PatternRefused> {
        let mut plain = Vec::new();
        let mut picky = Vec::new();
        for pattern in patterns {
            match parts(pattern.as_ref())? {
                (name, None, None) => plain.push(name.to_owned()),
                (name, colour, linetype) => picky.push(Picky {
                    layers: Names::new([name])?,
                    colour,
                    linetypes: linetype.map(|one| Names::new([one])).transpose()?,
                }),
            }
        }
        Ok(Self {
            plain: Names::new(plain)?,
            picky,
        })
    }

    /// Whether something on a layer of this name may be picked.
    pub fn may_pick(&self, layer: &str) -> bool {
        self.plain.has(layer) || self.asks_more(layer)
    }

    /// Whether some pattern for a layer of this name asks for a colour or a linetype.
    pub fn asks_more(&self, layer: &str) -> bool {
        self.picky.iter().any(|one| one.layers.has(layer))
    }

    /// Whether what lies on this layer and is seen in this colour (index 1 to 255; `None` for a true colour without
    /// one) and linetype is picked.
    pub fn picks(&self, layer: &str, colour: Option<u8>, linetype: &str) -> bool {
        self.plain.has(layer)
            || self.picky.iter().any(|one| {
                one.layers.has(layer)
                    && one.colour.is_none_or(|asked| colour == Some(asked))
                    && one.linetypes.as_ref().is_none_or(|set| set.has(linetype))
            })
    }
}

/// Names by shell patterns; a pattern fits a whole name, or what stands behind the prefix of a bound (`REF$0$NAME`) or
/// attached (`REF|NAME`) reference.
#[derive(Debug, Clone, Default)]
pub struct Names(Patterns);

impl Names {
    /// The names that one of the patterns fits.
    ///
    /// # Errors
    /// The first pattern that cannot be understood.
    pub fn new<S: AsRef<str>>(
        patterns: impl IntoIterator<Item = S>,
    ) -> Result<Self, BrokenPattern> {
        Patterns::new(patterns).map(Self)
    }

    /// Whether a pattern fits the name.
    pub fn has(&self, name: &str) -> bool {
        tails(name).any(|tail| self.0.fit(tail))
    }
}

/// References in references that are looked behind; nobody nests so many.
const MOST_PREFIXES: usize = 32;

/// A name, then what stands behind each prefix of a reference in it.
pub fn tails(name: &str) -> impl Iterator<Item = &str> {
    std::iter::successors(Some(name), |name| behind_prefix(name)).take(MOST_PREFIXES + 1)
}

/// A name as it is compared: without regard to letter case.
pub fn folded(name: &str) -> String {
    name.to_uppercase()
}

/// Why a pattern cannot be used.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum PatternRefused {
    /// Its shell pattern is broken.
    #[error(transparent)]
    Shell(#[from] BrokenPattern),
    /// It asks for something that is neither colour nor linetype.
    #[error("`@{0}=` is neither @colour= nor @linetype=")]
    Asks(String),
    /// Its colour is no colour index.
    #[error("`@colour={0}` is no colour index from 1 to 255")]
    Colour(String),
}

/// What stands behind the first prefix of a reference: `REF|` where it is attached, `REF$0$` where it was bound.
fn behind_prefix(name: &str) -> Option<&str> {
    let attached = name.find('|').filter(|at| *at > 0).map(|at| at + 1);
    let bound = name.match_indices('$').find_map(|(at, _)| {
        let number = name.get(at + 1..)?;
        let digits = number.bytes().take_while(u8::is_ascii_digit).count();
        let is_prefix = at > 0 && digits > 0 && number.get(digits..)?.starts_with('$');
        is_prefix.then_some(at + 1 + digits + 1)
    });
    let cut = attached.into_iter().chain(bound).min()?;
    name.get(cut..).filter(|rest| !rest.is_empty())
}

type Parts<'p> = (&'p str, Option<u8>, Option<&'p str>);

/// A pattern's parts: name, colour, linetype. An `@` without a `=` behind it belongs to the name; a layer's name holds
/// no `=`.
fn parts(pattern: &str) -> Result<Parts<'_>, PatternRefused> {
    let (mut name, mut colour, mut linetype) = (pattern, None, None);
    while let Some((rest, asked)) = name.rsplit_once('@')
        && let Some((what, value)) = asked.split_once('=')
    {
        match folded(what.trim()).as_str() {
            "COLOUR" | "COLOR" => {
                let index = value.trim().parse().ok().filter(|index| *index > 0);
                colour = Some(index.ok_or_else(|| PatternRefused::Colour(value.to_owned()))?);
            }
            "LINETYPE" => linetype = Some(value.trim()),
            _ => return Err(PatternRefused::Asks(what.to_owned())),
        }
        name = rest;
    }
    Ok((name, colour, linetype))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_fit_in_any_letter_case_and_behind_the_prefix_of_a_reference() {
        let names = Names::new(["Tendon-*", "КОЛОННА?", "PT"]).expect("patterns");
        for name in [
            "TENDON-BANDED",
            "tendon-mark",
            "колонна1",
            "LEVEL 2$0$TENDON-END",
            "level2|tendon-height",
            "A$0$B$12$PT",
            "A|B|PT",
            "US$D$0$PT",
        ] {
            assert!(names.has(name), "{name}");
        }
        for name in [
            "SLAB", "X-TENDON", "REF$0$", "REF$$PT", "PT$0$X", "REF$A$PT",
        ] {
            assert!(!names.has(name), "{name}");
        }
        assert!(!Names::default().has("PT"));
    }

    #[test]
    fn prefixes_without_end_cost_no_more_than_a_few() {
        let names = Names::new(["PT"]).expect("a pattern");
        let begun = std::time::Instant::now();
        for prefix in ["A|", "A$0$", "$1", "A$1"] {
            assert!(!names.has(&prefix.repeat(100_000)));
        }
        assert!(begun.elapsed().as_secs() < 10, "{:?}", begun.elapsed());
        assert!(names.has(&("A|".repeat(MOST_PREFIXES) + "PT")));
    }

    #[test]
    fn a_layer_may_be_picked_by_what_is_seen() {
        let picked =
            Selectors::new(["PT@colour=1", "0@linetype=dash*@Color=3", "S@TOP"]).expect("patterns");
        assert!(picked.picks("pt", Some(1), "CONTINUOUS"));
        assert!(picked.picks("REF$0$PT", Some(1), "DOT"));
        assert!(!picked.picks("PT", Some(2), "CONTINUOUS"));
        assert!(!picked.picks("PT", None, "CONTINUOUS"));
        assert!(picked.picks("0", Some(3), "REF$0$DASHED2"));
        assert!(!picked.picks("0", Some(3), "CONTINUOUS") && !picked.picks("0", Some(1), "DASHED"));
        assert!(picked.picks("s@top", None, ""));
        assert!(picked.may_pick("PT") && picked.asks_more("PT") && !picked.asks_more("S@TOP"));
        assert!(!picked.may_pick("SLAB"));
    }

    #[test]
    fn a_pattern_that_cannot_be_understood_is_refused_in_words() {
        let refused = |pattern: &str| {
            let refused = Selectors::new([pattern]).map(|_| ());
            refused.expect_err(pattern).to_string()
        };
        assert!(refused("PT@colour=0").contains("@colour=0"));
        assert!(refused("PT@colour=red").contains("from 1 to 255"));
        assert!(refused("PT@weight=30").contains("`@weight=`"));
        assert!(refused("PT@linetype=[").contains("not closed"));
        assert!(refused("a{b").contains("not closed"));
    }
}
