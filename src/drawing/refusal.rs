//! Why a file cannot be read as a drawing.

/// A file that cannot be read as a drawing, or not without risk of losing a part of it.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum Refusal {
    /// Nothing in it.
    #[error("the file is empty, and a DXF drawing was expected; export the drawing again")]
    Empty,
    /// A DWG under another name.
    #[error(
        "the file is a DWG ({version}), and DXF was expected; open it in the drafting program and save it as DXF"
    )]
    Dwg {
        /// The version that the file begins with.
        version: String,
    },
    /// Something else altogether.
    #[error(
        "the file is no DXF: it begins with {found}, and a group code 0 with SECTION was expected; save the drawing as DXF"
    )]
    NotDxf {
        /// What the file begins with.
        found: String,
    },
    /// A line that is no group code, or a binary tag that makes no sense.
    #[error("{place}: {what}; the file is damaged there: save the drawing again as DXF")]
    Garbled {
        /// Line number, or byte offset in a binary file.
        place: String,
        /// What stands there and what was expected.
        what: String,
    },
    /// The file stops early.
    #[error(
        "{place}: the file ends inside {inside}, and ENDSEC and EOF were expected; it was cut short: export or copy the drawing again"
    )]
    Cut {
        /// Line number, or byte offset in a binary file.
        place: String,
        /// What was still open.
        inside: String,
    },
    /// A section starts inside another.
    #[error(
        "{place}: a new section starts although ENTITIES is not closed by ENDSEC; the file is damaged: save the drawing again as DXF"
    )]
    Unclosed {
        /// Line number, or byte offset in a binary file.
        place: String,
    },
    /// More than the job allows.
    #[error(
        "{what}; working with that takes some {needed_mb} MB of memory, and limits.memory_mb allows {allowed_mb}: set limits.memory_mb to {needed_mb} or more in the job file, or purge the drawing"
    )]
    TooLarge {
        /// What was met.
        what: String,
        /// Estimated memory, megabytes.
        needed_mb: u64,
        /// What the job allows, megabytes.
        allowed_mb: u64,
    },
    /// Something to draw lies nowhere.
    #[error(
        "{what}, and finite numbers were expected; nothing was drawn: check the drawing's unit and coordinates"
    )]
    NoNumber {
        /// What was found.
        what: String,
    },
}
