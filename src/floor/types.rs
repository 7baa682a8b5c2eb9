//! A floor as read: tendons with what the drawing says of each, and the slab.

use geo::{Coord, Polygon};

use crate::geometry::Path;

/// A floor.
#[derive(Debug, Clone, Default)]
pub struct Floor {
    /// Tendons, in an order that does not depend on the order of the entities (by mark, naturally: B2 before B10).
    pub tendons: Vec<Tendon>,
    /// The slab.
    pub slab: Slab,
}

/// One tendon line as drawn; what the drawing does not say is `None`, never assumed.
#[derive(Debug, Clone)]
pub struct Tendon {
    /// Mark, from the drawing or from the tendon's place on the plan.
    pub mark: String,
    /// Whether the drawing gives the mark.
    pub mark_drawn: bool,
    /// Whether the drawing shows the tendon only by a typical one of its group, of which this is a copy.
    pub made: bool,
    /// Handle of the (first) piece.
    pub handle: String,
    /// Layer of the pieces.
    pub layer: String,
    /// Banded or distributed, by layer.
    pub run: Run,
    /// Plan line, from its first drawn vertex.
    pub path: Path,
    /// Tendons that the line stands for.
    pub tendons: u32,
    /// Strands in each of those tendons, as drawn: a label may say 0.
    pub strands: Option<u32>,
    /// Strand size by its name in the job, such as `12.7`; as written, where the job knows none of that name.
    pub strand: Option<String>,
    /// Force after losses that the line's tendons together are required to have, kN, where a label says so.
    pub required_kn: Option<f64>,
    /// The same per width of slab, kN/m.
    pub required_kn_per_m: Option<f64>,
    /// The two ends: at station 0 and at the path's end.
    pub ends: [End; 2],
    /// Intermediate anchors between the ends, in order of station: each segment between two anchors is stressed by itself.
    pub joints: Vec<PourJoint>,
    /// Profile points in order of station: anchor first, anchor last.
    pub points: Vec<Point>,
}

/// An intermediate anchor: the tendon goes on through it from one pour into the next.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PourJoint {
    /// Station along the plan line, metres.
    pub station_m: f64,
    /// Place on the plan line, metres.
    pub place: Coord<f64>,
}

impl Tendon {
    /// Stations of the anchors on either side of a segment, the first of which is number 0, metres.
    pub fn segment_m(&self, segment: usize) -> [f64; 2] {
        let joint_m = |at: usize| Some(self.joints.get(at)?.station_m);
        let from_m = segment.checked_sub(1).and_then(joint_m);
        let to_m = joint_m(segment);
        [
            from_m.unwrap_or(0.0),
            to_m.unwrap_or_else(|| self.path.length_m()),
        ]
    }
}

/// Which way a tendon serves the floor.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Run {
    /// Gathered along a column line.
    Banded,
    /// Spread over the floor.
    Distributed,
}

/// An end of a tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct End {
    /// Live or dead; `None` where no symbol was found.
    pub kind: Option<EndKind>,
    /// Place on the plan, metres.
    pub place: Coord<f64>,
}

/// What is at an end.
#[derive(Debug, Clone, Copy, PartialEq, Eq, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum EndKind {
    /// Stressed from here.
    Live,
    /// Fixed.
    Dead,
}

/// A point at which the drawing fixes the tendon's level, or should.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Point {
    /// What the point is.
    pub kind: PointKind,
    /// Station along the plan line, metres.
    pub station_m: f64,
    /// Place on the plan line, metres.
    pub place: Coord<f64>,
    /// The drawing's own number here, metres, from the face and to the datum that it is written for; `None` where it gives
    /// none.
    pub drawn_m: Option<f64>,
    /// Strand centroid above the local soffit, metres; `None` where the drawing does not say.
    pub height_m: Option<f64>,
    /// What the height would be if the number were measured from the other soffit, the general slab's in place of the
    /// local one or the reverse, metres; `None` where that is the same, or the height is not from a soffit.
    pub other_soffit_m: Option<f64>,
    /// Slab thickness here, metres; `None` where the drawing does not say.
    pub thickness_m: Option<f64>,
    /// Top of the slab here above the top of the general slab (negative below it), metres.
    pub top_m: f64,
}

impl Point {
    /// Strand centroid above the top of the general slab (negative below it), metres.
    pub fn level_m(&self) -> Option<f64> {
        self.level_of_m(self.height_m?)
    }

    /// Where the concrete lies here.
    pub fn faces(&self) -> Faces {
        Faces {
            top_m: self.top_m,
            thickness_m: self.thickness_m,
        }
    }

    /// Level of a height above the local soffit, metres.
    pub fn level_of_m(&self, height_m: f64) -> Option<f64> {
        Some(height_m + self.faces().soffit_m()?)
    }
}

/// Kinds of profile point.
#[derive(Debug, Clone, Copy, PartialEq, Eq, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum PointKind {
    /// An end.
    Anchor,
    /// A high point.
    High,
    /// A low point.
    Low,
    /// A support height between a high and a low point: it checks the curve and does not bend it.
    Support,
}

/// The slab on plan.
#[derive(Debug, Clone, Default)]
pub struct Slab {
    /// Outlines (a floor may be drawn as several slabs).
    pub outlines: Vec<Polygon<f64>>,
    /// Openings.
    pub openings: Vec<Polygon<f64>>,
    /// Zones with a thickness or a top of their own.
    pub zones: Vec<Zone>,
    /// Thickness outside every zone, metres, from the job or the drawing.
    pub thickness_m: Option<f64>,
    /// Columns and walls.
    pub columns: Vec<Polygon<f64>>,
}

/// A zone of the slab.
#[derive(Debug, Clone)]
pub struct Zone {
    /// Its outline.
    pub outline: Polygon<f64>,
    /// Its thickness, metres.
    pub thickness_m: f64,
    /// Its top above the top of the general slab (negative below it), metres.
    pub top_m: f64,
}

/// Where the concrete lies at a place.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Faces {
    /// Top above the top of the general slab, metres.
    pub top_m: f64,
    /// Thickness, metres; `None` where it is not known.
    pub thickness_m: Option<f64>,
}

impl Faces {
    /// Faces of the general slab.
    pub fn general(thickness_m: Option<f64>) -> Self {
        Self {
            top_m: 0.0,
            thickness_m,
        }
    }

    /// Soffit above the top of the general slab, metres.
    pub fn soffit_m(&self) -> Option<f64> {
        Some(self.top_m - self.thickness_m?)
    }
}

impl Zone {
    /// Where its concrete lies.
    pub fn faces(&self) -> Faces {
        Faces {
            top_m: self.top_m,
            thickness_m: Some(self.thickness_m),
        }
    }
}
