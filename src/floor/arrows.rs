//! Where labels point: leaders, and plain lines drawn from a text to its tendon or across a bundle of tendons.

use std::collections::{BTreeMap, BTreeSet, HashMap};

use geo::Coord;
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, RTree};

use super::aims::Aim;
use super::index::{Foot, Index, to_box_m};
use super::layers::Roles;
use super::strokes::{self, Stroke};
use crate::drawing::{Drawing, Text};
use crate::finding::Wording;
use crate::geometry::distance_m;
use crate::units::LONG;

/// A line belongs to a text whose box is this near to its end, in heights of the text.
pub(super) const TOUCH_H: f64 = 1.5;
/// It belongs to the nearest text only if that is nearer than the next by this, in heights of the text.
const CLEAR_H: f64 = 0.25;
/// Tendons whose distances from a tip differ by less are both pointed at, metres.
const CROSSING_M: f64 = 0.02;

/// What the drawing's arrows say of its texts.
#[derive(Default)]
pub(super) struct Arrows {
    /// By the text's place in the drawing's list.
    of_text: BTreeMap<usize, Pointed>,
    places: HashMap<*const Text, usize>,
}

/// Where a text points.
#[derive(Debug, Clone, Default)]
pub(super) struct Pointed {
    /// A tendon, or tendons that cross there, for each arrow; in order of the tendons.
    pub(super) aims: Vec<Aim>,
    /// Why an arrow says nothing, and where its tip is.
    pub(super) astray: Option<(Wording, Coord<f64>)>,
}

impl Arrows {
    /// Reads the arrows of a drawing; `index` holds the tendon lines.
    pub(super) fn new(drawing: &Drawing, roles: &Roles, index: &Index, reach_m: f64) -> Self {
        let strokes = strokes::strokes(drawing, roles);
        if strokes.is_empty() && drawing.leaders.is_empty() {
            return Self::default();
        }
        let mut of_text: BTreeMap<usize, Pointed> = BTreeMap::new();
        let mut lead = |text: usize, tips: &[Coord<f64>]| {
            let pointed = of_text.entry(text).or_default();
            for &tip in tips {
                pointed.at(tip, index, reach_m);
            }
        };
        let mut boxes = Boxes::new(drawing, roles);
        for leader in &drawing.leaders {
            for &text in &leader.texts {
                lead(text, &leader.arrows);
                // A text that has its leader is not another's.
                boxes.led.insert(text);
            }
        }
        let mut found = Vec::new();
        for leader in drawing.leaders.iter().filter(|l| l.texts.is_empty()) {
            for text in leader.tails.iter().filter_map(|&tail| boxes.at(tail, None)) {
                lead(text, &leader.arrows);
                found.push(text);
            }
        }
        boxes.led.extend(found);
        for stroke in &strokes {
            if let Some((text, pointed)) = by_stroke(stroke, &boxes, index, reach_m) {
                of_text.entry(text).or_default().add(pointed);
            }
        }
        for pointed in of_text.values_mut() {
            pointed.settle();
        }
        let texts = of_text
            .keys()
            .filter_map(|&at| Some((drawing.texts.get(at)?, at)));
        Self {
            places: texts
                .map(|(text, at)| (std::ptr::from_ref(text), at))
                .collect(),
            of_text,
        }
    }

    /// Where a text of the drawing points, if an arrow is tied to it.
    pub(super) fn of(&self, text: &Text) -> Option<&Pointed> {
        self.of_text
            .get(self.places.get(&std::ptr::from_ref(text))?)
    }
}

impl Pointed {
    fn at(&mut self, tip: Coord<f64>, index: &Index, reach_m: f64) {
        match aim(tip, index, reach_m).as_slice() {
            [] => {
                let near = index.feet(tip, 20.0 * reach_m).into_iter();
                let nearest = near.min_by(|a, b| a.distance_m.total_cmp(&b.distance_m));
                let why = Wording::of(|units| {
                    let long = |length_m: f64| units.of(LONG).said(length_m, 2);
                    let off = nearest.as_ref().map_or_else(
                        || "none is near".to_owned(),
                        |foot| format!("the nearest is {} off", long(foot.distance_m)),
                    );
                    let reach = long(reach_m);
                    format!("points at no tendon: {off}, and {reach} is the reach")
                });
                self.say(why, tip);
            }
            aim => self.aims.push(aim.to_vec()),
        }
    }

    fn add(&mut self, other: Self) {
        self.aims.extend(other.aims);
        if let Some((why, tip)) = other.astray {
            self.say(why, tip);
        }
    }

    /// Of several arrows that say nothing the first by its place is told.
    fn say(&mut self, why: Wording, tip: Coord<f64>) {
        let before = |(_, held): &(Wording, Coord<f64>)| (held.x, held.y) <= (tip.x, tip.y);
        if !self.astray.as_ref().is_some_and(before) {
            self.astray = Some((why, tip));
        }
    }

    /// Each aim once, in an order that the tendons' places decide.
    fn settle(&mut self) {
        let key = |aim: &Aim| -> Vec<(usize, f64)> {
            aim.iter().map(|foot| (foot.line, foot.station_m)).collect()
        };
        self.aims.sort_by(|a, b| {
            key(a)
                .partial_cmp(&key(b))
                .unwrap_or(std::cmp::Ordering::Equal)
        });
        self.aims.dedup_by(|a, b| {
            a.len() == b.len()
                && a.iter()
                    .zip(b.iter())
                    .all(|(a, b)| a.line == b.line && (a.station_m - b.station_m).abs() < 0.05)
        });
    }
}

/// The tendons at a tip: the nearest within reach, and those that are about as near.
pub(super) fn aim(tip: Coord<f64>, index: &Index, reach_m: f64) -> Aim {
    let mut feet = index.feet(tip, reach_m);
    let nearest = feet.iter().map(|foot| foot.distance_m);
    let nearest_m = nearest.fold(f64::INFINITY, f64::min);
    feet.retain(|foot| foot.distance_m <= nearest_m + CROSSING_M);
    feet
}

/// Which text a stroke comes from, and at what it points.
fn by_stroke(
    stroke: &Stroke,
    boxes: &Boxes<'_>,
    index: &Index,
    reach_m: f64,
) -> Option<(usize, Pointed)> {
    let ends = [stroke.path.start()?, stroke.path.end()?];
    let found = ends.map(|end| boxes.at(end, Some(&stroke.layer)));
    let gap_h = |end: usize, text: usize| {
        let text = boxes.drawing.texts.get(text);
        text.map_or(f64::INFINITY, |text| {
            to_box_m(ends[end], &text.corners) / text.height_m
        })
    };
    // An underline or a frame has both its ends at one text.
    let (text, from) = match found {
        [Some(a), Some(b)] if a == b => {
            let (first, last) = (gap_h(0, a), gap_h(1, a));
            if (first - last).abs() < CLEAR_H {
                return None;
            }
            (a, usize::from(last < first))
        }
        [Some(text), None] => (text, 0),
        [None, Some(text)] => (text, 1),
        _ => return None,
    };
    let path = if from == 0 {
        stroke.path.clone()
    } else {
        stroke.path.reversed()
    };
    let tip = path.end()?;
    let crossed = strokes::crossed(&path, index);
    let height_m = boxes.drawing.texts.get(text)?.height_m;
    if strokes::is_tick(&path, &crossed, height_m) {
        return None;
    }
    let mut pointed = Pointed::default();
    let at_tip = aim(tip, index, reach_m);
    let on = at_tip.first().filter(|_| {
        let nearest = at_tip.iter().map(|foot| foot.distance_m);
        nearest.fold(f64::INFINITY, f64::min) <= strokes::ON_M
    });
    let bundle = strokes::bundle(&crossed, &at_tip);
    let passed = |foot: &Foot| crossed.iter().any(|other| other.line == foot.line);
    let stops = on.is_some() || !at_tip.iter().all(passed);
    match bundle.len() {
        2.. if stops => {
            let why = format!(
                "crosses {} tendons of a bundle and stops at one of them: it may mean that one or all",
                bundle.len()
            );
            pointed.say(why.into(), tip);
        }
        2.. => pointed
            .aims
            .extend(bundle.into_iter().map(|foot| vec![foot])),
        _ if on.is_some() => pointed.aims.push(at_tip),
        _ => match crossed.last() {
            Some(last) if distance_m(last.place, tip) <= reach_m => {
                pointed.aims.push(aim(last.place, index, strokes::ON_M));
            }
            _ if !at_tip.is_empty() => pointed.aims.push(at_tip),
            _ => return None,
        },
    }
    Some((text, pointed))
}

/// Boxes of the texts on label layers, by place.
struct Boxes<'a> {
    tree: RTree<GeomWithData<Rectangle<[f64; 2]>, usize>>,
    drawing: &'a Drawing,
    /// Texts that have a leader already.
    led: BTreeSet<usize>,
}

impl<'a> Boxes<'a> {
    fn new(drawing: &'a Drawing, roles: &Roles) -> Self {
        let labels = drawing.texts.iter().enumerate().filter(|(_, text)| {
            let role = roles.of(&text.layer, text.look);
            let label = role.label.heights || role.label.marks || role.extents;
            label && text.height_m.is_finite() && text.height_m > 0.0
        });
        let boxes = labels.filter_map(|(at, text)| {
            let (mut low, mut high) = ([f64::INFINITY; 2], [f64::NEG_INFINITY; 2]);
            for corner in &text.corners {
                low = [low[0].min(corner.x), low[1].min(corner.y)];
                high = [high[0].max(corner.x), high[1].max(corner.y)];
            }
            let reach_m = TOUCH_H * text.height_m;
            let sound = low.iter().chain(&high).all(|x| x.is_finite());
            sound.then(|| {
                let low = low.map(|x| x - reach_m);
                let high = high.map(|x| x + reach_m);
                GeomWithData::new(Rectangle::from_corners(low, high), at)
            })
        });
        Self {
            tree: RTree::bulk_load(boxes.collect()),
            drawing,
            led: BTreeSet::new(),
        }
    }

    /// The text at whose box a line ends, on a layer if one is given; `None` where it is none, or not clear which.
    fn at(&self, end: Coord<f64>, layer: Option<&str>) -> Option<usize> {
        let point = AABB::from_point([end.x, end.y]);
        let near = self.tree.locate_in_envelope_intersecting(&point);
        let free = near
            .map(|entry| entry.data)
            .filter(|at| !self.led.contains(at));
        let mut found: Vec<(f64, usize)> = free
            .filter_map(|at| Some((at, self.drawing.texts.get(at)?)))
            .filter(|(_, text)| layer.is_none_or(|layer| text.layer == layer))
            .map(|(at, text)| (to_box_m(end, &text.corners) / text.height_m, at))
            .filter(|(gap_h, _)| *gap_h <= TOUCH_H)
            .collect();
        found.sort_by(|a, b| a.0.total_cmp(&b.0));
        match found.as_slice() {
            [(_, only)] => Some(*only),
            [(first_h, first), (second_h, _), ..] if second_h - first_h >= CLEAR_H => Some(*first),
            _ => None,
        }
    }
}
