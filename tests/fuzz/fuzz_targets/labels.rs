//! A job's patterns on arbitrary texts: the first lines are patterns, what follows stands on the plan as labels.
#![no_main]

use libfuzzer_sys::fuzz_target;
use tautplan::drawing::{Wanted, open, read};
use tautplan::{floor, job};

/// A drawing in metres with one tendon, open for labels.
const HEAD: &str = "0\nSECTION\n2\nHEADER\n9\n$ACADVER\n1\nAC1027\n9\n$INSUNITS\n70\n6\n0\nENDSEC\n0\nSECTION\n2\nENTITIES\n0\nLINE\n8\nTENDON-BANDED\n10\n0\n20\n0\n11\n20\n21\n0\n";

fuzz_target!(|input: &str| {
    let mut parts = input.splitn(4, '\u{1F}');
    let mut next = || parts.next().unwrap_or_default();
    let (mark, height, unit) = (next(), next(), next());
    let unit = ["mm", "cm", "m", "in", "ft"][unit.len() % 5];
    let mut text = format!("[height]\nunit = \"{unit}\"\n");
    if !height.is_empty() {
        text += &format!("patterns = [{}]\n", quoted(height));
    }
    if !mark.is_empty() {
        text += &format!("[labels]\nmark_patterns = [{}]\n", quoted(mark));
    }
    let resolved = match job::read("fuzz.toml", &text) {
        Ok(resolved) => resolved,
        Err(problems) => return assert!(!problems.render(false).is_empty()),
    };
    let labels = next().split('\u{1E}').take(40).enumerate();
    let labels: Vec<String> = labels.map(|(n, content)| label(n, content)).collect();
    let plan = format!("{HEAD}{}0\nENDSEC\n0\nEOF\n", labels.concat());
    let source = open(plan.into_bytes()).expect("a drawing");
    let (drawing, _) = read(&source, &Wanted::everything(), None);
    let (floor, findings) = floor::read(&drawing, &resolved.job);
    assert_eq!(floor.tendons.len(), 1);
    for point in &floor.tendons[0].points {
        assert!(point.height_m.is_none_or(f64::is_finite));
    }
    assert!(findings.iter().all(|f| !f.text.is_empty()));
});

/// As a TOML string, whatever is in it.
fn quoted(text: &str) -> String {
    let mut out = String::from("\"");
    for letter in text.chars() {
        out += &format!("\\U{:08X}", u32::from(letter));
    }
    out + "\""
}

fn label(number: usize, content: &str) -> String {
    let layer = ["TENDON-HEIGHT", "TENDON-MARK", "SLAB-ZONE"][number % 3];
    let content: String = content
        .chars()
        .filter(|c| !matches!(c, '\r' | '\n'))
        .collect();
    let x = 0.5 * number as f64;
    format!("0\nMTEXT\n8\n{layer}\n10\n{x}\n20\n0.3\n40\n0.2\n1\n{content}\n")
}
