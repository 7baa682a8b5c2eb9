//! BS 8110-1:1997 4.8, one pure function a clause.

pub mod concrete;
pub mod relaxation;

mod method;
mod working;

pub use method::Bs8110;
