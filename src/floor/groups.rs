//! Groups of like tendons of which a typical one is drawn: their texts and the lines that say how far they extend.

use std::collections::{BTreeMap, BTreeSet};

use super::arrows::Arrows;
use super::group_text::{GroupText, group_text};
use super::index::{Foot, Index};
use super::labels::left_over;
use super::layers::{Roles, sound};
use super::lines::Line;
use super::order::{by_handle, by_place};
use super::pieces::{Joint, chains};
use super::strokes;
use crate::drawing::{Drawing, Text};
use crate::finding::Finding;
use crate::geometry::{Path, distance_m};
use crate::job::Job;

/// Extent lines are at least this long, metres: what is shorter is an arrow of one.
const SHORTEST_M: f64 = 0.5;
/// Pieces of an extent line meet within this, metres, and go on about straight, radians.
const MEET_M: f64 = 0.005;
const STRAIGHT_RAD: f64 = 0.2;
/// Sine of the least angle between an extent line and its tendons.
const SQUARE: f64 = 0.7;
/// Sine of the angle within which tendons are parallel.
const PARALLEL: f64 = 0.1;

/// A line across a group, with what its texts say and the tendons that it crosses.
pub(super) struct Extent {
    pub(super) handle: String,
    pub(super) path: Path,
    pub(super) said: GroupText,
    /// Drawn tendons, parallel to one another, in order along the line; `distance_m` of each is the station on it.
    pub(super) crossed: Vec<Foot>,
}

/// Groups, and the texts, by place in the drawing's list, that are theirs.
#[derive(Default)]
pub(super) struct Groups {
    pub(super) extents: Vec<Extent>,
    pub(super) texts: BTreeSet<usize>,
    /// What could not be read in them.
    pub(super) findings: Vec<Finding>,
}

/// Reads groups; `index` holds the tendon lines.
pub(super) fn groups(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    arrows: &Arrows,
    lines: &[Line],
    index: &Index,
) -> Groups {
    let conventions = &job.conventions;
    let mut extents = extents(drawing, roles);
    if extents.is_empty() {
        return Groups::default();
    }
    for extent in &mut extents {
        extent.crossed = tendons(&extent.path, lines, index, conventions.arrow_reach_m);
    }
    let by_place = Index::new(extents.iter().map(|extent| &extent.path));
    let mut findings = Vec::new();
    let mut texts: Vec<(usize, usize, GroupText)> = Vec::new();
    for (at, text) in drawing.texts.iter().enumerate() {
        let role = roles.of(&text.layer, text.look);
        if !(role.extents || role.label.marks || role.label.heights) {
            continue;
        }
        if let Some((said, left)) = group_text(&text.content, job) {
            let reach_m = conventions.label_reach * text.height_m;
            let own = beside(text, &by_place, reach_m)
                .or_else(|| at_typical(text, arrows, &extents, index, reach_m));
            if own.is_some() && !text.hidden {
                findings.extend(left.iter().map(|line| left_over(text, line)));
            }
            texts.extend(own.map(|extent| (extent, at, said)));
        }
    }
    let place = |at: usize| {
        drawing
            .texts
            .get(at)
            .map(|text| (text.place.x, text.place.y))
    };
    texts.sort_by(|a, b| {
        let order = place(a.1).partial_cmp(&place(b.1));
        a.0.cmp(&b.0)
            .then(order.unwrap_or(std::cmp::Ordering::Equal))
    });
    let mut taken = BTreeSet::new();
    for (extent, at, said) in texts {
        taken.insert(at);
        if let Some(extent) = extents.get_mut(extent) {
            extent.said.join(said);
        }
    }
    Groups {
        extents,
        texts: taken,
        findings,
    }
}

/// Lines of the extent layers, pieces put together, in an order that their places decide.
fn extents(drawing: &Drawing, roles: &Roles) -> Vec<Extent> {
    let mut by_layer: BTreeMap<&str, Vec<(String, Path)>> = BTreeMap::new();
    for shape in &drawing.shapes {
        if roles.of(&shape.layer, shape.look).extents && !shape.closed && sound(shape) {
            let piece = (shape.handle.clone(), shape.path.clone());
            by_layer.entry(&shape.layer).or_default().push(piece);
        }
    }
    for leader in drawing.leaders.iter().filter(|l| l.texts.is_empty()) {
        if roles.of(&leader.layer, leader.look).extents
            && let (Some(&arrow), Some(&tail)) = (leader.arrows.first(), leader.tails.first())
        {
            let piece = (leader.handle.clone(), Path::through(&[arrow, tail]));
            by_layer.entry(&leader.layer).or_default().push(piece);
        }
    }
    let mut extents = Vec::new();
    for mut pieces in by_layer.into_values() {
        pieces.sort_by(|a, b| by_handle(&a.0, &b.0).then_with(|| by_place(&a.1, &b.1)));
        let paths: Vec<&Path> = pieces.iter().map(|(_, path)| path).collect();
        let joint = Joint {
            gap_m: MEET_M,
            turn_rad: STRAIGHT_RAD,
        };
        let (chains, _) = chains(&paths, joint, |_| false);
        for chain in chains.iter().filter(|chain| !chain.closed) {
            let path = straight(&chain.path(&paths));
            let first = chain.pieces.iter().map(|(piece, _)| *piece).min();
            let first = first.and_then(|piece| pieces.get(piece));
            if let (Some(path), Some((handle, _))) = (path, first) {
                extents.push(Extent {
                    handle: handle.clone(),
                    path,
                    said: GroupText::default(),
                    crossed: Vec::new(),
                });
            }
        }
    }
    extents
        .sort_by(|a, b| by_place(&a.path, &b.path).then_with(|| by_handle(&a.handle, &b.handle)));
    extents
}

/// A line from end to end, from the left or lower one, if it is long enough and about straight.
fn straight(path: &Path) -> Option<Path> {
    let (start, end) = (path.start()?, path.end()?);
    let length_m = distance_m(start, end);
    let fits = length_m >= SHORTEST_M && path.length_m() <= 1.02 * length_m;
    let (from, to) = if (end.x, end.y) < (start.x, start.y) {
        (end, start)
    } else {
        (start, end)
    };
    fits.then(|| Path::through(&[from, to]))
}

/// Tendons that an extent line crosses about squarely, or ends at.
fn tendons(path: &Path, lines: &[Line], index: &Index, reach_m: f64) -> Vec<Foot> {
    let length_m = path.length_m();
    let mut crossed = strokes::crossed(path, index);
    for (end, station_m) in [(path.start(), 0.0), (path.end(), length_m)] {
        let feet = end.map_or_else(Vec::new, |end| index.feet(end, reach_m));
        crossed.extend(feet.into_iter().map(|foot| Foot {
            distance_m: station_m,
            ..foot
        }));
    }
    let heading_rad = path.heading_at(0.0);
    crossed.retain(|foot| (foot.heading_rad - heading_rad).sin().abs() >= SQUARE);
    crossed.sort_by(|a, b| {
        a.line
            .cmp(&b.line)
            .then(a.distance_m.total_cmp(&b.distance_m))
    });
    crossed.dedup_by_key(|foot| foot.line);
    // The family with the most tendons: one run, one direction.
    let alike = |a: &Foot, b: &Foot| {
        let run = |foot: &Foot| lines.get(foot.line).map(|line| line.run);
        run(a) == run(b) && (a.heading_rad - b.heading_rad).sin().abs() < PARALLEL
    };
    let size = |foot: &Foot| crossed.iter().filter(|other| alike(foot, other)).count();
    let most = crossed
        .iter()
        .max_by(|a, b| size(a).cmp(&size(b)).then(b.line.cmp(&a.line)));
    let Some(most) = most.copied() else {
        return Vec::new();
    };
    crossed.retain(|foot| alike(&most, foot));
    crossed.sort_by(|a, b| a.distance_m.total_cmp(&b.distance_m));
    crossed
}

/// The extent line nearest to a text's box.
fn beside(text: &Text, extents: &Index, reach_m: f64) -> Option<usize> {
    extents
        .around(&text.corners, reach_m)
        .into_iter()
        .map(|chord| (chord.gap_m(&text.corners), chord.line))
        .filter(|(gap_m, _)| *gap_m <= reach_m * (1.0 + 1e-9))
        .min_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)))
        .map(|(_, extent)| extent)
}

/// The one extent line that crosses the tendon at which a text points or stands.
fn at_typical(
    text: &Text,
    arrows: &Arrows,
    extents: &[Extent],
    index: &Index,
    reach_m: f64,
) -> Option<usize> {
    let pointed = arrows.of(text).map(|pointed| pointed.aims.iter().flatten());
    let near: Vec<usize> = if let Some(feet) = pointed {
        feet.map(|foot| foot.line).collect()
    } else {
        let chords = index.around(&text.corners, reach_m).into_iter();
        let gaps = chords.map(|chord| (chord.gap_m(&text.corners), chord.line));
        let nearest = gaps
            .filter(|(gap_m, _)| *gap_m <= reach_m)
            .min_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        nearest.map(|(_, line)| line).into_iter().collect()
    };
    let mut own = extents.iter().enumerate().filter(|(_, extent)| {
        let mut crossed = extent.crossed.iter();
        crossed.any(|foot| near.contains(&foot.line))
    });
    match (own.next(), own.next()) {
        (Some((only, _)), None) => Some(only),
        _ => None,
    }
}
