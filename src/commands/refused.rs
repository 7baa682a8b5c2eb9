//! Why a command does not do what it was asked: what was found, what was expected, what to do.

use std::io;
use std::path::PathBuf;

use crate::drawing::Refusal;
use crate::job::Problems;

/// A reason not to go on with a drawing, or at all.
#[derive(Debug, thiserror::Error)]
pub enum Refused {
    /// Nothing at this path.
    #[error("{}: no such file; check the name and the folder you are in", .0.display())]
    NoFile(PathBuf),
    /// A folder where a drawing was expected.
    #[error("{}: a folder; name the drawings in it, such as {}", .0.display(), .0.join("*.dxf").display())]
    Folder(PathBuf),
    /// A pipe or a device.
    #[error("{}: not a file on disk; save the drawing to a file and name that", .0.display())]
    NotAFile(PathBuf),
    /// The file cannot be read.
    #[error("{}: cannot be read: {}; check its permissions", path.display(), reason(error))]
    Unreadable {
        /// Which file.
        path: PathBuf,
        /// The system's words.
        error: io::Error,
    },
    /// No readable DXF.
    #[error("{}: {refusal}", path.display())]
    Drawing {
        /// Which file.
        path: PathBuf,
        /// Why.
        refusal: Refusal,
    },
    /// Mistakes in the job file.
    #[error("{0}")]
    Job(Problems),
    /// A job file that is no text.
    #[error("{}: byte {at} is no UTF-8, and a job file is text in UTF-8; save it as UTF-8", path.display())]
    JobNotText {
        /// Which file.
        path: PathBuf,
        /// First offending byte.
        at: usize,
    },
    /// No layer of the drawing is a tendon layer by the job.
    #[error(
        "{}: no layer fits the tendon patterns {patterns}\nlayers of the drawing: {layers}{near}{references}\nname the tendon layers in the job file, below [layers], as banded and distributed; `tautplan survey` proposes one", path.display()
    )]
    NoTendonLayer {
        /// Which drawing.
        path: PathBuf,
        /// The job's patterns.
        patterns: String,
        /// The drawing's layers with counts.
        layers: String,
        /// A layer whose name is close to a pattern, or nothing.
        near: String,
        /// References whose contents are missing, or nothing.
        references: String,
    },
    /// Tendon layers, but nothing on them that could be a tendon.
    #[error(
        "{}: no line on the tendon layers {layers}\nexpected LINE, LWPOLYLINE, POLYLINE, ARC or SPLINE in model space; check that the tendons are on these layers and not in paper space or an external reference{references}", path.display()
    )]
    NoTendons {
        /// Which drawing.
        path: PathBuf,
        /// The layers with counts.
        layers: String,
        /// References whose contents are missing, or nothing.
        references: String,
    },
    /// The unit gives lengths that no floor has.
    #[error(
        "{}: read in {unit}, half of the tendons are {than} {median_m} m, and 1 m to 300 m was expected\n{advice}", path.display()
    )]
    Unit {
        /// Which drawing.
        path: PathBuf,
        /// The unit and where it came from.
        unit: String,
        /// Shorter or longer than.
        than: &'static str,
        /// Median length, metres, in words.
        median_m: String,
        /// Which units would make sense.
        advice: String,
    },
    /// Two drawings would write the same files.
    #[error(
        "{} and {} would both write {}; nothing was written: mark them one at a time, each with its own --out", first.display(), second.display(), target.display()
    )]
    SameTarget {
        /// One drawing.
        first: PathBuf,
        /// Another, or the same again.
        second: PathBuf,
        /// The file.
        target: PathBuf,
    },
    /// A result would take an input's place.
    #[error(
        "{}: a result would be written over this input; nothing was written: give another folder with --out", .0.display()
    )]
    OverInput(PathBuf),
    /// The folder for the results is no folder, or cannot be made or written.
    #[error("{}: cannot be written: {}; give another folder with --out", path.display(), reason(error))]
    Folderless {
        /// The folder.
        path: PathBuf,
        /// The system's words.
        error: io::Error,
    },
    /// A result cannot be written.
    #[error("{}: cannot be written: {}; put that right, or give another place with --out", path.display(), reason(error))]
    Unwritable {
        /// Which file.
        path: PathBuf,
        /// The system's words.
        error: io::Error,
    },
    /// A file that a person may have worked on.
    #[error("{}: there is a file of this name already, and it is left as it is; give another name with --out", .0.display())]
    Exists(PathBuf),
    /// No tendon of this mark.
    #[error("{}: no tendon is marked {mark}; {marks}", path.display())]
    NoMark {
        /// Which drawing.
        path: PathBuf,
        /// What was asked for.
        mark: String,
        /// Which marks there are.
        marks: String,
    },
}

/// The system's reason in words of one's own; those of a library name files that the user never asked for.
pub(super) fn reason(error: &io::Error) -> String {
    use io::ErrorKind;
    match error.kind() {
        ErrorKind::PermissionDenied => "it is protected from you".to_owned(),
        ErrorKind::AlreadyExists | ErrorKind::NotADirectory => {
            "a file stands where a folder is needed".to_owned()
        }
        ErrorKind::IsADirectory => "a folder of that name is there".to_owned(),
        ErrorKind::NotFound => "its folder is not there".to_owned(),
        ErrorKind::ReadOnlyFilesystem => "the disk can only be read".to_owned(),
        ErrorKind::StorageFull | ErrorKind::QuotaExceeded => "the disk is full".to_owned(),
        ErrorKind::InvalidFilename => "the name is too long or not allowed".to_owned(),
        other => other.to_string(),
    }
}
