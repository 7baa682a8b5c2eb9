//! Runs the tendons of a floor in parallel and gathers results by index; the only file that says `rayon`.
//!
//! Two passes: all tendons are jacked and locked off first, since the concrete stress of each comes from all of them; then
//! the sections of the slab, summed serially in the tendons' order; then transfer, service and the rules.

mod assumptions;
mod by_method;
mod findings_on;
mod refusals;
mod samples;
mod spread;

use std::cmp::Ordering;

use geo::Coord;
use rayon::prelude::*;

pub use self::by_method::{DAYS, MethodForces, MethodResult};
pub use self::refusals::{Refusal, rules};
pub use self::spread::{FloorSpread, Spread};
use crate::checks::{self, Ground, Turning, Worked};
use crate::finding::Finding;
use crate::floor::{Floor, Tendon};
use crate::job::{Fallback, Job, LongTermMethod};
use crate::losses::long_term::Turn;
use crate::losses::precompression::{Crossing, Sections};
use crate::losses::{Along, Effective, Forces, Pulls, first_end, steel, strand_size, turns};
use crate::profile::{self, Profile, Tightest};

/// A floor worked out.
#[derive(Debug, Clone)]
pub struct Analysis {
    /// The slab and the tendons as read.
    pub floor: Floor,
    /// One result a tendon, in the floor's order.
    pub results: Vec<TendonResult>,
    /// All findings, worst first, then by rule, tendon and station.
    pub findings: Vec<Finding>,
    /// What was assumed, in sentences.
    pub assumptions: Vec<String>,
    /// Keys that the job did not give, with what holds in their place.
    pub fallbacks: Vec<Fallback>,
}

impl Analysis {
    /// The job's methods of long-term loss, the drawn one first; none where no tendon has forces to lose.
    pub fn methods(&self) -> Vec<LongTermMethod> {
        let worked = self
            .results
            .iter()
            .find(|result| !result.by_method.is_empty());
        worked.map_or_else(Vec::new, |result| {
            result.by_method.iter().map(|one| one.method).collect()
        })
    }

    /// Everything that was assumed, in sentences: of the floor, and for want of a key.
    pub fn all_assumptions(&self) -> Vec<String> {
        let said = self.assumptions.iter().cloned();
        said.chain(self.fallbacks.iter().map(Fallback::to_string))
            .collect()
    }
}

/// A tendon worked out, as far as it could be.
#[derive(Debug, Clone)]
pub struct TendonResult {
    /// The curve, if every height is known.
    pub profile: Option<Profile>,
    /// The forces, if curve, strands and ends are known; without the later losses where the concrete stress is not.
    pub forces: Option<Forces>,
    /// Name of the strand size that was worked with: the drawing's, else the job's default; `None` where there is no area.
    pub strand: Option<String>,
    /// Steel area of all strands of one tendon, mm², if strands and size are known.
    pub area_mm2: Option<f64>,
    /// Least radius in plan.
    pub plan_tightest: Option<Tightest>,
    /// How it turns down to its point of least force; with the forces.
    pub turning: Option<Turning>,
    /// At each of the tendon's points.
    pub points: Vec<PointResult>,
    /// Between the points too, close enough to draw: stations, places, levels and forces at every stage. An intermediate
    /// anchor has two, one for each of the segments that meet there.
    pub samples: Vec<Sample>,
    /// Mean concrete stress used, MPa.
    pub concrete_stress_mpa: Option<f64>,
    /// The service force by each method that the job names, the drawn one first; empty where the tendon cannot be stressed.
    pub by_method: Vec<MethodResult>,
}

/// Results at a profile point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PointResult {
    /// Angle turned since station 0, in space, radians; with a bend at the point.
    pub angle_rad: Option<f64>,
    /// Level above the top of the slab, metres: as drawn, for a support too.
    pub level_m: Option<f64>,
    /// Forces at jacking, lock-off, transfer and service, kN per tendon, as far as they are known; at a bend, the least in it,
    /// at an intermediate anchor, the lesser of its two sides.
    pub forces_kn: [Option<f64>; 4],
}

/// A place along a tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Sample {
    /// Plan station, metres.
    pub station_m: f64,
    /// Place on the plan, metres.
    pub place: Coord<f64>,
    /// Level above the top of the slab, metres.
    pub level_m: f64,
    /// Forces at jacking, lock-off, transfer and service, kN per tendon, as far as they are known.
    pub forces_kn: [Option<f64>; 4],
}

/// A tendon with its result.
pub fn pair(analysis: &Analysis) -> impl Iterator<Item = (&Tendon, &TendonResult)> {
    analysis.floor.tendons.iter().zip(&analysis.results)
}

/// Works out a floor; `found` are the findings met while reading it. A tendon that lacks something gets no forces and a
/// finding, and the others go on without it.
pub fn work(floor: Floor, job: &Job, found: Vec<Finding>) -> Analysis {
    let tendons = &floor.tendons;
    let curves: Vec<Result<Profile, Refusal>> = tendons
        .par_iter()
        .map(|tendon| Ok(profile::build(tendon, &job.profile)?))
        .collect();
    let stressed: Vec<Result<Pulls<'_>, Refusal>> = tendons
        .par_iter()
        .zip(&curves)
        .map(|(tendon, curve)| stress(tendon, curve.as_ref().map_err(Clone::clone)?, job))
        .collect();
    let stresses_mpa = concrete_stresses(&floor, job, &stressed);
    let turns = turns(tendons, &job.stressing.order);
    let ground = Ground::of(&floor.slab);
    let parts: Vec<(TendonResult, Vec<Finding>)> = (0..tendons.len())
        .into_par_iter()
        .map(|index| {
            let (mut result, refusal) = finish(
                &tendons[index],
                job,
                curves[index].as_ref().ok(),
                stressed[index].as_ref().map_err(Clone::clone),
                stresses_mpa[index],
                turns[index],
                Some(&ground),
            );
            let mut found: Vec<Finding> = refusal
                .and_then(|refusal| refusal.finding(&tendons[index]))
                .into_iter()
                .collect();
            found.extend(check(&tendons[index], &result, &ground, job));
            result.points.shrink_to_fit();
            (result, found)
        })
        .collect();

    let mut findings = found;
    findings.extend(checks::floor(&floor, job));
    let mut results = Vec::with_capacity(parts.len());
    for (result, found) in parts {
        results.push(result);
        findings.extend(found);
    }
    let mean_service_kn: Vec<Option<f64>> = results
        .iter()
        .map(|result: &TendonResult| Some(result.forces.as_ref()?.later?.mean_service_kn))
        .collect();
    findings.extend(checks::required::per_width(&floor, &mean_service_kn));
    findings.extend(by_method::without_loss(&floor.tendons, &results));
    findings.sort_by(in_order);
    let assumptions = assumptions::sentences(&floor, &results, job);
    Analysis {
        floor,
        results,
        findings,
        assumptions,
        fallbacks: Vec::new(),
    }
}

/// Works out one tendon, one of a great many stressed in turn, at this mean concrete stress, MPa, and says what stopped it, if
/// something did.
pub fn work_tendon(
    tendon: &Tendon,
    job: &Job,
    concrete_stress_mpa: Option<f64>,
) -> (TendonResult, Option<Refusal>) {
    let curve = profile::build(tendon, &job.profile).map_err(Refusal::from);
    let stressed = curve
        .as_ref()
        .map_err(Clone::clone)
        .and_then(|curve| stress(tendon, curve, job));
    finish(
        tendon,
        job,
        curve.as_ref().ok(),
        stressed.as_ref().map_err(Clone::clone),
        concrete_stress_mpa,
        Turn::of_many(),
        None,
    )
}

/// Jacks a tendon and locks it off, pull by pull.
///
/// # Errors
/// [`Refusal`] says what is not known, or why there is no force.
pub fn stress<'p>(tendon: &Tendon, curve: &'p Profile, job: &Job) -> Result<Pulls<'p>, Refusal> {
    let steel = steel(tendon, &job.tendon).ok_or(Refusal::SteelUnknown)?;
    let [Some(start), Some(end)] = tendon.ends.map(|end| end.kind) else {
        return Err(Refusal::EndUnknown);
    };
    let first_end = first_end(tendon, &job.stressing.first_pour);
    Ok(Pulls::new(
        curve,
        steel,
        [start, end],
        first_end,
        &job.stressing,
    )?)
}

/// Mean concrete stress of each tendon, MPa: the job's, or from the slab's sections.
fn concrete_stresses(
    floor: &Floor,
    job: &Job,
    stressed: &[Result<Pulls<'_>, Refusal>],
) -> Vec<Option<f64>> {
    let tendons = &floor.tendons;
    if let Some(given_mpa) = job.long_term.concrete_stress_mpa {
        return vec![Some(given_mpa); tendons.len()];
    }
    let paths = || tendons.iter().map(|tendon| &tendon.path);
    let Some(sections) = Sections::cut(&floor.slab, paths()) else {
        return vec![None; tendons.len()];
    };
    let crossings: Vec<Vec<Crossing>> = tendons
        .par_iter()
        .zip(stressed)
        .enumerate()
        .map(|(index, (tendon, stressed))| {
            stressed.as_ref().map_or_else(
                |_| Vec::new(),
                |pulls| sections.crossings(index, &tendon.path, tendon.tendons, pulls),
            )
        })
        .collect();
    sections.stresses_mpa(paths(), &crossings)
}

/// Puts a tendon's result together from what is known of it.
fn finish(
    tendon: &Tendon,
    job: &Job,
    curve: Option<&Profile>,
    stressed: Result<&Pulls<'_>, Refusal>,
    concrete_stress_mpa: Option<f64>,
    turn: Turn,
    ground: Option<&Ground<'_>>,
) -> (TendonResult, Option<Refusal>) {
    let jacked = stressed.as_ref().ok().copied();
    let long_term = &job.long_term;
    let along =
        stressed.map(|pulls| Along::new(pulls, by_method::faces(tendon, ground, long_term)));
    let known = along.as_ref().map_err(Clone::clone).and_then(|along| {
        let stress_mpa = concrete_stress_mpa.ok_or(Refusal::ConcreteStressUnknown)?;
        Ok((along, along.case(long_term, stress_mpa, turn)))
    });
    let mut by_method = Vec::new();
    let effective = known.and_then(|(along, case)| {
        let (method, when) = (long_term.method, by_method::asked(long_term));
        let drawn = Effective::new(along, long_term, method, &case, when);
        by_method = by_method::by_each(tendon, along, long_term, &case, &drawn);
        drawn.map_err(|reason| by_method::refusal(method, reason))
    });
    // Jacking and lock-off ask nothing of the concrete.
    let only_jacked =
        |[jacking_kn, lockoff_kn]: [f64; 2]| [Some(jacking_kn), Some(lockoff_kn), None, None];
    let forces_kn = |station_m| match (&effective, jacked) {
        (Ok(effective), _) => effective.forces_kn(station_m).map(Some),
        (Err(_), Some(jacked)) => only_jacked(jacked.both_kn(station_m)),
        (Err(_), None) => [None; 4],
    };
    let sides_kn = |station_m| -> Vec<[Option<f64>; 4]> {
        match (&effective, jacked) {
            (Ok(effective), _) => effective
                .sides_kn(station_m)
                .map(|kn| kn.map(Some))
                .collect(),
            (Err(_), Some(jacked)) => jacked.sides_kn(station_m).map(only_jacked).collect(),
            (Err(_), None) => vec![[None; 4]],
        }
    };
    let forces = match &effective {
        Ok(effective) => Some(effective.forces()),
        Err(_) => jacked.map(Pulls::forces),
    };
    let points = tendon
        .points
        .iter()
        .map(|point| PointResult {
            angle_rad: curve.map(|curve| curve.angle_rad(point.station_m)),
            level_m: point.level_m(),
            forces_kn: forces_kn(point.station_m),
        })
        .collect();
    let samples = curve.map_or_else(Vec::new, |curve| {
        samples::stations(tendon)
            .into_iter()
            .flat_map(|station_m| {
                let sample = move |forces_kn| Sample {
                    station_m,
                    place: tendon.path.place_at(station_m),
                    level_m: curve.level_m(station_m),
                    forces_kn,
                };
                sides_kn(station_m).into_iter().map(sample)
            })
            .collect()
    });
    let result = TendonResult {
        profile: curve.cloned(),
        strand: strand_size(tendon, &job.tendon).map(|size| size.name.clone()),
        area_mm2: steel(tendon, &job.tendon).map(|steel| steel.area_mm2),
        plan_tightest: checks::plan::tightest_in_plan(&tendon.path),
        turning: curve
            .zip(forces.as_ref())
            .and_then(|(curve, forces)| checks::turning(curve, forces)),
        forces,
        points,
        samples,
        concrete_stress_mpa,
        by_method,
    };
    (result, effective.err())
}

/// What the rules say of a tendon.
fn check(tendon: &Tendon, result: &TendonResult, ground: &Ground<'_>, job: &Job) -> Vec<Finding> {
    let lock_off = |sample: Option<&Sample>| sample?.forces_kn[1];
    let ends = (
        lock_off(result.samples.first()),
        lock_off(result.samples.last()),
    );
    let by_method = by_method::stresses(result);
    let worked = Worked {
        tendon,
        profile: result.profile.as_ref(),
        forces: result.forces.as_ref(),
        turning: result.turning,
        lock_off_kn: match ends {
            (Some(start_kn), Some(end_kn)) => Some([start_kn, end_kn]),
            _ => None,
        },
        by_method: &by_method,
    };
    checks::tendon(&worked, ground, job)
}

/// Worst first, then by rule, tendon, station, place and words: an order that no reading order changes.
fn in_order(a: &Finding, b: &Finding) -> Ordering {
    let place = |finding: &Finding| {
        finding
            .place
            .map_or((f64::MIN, f64::MIN), |at| (at.x, at.y))
    };
    let station_m = |finding: &Finding| finding.station_m.unwrap_or(f64::MIN);
    a.level
        .cmp(&b.level)
        .then_with(|| a.rule.name.cmp(b.rule.name))
        .then_with(|| a.tendon.cmp(&b.tendon))
        .then_with(|| station_m(a).total_cmp(&station_m(b)))
        .then_with(|| place(a).0.total_cmp(&place(b).0))
        .then_with(|| place(a).1.total_cmp(&place(b).1))
        .then_with(|| a.text.cmp(&b.text))
}
