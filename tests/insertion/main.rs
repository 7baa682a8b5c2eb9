//! Insertion into drawings of every version and form, whole and with pieces missing.

mod awkward;
mod dxf_text;
mod folder;
mod kept;
mod read_back;
mod sample;
mod shapes;
mod sheets;
