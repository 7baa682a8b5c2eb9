//! Runs the tendons of a floor in parallel and gathers results by index; the only file that says `rayon`.

use geo::Coord;

use crate::finding::Finding;
use crate::floor::{Floor, Tendon};
use crate::losses::Forces;
use crate::profile::Profile;

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
}

/// A tendon worked out, as far as it could be.
#[derive(Debug, Clone)]
pub struct TendonResult {
    /// The curve, if every height is known.
    pub profile: Option<Profile>,
    /// The forces, if curve, strands and ends are known.
    pub forces: Option<Forces>,
    /// At each of the tendon's points.
    pub points: Vec<PointResult>,
    /// Between the points too, close enough to draw: stations, places, levels and forces at every stage.
    pub samples: Vec<Sample>,
    /// Mean concrete stress used, MPa.
    pub concrete_stress_mpa: Option<f64>,
}

/// Results at a profile point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PointResult {
    /// Angle turned since station 0, in space, radians.
    pub angle_rad: Option<f64>,
    /// Level above the top of the slab, metres.
    pub level_m: Option<f64>,
    /// Forces at jacking, lock-off, transfer and service, kN per tendon.
    pub forces_kn: Option<[f64; 4]>,
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
    /// Forces at jacking, lock-off, transfer and service, kN per tendon; `None` where they could not be worked out.
    pub forces_kn: Option<[f64; 4]>,
}

/// A tendon with its result.
pub fn pair(analysis: &Analysis) -> impl Iterator<Item = (&Tendon, &TendonResult)> {
    analysis.floor.tendons.iter().zip(&analysis.results)
}
