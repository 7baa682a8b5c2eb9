//! Tendons that the drawing shows by a typical one: copies of it where none is drawn.

use std::collections::BTreeSet;

use geo::Coord;

use super::heights::Height;
use super::index::{Foot, Index};
use super::lines::Line;
use super::plans::{Plan, Plans};
use super::points::points;
use super::rules::{DUPLICATE_LINE, TENDON_MADE};
use super::slab::Thickness;
use super::types::{End, Point, PourJoint, Tendon};
use crate::finding::{Finding, Level, Wording};
use crate::geometry::{Path, Segment};
use crate::job::HeightReading;
use crate::units::SHORT;

/// Points nearer than this are one, metres.
const SAME_STATION_M: f64 = 1e-6;
/// A made tendon this near to another, metres, and within this sine of its direction, lies on it.
const ON_M: f64 = 0.020;
const ALONG: f64 = 0.05;

impl Plans<'_> {
    /// The tendons that are not drawn; `tendons` are those drawn, by line, and `heights` what was settled on each.
    pub(super) fn made(
        &self,
        tendons: &[Tendon],
        heights: &[Vec<Height>],
        thickness: &Thickness<'_>,
        job: &HeightReading,
    ) -> (Vec<Tendon>, Vec<Finding>) {
        let mut made = Vec::new();
        let mut findings = Vec::new();
        for plan in &self.0 {
            let Some((typical, from)) = plan.typical(tendons) else {
                continue;
            };
            let before = made.len();
            let slots = plan.slots.stations_m.iter().zip(&plan.slots.drawn);
            for ((number, (&station_m, foot)), mark) in (1..).zip(slots).zip(&plan.marks) {
                if foot.is_none() {
                    let by = plan.shift(station_m - from.distance_m);
                    let mark = mark
                        .clone()
                        .unwrap_or_else(|| format!("{}.{number}", typical.mark));
                    let heights = heights.get(from.line).map_or(&[][..], Vec::as_slice);
                    let (copy, found) = copy(typical, mark, by, heights, thickness, job);
                    findings.extend(found.into_iter().filter(|f| f.level == Level::Error));
                    made.push(copy);
                }
            }
            findings.extend(plan.said(typical, made.get(before..).unwrap_or_default()));
        }
        findings.extend(on_one_another(&made, tendons));
        (made, findings)
    }
}

impl Plan<'_> {
    /// The drawn tendon of which most heights are known.
    fn typical<'t>(&self, tendons: &'t [Tendon]) -> Option<(&'t Tendon, Foot)> {
        let drawn = self.slots.drawn.iter().flatten();
        let of_group = drawn.filter_map(|foot| Some((tendons.get(foot.line)?, *foot)));
        let known = |tendon: &Tendon| {
            let points = tendon.points.iter();
            points.filter(|point| point.height_m.is_some()).count()
        };
        // Of equals the first along the line.
        of_group
            .rev()
            .max_by(|(a, _), (b, _)| known(a).cmp(&known(b)))
    }

    fn shift(&self, along_m: f64) -> Coord<f64> {
        let (sin, cos) = self.extent.path.heading_at(0.0).sin_cos();
        Coord {
            x: along_m * cos,
            y: along_m * sin,
        }
    }

    fn said(&self, typical: &Tendon, made: &[Tendon]) -> Option<Finding> {
        let (first, last) = (made.first()?, made.last()?);
        let apart_m = match self.slots.stations_m.as_slice() {
            [a, b, ..] => b - a,
            _ => 0.0,
        };
        let which = if made.len() == 1 {
            format!("tendon {} is not drawn and was", first.mark)
        } else {
            format!(
                "{} tendons ({} ... {}) are not drawn and were",
                made.len(),
                first.mark,
                last.mark
            )
        };
        let found = Finding::new(
            &TENDON_MADE,
            Level::Note,
            Wording::of(|units| {
                let apart = units.of(SHORT).said(apart_m * 1000.0, 0);
                format!(
                    "{which} made as copies of {}, {apart} apart along extent line {}",
                    typical.mark, self.extent.handle
                )
            }),
            "check that the group is what the drawing means; draw the tendons if they differ from the typical one",
        );
        Some(
            found
                .on_tendon(&typical.mark)
                .at_place(self.extent.path.place_at(self.extent.path.length_m() / 2.0)),
        )
    }
}

/// A tendon like the typical one, moved: what is drawn on that one is measured again where the copy comes to lie.
fn copy(
    typical: &Tendon,
    mark: String,
    by: Coord<f64>,
    heights: &[Height],
    thickness: &Thickness<'_>,
    job: &HeightReading,
) -> (Tendon, Vec<Finding>) {
    let end = |end: End| End {
        place: end.place + by,
        ..end
    };
    let joints = typical.joints.iter().map(|joint| PourJoint {
        place: joint.place + by,
        ..*joint
    });
    let segments = typical.path.segments().iter();
    let line = Line {
        handle: typical.handle.clone(),
        layer: typical.layer.clone(),
        run: typical.run,
        path: Path::new(segments.map(|&piece| moved(piece, by))),
    };
    let (mut points, findings) = points(&mark, &line, heights, thickness, job);
    // What the typical one lacks its copy lacks too.
    for lacking in typical
        .points
        .iter()
        .filter(|point| point.height_m.is_none())
    {
        let there = points
            .iter_mut()
            .find(|point| (point.station_m - lacking.station_m).abs() < SAME_STATION_M);
        if let Some(there) = there {
            there.height_m = None;
            continue;
        }
        let place = lacking.place + by;
        let faces = thickness.faces_at(place);
        let at = points.partition_point(|point| point.station_m <= lacking.station_m);
        points.insert(
            at.min(points.len().saturating_sub(1)),
            Point {
                place,
                thickness_m: faces.thickness_m,
                top_m: faces.top_m,
                ..*lacking
            },
        );
    }
    let copy = Tendon {
        mark,
        path: line.path,
        ends: typical.ends.map(end),
        joints: joints.collect(),
        points,
        made: true,
        ..typical.clone()
    };
    (copy, findings)
}

/// Made tendons that lie on drawn ones, or on one another.
fn on_one_another(made: &[Tendon], drawn: &[Tendon]) -> Vec<Finding> {
    let all = drawn.iter().chain(made);
    let index = Index::new(all.clone().map(|tendon| &tendon.path));
    let mut findings = Vec::new();
    for (at, tendon) in made.iter().enumerate() {
        let length_m = tendon.path.length_m();
        let own = drawn.len() + at;
        let on: Vec<BTreeSet<usize>> = [0.25, 0.5, 0.75]
            .map(|share| {
                let station_m = share * length_m;
                let heading_rad = tendon.path.heading_at(station_m);
                let feet = index
                    .feet(tendon.path.place_at(station_m), ON_M)
                    .into_iter();
                feet.filter(|foot| foot.line < own)
                    .filter(|foot| (foot.heading_rad - heading_rad).sin().abs() < ALONG)
                    .map(|foot| foot.line)
                    .collect()
            })
            .into();
        // On one of its quarters by chance, on two of them along it.
        let times = |line: &usize| on.iter().filter(|here| here.contains(line)).count();
        let other = on.iter().flatten().find(|line| times(line) > 1);
        let Some(other) = other.and_then(|&line| all.clone().nth(line)) else {
            continue;
        };
        findings.push(
            Finding::new(
                &DUPLICATE_LINE,
                Level::Error,
                format!(
                    "tendon {}, made as a copy of its group's typical one, lies on {}; expected each tendon once",
                    tendon.mark, other.mark
                ),
                "correct the group's extent line or its spacing, or delete the line that is drawn there",
            )
            .on_tendon(&tendon.mark)
            .at_place(tendon.path.place_at(length_m / 2.0)),
        );
    }
    findings
}

fn moved(piece: Segment, by: Coord<f64>) -> Segment {
    match piece {
        Segment::Line { from, to } => Segment::Line {
            from: from + by,
            to: to + by,
        },
        Segment::Arc {
            centre,
            radius_m,
            start_rad,
            sweep_rad,
        } => Segment::Arc {
            centre: centre + by,
            radius_m,
            start_rad,
            sweep_rad,
        },
    }
}
