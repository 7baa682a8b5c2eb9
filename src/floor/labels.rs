//! The drawing's texts sorted by what they are for, read, and put in an order that their places decide.

use std::cmp::Ordering;
use std::collections::{BTreeSet, HashMap};

use super::label_text::{changes, label};
use super::layers::{Labels as Role, Roles};
use super::marking::Marking;
use super::readings::HeightText;
use super::rules::{LABEL_CONTRADICTED, LABEL_UNREAD};
use super::writing::Writing;
use crate::drawing::{Drawing, Text};
use crate::finding::{Finding, Level};
use crate::geometry::distance_m;
use crate::job::Job;
use crate::job::families::offered;

/// Texts on label layers.
#[derive(Default)]
pub(super) struct Labels<'a> {
    pub(super) heights: Vec<(&'a Text, HeightText)>,
    pub(super) marks: Vec<(&'a Text, Marking)>,
    /// Texts on layers of heights that say none.
    pub(super) unread: Vec<&'a Text>,
}

/// The same text this near is a copy, metres.
const COPY_M: f64 = 0.005;

/// Reads all labels but those that level lines took.
pub(super) fn labels<'a>(
    drawing: &'a Drawing,
    job: &Job,
    roles: &Roles,
    taken: &BTreeSet<usize>,
) -> (Labels<'a>, Vec<Finding>) {
    let mut texts: Vec<&Text> = drawing
        .texts
        .iter()
        .enumerate()
        .filter(|(at, text)| !taken.contains(at) && usable(text))
        .map(|(_, text)| text)
        .filter(|text| {
            let label = roles.of(&text.layer, text.look).label;
            label.heights || label.marks || label.level_lines
        })
        .collect();
    texts.sort_by(|a, b| by_place(a, b));
    let texts = without_copies(&texts);
    let mut labels = Labels::default();
    let mut findings = Vec::new();
    let writing = Writing::of(drawing, job, roles);
    for text in texts {
        let of = roles.of(&text.layer, text.look).label;
        let said = label(&text.content, of.heights, of.marks, job);
        let silent = said.height.is_none() && said.mark.is_none();
        findings.extend(said.against.iter().map(|why| contradicted(text, why)));
        // What nobody sees need not say anything that is for us.
        if !text.hidden {
            if silent {
                findings.push(silent_label(text, of, job));
            } else {
                findings.extend(said.left.iter().map(|line| left_over(text, line)));
            }
        }
        let cannot_be_read = silent && of.heights && !text.hidden;
        labels.unread.extend(cannot_be_read.then_some(text));
        if let Some(height) = said.height {
            labels.heights.push((text, writing.means(height)));
        }
        labels.marks.extend(said.mark.map(|mark| (text, mark)));
    }
    (labels, findings)
}

/// A label of which nothing was read.
fn silent_label(text: &Text, of: Role, job: &Job) -> Finding {
    let expected = match (of.heights || of.level_lines, of.marks) {
        (true, false) => "a height such as H165, L30 or 165",
        (false, true) => "a mark or strand count such as D012 5-12.7",
        _ => "a height such as H165 or a mark such as D012 5-12.7",
    };
    let readable = label(&text.content, true, false, job).height.is_some();
    let what = if readable && of.level_lines {
        "is a height, but no level line is within reach"
    } else {
        "cannot be read"
    };
    unread(text, what, expected)
}

/// A line of a label of which another line was read.
pub(super) fn left_over(text: &Text, line: &str) -> Finding {
    let what = if changes(line) {
        format!(
            "has the line {line:?}, which cannot be read and may change what the others say; they were taken as they stand"
        )
    } else {
        format!("has the line {line:?}, which cannot be read; the others were")
    };
    unread(
        text,
        &what,
        "a height, a mark or a strand count in each line",
    )
}

/// A label that speaks against itself.
fn contradicted(text: &Text, why: &str) -> Finding {
    Finding::new(
        &LABEL_CONTRADICTED,
        Level::Error,
        format!(
            "text {:?} on layer {} contradicts itself: {why}; neither was used",
            text.content, text.layer
        ),
        "correct the text, so that it says each thing once",
    )
    .at_place(text.place)
}

/// Of texts that say the same at one place the first, wherever in the order the others stand.
fn without_copies<'a>(texts: &[&'a Text]) -> Vec<&'a Text> {
    // Texts by squares as wide as a copy may be off: a copy stands in the same one or in one beside it.
    let square = |text: &Text| {
        #[expect(
            clippy::cast_possible_truncation,
            reason = "places so far off that they leave the range share its last square"
        )]
        let square = [text.place.x, text.place.y].map(|x| (x / COPY_M).floor() as i64);
        square
    };
    let mut kept: Vec<&Text> = Vec::with_capacity(texts.len());
    let mut by_square: HashMap<[i64; 2], Vec<usize>> = HashMap::with_capacity(texts.len());
    for text in texts {
        let [x, y] = square(text);
        let around = (-1..=1).flat_map(|dx| (-1..=1).map(move |dy| (dx, dy)));
        let copied = around
            .filter_map(|(dx, dy)| by_square.get(&[x.saturating_add(dx), y.saturating_add(dy)]))
            .flatten()
            .any(|&at| {
                let other = kept[at];
                other.content == text.content
                    && other.layer == text.layer
                    && distance_m(other.place, text.place) < COPY_M
            });
        if !copied {
            by_square.entry([x, y]).or_default().push(kept.len());
            kept.push(text);
        }
    }
    kept
}

fn unread(text: &Text, what: &str, expected: &str) -> Finding {
    let known = text.content.lines().find_map(offered);
    let remedy = known.map_or_else(
        || "correct the text, move it to another layer if it is no label, or give its pattern in the job file".to_owned(),
        |offer| {
            format!(
                "if it is a {}, take that pattern into the job file ({}; survey proposes it): {}",
                offer.pattern.label(), offer.key, offer.caution
            )
        },
    );
    Finding::new(
        &LABEL_UNREAD,
        Level::Warning,
        format!(
            "text {:?} on layer {} {what}; expected {expected}",
            text.content, text.layer
        ),
        remedy,
    )
    .at_place(text.place)
}

/// Whether a text lies somewhere and has a size.
fn usable(text: &Text) -> bool {
    let finite = |c: &geo::Coord<f64>| c.x.is_finite() && c.y.is_finite();
    finite(&text.place)
        && text.corners.iter().all(finite)
        && text.height_m.is_finite()
        && text.height_m > 0.0
        && text.rotation_rad.is_finite()
        && !text.content.trim().is_empty()
}

fn by_place(a: &Text, b: &Text) -> Ordering {
    a.place
        .x
        .total_cmp(&b.place.x)
        .then(a.place.y.total_cmp(&b.place.y))
        .then_with(|| a.content.cmp(&b.content))
        .then_with(|| a.layer.cmp(&b.layer))
        .then(a.rotation_rad.total_cmp(&b.rotation_rad))
        .then(a.height_m.total_cmp(&b.height_m))
        .then_with(|| a.handle.cmp(&b.handle))
}
