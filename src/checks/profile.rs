//! What the curve does in elevation.

use super::Worked;
use super::words::{also_at, long, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::PointKind;
use crate::job::Job;
use crate::profile::Span;
use crate::units::{LONG, Units};

/// See [`Rule::meaning`].
pub static HIGHS_IN_A_ROW: Rule = Rule {
    name: "highs-in-a-row",
    meaning: "Between two high points stands a low point; without one the tendon is straight there.",
};

/// See [`Rule::meaning`].
pub static LOWS_IN_A_ROW: Rule = Rule {
    name: "lows-in-a-row",
    meaning: "Between two low points stands a high point; without one the tendon is straight there.",
};

/// See [`Rule::meaning`].
pub static HOGGING_RADIUS: Rule = Rule {
    name: "hogging-radius",
    meaning: "Over a high point the curve's least radius, l a/(2h), is at least limits.hogging_radius_error_m and should be \
              at least limits.hogging_radius_warning_m (common practice: 2.5 m and 5 m for flat ducts).",
};

/// See [`Rule::meaning`].
pub static SAGGING_RADIUS: Rule = Rule {
    name: "sagging-radius",
    meaning: "At a low point the curve's least radius, l (l − a)/(2h), is at least limits.sagging_radius_error_m and should \
              be at least limits.sagging_radius_warning_m (as over a high point: a duct kinks whichever way it is bent).",
};

/// Radii nearer to their limit than this are at it, metres.
const ROUNDING_M: f64 = 1e-6;

/// Crests nearer than this are one high point, metres.
const ONE_CREST_M: f64 = 1e-3;

/// Breaks in slope below this are rounding of heights, radians.
const LEAST_BREAK_RAD: f64 = 5e-4;

pub(super) fn highs_in_a_row(worked: &Worked) -> Option<Finding> {
    in_a_row(worked, &HIGHS_IN_A_ROW, PointKind::High, "high", "low")
}

pub(super) fn lows_in_a_row(worked: &Worked) -> Option<Finding> {
    in_a_row(worked, &LOWS_IN_A_ROW, PointKind::Low, "low", "high")
}

fn in_a_row(
    worked: &Worked,
    rule: &'static Rule,
    kind: PointKind,
    word: &str,
    missing: &str,
) -> Option<Finding> {
    let fixed: Vec<_> = worked
        .tendon
        .points
        .iter()
        // As drawn: a point that other tendons say belongs here is not on the drawing.
        .filter(|point| {
            point.kind != PointKind::Support
                && (point.height_m.is_some() || point.kind == PointKind::Anchor)
        })
        .collect();
    let pairs: Vec<(f64, f64)> = fixed
        .windows(2)
        .filter(|pair| pair[0].kind == kind && pair[1].kind == kind)
        .map(|pair| (pair[0].station_m, pair[1].station_m))
        .collect();
    // The longest straight is the one most likely to miss a point.
    let ((from_m, to_m), others) = worst_of(pairs, |pair| pair.1 - pair.0, |pair| pair.0)?;
    let straight = |units: Units| {
        worked.profile.map_or(String::new(), |profile| {
            // Hogging-radius and radius_min_m are of curves; a break in slope is a curve without a radius.
            let breaks: Vec<String> = profile
            .bends
            .iter()
            .filter(|bend| {
                let at = |station_m: f64| (bend.station_m - station_m).abs() < ONE_CREST_M;
                (at(from_m) || at(to_m)) && bend.angle_rad > LEAST_BREAK_RAD
            })
            .map(|bend| {
                format!(
                    "; it turns {:.3} rad at one point at station {}, which no radius given counts",
                    bend.angle_rad,
                    long(bend.station_m, units)
                )
            })
            .collect();
            format!(
                ", and the tendon was taken as straight there{}",
                breaks.concat()
            )
        })
    };
    Some(worked.finding(
        rule,
        Level::Warning,
        f64::midpoint(from_m, to_m),
        Wording::of(|units| {
            format!(
                "two {word} points in a row, at stations {} and {}; a {missing} point was expected between them{}{}",
                long(from_m, units),
                long(to_m, units),
                straight(units),
                also_at(&others, units)
            )
        }),
        format!(
            "draw the {missing} point's height between them, or correct the word of one of the two; if the tendon is meant \
             to run straight, nothing is to be done"
        ),
    ))
}

pub(super) fn hogging_radius(worked: &Worked, job: &Job) -> Option<Finding> {
    let limits = &job.limits;
    let bend = Bend {
        rule: &HOGGING_RADIUS,
        word: "hogging",
        sign: -1.0,
        error_m: limits.hogging_radius_error_m,
        warning_m: limits.hogging_radius_warning_m,
        remedy: "lower the high point, raise the low points beside it, or spread the hogging curve over more of the span \
                 (profile.inflection); a duct bent tighter kinks and its friction is more than was worked out",
    };
    bend.found(worked)
}

pub(super) fn sagging_radius(worked: &Worked, job: &Job) -> Option<Finding> {
    let limits = &job.limits;
    let bend = Bend {
        rule: &SAGGING_RADIUS,
        word: "sagging",
        sign: 1.0,
        error_m: limits.sagging_radius_error_m,
        warning_m: limits.sagging_radius_warning_m,
        remedy: "move the low point away from the high point or the anchor beside it, raise it, or leave the sagging curve \
                 more of the span (profile.inflection); a duct bent tighter kinks and its friction is more than was worked out",
    };
    bend.found(worked)
}

/// A way to bend, and how tightly a duct may be bent so.
struct Bend {
    rule: &'static Rule,
    word: &'static str,
    /// Of the curvature.
    sign: f64,
    error_m: f64,
    warning_m: f64,
    remedy: &'static str,
}

impl Bend {
    fn found(&self, worked: &Worked) -> Option<Finding> {
        let tight = worked
            .profile?
            .spans
            .iter()
            .filter(|span| self.sign * span.curvature_per_m > 0.0)
            .map(|span| (level_m(span), self.sign / span.curvature_per_m))
            .filter(|&(_, radius_m)| radius_m < self.warning_m - ROUNDING_M);
        // Both sides of one point, and pieces cut where the plan line turns, are one place.
        let mut places: Vec<(f64, f64)> = Vec::new();
        for next in tight {
            match places.last_mut() {
                Some(last) if (next.0 - last.0).abs() < ONE_CREST_M => last.1 = last.1.min(next.1),
                _ => places.push(next),
            }
        }
        let ((station_m, radius_m), others) = worst_of(places, |c| -c.1, |c| c.0)?;
        let (level, limit_m, key) = if radius_m < self.error_m - ROUNDING_M {
            (Level::Error, self.error_m, "error")
        } else {
            (Level::Warning, self.warning_m, "warning")
        };
        let word = self.word;
        Some(worked.finding(
            self.rule,
            level,
            station_m,
            Wording::of(|units| {
                format!(
                    "the curve has a {word} radius of {}; at least {} was expected (limits.{word}_radius_{key}_m){}",
                    long(radius_m, units),
                    units.of(LONG).given(limit_m),
                    also_at(&others, units)
                )
            }),
            self.remedy,
        ))
    }
}

/// Where a parabola is level, metres of plan line; also where only a part of it is this piece.
fn level_m(span: &Span) -> f64 {
    span.start_m - span.slope / span.curvature_per_m
}

#[cfg(test)]
mod tests {
    use super::super::testing::{high_to_low, job, point, straight, worked};
    use super::*;
    use crate::profile::Profile;

    #[test]
    fn two_highs_or_two_lows_in_a_row_are_seen_past_support_heights() {
        use PointKind::{Anchor, High, Low, Support};
        let mut tendon = straight(20.0);
        let kinds = [Anchor, High, Support, High, Low, Anchor];
        tendon.points = kinds
            .iter()
            .zip(0..)
            .map(|(&kind, n)| point(kind, f64::from(n) * 4.0, Some(0.1)))
            .collect();
        let found = highs_in_a_row(&worked(&tendon));
        assert!(found.is_some_and(|f| f.station_m == Some(8.0) && f.level == Level::Warning));
        assert_eq!(lows_in_a_row(&worked(&tendon)), None);
        let kinds = [Anchor, Low, Low, High, Low, Anchor];
        tendon.points = kinds
            .iter()
            .zip(0..)
            .map(|(&kind, n)| point(kind, f64::from(n) * 4.0, Some(0.1)))
            .collect();
        assert_eq!(highs_in_a_row(&worked(&tendon)), None);
        assert!(lows_in_a_row(&worked(&tendon)).is_some_and(|f| f.station_m == Some(6.0)));
        // A low that the neighbours say belongs here is not on the drawing.
        tendon.points = vec![
            point(Anchor, 0.0, None),
            point(High, 4.0, Some(0.2)),
            point(Low, 8.0, None),
            point(High, 12.0, Some(0.2)),
            point(Anchor, 20.0, None),
        ];
        assert!(highs_in_a_row(&worked(&tendon)).is_some_and(|f| f.station_m == Some(8.0)));
    }

    #[test]
    fn a_kink_where_two_highs_follow_each_other_is_said() {
        use PointKind::{Anchor, High};
        let said = |second_m: f64| {
            let mut tendon = straight(12.0);
            let marked = [
                (Anchor, 0.0, 0.1),
                (High, 4.0, 0.17),
                (High, 8.0, second_m),
                (Anchor, 12.0, 0.1),
            ];
            tendon.points = marked
                .map(|(kind, station_m, height_m)| point(kind, station_m, Some(height_m)))
                .to_vec();
            let profile = crate::profile::build(&tendon, &job().profile).expect("a curve");
            let mut worked = worked(&tendon);
            worked.profile = Some(&profile);
            highs_in_a_row(&worked).map_or(String::new(), |found| found.text.to_string())
        };
        let slope_rad = (0.04_f64 / 4.0).atan();
        let text = said(0.13);
        assert!(
            text.contains(&format!(
                "turns {slope_rad:.3} rad at one point at station 4.00 m"
            )),
            "{text}"
        );
        assert!(!said(0.17).contains("at one point"));
    }

    #[test]
    fn hogging_radius_warns_and_errs_at_its_limits() {
        let tendon = straight(10.0);
        // Radius over the high point l a/(2h), l = 5 m, h = 0.1 m.
        let level_at = |radius_m: f64| {
            let profile = high_to_low(5.0, 0.1, radius_m * 2.0 * 0.1 / 5.0);
            let mut worked = worked(&tendon);
            worked.profile = Some(&profile);
            hogging_radius(&worked, &job()).map(|found| found.level)
        };
        let limits = job().limits;
        assert_eq!(level_at(limits.hogging_radius_warning_m + 0.01), None);
        assert_eq!(
            level_at(limits.hogging_radius_warning_m - 0.01),
            Some(Level::Warning)
        );
        assert_eq!(
            level_at(limits.hogging_radius_error_m + 0.01),
            Some(Level::Warning)
        );
        assert_eq!(
            level_at(limits.hogging_radius_error_m - 0.01),
            Some(Level::Error)
        );
    }

    #[test]
    fn sagging_radius_warns_and_errs_at_its_limits() {
        let tendon = straight(10.0);
        // Radius at the low point l (l - a)/(2h), l = 5 m, h = 0.1 m.
        let level_at = |radius_m: f64| {
            let profile = high_to_low(5.0, 0.1, 5.0 - radius_m * 2.0 * 0.1 / 5.0);
            let mut worked = worked(&tendon);
            worked.profile = Some(&profile);
            assert_eq!(hogging_radius(&worked, &job()), None);
            sagging_radius(&worked, &job()).map(|found| {
                assert!(found.text.contains("sagging radius") && found.station_m == Some(5.0));
                found.level
            })
        };
        let limits = job().limits;
        assert_eq!(level_at(limits.sagging_radius_warning_m + 0.01), None);
        for (radius_m, level) in [
            (limits.sagging_radius_warning_m - 0.01, Level::Warning),
            (limits.sagging_radius_error_m + 0.01, Level::Warning),
            (limits.sagging_radius_error_m - 0.01, Level::Error),
        ] {
            assert_eq!(level_at(radius_m), Some(level));
        }
    }

    #[test]
    fn one_high_point_is_one_place_though_the_plan_line_cuts_its_curve() {
        let whole = high_to_low(5.0, 0.1, 0.2);
        let hogging = whole.spans[0];
        let (first_m, rest_m) = (0.05, hogging.length_m - 0.05);
        let cut = [
            Span {
                length_m: first_m,
                ..hogging
            },
            Span {
                start_m: first_m,
                length_m: rest_m,
                level_m: hogging.level_at(first_m),
                slope: hogging.slope_at(first_m),
                ..hogging
            },
            whole.spans[1],
        ];
        let tendon = straight(10.0);
        let found = |profile: &Profile| {
            let mut worked = worked(&tendon);
            worked.profile = Some(profile);
            hogging_radius(&worked, &job()).map(|found| found.text)
        };
        assert_eq!(
            found(&Profile::new(cut.to_vec(), Vec::new())),
            found(&whole)
        );
    }
}
