//! Which tendons a label may belong to, and how it lies to each of them.

use geo::Coord;

use super::aims::Aim;
use super::columns::Columns;
use super::index::{Foot, Index};
use super::lines::{Line, axis_rad};
use super::settle::Pairing;
use super::types::Run;
use crate::drawing::Text;
use crate::geometry::{distance_m, turn_rad};

/// Tendons this near to a label tell what is usual beside it, metres.
pub(super) const BESIDE_M: f64 = 3.2;
/// Of these, the nearest so many count.
const BESIDE: usize = 6;
/// Columns this near belong to the place, metres.
const COLUMN_M: f64 = 1.2;
/// A label this near to an end stands at the anchor: metres, and text heights.
const AT_END_M: f64 = 0.3;
const AT_END_HEIGHTS: f64 = 1.5;
/// As far from the start as from the end, whatever adding up lengths leaves, metres.
const ROUNDING_M: f64 = 1e-6;

/// Bins of the angle between text and tendon, of 15° each from along to across.
pub(super) const TURNS: usize = 6;

/// How a label lies to one tendon.
#[derive(Debug, Clone)]
pub(super) struct Lie {
    pub(super) pairing: Pairing,
    /// From the text's box to the line, in text heights; zero where they touch.
    pub(super) gap_h: f64,
    /// From the line to the text's place, in text heights, positive to the left of the line.
    pub(super) off_h: f64,
    /// The same, positive to the left of the run's axis, whichever way the line was drawn.
    pub(super) side_h: f64,
    /// Bin of the angle between text and line.
    pub(super) turn: usize,
    /// Whether the place is at an end.
    pub(super) at_end: bool,
    /// From the text's nearest edge, along the tendon, to the nearer end, in text heights.
    pub(super) edge_h: f64,
    /// Tendons of the same run beside this one, nearest first, with the station beside the label.
    pub(super) beside: Vec<(usize, f64)>,
    /// Along the tendon from the label to the middle of a column, metres.
    pub(super) column_m: Option<f64>,
    /// Whether the label says by arrow or tick that it belongs here.
    pub(super) aimed: bool,
}

/// The lies of labels to all tendons within reach, label by label; a label that points has those of its aim alone.
pub(super) fn lies(
    texts: &[&Text],
    aims: &[Option<Aim>],
    lines: &[Line],
    index: &Index,
    reach: f64,
    columns: &Columns<'_>,
) -> Vec<Lie> {
    let mut lies = Vec::new();
    let axes = [Run::Banded, Run::Distributed]
        .map(|run| (run, axis_rad(lines.iter().filter(|line| line.run == run))));
    for (label, text) in texts.iter().enumerate() {
        let setting = Setting {
            label,
            text,
            lines,
            axes,
            columns,
        };
        if let Some(Some(aim)) = aims.get(label) {
            for foot in aim {
                let feet = index.feet(foot.place, BESIDE_M);
                lies.extend(setting.lie(foot, foot.distance_m, &feet).map(|lie| Lie {
                    off_h: 0.0,
                    side_h: 0.0,
                    aimed: true,
                    ..lie
                }));
            }
            continue;
        }
        let reach_m = reach * text.height_m;
        let feet = index.feet(text.place, BESIDE_M.max(reach_m + text_span_m(text)));
        let mut gaps: Vec<(usize, f64)> = index
            .around(&text.corners, reach_m)
            .into_iter()
            .map(|chord| (chord.line, chord.gap_m(&text.corners)))
            .filter(|&(_, gap_m)| gap_m <= reach_m * (1.0 + 1e-9))
            .collect();
        gaps.sort_by(|a, b| a.0.cmp(&b.0).then(a.1.total_cmp(&b.1)));
        gaps.dedup_by_key(|gap| gap.0);
        for (host, gap_m) in gaps {
            if let Some(foot) = feet.iter().find(|foot| foot.line == host) {
                lies.extend(setting.lie(foot, gap_m, &feet));
            }
        }
    }
    lies
}

/// From the text's nearest edge, along a line in this direction, to the nearer end of a line of this length, metres.
fn edge_m(
    text: &Text,
    foot: &Coord<f64>,
    (cos, sin): (f64, f64),
    station_m: f64,
    length_m: f64,
) -> f64 {
    let along = text.corners.iter().map(|corner| {
        let station_m = station_m + cos * (corner.x - foot.x) + sin * (corner.y - foot.y);
        station_m.min(length_m - station_m)
    });
    along.fold(f64::INFINITY, f64::min)
}

/// A label and what it stands among.
struct Setting<'a> {
    label: usize,
    text: &'a Text,
    lines: &'a [Line],
    axes: [(Run, f64); 2],
    columns: &'a Columns<'a>,
}

impl Setting<'_> {
    /// How the label lies to the tendon of a foot; `feet` are those of all tendons near to it.
    fn lie(&self, foot: &Foot, gap_m: f64, feet: &[Foot]) -> Option<Lie> {
        let (text, lines) = (self.text, self.lines);
        let line = lines.get(foot.line)?;
        let mut beside: Vec<(f64, usize, f64)> = feet
            .iter()
            .filter(|other| {
                other.line != foot.line
                    && lines.get(other.line).is_some_and(|l| l.run == line.run)
                    && (other.heading_rad - foot.heading_rad).sin().abs() < 0.2
            })
            .map(|other| {
                (
                    distance_m(other.place, foot.place),
                    other.line,
                    other.station_m,
                )
            })
            .collect();
        beside.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        beside.truncate(BESIDE);
        let (sin, cos) = foot.heading_rad.sin_cos();
        let (dx, dy) = (text.place.x - foot.place.x, text.place.y - foot.place.y);
        let height_m = text.height_m.max(1e-6);
        let length_m = line.path.length_m();
        let off_h = (cos * dy - sin * dx) / height_m;
        let axis_rad = self
            .axes
            .iter()
            .find(|(run, _)| *run == line.run)
            .map_or(0.0, |&(_, axis)| axis);
        let with_axis = (foot.heading_rad - axis_rad).cos() >= 0.0;
        let end_m = foot.station_m.min(length_m - foot.station_m);
        Some(Lie {
            pairing: Pairing {
                label: self.label,
                host: foot.line,
                station_m: foot.station_m,
            },
            gap_h: gap_m / height_m,
            off_h,
            side_h: if with_axis { off_h } else { -off_h },
            turn: turn_bin(text.rotation_rad - foot.heading_rad),
            at_end: end_m
                <= AT_END_M
                    .max(AT_END_HEIGHTS * text.height_m)
                    .min(length_m / 4.0)
                    + ROUNDING_M,
            edge_h: edge_m(text, &foot.place, (cos, sin), foot.station_m, length_m) / height_m,
            beside: beside
                .into_iter()
                .map(|(_, line, station_m)| (line, station_m))
                .collect(),
            column_m: column_m(self.columns, foot.place, foot.heading_rad),
            aimed: false,
        })
    }
}

/// From the text's place to its farthest corner, metres.
fn text_span_m(text: &Text) -> f64 {
    let spans = text.corners.iter().map(|&c| distance_m(c, text.place));
    spans.fold(0.0, f64::max)
}

fn turn_bin(angle_rad: f64) -> usize {
    let folded = turn_rad(2.0 * angle_rad).abs() / 2.0;
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "clamped to the bins"
    )]
    let bin = (folded / std::f64::consts::FRAC_PI_2 * 6.0).clamp(0.0, 5.0) as usize;
    bin.min(TURNS - 1)
}

fn column_m(columns: &Columns<'_>, place: Coord<f64>, heading_rad: f64) -> Option<f64> {
    let middle = columns.nearest(place, COLUMN_M)?;
    let (sin, cos) = heading_rad.sin_cos();
    Some((cos * (middle.x - place.x) + sin * (middle.y - place.y)).abs())
}
