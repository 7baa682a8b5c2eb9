//! Names met in one pass, each turned into a small number: layers without regard to case, types as written.

use std::collections::HashMap;

use super::code_page::CodePage;
use super::leaders::POINTING_TYPES;
use super::scan::READ_TYPES;
use super::sheet::OWN_LAYERS;
use super::text_decode::plain_name;
use crate::patterns::folded;

/// A layer as the pass finds it.
#[derive(Debug, Clone, Default)]
pub(super) struct ScannedLayer {
    /// Name, decoded.
    pub(super) name: String,
    /// Whether the layer table has a record of it.
    pub(super) in_table: bool,
    /// Its record's handle, as written.
    pub(super) handle: Option<String>,
    /// Group 62: negative for a layer that is off.
    pub(super) colour: Option<i64>,
    /// Linetype, as written.
    pub(super) linetype: Option<Vec<u8>>,
    /// Group 70: 1 frozen, 4 locked.
    pub(super) flags: i64,
}

impl ScannedLayer {
    /// Switched off.
    pub(super) fn off(&self) -> bool {
        self.colour.is_some_and(|colour| colour < 0)
    }

    /// Frozen.
    pub(super) fn frozen(&self) -> bool {
        self.flags & 1 != 0
    }

    /// Whether the layer is this tool's own.
    pub(super) fn is_own(&self) -> bool {
        is_own(&self.name)
    }
}

/// Whether a layer of this name is this tool's own, in any letter case.
pub(super) fn is_own(name: &str) -> bool {
    OWN_LAYERS.iter().any(|own| own.eq_ignore_ascii_case(name))
}

/// Layer names and what is known of each layer.
#[derive(Debug, Default)]
pub(super) struct LayerNames<'a> {
    layers: Vec<ScannedLayer>,
    own: Vec<bool>,
    by_bytes: HashMap<&'a [u8], u32>,
    by_name: HashMap<String, u32>,
    lately: Lately<'a>,
    /// Whether some name could not be decoded with certainty.
    pub(super) guessed: bool,
}

impl<'a> LayerNames<'a> {
    /// The layer's number.
    pub(super) fn id(&mut self, raw: &'a [u8], code_page: &CodePage) -> u32 {
        if let Some(id) = self.lately.get(raw) {
            return id;
        }
        let id = match self.by_bytes.get(raw) {
            Some(&id) => id,
            None => self.learn(raw, code_page),
        };
        self.lately.put(raw, id);
        id
    }

    fn learn(&mut self, raw: &'a [u8], code_page: &CodePage) -> u32 {
        let (name, guessed) = code_page.decode(raw);
        self.guessed |= guessed;
        let name = plain_name(&name);
        let next = u32::try_from(self.layers.len()).unwrap_or(u32::MAX);
        let id = *self.by_name.entry(folded(&name)).or_insert(next);
        if id == next {
            self.own.push(is_own(&name));
            self.layers.push(ScannedLayer {
                name,
                ..ScannedLayer::default()
            });
        }
        self.by_bytes.insert(raw, id);
        id
    }

    /// How many there are.
    pub(super) fn len(&self) -> usize {
        self.layers.len()
    }

    /// Whether the layer is this tool's own.
    pub(super) fn is_own(&self, id: u32) -> bool {
        self.own.get(id as usize).copied().unwrap_or(false)
    }

    /// Writes down what the table says of a layer, the first time it does.
    pub(super) fn describe(&mut self, id: u32, set: impl FnOnce(&mut ScannedLayer)) {
        if let Some(layer) = self.layers.get_mut(id as usize)
            && !layer.in_table
        {
            set(layer);
        }
    }

    /// The layers, in order of their numbers.
    pub(super) fn into_layers(self) -> Vec<ScannedLayer> {
        self.layers
    }
}

/// Names compared byte by byte.
#[derive(Debug, Default)]
pub(super) struct Types<'a> {
    names: Vec<&'a [u8]>,
    read: Vec<bool>,
    points: Vec<bool>,
    ids: HashMap<&'a [u8], usize>,
    lately: Lately<'a>,
}

impl<'a> Types<'a> {
    /// The name's number.
    pub(super) fn id(&mut self, name: &'a [u8]) -> usize {
        if let Some(id) = self.lately.get(name) {
            return id as usize;
        }
        let next = self.names.len();
        let id = *self.ids.entry(name).or_insert(next);
        if id == next {
            self.names.push(name);
            self.read.push(READ_TYPES.contains(&name));
            self.points.push(POINTING_TYPES.contains(&name));
        }
        if let Ok(short) = u32::try_from(id) {
            self.lately.put(name, short);
        }
        id
    }

    /// How many there are.
    pub(super) fn len(&self) -> usize {
        self.names.len()
    }

    /// Whether the number is of this name.
    pub(super) fn is(&self, id: usize, name: &[u8]) -> bool {
        self.names.get(id).is_some_and(|held| *held == name)
    }

    /// Whether entities of this type are read.
    pub(super) fn is_read(&self, id: usize) -> bool {
        self.read.get(id).copied().unwrap_or(false)
    }

    /// Whether entities of this type point at something.
    pub(super) fn points(&self, id: usize) -> bool {
        self.points.get(id).copied().unwrap_or(false)
    }

    /// The names as bytes, in order of their numbers.
    pub(super) fn into_raw(self) -> Vec<&'a [u8]> {
        self.names
    }

    /// The names, in order of their numbers.
    pub(super) fn into_names(self) -> Vec<String> {
        self.names
            .into_iter()
            .map(|name| String::from_utf8_lossy(name).into_owned())
            .collect()
    }
}

/// Names met lately with their numbers, each in the one place that its length and last letters give it.
#[derive(Debug)]
struct Lately<'a>([(&'a [u8], u32); PLACES]);

/// A power of two.
const PLACES: usize = 256;

impl Default for Lately<'_> {
    fn default() -> Self {
        // An empty name stands where only an empty one is looked for, but under no number that is given.
        Self([(b"", u32::MAX); PLACES])
    }
}

impl<'a> Lately<'a> {
    fn place(name: &[u8]) -> usize {
        let last = |back: usize| {
            let byte = name.len().checked_sub(back).and_then(|at| name.get(at));
            byte.copied().map_or(0, usize::from)
        };
        (last(1) + 11 * last(2) + 37 * last(4) + 101 * name.len()) % PLACES
    }

    #[inline]
    fn get(&self, name: &[u8]) -> Option<u32> {
        let (held, id) = self.0.get(Self::place(name))?;
        (*held == name && *id != u32::MAX).then_some(*id)
    }

    fn put(&mut self, name: &'a [u8], id: u32) {
        if let Some(place) = self.0.get_mut(Self::place(name)) {
            *place = (name, id);
        }
    }
}
