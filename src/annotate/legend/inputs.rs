//! What the forces rest on, in sentences.

use crate::analysis::Analysis;
use crate::job::{Job, LongTermMethod, Pattern, Wobble};
use crate::units::{LONG, PER_LENGTH, SHORT, STRESS, TURN};

/// What the forces rest on: stressing, the drawn method with what it looks at, the methods beside it, heights.
pub(super) fn inputs(analysis: &Analysis, job: &Job) -> Vec<String> {
    let mut said = vec![stressing(job)];
    match job.long_term.method {
        LongTermMethod::Direct => said.extend(direct(job)),
        method => said.push(published(job, method)),
    }
    said.extend(beside(analysis));
    said.push(format!(
        "Heights read as {}{}",
        job.conventions.height,
        by_pattern(job)
    ));
    said
}

fn stressing(job: &Job) -> String {
    let (stressing, units) = (&job.stressing, job.units);
    let wobble = match stressing.wobble {
        Wobble::RadPerM(k) => format!("k {}", units.of(TURN).given(k)),
        Wobble::PerM(k) => {
            let k = units.of(PER_LENGTH).given_figure(k);
            format!("K {k} per {}", units.of(LONG).name)
        }
    };
    format!(
        "Jacking stress {} of strength, friction mu {} per rad, wobble {wobble}, draw-in {}, strand modulus {}",
        stressing.jacking_ratio,
        stressing.mu_per_rad,
        units.of(SHORT).said(1000.0 * stressing.draw_in_m, 1),
        units.of(STRESS).given(job.tendon.strand_modulus_mpa)
    )
}

fn direct(job: &Job) -> [String; 2] {
    let (long_term, stress) = (&job.long_term, job.units.of(STRESS));
    [
        format!(
            "Losses after lock-off by the job's own figures: concrete modulus {} at stressing, {} at 28 days; share of \
             elastic shortening {}",
            stress.given(long_term.concrete_modulus_transfer_mpa),
            stress.given(long_term.concrete_modulus_mpa),
            if job.stressing.order.is_empty() {
                long_term.shortening_share.to_string()
            } else {
                "by the order of stressing".to_owned()
            }
        ),
        format!(
            "Shrinkage strain {}, creep coefficient {}, relaxation {:.1} % at 1000 h, times {} at the end",
            long_term.shrinkage_strain,
            long_term.creep_coefficient,
            100.0 * long_term.relaxation_1000h,
            long_term.relaxation_factor
        ),
    ]
}

/// A published method with the values that it looks at.
fn published(job: &Job, method: LongTermMethod) -> String {
    let (given, stress) = (&job.long_term.published, job.units.of(STRESS));
    let all = [
        (
            "strength_mpa",
            format!("concrete {} at 28 days", stress.given(given.strength_mpa)),
        ),
        (
            "strength_at_stressing_mpa",
            format!(
                "{} at stressing",
                stress.given(given.strength_at_stressing_mpa)
            ),
        ),
        (
            "stressing_days",
            format!("stressed at {} days", given.stressing_days),
        ),
        (
            "curing_days",
            format!("cured to {} days", given.curing_days),
        ),
        ("cement_class", format!("cement {}", given.cement.word())),
        ("humidity_percent", format!("humidity {} %", given.humidity)),
        (
            "environment",
            format!("environment {}", given.environment.word()),
        ),
        (
            "relaxation_class",
            format!("relaxation {}", given.relaxation_class.word()),
        ),
        (
            "bonded",
            if given.bonded { "bonded" } else { "unbonded" }.to_owned(),
        ),
    ];
    let asked: Vec<String> = all
        .into_iter()
        .filter(|(key, _)| method.asks(key, given.bonded))
        .map(|(_, said)| said)
        .collect();
    format!(
        "Losses after lock-off by {} ({}), {}: {}; values that it quotes from memory are marked on the calculation sheet",
        method.word(),
        method.standard(),
        job.long_term.asked_words(),
        asked.join(", ")
    )
}

/// The methods beside the drawn one, and how much hangs on the method.
fn beside(analysis: &Analysis) -> Option<String> {
    let methods = analysis.methods();
    let others: Vec<&str> = methods.iter().skip(1).map(|method| method.word()).collect();
    let spread = analysis.spread();
    (!others.is_empty()).then(|| {
        let apart = spread.map_or_else(String::new, |spread| {
            format!(
                "; between the methods the mean service force of a tendon differs by {:.1} % on average, {:.1} % at most ({})",
                100.0 * spread.mean_ratio,
                100.0 * spread.widest_ratio,
                spread.widest
            )
        });
        format!("Beside it, in the table only: {}{apart}", others.join(", "))
    })
}

/// Patterns that say otherwise.
fn by_pattern(job: &Job) -> String {
    let patterns = job.conventions.height_patterns.iter();
    let own: Vec<&str> = patterns
        .filter(|pattern| {
            pattern.unit.is_some() || pattern.from.is_some() || pattern.datum.is_some()
        })
        .map(Pattern::label)
        .collect();
    if own.is_empty() {
        String::new()
    } else {
        format!(", except by the job's patterns {}", own.join(", "))
    }
}
