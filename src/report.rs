//! Results as text, one format per file; takes values, gives strings, opens no file.

mod calculation;
mod csv;
mod json;
mod record;
mod summary;
mod table;

pub use calculation::calculation;
pub use csv::{extensions_csv, findings_csv, methods_csv, points_csv, tendons_csv};
pub use json::json;
pub use summary::summary;
pub use table::{Align, plain, table};

/// What a report says of the drawing itself.
#[derive(Debug, Clone, PartialEq)]
pub struct DrawingFacts {
    /// File name, without its folder: a result does not depend on where the drawing lies.
    pub file: String,
    /// `$ACADVER`, such as `AC1027`.
    pub version: String,
    /// Metres in one drawing unit.
    pub unit_m: f64,
}
