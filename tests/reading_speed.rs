//! How long reading takes beside the DXF library's own load of the same file. Prints ratios, judges nothing:
//! `cargo test --release --test reading_speed -- --ignored --nocapture`.

use std::fmt::Write as _;
use std::time::{Duration, Instant};

use tautplan::drawing::{Wanted, open, read};

/// A floor plan that is mostly background: about 20 MB, a ninth of its entities on layers that are read.
fn floor() -> Vec<u8> {
    let mut out = String::with_capacity(22 << 20);
    out.push_str("  0\nSECTION\n  2\nHEADER\n  9\n$ACADVER\n  1\nAC1024\n  9\n$INSUNITS\n 70\n     4\n  0\nENDSEC\n");
    out.push_str("  0\nSECTION\n  2\nTABLES\n  0\nTABLE\n  2\nLAYER\n  5\n2\n100\nAcDbSymbolTable\n 70\n   124\n");
    let layer = |out: &mut String, name: &str| {
        let _ = write!(
            out,
            "  0\nLAYER\n  5\n{:X}\n330\n2\n100\nAcDbSymbolTableRecord\n100\nAcDbLayerTableRecord\n  2\n{name}\n 70\n     0\n 62\n     7\n  6\nContinuous\n370\n    -3\n390\nF\n",
            0x100 + name.len()
        );
    };
    for number in 0..120 {
        layer(&mut out, &format!("A-WALL-{number:03}"));
    }
    for name in ["TENDON-BANDED", "TENDON-DISTRIBUTED", "TENDON-HEIGHT"] {
        layer(&mut out, name);
    }
    out.push_str("  0\nENDTAB\n  0\nENDSEC\n  0\nSECTION\n  2\nENTITIES\n");
    let mut handle = 0x1000;
    let mut head = |out: &mut String, kind: &str, layer: &str, sub: &str| {
        handle += 1;
        let _ = write!(
            out,
            "  0\n{kind}\n  5\n{handle:X}\n330\n1F\n100\nAcDbEntity\n  8\n{layer}\n 62\n     1\n100\n{sub}\n"
        );
    };
    for n in 0_u32..21_000 {
        let x = f64::from(n % 977) * 37.123_456_789;
        let y = f64::from(n % 613) * 41.987_654_321;
        let wall = format!("A-WALL-{:03}", n % 120);
        head(&mut out, "LINE", &wall, "AcDbLine");
        let _ = write!(
            out,
            " 10\n{x:.9}\n 20\n{y:.9}\n 30\n0.0\n 11\n{:.9}\n 21\n{y:.9}\n 31\n0.0\n",
            x + 500.0
        );
        if n % 4 != 0 {
            head(&mut out, "LWPOLYLINE", &wall, "AcDbPolyline");
            out.push_str(" 90\n        6\n 70\n     1\n 43\n0.0\n");
            for k in 0..6 {
                let _ = write!(
                    out,
                    " 10\n{:.9}\n 20\n{:.9}\n",
                    x + f64::from(k) * 111.1,
                    y + f64::from(k * k) * 7.3
                );
            }
        }
        if n % 4 == 1 {
            head(&mut out, "HATCH", &wall, "AcDbHatch");
            for k in 0..20 {
                let _ = write!(
                    out,
                    " 10\n{:.9}\n 20\n{:.9}\n 72\n     1\n",
                    x + f64::from(k),
                    y - f64::from(k)
                );
            }
        }
        if n % 2 == 0 {
            head(&mut out, "TEXT", &wall, "AcDbText");
            let _ = write!(
                out,
                " 10\n{x:.9}\n 20\n{y:.9}\n 30\n0.0\n 40\n250.0\n  1\nroom {n}\n100\nAcDbText\n"
            );
        }
        if n % 3 == 0 {
            head(&mut out, "TEXT", "TENDON-HEIGHT", "AcDbText");
            let _ = write!(
                out,
                " 10\n{x:.9}\n 20\n{y:.9}\n 30\n0.0\n 40\n150.0\n  1\nH{}\n100\nAcDbText\n",
                n % 200
            );
        }
        if n % 30 == 0 {
            head(&mut out, "LWPOLYLINE", "TENDON-DISTRIBUTED", "AcDbPolyline");
            out.push_str(" 90\n       33\n 70\n     0\n 43\n0.0\n");
            for k in 0..33 {
                let _ = write!(
                    out,
                    " 10\n{:.9}\n 20\n{:.9}\n 42\n0.01\n",
                    x + f64::from(k) * 900.0,
                    y
                );
            }
        }
    }
    out.push_str("  0\nENDSEC\n  0\nEOF\n");
    out.into_bytes()
}

fn timed<T>(work: impl FnOnce() -> T) -> (Duration, T) {
    let start = Instant::now();
    let value = work();
    (start.elapsed(), value)
}

#[expect(
    clippy::print_stdout,
    clippy::cast_precision_loss,
    reason = "a measurement that is printed"
)]
#[test]
#[ignore = "a measurement, for release builds"]
fn reading_beside_the_library_alone() {
    let bytes = floor();
    let wanted = Wanted::layers(["TENDON-*"]).expect("pattern");
    let mut ratios = Vec::new();
    for _ in 0..7 {
        let copy = bytes.clone();
        let (scan_time, source) = timed(|| open(copy).expect("a drawing"));
        let (read_time, (drawing, _)) = timed(|| read(&source, &wanted, None));
        let (library_time, library) = timed(|| {
            dxf::Drawing::load(&mut bytes.as_slice())
                .expect("a drawing")
                .entities()
                .count()
        });
        assert_eq!(drawing.shapes.len() + drawing.texts.len(), 7_700);
        assert!(library > 50_000);
        ratios.push((scan_time + read_time).as_secs_f64() / library_time.as_secs_f64());
        println!(
            "{:.1} MB: open {:.1} ms, read {:.1} ms, library {:.1} ms, ratio {:.3}",
            bytes.len() as f64 / 1e6,
            scan_time.as_secs_f64() * 1e3,
            read_time.as_secs_f64() * 1e3,
            library_time.as_secs_f64() * 1e3,
            ratios.last().copied().unwrap_or_default()
        );
    }
    ratios.sort_by(f64::total_cmp);
    println!("median ratio {:.3}", ratios[ratios.len() / 2]);
}
