//! What the drawing says of the tendon.

use super::{figure, grid, number, over_1000};
use crate::analysis::TendonResult;
use crate::floor::{EndKind, Point, Tendon};
use crate::job::{HeightReading, Job};
use crate::losses::{steel, strand_size};
use crate::report::DrawingFacts;
use crate::report::table::plain;
use crate::units::{FORCE, FORCE_PER_WIDTH, LONG, SHORT, STEEL, STRESS, Unit};

/// Heading, strands and steel, points as read.
pub(super) fn part(
    facts: &DrawingFacts,
    job: &Job,
    tendon: &Tendon,
    result: &TendonResult,
) -> String {
    let units = job.units;
    let (long, short) = (units.of(LONG), units.of(SHORT));
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
            "  required by its label: {} after losses, all tendons of the line\n",
            units.of(FORCE).said(required_kn, 1)
        ));
    }
    if let Some(required) = tendon.required_kn_per_m {
        text.push(format!(
            "  required by its label: {} after losses\n",
            units.of(FORCE_PER_WIDTH).said(required, 1)
        ));
    }
    let ends = tendon.ends.map(|end| match end.kind {
        Some(EndKind::Live) => "live",
        Some(EndKind::Dead) => "dead",
        None => "unknown",
    });
    let joints: Vec<String> = tendon
        .joints
        .iter()
        .map(|joint| long.said(joint.station_m, 3))
        .collect();
    let between = if joints.is_empty() {
        String::new()
    } else {
        format!("; intermediate anchors at station {}", joints.join(", "))
    };
    text.push(format!(
        "  ends: {} at station 0, {} at the last station{between}\n\n",
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
                long.figure(point.station_m, 3),
                long.figure(point.place.x, 3),
                long.figure(point.place.y, 3),
                number(drawn(point, reading), 2),
                figure(short, point.height_m.map(|h| h * 1000.0), 1),
                brief(short, point.thickness_m),
            ];
            if stepped {
                row.push(brief(short, Some(point.top_m)));
            }
            row.push(figure(short, worked.level_m.map(|l| l * 1000.0), 1));
            row
        })
        .collect();
    let in_unit = |words: &[&str], unit: Unit| -> Vec<String> {
        words
            .iter()
            .map(|word| format!("{word} {}", unit.name))
            .collect()
    };
    let mut columns = vec!["point".to_owned()];
    columns.extend(in_unit(&["station", "x", "y"], long));
    columns.push(format!("drawn {}", reading.unit.name()));
    columns.extend(in_unit(&["height", "thickness"], short));
    if stepped {
        columns.extend(in_unit(&["top"], short));
    }
    columns.extend(in_unit(&["level"], short));
    let columns: Vec<&str> = columns.iter().map(String::as_str).collect();
    text.push(grid(1, &columns, rows));
    text.concat()
}

/// Whole millimetres mostly: decimals only where there are some.
fn brief(short: Unit, length_m: Option<f64>) -> String {
    length_m.map_or_else(
        || "-".to_owned(),
        |length_m| short.brief_figure(length_m * 1000.0, 1),
    )
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
            let units = job.units;
            let (area, stress) = (units.of(STEEL), units.of(STRESS));
            let size = strand_size(tendon, &job.tendon).map_or("", |size| size.name.as_str());
            let whose = if tendon.strand.is_none() {
                " (the job's default_strand)"
            } else {
                ""
            };
            format!(
                "  {count} strands of size {}{whose}, {} each: Ap = {whole}, fpk = {strength}, Ep = {}{several}\n  \
                 P0 = {} x {strength} x {whole}{} = {}\n",
                plain(size),
                area.given(steel.area_mm2 / f64::from(count)),
                stress.given(steel.modulus_mpa),
                job.stressing.jacking_ratio,
                over_1000(units),
                units
                    .of(FORCE)
                    .said(steel.jacking_kn(job.stressing.jacking_ratio), 2),
                whole = area.said(steel.area_mm2, 1),
                strength = stress.given(steel.strength_mpa),
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
