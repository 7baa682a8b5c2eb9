//! The rules: one rule, one documented name, grouped by what they look at.
//!
//! A rule looks at one tendon and speaks at most once a level, at its worst place, naming the other places in its
//! text; a rule about the job speaks once. Every limit is a key of the job and is named where it is broken.

mod chords;
pub mod cover;
pub mod curvature;
pub mod edge;
pub mod elevation;
pub mod ends;
pub mod ground;
pub mod openings;
pub mod order;
pub mod plan;
pub mod profile;
mod pulls;
pub mod required;
pub mod soffit;
pub mod standards;
pub mod stressing;
#[cfg(test)]
mod testing;
mod words;

pub use curvature::{Turning, turning};
pub use ground::Ground;

use std::sync::LazyLock;

use crate::drawing;
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::{EndKind, Floor, Tendon};
use crate::job::Job;
use crate::losses::Forces;
use crate::profile::Profile;

/// A tendon with what could be worked out of it.
#[derive(Debug, Clone, Copy)]
pub struct Worked<'a> {
    /// The tendon as read.
    pub tendon: &'a Tendon,
    /// Its curve, if every height is known.
    pub profile: Option<&'a Profile>,
    /// Its forces, if curve, strands and ends are known.
    pub forces: Option<&'a Forces>,
    /// How it turns down to its point of least force; with the forces.
    pub turning: Option<Turning>,
    /// Lock-off force at its two anchors, at station 0 and at the path's end, kN; with the forces.
    pub lock_off_kn: Option<[f64; 2]>,
    /// Its greatest stresses by each method of long-term loss that gives one.
    pub by_method: &'a [standards::MethodStress],
}

/// What every rule of one tendon says of it; `ground` is the floor's slab, prepared once for all tendons.
pub fn tendon(worked: &Worked, ground: &Ground, job: &Job) -> Vec<Finding> {
    let chords = chords::Chords::of(&worked.tendon.path);
    let mut found = Vec::new();
    found.extend(ends::no_live_end(worked));
    found.extend(ends::one_end_length(worked, job));
    found.extend(profile::highs_in_a_row(worked));
    found.extend(profile::lows_in_a_row(worked));
    found.extend(elevation::high_below_low(worked));
    found.extend(elevation::support_off_curve(worked, job));
    found.extend(cover::height_outside_cover(worked, ground, &chords, job));
    found.extend(soffit::soffit_doubtful(worked, ground, job));
    found.extend(profile::hogging_radius(worked, job));
    found.extend(profile::sagging_radius(worked, job));
    found.extend(plan::plan_radius(worked, job));
    found.extend(openings::crosses_opening(worked, ground, &chords, job));
    found.extend(edge::leaves_slab(worked, ground, &chords, job));
    found.extend(stressing::far_end_force(worked, job));
    found.extend(curvature::curvature_loss(worked, job));
    found.extend(stressing::anchor_stress(worked, job));
    found.extend(stressing::draw_in_reaches_dead_end(worked));
    found.extend(required::force_below_required(worked));
    found.extend(standards::along(worked, job));
    found
}

/// What the rules say of the floor and the job as a whole.
pub fn floor(floor: &Floor, job: &Job) -> Vec<Finding> {
    let mut found = Vec::new();
    found.extend(stressing::jacking_stress(job));
    found.extend(standards::jacking(job));
    found.extend(order::stressing_order(floor, job));
    found.extend(edge::no_outline(floor));
    found
}

/// Every rule of every stage, by name.
pub fn rules() -> &'static [&'static Rule] {
    static ALL: LazyLock<Vec<&'static Rule>> = LazyLock::new(|| {
        let mut all = [&drawing::READING_RULES[..], &RULES[..]].concat();
        all.sort_by_key(|rule| rule.name);
        all
    });
    &ALL
}

/// This stage's own rules.
static RULES: [&Rule; 21] = [
    &ends::NO_LIVE_END,
    &ends::ONE_END_LENGTH,
    &profile::HIGHS_IN_A_ROW,
    &profile::LOWS_IN_A_ROW,
    &elevation::HIGH_BELOW_LOW,
    &elevation::SUPPORT_OFF_CURVE,
    &cover::HEIGHT_OUTSIDE_COVER,
    &soffit::SOFFIT_DOUBTFUL,
    &profile::HOGGING_RADIUS,
    &profile::SAGGING_RADIUS,
    &plan::PLAN_RADIUS,
    &openings::CROSSES_OPENING,
    &edge::LEAVES_SLAB,
    &stressing::JACKING_STRESS,
    &stressing::FAR_END_FORCE,
    &stressing::ANCHOR_STRESS,
    &stressing::DRAW_IN_REACHES_DEAD_END,
    &curvature::CURVATURE_LOSS,
    &required::FORCE_BELOW_REQUIRED,
    &standards::STANDARD_STRESS,
    &order::STRESSING_ORDER,
];

impl Worked<'_> {
    /// A finding on this tendon at a station.
    fn finding(
        &self,
        rule: &'static Rule,
        level: Level,
        station_m: f64,
        text: impl Into<Wording>,
        remedy: impl Into<String>,
    ) -> Finding {
        Finding::new(rule, level, text, remedy)
            .on_tendon(&self.tendon.mark)
            .at_station(station_m)
            .at_place(self.tendon.path.place_at(station_m))
    }

    /// What the drawing puts at the two ends.
    fn end_kinds(&self) -> [Option<EndKind>; 2] {
        [self.tendon.ends[0].kind, self.tendon.ends[1].kind]
    }

    /// Stations of the two ends, metres.
    fn end_stations_m(&self) -> [f64; 2] {
        [0.0, self.tendon.path.length_m()]
    }
}
