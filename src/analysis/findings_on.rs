//! Which findings are on which tendon, also where one mark stands on several lines.

use std::cmp::Ordering;
use std::collections::BTreeMap;

use super::Analysis;
use crate::finding::Finding;

impl Analysis {
    /// The findings on each tendon, in the floor's order. Where several lines have one mark, a finding is on the one that
    /// its place is nearest to; without a place, on all of them.
    pub fn findings_by_tendon(&self) -> Vec<Vec<&Finding>> {
        let tendons = &self.floor.tendons;
        let mut marked: BTreeMap<&str, Vec<usize>> = BTreeMap::new();
        for (index, tendon) in tendons.iter().enumerate() {
            marked.entry(&tendon.mark).or_default().push(index);
        }
        let mut found = vec![Vec::new(); tendons.len()];
        for finding in &self.findings {
            let named = finding.tendon.as_deref();
            let Some(lines) = named.and_then(|mark| marked.get(mark)) else {
                continue;
            };
            let away_m = |&&index: &&usize| {
                let near = tendons.get(index)?.path.project(finding.place?)?;
                Some(near.distance_m)
            };
            let nearest = lines
                .iter()
                .filter(|line| lines.len() > 1 && away_m(line).is_some())
                .min_by(|a, b| away_m(a).partial_cmp(&away_m(b)).unwrap_or(Ordering::Equal));
            for line in nearest.map_or(lines.as_slice(), std::slice::from_ref) {
                if let Some(of_line) = found.get_mut(*line) {
                    of_line.push(finding);
                }
            }
        }
        found
    }
}
