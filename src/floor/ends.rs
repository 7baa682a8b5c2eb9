//! Symbols matched to the ends of tendons, and what they say of each end together.

use geo::{Coord, Distance, Euclidean, LineString, Point, Polygon};
use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::lines::Line;
use super::rules::{END_CONTRADICTED, END_UNCLAIMED, END_UNKNOWN};
use super::settle::{Pairing, Settlement, Stakes};
use super::symbols::{Sign, Symbol};
use super::types::{End, EndKind};
use crate::finding::{Finding, Level, Wording};
use crate::geometry::distance_m;
use crate::job::Conventions;
use crate::units::LONG;

/// An end, and why its kind is not known if it is not.
#[derive(Debug, Clone)]
pub(super) struct Told {
    pub(super) end: End,
    doubt: Option<Doubt>,
}

#[derive(Debug, Clone)]
enum Doubt {
    /// A block marks the end and nothing says which kind.
    Unsaid(String),
    /// One symbol says live, another dead.
    Differ([String; 2]),
    /// An intermediate anchor of this name stands there.
    GoesOn(String),
}

const SIGNS: [Sign; 7] = [
    Sign::Block,
    Sign::Solid,
    Sign::Triangle,
    Sign::Square,
    Sign::Circle,
    Sign::Bar,
    Sign::Word,
];

/// Each line's two ends; findings for symbols without an end. Symbols of one sort are matched to ends one to one; an end
/// may have one of each sort. What is wrong with an end itself is told by [`left_open`].
pub(super) fn ends(
    lines: &[Line],
    symbols: &[Symbol<'_>],
    reach_m: f64,
) -> (Vec<[Told; 2]>, Vec<Finding>) {
    let places: Vec<Coord<f64>> = lines
        .iter()
        .flat_map(|line| [line.path.start(), line.path.end()].map(Option::unwrap_or_default))
        .collect();
    let tree = RTree::bulk_load(
        places
            .iter()
            .enumerate()
            .map(|(at, place)| GeomWithData::new([place.x, place.y], at))
            .collect(),
    );
    let mut of_end: Vec<Vec<&Symbol<'_>>> = vec![Vec::new(); places.len()];
    let mut findings = Vec::new();
    for sign in SIGNS {
        let alike: Vec<&Symbol<'_>> = symbols.iter().filter(|one| one.sign == sign).collect();
        let Matched { host, near } = matched(&alike, &places, &tree, reach_m);
        let of_both = match sign {
            Sign::Block => at_one_point(&alike, &host, &places),
            _ => Vec::new(),
        };
        for &(symbol, end) in &of_both {
            of_end[end].extend(alike.get(symbol));
        }
        for (number, ((symbol, host), near)) in alike.into_iter().zip(host).zip(near).enumerate() {
            if of_both
                .binary_search_by_key(&number, |&(other, _)| other)
                .is_ok()
            {
                continue;
            }
            match host.and_then(|host| of_end.get_mut(host)) {
                Some(held) => held.push(symbol),
                // A symbol may be drawn with two lines alike, or lettered twice.
                None if near && sign != Sign::Block => {}
                None => findings.push(unclaimed(symbol, reach_m)),
            }
        }
    }
    let mut told = places
        .iter()
        .zip(&of_end)
        .map(|(&place, held)| tell(place, held));
    let mut ends = Vec::with_capacity(lines.len());
    while let (Some(start), Some(end)) = (told.next(), told.next()) {
        ends.push([start, end]);
    }
    (ends, findings)
}

struct Matched {
    /// By symbol: the end that it marks.
    host: Vec<Option<usize>>,
    /// By symbol: whether some end is within reach.
    near: Vec<bool>,
}

/// Symbols of one sort and ends, one to one.
fn matched(
    symbols: &[&Symbol<'_>],
    places: &[Coord<f64>],
    tree: &RTree<GeomWithData<[f64; 2], usize>>,
    reach_m: f64,
) -> Matched {
    let mut pairings = Vec::new();
    let mut costs = Vec::new();
    let mut near_any = vec![false; symbols.len()];
    for (label, symbol) in symbols.iter().enumerate() {
        let place = symbol.place;
        let around = Around::new(symbol);
        let search_m = reach_m + around.half_m;
        let mut near: Vec<usize> = tree
            .locate_within_distance([place.x, place.y], search_m * search_m)
            .map(|found| found.data)
            .collect();
        near.sort_unstable();
        for host in near {
            let gap_m = around.gap_m(places[host]);
            if gap_m > reach_m {
                continue;
            }
            near_any[label] = true;
            pairings.push(Pairing {
                label,
                host,
                station_m: 0.0,
            });
            // Squared, so that of two ways to match a pair of ends the one without a long reach is the cheaper.
            let share = gap_m / reach_m.max(1e-9);
            // What covers several ends marks the one nearest to its middle.
            let off = distance_m(places[host], place) / search_m.max(1e-9);
            costs.push(4.0 * share * share + if around.half_m > 0.0 { off * off } else { 0.0 });
        }
    }
    let stakes = OneEach(costs);
    let taken = Settlement::new(&pairings, symbols.len(), places.len(), &stakes, &[]).settle();
    let host = taken
        .into_iter()
        .map(|pairing| Some(pairings.get(pairing?)?.host));
    Matched {
        host: host.collect(),
        near: near_any,
    }
}

/// Places this near to one another are one, metres.
const ONE_POINT_M: f64 = 0.005;

/// A live and a dead symbol at one point, by number, each with every end that the two were matched to: nothing tells which
/// of them is right, or which is whose where two tendons meet.
fn at_one_point(
    symbols: &[&Symbol<'_>],
    host: &[Option<usize>],
    places: &[Coord<f64>],
) -> Vec<(usize, usize)> {
    let mut of_both = Vec::new();
    let hosted = (0..symbols.len()).filter_map(|one| Some((one, host[one]?)));
    for (one, end) in hosted {
        let a = symbols[one];
        // Symbols stand in order of x.
        let near = |other: &usize| (symbols[*other].place.x - a.place.x).abs() <= ONE_POINT_M;
        let after = (one + 1..symbols.len()).take_while(near);
        for two in (0..one).rev().take_while(near).chain(after) {
            let b = symbols[two];
            let differ = matches!((a.kind, b.kind), (Some(a), Some(b)) if a != b);
            if !differ || distance_m(a.place, b.place) > ONE_POINT_M {
                continue;
            }
            // Of two ends apart from one another each has the nearer symbol.
            let other = host[two].unwrap_or(end);
            if distance_m(places[end], places[other]) <= ONE_POINT_M {
                of_both.extend([(one, end), (two, end)]);
            }
        }
    }
    of_both.sort_unstable();
    of_both.dedup();
    of_both
}

/// A symbol's extent.
pub(super) struct Around {
    place: Coord<f64>,
    outline: Option<Polygon<f64>>,
    /// From its place to its farthest corner, metres.
    half_m: f64,
}

impl Around {
    pub(super) fn new(symbol: &Symbol<'_>) -> Self {
        let corners = symbol.corners.iter().flatten();
        Self {
            place: symbol.place,
            outline: symbol
                .corners
                .map(|corners| Polygon::new(LineString::from(corners.to_vec()), Vec::new())),
            half_m: corners.fold(0.0, |most_m, corner| {
                distance_m(*corner, symbol.place).max(most_m)
            }),
        }
    }

    pub(super) fn gap_m(&self, place: Coord<f64>) -> f64 {
        match &self.outline {
            Some(outline) => Euclidean.distance(&Point(place), outline),
            None => distance_m(place, self.place),
        }
    }
}

/// What the symbols at one end say together: the block, else the most telling shape, else the word.
fn tell(place: Coord<f64>, held: &[&Symbol<'_>]) -> Told {
    let mut blocks = held.iter().filter(|one| one.sign == Sign::Block);
    let block = blocks.next();
    let shape = held
        .iter()
        .find(|one| !matches!(one.sign, Sign::Block | Sign::Word));
    let word = held.iter().find(|one| one.sign == Sign::Word);
    let told: Vec<(EndKind, &str)> = [block, shape, word]
        .into_iter()
        .flatten()
        .chain(blocks)
        .filter_map(|one| Some((one.kind?, one.name)))
        .collect();
    let first = told.first().copied();
    let other = first.and_then(|(kind, _)| told.iter().copied().find(|(other, _)| *other != kind));
    let (kind, doubt) = match (first, other) {
        (Some((EndKind::Live, live)), Some((_, dead)))
        | (Some((EndKind::Dead, dead)), Some((_, live))) => {
            let both = [live, dead].map(str::to_owned);
            (None, Some(Doubt::Differ(both)))
        }
        (Some((kind, _)), None) => (Some(kind), None),
        (None, _) => (None, block.map(|one| Doubt::Unsaid(one.name.to_owned()))),
    };
    Told {
        end: End { kind, place },
        doubt,
    }
}

impl Told {
    /// Takes an end of which nothing is said as dead, where the drawing marks live ends only.
    fn or_dead(&mut self, unmarked_is_dead: bool) {
        if unmarked_is_dead && self.doubt.is_none() {
            self.end.kind = self.end.kind.or(Some(EndKind::Dead));
        }
    }

    /// Whether the end's kind is known; if nothing at all is said of it, it goes on through an intermediate anchor of this
    /// name.
    pub(super) fn known_or_goes_on(&mut self, anchor: &str) -> bool {
        if self.end.kind.is_none() && self.doubt.is_none() {
            self.doubt = Some(Doubt::GoesOn(anchor.to_owned()));
        }
        self.end.kind.is_some()
    }
}

/// Takes ends of which nothing is said as the job says, and gives one finding for each whose kind is not known then.
pub(super) fn left_open(
    mark: &str,
    ends: &mut [Told; 2],
    length_m: f64,
    conventions: &Conventions,
) -> Vec<Finding> {
    let reach_m = conventions.end_reach_m;
    for told in ends.iter_mut() {
        told.or_dead(conventions.unmarked_is_dead);
    }
    ends.iter()
        .zip([0.0, length_m])
        .filter(|(told, _)| told.end.kind.is_none())
        .map(|(told, station_m)| {
            let (rule, text, remedy) = match &told.doubt {
                Some(Doubt::Differ([live, dead])) => (
                    &END_CONTRADICTED,
                    Wording::from(format!("{live} says that this end is live, {dead} that it is dead; it was taken for neither")),
                    "delete the wrong one",
                ),
                Some(Doubt::Unsaid(block)) => (
                    &END_UNKNOWN,
                    Wording::of(|units| {
                        let reach = units.of(LONG).said(reach_m, 2);
                        format!("block {block} marks this end, but no attribute and no word within {reach} says whether it is live or dead")
                    }),
                    "name the block among the live or dead ones in the job file, or its attribute's or text's word in live_words or dead_words",
                ),
                Some(Doubt::GoesOn(anchor)) => (
                    &END_UNKNOWN,
                    Wording::from(format!("intermediate anchor {anchor} stands at this end: the tendon is drawn up to here only and goes on in another pour, so nobody can say from where it is stressed")),
                    "draw the tendon through its intermediate anchor to its far end, on one layer, or give the drawing of the whole tendon; if it ends at this joint, put a live or dead end symbol there instead",
                ),
                None => (
                    &END_UNKNOWN,
                    Wording::of(|units| {
                        let reach = units.of(LONG).said(reach_m, 2);
                        format!("no end symbol lies within {reach} of this end; expected a live or a dead end")
                    }),
                    "insert the live or dead end block at the end, or name the office's blocks, words or shapes in the job file; where \
                     the drawing marks live ends only, set unmarked_is_dead = true below [ends]",
                ),
            };
            Finding::new(rule, Level::Error, text, remedy)
                .on_tendon(mark)
                .at_station(station_m)
                .at_place(told.end.place)
        })
        .collect()
}

fn unclaimed(symbol: &Symbol<'_>, reach_m: f64) -> Finding {
    let kind = match symbol.kind {
        Some(EndKind::Live) => "live end symbol",
        Some(EndKind::Dead) => "dead end symbol",
        None => "end symbol",
    };
    Finding::new(
        &END_UNCLAIMED,
        Level::Warning,
        Wording::of(|units| {
            format!(
                "{kind} {} ({}) is not the nearest to any tendon's end within {}",
                symbol.handle,
                symbol.name,
                units.of(LONG).said(reach_m, 2)
            )
        }),
        "move the symbol to its tendon's end, or delete it",
    )
    .at_place(symbol.place)
}

/// An end takes one symbol.
struct OneEach(Vec<f64>);

impl Stakes for OneEach {
    fn own(&self, pairing: usize) -> f64 {
        self.0[pairing]
    }

    fn shared(&self, _: usize, pairings: impl Iterator<Item = usize> + Clone) -> f64 {
        let extra = u32::try_from(pairings.count().saturating_sub(1)).unwrap_or(u32::MAX);
        10.0 * f64::from(extra)
    }

    fn apart_m(&self) -> f64 {
        f64::INFINITY
    }
}
