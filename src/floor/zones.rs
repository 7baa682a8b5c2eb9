//! Zones of the slab: what their texts say of thickness, top and soffit, and where their concrete lies by that.

use geo::{Area, Coord, Polygon};

use super::areas::{Areas, holds};
use super::rules::{STEP_ASSUMED, THICKNESS_DIFFERS, ZONE_UNREAD};
use super::slab::EDGE_M;
use super::types::{Faces, Zone};
use super::zone_texts::{ZoneText, short};
use crate::finding::{Finding, Level, Wording};
use crate::job::{SlabJob, StepKeeps};
use crate::units::{FLOOR, LONG, Units};

/// Numbers that differ by less say the same, metres.
pub(super) const SAME_M: f64 = 0.0005;
/// A zone's level farther from the general top is counted from elsewhere, metres.
const FAR_M: f64 = 3.0;
/// No slab is thinner, metres.
const THINNEST_M: f64 = 0.020;

/// A text on a slab layer, read.
#[derive(Debug, Clone, Copy)]
pub(super) struct Said {
    pub(super) text: ZoneText,
    pub(super) place: Coord<f64>,
}

/// Zones of known thickness, in the order of their outlines; those without, and those `doubted` for a text that cannot be
/// read, are returned apart. What a zone's text leaves
/// open it has of the smallest zone that holds the whole of it, or of the general slab.
pub(super) fn zones(
    outlines: Vec<Polygon<f64>>,
    said: &[Vec<Said>],
    doubted: &[Option<String>],
    general: Faces,
    job: &SlabJob,
    findings: &mut Vec<Finding>,
) -> (Vec<Zone>, Vec<Polygon<f64>>) {
    let sizes_m2: Vec<f64> = outlines.iter().map(Area::unsigned_area).collect();
    let mut largest_first: Vec<usize> = (0..outlines.len()).collect();
    largest_first.sort_by(|&a, &b| sizes_m2[b].total_cmp(&sizes_m2[a]));
    let areas = Areas::new(outlines.iter());
    let mut faces: Vec<Option<Faces>> = vec![None; outlines.len()];
    let mut found: Vec<Vec<Finding>> = vec![Vec::new(); outlines.len()];
    for at in largest_first {
        let around = areas
            .around(&outlines[at], sizes_m2[at])
            .and_then(|outer| faces[outer])
            .unwrap_or(general);
        let here = match &doubted[at] {
            None => read(&said[at], &outlines[at], around, job, &mut found[at]),
            Some(line) => {
                let what = format!(
                    "has the text {line:?} inside, which cannot be read; expected a text such as T350 or TOS -50"
                );
                found[at].push(unread(&outlines[at], |_| what.clone()));
                None
            }
        };
        // Through a zone that says nothing the top runs on; how thick it is nobody knows.
        faces[at] = Some(here.unwrap_or(Faces {
            top_m: around.top_m,
            thickness_m: None,
        }));
    }
    findings.extend(found.into_iter().flatten());
    let (mut zones, mut unread) = (Vec::new(), Vec::new());
    for (outline, faces) in outlines.into_iter().zip(faces) {
        match faces.and_then(|faces| Some((faces.top_m, faces.thickness_m?))) {
            Some((top_m, thickness_m)) => zones.push(Zone {
                outline,
                thickness_m,
                top_m,
            }),
            None => unread.push(outline),
        }
    }
    (zones, unread)
}

/// Where a zone's concrete lies by its texts; `None` where they do not say, contradict one another or cannot be.
fn read(
    said: &[Said],
    outline: &Polygon<f64>,
    around: Faces,
    job: &SlabJob,
    findings: &mut Vec<Finding>,
) -> Option<Faces> {
    let Some(first) = said.first() else {
        findings.push(unread(outline, |_| {
            "has no thickness and no level inside; expected a text such as T350 or TOS -50"
                .to_owned()
        }));
        return None;
    };
    let before = findings.len();
    let mut one = |what: &str, part: fn(&ZoneText) -> Option<f64>| {
        let parts: Vec<(f64, Coord<f64>)> = said
            .iter()
            .filter_map(|said| Some((part(&said.text)?, said.place)))
            .collect();
        let &(first_m, _) = parts.first()?;
        differing(what, &parts, first_m, "in one zone", findings);
        Some(first_m)
    };
    let thickness_m = one("thicknesses", |text| text.thickness_m);
    let top_m = one("top levels", |text| text.top_m);
    let soffit_m = one("soffit levels", |text| text.soffit_m);
    let down_m = one("steps of the top", |text| text.down_m);
    // Two of one thing leave none that could be relied on.
    if findings.len() > before {
        return None;
    }
    let top_m = top_m.map(|level_m| level_m - job.top_level_m);
    let soffit_m = soffit_m.map(|level_m| level_m - job.top_level_m);
    let stepped_m = down_m.map(|down_m| around.top_m - down_m);
    if let (Some(a), Some(b)) = (top_m, stepped_m) {
        differing("tops", &[(b, first.place)], a, "in one zone", findings);
    }
    let top_m = top_m.or(stepped_m);
    if let (Some(thickness_m), Some(top_m), Some(soffit_m)) = (thickness_m, top_m, soffit_m) {
        let between = [(top_m - soffit_m, first.place)];
        let context = "in one zone, by its text and between its top and its soffit";
        differing("thicknesses", &between, thickness_m, context, findings);
    }
    if findings.len() > before {
        return None;
    }
    let faces = match (thickness_m, top_m, soffit_m) {
        (Some(_), Some(top_m), _) => Faces { top_m, thickness_m },
        (Some(thickness), None, soffit_m) => Faces {
            top_m: soffit_m.map_or(around.top_m, |soffit_m| soffit_m + thickness),
            thickness_m,
        },
        (None, top_m, Some(soffit_m)) => {
            let top_m = top_m.unwrap_or(around.top_m);
            Faces {
                top_m,
                thickness_m: Some(top_m - soffit_m),
            }
        }
        (None, Some(top_m), None) => step(top_m, around, job.step_keeps, first.place, findings),
        (None, None, None) => around,
    };
    let thickness_m = faces.thickness_m?;
    if faces.top_m.abs() > FAR_M {
        findings.push(unread(
            outline,
            |units| {
                let long = units.of(LONG);
                format!(
                    "has its top {} from the top of the general slab; expected a step of a slab, within {}: its level is \
                     counted from elsewhere (slab.top_level_m {})",
                    long.said(faces.top_m, 3),
                    long.given(FAR_M),
                    long.given(job.top_level_m)
                )
            },
        ));
        return None;
    }
    if thickness_m < THINNEST_M {
        findings.push(unread(outline, |units| {
            format!(
                "has its top at {} and its soffit at {}; expected the soffit below the top",
                short(faces.top_m, units),
                short(faces.top_m - thickness_m, units)
            )
        }));
        return None;
    }
    Some(faces)
}

/// A step in the top whose text gives no more.
fn step(
    top_m: f64,
    around: Faces,
    keeps: StepKeeps,
    place: Coord<f64>,
    findings: &mut Vec<Finding>,
) -> Faces {
    let thinner_m = around.soffit_m().map(|soffit_m| top_m - soffit_m);
    let thickness_m = match keeps {
        StepKeeps::Thickness => around.thickness_m,
        StepKeeps::Soffit => thinner_m,
    };
    if let (Some(same_m), Some(thinner_m)) = (around.thickness_m, thinner_m)
        && (same_m - thinner_m).abs() > SAME_M
    {
        let taken = |units: Units| {
            let (taken, other) = (short(same_m, units), short(thinner_m, units));
            match keeps {
                StepKeeps::Thickness => format!(
                    "taken as {taken} thick, like the slab around it, so that its soffit steps with its top; if the soffit \
                     runs through, it is {other} thick"
                ),
                StepKeeps::Soffit => format!(
                    "taken as {other} thick, its soffit being that of the slab around it; if its soffit steps with its top, \
                     it is {taken} thick"
                ),
            }
        };
        findings.push(
            Finding::new(
                &STEP_ASSUMED,
                Level::Warning,
                Wording::of(|units| {
                    format!(
                        "the text of a zone gives its top, {}, and neither thickness nor soffit: it was {}",
                        short(top_m, units),
                        taken(units)
                    )
                }),
                "write the thickness or the soffit's level inside the zone, or set slab.step_keeps to what runs through",
            )
            .at_place(place),
        );
    }
    Faces { top_m, thickness_m }
}

fn unread(outline: &Polygon<f64>, what: impl Fn(Units) -> String) -> Finding {
    let finding = Finding::new(
        &ZONE_UNREAD,
        Level::Error,
        Wording::of(|units| {
            let area = units.of(FLOOR).said(outline.unsigned_area(), 1);
            format!("a zone of {area} {}", what(units))
        }),
        "write the thickness, or a level, inside the zone; set slab.top_level_m if levels are not counted from the general \
         slab's top; move the line to another layer if it is no zone",
    );
    match outline.exterior().0.first() {
        Some(&place) => finding.at_place(place),
        None => finding,
    }
}

/// One finding for each number that says otherwise; how many there were.
pub(super) fn differing(
    what: &str,
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
                    Wording::of(|units| {
                        format!(
                            "two {what} {context}: {} and {}",
                            short(used_m, units),
                            short(value_m, units)
                        )
                    }),
                    "correct the one that is wrong; draw a zone where the slab has another thickness or level",
                )
                .at_place(place),
            );
        }
    }
    findings.len() - before
}

impl Areas<'_> {
    /// The smallest outline larger than `size_m2` that holds the whole of this one.
    fn around(&self, inner: &Polygon<f64>, size_m2: f64) -> Option<usize> {
        let corners = &inner.exterior().0;
        self.smallest_of(*corners.first()?, EDGE_M, |outer| {
            outer.unsigned_area() > size_m2 * (1.0 + 1e-9)
                && corners.iter().all(|&corner| holds(outer, corner, EDGE_M))
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use geo::{Rect, coord};

    fn square(from: f64, to: f64) -> Polygon<f64> {
        Rect::new(coord! {x: from, y: from}, coord! {x: to, y: to}).to_polygon()
    }

    /// Top and thickness of zones within one another, each with what its text gives (thickness, top, soffit, down), mm.
    fn nested(texts: &[[Option<f64>; 4]], job: &SlabJob) -> Vec<Option<[f64; 2]>> {
        let outlines: Vec<Polygon<f64>> = (0..texts.len())
            .map(|at| square(f64::from(u8::try_from(at).unwrap_or(0)), 20.0))
            .collect();
        let said: Vec<Vec<Said>> = texts
            .iter()
            .map(|text| {
                let [thickness_m, top_m, soffit_m, down_m] =
                    text.map(|part| part.map(|mm| mm / 1000.0));
                let text = ZoneText {
                    thickness_m,
                    top_m,
                    soffit_m,
                    down_m,
                };
                vec![Said {
                    text,
                    place: Coord::default(),
                }]
            })
            .collect();
        let general = Faces::general(Some(0.25));
        let mut findings = Vec::new();
        let (zones, _) = zones(
            outlines.clone(),
            &said,
            &vec![None; said.len()],
            general,
            job,
            &mut findings,
        );
        let found = outlines.iter().map(|outline| {
            let zone = zones.iter().find(|zone| zone.outline == *outline)?;
            Some([zone.top_m, zone.thickness_m].map(|m| (m * 1e6).round() / 1e3))
        });
        found.collect()
    }

    fn job() -> SlabJob {
        crate::job::Job::default().slab
    }

    #[test]
    fn two_of_thickness_top_and_soffit_give_the_third() {
        let alone = |text| nested(&[text], &job())[0];
        let given = Some;
        assert_eq!(alone([given(350.0), None, None, None]), Some([0.0, 350.0]));
        assert_eq!(
            alone([given(300.0), given(-50.0), None, None]),
            Some([-50.0, 300.0])
        );
        assert_eq!(alone([None, None, given(-400.0), None]), Some([0.0, 400.0]));
        assert_eq!(
            alone([None, given(50.0), given(-250.0), None]),
            Some([50.0, 300.0])
        );
        assert_eq!(
            alone([given(200.0), None, given(-250.0), None]),
            Some([-50.0, 200.0])
        );
        assert_eq!(
            alone([given(200.0), None, None, given(30.0)]),
            Some([-30.0, 200.0])
        );
        // All three, and they agree; they do not; the soffit lies above the top; the top is elsewhere.
        assert_eq!(
            alone([given(300.0), given(-50.0), given(-350.0), None]),
            Some([-50.0, 300.0])
        );
        assert_eq!(
            alone([given(300.0), given(-50.0), given(-300.0), None]),
            None
        );
        assert_eq!(alone([None, given(-50.0), given(-50.0), None]), None);
        assert_eq!(alone([given(300.0), given(45_200.0), None, None]), None);
    }

    #[test]
    fn a_level_is_counted_from_where_the_job_says() {
        let mut job = job();
        job.top_level_m = 45.25;
        let found = nested(&[[Some(300.0), Some(45_200.0), None, None]], &job);
        assert_eq!(found[0], Some([-50.0, 300.0]));
    }

    #[test]
    fn a_top_alone_keeps_the_thickness_or_the_soffit_as_the_job_says() {
        let top = [None, Some(-50.0), None, None];
        let mut job = job();
        assert_eq!(nested(&[top], &job)[0], Some([-50.0, 250.0]));
        job.step_keeps = StepKeeps::Soffit;
        assert_eq!(nested(&[top], &job)[0], Some([-50.0, 200.0]));
    }

    #[test]
    fn a_drop_within_a_step_has_the_top_of_the_step() {
        let wing = [Some(250.0), Some(-100.0), None, None];
        let drop = [Some(400.0), None, None, None];
        let recess = [None, None, None, Some(30.0)];
        let found = nested(&[wing, drop, recess], &job());
        assert_eq!(found[1], Some([-100.0, 400.0]));
        assert_eq!(found[2], Some([-130.0, 400.0]));
    }
}
