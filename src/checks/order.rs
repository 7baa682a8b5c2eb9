//! The job's order of stressing against the tendons that it names.

use crate::finding::{Finding, Level, Rule};
use crate::floor::Floor;
use crate::job::Job;
use crate::patterns::Patterns;

/// See [`Rule::meaning`].
pub static STRESSING_ORDER: Rule = Rule {
    name: "stressing-order",
    meaning: "Where the job gives an order of stressing, every entry names a tendon and every tendon is named; one that no \
              entry names counts as stressed after all others, and its elastic shortening follows from that.",
};

/// How many marks a text names before it only counts them.
const NAMED: usize = 5;

/// A warning for entries that name nothing, a note for tendons that nothing names.
pub(super) fn stressing_order(floor: &Floor, job: &Job) -> Vec<Finding> {
    let order = &job.stressing.order;
    if order.is_empty() {
        return Vec::new();
    }
    // The job's patterns were tried when it was read: none is broken here.
    let marks = || floor.tendons.iter().map(|tendon| tendon.mark.as_str());
    let idle: Vec<&str> = order
        .iter()
        .filter(|entry| {
            let entry = Patterns::new([entry]).unwrap_or_default();
            !marks().any(|mark| entry.fit(mark))
        })
        .map(String::as_str)
        .collect();
    let all = Patterns::new(order).unwrap_or_default();
    let left: Vec<&str> = marks().filter(|mark| !all.fit(mark)).collect();
    let of_entries = (!idle.is_empty()).then(|| {
        Finding::new(
            &STRESSING_ORDER,
            Level::Warning,
            format!(
                "entries of stressing.order name no tendon of this drawing: {}",
                named(&idle)
            ),
            "write the marks as the drawing has them, or take the entries out",
        )
    });
    let of_tendons = (!left.is_empty()).then(|| {
        Finding::new(
            &STRESSING_ORDER,
            Level::Note,
            format!(
                "{} of {} tendon lines are named by no entry of stressing.order and count as stressed after all others: {}",
                left.len(),
                floor.tendons.len(),
                named(&left)
            ),
            "name them in stressing.order where that is not so; \"*\" as the last entry says that it is",
        )
    });
    of_entries.into_iter().chain(of_tendons).collect()
}

fn named(words: &[&str]) -> String {
    let first: Vec<&str> = words.iter().take(NAMED).copied().collect();
    let more = words.len().saturating_sub(NAMED);
    if more > 0 {
        format!("{} and {more} more", first.join(", "))
    } else {
        first.join(", ")
    }
}

#[cfg(test)]
mod tests {
    use super::super::testing::{job, straight};
    use super::*;
    use crate::floor::Slab;

    #[test]
    fn an_order_that_misses_tendons_or_names_none_is_told() {
        let tendons = ["D1", "D2", "B1"].map(|mark| {
            let mut tendon = straight(9.0);
            mark.clone_into(&mut tendon.mark);
            tendon
        });
        let floor = Floor {
            tendons: tendons.to_vec(),
            slab: Slab::default(),
        };
        let told = |order: &[&str]| {
            let mut job = job();
            job.stressing.order = order.iter().map(|&entry| entry.to_owned()).collect();
            let found = stressing_order(&floor, &job);
            found
                .into_iter()
                .map(|finding| (finding.level, finding.text.to_string()))
                .collect::<Vec<_>>()
        };
        assert_eq!(told(&[]), []);
        assert_eq!(told(&["d*", "B1"]), []);
        assert_eq!(told(&["D2", "*"]), []);
        let found = told(&["D1", "X*"]);
        assert_eq!(found.len(), 2);
        assert!(found[0].0 == Level::Warning && found[0].1.ends_with(": X*"));
        assert!(found[1].0 == Level::Note && found[1].1.ends_with(": D2, B1"));
    }
}
