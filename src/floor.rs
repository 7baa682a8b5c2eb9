//! What the shapes mean: tendons joined from pieces, labels settled, slab zones, ends, marks.

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
mod missing;
mod order;
mod pieces;
mod points;
mod readings;
mod rules;
mod settle;
mod slab;
mod symbols;
mod types;

pub use assemble::read;
pub use readings::{HeightText, MarkText, Word, height_of_line, mark_of_line, thickness_of_line};
pub use rules::RULES;
pub use symbols::{EndWords, Figure, figures};
pub use types::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon, Zone};
