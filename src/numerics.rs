//! A bracketed root finder and an adaptive quadrature, each with its accuracy stated.

/// A root of `f` between `a` and `b`, at whose ends `f` must differ in sign (infinite values are allowed).
///
/// Guarantee: within `tolerance` of the value returned, `f` changes sign; for a continuous `f` that is a root, for a
/// jump it is the jump. `None` if the signs at the ends do not differ or a value there is not a number. Takes at most one
/// evaluation more than bisection and about log log as many where `f` is smooth (the ITP method, I. F. D. Oliveira and
/// R. H. C. Takahashi, ACM Transactions on Mathematical Software 47(1), 2020).
pub fn root(f: impl Fn(f64) -> f64, a: f64, b: f64, tolerance: f64) -> Option<f64> {
    let (mut low, mut high) = (a.min(b), a.max(b));
    let (mut at_low, mut at_high) = (f(low), f(high));
    if at_low == 0.0 {
        return Some(low);
    }
    if at_high == 0.0 {
        return Some(high);
    }
    if at_low.is_nan() || at_high.is_nan() || at_low.signum() * at_high.signum() > 0.0 {
        return None;
    }
    let rising = at_high.signum();
    (at_low, at_high) = (at_low * rising, at_high * rising);

    let finest = 4.0 * f64::EPSILON * low.abs().max(high.abs());
    let half_width = tolerance.max(finest).max(f64::MIN_POSITIVE);
    let halvings = ((high - low) / (2.0 * half_width)).log2().ceil().max(0.0);
    // A millionth less than one halving to spare, so that rounding never costs another.
    let mut slack = half_width * (halvings + 1.0).exp2() * (1.0 - 1e-6);
    let truncation = 0.2 / (high - low);
    while high - low > 2.0 * half_width {
        let middle = f64::midpoint(low, high);
        let radius = slack - 0.5 * (high - low);
        let secant = (at_high * low - at_low * high) / (at_high - at_low);
        let aim = if secant.is_finite() { secant } else { middle };
        let towards = (middle - aim).signum();
        let step = truncation * (high - low) * (high - low);
        let nudged = if step <= (middle - aim).abs() {
            aim + towards * step
        } else {
            middle
        };
        let next = if (nudged - middle).abs() <= radius {
            nudged
        } else {
            middle - towards * radius
        };
        let value = f(next) * rising;
        if value > 0.0 {
            (high, at_high) = (next, value);
        } else if value < 0.0 {
            (low, at_low) = (next, value);
        } else {
            // Zero; or not a number, where no better place is known.
            return Some(next);
        }
        slack *= 0.5;
    }
    Some(f64::midpoint(low, high))
}

/// The Gauss rule of 3 points and Kronrod's extension to 7: abscissa, weight of 7, weight of 3. Computed to 40 digits from
/// the orthogonality conditions; the tests below prove degree 11.
const RULE: [(f64, f64, f64); 4] = [
    (0.0, 0.450_916_538_658_474_14, 8.0 / 9.0),
    (0.434_243_749_346_802_56, 0.401_397_414_775_962_2, 0.0),
    (0.774_596_669_241_483_4, 0.268_488_089_868_333_44, 5.0 / 9.0),
    (0.960_491_268_708_020_3, 0.104_656_226_026_467_27, 0.0),
];

/// Two rules may differ by this much, relatively, before a piece is halved. The rule of 7 is then far closer than that.
const AGREE: f64 = 1e-7;

/// A piece is halved at most this often: a jump inside it is then found to 1e-9 of its length.
const HALVINGS: u32 = 30;

/// The integrals of several functions of one variable from `a` to `b`, evaluated together.
///
/// Accuracy: 1e-7 relative to the integral of the absolute values or better, in practice about 1e-12 for smooth
/// integrands, since pieces are halved until rules of degree 5 and 11 agree to 1e-7.
pub fn integrate<const N: usize>(f: &impl Fn(f64) -> [f64; N], a: f64, b: f64) -> [f64; N] {
    halve_until_agreed(f, a, b, HALVINGS)
}

fn halve_until_agreed<const N: usize>(
    f: &impl Fn(f64) -> [f64; N],
    a: f64,
    b: f64,
    halvings: u32,
) -> [f64; N] {
    let (middle, half) = (f64::midpoint(a, b), 0.5 * (b - a));
    let (mut fine, mut coarse, mut size) = ([0.0; N], [0.0; N], [0.0; N]);
    let mut add = |values: [f64; N], weight_fine: f64, weight_coarse: f64| {
        for (index, value) in values.into_iter().enumerate() {
            fine[index] += weight_fine * value;
            coarse[index] += weight_coarse * value;
            size[index] += weight_fine * value.abs();
        }
    };
    for (index, &(abscissa, weight_fine, weight_coarse)) in RULE.iter().enumerate() {
        add(f(middle + half * abscissa), weight_fine, weight_coarse);
        if index > 0 {
            add(f(middle - half * abscissa), weight_fine, weight_coarse);
        }
    }
    // Asked this way round, what is not a number ends the halving too.
    let differ = (0..N).any(|index| (fine[index] - coarse[index]).abs() > AGREE * size[index]);
    if !differ || halvings == 0 {
        return fine.map(|value| value * half);
    }
    let left = halve_until_agreed(f, a, middle, halvings - 1);
    let right = halve_until_agreed(f, middle, b, halvings - 1);
    std::array::from_fn(|index| left[index] + right[index])
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::cell::Cell;

    #[test]
    fn a_root_lies_within_the_tolerance() {
        for (f, a, b, exact) in [
            (
                (|x: f64| x * x - 2.0) as fn(f64) -> f64,
                0.0,
                2.0,
                2.0_f64.sqrt(),
            ),
            (|x| (x - 1.0).powi(3), 0.0, 5.0, 1.0),
            (|x| 1.0 - x.exp(), -3.0, 4.0, 0.0),
            (|x| if x < 0.3 { -1.0 } else { 7.0 }, 0.0, 1.0, 0.3),
        ] {
            let found = root(f, a, b, 1e-10).expect("the signs differ");
            assert!((found - exact).abs() <= 1e-10, "{found} for {exact}");
        }
    }

    #[test]
    fn a_root_costs_at_most_one_evaluation_more_than_bisection() {
        for f in [
            (|x: f64| (x - 0.123).powi(9)) as fn(f64) -> f64,
            |x| if x < 0.777 { -1e-9 } else { 1e9 },
            |x| (20.0 * (x - 0.9)).exp() - 1.0,
        ] {
            let count = Cell::new(0);
            let counted = |x| {
                count.set(count.get() + 1);
                f(x)
            };
            root(counted, 0.0, 1.0, 1e-10).expect("the signs differ");
            // Bisection: log2(1 / 2e-10) = 33 halvings, and the two ends.
            assert!(count.get() <= 36, "{}", count.get());
        }
    }

    #[test]
    fn no_root_where_the_signs_agree() {
        assert_eq!(root(|x| x * x + 1.0, -1.0, 1.0, 1e-9), None);
        assert_eq!(root(|_| f64::NAN, -1.0, 1.0, 1e-9), None);
    }

    #[test]
    fn the_rule_of_seven_is_exact_to_degree_eleven() {
        for degree in 0..=11 {
            let sum: f64 = RULE
                .iter()
                .enumerate()
                .map(|(index, &(x, weight, _))| {
                    let both = x.powi(degree) + if index > 0 { (-x).powi(degree) } else { 0.0 };
                    weight * both
                })
                .sum();
            let exact = if degree % 2 == 0 {
                2.0 / f64::from(degree + 1)
            } else {
                0.0
            };
            assert!(
                (sum - exact).abs() < 1e-14,
                "degree {degree}: {sum} for {exact}"
            );
        }
    }

    #[test]
    fn integrals_stand_to_their_accuracy_even_with_a_corner_or_a_peak() {
        let [exponential, corner, peak] = integrate(
            &|x: f64| [x.exp(), (x - 0.3).abs(), 1.0 / (1e-4 + x * x)],
            -1.0,
            2.0,
        );
        let exact = 2.0_f64.exp() - (-1.0_f64).exp();
        assert!((exponential / exact - 1.0).abs() < 1e-12);
        assert!((corner / (0.5 * (1.3 * 1.3 + 1.7 * 1.7)) - 1.0).abs() < 1e-7);
        let exact = 100.0 * ((200.0_f64).atan() + (100.0_f64).atan());
        assert!((peak / exact - 1.0).abs() < 1e-7);
    }

    #[test]
    fn an_empty_interval_has_no_integral() {
        let [none] = integrate(&|_| [5.0], 1.0, 1.0);
        assert!(none.abs() < f64::EPSILON);
    }
}
