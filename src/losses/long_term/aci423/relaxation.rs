//! Relaxation by the ACI-ASCE 423 method. Stresses in psi.

use super::super::outside::{Outside, interpolated};
use crate::job::RelaxationClass;

/// ACI-ASCE 423 method, table 2: `K_re` (psi) and J of a strand, by relaxation and grade (`f_pu`, ksi): 270 or 250, within a
/// hundredth.
///
/// # Errors
/// [`Outside`] the table: another grade, or a bar.
pub fn k_re_and_j(class: RelaxationClass, f_pu_ksi: f64) -> Result<(f64, f64), Outside> {
    const CLAUSE: &str = "ACI-ASCE 423 method, table 2";
    let grade = |ksi: f64| (f_pu_ksi / ksi - 1.0).abs() <= 0.01;
    let outside = |symbol, value, covered: &str| Outside {
        symbol,
        value,
        clause: CLAUSE,
        covered: covered.to_owned(),
    };
    match (class, grade(270.0), grade(250.0)) {
        (RelaxationClass::Bar, ..) => Err(outside(
            "relaxation class",
            "bar".to_owned(),
            "low-relaxation and stress-relieved strand here",
        )),
        (RelaxationClass::Low, true, _) => Ok((5_000.0, 0.040)),
        (RelaxationClass::Ordinary, true, _) => Ok((20_000.0, 0.15)),
        (RelaxationClass::Low, _, true) => Ok((4_630.0, 0.037)),
        (RelaxationClass::Ordinary, _, true) => Ok((18_500.0, 0.14)),
        _ => Err(outside(
            "f_pu",
            format!("{f_pu_ksi:.1} ksi"),
            "grades 250 and 270",
        )),
    }
}

/// ACI-ASCE 423 method, table 3, low-relaxation strand: C by `f_pi`/`f_pu`, 0.60 to 0.80. Below 0.64 from memory.
const C_LOW: [f64; 21] = [
    0.33, 0.37, 0.41, 0.45, 0.49, 0.53, 0.57, 0.61, 0.66, 0.70, 0.75, 0.80, 0.85, 0.90, 0.95, 1.00,
    1.05, 1.11, 1.16, 1.22, 1.28,
];

/// ACI-ASCE 423 method, table 3, stress-relieved strand: C by `f_pi`/`f_pu`, 0.60 to 0.75. From memory.
const C_ORDINARY: [f64; 16] = [
    0.49, 0.53, 0.58, 0.63, 0.68, 0.73, 0.78, 0.83, 0.89, 0.94, 1.00, 1.09, 1.18, 1.27, 1.36, 1.45,
];

/// ACI-ASCE 423 method, table 3: C by `f_pi`/`f_pu`, straight between its rows; 0.60 to 0.80, for stress-relieved strand to 0.75.
/// In part from memory.
///
/// # Errors
/// [`Outside`] the table.
pub fn c(class: RelaxationClass, f_pi_over_f_pu: f64) -> Result<f64, Outside> {
    let values: &[f64] = match class {
        RelaxationClass::Low => &C_LOW,
        RelaxationClass::Ordinary | RelaxationClass::Bar => &C_ORDINARY,
    };
    let rows: Vec<(f64, f64)> = (60_u32..)
        .zip(values)
        .map(|(hundredths, &value)| (f64::from(hundredths) / 100.0, value))
        .collect();
    let clause = "ACI-ASCE 423 method, table 3";
    interpolated(&rows, "f_pi/f_pu", f_pi_over_f_pu, "", clause)
}

/// Whether the table's value there is from memory: all of stress-relieved strand, and below 0.64 (and so towards it).
pub(super) fn c_is_recalled(class: RelaxationClass, f_pi_over_f_pu: f64) -> bool {
    class != RelaxationClass::Low || f_pi_over_f_pu < 0.64
}

/// ACI-ASCE 423 method: RE = [`K_re` − J (SH + CR + ES)] C, psi; not below zero.
pub fn re(k_re: f64, j: f64, sh: f64, cr: f64, es: f64, c: f64) -> f64 {
    ((k_re - j * (sh + cr + es)) * c).max(0.0)
}
