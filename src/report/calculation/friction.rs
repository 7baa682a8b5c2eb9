//! Jacking: friction from the jack, point by point.

use super::pulls::Shown;
use super::{figure, grid};
use crate::analysis::TendonResult;
use crate::floor::Tendon;
use crate::job::{Job, Wobble};
use crate::losses::{Forces, Friction};
use crate::profile::SAME_PLACE_M;
use crate::units::{FORCE, LONG, PER_LENGTH, TURN};

/// The exponent at each point from each jack, and the force at jacking, pull by pull.
pub(super) fn part(
    job: &Job,
    tendon: &Tendon,
    forces: &Forces,
    pulls: &[Shown<'_>],
    result: &TendonResult,
) -> String {
    let (units, mu) = (job.units, job.stressing.mu_per_rad);
    let force = units.of(FORCE);
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
        if forces.both_live() {
            "; of the two ends' curves the larger holds"
        } else {
            ""
        }
    )];
    if pulls.len() > 1 {
        text.push(
            "   each segment between two anchors is pulled by itself, in this order; a bend at an intermediate anchor is in none\n"
                .to_owned(),
        );
    }
    for pull in pulls {
        text.extend(pull.heading(units));
        text.push(points(job, tendon, pull, result));
    }
    text.concat()
}

fn points(job: &Job, tendon: &Tendon, pull: &Shown<'_>, result: &TendonResult) -> String {
    let units = job.units;
    let (force, long) = (units.of(FORCE), units.of(LONG));
    let (profile, forces) = (pull.curve, pull.forces);
    let friction = Friction::of(&job.stressing);
    let two_jacks = pull.live(0) && pull.live(1);
    let rows = pull
        .stops(tendon, result)
        .into_iter()
        .map(|stop| {
            let station_m = stop.station_m - pull.stations_m[0];
            let [from_start_rad, from_end_rad] = angles_rad(pull, station_m);
            let along_m = profile.arc_length_m(station_m);
            let back_m = profile.length_m() - along_m;
            let mut row = vec![stop.name.to_owned(), long.figure(stop.station_m, 3)];
            for (end, angle_rad, length_m) in
                [(0, from_start_rad, along_m), (1, from_end_rad, back_m)]
            {
                if pull.live(end) {
                    let exponent = friction.exponent(angle_rad, length_m);
                    row.push(format!("{angle_rad:.6}"));
                    row.push(long.figure(length_m, 4));
                    row.push(format!("{exponent:.6}"));
                }
            }
            row.push(figure(force, stop.jacking_kn, 2));
            row
        })
        .collect();
    let [station, along] = ["station", "s"].map(|word| format!("{word} {}", long.name));
    let head = format!("P {}", force.name);
    let mut header = vec!["point", &station];
    for end in [0, 1] {
        if pull.live(end) {
            header.extend(["alpha rad", &along, "phi"]);
        }
    }
    header.push(&head);
    let mut text = vec![grid(1, &header, rows)];
    if two_jacks {
        let last = if pull.order.is_some() {
            "  first alpha, s, phi from the first station; second from the last\n"
        } else {
            "  first alpha, s, phi from station 0; second from the last station\n"
        };
        text.push(last.to_owned());
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

/// Angle from either anchor to a station of the pull: a bend there counts whole from both, since the lesser of its sides is
/// listed; where the curves of two jacks meet within it, each has its share.
fn angles_rad(pull: &Shown<'_>, station_m: f64) -> [f64; 2] {
    let (profile, forces) = (pull.curve, pull.forces);
    let off_m = station_m + pull.stations_m[0] - forces.least_jacking_station_m;
    if forces.both_live() && off_m.abs() <= SAME_PLACE_M {
        let from_start_rad = forces.least_jacking_angle_rad;
        return [from_start_rad, profile.total_angle_rad() - from_start_rad];
    }
    [
        profile.angle_rad(station_m),
        profile.angle_from_end_rad(station_m),
    ]
}
