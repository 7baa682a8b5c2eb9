//! Steel in, forces out.

use crate::floor::EndKind;

/// The strands of one tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Steel {
    /// Steel area of all strands of one tendon, mm².
    pub area_mm2: f64,
    /// Characteristic strength, MPa.
    pub strength_mpa: f64,
    /// Modulus, MPa.
    pub modulus_mpa: f64,
}

/// Why a tendon has no forces although its curve is known.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
pub enum CannotStress {
    /// No end is live.
    #[error("neither end is live")]
    NoLiveEnd,
    /// The draw-in is longer than the strand's whole extension.
    #[error("the draw-in takes up the whole extension and leaves no force")]
    DrawInTakesAll,
    /// Friction leaves next to nothing of the jacking force at the far end.
    #[error("friction leaves nothing of the jacking force at the far end")]
    FrictionTakesAll,
    /// Shortening and long-term losses are larger than the force after lock-off.
    #[error("shortening and long-term losses take all the force that lock-off leaves somewhere")]
    LossesTakeAll,
}

/// A tendon that cannot be stressed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
#[error("{reason}")]
pub struct Unstressed {
    /// Which of several segments cannot, in order along the tendon, from 0; `None`: the tendon as a whole.
    pub segment: Option<usize>,
    /// Why not.
    pub reason: CannotStress,
}

impl From<CannotStress> for Unstressed {
    fn from(reason: CannotStress) -> Self {
        Self {
            segment: None,
            reason,
        }
    }
}

/// One of several pulls of a tendon: a segment between two neighbouring anchors.
#[derive(Debug, Clone, PartialEq)]
pub struct Pull {
    /// Stations of its two anchors, metres of plan line.
    pub stations_m: [f64; 2],
    /// Force at them after lock-off, on this segment's side, kN.
    pub lock_off_kn: [f64; 2],
    /// Its forces, as of a tendon by itself; without the later losses, which are the whole tendon's.
    pub forces: Forces,
}

impl Pull {
    /// Its jacked anchors: station, metres, and what the jack does there.
    pub fn jacks(&self) -> impl Iterator<Item = (f64, &EndForces)> {
        let ends = self.stations_m.into_iter().zip(&self.forces.ends);
        ends.filter(|(_, end)| end.kind == EndKind::Live)
    }

    /// Of several pulls, the one that leaves least while it is jacked; of equals, the first.
    pub fn governing(pulls: &[Self]) -> Option<&Self> {
        pulls.iter().min_by(|a, b| {
            let least_kn = |pull: &Self| pull.forces.least_jacking_kn;
            least_kn(a).total_cmp(&least_kn(b))
        })
    }
}

/// Forces of one tendon as a whole; forces at a place are asked of [`super::Pulls`] and [`super::Effective`].
#[derive(Debug, Clone, PartialEq)]
pub struct Forces {
    /// The steel.
    pub steel: Steel,
    /// Jacking force, kN.
    pub jack_kn: f64,
    /// The two ends, at station 0 and at the path's end; of several pulls, each end by its own.
    pub ends: [EndForces; 2],
    /// Losses at jacking and lock-off; of several pulls, of the one that leaves least.
    pub totals: LossTotals,
    /// What comes after lock-off; `None` where the concrete's stress is not known, or where nothing would be left.
    pub later: Option<LaterLosses>,
    /// Least jacking-stage force, kN (the far end of a tendon stressed from one end).
    pub least_jacking_kn: f64,
    /// Station of the least jacking-stage force, metres of plan line.
    pub least_jacking_station_m: f64,
    /// Angle turned from station 0, or from the start of its pull, to there, radians; of a bend there, the share up to its
    /// least force.
    pub least_jacking_angle_rad: f64,
    /// The pulls in order of stressing; none where the tendon is stressed in one.
    pub pulls: Vec<Pull>,
}

/// Forces at an end.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct EndForces {
    /// Live or dead.
    pub kind: EndKind,
    /// Extension at jacking, before draw-in, mm; live ends only.
    pub extension_mm: Option<f64>,
    /// Extension after draw-in, mm; live ends only.
    pub extension_net_mm: Option<f64>,
    /// Length of tendon over which draw-in is felt, metres; live ends only.
    pub draw_in_reach_m: Option<f64>,
    /// Whether the draw-in is felt as far as the other end, or as the other end's draw-in.
    pub draw_in_reaches_far: bool,
}

/// Losses at jacking and lock-off by cause, per tendon.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct LossTotals {
    /// Jacking force lost to angle alone, down to the point of least force: P0 (1 − exp(−μ α)), kN.
    pub friction_curvature_kn: f64,
    /// The rest of the friction loss down to the same point: wobble, kN.
    pub friction_wobble_kn: f64,
    /// Drop at the (first) live anchor by draw-in, kN.
    pub draw_in_kn: f64,
}

/// Losses after lock-off by cause, and what they leave.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct LaterLosses {
    /// Elastic shortening, MPa.
    pub shortening_mpa: f64,
    /// Shrinkage, MPa.
    pub shrinkage_mpa: f64,
    /// Creep, MPa.
    pub creep_mpa: f64,
    /// Relaxation, mean along the tendon, MPa.
    pub relaxation_mpa: f64,
    /// Mean of the service force along the tendon, kN.
    pub mean_service_kn: f64,
}

impl Forces {
    /// Whether it is stressed from both ends at once, as a whole or in one of its pulls.
    pub fn both_live(&self) -> bool {
        if self.pulls.is_empty() {
            return self.ends.iter().all(|end| end.kind == EndKind::Live);
        }
        self.pulls.iter().any(|pull| pull.forces.both_live())
    }
}
