//! Patterns of the job file that are at odds on this drawing: one name fits two that exclude one another.

use std::collections::BTreeSet;

use super::layers::{names, selectors};
use super::rules::PATTERNS_AT_ODDS;
use crate::drawing::{Drawing, Look};
use crate::finding::{Finding, Level};
use crate::job::{AT_ODDS, Conventions};

/// One finding for each name and pair of lists that both claim it. A block that is live and dead by its name is neither,
/// as long as nothing else tells; a layer keeps the role that comes first.
pub(super) fn odds(drawing: &Drawing, conventions: &Conventions) -> Vec<Finding> {
    let mut findings = Vec::new();
    let (live, dead) = (
        names(&conventions.live_end_blocks),
        names(&conventions.dead_end_blocks),
    );
    let blocks: BTreeSet<&str> = drawing.inserts.iter().map(|i| i.block.as_str()).collect();
    for block in blocks {
        if live.has(block) && dead.has(block) {
            findings.push(finding(
                &format!("block {block}"),
                ["ends.live_blocks", "ends.dead_blocks"],
                "its name was taken for neither",
            ));
        }
    }
    let layers = &conventions.layers;
    let lists = [
        ("banded", &layers.banded),
        ("distributed", &layers.distributed),
        ("tendons", &layers.tendons),
        ("level_lines", &layers.level_lines),
        ("extents", &layers.extents),
        ("slab_edge", &layers.slab_edge),
        ("slab_opening", &layers.slab_opening),
        ("slab_zone", &layers.slab_zone),
        ("column", &layers.column),
    ];
    let sets = lists.map(|(name, patterns)| (name, selectors(patterns)));
    let seen: BTreeSet<(&str, Look)> = drawing
        .shapes
        .iter()
        .map(|shape| (shape.layer.as_str(), shape.look))
        .collect();
    let mut told: BTreeSet<(&str, &str, &str)> = BTreeSet::new();
    for (layer, look) in seen {
        let linetype = drawing.linetype(look);
        let claimed = |name: &str| {
            let set = sets.iter().find(|(list, _)| *list == name);
            set.is_some_and(|(_, set)| set.picks(layer, look.colour, linetype))
        };
        for &(table, one, other) in AT_ODDS {
            if table == "layers"
                && claimed(one)
                && claimed(other)
                && told.insert((layer, one, other))
            {
                findings.push(finding(
                    &format!("layer {layer}"),
                    [&format!("layers.{one}"), &format!("layers.{other}")],
                    "where a line cannot be both it was read as the first",
                ));
            }
        }
    }
    findings
}

fn finding(what: &str, [one, other]: [&str; 2], outcome: &str) -> Finding {
    Finding::new(
        &PATTERNS_AT_ODDS,
        Level::Error,
        format!(
            "{what} fits patterns of both `{one}` and `{other}`, which exclude one another; {outcome}"
        ),
        "narrow one of the two lists in the job file until the name fits one of them only",
    )
}
