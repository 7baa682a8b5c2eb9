//! Tendons that the drawing shows by a typical one: marks for the group, and copies where none is drawn.

use geo::Coord;

use super::groups::{Extent, Groups};
use super::index::Foot;
use super::lines::Line;
use super::readings::MarkText;
use super::rules::{GROUP_MISFIT, TENDON_MADE};
use super::slab::Thickness;
use super::slots::{Slots, slot_marks, slots};
use super::types::{End, Point, PointKind, PourJoint, Tendon};
use crate::finding::{Finding, Level, Wording};
use crate::geometry::{Path, Segment};
use crate::units::SHORT;

/// A group that can be made.
struct Plan<'a> {
    extent: &'a Extent,
    slots: Slots,
    /// Mark of each slot, where the group's text gives marks.
    marks: Vec<Option<String>>,
}

/// Groups whose extent lines fit what their texts say.
pub(super) struct Plans<'a>(Vec<Plan<'a>>);

/// Lays the groups out; what does not fit is a finding, and nothing is made of it.
pub(super) fn plans<'a>(
    groups: &'a Groups,
    said: &[MarkText],
    lines: &[Line],
) -> (Plans<'a>, Vec<Finding>) {
    let mut plans = Vec::new();
    let mut findings = Vec::new();
    for extent in &groups.extents {
        match slots(extent) {
            Ok(slots) => {
                let marks = slot_marks(extent, &slots, said, lines);
                plans.push(Plan {
                    extent,
                    slots,
                    marks,
                });
            }
            Err(why) => findings.push(
                Finding::new(
                    &GROUP_MISFIT,
                    Level::Error,
                    Wording::of(|units| {
                        format!(
                            "extent line {} {}: the group's undrawn tendons are missing from everything worked out here",
                            extent.handle,
                            why.in_units(units)
                        )
                    }),
                    "correct the extent line or its text, or draw the group's tendons",
                )
                .at_place(extent.path.place_at(extent.path.length_m() / 2.0)),
            ),
        }
    }
    (Plans(plans), findings)
}

impl Plans<'_> {
    /// Gives the group's drawn tendons the marks and strands that they lack; returns the marks of those to be made, so
    /// that nobody else is called by them.
    pub(super) fn claim(&self, said: &mut [MarkText]) -> Vec<MarkText> {
        let mut reserved = Vec::new();
        for plan in &self.0 {
            let strands = plan.strands(said);
            for (foot, mark) in plan.slots.drawn.iter().zip(&plan.marks) {
                match foot.as_ref().and_then(|foot| said.get_mut(foot.line)) {
                    Some(own) => {
                        own.mark = own.mark.take().or_else(|| mark.clone());
                        if own.strands.is_none() {
                            own.add(&MarkText {
                                mark: None,
                                ..strands.clone()
                            });
                        }
                    }
                    None => reserved.push(MarkText {
                        mark: mark.clone(),
                        ..MarkText::default()
                    }),
                }
            }
        }
        reserved
    }

    /// The tendons that are not drawn; `tendons` are those drawn, by line.
    pub(super) fn made(
        &self,
        tendons: &[Tendon],
        thickness: &Thickness<'_>,
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
                    made.push(copy(typical, mark, by, thickness));
                }
            }
            findings.extend(plan.said(typical, made.get(before..).unwrap_or_default()));
        }
        (made, findings)
    }
}

impl Plan<'_> {
    /// Strands of the group: by its text, else by the first of its tendons that says them.
    fn strands(&self, said: &[MarkText]) -> MarkText {
        let text = &self.extent.said.strands;
        let drawn = self.slots.drawn.iter().flatten();
        let mut known = drawn.filter_map(|foot| said.get(foot.line));
        if text.strands.is_some() {
            return text.clone();
        }
        known
            .find(|own| own.strands.is_some())
            .cloned()
            .unwrap_or_default()
    }

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

/// A tendon like the typical one, moved; heights stand above the soffit where it comes to lie.
fn copy(typical: &Tendon, mark: String, by: Coord<f64>, thickness: &Thickness<'_>) -> Tendon {
    let end = |end: End| End {
        place: end.place + by,
        ..end
    };
    let joints = typical.joints.iter().map(|joint| PourJoint {
        place: joint.place + by,
        ..*joint
    });
    let points = typical.points.iter().map(|point| {
        let place = point.place + by;
        let thickness_m = thickness.at(place);
        // An anchor to which the drawing gives no height is at mid-depth, wherever it stands.
        let free = point.kind == PointKind::Anchor && point.drawn_m.is_none();
        let middle = thickness_m.map(|thickness_m| thickness_m / 2.0);
        Point {
            place,
            thickness_m,
            height_m: if free {
                point.height_m.and(middle)
            } else {
                point.height_m
            },
            ..*point
        }
    });
    Tendon {
        mark,
        path: Path::new(
            typical
                .path
                .segments()
                .iter()
                .map(|&piece| moved(piece, by)),
        ),
        ends: typical.ends.map(end),
        joints: joints.collect(),
        points: points.collect(),
        made: true,
        ..typical.clone()
    }
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
