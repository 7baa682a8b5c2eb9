//! A survey in lines: what stands on top of the proposed job file.

use std::collections::BTreeMap;

use super::contents::Contents;
use super::extents::names_group;
use super::proposals::patterns;
use super::readings::Reading;
use crate::commands::work;
use crate::drawing::{Drawing, Layer, UnitFrom, Wanted};
use crate::finding::Finding;
use crate::floor::{EndKind, EndWords};
use crate::job::Job;
use crate::job::keys::of_table;
use crate::report::{Align, plain, table};

/// The lines, without comment signs.
pub(super) fn head(
    file: &str,
    drawing: &Drawing,
    contents: &Contents,
    findings: &[Finding],
    job: &Job,
) -> Vec<String> {
    let unit = match drawing.unit_from {
        UnitFrom::Job => "by the job file".to_owned(),
        UnitFrom::Header => "by $INSUNITS".to_owned(),
        UnitFrom::Assumed(unsaid) => format!("assumed, since {unsaid}"),
    };
    let mut lines = vec![
        format!("Job file proposed from {}.", plain(file)),
        "Lines without # are set from the drawing; `#key = value` shows a default. Change what does not fit.".to_owned(),
        String::new(),
        format!(
            "Version {}; one unit is {} m, {unit}.",
            plain(&drawing.version),
            drawing.unit_m
        ),
        String::new(),
    ];
    lines.extend(layers(drawing, contents, job));
    lines.extend(looks(drawing, contents));
    lines.extend(at_ends(contents));
    lines.extend(texts(contents, job));
    lines.extend(leaders(drawing));
    if !findings.is_empty() {
        lines.push(String::new());
        lines.push("Findings while reading:".to_owned());
        lines.extend(findings.iter().map(|finding| {
            format!(
                "  {} {}: {}; {}",
                finding.level.word(),
                finding.rule.name,
                plain(&finding.text),
                plain(&finding.remedy)
            )
        }));
    }
    lines
}

/// What lies on each layer, and what this proposal reads it as; blank: not read.
fn layers(drawing: &Drawing, contents: &Contents, job: &Job) -> Vec<String> {
    let roles: Vec<(&str, Wanted)> = of_table("layers")
        .map(|key| (key.name, work::wanted(patterns(job, key.name))))
        .collect();
    let row = |layer: &Layer| {
        let counts: Vec<String> = layer
            .counts
            .iter()
            .map(|(name, count)| format!("{count} {}", plain(name)))
            .collect();
        let state = match (layer.frozen, layer.off) {
            (true, _) => "frozen",
            (false, true) => "off",
            (false, false) => "",
        };
        let fitting = roles.iter().filter(|(_, wanted)| wanted.has(&layer.name));
        let mut fitting: Vec<&str> = fitting.map(|(role, _)| *role).collect();
        let of_grid = contents
            .layers
            .get(&layer.name)
            .is_some_and(|held| held.of_grid > 0);
        if of_grid {
            fitting.push("(grid)");
        }
        vec![
            format!("  {}", plain(&layer.name)),
            fitting.join(", "),
            counts.join(", "),
            state.to_owned(),
        ]
    };
    let filled = drawing
        .layers
        .iter()
        .filter(|layer| !layer.counts.is_empty());
    let mut rows = vec![vec![
        "Layer".to_owned(),
        "read as".to_owned(),
        "entities in model space".to_owned(),
        String::new(),
    ]];
    rows.extend(filled.map(row));
    let empty = drawing.layers.len() + 1 - rows.len();
    let mut lines = lines_of(&rows);
    if empty > 0 {
        lines.push(format!("  and {empty} empty"));
    }
    lines
}

/// Keys below `[layers]` whose layers hold texts that are read.
const LABELLED: [&str; 10] = [
    "banded",
    "distributed",
    "tendons",
    "heights",
    "level_lines",
    "marks",
    "extents",
    "ends",
    "slab_zone",
    "slab_edge",
];
/// Rows shown of what stands at line ends.
const SHOWN: usize = 24;

/// What stands at the ends of lines.
fn at_ends(contents: &Contents) -> Vec<String> {
    let found = &contents.at_ends;
    let mut rows: Vec<Vec<String>> = Vec::new();
    let mut row =
        |what: String, count: usize| rows.push(vec![format!("  {what}"), count.to_string()]);
    for (block, count) in &found.blocks {
        row(format!("block {}", plain(block)), *count);
    }
    for ((block, tag, value), count) in &found.attributes {
        row(
            format!("  {}: {} = {}", plain(block), plain(tag), plain(value)),
            *count,
        );
    }
    for ((layer, text), count) in &found.words {
        row(format!("text {} on {}", plain(text), plain(layer)), *count);
    }
    for ((layer, shape), count) in &found.shapes {
        row(format!("{shape} on {}", plain(layer)), *count);
    }
    let mut lines = vec![String::new()];
    if !found.between.is_empty() {
        let blocks: Vec<String> = found.between.iter().map(|block| plain(block)).collect();
        lines.push(format!(
            "On lines, between their ends, by their names or a legend: blocks {}",
            blocks.join(", ")
        ));
    }
    if rows.is_empty() {
        lines.push(
            "Nothing that could be a symbol stands at the end of a line: live and dead ends are not known.".to_owned(),
        );
        return lines;
    }
    let more = rows.len().saturating_sub(SHOWN);
    rows.truncate(SHOWN);
    rows.insert(0, vec!["At line ends".to_owned(), "ends".to_owned()]);
    lines.extend(lines_of(&rows));
    if more > 0 {
        lines.push(format!("  and {more} more"));
    }
    lines
}

/// Colours and linetypes of layers on which they differ.
fn looks(drawing: &Drawing, contents: &Contents) -> Vec<String> {
    let mut rows = vec![
        [
            "Layer",
            "colour",
            "linetype",
            "lines open",
            "closed",
            "texts",
            "of a grid",
        ]
        .map(str::to_owned)
        .to_vec(),
    ];
    for (layer, looks) in contents.looks.iter().filter(|(_, looks)| looks.len() > 1) {
        for (look, held) in looks {
            rows.push(vec![
                format!("  {}", plain(layer)),
                look.colour
                    .map_or_else(|| "true colour".to_owned(), |index| index.to_string()),
                plain(drawing.linetype(*look)),
                held.open_m.len().to_string(),
                held.closed_m.len().to_string(),
                held.texts.to_string(),
                held.of_grid.to_string(),
            ]);
        }
    }
    if rows.len() == 1 {
        return Vec::new();
    }
    let mut lines = vec![String::new()];
    lines.extend(lines_of(&rows));
    lines.push(
        "  A layer pattern may ask for them: NAME@colour=1, NAME@linetype=DASHED*.".to_owned(),
    );
    lines
}

fn texts(contents: &Contents, job: &Job) -> Vec<String> {
    let labels = LABELLED.iter().flat_map(|role| patterns(job, role));
    let labels = work::wanted(labels);
    let ends = EndWords::new(&job.conventions);
    let says = |layer: &str, text: &str, said: &Reading| {
        let end = || text.lines().find_map(|line| ends.kind(line));
        match said {
            _ if !labels.has(layer) => "not read".to_owned(),
            Reading::Unread | Reading::Offered(_) if names_group(text, job) => {
                "group of tendons".to_owned()
            }
            Reading::Unread | Reading::Offered(_) => match end() {
                Some(EndKind::Live) => "live end".to_owned(),
                Some(EndKind::Dead) => "dead end".to_owned(),
                None => said.words().to_owned(),
            },
            _ => said.words().to_owned(),
        }
    };
    let mut rows = vec![vec![
        "Layer".to_owned(),
        "texts, such as".to_owned(),
        "read as".to_owned(),
    ]];
    for (layer, held) in &contents.layers {
        for (index, (text, said)) in held.samples.iter().enumerate() {
            let name = match index {
                0 => format!("  {} ({})", plain(layer), held.texts),
                _ => String::new(),
            };
            let short: String = text.chars().take(40).collect();
            rows.push(vec![name, plain(&short), says(layer, text, said)]);
        }
    }
    if rows.len() == 1 {
        return vec![String::new(), "No texts in model space.".to_owned()];
    }
    let mut lines = vec![String::new()];
    lines.extend(lines_of(&rows));
    lines
}

/// Leaders by layer; those without a text of their own point for the text at their other end.
fn leaders(drawing: &Drawing) -> Vec<String> {
    let mut by_layer: BTreeMap<&str, [usize; 3]> = BTreeMap::new();
    for leader in &drawing.leaders {
        let [all, with_text, arrows] = by_layer.entry(&leader.layer).or_default();
        *all += 1;
        *with_text += usize::from(!leader.texts.is_empty());
        *arrows += leader.arrows.len();
    }
    if by_layer.is_empty() {
        return Vec::new();
    }
    let head = ["Layer", "leaders", "tied to a text", "arrows"];
    let mut rows = vec![head.map(str::to_owned).to_vec()];
    rows.extend(by_layer.into_iter().map(|(layer, counts)| {
        let name = format!("  {}", plain(layer));
        std::iter::once(name)
            .chain(counts.map(|count| count.to_string()))
            .collect()
    }));
    let mut lines = vec![String::new()];
    lines.extend(lines_of(&rows));
    lines
}

fn lines_of(rows: &[Vec<String>]) -> Vec<String> {
    let aligns = vec![Align::Left; rows.first().map_or(0, Vec::len)];
    table(&aligns, rows).lines().map(str::to_owned).collect()
}
