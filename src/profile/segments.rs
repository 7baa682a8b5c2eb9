//! A curve between two of its stations: what an intermediate anchor leaves on either side of it.

use super::{Bend, Profile, SAME_PLACE_M, Span};

/// The part of a tendon's curve between two neighbouring anchors.
#[derive(Debug, Clone, PartialEq)]
pub struct Segment {
    /// Station of its first anchor on the whole curve, metres.
    pub from_m: f64,
    /// Its curve, from a station 0 of its own.
    pub curve: Profile,
}

impl Profile {
    /// The same curve, divided at the stations of intermediate anchors, which are in order.
    #[must_use]
    pub fn divided(self, anchors_m: &[f64]) -> Self {
        if anchors_m.is_empty() {
            return self;
        }
        let starts = std::iter::once(0.0).chain(anchors_m.iter().copied());
        let ends = anchors_m.iter().copied().chain([self.plan_length_m()]);
        let segments = starts
            .zip(ends)
            .map(|(from_m, to_m)| Segment {
                from_m,
                curve: self.between(from_m, to_m),
            })
            .collect();
        Self { segments, ..self }
    }

    /// The curve between two stations, from a station 0 of its own; a bend at either is left out. An anchor holds the strand
    /// in line with the segment that was pulled through it: what turns there turns beyond the wedges.
    #[must_use]
    pub fn between(&self, from_m: f64, to_m: f64) -> Self {
        let spans = self.spans.iter().filter_map(|span| {
            let start_m = (from_m - span.start_m).max(0.0);
            let end_m = (to_m - span.start_m).min(span.length_m);
            (end_m - start_m > SAME_PLACE_M).then(|| Span {
                start_m: (span.start_m - from_m).max(0.0),
                ..span.cut(start_m, end_m)
            })
        });
        let within = from_m + SAME_PLACE_M..to_m - SAME_PLACE_M;
        let bends = self
            .bends
            .iter()
            .filter(|bend| within.contains(&bend.station_m));
        let bends = bends.map(|bend| Bend {
            station_m: bend.station_m - from_m,
            ..*bend
        });
        Self::new(spans.collect(), bends.collect())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Two parabolas and a straight piece, with a bend where they meet and one within the last.
    fn curve() -> Profile {
        let span = |start_m, length_m, level_m, slope, curvature_per_m| Span {
            start_m,
            length_m,
            level_m,
            slope,
            curvature_per_m,
            plan_curvature_per_m: 0.0,
        };
        let spans = vec![
            span(0.0, 4.0, -0.1, -0.05, 0.0125),
            span(4.0, 5.0, -0.2, 0.0, 0.01),
            span(9.0, 3.0, -0.075, 0.04, 0.0),
        ];
        let bend = |station_m, angle_rad| Bend {
            station_m,
            angle_rad,
        };
        Profile::new(spans, vec![bend(9.0, 0.01), bend(10.5, 0.2)])
    }

    #[test]
    fn segments_add_up_to_the_whole_but_for_a_bend_at_an_anchor() {
        let whole = curve();
        for (anchors_m, lost_rad) in [
            (vec![2.5], 0.0),
            (vec![4.0, 7.25], 0.0),
            (vec![1.0, 9.0, 11.0], 0.01),
            (vec![10.5], 0.2),
        ] {
            let divided = curve().divided(&anchors_m);
            assert_eq!(divided.segments().len(), anchors_m.len() + 1);
            let sum = |of: fn(&Profile) -> f64| -> f64 {
                divided.segments().iter().map(|one| of(&one.curve)).sum()
            };
            assert!((sum(Profile::length_m) - whole.length_m()).abs() < 1e-12);
            assert!((sum(Profile::plan_length_m) - whole.plan_length_m()).abs() < 1e-12);
            let angle_rad = sum(Profile::total_angle_rad);
            assert!((angle_rad + lost_rad - whole.total_angle_rad()).abs() < 1e-12);
            for segment in divided.segments() {
                for tenth in 0..=10 {
                    let along_m = segment.curve.plan_length_m() * f64::from(tenth) / 10.0;
                    let (own_m, whole_m) = (
                        segment.curve.level_m(along_m),
                        whole.level_m(segment.from_m + along_m),
                    );
                    assert!((own_m - whole_m).abs() < 1e-12);
                }
            }
        }
    }

    #[test]
    fn a_curve_without_intermediate_anchors_is_left_alone() {
        assert!(curve().divided(&[]).segments().is_empty());
    }
}
