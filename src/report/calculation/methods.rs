//! Elastic shortening and long-term loss, equation by equation, by every method that the job names; side by side at the end.

use super::drawn::kind;
use super::{figure, grid};
use crate::analysis::{DAYS, MethodForces, MethodResult, TendonResult};
use crate::floor::Tendon;
use crate::job::{Job, LongTermMethod};
use crate::losses::long_term::Equation;
use crate::units::{FORCE, LONG, STRESS, Unit, Units};

/// Concrete stress, and the working of the drawn method.
pub(super) fn drawn(job: &Job, result: &TendonResult) -> String {
    let mut text = concrete_stress(job, result);
    if let Some((method, forces)) = given(result).next() {
        text.push_str(&working("6.", method, forces, job.units));
    }
    text
}

/// The working of the methods beside the drawn one; nothing where there is none.
pub(super) fn others(result: &TendonResult, units: Units) -> String {
    let mut parts = Vec::new();
    for (count, other) in (1..).zip(result.by_method.iter().skip(1)) {
        let number = format!("9.{count}");
        parts.push(match &other.outcome {
            Ok(forces) => working(&number, other.method, forces, units),
            Err(reason) => format!(
                "{number} Method {}: no loss. {reason}\n",
                other.method.word()
            ),
        });
    }
    parts.join("\n")
}

fn concrete_stress(job: &Job, result: &TendonResult) -> String {
    let stress = job.units.of(STRESS);
    format!(
        "5. Mean concrete stress along the tendon: sigma_c = {} {}, {}\n\n",
        figure(stress, result.concrete_stress_mpa, 4),
        stress.name,
        if job.long_term.concrete_stress_mpa.is_some() {
            "given by the job"
        } else {
            "from the floor's lock-off forces over the slab's sections in this direction"
        }
    )
}

fn given(result: &TendonResult) -> impl Iterator<Item = (LongTermMethod, &MethodForces)> {
    result
        .by_method
        .iter()
        .filter_map(|one| Some((one.method, one.outcome.as_ref().ok()?)))
}

fn working(number: &str, method: LongTermMethod, forces: &MethodForces, units: Units) -> String {
    let stress = units.of(STRESS);
    let (mean, lost) = (&forces.mean, &forces.lost);
    let equations = forces.made.equations(*mean);
    // A method that does not ask for the tendon's level was not told it.
    let level = if mean.eccentricity > 0.0 {
        format!(", (A/I) z^2 = {:.4}", mean.eccentricity)
    } else {
        String::new()
    };
    let mut text = vec![format!(
        "{number} Elastic shortening and long-term loss, method {}, where the tendon is at its mean: {} after lock-off{level}\n",
        method.word(),
        stress.said(mean.lockoff_mpa, 3),
    )];
    if units == Units::Us {
        text.push(format!(
            "  equations as published in {}\n",
            published_in(method)
        ));
    }
    text.extend(equations.iter().map(|equation| line(equation, units)));
    text.push(format!(
        "  mean along the tendon: shortening {}, shrinkage {}, creep {}, relaxation {}, together {}\n",
        stress.figure(lost.shortening_mpa, 3),
        stress.figure(lost.shrinkage_mpa, 3),
        stress.figure(lost.creep_mpa, 3),
        stress.figure(lost.relaxation_mpa, 3),
        stress.said(lost.all_mpa(), 3)
    ));
    let mut from_memory: Vec<&str> = Vec::new();
    for equation in equations.iter().filter(|equation| equation.from_memory) {
        if !from_memory.contains(&equation.clause) {
            from_memory.push(equation.clause);
        }
    }
    if !from_memory.is_empty() {
        text.push(format!(
            "  quoted from memory, to be checked against the standard: {}\n",
            from_memory.join("; ")
        ));
    }
    text.concat()
}

/// The units that a method is published in.
fn published_in(method: LongTermMethod) -> &'static str {
    match method {
        LongTermMethod::Aci423 => "psi and inches",
        _ => "SI: stresses in MPa, lengths in mm",
    }
}

fn line(equation: &Equation, units: Units) -> String {
    let mut parts = vec![equation.symbol, equation.formula, &equation.numbers];
    let value = format!("{} {}", equation.value_text(), equation.unit);
    parts.push(value.trim_end());
    let in_us = match units {
        Units::Us if equation.unit == "MPa" => units.of(STRESS).said(equation.value, 3),
        _ => String::new(),
    };
    parts.push(&in_us);
    parts.retain(|part| !part.is_empty());
    let at = if equation.at.is_empty() {
        String::new()
    } else {
        format!(", at {}", equation.at)
    };
    let memory = if equation.from_memory {
        ", from memory"
    } else {
        ""
    };
    format!(
        "  {}{at}   [{}{memory}]\n",
        parts.join(" = "),
        equation.clause
    )
}

/// Service force by each method, point by point, and the mean force against time.
pub(super) fn side_by_side(tendon: &Tendon, result: &TendonResult, job: &Job) -> String {
    let units = job.units;
    let force = units.of(FORCE);
    let methods = &result.by_method;
    let mut text = Vec::new();
    if methods.len() > 1 {
        text.push(format!(
            "10. Service force by each method, {} per tendon, {}\n",
            force.name,
            job.long_term.asked_words()
        ));
        text.push(points(tendon, methods, units));
        if let Some(spread) = result.spread() {
            text.push(format!(
                "  mean service force: {} by {}, {} by {}; spread {}, {:.1} % of the drawn method's\n",
                force.said(spread.least_kn, 2),
                spread.least.word(),
                force.said(spread.greatest_kn, 2),
                spread.greatest.word(),
                force.said(spread.greatest_kn - spread.least_kn, 2),
                100.0 * spread.ratio
            ));
        }
    }
    if methods.iter().any(|one| one.final_kn.is_some()) {
        text.push(format!(
            "{}. Mean force along the tendon against time after stressing, {} per tendon\n",
            if methods.len() > 1 { "\n11" } else { "9" },
            force.name
        ));
        text.push(in_time(methods, force));
        text.extend(methods.iter().filter_map(without_time));
    }
    text.concat()
}

/// Why a method's row holds no force before the end, or none at all.
fn without_time(one: &MethodResult) -> Option<String> {
    let reason = match &one.outcome {
        Ok(_) => one.no_force_in_time()?.to_string(),
        Err(reason) => format!("{}: no loss. {reason}", one.method.word()),
    };
    Some(format!("  {reason}\n"))
}

fn points(tendon: &Tendon, methods: &[MethodResult], units: Units) -> String {
    let (force, long) = (units.of(FORCE), units.of(LONG));
    let station = format!("station {}", long.name);
    let mut header = vec!["point", &station];
    header.extend(methods.iter().map(|one| one.method.word()));
    let rows = tendon
        .points
        .iter()
        .enumerate()
        .map(|(index, point)| {
            let mut row = vec![kind(point.kind).to_owned(), long.figure(point.station_m, 3)];
            row.extend(methods.iter().map(|one| {
                let forces = one.outcome.as_ref().ok();
                let force_kn = forces.and_then(|forces| forces.service_kn.get(index).copied());
                figure(force, force_kn, 2)
            }));
            row
        })
        .collect();
    grid(1, &header, rows)
}

fn in_time(methods: &[MethodResult], force: Unit) -> String {
    let heads: Vec<String> = DAYS.map(|days| format!("{days} d")).to_vec();
    let mut header = vec!["method"];
    header.extend(heads.iter().map(String::as_str));
    header.push("final");
    let rows = methods
        .iter()
        .map(|one| {
            let forces = one.outcome.as_ref().ok();
            let mut row = vec![one.method.word().to_owned()];
            row.extend((0..DAYS.len()).map(|at| {
                let in_time = forces.and_then(|forces| *forces.in_time_kn.get(at)?);
                figure(force, in_time, 2)
            }));
            row.push(figure(force, one.final_kn, 2));
            row
        })
        .collect();
    grid(1, &header, rows)
}
