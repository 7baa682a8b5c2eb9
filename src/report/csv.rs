//! The result as CSV tables (RFC 4180), one for each reader: units in the header, numbers rounded to what is measured.

mod cells;

use self::cells::{end_kind, point_kind, rounded, run, text, written};
use super::record::{FindingRecord, TendonRecord};
use crate::analysis::{Analysis, pair};
use crate::job::LongTermMethod;

/// A row a tendon.
pub fn tendons_csv(analysis: &Analysis) -> String {
    let header = [
        "mark",
        "handle",
        "layer",
        "run",
        "tendons",
        "strands",
        "strand",
        "area_mm2",
        "length_m",
        "plan_length_m",
        "radius_min_m",
        "radius_plan_min_m",
        "start",
        "end",
        "jacking_kn",
        "angle_rad",
        "curvature_loss_percent",
        "friction_curvature_kn",
        "friction_wobble_kn",
        "draw_in_kn",
        "shortening_mpa",
        "shrinkage_mpa",
        "creep_mpa",
        "relaxation_mpa",
        "mean_service_kn",
        "concrete_stress_mpa",
        "made",
    ];
    let methods = side_by_side(analysis);
    let more = methods.iter().map(|word| format!("mean_service_{word}_kn"));
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
            rounded(record.area_mm2, 1),
            rounded(record.length_m, 3),
            rounded(record.plan_length_m, 3),
            rounded(record.radius_min_m, 2),
            rounded(record.radius_plan_min_m, 2),
            end_kind(&record.ends[0]).to_owned(),
            end_kind(&record.ends[1]).to_owned(),
            rounded(jack_kn, 1),
            rounded(record.angle_rad, 4),
            rounded(record.curvature_loss_ratio.map(|ratio| 100.0 * ratio), 1),
            rounded(losses.and_then(|l| l.friction_curvature_kn), 1),
            rounded(losses.and_then(|l| l.friction_wobble_kn), 1),
            rounded(losses.and_then(|l| l.draw_in_kn), 1),
            rounded(losses.and_then(|l| l.shortening_mpa), 1),
            rounded(losses.and_then(|l| l.shrinkage_mpa), 1),
            rounded(losses.and_then(|l| l.creep_mpa), 1),
            rounded(losses.and_then(|l| l.relaxation_mpa), 1),
            rounded(record.mean_service_kn, 1),
            rounded(record.concrete_stress_mpa, 2),
            if record.made { "true" } else { "" }.to_owned(),
        ];
        row.extend(methods.iter().map(|word| {
            let by_method = record.losses_by_method.get(word);
            rounded(by_method.and_then(|method| method.mean_service_kn), 1)
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

/// What `height_mm` is, whatever the drawing's own datum is.
const HEIGHT_IS: &str = "strand centroid above local soffit";
/// What an extension at either of two live ends is.
const BOTH_LIVE: &str =
    "both jacks pull together; with one jack moved from end to end the first pull is longer";
/// What no extension holds.
const BEYOND_ANCHOR: &str = "strand between anchor and jack is not included";

/// A row a profile point; forces are per tendon.
pub fn points_csv(analysis: &Analysis) -> String {
    let header = [
        "mark",
        "handle",
        "kind",
        "station_m",
        "x_m",
        "y_m",
        "height_mm",
        "level_m",
        "angle_rad",
        "jacking_kn",
        "lockoff_kn",
        "transfer_kn",
        "service_kn",
        "height_is",
    ];
    let methods = side_by_side(analysis);
    let header = all(
        &header,
        methods.iter().map(|word| format!("service_{word}_kn")),
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
                rounded(point.station_m, 3),
                rounded(point.x_m, 3),
                rounded(point.y_m, 3),
                rounded(point.height_mm, 1),
                rounded(point.level_m, 4),
                rounded(point.angle_rad, 4),
                rounded(point.jacking_kn, 1),
                rounded(point.lockoff_kn, 1),
                rounded(point.transfer_kn, 1),
                rounded(point.service_kn, 1),
                point.height_mm.map_or("", |_| HEIGHT_IS).to_owned(),
            ];
            row.extend(methods.iter().map(|word| {
                let by_method = point.service_by_method_kn.get(word);
                rounded(by_method.copied().flatten(), 1)
            }));
            row
        })
    });
    written(&header, rows)
}

/// A row a live end, with empty cells where the extension is not known.
pub fn extensions_csv(analysis: &Analysis) -> String {
    let header = [
        "mark",
        "handle",
        "end",
        "x_m",
        "y_m",
        "tendons",
        "strands",
        "strand",
        "jacking_kn",
        "extension_mm",
        "extension_net_mm",
        "draw_in_reach_m",
        "note",
    ];
    let rows = pair(analysis).flat_map(|(tendon, result)| {
        let record = TendonRecord::of(tendon, result);
        let note = if record.ends.iter().all(|end| end.live.is_some()) {
            format!("{BOTH_LIVE}; {BEYOND_ANCHOR}")
        } else {
            BEYOND_ANCHOR.to_owned()
        };
        let known = [
            text(record.mark),
            text(record.handle),
            record.tendons.to_string(),
            record.strands.map(|n| n.to_string()).unwrap_or_default(),
            text(record.strand.unwrap_or_default()),
        ];
        ["start", "end"]
            .into_iter()
            .zip(record.ends)
            .filter_map(move |(which, end)| {
                let live = end.live?;
                let [mark, handle, tendons, strands, strand] = known.clone();
                Some(vec![
                    mark,
                    handle,
                    which.to_owned(),
                    rounded(end.x_m, 3),
                    rounded(end.y_m, 3),
                    tendons,
                    strands,
                    strand,
                    rounded(live.jacking_kn, 1),
                    rounded(live.extension_mm, 1),
                    rounded(live.extension_net_mm, 1),
                    rounded(live.draw_in_reach_m, 2),
                    note.clone(),
                ])
            })
    });
    written(&header, rows)
}

/// A row a finding.
pub fn findings_csv(analysis: &Analysis) -> String {
    let header = [
        "rule",
        "level",
        "tendon",
        "station_m",
        "x_m",
        "y_m",
        "text",
        "remedy",
    ];
    let rows = analysis.findings.iter().map(|finding| {
        let record = FindingRecord::of(finding);
        vec![
            record.rule.to_owned(),
            record.level.word().to_owned(),
            text(record.tendon.unwrap_or_default()),
            rounded(record.station_m, 3),
            rounded(record.x_m, 3),
            rounded(record.y_m, 3),
            text(record.text),
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
fn all(header: &[&str], more: impl Iterator<Item = String>) -> Vec<String> {
    header
        .iter()
        .map(|&name| name.to_owned())
        .chain(more)
        .collect()
}
