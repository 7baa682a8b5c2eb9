//! Tendons that the drawing shows by a typical one: marks for the group, and copies where none is drawn.

use std::collections::BTreeSet;

use geo::Coord;

use super::groups::{Extent, Groups};
use super::heard::Heard;
use super::heights::Height;
use super::index::{Foot, Index};
use super::lines::Line;
use super::marking::Marking;
use super::points::points;
use super::rules::{DUPLICATE_LINE, GROUP_MISFIT, TENDON_MADE};
use super::slab::Thickness;
use super::slots::{OFF, Slots, slot_marks, slots};
use super::types::{End, Point, Tendon};
use crate::finding::{Finding, Level};
use crate::geometry::{Path, Segment};
use crate::job::HeightReading;

/// Points nearer than this are one, metres.
const SAME_STATION_M: f64 = 1e-6;
/// A made tendon this near to another, metres, and within this sine of its direction, lies on it.
const ON_M: f64 = 0.020;
const ALONG: f64 = 0.05;

/// A group that can be made.
struct Plan<'a> {
    extent: &'a Extent,
    slots: Slots,
    /// Mark of each slot, where the group's text gives marks.
    marks: Vec<Option<String>>,
}

/// Groups whose extent lines fit what their texts say.
pub(super) struct Plans<'a>(Vec<Plan<'a>>);

/// Lays the groups out; what does not fit is a finding, and nothing is made of it. Where a group's text counts its drawn
/// tendons otherwise than their own labels do, neither counts.
pub(super) fn plans<'a>(
    groups: &'a Groups,
    said: &mut [Marking],
    lines: &[Line],
) -> (Plans<'a>, Vec<Finding>) {
    let mut plans = Vec::new();
    let mut findings = Vec::new();
    for extent in &groups.extents {
        let plan = slots(extent).and_then(|slots| {
            counted_alike(extent, &slots, said)?;
            let marks = slot_marks(extent, &slots, said, lines);
            Ok(Plan {
                extent,
                slots,
                marks,
            })
        });
        match plan {
            Ok(plan) => plans.push(plan),
            Err(why) => findings.push(misfit(extent, &why)),
        }
    }
    let (plans, twice) = told_once(plans);
    findings.extend(twice.into_iter().map(|extent| {
        misfit(
            extent,
            "spreads a tendon over places over which another extent line spreads it too",
        )
    }));
    (Plans(plans), findings)
}

fn misfit(extent: &Extent, why: &str) -> Finding {
    Finding::new(
        &GROUP_MISFIT,
        Level::Error,
        format!(
            "extent line {} {why}: the group's undrawn tendons are missing from everything worked out here",
            extent.handle
        ),
        "correct the extent line or its text, or draw the group's tendons",
    )
    .at_place(extent.path.place_at(extent.path.length_m() / 2.0))
}

/// Whether a group's text and its drawn tendons say the same of strands.
fn counted_alike(extent: &Extent, slots: &Slots, said: &mut [Marking]) -> Result<(), String> {
    let text = extent.counted();
    let mut first: Option<Marking> = None;
    let mut unlike = None;
    for foot in slots.drawn.iter().flatten() {
        let Some(own) = said.get_mut(foot.line) else {
            continue;
        };
        if own.counts_otherwise(&text) {
            own.tear(&Marking {
                mark: Heard::Nothing,
                ..text.clone()
            });
            unlike = Some(
                "has a text that counts tendons or strands otherwise than its drawn tendon does",
            );
        } else if first
            .as_ref()
            .is_some_and(|first| first.counts_otherwise(own))
        {
            unlike = unlike.or(Some("has drawn tendons that differ in strands"));
        }
        first.get_or_insert_with(|| own.clone());
    }
    let all_drawn = slots.drawn.iter().all(Option::is_some);
    match unlike {
        Some(why) if !all_drawn || text.counts() => Err(why.to_owned()),
        _ => Ok(()),
    }
}

/// Groups of which no other one spreads the same drawn tendon over the same places; and the extent lines of those that
/// contradict one another so. Of two that say the same the first stays.
fn told_once(plans: Vec<Plan<'_>>) -> (Vec<Plan<'_>>, Vec<&Extent>) {
    let (mut repeated, mut twice) = (vec![false; plans.len()], vec![false; plans.len()]);
    for (at, a) in plans.iter().enumerate() {
        for (b, other) in plans.iter().zip(0..).take(at) {
            if repeated[other] || !a.shares_with(b) {
                continue;
            }
            if a.repeats(b) {
                repeated[at] = true;
            } else if a.overlaps(b) {
                (twice[at], twice[other]) = (true, true);
            }
        }
    }
    let mut kept = Vec::new();
    let mut contradicted = Vec::new();
    for (plan, (repeated, twice)) in plans.into_iter().zip(repeated.into_iter().zip(twice)) {
        if twice {
            contradicted.push(plan.extent);
        } else if !repeated {
            kept.push(plan);
        }
    }
    (kept, contradicted)
}

impl Plans<'_> {
    /// Gives the group's drawn tendons the marks and strands that they lack; returns the marks of those to be made, so
    /// that nobody else is called by them.
    pub(super) fn claim(&self, said: &mut [Marking]) -> Vec<Marking> {
        let mut reserved = Vec::new();
        for plan in &self.0 {
            let strands = plan.strands(said);
            for (foot, mark) in plan.slots.drawn.iter().zip(&plan.marks) {
                match foot.as_ref().and_then(|foot| said.get_mut(foot.line)) {
                    Some(own) => {
                        if !own.mark.is_said() {
                            own.mark = mark.clone().into();
                        }
                        if !own.strands.is_said() {
                            own.join(Marking {
                                mark: Heard::Nothing,
                                ..strands.clone()
                            });
                        } else if !own.tendons.is_said() {
                            own.tendons = strands.tendons.clone();
                        }
                    }
                    None => reserved.push(Marking {
                        mark: mark.clone().into(),
                        ..Marking::default()
                    }),
                }
            }
        }
        reserved
    }

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

impl Extent {
    /// What the group's texts say of strands and tendons at each place.
    fn counted(&self) -> Marking {
        let mut counted = self.said.strands.clone();
        counted.tendons.join(self.said.each);
        counted
    }
}

impl Plan<'_> {
    /// Whether a tendon that is drawn is of this group and of another.
    fn shares_with(&self, other: &Self) -> bool {
        let mut own = self.slots.drawn.iter().flatten();
        own.any(|foot| {
            let mut others = other.slots.drawn.iter().flatten();
            others.any(|drawn| drawn.line == foot.line)
        })
    }

    /// Where its tendons lie across the direction of the first one drawn, in order, metres.
    fn across_m(&self, heading_rad: f64) -> Vec<f64> {
        let (sin, cos) = heading_rad.sin_cos();
        let places = self.slots.stations_m.iter();
        let mut across: Vec<f64> = places
            .map(|&station_m| self.extent.path.place_at(station_m))
            .map(|place| cos * place.y - sin * place.x)
            .collect();
        across.sort_by(f64::total_cmp);
        across
    }

    fn both_across_m(&self, other: &Self) -> (Vec<f64>, Vec<f64>, f64) {
        let first = self.slots.drawn.iter().flatten().next();
        let heading_rad = first.map_or(0.0, |foot| foot.heading_rad);
        let (own, others) = (self.across_m(heading_rad), other.across_m(heading_rad));
        let gap_m = |places: &[f64]| match places {
            [a, b, ..] => b - a,
            _ => f64::INFINITY,
        };
        let near_m = OFF * gap_m(&own).min(gap_m(&others));
        (own, others, near_m)
    }

    /// Whether another group has the same places.
    fn repeats(&self, other: &Self) -> bool {
        let (own, others, near_m) = self.both_across_m(other);
        own.len() == others.len()
            && own
                .iter()
                .zip(&others)
                .all(|(a, b)| (a - b).abs() <= near_m)
    }

    /// Whether another group reaches over more than the outermost tendon of this one.
    fn overlaps(&self, other: &Self) -> bool {
        let (own, others, near_m) = self.both_across_m(other);
        let (Some(a), Some(b)) = (own.first(), own.last()) else {
            return false;
        };
        let (Some(c), Some(d)) = (others.first(), others.last()) else {
            return false;
        };
        b.min(*d) - a.max(*c) > near_m
    }

    /// Strands of the group: by its text, else by the first of its tendons that says them.
    fn strands(&self, said: &[Marking]) -> Marking {
        let text = self.extent.counted();
        let drawn = self.slots.drawn.iter().flatten();
        let mut known = drawn.filter_map(|foot| said.get(foot.line));
        if text.strands.is_said() {
            return text;
        }
        let mut strands = known
            .find(|own| own.strands.is_said())
            .cloned()
            .unwrap_or_default();
        strands.tendons.join(text.tendons);
        strands
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
            format!(
                "{which} made as copies of {}, {:.0} mm apart along extent line {}",
                typical.mark,
                apart_m * 1000.0,
                self.extent.handle
            ),
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
