//! What the heights of a tendon say against one another.

use super::Worked;
use super::words::{also_at, long, short, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::{Point, PointKind};
use crate::job::Job;
use crate::profile::support_residuals;
use crate::units::Units;

/// See [`Rule::meaning`].
pub static HIGH_BELOW_LOW: Rule = Rule {
    name: "high-below-low",
    meaning: "A high point's level is above the levels of the low points beside it.",
};

/// See [`Rule::meaning`].
pub static SUPPORT_OFF_CURVE: Rule = Rule {
    name: "support-off-curve",
    meaning: "A support height lies on the curve through the high and low points beside it, to \
              limits.support_residual_warning_mm; above limits.support_residual_error_mm it is an error (common practice: \
              heights are drawn to 5 mm).",
};

/// Levels and residuals nearer to their limit than this are at it, metres.
const ROUNDING_M: f64 = 1e-6;

pub(super) fn high_below_low(worked: &Worked) -> Option<Finding> {
    let bending: Vec<&Point> = worked
        .tendon
        .points
        .iter()
        .filter(|point| point.kind != PointKind::Support)
        .collect();
    let upside_down: Vec<(&Point, &Point, f64)> = bending
        .windows(2)
        .filter_map(|pair| {
            let [before, after] = *pair else { return None };
            let (high, low) = match (before.kind, after.kind) {
                (PointKind::High, PointKind::Low) => (before, after),
                (PointKind::Low, PointKind::High) => (after, before),
                _ => return None,
            };
            let above_m = high.level_m()? - low.level_m()?;
            (above_m <= ROUNDING_M).then_some((high, low, above_m))
        })
        .collect();
    let station_m = |pair: &(&Point, &Point, f64)| pair.0.station_m;
    let ((high, low, above_m), mut others) = worst_of(upside_down, |pair| -pair.2, station_m)?;
    // A high point between two low ones is one place.
    others.dedup();
    others.retain(|&other_m| other_m.total_cmp(&high.station_m).is_ne());
    // At one level with its low point the tendon is straight: it can be built, and the words are still wrong.
    let (level, how) = if above_m < -ROUNDING_M {
        (Level::Error, "lower than")
    } else {
        (Level::Warning, "at the level of")
    };
    Some(worked.finding(
        &HIGH_BELOW_LOW,
        level,
        high.station_m,
        Wording::of(|units| {
            format!(
                "the high point at station {} ({}) is {how} the low point at station {} ({}); it was expected above it{}",
                long(high.station_m, units),
                height(high, units),
                long(low.station_m, units),
                height(low, units),
                also_at(&others, units)
            )
        }),
        "exchange the words high and low, or correct the height that is wrong; check which face the heights are measured \
         from (height.from), since a profile read from the wrong one stands upside down",
    ))
}

/// A point's height, and its level where another height of slab could make the two differ.
fn height(point: &Point, units: Units) -> String {
    let from_soffit = point.height_m.map_or(String::new(), |height_m| {
        format!("{} above the soffit", short(height_m, units))
    });
    let below_top = point.level_m().map_or(String::new(), |level_m| {
        let slab = if point.top_m == 0.0 {
            "slab"
        } else {
            "general slab"
        };
        format!(", {} below the top of the {slab}", short(-level_m, units))
    });
    from_soffit + &below_top
}

pub(super) fn support_off_curve(worked: &Worked, job: &Job) -> Option<Finding> {
    let (profile, limits) = (worked.profile?, &job.limits);
    let off: Vec<(&Point, f64)> = support_residuals(profile, worked.tendon)
        .into_iter()
        .filter(|(_, off_m)| off_m.abs() > limits.support_residual_warning_m + ROUNDING_M)
        .filter_map(|(index, off_m)| Some((worked.tendon.points.get(index)?, off_m)))
        .collect();
    let ((point, off_m), others) = worst_of(off, |s| s.1.abs(), |s| s.0.station_m)?;
    let (level, limit_m, key) = if off_m.abs() > limits.support_residual_error_m + ROUNDING_M {
        (
            Level::Error,
            limits.support_residual_error_m,
            "limits.support_residual_error_mm",
        )
    } else {
        (
            Level::Warning,
            limits.support_residual_warning_m,
            "limits.support_residual_warning_mm",
        )
    };
    let side = if off_m > 0.0 { "above" } else { "below" };
    let drawn_m = point.height_m.unwrap_or_default();
    Some(worked.finding(
        &SUPPORT_OFF_CURVE,
        level,
        point.station_m,
        Wording::of(|units| {
            let short = |length_m: f64| short(length_m, units);
            format!(
                "the support height of {} is {} {side} the curve through the high and low points beside it, which is at {} \
                 there; at most {} was expected ({key}){}",
                short(drawn_m),
                short(off_m.abs()),
                short(drawn_m - off_m),
                short(limit_m),
                also_at(&others, units)
            )
        }),
        "correct the support height, or the high or low point beside it; if the supports follow another shape of curve, set \
         profile.inflection or profile.fit_inflection",
    ))
}

#[cfg(test)]
mod tests {
    use super::super::testing::{high_to_low, job, point, straight, worked};
    use super::*;
    use PointKind::{Anchor, High, Low, Support};

    #[test]
    fn a_high_point_stands_above_the_low_points_beside_it() {
        let found = |high_m: f64, low_m: f64| {
            let mut tendon = straight(20.0);
            tendon.points = vec![
                point(Anchor, 0.0, Some(0.1)),
                point(Low, 5.0, Some(low_m)),
                point(Support, 7.0, Some(0.1)),
                point(High, 10.0, Some(high_m)),
                point(Low, 15.0, Some(low_m)),
                point(Anchor, 20.0, Some(0.1)),
            ];
            high_below_low(&worked(&tendon))
        };
        assert_eq!(found(0.101, 0.1), None);
        assert!(found(0.1, 0.1).is_some_and(|f| f.level == Level::Warning));
        let upside_down = found(0.04, 0.17).expect("upside down");
        assert_eq!(
            (upside_down.level, upside_down.station_m),
            (Level::Error, Some(10.0))
        );
        for said in ["high point", "40 mm", "low point", "170 mm"] {
            assert!(upside_down.text.contains(said), "{}", upside_down.text);
        }
        assert!(
            !upside_down.text.contains("also at"),
            "{}",
            upside_down.text
        );
    }

    #[test]
    fn a_support_height_may_be_off_by_what_heights_are_drawn_to() {
        let profile = high_to_low(10.0, 0.1, 1.0);
        let level = |off_m: f64| {
            let mut tendon = straight(10.0);
            let on_curve_m = 0.2 + profile.level_m(4.0);
            tendon.points = vec![point(Support, 4.0, Some(on_curve_m + off_m))];
            let mut worked = worked(&tendon);
            worked.profile = Some(&profile);
            support_off_curve(&worked, &job()).map(|found| (found.level, found.station_m))
        };
        let limits = job().limits;
        let (warning_m, error_m) = (
            limits.support_residual_warning_m,
            limits.support_residual_error_m,
        );
        for side in [1.0, -1.0] {
            assert_eq!(level(side * (warning_m - 1e-4)), None);
            let warned = Some((Level::Warning, Some(4.0)));
            assert_eq!(level(side * (warning_m + 1e-4)), warned);
            assert_eq!(level(side * (error_m - 1e-4)), warned);
            let erred = Some((Level::Error, Some(4.0)));
            assert_eq!(level(side * (error_m + 1e-4)), erred);
        }
    }
}
