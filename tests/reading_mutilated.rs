//! Drawings with bytes changed, cut and repeated: reading refuses or reports, and never panics.

use std::path::Path;

use tautplan::drawing::{Wanted, open, read};

/// A small linear congruential generator (Knuth's MMIX constants): the same mutilations at every run.
struct Dice(u64);

impl Dice {
    fn roll(&mut self, below: usize) -> usize {
        self.0 = self
            .0
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1_442_695_040_888_963_407);
        usize::try_from(self.0 >> 33).unwrap_or(0) % below.max(1)
    }
}

const WORDS: [&str; 24] = [
    "0", "5", "8", "10", "11", "42", "66", "67", "70", "100", "101", "102", "999", "1001", "-1",
    "1e300", "nan", "{", "POLYLINE", "INSERT", "SEQEND", "ENDSEC", "ENDBLK", "1e-300",
];

fn mutilate(bytes: &mut Vec<u8>, dice: &mut Dice) {
    for _ in 0..=dice.roll(4) {
        let at = dice.roll(bytes.len());
        match dice.roll(6) {
            0 => bytes.truncate(at),
            1 => {
                if let Some(byte) = bytes.get_mut(at) {
                    *byte = u8::try_from(dice.roll(256)).unwrap_or(0);
                }
            }
            2 => {
                let end = (at + dice.roll(200)).min(bytes.len());
                bytes.drain(at..end);
            }
            3 => {
                let end = (at + dice.roll(400)).min(bytes.len());
                let part: Vec<u8> = bytes.get(at..end).unwrap_or_default().to_vec();
                let to = dice.roll(bytes.len());
                bytes.splice(to..to, part);
            }
            _ => {
                // A whole line replaced, so that the tags stay in step.
                let next = |from: usize| {
                    let rest = bytes.get(from..).unwrap_or_default();
                    rest.iter().position(|b| *b == b'\n').map(|n| from + n + 1)
                };
                if let Some(start) = next(at)
                    && let Some(end) = next(start)
                {
                    let word = format!("{}\n", WORDS[dice.roll(WORDS.len())]);
                    bytes.splice(start..end, word.into_bytes());
                }
            }
        }
    }
}

#[test]
fn mutilated_drawings_are_read_or_refused() {
    let data = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/data");
    let rounds = std::env::var("MUTILATIONS")
        .ok()
        .and_then(|n| n.parse().ok())
        .unwrap_or(6);
    let mut files = Vec::new();
    for folder in ["versions", "dxf-triggers"] {
        for entry in std::fs::read_dir(data.join(folder)).expect("test data") {
            let path = entry.expect("a file").path();
            if path.extension().is_some_and(|extension| extension == "dxf") {
                files.push(path);
            }
        }
    }
    files.sort();
    let mut dice = Dice(7);
    let (mut read_well, mut refused) = (0, 0);
    for path in files {
        let whole = std::fs::read(&path).expect("a file");
        for _ in 0..rounds {
            let mut bytes = whole.clone();
            mutilate(&mut bytes, &mut dice);
            match open(bytes) {
                Ok(source) => {
                    let (drawing, findings) = read(&source, &Wanted::everything(), None);
                    assert!(drawing.shapes.iter().all(|s| s.path.length_m().is_finite()));
                    assert!(findings.iter().all(|f| !f.text.is_empty()));
                    read_well += 1;
                }
                Err(refusal) => {
                    assert!(!refusal.to_string().is_empty());
                    refused += 1;
                }
            }
        }
    }
    assert!(
        read_well > 30 && refused > 30,
        "{read_well} read, {refused} refused"
    );
}
