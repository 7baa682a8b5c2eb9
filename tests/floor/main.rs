//! The floor stage on drawings made in code, with the truth beside them.

mod kit;
mod settling;
