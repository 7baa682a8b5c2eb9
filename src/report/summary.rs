//! The short summary that the terminal shows.

mod methods;

use std::collections::BTreeMap;

use super::DrawingFacts;
use super::table::{Align, plain, table};
use crate::analysis::{Analysis, pair};
use crate::cautions::CAUTIONS;
use crate::checks::Turning;
use crate::finding::{Finding, Level};
use crate::floor::{Run, Tendon};
use crate::job::keys::ROOT;
use crate::job::{Fallback, Job};
use crate::losses::Forces;
use crate::units::{LONG, TURN, Units};

/// Tendons in the table of the worst.
const WORST: usize = 8;

/// Tendons named beside a rule.
const NAMED: usize = 4;

/// Letters in a line of the cautions.
const LINE: usize = 120;

/// Counts, the worst tendons by curvature loss, findings by rule, assumptions, the files written, and the cautions.
/// Plain text; what came from the drawing is escaped.
pub fn summary(facts: &DrawingFacts, analysis: &Analysis, job: &Job, files: &[String]) -> String {
    let mut parts = vec![counts(facts, analysis, job)];
    parts.extend(worst(analysis, job.units));
    parts.extend(methods::part(analysis, job));
    parts.push(findings(&analysis.findings));
    parts.push(assumed(analysis));
    parts.extend(list("Written:", files));
    parts.push(cautions());
    parts.join("\n")
}

/// The cautions, broken into lines.
pub(super) fn cautions() -> String {
    let mut lines: Vec<String> = Vec::new();
    for paragraph in CAUTIONS {
        let mut line = String::new();
        for word in paragraph.split(' ') {
            if !line.is_empty() && line.chars().count() + 1 + word.chars().count() > LINE {
                lines.push(std::mem::take(&mut line));
            }
            if !line.is_empty() {
                line.push(' ');
            }
            line.push_str(word);
        }
        lines.push(line);
    }
    lines.join("\n") + "\n"
}

fn counts(facts: &DrawingFacts, analysis: &Analysis, job: &Job) -> String {
    let tendons = &analysis.floor.tendons;
    let banded = tendons
        .iter()
        .filter(|tendon| tendon.run == Run::Banded)
        .count();
    let stand_for: u64 = tendons.iter().map(|tendon| u64::from(tendon.tendons)).sum();
    let worked = analysis
        .results
        .iter()
        .filter(|result| result.forces.is_some())
        .count();
    let stand = if stand_for == tendons.len() as u64 {
        String::new()
    } else {
        format!(" that stand for {stand_for} tendons")
    };
    let jacked = analysis
        .results
        .iter()
        .filter(|result| result.forces.as_ref().is_some_and(|f| f.later.is_none()))
        .count();
    let only = if jacked == 0 {
        String::new()
    } else {
        format!(", for {jacked} of these at jacking and lock-off only")
    };
    let all = tendons.len();
    let rest = if worked == all {
        ""
    } else {
        "; what the others lack is among the findings"
    };
    let stand = if all == 1 {
        stand.replacen("stand", "stands", 1)
    } else {
        stand
    };
    let lines = if all == 1 { "line" } else { "lines" };
    let several = tendons.iter().filter(|tendon| !tendon.joints.is_empty());
    let several = match several.count() {
        0 => String::new(),
        count => {
            format!("Stressed in several pulls, from anchor to intermediate anchor: {count}.\n")
        }
    };
    format!(
        "{}: {all} tendon {lines} ({banded} banded, {} distributed){stand}.\n\
         Forces were worked out for {worked} of {all} {lines}{only}{rest}.\n\
         {several}\
         Heights read as {}.\n",
        plain(&facts.file),
        all - banded,
        job.conventions.height
    )
}

/// Tendons with the greatest share of jacking force lost to angle alone, worst first.
fn worst(analysis: &Analysis, units: Units) -> Option<String> {
    let mut turned: Vec<(&Tendon, &Forces, Turning)> = pair(analysis)
        .filter_map(|(tendon, result)| {
            let forces = result.forces.as_ref()?;
            Some((tendon, forces, result.turning?))
        })
        .collect();
    // A stable sort: of equals, the floor's own order.
    turned.sort_by(|a, b| b.2.loss_ratio.total_cmp(&a.2.loss_ratio));
    if turned.is_empty() {
        return None;
    }
    let (long, turn) = (units.of(LONG), units.of(TURN));
    let length = format!("length {}", long.name);
    let header = [
        "",
        "tendon",
        &length,
        "angle rad",
        turn.name,
        "lost to angle %",
        "left at least %",
    ];
    let mut rows = vec![header.map(str::to_owned).to_vec()];
    for (rank, (tendon, forces, turning)) in turned.iter().take(WORST).enumerate() {
        rows.push(vec![
            format!("{}", rank + 1),
            plain(&tendon.mark),
            long.figure(tendon.path.length_m(), 2),
            format!("{:.3}", turning.angle_rad),
            turn.figure(turning.angle_per_m_rad, 4),
            format!("{:.1}", 100.0 * turning.loss_ratio),
            format!("{:.1}", 100.0 * forces.least_jacking_kn / forces.jack_kn),
        ]);
    }
    let aligns = [
        Align::Right,
        Align::Left,
        Align::Right,
        Align::Right,
        Align::Right,
        Align::Right,
        Align::Right,
    ];
    Some(format!(
        "Most jacking force lost to angle alone, from the jack to the point of least force:\n{}",
        table(&aligns, &rows)
    ))
}

/// Findings counted by level and rule, with the first tendons concerned.
fn findings(findings: &[Finding]) -> String {
    if findings.is_empty() {
        return "No findings.\n".to_owned();
    }
    let mut by_rule: BTreeMap<(Level, &str), Vec<&Finding>> = BTreeMap::new();
    for finding in findings {
        by_rule
            .entry((finding.level, finding.rule.name))
            .or_default()
            .push(finding);
    }
    let mut rows = vec![["level", "rule", "found", "on"].map(str::to_owned).to_vec()];
    for ((level, rule), found) in &by_rule {
        rows.push(vec![
            level.word().to_owned(),
            (*rule).to_owned(),
            found.len().to_string(),
            named(found),
        ]);
    }
    let count = |level: Level| {
        findings
            .iter()
            .filter(|finding| finding.level == level)
            .count()
    };
    format!(
        "Findings: errors {}, warnings {}, notes {}.\n{}",
        count(Level::Error),
        count(Level::Warning),
        count(Level::Note),
        table(
            &[Align::Left, Align::Left, Align::Right, Align::Left],
            &rows
        )
    )
}

fn named(found: &[&Finding]) -> String {
    let mut marks: Vec<&str> = Vec::new();
    for mark in found.iter().filter_map(|finding| finding.tendon.as_deref()) {
        if !marks.contains(&mark) {
            marks.push(mark);
        }
        if marks.len() > NAMED {
            break;
        }
    }
    let more = if marks.len() > NAMED { ", ..." } else { "" };
    let shown: Vec<String> = marks.iter().take(NAMED).map(|mark| plain(mark)).collect();
    shown.join(", ") + more
}

/// Tables of the job whose values are engineering figures; the rest are conventions of reading and limits.
const FIGURES: [&str; 7] = [
    ROOT,
    "slab",
    "height",
    "tendon",
    "stressing",
    "profile",
    "long_term",
];

/// What was assumed: in sentences of the floor, in short of the job's keys; the result file has them in full.
pub(super) fn assumed(analysis: &Analysis) -> String {
    let mut lines = analysis.assumptions.clone();
    let short: Vec<String> = analysis.fallbacks.iter().filter_map(figure).collect();
    lines.extend(short.chunks(4).map(|some| some.join(", ")));
    let others = analysis.fallbacks.len() - short.len();
    if others > 0 {
        lines.push(format!(
            "and {others} more keys, mostly conventions of reading and limits, at their defaults; the result file lists every \
             default with its source"
        ));
    }
    list(
        "Assumed, since neither drawing nor job file says otherwise:",
        &lines,
    )
    .unwrap_or_else(|| "Nothing was assumed: the job file gives every key.\n".to_owned())
}

/// An engineering figure in short; a list of several is left to the result file.
fn figure(key: &Fallback) -> Option<String> {
    let convention = key.name.contains("pattern") || key.name.contains("word");
    if convention || !FIGURES.contains(&key.table) {
        return None;
    }
    match &key.value {
        Some(value) if value.len() < 40 => Some(format!("{} {value}", key.name)),
        Some(_) => None,
        None => Some(format!("{} not given", key.name)),
    }
}

fn list(title: &str, items: &[String]) -> Option<String> {
    (!items.is_empty()).then(|| {
        let lines: Vec<String> = items
            .iter()
            .map(|item| format!("  {}\n", plain(item)))
            .collect();
        format!("{title}\n{}", lines.concat())
    })
}
