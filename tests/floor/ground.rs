//! Slab zones, and the thickness that points take from them.

use tautplan::drawing::Layer;
use tautplan::finding::{Finding, Level};
use tautplan::floor::{Floor, Tendon, read};
use tautplan::job::Job;

use crate::kit::Board;
use crate::sketch::{BANDED, mm, only, rules, tendon, told};

const ZONE: &str = "SLAB-ZONE";

/// A tendon across the slab with heights every five metres.
fn crossed(draw: impl FnOnce(&mut Board)) -> (Floor, Vec<Finding>) {
    let mut board = Board::slab();
    board.bare_tendon(BANDED, "B01", [0.0, 40.0], 5.0);
    for (x, content) in [(5.0, "L30"), (15.0, "H165"), (25.0, "L30"), (35.0, "H165")] {
        board.height(content, (x, 5.0));
    }
    draw(&mut board);
    board.read()
}

/// Thickness at each point, millimetres.
fn thickness_mm(tendon: &Tendon) -> Vec<Option<i64>> {
    tendon
        .points
        .iter()
        .map(|p| p.thickness_m.map(mm))
        .collect()
}

fn found(floor: &Floor) -> Vec<Option<i64>> {
    thickness_mm(tendon(floor, "B01"))
}

#[test]
fn a_zone_within_a_zone_has_the_thickness_of_the_inner_text() {
    let (floor, findings) = crossed(|board| {
        board.rectangle(ZONE, (12.0, 2.0), (30.0, 9.0));
        board.rectangle(ZONE, (13.0, 3.0), (17.0, 7.0));
        board.write(ZONE, "T300", (20.0, 8.0));
        board.write(ZONE, "T350", (15.0, 6.0));
    });
    assert_eq!(found(&floor), [250, 250, 350, 300, 250, 250].map(Some));
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    // The top is level, so the soffit drops: the same height lies lower.
    let high = &tendon(&floor, "B01").points[2];
    assert_eq!(high.level_m().map(mm), Some(165 - 350));
}

#[test]
fn a_zone_may_be_an_open_chain_of_lines_that_closes() {
    let sides = [
        [(12.0, 2.0), (18.0, 2.0)],
        [(18.0, 9.0), (18.0, 2.0)],
        [(12.008, 9.0), (18.0, 9.0)],
        [(12.0, 2.0), (12.0, 9.0)],
    ];
    let draw = |sides: &[[(f64, f64); 2]]| {
        crossed(|board| {
            for side in sides {
                board.line(ZONE, side);
            }
            board.write(ZONE, "T350", (15.0, 6.0));
        })
    };
    let (floor, findings) = draw(&sides);
    assert_eq!(found(&floor), [250, 250, 350, 250, 250, 250].map(Some));
    assert!(told(&findings, "outline-open").is_empty());
    // Three sides are no zone; its text then speaks of the slab, and contradicts the slab's own.
    let (floor, findings) = draw(&sides[..3]);
    assert!(floor.slab.zones.is_empty());
    let open = only(&findings, "outline-open");
    assert!(
        open.text.contains("its ends 7.000 m apart"),
        "{}",
        open.text
    );
    assert_eq!(only(&findings, "thickness-differs").level, Level::Error);
    assert_eq!(
        found(&floor),
        [None; 6],
        "neither of two thicknesses is taken"
    );
}

#[test]
fn inside_a_zone_without_a_text_the_thickness_is_unknown() {
    let (floor, findings) = crossed(|board| board.rectangle(ZONE, (12.0, 2.0), (18.0, 9.0)));
    let expected = [Some(250), Some(250), None, Some(250), Some(250), Some(250)];
    assert_eq!(found(&floor), expected);
    let finding = only(&findings, "zone-unread");
    assert!(finding.text.contains("42.0 m²"), "{}", finding.text);
}

#[test]
fn two_thicknesses_in_one_zone_are_said_whichever_was_drawn_first() {
    let read = |texts: [&str; 2]| {
        crossed(|board| {
            board.rectangle(ZONE, (12.0, 2.0), (18.0, 9.0));
            for text in texts {
                board.write(ZONE, text, (15.0, 6.0));
            }
        })
    };
    let (first, findings) = read(["T350", "T400"]);
    let (other, others) = read(["T400", "T350"]);
    assert_eq!(only(&findings, "thickness-differs").level, Level::Error);
    assert_eq!(findings, others);
    assert_eq!(found(&first), found(&other));
}

#[test]
fn a_floor_without_a_thickness_says_so_once() {
    let mut board = Board::new();
    board.bare_tendon(BANDED, "B01", [0.0, 40.0], 5.0);
    board.height("L30", (20.0, 5.0));
    let (floor, findings) = board.read();
    assert_eq!(only(&findings, "thickness-unknown").level, Level::Error);
    let points = &tendon(&floor, "B01").points;
    let heights: Vec<Option<i64>> = points.iter().map(|p| p.height_m.map(mm)).collect();
    assert_eq!(
        heights,
        [None, Some(30), None],
        "no mid-depth without a depth"
    );
}

#[test]
fn of_outlines_on_one_layer_for_edge_and_zones_the_inner_are_zones() {
    let mut board = Board::new();
    board.rectangle("STRUCTURE", (0.0, 0.0), (40.0, 20.0));
    board.rectangle("STRUCTURE", (12.0, 2.0), (18.0, 9.0));
    board.write("STRUCTURE", "T250", (30.0, 15.0));
    board.write("STRUCTURE", "T350", (15.0, 6.0));
    board.bare_tendon(BANDED, "B01", [0.0, 40.0], 5.0);
    for (x, content) in [(5.0, "L30"), (15.0, "H165"), (25.0, "L30"), (35.0, "H165")] {
        board.height(content, (x, 5.0));
    }
    let mut job = Job::default();
    for layers in [
        &mut job.conventions.layers.slab_edge,
        &mut job.conventions.layers.slab_zone,
    ] {
        *layers = vec!["STRUCTURE".to_owned()];
    }
    let (floor, findings) = read(&board.drawing, &job);
    assert_eq!(found(&floor), [250, 250, 350, 250, 250, 250].map(Some));
    assert_eq!(floor.slab.outlines.len(), 1);
    assert_eq!(floor.slab.zones.len(), 1);
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
}

#[test]
fn openings_that_are_hatched_and_have_no_outline_are_said() {
    let hatched = |layer: &str, outlined: bool| {
        let mut board = Board::slab();
        board.bare_tendon(BANDED, "B01", [0.0, 20.0], 5.0);
        board.drawing.layers.push(Layer {
            name: layer.to_owned(),
            counts: vec![("HATCH".to_owned(), 3)],
            ..Layer::default()
        });
        if outlined {
            board.rectangle(layer, (2.0, 8.0), (3.0, 9.0));
        }
        let (_, findings) = board.read();
        findings
    };
    let text = &only(&hatched("SLAB-OPENING", false), "hatch-unread")
        .text
        .clone();
    assert!(
        text.starts_with("layer SLAB-OPENING holds 3 hatches and no line: no openings were read"),
        "{text}"
    );
    for (layer, outlined) in [("SLAB-OPENING", true), ("FURNITURE", false)] {
        assert!(
            told(&hatched(layer, outlined), "hatch-unread").is_empty(),
            "{layer}"
        );
    }
}
