//! A tendon as read held against the one meant.

use serde_json::Value;
use tautplan::floor::{EndKind, Tendon};
use tautplan::job::Job;

/// Places and heights as near as this are those meant.
const NEAR_M: f64 = 0.05;
const NEAR_MM: f64 = 0.01;

fn number(value: &Value) -> f64 {
    value.as_f64().expect("a number")
}

/// Whether a tendon has the ends of the one meant, and if so whether it was drawn the same way.
pub(crate) fn runs_forwards(tendon: &Tendon, truth: &Value) -> Option<bool> {
    let points = truth["points"].as_array()?;
    let meant = [points.first()?, points.last()?];
    let [start, end] = tendon.ends.map(|end| end.place);
    let near = |place: geo::Coord<f64>, point: &Value| {
        (place.x - number(&point["x_m"])).hypot(place.y - number(&point["y_m"])) < NEAR_M
    };
    if near(start, meant[0]) && near(end, meant[1]) {
        Some(true)
    } else {
        (near(start, meant[1]) && near(end, meant[0])).then_some(false)
    }
}

/// What of a tendon is not as meant.
pub(crate) fn tendon_differences(
    tendon: &Tendon,
    forwards: bool,
    truth: &Value,
    job: &Job,
) -> Vec<String> {
    let mut found = Vec::new();
    let mut held = |what: &str, read: Value, meant: &Value| {
        let same = match (read.as_f64(), meant.as_f64()) {
            (Some(read), Some(meant)) => (read - meant).abs() < NEAR_MM,
            _ => read == *meant,
        };
        if !same {
            found.push(format!("{what} {read}, meant {meant}"));
        }
    };
    // Where the drawing marks no tendon, the mark is the program's own.
    if !truth["mark"].is_null() {
        held("mark", tendon.mark.clone().into(), &truth["mark"]);
    }
    let run = serde_json::to_value(tendon.run).expect("a run");
    held("run", run, &truth["run"]);
    held("tendons", tendon.tendons.into(), &truth["tendons"]);
    held("strands", tendon.strands.into(), &truth["strands"]);
    let counted = tendon.strands.and(job.tendon.default_strand.clone());
    let strand = tendon.strand.clone().or(counted);
    held("strand", strand.into(), &truth["strand"]);
    held(
        "required kN",
        tendon.required_kn.into(),
        &truth["required_kn"],
    );
    held(
        "required kN/m",
        tendon.required_kn_per_m.into(),
        &truth["required_kn_per_m"],
    );
    let mut ends = tendon.ends.map(|end| {
        end.kind.map(|kind| match kind {
            EndKind::Live => "live",
            EndKind::Dead => "dead",
        })
    });
    let mut points = tendon.points.clone();
    if !forwards {
        ends.reverse();
        points.reverse();
    }
    held("ends", serde_json::json!(ends), &truth["ends"]);
    let mut joints = tendon.joints.clone();
    if !forwards {
        joints.reverse();
    }
    let divided = truth["joints"].as_array().cloned().unwrap_or_default();
    let divided_alike = joints.len() == divided.len()
        && joints.iter().zip(&divided).all(|(joint, meant)| {
            (joint.place.x - number(&meant["x_m"])).hypot(joint.place.y - number(&meant["y_m"]))
                < NEAR_M
        });
    if !divided_alike {
        found.push(format!("joints {joints:?}, meant {divided:?}"));
    }
    let meant = truth["points"].as_array().expect("points");
    let same = points.len() == meant.len()
        && points.iter().zip(meant).all(|(point, meant)| {
            let kind = serde_json::to_value(point.kind).expect("a kind");
            let off_m = (point.place.x - number(&meant["x_m"]))
                .hypot(point.place.y - number(&meant["y_m"]));
            let height_mm = point
                .height_m
                .map_or(f64::NAN, |height_m| height_m * 1000.0);
            kind == meant["kind"]
                && off_m < NEAR_M
                && (height_mm - number(&meant["height_mm"])).abs() < NEAR_MM
        });
    if !same {
        let read: Vec<String> = points
            .iter()
            .map(|p| {
                format!(
                    "{:?} {:.1?} at {:.2} {:.2}",
                    p.kind,
                    p.height_m.map(|h| h * 1000.0),
                    p.place.x,
                    p.place.y
                )
            })
            .collect();
        found.push(format!("points {}", read.join(", ")));
    }
    found
}
