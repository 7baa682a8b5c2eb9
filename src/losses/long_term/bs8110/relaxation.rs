//! Relaxation, BS 8110-1:1997 4.8.2.

use super::super::outside::{Outside, interpolated};
use crate::job::RelaxationClass;

/// BS 8110-1:1997 4.8.2, with BS 5896: part of the initial load lost at 1000 hours, by that load over strength, 0.60 to 0.80:
/// 4.5, 8, 12 % for class 1; 1.0, 2.5, 4.5 % for class 2; straight between. From memory.
///
/// # Errors
/// [`Outside`] those loads, or a bar.
pub fn loss_1000h(class: RelaxationClass, load_ratio: f64) -> Result<f64, Outside> {
    const CLASS_1: [(f64, f64); 3] = [(0.60, 0.045), (0.70, 0.08), (0.80, 0.12)];
    const CLASS_2: [(f64, f64); 3] = [(0.60, 0.010), (0.70, 0.025), (0.80, 0.045)];
    let rows = match class {
        RelaxationClass::Ordinary => &CLASS_1,
        RelaxationClass::Low => &CLASS_2,
        RelaxationClass::Bar => return Err(no_bar()),
    };
    let (symbol, clause) = ("initial load/strength", "BS 8110-1 4.8.2 (BS 5896)");
    interpolated(rows, symbol, load_ratio, "", clause)
}

/// BS 8110-1:1997 table 4.6: what the 1000-hour loss of a post-tensioned strand is multiplied by: 2.0 class 1, 1.5 class 2.
///
/// # Errors
/// [`Outside`] for a bar.
pub fn factor(class: RelaxationClass) -> Result<f64, Outside> {
    match class {
        RelaxationClass::Ordinary => Ok(2.0),
        RelaxationClass::Low => Ok(1.5),
        RelaxationClass::Bar => Err(no_bar()),
    }
}

/// BS 8110-1:1997 4.8.2: loss by relaxation as a part of the initial load, 1000-hour loss × factor.
pub fn relaxation(loss_1000h: f64, factor: f64) -> f64 {
    loss_1000h * factor
}

fn no_bar() -> Outside {
    Outside {
        symbol: "relaxation class",
        value: "bar".to_owned(),
        clause: "BS 8110-1 table 4.6",
        covered: "strand of class 1 and class 2 here".to_owned(),
    }
}
