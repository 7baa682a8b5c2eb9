//! Draws the demonstration floors, and floors of any size for measuring.
//!
//! `cargo run --example draw-floors -- demos` rewrites `demo-drawings/` and, beside the tests, what was drawn in them;
//! `-- reference PATH` writes a floor of about 400 tendons in 20 MB, `-- r12 PATH` and `-- binary PATH` the same floor
//! as release 12 or in binary form; `-- tendons N PATH` one of N plain tendons.
//! The same call writes the same bytes. Nothing here uses the crate under test or its DXF library.

mod background;
mod bays;
mod dice;
mod dxf;
mod faulty;
mod growth;
mod path;
mod plan;
mod real;
mod reference;
mod slab;
mod small;
mod tendon;
mod truth;

use std::io::{self, Write as _};
use std::path::{Path as FilePath, PathBuf};
use std::process::ExitCode;

/// A floor: what it is, and the drawing with everything on it but the tendons.
struct Floor {
    name: &'static str,
    slab: slab::Slab,
    tendons: Vec<tendon::Tendon>,
    drawing: dxf::Drawing,
}

impl Floor {
    /// Adds the tendons and mixes all entities, since no drawing lists them in order.
    fn finish(mut self) -> Self {
        for tendon in &self.tendons {
            plan::draw_tendon(&mut self.drawing, tendon);
        }
        dice::Dice(self.name.len() as u64).shuffle(&mut self.drawing.model);
        self
    }
}

const USAGE: &str =
    "usage: draw-floors demos | reference PATH | r12 PATH | binary PATH | tendons N PATH";

fn main() -> ExitCode {
    let words = std::env::args().skip(1).collect::<Vec<_>>();
    let words = words.iter().map(String::as_str).collect::<Vec<_>>();
    let done = match words.as_slice() {
        ["demos"] => demos(),
        ["reference", path] => anywhere(path, reference::floor()),
        ["r12", path] => write(FilePath::new(path), dxf::older(&reference())),
        ["binary", path] => write(FilePath::new(path), dxf::binary(&reference())),
        ["tendons", count, path] => match count.parse::<u32>() {
            Ok(count @ 1..=100_000) => anywhere(path, growth::floor(count)),
            _ => Err(io::Error::other(format!(
                "'{count}' is no number of tendons from 1 to 100000; {USAGE}"
            ))),
        },
        _ => Err(io::Error::other(USAGE)),
    };
    match done {
        Ok(()) => ExitCode::SUCCESS,
        Err(problem) => {
            // Nothing is left to do when standard error is gone.
            let _ = writeln!(io::stderr(), "draw-floors: {problem}");
            ExitCode::from(2)
        }
    }
}

/// The reference floor's drawing.
fn reference() -> String {
    reference::floor().finish().drawing.to_dxf()
}

fn demos() -> io::Result<()> {
    let top = PathBuf::from(env!("CARGO_MANIFEST_DIR"));
    let (drawings, truths) = (top.join("demo-drawings"), top.join("tests/data/demos"));
    let (faulty, faults) = faulty::floor();
    for floor in [small::floor(), real::floor(), faulty] {
        let truth = truths.join(format!("{}-truth.json", floor.name));
        save(&drawings.join(format!("{}.dxf", floor.name)), &truth, floor)?;
    }
    write(
        &drawings.join("faulty-floor-faults.csv"),
        faulty::to_csv(&faults),
    )
}

fn anywhere(path: &str, floor: Floor) -> io::Result<()> {
    let path = FilePath::new(path);
    let stem = path.file_stem().unwrap_or_default().to_string_lossy();
    save(
        path,
        &path.with_file_name(format!("{stem}-truth.json")),
        floor,
    )
}

/// The drawing, and what was drawn in it.
fn save(drawing: &FilePath, truth: &FilePath, floor: Floor) -> io::Result<()> {
    let floor = floor.finish();
    let file = drawing.file_name().unwrap_or_default().to_string_lossy();
    write(drawing, floor.drawing.to_dxf())?;
    write(truth, truth::to_json(&file, &floor.slab, &floor.tendons))
}

fn write(path: &FilePath, contents: impl AsRef<[u8]>) -> io::Result<()> {
    if let Some(folder) = path.parent() {
        std::fs::create_dir_all(folder)?;
    }
    std::fs::write(path, contents)
        .map_err(|problem| io::Error::other(format!("{}: {problem}", path.display())))
}
