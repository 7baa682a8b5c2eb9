//! DXF in: shapes and texts in metres, each with handle and layer. DXF out: lossless insertion of a [`Sheet`].
//! Knows nothing of tendons; the only stage that says `dxf::`.

mod sheet;
mod tags;
mod types;

pub use sheet::{Align, Drawn, Ink, Mark, Sheet, SheetLayer};
pub use types::{Drawing, Insert, Layer, Shape, ShapeKind, Text, UnitFrom};
