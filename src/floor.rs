//! What the shapes mean: tendons joined from pieces, labels settled, slab zones, ends, marks.

mod aims;
mod areas;
mod arrows;
mod assemble;
mod bridges;
mod candidates;
mod columns;
mod copies;
mod ends;
mod groups;
mod habits;
mod heights;
mod index;
mod joints;
mod labels;
mod lacks;
mod layers;
mod lengths;
mod levels;
mod lines;
mod made;
mod marks;
mod measured;
mod missing;
mod near;
mod nearer_face;
mod order;
mod outlines;
mod pieces;
mod points;
mod readings;
mod rules;
mod settle;
mod slab;
mod slots;
mod strokes;
mod symbols;
mod ticks;
mod types;
mod zone_texts;
mod zones;

pub use assemble::read;
pub use readings::{HeightText, MarkText, Word, height_of_line, mark_of_line};
pub use rules::RULES;
pub use symbols::{EndWords, Figure, Said, figures};
pub use types::{
    End, EndKind, Faces, Floor, Point, PointKind, PourJoint, Run, Slab, Tendon, Zone,
};
pub use zone_texts::{ZoneText, thickness_of_line, zone_text_of_line};
