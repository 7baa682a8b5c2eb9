//! Labels of several lines, of other families, and by patterns of the job: what reaches the tendon.

use tautplan::drawing::Drawing;
use tautplan::finding::Finding;
use tautplan::floor::{PointKind, Tendon, read};
use tautplan::job::{self, Job};

use crate::kit::{Board, at};

/// One tendon of 10 m along x in a slab of 200 mm, live at its start and dead at its end, with these labels: layer,
/// text, place along it.
fn board(labels: &[(&str, &str, f64)]) -> Drawing {
    let mut board = Board::new();
    board.rectangle("SLAB-EDGE", (-0.2, -5.0), (10.2, 5.0));
    board.text("SLAB-ZONE", "T200", at(5.0, 3.0), 0.2, 0.0, true);
    board.line("TENDON-DISTRIBUTED", &[(0.0, 0.0), (10.0, 0.0)]);
    board.insert("TENDON-END", "LIVE-END", at(0.0, 0.0));
    board.insert("TENDON-END", "DEAD-END", at(10.0, 0.0));
    for (layer, text, along_m) in labels {
        board.text(layer, text, at(*along_m, 0.2), 0.1, 0.0, true);
    }
    board.drawing
}

fn job_of(text: &str) -> Job {
    job::read("tautplan.toml", text)
        .unwrap_or_else(|problems| panic!("{problems}"))
        .job
}

fn only(job: &str, labels: &[(&str, &str, f64)]) -> (Tendon, Vec<Finding>) {
    let (mut floor, findings) = read(&board(labels), &job_of(job));
    assert_eq!(floor.tendons.len(), 1);
    (floor.tendons.remove(0), findings)
}

/// Heights between the anchors, in order: kind and millimetres.
fn heights(tendon: &Tendon) -> Vec<(PointKind, i64)> {
    let between = tendon.points.iter().filter(|p| p.kind != PointKind::Anchor);
    between
        .map(|point| {
            let millimetres = point.height_m.expect("known") * 1000.0;
            (
                point.kind,
                format!("{millimetres:.0}").parse().expect("a number"),
            )
        })
        .collect()
}

const HEIGHTS: &str = "TENDON-HEIGHT";
const MARKS: &str = "TENDON-MARK";

#[test]
fn each_line_of_a_label_is_read_for_what_it_is() {
    let whole = "D012\n5-0.5\"\nL30\nTYP.";
    for (job, layer) in [
        ("", MARKS),
        (
            "[layers]\nmarks = [\"NOTES\"]\nheights = [\"NOTES\"]",
            "NOTES",
        ),
    ] {
        let (tendon, findings) = only(job, &[(layer, whole, 5.0)]);
        assert_eq!(tendon.mark, "D012", "{layer}");
        assert_eq!(tendon.strands, Some(5), "{layer}");
        assert_eq!(tendon.strand.as_deref(), Some("12.7"), "{layer}");
        assert_eq!(heights(&tendon), [(PointKind::Low, 30)], "{layer}");
        assert!(findings.is_empty(), "{layer}: {findings:?}");
    }
    let (tendon, _) = only("", &[(HEIGHTS, "B7 4x15.2\nL30", 5.0)]);
    assert_eq!((tendon.mark.as_str(), tendon.strands), ("B7", Some(4)));
    assert_eq!(heights(&tendon), [(PointKind::Low, 30)]);
}

#[test]
fn a_line_that_does_not_speak_for_itself_stays_with_its_layer() {
    // One line on the layer of marks: a mark; a bare number below a mark: nobody knows.
    let (tendon, _) = only("", &[(MARKS, "L30", 5.0)]);
    assert_eq!(tendon.mark, "L30");
    assert!(heights(&tendon).is_empty());
    let (tendon, _) = only(
        "",
        &[(MARKS, "D1 5-12.7\n30", 5.0), (HEIGHTS, "D1\nL40", 7.0)],
    );
    assert_eq!(heights(&tendon), [(PointKind::Low, 40)]);
}

#[test]
fn two_heights_in_one_label_are_said() {
    let (tendon, findings) = only("", &[(MARKS, "D1 5-12.7", 3.0), (HEIGHTS, "L30\nL40", 6.0)]);
    let low = tendon.points[1];
    assert_eq!((low.kind, low.height_m), (PointKind::Low, None));
    let found = findings
        .iter()
        .find(|f| f.rule.name == "label-contradicted");
    assert!(
        found.expect("said").text.contains("two heights"),
        "{findings:?}"
    );
}

#[test]
fn mid_depth_is_half_of_the_slab() {
    let labels = [
        (HEIGHTS, "T/2", 0.0),
        (HEIGHTS, "L30", 5.0),
        (HEIGHTS, "MID", 10.0),
    ];
    let (tendon, findings) = only("[slab]\nthickness_mm = 200", &labels);
    let ends = [tendon.points.first(), tendon.points.last()];
    for end in ends {
        let height_m = end.expect("an anchor").height_m.expect("known");
        assert!((height_m - 0.1).abs() < 1e-12, "{height_m}");
    }
    assert!(
        findings.iter().all(|f| f.rule.name != "label-unread"),
        "{findings:?}"
    );
}

#[test]
fn each_pattern_brings_its_own_unit_face_and_datum() {
    let job = "[height]\nhigh_words = [\"T\"]\npatterns = [\
        { expression = '^(?<word>T)(?<value>\\d+)$', from = \"top\" },\
        { expression = '^C(?<value>\\d+)$', datum = \"chair\", word = \"low\" },\
        { expression = '^(?<value>[\\d /]+)\"$', unit = \"in\" }]";
    let labels = [
        (HEIGHTS, "C30", 2.5),
        (HEIGHTS, "T40", 5.0),
        (HEIGHTS, "1 1/4\"", 7.5),
    ];
    let (tendon, _) = only(job, &labels);
    assert_eq!(
        heights(&tendon),
        // 30 + 13 in the duct at a low point; 200 - 40; 31.75.
        [
            (PointKind::Low, 43),
            (PointKind::High, 160),
            (PointKind::Low, 32)
        ]
    );
}

#[test]
fn a_required_force_is_kept_and_never_turned_into_strands() {
    let (tendon, findings) = only("", &[(MARKS, "B7 324 KIPS", 5.0), (HEIGHTS, "L30", 4.0)]);
    assert!((tendon.required_kn.expect("kept") - 1_441.223_803).abs() < 1e-5);
    assert_eq!((tendon.strands, tendon.tendons), (None, 1));
    let found = findings
        .iter()
        .find(|f| f.rule.name == "strand-count-missing");
    assert!(found.expect("said").text.contains("not worked out from it"));
    // A count and a force in two texts belong to one tendon.
    let labels = [
        (MARKS, "5-12.7", 4.0),
        (MARKS, "40.5 K/FT", 6.0),
        (HEIGHTS, "L30", 5.0),
    ];
    let (tendon, findings) = only("", &labels);
    assert_eq!(tendon.strands, Some(5));
    assert!((tendon.required_kn_per_m.expect("kept") - 591.052_9).abs() < 1e-3);
    assert!(
        findings.iter().all(|f| f.rule.name != "label-unclaimed"),
        "{findings:?}"
    );
}

#[test]
fn a_text_of_a_known_family_is_not_guessed_but_offered() {
    let (tendon, findings) = only("", &[(MARKS, "12T", 5.0), (HEIGHTS, "L30", 4.0)]);
    assert_eq!((tendon.strands, tendon.tendons), (None, 1));
    let found = findings
        .iter()
        .find(|f| f.rule.name == "label-unread")
        .expect("said");
    assert!(
        found.remedy.contains("single-strand tendons"),
        "{}",
        found.remedy
    );
    let job = "[labels]\nmark_patterns = [{ expression = '^(?<tendons>\\d+)T$', strands = 1, strand = \".5\" }]";
    let (tendon, _) = only(job, &[(MARKS, "12T", 5.0), (HEIGHTS, "L30", 4.0)]);
    assert_eq!((tendon.strands, tendon.tendons), (Some(1), 12));
    assert_eq!(tendon.strand.as_deref(), Some("12.7"));
}

#[test]
fn what_nobody_sees_is_read_but_need_not_make_sense() {
    let mut drawing = board(&[(MARKS, "D1 5-12.7", 4.0), (MARKS, "REV C", 6.0)]);
    for text in &mut drawing.texts {
        text.hidden = text.layer == MARKS;
    }
    let (floor, findings) = read(&drawing, &Job::default());
    assert_eq!(floor.tendons[0].strands, Some(5));
    assert!(
        findings.iter().all(|f| f.rule.name != "label-unread"),
        "{findings:?}"
    );
}
