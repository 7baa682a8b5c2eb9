//! What the reading of a drawing looks for, under the names that every output uses.

use crate::finding::Rule;

/// A drawing of which a part could not be read.
pub(super) static DRAWING_DAMAGED: Rule = Rule {
    name: "drawing-damaged",
    meaning: "The drawing is cut short or holds lines that make no sense; what is sound is read, the entities concerned are left out.",
};

/// An entity that could not be read.
pub(super) static ENTITY_DAMAGED: Rule = Rule {
    name: "entity-damaged",
    meaning: "An entity on a layer that is read holds a value that is no finite number, lacks a coordinate, or lies beyond a million kilometres, and is left out; or it has fewer vertices than it announces, and is read as it stands.",
};

/// Entities that are not shown.
pub(super) static ENTITY_INVISIBLE: Rule = Rule {
    name: "entity-invisible",
    meaning: "Entities on layers that are read are hidden one by one (group 60), whatever their layer: nobody sees them, and they are left out.",
};

/// The drawing does not say its unit.
pub(super) static UNIT_ASSUMED: Rule = Rule {
    name: "unit-assumed",
    meaning: "Neither the job nor $INSUNITS of the drawing says the unit of length; millimetres are assumed.",
};

/// Blocks nested beyond reason.
pub(super) static BLOCK_TOO_DEEP: Rule = Rule {
    name: "block-too-deep",
    meaning: "Blocks are inserted in blocks more than 32 deep; what lies deeper is left out.",
};

/// A block inserted in itself.
pub(super) static BLOCK_IN_ITSELF: Rule = Rule {
    name: "block-in-itself",
    meaning: "A block inserts itself, directly or through others; the inner insert is left out.",
};

/// More than can be expanded.
pub(super) static BLOCK_TOO_MANY: Rule = Rule {
    name: "block-too-many",
    meaning: "Block inserts expand to more entities than limits.expanded_entities or limits.memory_mb allows; the rest is left out.",
};

/// An insert of a block that the drawing does not hold.
pub(super) static BLOCK_MISSING: Rule = Rule {
    name: "block-missing",
    meaning: "An insert names a block that the drawing does not define; only its place and attributes are read.",
};

/// Characters that had to be guessed.
pub(super) static TEXT_CODE_PAGE: Rule = Rule {
    name: "text-code-page",
    meaning: "Texts hold characters beyond ASCII that the drawing's code page does not settle; they were read as Windows-1252.",
};

/// Entities of types that are not read.
pub(super) static ENTITY_UNREAD: Rule = Rule {
    name: "entity-unread",
    meaning: "Entities on a layer that the job names are of a type that is not read, such as HATCH or MLINE.",
};

/// References that are not there.
pub(super) static REFERENCE_EMPTY: Rule = Rule {
    name: "reference-empty",
    meaning: "The drawing inserts an external reference and does not hold its contents; nothing of it is read.",
};

/// Every rule of reading.
pub static READING_RULES: [&Rule; 11] = [
    &DRAWING_DAMAGED,
    &ENTITY_DAMAGED,
    &ENTITY_INVISIBLE,
    &UNIT_ASSUMED,
    &BLOCK_TOO_DEEP,
    &BLOCK_IN_ITSELF,
    &BLOCK_TOO_MANY,
    &BLOCK_MISSING,
    &TEXT_CODE_PAGE,
    &ENTITY_UNREAD,
    &REFERENCE_EMPTY,
];
