//! Small floors in other offices' habits, drawn by `tests/python/offices.py` with ezdxf: what is read of each, with the
//! lines that an engineer would add, is what was meant; and what `survey` proposes, used unchanged, reads most of them.

mod truth;

use std::collections::BTreeMap;
use std::path::{Path, PathBuf};
use std::process::Command;

use serde_json::Value;
use tautplan::drawing::{self, Wanted};
use tautplan::floor::{self, Tendon};
use tautplan::job;
use truth::{runs_forwards, tendon_differences};

/// Drawings below `tests/data/offices/`.
const CASES: usize = 87;
/// Cases that a person can read and the program cannot, each with the reason.
const NOT_READ: &[(&str, &str)] = &[];
/// What survey's proposal, used unchanged, does not read yet, each with what the engineer still says.
const NOT_BY_SURVEY: &[(&str, &str)] = &[];

struct Case {
    name: String,
    drawing: PathBuf,
    truth: Value,
    /// The engineer's lines; none where the defaults do.
    job: String,
}

fn cases() -> Vec<Case> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/data/offices");
    let mut cases: Vec<Case> = std::fs::read_dir(&folder)
        .expect("the drawings are there")
        .map(|entry| entry.expect("an entry").path())
        .filter(|path| path.extension().is_some_and(|ending| ending == "dxf"))
        .map(|drawing| {
            let beside = |ending: &str| std::fs::read_to_string(drawing.with_extension(ending));
            let truth = beside("json").expect("the truth is beside the drawing");
            Case {
                name: drawing
                    .file_stem()
                    .map(|n| n.to_string_lossy().into_owned())
                    .unwrap_or_default(),
                truth: serde_json::from_str(&truth).expect("JSON"),
                job: beside("toml").unwrap_or_default(),
                drawing,
            }
        })
        .collect();
    cases.sort_by(|a, b| a.name.cmp(&b.name));
    cases
}

/// What differs between the floor as read by this job and as meant; empty where nothing does.
fn differences(case: &Case, job: &str) -> Vec<String> {
    let job = match job::read("tautplan.toml", job) {
        Ok(resolved) => resolved.job,
        Err(problems) => return vec![format!("the job file: {problems}")],
    };
    let bytes = std::fs::read(&case.drawing).expect("the drawing can be read");
    let source = match drawing::open(bytes) {
        Ok(source) => source,
        Err(refusal) => return vec![format!("{refusal:?}")],
    };
    let wanted = Wanted::layers(job.layer_patterns()).expect("patterns of layers");
    let (drawing, _) = drawing::read(&source, &wanted, job.conventions.unit);
    let (floor, _) = floor::read(&drawing, &job);
    let meant = case.truth["tendons"].as_array().expect("tendons");
    let mut found = Vec::new();
    if floor.tendons.len() != meant.len() {
        found.push(format!(
            "{} tendons, meant {}",
            floor.tendons.len(),
            meant.len()
        ));
    }
    for truth in meant {
        let fitting: Vec<(&Tendon, bool)> = floor
            .tendons
            .iter()
            .filter_map(|tendon| Some((tendon, runs_forwards(tendon, truth)?)))
            .collect();
        let name = &truth["mark"];
        match fitting[..] {
            [(tendon, forwards)] => found.extend(
                tendon_differences(tendon, forwards, truth, &job)
                    .into_iter()
                    .map(|difference| format!("{name}: {difference}")),
            ),
            _ => found.push(format!("{name}: {} tendons have its ends", fitting.len())),
        }
    }
    found
}

/// What was found wrong, case by case, where it was not known to be; and what was known to be wrong and is not.
fn judge(found: &BTreeMap<String, Vec<String>>, known: &[(&str, &str)]) -> String {
    let mut lines = Vec::new();
    for (name, wrong) in found {
        let is_known = known.iter().any(|(known, _)| known == name);
        match (wrong.first(), is_known) {
            (Some(first), false) => {
                let count = wrong.len();
                lines.push(format!("{name}: {count} differences, the first: {first}"));
            }
            (None, true) => lines.push(format!("{name} is read now: take it from the list")),
            _ => {}
        }
    }
    let strange = known.iter().filter(|(name, _)| !found.contains_key(*name));
    lines.extend(strange.map(|(name, _)| format!("{name} is in the list and no case")));
    lines.join("\n")
}

#[test]
fn every_office_is_read_with_its_job_file() {
    let cases = cases();
    assert_eq!(cases.len(), CASES);
    let found = cases
        .iter()
        .map(|case| (case.name.clone(), differences(case, &case.job)))
        .collect();
    let words = judge(&found, NOT_READ);
    assert!(words.is_empty(), "\n{words}");
}

/// The proposal for a drawing, as a file.
fn surveyed(case: &Case) -> String {
    let output = Command::new(env!("CARGO_BIN_EXE_tautplan"))
        .arg("survey")
        .arg(&case.drawing)
        .output()
        .expect("the program runs");
    assert!(output.status.success(), "{}: {output:?}", case.name);
    String::from_utf8(output.stdout).expect("UTF-8")
}

/// The proposal with the engineer's lines in place of its own.
fn with_lines(proposal: &str, lines: &str) -> String {
    let mut whole: toml::Table = toml::from_str(proposal).expect("TOML");
    for (table, keys) in toml::from_str::<toml::Table>(lines).expect("TOML") {
        let held = whole
            .entry(table)
            .or_insert_with(|| toml::Table::new().into());
        let held = held.as_table_mut().expect("a table");
        held.extend(keys.as_table().expect("a table").clone());
    }
    toml::to_string(&whole).expect("TOML")
}

#[test]
fn surveys_proposals_read_every_office_unchanged_and_all_with_the_lines_added() {
    let cases = cases();
    let mut unchanged = BTreeMap::new();
    let mut added = BTreeMap::new();
    for case in &cases {
        let proposal = surveyed(case);
        let wrong = differences(case, &proposal);
        if !wrong.is_empty() {
            added.insert(
                case.name.clone(),
                differences(case, &with_lines(&proposal, &case.job)),
            );
        }
        unchanged.insert(case.name.clone(), wrong);
    }
    let right = unchanged.values().filter(|wrong| wrong.is_empty()).count();
    let words = judge(&unchanged, NOT_BY_SURVEY);
    assert!(
        words.is_empty(),
        "{right} of {} unchanged\n{words}",
        cases.len()
    );
    assert!(3 * right >= 2 * cases.len(), "{right} of {}", cases.len());
    let words = judge(&added, NOT_READ);
    assert!(words.is_empty(), "with the lines added\n{words}");
}
