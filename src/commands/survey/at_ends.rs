//! What stands at the ends of lines: blocks, their attributes, words, shapes; and what a legend says of them.

use std::collections::{BTreeMap, BTreeSet};

use geo::Coord;
use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::grids::Grids;
use super::trade_words::{Trade, hinted, is_between, named, shape_in};
use crate::drawing::{Drawing, Shape, Text};
use crate::floor::{EndKind, Figure, figures};
use crate::job::Job;

/// Lines shorter than this many reaches of an end symbol are symbols themselves.
const LINE: f64 = 4.0;
/// A legend's symbol stands this near to its words, in text heights.
const LEGEND: f64 = 12.0;
/// Longer texts are notes.
const LONGEST_WORD: usize = 16;

/// What stands at line ends, with the number of ends.
#[derive(Debug, Default)]
pub(super) struct AtEnds {
    /// Blocks by name.
    pub(super) blocks: BTreeMap<String, usize>,
    /// Their attributes: block, tag, value.
    pub(super) attributes: BTreeMap<(String, String, String), usize>,
    /// Texts without digits: layer, text.
    pub(super) words: BTreeMap<(String, String), usize>,
    /// Shapes: layer, what it is called.
    pub(super) shapes: BTreeMap<(String, &'static str), usize>,
    /// By number of an insert that stands at an end: its layer.
    pub(super) insert_layers: BTreeMap<usize, String>,
    /// By number of a shape that is a line: how many of its ends have something that marks them.
    pub(super) marked: BTreeMap<usize, usize>,
    /// Ends at which a block or a shape stands.
    pub(super) stops: Vec<Coord<f64>>,
    /// Numbers of texts that stand at an end: they are no legend.
    texts: BTreeSet<usize>,
    /// Blocks on lines whose names, or a legend, call them intermediate anchors.
    pub(super) between: BTreeSet<String>,
    /// What legends say of blocks.
    pub(super) legend_blocks: BTreeMap<String, EndKind>,
    /// What legends say of shapes.
    pub(super) legend_shapes: BTreeMap<&'static str, EndKind>,
}

type Placed = GeomWithData<[f64; 2], usize>;

impl AtEnds {
    /// Looks at the ends of every open line.
    pub(super) fn of(drawing: &Drawing, job: &Job, grids: &Grids) -> Self {
        let reach_m = job.conventions.end_reach_m;
        let gap_m = job.conventions.join_gap_m;
        let figures = figures(drawing, gap_m, 2.0 * reach_m, |shape| {
            shape.within.is_none() && !named(Trade::Column, &shape.layer)
        });
        let inserts = tree(drawing.inserts.iter().map(|insert| insert.place));
        let texts = tree(drawing.texts.iter().map(|text| middle(&text.corners)));
        let shapes = tree(figures.iter().map(|figure| middle(&figure.corners)));
        let mut found = Self::default();
        for (number, shape) in drawing.shapes.iter().enumerate() {
            let short = shape.path.length_m() < LINE * reach_m;
            if shape.closed || short || grids.draw(number, shape) {
                continue;
            }
            let holding = holding(drawing, shape);
            let mut marked = 0;
            for place in [shape.path.start(), shape.path.end()].into_iter().flatten() {
                let at = [place.x, place.y];
                let block = nearest(&inserts, at, reach_m, |insert| !holding.contains(&insert));
                let word = nearest(&texts, at, 2.0 * reach_m, |text| {
                    drawing
                        .texts
                        .get(text)
                        .is_some_and(|text| is_word(&text.content) && !is_value(drawing, text))
                });
                let figure = nearest(&shapes, at, reach_m, |_| true);
                found.block(drawing, block);
                found.texts.extend(word);
                if let Some(text) = word.and_then(|text| drawing.texts.get(text)) {
                    let key = (text.layer.clone(), text.content.trim().to_owned());
                    *found.words.entry(key).or_default() += 1;
                }
                let figure = figure.and_then(|figure| figures.get(figure));
                if let Some(figure) = figure
                    && let Some(piece) =
                        figure.pieces.first().and_then(|at| drawing.shapes.get(*at))
                    && let Some(word) = figure.words.first()
                {
                    let key = (piece.layer.clone(), *word);
                    *found.shapes.entry(key).or_default() += 1;
                }
                if block.is_some() || figure.is_some() {
                    found.stops.push(place);
                }
                marked += usize::from(block.is_some() || word.is_some() || figure.is_some());
            }
            if marked > 0 {
                found.marked.insert(number, marked);
            }
        }
        found.legend(drawing, &inserts, &shapes, &figures);
        found.between(drawing, reach_m);
        found
    }

    /// Blocks that say by their names that a tendon goes on through them, where they stand on an open line.
    fn between(&mut self, drawing: &Drawing, reach_m: f64) {
        for insert in drawing
            .inserts
            .iter()
            .filter(|insert| is_between(&insert.block))
        {
            if self.between.contains(&insert.block) {
                continue;
            }
            let mut lines = drawing.shapes.iter().filter(|shape| !shape.closed);
            let on = |shape: &Shape| {
                let near = shape.path.project(insert.place);
                near.is_some_and(|near| near.distance_m <= reach_m)
                    && shape.path.length_m() >= LINE * reach_m
            };
            if lines.any(on) {
                self.between.insert(insert.block.clone());
            }
        }
    }

    /// Whether a shape is part of a block that stands at line ends, here or elsewhere: no line of its layer.
    pub(super) fn draws(&self, drawing: &Drawing, shape: &Shape) -> bool {
        let mut around = holding(drawing, shape)
            .into_iter()
            .filter_map(|insert| drawing.inserts.get(insert));
        around.any(|insert| self.blocks.contains_key(&insert.block))
    }

    fn block(&mut self, drawing: &Drawing, number: Option<usize>) {
        let Some((number, insert)) = number.and_then(|at| Some((at, drawing.inserts.get(at)?)))
        else {
            return;
        };
        *self.blocks.entry(insert.block.clone()).or_default() += 1;
        self.insert_layers.insert(number, insert.layer.clone());
        for (tag, value) in &insert.attributes {
            let key = (insert.block.clone(), tag.clone(), value.clone());
            *self.attributes.entry(key).or_default() += 1;
        }
    }

    /// A text that speaks of live or dead ends beside one block or shape tells what it stands for.
    fn legend(
        &mut self,
        drawing: &Drawing,
        inserts: &RTree<Placed>,
        shapes: &RTree<Placed>,
        figures: &[Figure],
    ) {
        for (number, text) in drawing.texts.iter().enumerate() {
            let (kind, between) = (hinted(&text.content), is_between(&text.content));
            if kind.is_none() && !between || !text.content.contains(' ') {
                continue;
            }
            if text.within.is_some() || self.texts.contains(&number) {
                continue;
            }
            if let Some((shape, kind)) = shape_in(&text.content).zip(kind) {
                self.legend_shapes.entry(shape).or_insert(kind);
                continue;
            }
            let reach_m = LEGEND * text.height_m;
            // A legend's words stand level with its symbol and to the right of it.
            let level = |place: Coord<f64>| {
                (place.y - middle(&text.corners).y).abs() <= 2.0 * text.height_m
                    && place.x < text.place.x + text.height_m
            };
            let at = [text.place.x, text.place.y];
            let insert = nearest(inserts, at, reach_m, |insert| {
                drawing
                    .inserts
                    .get(insert)
                    .is_some_and(|insert| level(insert.place))
            });
            let insert = insert.and_then(|insert| drawing.inserts.get(insert));
            if let Some(insert) = insert.filter(|_| between) {
                self.between.insert(insert.block.clone());
            }
            let Some(kind) = kind else {
                continue;
            };
            if let Some(insert) = insert {
                self.legend_blocks
                    .entry(insert.block.clone())
                    .or_insert(kind);
            }
            let figure = nearest(shapes, at, reach_m, |figure| {
                figures
                    .get(figure)
                    .is_some_and(|figure| level(middle(&figure.corners)))
            });
            if let Some(word) = figure.and_then(|figure| figures.get(figure)?.words.first()) {
                self.legend_shapes.entry(word).or_insert(kind);
            }
        }
    }
}

/// A short text without digits.
fn is_word(text: &str) -> bool {
    let text = text.trim();
    let letters = text.chars().any(char::is_alphabetic);
    letters && text.len() <= LONGEST_WORD && !text.bytes().any(|byte| byte.is_ascii_digit())
}

/// Whether a text is an attribute of its insert: it is told with the block.
fn is_value(drawing: &Drawing, text: &Text) -> bool {
    let insert = text.within.and_then(|insert| drawing.inserts.get(insert));
    let mut values = insert.into_iter().flat_map(|insert| &insert.attributes);
    values.any(|(_, value)| *value == text.content)
}

/// The inserts that a shape lies in: it is no tendon that they mark.
fn holding(drawing: &Drawing, shape: &Shape) -> Vec<usize> {
    let outwards = |insert: &usize| drawing.inserts.get(*insert)?.within;
    std::iter::successors(shape.within, outwards).collect()
}

fn tree(places: impl Iterator<Item = Coord<f64>>) -> RTree<Placed> {
    let placed = places
        .enumerate()
        .map(|(at, place)| Placed::new([place.x, place.y], at));
    RTree::bulk_load(
        placed
            .filter(|one| one.geom().iter().all(|x| x.is_finite()))
            .collect(),
    )
}

/// The nearest within reach; of equals the first in the drawing.
fn nearest(
    tree: &RTree<Placed>,
    at: [f64; 2],
    reach_m: f64,
    fits: impl Fn(usize) -> bool,
) -> Option<usize> {
    let off = |one: &Placed| {
        let [x, y] = *one.geom();
        (x - at[0]).hypot(y - at[1])
    };
    tree.locate_within_distance(at, reach_m * reach_m)
        .filter(|one| fits(one.data))
        .min_by(|a, b| off(a).total_cmp(&off(b)).then(a.data.cmp(&b.data)))
        .map(|one| one.data)
}

fn middle(corners: &[Coord<f64>; 4]) -> Coord<f64> {
    let [a, b, c, d] = *corners;
    (a + b + c + d) / 4.0
}
