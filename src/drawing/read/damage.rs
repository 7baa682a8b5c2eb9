//! What could not be read, told.

use std::fmt::Write as _;

use crate::drawing::clean::Damage;
use crate::drawing::explode::{MOST_TOLD, and_more};
use crate::drawing::rules::{DRAWING_DAMAGED, ENTITY_DAMAGED, TEXT_CODE_PAGE};
use crate::drawing::scan::Scan;
use crate::drawing::source::Source;
use crate::drawing::tags::place_in_words;
use crate::drawing::windows::Losses;
use crate::finding::{Finding, Level};

pub(super) fn passed_over_finding(scan: &Scan) -> Option<Finding> {
    let over = scan.passed_over.as_ref()?;
    let more = match over.places {
        1 => String::new(),
        places => format!(" (the first of {places} such places)"),
    };
    let (level, mut left_out) = match over.left_out {
        0 => (Level::Warning, "no entity is left out for it".to_owned()),
        1 => (Level::Error, "one entity is left out for it".to_owned()),
        n => (Level::Error, format!("{n} entities are left out for it")),
    };
    for (lost, what) in [
        (over.in_header, "variables of the header"),
        (over.in_tables, "layers or text styles of its tables"),
    ] {
        if lost {
            let _ = write!(left_out, ", {what} may be lost");
        }
    }
    Some(Finding::new(
        &DRAWING_DAMAGED,
        level,
        format!(
            "the drawing is damaged: at {}, {}{more}; {left_out}",
            over.first, over.what
        ),
        "export or copy the drawing again, and look for what is missing",
    ))
}

pub(super) fn damage_findings(source: &Source, losses: &Losses) -> Vec<Finding> {
    let mut findings = told(source, &losses.damaged, "is left out");
    findings.extend(told(source, &losses.doubtful, "is read as it stands"));
    findings
}

fn told(source: &Source, damages: &[Damage], what: &str) -> Vec<Finding> {
    let scan = &source.scan;
    let shown = damages.iter().take(MOST_TOLD);
    let mut findings: Vec<Finding> = shown
        .map(|damage| {
            let layer = scan.layers.get(damage.kept.layer as usize);
            let layer = layer.map_or("0", |layer| layer.name.as_str());
            let handle = match &damage.kept.handle {
                Some(handle) => handle.clone(),
                None => format!("#{}", damage.kept.number),
            };
            Finding::new(
                &ENTITY_DAMAGED,
                Level::Error,
                format!(
                    "{} {handle} on layer {layer} {what}: at {}, {}",
                    damage.type_name,
                    place_in_words(&source.bytes, scan.form, damage.at),
                    damage.found
                ),
                "redraw the entity, or export the drawing again",
            )
        })
        .collect();
    findings.extend(and_more(&ENTITY_DAMAGED, Level::Error, damages.len()));
    findings
}

pub(super) fn code_page_finding(scan: &Scan, losses: &Losses) -> Option<Finding> {
    if losses.guessed == 0 && !scan.names_are_guessed {
        return None;
    }
    let why = match &scan.code_page.unsure_of {
        Some(page) => format!("the drawing names {page}, which is not known here"),
        None => "their bytes are not of the drawing's code page".to_owned(),
    };
    let what = if losses.guessed > 0 {
        format!(
            "there are characters beyond ASCII in {} text(s)",
            losses.guessed
        )
    } else {
        "there are characters beyond ASCII in names of layers or blocks".to_owned()
    };
    Some(Finding::new(
        &TEXT_CODE_PAGE,
        Level::Warning,
        format!("{what}, and {why}; they were read as Windows-1252"),
        "look at marks and heights with accents or other scripts; save as R2007 or later to settle them",
    ))
}
