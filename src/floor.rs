//! What the shapes mean: tendons joined from pieces, labels settled, slab zones, ends, marks.

mod areas;
mod assemble;
mod bridges;
mod candidates;
mod copies;
mod ends;
mod habits;
mod heights;
mod index;
mod labels;
mod layers;
mod lengths;
mod levels;
mod lines;
mod marks;
mod measured;
mod missing;
mod nearer_face;
mod order;
mod outlines;
mod pieces;
mod points;
mod readings;
mod rules;
mod settle;
mod slab;
mod symbols;
mod types;
mod zone_texts;
mod zones;

pub use assemble::read;
pub use readings::{HeightText, MarkText, Word, height_of_line, mark_of_line};
pub use rules::RULES;
pub use symbols::{EndWords, Figure, figures};
pub use types::{End, EndKind, Faces, Floor, Point, PointKind, Run, Slab, Tendon, Zone};
pub use zone_texts::{ZoneText, thickness_of_line, zone_text_of_line};
