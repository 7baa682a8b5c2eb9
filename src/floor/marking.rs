//! Mark, strands and required force, as the lines of a label or the labels of a tendon say them together.

use super::heard::Heard;
use super::readings::MarkText;

/// What is said of one tendon; see [`MarkText`] for the parts.
#[derive(Debug, Clone, Default, PartialEq)]
pub(super) struct Marking {
    pub(super) mark: Heard<String>,
    pub(super) tendons: Heard<u32>,
    pub(super) strands: Heard<u32>,
    pub(super) strand: Heard<String>,
    pub(super) required_kn: Heard<f64>,
    pub(super) required_kn_per_m: Heard<f64>,
}

impl From<MarkText> for Marking {
    fn from(said: MarkText) -> Self {
        Self {
            mark: said.mark.into(),
            tendons: said.tendons.into(),
            strands: said.strands.into(),
            strand: said.strand.into(),
            required_kn: said.required_kn.into(),
            required_kn_per_m: said.required_kn_per_m.into(),
        }
    }
}

impl Marking {
    /// Hears what another text says too.
    pub(super) fn join(&mut self, other: Self) {
        self.mark.join(other.mark);
        self.tendons.join(other.tendons);
        self.strands.join(other.strands);
        self.strand.join(other.strand);
        self.required_kn.join(other.required_kn);
        self.required_kn_per_m.join(other.required_kn_per_m);
    }

    /// Hears only what another text says otherwise.
    pub(super) fn tear(&mut self, other: &Self) {
        self.mark.tear(&other.mark);
        self.tendons.tear(&other.tendons);
        self.strands.tear(&other.strands);
        self.strand.tear(&other.strand);
        self.required_kn.tear(&other.required_kn);
        self.required_kn_per_m.tear(&other.required_kn_per_m);
    }

    /// Whether the two contradict one another.
    pub(super) fn differs(&self, other: &Self) -> bool {
        self.mark.differs(&other.mark)
            || self.counts_otherwise(other)
            || self.required_kn.differs(&other.required_kn)
            || self.required_kn_per_m.differs(&other.required_kn_per_m)
    }

    /// Whether they contradict one another in what they count.
    pub(super) fn counts_otherwise(&self, other: &Self) -> bool {
        self.tendons.differs(&other.tendons)
            || self.strands.differs(&other.strands)
            || self.strand.differs(&other.strand)
    }

    /// Whether strands or tendons are in it, or a force.
    pub(super) fn counts(&self) -> bool {
        self.strands.is_said() || self.tendons.is_said() || self.requires()
    }

    /// Whether a force is in it.
    pub(super) fn requires(&self) -> bool {
        self.required_kn.is_said() || self.required_kn_per_m.is_said()
    }

    /// Whether what it counts is contradicted, so that nobody knows what steel there is.
    pub(super) fn uncounted(&self) -> bool {
        self.strands.is_torn() || self.tendons.is_torn() || self.strand.is_torn()
    }

    /// What is contradicted in it, in words.
    pub(super) fn torn(&self) -> Vec<&'static str> {
        [
            (self.mark.is_torn(), "marks"),
            (self.tendons.is_torn(), "numbers of tendons"),
            (self.strands.is_torn(), "numbers of strands"),
            (self.strand.is_torn(), "sizes of strand"),
            (
                self.required_kn.is_torn() || self.required_kn_per_m.is_torn(),
                "required forces",
            ),
        ]
        .into_iter()
        .filter_map(|(torn, what)| torn.then_some(what))
        .collect()
    }
}
