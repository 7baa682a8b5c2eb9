//! What survey proposes for drawings of other habits, used unchanged.

use std::collections::BTreeMap;
use std::fmt::Write as _;
use std::path::Path;
use std::process::{Command, Output};

use tempfile::TempDir;

/// A drawing being written, in metres, without handles.
#[derive(Default)]
struct Sheet {
    layers: String,
    blocks: String,
    entities: String,
}

impl Sheet {
    fn layer(&mut self, name: &str, colour: u8, linetype: &str) {
        let _ = write!(
            self.layers,
            "0|LAYER|2|{name}|70|0|62|{colour}|6|{linetype}|"
        );
    }

    fn line(&mut self, layer: &str, more: &str, points: [(f64, f64); 2]) {
        let [(x, y), (u, v)] = points;
        let _ = write!(
            self.entities,
            "0|LINE|8|{layer}|{more}10|{x}|20|{y}|11|{u}|21|{v}|"
        );
    }

    fn ring(&mut self, layer: &str, more: &str, points: &[(f64, f64)]) {
        let _ = write!(
            self.entities,
            "0|LWPOLYLINE|8|{layer}|{more}90|{}|70|1|",
            points.len()
        );
        for (x, y) in points {
            let _ = write!(self.entities, "10|{x}|20|{y}|");
        }
    }

    fn text(&mut self, layer: &str, content: &str, (x, y): (f64, f64)) {
        let _ = write!(
            self.entities,
            "0|TEXT|8|{layer}|10|{x}|20|{y}|40|0.15|1|{content}|"
        );
    }

    fn insert(
        &mut self,
        layer: &str,
        block: &str,
        (x, y): (f64, f64),
        attribute: Option<(&str, &str)>,
    ) {
        let follows = u8::from(attribute.is_some());
        let _ = write!(
            self.entities,
            "0|INSERT|8|{layer}|66|{follows}|2|{block}|10|{x}|20|{y}|"
        );
        if let Some((tag, value)) = attribute {
            let _ = write!(
                self.entities,
                "0|ATTRIB|8|{layer}|10|{x}|20|{y}|40|0.1|1|{value}|2|{tag}|70|0|0|SEQEND|"
            );
        }
    }

    fn block(&mut self, name: &str, entities: &str) {
        let _ = write!(
            self.blocks,
            "0|BLOCK|8|0|2|{name}|70|0|10|0|20|0|{entities}0|ENDBLK|8|0|"
        );
    }

    /// One tendon's labels: mark, high points at both ends, a low point between.
    fn labels(&mut self, layer: &str, mark: &str, (x, y): (f64, f64), along_x: bool) {
        for (content, along) in [
            (format!("{mark} 5-12.7"), 3.0),
            ("L40".to_owned(), 10.0),
            ("H120".to_owned(), 19.0),
        ] {
            let place = if along_x {
                (x + along, y + 0.05)
            } else {
                (x + 0.05, y + along)
            };
            self.text(layer, &content, place);
        }
    }

    fn write(&self, path: &Path) {
        let tags = format!(
            "0|SECTION|2|HEADER|9|$ACADVER|1|AC1015|9|$INSUNITS|70|6|0|ENDSEC|\
             0|SECTION|2|TABLES|0|TABLE|2|LAYER|70|9|{}0|ENDTAB|0|ENDSEC|\
             0|SECTION|2|BLOCKS|{}0|ENDSEC|0|SECTION|2|ENTITIES|{}0|ENDSEC|0|EOF",
            self.layers, self.blocks, self.entities
        );
        std::fs::write(path, tags.replace('|', "\n") + "\n").expect("written");
    }
}

fn tautplan(folder: &Path, words: &[&str]) -> Output {
    Command::new(env!("CARGO_BIN_EXE_tautplan"))
        .args(words)
        .current_dir(folder)
        .output()
        .expect("run")
}

/// Kinds of the ends by mark, and the run; with what was proposed.
fn surveyed(sheet: &Sheet) -> (BTreeMap<String, String>, String) {
    let folder = TempDir::new().expect("a folder");
    sheet.write(&folder.path().join("plan.dxf"));
    let survey = tautplan(
        folder.path(),
        &["survey", "plan.dxf", "--out", "tautplan.toml"],
    );
    let said = |output: &Output| String::from_utf8_lossy(&output.stderr).into_owned();
    assert_eq!(survey.status.code(), Some(0), "{}", said(&survey));
    let proposed =
        std::fs::read_to_string(folder.path().join("tautplan.toml")).expect("a job file");
    let marked = tautplan(folder.path(), &["mark", "plan.dxf"]);
    let result = std::fs::read(folder.path().join("plan-result.json"));
    let result = result.unwrap_or_else(|_| panic!("{}\n{proposed}", said(&marked)));
    let result: serde_json::Value = serde_json::from_slice(&result).expect("JSON");
    let tendons = result["tendons"].as_array().expect("a list");
    let row = |tendon: &serde_json::Value| {
        let word = |value: &serde_json::Value| value.as_str().unwrap_or("?").to_owned();
        let ends = [0, 1]
            .map(|end| word(&tendon["ends"][end]["kind"]))
            .join("-");
        (
            word(&tendon["mark"]),
            format!("{} {ends}", word(&tendon["run"])),
        )
    };
    (tendons.iter().map(row).collect(), proposed)
}

fn expected(rows: &[(&str, &str)]) -> BTreeMap<String, String> {
    rows.iter()
        .map(|(mark, row)| ((*mark).to_owned(), (*row).to_owned()))
        .collect()
}

/// Six tendons two ways on one layer: banded ones 0.5 m apart along x, distributed ones 1.4 m apart along y.
const PLAN: [(&str, (f64, f64), bool); 6] = [
    ("B1", (0.0, 8.0), true),
    ("B2", (0.0, 8.5), true),
    ("B3", (0.0, 9.0), true),
    ("D1", (7.5, 0.0), false),
    ("D2", (8.9, 0.0), false),
    ("D3", (10.3, 0.0), false),
];

fn end((x, y): (f64, f64), along_x: bool) -> (f64, f64) {
    if along_x {
        (x + 20.0, y)
    } else {
        (x, y + 20.0)
    }
}

const BOTH_RUNS: [(&str, &str); 6] = [
    ("B1", "banded live-dead"),
    ("B2", "banded live-dead"),
    ("B3", "banded live-dead"),
    ("D1", "distributed live-dead"),
    ("D2", "distributed live-dead"),
    ("D3", "distributed live-dead"),
];

#[test]
fn everything_on_one_layer_in_colours_with_words_at_the_ends() {
    let mut sheet = Sheet::default();
    sheet.layer("0", 7, "CONTINUOUS");
    sheet.ring(
        "0",
        "62|8|",
        &[(-1.0, -1.0), (21.0, -1.0), (21.0, 21.0), (-1.0, 21.0)],
    );
    sheet.line("0", "62|9|6|CENTER|", [(-3.0, 4.0), (24.0, 4.0)]);
    sheet.line("0", "62|9|6|CENTER|", [(6.0, -3.0), (6.0, 24.0)]);
    for (mark, from, along_x) in PLAN {
        let to = end(from, along_x);
        sheet.line("0", "62|1|", [from, to]);
        sheet.labels("0", mark, from, along_x);
        sheet.text("0", "LE", (from.0 - 0.3, from.1 - 0.25));
        sheet.text("0", "DE", (to.0 + 0.05, to.1 + 0.05));
    }
    let (found, proposed) = surveyed(&sheet);
    assert_eq!(found, expected(&BOTH_RUNS), "{proposed}");
    for line in [
        "tendons = [\"0@colour=1\"]",
        "banded_along_deg = 0",
        "slab_edge = [\"0@colour=8\"]",
        "text LE on 0",
        "CENTER",
    ] {
        assert!(proposed.contains(line), "{line}\n{proposed}");
    }
}

#[test]
fn a_bound_reference_keeps_to_the_conventions_behind_its_prefix() {
    let mut sheet = Sheet::default();
    for (name, colour) in [
        ("0", 7),
        ("PT$0$TENDON-BANDED", 1),
        ("PT$0$TENDON-END", 3),
        ("PT$0$TENDON-MARK", 2),
    ] {
        sheet.layer(name, colour, "CONTINUOUS");
    }
    for (mark, from, along_x) in PLAN.into_iter().filter(|(_, _, along_x)| *along_x) {
        let to = end(from, along_x);
        sheet.line("PT$0$TENDON-BANDED", "", [from, to]);
        sheet.text(
            "PT$0$TENDON-MARK",
            &format!("{mark} 5-12.7"),
            (from.0 + 3.0, from.1 + 0.05),
        );
        sheet.insert("PT$0$TENDON-END", "PT$0$LIVE-END", from, None);
        sheet.insert("PT$0$TENDON-END", "PT$0$DEAD-END", to, None);
    }
    // The reference as it is bound: one block with everything in it.
    let inside = std::mem::take(&mut sheet.entities);
    let symbol = "0|LINE|8|0|10|0|20|-0.1|11|0|21|0.1|";
    sheet.block("PT$0$LIVE-END", symbol);
    sheet.block("PT$0$DEAD-END", symbol);
    sheet.block("PT", &inside);
    sheet.insert("0", "PT", (100.0, 50.0), None);
    let (found, proposed) = surveyed(&sheet);
    assert_eq!(found, expected(&BOTH_RUNS[..3]), "{proposed}");
    assert!(
        !proposed.lines().any(|line| line.starts_with("banded =")),
        "{proposed}"
    );
}

#[test]
fn blocks_are_told_apart_by_an_attribute_and_shapes_by_the_legend() {
    let mut sheet = Sheet::default();
    for name in ["0", "P-CABLE-BANDED", "P-NOTES", "P-ANC"] {
        sheet.layer(name, 7, "CONTINUOUS");
    }
    sheet.block("ANC", "0|CIRCLE|8|0|10|0|20|0|40|0.05|");
    for (mark, from, _) in &PLAN[..3] {
        let to = end(*from, true);
        sheet.line("P-CABLE-BANDED", "", [*from, to]);
        sheet.labels("P-NOTES", mark, *from, true);
        sheet.insert("P-ANC", "ANC", *from, Some(("TYP", "LE")));
        sheet.insert("P-ANC", "ANC", to, Some(("TYP", "FIXED END")));
    }
    let (found, proposed) = surveyed(&sheet);
    assert_eq!(found, expected(&BOTH_RUNS[..3]), "{proposed}");
    assert!(
        proposed.contains("ANC: TYP = LE") && proposed.contains("\nblocks = [\"ANC\"]"),
        "{proposed}"
    );

    let mut sheet = Sheet::default();
    for name in ["0", "P-CABLE-BANDED", "P-NOTES", "P-ANC"] {
        sheet.layer(name, 7, "CONTINUOUS");
    }
    for (mark, from, _) in &PLAN[..3] {
        let to = end(*from, true);
        sheet.line("P-CABLE-BANDED", "", [*from, to]);
        sheet.labels("P-NOTES", mark, *from, true);
        let square = |(x, y): (f64, f64)| {
            [
                (x - 0.1, y - 0.1),
                (x + 0.1, y - 0.1),
                (x + 0.1, y + 0.1),
                (x - 0.1, y + 0.1),
            ]
        };
        sheet.ring("P-ANC", "", &square(*from));
        sheet.line("P-ANC", "", [(to.0, to.1 - 0.15), (to.0, to.1 + 0.15)]);
    }
    sheet.ring(
        "P-ANC",
        "",
        &[(30.0, 5.0), (30.2, 5.0), (30.2, 5.2), (30.0, 5.2)],
    );
    sheet.text("P-ANC", "LIVE END", (30.6, 5.0));
    sheet.line("P-ANC", "", [(30.1, 4.0), (30.1, 4.3)]);
    sheet.text("P-ANC", "DEAD END", (30.6, 4.05));
    let (found, proposed) = surveyed(&sheet);
    assert_eq!(found, expected(&BOTH_RUNS[..3]), "{proposed}");
    assert!(
        proposed.contains("live_shapes = [\"square\"]")
            && proposed.contains("dead_shapes = [\"bar\"]"),
        "{proposed}"
    );
}
