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
mod types;

pub use assemble::read;
pub use points::drawn_height_m;
pub use rules::RULES;
pub use types::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon, Zone};
