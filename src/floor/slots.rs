//! Places of a group's tendons along its extent line: from number and spacing, and which of them are drawn.

use geo::Coord;

use super::group_text::GroupText;
use super::groups::Extent;
use super::index::Foot;
use super::lines::{Line, axis_rad};
use super::marking::Marking;
use crate::finding::Wording;
use crate::units::LONG;

/// An extent line fits number and spacing within this share.
const FIT: f64 = 0.02;
/// A drawn tendon stands at its place within this share of the spacing.
pub(super) const OFF: f64 = 0.25;
/// More tendons than this are no group.
const MOST: u32 = 1000;

/// A group laid out.
#[derive(Debug, Clone)]
pub(super) struct Slots {
    /// Stations along the extent line, metres.
    pub(super) stations_m: Vec<f64>,
    /// The drawn tendon at each, if one is.
    pub(super) drawn: Vec<Option<Foot>>,
    /// Marks of the group in order, where its text gives first and last.
    pub(super) marks: Vec<String>,
}

/// Lays a group out; what does not fit is said in words.
pub(super) fn slots(extent: &Extent) -> Result<Slots, Wording> {
    if extent.crossed.is_empty() {
        return Err("crosses no tendon about squarely".into());
    }
    if let Some(torn) = extent.said.torn() {
        return Err(format!("has texts that give two {torn}").into());
    }
    let marks = marks(&extent.said)?;
    let length_m = extent.path.length_m();
    let stations_m = stations_m(length_m, &extent.said, marks.len())?;
    let apart_m = match stations_m.as_slice() {
        [a, b, ..] => b - a,
        _ => length_m,
    };
    let mut drawn: Vec<Option<Foot>> = vec![None; stations_m.len()];
    for foot in &extent.crossed {
        let off_m = |station_m: f64| (station_m - foot.distance_m).abs();
        let own = stations_m.iter().zip(&mut drawn);
        let own = own
            .map(|(&station_m, slot)| (off_m(station_m), slot))
            .min_by(|a, b| a.0.total_cmp(&b.0));
        match own {
            Some((off_m, slot)) if off_m <= OFF * apart_m && slot.is_none() => *slot = Some(*foot),
            _ => {
                return Err(Wording::of(|units| {
                    let long = units.of(LONG);
                    format!(
                        "crosses a line {} from its end, at which it has no place left: it gives {} tendons, {} apart",
                        long.said(foot.distance_m, 2),
                        stations_m.len(),
                        long.said(apart_m, 3)
                    )
                }));
            }
        }
    }
    Ok(Slots {
        stations_m,
        drawn,
        marks,
    })
}

/// The marks from first to last; none where the text gives none.
fn marks(said: &GroupText) -> Result<Vec<String>, String> {
    let (Some(first), Some(last)) = (said.first.one(), said.last.one()) else {
        return Ok(Vec::new());
    };
    let wrong = || format!("has the marks {first} to {last}, which do not count up");
    let (letters, from, width) = numbered(first).ok_or_else(wrong)?;
    let (last_letters, to, _) = numbered(last).ok_or_else(wrong)?;
    let alike = last_letters.is_empty() || last_letters.eq_ignore_ascii_case(letters);
    if !alike || to <= from || to - from >= MOST {
        return Err(wrong());
    }
    Ok((from..=to)
        .map(|number| format!("{letters}{number:0width$}"))
        .collect())
}

/// A mark's letters, its number, and the digits that it is written with.
pub(super) fn numbered(mark: &str) -> Option<(&str, u32, usize)> {
    let start = mark
        .rfind(|c: char| !c.is_ascii_digit())
        .and_then(|at| Some(at + mark.get(at..)?.chars().next()?.len_utf8()))
        .unwrap_or(0);
    let digits = mark.get(start..)?;
    Some((mark.get(..start)?, digits.parse().ok()?, digits.len()))
}

/// Stations of the tendons: from end to end of the line, or half a spacing in from either end, whichever the numbers fit.
fn stations_m(length_m: f64, said: &GroupText, marks: usize) -> Result<Vec<f64>, Wording> {
    let counted = u32::try_from(marks).ok().filter(|&count| count > 0);
    let said_number = said.number.one().copied();
    if let (Some(number), Some(count)) = (said_number, counted)
        && number != count
    {
        return Err(format!("says {number} tendons, and its marks are {count}").into());
    }
    let spacing_m = said
        .spacing_m
        .one()
        .copied()
        .filter(|&spacing_m| spacing_m > 0.0);
    let number = match (said_number.or(counted), spacing_m) {
        (Some(number), _) => number,
        (None, Some(spacing_m)) => {
            #[expect(
                clippy::cast_possible_truncation,
                clippy::cast_sign_loss,
                reason = "clamped to 0..=1000"
            )]
            let gaps = (length_m / spacing_m).round().clamp(0.0, f64::from(MOST)) as u32;
            gaps + 1
        }
        (None, None) => return Err("has no text that gives number or spacing".into()),
    };
    if !(2..=MOST).contains(&number) {
        return Err(format!("gives {number} tendons; expected 2 to {MOST}").into());
    }
    let count = f64::from(number);
    let off = |gaps: f64| {
        let wanted_m = gaps * spacing_m.unwrap_or(length_m / gaps);
        ((length_m - wanted_m) / wanted_m).abs()
    };
    // `3T @ 1000`: three in all, where the line is as long as three take, or three at each place.
    if let Some(&each) = said.each.one()
        && each > 1
        && said_number.or(counted).is_none()
        && off(f64::from(each) - 1.0).min(off(f64::from(each))) <= FIT
    {
        return Err(format!(
            "says {each}T, which may be the number of all its tendons or of those at each place"
        )
        .into());
    }
    let (end_to_end, half_in) = (off(count - 1.0), off(count));
    // Without a spacing both fit: tendons stand at the line's ends.
    let at_ends = end_to_end <= half_in;
    if end_to_end.min(half_in) > FIT {
        let spacing_m = spacing_m.unwrap_or_default();
        return Err(Wording::of(|units| {
            let long = |length_m: f64, decimals| units.of(LONG).said(length_m, decimals);
            format!(
                "is {} long, and {number} tendons {} apart take {}",
                long(length_m, 2),
                long(spacing_m, 3),
                long((count - 1.0) * spacing_m, 2)
            )
        }));
    }
    let (gaps, lead) = if at_ends {
        (count - 1.0, 0.0)
    } else {
        (count, 0.5)
    };
    Ok((0..number)
        .map(|at| (f64::from(at) + lead) * length_m / gaps)
        .collect())
}

/// Marks by slot: drawn ones stay where they are, the others of the group go to the other slots in order.
pub(super) fn slot_marks(
    extent: &Extent,
    slots: &Slots,
    said: &[Marking],
    lines: &[Line],
) -> Vec<Option<String>> {
    let count = slots.stations_m.len();
    let own = |foot: &Option<Foot>| said.get(foot.as_ref()?.line)?.mark.one().cloned();
    let mut marks: Vec<Option<String>> = slots.drawn.iter().map(own).collect();
    if slots.marks.len() != count {
        return marks;
    }
    let number = |mark: &String| {
        let like = |known: &&String| known.eq_ignore_ascii_case(mark);
        slots.marks.iter().position(|known| like(&known))
    };
    let held: Vec<(usize, usize)> = marks
        .iter()
        .enumerate()
        .filter_map(|(slot, mark)| Some((slot, number(mark.as_ref()?)?)))
        .collect();
    let off = |forward: bool| -> usize {
        let place = |slot: usize| if forward { slot } else { count - 1 - slot };
        held.iter()
            .map(|&(slot, number)| place(slot).abs_diff(number))
            .sum()
    };
    let forward = match off(true).cmp(&off(false)) {
        std::cmp::Ordering::Less => true,
        std::cmp::Ordering::Greater => false,
        std::cmp::Ordering::Equal => counts_up(extent, lines),
    };
    let used: Vec<usize> = held.iter().map(|&(_, number)| number).collect();
    let mut left = (0..count)
        .filter(|number| !used.contains(number))
        .filter_map(|number| slots.marks.get(number).cloned());
    let order: Vec<usize> = if forward {
        (0..count).collect()
    } else {
        (0..count).rev().collect()
    };
    for slot in order {
        if let Some(mark) = marks.get_mut(slot)
            && mark.is_none()
        {
            *mark = left.next();
        }
    }
    marks
}

/// Whether tendons are counted along the extent line: runs along y by x, runs along x by y, as names are given.
fn counts_up(extent: &Extent, lines: &[Line]) -> bool {
    let of_group = extent
        .crossed
        .iter()
        .filter_map(|foot| lines.get(foot.line));
    let axis = axis_rad(of_group);
    let (sin, cos) = axis.sin_cos();
    let sign = if axis > std::f64::consts::FRAC_PI_4 + 0.001 {
        -1.0
    } else {
        1.0
    };
    let across = |p: Coord<f64>| sign * (cos * p.y - sin * p.x);
    let (start, end) = (
        extent.path.place_at(0.0),
        extent.path.place_at(extent.path.length_m()),
    );
    across(end) >= across(start)
}
