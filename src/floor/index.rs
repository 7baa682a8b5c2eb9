//! Where lines lie: short chords of every line in one spatial index.

use geo::Coord;
use rstar::{AABB, RTree, RTreeObject};

use crate::geometry::{Path, Segment, distance_m};

/// Chords leave the line by no more than this, metres; stations are taken on the line itself.
const CHORD_M: f64 = 0.005;
/// Longest chord, metres: a long skew line would otherwise be near to everything inside its envelope.
const PIECE_M: f64 = 4.0;

/// A stretch of one line.
#[derive(Debug, Clone, Copy)]
pub(super) struct Chord {
    pub(super) line: usize,
    from: Coord<f64>,
    to: Coord<f64>,
    segment: Segment,
    /// Station of the segment's start.
    start_m: f64,
    /// Direction of a straight segment, which is asked for again and again.
    straight_rad: Option<f64>,
}

impl RTreeObject for Chord {
    type Envelope = AABB<[f64; 2]>;

    fn envelope(&self) -> Self::Envelope {
        AABB::from_corners([self.from.x, self.from.y], [self.to.x, self.to.y])
    }
}

/// A line's nearest place to a point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Foot {
    pub(super) line: usize,
    pub(super) station_m: f64,
    pub(super) place: Coord<f64>,
    pub(super) heading_rad: f64,
    pub(super) distance_m: f64,
}

/// Lines by place.
pub(super) struct Index {
    tree: RTree<Chord>,
}

impl Index {
    /// An index of lines; they are known by their place in the sequence.
    pub(super) fn new<'a>(paths: impl Iterator<Item = &'a Path>) -> Self {
        let mut chords = Vec::new();
        for (line, path) in paths.enumerate() {
            for (start_m, &segment) in path.pieces() {
                let straight = matches!(segment, Segment::Line { .. });
                let straight_rad = straight.then(|| segment.heading_at(0.0));
                let whole = Path::new([segment]).to_line_string(CHORD_M);
                for pair in whole.0.windows(2) {
                    split(pair[0], pair[1], |from, to| {
                        chords.push(Chord {
                            line,
                            from,
                            to,
                            segment,
                            start_m,
                            straight_rad,
                        });
                    });
                }
            }
        }
        Self {
            tree: RTree::bulk_load(chords),
        }
    }

    /// Chords whose envelopes touch a box grown by `reach_m`.
    pub(super) fn around(&self, corners: &[Coord<f64>], reach_m: f64) -> Vec<&Chord> {
        let (mut low, mut high) = ([f64::INFINITY; 2], [f64::NEG_INFINITY; 2]);
        for corner in corners {
            low = [low[0].min(corner.x), low[1].min(corner.y)];
            high = [high[0].max(corner.x), high[1].max(corner.y)];
        }
        let envelope = AABB::from_corners(
            [low[0] - reach_m, low[1] - reach_m],
            [high[0] + reach_m, high[1] + reach_m],
        );
        self.tree
            .locate_in_envelope_intersecting(&envelope)
            .collect()
    }

    /// Lines that pass within a distance of a place, in order, each once.
    pub(super) fn within(&self, place: Coord<f64>, reach_m: f64) -> Vec<usize> {
        let mut found: Vec<usize> = self
            .around(&[place], reach_m + CHORD_M)
            .into_iter()
            .filter(|chord| chord.foot(place).distance_m <= reach_m)
            .map(|chord| chord.line)
            .collect();
        found.sort_unstable();
        found.dedup();
        found
    }

    /// For each line within reach, in order of lines, the place nearest to `place`.
    pub(super) fn feet(&self, place: Coord<f64>, reach_m: f64) -> Vec<Foot> {
        let mut chords = self.around(&[place], reach_m + CHORD_M);
        // Chords of one piece of a line have one foot.
        chords.sort_unstable_by(|a, b| a.line.cmp(&b.line).then(a.start_m.total_cmp(&b.start_m)));
        chords.dedup_by(|a, b| a.is_of_piece(b));
        let mut feet: Vec<Foot> = chords
            .into_iter()
            .map(|chord| chord.foot(place))
            .filter(|foot| foot.distance_m <= reach_m)
            .collect();
        feet.sort_by(|a, b| {
            a.line
                .cmp(&b.line)
                .then(a.distance_m.total_cmp(&b.distance_m))
                .then(a.station_m.total_cmp(&b.station_m))
        });
        feet.dedup_by_key(|foot| foot.line);
        feet
    }
}

impl Chord {
    /// Whether both belong to the same piece of the same line.
    fn is_of_piece(&self, other: &Self) -> bool {
        self.line == other.line
            && self.start_m.total_cmp(&other.start_m).is_eq()
            && self.segment == other.segment
    }

    /// The place nearest to a point on the piece of line that the chord belongs to.
    pub(super) fn foot(&self, place: Coord<f64>) -> Foot {
        let along_m = self.segment.nearest_along_m(place);
        let foot = self.segment.place_at(along_m);
        Foot {
            line: self.line,
            station_m: self.start_m + along_m,
            place: foot,
            heading_rad: self
                .straight_rad
                .unwrap_or_else(|| self.segment.heading_at(along_m)),
            distance_m: distance_m(foot, place),
        }
    }

    /// Where a stretch crosses the chord; `None` where it does not, or runs along it.
    pub(super) fn crossing(&self, from: Coord<f64>, to: Coord<f64>) -> Option<Coord<f64>> {
        let (a, b) = (side(from, to, self.from), side(from, to, self.to));
        let (c, d) = (side(self.from, self.to, from), side(self.from, self.to, to));
        let along = (a - b).abs() <= 0.02 * distance_m(from, to) * distance_m(self.from, self.to);
        if along || a * b > 0.0 || c * d > 0.0 {
            return None;
        }
        let share = a / (a - b);
        Some(Coord {
            x: self.from.x + share * (self.to.x - self.from.x),
            y: self.from.y + share * (self.to.y - self.from.y),
        })
    }

    /// Distance between the chord and a quadrangle; zero where they touch or overlap.
    pub(super) fn gap_m(&self, corners: &[Coord<f64>; 4]) -> f64 {
        let mut least_m = f64::INFINITY;
        for side in 0..4 {
            let (a, b) = (corners[side], corners[(side + 1) % 4]);
            if cross(self.from, self.to, a, b) {
                return 0.0;
            }
            least_m = least_m
                .min(to_stretch_m(a, self.from, self.to))
                .min(to_stretch_m(self.from, a, b))
                .min(to_stretch_m(self.to, a, b));
        }
        if inside(self.from, corners) {
            0.0
        } else {
            least_m
        }
    }
}

/// Distance from a place to a text's box; zero inside it.
pub(super) fn to_box_m(place: Coord<f64>, corners: &[Coord<f64>; 4]) -> f64 {
    if inside(place, corners) {
        return 0.0;
    }
    (0..4)
        .map(|side| to_stretch_m(place, corners[side], corners[(side + 1) % 4]))
        .fold(f64::INFINITY, f64::min)
}

fn split(from: Coord<f64>, to: Coord<f64>, mut take: impl FnMut(Coord<f64>, Coord<f64>)) {
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "clamped to 1..=10000"
    )]
    let parts = (distance_m(from, to) / PIECE_M).ceil().clamp(1.0, 10_000.0) as u32;
    let at = |part: u32| {
        let share = f64::from(part) / f64::from(parts);
        Coord {
            x: from.x + share * (to.x - from.x),
            y: from.y + share * (to.y - from.y),
        }
    };
    for part in 0..parts {
        take(at(part), at(part + 1));
    }
}

fn side(a: Coord<f64>, b: Coord<f64>, c: Coord<f64>) -> f64 {
    (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x)
}

/// Whether two stretches cross (touching is told by distance).
fn cross(a: Coord<f64>, b: Coord<f64>, c: Coord<f64>, d: Coord<f64>) -> bool {
    side(a, b, c) * side(a, b, d) < 0.0 && side(c, d, a) * side(c, d, b) < 0.0
}

fn to_stretch_m(place: Coord<f64>, from: Coord<f64>, to: Coord<f64>) -> f64 {
    let stretch = Segment::Line { from, to };
    distance_m(stretch.place_at(stretch.nearest_along_m(place)), place)
}

fn inside(place: Coord<f64>, corners: &[Coord<f64>; 4]) -> bool {
    let turns: [f64; 4] = std::array::from_fn(|at| side(corners[at], corners[(at + 1) % 4], place));
    turns.iter().all(|&turn| turn >= 0.0) || turns.iter().all(|&turn| turn <= 0.0)
}
