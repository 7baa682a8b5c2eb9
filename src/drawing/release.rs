//! Which release of DXF a drawing is of: the one reading of `$ACADVER`.

/// The first release with handles everywhere and subclass markers (R13).
pub(super) const R13: u32 = 1012;
/// The first release with an owner and a plot style (R2000).
pub(super) const R2000: u32 = 1015;
/// The first release in UTF-8 (R2007).
pub(super) const R2007: u32 = 1021;

/// The number of a `$ACADVER`, such as 1027 of `AC1027`; 0 for what is none, such as R10's `AC2.10`.
pub(super) fn number(version: &str) -> u32 {
    let digits = version.trim().strip_prefix("AC");
    digits.and_then(|digits| digits.parse().ok()).unwrap_or(0)
}
