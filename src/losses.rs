//! Forces along a tendon in four stages: jacking, lock-off, transfer, service. One loss per file, pure functions with
//! their source.
//!
//! [`Stressed`] is a tendon jacked and locked off; with the mean concrete stress it becomes [`Effective`], which knows all
//! four stages at any station. The concrete stress is the job's, or [`precompression`] finds it from all tendons of a floor.

mod draw_in;
mod effective;
mod exponent;
mod extension;
mod friction;
mod long_term;
pub mod precompression;
mod shortening;
mod steel;
mod stressed;
mod types;

pub use effective::Effective;
pub use extension::extension_mm;
pub use friction::{Friction, force_kn, loss_kn};
pub use long_term::{LongTermLoss, long_term_loss};
pub use shortening::shortening_mpa;
pub use steel::steel;
pub use stressed::Stressed;
pub use types::{CannotStress, EndForces, Forces, LaterLosses, LossTotals, Steel};
