//! The main job: each drawing worked out and given back with the answers drawn on it.

use std::collections::BTreeMap;
use std::ffi::OsString;
use std::path::{Path, PathBuf};

use super::files::Pieces;
use super::job_file::{self, JobFile};
use super::work::work;
use super::{Outcome, Refused, files, refuse};
use crate::finding::Level;
use crate::terminal::Terminal;
use crate::{annotate, drawing, report};

/// What `mark` takes.
#[derive(Debug, Clone)]
pub struct Order {
    /// Drawings.
    pub plans: Vec<PathBuf>,
    /// Job file for all of them.
    pub job: Option<PathBuf>,
    /// Folder for the results; `None`: beside each drawing.
    pub out: Option<PathBuf>,
}

/// What each drawing's files end with, in the order they are listed.
const ENDINGS: [&str; 7] = [
    "-marked.dxf",
    "-result.json",
    "-tendons.csv",
    "-points.csv",
    "-extensions.csv",
    "-methods.csv",
    "-findings.csv",
];

/// Marks every drawing; one that cannot be marked does not stop the others.
pub fn run(order: &Order, terminal: &mut Terminal) -> Outcome {
    let job = match order.job.as_deref().map(job_file::named).transpose() {
        Ok(job) => job,
        Err(refused) => return refuse(&refused, terminal),
    };
    if let Err(refused) = check_targets(order) {
        return refuse(&refused, terminal);
    }
    if let Some(Err(refused)) = order.out.as_deref().map(files::prepare) {
        return refuse(&refused, terminal);
    }
    let mut outcome = Outcome::Done;
    for (index, plan) in order.plans.iter().enumerate() {
        if index > 0 && terminal.result("\n").is_err() {
            return Outcome::NotDone;
        }
        let one = mark(plan, job.as_ref(), order.out.as_deref(), terminal);
        outcome = outcome.max(one.unwrap_or_else(|refused| refuse(&refused, terminal)));
    }
    outcome
}

fn mark(
    plan: &Path,
    job: Option<&JobFile>,
    out: Option<&Path>,
    terminal: &mut Terminal,
) -> Result<Outcome, Refused> {
    let beside = match job {
        Some(_) => JobFile::default(),
        None => job_file::beside(plan)?,
    };
    let job_file = job.unwrap_or(&beside);
    let done = work(plan, job_file)?;
    terminal.progress(&format!("{}: {}", plan.display(), job_file.words()));

    let job = &job_file.resolved.job;
    let analysis = &done.analysis;
    let sheet = annotate::draw(analysis, &done.around, job);
    let marked =
        drawing::insertion(&done.source, done.facts.unit_m, &sheet).map_err(|refusal| {
            Refused::Drawing {
                path: plan.to_owned(),
                refusal,
            }
        })?;
    drop(sheet);
    let contents: [Pieces<'_>; 7] = [
        marked,
        text(report::json(&done.facts, &job.inputs(), analysis)),
        text(report::tendons_csv(analysis, job.units)),
        text(report::points_csv(analysis, job.units)),
        text(report::extensions_csv(analysis, job.units)),
        text(report::methods_csv(analysis, job.units)),
        text(report::findings_csv(analysis, job.units)),
    ];
    let written: Vec<(PathBuf, Pieces<'_>)> =
        targets(plan, out).into_iter().zip(contents).collect();
    files::write_all(&written)?;

    let names: Vec<String> = written
        .iter()
        .map(|(path, _)| path.display().to_string())
        .collect();
    let summary = report::summary(&done.facts, analysis, job, &names);
    let printed = super::print(&summary, terminal);
    let grave = analysis
        .findings
        .iter()
        .any(|finding| finding.level == Level::Error);
    let found = if grave { Outcome::Found } else { Outcome::Done };
    Ok(found.max(printed))
}

/// A text as a file's contents.
fn text<'a>(text: String) -> Pieces<'a> {
    vec![text.into_bytes().into()]
}

/// Where a drawing's results go, in the order of [`ENDINGS`].
fn targets(plan: &Path, out: Option<&Path>) -> Vec<PathBuf> {
    let stem = plan.file_stem().unwrap_or_default();
    let folder = out.or_else(|| plan.parent()).unwrap_or(Path::new(""));
    ENDINGS
        .iter()
        .map(|ending| {
            let mut name = OsString::from(stem);
            name.push(ending);
            folder.join(name)
        })
        .collect()
}

/// Before anything is written: no two drawings write one file, and no result takes an input's place.
fn check_targets(order: &Order) -> Result<(), Refused> {
    let mut inputs: BTreeMap<PathBuf, &Path> = BTreeMap::new();
    for input in order.plans.iter().chain(&order.job) {
        inputs.insert(files::identity(input), input);
    }
    let mut taken: BTreeMap<PathBuf, &Path> = BTreeMap::new();
    for plan in &order.plans {
        for target in targets(plan, order.out.as_deref()) {
            let identity = files::identity(&target);
            if let Some(input) = inputs.get(&identity) {
                return Err(Refused::OverInput((*input).to_owned()));
            }
            if let Some(first) = taken.insert(identity, plan) {
                return Err(Refused::SameTarget {
                    first: first.to_owned(),
                    second: plan.clone(),
                    target,
                });
            }
        }
    }
    Ok(())
}
