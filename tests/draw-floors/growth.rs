//! Any number of plain tendons on one large slab, to see how cost grows.

use crate::Floor;
use crate::bays::{self, Drape};
use crate::path::Path;
use crate::plan;
use crate::slab::Slab;
use crate::tendon::{End, Run};

/// Tendons side by side before a new row of them begins.
const IN_A_ROW: u32 = 100;
const SPACING_MM: f64 = 1200.0;
const LENGTH_MM: f64 = 26_000.0;
const ROW_MM: f64 = 27_000.0;
/// Supports from the start of each tendon.
const SUPPORTS_MM: [f64; 4] = [1500.0, 9100.0, 16_900.0, 24_500.0];

/// `growth`: `count` tendons of three spans, rows of a hundred, labelled all along, stressed at both ends.
pub(crate) fn floor(count: u32) -> Floor {
    let rows = count.div_ceil(IN_A_ROW);
    let [wide, high] = [SPACING_MM * f64::from(IN_A_ROW), ROW_MM * f64::from(rows)];
    let supports = (0..rows)
        .flat_map(|row| SUPPORTS_MM.map(|support| support + ROW_MM * f64::from(row)))
        .collect::<Vec<_>>();
    let mut slab = Slab {
        edge: plan::rectangle([[0.0, -500.0], [wide, high]]),
        thickness_mm: 250.0,
        zones: Vec::new(),
        openings: Vec::new(),
        columns: Vec::new(),
        column_mm: 600.0,
        level_lines: Vec::new(),
        grid: [Vec::new(), Vec::new()],
    };
    let mut tendons = Vec::new();
    for index in 0..count {
        let (row, place) = (index / IN_A_ROW, index % IN_A_ROW);
        let x_mm = SPACING_MM * (f64::from(place) + 0.5);
        let y_mm = ROW_MM * f64::from(row);
        if place == 0 {
            let first = SUPPORTS_MM.len() * row as usize;
            slab.grid[1] = supports[first..first + SUPPORTS_MM.len()].to_vec();
        }
        let path = Path::straight([x_mm, y_mm], [x_mm, y_mm + LENGTH_MM]);
        let drape = Drape {
            below_top_mm: 45.0,
            low_mm: 45.0,
        };
        let mut tendon = bays::tendon(&slab, Run::Distributed, path, [End::Live, End::Live], drape);
        tendon.lettering.along = index % 2 == 0;
        tendons.push(tendon);
    }
    bays::number(&mut tendons);
    let mut drawing = plan::start(&slab);
    plan::draw_slab(&mut drawing, &slab, [600.0, -400.0]);
    Floor {
        name: "growth",
        slab,
        tendons,
        drawing,
    }
}
