//! What the library loses of a record, and what was left out.

use super::Tag;

/// What the library loses of a record, kept beside it.
#[derive(Debug, Clone, Default)]
pub(in crate::drawing) struct Kept {
    /// Number of the record's layer.
    pub(in crate::drawing) layer: u32,
    /// The record's number among its neighbours.
    pub(in crate::drawing) number: u32,
    /// Handle, upper-case hexadecimal without leading zeros.
    pub(in crate::drawing) handle: Option<String>,
    /// Number of the block's name, for an insert.
    pub(in crate::drawing) block: u32,
    /// An insert's attributes, in order.
    pub(in crate::drawing) attributes: Vec<KeptAttribute>,
    /// Offset of the record in the file.
    pub(in crate::drawing) start: usize,
    /// Colour and linetype as written.
    pub(in crate::drawing) worn: Worn,
}

/// An insert's attribute: what the library loses of it.
#[derive(Debug, Clone, Default)]
pub(in crate::drawing) struct KeptAttribute {
    /// Layer as written.
    pub(in crate::drawing) layer: Option<Vec<u8>>,
    /// Handle as for [`Kept`].
    pub(in crate::drawing) handle: Option<String>,
    /// Colour and linetype as written.
    pub(in crate::drawing) worn: Worn,
    /// It is written without a place: its value counts, but it stands nowhere.
    pub(in crate::drawing) nowhere: bool,
}

/// Colour and linetype as an entity writes them; what it leaves out is its layer's.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(in crate::drawing) struct Worn {
    /// Group 62: 0 by block, 256 by layer.
    pub(in crate::drawing) colour: Option<i64>,
    /// Whether group 420 gives a true colour.
    pub(in crate::drawing) true_colour: bool,
    /// Where in the file the linetype's name stands: first byte and past the last.
    pub(in crate::drawing) linetype: Option<(usize, usize)>,
    /// Group 60: not shown, whatever its layer.
    pub(in crate::drawing) invisible: bool,
}

impl Worn {
    /// Takes note of a group that says colour or linetype.
    pub(in crate::drawing) fn note(&mut self, tag: &Tag<'_>) {
        match tag.code {
            6 => {
                let name = tag.value_range();
                self.linetype = Some((name.start, name.end));
            }
            60 => self.invisible = tag.integer() == Some(1),
            62 => self.colour = tag.integer(),
            420 => self.true_colour = true,
            _ => {}
        }
    }
}

/// Why a record was left out.
#[derive(Debug, Clone)]
pub(in crate::drawing) struct Damage {
    /// What was left out.
    pub(in crate::drawing) kept: Kept,
    /// Type name.
    pub(in crate::drawing) type_name: String,
    /// Offset of the trouble in the file.
    pub(in crate::drawing) at: usize,
    /// What was found and what was expected.
    pub(in crate::drawing) found: String,
}
