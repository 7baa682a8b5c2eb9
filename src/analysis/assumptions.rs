//! What is assumed of a floor while it is worked out.

use super::{TendonResult, by_method};
use crate::floor::{EndKind, Floor, PointKind, Tendon};
use crate::job::Job;

/// In sentences.
pub(super) fn sentences(floor: &Floor, results: &[TendonResult], job: &Job) -> Vec<String> {
    let mut said = Vec::new();
    let anchors = floor
        .tendons
        .iter()
        .flat_map(|tendon| &tendon.points)
        .filter(|point| point.kind == PointKind::Anchor)
        .filter(|point| point.drawn_m.is_none() && point.height_m.is_some())
        .count();
    if anchors > 0 {
        said.push(format!(
            "Anchors for which the drawing gives no height of their own are at mid-depth: {anchors}."
        ));
    }
    let unmarked = floor.tendons.iter().filter(|tendon| !tendon.mark_drawn);
    let unmarked = unmarked.count();
    if unmarked > 0 {
        said.push(format!(
            "Tendons without a mark on the drawing were given one by their place, and it is written beside them: {unmarked}."
        ));
    }
    said.extend(by_method::recalled(&job.long_term));
    said.extend(in_pours(floor, job));
    said.extend(by_default_strand(floor, results, job));
    if job.long_term.concrete_stress_mpa.is_none() && !floor.slab.outlines.is_empty() {
        said.push(
            "The concrete stress of each tendon is the lock-off force of the floor's own tendons over the slab's sections \
             (long_term.concrete_stress_mpa is not given)."
                .to_owned(),
        );
        let without = results
            .iter()
            .filter(|result| result.forces.is_none())
            .count();
        if without > 0 && without < results.len() {
            said.push(format!(
                "The compression of {without} of {} tendon lines, whose forces are not known, is left out: concrete stress and losses \
                 of the others are low.",
                results.len()
            ));
        }
    }
    said
}

/// Tendons whose strand size the job gives.
fn by_default_strand(floor: &Floor, results: &[TendonResult], job: &Job) -> Option<String> {
    let name = job.tendon.default_strand.as_ref()?;
    let count = floor
        .tendons
        .iter()
        .zip(results)
        .filter(|(tendon, result)| tendon.strand.is_none() && result.strand.is_some())
        .count();
    (count > 0).then(|| {
        format!(
            "Tendons whose strand size the drawing does not give have the job's default_strand, {name}: {count}."
        )
    })
}

/// How tendons with intermediate anchors are stressed.
fn in_pours(floor: &Floor, job: &Job) -> Vec<String> {
    let with_live_ends = |wanted: usize| {
        let tendons = floor.tendons.iter();
        let divided = tendons.filter(|tendon| !tendon.joints.is_empty());
        let live = |tendon: &Tendon| {
            let live = tendon
                .ends
                .iter()
                .filter(|end| end.kind == Some(EndKind::Live));
            live.count()
        };
        divided.filter(|tendon| live(tendon) == wanted).count()
    };
    let mut said = Vec::new();
    let from_dead = with_live_ends(1);
    if from_dead > 0 {
        said.push(format!(
            "Tendons with intermediate anchors are stressed from the dead end on, each segment from its far anchor: {from_dead}."
        ));
    }
    let between_live = with_live_ends(2);
    if between_live > 0 {
        said.push(format!(
            "Of tendons with intermediate anchors between two live ends the segment at the {} end is stressed first, from that \
             end and its intermediate anchor together, then each from its far anchor (stressing.first_pour): {between_live}.",
            job.stressing.first_pour.join(" or ")
        ));
    }
    said
}
