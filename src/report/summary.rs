//! The short summary that the terminal shows.

use std::collections::BTreeMap;

use super::DrawingFacts;
use super::table::{Align, plain, table};
use crate::analysis::{Analysis, pair};
use crate::checks::Turning;
use crate::finding::{Finding, Level};
use crate::floor::{Run, Tendon};
use crate::job::Fallback;
use crate::losses::Forces;

/// Tendons in the table of the worst.
const WORST: usize = 8;

/// Tendons named beside a rule.
const NAMED: usize = 4;

/// What every summary ends with.
pub const CAUTIONS: &str = "\
This is a check of a drawing, not a design certificate: strength, punching, deflection, anchorage zones and fire are not
looked at. The engineer responsible decides, under the local code.
A stressed tendon stores great energy: nobody behind, in line with or above a jack or a tendon's line. Concrete strength
is proven in writing first; only trained crews stress, cut or de-tension.
";

/// Counts, the worst tendons by curvature loss, findings by rule, assumptions, the files written, and the cautions.
/// Plain text; what came from the drawing is escaped.
pub fn summary(facts: &DrawingFacts, analysis: &Analysis, files: &[String]) -> String {
    let mut parts = vec![counts(facts, analysis)];
    parts.extend(worst(analysis));
    parts.push(findings(&analysis.findings));
    parts.push(assumed(analysis));
    parts.extend(list("Written:", files));
    parts.push(CAUTIONS.to_owned());
    parts.join("\n")
}

fn counts(facts: &DrawingFacts, analysis: &Analysis) -> String {
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
    let rest = if worked == tendons.len() {
        ""
    } else {
        "; what the others lack is among the findings"
    };
    format!(
        "{}: {} tendon lines ({banded} banded, {} distributed){stand}.\nForces were worked out for {worked} of them{only}{rest}.\n",
        plain(&facts.file),
        tendons.len(),
        tendons.len() - banded
    )
}

/// Tendons with the greatest share of jacking force lost to angle alone, worst first.
fn worst(analysis: &Analysis) -> Option<String> {
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
    let header = [
        "",
        "tendon",
        "length m",
        "angle rad",
        "rad/m",
        "lost to angle %",
        "left at least %",
    ];
    let mut rows = vec![header.map(str::to_owned).to_vec()];
    for (rank, (tendon, forces, turning)) in turned.iter().take(WORST).enumerate() {
        rows.push(vec![
            format!("{}", rank + 1),
            plain(&tendon.mark),
            format!("{:.2}", tendon.path.length_m()),
            format!("{:.3}", turning.angle_rad),
            format!("{:.4}", turning.angle_per_m_rad),
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
const FIGURES: [&str; 6] = [
    "slab",
    "height",
    "system",
    "stressing",
    "profile",
    "long_term",
];

/// What was assumed: in sentences of the floor, in short of the job's keys; the result file has them in full.
pub(super) fn assumed(analysis: &Analysis) -> String {
    let mut lines = analysis.assumptions.clone();
    let (figures, others): (Vec<&Fallback>, Vec<&Fallback>) = analysis
        .fallbacks
        .iter()
        .partition(|key| FIGURES.contains(&key.table));
    let short = figures
        .iter()
        .filter(|key| !key.name.contains("pattern") && !key.name.contains("word"));
    let short: Vec<String> = short
        .filter_map(|key| {
            let value = key.value.as_ref()?;
            (value.len() < 40).then(|| format!("{} {value}", key.name))
        })
        .collect();
    lines.extend(short.chunks(4).map(|some| some.join(", ")));
    if !others.is_empty() {
        lines.push(format!(
            "and {} conventions of reading and limits at their defaults; the result file lists every default with its source",
            others.len()
        ));
    }
    list(
        "Assumed, since neither drawing nor job file says otherwise:",
        &lines,
    )
    .unwrap_or_else(|| "Nothing was assumed: the job file gives every key.\n".to_owned())
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
