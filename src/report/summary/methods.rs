//! How much hangs on the method of long-term loss.

use crate::analysis::Analysis;
use crate::job::{Job, LongTermMethod};
use crate::report::table::{Align, plain, table};
use crate::units::{STRESS, Unit};

/// Losses and service force by each method, and the spread between them; `None` where the job names one only.
pub(super) fn part(analysis: &Analysis, job: &Job) -> Option<String> {
    let methods = analysis.methods();
    if methods.len() < 2 {
        return None;
    }
    let stress = job.units.of(STRESS);
    let [shortening, shrinkage, creep, relaxation] =
        ["shortening", "shrinkage", "creep", "relaxation"]
            .map(|loss| format!("{loss} {}", stress.name));
    let header = [
        "method",
        "tendons",
        &shortening,
        &shrinkage,
        &creep,
        &relaxation,
        "service/jacking %",
    ];
    let mut rows = vec![header.map(str::to_owned).to_vec()];
    rows.extend(methods.iter().map(|&method| row(analysis, method, stress)));
    let mut aligns = [Align::Right; 7];
    aligns[0] = Align::Left;
    let mut text = format!(
        "Long-term loss by each method{}, means over the tendons that it gives a loss for; {} is drawn and checked:\n{}",
        match job.long_term.published.asked_days {
            None => String::new(),
            Some(_) => format!(" {}", job.long_term.asked_words()),
        },
        methods.first().map_or("", |method| method.word()),
        table(&aligns, &rows)
    );
    if let Some(said) = spread(analysis) {
        text.push_str(&said);
    }
    Some(text)
}

fn row(analysis: &Analysis, method: LongTermMethod, stress: Unit) -> Vec<String> {
    let mut sums = [0.0; 5];
    let mut count = 0_u32;
    for result in &analysis.results {
        let one = result.by_method.iter().find(|one| one.method == method);
        let (Some(Ok(given)), Some(forces)) = (one.map(|one| &one.outcome), &result.forces) else {
            continue;
        };
        count += 1;
        let lost = &given.lost;
        let values = [
            lost.shortening_mpa,
            lost.shrinkage_mpa,
            lost.creep_mpa,
            lost.relaxation_mpa,
            100.0 * given.mean_service_kn / forces.jack_kn,
        ];
        for (sum, value) in sums.iter_mut().zip(values) {
            *sum += value;
        }
    }
    let mut cells = vec![method.word().to_owned(), count.to_string()];
    let [losses @ .., left_percent] = sums.map(|sum| sum / f64::from(count.max(1)));
    cells.extend(losses.map(|loss_mpa| stress.figure(loss_mpa, 1)));
    cells.push(format!("{left_percent:.1}"));
    if count == 0 {
        cells
            .iter_mut()
            .skip(2)
            .for_each(|cell| "-".clone_into(cell));
    }
    cells
}

/// The spread of the mean service force, on average and at its widest.
fn spread(analysis: &Analysis) -> Option<String> {
    let spread = analysis.spread()?;
    Some(format!(
        "  Between the methods the mean service force of a tendon differs by {:.1} % on average, {:.1} % at most ({}).\n",
        100.0 * spread.mean_ratio,
        100.0 * spread.widest_ratio,
        plain(&spread.widest)
    ))
}
