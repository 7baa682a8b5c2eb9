//! The slab on plan: outlines, openings, columns, zones and their thickness.

use std::collections::BTreeSet;

use geo::{Area, BoundingRect, Contains, Coord, Polygon};
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, RTree};

use super::layers::{Ground, Roles, sound};
use super::order::by_place;
use super::pieces::{Joint, chains};
use super::readings::thickness_m;
use super::rules::{OUTLINE_OPEN, THICKNESS_DIFFERS, THICKNESS_UNKNOWN, ZONE_UNREAD};
use super::types::{Slab, Zone};
use crate::drawing::{Drawing, Shape, ShapeKind, Text};
use crate::finding::{Finding, Level};
use crate::geometry::{Path, Segment, distance_m};
use crate::job::Job;

/// Outlines leave the drawn line by no more than this, metres.
const CHORD_M: f64 = 0.001;
/// A place this near to a zone's edge is in the zone, metres.
const EDGE_M: f64 = 0.010;
/// An outline no larger than this is a symbol's, not the slab's, metres.
const SYMBOL_M: f64 = 0.4;
/// Texts that differ by less say the same thickness, metres.
const SAME_M: f64 = 0.0005;

/// Reads the slab; zones without a thickness are returned apart.
pub(super) fn slab(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    symbols: &BTreeSet<usize>,
) -> (Slab, Vec<Polygon<f64>>, Vec<Finding>) {
    let mut findings = Vec::new();
    let mut rings = |ground| outlines(drawing, job, roles, symbols, ground, &mut findings);
    let mut slab = Slab {
        outlines: rings(Ground::Edge),
        openings: rings(Ground::Opening),
        zones: Vec::new(),
        thickness_m: job.slab.thickness_m,
        columns: rings(Ground::Column),
    };
    let zones = rings(Ground::Zone);
    let mut said: Vec<Vec<(f64, Coord<f64>)>> = vec![Vec::new(); zones.len()];
    let mut general: Vec<(f64, Coord<f64>)> = Vec::new();
    let areas = Areas::new(zones.iter());
    let mut texts: Vec<&Text> = drawing.texts.iter().collect();
    texts.sort_by(|a, b| {
        let by_x = a.place.x.total_cmp(&b.place.x);
        let by_place = by_x.then(a.place.y.total_cmp(&b.place.y));
        by_place.then_with(|| a.content.cmp(&b.content))
    });
    for text in texts {
        let ground = roles.of(&text.layer, text.look).ground;
        if ground != Ground::Zone && ground != Ground::Edge {
            continue;
        }
        let Some(value_m) = thickness_m(&text.content, &job.conventions) else {
            continue;
        };
        let zone = areas.smallest(text.place, 0.0);
        match zone.or_else(|| areas.smallest(middle(text), 0.0)) {
            Some(zone) => said[zone].push((value_m, text.place)),
            None => general.push((value_m, text.place)),
        }
    }
    let mut unread = Vec::new();
    for (outline, said) in zones.into_iter().zip(said) {
        let Some(&(thickness_m, _)) = said.first() else {
            findings.push(zone_unread(&outline));
            unread.push(outline);
            continue;
        };
        // Two thicknesses leave none that could be relied on.
        if differing(&said, thickness_m, "in one zone", &mut findings) == 0 {
            slab.zones.push(Zone {
                outline,
                thickness_m,
            });
        } else {
            unread.push(outline);
        }
    }
    general_thickness(&mut slab, &general, &mut findings);
    (slab, unread, findings)
}

fn zone_unread(outline: &Polygon<f64>) -> Finding {
    let finding = Finding::new(
        &ZONE_UNREAD,
        Level::Error,
        format!(
            "a zone of {:.1} m² has no thickness inside; expected a text such as T350",
            outline.unsigned_area()
        ),
        "write the thickness inside the zone, or move the line to another layer if it is none",
    );
    match outline.exterior().0.first() {
        Some(&place) => finding.at_place(place),
        None => finding,
    }
}

fn general_thickness(slab: &mut Slab, said: &[(f64, Coord<f64>)], findings: &mut Vec<Finding>) {
    match (slab.thickness_m, said.first()) {
        (Some(job_m), _) => {
            differing(said, job_m, "in the job file and on the drawing", findings);
        }
        (None, Some(&(first_m, _))) => {
            // Here too.
            if differing(said, first_m, "outside every zone", findings) == 0 {
                slab.thickness_m = Some(first_m);
            }
        }
        (None, None) => findings.push(Finding::new(
            &THICKNESS_UNKNOWN,
            Level::Error,
            "the job gives no slab.thickness_mm and no text such as T250 stands on a slab layer outside the zones",
            "give `thickness_mm` in the job file's [slab] table, or write it on the drawing",
        )),
    }
}

/// One finding for each text that says otherwise.
fn differing(
    said: &[(f64, Coord<f64>)],
    used_m: f64,
    context: &str,
    findings: &mut Vec<Finding>,
) -> usize {
    let before = findings.len();
    for &(value_m, place) in said {
        if (value_m - used_m).abs() > SAME_M {
            findings.push(
                Finding::new(
                    &THICKNESS_DIFFERS,
                    Level::Error,
                    format!(
                        "two thicknesses {context}: {:.0} mm and {:.0} mm",
                        used_m * 1000.0,
                        value_m * 1000.0
                    ),
                    "correct the one that is wrong; draw a zone where the slab has another thickness",
                )
                .at_place(place),
            );
        }
    }
    findings.len() - before
}

fn middle(text: &Text) -> Coord<f64> {
    Coord {
        x: text.corners.iter().map(|c| c.x).sum::<f64>() / 4.0,
        y: text.corners.iter().map(|c| c.y).sum::<f64>() / 4.0,
    }
}

/// Closed lines on layers of one purpose, in an order that their places decide.
fn outlines(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    symbols: &BTreeSet<usize>,
    ground: Ground,
    findings: &mut Vec<Finding>,
) -> Vec<Polygon<f64>> {
    let gap_m = job.conventions.join_gap_m.max(0.010);
    let shapes: Vec<&Shape> = drawing
        .shapes
        .iter()
        .enumerate()
        .filter(|(at, shape)| {
            let of = roles.of(&shape.layer, shape.look).ground;
            of == ground && sound(shape) && !symbols.contains(at)
        })
        .map(|(_, shape)| shape)
        // A filled triangle or quadrangle is a column's body; elsewhere it is an arrow's head or a legend's sample.
        .filter(|shape| shape.kind != ShapeKind::Solid || ground == Ground::Column)
        .collect();
    let whole = |shape: &&&Shape| shape.closed || super::pieces::returns(&shape.path, gap_m);
    let mut rings: Vec<Polygon<f64>> = shapes
        .iter()
        .filter(whole)
        .map(|shape| ring(&shape.path))
        .collect();
    let mut open: Vec<&Path> = shapes
        .iter()
        .filter(|shape| !whole(shape))
        .map(|shape| &shape.path)
        .collect();
    open.sort_by(|a, b| by_place(a, b));
    let joint = Joint {
        gap_m,
        turn_rad: std::f64::consts::PI,
    };
    let (chains, _) = chains(&open, joint, |_| false);
    for chain in chains {
        let path = chain.path(&open);
        if chain.closed {
            rings.push(ring(&path));
        } else if ground != Ground::Column && path.length_m() > gap_m.max(SYMBOL_M) {
            findings.push(open_outline(ground, &path));
        }
    }
    // A hole may be as small as a pipe; an edge or a zone of the size of a symbol is one.
    let least_m2 = match ground {
        Ground::Edge | Ground::Zone => SYMBOL_M * SYMBOL_M,
        _ => 1e-6,
    };
    rings.retain(|ring| ring.unsigned_area() > least_m2);
    rings.sort_by(|a, b| {
        let key = |ring: &Polygon<f64>| ring.bounding_rect().map(|r| (r.min(), r.max()));
        let (a, b) = (key(a), key(b));
        a.zip(b).map_or(std::cmp::Ordering::Equal, |(a, b)| {
            let by_x = a.0.x.total_cmp(&b.0.x).then(a.0.y.total_cmp(&b.0.y));
            by_x.then(a.1.x.total_cmp(&b.1.x))
                .then(a.1.y.total_cmp(&b.1.y))
        })
    });
    rings
}

fn open_outline(ground: Ground, path: &Path) -> Finding {
    let what = match ground {
        Ground::Opening => "an opening",
        Ground::Zone => "a zone",
        _ => "the slab edge",
    };
    let (start, end) = (
        path.start().unwrap_or_default(),
        path.end().unwrap_or_default(),
    );
    Finding::new(
        &OUTLINE_OPEN,
        Level::Warning,
        format!(
            "{what} does not close: {:.2} m of line, its ends {:.3} m apart; it was left out",
            path.length_m(),
            distance_m(start, end)
        ),
        "close the outline, or move the line to another layer if it is none",
    )
    .at_place(start)
}

fn ring(path: &Path) -> Polygon<f64> {
    Polygon::new(path.to_line_string(CHORD_M), Vec::new())
}

type Boxed = GeomWithData<Rectangle<[f64; 2]>, usize>;

/// Outlines by place.
pub(super) struct Areas<'a> {
    outlines: Vec<&'a Polygon<f64>>,
    tree: RTree<Boxed>,
}

impl<'a> Areas<'a> {
    /// Outlines, known by their place in the sequence.
    pub(super) fn new(outlines: impl Iterator<Item = &'a Polygon<f64>>) -> Self {
        let outlines: Vec<&Polygon<f64>> = outlines.collect();
        let boxes = outlines.iter().enumerate().filter_map(|(at, outline)| {
            let rect = outline.bounding_rect()?;
            let (min, max) = (rect.min(), rect.max());
            let rect = Rectangle::from_corners([min.x, min.y], [max.x, max.y]);
            Some(GeomWithData::new(rect, at))
        });
        Self {
            tree: RTree::bulk_load(boxes.collect()),
            outlines,
        }
    }

    /// The smallest outline that holds a place, or has it within `edge_m` of its edge.
    pub(super) fn smallest(&self, place: Coord<f64>, edge_m: f64) -> Option<usize> {
        let envelope = AABB::from_corners(
            [place.x - edge_m, place.y - edge_m],
            [place.x + edge_m, place.y + edge_m],
        );
        self.tree
            .locate_in_envelope_intersecting(&envelope)
            .map(|found| found.data)
            .filter(|&at| holds(self.outlines[at], place, edge_m))
            .min_by(|&a, &b| {
                let area = |at: usize| self.outlines[at].unsigned_area();
                area(a).total_cmp(&area(b)).then(a.cmp(&b))
            })
    }
}

fn holds(outline: &Polygon<f64>, place: Coord<f64>, edge_m: f64) -> bool {
    outline.contains(&place)
        || outline.exterior().lines().any(|line| {
            let side = Segment::Line {
                from: line.start,
                to: line.end,
            };
            distance_m(side.place_at(side.nearest_along_m(place)), place) <= edge_m
        })
}

/// Thickness anywhere on the plan.
pub(super) struct Thickness<'a> {
    slab: &'a Slab,
    /// Zones with a thickness, then zones without.
    areas: Areas<'a>,
}

impl<'a> Thickness<'a> {
    /// Thickness by place; inside zones whose thickness is not known, unknown.
    pub(super) fn new(slab: &'a Slab, unread: &'a [Polygon<f64>]) -> Self {
        let outlines = slab.zones.iter().map(|zone| &zone.outline).chain(unread);
        Self {
            slab,
            areas: Areas::new(outlines),
        }
    }

    /// Thickness at a place, metres.
    pub(super) fn at(&self, place: Coord<f64>) -> Option<f64> {
        match self.areas.smallest(place, EDGE_M) {
            Some(zone) => self.slab.zones.get(zone).map(|zone| zone.thickness_m),
            None => self.slab.thickness_m,
        }
    }
}
