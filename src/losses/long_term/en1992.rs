//! EN 1992-1-1:2004, one pure function an equation, named by the standard's symbols. Stresses in MPa.

pub mod combined;
pub mod concrete;
pub mod creep;
pub mod relaxation;
pub mod shrinkage;

mod method;
mod working;

pub use method::En1992;
