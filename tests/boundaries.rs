//! The house's walls: no stage imports a later one; `dxf::`, `rayon` and `clap` each stay in their one room.

use std::fs;
use std::path::{Path, PathBuf};

/// Stages in pipeline order; those of equal rank must not import one another.
const STAGES: &[(&str, u8)] = &[
    ("units", 0),
    ("geometry", 0),
    ("numerics", 0),
    ("finding", 0),
    ("patterns", 0),
    ("cautions", 0),
    ("job", 1),
    ("drawing", 1),
    ("floor", 2),
    ("profile", 3),
    ("losses", 4),
    ("checks", 5),
    ("analysis", 6),
    ("annotate", 7),
    ("report", 7),
    ("terminal", 8),
    ("commands", 9),
    ("cli", 10),
];

fn rank(stage: &str) -> Option<u8> {
    STAGES
        .iter()
        .find(|(name, _)| *name == stage)
        .map(|&(_, rank)| rank)
}

fn sources(folder: &Path, found: &mut Vec<PathBuf>) {
    for entry in fs::read_dir(folder).expect("src is readable") {
        let path = entry.expect("entry is readable").path();
        if path.is_dir() {
            sources(&path, found);
        } else if path.extension().is_some_and(|ending| ending == "rs") {
            found.push(path);
        }
    }
}

/// Code lines without comments, with the stage that the file belongs to.
fn rooms() -> Vec<(String, String, String)> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut files = Vec::new();
    sources(&root, &mut files);
    files.sort();
    assert!(files.len() > 10, "the walk over src found too few files");
    files
        .into_iter()
        .map(|file| {
            let name = file
                .strip_prefix(&root)
                .expect("below src")
                .to_string_lossy()
                .replace('\\', "/");
            let stage = name.split(['/', '.']).next().unwrap_or_default().to_owned();
            let text = fs::read_to_string(&file).expect("source is text");
            let code: Vec<&str> = text
                .lines()
                .filter(|line| !line.trim_start().starts_with("//"))
                .collect();
            (stage, name, code.join("\n"))
        })
        .collect()
}

#[test]
fn no_stage_imports_a_later_one_or_a_neighbour() {
    let mut breaches = Vec::new();
    for (stage, name, code) in rooms() {
        if stage == "lib" || stage == "main" {
            continue;
        }
        let own =
            rank(&stage).unwrap_or_else(|| panic!("{name}: stage {stage} is not in the list"));
        for import in code.split("crate::").skip(1) {
            let names: Vec<&str> = match import.strip_prefix('{') {
                Some(group) => group
                    .split(['}', ';'])
                    .next()
                    .unwrap_or_default()
                    .split(',')
                    .collect(),
                None => vec![import],
            };
            for target in names {
                let target: String = target
                    .trim()
                    .chars()
                    .take_while(|c| c.is_alphanumeric() || *c == '_')
                    .collect();
                let Some(other) = rank(&target) else { continue };
                if target != stage && other >= own && other != 0 {
                    breaches.push(format!("{name} ({stage}) imports {target}"));
                }
            }
        }
    }
    assert!(breaches.is_empty(), "{}", breaches.join("\n"));
}

#[test]
fn each_prescribed_crate_stays_in_its_room() {
    let mut breaches = Vec::new();
    for (stage, name, code) in rooms() {
        for (word, allowed) in [
            ("dxf::", &["drawing"][..]),
            ("rayon", &["analysis"][..]),
            ("clap", &["cli"][..]),
            ("std::fs", &["commands"][..]),
        ] {
            if code.contains(word) && !allowed.contains(&stage.as_str()) {
                breaches.push(format!("{name} says {word}"));
            }
        }
    }
    assert!(breaches.is_empty(), "{}", breaches.join("\n"));
}
