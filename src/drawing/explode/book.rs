//! What is known of blocks and layers before any record is placed.

use std::collections::BTreeMap;

use crate::drawing::leaders::Pointing;
use crate::drawing::lettering::Style;
use crate::drawing::scan::Scan;
use crate::drawing::text_decode::plain_name;
use crate::drawing::windows::Record;
use crate::patterns::folded;

/// What is known of blocks and layers before any record is placed.
#[derive(Debug)]
pub(in crate::drawing) struct Book<'s> {
    pub(in crate::drawing) scan: &'s Scan,
    /// By layer number: whether it is read.
    pub(in crate::drawing) wanted: Vec<bool>,
    /// By number of a block's name: the block's number.
    pub(in crate::drawing) block_of_name: Vec<Option<usize>>,
    /// By block number: whether it holds entities on layers that are read, itself or through its inserts.
    pub(in crate::drawing) holds_wanted: Vec<bool>,
    /// By block number: its records.
    pub(in crate::drawing) records: Vec<Vec<Record>>,
    /// By block number: its leaders and points.
    pub(in crate::drawing) pointing: Vec<Vec<Pointing>>,
    /// Layer numbers by folded name.
    pub(in crate::drawing) layers: BTreeMap<String, u32>,
}

impl Book<'_> {
    pub(super) fn wants(&self, layer: u32) -> bool {
        self.wanted.get(layer as usize).copied().unwrap_or(false)
    }

    pub(super) fn layer_name(&self, layer: u32) -> &str {
        let layer = self.scan.layers.get(layer as usize);
        layer.map_or("0", |layer| layer.name.as_str())
    }

    pub(super) fn block_name(&self, name: u32) -> &str {
        let name = self.scan.block_names.get(name as usize);
        name.map_or("", String::as_str)
    }

    /// A block's base point; `None` for a damaged one.
    pub(super) fn base(&self, block: usize) -> Option<[f64; 2]> {
        self.scan.blocks.get(block).and_then(|block| block.base)
    }

    pub(super) fn block(&self, name: u32) -> Option<usize> {
        self.block_of_name.get(name as usize).copied().flatten()
    }

    pub(super) fn style(&self, name: &str) -> Style {
        let name = folded(&plain_name(name));
        self.scan.styles.get(&name).copied().unwrap_or_default()
    }

    /// The number of a layer by its bytes.
    pub(super) fn layer_id(&self, raw: &[u8]) -> Option<u32> {
        let (name, _) = self.scan.code_page.decode(raw);
        let name = plain_name(&name);
        self.layers.get(&folded(&name)).copied()
    }
}
