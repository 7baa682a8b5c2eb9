//! Tendons that go on through intermediate anchors, from the drawing to what is written of each pull.

use serde_json::Value;
use tautplan::analysis::{Analysis, work};
use tautplan::annotate::{self, Surroundings};
use tautplan::drawing::{self, Drawing, Drawn, Insert, Wanted};
use tautplan::finding::Finding;
use tautplan::floor;
use tautplan::job::Job;
use tautplan::report::{self, DrawingFacts};
use tautplan::units::Units;

const LENGTH_M: f64 = 16.4;

/// Three bands with anchors at 5.5 m and 11 m: B01 live on the left, B02 at both ends, B03 on the right.
fn plan() -> Drawing {
    let folder = concat!(env!("CARGO_MANIFEST_DIR"), "/tests/data/offices/");
    let bytes = std::fs::read(format!("{folder}intermediate-anchors.dxf")).expect("the drawing");
    let source = drawing::open(bytes).expect("a drawing");
    let wanted = Wanted::layers(Job::default().layer_patterns()).expect("patterns");
    drawing::read(&source, &wanted, None).0
}

fn worked(plan: &Drawing, job: &Job) -> Analysis {
    let (floor, findings) = floor::read(plan, job);
    work(floor, job, findings)
}

fn facts() -> DrawingFacts {
    DrawingFacts {
        file: "intermediate-anchors.dxf".to_owned(),
        version: "AC1024".to_owned(),
        unit_m: 0.001,
    }
}

/// A tendon's record in the result file.
fn record(analysis: &Analysis, mark: &str) -> Value {
    let whole: Value = serde_json::from_str(&report::json(&facts(), &[], analysis)).expect("JSON");
    let tendons = whole["tendons"].as_array().expect("tendons").clone();
    let mut own = tendons.into_iter().filter(|one| one["mark"] == mark);
    own.next().expect("the mark is there")
}

/// Order, stations of both anchors and of the jack of each pull.
fn pulls(record: &Value) -> Vec<(u64, [f64; 3])> {
    let number = |value: &Value| (value.as_f64().expect("a number") * 1e6).round() / 1e6;
    let of = |pull: &Value| {
        let stations = ["from_m", "to_m", "at_m"].map(|key| number(&pull[key]));
        (pull["order"].as_u64().expect("an order"), stations)
    };
    record["pulls"]
        .as_array()
        .expect("pulls")
        .iter()
        .map(of)
        .collect()
}

fn told<'a>(analysis: &'a Analysis, rule: &str, mark: &str) -> Vec<&'a Finding> {
    let own =
        |finding: &&Finding| finding.rule.name == rule && finding.tendon.as_deref() == Some(mark);
    analysis.findings.iter().filter(own).collect()
}

#[test]
fn the_result_has_every_pull_in_the_order_of_stressing() {
    let analysis = worked(&plan(), &Job::default());
    let [b01, b02, b03] = ["B01", "B02", "B03"].map(|mark| record(&analysis, mark));
    assert_eq!(
        pulls(&b01),
        [
            (1, [11.0, 16.4, 11.0]),
            (2, [5.5, 11.0, 5.5]),
            (3, [0.0, 5.5, 0.0])
        ]
    );
    assert_eq!(
        pulls(&b02),
        [
            (1, [0.0, 5.5, 0.0]),
            (1, [0.0, 5.5, 5.5]),
            (2, [5.5, 11.0, 11.0]),
            (3, [11.0, 16.4, 16.4])
        ]
    );
    assert_eq!(
        pulls(&b03),
        [
            (1, [0.0, 5.5, 5.5]),
            (2, [5.5, 11.0, 11.0]),
            (3, [11.0, 16.4, 16.4])
        ]
    );
    let joints = b02["joints"].as_array().expect("joints");
    assert_eq!(joints.len(), 2);
    for (joint, x_m) in joints.iter().zip([5.5, 11.0]) {
        let place = ["station_m", "x_m", "y_m"].map(|key| joint[key].as_f64());
        assert_eq!(place, [x_m, x_m, 6.9].map(Some));
        let [jacking, lockoff, transfer, service] =
            ["jacking_kn", "lockoff_kn", "transfer_kn", "service_kn"]
                .map(|key| joint[key].as_f64().expect("a force"));
        // The lesser side is the one that no jack stands on, or that a draw-in is felt on.
        let jack = b02["pulls"][0]["jacking_kn"].as_f64().expect("a force");
        assert!(jack > jacking && jacking > lockoff, "{joint}");
        assert!(lockoff > transfer && transfer > service, "{joint}");
    }
    // A live end's figures are those of its own pull; a dead end has none.
    for (record, end, pull) in [(&b01, 0, 2), (&b02, 0, 0), (&b02, 1, 3), (&b03, 1, 2)] {
        for key in [
            "jacking_kn",
            "extension_mm",
            "extension_net_mm",
            "draw_in_reach_m",
        ] {
            assert_eq!(
                record["ends"][end][key], record["pulls"][pull][key],
                "{key}"
            );
            assert!(record["ends"][end][key].is_number());
        }
    }
    assert!(b01["ends"][1]["extension_mm"].is_null());
    // A tendon in one pour says nothing of pulls.
    let d01 = record(&analysis, "D01");
    assert!(d01.get("joints").is_none() && d01.get("pulls").is_none());
    let said = analysis.all_assumptions().join("\n");
    assert!(said.contains("stressed from the dead end on") && said.contains("left or bottom end"));
}

#[test]
fn the_tables_have_a_row_and_the_plan_a_mark_for_each_jack() {
    let (job, analysis) = (Job::default(), worked(&plan(), &Job::default()));
    let table = report::extensions_csv(&analysis, Units::Si);
    let rows: Vec<Vec<&str>> = table.lines().map(|row| row.split(',').collect()).collect();
    assert_eq!(rows[0].last(), Some(&"pull"));
    let of = |mark: &str| -> Vec<(&str, &str, &str)> {
        let own = rows.iter().filter(|row| row[0] == mark);
        own.map(|row| (row[2], row[3], *row.last().expect("cells")))
            .collect()
    };
    assert_eq!(
        of("B01"),
        [
            ("joint", "11.000", "1"),
            ("joint", "5.500", "2"),
            ("start", "0.000", "3")
        ]
    );
    assert_eq!(of("B02").len(), 4);
    assert_eq!(of("D01"), [("start", "1.600", "")]);
    let pairs = rows
        .iter()
        .filter(|row| row[0] == "B02" && row[12].contains("both jacks pull"));
    assert_eq!(pairs.count(), 2);

    let sheet = annotate::draw(&analysis, &Surroundings::default(), &job);
    let marks = sheet
        .marks
        .iter()
        .filter(|mark| mark.layer == "TAUT-EXTENSION");
    let texts: Vec<&str> = marks
        .filter_map(|mark| match &mark.drawn {
            Drawn::Text { content, .. } => Some(content.as_str()),
            _ => None,
        })
        .collect();
    assert_eq!(texts.len(), rows.len() - 1);
    let in_pulls = texts.iter().filter(|text| text.starts_with("pull "));
    assert_eq!(in_pulls.count(), 10);

    let sheet = report::calculation(&facts(), &analysis, &job, "B02").expect("a sheet");
    for words in [
        "intermediate anchors at station 5.500 m, 11.000 m",
        "pull 2, station 5.500 m to 11.000 m:",
        "pull 1, anchor at station 5.500 m: PA = ",
        "pull 3, at station 16.400 m: ",
    ] {
        assert!(sheet.contains(words), "{words}");
    }
    let summary = report::summary(&facts(), &analysis, &job, &[]);
    assert!(summary.contains("Stressed in several pulls, from anchor to intermediate anchor: 3."));
}

#[test]
fn a_line_drawn_the_other_way_is_stressed_alike() {
    let (here, job) = (plan(), Job::default());
    let mut turned = here.clone();
    for shape in &mut turned.shapes {
        shape.path = shape.path.reversed();
    }
    let (here, there) = (worked(&here, &job), worked(&turned, &job));
    for mark in ["B01", "B02", "B03"] {
        let (one, other) = (record(&here, mark), record(&there, mark));
        let jacks = |record: &Value, mirrored: bool| -> Vec<(u64, i64, String)> {
            let pulls = record["pulls"].as_array().expect("pulls").iter();
            let mut jacks: Vec<(u64, i64, String)> = pulls
                .map(|pull| {
                    let at_m = pull["at_m"].as_f64().expect("a station");
                    let at_m = if mirrored { LENGTH_M - at_m } else { at_m };
                    #[expect(clippy::cast_possible_truncation, reason = "a few metres")]
                    let at_mm = (1e3 * at_m).round() as i64;
                    let extension_mm = pull["extension_net_mm"].as_f64().expect("a length");
                    (
                        pull["order"].as_u64().expect("an order"),
                        at_mm,
                        format!("{extension_mm:.4}"),
                    )
                })
                .collect();
            jacks.sort();
            jacks
        };
        assert_eq!(jacks(&one, false), jacks(&other, true), "{mark}");
        for key in ["mean_service_kn", "length_m", "curvature_loss_ratio"] {
            let [a, b] = [&one, &other].map(|record| record[key].as_f64().expect("a number"));
            assert!((a - b).abs() < 1e-6 * a.abs(), "{mark} {key}: {a} {b}");
        }
    }
}

#[test]
fn the_job_says_which_pour_comes_first_between_two_live_ends() {
    let mut job = Job::default();
    job.stressing.first_pour = vec!["top".to_owned(), "right".to_owned()];
    let analysis = worked(&plan(), &job);
    let orders = |mark: &str| -> Vec<u64> {
        let mut found = pulls(&record(&analysis, mark));
        found.sort_by(|a, b| a.1[0].total_cmp(&b.1[0]));
        found.into_iter().map(|(order, _)| order).collect()
    };
    assert_eq!(orders("B02"), [3, 2, 1, 1]);
    // With one live end it follows from the dead end.
    assert_eq!(
        (orders("B01"), orders("B03")),
        (vec![3, 2, 1], vec![1, 2, 3])
    );
}

#[test]
fn the_rules_look_at_each_segment() {
    let mut job = Job::default();
    job.limits.anchor_stress_ratio = 0.55;
    job.limits.far_end_ratio = 0.99;
    job.limits.one_end_length_m = 5.45;
    job.limits.curvature_loss_ratio = 0.01;
    let analysis = worked(&plan(), &job);
    let only = |rule: &str| match told(&analysis, rule, "B01").as_slice() {
        [one] => (
            one.station_m.unwrap_or_default(),
            one.text.as_str().to_owned(),
        ),
        found => panic!("{} under {rule}", found.len()),
    };
    // From 11 m to its dead end at 16.4 m the first pull is 5.4 m; the next two are 5.5 m.
    let (station_m, text) = only("one-end-length");
    assert!(
        (station_m - 5.5).abs() < 1e-6 && text.contains("segment from station 0.00 m to 5.50 m")
    );
    assert!(text.contains("also at station 11.00 m"));
    // Over the high point between the two anchors the strand turns most.
    for rule in ["far-end-force", "curvature-loss"] {
        let (station_m, text) = only(rule);
        assert!((station_m - 11.0).abs() < 1e-6, "{rule} {station_m}");
        assert!(
            text.contains("segment from station 5.50 m to 11.00 m"),
            "{text}"
        );
    }
    let (station_m, _) = only("anchor-stress");
    assert!(
        [0.0, 5.5, 11.0, 16.4]
            .iter()
            .any(|at| (at - station_m).abs() < 1e-6)
    );
    assert!(
        only("draw-in-reaches-dead-end")
            .1
            .contains("as far as the fixed anchor")
    );
}

#[test]
fn where_no_jack_can_stand_or_a_segment_is_too_short_there_are_no_forces() {
    let mut dead = plan();
    for insert in &mut dead.inserts {
        if insert.block == "LIVE-END" && insert.place.y > 0.5 && insert.place.y < 0.7 {
            insert.block = "DEAD-END".to_owned();
        }
    }
    let analysis = worked(&dead, &Job::default());
    let [finding] = told(&analysis, "no-live-end", "B01")[..] else {
        panic!("one finding was expected")
    };
    assert!(finding.text.contains("from joint to joint"));
    assert!(record(&analysis, "B01")["mean_service_kn"].is_null());

    let mut short = plan();
    short.inserts.push(Insert {
        block: "INTERMEDIATE-ANCHOR".to_owned(),
        place: geo::Coord { x: 15.7, y: 0.6 },
        ..Insert::default()
    });
    let analysis = worked(&short, &Job::default());
    let [finding] = told(&analysis, "no-force-left", "B01")[..] else {
        panic!("one finding was expected")
    };
    assert!(
        finding
            .text
            .contains("segment from station 15.70 m to 16.40 m")
    );
    let record = record(&analysis, "B01");
    assert_eq!(record["joints"].as_array().map(Vec::len), Some(3));
    assert!(record.get("pulls").is_none() && record["losses"].is_null());
}
