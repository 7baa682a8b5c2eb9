//! The reference floor end to end against the `dxf` crate's load alone of the same file, in pairs.
//!
//! `cargo bench --bench reference` draws the floor below `target/`, then runs both in turn, each in a process of its
//! own, and prints times, peak memory and ratios; it judges nothing. `cargo bench --bench reference -- FILE` takes
//! another drawing.

#![expect(
    clippy::print_stdout,
    clippy::print_stderr,
    clippy::cast_precision_loss,
    reason = "a measurement prints what it measured; sizes are far below 2^52"
)]

use std::path::{Path, PathBuf};
use std::process::Command;
use std::time::Instant;

const PAIRS: usize = 7;

fn main() {
    let arguments: Vec<String> = std::env::args()
        .skip(1)
        .filter(|a| a != "--bench")
        .collect();
    match arguments.as_slice() {
        [mode, file] if mode == "--crate-load" => crate_load(file),
        [mode, file] if mode == "--whole-job" => whole_job(file),
        [file] => compare(Path::new(file)),
        _ => compare(&reference_floor()),
    }
}

/// One measured run: seconds and peak memory in bytes.
#[derive(Clone, Copy)]
struct Run {
    seconds: f64,
    peak_bytes: f64,
}

fn compare(file: &Path) {
    let size = std::fs::metadata(file).expect("the drawing is there").len() as f64;
    println!("{}: {:.1} MB", file.display(), size / 1e6);
    let mut ratios = Vec::new();
    let (mut loads, mut jobs) = (Vec::new(), Vec::new());
    for _ in 0..PAIRS {
        let load = child("--crate-load", file);
        let job = child("--whole-job", file);
        ratios.push(job.seconds / load.seconds);
        loads.push(load);
        jobs.push(job);
    }
    let seconds = |runs: &[Run]| middle(runs.iter().map(|run| run.seconds).collect());
    let memory = |runs: &[Run]| middle(runs.iter().map(|run| run.peak_bytes).collect()) / size;
    println!(
        "crate's load alone   {:.3} s   peak {:.1} x file",
        seconds(&loads),
        memory(&loads)
    );
    println!(
        "whole job            {:.3} s   peak {:.1} x file",
        seconds(&jobs),
        memory(&jobs)
    );
    println!(
        "whole job / load     {:.2} (median of {PAIRS} pairs)",
        middle(ratios)
    );
}

fn middle(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    values[values.len() / 2]
}

fn child(mode: &str, file: &Path) -> Run {
    let own = std::env::current_exe().expect("own path");
    let output = Command::new(own)
        .arg(mode)
        .arg(file)
        .output()
        .expect("child runs");
    let text = String::from_utf8_lossy(&output.stderr);
    let numbers: Vec<f64> = text
        .lines()
        .rev()
        .find_map(|line| line.strip_prefix("measured "))
        .unwrap_or_else(|| panic!("{mode} measured nothing: {text}"))
        .split_whitespace()
        .filter_map(|word| word.parse().ok())
        .collect();
    Run {
        seconds: numbers[0],
        peak_bytes: numbers[1],
    }
}

fn crate_load(file: &str) {
    let start = Instant::now();
    let drawing = dxf::Drawing::load_file(file).expect("the crate loads the drawing");
    let seconds = start.elapsed().as_secs_f64();
    assert!(drawing.entities().count() > 0);
    report(seconds);
}

fn whole_job(file: &str) {
    let out = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("target/reference-out");
    let start = Instant::now();
    tautplan::cli::run(["tautplan", "mark", file, "--out", &out.to_string_lossy()].map(Into::into));
    report(start.elapsed().as_secs_f64());
}

/// Says the time and this process's peak memory, where the system tells it.
fn report(seconds: f64) {
    let status = std::fs::read_to_string("/proc/self/status").unwrap_or_default();
    let kilobytes: f64 = status
        .lines()
        .find_map(|line| line.strip_prefix("VmHWM:"))
        .and_then(|rest| rest.split_whitespace().next()?.parse().ok())
        .unwrap_or(f64::NAN);
    eprintln!("measured {seconds} {}", kilobytes * 1024.0);
}

fn reference_floor() -> PathBuf {
    let file = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("target/reference.dxf");
    let status = Command::new(env!("CARGO"))
        .args([
            "run",
            "--release",
            "--quiet",
            "--example",
            "draw-floors",
            "--",
            "reference",
        ])
        .arg(&file)
        .status()
        .expect("cargo runs");
    assert!(status.success(), "the reference floor could not be drawn");
    file
}
