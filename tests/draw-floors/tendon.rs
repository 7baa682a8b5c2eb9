//! A tendon as it is meant: its way in plan, its heights, and how both are to be drawn.

use crate::dxf::Xy;
use crate::path::{Axis, Path};

/// The run a tendon belongs to.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum Run {
    Banded,
    Distributed,
}

impl Run {
    /// Banded tendons go along x here, distributed ones along y.
    pub(crate) fn axis(self) -> Axis {
        if self == Self::Banded {
            Axis::X
        } else {
            Axis::Y
        }
    }

    pub(crate) fn name(self) -> &'static str {
        if self == Self::Banded {
            "banded"
        } else {
            "distributed"
        }
    }

    pub(crate) fn layer(self) -> &'static str {
        if self == Self::Banded {
            "TENDON-BANDED"
        } else {
            "TENDON-DISTRIBUTED"
        }
    }
}

/// What stands at an end.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum End {
    Live,
    Dead,
    /// No symbol is drawn.
    Unknown,
}

/// What a height is.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum Kind {
    Anchor,
    High,
    Low,
    Support,
}

/// How a height is told to the reader of the drawing.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum Shown {
    /// By a text beside the tendon, with its letter: `H205`, `L40`.
    Label,
    /// By a text with no letter: `125`.
    Bare,
    /// By a level line that crosses the tendon.
    LevelLine,
    /// By nothing: an anchor at mid-depth, or a fault.
    Nothing,
}

/// A point of the profile.
#[derive(Clone)]
pub(crate) struct Point {
    pub(crate) kind: Kind,
    pub(crate) station_mm: f64,
    /// To the centroid of the strands, above the soffit there.
    pub(crate) height_mm: f64,
    pub(crate) shown: Shown,
}

/// Which DXF entity draws the line.
#[derive(Clone, PartialEq)]
pub(crate) enum DrawnAs {
    Polyline,
    HeavyPolyline,
    /// One LINE or ARC for each piece; a long straight piece is cut in two.
    Pieces,
    Spline(Vec<Xy>),
}

/// The writing beside a tendon.
#[derive(Clone, Copy)]
pub(crate) struct Lettering {
    pub(crate) height_mm: f64,
    /// On the side of greater y (banded) or greater x (distributed)?
    pub(crate) far_side: bool,
    /// Heights turned along the tendon, or level with the sheet?
    pub(crate) along: bool,
    /// Heights as MTEXT, where they stand level on the far side.
    pub(crate) word: bool,
    /// Where the mark stands: distance from the first anchor.
    pub(crate) mark_station_mm: f64,
}

/// One line on the plan.
#[derive(Clone)]
pub(crate) struct Tendon {
    pub(crate) mark: String,
    pub(crate) run: Run,
    /// How many tendons the line stands for.
    pub(crate) tendons: u8,
    pub(crate) strands: u8,
    pub(crate) strand: &'static str,
    pub(crate) ends: [End; 2],
    pub(crate) path: Path,
    pub(crate) points: Vec<Point>,
    pub(crate) drawn_as: DrawnAs,
    pub(crate) lettering: Lettering,
    /// Added to every layer name, for superseded work.
    pub(crate) layer_suffix: &'static str,
    /// What the mark says, when that is not mark and strands.
    pub(crate) mark_text: Option<String>,
}

impl Tendon {
    /// `D012 5-12.7`, or `B03 4x5-12.7` for a line that stands for four.
    pub(crate) fn mark_text(&self) -> String {
        let Self {
            mark,
            tendons,
            strands,
            strand,
            ..
        } = self;
        match (&self.mark_text, tendons) {
            (Some(text), _) => text.clone(),
            (None, 1) => format!("{mark} {strands}-{strand}"),
            (None, _) => format!("{mark} {tendons}x{strands}-{strand}"),
        }
    }

    /// The same tendon drawn from its other end.
    pub(crate) fn reversed(mut self) -> Self {
        let length_mm = self.path.length_mm();
        self.path = self.path.reversed();
        if let DrawnAs::Spline(controls) = &mut self.drawn_as {
            controls.reverse();
        }
        self.ends.reverse();
        self.points.reverse();
        for point in &mut self.points {
            point.station_mm = length_mm - point.station_mm;
        }
        self.lettering.mark_station_mm = length_mm - self.lettering.mark_station_mm;
        self
    }

    /// Where a point lies in plan.
    pub(crate) fn place(&self, point: &Point) -> Xy {
        self.path.at(point.station_mm).0
    }
}
