//! Why a tendon has no forces, and the finding that says so where no earlier stage has said it.

use super::by_method::{METHOD_WITHOUT_LOSS, REMEDY};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::Tendon;
use crate::job::LongTermMethod;
use crate::losses::long_term::NoLoss;
use crate::losses::{CannotStress, Unstressed};
use crate::profile::Unknown;
use crate::units::LONG;

/// See its meaning.
static CURVE_UNKNOWN: Rule = Rule {
    name: "curve-unknown",
    meaning: "The points that bend a tendon run from its one end to its other, each at a station of its own.",
};

/// See its meaning.
static STRAND_SIZE_UNKNOWN: Rule = Rule {
    name: "strand-size-unknown",
    meaning: "A tendon's strands are of a size that the job knows (tendon.strand), or of its default size.",
};

/// See its meaning.
static NO_FORCE_LEFT: Rule = Rule {
    name: "no-force-left",
    meaning: "Friction, draw-in and the later losses leave a force at every point of a tendon.",
};

/// See its meaning.
static CONCRETE_STRESS_UNKNOWN: Rule = Rule {
    name: "concrete-stress-unknown",
    meaning: "The mean concrete stress, on which shortening and creep depend, is in the job or comes from the slab outline, its \
              thickness and the tendons that cross it.",
};

/// Rules of this stage, by name.
pub fn rules() -> &'static [&'static Rule] {
    static RULES: [&Rule; 5] = [
        &CONCRETE_STRESS_UNKNOWN,
        &CURVE_UNKNOWN,
        &METHOD_WITHOUT_LOSS,
        &NO_FORCE_LEFT,
        &STRAND_SIZE_UNKNOWN,
    ];
    &RULES
}

/// Why a tendon has no forces.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum Refusal {
    /// It has no curve.
    #[error(transparent)]
    Curve(#[from] Unknown),
    /// Strand count or size is not known.
    #[error("the number or the size of its strands is not known")]
    SteelUnknown,
    /// It is not known whether an end is live or dead.
    #[error("it is not known whether an end is live or dead")]
    EndUnknown,
    /// It cannot be stressed.
    #[error(transparent)]
    Stress(CannotStress),
    /// One of its segments, in order along it, from 0, cannot be stressed.
    #[error("segment {number}: {1}", number = .0 + 1)]
    Segment(usize, CannotStress),
    /// The mean concrete stress is not known.
    #[error("the mean concrete stress is not known")]
    ConcreteStressUnknown,
    /// The method of long-term loss gives none.
    #[error("{word}: {1}", word = .0.word())]
    Method(LongTermMethod, NoLoss),
}

impl From<CannotStress> for Refusal {
    fn from(reason: CannotStress) -> Self {
        Self::Stress(reason)
    }
}

impl From<Unstressed> for Refusal {
    fn from(unstressed: Unstressed) -> Self {
        let Unstressed { segment, reason } = unstressed;
        match segment {
            Some(segment) => Self::Segment(segment, reason),
            None => Self::Stress(reason),
        }
    }
}

impl Refusal {
    /// The finding; `None` where reading the drawing or a rule has said it: heights, strand counts and ends that are missing.
    pub(super) fn finding(&self, tendon: &Tendon) -> Option<Finding> {
        match self {
            Self::Curve(Unknown::Levels(_))
            | Self::EndUnknown
            | Self::Stress(CannotStress::NoLiveEnd) => None,
            Self::Curve(Unknown::NoLine) => Some(at(
                tendon,
                &CURVE_UNKNOWN,
                0.0,
                "the points do not run from one end of the line to the other, so no curve and no forces were worked out; an \
                 anchor at each end was expected"
                    .to_owned(),
                "draw the tendon as one line with some length between its two anchors",
            )),
            Self::Curve(Unknown::Coincident(points)) => {
                let station_m = points
                    .first()
                    .and_then(|&index| tendon.points.get(index))
                    .map_or(0.0, |point| point.station_m);
                Some(at(
                    tendon,
                    &CURVE_UNKNOWN,
                    station_m,
                    Wording::of(|units| {
                        format!(
                            "two heights stand at one station, {}, so no curve and no forces were worked out; one height at \
                             a station was expected",
                            units.of(LONG).said(station_m, 2)
                        )
                    }),
                    "remove one of the heights, or move it to where it belongs",
                ))
            }
            Self::SteelUnknown => {
                tendon.strands.filter(|&count| count > 0)?;
                let named = tendon.strand.as_ref().map_or_else(
                    || "no strand size is given".to_owned(),
                    |name| format!("strand size {name} is not among the job's"),
                );
                Some(at(
                    tendon,
                    &STRAND_SIZE_UNKNOWN,
                    0.0,
                    format!(
                        "{named}, so no forces were worked out; a size of a [[tendon.strand]] table, or \
                         tendon.default_strand, was expected"
                    ),
                    "write the size in the tendon's mark; or set default_strand below [tendon]; or add the size to the job \
                     file as a table [[tendon.strand]] with name, area_mm2 and strength_mpa",
                ))
            }
            Self::Stress(reason) => Some(at(
                tendon,
                &NO_FORCE_LEFT,
                0.0,
                format!(
                    "{reason}, so {} are given; a force at every point was expected",
                    if *reason == CannotStress::LossesTakeAll {
                        "only jacking and lock-off forces"
                    } else {
                        "no forces"
                    }
                ),
                "look at draw-in, friction and wobble (whether per metre or in radians per metre), heights and long-term \
                 coefficients; stress a tendon this short or this winding in another way",
            )),
            Self::Segment(segment, reason) => Some(in_segment(tendon, *segment, *reason)),
            Self::Method(..) => Some(at(
                tendon,
                &METHOD_WITHOUT_LOSS,
                0.0,
                format!("{self}; only jacking and lock-off forces are given"),
                REMEDY,
            )),
            Self::ConcreteStressUnknown => Some(at(
                tendon,
                &CONCRETE_STRESS_UNKNOWN,
                0.0,
                "the mean concrete stress is not known, so only jacking and lock-off forces are given; a slab outline around the tendon with its \
                 thickness, or the stress in the job, was expected"
                    .to_owned(),
                "draw the slab edge as a closed line on its layer and give the slab's thickness, or set \
                 long_term.concrete_stress_mpa in the job file",
            )),
        }
    }
}

fn in_segment(tendon: &Tendon, segment: usize, reason: CannotStress) -> Finding {
    let [from_m, to_m] = tendon.segment_m(segment);
    at(
        tendon,
        &NO_FORCE_LEFT,
        from_m,
        Wording::of(|units| {
            let [from, to] = [from_m, to_m].map(|station_m| units.of(LONG).said(station_m, 2));
            format!(
                "{reason} in the segment from station {from} to {to}, which is stressed by itself, so no forces are given to \
                 the tendon; a force at every point was expected"
            )
        }),
        "look at where the intermediate anchors stand, then at draw-in, friction and wobble; stress a segment this short or \
         this winding in another way",
    )
}

fn at(
    tendon: &Tendon,
    rule: &'static Rule,
    station_m: f64,
    text: impl Into<Wording>,
    remedy: &'static str,
) -> Finding {
    Finding::new(rule, Level::Error, text, remedy)
        .on_tendon(&tendon.mark)
        .at_station(station_m)
        .at_place(tendon.path.place_at(station_m))
}
