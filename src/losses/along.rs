//! The places along a tendon, as the methods of long-term loss ask for them.

use super::Pulls;
use super::long_term::{Case, Place, Turn};
use crate::floor::Tendon;
use crate::job::{LongTerm, LongTermMethod};
use crate::numerics::integrate;

/// A stressed tendon in its slab. Between two points of different thickness the slab changes half way.
#[derive(Debug, Clone)]
pub struct Along<'s, 'p> {
    pulls: &'s Pulls<'p>,
    /// Stations from which a thickness holds, metres.
    steps: Vec<(f64, f64)>,
}

impl<'s, 'p> Along<'s, 'p> {
    /// The tendon in the slab that its points give.
    pub fn new(pulls: &'s Pulls<'p>, tendon: &Tendon) -> Self {
        let mut steps: Vec<(f64, f64)> = Vec::new();
        let mut last_m = 0.0;
        for point in &tendon.points {
            let Some(thickness_m) = point.thickness_m else {
                continue;
            };
            let from_m = if steps.is_empty() {
                0.0
            } else {
                f64::midpoint(last_m, point.station_m)
            };
            let same = |&(_, held_m): &(f64, f64)| (held_m - thickness_m).abs() < 1e-9;
            if !steps.last().is_some_and(same) {
                steps.push((from_m, thickness_m));
            }
            last_m = point.station_m;
        }
        Self { pulls, steps }
    }

    /// The tendon.
    pub(super) fn pulls(&self) -> &'s Pulls<'p> {
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

    /// 12 z²/h² at a station, z from mid-depth; 0 where no thickness is known.
    fn eccentricity(&self, station_m: f64) -> f64 {
        let next = self.steps.partition_point(|step| step.0 <= station_m);
        let Some(&(_, thickness_m)) = self.steps.get(next.saturating_sub(1)) else {
            return 0.0;
        };
        let z_m = self.pulls.profile().level_m(station_m) + 0.5 * thickness_m;
        12.0 * (z_m / thickness_m).powi(2)
    }

    /// Means along the tendon in space, quadrature to 1e-7.
    pub(super) fn means<const N: usize>(&self, of: impl Fn(f64) -> [f64; N]) -> [f64; N] {
        let profile = self.pulls.profile();
        let weighted = |station_m: f64| {
            let steep = profile.slope(station_m).hypot(1.0);
            of(station_m).map(|value| value * steep)
        };
        let mut breaks: Vec<f64> = profile.spans.iter().map(|span| span.start_m).collect();
        breaks.extend(self.steps.iter().map(|step| step.0));
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
        let published = job
            .all_methods()
            .iter()
            .any(|&method| method != LongTermMethod::Direct);
        let profile = self.pulls.profile();
        // Level and thickness have their extremes where pieces begin and end, or where the curve is level.
        let stations = profile.spans.iter().flat_map(|span| {
            let turn_m = span.start_m - span.slope / span.curvature_per_m;
            let within = (span.start_m..=span.end_m()).contains(&turn_m);
            [
                span.start_m,
                span.end_m(),
                if within { turn_m } else { span.start_m },
            ]
        });
        let steps = self.steps.iter().map(|step| step.0);
        let most = stations
            .chain(steps)
            .map(|station_m| self.eccentricity(station_m))
            .fold(0.0, f64::max);
        let [eccentricity] = if published {
            self.means(|station_m| [self.eccentricity(station_m)])
        } else {
            [0.0]
        };
        let [thickness_m] = if published && !self.steps.is_empty() {
            self.means(|station_m| {
                let next = self.steps.partition_point(|step| step.0 <= station_m);
                [self
                    .steps
                    .get(next.saturating_sub(1))
                    .map_or(0.0, |step| step.1)]
            })
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
            turn,
            mean: Place {
                lockoff_mpa: mean_mpa,
                eccentricity,
            },
            most_eccentricity: most,
        }
    }

    /// Whether the slab's thickness is known somewhere along the tendon.
    pub(super) fn knows_thickness(&self) -> bool {
        !self.steps.is_empty()
    }
}
