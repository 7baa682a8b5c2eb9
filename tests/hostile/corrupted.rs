//! Demo drawings corrupted by chance, from a fixed seed, for no longer than a minute: read and marked if they can be,
//! refused in words if not.

use std::time::{Duration, Instant};

use tautplan::drawing::{Wanted, open, read};

use crate::drawings::{Dice, file, marks_without_loss};

const DEMOS: [&str; 6] = [
    "demo-drawings/small-floor.dxf",
    "demo-drawings/faulty-floor.dxf",
    "demo-drawings/harbour-level-2.dxf",
    "tests/data/versions/plan-R2018-binary.dxf",
    "tests/data/versions/plan-R12-binary.dxf",
    "tests/data/versions/plan-R2007-ascii.dxf",
];

const WORDS: [&[u8]; 16] = [
    b"0\n",
    b"\n",
    b"  0\nENDSEC\n",
    b"  0\nEOF\n",
    b"  0\nSECTION\n",
    b"  0\nPOLYLINE\n",
    b"nan\n",
    b"1e308\n",
    b"102\n{\n",
    b"101\nEmbedded Object\n",
    b"  8\nTAUT-TABLE\n",
    b"\0",
    b"\0\0LINE\0",
    b"\xFF\xFF",
    b"999\nx\n",
    b"66\n1\n",
];

fn corrupt(bytes: &mut Vec<u8>, dice: &mut Dice) {
    for _ in 0..=dice.roll(3) {
        let at = dice.roll(bytes.len());
        let end = (at + dice.roll(300)).min(bytes.len());
        match dice.roll(7) {
            0 => bytes.truncate(at),
            1 => drop(bytes.drain(at..end)),
            2 => {
                let part = bytes.get(at..end).unwrap_or_default().to_vec();
                let to = dice.roll(bytes.len());
                drop(bytes.splice(to..to, part));
            }
            3 | 4 => {
                let word = WORDS[dice.roll(WORDS.len())];
                drop(bytes.splice(at..at, word.iter().copied()));
            }
            _ => {
                if let Some(byte) = bytes.get_mut(at) {
                    *byte ^= 1 << dice.roll(8);
                }
            }
        }
    }
}

#[test]
fn corrupted_demos_are_read_and_marked_without_loss_or_refused() {
    // As many rounds as a minute holds, but the same ones in the same order.
    let longest = Duration::from_secs(50);
    let rounds = std::env::var("CORRUPTIONS")
        .ok()
        .and_then(|n| n.parse().ok())
        .unwrap_or(240);
    let demos: Vec<Vec<u8>> = DEMOS.iter().map(|name| file(name)).collect();
    let mut dice = Dice(20_241);
    let begun = Instant::now();
    let (mut marked, mut refused) = (0, 0);
    for round in 0..rounds {
        if begun.elapsed() > longest {
            break;
        }
        let mut bytes = demos[round % demos.len()].clone();
        corrupt(&mut bytes, &mut dice);
        match open(bytes) {
            Ok(source) => {
                let (drawing, findings) = read(&source, &Wanted::everything(), None);
                assert!(drawing.shapes.iter().all(|s| s.path.length_m().is_finite()));
                assert!(findings.iter().all(|f| !f.text.is_empty()));
                marks_without_loss(&source, drawing.unit_m);
                marked += 1;
            }
            Err(refusal) => {
                assert!(!refusal.to_string().is_empty());
                refused += 1;
            }
        }
    }
    assert!(
        marked > 20 && refused > 0,
        "{marked} marked, {refused} refused"
    );
}
