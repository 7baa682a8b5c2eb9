//! Sheets to insert.

use tautplan::drawing::{Align, Drawn, Ink, Mark, Sheet, SheetLayer};

type Coord = geo::Coord<f64>;

pub(crate) fn sheet() -> Sheet {
    let layer = |name: &str, rgb, on| SheetLayer {
        name: name.to_owned(),
        ink: Ink { index: 3, rgb },
        on,
    };
    let at = |x: f64, y: f64| Coord { x, y };
    let mark = |name: &str, ink, drawn| Mark {
        layer: name.to_owned(),
        ink,
        drawn,
    };
    let red = Some(Ink {
        index: 1,
        rgb: Some([250, 10, 20]),
    });
    let line = |closed, width_m| Drawn::Line {
        points: vec![at(0.0, 0.0), at(1.0 / 3.0, 2.0), at(4.0, 1.0)],
        width_m,
        closed,
    };
    Sheet {
        layers: vec![
            layer("TAUT-FORCE-SERVICE", Some([1, 2, 3]), true),
            layer("TAUT-FORCE-JACKING", None, false),
            layer("TAUT-TABLE", None, true),
        ],
        marks: vec![
            mark("TAUT-FORCE-SERVICE", red, line(false, 0.05)),
            mark("TAUT-FORCE-JACKING", None, line(true, 0.0)),
            mark(
                "TAUT-TABLE",
                None,
                Drawn::Line3d {
                    points: vec![[0.0, 0.0, -0.1], [5.0, 0.0, -0.25]],
                },
            ),
            mark(
                "TAUT-TABLE",
                red,
                Drawn::Text {
                    place: at(1.0, 2.0),
                    height_m: 0.2,
                    rotation_rad: 0.5,
                    align: Align::Middle,
                    content: "540 kN ±2 ²".to_owned(),
                },
            ),
            mark(
                "TAUT-TABLE",
                None,
                Drawn::Circle {
                    centre: at(3.0, 3.0),
                    radius_m: 0.4,
                },
            ),
            mark(
                "TAUT-TABLE",
                None,
                Drawn::Solid {
                    corners: [at(0.0, 0.0), at(1.0, 0.0), at(1.0, 1.0), at(0.0, 1.0)],
                },
            ),
        ],
    }
}

/// The same layers with fewer marks.
pub(crate) fn smaller_sheet() -> Sheet {
    let mut sheet = sheet();
    sheet.marks.truncate(2);
    sheet
}

pub(crate) fn no_marks() -> Sheet {
    Sheet {
        marks: Vec::new(),
        ..sheet()
    }
}
