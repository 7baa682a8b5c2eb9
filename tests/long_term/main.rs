//! Long-term loss: laws of the formulas and of the methods made of them, and several methods in one run.

mod formulas;
mod in_slab;
mod kit;
mod methods;
mod refused;
mod shown;
mod side_by_side;
mod sweep;
