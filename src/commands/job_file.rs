//! Which job file holds for a drawing.

use std::path::{Path, PathBuf};

use super::files;
use super::refused::Refused;
use crate::job::{Resolved, read};

/// A job and where it came from.
#[derive(Debug, Clone, Default)]
pub(super) struct JobFile {
    /// The file; `None` where there is none and every default holds.
    pub(super) path: Option<PathBuf>,
    /// What it says.
    pub(super) resolved: Resolved,
}

/// Reads a job file that was named.
pub(super) fn named(path: &Path) -> Result<JobFile, Refused> {
    let bytes = files::read(path)?;
    let text = String::from_utf8(bytes).map_err(|error| Refused::JobNotText {
        path: path.to_owned(),
        at: error.utf8_error().valid_up_to(),
    })?;
    let resolved = read(&path.display().to_string(), &text).map_err(Refused::Job)?;
    Ok(JobFile {
        path: Some(path.to_owned()),
        resolved,
    })
}

/// Reads the job file of a drawing: `<stem>.toml` beside it, else `tautplan.toml` beside it, else every default.
pub(super) fn beside(plan: &Path) -> Result<JobFile, Refused> {
    let folder = plan.parent().unwrap_or(Path::new(""));
    for candidate in [plan.with_extension("toml"), folder.join("tautplan.toml")] {
        if files::exists(&candidate) {
            return named(&candidate);
        }
    }
    Ok(JobFile::default())
}

impl JobFile {
    /// Which file it is, in words.
    pub(super) fn words(&self) -> String {
        match &self.path {
            Some(path) => format!("job file {}", path.display()),
            None => "no job file, every default holds; `tautplan survey` proposes one".to_owned(),
        }
    }
}
