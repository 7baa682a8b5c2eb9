//! One tendon's whole working.

use std::path::PathBuf;

use super::work::work;
use super::{Outcome, Refused, job_file, print, refuse};
use crate::finding::{Finding, Level};
use crate::floor::Tendon;
use crate::report;
use crate::terminal::Terminal;

/// What `tendon` takes.
#[derive(Debug, Clone)]
pub struct Order {
    /// Drawing.
    pub plan: PathBuf,
    /// Mark of the tendon, in any letter case.
    pub mark: String,
    /// Job file.
    pub job: Option<PathBuf>,
}

/// Prints the tendon's calculation sheet.
pub fn run(order: &Order, terminal: &mut Terminal) -> Outcome {
    match sheet(order, terminal) {
        Ok((text, found)) => found.max(print(&text, terminal)),
        Err(refused) => refuse(&refused, terminal),
    }
}

fn sheet(order: &Order, terminal: &mut Terminal) -> Result<(String, Outcome), Refused> {
    let job_file = match &order.job {
        Some(path) => job_file::named(path)?,
        None => job_file::beside(&order.plan)?,
    };
    let done = work(&order.plan, &job_file)?;
    terminal.progress(&format!("{}: {}", order.plan.display(), job_file.words()));
    let job = &job_file.resolved.job;
    let text = report::calculation(&done.facts, &done.analysis, job, &order.mark);
    // What is wrong with the whole floor is wrong with the tendon too.
    let concerned = |finding: &&Finding| {
        let mark = finding.tendon.as_deref();
        mark.is_none_or(|mark| mark.eq_ignore_ascii_case(&order.mark))
    };
    let found = Outcome::of(done.analysis.findings.iter().filter(concerned));
    let of_floor = done.analysis.findings.iter().filter(|f| f.tendon.is_none());
    for finding in of_floor.filter(|finding| finding.level == Level::Error) {
        let text = finding.text.in_units(job.units);
        terminal.warning(&format!("{}: {text}", finding.rule.name));
    }
    text.map(|text| (text, found))
        .ok_or_else(|| Refused::NoMark {
            path: order.plan.clone(),
            mark: order.mark.clone(),
            marks: marks(&done.analysis.floor.tendons, &order.mark),
        })
}

/// Which marks there are, the likeliest first.
fn marks(tendons: &[Tendon], wanted: &str) -> String {
    let wanted = wanted.to_lowercase();
    let mut all: Vec<(f64, &str)> = tendons
        .iter()
        .map(|tendon| {
            let mark = tendon.mark.as_str();
            (strsim::jaro_winkler(&mark.to_lowercase(), &wanted), mark)
        })
        .collect();
    all.sort_by(|one, other| other.0.total_cmp(&one.0));
    let nearest: Vec<&str> = all.iter().take(8).map(|(_, mark)| *mark).collect();
    format!(
        "the nearest of its {} marks are {}",
        all.len(),
        nearest.join(", ")
    )
}
