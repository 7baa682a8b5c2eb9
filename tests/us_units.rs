//! Results in US units: nothing of SI is left in what people read, and the result file is as it was.

use std::collections::BTreeSet;
use std::fs;
use std::path::Path;
use std::process::Command;

use regex::Regex;
use tempfile::TempDir;

/// The outputs of the faulty floor, whose findings come from many rules.
struct Run {
    folder: TempDir,
    summary: String,
}

impl Run {
    fn of(job: &str) -> Self {
        let folder = TempDir::new().expect("a folder");
        let demos = Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-drawings");
        for name in ["faulty-floor.dxf", "small-floor.dxf"] {
            fs::copy(demos.join(name), folder.path().join(name)).expect("copied");
        }
        fs::write(folder.path().join("tautplan.toml"), job).expect("written");
        let mut run = Self {
            folder,
            summary: String::new(),
        };
        run.summary = run.tautplan(&["mark", "faulty-floor.dxf", "small-floor.dxf"]);
        run
    }

    fn tautplan(&self, arguments: &[&str]) -> String {
        let output = Command::new(env!("CARGO_BIN_EXE_tautplan"))
            .args(arguments)
            .current_dir(self.folder.path())
            .output()
            .expect("the program starts");
        let message = String::from_utf8_lossy(&output.stderr);
        assert!(
            output.status.code().is_some_and(|code| code < 2),
            "{message}"
        );
        String::from_utf8(output.stdout).expect("text")
    }

    fn file(&self, name: &str) -> String {
        fs::read_to_string(self.folder.path().join(name)).expect("written")
    }

    /// Lines of a marked drawing that the drawing itself has not: its marks.
    fn marks(&self, stem: &str) -> Vec<String> {
        let own = self.file(&format!("{stem}.dxf"));
        let own: BTreeSet<&str> = own.lines().collect();
        let marked = self.file(&format!("{stem}-marked.dxf"));
        let marks = marked.lines().filter(|line| !own.contains(line));
        marks.map(str::to_owned).collect()
    }

    /// Marks of the tendons that have forces.
    fn stressed(&self, stem: &str) -> Vec<String> {
        let table = self.file(&format!("{stem}-tendons.csv"));
        let mut reader = csv::Reader::from_reader(table.as_bytes());
        let rows = reader.records().map(|row| row.expect("a row"));
        let marks = rows
            .filter(|row| !row[14].is_empty())
            .map(|row| row[0].to_owned());
        marks.collect()
    }
}

const US: &str = "units = \"us\"\n[height]\nunit = \"mm\"\n";

/// Lines with an SI unit as a word of its own. How the drawing's own heights are read is the drawing's business, and
/// published equations, which end in their clause, stand in the units they are published in, as the sheet says.
fn si_words(text: &str) -> Vec<String> {
    let unit = Regex::new(r"(?m)(^|[ (])(kN|MPa|mm2?|m2?|m²|kN m|kN/m|rad/m|1?/m)([ ,;:.)]|$)");
    let unit = unit.expect("a pattern");
    let read = Regex::new(r"mm (above the local soffit)|drawn mm").expect("a pattern");
    let lines = text.lines().map(|line| read.replace_all(line, ""));
    lines
        .filter(|line| !line.ends_with(']') && !line.contains("as published in SI"))
        .filter(|line| unit.is_match(line))
        .map(std::borrow::Cow::into_owned)
        .collect()
}

#[test]
fn no_si_unit_is_left_where_people_read() {
    let run = Run::of(US);
    assert_eq!(si_words(&run.summary), [""; 0]);
    let column = Regex::new(r"_(kn|mpa|mm2?|m)(,|\r?$)").expect("a pattern");
    for stem in ["faulty-floor", "small-floor"] {
        for table in ["tendons", "points", "extensions", "findings"] {
            let text = run.file(&format!("{stem}-{table}.csv"));
            assert_eq!(si_words(&text), [""; 0], "{stem} {table}");
            let header = text.lines().next().unwrap_or_default();
            assert!(!column.is_match(header), "{header}");
        }
        let marks = run.marks(stem);
        assert_eq!(si_words(&marks.join("\n")), [""; 0], "{stem}");
        let texts = |word: &str| marks.iter().filter(|mark| mark.contains(word)).count();
        assert!(texts("kip") >= 4 && texts(" in") >= 2, "{marks:?}");
        let stressed = run.stressed(stem);
        assert!(stressed.len() > 3, "{stem}");
        for mark in stressed.iter().take(6) {
            let sheet = run.tautplan(&["tendon", &format!("{stem}.dxf"), mark]);
            assert_eq!(si_words(&sheet), [""; 0], "{mark}");
            assert!(sheet.contains(" kip") && sheet.contains(" ksi"));
        }
    }
    // The same looks would find them in SI.
    let run = Run::of("");
    assert!(!si_words(&run.summary).is_empty());
    assert!(!si_words(&run.file("faulty-floor-findings.csv")).is_empty());
    let header = run.file("faulty-floor-tendons.csv");
    assert!(column.is_match(header.lines().next().unwrap_or_default()));
    assert!(!si_words(&run.marks("faulty-floor").join("\n")).is_empty());
}

#[test]
fn the_result_file_is_in_si_whatever_the_job_wants() {
    let read = |run: &Run| -> serde_json::Value {
        serde_json::from_str(&run.file("faulty-floor-result.json")).expect("JSON")
    };
    let (si, us) = (read(&Run::of("")), read(&Run::of(US)));
    assert_eq!(us["inputs"]["units"], "us");
    for part in ["tendons", "findings", "drawing"] {
        assert!(si[part] == us[part], "{part}");
    }
}

#[test]
fn a_table_in_us_units_holds_the_same_forces() {
    let column = |run: &Run, name: &str| -> Vec<f64> {
        let table = run.file("faulty-floor-points.csv");
        let mut reader = csv::Reader::from_reader(table.as_bytes());
        let at = reader
            .headers()
            .expect("a header")
            .iter()
            .position(|head| head == name);
        let at = at.unwrap_or_else(|| panic!("no column {name}"));
        let rows = reader.records().map(|row| row.expect("a row"));
        rows.filter_map(|row| row[at].parse().ok()).collect()
    };
    let (si, us) = (Run::of(""), Run::of(US));
    for (name, us_name, factor, step) in [
        ("service_kn", "service_kip", 4.448_222, 0.08),
        ("height_mm", "height_in", 25.4, 0.07),
        ("station_m", "station_ft", 0.3048, 0.001),
    ] {
        let (si, us) = (column(&si, name), column(&us, us_name));
        assert!(si.len() == us.len() && si.len() > 20, "{name}");
        for (si, us) in si.iter().zip(us) {
            assert!((si - us * factor).abs() < step, "{name}: {si}, {us}");
        }
    }
}
