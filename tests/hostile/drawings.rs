//! Drawings to do harm to, and what must hold of anything that is read.

use std::path::{Path, PathBuf};

use tautplan::drawing::{
    Align, Drawing, Drawn, Ink, Mark, Sheet, SheetLayer, Source, Wanted, insert, open, read,
};
use tautplan::finding::Finding;
use tautplan::geometry::Coord;

pub(crate) fn root() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).to_owned()
}

pub(crate) fn file(name: &str) -> Vec<u8> {
    std::fs::read(root().join(name)).unwrap_or_else(|error| panic!("{name}: {error}"))
}

/// A drawing from its sections' tags: codes and values in turn, blanks between.
pub(crate) fn of_tags(tags: &str) -> Vec<u8> {
    let mut text = String::with_capacity(tags.len());
    for word in tags.split_whitespace() {
        text.push_str(word);
        text.push('\n');
    }
    text.into_bytes()
}

/// A drawing from the tags of its blocks and entities.
pub(crate) fn with_blocks(blocks: &str, entities: &str) -> Vec<u8> {
    of_tags(&format!(
        "0 SECTION 2 BLOCKS {blocks} 0 ENDSEC 0 SECTION 2 ENTITIES {entities} 0 ENDSEC 0 EOF"
    ))
}

pub(crate) fn everything(bytes: Vec<u8>) -> (Source, Drawing, Vec<Finding>) {
    let source = open(bytes).unwrap_or_else(|refusal| panic!("{refusal}"));
    let (drawing, findings) = read(&source, &Wanted::everything(), None);
    (source, drawing, findings)
}

pub(crate) fn rules(findings: &[Finding]) -> Vec<&'static str> {
    let rules = findings.iter().map(|finding| finding.rule.name);
    rules.filter(|rule| *rule != "unit-assumed").collect()
}

/// Marks the drawing twice: every line of it stands in the marked one in its order, and marking again changes nothing.
pub(crate) fn marks_without_loss(source: &Source, unit_m: f64) {
    let marked = insert(source, unit_m, &sheet()).expect("marked");
    assert!(
        keeps(source.bytes(), &marked),
        "{} bytes of a drawing are not all in the marked one",
        source.bytes().len()
    );
    let again = open(marked.clone()).expect("the marked drawing opens");
    let twice = insert(&again, unit_m, &sheet()).expect("marked again");
    assert!(twice == marked, "marking twice gives other bytes");
}

/// Whether each line of a text file, or each byte of a binary one, stands in the other in order; the value of
/// `$HANDSEED` alone may differ, and marks of an earlier run may go.
fn keeps(original: &[u8], marked: &[u8]) -> bool {
    if original.starts_with(b"AutoCAD Binary DXF") {
        let marked = without_seed(marked);
        let mut rest = marked.iter();
        return without_seed(original)
            .iter()
            .all(|byte| rest.any(|other| other == byte));
    }
    let mut rest = marked.split_inclusive(|b| *b == b'\n');
    let mut seed_in = 0_u8;
    for line in original.split_inclusive(|b| *b == b'\n') {
        seed_in = match (seed_in, line.trim_ascii()) {
            (_, b"$HANDSEED") => 2,
            (2, b"5") => 1,
            (1, _) => {
                // The value itself.
                rest.next();
                seed_in = 0;
                continue;
            }
            _ => 0,
        };
        if !rest.any(|other| other == line) {
            return false;
        }
    }
    true
}

/// A binary drawing without the value of its `$HANDSEED`.
fn without_seed(bytes: &[u8]) -> Vec<u8> {
    const NAME: &[u8] = b"$HANDSEED\0";
    let name = bytes.windows(NAME.len()).position(|window| window == NAME);
    let Some(code) = name.map(|at| at + NAME.len()) else {
        return bytes.to_vec();
    };
    let is_digit = |byte: &u8| byte.is_ascii_hexdigit();
    let from = code + bytes[code..].iter().position(is_digit).unwrap_or(0);
    let length = bytes[from..].iter().take_while(|byte| is_digit(byte));
    let to = from + length.count();
    [&bytes[..from], &bytes[to..]].concat()
}

#[test]
fn the_comparison_of_binary_drawings_sees_a_loss_anywhere() {
    let whole = file("tests/data/versions/plan-R2018-binary.dxf");
    let source = open(whole.clone()).expect("read");
    let marked = insert(&source, 0.001, &sheet()).expect("marked");
    assert!(keeps(&whole, &marked));
    let seed = whole.windows(9).position(|window| window == b"$HANDSEED");
    for at in [100, seed.expect("a seed") + 40, whole.len() - 20] {
        // A run that stands in no mark.
        let harmed = [&marked[..at], &marked[(at + 60).min(marked.len())..]].concat();
        assert!(!keeps(&whole, &harmed), "{at}");
    }
}

pub(crate) fn sheet() -> Sheet {
    let ink = Ink {
        index: 1,
        rgb: Some([255, 0, 0]),
    };
    let at = |x, y| Coord { x, y };
    let mark = |drawn| Mark {
        layer: "TAUT-TABLE".to_owned(),
        ink: None,
        drawn,
    };
    Sheet {
        layers: vec![SheetLayer {
            name: "TAUT-TABLE".to_owned(),
            ink,
            on: true,
        }],
        marks: vec![
            mark(Drawn::Text {
                place: at(1.0, 2.0),
                height_m: 0.1,
                rotation_rad: 0.0,
                align: Align::Middle,
                content: "688 kN".to_owned(),
            }),
            mark(Drawn::Line {
                points: vec![at(0.0, 0.0), at(1.0, 0.0), at(1.0, 1.0)],
                width_m: 0.02,
                closed: false,
            }),
        ],
    }
}

/// A small linear congruential generator (Knuth's MMIX constants): the same harm at every run.
pub(crate) struct Dice(pub(crate) u64);

impl Dice {
    pub(crate) fn roll(&mut self, below: usize) -> usize {
        self.0 = self
            .0
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1_442_695_040_888_963_407);
        usize::try_from(self.0 >> 33).unwrap_or(0) % below.max(1)
    }
}
