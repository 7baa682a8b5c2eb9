//! What a result holds where something is not known, and whose findings are whose.

use geo::Coord;
use tautplan::analysis::{Analysis, TendonResult, work, work_tendon};
use tautplan::floor::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon};
use tautplan::geometry::Path;
use tautplan::job::Job;
use tautplan::report::{self, DrawingFacts};

fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

/// A tendon through these places, live at both ends, that sags once and hogs once.
fn tendon(mark: &str, places: &[Coord<f64>]) -> Tendon {
    let path = Path::through(places);
    let length_m = path.length_m();
    let points = [
        (PointKind::Anchor, 0.0, 0.1),
        (PointKind::Low, 0.25, 0.03),
        (PointKind::High, 0.5, 0.17),
        (PointKind::Low, 0.75, 0.03),
        (PointKind::Anchor, 1.0, 0.1),
    ];
    Tendon {
        mark: mark.to_owned(),
        mark_drawn: true,
        made: false,
        handle: format!("{:.0}", places[0].y),
        layer: "TENDON-DISTRIBUTED".to_owned(),
        run: Run::Distributed,
        tendons: 1,
        strands: Some(5),
        strand: Some("12.7".to_owned()),
        required_kn: None,
        required_kn_per_m: None,
        joints: Vec::new(),
        ends: [places[0], places[places.len() - 1]].map(|place| End {
            kind: Some(EndKind::Live),
            place,
        }),
        points: points
            .map(|(kind, share, height_m)| Point {
                kind,
                station_m: share * length_m,
                place: path.place_at(share * length_m),
                drawn_m: None,
                height_m: Some(height_m),
                other_soffit_m: None,
                thickness_m: Some(0.2),
                top_m: 0.0,
            })
            .to_vec(),
        path,
    }
}

fn straight(mark: &str, y: f64) -> Tendon {
    tendon(mark, &[at(0.0, y), at(20.0, y)])
}

fn floor(tendons: Vec<Tendon>) -> Analysis {
    let floor = Floor {
        tendons,
        slab: Slab::default(),
    };
    work(floor, &Job::default(), Vec::new())
}

fn facts() -> DrawingFacts {
    DrawingFacts {
        file: "level-2.dxf".to_owned(),
        version: "AC1027".to_owned(),
        unit_m: 0.001,
    }
}

#[test]
fn without_the_concrete_stress_jacking_and_lock_off_are_what_they_are_with_it() {
    let (tendon, job) = (straight("D001", 0.0), Job::default());
    let (with, _) = work_tendon(&tendon, &job, Some(1.2));
    let (without, refusal) = work_tendon(&tendon, &job, None);
    assert!(refusal.is_some());
    let whole = |result: &TendonResult| {
        let forces = result.forces.clone().expect("forces");
        (forces.ends, forces.totals, forces.later.is_some())
    };
    let (whole_with, whole_without) = (whole(&with), whole(&without));
    assert_eq!(
        (whole_with.0, whole_with.1),
        (whole_without.0, whole_without.1)
    );
    assert!(whole_with.2 && !whole_without.2);
    for (a, b) in with.points.iter().zip(&without.points) {
        assert!(a.forces_kn.iter().all(Option::is_some));
        assert_eq!(b.forces_kn, [a.forces_kn[0], a.forces_kn[1], None, None]);
    }
}

#[test]
fn without_a_slab_edge_the_extensions_are_given_and_the_later_losses_are_null() {
    let analysis = floor(vec![straight("D001", 0.0)]);
    let rules: Vec<&str> = analysis.findings.iter().map(|f| f.rule.name).collect();
    assert!(rules.contains(&"concrete-stress-unknown"), "{rules:?}");
    let json: serde_json::Value =
        serde_json::from_str(&report::json(&facts(), &[], &analysis)).expect("JSON");
    let tendon = &json["tendons"][0];
    assert_eq!(tendon["area_mm2"], 493.5);
    for end in [0, 1] {
        assert!(tendon["ends"][end]["extension_net_mm"].is_number());
    }
    assert!(tendon["points"][2]["lockoff_kn"].is_number());
    assert!(tendon["points"][2]["service_kn"].is_null());
    assert!(tendon["losses"]["draw_in_kn"].is_number());
    for key in ["shortening_mpa", "relaxation_mpa"] {
        assert!(tendon["losses"][key].is_null(), "{key}");
    }
    assert!(tendon["mean_service_kn"].is_null());
    let sheet = report::calculation(&facts(), &analysis, &Job::default(), "D001");
    assert!(sheet.is_some_and(|sheet| sheet.contains("mm gross") && !sheet.contains("5. Elastic")));
}

#[test]
fn steel_is_told_without_heights() {
    let mut unread = straight("D001", 0.0);
    unread.points[1].height_m = None;
    let (result, _) = work_tendon(&unread, &Job::default(), Some(1.2));
    assert!(result.forces.is_none());
    assert_eq!(result.area_mm2, Some(493.5));
}

#[test]
fn sheet_and_result_leave_out_the_same_drafting_turns() {
    let kinked = tendon(
        "D001",
        &[
            at(0.0, 5.0),
            at(10.0, 5.0),
            at(10.012, 5.000_06),
            at(20.0, 5.000_06),
        ],
    );
    let analysis = floor(vec![kinked]);
    assert_eq!(analysis.results[0].plan_tightest, None);
    let sheet = report::calculation(&facts(), &analysis, &Job::default(), "D001");
    assert!(sheet.is_some_and(|sheet| !sheet.contains("least plan radius")));
}

/// At a bare vertex in which two jacks meet, the sheet's own columns give the force it lists.
#[test]
fn the_sheet_follows_from_its_columns_where_two_jacks_meet_in_a_bend() {
    let bent = tendon(
        "D001",
        &[at(0.0, 0.0), at(9.0, 0.0), at(13.5, 9.0 * 0.75_f64.sqrt())],
    );
    let analysis = floor(vec![bent]);
    let sheet = report::calculation(&facts(), &analysis, &Job::default(), "D001").expect("a sheet");
    let row = sheet
        .lines()
        .filter(|line| line.trim_start().starts_with("high"))
        .map(|line| line.split_whitespace().collect::<Vec<_>>())
        .find(|cells| cells.len() == 9)
        .expect("the row of the high point");
    let number = |cell: usize| row[cell].parse::<f64>().expect("a number");
    let jack_kn = analysis.results[0]
        .forces
        .as_ref()
        .map_or(0.0, |f| f.jack_kn);
    let from_columns_kn = jack_kn * (-number(4).min(number(7))).exp();
    assert!((from_columns_kn - number(8)).abs() < 0.02, "{row:?}");
    assert!((number(4) - number(7)).abs() < 2e-6, "{row:?}");
}

#[test]
fn findings_on_a_mark_used_twice_go_to_the_line_they_stand_on() {
    let mut unlabelled = straight("D002", 9.0);
    unlabelled.ends[0].kind = Some(EndKind::Dead);
    unlabelled.ends[1].kind = Some(EndKind::Dead);
    let analysis = floor(vec![straight("D002", 3.0), unlabelled]);
    let of_rule = |line: usize| {
        let found = analysis.findings_by_tendon();
        let named = found[line].iter().filter(|f| f.rule.name == "no-live-end");
        named.count()
    };
    assert_eq!((of_rule(0), of_rule(1)), (0, 1));
}

#[test]
fn anchors_without_a_drawn_height_are_counted_among_the_assumptions() {
    let mut said = straight("D001", 3.0);
    for point in &mut said.points {
        point.drawn_m = point.height_m;
    }
    let told = |tendons| {
        let assumptions = floor(tendons).assumptions;
        let mut lines = assumptions.into_iter();
        lines.find(|line| line.contains("mid-depth"))
    };
    assert_eq!(told(vec![said.clone()]), None);
    let unsaid = straight("D002", 9.0);
    let line = told(vec![said, unsaid]).expect("two anchors of D002");
    assert!(line.ends_with(": 2."), "{line}");
}

/// A count without a size is worked out with the job's default, and every output names that size and whose it is; without
/// a default there is none to name.
#[test]
fn a_size_from_the_default_is_named_as_such() {
    let facts = DrawingFacts {
        file: "plan.dxf".to_owned(),
        version: "AC1027".to_owned(),
        unit_m: 0.001,
    };
    let worked = |strands: Option<u32>, drawn: Option<&str>, default: Option<&str>| {
        let mut job = Job::default();
        job.tendon.default_strand = default.map(str::to_owned);
        let tendons = vec![Tendon {
            strands,
            strand: drawn.map(str::to_owned),
            ..straight("D1", 0.0)
        }];
        let floor = Floor {
            tendons,
            slab: Slab::default(),
        };
        let analysis = work(floor, &job, Vec::new());
        let record: serde_json::Value =
            serde_json::from_str(&report::json(&facts, &[], &analysis)).expect("JSON");
        let table = report::tendons_csv(&analysis, job.units);
        let mut rows = csv::Reader::from_reader(table.as_bytes());
        let column = rows
            .headers()
            .expect("a header")
            .iter()
            .position(|name| name == "strand");
        let row = rows.records().next().expect("a row").expect("a row");
        let cell = row[column.expect("a column")].to_owned();
        let said = analysis
            .all_assumptions()
            .iter()
            .any(|line| line.contains("default_strand, 15.7: 1"));
        let sheet = report::calculation(&facts, &analysis, &job, "D1").expect("a sheet");
        let tendon = &record["tendons"][0];
        let size = (tendon["strand"].clone(), tendon["area_mm2"].clone(), cell);
        (size, said, sheet)
    };

    let (size, said, sheet) = worked(Some(5), None, Some("15.7"));
    assert_eq!(size, ("15.7".into(), 750.0.into(), "15.7".to_owned()));
    assert!(said);
    assert!(
        sheet.contains("5 strands of size 15.7 (the job's default_strand), 150 mm2 each"),
        "{sheet}"
    );

    let (size, said, sheet) = worked(Some(5), Some("12.7"), Some("15.7"));
    assert_eq!((size.0, size.2), ("12.7".into(), "12.7".to_owned()));
    assert!(!said);
    assert!(sheet.contains("5 strands of size 12.7, "), "{sheet}");

    for (strands, default) in [(Some(5), None), (None, Some("15.7"))] {
        let (size, said, _) = worked(strands, None, default);
        assert_eq!((size.0, size.1), (().into(), ().into()));
        assert!(!said);
    }
}
