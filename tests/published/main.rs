//! Published figures and independent computations, each with its source and tolerance.

mod aci423;
mod as3600;
mod bs8110;
mod en1992;
mod forces;
mod rows;

/// Holds a figure against a published one, within a relative tolerance.
fn near(found: f64, published: f64, relative: f64) {
    assert!(
        ((found - published) / published).abs() <= relative,
        "found {found}, published {published}, off by {:.2e}",
        (found - published) / published
    );
}

/// Holds a figure against one that was published rounded, within half of its last digit.
fn rounds_to(found: f64, published: f64, last_digit: f64) {
    assert!(
        (found - published).abs() <= 0.5 * last_digit * (1.0 + 1e-9),
        "found {found}, published {published}"
    );
}
