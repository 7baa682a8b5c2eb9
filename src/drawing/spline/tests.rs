//! Splines held against what is known of them.

use super::*;
use crate::geometry::{Path, distance_m};

fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

fn path(spline: &Spline) -> Path {
    let mut out = Vec::new();
    spline.segments(&Placing::scaled(1.0), 1e-3, &mut out);
    Path::new(out)
}

#[test]
fn a_rational_quadratic_is_an_exact_quarter_circle() {
    let spline = Spline::new(
        2,
        &[0.0, 0.0, 0.0, 1.0, 1.0, 1.0],
        &[at(1.0, 0.0), at(1.0, 1.0), at(0.0, 1.0)],
        &[1.0, std::f64::consts::FRAC_1_SQRT_2, 1.0],
    )
    .expect("a spline");
    for step in 0..=20 {
        let (point, slope) = spline.at(f64::from(step) / 20.0);
        assert!((point.x.hypot(point.y) - 1.0).abs() < 1e-12);
        assert!((point.x * slope.x + point.y * slope.y).abs() < 1e-12);
    }
    assert!((path(&spline).length_m() - std::f64::consts::FRAC_PI_2).abs() < 1e-6);
}

#[test]
fn a_uniform_cubic_has_no_corners() {
    let points = [(0.0, 0.0), (3.0, 4.0), (6.0, -4.0), (9.0, 0.0), (12.0, 3.0)];
    let points: Vec<_> = points.iter().map(|&(x, y)| at(x, y)).collect();
    let knots = [0.0, 0.0, 0.0, 0.0, 1.0, 2.0, 2.0, 2.0, 2.0];
    let spline = Spline::new(3, &knots, &points, &[]).expect("a spline");
    let path = path(&spline);
    assert!(
        path.start()
            .is_some_and(|p| distance_m(p, points[0]) < 1e-12)
    );
    assert!(path.end().is_some_and(|p| distance_m(p, points[4]) < 1e-12));
    assert!(
        path.corners()
            .iter()
            .all(|corner| corner.turn_rad.abs() < 1e-6)
    );
    for step in 0..=200 {
        let point = spline.at(2.0 * f64::from(step) / 200.0).0;
        assert!(path.project(point).is_some_and(|p| p.distance_m < 1.2e-3));
    }
}

#[test]
fn a_degree_of_one_keeps_its_corners() {
    let points = [at(0.0, 0.0), at(4.0, 0.0), at(4.0, 3.0)];
    let spline = Spline::new(1, &[0.0, 0.0, 1.0, 2.0, 2.0], &points, &[]).expect("a spline");
    let path = path(&spline);
    assert!((path.length_m() - 7.0).abs() < 1e-9);
    let turns: Vec<_> = path
        .corners()
        .iter()
        .filter(|c| c.turn_rad.abs() > 1e-6)
        .copied()
        .collect();
    assert_eq!(turns.len(), 1);
}

#[test]
fn fit_points_are_passed_through() {
    let points = [at(0.0, 0.0), at(4.0, 1.0), at(7.0, -1.0), at(12.0, 0.0)];
    let spline = Spline::through(&points, None, None).expect("a spline");
    let path = path(&spline);
    for point in points {
        assert!(path.project(point).is_some_and(|p| p.distance_m < 1e-9));
    }
    assert!(
        path.corners()
            .iter()
            .all(|corner| corner.turn_rad.abs() < 1e-6)
    );
    let level = Spline::through(&points, Some(at(2.0, 0.0)), Some(at(1.0, 0.0))).expect("a spline");
    assert!(level.at(0.0).1.y.abs() < 1e-12);
    assert!(!level.is_closed());
}

#[test]
fn a_closed_curve_comes_back_without_a_corner_or_a_jump_of_curvature() {
    let ring = [
        at(0.0, 0.0),
        at(9.0, 1.0),
        at(8.0, 6.0),
        at(3.0, 9.0),
        at(-1.0, 4.0),
    ];
    let with_first_again = [&ring[..], &ring[..1]].concat();
    for points in [&ring[..], &with_first_again] {
        let spline = Spline::around(points).expect("a spline");
        assert!(spline.is_closed());
        let path = path(&spline);
        for point in ring {
            assert!(path.project(point).is_some_and(|p| p.distance_m < 1e-9));
        }
        let (from, to) = spline.domain();
        let curvature = |t: f64, step: f64| (spline.at(t + step).1 - spline.at(t).1) / step;
        let (leaving, arriving) = (spline.at(from).1, spline.at(to).1);
        assert!(distance_m(leaving, arriving) < 1e-9);
        let jump = curvature(from, 1e-5) - curvature(to, -1e-5);
        assert!(jump.x.hypot(jump.y) < 1e-4, "{jump:?}");
    }
}

#[test]
fn weights_are_whole_or_none() {
    let points = [at(1.0, 0.0), at(1.0, 1.0), at(0.0, 1.0)];
    let knots = [0.0, 0.0, 0.0, 1.0, 1.0, 1.0];
    let with = |weights: &[f64]| Spline::new(2, &knots, &points, weights);
    assert!(with(&[]).is_some() && with(&[1.0, 0.7, 1.0]).is_some());
    for weights in [
        &[1.0, 0.0, 1.0][..],
        &[1.0, -1.0, 1.0],
        &[1.0, 0.7],
        &[1.0; 4],
    ] {
        assert_eq!(with(weights), None);
    }
}

#[test]
fn nonsense_is_no_spline() {
    assert_eq!(Spline::new(3, &[0.0, 1.0], &[at(0.0, 0.0)], &[]), None);
    assert_eq!(
        Spline::through(&[at(1.0, 1.0), at(1.0, 1.0)], None, None),
        None
    );
}
