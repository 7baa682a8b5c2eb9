//! What a whole curve answers at a station.

use super::types::{SoFar, Tightest};
use super::{Bend, Profile, SAME_PLACE_M, Segment, Span};

impl Profile {
    /// A curve from its pieces (in order, without gaps) and bends (in order of station).
    pub fn new(spans: Vec<Span>, bends: Vec<Bend>) -> Self {
        let mut so_far = SoFar::default();
        let mut starts = vec![so_far];
        for span in &spans {
            so_far.arc_m += span.arc_length_to(span.length_m);
            so_far.angle_rad += span.angle_to(span.length_m);
            starts.push(so_far);
        }
        let mut sum_rad = 0.0;
        let mut bends_before_rad = vec![sum_rad];
        for bend in &bends {
            sum_rad += bend.angle_rad;
            bends_before_rad.push(sum_rad);
        }
        Self {
            spans,
            bends,
            starts,
            bends_before_rad,
            segments: Vec::new(),
        }
    }

    /// What lies between each two neighbouring anchors, in order; none where there are only the two at the ends.
    pub fn segments(&self) -> &[Segment] {
        &self.segments
    }

    /// Index of the piece that holds a station (the later of two that meet there), and the plan distance from its start.
    pub fn locate(&self, station_m: f64) -> (usize, f64) {
        let after = self.spans.partition_point(|span| span.start_m <= station_m);
        let index = after.saturating_sub(1);
        let along_m = self.spans.get(index).map_or(0.0, |span| {
            (station_m - span.start_m).clamp(0.0, span.length_m)
        });
        (index, along_m)
    }

    /// Level, metres above the top of the slab.
    pub fn level_m(&self, station_m: f64) -> f64 {
        let (index, along_m) = self.locate(station_m);
        self.spans
            .get(index)
            .map_or(0.0, |span| span.level_at(along_m))
    }

    /// dz/dx; where the slope breaks, that of the piece that follows.
    pub fn slope(&self, station_m: f64) -> f64 {
        let (index, along_m) = self.locate(station_m);
        self.spans
            .get(index)
            .map_or(0.0, |span| span.slope_at(along_m))
    }

    /// Length in space and smooth angle from station 0 to a place on a piece.
    pub(crate) fn so_far(&self, index: usize, along_m: f64) -> (f64, f64) {
        match (self.starts.get(index), self.spans.get(index)) {
            (Some(start), Some(span)) => (
                start.arc_m + span.arc_length_to(along_m),
                start.angle_rad + span.angle_to(along_m),
            ),
            _ => (0.0, 0.0),
        }
    }

    /// Sum of the first `count` bends, radians.
    pub(crate) fn bends_rad(&self, count: usize) -> f64 {
        self.bends_before_rad.get(count).copied().unwrap_or(0.0)
    }

    /// Length in space from station 0, metres.
    pub fn arc_length_m(&self, station_m: f64) -> f64 {
        let (index, along_m) = self.locate(station_m);
        self.so_far(index, along_m).0
    }

    /// Angle turned in space from station 0, radians, with the bends at or before the station.
    pub fn angle_rad(&self, station_m: f64) -> f64 {
        let count = self
            .bends
            .partition_point(|bend| bend.station_m <= station_m + SAME_PLACE_M);
        self.smooth_angle_rad(station_m) + self.bends_rad(count)
    }

    /// Angle turned in space from station 0, radians, without a bend at the station.
    pub fn angle_before_rad(&self, station_m: f64) -> f64 {
        let count = self
            .bends
            .partition_point(|bend| bend.station_m < station_m - SAME_PLACE_M);
        self.smooth_angle_rad(station_m) + self.bends_rad(count)
    }

    /// Angle turned in space from the far end back to the station, radians, with the bends at or beyond the station.
    pub fn angle_from_end_rad(&self, station_m: f64) -> f64 {
        self.total_angle_rad() - self.angle_before_rad(station_m)
    }

    fn smooth_angle_rad(&self, station_m: f64) -> f64 {
        let (index, along_m) = self.locate(station_m);
        self.so_far(index, along_m).1
    }

    /// Length in space, metres.
    pub fn length_m(&self) -> f64 {
        self.starts.last().map_or(0.0, |last| last.arc_m)
    }

    /// Length in plan, metres.
    pub fn plan_length_m(&self) -> f64 {
        self.spans.last().map_or(0.0, Span::end_m)
    }

    /// Angle turned in space from end to end, bends included, radians.
    pub fn total_angle_rad(&self) -> f64 {
        self.starts.last().map_or(0.0, |last| last.angle_rad)
            + self.bends_before_rad.last().copied().unwrap_or(0.0)
    }

    /// Least vertical radius where the curve hogs; `None` where it nowhere does. Of equals, the first.
    pub fn hogging_radius_min_m(&self) -> Option<Tightest> {
        self.tightest(|span| span.curvature_per_m < 0.0)
    }

    /// Least vertical radius, hogging or sagging; `None` for a straight curve. Of equals, the first.
    pub fn radius_min_m(&self) -> Option<Tightest> {
        self.tightest(|_| true)
    }

    fn tightest(&self, counts: impl Fn(&Span) -> bool) -> Option<Tightest> {
        self.spans
            .iter()
            .filter(|span| counts(span))
            .filter_map(|span| {
                let (radius_m, along_m) = span.vertical_radius_min()?;
                let station_m = span.start_m + along_m;
                Some(Tightest {
                    radius_m,
                    station_m,
                })
            })
            .min_by(|a, b| a.radius_m.total_cmp(&b.radius_m))
    }
}
