//! The places along a tendon, as the methods of long-term loss ask for them.

use super::Pulls;
use super::long_term::{Case, Place, Turn};
use crate::floor::{Faces, Tendon};
use crate::job::LongTerm;
use crate::numerics::integrate;

/// A stressed tendon in its slab.
#[derive(Debug, Clone)]
pub struct Along<'s, 'p> {
    pulls: &'s Pulls<'p>,
    /// Where the concrete lies, from each station on.
    steps: Vec<Step>,
}

/// From a station on the concrete lies so.
#[expect(clippy::struct_field_names, reason = "each says its unit")]
#[derive(Debug, Clone, Copy)]
struct Step {
    from_m: f64,
    top_m: f64,
    thickness_m: f64,
}

impl Step {
    /// 12 z²/h² of a level, z from mid-depth.
    fn eccentricity(&self, level_m: f64) -> f64 {
        let z_m = level_m - (self.top_m - 0.5 * self.thickness_m);
        12.0 * (z_m / self.thickness_m).powi(2)
    }
}

/// Where the concrete lies along a tendon, as far as its own points tell, from each station on: between two points that
/// differ it changes half way.
pub fn faces_by_points(tendon: &Tendon) -> Vec<(f64, Faces)> {
    let known = tendon
        .points
        .iter()
        .filter(|point| point.thickness_m.is_some());
    let mut faces: Vec<(f64, Faces)> = Vec::new();
    let mut last_m = 0.0;
    for point in known {
        let from_m = if faces.is_empty() {
            0.0
        } else {
            f64::midpoint(last_m, point.station_m)
        };
        if faces.last().is_none_or(|last| last.1 != point.faces()) {
            faces.push((from_m, point.faces()));
        }
        last_m = point.station_m;
    }
    faces
}

impl<'s, 'p> Along<'s, 'p> {
    /// The tendon in a slab that lies so from each station on, in order; a stretch of unknown thickness is passed over.
    pub fn new(pulls: &'s Pulls<'p>, faces: impl IntoIterator<Item = (f64, Faces)>) -> Self {
        let step = |(from_m, faces): (f64, Faces)| {
            Some(Step {
                from_m,
                top_m: faces.top_m,
                thickness_m: faces.thickness_m.filter(|&thick_m| thick_m > 0.0)?,
            })
        };
        let steps = faces.into_iter().filter_map(step).collect();
        Self { pulls, steps }
    }

    /// The tendon.
    pub fn pulls(&self) -> &'s Pulls<'p> {
        self.pulls
    }

    /// The place at a station.
    pub(super) fn place(&self, station_m: f64) -> Place {
        self.place_of(station_m, self.pulls.lockoff_kn(station_m))
    }

    /// The place at a station, its force after lock-off known.
    pub(super) fn place_of(&self, station_m: f64, lockoff_kn: f64) -> Place {
        Place {
            lockoff_mpa: self.pulls.steel().stress_mpa(lockoff_kn),
            eccentricity: self.eccentricity(station_m),
        }
    }

    /// (A/I) z² at a station; 0 where no thickness is known.
    fn eccentricity(&self, station_m: f64) -> f64 {
        let level_m = self.pulls.profile().level_m(station_m);
        self.step(station_m)
            .map_or(0.0, |step| step.eccentricity(level_m))
    }

    /// How the concrete lies at a station.
    fn step(&self, station_m: f64) -> Option<&Step> {
        let next = self.steps.partition_point(|step| step.from_m <= station_m);
        self.steps.get(next.saturating_sub(1))
    }

    /// Greatest (A/I) z²: level and slab have their extremes where pieces begin and end, where the curve is level, and on
    /// both sides of a step.
    fn most_eccentricity(&self) -> f64 {
        let profile = self.pulls.profile();
        let of_curve = profile.spans.iter().flat_map(|span| {
            let turn_m = span.start_m - span.slope / span.curvature_per_m;
            let within = (span.start_m..=span.end_m()).contains(&turn_m);
            [
                span.start_m,
                span.end_m(),
                if within { turn_m } else { span.start_m },
            ]
        });
        let before_steps = self.steps.windows(2).filter_map(|pair| {
            let [before, after] = pair else { return None };
            Some(before.eccentricity(profile.level_m(after.from_m)))
        });
        of_curve
            .chain(self.steps.iter().map(|step| step.from_m))
            .map(|station_m| self.eccentricity(station_m))
            .chain(before_steps)
            .fold(0.0, f64::max)
    }

    /// Means along the tendon in space, quadrature to 1e-7.
    pub(super) fn means<const N: usize>(&self, of: impl Fn(f64) -> [f64; N]) -> [f64; N] {
        let profile = self.pulls.profile();
        let weighted = |station_m: f64| {
            let steep = profile.slope(station_m).hypot(1.0);
            of(station_m).map(|value| value * steep)
        };
        let mut breaks: Vec<f64> = profile.spans.iter().map(|span| span.start_m).collect();
        breaks.extend(self.steps.iter().map(|step| step.from_m));
        breaks.extend(profile.bends.iter().map(|bend| bend.station_m));
        breaks.extend(self.pulls.anchors_m());
        breaks.push(profile.plan_length_m());
        breaks.sort_by(f64::total_cmp);
        let mut sums = [0.0; N];
        for pair in breaks.windows(2) {
            let [from_m, to_m] = [pair[0], pair[1]];
            if to_m > from_m {
                let piece = integrate(&weighted, from_m, to_m);
                for (sum, value) in sums.iter_mut().zip(piece) {
                    *sum += value;
                }
            }
        }
        sums.map(|sum| sum / profile.length_m())
    }

    /// The tendon as the job's methods see it, at this mean concrete stress, MPa.
    pub fn case(&self, job: &LongTerm, concrete_stress_mpa: f64, turn: Turn) -> Case {
        let steel = self.pulls.steel();
        let mean_mpa = steel.stress_mpa(self.pulls.mean_lockoff_kn());
        let published = job.asks_published();
        let [eccentricity] = if published {
            self.means(|station_m| [self.eccentricity(station_m)])
        } else {
            [0.0]
        };
        let [thickness_m] = if published && self.knows_thickness() {
            self.means(|station_m| [self.step(station_m).map_or(0.0, |step| step.thickness_m)])
        } else {
            [0.0]
        };
        let own_m = (thickness_m > 0.0).then_some(thickness_m);
        Case {
            steel,
            concrete_stress_mpa,
            // Ap fp = Ac σc: the strand's share of the floor.
            steel_ratio: concrete_stress_mpa / mean_mpa,
            notional_thickness_mm: job
                .published
                .notional_thickness_m
                .or(own_m)
                .map(|m| 1e3 * m),
            thickness_given: job.published.notional_thickness_m.is_some(),
            turn,
            mean: Place {
                lockoff_mpa: mean_mpa,
                eccentricity,
            },
            most_eccentricity: self.most_eccentricity(),
        }
    }

    /// Whether the slab's thickness is known somewhere along the tendon.
    pub(super) fn knows_thickness(&self) -> bool {
        !self.steps.is_empty()
    }
}
