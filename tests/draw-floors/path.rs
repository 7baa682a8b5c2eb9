//! A tendon's way in plan: straight pieces and arcs, stations along it, sweeps and splines.

use crate::dxf::Xy;

/// Corners with the bulge of the piece that follows each (tangent of a quarter of its angle, positive to the left).
#[derive(Clone)]
pub(crate) struct Path {
    pub(crate) corners: Vec<(Xy, f64)>,
}

/// A piece between two corners.
#[derive(Clone, Copy)]
pub(crate) enum Piece {
    Straight {
        from: Xy,
        to: Xy,
    },
    /// `turn_rad` positive to the left; `start_rad` is the direction from the centre to the first end.
    Arc {
        centre: Xy,
        radius_mm: f64,
        start_rad: f64,
        turn_rad: f64,
    },
}

/// Which way a run goes.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum Axis {
    X,
    Y,
}

impl Axis {
    /// The coordinate along this axis.
    pub(crate) fn along(self, at: Xy) -> f64 {
        if self == Self::X { at[0] } else { at[1] }
    }

    /// The point at `along` on this axis and `across` on the other.
    pub(crate) fn point(self, along: f64, across: f64) -> Xy {
        if self == Self::X {
            [along, across]
        } else {
            [across, along]
        }
    }

    /// Which sign a step to greater `across` has for one who walks along the axis, left being positive.
    fn left(self) -> f64 {
        if self == Self::X { 1.0 } else { -1.0 }
    }
}

/// A smooth step sideways: it begins at `from_mm` along the axis and shifts by `shift_mm` across it.
#[derive(Clone, Copy)]
pub(crate) struct Sweep {
    pub(crate) from_mm: f64,
    pub(crate) shift_mm: f64,
    pub(crate) radius_mm: f64,
    pub(crate) slope: f64,
}

impl Path {
    pub(crate) fn straight(from: Xy, to: Xy) -> Self {
        Self {
            corners: vec![(from, 0.0), (to, 0.0)],
        }
    }

    /// From `start_mm` to `end_mm` along an axis, with steps sideways on the way, in order.
    pub(crate) fn swept(
        axis: Axis,
        [start_mm, end_mm]: [f64; 2],
        across_mm: f64,
        sweeps: &[Sweep],
    ) -> Self {
        let mut corners = vec![(axis.point(start_mm, across_mm), 0.0)];
        let mut across = across_mm;
        for sweep in sweeps {
            let angle = sweep.slope.atan();
            let sign = sweep.shift_mm.signum();
            let bulge = (angle / 4.0).tan() * sign * axis.left();
            let arc_along = sweep.radius_mm * angle.sin();
            let arc_across = sweep.radius_mm * (1.0 - angle.cos()) * sign;
            let straight = (sweep.shift_mm - 2.0 * arc_across).abs() / sweep.slope;
            let mut along = sweep.from_mm;
            corners.push((axis.point(along, across), bulge));
            along += arc_along;
            corners.push((axis.point(along, across + arc_across), 0.0));
            along += straight;
            corners.push((
                axis.point(along, across + sweep.shift_mm - arc_across),
                -bulge,
            ));
            along += arc_along;
            across += sweep.shift_mm;
            corners.push((axis.point(along, across), 0.0));
        }
        corners.push((axis.point(end_mm, across), 0.0));
        Self { corners }
    }

    /// The clamped cubic spline of these controls, as short chords.
    pub(crate) fn spline(controls: &[Xy], chords: u32) -> Self {
        let corners = (0..=chords)
            .map(|step| {
                (
                    on_spline(controls, f64::from(step) / f64::from(chords)),
                    0.0,
                )
            })
            .collect();
        Self { corners }
    }

    pub(crate) fn reversed(&self) -> Self {
        let mut corners = Vec::with_capacity(self.corners.len());
        for (index, (at, _)) in self.corners.iter().enumerate().rev() {
            let bulge = index
                .checked_sub(1)
                .map_or(0.0, |before| -self.corners[before].1);
            corners.push((*at, bulge));
        }
        Self { corners }
    }

    pub(crate) fn pieces(&self) -> Vec<Piece> {
        self.corners
            .windows(2)
            .map(|pair| piece(pair[0].0, pair[1].0, pair[0].1))
            .collect()
    }

    pub(crate) fn length_mm(&self) -> f64 {
        self.pieces().iter().map(Piece::length_mm).sum()
    }

    /// The point at a station and the direction there.
    pub(crate) fn at(&self, station_mm: f64) -> (Xy, f64) {
        let pieces = self.pieces();
        let mut left = station_mm;
        for piece in &pieces {
            let length = piece.length_mm();
            if left <= length {
                return piece.at(left);
            }
            left -= length;
        }
        pieces
            .last()
            .map_or(([0.0, 0.0], 0.0), |last| last.at(last.length_mm()))
    }

    /// The station where the path reaches a coordinate along an axis, for paths that only go forward along it.
    pub(crate) fn station_at(&self, axis: Axis, along_mm: f64) -> f64 {
        let (mut low, mut high) = (0.0, self.length_mm());
        for _ in 0..60 {
            let middle = f64::midpoint(low, high);
            if axis.along(self.at(middle).0) < along_mm {
                low = middle;
            } else {
                high = middle;
            }
        }
        f64::midpoint(low, high)
    }
}

impl Piece {
    pub(crate) fn length_mm(&self) -> f64 {
        match self {
            Self::Straight { from, to } => (to[0] - from[0]).hypot(to[1] - from[1]),
            Self::Arc {
                radius_mm,
                turn_rad,
                ..
            } => radius_mm * turn_rad.abs(),
        }
    }

    fn at(&self, station_mm: f64) -> (Xy, f64) {
        match self {
            Self::Straight { from, to } => {
                let share = station_mm / self.length_mm();
                let at = [
                    from[0] + (to[0] - from[0]) * share,
                    from[1] + (to[1] - from[1]) * share,
                ];
                (at, (to[1] - from[1]).atan2(to[0] - from[0]))
            }
            Self::Arc {
                centre,
                radius_mm,
                start_rad,
                turn_rad,
            } => {
                let angle = start_rad + station_mm / radius_mm * turn_rad.signum();
                let at = [
                    centre[0] + radius_mm * angle.cos(),
                    centre[1] + radius_mm * angle.sin(),
                ];
                (at, angle + std::f64::consts::FRAC_PI_2 * turn_rad.signum())
            }
        }
    }
}

fn piece(from: Xy, to: Xy, bulge: f64) -> Piece {
    if bulge == 0.0 {
        return Piece::Straight { from, to };
    }
    let chord = [to[0] - from[0], to[1] - from[1]];
    let turn_rad = 4.0 * bulge.atan();
    let radius_mm = chord[0].hypot(chord[1]) * (1.0 + bulge * bulge) / (4.0 * bulge.abs());
    // The centre stands to the left of the chord's middle by this share of the chord.
    let aside = (1.0 - bulge * bulge) / (4.0 * bulge);
    let centre = [
        f64::midpoint(from[0], to[0]) - chord[1] * aside,
        f64::midpoint(from[1], to[1]) + chord[0] * aside,
    ];
    let start_rad = (from[1] - centre[1]).atan2(from[0] - centre[0]);
    Piece::Arc {
        centre,
        radius_mm,
        start_rad,
        turn_rad,
    }
}

/// Even knots from 0 to 1 with fourfold ends, for a cubic of so many controls.
pub(crate) fn clamped_knots(controls: usize) -> Vec<f64> {
    let spans = u32::try_from(controls.saturating_sub(3))
        .unwrap_or(1)
        .max(1);
    let inner = (1..spans).map(|index| f64::from(index) / f64::from(spans));
    std::iter::repeat_n(0.0, 4)
        .chain(inner)
        .chain(std::iter::repeat_n(1.0, 4))
        .collect()
}

/// De Boor's recurrence (Calcolo 1, 1972; any text on splines).
fn on_spline(controls: &[Xy], share: f64) -> Xy {
    let knots = clamped_knots(controls.len());
    let span = (3..controls.len() - 1)
        .rev()
        .find(|span| knots[*span] <= share)
        .unwrap_or(3);
    let mut points = [0, 1, 2, 3].map(|index| controls[span - 3 + index]);
    for level in 1..=3 {
        for index in (level..=3).rev() {
            let low = knots[span - 3 + index];
            let high = knots[span + 1 + index - level];
            let weight = (share - low) / (high - low);
            let (before, after) = (points[index - 1], points[index]);
            let between = |side: usize| (1.0 - weight) * before[side] + weight * after[side];
            points[index] = [between(0), between(1)];
        }
    }
    points[3]
}
