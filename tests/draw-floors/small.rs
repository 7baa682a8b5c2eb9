//! The first drawing to read: two spans one way, one the other, fourteen tendons, every height labelled.

use crate::Floor;
use crate::background::{Title, dimensions, gridlines, title_strip};
use crate::bays::{self, Drape};
use crate::path::Path;
use crate::plan;
use crate::slab::Slab;
use crate::tendon::{DrawnAs, End, Run};

/// `small-floor`: 14 m by 10 m, 250 mm thick.
pub(crate) fn floor() -> Floor {
    let [wide, high] = [14_000.0, 10_000.0];
    let grid = [vec![1500.0, 7000.0, 12_500.0], vec![1500.0, 8500.0]];
    let columns = grid[0]
        .iter()
        .flat_map(|x| grid[1].iter().map(|y| [*x, *y]))
        .collect();
    let slab = Slab {
        edge: plan::rectangle([[0.0, 0.0], [wide, high]]),
        thickness_mm: 250.0,
        zones: Vec::new(),
        openings: Vec::new(),
        columns,
        column_mm: 500.0,
        level_lines: Vec::new(),
        grid,
    };
    let mut tendons = Vec::new();
    for y_mm in [1350.0, 1650.0, 8350.0, 8650.0] {
        let path = Path::straight([0.0, y_mm], [wide, y_mm]);
        let drape = Drape {
            below_top_mm: 85.0,
            low_mm: 45.0,
        };
        let mut band = bays::tendon(&slab, Run::Banded, path, [End::Live, End::Dead], drape);
        band.lettering.far_side = [1650.0, 8650.0].contains(&y_mm);
        tendons.push(band);
    }
    for index in 0..10_u8 {
        let x_mm = (600.0 + 12_800.0 / 9.0 * f64::from(index)).round();
        let path = Path::straight([x_mm, 0.0], [x_mm, high]);
        let drape = Drape {
            below_top_mm: 45.0,
            low_mm: 45.0,
        };
        let ends = if index % 2 == 0 {
            [End::Live, End::Dead]
        } else {
            [End::Dead, End::Live]
        };
        let mut single = bays::tendon(&slab, Run::Distributed, path, ends, drape);
        single.lettering.along = index % 3 != 0;
        if index == 5 {
            single.drawn_as = DrawnAs::Pieces;
        }
        tendons.push(if index == 3 {
            single.reversed()
        } else {
            single
        });
    }
    bays::number(&mut tendons);
    let mut drawing = plan::start(&slab);
    plan::draw_slab(&mut drawing, &slab, [8050.0, 3600.0]);
    gridlines(&mut drawing, &slab);
    dimensions(&mut drawing, &slab);
    let title = Title {
        project: "SMALL FLOOR",
        sheet: "TENDON LAYOUT",
        number: "DEMO-01",
        revisions: &["A  FIRST ISSUE"],
    };
    let notes = [
        "1. HEIGHTS ARE TO THE CENTROID OF THE STRANDS, IN MILLIMETRES ABOVE THE SOFFIT.",
        "2. ANCHORS ARE AT MID-DEPTH UNLESS A HEIGHT IS GIVEN.",
        "3. FLAT DUCTS 20 mm HIGH, FIVE STRANDS OF 12.7 mm.",
    ];
    title_strip(&mut drawing, &slab, &title, &notes);
    Floor {
        name: "small-floor",
        slab,
        tendons,
        drawing,
    }
}
