//! The main job: each drawing worked out and given back with the answers drawn on it.

use std::collections::BTreeMap;
use std::ffi::OsString;
use std::panic::resume_unwind;
use std::path::{Path, PathBuf};

use super::files::Nameless;
use super::job_file::{self, JobFile};
use super::work::{Work, work};
use super::{Outcome, Refused, files, refuse};
use crate::job::Job;
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
    let targets = targets(plan, out);
    // Drawing and reports need nothing of one another.
    let (marked, reports) = std::thread::scope(|scope| {
        let reports = || write_reports(&targets, &done, job);
        let beside = std::thread::Builder::new().spawn_scoped(scope, reports);
        let marked = write_marked(&targets, plan, &done, job);
        let reports = match beside {
            Ok(thread) => thread.join().unwrap_or_else(|panic| resume_unwind(panic)),
            Err(_) => reports(),
        };
        (marked, reports)
    });
    let mut written = vec![marked?];
    written.extend(reports?);
    files::name(written)?;

    let names: Vec<String> = targets
        .iter()
        .map(|path| path.display().to_string())
        .collect();
    let summary = report::summary(&done.facts, analysis, job, &names);
    let printed = super::print(&summary, terminal);
    Ok(Outcome::of(&analysis.findings).max(printed))
}

/// The drawing with the answers on it.
fn write_marked(
    targets: &Targets,
    plan: &Path,
    done: &Work,
    job: &Job,
) -> Result<Nameless, Refused> {
    let [target, ..] = targets;
    let sheet = annotate::draw(&done.analysis, &done.around, job);
    let marked =
        drawing::insertion(&done.source, done.facts.unit_m, &sheet).map_err(|refusal| {
            Refused::Drawing {
                path: plan.to_owned(),
                refusal,
            }
        })?;
    drop(sheet);
    files::write(target, marked)
}

/// Everything but the drawing, each text let go once it is written.
fn write_reports(targets: &Targets, done: &Work, job: &Job) -> Result<Vec<Nameless>, Refused> {
    let (analysis, units) = (&done.analysis, job.units);
    let [_, result, tendons, points, extensions, methods, findings] = targets;
    let write = |path: &Path, text: String| files::write(path, [text]);
    Ok(vec![
        write(result, report::json(&done.facts, &job.inputs(), analysis))?,
        write(tendons, report::tendons_csv(analysis, units))?,
        write(points, report::points_csv(analysis, units))?,
        write(extensions, report::extensions_csv(analysis, units))?,
        write(methods, report::methods_csv(analysis, units))?,
        write(findings, report::findings_csv(analysis, units))?,
    ])
}

/// Where a drawing's results go, in the order of [`ENDINGS`].
type Targets = [PathBuf; ENDINGS.len()];

fn targets(plan: &Path, out: Option<&Path>) -> Targets {
    let stem = plan.file_stem().unwrap_or_default();
    let folder = out.or_else(|| plan.parent()).unwrap_or(Path::new(""));
    ENDINGS.map(|ending| {
        let mut name = OsString::from(stem);
        name.push(ending);
        folder.join(name)
    })
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
