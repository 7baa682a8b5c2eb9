//! Leaders in drawings that ezdxf wrote (R2000 to R2018, ASCII and binary, also inside a block): every label stands in a
//! column beside the plan, where only its leader says which of four tendons is meant.

use std::collections::BTreeMap;
use std::path::Path;

use tautplan::drawing::{Drawing, Wanted, open, read};
use tautplan::finding::Finding;
use tautplan::floor::{self, Floor, PointKind};
use tautplan::job::Job;

fn drawn(name: &str, job: &Job) -> (Drawing, Vec<Finding>) {
    let path =
        Path::new(env!("CARGO_MANIFEST_DIR")).join(format!("tests/data/pointing/{name}.dxf"));
    let source = open(std::fs::read(path).expect("a file")).expect("a drawing");
    let wanted = Wanted::layers(job.layer_patterns()).expect("patterns");
    read(&source, &wanted, None)
}

fn floor_of(drawing: &Drawing, job: &Job) -> (Floor, Vec<Finding>) {
    floor::read(drawing, job)
}

/// Kind, station and height in millimetres of the points between the anchors, by mark.
fn heights(floor: &Floor) -> BTreeMap<String, Vec<(PointKind, i64, i64)>> {
    #[expect(clippy::cast_possible_truncation, reason = "millimetres of a floor")]
    let whole = |metres: f64| (metres * 1000.0).round() as i64;
    let points = |tendon: &floor::Tendon| {
        let inner = tendon.points.iter().filter(|p| p.kind != PointKind::Anchor);
        inner
            .map(|p| {
                (
                    p.kind,
                    whole(p.station_m),
                    whole(p.height_m.unwrap_or(-1.0)),
                )
            })
            .collect()
    };
    let tendons = floor.tendons.iter();
    tendons.map(|t| (t.mark.clone(), points(t))).collect()
}

fn labels_amiss(findings: &[Finding]) -> Vec<&Finding> {
    let amiss = |f: &&Finding| {
        f.rule.name.starts_with("label-")
            || f.rule.name.starts_with("leader-")
            || f.rule.name == "height-missing"
    };
    findings.iter().filter(amiss).collect()
}

const FILES: [&str; 8] = [
    "leader-R2000",
    "leader-R2004",
    "leader-R2018",
    "leader-R2010-binary",
    "mleader-R2007",
    "mleader-R2018",
    "mleader-R2013-binary",
    "mleader-R2010-block",
];

#[test]
fn each_label_goes_to_the_tendon_at_its_arrow() {
    let job = Job::default();
    for name in FILES {
        let (drawing, found) = drawn(name, &job);
        assert!(found.is_empty(), "{name}: {found:?}");
        assert_eq!(drawing.leaders.len(), 16, "{name}");
        let (floor, found) = floor_of(&drawing, &job);
        let meant: BTreeMap<String, Vec<(PointKind, i64, i64)>> = (0..4)
            .map(|i| {
                let points = vec![
                    (PointKind::Low, 4000, 40 + 5 * i),
                    (PointKind::High, 8000, 170 + 5 * i),
                    (PointKind::Low, 12000, 40 + 5 * i),
                ];
                (format!("D{:02}", i + 1), points)
            })
            .collect();
        assert_eq!(heights(&floor), meant, "{name}");
        assert!(floor.tendons.iter().all(|t| t.strands == Some(5)), "{name}");
        let places: Vec<i32> = floor
            .tendons
            .iter()
            .map(|t| {
                #[expect(clippy::cast_possible_truncation, reason = "metres of a floor")]
                let place = (t.ends[0].place.x / 1.2).round() as i32;
                place
            })
            .collect();
        assert_eq!(places, [0, 1, 2, 3], "{name}");
        assert!(labels_amiss(&found).is_empty(), "{name}: {found:?}");
    }
}

#[test]
fn without_their_leaders_the_same_labels_are_not_read_so() {
    let job = Job::default();
    for name in FILES {
        let (mut drawing, _) = drawn(name, &job);
        drawing.leaders.clear();
        let (_, found) = floor_of(&drawing, &job);
        assert!(!labels_amiss(&found).is_empty(), "{name}");
    }
}

#[test]
fn one_label_with_several_arrows_goes_to_each_tendon() {
    let job = Job::default();
    let (drawing, _) = drawn("mleader-R2010-several", &job);
    let (floor, found) = floor_of(&drawing, &job);
    let points = vec![
        (PointKind::Low, 4000, 40),
        (PointKind::High, 8000, 170),
        (PointKind::Low, 12000, 45),
    ];
    let meant = ["B7.1", "B7.2", "B7.3", "B7.4"].map(|mark| (mark.to_owned(), points.clone()));
    assert_eq!(heights(&floor), BTreeMap::from(meant));
    // 4x5 on four lines: each is one tendon of five strands.
    assert!(
        floor
            .tendons
            .iter()
            .all(|t| (t.tendons, t.strands) == (1, Some(5)))
    );
    let shared: Vec<_> = found
        .iter()
        .filter(|f| f.rule.name == "label-shared")
        .collect();
    assert_eq!(shared.len(), 1, "{found:?}");
    // A text beyond ASCII comes through, and is said not to be a label.
    let unread = found.iter().find(|f| f.rule.name == "label-unread");
    assert!(
        unread.is_some_and(|f| f.text.contains("Ø 12,7 – übrige")),
        "{found:?}"
    );
}

#[test]
fn a_leader_that_points_at_nothing_gives_its_label_to_nobody() {
    let job = Job::default();
    let (mut drawing, _) = drawn("mleader-R2018", &job);
    let text = drawing
        .texts
        .iter()
        .position(|text| text.content == "H170")
        .expect("the label");
    let leader = drawing
        .leaders
        .iter_mut()
        .find(|l| l.texts == [text])
        .expect("its leader");
    leader.arrows[0].x = -0.7;
    let (floor, found) = floor_of(&drawing, &job);
    let astray: Vec<_> = found
        .iter()
        .filter(|f| f.rule.name == "leader-astray")
        .collect();
    assert_eq!(astray.len(), 1, "{found:?}");
    assert!(astray[0].text.contains("0.70 m off"), "{}", astray[0].text);
    // The column's low points say that a high one belongs between them: it is missing, not taken from elsewhere.
    assert_eq!(heights(&floor)["D01"][1], (PointKind::High, 8000, -1000));
    assert_eq!(heights(&floor)["D02"][1], (PointKind::High, 8000, 175));
}

#[test]
fn a_text_of_a_multileader_has_its_handle_layer_and_place() {
    let job = Job::default();
    let (drawing, _) = drawn("mleader-R2013-binary", &job);
    let text = drawing
        .texts
        .iter()
        .find(|t| t.content == "L40")
        .expect("the label");
    assert_eq!(text.layer, "TENDON-HEIGHT");
    assert!(u64::from_str_radix(&text.handle, 16).is_ok());
    assert!((text.height_m - 0.15).abs() < 1e-9);
    assert!((text.place.x - 3.8).abs() < 1e-9 && (text.place.y - 4.9).abs() < 1e-9);
    assert!(drawing.texts.iter().any(|t| t.content == "D01\n5-12.7"));
}

#[test]
fn tendons_that_are_made_are_said_to_be_in_every_result() {
    let folder = tempfile::tempdir().expect("a folder");
    let data = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/data/pointing/group-R2010.dxf");
    let out = std::process::Command::new(env!("CARGO_BIN_EXE_tautplan"))
        .arg("mark")
        .arg(data)
        .arg("--out")
        .arg(folder.path())
        .output()
        .expect("a run");
    assert_eq!(
        out.status.code(),
        Some(0),
        "{}",
        String::from_utf8_lossy(&out.stderr)
    );
    let text = |name: &str| std::fs::read_to_string(folder.path().join(name)).expect("a result");
    let result: serde_json::Value =
        serde_json::from_str(&text("group-R2010-result.json")).expect("JSON");
    let tendons = result["tendons"].as_array().expect("tendons");
    let made: Vec<(&str, bool, f64)> = tendons
        .iter()
        .map(|t| {
            let place = t["ends"][0]["x_m"].as_f64().unwrap_or(-1.0);
            (t["mark"].as_str().unwrap_or(""), t["made"] == true, place)
        })
        .collect();
    let meant = [
        ("D05", 0.0),
        ("D06", 1.2),
        ("D07", 2.4),
        ("D08", 3.6),
        ("D09", 4.8),
        ("D10", 6.0),
    ];
    assert_eq!(made, meant.map(|(mark, x_m)| (mark, mark != "D05", x_m)));
    // Each is worked out like the one that is drawn.
    let service = |t: &serde_json::Value| t["mean_service_kn"].as_f64().unwrap_or(-1.0);
    assert!(service(&tendons[0]) > 100.0);
    assert!(
        tendons
            .iter()
            .all(|t| (service(t) - service(&tendons[0])).abs() < 1e-6)
    );
    let table = text("group-R2010-tendons.csv");
    let made_rows = table.lines().filter(|row| row.ends_with(",true")).count();
    assert_eq!((table.lines().count(), made_rows), (7, 5), "{table}");
    assert!(text("group-R2010-findings.csv").contains("tendon-made,note,D05"));
}

#[test]
fn a_survey_counts_leaders_by_layer() {
    let data = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/data/pointing/leader-R2018.dxf");
    let out = std::process::Command::new(env!("CARGO_BIN_EXE_tautplan"))
        .arg("survey")
        .arg(data)
        .output()
        .expect("a run");
    let text = String::from_utf8_lossy(&out.stdout).into_owned();
    let row = text
        .lines()
        .find(|line| line.starts_with("#     ANNO ") && !line.contains("LEADER"));
    let numbers: Vec<&str> = row.unwrap_or("").split_whitespace().skip(2).collect();
    assert_eq!(numbers, ["6", "6", "6"], "{text}");
}
