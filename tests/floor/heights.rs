//! What a height number means: the same drawing under other conventions.

use tautplan::drawing::{Wanted, open, read};
use tautplan::floor::{Floor, Point, PointKind};
use tautplan::job::{Datum, FromFace, Job};
use tautplan::units::LengthUnit;

fn small(job: &Job) -> Floor {
    let file = concat!(env!("CARGO_MANIFEST_DIR"), "/demo-drawings/small-floor.dxf");
    let source = open(std::fs::read(file).expect("the demo is there")).expect("a drawing");
    let wanted = Wanted::layers(job.layer_patterns()).expect("sound patterns");
    let (drawing, _) = read(&source, &wanted, None);
    tautplan::floor::read(&drawing, job).0
}

/// Heights of the first tendon's points of one kind, millimetres.
fn heights_mm(floor: &Floor, kind: PointKind) -> Vec<f64> {
    let points: &[Point] = &floor.tendons[0].points;
    let of_kind = points.iter().filter(|point| point.kind == kind);
    of_kind
        .map(|point| (point.height_m.expect("drawn") * 1e6).round() / 1e3)
        .collect()
}

#[test]
fn heights_to_the_centroid_stand_as_written() {
    let floor = small(&Job::default());
    assert_eq!(heights_mm(&floor, PointKind::High), [165.0; 3]);
    assert_eq!(heights_mm(&floor, PointKind::Low), [45.0; 2]);
}

#[test]
fn heights_to_the_ducts_underside_gain_the_strands_place_in_the_duct() {
    let mut job = Job::default();
    job.conventions.height.datum = Datum::DuctUnderside;
    let floor = small(&job);
    assert_eq!(heights_mm(&floor, PointKind::High), [172.0; 3]);
    assert_eq!(heights_mm(&floor, PointKind::Low), [58.0; 2]);
}

#[test]
fn heights_from_the_top_are_what_the_slab_leaves() {
    let mut job = Job::default();
    job.conventions.height.from = FromFace::Top;
    let floor = small(&job);
    assert_eq!(heights_mm(&floor, PointKind::High), [85.0; 3]);
    assert_eq!(heights_mm(&floor, PointKind::Low), [205.0; 2]);
}

#[test]
fn the_unit_of_the_numbers_is_the_jobs() {
    let mut job = Job::default();
    job.conventions.height.unit = LengthUnit::Cm;
    let floor = small(&job);
    assert_eq!(heights_mm(&floor, PointKind::Low), [450.0; 2]);
}

#[test]
fn a_label_that_says_no_strands_is_quoted_and_not_called_missing() {
    let file = concat!(env!("CARGO_MANIFEST_DIR"), "/demo-drawings/small-floor.dxf");
    let bytes = std::fs::read(file).expect("the demo is there");
    let text = String::from_utf8(bytes).expect("ASCII");
    let (before, after) = text.split_once("5-12.7").expect("a strand count");
    let job = Job::default();
    let source = open(format!("{before}0-12.7{after}").into_bytes()).expect("a drawing");
    let wanted = Wanted::layers(job.layer_patterns()).expect("sound patterns");
    let (drawing, _) = read(&source, &wanted, None);
    let (_, found) = tautplan::floor::read(&drawing, &job);
    let texts: Vec<&str> = found
        .iter()
        .filter(|finding| finding.rule.name == "strand-count-missing")
        .map(|finding| &*finding.text)
        .collect();
    assert_eq!(texts.len(), 1);
    assert!(texts[0].contains("says 0 strands"), "{texts:?}");
}
