//! From an opened drawing to shapes and texts in metres.

mod damage;
mod reach;
mod unit;
mod unread;

use geo::Coord;

use super::Drawing;
use super::answers::Answers;
use super::caps::Caps;
use super::explode::{Book, Gatherer};
use super::leaders::pointings;
use super::looks::Looks;
use super::scan::Scan;
use super::source::Source;
use super::wanted::Wanted;
use super::windows::{Losses, read_records};
use crate::finding::Finding;
use crate::units::LengthUnit;
use damage::{code_page_finding, damage_findings, passed_over_finding};
use reach::{
    block_of_name, block_pointing, block_records, holds_wanted, layer_numbers, needed_blocks,
    top_entries, wanted_pointing,
};
use unit::{unit_finding, unit_of};
use unread::{references_finding, unread_findings};

/// Reads the wanted layers of a drawing's model space, blocks exploded, in metres. `unit` is what the job says of the
/// drawing's unit, which goes before the header's word. What could not be read is among the findings.
pub fn read(source: &Source, wanted: &Wanted, unit: Option<LengthUnit>) -> (Drawing, Vec<Finding>) {
    read_within(source, wanted, unit, &Caps::default())
}

/// The same, with blocks expanded no further than the caps allow.
pub fn read_within(
    source: &Source,
    wanted: &Wanted,
    unit: Option<LengthUnit>,
    caps: &Caps,
) -> (Drawing, Vec<Finding>) {
    let scan = &source.scan;
    let (unit_m, unit_from) = unit_of(scan, unit);
    let mut losses = Losses::default();
    let mut book = Book {
        scan,
        wanted: scan.layers.iter().map(|l| wanted.has(&l.name)).collect(),
        block_of_name: block_of_name(scan),
        holds_wanted: Vec::new(),
        records: Vec::new(),
        pointing: Vec::new(),
        layers: layer_numbers(scan),
    };
    book.holds_wanted = holds_wanted(&book);
    let top = top_entries(&book);
    let needed = needed_blocks(&book, &top);
    book.records = block_records(source, &book, &needed, &mut losses);
    book.pointing = block_pointing(source, &book, &needed, &mut losses);
    let pointing = pointings(source, wanted_pointing(&book, &scan.pointing), &mut losses);
    let answers = Answers::to(book.pointing.iter().flatten().chain(&pointing));

    let looks = Looks::new(&source.bytes, scan);
    let expansion = caps.expansion(source, wanted);
    let mut gatherer = Gatherer::new(&book, looks, answers, unit_m, expansion);
    read_records(source, top, &mut losses, |record| gatherer.take(&record));
    for pointing in &pointing {
        gatherer.take_pointing(pointing);
    }
    let (mut drawing, mut of_blocks) = gatherer.finish();
    drawing.version.clone_from(&scan.version);
    drawing.unit_m = unit_m;
    drawing.unit_from = unit_from;
    drawing.metric = match scan.measurement {
        Some(0) => Some(false),
        Some(1) => Some(true),
        _ => None,
    };
    drawing.extent = extent_of(scan, unit_m);
    drawing.layers = source.layers();
    let mut findings: Vec<Finding> = unit_finding(unit_from).into_iter().collect();
    if wanted.chooses() {
        findings.extend(unread_findings(source, &book, &needed));
    }
    findings.extend(references_finding(source, &book));
    findings.extend(passed_over_finding(scan));
    findings.extend(damage_findings(source, &losses));
    findings.append(&mut of_blocks);
    findings.extend(code_page_finding(scan, &losses));
    (drawing, findings)
}

/// The header's extents in metres; an empty drawing's stand at ±1e20, the lower left above the upper right.
fn extent_of(scan: &Scan, unit_m: f64) -> Option<[Coord<f64>; 2]> {
    let [low, high] = scan.extents.map(|[x, y]| {
        Some(Coord {
            x: x? * unit_m,
            y: y? * unit_m,
        })
    });
    let (low, high) = (low?, high?);
    (low.x < high.x && low.y < high.y).then_some([low, high])
}
