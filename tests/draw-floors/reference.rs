//! The floor to measure with: eight bays by six, about 400 tendons, and far more background than tendons.

use crate::Floor;
use crate::background::{dimensions, furniture, gridlines};
use crate::bays::{self, Drape};
use crate::dice::Dice;
use crate::dxf::{Drawing, Shape, Xy};
use crate::path::Path;
use crate::plan;
use crate::slab::Slab;
use crate::tendon::{End, Kind, Run, Tendon};

const WIDE_MM: f64 = 60_000.0;
const HIGH_MM: f64 = 45_000.0;
const DISTRIBUTED: Drape = Drape {
    below_top_mm: 45.0,
    low_mm: 110.0,
};
const SHORT: Drape = Drape {
    below_top_mm: 45.0,
    low_mm: 50.0,
};
const BANDED: Drape = Drape {
    below_top_mm: 100.0,
    low_mm: 75.0,
};
const BACKGROUND_LAYERS: u32 = 64;
/// Brings the file to about 20 MB.
const BACKGROUND_SHAPES: u32 = 112_000;

/// `reference-floor`: 60 m by 45 m.
pub(crate) fn floor() -> Floor {
    let slab = slab();
    let mut tendons = banded(&slab);
    tendons.extend(distributed(&slab));
    bays::number(&mut tendons);
    let mut dice = Dice(400);
    for tendon in &mut tendons {
        tendon.lettering.height_mm = 90.0;
        tendon.lettering.mark_station_mm = 3090.0;
    }
    let tendons = tendons
        .into_iter()
        .map(|tendon| {
            if dice.once_in(3) {
                tendon.reversed()
            } else {
                tendon
            }
        })
        .collect();
    let mut drawing = plan::start(&slab);
    plan::draw_slab(&mut drawing, &slab, [6600.0, 5000.0]);
    gridlines(&mut drawing, &slab);
    dimensions(&mut drawing, &slab);
    furniture(
        &mut drawing,
        &mut dice,
        &[[[2000.0, 3000.0], [57_000.0, 42_000.0]]],
    );
    background(&mut drawing, &mut dice);
    Floor {
        name: "reference-floor",
        slab,
        tendons,
        drawing,
    }
}

fn slab() -> Slab {
    let grid = [even(1600.0, 7100.0, 9), even(1500.0, 7000.0, 7)];
    let columns = grid[0]
        .iter()
        .flat_map(|x| grid[1].iter().map(|y| [*x, *y]))
        .collect();
    let mut slab = Slab {
        edge: plan::rectangle([[0.0, 0.0], [WIDE_MM, HIGH_MM]]),
        thickness_mm: 250.0,
        zones: Vec::new(),
        openings: Vec::new(),
        columns,
        column_mm: 600.0,
        level_lines: Vec::new(),
        grid,
    };
    // Half of the floor takes its heights over the columns from level lines.
    for y_mm in slab.grid[1].clone() {
        slab.level_line(y_mm, [150.0, 30_000.0], &[], Kind::High, 205.0);
    }
    slab
}

fn even(first_mm: f64, step_mm: f64, count: u8) -> Vec<f64> {
    (0..count)
        .map(|index| first_mm + step_mm * f64::from(index))
        .collect()
}

fn banded(slab: &Slab) -> Vec<Tendon> {
    let mut tendons = Vec::new();
    for y_mm in &slab.grid[1] {
        for offset in [-525.0, -225.0, 75.0, 375.0] {
            for [from, to, live] in [[0.0, 32_000.0, 0.0], [28_000.0, WIDE_MM, 1.0]] {
                let y_mm = y_mm + offset + 150.0 * live;
                let ends = if live == 0.0 {
                    [End::Live, End::Dead]
                } else {
                    [End::Dead, End::Live]
                };
                let path = Path::straight([from, y_mm], [to, y_mm]);
                tendons.push(bays::tendon(slab, Run::Banded, path, ends, BANDED));
            }
        }
    }
    tendons
}

/// Two lengths that lap on each of some ninety tracks, and shorter tendons at the edges.
fn distributed(slab: &Slab) -> Vec<Tendon> {
    let mut tendons = Vec::new();
    let mut add = |x_mm: f64, reach: [f64; 2], ends: [End; 2]| {
        let drape = if reach[1] - reach[0] < 12_000.0 {
            SHORT
        } else {
            DISTRIBUTED
        };
        let path = Path::straight([x_mm, reach[0]], [x_mm, reach[1]]);
        tendons.push(bays::tendon(slab, Run::Distributed, path, ends, drape));
    };
    for track in 0..88_u8 {
        // Eleven tracks a bay, none where the bands' heights and marks are written.
        let x_mm = 1750.0 + 7100.0 * f64::from(track / 11) + 620.0 * f64::from(track % 11);
        add(x_mm, [0.0, 24_500.0], [End::Live, End::Dead]);
        add(x_mm + 200.0, [20_500.0, HIGH_MM], [End::Dead, End::Live]);
        add(x_mm + 400.0, [0.0, 10_500.0], [End::Live, End::Dead]);
        if track % 4 != 3 {
            add(x_mm + 400.0, [34_500.0, HIGH_MM], [End::Dead, End::Live]);
        }
    }
    tendons
}

/// Walls, linework, hatches, words and blocks all over the floor, on many layers.
fn background(drawing: &mut Drawing, dice: &mut Dice) {
    let layers = (0..BACKGROUND_LAYERS)
        .map(|index| format!("ARCH-{index:02}"))
        .collect::<Vec<_>>();
    for (layer, colour) in layers.iter().zip((30_u8..).step_by(3)) {
        drawing.layer(layer, colour, "Continuous");
    }
    for _ in 0..BACKGROUND_SHAPES {
        let at = [dice.between(0.0, WIDE_MM), dice.between(0.0, HIGH_MM)];
        let shape = clutter(at, dice);
        let layer = &layers[dice.below(BACKGROUND_LAYERS) as usize];
        drawing.draw(layer, shape);
    }
}

fn clutter(at: Xy, dice: &mut Dice) -> Shape {
    let [wide, high] = [dice.between(100.0, 2500.0), dice.between(100.0, 1200.0)];
    let outline = plan::rectangle([at, [at[0] + wide, at[1] + high]]);
    match dice.below(20) {
        0..7 => Shape::Line([at, [at[0] + wide, at[1] + high * f64::from(dice.below(2))]]),
        7..12 => plan::closed(&outline),
        12..14 => Shape::Hatch {
            outline,
            spacing_mm: Some(90.0),
        },
        14..17 => plan::text(
            at,
            120.0,
            ["FFL +7.350", "CEILING 2.70", "H205", "FD 30", "T350"][dice.below(5) as usize],
        ),
        17 => Shape::Arc {
            centre: at,
            radius_mm: high,
            angles_rad: [0.0, std::f64::consts::FRAC_PI_2],
        },
        18 => Shape::Circle {
            centre: at,
            radius_mm: high,
        },
        _ => Shape::Insert {
            block: "DESK".to_owned(),
            at,
            scale: 1.0,
            rotation_rad: 0.0,
        },
    }
}
