//! Colours and linetypes as they are seen: by layer and by block settled, linetypes numbered.

use std::collections::BTreeMap;

use super::Look;
use super::clean::Worn;
use super::scan::Scan;
use super::text_decode::plain_name;
use super::types::CONTINUOUS;
use crate::patterns::folded;

/// Black or white, whichever reads: the colour of what has none.
const PLAIN: u8 = 7;

/// What entities wear, by layer and by block settled.
#[derive(Debug)]
pub(super) struct Looks<'s> {
    bytes: &'s [u8],
    scan: &'s Scan,
    /// By layer number.
    of_layers: Vec<Look>,
    /// Names of linetypes as first written.
    pub(super) linetypes: Vec<String>,
    by_name: BTreeMap<String, Named>,
    by_bytes: BTreeMap<Vec<u8>, Named>,
}

/// What a linetype's name stands for.
#[derive(Debug, Clone, Copy)]
enum Named {
    ByLayer,
    ByBlock,
    Own(u32),
}

impl<'s> Looks<'s> {
    /// Looks of a drawing's layers; the linetype of number 0 is the continuous one.
    pub(super) fn new(bytes: &'s [u8], scan: &'s Scan) -> Self {
        let by_name = [
            (folded(CONTINUOUS), Named::Own(0)),
            ("BYLAYER".to_owned(), Named::ByLayer),
            ("BYBLOCK".to_owned(), Named::ByBlock),
        ];
        let mut looks = Self {
            bytes,
            scan,
            of_layers: Vec::new(),
            linetypes: vec![CONTINUOUS.to_owned()],
            by_name: by_name.into_iter().collect(),
            by_bytes: BTreeMap::new(),
        };
        for layer in &scan.layers {
            let raw = layer.linetype.as_deref().unwrap_or_default();
            let linetype = match looks.named(raw) {
                Named::Own(number) => number,
                Named::ByLayer | Named::ByBlock => 0,
            };
            let index = layer.colour.map_or(i64::from(PLAIN), i64::abs);
            looks.of_layers.push(Look {
                colour: Some(index_of(index).unwrap_or(PLAIN)),
                linetype,
            });
        }
        looks
    }

    /// What by-block means in model space.
    pub(super) fn outermost() -> Look {
        Look {
            colour: Some(PLAIN),
            linetype: 0,
        }
    }

    /// How an entity on a layer is seen, inside an insert that is seen so.
    pub(super) fn seen(&mut self, worn: &Worn, layer: u32, insert: Look) -> Look {
        let of_layer = self.of_layers.get(layer as usize);
        let of_layer = of_layer.copied().unwrap_or_else(Self::outermost);
        let colour = match worn.colour {
            None if worn.true_colour => None,
            Some(0) => insert.colour,
            Some(index) => index_of(index).or(of_layer.colour),
            None => of_layer.colour,
        };
        let name = worn
            .linetype
            .and_then(|(start, end)| self.bytes.get(start..end));
        let linetype = match name.map(|raw| self.named(raw)) {
            None | Some(Named::ByLayer) => of_layer.linetype,
            Some(Named::ByBlock) => insert.linetype,
            Some(Named::Own(number)) => number,
        };
        Look { colour, linetype }
    }

    fn named(&mut self, raw: &[u8]) -> Named {
        let raw = raw.trim_ascii();
        if raw.is_empty() {
            return Named::ByLayer;
        }
        if let Some(&known) = self.by_bytes.get(raw) {
            return known;
        }
        let (name, _) = self.scan.code_page.decode(raw);
        let name = plain_name(&name);
        let next = u32::try_from(self.linetypes.len()).unwrap_or(u32::MAX);
        let named = *self
            .by_name
            .entry(folded(&name))
            .or_insert(Named::Own(next));
        if matches!(named, Named::Own(number) if number == next) {
            self.linetypes.push(name);
        }
        self.by_bytes.insert(raw.to_vec(), named);
        named
    }
}

fn index_of(number: i64) -> Option<u8> {
    u8::try_from(number).ok().filter(|index| *index > 0)
}
