//! The TABLES section: view, line types, layers, text style, dimension style, block records.

use super::tags::{Tags, fixed};
use super::{Drawing, Xy};

/// Line types beside the three that every drawing has: name, description, dashes and gaps (negative) in millimetres.
const LINETYPES: [(&str, &str, &[f64]); 3] = [
    (
        "CENTER",
        "Center ____ _ ____ _ ____",
        &[900.0, -150.0, 150.0, -150.0],
    ),
    ("DASHED", "Dashed __ __ __ __ __", &[300.0, -150.0]),
    ("HIDDEN", "Hidden _ _ _ _ _ _", &[150.0, -90.0]),
];

/// Writes all nine tables.
pub(super) fn write(tags: &mut Tags, drawing: &Drawing, block_names: &[&str]) {
    table(tags, "VPORT", fixed::VIEWPORTS, 1, |tags| {
        view(tags, drawing.extents);
    });
    table(
        tags,
        "LTYPE",
        fixed::LINETYPES,
        3 + LINETYPES.len(),
        linetypes,
    );
    table(
        tags,
        "LAYER",
        fixed::LAYERS,
        2 + drawing.layers.len(),
        |tags| layers(tags, drawing),
    );
    table(tags, "STYLE", fixed::STYLES, 1, |tags| {
        record(
            tags,
            "STYLE",
            fixed::STYLES,
            "AcDbTextStyleTableRecord",
            "Standard",
        );
        tags.real(40, 0.0)
            .real(41, 1.0)
            .real(50, 0.0)
            .put(71, 0)
            .real(42, 150.0)
            .put(3, "txt")
            .put(4, "");
    });
    table(tags, "VIEW", fixed::VIEWS, 0, |_| ());
    table(tags, "UCS", fixed::UCS, 0, |_| ());
    table(tags, "APPID", fixed::APPIDS, 1, |tags| {
        record(
            tags,
            "APPID",
            fixed::APPIDS,
            "AcDbRegAppTableRecord",
            "ACAD",
        );
    });
    table(tags, "DIMSTYLE", fixed::DIMSTYLES, 1, dimension_style);
    table(
        tags,
        "BLOCK_RECORD",
        fixed::BLOCK_RECORDS,
        block_names.len(),
        |tags| {
            for name in block_names {
                block_record(tags, name);
            }
        },
    );
}

fn table(tags: &mut Tags, name: &str, handle: u64, count: usize, records: impl FnOnce(&mut Tags)) {
    tags.put(0, "TABLE")
        .put(2, name)
        .handle(5, handle)
        .handle(330, 0)
        .put(100, "AcDbSymbolTable")
        .put(70, count);
    if name == "DIMSTYLE" {
        tags.put(100, "AcDbDimStyleTable");
    }
    records(tags);
    tags.put(0, "ENDTAB");
}

/// The head that most records share, up to the flags.
fn record(tags: &mut Tags, kind: &str, owner: u64, class: &str, name: &str) {
    record_with_flags(tags, kind, owner, class, name, 0);
}

fn record_with_flags(tags: &mut Tags, kind: &str, owner: u64, class: &str, name: &str, flags: u8) {
    tags.put(0, kind);
    tags.fresh();
    tags.handle(330, owner)
        .put(100, "AcDbSymbolTableRecord")
        .put(100, class)
        .put(2, name)
        .put(70, flags);
}

fn view(tags: &mut Tags, [least, most]: [Xy; 2]) {
    let [wide, high] = [most[0] - least[0], most[1] - least[1]];
    record(
        tags,
        "VPORT",
        fixed::VIEWPORTS,
        "AcDbViewportTableRecord",
        "*Active",
    );
    tags.xy(10, [0.0, 0.0]).xy(11, [1.0, 1.0]);
    tags.xy(
        12,
        [
            f64::midpoint(least[0], most[0]),
            f64::midpoint(least[1], most[1]),
        ],
    );
    tags.xy(13, [0.0, 0.0])
        .xy(14, [10.0, 10.0])
        .xy(15, [10.0, 10.0]);
    tags.xy(16, [0.0, 0.0]).real(36, 1.0).xyz(17, [0.0, 0.0]);
    tags.real(40, high.max(wide / 1.6) * 1.05)
        .real(41, 1.6)
        .real(42, 50.0)
        .real(43, 0.0)
        .real(44, 0.0);
    tags.real(50, 0.0)
        .real(51, 0.0)
        .put(71, 0)
        .put(72, 1000)
        .put(73, 1)
        .put(74, 3);
    tags.put(75, 0)
        .put(76, 0)
        .put(77, 0)
        .put(78, 0)
        .put(281, 0)
        .put(65, 0)
        .real(146, 0.0);
}

fn linetypes(tags: &mut Tags) {
    for name in ["ByBlock", "ByLayer", "Continuous"] {
        linetype(tags, name, "", &[]);
    }
    for (name, description, dashes) in LINETYPES {
        linetype(tags, name, description, dashes);
    }
}

fn linetype(tags: &mut Tags, name: &str, description: &str, dashes: &[f64]) {
    record(
        tags,
        "LTYPE",
        fixed::LINETYPES,
        "AcDbLinetypeTableRecord",
        name,
    );
    tags.put(3, description).put(72, 65).put(73, dashes.len());
    tags.real(40, dashes.iter().map(|dash| dash.abs()).sum());
    for dash in dashes {
        tags.real(49, *dash).put(74, 0);
    }
}

fn layers(tags: &mut Tags, drawing: &Drawing) {
    layer(tags, "0", 7, "Continuous", false);
    layer(tags, "Defpoints", 7, "Continuous", false);
    for own in &drawing.layers {
        layer(tags, &own.name, own.colour, own.linetype, own.frozen);
    }
}

fn layer(tags: &mut Tags, name: &str, colour: u8, linetype: &str, frozen: bool) {
    record_with_flags(
        tags,
        "LAYER",
        fixed::LAYERS,
        "AcDbLayerTableRecord",
        name,
        u8::from(frozen),
    );
    tags.put(62, colour).put(6, linetype);
    if name == "Defpoints" {
        tags.put(290, 0);
    }
    tags.put(370, -3)
        .handle(390, fixed::PLOT_STYLE_NORMAL)
        .handle(347, fixed::MATERIAL_GLOBAL);
}

fn dimension_style(tags: &mut Tags) {
    // This one table keeps its handle under 105, since 5 once named an arrow here.
    let handle = tags.take_handle();
    tags.put(0, "DIMSTYLE")
        .handle(105, handle)
        .handle(330, fixed::DIMSTYLES);
    tags.put(100, "AcDbSymbolTableRecord")
        .put(100, "AcDbDimStyleTableRecord")
        .put(2, "Standard")
        .put(70, 0);
    tags.real(40, 1.0)
        .real(41, 150.0)
        .real(42, 60.0)
        .real(44, 120.0)
        .real(140, 200.0)
        .real(147, 60.0);
    tags.put(73, 0).put(74, 0).put(77, 1).put(271, 0);
}

fn block_record(tags: &mut Tags, name: &str) {
    let [handle, _, _] = tags.block_handles(name);
    let layout = match name {
        "*Model_Space" => fixed::MODEL_LAYOUT,
        "*Paper_Space" => fixed::PAPER_LAYOUT,
        _ => 0,
    };
    tags.put(0, "BLOCK_RECORD")
        .handle(5, handle)
        .handle(330, fixed::BLOCK_RECORDS);
    tags.put(100, "AcDbSymbolTableRecord")
        .put(100, "AcDbBlockTableRecord")
        .put(2, name);
    tags.handle(340, layout).put(70, 0).put(280, 1).put(281, 0);
}
