//! The reference floor end to end against the `dxf` crate's load alone of the same file, in pairs: ASCII, release 12 and
//! binary.
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
        _ => ["reference", "r12", "binary"]
            .into_iter()
            .for_each(|form| compare(&reference_floor(form))),
    }
}

/// One measured run: seconds by the clock and of all its processors, and peak memory in bytes.
#[derive(Clone, Copy)]
struct Run {
    seconds: f64,
    busy_seconds: f64,
    peak_bytes: f64,
}

fn compare(file: &Path) {
    let size = std::fs::metadata(file).expect("the drawing is there").len() as f64;
    println!("{}: {:.1} MB", file.display(), size / 1e6);
    let (mut ratios, mut busy_ratios) = (Vec::new(), Vec::new());
    let (mut loads, mut jobs) = (Vec::new(), Vec::new());
    for _ in 0..PAIRS {
        let load = child("--crate-load", file);
        let job = child("--whole-job", file);
        ratios.push(job.seconds / load.seconds);
        busy_ratios.push(job.busy_seconds / load.busy_seconds);
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
        "whole job / load     {:.2}, of processor time {:.2} (medians of {PAIRS} pairs)",
        middle(ratios),
        middle(busy_ratios)
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
        busy_seconds: numbers[1],
        peak_bytes: numbers[2],
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

/// Says the time, and this process's time on processors and peak memory where the system tells them.
fn report(seconds: f64) {
    let about = |file: &str| std::fs::read_to_string(file).unwrap_or_default();
    let kilobytes: f64 = about("/proc/self/status")
        .lines()
        .find_map(|line| line.strip_prefix("VmHWM:"))
        .and_then(|rest| rest.split_whitespace().next()?.parse().ok())
        .unwrap_or(f64::NAN);
    // Behind the name in brackets: user and system time are the 12th and 13th, in hundredths of a second.
    let busy_hundredths: f64 = about("/proc/self/stat")
        .rsplit(')')
        .next()
        .unwrap_or_default()
        .split_whitespace()
        .skip(11)
        .take(2)
        .filter_map(|word| word.parse::<f64>().ok())
        .sum();
    eprintln!(
        "measured {seconds} {} {}",
        busy_hundredths / 100.0,
        kilobytes * 1024.0
    );
}

/// The floor in this form.
fn reference_floor(form: &str) -> PathBuf {
    let file = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join(format!("target/{form}.dxf"));
    let status = Command::new(env!("CARGO"))
        .args([
            "run",
            "--release",
            "--quiet",
            "--example",
            "draw-floors",
            "--",
            form,
        ])
        .arg(&file)
        .status()
        .expect("cargo runs");
    assert!(status.success(), "the reference floor could not be drawn");
    file
}
