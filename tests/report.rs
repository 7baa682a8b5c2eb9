//! The outputs of one hand-made analysis, held against files one can open; `SNAPSHOTS=overwrite` refreshes them.

use geo::Coord;
use snapbox::{assert_data_eq, file};
use tautplan::analysis::{Analysis, PointResult, TendonResult};
use tautplan::checks;
use tautplan::finding::{Finding, Level, Wording};
use tautplan::floor::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon};
use tautplan::geometry::Path;
use tautplan::job::{Datum, Fallback, Job};
use tautplan::losses::{EndForces, Forces, LaterLosses, LossTotals, Steel};
use tautplan::profile::{Profile, Span};
use tautplan::report::{self, DrawingFacts};
use tautplan::units::{SHORT, Units};

fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

fn tendon(mark: &str, y: f64, ends: [Option<EndKind>; 2], heights_m: [Option<f64>; 3]) -> Tendon {
    let stations_m = [0.0, 5.0, 10.0];
    let kinds = [PointKind::Anchor, PointKind::Low, PointKind::Anchor];
    Tendon {
        mark: mark.to_owned(),
        mark_drawn: true,
        made: false,
        handle: "2A7".to_owned(),
        layer: "TENDON-DISTRIBUTED".to_owned(),
        run: Run::Distributed,
        path: Path::through(&[at(0.0, y), at(10.0, y)]),
        tendons: 2,
        strands: Some(5),
        strand: Some("12.7".to_owned()),
        required_kn: None,
        required_kn_per_m: None,
        joints: Vec::new(),
        ends: [(ends[0], 0.0), (ends[1], 10.0)].map(|(kind, x)| End {
            kind,
            place: at(x, y),
        }),
        points: (0..3)
            .map(|n| Point {
                kind: kinds[n],
                station_m: stations_m[n],
                place: at(stations_m[n], y),
                drawn_m: None,
                height_m: heights_m[n],
                other_soffit_m: None,
                thickness_m: Some(0.2),
                top_m: 0.0,
            })
            .collect(),
    }
}

/// Two parabolas that meet level at the low point.
fn profile() -> Profile {
    let half = |start_m: f64, level_m: f64, slope: f64| Span {
        start_m,
        length_m: 5.0,
        level_m,
        slope,
        curvature_per_m: 0.0056,
        plan_curvature_per_m: 0.0,
    };
    Profile::new(
        vec![half(0.0, -0.1, -0.028), half(5.0, -0.17, 0.0)],
        Vec::new(),
    )
}

fn forces() -> Forces {
    let end = |kind, known: Option<[f64; 3]>| EndForces {
        kind,
        extension_mm: known.map(|k| k[0]),
        extension_net_mm: known.map(|k| k[1]),
        draw_in_reach_m: known.map(|k| k[2]),
        draw_in_reaches_far: false,
    };
    Forces {
        steel: Steel {
            area_mm2: 493.5,
            strength_mpa: 1860.0,
            modulus_mpa: 195_000.0,
        },
        jack_kn: 688.4325,
        ends: [
            end(EndKind::Live, Some([69.3, 63.3, 9.75])),
            end(EndKind::Dead, None),
        ],
        totals: LossTotals {
            friction_curvature_kn: 7.29,
            friction_wobble_kn: 10.32,
            draw_in_kn: 108.5,
        },
        later: Some(LaterLosses {
            shortening_mpa: 8.7,
            shrinkage_mpa: 78.0,
            creep_mpa: -0.0,
            // No output shows a number that is none.
            relaxation_mpa: f64::NAN,
            mean_service_kn: 553.25,
        }),
        least_jacking_kn: 670.82,
        least_jacking_station_m: 10.0,
        least_jacking_angle_rad: 0.055_985_364,
        pulls: Vec::new(),
    }
}

fn analysis() -> Analysis {
    let worked = tendon(
        "D001",
        0.0,
        [Some(EndKind::Live), Some(EndKind::Dead)],
        [None, Some(0.03), Some(0.1)],
    );
    let unworked = tendon(
        "=D2\u{1b}[31m",
        1.2,
        [Some(EndKind::Live), None],
        [Some(0.1), None, Some(0.1)],
    );
    let point = |angle_rad, level_m, forces_kn: [f64; 4]| PointResult {
        angle_rad: Some(angle_rad),
        level_m: Some(level_m),
        forces_kn: forces_kn.map(Some),
    };
    let results = vec![
        TendonResult {
            profile: Some(profile()),
            forces: Some(forces()),
            strand: Some("12.7".to_owned()),
            area_mm2: Some(493.5),
            plan_tightest: None,
            turning: checks::turning(&profile(), &forces()),
            points: vec![
                point(-0.0, -0.1, [688.4325, 579.9, 575.6, 530.1]),
                point(0.027_992_682, -0.17, [679.57, 634.1, 629.8, 560.2]),
                point(0.055_985_364, -0.1, [670.82, 670.82, 666.5, 566.0]),
            ],
            samples: Vec::new(),
            concrete_stress_mpa: Some(1.25),
            by_method: Vec::new(),
        },
        TendonResult {
            profile: None,
            forces: None,
            strand: Some("12.7".to_owned()),
            area_mm2: Some(493.5),
            plan_tightest: None,
            turning: None,
            points: Vec::new(),
            samples: Vec::new(),
            concrete_stress_mpa: None,
            by_method: Vec::new(),
        },
    ];
    let findings = vec![
        Finding::new(
            &checks::cover::HEIGHT_OUTSIDE_COVER,
            Level::Error,
            Wording::of(|units| {
                let short = units.of(SHORT);
                format!(
                    "the duct has {} of cover, \"{}\" was expected",
                    short.brief(15.0, 1),
                    short.brief(20.0, 1)
                )
            }),
            "correct the height",
        )
        .on_tendon("=D2\u{1b}[31m")
        .at_station(2.5)
        .at_place(at(2.5, 1.2)),
        Finding::new(
            &checks::edge::LEAVES_SLAB,
            Level::Note,
            "no closed slab edge was found",
            "draw the slab edge",
        ),
    ];
    Analysis {
        floor: Floor {
            tendons: vec![worked, unworked],
            slab: Slab::default(),
        },
        results,
        findings,
        assumptions: vec!["draw-in 6 mm: the job gives none".to_owned()],
        fallbacks: Vec::new(),
    }
}

fn facts() -> DrawingFacts {
    DrawingFacts {
        file: "level-2.dxf".to_owned(),
        version: "AC1027".to_owned(),
        unit_m: 0.001,
    }
}

fn inputs() -> Vec<(String, serde_json::Value)> {
    vec![
        ("mu_per_rad".to_owned(), serde_json::json!(0.19)),
        ("draw_in_mm".to_owned(), serde_json::json!(6.0)),
        ("method".to_owned(), serde_json::json!("direct")),
    ]
}

#[test]
fn json_is_as_it_was() {
    let made = report::json(&facts(), &inputs(), &analysis());
    assert_data_eq!(made, file!["golden/result.json"].raw());
}

#[test]
fn csv_tables_are_as_they_were() {
    let analysis = analysis();
    // Line ends are CRLF in the tables and LF in the files, so that the files open everywhere.
    let lf = |table: String| table.replace("\r\n", "\n");
    assert_data_eq!(
        lf(report::tendons_csv(&analysis, Units::Si)),
        file!["golden/tendons.csv"].raw()
    );
    assert_data_eq!(
        lf(report::points_csv(&analysis, Units::Si)),
        file!["golden/points.csv"].raw()
    );
    assert_data_eq!(
        lf(report::extensions_csv(&analysis, Units::Si)),
        file!["golden/extensions.csv"].raw()
    );
    assert_data_eq!(
        lf(report::findings_csv(&analysis, Units::Si)),
        file!["golden/findings.csv"].raw()
    );
}

#[test]
fn the_summary_is_as_it_was() {
    let files = [
        "level-2-marked.dxf".to_owned(),
        "level-2-result.json".to_owned(),
    ];
    let made = report::summary(&facts(), &analysis(), &Job::default(), &files);
    assert_data_eq!(made, file!["golden/summary.txt"].raw());
}

#[test]
fn results_in_us_units_are_as_they_were() {
    let (analysis, lf) = (analysis(), |table: String| table.replace("\r\n", "\n"));
    let job = Job {
        units: Units::Us,
        ..Job::default()
    };
    assert_data_eq!(
        report::summary(&facts(), &analysis, &job, &[]),
        file!["golden/us/summary.txt"].raw()
    );
    assert_data_eq!(
        report::calculation(&facts(), &analysis, &job, "D001").expect("a sheet"),
        file!["golden/us/sheet.txt"].raw()
    );
    assert_data_eq!(
        lf(report::tendons_csv(&analysis, Units::Us)),
        file!["golden/us/tendons.csv"].raw()
    );
    assert_data_eq!(
        lf(report::points_csv(&analysis, Units::Us)),
        file!["golden/us/points.csv"].raw()
    );
    assert_data_eq!(
        lf(report::extensions_csv(&analysis, Units::Us)),
        file!["golden/us/extensions.csv"].raw()
    );
    assert_data_eq!(
        lf(report::findings_csv(&analysis, Units::Us)),
        file!["golden/us/findings.csv"].raw()
    );
}

#[test]
fn json_reads_back_with_its_numbers_at_full_precision() {
    let made = report::json(&facts(), &inputs(), &analysis());
    let read: serde_json::Value = serde_json::from_str(&made).expect("the result is JSON");
    assert!(made.ends_with("}\n"));
    let worked = &read["tendons"][0];
    assert_eq!(worked["ends"][0]["jacking_kn"], serde_json::json!(688.4325));
    assert_eq!(
        worked["ends"][1].as_object().map(serde_json::Map::len),
        Some(3)
    );
    assert_eq!(
        worked["points"][1]["angle_rad"],
        serde_json::json!(0.027_992_682)
    );
    assert!(worked["losses"]["relaxation_mpa"].is_null());
    let unworked = &read["tendons"][1];
    assert!(unworked["losses"].is_null() && unworked["points"][0]["jacking_kn"].is_null());
    assert_eq!(unworked["points"].as_array().map(Vec::len), Some(3));
}

#[test]
fn every_csv_row_has_the_headers_cells() {
    let analysis = analysis();
    for (table, rows) in [
        (report::tendons_csv(&analysis, Units::Si), 2),
        (report::points_csv(&analysis, Units::Si), 6),
        (report::extensions_csv(&analysis, Units::Si), 2),
        (report::findings_csv(&analysis, Units::Si), 2),
    ] {
        // The strict reader refuses a row of another length.
        let mut reader = csv::Reader::from_reader(table.as_bytes());
        let read: Result<Vec<csv::StringRecord>, csv::Error> = reader.records().collect();
        assert_eq!(read.expect("rows of equal length").len(), rows);
    }
}

#[test]
fn no_output_shows_a_terminal_a_control_character() {
    let made = report::summary(&facts(), &analysis(), &Job::default(), &[]);
    assert!(made.chars().all(|c| c == '\n' || !c.is_control()));
}

#[test]
fn every_figure_that_was_assumed_is_listed_or_counted() {
    let mut analysis = analysis();
    let key = |table, name: &str, value: Option<&str>| Fallback {
        table,
        name: name.to_owned(),
        value: value.map(str::to_owned),
        source: "common practice",
        system: None,
    };
    analysis.fallbacks = vec![
        key("stressing", "mu_per_rad", Some("0.19")),
        key("tendon", "strand", Some(&"x".repeat(60))),
        key("tendon", "default_strand", None),
        key("limits", "cover_mm", Some("20")),
    ];
    let made = report::summary(&facts(), &analysis, &Job::default(), &[]);
    assert!(
        made.contains("mu_per_rad 0.19, default_strand not given"),
        "{made}"
    );
    assert!(made.contains("and 2 more keys"), "{made}");
}

#[test]
fn one_line_is_one_line() {
    let mut analysis = analysis();
    analysis.floor.tendons.truncate(1);
    analysis.results.truncate(1);
    let made = report::summary(&facts(), &analysis, &Job::default(), &[]);
    assert!(made.contains("1 tendon line ("), "{made}");
    assert!(made.contains("for 1 of 1 line."), "{made}");
}

#[test]
fn the_sheet_gives_the_drawings_number_beside_the_height_and_names_the_datum() {
    let mut job = Job::default();
    job.conventions.height.datum = Datum::DuctUnderside;
    job.profile.fit_inflection = true;
    let mut analysis = analysis();
    for tendon in &mut analysis.floor.tendons {
        for point in tendon
            .points
            .iter_mut()
            .filter(|p| p.kind == PointKind::Low)
        {
            point.drawn_m = point.height_m.map(|height_m| height_m - 0.013);
        }
    }
    let sheet = report::calculation(&facts(), &analysis, &job, "D001").expect("a sheet");
    assert!(
        sheet.contains("above the local soffit to the underside of the duct"),
        "{sheet}"
    );
    // A low at 30 mm, whose strand lies 13 mm above the duct's underside.
    let low = sheet
        .lines()
        .find(|line| line.starts_with("  low"))
        .expect("a low");
    let cells: Vec<&str> = low.split_whitespace().collect();
    assert!(cells.contains(&"17.00") && cells.contains(&"30.0"), "{low}");
    assert!(sheet.contains("fitted to the support heights"), "{sheet}");
    assert!(
        !sheet.contains("hogging length: 0.1 of the span"),
        "{sheet}"
    );
}

#[test]
fn extensions_of_a_tendon_live_at_both_ends_say_that_both_jacks_pull_together() {
    let mut analysis = analysis();
    let live = analysis.floor.tendons[0].ends[0].kind;
    analysis.floor.tendons[0].ends[1].kind = live;
    let forces = analysis.results[0].forces.as_mut().expect("forces");
    forces.ends[1] = forces.ends[0];
    let table = report::extensions_csv(&analysis, Units::Si);
    let rows: Vec<&str> = table.lines().collect();
    assert!(rows[1].contains("both jacks pull together") && rows[2].contains("both jacks"));
    assert!(!rows[3].contains("both jacks") && rows[3].contains("not included"));
    let sheet = report::calculation(&facts(), &analysis, &Job::default(), "D001").expect("a sheet");
    assert!(
        sheet.contains("both jacks pull together; the two add up to 138.6 mm gross"),
        "{sheet}"
    );
}
