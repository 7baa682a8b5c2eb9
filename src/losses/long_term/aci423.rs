//! The ACI-ASCE 423 method (P. Zia, H. K. Preston, N. L. Scott and E. B. Workman, Concrete International, June 1979; ACI 423.10R).

pub mod elastic;
pub mod relaxation;
pub mod shrinkage;
pub mod units;

mod method;
mod working;

pub use method::Aci423;
