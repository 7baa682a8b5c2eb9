//! A floor as it comes to the desk: six bays by four, about 120 tendons, drop panels, an opening that tendons sweep around.

mod surroundings;

use crate::Floor;
use crate::bays::{self, Drape};
use crate::dice::Dice;
use crate::path::{Axis, Path, Sweep};
use crate::plan;
use crate::slab::Slab;
use crate::tendon::{DrawnAs, End, Kind, Run, Shown, Tendon};

const WIDE_MM: f64 = 50_000.0;
const HIGH_MM: f64 = 34_000.0;
const GRID_X: [f64; 7] = [
    1600.0, 9400.0, 17_800.0, 25_600.0, 33_400.0, 40_600.0, 48_400.0,
];
/// Distributed tendons pass over the banded ones, so that the ducts never meet.
const DISTRIBUTED: Drape = Drape {
    below_top_mm: 45.0,
    low_mm: 45.0,
};
const BANDED: Drape = Drape {
    below_top_mm: 90.0,
    low_mm: 45.0,
};
/// Tendons beyond this gridline (counted from 0) carry their lows as labels, the others by level lines.
const LABELLED_BEYOND: usize = 3;
/// The bay, counted from 0, whose middle opening two tendons sweep around, and the one with the small riser.
const OPENING_BAY: usize = 2;
const RISER_BAY: usize = 0;
/// Spacings of the distributed tendons in a bay; odd, so that none runs where the bands' lows are written.
const SPACINGS: f64 = 7.0;
/// The line of columns, counted from 0, whose band comes in two lengths.
const LAPPED_LINE: usize = 3;

/// `harbour-level-2`: 50 m by 34 m.
pub(crate) fn floor() -> Floor {
    let slab = slab();
    let mut tendons = banded(&slab);
    tendons.extend(distributed(&slab));
    bays::number(&mut tendons);
    let mut dice = Dice(2);
    let tendons = tendons
        .into_iter()
        .map(|tendon| as_drafted(tendon, &mut dice))
        .collect();
    let drawing = surroundings::draw(&slab, &mut dice);
    Floor {
        name: "harbour-level-2",
        slab,
        tendons,
        drawing,
    }
}

fn slab() -> Slab {
    let grid = [
        GRID_X.to_vec(),
        vec![1600.0, 8800.0, 17_200.0, 25_200.0, 32_400.0],
    ];
    let columns = grid[0]
        .iter()
        .flat_map(|x| grid[1].iter().map(|y| [*x, *y]))
        .collect();
    let drop = |x: f64, y: f64| ([[x - 1050.0, y - 1050.0], [x + 1050.0, y + 1050.0]], 450.0);
    let zones = grid[0][1..6]
        .iter()
        .flat_map(|x| grid[1][1..4].iter().map(|y| drop(*x, *y)))
        .collect();
    let opening_x = opening_middle_mm(&grid[0]);
    let riser_x = track(&grid[0], RISER_BAY, 3.0);
    let mut slab = Slab {
        edge: plan::rectangle([[0.0, 0.0], [WIDE_MM, HIGH_MM]]),
        thickness_mm: 250.0,
        zones,
        openings: vec![
            [
                [opening_x - 1000.0, 11_500.0],
                [opening_x + 1000.0, 14_500.0],
            ],
            [[riser_x - 150.0, 18_950.0], [riser_x + 350.0, 19_450.0]],
        ],
        columns,
        column_mm: 600.0,
        level_lines: Vec::new(),
        grid,
    };
    let [x, y] = slab.grid.clone();
    let at_drops = x[1..6]
        .iter()
        .map(|x| [x - 1080.0, x + 1080.0])
        .collect::<Vec<_>>();
    for (index, y_mm) in y.iter().enumerate() {
        let gaps = if (1..4).contains(&index) {
            &at_drops[..]
        } else {
            &[]
        };
        slab.level_line(*y_mm, [300.0, WIDE_MM - 300.0], gaps, Kind::High, 205.0);
    }
    for (index, pair) in y.windows(2).enumerate() {
        let gaps = if index == 1 {
            vec![[opening_x - 1100.0, opening_x + 1100.0]]
        } else {
            Vec::new()
        };
        let y_mm = f64::midpoint(pair[0], pair[1]);
        slab.level_line(
            y_mm,
            [300.0, x[LABELLED_BEYOND] + 500.0],
            &gaps,
            Kind::Low,
            DISTRIBUTED.low_mm,
        );
    }
    slab
}

/// Tendons stand 200 mm beside the columns of a bay and evenly between: the place of one, counted in spacings.
fn track(grid_x: &[f64], bay: usize, spacings: f64) -> f64 {
    let [left, right] = [grid_x[bay] + 200.0, grid_x[bay + 1] - 200.0];
    (left + (right - left) / SPACINGS * spacings).round()
}

fn opening_middle_mm(grid_x: &[f64]) -> f64 {
    track(grid_x, OPENING_BAY, 1.5)
}

/// On each line of columns four tendons from end to end, or pairs that lap, and four shorter ones at the ends.
fn banded(slab: &Slab) -> Vec<Tendon> {
    let [x, y] = &slab.grid;
    let mut tendons = Vec::new();
    let mut add = |y_mm: f64, [from, to]: [f64; 2], ends: [End; 2], drape: Drape| {
        let mut band = bays::tendon(
            slab,
            Run::Banded,
            Path::straight([from, y_mm], [to, y_mm]),
            ends,
            drape,
        );
        band.lettering.mark_station_mm = if from > 0.0 {
            to - from - 4300.0
        } else {
            2650.0
        };
        tendons.push(band);
    };
    for (line, y_mm) in y.iter().enumerate() {
        if line == LAPPED_LINE {
            // Two lengths that lap, none of them on the column line itself, where the distributed heights stand.
            let lapped = Drape {
                below_top_mm: 100.0,
                ..BANDED
            };
            for offset in [-600.0, -300.0, 150.0, 450.0] {
                add(
                    y_mm + offset,
                    [0.0, x[3] + 2000.0],
                    [End::Live, End::Dead],
                    lapped,
                );
                add(
                    y_mm - offset,
                    [x[3] - 2000.0, WIDE_MM],
                    [End::Dead, End::Live],
                    lapped,
                );
            }
        } else {
            for offset in [-450.0, -150.0, 150.0, 450.0] {
                add(
                    y_mm + offset,
                    [0.0, WIDE_MM],
                    [End::Live, End::Live],
                    BANDED,
                );
            }
        }
        // Further from the columns, so lower, under the distributed tendons that come down there.
        let outer = Drape {
            below_top_mm: 115.0,
            low_mm: 45.0,
        };
        for offset in [-750.0, 750.0] {
            add(
                y_mm + offset,
                [0.0, x[2] + 2400.0],
                [End::Live, End::Dead],
                outer,
            );
            add(
                y_mm + offset,
                [x[4] - 2400.0, WIDE_MM],
                [End::Dead, End::Live],
                outer,
            );
        }
    }
    // Two lines on the middle line of columns and two more stand for several tendons.
    for (index, count) in [(16, 2), (19, 2), (8, 4), (11, 4)] {
        tendons[index].tendons = count;
    }
    tendons
}

/// Tendons from edge to edge at about 1.2 m, and shorter ones between them in the end bays.
fn distributed(slab: &Slab) -> Vec<Tendon> {
    let [x, y] = &slab.grid;
    let mut tendons = Vec::new();
    let whole = [0.0, HIGH_MM];
    let both = [End::Live, End::Live];
    let straight = |x_mm: f64, [from, to]: [f64; 2]| Path::straight([x_mm, from], [x_mm, to]);
    let plain = |x_mm: f64, reach: [f64; 2], ends: [End; 2], drape: Drape| {
        bays::tendon(slab, Run::Distributed, straight(x_mm, reach), ends, drape)
    };
    tendons.push(plain(600.0, whole, both, DISTRIBUTED));
    for bay in 0..x.len() - 1 {
        for spacing in 0..=7_u8 {
            let x_mm = track(x, bay, f64::from(spacing));
            tendons.push(match (bay, spacing) {
                (OPENING_BAY, 1 | 2) => swept(slab, x_mm),
                (RISER_BAY, 3) => splined(slab, x_mm),
                _ => plain(x_mm, whole, both, DISTRIBUTED),
            });
            if spacing % 2 == 1 {
                continue;
            }
            if spacing < 5 && bay < LABELLED_BEYOND + 1 {
                // Where tendons sweep aside, one between them takes the place of two.
                let share = match (bay, spacing) {
                    (OPENING_BAY, 0) => continue,
                    (OPENING_BAY, 2) => -0.5,
                    _ => 0.5,
                };
                let x_mm = track(x, bay, f64::from(spacing) + share);
                tendons.push(plain(
                    x_mm,
                    [0.0, y[1] + 2000.0],
                    [End::Live, End::Dead],
                    DISTRIBUTED,
                ));
                tendons.push(plain(
                    x_mm,
                    [y[3] - 2000.0, HIGH_MM],
                    [End::Dead, End::Live],
                    DISTRIBUTED,
                ));
            } else if spacing < 5 {
                let shallow = Drape {
                    low_mm: 60.0,
                    ..DISTRIBUTED
                };
                let [south, north] =
                    [0.4, 0.6].map(|share| track(x, bay, f64::from(spacing) + share));
                let tendon = plain(south, [0.0, y[2] + 2000.0], [End::Live, End::Dead], shallow);
                // Two of these show the height of every support, as a sample for the site.
                tendons.push(if spacing == 2 {
                    bays::with_supports(tendon, 1000.0)
                } else {
                    tendon
                });
                tendons.push(plain(
                    north,
                    [y[2] - 2000.0, HIGH_MM],
                    [End::Dead, End::Live],
                    shallow,
                ));
            }
        }
    }
    tendons.push(plain(WIDE_MM - 600.0, whole, both, DISTRIBUTED));
    tendons
}

/// Around the opening: out to 250 mm clear of its side, slope 1 in 14, arcs of 20 m.
fn swept(slab: &Slab, x_mm: f64) -> Tendon {
    let middle = opening_middle_mm(&slab.grid[0]);
    let clear = middle + 1250.0 * (x_mm - middle).signum();
    let shift_mm = clear - x_mm;
    let sweep = |from_mm: f64, shift_mm: f64| Sweep {
        from_mm,
        shift_mm,
        radius_mm: 20_000.0,
        slope: 1.0 / 14.0,
    };
    let sweeps = [sweep(1000.0, shift_mm), sweep(14_800.0, -shift_mm)];
    let path = Path::swept(Axis::Y, [0.0, HIGH_MM], x_mm, &sweeps);
    let mut tendon = bays::tendon(
        slab,
        Run::Distributed,
        path,
        [End::Live, End::Live],
        DISTRIBUTED,
    );
    if shift_mm > 0.0 {
        tendon.drawn_as = DrawnAs::Pieces;
    }
    tendon
}

/// Past the riser: one spline that eases aside and back.
fn splined(slab: &Slab, x_mm: f64) -> Tendon {
    let eased = [
        (0.0, 0.0),
        (3000.0, 0.0),
        (6000.0, 0.0),
        (9000.0, 0.0),
        (12_000.0, 60.0),
        (15_000.0, 240.0),
        (18_000.0, 360.0),
        (20_400.0, 360.0),
        (23_000.0, 240.0),
        (26_000.0, 60.0),
        (29_000.0, 0.0),
        (32_000.0, 0.0),
        (34_000.0, 0.0),
    ];
    let controls = eased
        .iter()
        .map(|(y_mm, aside)| [x_mm - aside, *y_mm])
        .collect::<Vec<_>>();
    let path = Path::spline(&controls, 170);
    let mut tendon = bays::tendon(
        slab,
        Run::Distributed,
        path,
        [End::Live, End::Live],
        DISTRIBUTED,
    );
    tendon.drawn_as = DrawnAs::Spline(controls);
    tendon
}

/// Habits of several hands: sides, directions and kinds of entity differ.
fn as_drafted(mut tendon: Tendon, dice: &mut Dice) -> Tendon {
    let axis = tendon.run.axis();
    let across = if axis == Axis::X {
        tendon.path.corners[0].0[1]
    } else {
        tendon.path.corners[0].0[0]
    };
    if tendon.run == Run::Banded {
        // One side for a whole band, or its labels would face one another.
        tendon.lettering.far_side = !(12_000.0..=30_000.0).contains(&across);
    } else {
        let crowded = tendon
            .points
            .iter()
            .any(|point| point.kind == Kind::Support);
        tendon.lettering.mark_station_mm = match tendon.path.length_mm() {
            _ if crowded => 2650.0,
            short if short > 30_000.0 => 2650.0,
            short if tendon.ends[0] == End::Live => short - 4900.0,
            _ => 3000.0,
        };
        letter(&mut tendon, across, dice);
    }
    if dice.once_in(7) {
        // Said although it is what mid-depth gives anyhow.
        for point in tendon
            .points
            .iter_mut()
            .filter(|point| point.kind == Kind::Anchor)
        {
            point.shown = Shown::Bare;
        }
    }
    if tendon.drawn_as == DrawnAs::Polyline {
        tendon.drawn_as = match dice.below(10) {
            0 => DrawnAs::Pieces,
            1 => DrawnAs::HeavyPolyline,
            _ => DrawnAs::Polyline,
        };
    }
    if dice.once_in(3) {
        tendon.reversed()
    } else {
        tendon
    }
}

/// Chooses sides so that no two labels share one gap: away from columns, and never towards a shorter tendon's label.
fn letter(tendon: &mut Tendon, across_mm: f64, dice: &mut Dice) {
    let spacing = GRID_X
        .windows(2)
        .find(|bay| across_mm < bay[1])
        .map_or(SPACINGS, |bay| {
            let [left, right] = [bay[0] + 200.0, bay[1] - 200.0];
            (across_mm - left) / (right - left) * SPACINGS
        });
    let short = (spacing - spacing.round()).abs() > 0.2;
    let odd = [1.0, 3.0, 5.0]
        .iter()
        .any(|odd| (spacing - odd).abs() < 0.2);
    tendon.lettering.far_side = spacing < SPACINGS - 0.2 && !(odd && dice.once_in(2));
    let last = (spacing - 6.0).abs() < 0.2;
    let far_side = tendon.lettering.far_side;
    tendon.lettering.along = short || last || (odd && (!far_side || dice.once_in(3)));
    tendon.lettering.word = (spacing - 2.0).abs() < 0.2;
}
