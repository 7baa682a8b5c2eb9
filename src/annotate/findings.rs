//! Findings at their places: a ring, by level in size and colour, and beside it what was found on which tendon.

use geo::Coord;

use super::place::{Boxes, Room, Spot};
use super::{layers, words};
use crate::analysis::Analysis;
use crate::drawing::{Align, Drawn, Mark};
use crate::finding::{Finding, Level};
use crate::geometry::distance_m;

/// Findings nearer than this to one another share their place, metres.
const SHARED_M: f64 = 0.4;
/// Lines of text at one place before the rest is only counted.
const MOST_LINES: usize = 6;

/// Rings and texts of all findings that have a place, worst first.
pub(super) fn rings(analysis: &Analysis, text_m: f64, room: &mut Room) -> Vec<Mark> {
    let mut marks = Vec::new();
    for (place, findings) in by_place(&analysis.findings) {
        let mut levels: Vec<Level> = findings.iter().map(|finding| finding.level).collect();
        levels.sort_unstable();
        levels.dedup();
        for level in &levels {
            let ring = Drawn::Circle {
                centre: place,
                radius_m: radius_m(*level, text_m),
            };
            marks.push(layers::inked(
                layers::FINDING,
                layers::level_ink(*level),
                ring,
            ));
        }
        let outer_m = levels.first().map_or(0.0, |level| radius_m(*level, text_m));
        marks.extend(texts(place, outer_m, &lines(&findings), text_m, room));
    }
    marks
}

/// The graver, the larger: rings of several levels at one place stay apart.
fn radius_m(level: Level, text_m: f64) -> f64 {
    text_m
        * match level {
            Level::Error => 3.0,
            Level::Warning => 2.2,
            Level::Note => 1.4,
        }
}

/// Findings that share a place, in the order of the first of them.
fn by_place(findings: &[Finding]) -> Vec<(Coord<f64>, Vec<&Finding>)> {
    let mut groups: Vec<(Coord<f64>, Vec<&Finding>)> = Vec::new();
    let mut centres = Boxes::new(1.0);
    for finding in findings {
        let Some(place) = finding.place else { continue };
        let reach = Spot::upright(place, 2.0 * SHARED_M, 2.0 * SHARED_M).quad(0.0);
        let shared = centres.near(&reach).into_iter().find(|&index| {
            groups
                .get(index)
                .is_some_and(|(centre, _)| distance_m(*centre, place) <= SHARED_M)
        });
        if let Some((_, members)) = shared.and_then(|index| groups.get_mut(index)) {
            members.push(finding);
        } else if centres.insert([place; 4]) {
            groups.push((place, vec![finding]));
        }
    }
    groups
}

/// Level, rule and mark; the same words once, with their number.
fn lines(findings: &[&Finding]) -> Vec<(Level, String)> {
    let mut lines: Vec<(Level, String, usize)> = Vec::new();
    for finding in findings {
        let mark = finding.tendon.as_deref().map(words::name);
        let mark = mark.map(|mark| format!(" {mark}")).unwrap_or_default();
        let content = format!("{}: {}{mark}", finding.level.word(), finding.rule.name);
        match lines.iter_mut().find(|(_, known, _)| *known == content) {
            Some((_, _, count)) => *count += 1,
            None => lines.push((finding.level, content, 1)),
        }
    }
    let more = lines.len().saturating_sub(MOST_LINES);
    let worst_left = lines.get(MOST_LINES).map(|(level, _, _)| *level);
    let mut shown: Vec<(Level, String)> = lines
        .into_iter()
        .take(MOST_LINES)
        .map(|(level, content, count)| match count {
            1 => (level, content),
            _ => (level, format!("{content} x{count}")),
        })
        .collect();
    if let Some(level) = worst_left {
        shown.push((level, format!("and {more} more, see the list of findings")));
    }
    shown
}

/// Stacks lines beside the ring: where there is no text yet, or else where there is least.
fn texts(
    place: Coord<f64>,
    ring_m: f64,
    lines: &[(Level, String)],
    text_m: f64,
    room: &mut Room,
) -> Vec<Mark> {
    let pitch_m = 1.5 * text_m;
    let width_m = lines
        .iter()
        .map(|(_, content)| words::width_m(content, text_m))
        .fold(0.0, f64::max);
    let count = u32::try_from(lines.len()).unwrap_or(u32::MAX);
    let height_m = text_m + pitch_m * f64::from(count.saturating_sub(1));
    let mut best: Option<((usize, usize), Spot)> = None;
    for (side, up) in spots() {
        let centre = Coord {
            x: place.x + side * (ring_m + 0.5 * text_m + width_m / 2.0),
            y: place.y + up * (ring_m + height_m / 2.0),
        };
        let spot = Spot::upright(centre, width_m, height_m);
        // A text written over is lost; a line shows through.
        let texts = room.texts_hit(&spot);
        if best.is_some_and(|((least, _), _)| texts > least) {
            continue;
        }
        let hit = (texts, room.lines_hit(&spot));
        if best.is_none_or(|(least, _)| hit < least) {
            best = Some((hit, spot));
        }
        if hit == (0, 0) {
            break;
        }
    }
    let Some((_, spot)) = best else {
        return Vec::new();
    };
    room.take(&spot);
    // The near edge of the stack stays put, however wide the font comes out.
    let right_of_ring = spot.centre.x >= place.x;
    let (edge, align) = if right_of_ring {
        (spot.centre.x - spot.width_m / 2.0, Align::MiddleLeft)
    } else {
        (spot.centre.x + spot.width_m / 2.0, Align::MiddleRight)
    };
    let top = spot.centre.y + spot.height_m / 2.0 - text_m / 2.0;
    let near = Coord {
        x: edge,
        y: spot.centre.y,
    };
    let mut marks: Vec<Mark> = leader(place, ring_m, near, lines).into_iter().collect();
    for ((level, content), line) in lines.iter().zip(0_u32..) {
        let drawn = Drawn::Text {
            place: Coord {
                x: edge,
                y: top - pitch_m * f64::from(line),
            },
            height_m: text_m,
            rotation_rad: 0.0,
            align,
            content: content.clone(),
        };
        marks.push(layers::inked(
            layers::FINDING,
            layers::level_ink(*level),
            drawn,
        ));
    }
    marks
}

/// Steps to the side and up, in half widths and half heights of the stack from the ring, near ones first.
fn spots() -> impl Iterator<Item = (f64, f64)> {
    let ups = [
        0.0, 0.6, -0.6, 1.2, -1.2, 2.0, -2.0, 3.0, -3.0, 4.0, -4.0, 5.5, -5.5, 7.0, -7.0, 9.0, -9.0,
    ];
    ups.into_iter().flat_map(|up| [(1.0, up), (-1.0, up)])
}

/// A hairline from the ring to a stack that stands off it.
fn leader(
    place: Coord<f64>,
    ring_m: f64,
    to: Coord<f64>,
    lines: &[(Level, String)],
) -> Option<Mark> {
    let (level, _) = lines.first()?;
    let reach_m = distance_m(place, to);
    let beside = (to.y - place.y).abs() < ring_m / 2.0;
    if beside || reach_m < 1.3 * ring_m {
        return None;
    }
    let from = place + (to - place) * (ring_m / reach_m);
    let drawn = Drawn::Line {
        points: vec![from, to],
        width_m: 0.0,
        closed: false,
    };
    let ink = layers::level_ink(*level);
    Some(layers::inked(layers::FINDING, ink, drawn))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::finding::Rule;

    static GAP: Rule = Rule {
        name: "height-missing",
        meaning: "",
    };
    static SHARP: Rule = Rule {
        name: "radius-small",
        meaning: "",
    };

    fn found(rule: &'static Rule, level: Level, mark: &str, x: f64) -> Finding {
        Finding::new(rule, level, "", "")
            .on_tendon(mark)
            .at_place(Coord { x, y: 0.0 })
    }

    #[test]
    fn one_place_is_written_once_and_counted() {
        let findings = [
            found(&GAP, Level::Error, "D1", 0.0),
            found(&GAP, Level::Error, "D1", 0.1),
            found(&SHARP, Level::Warning, "D2", 0.2),
            found(&SHARP, Level::Warning, "D3", 9.0),
            Finding::new(&SHARP, Level::Note, "", ""),
        ];
        let groups = by_place(&findings);
        assert_eq!(groups.len(), 2);
        let words: Vec<String> = lines(&groups[0].1).into_iter().map(|(_, w)| w).collect();
        assert_eq!(
            words,
            ["error: height-missing D1 x2", "warning: radius-small D2"]
        );
    }

    #[test]
    fn a_crowd_is_cut_and_the_rest_counted() {
        let findings: Vec<Finding> = (0..9)
            .map(|i| found(&GAP, Level::Error, &format!("D{i}"), 0.0))
            .collect();
        let crowd: Vec<&Finding> = findings.iter().collect();
        let lines = lines(&crowd);
        assert_eq!(lines.len(), MOST_LINES + 1);
        assert!(lines[MOST_LINES].1.starts_with("and 3 more"));
    }
}
