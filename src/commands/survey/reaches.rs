//! How far labels and symbols reach, where with the defaults most of them are left over and a longer reach settles them.

use serde_json::json;

use super::trial::said;
use crate::drawing::Drawing;
use crate::finding::Finding;
use crate::floor::{self, Floor};
use crate::job::{Job, Proposal};

/// So many tendons tell something.
const SOME: usize = 3;
/// Reaches of labels that are tried, in text heights.
const REACHES: [f64; 4] = [4.0, 5.0, 6.0, 8.0];

/// Reaches of end symbols that are tried, metres.
const END_REACHES_M: [f64; 5] = [0.45, 0.6, 0.9, 1.2, 1.5];

/// Longer reaches, as this floor by this job suggests.
pub(super) fn proposals(
    drawing: &Drawing,
    floor: &Floor,
    job: &Job,
    findings: &[Finding],
) -> Vec<(String, Proposal)> {
    let labels = of_labels(drawing, floor, job, findings);
    labels
        .into_iter()
        .chain(of_ends(drawing, floor, job))
        .collect()
}

/// A longer reach of end symbols and words, where they stand further off and many ends get none.
fn of_ends(drawing: &Drawing, floor: &Floor, job: &Job) -> Option<(String, Proposal)> {
    let without = |floor: &Floor| {
        let ends = floor.tendons.iter().flat_map(|tendon| &tendon.ends);
        ends.filter(|end| end.kind.is_none()).count()
    };
    let (tendons, before) = (floor.tendons.len(), without(floor));
    if before < SOME || 5 * before < 2 * tendons {
        return None;
    }
    let longer = END_REACHES_M
        .into_iter()
        .filter(|reach_m| *reach_m > job.conventions.end_reach_m);
    longer.into_iter().find_map(|reach_m| {
        let mut wider = job.clone();
        wider.conventions.end_reach_m = reach_m;
        let (floor, _) = floor::read(drawing, &wider);
        let after = without(&floor);
        (floor.tendons.len() == tendons && 10 * after <= before).then(|| {
            let why = format!(
                "Within {:.0} mm {before} of {} ends have no symbol or word, within this {after}. Check it.",
                1000.0 * job.conventions.end_reach_m,
                2 * tendons
            );
            said("ends.reach_mm", json!(1000.0 * reach_m), why)
        })
    })
}

/// A longer reach of labels, where labels are left over and most tendons get no mark or no strands.
fn of_labels(
    drawing: &Drawing,
    floor: &Floor,
    job: &Job,
    findings: &[Finding],
) -> Option<(String, Proposal)> {
    let without = |floor: &Floor| {
        let tendons = floor.tendons.iter();
        tendons
            .filter(|tendon| tendon.strands.is_none() || !tendon.mark_drawn)
            .count()
    };
    let all = floor.tendons.len();
    let before = without(floor);
    let (over, doubtful) = (
        told(findings, "label-unclaimed"),
        told(findings, "label-ambiguous"),
    );
    if before < SOME || 2 * before < all || over == 0 {
        return None;
    }
    let longer = REACHES
        .into_iter()
        .filter(|reach| *reach > job.conventions.label_reach);
    longer.into_iter().find_map(|reach| {
        let mut wider = job.clone();
        wider.conventions.label_reach = reach;
        let (floor, findings) = floor::read(drawing, &wider);
        let after = without(&floor);
        let helps = floor.tendons.len() == all && 5 * after <= all && told(&findings, "label-ambiguous") <= doubtful;
        helps.then(|| {
            let why = format!(
                "With {} text heights {before} of {all} tendons have no mark or no strands, with these {after}. Check it.",
                job.conventions.label_reach
            );
            said("labels.reach_text_heights", json!(reach), why)
        })
    })
}

fn told(findings: &[Finding], rule: &str) -> usize {
    let of_rule = findings.iter().filter(|finding| finding.rule.name == rule);
    of_rule.count()
}
