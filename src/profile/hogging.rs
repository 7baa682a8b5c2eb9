//! The hogging length at a high point: from the job's fraction, or fitted to support heights.

/// Level between a high point and a low point, metres: z = zH − h t²/(l a) for t ≤ a, then z = zL + h (l − t)²/(l (l − a)).
/// `t_m` from the high point, `l_m` between the two, `a_m` the hogging length.
pub(super) fn level_between(high_m: f64, low_m: f64, l_m: f64, a_m: f64, t_m: f64) -> f64 {
    let drop_m = high_m - low_m;
    if t_m < a_m || a_m >= l_m {
        high_m - drop_m * t_m * t_m / (l_m * a_m)
    } else {
        low_m + drop_m * (l_m - t_m).powi(2) / (l_m * (l_m - a_m))
    }
}

/// Places tried before the best is refined.
const TRIES: u32 = 64;

/// Halvings of the bracket while refining: to about 1e-9 of the length.
const REFINEMENTS: u32 = 40;

/// The hogging length, as least squares over the support heights between a high and a low point give it, metres.
/// `supports`: distance from the high point and level, metres. `None` where there is no support to fit.
pub(super) fn fitted_m(high_m: f64, low_m: f64, l_m: f64, supports: &[(f64, f64)]) -> Option<f64> {
    if supports.is_empty() {
        return None;
    }
    let misfit = |a_m: f64| -> f64 {
        supports
            .iter()
            .map(|&(t_m, level_m)| (level_between(high_m, low_m, l_m, a_m, t_m) - level_m).powi(2))
            .sum()
    };
    let place = |step: u32| l_m * f64::from(step) / f64::from(TRIES);
    // The misfit may have several hollows: take the lowest of a comb (the first of equals), then close in on it.
    let best = (1..=TRIES).min_by(|&a, &b| misfit(place(a)).total_cmp(&misfit(place(b))))?;
    let (mut from_m, mut to_m) = (place(best - 1), place((best + 1).min(TRIES)));
    let golden = 0.5 * (5.0_f64.sqrt() - 1.0);
    for _ in 0..REFINEMENTS {
        let reach_m = golden * (to_m - from_m);
        let (left_m, right_m) = (to_m - reach_m, from_m + reach_m);
        if misfit(left_m) <= misfit(right_m) {
            to_m = right_m;
        } else {
            from_m = left_m;
        }
    }
    Some(f64::midpoint(from_m, to_m).clamp(1e-6 * l_m, l_m))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn supports_on_a_curve_give_its_hogging_length_back() {
        for a_m in [0.3, 0.84, 1.5, 2.6] {
            let supports: Vec<(f64, f64)> = [0.8, 1.6, 2.4, 3.2]
                .into_iter()
                .map(|t_m| (t_m, level_between(-0.04, -0.165, 4.2, a_m, t_m)))
                .collect();
            let found_m =
                fitted_m(-0.04, -0.165, 4.2, &supports).expect("there are supports to fit");
            assert!((found_m - a_m).abs() < 1e-4, "{found_m} for {a_m}");
        }
    }

    #[test]
    fn the_two_parabolas_meet_on_the_chord_with_slope_two_h_over_l() {
        let (h, l, a) = (0.125, 4.2, 0.84);
        let join_m = level_between(0.0, -h, l, a, a);
        assert!((join_m + h * a / l).abs() < 1e-12);
        let slope = |from: f64, to: f64| {
            (level_between(0.0, -h, l, a, to) - level_between(0.0, -h, l, a, from)) / (to - from)
        };
        assert!((slope(a - 1e-6, a) + 2.0 * h / l).abs() < 1e-5);
        assert!((slope(a, a + 1e-6) + 2.0 * h / l).abs() < 1e-5);
    }

    #[test]
    fn without_supports_nothing_is_fitted() {
        assert_eq!(fitted_m(0.0, -0.1, 4.0, &[]), None);
    }
}
