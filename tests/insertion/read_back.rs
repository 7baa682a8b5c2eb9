//! What was inserted, read again.

use proptest::prelude::*;
use tautplan::drawing::{
    Align, Drawing, Drawn, Ink, Mark, ShapeKind, Sheet, SheetLayer, Wanted, insert, open, read,
};
use tautplan::units::LengthUnit;

use crate::dxf_text::{Coding, encode};
use crate::sample::{VERSIONS, WHOLE, codings, drawing};

type Coord = geo::Coord<f64>;

/// A layer that the reader reads, unlike the marks' own.
const LAYER: &str = "TENDON-READ";

fn sheet_of(drawn: Vec<Drawn>) -> Sheet {
    let ink = Ink {
        index: 2,
        rgb: None,
    };
    Sheet {
        layers: vec![SheetLayer {
            name: LAYER.to_owned(),
            ink,
            on: true,
        }],
        marks: drawn
            .into_iter()
            .map(|drawn| Mark {
                layer: LAYER.to_owned(),
                ink: None,
                drawn,
            })
            .collect(),
    }
}

/// Inserts, and reads the layer that was inserted.
fn there_and_back(version: &str, coding: Coding, unit: LengthUnit, drawn: Vec<Drawn>) -> Drawing {
    let bytes = encode(&drawing(version, WHOLE), coding);
    let source = open(bytes).expect("a drawing");
    let marked = insert(&source, unit.metres(), &sheet_of(drawn)).expect("a sheet");
    let marked = open(marked).expect("a marked drawing");
    let wanted = Wanted::layers([LAYER]).expect("a pattern");
    let (drawing, findings) = read(&marked, &wanted, Some(unit));
    assert!(findings.is_empty(), "{version} {coding:?}: {findings:?}");
    drawing
}

fn text(place: Coord, content: &str) -> Drawn {
    Drawn::Text {
        place,
        height_m: 0.2,
        rotation_rad: 0.5,
        align: Align::MiddleRight,
        content: content.to_owned(),
    }
}

/// Signs that one code stands for, read as the commonest of them.
fn as_read(content: &str) -> String {
    content.replace('\u{2300}', "Ø")
}

fn near(a: Coord, b: Coord) -> bool {
    (a.x - b.x).abs() < 2e-9 && (a.y - b.y).abs() < 2e-9
}

#[test]
fn every_version_and_form_reads_back_as_it_was_drawn() {
    let points = vec![
        Coord {
            x: 0.0,
            y: 1.0 / 3.0,
        },
        Coord { x: 12.25, y: -7.0 },
        Coord { x: 1234.5, y: 1e-4 },
    ];
    let content = "B03 4x5-\u{2300}12.7 m^2 50% 100%% \u{b1}2\u{b0} \u{b2} a\\b";
    for version in VERSIONS {
        for coding in codings(version, WHOLE) {
            let line = Drawn::Line {
                points: points.clone(),
                width_m: 0.05,
                closed: false,
            };
            let circle = Drawn::Circle {
                centre: points[1],
                radius_m: 0.75,
            };
            let drawn = vec![line, circle, text(points[2], content)];
            let drawing = there_and_back(version, coding, LengthUnit::Mm, drawn);
            let what = format!("{version} {coding:?}");
            assert_eq!(drawing.shapes.len(), 2, "{what}");
            for shape in &drawing.shapes {
                assert_eq!(shape.layer, LAYER, "{what}");
                if shape.kind == ShapeKind::Polyline {
                    let ends =
                        [shape.path.start(), shape.path.end()].map(Option::unwrap_or_default);
                    assert!(
                        near(ends[0], points[0]) && near(ends[1], points[2]),
                        "{what}"
                    );
                    assert_eq!(shape.path.segments().len(), 2, "{what}");
                } else {
                    assert_eq!(shape.kind, ShapeKind::Circle, "{what}");
                    let round = std::f64::consts::TAU * 0.75;
                    assert!((shape.path.length_m() - round).abs() < 1e-9, "{what}");
                }
            }
            let [text] = &drawing.texts[..] else {
                panic!("{what}: {} texts", drawing.texts.len());
            };
            assert_eq!(text.content, as_read(content), "{what}");
            assert!(near(text.place, points[2]), "{what}: {:?}", text.place);
            assert!((text.rotation_rad - 0.5).abs() < 1e-7, "{what}");
            assert!((text.height_m - 0.2).abs() < 1e-9, "{what}");
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_text_reads_back(content in "[ -~äß²µΩ–⌀°±日Ø]{1,30}", version in 0..VERSIONS.len(), form in 0..4_usize) {
        let version = VERSIONS[version];
        let coding = codings(version, WHOLE)[form];
        prop_assume!(!content.trim().is_empty());
        let drawn = vec![text(Coord { x: 1.0, y: 2.0 }, &content)];
        let drawing = there_and_back(version, coding, LengthUnit::M, drawn);
        prop_assert_eq!(drawing.texts.len(), 1);
        prop_assert_eq!(drawing.texts[0].content.trim(), as_read(content.trim()));
    }

    #[test]
    fn any_line_reads_back(
        points in prop::collection::vec((-1e4..1e4_f64, -1e4..1e4_f64), 2..20),
        version in 0..VERSIONS.len(),
        form in 0..4_usize,
        inches in any::<bool>(),
    ) {
        let version = VERSIONS[version];
        let unit = if inches { LengthUnit::In } else { LengthUnit::Mm };
        let points: Vec<Coord> = points.into_iter().map(|(x, y)| Coord { x, y }).collect();
        let line = Drawn::Line { points: points.clone(), width_m: 0.0, closed: false };
        let drawing = there_and_back(version, codings(version, WHOLE)[form], unit, vec![line]);
        prop_assert_eq!(drawing.shapes.len(), 1);
        let segments = drawing.shapes[0].path.segments();
        prop_assert_eq!(segments.len(), points.len() - 1);
        for (segment, pair) in segments.iter().zip(points.windows(2)) {
            let half_step = 0.5e-6 * unit.metres() * 1.5;
            prop_assert!((segment.start().x - pair[0].x).abs() < half_step);
            prop_assert!((segment.end().y - pair[1].y).abs() < half_step);
        }
    }
}
