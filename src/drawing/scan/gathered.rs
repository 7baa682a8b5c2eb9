//! Where in the drawing the pass is, and what it holds of the record at hand.

use super::super::lettering::Style;

/// The part of the drawing that the pass is in.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Section {
    Outside,
    Named,
    Header,
    Tables,
    Blocks,
    Entities,
    Other,
}

/// What is being gathered of the record at hand.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Record {
    /// `0 SECTION`, `0 ENDSEC`, a record of no interest.
    None,
    Table,
    Layer,
    BlockHome,
    Dimstyle,
    Style,
    Block,
    Entity,
    /// VERTEX, ATTRIB or SEQEND of the entity before it.
    Follower,
}

/// The tags of one entity or table record that matter here.
#[derive(Default)]
#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a fact of its own about the record"
)]
pub(super) struct Gathered<'a> {
    pub(super) start: usize,
    pub(super) type_id: usize,
    pub(super) name: Option<&'a [u8]>,
    pub(super) handle: Option<&'a [u8]>,
    pub(super) owner: Option<&'a [u8]>,
    pub(super) layer: Option<&'a [u8]>,
    pub(super) paper: bool,
    pub(super) followed: bool,
    pub(super) linetype: Option<&'a [u8]>,
    pub(super) colour: Option<i64>,
    pub(super) flags: i64,
    pub(super) base: [Option<f64>; 2],
    /// A coordinate of the base that is no finite number.
    pub(super) bad_base: bool,
    pub(super) pointers: [Option<&'a [u8]>; 3],
    pub(super) style: Style,
    /// Something in it makes no sense and was passed over.
    pub(super) broken: bool,
    /// The entity before it still waited for its SEQEND.
    pub(super) after_open: bool,
}
