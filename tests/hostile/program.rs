//! The program on drawings that mean harm: a status, a message, in time.

use std::fs;
use std::path::PathBuf;
use std::process::Command;
use std::time::{Duration, Instant};

use tempfile::TempDir;

use crate::drawings::{file, of_tags};

/// A drawing `plan.dxf` with its job file in a folder of its own.
pub(crate) struct Place(TempDir);

/// How the program ended.
pub(crate) struct Ended {
    pub(crate) status: Option<i32>,
    pub(crate) said: String,
    pub(crate) printed: String,
}

pub(crate) fn folder(drawing: &[u8], job: &str) -> Place {
    let place = TempDir::new().expect("a folder");
    fs::write(place.path().join("plan.dxf"), drawing).expect("written");
    fs::write(place.path().join("plan.toml"), job).expect("written");
    Place(place)
}

pub(crate) fn small_with(job: &str) -> Place {
    folder(&file("demo-drawings/small-floor.dxf"), job)
}

impl Place {
    pub(crate) fn path(&self, name: &str) -> PathBuf {
        self.0.path().join(name)
    }

    pub(crate) fn run(&self, arguments: &[&str]) -> Ended {
        let begun = Instant::now();
        let output = Command::new(env!("CARGO_BIN_EXE_tautplan"))
            .args(arguments)
            .current_dir(self.0.path())
            .env("NO_COLOR", "1")
            .output()
            .expect("the program starts");
        let text = |bytes: &[u8]| String::from_utf8_lossy(bytes).into_owned();
        let said = text(&output.stderr);
        assert!(!said.contains("panicked"), "{said}");
        assert!(output.status.code().is_some(), "ended by a signal: {said}");
        let limit_s = if cfg!(debug_assertions) { 120 } else { 20 };
        assert!(
            begun.elapsed() < Duration::from_secs(limit_s),
            "{:?}",
            begun.elapsed()
        );
        Ended {
            status: output.status.code(),
            said,
            printed: text(&output.stdout),
        }
    }
}

const METRES: &str = "[drawing]\nunit = \"m\"\n[slab]\nthickness_mm = 250\n";

#[test]
fn a_cut_floor_is_marked_as_far_as_it_goes() {
    let whole = file("demo-drawings/small-floor.dxf");
    let entities = whole
        .windows(8)
        .position(|w| w == b"ENTITIES")
        .expect("a section");
    let cut = entities + (whole.len() - entities) / 2;
    let place = folder(&whole[..cut], "");
    let Ended { status, said, .. } = place.run(&["mark", "plan.dxf"]);
    assert_eq!(status, Some(1), "{said}");
    let findings = fs::read_to_string(place.path("plan-findings.csv")).expect("findings");
    assert!(findings.contains("drawing-damaged"), "{findings}");
    let marked = fs::read(place.path("plan-marked.dxf")).expect("marked");
    assert!(marked.len() > cut);
}

#[test]
fn a_cut_head_is_refused_in_one_message() {
    let whole = file("demo-drawings/small-floor.dxf");
    let place = folder(&whole[..whole.len() / 10], "");
    for command in ["mark", "survey"] {
        let Ended {
            status,
            said,
            printed,
        } = place.run(&[command, "plan.dxf"]);
        assert_eq!(status, Some(2), "{said}");
        assert!(
            printed.is_empty() && said.contains("the file ends inside"),
            "{said}"
        );
    }
}

#[test]
fn a_tendon_of_a_hundred_thousand_vertices_is_worked_out() {
    let vertices: Vec<String> = (0..100_000)
        .map(|n| {
            format!(
                "10 {} 20 {} ",
                f64::from(n) * 0.0003,
                f64::from(n % 2) * 1e-5
            )
        })
        .collect();
    let labels: Vec<String> = (0..40)
        .map(|n| {
            format!(
                "0 TEXT 8 TENDON-HEIGHT 10 {} 20 0.2 40 0.15 1 {} ",
                f64::from(n) * 0.75,
                60 + n
            )
        })
        .collect();
    let plan = of_tags(&format!(
        "0 SECTION 2 ENTITIES 0 LWPOLYLINE 8 TENDON-BANDED 90 100000 70 0 {} {} 0 ENDSEC 0 EOF",
        vertices.concat(),
        labels.concat()
    ));
    let Ended { status, said, .. } = folder(&plan, METRES).run(&["mark", "plan.dxf"]);
    assert!(matches!(status, Some(0 | 1)), "{said}");
}

#[test]
fn thousands_of_tendons_and_labels_in_one_place_end_in_time() {
    let tendons = "0 LINE 8 TENDON-BANDED 10 0 20 0 11 20 21 0 ".repeat(1500);
    let labels = "0 TEXT 8 TENDON-HEIGHT 10 5 20 0.1 40 0.15 1 165 ".repeat(1500);
    let plan = of_tags(&format!(
        "0 SECTION 2 ENTITIES {tendons} {labels} 0 ENDSEC 0 EOF"
    ));
    let Ended { status, said, .. } = folder(&plan, METRES).run(&["mark", "plan.dxf"]);
    assert!(matches!(status, Some(0..=2)), "{said}");
}
