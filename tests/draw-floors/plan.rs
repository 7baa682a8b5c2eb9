//! The drawing conventions: which layer, which entity, which symbol says what about slab and tendons.

use std::f64::consts::{FRAC_PI_2, PI};

use crate::dxf::{Across, Drawing, Shape, Text, Up, Xy};
use crate::path::Piece;
use crate::slab::{Box2, Slab};
use crate::tendon::{DrawnAs, End, Kind, Point, Run, Shown, Tendon};

const LAYERS: [(&str, u8, &str); 13] = [
    ("TENDON-BANDED", 1, "Continuous"),
    ("TENDON-DISTRIBUTED", 5, "Continuous"),
    ("TENDON-HEIGHT", 3, "Continuous"),
    ("TENDON-LEVEL-LINE", 6, "DASHED"),
    ("TENDON-MARK", 30, "Continuous"),
    ("TENDON-END", 2, "Continuous"),
    ("SLAB-EDGE", 7, "Continuous"),
    ("SLAB-OPENING", 7, "Continuous"),
    ("SLAB-ZONE", 4, "HIDDEN"),
    ("COLUMN", 8, "Continuous"),
    ("GRID", 8, "CENTER"),
    ("DIMENSIONS", 9, "Continuous"),
    ("NOTES", 7, "Continuous"),
];

/// An empty drawing with the layers and the blocks every floor uses.
pub(crate) fn start(slab: &Slab) -> Drawing {
    let mut drawing = Drawing {
        extents: slab.extents(),
        ..Drawing::default()
    };
    for (name, colour, linetype) in LAYERS {
        drawing.layer(name, colour, linetype);
    }
    // Symbols point out of the slab along x, with the anchor at the origin.
    let wedge = [[0.0, 0.0], [150.0, 55.0], [150.0, 55.0], [150.0, -55.0]];
    drawing.block(
        "LIVE-END",
        vec![
            ("0", Shape::Solid(wedge)),
            ("0", Shape::Line([[0.0, 0.0], [150.0, 0.0]])),
        ],
    );
    let plate = [[-25.0, -60.0], [0.0, -60.0], [0.0, 60.0], [-25.0, 60.0]];
    let tail = Shape::Line([[-120.0, 0.0], [0.0, 0.0]]);
    drawing.block("DEAD-END", vec![("0", Shape::Solid(plate)), ("0", tail)]);
    let half = slab.column_mm / 2.0;
    let faces = rectangle([[-half, -half], [half, half]]);
    let cross = [
        [[-half, -half], [half, half]],
        [[-half, half], [half, -half]],
    ];
    drawing.block(
        "COLUMN-SQUARE",
        vec![
            ("0", closed(&faces)),
            ("0", Shape::Line(cross[0])),
            ("0", Shape::Line(cross[1])),
        ],
    );
    drawing.block(
        "GRID-BUBBLE",
        vec![(
            "0",
            Shape::Circle {
                centre: [0.0, 0.0],
                radius_mm: 450.0,
            },
        )],
    );
    drawing
}

pub(crate) fn rectangle([low, high]: Box2) -> Vec<Xy> {
    vec![low, [high[0], low[1]], high, [low[0], high[1]]]
}

pub(crate) fn closed(corners: &[Xy]) -> Shape {
    Shape::Polyline {
        corners: corners.iter().map(|at| (*at, 0.0)).collect(),
        closed: true,
    }
}

/// A text level with the sheet, by its lower left corner.
pub(crate) fn text(at: Xy, height_mm: f64, content: &str) -> Shape {
    let content = content.to_owned();
    Shape::Text(Text {
        at,
        height_mm,
        rotation_rad: 0.0,
        across: Across::Left,
        up: Up::Baseline,
        content,
    })
}

/// A text level with the sheet, by its middle.
pub(crate) fn centred(at: Xy, height_mm: f64, content: &str) -> Shape {
    let content = content.to_owned();
    Shape::Text(Text {
        at,
        height_mm,
        rotation_rad: 0.0,
        across: Across::Centre,
        up: Up::Middle,
        content,
    })
}

/// Edge, zones with their thickness, openings with a cross, columns, level lines.
pub(crate) fn draw_slab(drawing: &mut Drawing, slab: &Slab, thickness_at: Xy) {
    drawing.draw("SLAB-EDGE", closed(&slab.edge));
    drawing.draw(
        "SLAB-ZONE",
        text(thickness_at, 250.0, &format!("T{}", slab.thickness_mm)),
    );
    for (corners, thickness_mm) in &slab.zones {
        drawing.draw("SLAB-ZONE", closed(&rectangle(*corners)));
        let inside = [corners[0][0] + 100.0, corners[1][1] - 270.0];
        drawing.draw(
            "SLAB-ZONE",
            text(inside, 180.0, &format!("T{thickness_mm}")),
        );
    }
    for [low, high] in &slab.openings {
        drawing.draw("SLAB-OPENING", closed(&rectangle([*low, *high])));
        drawing.draw("NOTES", Shape::Line([*low, *high]));
        drawing.draw("NOTES", Shape::Line([[low[0], high[1]], [high[0], low[1]]]));
    }
    for at in &slab.columns {
        let block = "COLUMN-SQUARE".to_owned();
        drawing.draw(
            "COLUMN",
            Shape::Insert {
                block,
                at: *at,
                scale: 1.0,
                rotation_rad: 0.0,
            },
        );
    }
    for line in &slab.level_lines {
        let ends = line.x_mm.map(|x_mm| [x_mm, line.y_mm]);
        drawing.draw("TENDON-LEVEL-LINE", Shape::Line(ends));
        let letter = if line.kind == Kind::High { "H" } else { "L" };
        let at = [line.text_x_mm, line.y_mm + 30.0];
        drawing.draw(
            "TENDON-LEVEL-LINE",
            text(at, 90.0, &format!("{letter}{}", line.height_mm)),
        );
    }
}

/// The line, its ends, its mark and its heights.
pub(crate) fn draw_tendon(drawing: &mut Drawing, tendon: &Tendon) {
    let on = |layer: &str| format!("{layer}{}", tendon.layer_suffix);
    for shape in line(tendon) {
        drawing.draw(&on(tendon.run.layer()), shape);
    }
    for (end, station_mm) in tendon.ends.into_iter().zip([0.0, tendon.path.length_mm()]) {
        let (at, direction) = tendon.path.at(station_mm);
        let outward = if station_mm > 0.0 {
            direction
        } else {
            direction + PI
        };
        let block = match end {
            End::Live => "LIVE-END",
            End::Dead => "DEAD-END",
            End::Unknown => continue,
        };
        let rotation_rad = outward.rem_euclid(2.0 * PI);
        drawing.draw(
            &on("TENDON-END"),
            Shape::Insert {
                block: block.to_owned(),
                at,
                scale: 1.0,
                rotation_rad,
            },
        );
    }
    let mark = beside(
        tendon,
        tendon.lettering.mark_station_mm,
        true,
        Across::Left,
        tendon.mark_text(),
    );
    drawing.draw(&on("TENDON-MARK"), mark);
    for point in &tendon.points {
        if let Some(label) = height(tendon, point) {
            drawing.draw(&on("TENDON-HEIGHT"), label);
        }
    }
}

fn line(tendon: &Tendon) -> Vec<Shape> {
    let corners = tendon.path.corners.clone();
    match &tendon.drawn_as {
        DrawnAs::Polyline => vec![Shape::Polyline {
            corners,
            closed: false,
        }],
        DrawnAs::HeavyPolyline => vec![Shape::HeavyPolyline { corners }],
        DrawnAs::Spline(controls) => vec![Shape::Spline {
            controls: controls.clone(),
        }],
        DrawnAs::Pieces => tendon.path.pieces().iter().flat_map(pieces).collect(),
    }
}

/// A LINE or an ARC; a straight piece of more than twelve metres as two LINEs, as drafting leaves them.
fn pieces(piece: &Piece) -> Vec<Shape> {
    match *piece {
        Piece::Straight { from, to } if piece.length_mm() > 12_000.0 => {
            let middle = [f64::midpoint(from[0], to[0]), f64::midpoint(from[1], to[1])];
            vec![Shape::Line([from, middle]), Shape::Line([to, middle])]
        }
        Piece::Straight { from, to } => vec![Shape::Line([from, to])],
        Piece::Arc {
            centre,
            radius_mm,
            start_rad,
            turn_rad,
        } => {
            let ends = [start_rad, start_rad + turn_rad];
            let [from, to] = if turn_rad > 0.0 {
                ends
            } else {
                [ends[1], ends[0]]
            };
            let angles_rad = [from.rem_euclid(2.0 * PI), to.rem_euclid(2.0 * PI)];
            vec![Shape::Arc {
                centre,
                radius_mm,
                angles_rad,
            }]
        }
    }
}

fn height(tendon: &Tendon, point: &Point) -> Option<Shape> {
    let content = match (point.shown, point.kind) {
        (Shown::Label, Kind::High) => format!("H{}", point.height_mm),
        (Shown::Label, Kind::Low) => format!("L{}", point.height_mm),
        (Shown::Label | Shown::Bare, _) => format!("{}", point.height_mm),
        (Shown::LevelLine | Shown::Nothing, _) => return None,
    };
    let lettering = tendon.lettering;
    if lettering.word && !lettering.along && lettering.far_side {
        let at = tendon.place(point);
        let at = [at[0] + 0.5 * lettering.height_mm, at[1]];
        return Some(Shape::Word {
            at,
            height_mm: lettering.height_mm,
            content,
        });
    }
    Some(beside(
        tendon,
        point.station_mm,
        lettering.along,
        Across::Centre,
        content,
    ))
}

/// A text whose alignment point stands square off the tendon at a station, on the tendon's lettering side.
fn beside(tendon: &Tendon, station_mm: f64, along: bool, across: Across, content: String) -> Shape {
    let lettering = tendon.lettering;
    let height_mm = lettering.height_mm;
    let (at, direction) = tendon.path.at(station_mm);
    let rotation_rad = readable(direction);
    let left = [-rotation_rad.sin(), rotation_rad.cos()];
    // Left of a readable direction is up for a banded tendon, and towards lesser x for a distributed one.
    let on_left = lettering.far_side == (tendon.run == Run::Banded);
    let side = if on_left { 1.0 } else { -1.0 };
    let aside = |distance: f64| {
        [
            at[0] + left[0] * side * distance,
            at[1] + left[1] * side * distance,
        ]
    };
    if along {
        let up = if on_left { Up::Baseline } else { Up::Top };
        return Shape::Text(Text {
            at: aside(0.4 * height_mm),
            height_mm,
            rotation_rad,
            across,
            up,
            content,
        });
    }
    let across = if on_left { Across::Right } else { Across::Left };
    Shape::Text(Text {
        at: aside(0.5 * height_mm),
        height_mm,
        rotation_rad: 0.0,
        across,
        up: Up::Middle,
        content,
    })
}

/// The direction turned so that writing along it is not upside down.
fn readable(direction_rad: f64) -> f64 {
    let mut turned = direction_rad;
    while turned > FRAC_PI_2 + 1e-9 {
        turned -= PI;
    }
    while turned <= -FRAC_PI_2 + 1e-9 {
        turned += PI;
    }
    turned
}
