//! Forces along a tendon in four stages: jacking, lock-off, transfer, service. One loss per file, pure functions with
//! their source.
//!
//! [`Stressed`] is a tendon, or a segment of one, jacked and locked off in one pull; [`Pulls`] are all of a tendon's, and decide
//! which of them a station lies in; [`Along`] is that tendon in its slab; by a method of [`long_term`] loss it
//! becomes [`Effective`], which knows all four stages at any station. The concrete stress is the job's, or [`precompression`]
//! finds it from all tendons of a floor.

mod along;
mod draw_in;
mod effective;
mod exponent;
mod extension;
mod friction;
pub mod long_term;
pub mod precompression;
mod pulls;
mod sequence;
mod shortening;
mod steel;
mod stressed;
mod turns;
mod types;

pub use along::{Along, faces_by_points};
pub use effective::{Effective, NoForce};
pub use extension::extension_mm;
pub use friction::{Friction, force_kn, loss_kn};
pub use pulls::Pulls;
pub use sequence::first_end;
pub use shortening::shortening_mpa;
pub use steel::{steel, strand_size};
pub use stressed::Stressed;
pub use turns::turns;
pub use types::{
    CannotStress, EndForces, Forces, LaterLosses, LossTotals, Pull, Steel, Unstressed,
};
