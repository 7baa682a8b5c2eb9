//! What survey proposes of a drawing's habits, and what it does not where a drawing gives no reason to.

use std::fmt::Write as _;
use std::process::Command;

/// A drawing being written in the unit of its coordinates; tags are parted by `|`.
struct Plan {
    header: &'static str,
    entities: String,
}

impl Plan {
    /// In metres, with an outline, four columns and end symbols by the default names.
    fn metric() -> Self {
        let mut plan = Self {
            header: "9|$INSUNITS|70|6|9|$MEASUREMENT|70|1|",
            entities: String::new(),
        };
        plan.ring("SLAB-EDGE", (-0.5, -0.5), (20.5, 16.5));
        for (x, y) in [(0.0, 0.0), (10.0, 0.0), (10.0, 8.0), (10.0, 16.0)] {
            plan.ring("COLUMN", (x - 0.3, y - 0.3), (x + 0.3, y + 0.3));
        }
        plan
    }

    fn line(&mut self, layer: &str, (x, y): (f64, f64), (u, v): (f64, f64)) {
        let _ = write!(
            self.entities,
            "0|LINE|8|{layer}|10|{x}|20|{y}|11|{u}|21|{v}|"
        );
    }

    fn ring(&mut self, layer: &str, (x, y): (f64, f64), (u, v): (f64, f64)) {
        let _ = write!(
            self.entities,
            "0|LWPOLYLINE|8|{layer}|90|4|70|1|10|{x}|20|{y}|10|{u}|20|{y}|10|{u}|20|{v}|10|{x}|20|{v}|"
        );
    }

    fn text(&mut self, layer: &str, content: &str, (x, y): (f64, f64)) {
        let _ = write!(
            self.entities,
            "0|TEXT|8|{layer}|10|{x}|20|{y}|40|0.15|1|{content}|"
        );
    }

    fn end(&mut self, block: &str, (x, y): (f64, f64)) {
        let _ = write!(
            self.entities,
            "0|INSERT|8|TENDON-END|2|{block}|10|{x}|20|{y}|"
        );
    }

    /// A banded tendon along x from 0 to 20, live at the left, with texts at stations.
    fn banded(&mut self, y: f64, labels: &[(&str, f64)]) {
        self.line("TENDON-BANDED", (0.0, y), (20.0, y));
        self.ends(y);
        self.labels(y, labels);
    }

    fn ends(&mut self, y: f64) {
        self.end("LIVE-END", (0.0, y));
        self.end("DEAD-END", (20.0, y));
    }

    fn labels(&mut self, y: f64, labels: &[(&str, f64)]) {
        self.text("TENDON-MARK", "5-12.7", (2.0, y + 0.05));
        for (content, x) in labels {
            self.text("TENDON-HEIGHT", content, (*x, y + 0.05));
        }
    }

    /// The keys that the survey sets, a line each.
    fn proposed(&self) -> Vec<String> {
        let tags = format!(
            "0|SECTION|2|HEADER|9|$ACADVER|1|AC1015|{}0|ENDSEC|0|SECTION|2|BLOCKS|{}0|ENDSEC|\
             0|SECTION|2|ENTITIES|{}0|ENDSEC|0|EOF|",
            self.header,
            ["LIVE-END", "DEAD-END"]
                .map(|name| format!("0|BLOCK|8|0|2|{name}|70|0|10|0|20|0|0|CIRCLE|8|0|10|0|20|0|40|0.1|0|ENDBLK|8|0|"))
                .concat(),
            self.entities
        );
        let folder = tempfile::TempDir::new().expect("a folder");
        let path = folder.path().join("plan.dxf");
        std::fs::write(&path, tags.replace('|', "\n")).expect("written");
        let output = Command::new(env!("CARGO_BIN_EXE_tautplan"))
            .arg("survey")
            .arg(&path)
            .output()
            .expect("the program runs");
        assert!(output.status.success(), "{output:?}");
        let text = String::from_utf8(output.stdout).expect("UTF-8");
        text.lines()
            .filter(|line| !line.starts_with(['#', '[']) && !line.is_empty())
            .map(str::to_owned)
            .collect()
    }
}

const NOTHING: [&str; 0] = [];

/// Heights of a tendon over two spans with its high point at the columns.
const DRAPED: [(&str, f64); 3] = [("L30", 5.0), ("H165", 10.0), ("L30", 15.0)];

#[test]
fn gaps_left_for_labels_are_bridged_and_gaps_left_for_nothing_are_not() {
    let broken = |explained: bool, gap: f64| {
        let mut plan = Plan::metric();
        for y in [0.0, 0.5, 8.0, 16.0] {
            plan.line("TENDON-BANDED", (0.0, y), (7.0, y));
            plan.line("TENDON-BANDED", (7.0 + gap, y), (20.0, y));
            plan.ends(y);
            plan.labels(y, &DRAPED);
            if explained {
                plan.text("TENDON-HEIGHT", "70", (7.05 + 0.3 * gap, y - 0.07));
            }
        }
        plan.proposed()
    };
    assert_eq!(broken(true, 0.62), ["bridge_gap_mm = 650"]);
    assert_eq!(broken(false, 0.62), NOTHING);
    // Nobody leaves four metres for a label.
    assert_eq!(broken(true, 4.0), NOTHING);
}

#[test]
fn gaps_left_for_crossing_tendons_are_bridged_and_gaps_at_joints_are_not() {
    let crossed = |symbols: bool| {
        let mut plan = Plan::metric();
        for y in [1.0, 2.0, 3.0, 4.0] {
            plan.line("TENDON-DISTRIBUTED", (0.0, y), (9.8, y));
            plan.line("TENDON-DISTRIBUTED", (10.2, y), (20.0, y));
            plan.ends(y);
            if symbols {
                plan.end("DEAD-END", (9.8, y));
                plan.end("LIVE-END", (10.2, y));
            }
        }
        plan.line("TENDON-BANDED", (10.0, 0.0), (10.0, 16.0));
        plan.proposed()
    };
    assert_eq!(crossed(false), ["bridge_gap_mm = 450"]);
    assert_eq!(crossed(true), NOTHING);
}

#[test]
fn a_drawing_in_feet_or_with_heights_in_inches_is_reported_in_us_units() {
    let mut plan = Plan::metric();
    plan.banded(8.0, &DRAPED);
    assert_eq!(plan.proposed(), NOTHING);
    plan.header = "9|$INSUNITS|70|2|";
    assert_eq!(plan.proposed(), ["units = \"us\""]);
    let mut plan = Plan::metric();
    for y in [0.0, 8.0, 16.0] {
        plan.banded(
            y,
            &[("L 1 1/4\"", 5.0), ("H 6 1/2\"", 10.0), ("L 1 1/4\"", 15.0)],
        );
    }
    let proposed = plan.proposed();
    assert!(
        ["units = \"us\"", "unit = \"in\""]
            .iter()
            .all(|line| proposed.iter().any(|other| other == line)),
        "{proposed:?}"
    );
}

#[test]
fn an_assumed_unit_is_doubted_where_tendons_would_be_strangely_short() {
    let of = |header: &'static str| {
        let mut plan = Plan::metric();
        plan.banded(8.0, &DRAPED);
        plan.header = header;
        // A floor of 20 m by these numbers.
        plan.proposed()
            .into_iter()
            .find(|line| line.starts_with("unit ="))
    };
    assert_eq!(
        of("9|$INSUNITS|70|0|9|$MEASUREMENT|70|1|"),
        Some("unit = \"m\"".to_owned())
    );
    assert_eq!(
        of("9|$INSUNITS|70|0|9|$MEASUREMENT|70|0|"),
        Some("unit = \"ft\"".to_owned())
    );
    assert_eq!(of("9|$INSUNITS|70|6|"), None);
}

#[test]
fn lines_across_a_group_beside_its_text_are_extents() {
    let of = |text: &str, across: bool| {
        let mut plan = Plan::metric();
        plan.line("TENDON-DISTRIBUTED", (0.0, 2.0), (20.0, 2.0));
        plan.ends(2.0);
        plan.labels(2.0, &DRAPED);
        if across {
            plan.line("PT-RANGE", (8.0, 2.0), (8.0, 14.0));
        } else {
            plan.line("PT-RANGE", (8.0, 3.0), (8.0, 14.0));
        }
        plan.text("TENDON-MARK", text, (8.1, 7.0));
        plan.proposed()
    };
    assert_eq!(of("D05-D15 @ 1200", true), ["extents = [\"PT-RANGE\"]"]);
    assert_eq!(of("11 @ 1200 c/c", true), ["extents = [\"PT-RANGE\"]"]);
    assert_eq!(of("D05", true), NOTHING);
    assert_eq!(of("D05-D15 @ 1200", false), NOTHING);
}

#[test]
fn notes_say_thickness_and_strand_where_labels_do_not() {
    let of = |notes: &[&str]| {
        let mut plan = Plan::metric();
        plan.banded(8.0, &DRAPED);
        for (at, note) in (0_u32..).zip(notes) {
            plan.text("NOTES", note, (30.0, f64::from(at)));
        }
        plan.proposed()
    };
    assert_eq!(
        of(&["1. SLAB THICKNESS: 220 mm U.N.O."]),
        ["thickness_mm = 220"]
    );
    assert_eq!(
        of(&["ALL SLABS TO BE 8\" THK. U.N.O."]),
        ["thickness_mm = 203.2"]
    );
    assert_eq!(of(&["60 mm THICK TOPPING ON ALL SLABS"]), NOTHING);
    assert_eq!(
        of(&["SLAB IS 220 mm THICK", "PODIUM SLAB IS 300 mm THICK"]),
        NOTHING
    );
    let counted = |note: &str| {
        let mut plan = Plan::metric();
        plan.line("TENDON-BANDED", (0.0, 8.0), (20.0, 8.0));
        plan.ends(8.0);
        plan.text("TENDON-MARK", "B01 5 STRANDS", (2.0, 8.05));
        plan.text("NOTES", note, (30.0, 0.0));
        plan.proposed()
    };
    let note = "ALL STRANDS 0.6\" DIA. TO ASTM A416";
    assert_eq!(counted(note), ["default_strand = \"15.2\""]);
    // Where the marks themselves say it no default is needed.
    assert_eq!(of(&[note]), NOTHING);
    let either = "STRANDS 12.7 mm OR 15.2 mm DIA. AS SHOWN";
    assert_eq!(counted(either), NOTHING);
}

#[test]
fn the_face_that_heights_are_counted_from_is_seen_at_columns() {
    let of = |labels: &[(&str, f64)], thickness: &str| {
        let mut plan = Plan::metric();
        for y in [0.0, 8.0, 16.0] {
            plan.banded(y, labels);
        }
        plan.text("SLAB-ZONE", thickness, (3.0, 12.0));
        plan.proposed()
    };
    assert_eq!(of(&DRAPED, "T200"), NOTHING);
    let bare = [("30", 5.0), ("165", 10.0), ("30", 15.0)];
    assert_eq!(of(&bare, "T200"), NOTHING);
    // With words a low point may well stand at a column.
    let by_column = [("L30", 10.0), ("H165", 13.0), ("L30", 16.0), ("H165", 19.0)];
    assert_eq!(of(&by_column, "T200"), NOTHING);
    let from_top = [("170", 5.0), ("35", 10.0), ("170", 15.0)];
    assert_eq!(of(&from_top, "T200"), ["from = \"top\""]);
    let worded = [("L170", 5.0), ("H35", 10.0), ("L170", 15.0)];
    assert_eq!(of(&worded, "T200"), ["from = \"top\""]);
    let nearer = [("L30", 5.0), ("H40", 10.0), ("L30", 15.0)];
    assert_eq!(of(&nearer, "T200"), ["from = \"nearer-face\""]);
    // A shallow drape about mid-depth is one.
    let shallow = [("L90", 5.0), ("H110", 10.0), ("L90", 15.0)];
    assert_eq!(of(&shallow, "T200"), NOTHING);
}

#[test]
fn the_soffit_that_heights_are_counted_from_is_seen_in_a_drop() {
    let of = |over_column: &str| {
        let mut plan = Plan::metric();
        plan.ring("SLAB-ZONE", (8.5, 6.5), (11.5, 9.5));
        plan.text("SLAB-ZONE", "T350", (9.0, 9.0));
        plan.text("SLAB-ZONE", "T200", (3.0, 12.0));
        plan.banded(0.0, &DRAPED);
        plan.banded(8.0, &[("L30", 5.0), (over_column, 10.0), ("L30", 15.0)]);
        plan.banded(16.0, &DRAPED);
        plan.proposed()
    };
    assert_eq!(of("H165"), ["soffit = \"general\""]);
    assert_eq!(of("H315"), NOTHING);
    // A sign is a habit in a drop, and a slip outside one.
    let negative = |x: f64| {
        let mut plan = Plan::metric();
        plan.ring("SLAB-ZONE", (4.0, 6.5), (6.0, 9.5));
        plan.text("SLAB-ZONE", "T400", (4.5, 9.0));
        plan.text("SLAB-ZONE", "T200", (3.0, 12.0));
        plan.banded(8.0, &[("L-120", x), ("H165", 10.0), ("L30", 15.0)]);
        plan.proposed()
    };
    assert_eq!(negative(5.0), ["soffit = \"general\""]);
    assert_eq!(negative(7.0), NOTHING);
}

#[test]
fn heights_that_would_put_a_duct_on_the_form_are_those_of_chairs() {
    let of = |low: &str| {
        let mut plan = Plan::metric();
        let supports = [
            (low, 5.0),
            ("80", 7.0),
            ("120", 8.5),
            ("H158", 10.0),
            ("120", 11.5),
            ("80", 13.0),
            (low, 15.0),
        ];
        for y in [0.0, 8.0, 16.0] {
            plan.banded(y, &supports);
        }
        plan.proposed()
    };
    assert_eq!(of("L15"), ["datum = \"chair\""]);
    assert_eq!(of("L30"), NOTHING);
}

#[test]
fn marks_out_of_reach_widen_it() {
    let of = |off: f64| {
        let mut plan = Plan::metric();
        for (mark, y) in [
            ("B01 5-12.7", 0.0),
            ("B02 5-12.7", 8.0),
            ("B03 5-12.7", 16.0),
        ] {
            plan.line("TENDON-BANDED", (0.0, y), (20.0, y));
            plan.ends(y);
            plan.text("TENDON-MARK", mark, (3.0, y + off));
        }
        plan.proposed()
    };
    assert_eq!(of(0.1), NOTHING);
    assert_eq!(of(0.7), ["reach_text_heights = 5"]);
    // That far off nobody would look.
    assert_eq!(of(2.5), NOTHING);
}

#[test]
fn the_letter_h_stands_for_heights_where_its_numbers_are_those_of_heights() {
    let of = |numbers: [&str; 3]| {
        let mut plan = Plan::metric();
        for y in [0.0, 8.0, 16.0] {
            plan.line("TENDON-BANDED", (0.0, y), (20.0, y));
            plan.ends(y);
            plan.text("TENDON-MARK", "5-12.7", (2.0, y + 0.05));
            for (number, x) in numbers.into_iter().zip([5.0, 10.0, 15.0]) {
                plan.text("HOOGTE", &format!("h={number}"), (x, y + 0.05));
            }
        }
        plan.proposed()
    };
    let heights = ["heights = [\"HOOGTE\"]"];
    assert_eq!(of(["45", "205", "45"]), heights);
    assert_eq!(of(["220", "250", "220"]), ["slab_zone = [\"HOOGTE\"]"]);
}
