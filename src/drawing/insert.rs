//! DXF out: a [`Sheet`] inserted into the bytes of a drawing, of which nothing else moves.

mod digits;
mod entities;
mod handles;
mod layers;
mod records;
mod splice;
mod words;

use std::borrow::Cow;

use self::entities::{Entities, Scale, handles_of, is_finite, shows};
use self::handles::{Known, Supply, first_in_gap};
use self::layers::{Pattern, write_layers, write_table};
use self::records::{Edition, Records, Style};
use self::splice::Splice;
use super::handles::parse_handle;
use super::scan::Scan;
use super::{Refusal, Sheet, SheetLayer, Source};

/// The drawing with the sheet's layers and marks in it, as the bytes of a DXF file.
///
/// Every byte of the drawing stays, in its order, except for two things: the value of `$HANDSEED`, and the marks of an
/// earlier run, which are those entities of ENTITIES that lie on [`OWN_LAYERS`](super::OWN_LAYERS); the new ones
/// are put in instead. Inserting the same sheet into the result gives the same bytes again. Layers that the drawing has
/// already, in whatever letter case, keep their records. A mark that shows nothing (a line of one point, a circle or
/// text without size, an empty text) is left out.
///
/// # Errors
/// [`Refusal::NoNumber`] if a mark has a coordinate that is no finite number, or `unit_m` is no positive one.
pub fn insert(source: &Source, unit_m: f64, sheet: &Sheet) -> Result<Vec<u8>, Refusal> {
    Ok(insertion(source, unit_m, sheet)?.concat())
}

/// The same as pieces of the original with the marks between them, so that a large drawing is not held twice.
///
/// # Errors
/// As [`insert`].
pub fn insertion<'a>(
    source: &'a Source,
    unit_m: f64,
    sheet: &Sheet,
) -> Result<Vec<Cow<'a, [u8]>>, Refusal> {
    check(unit_m, sheet)?;
    let (bytes, scan) = (source.bytes.as_slice(), &source.scan);
    let style = Style {
        form: scan.form,
        line_end: scan.line_end,
        code_width: scan.code_width,
        edition: Edition::of(scan.release),
    };
    let lacking = lacking_layers(scan, sheet);
    let mut supply = supply(
        bytes,
        scan,
        handles_needed(scan, style.edition, &lacking, sheet),
    );
    let first = supply.next();
    let mut splice = Splice::default();

    insert_layers(&mut splice, scan, style, &lacking, &mut supply);
    for marks in &scan.own_marks {
        splice.replace(marks.clone(), Vec::new());
    }
    let mut entities = Entities {
        records: Records::new(style),
        supply: &mut supply,
        model_space: scan.model_space_record.as_deref().and_then(number),
        scale: Scale { unit_m },
    };
    let mut shown = sheet
        .marks
        .iter()
        .filter(|mark| shows(&mark.drawn))
        .peekable();
    if scan.open_sequence && shown.peek().is_some() {
        entities.end_open_sequence();
    }
    for mark in shown {
        entities.mark(mark);
    }
    let marks = entities.records;
    insert_marks(&mut splice, scan, marks);
    if scan.own_handles.is_some() || first != supply.next() {
        raise_seed(&mut splice, scan, style, supply);
    }
    Ok(splice.pieces(bytes))
}

fn check(unit_m: f64, sheet: &Sheet) -> Result<(), Refusal> {
    if !(unit_m.is_finite() && unit_m > 0.0) {
        return Err(Refusal::NoNumber {
            what: format!("the drawing unit is {unit_m} m"),
        });
    }
    match sheet.marks.iter().find(|mark| !is_finite(&mark.drawn)) {
        Some(mark) => Err(Refusal::NoNumber {
            what: format!("a mark on layer {} lies at no finite place", mark.layer),
        }),
        None => Ok(()),
    }
}

fn number(handle: &str) -> Option<u64> {
    parse_handle(handle.as_bytes())
}

/// The sheet's layers that the drawing's layer table has not, each once.
fn lacking_layers<'a>(scan: &Scan, sheet: &'a Sheet) -> Vec<&'a SheetLayer> {
    let mut lacking: Vec<&SheetLayer> = Vec::new();
    for layer in &sheet.layers {
        let same = |name: &str| name.eq_ignore_ascii_case(&layer.name);
        let there = scan
            .layers
            .iter()
            .any(|own| own.in_table && same(&own.name))
            || lacking.iter().any(|other| same(&other.name));
        if !there {
            lacking.push(layer);
        }
    }
    lacking
}

fn layers_have_handles(scan: &Scan, edition: Edition) -> bool {
    // Layers of R12 drawings that carry handles elsewhere have none as a rule.
    scan.uses_handles && (edition >= Edition::R13 || scan.layers_have_handles)
}

fn handles_needed(scan: &Scan, edition: Edition, lacking: &[&SheetLayer], sheet: &Sheet) -> u64 {
    let layers = lacking.len() as u64;
    let for_layers = match scan.layer_table_end {
        // The table itself and layer "0".
        None => layers + 2,
        Some(_) if layers_have_handles(scan, edition) => layers,
        Some(_) => 0,
    };
    let for_marks: u64 = sheet
        .marks
        .iter()
        .map(|mark| handles_of(&mark.drawn, edition))
        .sum();
    for_layers + for_marks + u64::from(scan.open_sequence)
}

fn known(scan: &Scan) -> Known {
    Known {
        greatest: scan.greatest_handle,
        seed: scan.handseed.as_ref().map(|(_, seed)| *seed),
        own: scan.own_handles,
    }
}

/// Handles for the records to come: those of layers and of what else stays first, then those of the marks, so that a
/// later run, which finds the former and replaces the latter, comes to the same numbers.
fn supply(bytes: &[u8], scan: &Scan, count: u64) -> Supply {
    if !scan.uses_handles {
        return Supply::none();
    }
    let passed_over = scan.passed_over.as_ref();
    let passed_over = passed_over.map_or(&[][..], |over| &over.handles);
    let own_least = scan.own_handles.map(|(least, _)| least);
    known(scan)
        .first_above(count)
        .or_else(|| first_in_gap(bytes, &scan.own_marks, passed_over, own_least, count))
        .map_or(Supply::none(), Supply::from)
}

fn insert_layers(
    splice: &mut Splice,
    scan: &Scan,
    style: Style,
    lacking: &[&SheetLayer],
    supply: &mut Supply,
) {
    let mut records = Records::new(style);
    if let Some(end) = scan.layer_table_end {
        let [plot_style, material, visual_style] = &scan.zero_layer_pointers;
        let pattern = Pattern {
            table: scan.layer_table_handle.as_deref().and_then(number),
            with_handles: layers_have_handles(scan, style.edition),
            plot_style: plot_style.as_deref(),
            material: material.as_deref(),
            visual_style: visual_style.as_deref(),
        };
        write_layers(&mut records, supply, &pattern, lacking);
        splice.insert(end, records.into_bytes());
    } else if lacking.is_empty() {
        // Nothing to name, so no table is needed for it.
    } else if let Some(end) = scan.tables_end {
        write_table(&mut records, supply, lacking);
        splice.insert(end, records.into_bytes());
    } else {
        records.text(0, "SECTION");
        records.text(2, "TABLES");
        write_table(&mut records, supply, lacking);
        records.text(0, "ENDSEC");
        let after = [scan.blocks_start, scan.entities_start, scan.objects_start];
        insert_section(splice, scan, &after, records);
    }
}

fn insert_marks(splice: &mut Splice, scan: &Scan, marks: Records) {
    if marks.is_empty() {
        return;
    }
    if let Some(end) = scan.entities_end {
        splice.insert(end, marks.into_bytes());
        return;
    }
    let mut section = Records::new(marks.style);
    section.text(0, "SECTION");
    section.text(2, "ENTITIES");
    section.append(&marks);
    section.text(0, "ENDSEC");
    insert_section(splice, scan, &[scan.objects_start], section);
}

/// Inserts a section before the first of those that must come after it, before EOF, or behind the last tag.
fn insert_section(splice: &mut Splice, scan: &Scan, after: &[Option<usize>], section: Records) {
    let places = after.iter().copied().chain([scan.eof_start]).flatten();
    let at = places.min().unwrap_or(scan.tags_end);
    splice.insert(at, section.into_bytes());
}

/// Has `$HANDSEED` say what is free now; where the greatest handle leaves no room above it, it stays.
fn raise_seed(splice: &mut Splice, scan: &Scan, style: Style, supply: Supply) {
    let known = known(scan);
    let Some(next) = supply.next().filter(|&next| next > known.greatest) else {
        return;
    };
    let seed = known.seed_after(next);
    let mut records = Records::new(style);
    match (&scan.handseed, scan.header_end) {
        (Some((_, old)), _) if *old == seed => {}
        (Some((value, _)), _) => splice.replace(value.clone(), format!("{seed:X}").into_bytes()),
        // A damaged drawing may have a seed where nothing is read; a second one would do harm.
        (None, Some(end)) if scan.passed_over.is_none() => {
            records.text(9, "$HANDSEED");
            records.handle(5, Some(seed));
            splice.insert(end, records.into_bytes());
        }
        (None, _) => {}
    }
}
