//! The slab on plan: outlines, openings, columns, zones, and where its faces lie.

use std::collections::BTreeSet;

use geo::{Area, Coord, Intersects, Point, Polygon};

use super::areas::Areas;
use super::layers::{Ground, Roles};
use super::outlines::outlines;

use super::rules::{LABEL_UNREAD, LEVEL_OUTSIDE_ZONES, THICKNESS_UNKNOWN};
use super::types::{Faces, Slab};
use super::zone_texts::{Unread, short, zone_text};
use super::zones::{self, SAME_M, Said, differing};
use crate::drawing::{Drawing, Text};
use crate::finding::{Finding, Level, Wording};
use crate::job::Job;

/// A place this near to a zone's edge is in the zone, metres.
pub(super) const EDGE_M: f64 = 0.010;

/// Reads the slab; zones without a thickness are returned apart.
pub(super) fn slab(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    symbols: &BTreeSet<usize>,
) -> (Slab, Vec<Polygon<f64>>, Vec<Finding>) {
    let mut findings = Vec::new();
    let mut rings = |ground| outlines(drawing, job, roles, symbols, ground, &mut findings);
    let (inner, outer) = one_in_another(rings(Ground::Slab));
    let mut slab = Slab {
        outlines: [outer, rings(Ground::Edge)].concat(),
        openings: rings(Ground::Opening),
        zones: Vec::new(),
        thickness_m: job.slab.thickness_m,
        columns: rings(Ground::Column),
    };
    let rings_of_zones = [inner, rings(Ground::Zone)].concat();
    let mut said: Vec<Vec<Said>> = vec![Vec::new(); rings_of_zones.len()];
    // Levels of zones that nobody can read.
    let mut doubted: Vec<Option<String>> = vec![None; rings_of_zones.len()];
    let mut findings_of_texts = Vec::new();
    let mut general: Vec<Said> = Vec::new();
    let areas = Areas::new(rings_of_zones.iter());
    let mut texts: Vec<&Text> = drawing.texts.iter().collect();
    texts.sort_by(|a, b| {
        let by_x = a.place.x.total_cmp(&b.place.x);
        let by_place = by_x.then(a.place.y.total_cmp(&b.place.y));
        by_place.then_with(|| a.content.cmp(&b.content))
    });
    for text in texts {
        let ground = roles.of(&text.layer, text.look).ground;
        if !matches!(ground, Ground::Zone | Ground::Edge | Ground::Slab) {
            continue;
        }
        let (read, cannot) = zone_text(&text.content, &job.conventions);
        let read = read.into_iter().map(|read| Said {
            text: read,
            place: text.place,
        });
        let zone = areas.smallest(text.place, 0.0);
        let zone = zone.or_else(|| areas.smallest(middle(text), 0.0));
        match zone {
            Some(zone) => said[zone].extend(read),
            None => general.extend(read),
        }
        for cannot in cannot.into_iter().filter(|_| !text.hidden) {
            findings_of_texts.push(unread(text, &cannot, zone.is_some()));
            if let Some(zone) = zone.filter(|_| cannot.alone) {
                doubted[zone].get_or_insert(cannot.line);
            }
        }
    }
    let mut of_slab = Vec::new();
    general_thickness(&mut slab, &general, job, &mut of_slab);
    let around = Faces::general(slab.thickness_m);
    let (zones, silent) = zones::zones(
        rings_of_zones,
        &said,
        &doubted,
        around,
        &job.slab,
        &mut findings,
    );
    slab.zones = zones;
    findings.extend(of_slab);
    findings.extend(findings_of_texts);
    (slab, silent, findings)
}

/// Outlines that lie in another, and those that lie in none.
fn one_in_another(rings: Vec<Polygon<f64>>) -> (Vec<Polygon<f64>>, Vec<Polygon<f64>>) {
    let within = |inner: &Polygon<f64>| {
        let mut larger = rings
            .iter()
            .filter(|outer| outer.unsigned_area() > inner.unsigned_area());
        larger.any(|outer| {
            let corners = || inner.exterior().coords();
            let inside = corners().filter(|&&corner| outer.intersects(&Point(corner)));
            2 * inside.count() > corners().count()
        })
    };
    let inside: Vec<bool> = rings.iter().map(within).collect();
    let (mut inner, mut outer) = (Vec::new(), Vec::new());
    for (ring, inside) in rings.into_iter().zip(inside) {
        if inside {
            inner.push(ring);
        } else {
            outer.push(ring);
        }
    }
    (inner, outer)
}

fn general_thickness(slab: &mut Slab, said: &[Said], job: &Job, findings: &mut Vec<Finding>) {
    let thicknesses: Vec<(f64, Coord<f64>)> = said
        .iter()
        .filter_map(|said| Some((said.text.thickness_m?, said.place)))
        .collect();
    match (slab.thickness_m, thicknesses.first()) {
        (Some(job_m), _) => {
            let context = "in the job file and on the drawing";
            differing("thicknesses", &thicknesses, job_m, context, findings);
        }
        (None, Some(&(first_m, _))) => {
            // Two of them leave none that could be relied on.
            let context = "outside every zone";
            if differing("thicknesses", &thicknesses, first_m, context, findings) == 0 {
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
    for said in said {
        let (top_m, text) = (job.slab.top_level_m, said.text);
        let soffit_m = slab.thickness_m.map(|thickness_m| top_m - thickness_m);
        let off = |said_m: Option<f64>, is_m: Option<f64>| {
            said_m.filter(|said_m| is_m.is_none_or(|is_m| (said_m - is_m).abs() > SAME_M))
        };
        let down_m = text.down_m.map(|down_m| top_m - down_m);
        let level_m = off(text.top_m, Some(top_m))
            .or(off(text.soffit_m, soffit_m))
            .or(down_m);
        if let Some(level_m) = level_m {
            findings.push(level_outside(level_m, said.place));
        }
    }
}

fn level_outside(level_m: f64, place: Coord<f64>) -> Finding {
    Finding::new(
        &LEVEL_OUTSIDE_ZONES,
        Level::Warning,
        Wording::of(|units| {
            format!(
                "a text outside every zone gives the level {}, which is not the general slab's: it was not used",
                short(level_m, units)
            )
        }),
        "write the level inside its zone and close the zone's line; if it is the general slab's top, set slab.top_level_m",
    )
    .at_place(place)
}

/// A text on a slab layer that speaks of a level and cannot be read.
fn unread(text: &Text, cannot: &Unread, in_zone: bool) -> Finding {
    let outcome = match (cannot.alone, in_zone) {
        (true, true) => "where its zone lies nobody knows",
        (false, true) => "it was taken for a note, and its zone for what the other texts say",
        (_, false) => "outside the zones the slab was taken for what the other texts say",
    };
    Finding::new(
        &LABEL_UNREAD,
        Level::Warning,
        format!(
            "{:?} on layer {} speaks of a level or a thickness and cannot be read: {outcome}; expected such as T350, TOS -50 or \
             50 SET DOWN",
            cannot.line, text.layer
        ),
        "correct the text, move it to another layer if it is a note, or give its pattern in the job file",
    )
    .at_place(text.place)
}

fn middle(text: &Text) -> Coord<f64> {
    Coord {
        x: text.corners.iter().map(|c| c.x).sum::<f64>() / 4.0,
        y: text.corners.iter().map(|c| c.y).sum::<f64>() / 4.0,
    }
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
        self.faces_at(place).thickness_m
    }

    /// Where the concrete lies at a place.
    pub(super) fn faces_at(&self, place: Coord<f64>) -> Faces {
        match self.areas.smallest(place, EDGE_M) {
            Some(zone) => {
                let zone = self.slab.zones.get(zone);
                zone.map_or(Faces::general(None), super::types::Zone::faces)
            }
            None => self.general(),
        }
    }

    /// Where it lies outside every zone.
    pub(super) fn general(&self) -> Faces {
        Faces::general(self.slab.thickness_m)
    }
}
