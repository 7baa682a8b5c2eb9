//! AS 3600:2018, one pure function an equation, named by the standard's symbols. Stresses in MPa.

pub mod concrete;
pub mod creep;
pub mod relaxation;
pub mod shrinkage;

mod method;
mod working;

pub use method::As3600;
