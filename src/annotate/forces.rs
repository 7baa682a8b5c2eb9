//! Tendons as coloured lengths: each length is one class of the share of jacking force left.

use geo::Coord;

use super::lanes::Lane;
use super::{layers, ramp};
use crate::analysis::{Analysis, Sample, pair};
use crate::drawing::{Drawn, Mark};
use crate::geometry::distance_m;

/// Length of a dash, metres, and most of them on a tendon.
const DASH_M: f64 = 0.5;
const MOST_DASHES: f64 = 60.0;

/// The lengths of all tendons that have forces, stage by stage, in the floor's order.
pub(super) fn lengths(analysis: &Analysis, lanes: &[Lane]) -> Vec<Mark> {
    let mut marks = Vec::new();
    for (stage, layer) in layers::FORCE.into_iter().enumerate() {
        for ((_, result), lane) in pair(analysis).zip(lanes) {
            let Some(forces) = &result.forces else {
                continue;
            };
            for run in runs(&result.samples, stage, forces.jack_kn) {
                let drawn = Drawn::Line {
                    points: run.points,
                    width_m: lane.width_m,
                    closed: false,
                };
                marks.push(layers::inked(layer, ramp::class_ink(run.class), drawn));
            }
        }
    }
    marks
}

/// Grey dashes on a thin grey line along the tendons that have no forces in service: left in their layer's colour they
/// would pass for one of the classes.
pub(super) fn without(analysis: &Analysis, lanes: &[Lane]) -> Vec<Mark> {
    let mut marks = Vec::new();
    for ((tendon, result), lane) in pair(analysis).zip(lanes) {
        let in_service = result.forces.as_ref().and_then(|forces| forces.later);
        if in_service.is_some() {
            continue;
        }
        let length_m = tendon.path.length_m();
        let grey = |points, width_m| {
            let drawn = Drawn::Line {
                points,
                width_m,
                closed: false,
            };
            layers::inked(layers::FINDING, layers::GREY, drawn)
        };
        let whole = tendon.path.to_line_string(0.01).0;
        if whole.len() > 1 {
            marks.push(grey(whole, lane.width_m / 4.0));
        }
        // A line drawn in another unit must not turn into millions of dashes.
        let pitch_m = DASH_M.max(length_m / MOST_DASHES) * 1.6;
        let mut from_m = 0.0;
        while from_m < length_m {
            let to_m = (from_m + pitch_m / 1.6).min(length_m);
            let stations_m = [from_m, f64::midpoint(from_m, to_m), to_m];
            let dash = stations_m.map(|at_m| tendon.path.place_at(at_m));
            marks.push(grey(dash.to_vec(), lane.width_m));
            from_m += pitch_m;
        }
    }
    marks
}

/// A length in one colour.
#[derive(Debug, PartialEq)]
struct Run {
    class: usize,
    points: Vec<Coord<f64>>,
}

/// Cuts a tendon where its share of the jacking force passes from one class into the next.
fn runs(samples: &[Sample], stage: usize, jack_kn: f64) -> Vec<Run> {
    let mut done = Vec::new();
    let mut open: Option<Run> = None;
    for step in samples.windows(2) {
        let [from, to] = step else { continue };
        let (Some(start), Some(end)) = (share(from, stage, jack_kn), share(to, stage, jack_kn))
        else {
            close(&mut done, open.take());
            continue;
        };
        let mut at = 0.0;
        for next in cuts(start, end).into_iter().chain([1.0]) {
            let between = |t: f64| from.place + (to.place - from.place) * t;
            let class = ramp::class_of(start + (end - start) * f64::midpoint(at, next));
            if open.as_ref().is_none_or(|run| run.class != class) {
                close(&mut done, open.take());
            }
            open.get_or_insert_with(|| Run {
                class,
                points: vec![between(at)],
            })
            .points
            .push(between(next));
            at = next;
        }
    }
    close(&mut done, open);
    done
}

fn share(sample: &Sample, stage: usize, jack_kn: f64) -> Option<f64> {
    let force_kn = (*sample.forces_kn.get(stage)?)?;
    Some(force_kn / jack_kn).filter(|share| share.is_finite())
}

/// Where between two shares a class ends, as fractions of the way.
fn cuts(start: f64, end: f64) -> Vec<f64> {
    if ramp::class_of(start) == ramp::class_of(end) {
        return Vec::new();
    }
    let mut cuts: Vec<f64> = ramp::BOUNDS
        .iter()
        .map(|bound| (bound - start) / (end - start))
        .filter(|t| *t > 0.0 && *t < 1.0)
        .collect();
    cuts.sort_by(f64::total_cmp);
    cuts
}

/// Ends a run, without the points that a straight line does not need; a run without length is none.
fn close(done: &mut Vec<Run>, run: Option<Run>) {
    const SAME_M: f64 = 1e-6;
    let Some(run) = run else { return };
    let mut kept: Vec<Coord<f64>> = Vec::with_capacity(run.points.len());
    for point in run.points {
        if kept
            .last()
            .is_some_and(|last| distance_m(*last, point) < SAME_M)
        {
            continue;
        }
        if let [.., before, middle] = kept[..]
            && off_line_m(before, point, middle) < SAME_M
        {
            kept.pop();
        }
        kept.push(point);
    }
    if kept.len() > 1 {
        done.push(Run {
            class: run.class,
            points: kept,
        });
    }
}

/// Distance of a point from the line through two others, metres.
fn off_line_m(from: Coord<f64>, to: Coord<f64>, point: Coord<f64>) -> f64 {
    let (run, away) = (to - from, point - from);
    (run.x * away.y - run.y * away.x).abs() / run.x.hypot(run.y)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn samples(forces_kn: &[Option<f64>]) -> Vec<Sample> {
        (0_u32..)
            .zip(forces_kn)
            .map(|(i, force)| Sample {
                station_m: f64::from(i),
                place: Coord {
                    x: f64::from(i),
                    y: 2.0,
                },
                level_m: -0.1,
                forces_kn: [*force; 4],
            })
            .collect()
    }

    #[test]
    fn a_colour_ends_where_its_class_ends_and_not_at_the_next_sample() {
        let runs = runs(&samples(&[Some(100.0), Some(88.0), Some(86.0)]), 0, 100.0);
        assert_eq!(runs.len(), 2);
        assert_eq!((runs[0].class, runs[1].class), (0, 1));
        assert!((runs[0].points[1].x - 10.0 / 12.0).abs() < 1e-12);
        assert_eq!(runs[0].points[1], runs[1].points[0]);
        assert_eq!(runs[1].points.len(), 2, "no vertex on a straight line");
    }

    #[test]
    fn a_steep_step_shows_every_class_it_passes() {
        let runs = runs(&samples(&[Some(100.0), Some(58.0)]), 0, 100.0);
        let classes: Vec<usize> = runs.iter().map(|run| run.class).collect();
        assert_eq!(classes, [0, 1, 2, 3, 4, 5, 6, 7]);
    }

    #[test]
    fn an_unknown_stretch_stays_without_colour() {
        let runs = runs(
            &samples(&[Some(99.0), Some(98.0), None, Some(97.0), Some(96.0)]),
            0,
            100.0,
        );
        assert_eq!(runs.len(), 2);
        assert!((runs[0].points[1].x - 1.0).abs() < 1e-12);
        assert!((runs[1].points[0].x - 3.0).abs() < 1e-12);
    }

    #[test]
    fn no_jacking_force_gives_no_colour() {
        assert!(runs(&samples(&[Some(0.0), Some(0.0)]), 0, 0.0).is_empty());
    }
}
