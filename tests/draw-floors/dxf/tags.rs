//! Group codes and values, one pair after another, and the handles that tie them together.

use std::collections::BTreeMap;
use std::fmt::{Display, Write as _};

use super::Xy;

/// Handles that other records point at, the same in every drawing.
pub(super) mod fixed {
    pub(in super::super) const BLOCK_RECORDS: u64 = 0x1;
    pub(in super::super) const LAYERS: u64 = 0x2;
    pub(in super::super) const STYLES: u64 = 0x3;
    pub(in super::super) const LINETYPES: u64 = 0x5;
    pub(in super::super) const VIEWS: u64 = 0x6;
    pub(in super::super) const UCS: u64 = 0x7;
    pub(in super::super) const VIEWPORTS: u64 = 0x8;
    pub(in super::super) const APPIDS: u64 = 0x9;
    pub(in super::super) const DIMSTYLES: u64 = 0xA;
    pub(in super::super) const ROOT: u64 = 0xC;
    pub(in super::super) const GROUPS: u64 = 0xD;
    pub(in super::super) const LAYOUTS: u64 = 0xE;
    pub(in super::super) const MATERIALS: u64 = 0xF;
    pub(in super::super) const MLINE_STYLES: u64 = 0x10;
    pub(in super::super) const PLOT_SETTINGS: u64 = 0x11;
    pub(in super::super) const PLOT_STYLES: u64 = 0x12;
    pub(in super::super) const PLOT_STYLE_NORMAL: u64 = 0x13;
    pub(in super::super) const MODEL_LAYOUT: u64 = 0x14;
    pub(in super::super) const PAPER_LAYOUT: u64 = 0x15;
    pub(in super::super) const MATERIAL_BY_BLOCK: u64 = 0x16;
    pub(in super::super) const MATERIAL_BY_LAYER: u64 = 0x17;
    pub(in super::super) const MATERIAL_GLOBAL: u64 = 0x18;
    pub(in super::super) const MLINE_STANDARD: u64 = 0x19;
    pub(super) const FIRST_FREE: u64 = 0x40;
}

/// What has been written so far.
pub(super) struct Tags {
    text: String,
    next_handle: u64,
    blocks: BTreeMap<String, u64>,
}

/// A finished body and the first handle that nothing in it uses.
pub(super) struct Body {
    pub(super) text: String,
    pub(super) next_handle: u64,
}

impl Tags {
    /// Sets three handles aside for each block: its record, its beginning, its end.
    pub(super) fn new(block_names: &[&str]) -> Self {
        let mut next_handle = fixed::FIRST_FREE;
        let mut blocks = BTreeMap::new();
        for name in block_names {
            blocks.insert((*name).to_owned(), next_handle);
            next_handle += 3;
        }
        Self {
            text: String::new(),
            next_handle,
            blocks,
        }
    }

    pub(super) fn put(&mut self, code: u16, value: impl Display) -> &mut Self {
        // Writing into a string cannot fail.
        let _ = write!(self.text, "{code:>3}\n{value}\n");
        self
    }

    pub(super) fn handle(&mut self, code: u16, handle: u64) -> &mut Self {
        self.put(code, format_args!("{handle:X}"))
    }

    /// Gives the record being written a handle of its own (group 5).
    pub(super) fn fresh(&mut self) -> u64 {
        let handle = self.take_handle();
        self.handle(5, handle);
        handle
    }

    /// A handle of its own for a record that keeps it under another code.
    pub(super) fn take_handle(&mut self) -> u64 {
        let handle = self.next_handle;
        self.next_handle += 1;
        handle
    }

    /// A length or factor to a ten-thousandth, so that the last bits of a platform's sine cannot show.
    pub(super) fn real(&mut self, code: u16, value: f64) -> &mut Self {
        self.rounded(code, value, 4)
    }

    /// A bulge or an angle, where a ten-thousandth is not enough.
    pub(super) fn fine(&mut self, code: u16, value: f64) -> &mut Self {
        self.rounded(code, value, 9)
    }

    fn rounded(&mut self, code: u16, value: f64, decimals: usize) -> &mut Self {
        let padded = format!("{value:.decimals$}");
        let trimmed = padded.trim_end_matches('0');
        let whole = if trimmed.ends_with('.') {
            format!("{trimmed}0")
        } else {
            trimmed.to_owned()
        };
        self.put(code, if whole == "-0.0" { "0.0" } else { &whole })
    }

    pub(super) fn xy(&mut self, code: u16, at: Xy) -> &mut Self {
        self.real(code, at[0]).real(code + 10, at[1])
    }

    pub(super) fn xyz(&mut self, code: u16, at: Xy) -> &mut Self {
        self.xy(code, at).real(code + 20, 0.0)
    }

    pub(super) fn section(&mut self, name: &str) {
        self.put(0, "SECTION").put(2, name);
    }

    pub(super) fn end_section(&mut self) {
        self.put(0, "ENDSEC");
    }

    /// Handles of a block's record, beginning and end.
    pub(super) fn block_handles(&self, name: &str) -> [u64; 3] {
        let first = self.blocks.get(name).copied().unwrap_or_default();
        [first, first + 1, first + 2]
    }

    pub(super) fn finish(self) -> Body {
        Body {
            text: self.text,
            next_handle: self.next_handle,
        }
    }
}
