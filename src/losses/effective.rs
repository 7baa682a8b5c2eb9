//! A stressed tendon after the concrete has shortened and after the long-term losses: transfer and service.

use super::along::Along;
use super::long_term::{Case, Lost, Method, NoLoss, Place, When};
use super::pulls::least;
use super::{CannotStress, Forces, LaterLosses};
use crate::job::{LongTerm, LongTermMethod};

/// A stressed tendon with its later losses: force at all four stages, anywhere.
#[derive(Debug, Clone, Copy)]
pub struct Effective<'a> {
    along: &'a Along<'a, 'a>,
    method: Method,
    mean: Place,
    /// Whether each place loses by its own stress, or all by the mean.
    places: Places,
    mean_lost: Lost,
}

/// Where a method looks.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Places {
    /// At each place.
    Each,
    /// At the mean of the tendon, for all its places.
    Mean,
}

/// Why there is no force at transfer and in service.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum NoForce {
    /// Nothing would be left.
    #[error(transparent)]
    Stress(#[from] CannotStress),
    /// The method gives no loss.
    #[error(transparent)]
    Loss(#[from] NoLoss),
}

impl<'a> Effective<'a> {
    /// Later losses of a tendon by a method.
    ///
    /// # Errors
    /// [`NoForce`] where the method gives no loss, or where no force would be left somewhere.
    pub fn new(
        along: &'a Along<'a, 'a>,
        job: &LongTerm,
        method: LongTermMethod,
        case: &Case,
        when: When,
    ) -> Result<Self, NoForce> {
        let places = if method == LongTermMethod::Direct || job.published.bonded {
            Places::Each
        } else {
            Places::Mean
        };
        if method != LongTermMethod::Direct && !along.knows_thickness() {
            return Err(NoLoss::ThicknessUnknown(method.word()).into());
        }
        let method = Method::new(method, job, case, when)?;
        let mut effective = Self {
            along,
            method,
            mean: case.mean,
            places,
            mean_lost: method.at(case.mean),
        };
        let pulls = along.pulls();
        let least_mpa = pulls.steel().stress_mpa(pulls.least_lockoff_kn());
        for eccentricity in [0.0, case.most_eccentricity] {
            let worst = Place {
                lockoff_mpa: least_mpa,
                eccentricity,
            };
            let lost = method.at(effective.seen(worst));
            let left_mpa = least_mpa - lost.all_mpa();
            if left_mpa.is_nan() || left_mpa <= 0.0 {
                return Err(CannotStress::LossesTakeAll.into());
            }
        }
        if places == Places::Each && !method.is_linear() {
            let [shortening_mpa, shrinkage_mpa, creep_mpa, relaxation_mpa] =
                along.means(|station_m| {
                    let lost = method.at(along.place(station_m));
                    [
                        lost.shortening_mpa,
                        lost.shrinkage_mpa,
                        lost.creep_mpa,
                        lost.relaxation_mpa,
                    ]
                });
            effective.mean_lost = Lost {
                shortening_mpa,
                shrinkage_mpa,
                creep_mpa,
                relaxation_mpa,
            };
        }
        Ok(effective)
    }

    /// The method.
    pub fn method(&self) -> Method {
        self.method
    }

    /// The mean of the losses along the tendon, MPa.
    pub fn mean_lost(&self) -> Lost {
        self.mean_lost
    }

    /// The mean of the tendon's places.
    pub fn mean_place(&self) -> Place {
        self.mean
    }

    /// What the method looks at for this place.
    fn seen(&self, place: Place) -> Place {
        match self.places {
            Places::Each => place,
            Places::Mean => self.mean,
        }
    }

    /// Force at jacking, lock-off, transfer and service, kN, of each segment that holds a station: two at an intermediate
    /// anchor, in order along the tendon. At a bend, the least in it.
    pub fn sides_kn(&self, station_m: f64) -> impl Iterator<Item = [f64; 4]> {
        let pulls = self.along.pulls();
        let steel = pulls.steel();
        pulls
            .sides_kn(station_m)
            .map(move |[jacking_kn, lockoff_kn]| {
                let place = self.along.place_of(station_m, lockoff_kn);
                let lost = self.method.at(self.seen(place));
                let transfer_kn = lockoff_kn - steel.force_kn(lost.shortening_mpa);
                let service_kn = transfer_kn - steel.force_kn(lost.long_term_mpa());
                [jacking_kn, lockoff_kn, transfer_kn, service_kn]
            })
    }

    /// Force at jacking, lock-off, transfer and service, kN: the least at the station.
    pub fn forces_kn(&self, station_m: f64) -> [f64; 4] {
        least(self.sides_kn(station_m))
    }

    /// Effective force, kN: the least at the station.
    pub fn service_kn(&self, station_m: f64) -> f64 {
        self.forces_kn(station_m)[3]
    }

    /// Mean effective force along the tendon, kN.
    pub fn mean_service_kn(&self) -> f64 {
        let pulls = self.along.pulls();
        pulls.mean_lockoff_kn() - pulls.steel().force_kn(self.mean_lost.all_mpa())
    }

    /// What is reported of the tendon as a whole.
    pub fn forces(&self) -> Forces {
        let lost = &self.mean_lost;
        Forces {
            later: Some(LaterLosses {
                shortening_mpa: lost.shortening_mpa,
                shrinkage_mpa: lost.shrinkage_mpa,
                creep_mpa: lost.creep_mpa,
                relaxation_mpa: lost.relaxation_mpa,
                mean_service_kn: self.mean_service_kn(),
            }),
            ..self.along.pulls().forces()
        }
    }
}
