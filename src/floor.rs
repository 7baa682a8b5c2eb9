//! What the shapes mean: tendons joined from pieces, labels settled, slab zones, ends, marks.

mod types;

pub use types::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon, Zone};
