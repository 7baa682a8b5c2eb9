//! What lies around the tendons of the large floor.

use crate::background::{Title, dimensions, furniture, gridlines, title_strip, walls};
use crate::dice::Dice;
use crate::dxf::Drawing;
use crate::plan;
use crate::slab::Slab;

/// The slab and all the clutter of a working drawing.
pub(super) fn draw(slab: &Slab, dice: &mut Dice) -> Drawing {
    let mut drawing = plan::start(slab);
    plan::draw_slab(&mut drawing, slab, [21_200.0, 20_000.0]);
    gridlines(&mut drawing, slab);
    dimensions(&mut drawing, slab);
    let [low, high] = slab.openings[0];
    let wall = 200.0;
    walls(
        &mut drawing,
        &[
            [[low[0] - wall, low[1] - wall], [low[0], high[1] + wall]],
            [[high[0], low[1] - wall], [high[0] + wall, high[1] + wall]],
            [[low[0], high[1]], [high[0], high[1] + wall]],
            [[27_000.0, 18_600.0], [32_000.0, 18_800.0]],
        ],
    );
    let areas = [
        [[2600.0, 10_400.0], [8000.0, 16_000.0]],
        [[26_800.0, 10_400.0], [46_000.0, 15_800.0]],
        [[35_000.0, 19_000.0], [46_500.0, 23_800.0]],
        [[2600.0, 27_000.0], [46_000.0, 30_500.0]],
    ];
    furniture(&mut drawing, dice, &areas);
    for (at, words) in [
        ([10_900.0, 12_200.0], "OPEN OFFICE"),
        ([36_400.0, 17_900.0], "OPEN OFFICE"),
        ([18_900.0, 10_950.0], "STAIR 2"),
        ([42_000.0, 4600.0], "MEETING"),
    ] {
        drawing.layer("ROOM-NAMES", 252, "Continuous");
        drawing.draw("ROOM-NAMES", plan::text(at, 300.0, words));
    }
    let title = Title {
        project: "HARBOUR LEVEL 2",
        sheet: "POST-TENSIONING: TENDON LAYOUT",
        number: "DEMO-02   1:100 AT A1",
        revisions: &[
            "C  OPENING AT STAIR 2 WIDENED, TENDONS SWEPT",
            "B  DROP PANELS ADDED AT LINES B, C, D",
            "A  FIRST ISSUE",
        ],
    };
    let notes = [
        "1. HEIGHTS ARE TO THE CENTROID OF THE STRANDS, IN MILLIMETRES ABOVE THE LOCAL SOFFIT.",
        "2. ANCHORS ARE AT MID-DEPTH UNLESS A HEIGHT IS GIVEN.",
        "3. FLAT DUCTS 20 mm HIGH, FIVE STRANDS OF 12.7 mm. DISTRIBUTED TENDONS PASS OVER BANDED ONES.",
        "4. A DASHED LEVEL LINE GIVES ITS HEIGHT TO EVERY DISTRIBUTED TENDON THAT IT CROSSES.",
        "5. SWEEPS IN PLAN: SLOPE AT MOST 1 IN 12, RADIUS AT LEAST 8 m.",
        "6. WHERE TENDONS MEET AN OPENING KEEP 150 mm CLEAR.",
    ];
    title_strip(&mut drawing, slab, &title, &notes);
    drawing
}
