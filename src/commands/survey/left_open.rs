//! What a proposal leaves open, why, and which line of the job file would say it; and notes to hold against its keys.

use std::collections::BTreeMap;

use super::contents::Contents;
use super::notes;
use super::picked::Picked;
use super::proposals::is_fitted;
use super::slab::outside_edges;
use crate::commands::work;
use crate::drawing::{Drawing, Text};
use crate::floor::{EndKind, EndWords};
use crate::job::Job;
use crate::patterns::Names;
use crate::report::plain;

/// Things named of each kind.
const NAMED: usize = 4;
/// Lines for the head of the file; `job` is the proposal, and the contents are as it reads them.
pub(super) fn lines(drawing: &Drawing, contents: &Contents, job: &Job) -> Vec<String> {
    let has = |role: &str| is_fitted(drawing, job, role);
    let tendons = ["banded", "distributed", "tendons"].into_iter().any(has);
    let mut open: Vec<String> = Vec::new();
    if !tendons {
        open.push("no layer is named for tendons, and no lines carry symbols or words at most of their ends: name theirs in layers.banded and layers.distributed, or layers.tendons".to_owned());
    }
    let texts = other_texts(contents, job, drawing);
    let among = if texts.is_empty() {
        String::new()
    } else {
        format!("; not read: {texts}")
    };
    if !has("heights") && !has("level_lines") {
        open.push(format!("no layer's texts are mostly heights: name theirs in layers.heights, and how they are written in height.patterns or height.high_words and low_words{among}"));
    }
    if !has("marks") {
        open.push(format!("no layer's texts count strands or are marks beside tendons: name theirs in layers.marks, and how they are written in labels.mark_patterns{among}"));
    } else if counts_none(drawing, contents, job) && job.tendon.default_strand.is_none() {
        open.push("no text on the layers of marks counts strands: say them in labels.mark_patterns, or for all tendons alike below [tendon]".to_owned());
    }
    open.extend(ends(contents, job));
    if !has("slab_edge") {
        open.push("no closed line is named for the slab's edge, or has most tendons end at it: name it in layers.slab_edge".to_owned());
    }
    let thick = contents
        .layers
        .values()
        .any(|held| held.thicknesses + held.inched_thicknesses > 0);
    if job.slab.thickness_m.is_none() && !thick {
        open.push("no text says the slab's thickness: write slab.thickness_mm".to_owned());
    }
    open.extend(outside(drawing, contents, job));
    let mut lines = Vec::new();
    if !open.is_empty() {
        lines.extend([String::new(), "Left open:".to_owned()]);
        lines.extend(open.iter().map(|line| format!("  {line}")));
    }
    let notes = notes::measured(drawing);
    if !notes.is_empty() {
        lines.extend([
            String::new(),
            "What the drawing says of heights, to hold against height.datum and height.from:"
                .to_owned(),
        ]);
        lines.extend(
            notes
                .iter()
                .take(2 * NAMED)
                .map(|note| format!("  {}", plain(note))),
        );
    }
    lines
}

/// Whether no text on layers of marks counts strands or tendons.
fn counts_none(drawing: &Drawing, contents: &Contents, job: &Job) -> bool {
    let marks = Picked::of(&["marks"], job, &BTreeMap::new());
    let mut layers = contents.layers.iter().filter(|(layer, _)| {
        drawing
            .texts
            .iter()
            .any(|text| text.layer == **layer && marks.writes(drawing, text))
    });
    layers.all(|(_, held)| held.strands == 0)
}

/// Layers with several texts that hold numbers and are not named for anything, with one text of each.
fn other_texts(contents: &Contents, job: &Job, drawing: &Drawing) -> String {
    let named = work::wanted(job.layer_patterns());
    let mut found: Vec<String> = Vec::new();
    for (layer, held) in contents
        .layers
        .iter()
        .filter(|(layer, held)| held.texts > 2 && !named.has(layer))
    {
        let numbered = |text: &&Text| {
            text.layer == *layer && text.content.bytes().any(|byte| byte.is_ascii_digit())
        };
        let mut texts: Vec<&str> = drawing
            .texts
            .iter()
            .filter(numbered)
            .map(|text| text.content.as_str())
            .collect();
        texts.sort_unstable();
        if let Some(text) = texts.first().filter(|_| 2 * texts.len() > held.texts) {
            let short: String = text.chars().take(24).collect();
            found.push(format!(
                "{} ({} texts, such as {})",
                plain(layer),
                held.texts,
                plain(&short)
            ));
        }
    }
    found.truncate(NAMED);
    found.join(", ")
}

/// Which ends are not told, and what stands at them.
fn ends(contents: &Contents, job: &Job) -> Option<String> {
    let read = &job.conventions;
    let found = &contents.at_ends;
    let words = EndWords::new(read);
    let names = |blocks: &[String]| Names::new(blocks).unwrap_or_default();
    let told = |kind: EndKind, blocks: &[String], shapes: &[String]| {
        let blocks = names(blocks);
        let by_value = names(&read.end_blocks);
        found.blocks.keys().any(|block| blocks.has(block))
            || found
                .attributes
                .keys()
                .any(|(block, _, value)| by_value.has(block) && words.kind(value) == Some(kind))
            || found
                .words
                .keys()
                .any(|(_, text)| text.lines().any(|line| words.kind(line) == Some(kind)))
            || found
                .shapes
                .keys()
                .any(|(_, shape)| shapes.iter().any(|known| known == shape))
    };
    let live = told(EndKind::Live, &read.live_end_blocks, &read.live_end_shapes);
    let dead = told(EndKind::Dead, &read.dead_end_blocks, &read.dead_end_shapes);
    let missing = match (live, dead) {
        (true, true) => return None,
        (true, false) => {
            "nothing at line ends tells dead ends (where a drawing marks live ends only, write unmarked_is_dead = true below [ends])"
        }
        (false, true) => "nothing at line ends tells live ends",
        (false, false) => "nothing at line ends tells live and dead ends",
    };
    let mut stands: Vec<(usize, String)> = found
        .blocks
        .iter()
        .map(|(block, count)| (*count, format!("block {}", plain(block))))
        .collect();
    stands.extend(
        found
            .words
            .iter()
            .map(|((_, text), count)| (*count, format!("text {}", plain(text)))),
    );
    stands.extend(
        found
            .shapes
            .iter()
            .map(|((layer, shape), count)| (*count, format!("{shape} on {}", plain(layer)))),
    );
    stands.sort_by(|a, b| b.0.cmp(&a.0).then_with(|| a.1.cmp(&b.1)));
    stands.truncate(NAMED);
    let stands: Vec<String> = stands
        .into_iter()
        .map(|(count, what)| format!("{what} ({count})"))
        .collect();
    let among = if stands.is_empty() {
        String::new()
    } else {
        format!("; there stand: {}", stands.join(", "))
    };
    Some(format!(
        "{missing}: say which is which in ends.live_blocks and dead_blocks, live_words and dead_words, or live_shapes and dead_shapes with their layer in layers.ends{among}"
    ))
}

/// Lines on layers of tendons that lie outside every edge of the slab.
fn outside(drawing: &Drawing, contents: &Contents, job: &Job) -> Option<String> {
    let none = BTreeMap::new();
    let (tendons, edge) = (
        Picked::tendons(job, &none),
        Picked::of(&["slab_edge"], job, &none),
    );
    let out = outside_edges(drawing, &tendons, &edge);
    let drawn = |number: &&usize| {
        let shape = drawing.shapes.get(**number);
        shape.is_some_and(|shape| !contents.at_ends.draws(drawing, shape))
    };
    let count = out.iter().filter(drawn).count();
    (count > 0).then(|| {
        format!("{count} lines on layers of tendons lie outside the slab's edge: if they are a legend or an elevation, they must go to another layer, or they are read as tendons")
    })
}
