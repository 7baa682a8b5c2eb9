//! The result as CSV tables (RFC 4180), one for each reader: units in the header, as the job wants them, numbers rounded to what is measured.

mod cells;
mod extensions;
mod methods;

pub use self::extensions::extensions_csv;
pub use self::methods::methods_csv;

use self::cells::{end_kind, figure, point_kind, rounded, run, text, written};
use super::record::{FindingRecord, TendonRecord};
use crate::analysis::{Analysis, pair};
use crate::job::LongTermMethod;
use crate::units::{FORCE, LONG, SHORT, STEEL, STRESS, Units};

/// A row a tendon.
pub fn tendons_csv(analysis: &Analysis, units: Units) -> String {
    let (force, stress) = (units.of(FORCE), units.of(STRESS));
    let (long, steel) = (units.of(LONG), units.of(STEEL));
    let header = [
        "mark".to_owned(),
        "handle".to_owned(),
        "layer".to_owned(),
        "run".to_owned(),
        "tendons".to_owned(),
        "strands".to_owned(),
        "strand".to_owned(),
        steel.column("area"),
        long.column("length"),
        long.column("plan_length"),
        long.column("radius_min"),
        long.column("radius_plan_min"),
        "start".to_owned(),
        "end".to_owned(),
        force.column("jacking"),
        "angle_rad".to_owned(),
        "curvature_loss_percent".to_owned(),
        force.column("friction_curvature"),
        force.column("friction_wobble"),
        force.column("draw_in"),
        stress.column("shortening"),
        stress.column("shrinkage"),
        stress.column("creep"),
        stress.column("relaxation"),
        force.column("mean_service"),
        stress.column("concrete_stress"),
        "made".to_owned(),
    ];
    let methods = side_by_side(analysis);
    let more = methods
        .iter()
        .map(|word| force.column(&format!("mean_service_{word}")));
    let spread = (!methods.is_empty()).then(|| "method_spread_percent".to_owned());
    let header = all(&header, more.chain(spread));
    let rows = pair(analysis).map(|(tendon, result)| {
        let record = TendonRecord::of(tendon, result);
        let losses = record.losses.as_ref();
        let jack_kn = result.forces.as_ref().map(|forces| forces.jack_kn);
        let mut row = vec![
            text(record.mark),
            text(record.handle),
            text(record.layer),
            run(record.run).to_owned(),
            record.tendons.to_string(),
            record.strands.map(|n| n.to_string()).unwrap_or_default(),
            text(record.strand.unwrap_or_default()),
            figure(steel, record.area_mm2, 1),
            figure(long, record.length_m, 3),
            figure(long, record.plan_length_m, 3),
            figure(long, record.radius_min_m, 2),
            figure(long, record.radius_plan_min_m, 2),
            end_kind(&record.ends[0]).to_owned(),
            end_kind(&record.ends[1]).to_owned(),
            figure(force, jack_kn, 1),
            rounded(record.angle_rad, 4),
            rounded(record.curvature_loss_ratio.map(|ratio| 100.0 * ratio), 1),
            figure(force, losses.and_then(|l| l.friction_curvature_kn), 1),
            figure(force, losses.and_then(|l| l.friction_wobble_kn), 1),
            figure(force, losses.and_then(|l| l.draw_in_kn), 1),
            figure(stress, losses.and_then(|l| l.shortening_mpa), 1),
            figure(stress, losses.and_then(|l| l.shrinkage_mpa), 1),
            figure(stress, losses.and_then(|l| l.creep_mpa), 1),
            figure(stress, losses.and_then(|l| l.relaxation_mpa), 1),
            figure(force, record.mean_service_kn, 1),
            figure(stress, record.concrete_stress_mpa, 2),
            if record.made { "true" } else { "" }.to_owned(),
        ];
        row.extend(methods.iter().map(|word| {
            let by_method = record.losses_by_method.get(word);
            figure(
                force,
                by_method.and_then(|method| method.mean_service_kn),
                1,
            )
        }));
        if !methods.is_empty() {
            row.push(rounded(
                record.method_spread_ratio.map(|ratio| 100.0 * ratio),
                1,
            ));
        }
        row
    });
    written(&header, rows)
}

/// What a point's height is, whatever the drawing's own datum is.
const HEIGHT_IS: &str = "strand centroid above local soffit";

/// A row a profile point; forces are per tendon.
pub fn points_csv(analysis: &Analysis, units: Units) -> String {
    let (force, long, short) = (units.of(FORCE), units.of(LONG), units.of(SHORT));
    let header = [
        "mark".to_owned(),
        "handle".to_owned(),
        "kind".to_owned(),
        long.column("station"),
        long.column("x"),
        long.column("y"),
        short.column("height"),
        long.column("level"),
        "angle_rad".to_owned(),
        force.column("jacking"),
        force.column("lockoff"),
        force.column("transfer"),
        force.column("service"),
        "height_is".to_owned(),
    ];
    let methods = side_by_side(analysis);
    let header = all(
        &header,
        methods
            .iter()
            .map(|word| force.column(&format!("service_{word}"))),
    );
    let rows = pair(analysis).flat_map(|(tendon, result)| {
        let record = TendonRecord::of(tendon, result);
        let (mark, handle) = (text(record.mark), text(record.handle));
        let methods = methods.clone();
        record.points.into_iter().map(move |point| {
            let mut row = vec![
                mark.clone(),
                handle.clone(),
                point_kind(point.kind).to_owned(),
                figure(long, point.station_m, 3),
                figure(long, point.x_m, 3),
                figure(long, point.y_m, 3),
                figure(short, point.height_mm, 1),
                figure(long, point.level_m, 4),
                rounded(point.angle_rad, 4),
                figure(force, point.jacking_kn, 1),
                figure(force, point.lockoff_kn, 1),
                figure(force, point.transfer_kn, 1),
                figure(force, point.service_kn, 1),
                point.height_mm.map_or("", |_| HEIGHT_IS).to_owned(),
            ];
            row.extend(methods.iter().map(|word| {
                let by_method = point.service_by_method_kn.get(word);
                figure(force, by_method.copied().flatten(), 1)
            }));
            row
        })
    });
    written(&header, rows)
}

/// A row a finding.
pub fn findings_csv(analysis: &Analysis, units: Units) -> String {
    let long = units.of(LONG);
    let header = [
        "rule".to_owned(),
        "level".to_owned(),
        "tendon".to_owned(),
        long.column("station"),
        long.column("x"),
        long.column("y"),
        "text".to_owned(),
        "remedy".to_owned(),
    ];
    let rows = analysis.findings.iter().map(|finding| {
        let record = FindingRecord::of(finding);
        vec![
            record.rule.to_owned(),
            record.level.word().to_owned(),
            text(record.tendon.unwrap_or_default()),
            figure(long, record.station_m, 3),
            figure(long, record.x_m, 3),
            figure(long, record.y_m, 3),
            text(finding.text.in_units(units)),
            text(record.remedy),
        ]
    });
    written(&header, rows)
}

/// Words of the job's methods where there are several, to be shown beside one another.
fn side_by_side(analysis: &Analysis) -> Vec<&'static str> {
    let methods = analysis.methods();
    if methods.len() < 2 {
        return Vec::new();
    }
    methods.into_iter().map(LongTermMethod::word).collect()
}

/// A header with columns that depend on the job.
fn all(header: &[String], more: impl Iterator<Item = String>) -> Vec<String> {
    header.iter().cloned().chain(more).collect()
}
