//! Entities counted by layer and type, in room that grows with the pairs met and not with their product.

use std::collections::HashMap;

/// Counts being gathered; entities of one kind stand in runs, of which only the ends are looked up.
#[derive(Debug, Default)]
pub(super) struct Counts {
    cells: HashMap<(u32, usize), usize>,
    run: Option<((u32, usize), usize)>,
}

impl Counts {
    /// Counts one entity.
    #[inline]
    pub(super) fn add(&mut self, layer: u32, type_id: usize) {
        match &mut self.run {
            Some((cell, length)) if *cell == (layer, type_id) => *length += 1,
            _ => {
                self.close();
                self.run = Some(((layer, type_id), 1));
            }
        }
    }

    fn close(&mut self) {
        if let Some((cell, length)) = self.run.take() {
            *self.cells.entry(cell).or_default() += length;
        }
    }

    /// By layer: type and count, in the order of the types' numbers.
    pub(super) fn into_rows(mut self, layers: usize) -> Vec<Vec<(usize, usize)>> {
        self.close();
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
