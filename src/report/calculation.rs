//! One tendon's whole working, to be checked by hand: every figure beside the formula and the numbers it came from.

mod curve;
mod drawn;
mod forces;
mod friction;
mod methods;
mod pulls;

use super::DrawingFacts;
use super::summary::{assumed, cautions};
use super::table::{Align, plain, table};
use crate::analysis::{Analysis, TendonResult, pair};
use crate::finding::Finding;
use crate::floor::Tendon;
use crate::job::Job;
use crate::units::{LONG, Unit, Units};

/// The calculation sheet of every tendon with this mark (any letter case); `None` where no tendon has it.
pub fn calculation(
    facts: &DrawingFacts,
    analysis: &Analysis,
    job: &Job,
    mark: &str,
) -> Option<String> {
    let sheets: Vec<String> = pair(analysis)
        .zip(analysis.findings_by_tendon())
        .filter(|((tendon, _), _)| tendon.mark.eq_ignore_ascii_case(mark))
        .map(|(worked, found)| sheet(facts, analysis, job, worked, &found))
        .collect();
    (!sheets.is_empty()).then(|| sheets.join("\n"))
}

fn sheet(
    facts: &DrawingFacts,
    analysis: &Analysis,
    job: &Job,
    (tendon, result): (&Tendon, &TendonResult),
    found: &[&Finding],
) -> String {
    let mut parts = vec![drawn::part(facts, job, tendon, result)];
    match &result.profile {
        Some(profile) => {
            parts.push(curve::part(job, profile, result.plan_tightest));
            match &result.forces {
                Some(known) => {
                    let pulls = pulls::shown(tendon, profile, known, result);
                    parts.push(friction::part(job, tendon, known, &pulls, result));
                    parts.push(forces::part(job, tendon, known, &pulls, result));
                }
                None => parts.push(
                    "No forces: what the tendon lacks is among the findings below.\n".to_owned(),
                ),
            }
        }
        None => parts.push(
            "No curve and no forces: what the tendon lacks is among the findings below.\n"
                .to_owned(),
        ),
    }
    parts.push(findings(found, job.units));
    parts.push(assumed(analysis));
    parts.push(cautions());
    parts.join("\n")
}

fn findings(found: &[&Finding], units: Units) -> String {
    let own: Vec<String> = found
        .iter()
        .map(|finding| {
            let station = finding
                .station_m
                .map(|station_m| format!(" at station {}", units.of(LONG).said(station_m, 3)))
                .unwrap_or_default();
            format!(
                "  {} {}{station}: {}\n      {}\n",
                finding.level.word(),
                finding.rule.name,
                plain(finding.text.in_units(units)),
                plain(&finding.remedy)
            )
        })
        .collect();
    if own.is_empty() {
        "Findings on this tendon: none by the rules that were run.\n".to_owned()
    } else {
        format!("Findings on this tendon:\n{}", own.concat())
    }
}

/// A table whose first `words` columns hold words and the rest numbers.
fn grid(words: usize, header: &[&str], rows: Vec<Vec<String>>) -> String {
    let aligns: Vec<Align> = (0..header.len())
        .map(|column| {
            if column < words {
                Align::Left
            } else {
                Align::Right
            }
        })
        .collect();
    let mut all = vec![header.iter().map(|&cell| cell.to_owned()).collect()];
    all.extend(rows);
    table(&aligns, &all)
}

/// A figure in this unit, or a dash where there is none.
fn figure(unit: Unit, value: Option<f64>, decimals: usize) -> String {
    value.map_or_else(|| "-".to_owned(), |value| unit.figure(value, decimals))
}

/// MPa times mm2 are newtons; ksi times in2 are kips.
fn over_1000(units: Units) -> &'static str {
    match units {
        Units::Si => " / 1000",
        Units::Us => "",
    }
}

/// A number, or a dash where there is none.
fn number(value: Option<f64>, decimals: usize) -> String {
    value.map_or_else(|| "-".to_owned(), |value| format!("{value:.decimals$}"))
}
