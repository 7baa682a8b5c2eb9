//! The OBJECTS section: the root dictionary and what hangs from it.

use super::Xy;
use super::tags::{Tags, fixed};

/// Writes dictionaries, both layouts, the plot style placeholder, three materials and the multiline style.
pub(super) fn write(tags: &mut Tags, extents: [Xy; 2]) {
    let root = [
        ("ACAD_GROUP", fixed::GROUPS),
        ("ACAD_LAYOUT", fixed::LAYOUTS),
        ("ACAD_MATERIAL", fixed::MATERIALS),
        ("ACAD_MLINESTYLE", fixed::MLINE_STYLES),
        ("ACAD_PLOTSETTINGS", fixed::PLOT_SETTINGS),
        ("ACAD_PLOTSTYLENAME", fixed::PLOT_STYLES),
    ];
    let materials = [
        ("ByBlock", fixed::MATERIAL_BY_BLOCK),
        ("ByLayer", fixed::MATERIAL_BY_LAYER),
        ("Global", fixed::MATERIAL_GLOBAL),
    ];
    dictionary(tags, fixed::ROOT, 0, &root);
    dictionary(tags, fixed::GROUPS, fixed::ROOT, &[]);
    let layouts = [
        ("Layout1", fixed::PAPER_LAYOUT),
        ("Model", fixed::MODEL_LAYOUT),
    ];
    dictionary(tags, fixed::LAYOUTS, fixed::ROOT, &layouts);
    dictionary(tags, fixed::MATERIALS, fixed::ROOT, &materials);
    dictionary(
        tags,
        fixed::MLINE_STYLES,
        fixed::ROOT,
        &[("Standard", fixed::MLINE_STANDARD)],
    );
    dictionary(tags, fixed::PLOT_SETTINGS, fixed::ROOT, &[]);
    tags.put(0, "ACDBDICTIONARYWDFLT")
        .handle(5, fixed::PLOT_STYLES)
        .handle(330, fixed::ROOT);
    tags.put(100, "AcDbDictionary")
        .put(281, 1)
        .put(3, "Normal")
        .handle(350, fixed::PLOT_STYLE_NORMAL);
    tags.put(100, "AcDbDictionaryWithDefault")
        .handle(340, fixed::PLOT_STYLE_NORMAL);
    tags.put(0, "ACDBPLACEHOLDER")
        .handle(5, fixed::PLOT_STYLE_NORMAL)
        .handle(330, fixed::PLOT_STYLES);
    layout(tags, "Model", fixed::MODEL_LAYOUT, extents);
    layout(tags, "Layout1", fixed::PAPER_LAYOUT, extents);
    for (name, handle) in materials {
        tags.put(0, "MATERIAL")
            .handle(5, handle)
            .handle(330, fixed::MATERIALS);
        tags.put(100, "AcDbMaterial")
            .put(1, name)
            .put(2, "")
            .put(70, 0)
            .real(40, 1.0);
        tags.put(71, 1)
            .real(41, 1.0)
            .put(91, -1_023_410_177_i64)
            .put(94, 63);
    }
    tags.put(0, "MLINESTYLE")
        .handle(5, fixed::MLINE_STANDARD)
        .handle(330, fixed::MLINE_STYLES);
    tags.put(100, "AcDbMlineStyle")
        .put(2, "STANDARD")
        .put(70, 0)
        .put(3, "")
        .put(62, 256);
    tags.real(51, 90.0).real(52, 90.0).put(71, 2);
    for offset in [0.5, -0.5] {
        tags.real(49, offset).put(62, 256).put(6, "BYLAYER");
    }
}

fn dictionary(tags: &mut Tags, handle: u64, owner: u64, entries: &[(&str, u64)]) {
    tags.put(0, "DICTIONARY")
        .handle(5, handle)
        .handle(330, owner)
        .put(100, "AcDbDictionary")
        .put(281, 1);
    for (name, target) in entries {
        tags.put(3, name).handle(350, *target);
    }
}

/// An A1 sheet, landscape; for the model the same settings with the model flag.
fn layout(tags: &mut Tags, name: &str, handle: u64, [least, most]: [Xy; 2]) {
    let model = name == "Model";
    tags.put(0, "LAYOUT")
        .handle(5, handle)
        .handle(330, fixed::LAYOUTS)
        .put(100, "AcDbPlotSettings");
    tags.put(1, "")
        .put(2, "none_device")
        .put(4, "A1")
        .put(6, "");
    for (code, value) in [
        (40, 7.5),
        (41, 20.0),
        (42, 7.5),
        (43, 20.0),
        (44, 841.0),
        (45, 594.0),
    ] {
        tags.real(code, value);
    }
    for (code, value) in [
        (46, 0.0),
        (47, 0.0),
        (48, 0.0),
        (49, 0.0),
        (140, 0.0),
        (141, 0.0),
        (142, 1.0),
        (143, 1.0),
    ] {
        tags.real(code, value);
    }
    tags.put(70, if model { 1024 } else { 0 })
        .put(72, 1)
        .put(73, 0)
        .put(74, 5)
        .put(7, "")
        .put(75, 16);
    tags.put(76, 0)
        .put(77, 2)
        .put(78, 300)
        .real(147, 1.0)
        .real(148, 0.0)
        .real(149, 0.0);
    tags.put(100, "AcDbLayout")
        .put(1, name)
        .put(70, 1)
        .put(71, i32::from(!model));
    let [low, high] = if model {
        [least, most]
    } else {
        [[0.0, 0.0], [841.0, 594.0]]
    };
    tags.xy(10, low)
        .xy(11, high)
        .xyz(12, [0.0, 0.0])
        .xyz(14, low)
        .xyz(15, high)
        .real(146, 0.0);
    tags.xyz(13, [0.0, 0.0])
        .xyz(16, [1.0, 0.0])
        .xyz(17, [0.0, 1.0])
        .put(76, 1);
    let [record, _, _] = tags.block_handles(if model {
        "*Model_Space"
    } else {
        "*Paper_Space"
    });
    tags.handle(330, record);
}
