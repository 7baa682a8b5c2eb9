//! A floor with one planted fault a tendon, sound tendons around them, and the list of what was planted.

mod planted;

use std::fmt::Write as _;

use crate::Floor;
use crate::background::{Title, dimensions, gridlines, title_strip};
use crate::dxf::Xy;
use crate::plan;
use crate::slab::Slab;
use planted::{Planted, SUPERSEDED};

const HIGH_MM: f64 = 26_000.0;
const WIDE_MM: f64 = 42_000.0;

/// What is wrong, where, as a rule names it.
pub(crate) struct Fault {
    rule: &'static str,
    mark: String,
    at: Xy,
    what: &'static str,
}

/// The list as CSV, in the order planted.
pub(crate) fn to_csv(faults: &[Fault]) -> String {
    let mut text = "rule,mark,x_m,y_m,what\n".to_owned();
    for Fault {
        rule,
        mark,
        at,
        what,
    } in faults
    {
        // Writing into a string cannot fail.
        let _ = writeln!(
            text,
            "{rule},{mark},{:.3},{:.3},{what}",
            at[0] / 1000.0,
            at[1] / 1000.0
        );
    }
    text
}

/// `faulty-floor`: 42 m by 26 m with a recess in one side and one opening.
pub(crate) fn floor() -> (Floor, Vec<Fault>) {
    let grid = [
        vec![1500.0, 9300.0, 17_100.0, 24_900.0, 32_700.0, 40_500.0],
        vec![1500.0, 9100.0, 16_900.0, 24_500.0],
    ];
    let columns = grid[0]
        .iter()
        .flat_map(|x| grid[1].iter().map(|y| [*x, *y]))
        .collect();
    let slab = Slab {
        edge: vec![
            [0.0, 0.0],
            [WIDE_MM, 0.0],
            [WIDE_MM, 17_800.0],
            [38_300.0, 17_800.0],
            [38_300.0, 20_000.0],
            [WIDE_MM, 20_000.0],
            [WIDE_MM, HIGH_MM],
            [0.0, HIGH_MM],
        ],
        thickness_mm: 250.0,
        zones: Vec::new(),
        openings: vec![[[12_200.0, 11_500.0], [14_200.0, 14_500.0]]],
        columns,
        column_mm: 600.0,
        level_lines: Vec::new(),
        grid,
    };
    let planted = Planted::on(&slab);
    let Planted {
        mut tendons,
        faults,
        loose,
        ..
    } = planted;
    let mut drawing = plan::start(&slab);
    plan::draw_slab(&mut drawing, &slab, [37_200.0, 12_700.0]);
    gridlines(&mut drawing, &slab);
    dimensions(&mut drawing, &slab);
    for (layer, shape) in loose {
        drawing.draw(layer, shape);
    }
    for (layer, colour) in [
        ("TENDON-DISTRIBUTED", 5),
        ("TENDON-HEIGHT", 3),
        ("TENDON-MARK", 30),
        ("TENDON-END", 2),
    ] {
        drawing.layer(&format!("{layer}{SUPERSEDED}"), colour, "Continuous");
    }
    drawing.freeze(SUPERSEDED);
    let title = Title {
        project: "FAULTY FLOOR",
        sheet: "TENDON LAYOUT WITH PLANTED FAULTS",
        number: "DEMO-03",
        revisions: &["A  ISSUED FOR CHECKING"],
    };
    let notes = [
        "1. HEIGHTS ARE TO THE CENTROID OF THE STRANDS, IN MILLIMETRES ABOVE THE SOFFIT.",
        "2. ANCHORS ARE AT MID-DEPTH UNLESS A HEIGHT IS GIVEN.",
        "3. FLAT DUCTS 20 mm HIGH, STRANDS OF 12.7 mm.",
    ];
    title_strip(&mut drawing, &slab, &title, &notes);
    tendons.sort_by(|one, other| one.mark.cmp(&other.mark));
    (
        Floor {
            name: "faulty-floor",
            slab,
            tendons,
            drawing,
        },
        faults,
    )
}
