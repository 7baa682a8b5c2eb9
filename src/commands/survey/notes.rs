//! What a general note says in words, and no label does: the slab's thickness, the size of the strands.

use std::collections::BTreeSet;
use std::sync::LazyLock;

use regex::Regex;
use serde_json::json;

use super::contents::Contents;
use crate::drawing::Drawing;
use crate::job::{Job, Proposal};
use crate::units::LengthUnit;

/// `ALL SLABS ARE 220 mm THICK`, `SLAB THICKNESS = 8"`, `220 THK. SLAB U.N.O.`
static THICK: LazyLock<Option<Regex>> = LazyLock::new(|| {
    let number = r#"(\d+(?:\.\d+)?)\s*(mm|cm|m\b|"|in\b)?"#;
    Regex::new(&format!(
        r"(?i){number}\s*(?:thick\b|thk\b)|\b(?:thickness|thk)\s*(?:is|of|=|:|shall be|to be)*\s*{number}"
    ))
    .ok()
});

/// `ALL STRANDS 12.7 mm DIA.`, `0.5" DIAMETER STRAND`, `STRAND: 15.2 mm`.
static SIZE: LazyLock<Option<Regex>> = LazyLock::new(|| {
    Regex::new(r#"(?i)(?:[Øø⌀∅]\s*)?\b(\d+\.\d+|\d/\d|\.\d+)\s*(mm|"|in\b)?"#).ok()
});

/// `ALL TENDONS 5-12.7 U.N.O.`, `TENDONS ARE 4 x 15.2 mm STRANDS UNLESS NOTED`.
static EACH: LazyLock<Option<Regex>> = LazyLock::new(|| {
    Regex::new(r"(?i)\b(?:TENDONS|C[AÂ]BLES|CABOS|SPANNGLIEDER|KABLAR|KABLER)\b\D*?\b(\d{1,2})\s*(?:[-–x×/S]|NOS?\.?|STRANDS? OF)\s*[Øø∅]?\s*(\d+[.,]\d+|[.,]\d+|\d/\d+)").ok()
});

/// Lines of notes.
fn lines(drawing: &Drawing) -> BTreeSet<&str> {
    let texts = drawing.texts.iter();
    texts.flat_map(|text| sentences(&text.content)).collect()
}

/// Lines of a text that are more than a label.
fn sentences(text: &str) -> impl Iterator<Item = &str> {
    text.lines()
        .map(str::trim)
        .filter(|line| line.split_whitespace().count() >= 3)
}

/// The one thickness that notes give to slabs, where no label of a zone says any.
pub(super) fn thickness(
    drawing: &Drawing,
    contents: &Contents,
    job: &Job,
) -> Option<(String, Proposal)> {
    let labelled = contents
        .layers
        .values()
        .any(|held| held.thicknesses + held.inched_thicknesses > 0);
    if job.slab.thickness_m.is_some() || labelled {
        return None;
    }
    let notes = lines(drawing);
    let of_slab = notes.iter().filter(|note| {
        let note = note.to_uppercase();
        let other = [
            "TOPPING", "WALL", "DROP", "BEAM", "BAND", "BLINDING", "CAPITAL",
        ];
        note.contains("SLAB") && !other.iter().any(|word| note.contains(word))
    });
    let mut said: Vec<(f64, &str)> = Vec::new();
    for note in of_slab {
        let found = THICK.as_ref()?.captures_iter(note);
        said.extend(found.filter_map(|groups| {
            let number = groups
                .get(1)
                .or(groups.get(3))?
                .as_str()
                .parse::<f64>()
                .ok()?;
            let unit = groups
                .get(2)
                .or(groups.get(4))
                .map(|unit| unit.as_str().to_lowercase());
            let unit = match unit.as_deref() {
                Some("m") => LengthUnit::M,
                Some("cm") => LengthUnit::Cm,
                Some("in" | "\"") => LengthUnit::In,
                _ => LengthUnit::Mm,
            };
            let value_mm = (number * unit.metres() * 1e6).round() / 1e3;
            (50.0..=5000.0)
                .contains(&value_mm)
                .then_some((value_mm, *note))
        }));
    }
    let (value_mm, note) = *said.first()?;
    let differs = |(other_mm, _): &(f64, &str)| (other_mm - value_mm).abs() > 0.01;
    if said.iter().any(differs) {
        return None;
    }
    Some(proposal("slab.thickness_mm", json!(value_mm), note))
}

/// The one size that notes give to strands.
pub(super) fn strand(drawing: &Drawing, job: &Job) -> Option<(String, Proposal)> {
    if job.tendon.default_strand.is_some() {
        return None;
    }
    let notes = lines(drawing);
    let mut said: Vec<(&str, &str)> = Vec::new();
    for note in notes
        .iter()
        .filter(|note| note.to_uppercase().contains("STRAND"))
    {
        let found = SIZE.as_ref()?.captures_iter(note);
        said.extend(found.filter_map(|groups| {
            let size = job.tendon.strand_named(groups.get(1)?.as_str())?;
            Some((size.name.as_str(), *note))
        }));
    }
    let (name, note) = *said.first()?;
    if said.iter().any(|(other, _)| *other != name) {
        return None;
    }
    Some(proposal("tendon.default_strand", json!(name), note))
}

/// The one number and size of strands that notes give to all tendons that have none of their own.
pub(super) fn each(drawing: &Drawing, job: &Job) -> Vec<(String, Proposal)> {
    let mut said: BTreeSet<(u32, &str)> = BTreeSet::new();
    let mut by = "";
    let lines = lines(drawing);
    for note in &lines {
        let upper = note.to_uppercase();
        let general = [
            "ALL ", "U.N.O", "UNO", "UNLESS", "TYP", "TOUS ", "ALLE ", "TODOS ",
        ];
        if !general.iter().any(|word| upper.contains(word)) {
            continue;
        }
        let found = EACH.as_ref().and_then(|each| each.captures(note));
        let told = found.and_then(|groups| {
            let size = groups.get(2)?.as_str().replace(',', ".");
            let size = job.tendon.strand_named(&size)?;
            Some((groups.get(1)?.as_str().parse().ok()?, size.name.as_str()))
        });
        if let Some(told) = told {
            said.insert(told);
            by = note;
        }
    }
    let mut said = said.into_iter();
    let (Some((strands, size)), None) = (said.next(), said.next()) else {
        return Vec::new();
    };
    vec![
        proposal("tendon.default_strands", json!(strands), by),
        proposal("tendon.default_strand", json!(size), by),
    ]
}

/// Words of notes that say to what heights are measured, or from which face.
const MEASURED: [&str; 14] = [
    "UNDERSIDE",
    "U/S",
    "BOTTOM OF DUCT",
    "C.G.S",
    "CGS",
    "CENTROID",
    "CENTRE OF",
    "CENTER OF",
    "CHAIR",
    "FROM TOP",
    "FROM SOFFIT",
    "ABOVE SOFFIT",
    "UNTERKANTE",
    "SOUS-FACE",
];

/// Notes that say how heights are measured: for the engineer to hold against the keys.
pub(super) fn measured(drawing: &Drawing) -> Vec<&str> {
    let speaks = |note: &&str| {
        let note = note.to_uppercase();
        MEASURED.iter().any(|word| note.contains(word))
    };
    lines(drawing).into_iter().filter(speaks).collect()
}

/// What notes say heights are measured to, and from which face, where they say one thing.
pub(super) fn measure(drawing: &Drawing) -> Vec<(String, Proposal)> {
    let notes = measured(drawing);
    let says = |words: &[&str]| {
        let has = |note: &&&str| {
            let note = note.to_uppercase();
            words.iter().any(|word| note.contains(word))
        };
        notes.iter().find(has).copied()
    };
    let duct = says(&[
        "UNDERSIDE OF DUCT",
        "UNDERSIDE OF THE DUCT",
        "U/S OF DUCT",
        "U/S DUCT",
        "BOTTOM OF DUCT",
        "DUCT UNDERSIDE",
        "UNDERSIDE OF TENDON",
    ]);
    let chair = says(&["CHAIR HEIGHT", "TOP OF CHAIR"]);
    let strands = says(&[
        "C.G.S",
        "CGS",
        "C.G. OF",
        "CENTROID",
        "CENTRE OF STRAND",
        "CENTER OF STRAND",
    ]);
    let (top, soffit) = (
        says(&[
            "FROM TOP OF",
            "FROM THE TOP OF",
            "BELOW TOP OF",
            "DOWN FROM TOP",
        ]),
        says(&["SOFFIT", "FORM", "UNDERSIDE OF SLAB", "BOTTOM OF SLAB"]),
    );
    let mut found = Vec::new();
    match (duct, chair, strands) {
        (Some(note), None, None) => {
            found.push(proposal("height.datum", json!("duct-underside"), note));
        }
        (None, Some(note), None) => found.push(proposal("height.datum", json!("chair"), note)),
        _ => {}
    }
    if let (Some(note), None) = (top, soffit) {
        found.push(proposal("height.from", json!("top"), note));
    }
    found
}

fn proposal(key: &str, value: serde_json::Value, note: &str) -> (String, Proposal) {
    let why = format!("A note says: {}. Check it.", note.trim_end_matches('.'));
    (key.to_owned(), Proposal { value, why })
}
