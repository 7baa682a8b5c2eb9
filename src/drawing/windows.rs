//! Records through the DXF library in windows of about a megabyte, so that neither memory nor damage spreads.

use std::panic::{AssertUnwindSafe, catch_unwind};

use dxf::entities::{Entity, EntityType};

use super::clean::{Cleaner, Damage, Kept};
use super::scan::Entry;
use super::source::Source;

/// A record as the library reads it, with what the library loses.
#[derive(Debug, Clone)]
pub(super) struct Record {
    /// What the library reads.
    pub(super) entity: EntityType,
    /// Elevation, drawing units.
    pub(super) elevation: f64,
    /// What it loses.
    pub(super) kept: Kept,
}

/// What was left out or guessed on the way.
#[derive(Debug, Default)]
pub(super) struct Losses {
    /// Records left out.
    pub(super) damaged: Vec<Damage>,
    /// Strings whose characters had to be guessed.
    pub(super) guessed: usize,
    /// Records that may lack something and are read as they are.
    pub(super) doubtful: Vec<Damage>,
}

const WINDOW_BYTES: usize = 1 << 20;

/// Hands every record on, in order; damaged ones go to `losses`.
pub(super) fn read_records<'e>(
    source: &Source,
    entries: impl IntoIterator<Item = &'e Entry>,
    losses: &mut Losses,
    mut hand_on: impl FnMut(Record),
) {
    let mut cleaner = Cleaner::new(&source.bytes, &source.scan);
    let mut window: Vec<&Entry> = Vec::new();
    for entry in entries {
        match cleaner.add(entry) {
            Ok(()) => window.push(entry),
            Err(damage) => losses.damaged.push(*damage),
        }
        if cleaner.len() > WINDOW_BYTES {
            load(source, &mut cleaner, &window, losses, &mut hand_on);
            window.clear();
        }
    }
    load(source, &mut cleaner, &window, losses, &mut hand_on);
    losses.guessed += cleaner.guessed;
    losses.doubtful.append(&mut cleaner.doubtful);
}

/// Loads one window; if the library fails or loses a record, each half of it, down to the record.
fn load(
    source: &Source,
    cleaner: &mut Cleaner<'_>,
    window: &[&Entry],
    losses: &mut Losses,
    hand_on: &mut impl FnMut(Record),
) {
    let (stream, kept) = cleaner.take();
    if window.is_empty() {
        return;
    }
    match load_stream(&stream, kept) {
        Ok(records) => records.into_iter().for_each(hand_on),
        Err(mut kept) if window.len() == 1 => {
            losses.damaged.extend(kept.pop().map(|kept| Damage {
                at: kept.start,
                kept,
                type_name: "entity".into(),
                found: "its groups contradict one another".into(),
            }));
        }
        Err(_) => {
            let mut again = Cleaner::new(&source.bytes, &source.scan);
            let (first, second) = window.split_at(window.len() / 2);
            for half in [first, second] {
                for entry in half {
                    if let Err(damage) = again.add(entry) {
                        losses.damaged.push(*damage);
                    }
                }
                load(source, &mut again, half, losses, hand_on);
            }
        }
    }
}

/// The library's reading of a stream, or the stream's side table back if it fails, panics or loses a record.
fn load_stream(stream: &[u8], kept: Vec<Kept>) -> Result<Vec<Record>, Vec<Kept>> {
    let loaded = catch_unwind(AssertUnwindSafe(|| {
        let mut reader = stream;
        dxf::Drawing::load_with_encoding(&mut reader, encoding_rs::UTF_8)
            .map(|mut drawing| drawing.entities_mut().map(take).collect::<Vec<_>>())
    }));
    let Ok(Ok(loaded)) = loaded else {
        return Err(kept);
    };
    let in_order = (1_u64..).zip(&loaded);
    let whole = loaded.len() == kept.len();
    if !whole || in_order.into_iter().any(|(n, (handle, ..))| *handle != n) {
        return Err(kept);
    }
    let records = loaded.into_iter().zip(kept);
    Ok(records
        .map(|((_, entity, elevation), kept)| Record {
            entity,
            elevation,
            kept,
        })
        .collect())
}

fn take(entity: &mut Entity) -> (u64, EntityType, f64) {
    let specific = std::mem::replace(
        &mut entity.specific,
        EntityType::Seqend(dxf::entities::Seqend::default()),
    );
    (entity.common.handle.0, specific, entity.common.elevation)
}
