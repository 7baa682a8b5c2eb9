//! From a drawing's path to a floor worked out: the stages in their order.

use std::path::Path;

use super::job_file::JobFile;
use super::{Refused, files, units};
use crate::analysis::{self, Analysis};
use crate::annotate::Surroundings;
use crate::drawing::{self, Caps, Drawing, Layer, Purpose, Refusal, Source, Wanted};
use crate::finding::Finding;
use crate::floor;
use crate::job::Job;
use crate::report::DrawingFacts;

/// A floor worked out, and the drawing that it came from.
#[derive(Debug)]
pub(super) struct Work {
    /// The drawing as it came, for marks to be put in.
    pub(super) source: Source,
    /// What reports say of it.
    pub(super) facts: DrawingFacts,
    /// What already stands on the plan.
    pub(super) around: Surroundings,
    /// The floor, worked out.
    pub(super) analysis: Analysis,
}

/// Reads a drawing and works out its floor.
pub(super) fn work(plan: &Path, job_file: &JobFile) -> Result<Work, Refused> {
    let job = &job_file.resolved.job;
    let source = open(plan, job)?;
    let tendon_layers = tendon_layers(plan, &source, job)?;
    let wanted = wanted(job.layer_patterns());
    let (drawing, mut findings) = read(plan, &source, &wanted, job, Purpose::Work)?;
    let (floor, more) = floor::read(&drawing, job);
    findings.extend(more);
    if floor.tendons.is_empty() {
        return Err(Refused::NoTendons {
            path: plan.to_owned(),
            layers: listed(&tendon_layers),
            references: references(&source),
        });
    }
    units::check(plan, &floor.tendons, drawing.unit_m, drawing.unit_from)?;
    let mut analysis = analysis::work(floor, job, findings);
    analysis.fallbacks = job_file.resolved.fallbacks();
    analysis.assumptions.extend(job_file.resolved.idle());
    let name = plan.file_name().unwrap_or(plan.as_os_str());
    Ok(Work {
        facts: DrawingFacts {
            file: name.to_string_lossy().into_owned(),
            version: drawing.version,
            unit_m: drawing.unit_m,
        },
        around: Surroundings {
            texts: drawing.texts.iter().map(|text| text.corners).collect(),
            extent: drawing.extent,
        },
        source: source.for_insertion(),
        analysis,
    })
}

/// Opens a drawing, unless it is larger than the job allows.
pub(super) fn open(plan: &Path, job: &Job) -> Result<Source, Refused> {
    caps(job)
        .admit_file(files::size(plan)?)
        .map_err(|refusal| refused(plan, refusal))?;
    drawing::open_within(files::read(plan)?, &caps(job)).map_err(|refusal| refused(plan, refusal))
}

/// Reads the wanted layers of a drawing, unless they hold more than the job allows.
pub(super) fn read(
    plan: &Path,
    source: &Source,
    wanted: &Wanted,
    job: &Job,
    purpose: Purpose,
) -> Result<(Drawing, Vec<Finding>), Refused> {
    let caps = caps(job);
    caps.admit_layers(source, wanted, purpose)
        .map_err(|refusal| refused(plan, refusal))?;
    let unit = job.conventions.unit;
    Ok(drawing::read_within(source, wanted, unit, &caps))
}

fn refused(plan: &Path, refusal: Refusal) -> Refused {
    Refused::Drawing {
        path: plan.to_owned(),
        refusal,
    }
}

fn caps(job: &Job) -> Caps {
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "the key's range is held when the job is read"
    )]
    let whole = |number: f64| number as u64;
    Caps {
        memory_mb: whole(job.limits.memory_mb),
        expanded_entities: whole(job.limits.expanded_entities),
    }
}

/// The layers that fit these patterns. A job's patterns were tried when it was read: none is broken here.
pub(super) fn wanted(patterns: impl IntoIterator<Item = String>) -> Wanted {
    Wanted::layers(patterns).unwrap_or_else(|_| Wanted::everything())
}

/// The drawing's layers that the job names for tendons.
fn tendon_layers(plan: &Path, source: &Source, job: &Job) -> Result<Vec<Layer>, Refused> {
    let layers = &job.conventions.layers;
    let patterns: Vec<String> = [&layers.banded, &layers.distributed, &layers.tendons]
        .into_iter()
        .flatten()
        .cloned()
        .collect();
    let tendons = wanted(patterns.clone());
    let all = source.layers();
    let fitting: Vec<Layer> = all
        .iter()
        .filter(|layer| tendons.has(&layer.name))
        .cloned()
        .collect();
    if !fitting.is_empty() {
        return Ok(fitting);
    }
    Err(Refused::NoTendonLayer {
        path: plan.to_owned(),
        near: nearest(&all, &patterns)
            .map(|(layer, pattern)| format!("\nlayer {} comes nearest, to {pattern}", short(layer)))
            .unwrap_or_default(),
        patterns: patterns.join(", "),
        layers: listed(&all),
        references: references(source),
    })
}

/// References whose contents are not in the drawing, in a line of their own; nothing if there is none.
fn references(source: &Source) -> String {
    let absent = source.absent_references();
    match absent.as_slice() {
        [] => String::new(),
        names => format!(
            "\nexternal references whose contents are not in the drawing: {}; bind them if the tendons are drawn there",
            names
                .iter()
                .take(8)
                .map(|name| short(name))
                .collect::<Vec<_>>()
                .join(", ")
        ),
    }
}

/// A name that a message may hold.
fn short(name: &str) -> String {
    const LONGEST: usize = 80;
    match name.char_indices().nth(LONGEST) {
        Some((end, _)) => format!("{}...", name.get(..end).unwrap_or(name)),
        None => name.to_owned(),
    }
}

/// Layers with what lies on them, in one line.
fn listed(layers: &[Layer]) -> String {
    const SHOWN: usize = 40;
    let filled: Vec<&Layer> = layers
        .iter()
        .filter(|layer| !layer.counts.is_empty())
        .collect();
    let mut words: Vec<String> = filled
        .iter()
        .take(SHOWN)
        .map(|layer| {
            let counts: Vec<String> = layer
                .counts
                .iter()
                .map(|(name, count)| format!("{count} {name}"))
                .collect();
            format!("{} ({})", short(&layer.name), counts.join(", "))
        })
        .collect();
    if filled.len() > SHOWN {
        words.push(format!("and {} more", filled.len() - SHOWN));
    }
    match layers.len() - filled.len() {
        0 => {}
        1 => words.push("1 empty layer".to_owned()),
        empty => words.push(format!("{empty} empty layers")),
    }
    if words.is_empty() {
        "none".to_owned()
    } else {
        words.join(", ")
    }
}

/// The layer whose name is most like a pattern, if it is at all like it.
fn nearest<'a>(layers: &'a [Layer], patterns: &'a [String]) -> Option<(&'a str, &'a str)> {
    let mut best: Option<(f64, &str, &str)> = None;
    for layer in layers {
        for pattern in patterns {
            let stem = pattern.replace('*', "").to_lowercase();
            let likeness = strsim::jaro_winkler(&layer.name.to_lowercase(), &stem);
            if likeness > best.map_or(0.8, |(held, ..)| held) {
                best = Some((likeness, &layer.name, pattern));
            }
        }
    }
    best.map(|(_, layer, pattern)| (layer, pattern))
}
