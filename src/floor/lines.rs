//! Tendon lines: shapes on tendon layers, joined, each drawn line once.

use std::collections::BTreeMap;

use geo::Coord;
use rstar::RTree;

use super::bridges::{Reach, bridged};
use super::copies::{without_copies, without_overlaps};
use super::layers::{Roles, Way, sound};
use super::order::{by_handle, by_place, drawn_before};
use super::pieces::{Joint, chains, returns};
use super::rules::{PIECES_MEET, RUN_ASSUMED, TENDON_CLOSED, TENDON_STUB, TENDONS_MISSING};
use super::symbols::Symbols;
use super::types::Run;
use crate::drawing::{Drawing, Shape, ShapeKind};
use crate::finding::{Finding, Level, Wording};
use crate::geometry::Path;
use crate::job::Job;
use crate::units::SHORT;

/// A tendon line before anything is known of it but its way.
#[derive(Debug, Clone)]
pub(super) struct Line {
    pub(super) handle: String,
    pub(super) layer: String,
    pub(super) run: Run,
    pub(super) path: Path,
}

/// A line goes on into the next piece unless it turns by more than a right angle: tendons do not double back.
const SHARPEST_RAD: f64 = 1.6;
/// An end symbol this near to a joint says that two tendons end there.
const STOP_M: f64 = 0.05;
/// Pieces of one tendon that do not meet lie on one line within this, metres.
const ASIDE_M: f64 = 0.020;

/// Tendon lines in an order that their places decide.
pub(super) fn lines(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    symbols: &Symbols<'_>,
) -> (Vec<Line>, Vec<Finding>) {
    let through = Through {
        stops: placed(&symbols.stops()),
        anchors: placed(&symbols.anchors()),
    };
    let mut findings = Vec::new();
    let mut by_layer: BTreeMap<(&str, Way), Vec<&Shape>> = BTreeMap::new();
    for (at, shape) in drawing.shapes.iter().enumerate() {
        let Some(way) = roles.of(&shape.layer, shape.look).run else {
            continue;
        };
        if !sound(shape) || shape.kind == ShapeKind::Solid || symbols.shapes.contains(&at) {
            continue;
        }
        let gap_m = job.conventions.join_gap_m;
        if !shape.closed && shape.path.length_m() <= gap_m {
            findings.push(stub(shape, gap_m));
        } else if shape.closed || returns(&shape.path, gap_m) {
            findings.push(closed_shape(&shape.handle, &shape.layer, &shape.path));
        } else {
            by_layer.entry((&shape.layer, way)).or_default().push(shape);
        }
    }
    let tolerance_m = job.conventions.join_gap_m.max(0.005);
    let mut lines = Vec::new();
    let by_direction = by_layer.keys().any(|(_, way)| *way == Way::ByDirection);
    for ((_, way), mut shapes) in by_layer {
        shapes.sort_by(|a, b| drawn_before(a, b));
        let shapes = without_copies(&shapes, tolerance_m, &mut findings);
        lines.extend(joined(&shapes, way, job, &through, &mut findings));
    }
    if by_direction && job.conventions.banded_along_rad.is_none() {
        findings.push(Finding::new(
            &RUN_ASSUMED,
            Level::Note,
            "the job tells the runs apart by direction but gives none for banded tendons; all on those layers were taken as distributed",
            "set drawing.banded_along_deg to the direction of the banded tendons, in degrees from the x axis",
        ));
    }
    lines.sort_by(|a, b| by_place(&a.path, &b.path).then_with(|| by_handle(&a.handle, &b.handle)));
    let lines = without_overlaps(lines, tolerance_m, &mut findings);
    if lines.is_empty() {
        findings.push(Finding::new(
            &TENDONS_MISSING,
            Level::Error,
            format!(
                "no line lies on a tendon layer; expected layers like {}",
                [
                    job.conventions.layers.banded.as_slice(),
                    job.conventions.layers.distributed.as_slice(),
                    job.conventions.layers.tendons.as_slice(),
                ]
                .concat()
                .join(", ")
            ),
            "name the tendon layers in the job file; `tautplan survey` lists the drawing's layers",
        ));
    }
    (lines, findings)
}

fn closed_shape(handle: &str, layer: &str, path: &Path) -> Finding {
    let finding = Finding::new(
        &TENDON_CLOSED,
        Level::Warning,
        format!("shape {handle} on layer {layer} is closed; expected an open line with two ends"),
        "open the line where the tendon ends, or move the shape to another layer",
    );
    match path.start() {
        Some(place) => finding.at_place(place),
        None => finding,
    }
}

fn stub(shape: &Shape, gap_m: f64) -> Finding {
    let finding = Finding::new(
        &TENDON_STUB,
        Level::Warning,
        Wording::of(|units| {
            let short = units.of(SHORT);
            format!(
                "line {} on layer {} is {} long; expected more than the joining gap of {}",
                shape.handle,
                shape.layer,
                short.said(shape.path.length_m() * 1000.0, 1),
                short.said(gap_m * 1000.0, 1)
            )
        }),
        "delete the stub, or give a smaller `join_gap_mm` in the job file's [drawing] table",
    );
    match shape.path.start() {
        Some(place) => finding.at_place(place),
        None => finding,
    }
}

/// The run of a line: as its layer says, or banded if it lies nearer to the direction of banded tendons than to its
/// normal.
fn run(way: Way, path: &Path, banded_along_rad: Option<f64>) -> Run {
    let (Way::ByDirection, Some(along_rad)) = (way, banded_along_rad) else {
        return match way {
            Way::Run(run) => run,
            Way::ByDirection => Run::Distributed,
        };
    };
    let (Some(start), Some(end)) = (path.start(), path.end()) else {
        return Run::Distributed;
    };
    let turn_rad = (end.y - start.y).atan2(end.x - start.x) - along_rad;
    if turn_rad.cos().abs() > turn_rad.sin().abs() {
        Run::Banded
    } else {
        Run::Distributed
    }
}

/// Shapes of one layer as lines, each from the first vertex of the piece that was drawn first.
fn joined(
    shapes: &[&Shape],
    way: Way,
    job: &Job,
    through: &Through,
    findings: &mut Vec<Finding>,
) -> Vec<Line> {
    let paths: Vec<&Path> = shapes.iter().map(|shape| &shape.path).collect();
    let joint = Joint {
        gap_m: job.conventions.join_gap_m,
        turn_rad: SHARPEST_RAD,
    };
    let is_stop = |place: Coord<f64>| stands(&through.stops, place, STOP_M);
    let (chains, meetings) = chains(&paths, joint, is_stop);
    let layer = shapes.first().map_or("", |shape| shape.layer.as_str());
    findings.extend(meetings.iter().map(|meeting| {
        Finding::new(
            &PIECES_MEET,
            Level::Warning,
            format!(
                "{} line ends meet on layer {layer} and {} of them go on smoothly into none: these were left as ends",
                meeting.ends, meeting.left
            ),
            "draw each tendon as one polyline, or move its end off the others by more than the joining gap",
        )
        .at_place(meeting.place)
    }));
    let mut lines = Vec::new();
    for chain in chains {
        // Shapes stand in drawn order, so the lowest index is the piece drawn first.
        let Some(&(first, backwards)) = chain.pieces.iter().min_by_key(|(piece, _)| *piece) else {
            continue;
        };
        let path = chain.path(&paths);
        let Some(shape) = shapes.get(first) else {
            continue;
        };
        if chain.closed {
            findings.push(closed_shape(&shape.handle, &shape.layer, &path));
            continue;
        }
        lines.push(Line {
            handle: shape.handle.clone(),
            layer: shape.layer.clone(),
            run: run(way, &path, job.conventions.banded_along_rad),
            path: if backwards { path.reversed() } else { path },
        });
    }
    let reach = Reach {
        gap_m: job.conventions.bridge_gap_m,
        overlap_m: job.conventions.overlap_m,
        meet_m: job.conventions.join_gap_m,
        aside_m: job.conventions.join_gap_m.max(ASIDE_M),
        anchor_m: if through.anchors.size() > 0 {
            job.conventions.end_reach_m
        } else {
            0.0
        },
    };
    let is_anchor = |place, within_m| stands(&through.anchors, place, within_m);
    bridged(lines, reach, is_stop, is_anchor, findings)
}

/// What decides whether a line goes on: symbols of ends, at which it does not, and of intermediate anchors, at which it does.
struct Through {
    stops: RTree<[f64; 2]>,
    anchors: RTree<[f64; 2]>,
}

fn placed(places: &[Coord<f64>]) -> RTree<[f64; 2]> {
    RTree::bulk_load(places.iter().map(|place| [place.x, place.y]).collect())
}

fn stands(symbols: &RTree<[f64; 2]>, place: Coord<f64>, within_m: f64) -> bool {
    let mut near = symbols.locate_within_distance([place.x, place.y], within_m * within_m);
    near.next().is_some()
}

/// The direction in which a run goes, from −45° up to 135°.
pub(super) fn axis_rad<'a>(lines: impl Iterator<Item = &'a Line>) -> f64 {
    let (mut sum_sin, mut sum_cos) = (0.0, 0.0);
    for line in lines {
        let (Some(start), Some(end)) = (line.path.start(), line.path.end()) else {
            continue;
        };
        let (dx, dy) = (end.x - start.x, end.y - start.y);
        let length_m = dx.hypot(dy);
        let double_rad = 2.0 * dy.atan2(dx);
        sum_sin += length_m * double_rad.sin();
        sum_cos += length_m * double_rad.cos();
    }
    let axis_rad = sum_sin.atan2(sum_cos) / 2.0;
    // An axis a hair off −45° is the same as one at 135°.
    if axis_rad < -std::f64::consts::FRAC_PI_4 - 1e-6 {
        axis_rad + std::f64::consts::PI
    } else {
        axis_rad
    }
}
