//! Jacking: friction from the jack, point by point.

use super::drawn::kind;
use super::{figure, grid};
use crate::analysis::TendonResult;
use crate::floor::{EndKind, Tendon};
use crate::job::{Job, Wobble};
use crate::losses::{Forces, Friction};
use crate::profile::{Profile, SAME_PLACE_M};
use crate::units::{FORCE, LONG, PER_LENGTH, TURN};

/// The exponent at each point from each live end, and the force at jacking.
pub(super) fn part(
    job: &Job,
    tendon: &Tendon,
    profile: &Profile,
    forces: &Forces,
    result: &TendonResult,
) -> String {
    let (units, mu) = (job.units, job.stressing.mu_per_rad);
    let (force, long) = (units.of(FORCE), units.of(LONG));
    let formula = match job.stressing.wobble {
        Wobble::RadPerM(k) => {
            let k = units.of(TURN).given(k);
            format!("phi = mu (alpha + k s), mu = {mu} /rad, k = {k} (EN 1992-1-1 5.10.5.2)")
        }
        Wobble::PerM(k) => {
            let k = units.of(PER_LENGTH).given(k);
            format!("phi = mu alpha + K s, mu = {mu} /rad, K = {k}")
        }
    };
    let mut text = vec![format!(
        "3. Jacking: P = P0 exp(-phi), {formula}\n   alpha and s run from the jack; P0 = {}{}\n",
        force.said(forces.jack_kn, 2),
        if live(forces, 0) && live(forces, 1) {
            "; of the two ends' curves the larger holds"
        } else {
            ""
        }
    )];
    let friction = Friction::of(&job.stressing);
    let rows = tendon
        .points
        .iter()
        .zip(&result.points)
        .map(|(point, worked)| {
            let station_m = point.station_m;
            let [from_start_rad, from_end_rad] = angles_rad(profile, forces, station_m);
            let along_m = profile.arc_length_m(station_m);
            let back_m = profile.length_m() - along_m;
            let mut row = vec![kind(point.kind).to_owned(), long.figure(station_m, 3)];
            for (end, angle_rad, length_m) in
                [(0, from_start_rad, along_m), (1, from_end_rad, back_m)]
            {
                if live(forces, end) {
                    let exponent = friction.exponent(angle_rad, length_m);
                    row.push(format!("{angle_rad:.6}"));
                    row.push(long.figure(length_m, 4));
                    row.push(format!("{exponent:.6}"));
                }
            }
            row.push(figure(force, worked.forces_kn[0], 2));
            row
        })
        .collect();
    let [station, along] = ["station", "s"].map(|word| format!("{word} {}", long.name));
    let pull = format!("P {}", force.name);
    let mut header = vec!["point", &station];
    if live(forces, 0) {
        header.extend(["alpha rad", &along, "phi"]);
    }
    if live(forces, 1) {
        header.extend(["alpha rad", &along, "phi"]);
    }
    header.push(&pull);
    text.push(grid(1, &header, rows));
    if live(forces, 0) && live(forces, 1) {
        text.push(
            "  first alpha, s, phi from station 0; second from the last station\n".to_owned(),
        );
    }
    if !profile.bends.is_empty() {
        text.push("  at a bend the force is a step; the least in it is listed\n".to_owned());
    }
    let totals = &forces.totals;
    text.push(format!(
        "  least force {} at station {}, {:.4} of P0\n  \
         lost to angle alone down to there: P0 (1 - exp(-mu alpha)) = {} ({:.2} % of P0); to wobble: {}\n",
        force.said(forces.least_jacking_kn, 2),
        long.said(forces.least_jacking_station_m, 3),
        forces.least_jacking_kn / forces.jack_kn,
        force.said(totals.friction_curvature_kn, 2),
        100.0 * totals.friction_curvature_kn / forces.jack_kn,
        force.said(totals.friction_wobble_kn, 2),
    ));
    text.concat()
}

/// Angle from either end to a station: a bend there counts whole from both, since the lesser of its sides is listed; where
/// the curves of two jacks meet within it, each end has its share.
fn angles_rad(profile: &Profile, forces: &Forces, station_m: f64) -> [f64; 2] {
    let off_m = (station_m - forces.least_jacking_station_m).abs();
    if forces.both_live() && off_m <= SAME_PLACE_M {
        let from_start_rad = forces.least_jacking_angle_rad;
        return [from_start_rad, profile.total_angle_rad() - from_start_rad];
    }
    [
        profile.angle_rad(station_m),
        profile.angle_from_end_rad(station_m),
    ]
}

fn live(forces: &Forces, end: usize) -> bool {
    forces.ends[end].kind == EndKind::Live
}
