//! A tendon in its slab: drop panels and steps as they are drawn, and what a method asks of the thickness.

use crate::kit::{each, job, slab, tendon, worked};
use tautplan::floor::PointKind;

const POINTS: [(PointKind, f64, f64); 3] = [
    (PointKind::Anchor, 0.0, 0.125),
    (PointKind::Low, 10.0, 0.040),
    (PointKind::Anchor, 20.0, 0.125),
];

#[test]
fn a_step_in_the_top_moves_mid_depth_with_it() {
    let all_at = |top_m: f64| {
        let points = POINTS.map(|(kind, at, height)| (kind, at, height, 0.250, top_m));
        let zones: &[_] = if top_m == 0.0 {
            &[]
        } else {
            &[(-1.0, 21.0, 0.250, top_m)]
        };
        worked(slab(zones), tendon(&points), &job())
    };
    let (level, stepped) = (all_at(0.0), all_at(-0.300));
    for (a, b) in each(&level).into_iter().zip(each(&stepped)) {
        assert!((a.mean.eccentricity - b.mean.eccentricity).abs() < 1e-9);
        for (a_kn, b_kn) in a.service_kn.iter().zip(&b.service_kn) {
            assert!((a_kn - b_kn).abs() < 1e-9 * a_kn, "{a_kn} {b_kn}");
        }
    }
}

#[test]
fn the_drying_thickness_is_the_mean_of_the_slab_as_drawn() {
    // The tendon's points see the panels; the panels themselves are 2 m of 20.
    let points = [
        (PointKind::Anchor, 0.0, 0.125, 0.250, 0.0),
        (PointKind::Low, 5.0, 0.040, 0.250, 0.0),
        (PointKind::High, 10.0, 0.380, 0.450, 0.0),
        (PointKind::Low, 15.0, 0.040, 0.250, 0.0),
        (PointKind::Anchor, 20.0, 0.125, 0.250, 0.0),
    ];
    let analysis = worked(slab(&[(9.0, 11.0, 0.450, 0.0)]), tendon(&points), &job());
    let drawn = each(&analysis)[0];
    let lines = drawn.made.equations(drawn.mean);
    let h_0 = lines.iter().find(|line| line.symbol == "h_0");
    let h_0 = h_0.expect("EN 1992-1-1 shows it").value;
    assert!(
        (h_0 - (2.0 * 450.0 + 18.0 * 250.0) / 20.0).abs() < 0.1,
        "{h_0}"
    );
}
