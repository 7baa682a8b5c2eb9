//! How far the methods of long-term loss lie apart.

use super::{Analysis, TendonResult, pair};
use crate::job::LongTermMethod;

/// How far the methods lie apart on one tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Spread {
    /// The method that leaves least.
    pub least: LongTermMethod,
    /// Its mean service force, kN.
    pub least_kn: f64,
    /// The method that leaves most.
    pub greatest: LongTermMethod,
    /// Its mean service force, kN.
    pub greatest_kn: f64,
    /// The difference over the drawn method's mean service force.
    pub ratio: f64,
}

/// How far they lie apart on a floor.
#[derive(Debug, Clone, PartialEq)]
pub struct FloorSpread {
    /// Mean of the tendons' ratios.
    pub mean_ratio: f64,
    /// The greatest.
    pub widest_ratio: f64,
    /// Mark of its tendon.
    pub widest: String,
}

impl TendonResult {
    /// The spread between the methods; `None` where fewer than two give a force, or the drawn one gives none.
    pub fn spread(&self) -> Option<Spread> {
        let drawn_kn = self
            .by_method
            .first()?
            .outcome
            .as_ref()
            .ok()?
            .mean_service_kn;
        let mut means: Vec<(LongTermMethod, f64)> = self
            .by_method
            .iter()
            .filter_map(|one| Some((one.method, one.outcome.as_ref().ok()?.mean_service_kn)))
            .collect();
        means.sort_by(|a, b| a.1.total_cmp(&b.1));
        let [(least, least_kn), .., (greatest, greatest_kn)] = means[..] else {
            return None;
        };
        Some(Spread {
            least,
            least_kn,
            greatest,
            greatest_kn,
            ratio: (greatest_kn - least_kn) / drawn_kn,
        })
    }
}

impl Analysis {
    /// The spread over the tendons that have one; of equally wide ones the last is named.
    pub fn spread(&self) -> Option<FloorSpread> {
        let spreads: Vec<(&str, f64)> = pair(self)
            .filter_map(|(tendon, result)| Some((tendon.mark.as_str(), result.spread()?.ratio)))
            .collect();
        let (widest, widest_ratio) = *spreads.iter().max_by(|a, b| a.1.total_cmp(&b.1))?;
        let count = u32::try_from(spreads.len()).ok()?;
        Some(FloorSpread {
            mean_ratio: spreads.iter().map(|spread| spread.1).sum::<f64>() / f64::from(count),
            widest_ratio,
            widest: widest.to_owned(),
        })
    }
}
