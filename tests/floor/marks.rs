//! Marks and strand counts on their tendons, and the names of tendons that have none.

use geo::Coord;
use tautplan::finding::Level;
use tautplan::floor::{Floor, Tendon, read};
use tautplan::job::Job;

use crate::kit::{Board, Dice};
use crate::sketch::{BANDED, DISTRIBUTED, MARK, mm, only, tendon, told};

fn marked(texts: &[(&str, (f64, f64))]) -> (Floor, Vec<tautplan::finding::Finding>) {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (20.0, 5.0)]);
    board.line(BANDED, &[(0.0, 8.0), (20.0, 8.0)]);
    for &(content, place) in texts {
        board.write(MARK, content, place);
    }
    board.read()
}

/// Tendons, strands and size.
fn count(tendon: &Tendon) -> (u32, Option<u32>, Option<&str>) {
    (tendon.tendons, tendon.strands, tendon.strand.as_deref())
}

#[test]
fn a_mark_and_its_strands_may_stand_in_one_text_in_two_lines_or_in_two_texts() {
    let second = ("B02 5-12.7", (2.0, 8.12));
    let one = [("B03 4x5-12.7", (2.0, 5.12)), second];
    let lines = [("B03\n4x5-12.7", (2.0, 5.12)), second];
    let texts = [("B03", (2.0, 5.12)), ("4x5-12.7", (14.0, 4.88)), second];
    for way in [&one[..], &lines, &texts] {
        let (floor, findings) = marked(way);
        assert_eq!(count(tendon(&floor, "B03")), (4, Some(5), Some("12.7")));
        assert_eq!(count(tendon(&floor, "B02")), (1, Some(5), Some("12.7")));
        assert!(told(&findings, "strand-count-missing").is_empty());
        assert!(told(&findings, "label-unclaimed").is_empty());
    }
}

#[test]
fn two_marks_at_one_tendon_go_to_one_each_or_are_said() {
    // The second is nearer to the first tendon, but that one has a mark.
    let (floor, _) = marked(&[("B01 5-12.7", (4.0, 5.12)), ("B02 5-12.7", (12.0, 7.8))]);
    assert_eq!(mm(tendon(&floor, "B02").path.place_at(0.0).y), 8_000);
    let (floor, findings) = marked(&[("B01 5-12.7", (4.0, 5.12)), ("B02 7-12.7", (12.0, 5.12))]);
    for tendon in &floor.tendons {
        assert_eq!((tendon.mark_drawn, tendon.strands), (false, None));
    }
    let text = &only(&findings, "label-contradicted").text;
    assert!(text.contains("\"B01 5-12.7\" and \"B02 7-12.7\""), "{text}");
}

#[test]
fn a_mark_used_twice_is_said_and_both_tendons_stay() {
    let (floor, findings) = marked(&[("B01 5-12.7", (4.0, 5.12)), ("b01 5-12.7", (4.0, 8.12))]);
    assert_eq!(floor.tendons.len(), 2);
    let finding = only(&findings, "mark-twice");
    assert_eq!(finding.level, Level::Warning);
    for tendon in &floor.tendons {
        assert!(finding.text.contains(&tendon.handle), "{}", finding.text);
    }
}

#[test]
fn a_tendon_without_strands_is_said_not_guessed() {
    let (floor, findings) = marked(&[("B01", (4.0, 5.12)), ("B02 5-12.7", (4.0, 8.12))]);
    assert_eq!(count(tendon(&floor, "B01")), (1, None, None));
    let finding = only(&findings, "strand-count-missing");
    assert_eq!(
        (finding.level, finding.tendon.as_deref()),
        (Level::Error, Some("B01"))
    );
}

/// Names in order of place: by y, then x, of each tendon's middle before the plan was moved.
fn names(board: &Board, back: Coord<f64>) -> Vec<(i64, i64, String)> {
    let (floor, _) = board.read();
    let mut names: Vec<(i64, i64, String)> = floor
        .tendons
        .iter()
        .map(|tendon| {
            let middle = tendon.path.place_at(tendon.path.length_m() / 2.0);
            let tenth = |metres: f64| mm(metres * 10.0);
            (
                tenth(middle.y - back.y),
                tenth(middle.x - back.x),
                tendon.mark.clone(),
            )
        })
        .collect();
    names.sort_unstable();
    names
}

fn marks(names: &[(i64, i64, String)]) -> Vec<&str> {
    names.iter().map(|name| name.2.as_str()).collect()
}

/// Three rows of banded tendons, each of a left and a right half that lie `step_m` off one another, and three columns of
/// distributed ones.
fn unmarked(step_m: f64) -> Board {
    let mut board = Board::slab();
    for row in [4.0, 9.0, 14.0] {
        board.line(BANDED, &[(12.0, row), (24.0, row)]);
        board.line(BANDED, &[(11.0, row + step_m), (1.0, row + step_m)]);
        board.line(DISTRIBUTED, &[(row, 1.0), (row, 19.0)]);
    }
    board
}

#[test]
fn tendons_without_a_mark_are_named_by_place_whatever_the_order_of_entities() {
    let mut board = unmarked(0.0);
    board.write(MARK, "B004 5-12.7", (3.0, 4.12));
    let first = names(&board, Coord::default());
    // Rows upwards and each from the left; columns from the left. The drawn mark is not given again.
    assert_eq!(
        marks(&first),
        [
            "B004", "B001", "B002", "B003", "D001", "D002", "D003", "B005", "B006"
        ],
    );
    for seed in 0..5 {
        board.shuffle(&mut Dice(seed));
        assert_eq!(names(&board, Coord::default()), first);
    }
}

#[test]
fn moving_the_plan_renames_no_tendon() {
    // Half a millimetre is what rounding to millimetres trips over.
    for step_m in [0.0, 0.0001, 0.0005, 0.001, 0.0015] {
        let board = unmarked(step_m);
        let first = names(&board, Coord::default());
        for by_m in [0.0002, 0.0005, 0.001, 0.25, 1e4 + 0.0005, 1e6, 1e6 + 0.0005] {
            let by = Coord { x: by_m, y: by_m };
            assert_eq!(
                names(&board.moved(0.0, by), by),
                first,
                "{step_m} m by {by_m} m"
            );
        }
    }
}

#[test]
fn on_a_plan_drawn_at_45_degrees_the_names_do_not_hang_on_rounding() {
    let board = unmarked(0.0).moved(std::f64::consts::FRAC_PI_4, Coord::default());
    let first = names(&board, Coord::default());
    for by_m in [1.0 / 3.0, 77.7, 1234.567, 4e4, 1e6] {
        let by = Coord { x: by_m, y: -by_m };
        assert_eq!(
            marks(&names(&board.moved(0.0, by), by)),
            marks(&first),
            "by {by_m} m"
        );
    }
}

#[test]
fn strands_that_a_note_gives_for_all_others_are_a_key_of_the_job() {
    let mut board = Board::slab();
    board.line(BANDED, &[(0.0, 5.0), (20.0, 5.0)]);
    board.line(BANDED, &[(0.0, 8.0), (20.0, 8.0)]);
    board.write(MARK, "B01", (2.0, 5.12));
    board.write(MARK, "B02 7-12.7", (2.0, 8.12));
    let mut job = Job::default();
    job.tendon.default_strands = Some(4);
    job.tendon.default_strand = Some("12.7".to_owned());
    let (floor, findings) = read(&board.drawing, &job);
    assert_eq!(tendon(&floor, "B01").strands, Some(4));
    assert_eq!(tendon(&floor, "B02").strands, Some(7));
    assert!(told(&findings, "strand-count-missing").is_empty());
}
