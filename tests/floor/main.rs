//! The floor stage on drawings made in code, with the truth beside them.

#![expect(
    clippy::print_stderr,
    reason = "a failing survey of styles is read line by line"
)]

mod heights;
mod kit;
mod lettering;
mod laws;
mod settling;
