//! What stands at the two ends.

use super::Worked;
use super::pulls::Pulled;
use super::words::{also_at, long, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::EndKind;
use crate::job::Job;
use crate::units::LONG;

/// See [`Rule::meaning`].
pub static NO_LIVE_END: Rule = Rule {
    name: "no-live-end",
    meaning: "A tendon is stressed from at least one live end; both of its ends are drawn as dead ends.",
};

/// See [`Rule::meaning`].
pub static ONE_END_LENGTH: Rule = Rule {
    name: "one-end-length",
    meaning: "A tendon stressed from one end is no longer than limits.one_end_length_m (common practice: 35 m).",
};

pub(super) fn no_live_end(worked: &Worked) -> Option<Finding> {
    if worked.end_kinds() != [Some(EndKind::Dead); 2] {
        return None;
    }
    let text = if worked.tendon.joints.is_empty() {
        "both ends carry a dead-end symbol, so there is nowhere to stress the tendon from; at least one live end was \
         expected, and no forces were worked out"
    } else {
        "both ends carry a dead-end symbol: stressed from joint to joint, the last segment has no end that a jack can reach; \
         at least one live end was expected, and no forces were worked out"
    };
    Some(worked.finding(
        &NO_LIVE_END,
        Level::Error,
        0.0,
        text,
        "change the symbol at the end that a jack can reach into a live end, or correct the block names of live and dead \
         ends in the job file (ends.live_blocks, ends.dead_blocks)",
    ))
}

pub(super) fn one_end_length(worked: &Worked, job: &Job) -> Option<Finding> {
    if !worked.tendon.joints.is_empty() {
        return one_end_segment(worked, job);
    }
    let [start_m, end_m] = worked.end_stations_m();
    let dead_m = match worked.end_kinds() {
        [Some(EndKind::Live), Some(EndKind::Dead)] => end_m,
        [Some(EndKind::Dead), Some(EndKind::Live)] => start_m,
        _ => return None,
    };
    let (length_m, limit_m) = (end_m - start_m, job.limits.one_end_length_m);
    if length_m <= limit_m {
        return None;
    }
    Some(worked.finding(
        &ONE_END_LENGTH,
        Level::Warning,
        dead_m,
        Wording::of(|units| {
            format!(
                "{} long and stressed from one end; up to {} was expected (limits.one_end_length_m)",
                long(length_m, units),
                units.of(LONG).given(limit_m)
            )
        }),
        "make the dead end a live end and stress from both, or stop the tendon at a pour joint with an intermediate \
         anchor; where the end has to stay dead, let the engineer accept the force that is left there",
    ))
}

/// The same of the segments of a tendon in several pours.
fn one_end_segment(worked: &Worked, job: &Job) -> Option<Finding> {
    let limit_m = job.limits.one_end_length_m;
    let mut long_ones = worked.pulls();
    long_ones.retain(|pull| pull.one_jack().is_some() && pull.length_m() > limit_m);
    let fixed_m = |pull: &Pulled| {
        pull.one_jack()
            .map_or(0.0, |(_, fixed)| pull.stations_m[fixed])
    };
    let (worst, others) = worst_of(long_ones, Pulled::length_m, fixed_m)?;
    Some(worked.finding(
        &ONE_END_LENGTH,
        Level::Warning,
        fixed_m(&worst),
        Wording::of(|units| {
            format!(
                "{}{}, stressed from one end; up to {} was expected (limits.one_end_length_m){}",
                long(worst.length_m(), units),
                worst.of_segment(units),
                units.of(LONG).given(limit_m),
                also_at(&others, units)
            )
        }),
        "divide the segment at a further pour joint, or let the engineer accept the force that is left at its fixed anchor",
    ))
}

#[cfg(test)]
mod tests {
    use super::super::testing::{job, straight, worked};
    use super::*;

    #[test]
    fn two_dead_ends_are_an_error_and_one_live_end_is_enough() {
        let mut tendon = straight(10.0);
        tendon.ends[0].kind = Some(EndKind::Dead);
        let found = no_live_end(&worked(&tendon));
        assert!(found.is_some_and(|f| f.level == Level::Error && f.station_m == Some(0.0)));
        tendon.ends[0].kind = Some(EndKind::Live);
        assert_eq!(no_live_end(&worked(&tendon)), None);
        tendon.ends[0].kind = None;
        assert_eq!(
            no_live_end(&worked(&tendon)),
            None,
            "an unknown end is another rule's"
        );
    }

    #[test]
    fn one_live_end_serves_up_to_the_limit() {
        let limit_m = job().limits.one_end_length_m;
        assert_eq!(one_end_length(&worked(&straight(limit_m)), &job()), None);
        let mut long = straight(limit_m + 0.01);
        let found = one_end_length(&worked(&long), &job());
        assert!(found.is_some_and(|f| f.station_m == Some(limit_m + 0.01)));
        long.ends[1].kind = Some(EndKind::Live);
        assert_eq!(one_end_length(&worked(&long), &job()), None);
    }
}
