//! Draw-in, elastic shortening, long-term loss, the forces that are left, and the extension.

use super::drawn::kind;
use super::{grid, methods, number};
use crate::analysis::TendonResult;
use crate::floor::{EndKind, Tendon};
use crate::job::Job;
use crate::losses::Forces;

/// Everything after jacking.
pub(super) fn part(job: &Job, tendon: &Tendon, forces: &Forces, result: &TendonResult) -> String {
    let mut parts = vec![draw_in(job, tendon, forces, result)];
    parts.push(if forces.later.is_some() {
        methods::drawn(job, result)
    } else {
        "5, 6. No losses after lock-off: what the tendon lacks is among the findings below.\n"
            .to_owned()
    });
    parts.push(left(tendon, forces, result));
    parts.push(extension(job, forces));
    parts.push(methods::others(result));
    parts.push(methods::side_by_side(tendon, result));
    parts.retain(|part| !part.is_empty());
    parts.join("\n")
}

/// E A of the tendon, kN.
fn stiffness_kn(forces: &Forces) -> f64 {
    forces.steel.modulus_mpa * forces.steel.area_mm2 / 1000.0
}

fn draw_in(job: &Job, tendon: &Tendon, forces: &Forces, result: &TendonResult) -> String {
    let stiffness_kn = stiffness_kn(forces);
    let mut text = vec![format!(
        "4. Lock-off: PA exp(+phi) from the anchor until it meets the earlier curve; area between the curves = draw-in x E A\n  \
         E A = {} MPa x {:.1} mm2 / 1000 = {stiffness_kn:.1} kN; area = {} mm x E A = {:.3} kN m\n",
        forces.steel.modulus_mpa,
        forces.steel.area_mm2,
        job.stressing.draw_in_m * 1000.0,
        job.stressing.draw_in_m * stiffness_kn
    )];
    for (index, end) in forces.ends.iter().enumerate() {
        let point = if index == 0 {
            result.points.first()
        } else {
            result.points.last()
        };
        let locked = point.and_then(|point| point.forces_kn[1]);
        if end.kind == EndKind::Live {
            text.push(format!(
                "  {}: PA = {} kN ({} of fpk), felt over {} m{}\n",
                station(tendon, index),
                number(locked, 2),
                number(
                    locked
                        .map(|kn| kn * 1000.0 / forces.steel.area_mm2 / forces.steel.strength_mpa),
                    4
                ),
                number(end.draw_in_reach_m, 3),
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

fn station(tendon: &Tendon, end: usize) -> String {
    format!(
        "anchor at station {:.3} m",
        if end == 0 {
            0.0
        } else {
            tendon.path.length_m()
        }
    )
}

fn left(tendon: &Tendon, forces: &Forces, result: &TendonResult) -> String {
    let rows = tendon
        .points
        .iter()
        .zip(&result.points)
        .map(|(point, worked)| {
            let mut row = vec![
                kind(point.kind).to_owned(),
                format!("{:.3}", point.station_m),
            ];
            row.extend(worked.forces_kn.map(|force_kn| number(force_kn, 2)));
            row.push(number(
                worked.forces_kn[3].map(|service_kn| service_kn / forces.jack_kn),
                4,
            ));
            row
        })
        .collect();
    let mut text = vec!["7. Forces, kN per tendon\n".to_owned()];
    text.push(grid(
        1,
        &[
            "point",
            "station m",
            "jacking",
            "lock-off",
            "transfer",
            "service",
            "service / P0",
        ],
        rows,
    ));
    text.push(format!(
        "  mean service force along the tendon: {} kN\n",
        number(forces.later.map(|later| later.mean_service_kn), 2)
    ));
    text.concat()
}

fn extension(job: &Job, forces: &Forces) -> String {
    let stiffness_kn = stiffness_kn(forces);
    let mut text = vec!["8. Extension: integral of P ds / (E A), from the jack to the point of least force; net = gross - draw-in\n"
            .to_owned()];
    for (end, name) in forces.ends.iter().zip(["station 0", "the last station"]) {
        if let (Some(gross_mm), Some(net_mm)) = (end.extension_mm, end.extension_net_mm) {
            text.push(format!(
                "  at {name}: {:.2} kN m / {stiffness_kn:.1} kN = {gross_mm:.1} mm gross; - {} mm = {net_mm:.1} mm net\n",
                gross_mm / 1000.0 * stiffness_kn,
                job.stressing.draw_in_m * 1000.0
            ));
        }
    }
    if forces.ends.iter().all(|end| end.kind == EndKind::Live) {
        let total_mm: f64 = forces.ends.iter().filter_map(|end| end.extension_mm).sum();
        text.push(format!(
            "  both jacks pull together; the two add up to {total_mm:.1} mm gross; with one jack moved from end to end \
             the first pull is longer and the second shorter\n"
        ));
    }
    text.push("  strand between anchor and jack is not in these figures\n".to_owned());
    text.concat()
}
