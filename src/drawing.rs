//! DXF in: shapes and texts in metres, each with handle and layer. DXF out: lossless insertion of a [`Sheet`].
//! Knows nothing of tendons; the only stage that says `dxf::`.

mod answers;
mod caps;
mod clean;
mod code_page;
mod convert;
mod counts;
mod curves;
mod explode;
mod found;
mod handles;
mod insert;
mod leaders;
mod lettering;
mod looks;
mod names;
mod placing;
mod read;
mod refusal;
mod release;
mod resume;
mod rules;
mod scan;
mod sheet;
mod source;
mod spline;
mod tags;
mod text_decode;
mod types;
mod wanted;
mod windows;

pub use caps::{Caps, Purpose};
pub use insert::{insert, insertion};
pub use read::{read, read_within};
pub use refusal::Refusal;
pub use rules::READING_RULES;
pub use sheet::{Align, Drawn, Ink, Mark, OWN_LAYERS, Sheet, SheetLayer};
pub use source::{Source, open, open_within};
pub use types::{
    Dot, Drawing, Insert, Layer, Leader, Look, Shape, ShapeKind, Text, UnitFrom, Unsaid,
};
pub use wanted::Wanted;
