//! Small plans by hand: one thing at a time, and what is said of it.

use tautplan::finding::Finding;
use tautplan::floor::{EndKind, Floor, Point, PointKind, Tendon, read};
use tautplan::job::Job;

use crate::kit::{Board, at};

pub(crate) const BANDED: &str = "TENDON-BANDED";
pub(crate) const DISTRIBUTED: &str = "TENDON-DISTRIBUTED";
pub(crate) const HEIGHT: &str = "TENDON-HEIGHT";
pub(crate) const MARK: &str = "TENDON-MARK";
pub(crate) const LEVEL_LINE: &str = "TENDON-LEVEL-LINE";

/// Capitals of labels, metres; by default a label reaches three times as far.
const CAPITALS_M: f64 = 0.1;

impl Board {
    /// A slab of 250 mm, 40 m by 20 m, with nothing on it.
    pub(crate) fn slab() -> Self {
        let mut board = Self::new();
        board.rectangle("SLAB-EDGE", (0.0, 0.0), (40.0, 20.0));
        board.write("SLAB-ZONE", "T250", (39.0, 19.0));
        board
    }

    /// A level text by its middle.
    pub(crate) fn write(&mut self, layer: &str, content: &str, (x, y): (f64, f64)) {
        self.text(layer, content, at(x, y), CAPITALS_M, 0.0, true);
    }

    /// A height beside a level tendon, 0.12 m above it.
    pub(crate) fn height(&mut self, content: &str, (x, y): (f64, f64)) {
        self.write(HEIGHT, content, (x, y + 0.12));
    }

    pub(crate) fn live(&mut self, (x, y): (f64, f64)) {
        self.insert("TENDON-END", "LIVE-END", at(x, y));
    }

    pub(crate) fn dead(&mut self, (x, y): (f64, f64)) {
        self.insert("TENDON-END", "DEAD-END", at(x, y));
    }

    /// A level tendon with its ends, mark and strands, and no heights.
    pub(crate) fn bare_tendon(&mut self, layer: &str, mark: &str, x: [f64; 2], y: f64) {
        self.line(layer, &[(x[0], y), (x[1], y)]);
        self.live((x[0], y));
        self.dead((x[1], y));
        self.write(MARK, &format!("{mark} 5-12.7"), (x[0] + 1.5, y + 0.12));
    }

    pub(crate) fn read(&self) -> (Floor, Vec<Finding>) {
        read(&self.drawing, &Job::default())
    }
}

/// The tendon of this mark.
#[track_caller]
pub(crate) fn tendon<'a>(floor: &'a Floor, mark: &str) -> &'a Tendon {
    let marks: Vec<&str> = floor.tendons.iter().map(|t| t.mark.as_str()).collect();
    let found = floor.tendons.iter().find(|tendon| tendon.mark == mark);
    found.unwrap_or_else(|| panic!("no {mark} among {marks:?}"))
}

/// Where a floor's tendons begin and end, in millimetres, in the floor's order.
pub(crate) fn spans_mm(floor: &Floor) -> Vec<[i64; 4]> {
    let path = |tendon: &Tendon| {
        let (start, end) = (tendon.path.start(), tendon.path.end());
        [start, end].map(Option::unwrap_or_default)
    };
    let ends = floor.tendons.iter().map(path);
    ends.map(|[start, end]| [mm(start.x), mm(start.y), mm(end.x), mm(end.y)])
        .collect()
}

/// Kind, station and height of each point, in millimetres.
pub(crate) fn points_mm(tendon: &Tendon) -> Vec<(PointKind, i64, Option<i64>)> {
    let say = |point: &Point| (point.kind, mm(point.station_m), point.height_m.map(mm));
    tendon.points.iter().map(say).collect()
}

pub(crate) fn kinds(tendon: &Tendon) -> [Option<EndKind>; 2] {
    tendon.ends.map(|end| end.kind)
}

/// What is said under one rule.
pub(crate) fn told<'a>(findings: &'a [Finding], rule: &str) -> Vec<&'a Finding> {
    findings.iter().filter(|f| f.rule.name == rule).collect()
}

/// The only thing said under a rule.
#[track_caller]
pub(crate) fn only<'a>(findings: &'a [Finding], rule: &str) -> &'a Finding {
    match told(findings, rule).as_slice() {
        [one] => one,
        found => panic!("{} under {rule} in {findings:#?}", found.len()),
    }
}

/// The rules that spoke, each once, by name.
pub(crate) fn rules(findings: &[Finding]) -> Vec<&'static str> {
    let mut names: Vec<&str> = findings.iter().map(|f| f.rule.name).collect();
    names.sort_unstable();
    names.dedup();
    names
}

pub(crate) fn mm(metres: f64) -> i64 {
    #[expect(
        clippy::cast_possible_truncation,
        reason = "plans of a few hundred metres"
    )]
    let rounded = (metres * 1000.0).round() as i64;
    rounded
}
