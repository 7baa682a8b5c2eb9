//! Slabs that are not flat plates: drops, beams, steps and folds, and the soffit or face that heights are measured from.

use tautplan::analysis::{Analysis, work};
use tautplan::finding::{Finding, Level};
use tautplan::floor::{Floor, PointKind, read};
use tautplan::job::{FromFace, Job, Soffit};

use crate::kit::Board;
use crate::sketch::{BANDED, mm, only, points_mm, rules, tendon, told};

const ZONE: &str = "SLAB-ZONE";
/// Low points at 5 and 25 m, high points at 15 and 35 m.
const STATIONS: [f64; 4] = [5.0, 15.0, 25.0, 35.0];

/// A tendon of 40 m across a slab of 250 mm, with these heights; a zone that holds its high point at 15 m.
fn board(heights: [&str; 4], zone: Option<&[&str]>) -> Board {
    let mut board = Board::slab();
    board.bare_tendon(BANDED, "B01", [0.0, 40.0], 5.0);
    for (x, content) in STATIONS.into_iter().zip(heights) {
        board.height(content, (x, 5.0));
    }
    if let Some(texts) = zone {
        board.rectangle(ZONE, (12.0, 2.0), (18.0, 9.0));
        for (text, y) in texts.iter().zip([7.0, 8.0]) {
            board.write(ZONE, text, (13.5, y));
        }
    }
    board
}

fn job(change: impl FnOnce(&mut Job)) -> Job {
    let mut job = Job::default();
    change(&mut job);
    job
}

fn general() -> Job {
    job(|job| job.conventions.height.soffit = Soffit::General)
}

fn nearer() -> Job {
    job(|job| job.conventions.height.from = FromFace::NearerFace)
}

fn read_with(board: &Board, job: &Job) -> (Floor, Vec<Finding>) {
    read(&board.drawing, job)
}

fn levels_mm(floor: &Floor) -> Vec<Option<i64>> {
    let points = &tendon(floor, "B01").points;
    points.iter().map(|p| p.level_m().map(mm)).collect()
}

/// The floor worked out.
fn worked(board: &Board, job: &Job) -> Analysis {
    let (floor, findings) = read_with(board, job);
    work(floor, job, findings)
}

const FLAT: [&str; 4] = ["L30", "H215", "L30", "H215"];
const DROP_LOCAL: [&str; 4] = ["L30", "H365", "L30", "H215"];

#[test]
fn a_drop_read_from_either_soffit_gives_the_same_levels() {
    let drop = Some(&["T400"][..]);
    let (local, findings) = read_with(&board(DROP_LOCAL, drop), &Job::default());
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    let (from_general, findings) = read_with(&board(FLAT, drop), &general());
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    let expected = [-125, -220, -35, -220, -35, -125].map(Some);
    assert_eq!(levels_mm(&local), expected);
    assert_eq!(levels_mm(&from_general), expected);
    // Either way the height is what stands above the local soffit.
    let heights: Vec<_> = points_mm(tendon(&from_general, "B01"));
    assert_eq!(heights[2], (PointKind::High, 15_000, Some(365)));
}

#[test]
fn a_step_of_the_top_moves_the_tendon_with_it() {
    // The top at -100 and the same thickness, said in several ways.
    let ways: [&[&str]; 7] = [
        &["T250", "TOS -100"],
        &["T250 / SSL -0.10"],
        &["TOS -100", "SOFFIT -350"],
        &["T250", "SOFFIT -350"],
        &["T250 -100"],
        &["T250\n-0.100"],
        &["T250", "100 SET DOWN"],
    ];
    for texts in ways {
        let (floor, findings) = read_with(&board(FLAT, Some(texts)), &Job::default());
        assert_eq!(rules(&findings), [""; 0], "{texts:?} {findings:#?}");
        let expected = [-125, -220, -135, -220, -35, -125].map(Some);
        assert_eq!(levels_mm(&floor), expected, "{texts:?}");
        assert_eq!(floor.slab.zones.len(), 1);
        assert_eq!(mm(floor.slab.zones[0].top_m), -100);
    }
    // Heights from the top are from the local one.
    let from_top = job(|job| job.conventions.height.from = FromFace::Top);
    let heights = ["L220", "H35", "L220", "H35"];
    let (floor, _) = read_with(&board(heights, Some(&["T250", "TOS -100"])), &from_top);
    let expected = [-125, -220, -135, -220, -35, -125].map(Some);
    assert_eq!(levels_mm(&floor), expected);
}

#[test]
fn a_top_alone_keeps_what_the_job_says_and_the_finding_gives_the_other_thickness() {
    let board = board(FLAT, Some(&["TOS -50"]));
    let (floor, findings) = read_with(&board, &Job::default());
    let assumed = only(&findings, "step-assumed");
    assert_eq!(assumed.level, Level::Warning);
    for said in ["-50 mm", "250 mm", "200 mm"] {
        assert!(assumed.text.contains(said), "{}", assumed.text);
    }
    assert_eq!(levels_mm(&floor)[2], Some(-50 - 250 + 215));
    let soffit = job(|job| job.slab.step_keeps = tautplan::job::StepKeeps::Soffit);
    let (floor, findings) = read_with(&board, &soffit);
    only(&findings, "step-assumed");
    assert_eq!(levels_mm(&floor)[2], Some(-250 + 215));
}

#[test]
fn levels_may_be_counted_from_elsewhere_and_one_outside_zones_is_not_used() {
    let stepped = Some(&["T250", "SSL 45.150"][..]);
    let (floor, findings) = read_with(&board(FLAT, stepped), &Job::default());
    assert!(
        only(&findings, "zone-unread")
            .remedy
            .contains("slab.top_level_m")
    );
    assert_eq!(levels_mm(&floor)[2], None, "a level of 45 m is no step");
    let counted = job(|job| job.slab.top_level_m = 45.25);
    let mut stepped = board(FLAT, stepped);
    stepped.write(ZONE, "SSL 45.250", (30.0, 15.0));
    let (floor, findings) = read_with(&stepped, &counted);
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    assert_eq!(levels_mm(&floor)[2], Some(-135));
    let mut lost = board(FLAT, None);
    lost.write(ZONE, "TOS -50", (30.0, 15.0));
    let (floor, findings) = read_with(&lost, &Job::default());
    assert!(
        only(&findings, "level-outside-zones")
            .text
            .contains("-50 mm")
    );
    assert_eq!(levels_mm(&floor)[2], Some(-35));
}

#[test]
fn two_levels_in_one_zone_are_said_and_neither_is_taken() {
    let (floor, findings) = read_with(&board(FLAT, Some(&["T250 -50", "-100"])), &Job::default());
    let said = only(&findings, "thickness-differs");
    assert!(
        said.text.contains("two top levels in one zone"),
        "{}",
        said.text
    );
    assert_eq!(levels_mm(&floor)[2], None);
}

#[test]
fn a_zone_drawn_twice_is_one_zone() {
    let mut twice = board(DROP_LOCAL, Some(&["T400"]));
    twice.rectangle(ZONE, (12.001, 2.0), (18.0, 9.0));
    let (floor, findings) = read_with(&twice, &Job::default());
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    assert_eq!(floor.slab.zones.len(), 1);
    assert_eq!(levels_mm(&floor)[2], Some(-35));
}

#[test]
fn in_a_fold_the_cover_is_to_the_local_faces() {
    let cover = |height: &str| {
        // A fold of half its thickness: what is within one slab may be outside the other.
        let heights = ["L60", height, "L60", "H180"];
        let analysis = worked(&board(heights, Some(&["T250 TOS -120"])), &Job::default());
        let found = told(&analysis.findings, "height-outside-cover");
        found
            .into_iter()
            .find(|f| f.station_m == Some(15.0))
            .cloned()
    };
    let least_mm = mm(Job::default().limits.cover_m + Job::default().tendon.duct_height_m / 2.0);
    assert_eq!(cover(&format!("H{}", 250 - least_mm)), None);
    let high = cover(&format!("H{}", 250 - least_mm + 5)).expect("too near the fold's own top");
    let said = format!(
        "the strand is {} mm below the top of the 250 mm slab",
        least_mm - 5
    );
    assert!(high.text.contains(&said), "{}", high.text);
}

#[test]
fn along_a_band_beam_heights_from_the_general_soffit_are_negative() {
    let beam = |heights| {
        let mut beam = board(heights, None);
        beam.rectangle(ZONE, (0.0, 4.0), (40.0, 6.0));
        beam.write(ZONE, "T600", (30.0, 5.6));
        beam
    };
    let negative = beam(["L-300", "H215", "L-300", "H215"]);
    let expected = [-300, -550, -35, -550, -35, -300].map(Some);
    let (floor, findings) = read_with(&negative, &general());
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    assert_eq!(levels_mm(&floor), expected);
    assert_eq!(
        told(&worked(&negative, &general()).findings, "soffit-doubtful").len(),
        0
    );
    let local = beam(["L50", "H565", "L50", "H565"]);
    assert_eq!(levels_mm(&read_with(&local, &Job::default()).0), expected);
    // Each read as the other: below the soffit, and above the top.
    let found = worked(&negative, &Job::default());
    let doubt = only(&found.findings, "soffit-doubtful");
    for said in [
        "passes the soffit",
        "the low point at station 5.00 m",
        "also at",
    ] {
        assert!(doubt.text.contains(said), "{}", doubt.text);
    }
    assert!(
        doubt.remedy.contains("soffit = \"general\""),
        "{}",
        doubt.remedy
    );
    let found = worked(&local, &general());
    let doubt = only(&found.findings, "soffit-doubtful");
    assert!(doubt.text.contains("passes the top"), "{}", doubt.text);
    assert!(
        doubt.remedy.contains("soffit = \"local\""),
        "{}",
        doubt.remedy
    );
}

#[test]
fn a_drop_read_from_the_wrong_soffit_is_doubted_and_left_as_the_job_says() {
    let drop = Some(&["T400"][..]);
    // Drawn from the general soffit and read from the local one: within the concrete, and far too low for a high point.
    let analysis = worked(&board(FLAT, drop), &Job::default());
    let doubt = only(&analysis.findings, "soffit-doubtful");
    assert_eq!((doubt.level, doubt.station_m), (Level::Warning, Some(15.0)));
    for said in [
        "185 mm below the top",
        "215 mm above the soffit",
        "35 mm below",
        "365 mm above",
    ] {
        assert!(doubt.text.contains(said), "{said}: {}", doubt.text);
    }
    assert_eq!(
        levels_mm(&analysis.floor)[2],
        Some(-185),
        "never switched silently"
    );
    // The reverse leaves the concrete.
    let analysis = worked(&board(DROP_LOCAL, drop), &general());
    let doubt = only(&analysis.findings, "soffit-doubtful");
    assert!(doubt.text.contains("passes the top"), "{}", doubt.text);
    assert!(
        doubt.remedy.contains("soffit = \"local\""),
        "{}",
        doubt.remedy
    );
    assert_eq!(levels_mm(&analysis.floor)[2], Some(115));
}

#[test]
fn a_reading_that_fits_is_not_doubted() {
    let doubts =
        |board: &Board, job: &Job| told(&worked(board, job).findings, "soffit-doubtful").len();
    let drop = Some(&["T400"][..]);
    assert_eq!(doubts(&board(DROP_LOCAL, drop), &Job::default()), 0);
    assert_eq!(doubts(&board(FLAT, drop), &general()), 0);
    assert_eq!(
        doubts(&board(FLAT, Some(&["T250 TOS -100"])), &Job::default()),
        0
    );
    assert_eq!(doubts(&board(FLAT, None), &general()), 0);
    // A low point in a drop may stand on either soffit.
    let low = ["H215", "L30", "H215", "L30"];
    assert_eq!(doubts(&board(low, drop), &Job::default()), 0);
    assert_eq!(doubts(&board(low, drop), &general()), 0);
    // Both outside the concrete: neither fits, and the cover says so.
    let neither = ["L30", "H450", "L30", "H215"];
    assert_eq!(doubts(&board(neither, drop), &Job::default()), 0);
}

#[test]
fn one_support_read_from_the_wrong_soffit_is_named() {
    let supports = |inside: [&str; 2]| {
        let mut drop = board(DROP_LOCAL, Some(&["T400"]));
        drop.height(inside[0], (13.0, 5.0));
        drop.height(inside[1], (17.0, 5.0));
        let analysis = worked(&drop, &Job::default());
        let found = told(&analysis.findings, "soffit-doubtful");
        found.into_iter().cloned().collect::<Vec<Finding>>()
    };
    // On the curve 2 m from the high point, and the same level from the general soffit.
    assert_eq!(supports(["331", "331"]), []);
    let found = supports(["331", "181"]);
    assert_eq!(found.len(), 1, "{found:#?}");
    assert_eq!(found[0].station_m, Some(17.0));
    assert!(found[0].text.contains("the support"), "{}", found[0].text);
}

#[test]
fn a_distance_to_the_nearer_face_is_from_the_top_where_high_and_from_the_soffit_where_low() {
    let drop = Some(&["T400"][..]);
    let expected = [-125, -220, -35, -220, -35, -125].map(Some);
    let (floor, findings) = read_with(&board(["L30", "H35", "L30", "H35"], drop), &nearer());
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    assert_eq!(levels_mm(&floor), expected);
    // One word is enough where each is a span apart, and how the rest was read is said.
    let (floor, findings) = read_with(&board(["30", "H35", "30", "35"], drop), &nearer());
    let said = only(&findings, "face-by-neighbours");
    assert_eq!(said.level, Level::Note);
    assert!(
        said.text
            .contains("35 mm at station 35.00 m as a high point from the top"),
        "{}",
        said.text
    );
    assert_eq!(levels_mm(&floor), expected);
    // None is not: no curve, and no forces.
    let bare = board(["30", "35", "30", "35"], drop);
    let analysis = worked(&bare, &nearer());
    assert_eq!(only(&analysis.findings, "face-unknown").level, Level::Error);
    assert!(analysis.results[0].profile.is_none() && analysis.results[0].forces.is_none());
}

#[test]
fn the_demos_have_no_doubtful_soffit_and_no_assumed_step() {
    for demo in ["small-floor", "harbour-level-2"] {
        let file = format!("{}/demo-drawings/{demo}.dxf", env!("CARGO_MANIFEST_DIR"));
        let bytes = std::fs::read(&file).expect("the demo is there");
        let toml = std::fs::read_to_string(file.replace(".dxf", ".toml")).unwrap_or_default();
        let job = tautplan::job::read("job", &toml).expect("a sound job").job;
        let source = tautplan::drawing::open(bytes).expect("a drawing");
        let wanted = tautplan::drawing::Wanted::layers(job.layer_patterns()).expect("patterns");
        let (drawing, _) = tautplan::drawing::read(&source, &wanted, None);
        let (floor, findings) = read(&drawing, &job);
        let analysis = work(floor, &job, findings);
        for rule in ["soffit-doubtful", "step-assumed", "face-by-neighbours"] {
            assert_eq!(told(&analysis.findings, rule).len(), 0, "{demo} {rule}");
        }
    }
}

#[test]
fn a_level_of_a_zone_that_cannot_be_read_leaves_the_zone_open() {
    let high = |texts: &[&str]| {
        let (floor, findings) = board(FLAT, Some(texts)).read();
        let level = levels_mm(&floor)[2];
        (level, findings)
    };
    // Read, in one text or in two.
    for texts in [
        &["T250", "-50 SSL"][..],
        &["T250", "STEP 50"],
        &["T250 U.N.O.", "TOS -50 U.N.O."],
        &["T250\nRECESS 50"],
    ] {
        let (level, findings) = high(texts);
        assert_eq!(level, Some(-85), "{texts:?}");
        assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    }
    // A finished level, a drop that may be a panel below, tenths of who knows what.
    for text in ["FFL -0.050", "50 DROP", "SSL -0.1"] {
        let (level, findings) = high(&["T250", text]);
        assert_eq!(level, None, "{text}");
        let zone = only(&findings, "zone-unread");
        assert!(zone.level == Level::Error && zone.text.contains(text));
        let unread = only(&findings, "label-unread");
        assert!(unread.level == Level::Warning && unread.text.contains(text));
    }
    // A note leaves the zone as its other texts say.
    let (level, findings) = high(&["T250", "STEP 50 SEE DETAIL 3"]);
    assert_eq!(level, Some(-35));
    assert!(
        only(&findings, "label-unread")
            .text
            .contains("taken for a note")
    );
    let (_, findings) = high(&["T250", "SEE DETAIL 3"]);
    assert_eq!(rules(&findings), [""; 0], "{findings:#?}");
    // Two of one thing in one text are two.
    let (level, findings) = high(&["T250\nPT\nT300"]);
    assert_eq!(level, None);
    assert_eq!(only(&findings, "thickness-differs").level, Level::Error);
}
