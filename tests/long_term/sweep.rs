//! A sweep that sees a jump.

/// Sweeps a variable: where nothing jumps, steps half as long change the function by clearly less at most.
pub(crate) fn no_jump(
    name: &str,
    (from, to): (f64, f64),
    steps: u32,
    f: impl Fn(f64) -> Option<f64>,
) {
    let greatest = |steps: u32| {
        let at = |step: u32| {
            let x = from + (to - from) * f64::from(step) / f64::from(steps);
            f(x).unwrap_or_else(|| panic!("{name}: {x} is not covered"))
        };
        (0..steps)
            .map(|step| (at(step + 1) - at(step)).abs())
            .fold(0.0, f64::max)
    };
    let (coarse, fine) = (greatest(steps), greatest(2 * steps));
    assert!(
        fine <= 0.8 * coarse,
        "{name} jumps: {coarse} in long steps, {fine} in short ones"
    );
}

#[test]
fn the_sweep_sees_a_jump() {
    let jumps = |x: f64| Some(if x < 0.5 { x } else { x + 0.01 });
    let seen = std::panic::catch_unwind(|| no_jump("a step", (0.0, 1.0), 1000, jumps));
    assert!(seen.is_err());
}
