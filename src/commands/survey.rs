//! What a drawing holds, and a job file proposed from it: one text that is itself a job file.

use std::path::PathBuf;

use super::job_file::{self, JobFile};
use super::{Outcome, Refused, files, print, refuse, work};
use crate::drawing::{Purpose, Wanted};
use crate::job::{self, Job};
use crate::terminal::Terminal;

mod at_ends;
mod beside_tendons;
mod chords;
mod contents;
mod directions;
mod drawing_unit;
mod extents;
mod gaps;
mod grids;
mod held;
mod labels;
mod layers;
mod left_open;
mod level_lines;
mod notes;
mod pairs;
mod picked;
mod proposals;
mod reaches;
mod readings;
mod revisions;
mod roles;
mod slab;
mod symbols;
mod trade_words;
mod trial;
mod words;

use contents::Contents;

/// What `survey` takes.
#[derive(Debug, Clone)]
pub struct Order {
    /// Drawing.
    pub plan: PathBuf,
    /// Job file by which texts are read and whose keys are kept.
    pub job: Option<PathBuf>,
    /// File to write; `None`: standard output.
    pub out: Option<PathBuf>,
}

/// Prints or writes the survey.
pub fn run(order: &Order, terminal: &mut Terminal) -> Outcome {
    let (text, found) = match survey(order) {
        Ok(survey) => survey,
        Err(refused) => return refuse(&refused, terminal),
    };
    let Some(path) = &order.out else {
        return found.max(print(&text, terminal));
    };
    let written = if files::exists(path) {
        Err(Refused::Exists(path.clone()))
    } else {
        files::write(path, [text.as_bytes()]).and_then(|file| files::name(vec![file]))
    };
    match written {
        Ok(()) => {
            terminal.progress(&format!("{}: job file proposed", path.display()));
            found
        }
        Err(refused) => refuse(&refused, terminal),
    }
}

fn survey(order: &Order) -> Result<(String, Outcome), Refused> {
    let job_file = match &order.job {
        Some(path) => job_file::named(path)?,
        None => JobFile::default(),
    };
    let job = &job_file.resolved.job;
    let source = work::open(&order.plan, job)?;
    let read = |job: &Job| {
        let everything = Wanted::everything();
        work::read(&order.plan, &source, &everything, job, Purpose::Survey)
    };
    let (drawing, findings) = read(job)?;
    let contents = Contents::of(&drawing, job);
    let name = order.plan.file_name().unwrap_or(order.plan.as_os_str());
    let mut proposed = proposals::proposals(&drawing, &contents, &job_file);
    let mut in_unit = None;
    if let Some(unit) = proposed
        .get("drawing.unit")
        .filter(|_| job.conventions.unit.is_none())
    {
        // What stands within reach of what is another matter in another unit.
        let unit = unit.clone();
        let mut by_unit = job_file.clone();
        by_unit.resolved.job.conventions.unit = serde_json::from_value(unit.value.clone()).ok();
        let job = &by_unit.resolved.job;
        let (drawing, _) = read(job)?;
        proposed = proposals::proposals(&drawing, &Contents::of(&drawing, job), &by_unit);
        proposed.insert("drawing.unit".to_owned(), unit);
        in_unit = Some(drawing);
    }
    // What is said of the drawing is said as the proposal reads it.
    let resolved = job::read("survey", &job::file(&[], &proposed)).map(|resolved| resolved.job);
    let by_proposal = resolved.as_ref().unwrap_or(job);
    let as_read = in_unit.as_ref().unwrap_or(&drawing);
    let contents = Contents::of(as_read, by_proposal);
    let name = name.to_string_lossy();
    let mut head = words::head(&name, &drawing, &contents, &findings, by_proposal);
    head.extend(left_open::lines(as_read, &contents, by_proposal));
    Ok((job::file(&head, &proposed), Outcome::of(&findings)))
}
