//! DXF in: shapes and texts in metres, each with handle and layer. DXF out: lossless insertion of a [`Sheet`].
//! Knows nothing of tendons; the only stage that says `dxf::`.

mod code_page;
mod handles;
mod insert;
mod names;
mod refusal;
mod scan;
mod sheet;
mod source;
mod tags;
mod text_decode;
mod types;

pub use insert::insert;
pub use refusal::Refusal;
pub use sheet::{Align, Drawn, Ink, Mark, Sheet, SheetLayer};
pub use source::{Source, open};
pub use types::{Drawing, Insert, Layer, Shape, ShapeKind, Text, UnitFrom};
