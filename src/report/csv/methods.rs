//! The tendons by every method of long-term loss.

use super::cells::{figure, text, written};
use crate::analysis::{Analysis, DAYS};
use crate::report::record::TendonRecord;
use crate::units::{FORCE, STRESS, Units};

/// A row a tendon and method, the drawn one first: losses, mean along the tendon, and the mean force against time after
/// stressing. Where a cell is empty `note` says why.
pub fn methods_csv(analysis: &Analysis, units: Units) -> String {
    let (force, stress) = (units.of(FORCE), units.of(STRESS));
    let mut header = ["mark", "handle", "method", "drawn"]
        .map(str::to_owned)
        .to_vec();
    header
        .extend(["shortening", "shrinkage", "creep", "relaxation"].map(|loss| stress.column(loss)));
    header.push(force.column("mean_service"));
    header.extend(DAYS.map(|days| force.column(&format!("mean_after_{days}_days"))));
    header.extend([force.column("mean_final"), "note".to_owned()]);
    let methods = analysis.methods();
    let rows = crate::analysis::pair(analysis).flat_map(|(tendon, result)| {
        let record = TendonRecord::of(tendon, result);
        let rows = methods.iter().enumerate().filter_map(|(place, method)| {
            let given = record.losses_by_method.get(method.word())?;
            let mut row = vec![
                text(record.mark),
                text(record.handle),
                method.word().to_owned(),
                if place == 0 { "true" } else { "" }.to_owned(),
            ];
            let losses = [
                given.shortening_mpa,
                given.shrinkage_mpa,
                given.creep_mpa,
                given.relaxation_mpa,
            ];
            row.extend(losses.map(|loss_mpa| figure(stress, loss_mpa, 1)));
            row.push(figure(force, given.mean_service_kn, 1));
            let in_time = given.mean_force_in_time.iter();
            row.extend(in_time.map(|at| figure(force, at.force_kn, 1)));
            row.push(figure(force, given.mean_force_final_kn, 1));
            let note = given.no_loss.as_ref().or(given.no_force_in_time.as_ref());
            row.push(text(note.map_or("", String::as_str)));
            Some(row)
        });
        rows.collect::<Vec<_>>()
    });
    written(&header, rows)
}
