//! From an opened drawing to shapes and texts in metres.

use std::collections::BTreeMap;

use geo::Coord;

use super::answers::Answers;
use super::caps::Caps;
use super::explode::{Book, Gatherer, MOST_TOLD, and_more};
use super::leaders::{Pointing, pointings};
use super::looks::Looks;
use super::rules::{DRAWING_DAMAGED, ENTITY_DAMAGED, TEXT_CODE_PAGE, UNIT_ASSUMED};
use super::scan::{Entry, Scan};
use super::source::Source;
use super::tags::place_in_words;
use super::wanted::Wanted;
use super::windows::{Losses, read_records};
use super::{Drawing, UnitFrom};
use crate::finding::{Finding, Level};
use crate::patterns::folded;
use crate::units::LengthUnit;

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
    let mut findings: Vec<Finding> = unit_finding(scan, unit_from).into_iter().collect();
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

/// Metres in a unit by its `$INSUNITS` number (DXF reference); `None` for none and for what no plan is drawn in.
fn metres_of(insunits: i64) -> Option<f64> {
    Some(match insunits {
        1 => LengthUnit::In.metres(),
        2 => LengthUnit::Ft.metres(),
        4 => LengthUnit::Mm.metres(),
        5 => LengthUnit::Cm.metres(),
        6 => LengthUnit::M.metres(),
        7 => 1000.0,
        10 => 0.9144,
        14 => 0.1,
        15 => 10.0,
        16 => 100.0,
        // US survey foot: 1200/3937 m.
        21 => 1200.0 / 3937.0,
        _ => return None,
    })
}

fn unit_of(scan: &Scan, unit: Option<LengthUnit>) -> (f64, UnitFrom) {
    if let Some(unit) = unit {
        return (unit.metres(), UnitFrom::Job);
    }
    match scan.insunits.and_then(metres_of) {
        Some(unit_m) => (unit_m, UnitFrom::Header),
        None => (LengthUnit::Mm.metres(), UnitFrom::Assumed),
    }
}

fn unit_finding(scan: &Scan, from: UnitFrom) -> Option<Finding> {
    let header = match scan.insunits {
        None => "the drawing has no $INSUNITS".to_owned(),
        Some(number) => {
            format!("$INSUNITS of the drawing is {number}, which names no unit of plans")
        }
    };
    let finding = Finding::new(
        &UNIT_ASSUMED,
        Level::Note,
        format!("{header}; millimetres are assumed"),
        "set the drawing's unit in the job file",
    );
    (from == UnitFrom::Assumed).then_some(finding)
}

fn passed_over_finding(scan: &Scan) -> Option<Finding> {
    let over = scan.passed_over.as_ref()?;
    let more = match over.places {
        1 => String::new(),
        places => format!(" (the first of {places} such places)"),
    };
    let (level, left_out) = match over.left_out {
        0 => (Level::Warning, "no entity is left out for it".to_owned()),
        1 => (Level::Error, "one entity is left out for it".to_owned()),
        n => (Level::Error, format!("{n} entities are left out for it")),
    };
    Some(Finding::new(
        &DRAWING_DAMAGED,
        level,
        format!(
            "the drawing is damaged: at {}, {}{more}; {left_out}",
            over.first, over.what
        ),
        "export or copy the drawing again, and look for what is missing",
    ))
}

fn damage_findings(source: &Source, losses: &Losses) -> Vec<Finding> {
    let scan = &source.scan;
    let shown = losses.damaged.iter().take(MOST_TOLD);
    let mut findings: Vec<Finding> = shown
        .map(|damage| {
            let layer = scan.layers.get(damage.kept.layer as usize);
            let layer = layer.map_or("0", |layer| layer.name.as_str());
            let handle = match &damage.kept.handle {
                Some(handle) => handle.clone(),
                None => format!("#{}", damage.kept.number),
            };
            Finding::new(
                &ENTITY_DAMAGED,
                Level::Error,
                format!(
                    "{} {handle} on layer {layer} is left out: at {}, {}",
                    damage.type_name,
                    place_in_words(&source.bytes, scan.form, damage.at),
                    damage.found
                ),
                "redraw the entity, or export the drawing again",
            )
        })
        .collect();
    findings.extend(and_more(
        &ENTITY_DAMAGED,
        Level::Error,
        losses.damaged.len(),
    ));
    findings
}

fn code_page_finding(scan: &Scan, losses: &Losses) -> Option<Finding> {
    if losses.guessed == 0 && !scan.names_are_guessed {
        return None;
    }
    let why = match &scan.code_page.unsure_of {
        Some(page) => format!("the drawing names {page}, which is not known here"),
        None => "their bytes are not of the drawing's code page".to_owned(),
    };
    let what = if losses.guessed > 0 {
        format!(
            "there are characters beyond ASCII in {} text(s)",
            losses.guessed
        )
    } else {
        "there are characters beyond ASCII in names of layers or blocks".to_owned()
    };
    Some(Finding::new(
        &TEXT_CODE_PAGE,
        Level::Warning,
        format!("{what}, and {why}; they were read as Windows-1252"),
        "look at marks and heights with accents or other scripts; save as R2007 or later to settle them",
    ))
}

fn layer_numbers(scan: &Scan) -> BTreeMap<String, u32> {
    let numbered = (0..).zip(&scan.layers);
    numbered
        .map(|(n, layer)| (folded(&layer.name), n))
        .collect()
}

fn block_of_name(scan: &Scan) -> Vec<Option<usize>> {
    let mut blocks = BTreeMap::new();
    for (index, block) in scan.blocks.iter().enumerate() {
        blocks.entry(folded(&block.name)).or_insert(index);
    }
    let names = scan.block_names.iter();
    names
        .map(|name| blocks.get(&folded(name)).copied())
        .collect()
}

fn is_wanted(book: &Book<'_>, layer: u32) -> bool {
    book.wanted.get(layer as usize).copied().unwrap_or(false)
}

fn inserted(book: &Book<'_>, entry: &Entry) -> Option<usize> {
    let named = book.block_of_name.get(entry.block as usize);
    named.copied().flatten().filter(|_| entry.is_insert)
}

/// By block: whether it holds entities on wanted layers, itself or through its inserts.
fn holds_wanted(book: &Book<'_>) -> Vec<bool> {
    let blocks = &book.scan.blocks;
    let mut users: Vec<Vec<usize>> = vec![Vec::new(); blocks.len()];
    let mut holds = vec![false; blocks.len()];
    let mut news = Vec::new();
    for (index, block) in blocks.iter().enumerate() {
        for entry in &block.entries {
            if let Some(users) = inserted(book, entry).and_then(|inner| users.get_mut(inner)) {
                users.push(index);
            }
            holds[index] |= is_wanted(book, entry.layer);
        }
        let mut of_attributes = block.attribute_layers.iter();
        holds[index] |= of_attributes.any(|&layer| is_wanted(book, layer));
        let mut pointing = block.pointing.iter();
        holds[index] |= pointing.any(|entry| is_wanted(book, entry.layer));
        if holds[index] {
            news.push(index);
        }
    }
    while let Some(index) = news.pop() {
        for &user in users.get(index).into_iter().flatten() {
            if let Some(held) = holds.get_mut(user)
                && !*held
            {
                *held = true;
                news.push(user);
            }
        }
    }
    holds
}

/// The entries of model space that matter: on wanted layers, or inserts that bring in something wanted.
fn top_entries<'s>(book: &Book<'s>) -> Vec<&'s Entry> {
    let scan = book.scan;
    let mut by_attribute = vec![];
    for &(entry, layer) in &scan.attribute_layers {
        if is_wanted(book, layer) {
            by_attribute.push(entry as usize);
        }
    }
    let brings = |entry: &Entry| {
        inserted(book, entry).is_some_and(|block| book.holds_wanted.get(block) == Some(&true))
    };
    let entries = scan.entries.iter().enumerate();
    entries
        .filter(|(index, entry)| {
            is_wanted(book, entry.layer)
                || brings(entry)
                || by_attribute.binary_search(index).is_ok()
        })
        .map(|(_, entry)| entry)
        .collect()
}

/// By block: whether the top entries bring it in.
fn needed_blocks(book: &Book<'_>, top: &[&Entry]) -> Vec<bool> {
    let blocks = &book.scan.blocks;
    let mut needed = vec![false; blocks.len()];
    let mut open: Vec<usize> = top
        .iter()
        .filter_map(|entry| inserted(book, entry))
        .collect();
    while let Some(index) = open.pop() {
        if let (Some(needed), Some(block)) = (needed.get_mut(index), blocks.get(index))
            && !*needed
        {
            *needed = true;
            open.extend(
                block
                    .entries
                    .iter()
                    .filter_map(|entry| inserted(book, entry)),
            );
        }
    }
    needed
}

/// Leaders of every layer, and points that are wanted or may take a wanted layer from an insert.
fn wanted_pointing<'e>(
    book: &'e Book<'_>,
    entries: &'e [Entry],
) -> impl Iterator<Item = &'e Entry> {
    let zero = book.layers.get("0").copied();
    entries.iter().filter(move |entry| {
        !entry.is_dot || Some(entry.layer) == zero || is_wanted(book, entry.layer)
    })
}

/// Leaders and points of every block that is needed.
fn block_pointing(
    source: &Source,
    book: &Book<'_>,
    needed: &[bool],
    losses: &mut Losses,
) -> Vec<Vec<Pointing>> {
    let blocks = book.scan.blocks.iter().zip(needed);
    blocks
        .map(|(block, &needed)| {
            let entries = wanted_pointing(book, &block.pointing).filter(|_| needed);
            pointings(source, entries, losses)
        })
        .collect()
}

/// The records of every block that is needed.
fn block_records(
    source: &Source,
    book: &Book<'_>,
    needed: &[bool],
    losses: &mut Losses,
) -> Vec<Vec<super::windows::Record>> {
    let blocks = &book.scan.blocks;
    let zero = book.layers.get("0").copied();
    let mut entries = Vec::new();
    let mut homes = Vec::new();
    for (index, block) in blocks.iter().enumerate() {
        if !needed[index] {
            continue;
        }
        for entry in &block.entries {
            if entry.is_insert || Some(entry.layer) == zero || is_wanted(book, entry.layer) {
                entries.push(entry);
                homes.push((entry.start, index));
            }
        }
    }
    let mut records = vec![Vec::new(); blocks.len()];
    read_records(source, entries, losses, |record| {
        let home = homes.binary_search_by_key(&record.kept.start, |home| home.0);
        if let Some(home) = home.ok().and_then(|at| homes.get(at))
            && let Some(block) = records.get_mut(home.1)
        {
            block.push(record);
        }
    });
    records
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::open;

    fn with_unit(header: &str, unit: Option<LengthUnit>) -> (Drawing, Vec<Finding>) {
        let text = format!(
            "0 SECTION 2 HEADER {header} 0 ENDSEC 0 SECTION 2 ENTITIES
             0 LINE 8 0 10 0 20 0 11 2 21 0 0 ENDSEC 0 EOF"
        );
        let lines = text.split_whitespace().collect::<Vec<_>>().join("\n");
        let source = open(lines.into_bytes()).expect("a drawing");
        read(&source, &Wanted::everything(), unit)
    }

    #[test]
    fn the_job_goes_before_the_header_and_the_header_before_millimetres() {
        for (header, unit, length_m, from) in [
            (
                "9 $INSUNITS 70 6",
                Some(LengthUnit::Ft),
                0.6096,
                UnitFrom::Job,
            ),
            ("9 $INSUNITS 70 6", None, 2.0, UnitFrom::Header),
            ("9 $INSUNITS 70 1", None, 0.0508, UnitFrom::Header),
            ("9 $INSUNITS 70 2", None, 0.6096, UnitFrom::Header),
            ("9 $INSUNITS 70 5", None, 0.02, UnitFrom::Header),
            ("9 $INSUNITS 70 14", None, 0.2, UnitFrom::Header),
            ("9 $INSUNITS 70 0", None, 0.002, UnitFrom::Assumed),
            ("9 $INSUNITS 70 12", None, 0.002, UnitFrom::Assumed),
            ("", None, 0.002, UnitFrom::Assumed),
        ] {
            let (drawing, findings) = with_unit(header, unit);
            assert_eq!(drawing.unit_from, from, "{header}");
            assert!(
                (drawing.shapes[0].path.length_m() - length_m).abs() < 1e-12,
                "{header}"
            );
            let said = findings
                .iter()
                .any(|finding| finding.rule.name == "unit-assumed");
            assert_eq!(said, from == UnitFrom::Assumed, "{header}");
        }
    }
}
