//! A drawing as it came: its bytes, and what one pass over them found.

use std::collections::{BTreeMap, BTreeSet};

use super::Layer;
use super::caps::Caps;
use super::refusal::Refusal;
use super::scan::{Scan, scan};
use crate::patterns::folded;

/// A drawing's bytes and what one pass over them found; from it shapes are read, and into it marks are inserted.
#[derive(Debug, Clone)]
pub struct Source {
    pub(super) bytes: Vec<u8>,
    pub(super) scan: Scan,
}

/// Opens a drawing: ASCII or binary DXF of any version.
///
/// # Errors
/// A [`Refusal`] for what is no DXF, is cut short, or holds a line that is no group code.
pub fn open(bytes: Vec<u8>) -> Result<Source, Refusal> {
    open_within(bytes, &Caps::default())
}

/// The same within these caps.
///
/// # Errors
/// As [`open`], and for more names of layers and types than there is room for.
pub fn open_within(bytes: Vec<u8>, caps: &Caps) -> Result<Source, Refusal> {
    let scan = scan(&bytes, caps)?;
    Ok(Source { bytes, scan })
}

impl Source {
    /// `$ACADVER`, such as `AC1027`; empty if the header has none.
    pub fn version(&self) -> &str {
        &self.scan.version
    }

    /// The drawing's bytes, as they came.
    pub fn bytes(&self) -> &[u8] {
        &self.bytes
    }

    /// The same without the list of its entities, which takes a fifth of the room and which insertion does not need.
    #[must_use]
    pub fn for_insertion(mut self) -> Self {
        self.scan.entries = Vec::new();
        self.scan.pointing = Vec::new();
        self.scan.blocks = Vec::new();
        self.scan.attribute_layers = Vec::new();
        self
    }

    /// External references that model space inserts and whose contents are not in the drawing: their names, sorted.
    pub fn absent_references(&self) -> Vec<&str> {
        let scan = &self.scan;
        let blocks = scan.blocks.iter();
        let absent = blocks.filter(|block| block.is_absent_reference());
        let mut absent: BTreeMap<String, &str> = absent
            .map(|block| (folded(&block.name), block.name.as_str()))
            .collect();
        if !absent.is_empty() {
            let inserts = scan.entries.iter().filter(|entry| entry.is_insert);
            let named = inserts.filter_map(|insert| scan.block_names.get(insert.block as usize));
            let named: BTreeSet<String> = named.map(|name| folded(name)).collect();
            absent.retain(|name, _| named.contains(name));
        }
        absent.into_values().collect()
    }

    /// Every layer but this tool's own, in the table's order; layers that only entities name follow.
    pub fn layers(&self) -> Vec<Layer> {
        let scan = &self.scan;
        let layers = scan.layers.iter().enumerate();
        layers
            .filter(|(_, layer)| !layer.is_own())
            .map(|(index, layer)| {
                let row = scan.counts.get(index).map_or(&[][..], Vec::as_slice);
                let mut counts: Vec<(String, usize)> = row
                    .iter()
                    .filter_map(|(name, count)| Some((scan.types.get(*name)?.clone(), *count)))
                    .collect();
                counts.sort();
                Layer {
                    name: layer.name.clone(),
                    off: layer.off(),
                    frozen: layer.frozen(),
                    counts,
                }
            })
            .collect()
    }
}
