//! Entities counted by layer and type, in room that grows with the pairs met and not with their product.

use std::collections::HashMap;

/// Counts being gathered; those of the pairs met lately stand in a small tally, and only where two pairs share a place
/// in it is one looked up.
#[derive(Debug)]
pub(super) struct Counts {
    cells: HashMap<(u32, usize), usize>,
    tally: Vec<((u32, usize), usize)>,
}

/// Places of the tally.
const PLACES: usize = 1 << 10;

impl Default for Counts {
    fn default() -> Self {
        Self {
            cells: HashMap::new(),
            tally: vec![((0, 0), 0); PLACES],
        }
    }
}

impl Counts {
    /// Counts one entity.
    #[inline]
    pub(super) fn add(&mut self, layer: u32, type_id: usize) {
        let pair = (layer, type_id);
        let place = (layer as usize).wrapping_mul(13).wrapping_add(type_id) % PLACES;
        let Some((held, count)) = self.tally.get_mut(place) else {
            return;
        };
        if *held != pair {
            let (held, count) = (std::mem::replace(held, pair), std::mem::take(count));
            if count > 0 {
                *self.cells.entry(held).or_default() += count;
            }
        }
        *count += 1;
    }

    /// By layer: type and count, in the order of the types' numbers.
    pub(super) fn into_rows(mut self, layers: usize) -> Vec<Vec<(usize, usize)>> {
        for (pair, count) in self.tally {
            if count > 0 {
                *self.cells.entry(pair).or_default() += count;
            }
        }
        let mut cells: Vec<_> = self.cells.into_iter().collect();
        cells.sort_unstable();
        let mut rows = vec![Vec::new(); layers];
        for ((layer, type_id), count) in cells {
            if let Some(row) = rows.get_mut(layer as usize) {
                row.push((type_id, count));
            }
        }
        rows
    }
}
