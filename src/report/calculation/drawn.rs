//! What the drawing says of the tendon.

use super::{grid, number};
use crate::analysis::TendonResult;
use crate::floor::{EndKind, Point, Tendon};
use crate::job::{HeightReading, Job};
use crate::losses::steel;
use crate::report::DrawingFacts;
use crate::report::table::plain;

/// Heading, strands and steel, points as read.
pub(super) fn part(
    facts: &DrawingFacts,
    job: &Job,
    tendon: &Tendon,
    result: &TendonResult,
) -> String {
    let mut text = vec![format!(
        "Calculation sheet: tendon {} of {} (handle {}, layer {})\n",
        plain(&tendon.mark),
        plain(&facts.file),
        plain(&tendon.handle),
        plain(&tendon.layer)
    )];
    text.push(strands(job, tendon));
    if let Some(required_kn) = tendon.required_kn {
        text.push(format!(
            "  required by its label: {required_kn:.1} kN after losses, all tendons of the line\n"
        ));
    }
    if let Some(required) = tendon.required_kn_per_m {
        text.push(format!(
            "  required by its label: {required:.1} kN/m after losses\n"
        ));
    }
    let ends = tendon.ends.map(|end| match end.kind {
        Some(EndKind::Live) => "live",
        Some(EndKind::Dead) => "dead",
        None => "unknown",
    });
    text.push(format!(
        "  ends: {} at station 0, {} at the last station\n\n",
        ends[0], ends[1]
    ));
    let reading = &job.conventions.height;
    let stepped = tendon.points.iter().any(|point| point.top_m != 0.0);
    let step = if stepped {
        " + top, above the top of the general slab"
    } else {
        ""
    };
    text.push(format!(
        "1. Points: drawn = the drawing's number, {reading};\n   \
         height = from the local soffit to the strands' centroid; level = height - thickness{step}\n"
    ));
    let rows = tendon
        .points
        .iter()
        .zip(&result.points)
        .map(|(point, worked)| {
            let mut row = vec![
                kind(point.kind).to_owned(),
                format!("{:.3}", point.station_m),
                format!("{:.3}", point.place.x),
                format!("{:.3}", point.place.y),
                number(drawn(point, reading), 2),
                number(point.height_m.map(|h| h * 1000.0), 1),
                number(point.thickness_m.map(|t| t * 1000.0), 0),
            ];
            if stepped {
                row.push(number(Some(point.top_m * 1000.0), 0));
            }
            row.push(number(worked.level_m.map(|l| l * 1000.0), 1));
            row
        })
        .collect();
    let drawn = format!("drawn {}", reading.unit.name());
    let mut columns = vec!["point", "station m", "x m", "y m"];
    columns.extend([drawn.as_str(), "height mm", "thickness mm"]);
    if stepped {
        columns.push("top mm");
    }
    columns.push("level mm");
    text.push(grid(1, &columns, rows));
    text.concat()
}

/// The number that stands on the drawing, in its unit.
fn drawn(point: &Point, reading: &HeightReading) -> Option<f64> {
    Some(point.drawn_m? / reading.unit.metres())
}

fn strands(job: &Job, tendon: &Tendon) -> String {
    let several = if tendon.tendons > 1 {
        format!(
            "; the line stands for {} such tendons, forces are for one",
            tendon.tendons
        )
    } else {
        String::new()
    };
    match (tendon.strands, steel(tendon, &job.tendon)) {
        (None | Some(0), _) => "  strands: not known\n".to_owned(),
        (Some(count), Some(steel)) => {
            let one_mm2 = steel.area_mm2 / f64::from(count);
            let jack_kn = steel.jacking_kn(job.stressing.jacking_ratio);
            format!(
                "  {count} strands of {one_mm2} mm2: Ap = {:.1} mm2, fpk = {} MPa, Ep = {} MPa{several}\n  \
                 P0 = {} x {} MPa x {:.1} mm2 / 1000 = {jack_kn:.2} kN\n",
                steel.area_mm2,
                steel.strength_mpa,
                steel.modulus_mpa,
                job.stressing.jacking_ratio,
                steel.strength_mpa,
                steel.area_mm2,
            )
        }
        (Some(count), None) => format!("  {count} strands of a size that the job does not know\n"),
    }
}

/// A point's kind in a word.
pub(super) fn kind(kind: crate::floor::PointKind) -> &'static str {
    use crate::floor::PointKind;
    match kind {
        PointKind::Anchor => "anchor",
        PointKind::High => "high",
        PointKind::Low => "low",
        PointKind::Support => "support",
    }
}
