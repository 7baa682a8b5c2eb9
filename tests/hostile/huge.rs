//! Much of one thing.

use std::fmt::Write as _;
use std::time::{Duration, Instant};

use tautplan::drawing::{Wanted, open, read};

use crate::drawings::{everything, marks_without_loss, of_tags, rules};

#[test]
fn a_polyline_of_a_million_vertices_is_one_line() {
    let mut tags = String::from("0 SECTION 2 ENTITIES 0 LWPOLYLINE 8 A 90 1000000 70 0 ");
    for n in 0..1_000_000 {
        let _ = write!(tags, "10 {n} 20 {} ", n % 7);
    }
    tags.push_str("0 ENDSEC 0 EOF");
    let (source, drawing, findings) = everything(of_tags(&tags));
    assert_eq!(drawing.shapes[0].path.segments().len(), 999_999);
    assert!(rules(&findings).is_empty());
    marks_without_loss(&source, 0.001);
}

#[test]
fn layers_and_types_by_the_hundred_thousand_cost_what_they_are() {
    let mut tags = String::from("0 SECTION 2 ENTITIES ");
    for n in 0..100_000 {
        let _ = write!(
            tags,
            "0 TYPE_{n} 8 LAYER-{n} 0 LINE 8 LAYER-{n} 10 0 20 {n} 11 1 21 {n} "
        );
    }
    tags.push_str("0 ENDSEC 0 EOF");
    let begun = Instant::now();
    let (source, drawing, _) = everything(of_tags(&tags));
    assert_eq!(
        (drawing.shapes.len(), drawing.layers.len()),
        (100_000, 100_000)
    );
    assert_eq!(drawing.layers[7].counts.len(), 2);
    marks_without_loss(&source, 0.001);
    in_time(begun, 30);
}

#[test]
fn spline_points_without_sense_make_few_pieces() {
    let mut tags = String::from("0 SECTION 2 ENTITIES 0 SPLINE 8 A 70 0 71 3 ");
    for n in 0..1004 {
        let _ = write!(tags, "40 {n} ");
    }
    for n in 0..1000_u32 {
        let (x, y) = (
            n.wrapping_mul(2_654_435_761) % 1_000_000,
            n.wrapping_mul(40_503) % 999_983,
        );
        let _ = write!(tags, "10 {x} 20 {y} ");
    }
    tags.push_str("0 ENDSEC 0 EOF");
    let begun = Instant::now();
    let (_, drawing, _) = everything(of_tags(&tags));
    let pieces: usize = drawing.shapes.iter().map(|s| s.path.segments().len()).sum();
    // A hundred spans at least are curves, or the spline was not read at all.
    assert!((1000..200_000).contains(&pieces), "{pieces}");
    in_time(begun, 20);
}

#[test]
fn empty_lines_by_the_million_are_passed_over_at_once() {
    let mut bytes = of_tags("0 SECTION 2 ENTITIES 0 LINE 8 A 10 0 20 0");
    for _ in 0..20 {
        bytes.extend(std::iter::repeat_n(b'\n', 100_000));
        bytes.extend(b"11\n1\n21\n1\n");
    }
    bytes.extend(b"0\nENDSEC\n0\nEOF\n");
    let begun = Instant::now();
    let (_, drawing, findings) = everything(bytes);
    assert_eq!(drawing.shapes.len(), 1);
    assert_eq!(rules(&findings), ["drawing-damaged"]);
    in_time(begun, 20);
}

#[test]
fn garbage_by_the_million_lines_is_passed_over() {
    let mut bytes = of_tags("0 SECTION 2 ENTITIES 0 LINE 8 A 10 0 20 0 11 1 21 1");
    for n in 0..300_000 {
        bytes.extend(format!("oops\n0\nLINE\n8\nA\n10\n{n}\n").bytes());
    }
    bytes.extend(b"0\nCIRCLE\n8\nA\n10\n0\n20\n0\n40\n1\n0\nENDSEC\n0\nEOF\n");
    let begun = Instant::now();
    let (_, drawing, findings) = everything(bytes);
    assert_eq!(drawing.shapes.len(), 1);
    assert!(
        findings[1].text.contains("the first of 300000 such places"),
        "{}",
        findings[1].text
    );
    in_time(begun, 30);
}

/// Unoptimized code is not held to a time.
fn in_time(begun: Instant, seconds: u64) {
    let taken = begun.elapsed();
    assert!(
        cfg!(debug_assertions) || taken < Duration::from_secs(seconds),
        "{taken:?}"
    );
}

/// 200 MB of what no job asks for; run by hand: `cargo test --release --test hostile -- --ignored`.
#[test]
#[ignore = "makes a drawing of 200 MB"]
fn two_hundred_megabytes_of_clutter_are_passed_by() {
    let clutter = b"0\nHATCH\n5\nA1\n100\nAcDbEntity\n8\nCLUTTER\n10\n1234.5678\n20\n8765.4321\n91\n1\n92\n7\n93\n4\n0\nLINE\n8\nBACKGROUND\n10\n1.25\n20\n2.5\n11\n3.75\n21\n5.0\n";
    let mut bytes = of_tags("0 SECTION 2 ENTITIES");
    while bytes.len() < 200_000_000 {
        bytes.extend_from_slice(clutter);
    }
    bytes.extend(b"0\nLINE\n8\nTENDON\n10\n0\n20\n0\n11\n1\n21\n1\n0\nENDSEC\n0\nEOF\n");
    let begun = Instant::now();
    let source = open(bytes).expect("a drawing");
    let wanted = Wanted::layers(["TENDON*"]).expect("a pattern");
    let (drawing, _) = read(&source, &wanted, None);
    assert_eq!(drawing.shapes.len(), 1);
    in_time(begun, 10);
}
