//! Groups laid out: those whose extent line, texts and drawn tendons agree, each place of a tendon said once.

use super::groups::{Extent, Groups};
use super::heard::Heard;
use super::lines::Line;
use super::marking::Marking;
use super::rules::GROUP_MISFIT;
use super::slots::{OFF, Slots, slot_marks, slots};
use crate::finding::{Finding, Level, Wording};

/// A group that can be made.
pub(super) struct Plan<'a> {
    pub(super) extent: &'a Extent,
    pub(super) slots: Slots,
    /// Mark of each slot, where the group's text gives marks.
    pub(super) marks: Vec<Option<String>>,
}

/// Groups whose extent lines fit what their texts say.
pub(super) struct Plans<'a>(pub(super) Vec<Plan<'a>>);

/// Lays the groups out; what does not fit is a finding, and nothing is made of it. Where a group's text counts its drawn
/// tendons otherwise than their own labels do, neither counts.
pub(super) fn plans<'a>(
    groups: &'a Groups,
    said: &mut [Marking],
    lines: &[Line],
) -> (Plans<'a>, Vec<Finding>) {
    let mut plans = Vec::new();
    let mut findings = Vec::new();
    for extent in &groups.extents {
        let plan = slots(extent).and_then(|slots| {
            counted_alike(extent, &slots, said)?;
            let marks = slot_marks(extent, &slots, said, lines);
            Ok(Plan {
                extent,
                slots,
                marks,
            })
        });
        match plan {
            Ok(plan) => plans.push(plan),
            Err(why) => findings.push(misfit(extent, &why)),
        }
    }
    let (plans, twice) = told_once(plans);
    findings.extend(twice.into_iter().map(|extent| {
        misfit(
            extent,
            &"spreads a tendon over places over which another extent line spreads it too".into(),
        )
    }));
    (Plans(plans), findings)
}

fn misfit(extent: &Extent, why: &Wording) -> Finding {
    Finding::new(
        &GROUP_MISFIT,
        Level::Error,
        Wording::of(|units| {
            format!(
                "extent line {} {}: the group's undrawn tendons are missing from everything worked out here",
                extent.handle,
                why.in_units(units)
            )
        }),
        "correct the extent line or its text, or draw the group's tendons",
    )
    .at_place(extent.path.place_at(extent.path.length_m() / 2.0))
}

/// Whether a group's text and its drawn tendons say the same of strands.
fn counted_alike(extent: &Extent, slots: &Slots, said: &mut [Marking]) -> Result<(), Wording> {
    let text = extent.counted();
    let mut first: Option<Marking> = None;
    let mut unlike = None;
    for foot in slots.drawn.iter().flatten() {
        let Some(own) = said.get_mut(foot.line) else {
            continue;
        };
        if own.counts_otherwise(&text) {
            own.tear(&Marking {
                mark: Heard::Nothing,
                ..text.clone()
            });
            unlike = Some(
                "has a text that counts tendons or strands otherwise than its drawn tendon does",
            );
        } else if first
            .as_ref()
            .is_some_and(|first| first.counts_otherwise(own))
        {
            unlike = unlike.or(Some("has drawn tendons that differ in strands"));
        }
        first.get_or_insert_with(|| own.clone());
    }
    let all_drawn = slots.drawn.iter().all(Option::is_some);
    match unlike {
        Some(why) if !all_drawn || text.counts() => Err(why.into()),
        _ => Ok(()),
    }
}

/// Groups of which no other one spreads the same drawn tendon over the same places; and the extent lines of those that
/// contradict one another so. Of two that say the same the first stays.
fn told_once(plans: Vec<Plan<'_>>) -> (Vec<Plan<'_>>, Vec<&Extent>) {
    let (mut repeated, mut twice) = (vec![false; plans.len()], vec![false; plans.len()]);
    for (at, a) in plans.iter().enumerate() {
        for (b, other) in plans.iter().zip(0..).take(at) {
            if repeated[other] || !a.shares_with(b) {
                continue;
            }
            if a.repeats(b) {
                repeated[at] = true;
            } else if a.overlaps(b) {
                (twice[at], twice[other]) = (true, true);
            }
        }
    }
    let mut kept = Vec::new();
    let mut contradicted = Vec::new();
    for (plan, (repeated, twice)) in plans.into_iter().zip(repeated.into_iter().zip(twice)) {
        if twice {
            contradicted.push(plan.extent);
        } else if !repeated {
            kept.push(plan);
        }
    }
    (kept, contradicted)
}

impl Plans<'_> {
    /// Gives the group's drawn tendons the marks and strands that they lack; returns the marks of those to be made, so
    /// that nobody else is called by them.
    pub(super) fn claim(&self, said: &mut [Marking]) -> Vec<Marking> {
        let mut reserved = Vec::new();
        for plan in &self.0 {
            let strands = plan.strands(said);
            for (foot, mark) in plan.slots.drawn.iter().zip(&plan.marks) {
                match foot.as_ref().and_then(|foot| said.get_mut(foot.line)) {
                    Some(own) => {
                        if !own.mark.is_said() {
                            own.mark = mark.clone().into();
                        }
                        if !own.strands.is_said() {
                            own.join(Marking {
                                mark: Heard::Nothing,
                                ..strands.clone()
                            });
                        } else if !own.tendons.is_said() {
                            own.tendons = strands.tendons;
                        }
                    }
                    None => reserved.push(Marking {
                        mark: mark.clone().into(),
                        ..Marking::default()
                    }),
                }
            }
        }
        reserved
    }
}

impl Extent {
    /// What the group's texts say of strands and tendons at each place.
    fn counted(&self) -> Marking {
        let mut counted = self.said.strands.clone();
        counted.tendons.join(self.said.each);
        counted
    }
}

impl Plan<'_> {
    /// Whether a tendon that is drawn is of this group and of another.
    fn shares_with(&self, other: &Self) -> bool {
        let mut own = self.slots.drawn.iter().flatten();
        own.any(|foot| {
            let mut others = other.slots.drawn.iter().flatten();
            others.any(|drawn| drawn.line == foot.line)
        })
    }

    /// Where its tendons lie across the direction of the first one drawn, in order, metres.
    fn across_m(&self, heading_rad: f64) -> Vec<f64> {
        let (sin, cos) = heading_rad.sin_cos();
        let places = self.slots.stations_m.iter();
        let mut across: Vec<f64> = places
            .map(|&station_m| self.extent.path.place_at(station_m))
            .map(|place| cos * place.y - sin * place.x)
            .collect();
        across.sort_by(f64::total_cmp);
        across
    }

    fn both_across_m(&self, other: &Self) -> (Vec<f64>, Vec<f64>, f64) {
        let first = self.slots.drawn.iter().flatten().next();
        let heading_rad = first.map_or(0.0, |foot| foot.heading_rad);
        let (own, others) = (self.across_m(heading_rad), other.across_m(heading_rad));
        let gap_m = |places: &[f64]| match places {
            [a, b, ..] => b - a,
            _ => f64::INFINITY,
        };
        let near_m = OFF * gap_m(&own).min(gap_m(&others));
        (own, others, near_m)
    }

    /// Whether another group has the same places.
    fn repeats(&self, other: &Self) -> bool {
        let (own, others, near_m) = self.both_across_m(other);
        own.len() == others.len()
            && own
                .iter()
                .zip(&others)
                .all(|(a, b)| (a - b).abs() <= near_m)
    }

    /// Whether another group reaches over more than the outermost tendon of this one.
    fn overlaps(&self, other: &Self) -> bool {
        let (own, others, near_m) = self.both_across_m(other);
        let (Some(a), Some(b)) = (own.first(), own.last()) else {
            return false;
        };
        let (Some(c), Some(d)) = (others.first(), others.last()) else {
            return false;
        };
        b.min(*d) - a.max(*c) > near_m
    }

    /// Strands of the group: by its text, else by the first of its tendons that says them.
    fn strands(&self, said: &[Marking]) -> Marking {
        let text = self.extent.counted();
        let drawn = self.slots.drawn.iter().flatten();
        let mut known = drawn.filter_map(|foot| said.get(foot.line));
        if text.strands.is_said() {
            return text;
        }
        let mut strands = known
            .find(|own| own.strands.is_said())
            .cloned()
            .unwrap_or_default();
        strands.tendons.join(text.tendons);
        strands
    }
}
