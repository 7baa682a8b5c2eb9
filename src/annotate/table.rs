//! The table of tendons: a row each, in the floor's order, in as many columns of rows as the sheet bears.

use geo::Coord;

use super::legend::HEADING;
use super::place::Block;
use super::{layers, words};
use crate::analysis::{Analysis, TendonResult, pair};
use crate::drawing::{Align, Drawn, Mark};
use crate::floor::{End, EndKind, Tendon};
use crate::job::{Job, LongTermMethod};
use crate::losses::EndForces;
use crate::units::{FORCE, LONG, SHORT, Unit, Units};

/// Lines of heading over each column.
const HEAD_LINES: usize = 2;
/// Columns of words; numbers stand to the right.
const WORDS: [usize; 3] = [0, 1, 3];
/// Rows of one part of the table, and parts before their rows grow more.
const MOST_ROWS: usize = 80;
const MOST_PARTS: usize = 10;
/// Row height, and blank beside a cell's text, in letter heights.
const PITCH: f64 = 1.8;
const PAD: f64 = 0.7;
/// A heavier rule after so many rows leads the eye.
const RULE_EVERY: usize = 5;

type Row = Vec<String>;

/// What stands over each column, line by line; a column for each method beside the drawn one.
fn heads(units: Units, beside: &[LongTermMethod]) -> [Row; HEAD_LINES] {
    let [force, long, short] = [FORCE, LONG, SHORT].map(|quantity| units.of(quantity).name);
    let (least, mean) = (format!("least {force}"), format!("mean {force}"));
    let mut heads = vec![
        ["mark", ""],
        ["strands", ""],
        ["plan", long],
        ["ends", ""],
        ["jacking", force],
        ["service", &least],
        ["service", &mean],
    ];
    heads.extend(beside.iter().map(|method| [method.word(), mean.as_str()]));
    let [first, second] = ["first", "second"].map(|which| format!("ext {short} {which}"));
    heads.extend([
        [first.as_str(), "gross (net)"],
        [second.as_str(), "gross (net)"],
        ["curvature", "loss %"],
        ["least at", "jacking %"],
        ["find-", "ings"],
    ]);
    [0, 1].map(|line| heads.iter().map(|head| head[line].to_owned()).collect())
}

/// The table as a block, with letters of the given height.
pub(super) fn table(analysis: &Analysis, job: &Job, letter_m: f64) -> Block {
    let beside: Vec<LongTermMethod> = analysis.methods().into_iter().skip(1).collect();
    let rows = rows(analysis, job, &beside);
    let heads = heads(job.units, &beside);
    let widths_m = widths_m(&heads, &rows, letter_m);
    let part_m: f64 = widths_m.iter().sum();
    // Parts of like length, about as high as the floor.
    let per_part = rows.len().div_ceil(MOST_PARTS).max(MOST_ROWS);
    let per_part = rows
        .len()
        .div_ceil(rows.len().div_ceil(per_part).max(1))
        .max(1);
    let mut block = Block::default();
    let top_m = 3.0 * letter_m;
    let force = job.units.of(FORCE).name;
    let title = format!("{HEADING}: table of tendons, forces in {force} per tendon");
    block.width_m = words::width_m(&title, 1.2 * letter_m);
    let place = Coord {
        x: 0.0,
        y: -letter_m,
    };
    block
        .marks
        .push(text(place, 1.2 * letter_m, Align::MiddleLeft, title));
    for (part, chunk) in (0_u32..).zip(rows.chunks(per_part)) {
        let left_m = f64::from(part) * (part_m + 3.0 * letter_m);
        let bottom_m = draw_part(
            &mut block.marks,
            &heads,
            chunk,
            &widths_m,
            (left_m, top_m),
            letter_m,
        );
        block.width_m = block.width_m.max(left_m + part_m);
        block.height_m = block.height_m.max(bottom_m);
    }
    block.height_m = block.height_m.max(top_m);
    block
}

/// Draws heading, cells and rules of one part; gives its bottom below the block's top, metres.
fn draw_part(
    marks: &mut Vec<Mark>,
    heads: &[Row],
    rows: &[Row],
    widths_m: &[f64],
    (left_m, top_m): (f64, f64),
    letter_m: f64,
) -> f64 {
    let pitch_m = PITCH * letter_m;
    let right_m = left_m + widths_m.iter().sum::<f64>();
    let mut rule = |from: (f64, f64), to: (f64, f64)| {
        let point = |(x, down): (f64, f64)| Coord { x, y: -down };
        let drawn = Drawn::Line {
            points: vec![point(from), point(to)],
            width_m: 0.0,
            closed: false,
        };
        marks.push(layers::mark(layers::TABLE, drawn));
    };
    let below = |row: usize| top_m + pitch_m * f64::from(u32::try_from(row).unwrap_or(u32::MAX));
    let bottom_m = below(rows.len() + heads.len());
    let last = rows.len();
    let ruled = (0..=last).filter(|row| row % RULE_EVERY == 0 || *row == last);
    for down in ruled.map(|row| below(row + heads.len())).chain([top_m]) {
        rule((left_m, down), (right_m, down));
    }
    let mut x = left_m;
    let mut edges = vec![left_m];
    for width in widths_m {
        x += width;
        edges.push(x);
    }
    for edge in &edges {
        rule((*edge, top_m), (*edge, bottom_m));
    }
    for (number, row) in heads.iter().chain(rows).cloned().enumerate() {
        let middle = -(below(number) + pitch_m / 2.0);
        for (column, (content, sides)) in row.into_iter().zip(edges.windows(2)).enumerate() {
            let [from, to] = sides else { continue };
            if content.is_empty() {
                continue;
            }
            let (x, align) = if WORDS.contains(&column) {
                (from + PAD * letter_m, Align::MiddleLeft)
            } else {
                (to - PAD * letter_m, Align::MiddleRight)
            };
            marks.push(text(Coord { x, y: middle }, letter_m, align, content));
        }
    }
    bottom_m
}

fn text(place: Coord<f64>, height_m: f64, align: Align, content: String) -> Mark {
    let drawn = Drawn::Text {
        place,
        height_m,
        rotation_rad: 0.0,
        align,
        content,
    };
    layers::mark(layers::TABLE, drawn)
}

fn widths_m(heads: &[Row; HEAD_LINES], rows: &[Row], letter_m: f64) -> Vec<f64> {
    let mut widths_m = vec![0.0_f64; heads[0].len()];
    for row in heads.iter().chain(rows) {
        for (width, cell) in widths_m.iter_mut().zip(row) {
            *width = width.max(words::width_m(cell, letter_m));
        }
    }
    let padded = |width_m: f64| width_m + 2.0 * PAD * letter_m;
    widths_m.into_iter().map(padded).collect()
}

fn rows(analysis: &Analysis, job: &Job, beside: &[LongTermMethod]) -> Vec<Row> {
    pair(analysis)
        .zip(analysis.findings_by_tendon())
        .map(|((tendon, result), found)| row(tendon, result, job, beside, found.len()))
        .collect()
}

fn row(
    tendon: &Tendon,
    result: &TendonResult,
    job: &Job,
    beside: &[LongTermMethod],
    findings: usize,
) -> Row {
    let [first, second] = ends_on_plan(tendon);
    let forces = result.forces.as_ref();
    let or_dash = |value: Option<String>| value.unwrap_or_else(|| "-".to_owned());
    let force = job.units.of(FORCE);
    let whole = |value: Option<f64>| or_dash(value.map(|kn| force.figure(kn, 0)));
    let percent = |part: Option<f64>| or_dash(part.map(|share| format!("{:.1}", 100.0 * share)));
    let least_kn = result
        .samples
        .iter()
        .filter_map(|sample| sample.forces_kn[3])
        .min_by(f64::total_cmp)
        .filter(|_| forces.is_some());
    let short = job.units.of(SHORT);
    let extension =
        |at: usize| or_dash(forces.and_then(|forces| extension(forces.ends.get(at)?, short)));
    let mut row = vec![
        words::name(&tendon.mark),
        strands(tendon, job),
        job.units.of(LONG).figure(tendon.path.length_m(), 2),
        ends(tendon, [first, second]),
        whole(forces.map(|forces| forces.jack_kn)),
        whole(least_kn),
        whole(forces.and_then(|forces| Some(forces.later?.mean_service_kn))),
    ];
    row.extend(beside.iter().map(|&method| {
        let one = result.by_method.iter().find(|one| one.method == method);
        let forces = one.and_then(|one| one.outcome.as_ref().ok());
        whole(forces.map(|forces| forces.mean_service_kn))
    }));
    row.extend([
        extension(first),
        extension(second),
        percent(forces.map(|f| f.totals.friction_curvature_kn / f.jack_kn)),
        percent(forces.map(|f| f.least_jacking_kn / f.jack_kn)),
        findings.to_string(),
    ]);
    row
}

/// The ends as the plan shows them: the left one first, or the lower one where the tendon runs rather up than across.
fn ends_on_plan(tendon: &Tendon) -> [usize; 2] {
    let run = tendon.ends[1].place - tendon.ends[0].place;
    let ahead = if run.x.abs() >= run.y.abs() {
        run.x
    } else {
        run.y
    };
    if ahead < 0.0 { [1, 0] } else { [0, 1] }
}

/// `4x5-12.7`: tendons in the line, strands of each, size, as far as drawing and job say.
fn strands(tendon: &Tendon, job: &Job) -> String {
    let times = match tendon.tendons {
        1 => String::new(),
        more => format!("{more}x"),
    };
    let strands = tendon.strands.map_or("?".to_owned(), |n| n.to_string());
    let size = tendon.strand.as_deref();
    let size = size.or(job.tendon.default_strand.as_deref());
    let size = size.map(words::name);
    let size = size.map(|size| format!("-{size}")).unwrap_or_default();
    format!("{times}{strands}{size}")
}

/// `live-dead`; with the number of intermediate anchors between, if there are any.
fn ends(tendon: &Tendon, in_order: [usize; 2]) -> String {
    let words = in_order.map(|at| end_word(&tendon.ends[at])).join("-");
    match tendon.joints.len() {
        0 => words,
        1 => format!("{words}, 1 joint"),
        more => format!("{words}, {more} joints"),
    }
}

fn end_word(end: &End) -> &'static str {
    match end.kind {
        Some(EndKind::Live) => "live",
        Some(EndKind::Dead) => "dead",
        None => "?",
    }
}

fn extension(end: &EndForces, short: Unit) -> Option<String> {
    let gross = short.figure(end.extension_mm?, 0);
    Some(match end.extension_net_mm {
        Some(net_mm) => format!("{gross} ({})", short.figure(net_mm, 0)),
        None => gross,
    })
}
