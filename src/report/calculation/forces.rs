//! Draw-in, elastic shortening, long-term loss, the forces that are left, and the extension.

use super::drawn::kind;
use super::pulls::Shown;
use super::{figure, grid, methods, number, over_1000};
use crate::analysis::TendonResult;
use crate::floor::Tendon;
use crate::job::Job;
use crate::losses::Forces;
use crate::units::{FORCE, LONG, SHORT, STEEL, STRESS, WORK};

/// Everything after jacking.
pub(super) fn part(
    job: &Job,
    tendon: &Tendon,
    forces: &Forces,
    pulls: &[Shown<'_>],
    result: &TendonResult,
) -> String {
    let mut parts = vec![draw_in(job, forces, pulls)];
    parts.push(if forces.later.is_some() {
        methods::drawn(job, result)
    } else {
        "5, 6. No losses after lock-off: what the tendon lacks is among the findings below.\n"
            .to_owned()
    });
    parts.push(left(tendon, forces, result, job));
    parts.push(extension(job, forces, pulls));
    parts.push(methods::others(result, job.units));
    parts.push(methods::side_by_side(tendon, result, job));
    parts.retain(|part| !part.is_empty());
    parts.join("\n")
}

/// E A of the tendon, kN.
fn stiffness_kn(forces: &Forces) -> f64 {
    forces.steel.modulus_mpa * forces.steel.area_mm2 / 1000.0
}

fn draw_in(job: &Job, forces: &Forces, pulls: &[Shown<'_>]) -> String {
    let stiffness_kn = stiffness_kn(forces);
    let units = job.units;
    let (force, long) = (units.of(FORCE), units.of(LONG));
    let mut text = vec![format!(
        "4. Lock-off: PA exp(+phi) from the anchor until it meets the earlier curve; area between the curves = draw-in x E A\n  \
         E A = {} x {}{} = {}; area = {} x E A = {}\n",
        units.of(STRESS).given(forces.steel.modulus_mpa),
        units.of(STEEL).said(forces.steel.area_mm2, 1),
        over_1000(units),
        force.said(stiffness_kn, 1),
        units.of(SHORT).given(job.stressing.draw_in_m * 1000.0),
        units
            .of(WORK)
            .said(job.stressing.draw_in_m * stiffness_kn, 3)
    )];
    for pull in pulls {
        for (station_m, locked_kn, end) in pull.jacks() {
            let at = match pull.order {
                Some(order) => format!("pull {order}, anchor at station"),
                None => "anchor at station".to_owned(),
            };
            let ratio =
                locked_kn.map(|kn| kn * 1000.0 / forces.steel.area_mm2 / forces.steel.strength_mpa);
            text.push(format!(
                "  {at} {}: PA = {} {} ({} of fpk), felt over {} {}{}\n",
                long.said(station_m, 3),
                figure(force, locked_kn, 2),
                force.name,
                number(ratio, 4),
                figure(long, end.draw_in_reach_m, 3),
                long.name,
                if end.draw_in_reaches_far {
                    ", as far as the other end or its draw-in"
                } else {
                    ""
                }
            ));
        }
    }
    text.concat()
}

fn left(tendon: &Tendon, forces: &Forces, result: &TendonResult, job: &Job) -> String {
    let units = job.units;
    let (force, long) = (units.of(FORCE), units.of(LONG));
    let rows = tendon
        .points
        .iter()
        .zip(&result.points)
        .map(|(point, worked)| {
            let mut row = vec![kind(point.kind).to_owned(), long.figure(point.station_m, 3)];
            row.extend(worked.forces_kn.map(|force_kn| figure(force, force_kn, 2)));
            row.push(number(
                worked.forces_kn[3].map(|service_kn| service_kn / forces.jack_kn),
                4,
            ));
            row
        })
        .collect();
    let mut text = vec![format!(
        "7. Forces, {} per tendon; service: {}\n",
        force.name,
        job.long_term.asked_words()
    )];
    text.push(grid(
        1,
        &[
            "point",
            &format!("station {}", long.name),
            "jacking",
            "lock-off",
            "transfer",
            "service",
            "service / P0",
        ],
        rows,
    ));
    text.push(format!(
        "  mean service force along the tendon: {} {}\n",
        figure(force, forces.later.map(|later| later.mean_service_kn), 2),
        force.name
    ));
    text.concat()
}

fn extension(job: &Job, forces: &Forces, pulls: &[Shown<'_>]) -> String {
    let stiffness_kn = stiffness_kn(forces);
    let units = job.units;
    let short = units.of(SHORT);
    let mut text = vec!["8. Extension: integral of P ds / (E A), from the jack to the point of least force; net = gross - draw-in\n"
            .to_owned()];
    for pull in pulls {
        let mut gross_of_two_mm = 0.0;
        for (station_m, _, end) in pull.jacks() {
            let (Some(gross_mm), Some(net_mm)) = (end.extension_mm, end.extension_net_mm) else {
                continue;
            };
            gross_of_two_mm += gross_mm;
            let at = match pull.order {
                Some(order) => {
                    let station = units.of(LONG).said(station_m, 3);
                    format!("pull {order}, at station {station}")
                }
                None if station_m <= 0.0 => "at station 0".to_owned(),
                None => "at the last station".to_owned(),
            };
            text.push(format!(
                "  {at}: {} / {} = {} gross; - {} = {} net\n",
                units.of(WORK).said(gross_mm / 1000.0 * stiffness_kn, 2),
                units.of(FORCE).said(stiffness_kn, 1),
                short.said(gross_mm, 1),
                short.given(job.stressing.draw_in_m * 1000.0),
                short.said(net_mm, 1)
            ));
        }
        if pull.forces.both_live() {
            text.push(format!(
                "  both jacks pull together; the two add up to {} gross; with one jack moved from end to end the first \
                 pull is longer and the second shorter\n",
                short.said(gross_of_two_mm, 1)
            ));
        }
    }
    text.push("  strand between anchor and jack is not in these figures\n".to_owned());
    text.concat()
}
