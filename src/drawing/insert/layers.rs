//! Layer records, and the table and section around them where the drawing has none.

use super::entities::colour;
use super::handles::Supply;
use super::records::{Edition, Records};
use crate::drawing::{Ink, SheetLayer};

/// What a drawing's own layer records show of how new ones must look.
#[derive(Debug, Clone, Copy)]
pub(super) struct Pattern<'a> {
    /// Handle of the layer table.
    pub(super) table: Option<u64>,
    /// Whether layer records carry handles.
    pub(super) with_handles: bool,
    /// Group 390 of layer "0": plot style.
    pub(super) plot_style: Option<&'a str>,
    /// Group 347 of layer "0": material.
    pub(super) material: Option<&'a str>,
    /// Group 348 of layer "0": visual style.
    pub(super) visual_style: Option<&'a str>,
}

/// Layer records for a table that is there.
pub(super) fn write_layers(
    records: &mut Records,
    supply: &mut Supply,
    pattern: &Pattern<'_>,
    layers: &[&SheetLayer],
) {
    for layer in layers {
        write_layer(records, supply, pattern, layer);
    }
}

/// A layer table with layer "0" and the given ones, for a drawing that has none.
pub(super) fn write_table(records: &mut Records, supply: &mut Supply, layers: &[&SheetLayer]) {
    let edition = records.style.edition;
    let table = if edition >= Edition::R13 {
        supply.take()
    } else {
        None
    };
    records.text(0, "TABLE");
    records.text(2, "LAYER");
    records.handle(5, table);
    if edition >= Edition::R2000 {
        records.handle(330, table.map(|_| 0));
    }
    if edition >= Edition::R13 {
        records.text(100, "AcDbSymbolTable");
    }
    let count = layers.len().saturating_add(1);
    records.short(70, i16::try_from(count).unwrap_or(i16::MAX));
    let pattern = Pattern {
        table,
        with_handles: table.is_some(),
        plot_style: None,
        material: None,
        visual_style: None,
    };
    let zero = SheetLayer {
        name: "0".to_owned(),
        ink: Ink {
            index: 7,
            rgb: None,
        },
        on: true,
    };
    write_layer(records, supply, &pattern, &zero);
    write_layers(records, supply, &pattern, layers);
    records.text(0, "ENDTAB");
}

fn write_layer(
    records: &mut Records,
    supply: &mut Supply,
    pattern: &Pattern<'_>,
    layer: &SheetLayer,
) {
    let edition = records.style.edition;
    records.text(0, "LAYER");
    if pattern.with_handles {
        records.handle(5, supply.take());
    }
    if edition >= Edition::R13 {
        records.handle(330, pattern.table);
        records.text(100, "AcDbSymbolTableRecord");
        records.text(100, "AcDbLayerTableRecord");
    }
    records.text(2, &layer.name);
    records.short(70, 0);
    colour(records, layer.ink, layer.on);
    if edition == Edition::R12 {
        records.text(6, "CONTINUOUS");
    } else {
        records.text(6, "Continuous");
    }
    if edition >= Edition::R2000 {
        // -3: the default line weight.
        records.short(370, -3);
        copy(records, 390, pattern.plot_style);
    }
    if edition >= Edition::R2007 {
        copy(records, 347, pattern.material);
    }
    if edition >= Edition::R2013 {
        copy(records, 348, pattern.visual_style);
    }
}

fn copy(records: &mut Records, code: i16, pointer: Option<&str>) {
    if let Some(pointer) = pointer {
        records.text(code, pointer);
    }
}
