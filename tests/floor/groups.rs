//! Groups of like tendons: one is drawn, an extent line and a text stand for the others.

use tautplan::finding::{Finding, Level};
use tautplan::floor::{EndKind, Floor, Tendon};

use crate::kit::{Board, at};
use crate::sketch::{DISTRIBUTED, MARK, mm, only, tendon, told};

const EXTENT: &str = "TENDON-EXTENT";

/// A typical tendon along x with heights, its strands beside it, and a line across.
fn group(y: f64, line: [f64; 2], texts: &[&str]) -> Board {
    let mut board = Board::slab();
    typical(&mut board, y);
    board.line(EXTENT, &[(8.0, line[0]), (8.0, line[1])]);
    let middle = f64::midpoint(line[0], line[1]) + 0.37;
    for (number, text) in (0_u32..).zip(texts) {
        let place = at(8.1, middle + 0.2 * f64::from(number));
        board.text(MARK, text, place, 0.1, 0.0, false);
    }
    board
}

fn typical(board: &mut Board, y: f64) {
    board.line(DISTRIBUTED, &[(0.0, y), (20.0, y)]);
    board.live((0.0, y));
    board.dead((20.0, y));
    board.write(MARK, "5-12.7", (1.5, y + 0.12));
    board.height("L40", (5.0, y));
    board.height("H170", (10.0, y));
    board.height("L40", (15.0, y));
}

/// Mark, y in millimetres, whether made; in the floor's order.
fn lie(floor: &Floor) -> Vec<(&str, i64, bool)> {
    let lie = |t: &'_ Tendon| mm(t.path.place_at(0.0).y);
    floor
        .tendons
        .iter()
        .map(|t| (t.mark.as_str(), lie(t), t.made))
        .collect()
}

fn counted(
    first: i64,
    count: i64,
    from: i64,
    apart: i64,
    drawn: &[i64],
) -> Vec<(String, i64, bool)> {
    (0..count)
        .map(|n| {
            (
                format!("D{:02}", first + n),
                from + n * apart,
                !drawn.contains(&n),
            )
        })
        .collect()
}

fn same(floor: &Floor, meant: &[(String, i64, bool)]) {
    let found: Vec<(String, i64, bool)> = lie(floor)
        .into_iter()
        .map(|(mark, y, made)| (mark.to_owned(), y, made))
        .collect();
    assert_eq!(found, meant);
}

fn untold(findings: &[Finding]) {
    for rule in [
        "group-misfit",
        "label-unread",
        "label-unclaimed",
        "strand-count-missing",
    ] {
        assert!(told(findings, rule).is_empty(), "{findings:?}");
    }
}

#[test]
fn the_undrawn_tendons_of_a_group_are_made_and_said() {
    let board = group(2.0, [2.0, 14.0], &["D05-D15 @ 1200"]);
    let (floor, findings) = board.read();
    same(&floor, &counted(5, 11, 2000, 1200, &[0]));
    untold(&findings);
    let note = only(&findings, "tendon-made");
    assert_eq!(
        (note.level, note.tendon.as_deref()),
        (Level::Note, Some("D05"))
    );
    assert!(
        note.text.contains("10 tendons (D06 ... D15)") && note.text.contains("1200 mm apart"),
        "{}",
        note.text
    );
    let (drawn, made) = (tendon(&floor, "D05"), tendon(&floor, "D11"));
    assert_eq!(
        (made.tendons, made.strands, made.strand.as_deref()),
        (1, Some(5), Some("12.7"))
    );
    assert_eq!(
        made.ends.map(|end| end.kind),
        [Some(EndKind::Live), Some(EndKind::Dead)]
    );
    assert_eq!(mm(made.ends[1].place.y), 9200);
    assert_eq!(made.points.len(), 5);
    for (a, b) in drawn.points.iter().zip(&made.points) {
        assert_eq!(
            (a.kind, mm(a.station_m), a.height_m),
            (b.kind, mm(b.station_m), b.height_m)
        );
        assert_eq!(mm(b.place.y), 9200);
    }
}

#[test]
fn number_and_spacing_may_stand_in_the_group_s_text_or_in_one_of_their_own() {
    for texts in [
        &["D05-D15", "11 @ 1200 c/c"][..],
        &["D05 - D15\n5-12.7 @ 1200"],
        &["D05 to D15 5-12.7 @ 1200 mm C/C"],
        &["D05-D15"],
    ] {
        let (floor, findings) = group(2.0, [14.0, 2.0], texts).read();
        same(&floor, &counted(5, 11, 2000, 1200, &[0]));
        untold(&findings);
    }
    // The text at the typical tendon rather than beside the extent line.
    let mut board = group(2.0, [2.0, 14.0], &[]);
    board.write(MARK, "D05-D15 @ 1200", (4.0, 1.8));
    let (floor, findings) = board.read();
    same(&floor, &counted(5, 11, 2000, 1200, &[0]));
    untold(&findings);
}

#[test]
fn without_marks_the_made_tendons_are_numbered_after_the_typical_one() {
    let mut board = group(2.0, [2.0, 5.6], &["4 @ 1200 c/c"]);
    board.write(MARK, "D7", (3.0, 2.12));
    let (floor, _) = board.read();
    assert_eq!(
        lie(&floor),
        [
            ("D7", 2000, false),
            ("D7.2", 3200, true),
            ("D7.3", 4400, true),
            ("D7.4", 5600, true)
        ]
    );
    let (floor, _) = group(2.0, [2.0, 5.6], &["@ 1200"]).read();
    assert_eq!(floor.tendons.len(), 4);
}

#[test]
fn tendons_that_are_drawn_are_not_made_again_and_say_which_way_the_group_counts() {
    let mut board = group(2.0, [2.0, 6.8], &["D05-D09 @ 1200"]);
    typical(&mut board, 5.6);
    board.write(MARK, "D06", (3.0, 5.72));
    let (floor, findings) = board.read();
    // D06 stands last but one, so D05 is at the top.
    assert_eq!(
        lie(&floor),
        [
            ("D05", 6800, true),
            ("D06", 5600, false),
            ("D07", 4400, true),
            ("D08", 3200, true),
            ("D09", 2000, false)
        ]
    );
    assert!(only(&findings, "tendon-made").text.contains("3 tendons"));
    // All drawn: nothing to make, nothing to say.
    let mut board = group(2.0, [2.0, 4.4], &["D05-D07 @ 1200"]);
    typical(&mut board, 3.2);
    typical(&mut board, 4.4);
    let (floor, findings) = board.read();
    same(&floor, &counted(5, 3, 2000, 1200, &[0, 1, 2]));
    assert!(told(&findings, "tendon-made").is_empty());
}

#[test]
fn an_extent_line_may_reach_half_a_spacing_beyond_the_outer_tendons() {
    let (floor, findings) = group(6.2, [2.0, 12.8], &["D01-D09 @ 1200"]).read();
    same(&floor, &counted(1, 9, 2600, 1200, &[3]));
    untold(&findings);
}

#[test]
fn what_does_not_fit_is_said_and_nothing_is_made() {
    for (line, texts, why) in [
        ([2.0, 14.5], &["D05-D15 @ 1200"][..], "is 12.50 m long"),
        (
            [2.0, 14.0],
            &["D05-D15", "12 @ 1200"],
            "says 12 tendons, and its marks are 11",
        ),
        ([2.0, 14.5], &["@ 1200"], "is 12.50 m long"),
        ([2.0, 14.0], &["D15-D05 @ 1200"], "do not count up"),
        ([2.0, 14.0], &[], "no text that gives number or spacing"),
        ([4.0, 14.0], &["D05-D15 @ 1000"], "crosses no tendon"),
    ] {
        let (floor, findings) = group(2.0, line, texts).read();
        assert_eq!(floor.tendons.len(), 1, "{texts:?}");
        let found = only(&findings, "group-misfit");
        assert_eq!(found.level, Level::Error);
        assert!(found.text.contains(why), "{}", found.text);
    }
    // 1.5 % off is drawing accuracy.
    let (floor, _) = group(2.0, [2.0, 14.18], &["D05-D15 @ 1200"]).read();
    assert_eq!(floor.tendons.len(), 11);
}

#[test]
fn copies_stand_at_the_same_height_above_the_soffit_where_they_lie() {
    let mut board = group(2.0, [2.0, 5.6], &["D1-D4 @ 1200"]);
    board.rectangle("SLAB-ZONE", (9.0, 4.0), (11.0, 5.0));
    board.write("SLAB-ZONE", "T400", (9.5, 4.7));
    let (floor, _) = board.read();
    let high = tendon(&floor, "D3").points[2];
    assert_eq!(
        (
            mm(high.height_m.unwrap_or_default()),
            mm(high.level_m().unwrap_or_default())
        ),
        (170, -230)
    );
    let high = tendon(&floor, "D2").points[2];
    assert_eq!(mm(high.level_m().unwrap_or_default()), -80);
}

#[test]
fn a_group_that_contradicts_its_drawn_tendons_is_not_made() {
    // Strands by its text and by the tendon's own label.
    let (floor, findings) = group(2.0, [2.0, 6.0], &["5 @ 1000 4-12.7"]).read();
    assert_eq!((floor.tendons.len(), floor.tendons[0].strands), (1, None));
    assert!(only(&findings, "group-misfit").text.contains("otherwise"));
    // Two numbers in two texts; two parts in one.
    for texts in [&["5 @ 1000", "6 @ 1000"][..], &["3 @ 1000, 4 @ 500"]] {
        let (floor, findings) = group(2.0, [2.0, 6.0], texts).read();
        assert_eq!(floor.tendons.len(), 1);
        assert!(only(&findings, "group-misfit").text.contains("give two"));
    }
    // More lines than places, and one beside its place.
    for (y, others, text) in [
        (2.0, &[3.0, 4.0, 5.0, 6.0][..], "3 @ 2000"),
        (2.4, &[], "5 @ 1000"),
    ] {
        let mut board = group(y, [2.0, 6.0], &[text]);
        for &other in others {
            board.line(DISTRIBUTED, &[(0.0, other), (20.0, other)]);
        }
        let (floor, findings) = board.read();
        assert_eq!(floor.tendons.len(), 1 + others.len());
        assert!(
            only(&findings, "group-misfit")
                .text
                .contains("no place left")
        );
        let counted = floor.tendons.iter().filter(|t| t.strands.is_some());
        assert_eq!(counted.count(), 1);
    }
    // Its places are 250 mm accurate at 1000 mm.
    let (floor, _) = group(2.2, [2.0, 6.0], &["5 @ 1000"]).read();
    assert_eq!(floor.tendons.len(), 5);
}

#[test]
fn tendons_at_each_place_are_counted_unless_they_may_be_all() {
    let (floor, findings) = group(2.0, [2.0, 8.0], &["2T @ 1000"]).read();
    assert_eq!(floor.tendons.len(), 7);
    assert!(
        floor
            .tendons
            .iter()
            .all(|t| (t.tendons, t.strands) == (2, Some(5)))
    );
    untold(&findings);
    let (floor, findings) = group(2.0, [2.0, 4.0], &["3T @ 1000"]).read();
    assert_eq!(floor.tendons.len(), 1);
    assert!(only(&findings, "group-misfit").text.contains("says 3T"));
}

#[test]
fn one_typical_tendon_has_one_extent_or_several_that_go_on_from_it() {
    let second = |line: [f64; 2], text: &str| {
        let mut board = group(4.0, [4.0, 8.0], &["5 @ 1000"]);
        board.line(EXTENT, &[(12.0, line[0]), (12.0, line[1])]);
        board.text(
            MARK,
            text,
            at(12.1, f64::midpoint(line[0], line[1]) + 0.37),
            0.1,
            0.0,
            false,
        );
        board.read()
    };
    // The same once more; on the other side of it; over the same places otherwise.
    assert_eq!(second([4.0, 8.0], "5 @ 1000").0.tendons.len(), 5);
    assert_eq!(second([2.0, 4.0], "3 @ 1000").0.tendons.len(), 7);
    let (floor, findings) = second([4.0, 8.0], "9 @ 500");
    assert_eq!(
        (floor.tendons.len(), told(&findings, "group-misfit").len()),
        (1, 2)
    );
}

#[test]
fn a_made_tendon_that_lies_on_another_is_said() {
    let mut board = group(2.0, [2.0, 6.0], &["5 @ 1000"]);
    board.line(crate::sketch::BANDED, &[(0.0, 4.0), (20.0, 4.0)]);
    let (_, findings) = board.read();
    let found = only(&findings, "duplicate-line");
    assert!(found.level == Level::Error && found.text.contains("made as a copy"));
}

#[test]
fn a_copy_in_another_part_of_the_slab_is_measured_there() {
    let high_mm = |job: &str, zone: &str| {
        let mut board = group(2.0, [2.0, 5.6], &["D1-D4 @ 1200"]);
        board.rectangle("SLAB-ZONE", (-0.5, 4.0), (20.5, 5.0));
        board.write("SLAB-ZONE", zone, (9.5, 4.7));
        let job = tautplan::job::read("tautplan.toml", job).expect("a sound job");
        let (floor, _) = tautplan::floor::read(&board.drawing, &job.job);
        let high = tendon(&floor, "D3").points[2];
        (
            mm(high.height_m.unwrap_or_default()),
            mm(high.level_m().unwrap_or_default()),
        )
    };
    // The slab is 250 thick; the label says 170.
    assert_eq!(high_mm("", "TOS -20"), (170, -100));
    assert_eq!(high_mm("[height]\nfrom = \"top\"", "T280"), (110, -170));
    assert_eq!(
        high_mm("[height]\nsoffit = \"general\"", "T280"),
        (200, -80)
    );
}
