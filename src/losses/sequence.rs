//! Which anchors of a tendon in several pours are jacked, and in which order.

use crate::floor::{EndKind, Tendon};

/// What is done to a segment: the kinds of its two anchors, in order along the tendon, and when its turn comes, from 0.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Step {
    pub(super) kinds: [EndKind; 2],
    pub(super) turn: usize,
}

/// The steps of a tendon's segments, in order along it. Each pull is held where the one before it was locked off, and jacked
/// at its other anchor. With one live end the first is held at the dead end; with two it is at `first_end` (0 or 1), jacked at
/// that end and at its intermediate anchor together. With none no last pull has a jack: the segments are told as they are.
pub(super) fn steps(kinds: [EndKind; 2], segments: usize, first_end: usize) -> Vec<Step> {
    use EndKind::{Dead, Live};
    let last = segments.saturating_sub(1);
    let from_start = match kinds {
        [Dead, Live] => true,
        [Live, Dead] => false,
        [Live, Live] | [Dead, Dead] => first_end == 0,
    };
    let onwards = if from_start {
        [Dead, Live]
    } else {
        [Live, Dead]
    };
    (0..segments)
        .map(|segment| {
            let turn = if from_start { segment } else { last - segment };
            let mut own = onwards;
            if segment == 0 {
                own[0] = kinds[0];
            }
            if segment == last {
                own[1] = kinds[1];
            }
            Step { kinds: own, turn }
        })
        .collect()
}

/// The end, 0 or 1, that lies on the first of these sides of the plan that tells a tendon's ends apart: left and right for one
/// that runs rather across than up, bottom and top for the others. Left or bottom where no side does.
pub fn first_end(tendon: &Tendon, sides: &[String]) -> usize {
    let run = tendon.ends[1].place - tendon.ends[0].place;
    let across = run.x.abs() >= run.y.abs();
    let ahead = if across { run.x } else { run.y } >= 0.0;
    let told = sides.iter().find_map(|side| match side.as_str() {
        "left" if across => Some(ahead),
        "right" if across => Some(!ahead),
        "bottom" if !across => Some(ahead),
        "top" if !across => Some(!ahead),
        _ => None,
    });
    usize::from(!told.unwrap_or(ahead))
}

#[cfg(test)]
mod tests {
    use super::*;
    use EndKind::{Dead, Live};

    fn told(kinds: [EndKind; 2], segments: usize, first_end: usize) -> Vec<([EndKind; 2], usize)> {
        let steps = steps(kinds, segments, first_end);
        steps
            .into_iter()
            .map(|step| (step.kinds, step.turn))
            .collect()
    }

    #[test]
    fn pulls_follow_one_another_from_the_dead_end() {
        for first_end in [0, 1] {
            let up = [([Dead, Live], 0), ([Dead, Live], 1), ([Dead, Live], 2)];
            assert_eq!(told([Dead, Live], 3, first_end), up);
            let down = [([Live, Dead], 2), ([Live, Dead], 1), ([Live, Dead], 0)];
            assert_eq!(told([Live, Dead], 3, first_end), down);
        }
    }

    #[test]
    fn between_two_live_ends_the_first_pull_has_two_jacks() {
        let start = [([Live, Live], 0), ([Dead, Live], 1)];
        assert_eq!(told([Live, Live], 2, 0), start);
        let end = [([Live, Dead], 1), ([Live, Live], 0)];
        assert_eq!(told([Live, Live], 2, 1), end);
    }

    #[test]
    fn between_two_dead_ends_one_segment_has_no_jack() {
        for first_end in [0, 1] {
            let steps = steps([Dead, Dead], 3, first_end);
            let idle = steps.iter().filter(|step| step.kinds == [Dead; 2]);
            assert_eq!(idle.count(), 1);
        }
    }

    #[test]
    fn a_tendon_in_one_piece_is_stressed_as_its_ends_say() {
        for kinds in [[Live, Live], [Live, Dead], [Dead, Live], [Dead, Dead]] {
            assert_eq!(told(kinds, 1, 0), [(kinds, 0)]);
        }
    }
}
