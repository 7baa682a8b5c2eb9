//! How the stages grow with the number of tendons: labels to tendons, and the arithmetic.
//!
//! `cargo bench --bench growth` draws floors of 100, 1,000 and 10,000 tendons below `target/` and prints the time of each
//! stage, the best of three, and the growth from one size to the next; it judges nothing.

#![expect(clippy::print_stdout, reason = "a measurement prints what it measured")]

use std::hint::black_box;
use std::path::PathBuf;
use std::process::Command;
use std::time::Instant;

use tautplan::{analysis, drawing, floor, job::Job};

fn main() {
    let mut before: Option<[f64; 3]> = None;
    for tendons in [100, 1_000, 10_000] {
        let bytes = std::fs::read(drawn(tendons)).expect("the floor was drawn");
        let job = Job::default();
        let wanted =
            drawing::Wanted::layers(job.layer_patterns()).expect("default patterns are sound");
        let source = drawing::open(bytes).expect("the floor is a drawing");
        let mut best = [f64::INFINITY; 3];
        let mut labels = 0;
        for _ in 0..3 {
            let (read, reading) = timed(|| drawing::read(&source, &wanted, None).0);
            labels = read.texts.len();
            let (found, settling) = timed(|| floor::read(&read, &job).0);
            let (_, arithmetic) = timed(|| black_box(analysis::work(found, &job, Vec::new())));
            for (best, seconds) in best.iter_mut().zip([reading, settling, arithmetic]) {
                *best = best.min(seconds);
            }
        }
        println!("{tendons} tendons, {labels} texts");
        for (stage, name) in ["reading", "floor (joining, labels)", "arithmetic and rules"]
            .into_iter()
            .enumerate()
        {
            let growth = before.map_or(String::new(), |before| {
                format!("  x {:.1}", best[stage] / before[stage])
            });
            println!("  {name:<24} {:.4} s{growth}", best[stage]);
        }
        before = Some(best);
    }
}

fn timed<T>(work: impl FnOnce() -> T) -> (T, f64) {
    let start = Instant::now();
    let value = work();
    (value, start.elapsed().as_secs_f64())
}

fn drawn(tendons: u32) -> PathBuf {
    let file =
        PathBuf::from(env!("CARGO_MANIFEST_DIR")).join(format!("target/floor-{tendons}.dxf"));
    let status = Command::new(env!("CARGO"))
        .args([
            "run",
            "--release",
            "--quiet",
            "--example",
            "draw-floors",
            "--",
            "tendons",
        ])
        .arg(tendons.to_string())
        .arg(&file)
        .status()
        .expect("cargo runs");
    assert!(status.success(), "the floor could not be drawn");
    file
}
