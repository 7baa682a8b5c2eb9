//! What can be found while a floor is read, each under its name.

use crate::finding::Rule;

/// Every rule of this stage, by name.
pub const RULES: &[&Rule] = &[
    &ANCHOR_HEIGHT_INSIDE,
    &DUPLICATE_LINE,
    &END_CONTRADICTED,
    &END_UNCLAIMED,
    &END_UNKNOWN,
    &FACE_BY_NEIGHBOURS,
    &FACE_UNKNOWN,
    &GROUP_MISFIT,
    &HATCH_UNREAD,
    &HEIGHT_MISSING,
    &JOINT_UNCLAIMED,
    &LABEL_AMBIGUOUS,
    &LABEL_CONTRADICTED,
    &LABEL_SHARED,
    &LABEL_UNCLAIMED,
    &LABEL_UNREAD,
    &LAYER_HIDDEN,
    &LEADER_ASTRAY,
    &LEVEL_LINE_DIFFERS,
    &LEVEL_LINE_UNREAD,
    &LEVEL_OUTSIDE_ZONES,
    &MARK_TWICE,
    &OUTLINE_OPEN,
    &PATTERNS_AT_ODDS,
    &PIECES_BRIDGED,
    &PIECES_MEET,
    &PIECES_OVERLAP,
    &RUN_ASSUMED,
    &STEP_ASSUMED,
    &STRAND_COUNT_MISSING,
    &TENDON_CLOSED,
    &TENDON_MADE,
    &TENDON_STUB,
    &TENDONS_MISSING,
    &THICKNESS_DIFFERS,
    &THICKNESS_UNKNOWN,
    &ZONE_UNREAD,
];

/// A name that two lists of the job file claim.
pub(super) const PATTERNS_AT_ODDS: Rule = Rule {
    name: "patterns-at-odds",
    meaning: "A layer or block of the drawing fits patterns of two lists of the job file that exclude one another, such as live and dead ends.",
};

/// A height near to an end and not at it.
pub(super) const ANCHOR_HEIGHT_INSIDE: Rule = Rule {
    name: "anchor-height-inside",
    meaning: "A bare height that stands alone within 0.6 m of an end, and not at it, is the anchor's or has a word for high or low.",
};

/// The same line drawn twice.
pub(super) const DUPLICATE_LINE: Rule = Rule {
    name: "duplicate-line",
    meaning: "Two tendon lines lie on one another, wholly or in part: the tendon would be counted twice.",
};

/// An end said to be both.
pub(super) const END_CONTRADICTED: Rule = Rule {
    name: "end-contradicted",
    meaning: "A block, shape or word says that an end is live, another at the same end that it is dead.",
};

/// A live or dead end symbol without an end.
pub(super) const END_UNCLAIMED: Rule = Rule {
    name: "end-unclaimed",
    meaning: "An end symbol stands at no tendon's end.",
};

/// An end without a symbol.
pub(super) const END_UNKNOWN: Rule = Rule {
    name: "end-unknown",
    meaning: "An end has neither a live nor a dead end symbol within reach, so nobody can say where the jack stands.",
};

/// A distance to the nearer face, read by its neighbours.
pub(super) const FACE_BY_NEIGHBOURS: Rule = Rule {
    name: "face-by-neighbours",
    meaning: "A distance to the nearer face has no word: it was taken for the high or the low point that its neighbours leave.",
};

/// A distance to the nearer face that may be either.
pub(super) const FACE_UNKNOWN: Rule = Rule {
    name: "face-unknown",
    meaning: "A distance to the nearer face has no word, and its neighbours do not tell which face is meant.",
};

/// A group of tendons that its extent line contradicts.
pub(super) const GROUP_MISFIT: Rule = Rule {
    name: "group-misfit",
    meaning: "A group's extent line does not fit the number and spacing that its text gives, or lacks one of them: its undrawn tendons are not made.",
};

/// A height that the drawing ought to give and does not.
pub(super) const HEIGHT_MISSING: Rule = Rule {
    name: "height-missing",
    meaning: "A tendon has no height where its neighbours, a column or an unclaimed label say that one belongs.",
};

/// An intermediate anchor that divides no tendon.
pub(super) const JOINT_UNCLAIMED: Rule = Rule {
    name: "joint-unclaimed",
    meaning: "An intermediate anchor's symbol stands on no tendon, on several equally well, or at an end that has its own symbol: it divides none.",
};

/// A label that might as well belong elsewhere.
pub(super) const LABEL_AMBIGUOUS: Rule = Rule {
    name: "label-ambiguous",
    meaning: "A label fits two tendons about equally well, and the choice changes a height.",
};

/// Labels that speak against one another.
pub(super) const LABEL_CONTRADICTED: Rule = Rule {
    name: "label-contradicted",
    meaning: "Two lines of a label, or two labels of one tendon, say different things of one thing or at one place: neither was used.",
};

/// A label without a tendon.
pub(super) const LABEL_UNCLAIMED: Rule = Rule {
    name: "label-unclaimed",
    meaning: "A label belongs to no tendon: none is within reach, or each that is has its own.",
};

/// A text that is not what its layer holds.
pub(super) const LABEL_UNREAD: Rule = Rule {
    name: "label-unread",
    meaning: "A text on a label layer, a line of one, or a text on a slab layer that speaks of a level matches none of the job's patterns.",
};

/// Tendons or labels on a layer that nobody sees.
pub(super) const LAYER_HIDDEN: Rule = Rule {
    name: "layer-hidden",
    meaning: "A layer that is off or frozen holds tendons or labels; they were read all the same, but for labels beside visible ones of their kind.",
};

/// Areas that are hatched and have no outline.
pub(super) const HATCH_UNREAD: Rule = Rule {
    name: "hatch-unread",
    meaning: "A layer of slab edges, openings, zones or columns holds hatches and no closed line: hatches are not read, \
              their outlines are.",
};

/// A level that belongs to no zone.
pub(super) const LEVEL_OUTSIDE_ZONES: Rule = Rule {
    name: "level-outside-zones",
    meaning: "A text outside every zone gives a level that is not the general slab's.",
};

/// A level line and a label that disagree.
pub(super) const LEVEL_LINE_DIFFERS: Rule = Rule {
    name: "level-line-differs",
    meaning: "A level line and a label give one tendon two heights at one place.",
};

/// A level line without a height.
pub(super) const LEVEL_LINE_UNREAD: Rule = Rule {
    name: "level-line-unread",
    meaning: "A level line has no readable height within reach.",
};

/// One mark on two tendons.
pub(super) const MARK_TWICE: Rule = Rule {
    name: "mark-twice",
    meaning: "Two tendons carry the same mark.",
};

/// A slab edge, zone or opening that does not close.
pub(super) const OUTLINE_OPEN: Rule = Rule {
    name: "outline-open",
    meaning: "Lines on a slab layer do not close to an outline.",
};

/// More than two ends at one point.
pub(super) const PIECES_MEET: Rule = Rule {
    name: "pieces-meet",
    meaning: "Ends of tendon lines meet in a way that does not tell which of them go on into one another.",
};

/// A gap in a tendon.
pub(super) const PIECES_BRIDGED: Rule = Rule {
    name: "pieces-bridged",
    meaning: "A gap in a tendon line was bridged, since the job allows gaps of that length or an intermediate anchor stands in it.",
};

/// Two pieces of a tendon that overlap.
pub(super) const PIECES_OVERLAP: Rule = Rule {
    name: "pieces-overlap",
    meaning: "Two pieces in line with one another overlap: they were taken for one tendon.",
};

/// Banded or distributed is not told.
pub(super) const RUN_ASSUMED: Rule = Rule {
    name: "run-assumed",
    meaning: "Runs are told apart by direction, and the job does not say which way banded tendons go.",
};

/// Strands unknown.
pub(super) const STRAND_COUNT_MISSING: Rule = Rule {
    name: "strand-count-missing",
    meaning: "No label gives the number of strands in a tendon.",
};

/// A tendon line that closes on itself.
pub(super) const TENDON_CLOSED: Rule = Rule {
    name: "tendon-closed",
    meaning: "A closed shape lies on a tendon layer: it has no ends, so it is no tendon.",
};

/// A line too short to be a tendon.
pub(super) const TENDON_STUB: Rule = Rule {
    name: "tendon-stub",
    meaning: "A line on a tendon layer is no longer than the gap that is bridged between pieces: it was left out.",
};

/// A drawing without tendons.
pub(super) const TENDONS_MISSING: Rule = Rule {
    name: "tendons-missing",
    meaning: "No line lies on the layers that the job names for tendons.",
};

/// A step whose text gives only a top.
pub(super) const STEP_ASSUMED: Rule = Rule {
    name: "step-assumed",
    meaning: "A zone's text gives its top and neither thickness nor soffit: what runs through the step is the job's slab.step_keeps.",
};

/// Two thicknesses for one piece of slab.
pub(super) const THICKNESS_DIFFERS: Rule = Rule {
    name: "thickness-differs",
    meaning: "The drawing and the job, or two texts, give one part of the slab two thicknesses or two levels.",
};

/// Slab thickness unknown.
pub(super) const THICKNESS_UNKNOWN: Rule = Rule {
    name: "thickness-unknown",
    meaning: "Neither the job nor the drawing gives the general thickness of the slab.",
};

/// A zone without a thickness.
pub(super) const ZONE_UNREAD: Rule = Rule {
    name: "zone-unread",
    meaning: "A zone has no thickness and no level inside, or none that can be, so the slab's thickness there is unknown.",
};

/// A label for several lines.
pub(super) const LABEL_SHARED: Rule = Rule {
    name: "label-shared",
    meaning: "One mark points at several lines, which are numbered after it.",
};

/// A leader that points at nothing.
pub(super) const LEADER_ASTRAY: Rule = Rule {
    name: "leader-astray",
    meaning: "A label's leader points at no tendon, or nobody can say at which: the label is given to none.",
};

/// Tendons that the drawing does not show.
pub(super) const TENDON_MADE: Rule = Rule {
    name: "tendon-made",
    meaning: "Tendons of a group that the drawing shows by a typical one and an extent line were made as copies of that one.",
};
