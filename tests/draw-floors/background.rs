//! What surrounds the tendons on a working drawing: gridlines, dimensions, furniture, notes, title strip, a sheet.

use crate::dice::Dice;
use crate::dxf::{Drawing, Shape, Xy};
use crate::plan::{centred, closed, rectangle, text};
use crate::slab::Slab;

/// Gridlines with bubbles: numbers along x, letters along y.
pub(crate) fn gridlines(drawing: &mut Drawing, slab: &Slab) {
    let [low, high] = slab.extents();
    let bubble = |drawing: &mut Drawing, at: Xy, name: &str| {
        let block = "GRID-BUBBLE".to_owned();
        drawing.draw(
            "GRID",
            Shape::Insert {
                block,
                at,
                scale: 1.0,
                rotation_rad: 0.0,
            },
        );
        drawing.draw("GRID", centred(at, 350.0, name));
    };
    for (index, x_mm) in slab.grid[0].iter().enumerate() {
        let ends = [[*x_mm, low[1] - 3500.0], [*x_mm, high[1] + 3500.0]];
        drawing.draw("GRID", Shape::Line(ends));
        bubble(
            drawing,
            [*x_mm, ends[0][1] - 450.0],
            &format!("{}", index + 1),
        );
        bubble(
            drawing,
            [*x_mm, ends[1][1] + 450.0],
            &format!("{}", index + 1),
        );
    }
    for (y_mm, name) in slab.grid[1]
        .iter()
        .zip(["A", "B", "C", "D", "E", "F", "G", "H", "J", "K"])
    {
        let ends = [[low[0] - 3500.0, *y_mm], [high[0] + 3500.0, *y_mm]];
        drawing.draw("GRID", Shape::Line(ends));
        bubble(drawing, [ends[0][0] - 450.0, *y_mm], name);
        bubble(drawing, [ends[1][0] + 450.0, *y_mm], name);
    }
}

/// Chains of dimensions above and to the left of the floor.
pub(crate) fn dimensions(drawing: &mut Drawing, slab: &Slab) {
    let [low, high] = slab.extents();
    let chain = |ends: [f64; 2], grid: &[f64]| {
        let mut stops = vec![ends[0]];
        stops.extend_from_slice(grid);
        stops.push(ends[1]);
        stops
    };
    let across = chain([low[0], high[0]], &slab.grid[0]);
    let up = chain([low[1], high[1]], &slab.grid[1]);
    for pair in across.windows(2) {
        drawing.dimension(
            "DIMENSIONS",
            [pair[0], high[1]],
            [pair[1], high[1]],
            1400.0,
            220.0,
        );
    }
    drawing.dimension("DIMENSIONS", [low[0], high[1]], high, 2300.0, 220.0);
    for pair in up.windows(2) {
        drawing.dimension(
            "DIMENSIONS",
            [low[0], pair[0]],
            [low[0], pair[1]],
            1400.0,
            220.0,
        );
    }
    drawing.dimension("DIMENSIONS", low, [low[0], high[1]], 2300.0, 220.0);
}

/// A core wall along a line of boxes, outlined and hatched.
pub(crate) fn walls(drawing: &mut Drawing, boxes: &[[Xy; 2]]) {
    drawing.layer("WALL-BELOW", 8, "HIDDEN");
    drawing.layer("HATCH", 252, "Continuous");
    for corners in boxes {
        let outline = rectangle(*corners);
        drawing.draw("WALL-BELOW", closed(&outline));
        drawing.draw(
            "HATCH",
            Shape::Hatch {
                outline,
                spacing_mm: Some(120.0),
            },
        );
    }
}

/// Desks and chairs in rows, as an architect's background brings them along.
pub(crate) fn furniture(drawing: &mut Drawing, dice: &mut Dice, areas: &[[Xy; 2]]) {
    drawing.layer("FURNITURE", 253, "Continuous");
    let seat = Shape::Arc {
        centre: [800.0, -450.0],
        radius_mm: 230.0,
        angles_rad: [0.0, 2.0 * std::f64::consts::PI - 0.5],
    };
    let top = closed(&rectangle([[0.0, 0.0], [1600.0, 800.0]]));
    drawing.block("DESK", vec![("FURNITURE", top), ("FURNITURE", seat)]);
    for [low, high] in areas {
        let mut y_mm = low[1];
        while y_mm < high[1] {
            let mut x_mm = low[0];
            while x_mm < high[0] {
                if !dice.once_in(4) {
                    let block = "DESK".to_owned();
                    drawing.draw(
                        "FURNITURE",
                        Shape::Insert {
                            block,
                            at: [x_mm, y_mm],
                            scale: 1.0,
                            rotation_rad: 0.0,
                        },
                    );
                }
                x_mm += 1900.0;
            }
            y_mm += 2100.0;
        }
    }
}

/// What the title strip says.
pub(crate) struct Title<'a> {
    pub(crate) project: &'a str,
    pub(crate) sheet: &'a str,
    pub(crate) number: &'a str,
    /// Latest first.
    pub(crate) revisions: &'a [&'a str],
}

/// A strip to the right of the floor with legend, notes, revisions and names.
pub(crate) fn title_strip(drawing: &mut Drawing, slab: &Slab, title: &Title<'_>, notes: &[&str]) {
    let [low, high] = slab.extents();
    let [left, right] = [high[0] + 6500.0, high[0] + 15_500.0];
    let [bottom, top] = [low[1] - 5500.0, (high[1] + 5500.0).max(low[1] + 16_500.0)];
    drawing.extents = [
        [low[0] - 6500.0, bottom - 1000.0],
        [right + 1000.0, top + 1000.0],
    ];
    drawing.draw("NOTES", closed(&rectangle([[left, bottom], [right, top]])));
    drawing.draw(
        "NOTES",
        closed(&rectangle([
            [low[0] - 6000.0, bottom - 500.0],
            [right + 500.0, top + 500.0],
        ])),
    );
    let edge = left + 400.0;
    drawing.draw("NOTES", text([edge, top - 800.0], 300.0, "LEGEND"));
    let legend = [
        ("LIVE-END", "LIVE END, STRESSED FROM HERE"),
        ("DEAD-END", "DEAD END, FIXED"),
    ];
    let mut y_mm = top - 1500.0;
    for (block, meaning) in legend {
        let at = [edge + 900.0, y_mm];
        drawing.draw("NOTES", Shape::Line([[edge, y_mm], at]));
        drawing.draw(
            "NOTES",
            Shape::Insert {
                block: block.to_owned(),
                at,
                scale: 1.5,
                rotation_rad: 0.0,
            },
        );
        drawing.draw("NOTES", text([edge + 1500.0, y_mm - 90.0], 180.0, meaning));
        y_mm -= 500.0;
    }
    for meaning in [
        "B03 4x5-12.7   MARK, TENDONS x STRANDS - DIAMETER",
        "H205   HIGH POINT, mm ABOVE SOFFIT",
        "L45   LOW POINT, mm ABOVE SOFFIT",
        "T250   SLAB THICKNESS, mm",
    ] {
        drawing.draw("NOTES", text([edge, y_mm - 90.0], 180.0, meaning));
        y_mm -= 420.0;
    }
    y_mm -= 300.0;
    let content = format!("NOTES\\P{}", notes.join("\\P"));
    drawing.draw(
        "NOTES",
        Shape::Paragraph {
            at: [edge, y_mm],
            height_mm: 180.0,
            wide_mm: right - edge - 300.0,
            content,
        },
    );
    let head = bottom + 4200.0;
    for y_mm in [head, bottom + 2600.0, bottom + 1300.0] {
        drawing.draw("NOTES", Shape::Line([[left, y_mm], [right, y_mm]]));
    }
    for (index, revision) in (0_u8..).zip(title.revisions) {
        drawing.draw(
            "NOTES",
            text(
                [edge, head - 450.0 - 380.0 * f64::from(index)],
                180.0,
                revision,
            ),
        );
    }
    drawing.draw("NOTES", text([edge, bottom + 2050.0], 320.0, title.project));
    drawing.draw("NOTES", text([edge, bottom + 1550.0], 220.0, title.sheet));
    drawing.draw("NOTES", text([edge, bottom + 700.0], 250.0, title.number));
    drawing.draw(
        "NOTES",
        text(
            [edge, bottom + 250.0],
            160.0,
            "INVENTED FOR DEMONSTRATION, NOT FOR CONSTRUCTION",
        ),
    );
    sheet(drawing);
}

/// An A1 sheet with a frame and one window on the model.
fn sheet(drawing: &mut Drawing) {
    let [low, high] = drawing.extents;
    let middle = [
        f64::midpoint(low[0], high[0]),
        f64::midpoint(low[1], high[1]),
    ];
    let size = [800.0, 560.0];
    let high_mm = (high[1] - low[1]).max((high[0] - low[0]) * size[1] / size[0]);
    let whole = Shape::Viewport {
        id: 1,
        at: [420.5, 297.0],
        size: [841.0, 594.0],
        middle: [420.5, 297.0],
        high_mm: 594.0,
    };
    let window = Shape::Viewport {
        id: 2,
        at: [420.5, 297.0],
        size,
        middle,
        high_mm,
    };
    let frame = closed(&rectangle([[10.0, 10.0], [831.0, 584.0]]));
    for shape in [whole, window, frame] {
        drawing.paper.push(crate::dxf::Entity {
            layer: "NOTES".to_owned(),
            shape,
        });
    }
}
