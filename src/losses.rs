//! Forces along a tendon in four stages: jacking, lock-off, transfer, service. One loss per file, pure functions with
//! their source.

mod types;

pub use types::{CannotStress, EndForces, Forces, LossTotals, Stage, Steel};
