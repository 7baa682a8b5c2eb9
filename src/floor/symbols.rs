//! What marks the anchors of tendons, at their ends and between: blocks by name or attribute, shapes, words.

mod shapes;
mod words;

use std::collections::{BTreeMap, BTreeSet};

use geo::Coord;

use super::layers::{Roles, names};
use super::types::EndKind;
use crate::drawing::{Drawing, Insert};
use crate::job::Conventions;
pub use shapes::{Figure, figures};
pub use words::{EndWords, Said};

/// A symbol on the plan.
#[derive(Debug, Clone)]
pub(super) struct Symbol<'a> {
    /// Live or dead; `None` for a block that marks an end and does not tell.
    pub(super) kind: Option<EndKind>,
    /// Whether it is an intermediate anchor: no end, but a place where the tendon goes on into the next pour.
    pub(super) intermediate: bool,
    pub(super) sign: Sign,
    /// Where a block was placed, the middle of what is drawn or written.
    pub(super) place: Coord<f64>,
    /// Corners around what is drawn or written; none for a block, which marks an end by its place.
    pub(super) corners: Option<[Coord<f64>; 4]>,
    pub(super) handle: &'a str,
    /// The block's name, the word, what the shape is called.
    pub(super) name: &'a str,
}

/// What a symbol is. Of the shapes at one end the first in this order tells its kind.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Sign {
    Block,
    Solid,
    Triangle,
    Square,
    Circle,
    Bar,
    Word,
}

impl Sign {
    /// What a shape of this word is.
    fn of(word: &str) -> Self {
        match word {
            "solid" => Self::Solid,
            "triangle" => Self::Triangle,
            "square" => Self::Square,
            "circle" => Self::Circle,
            _ => Self::Bar,
        }
    }
}

impl Symbol<'_> {
    /// Takes what a name, an attribute or a word says, unless something has said it before.
    fn told(&mut self, said: Said) {
        if self.kind.is_some() || self.intermediate {
            return;
        }
        match said {
            Said::End(kind) => self.kind = Some(kind),
            Said::Intermediate => self.intermediate = true,
        }
    }
}

/// All symbols of a drawing, and what of it they consist of.
#[derive(Debug, Default)]
pub(super) struct Symbols<'a> {
    /// Those of ends, in an order that their places decide.
    pub(super) list: Vec<Symbol<'a>>,
    /// Those of intermediate anchors, likewise.
    pub(super) joints: Vec<Symbol<'a>>,
    /// Numbers of the shapes that belong to symbols.
    pub(super) shapes: BTreeSet<usize>,
    /// Numbers of the texts that are nothing but an end's word.
    pub(super) texts: BTreeSet<usize>,
}

impl<'a> Symbols<'a> {
    /// Gathers the symbols: blocks whatever their layer, words on layers of ends, tendons and labels, shapes on layers of
    /// ends.
    pub(super) fn new(drawing: &'a Drawing, conventions: &'a Conventions, roles: &Roles) -> Self {
        let words = EndWords::new(conventions);
        let mut symbols = Self::default();
        let within = symbols.blocks(drawing, conventions, &words);
        symbols.words(drawing, roles, &words, &within);
        symbols.shapes(drawing, conventions, roles, &within);
        symbols.list.sort_by(|a, b| {
            let by_x = a.place.x.total_cmp(&b.place.x);
            by_x.then(a.place.y.total_cmp(&b.place.y))
                .then(a.sign.cmp(&b.sign))
                .then_with(|| a.name.cmp(b.name))
                .then_with(|| a.handle.cmp(b.handle))
        });
        let all = std::mem::take(&mut symbols.list);
        (symbols.joints, symbols.list) = all.into_iter().partition(|one| one.intermediate);
        symbols
    }

    /// Places of blocks and shapes of ends: where one stands on a joint of two pieces, two tendons end.
    pub(super) fn stops(&self) -> Vec<Coord<f64>> {
        let drawn = self.list.iter().filter(|one| one.sign != Sign::Word);
        drawn.map(|one| one.place).collect()
    }

    /// Places of the blocks of intermediate anchors.
    pub(super) fn anchors(&self) -> Vec<Coord<f64>> {
        let drawn = self.joints.iter().filter(|one| one.sign != Sign::Word);
        drawn.map(|one| one.place).collect()
    }

    /// Takes the blocks; by number of an insert, the symbol that it is or lies in.
    fn blocks(
        &mut self,
        drawing: &'a Drawing,
        conventions: &Conventions,
        words: &EndWords,
    ) -> Vec<Option<usize>> {
        let live = names(&conventions.live_end_blocks);
        let dead = names(&conventions.dead_end_blocks);
        let between = names(&conventions.intermediate_blocks);
        let untold = names(&conventions.end_blocks);
        let tags = names(&conventions.end_attributes);
        // By name: no symbol, one that does not tell what it is, or one that does.
        let mut by_name: BTreeMap<&str, Option<Option<Said>>> = BTreeMap::new();
        let mut of_insert: Vec<Option<usize>> = Vec::with_capacity(drawing.inserts.len());
        for insert in &drawing.inserts {
            let named = *by_name.entry(&insert.block).or_insert_with(|| {
                if live.has(&insert.block) {
                    Some(Some(Said::End(EndKind::Live)))
                } else if dead.has(&insert.block) {
                    Some(Some(Said::End(EndKind::Dead)))
                } else if between.has(&insert.block) {
                    Some(Some(Said::Intermediate))
                } else {
                    untold.has(&insert.block).then_some(None)
                }
            });
            let around = insert.within.and_then(|outer| *of_insert.get(outer)?);
            let stands = insert.place.x.is_finite() && insert.place.y.is_finite();
            let Some(named) = named.filter(|_| stands && around.is_none()) else {
                of_insert.push(around);
                continue;
            };
            let told = |insert: &Insert| {
                let mut asked = insert.attributes.iter().filter(|(tag, _)| tags.has(tag));
                asked.find_map(|(_, value)| words.said(value))
            };
            let mut symbol = Symbol {
                kind: None,
                intermediate: false,
                sign: Sign::Block,
                place: insert.place,
                corners: None,
                handle: &insert.handle,
                name: &insert.block,
            };
            if let Some(said) = named.or_else(|| told(insert)) {
                symbol.told(said);
            }
            of_insert.push(Some(self.list.len()));
            self.list.push(symbol);
        }
        for (at, shape) in drawing.shapes.iter().enumerate() {
            if shape
                .within
                .is_some_and(|i| of_insert.get(i).is_some_and(Option::is_some))
            {
                self.shapes.insert(at);
            }
        }
        of_insert
    }

    fn words(
        &mut self,
        drawing: &'a Drawing,
        roles: &Roles,
        words: &EndWords,
        of_insert: &[Option<usize>],
    ) {
        for (at, text) in drawing.texts.iter().enumerate() {
            let Some((said, whole)) = words.found_in(&text.content) else {
                continue;
            };
            let inside = text.within.and_then(|insert| *of_insert.get(insert)?);
            if let Some(block) = inside.and_then(|symbol| self.list.get_mut(symbol)) {
                block.told(said);
                if whole {
                    self.texts.insert(at);
                }
                continue;
            }
            let role = roles.of(&text.layer, text.look);
            let lettered = role.label != super::layers::Labels::default();
            let corners = text.corners;
            let finite = corners.iter().all(|c| c.x.is_finite() && c.y.is_finite());
            if !(role.ends || lettered || role.run.is_some()) || !finite {
                continue;
            }
            if whole {
                self.texts.insert(at);
            }
            let mut symbol = Symbol {
                kind: None,
                intermediate: false,
                sign: Sign::Word,
                place: middle(&corners),
                corners: Some(corners),
                handle: &text.handle,
                name: text.content.trim(),
            };
            symbol.told(said);
            self.list.push(symbol);
        }
    }

    fn shapes(
        &mut self,
        drawing: &'a Drawing,
        conventions: &'a Conventions,
        roles: &Roles,
        of_insert: &[Option<usize>],
    ) {
        let (live, dead) = (&conventions.live_end_shapes, &conventions.dead_end_shapes);
        if live.is_empty() && dead.is_empty() {
            return;
        }
        let free = |within: Option<usize>| {
            within.is_none_or(|insert| of_insert.get(insert).is_none_or(Option::is_none))
        };
        let largest_m = 2.0 * conventions.end_reach_m;
        let found = figures(drawing, conventions.join_gap_m, largest_m, |shape| {
            let role = roles.of(&shape.layer, shape.look);
            // On a layer of tendons too, an open line is a tendon.
            role.ends && free(shape.within) && (role.run.is_none() || shape.closed)
        });
        for figure in found {
            let told = figure.words.iter().find_map(|word| {
                let is = |known: &String| known == word;
                if live.iter().any(is) {
                    Some((EndKind::Live, *word))
                } else {
                    dead.iter().any(is).then_some((EndKind::Dead, *word))
                }
            });
            let Some((kind, word)) = told else {
                continue;
            };
            let handle = figure.pieces.first().and_then(|at| drawing.shapes.get(*at));
            self.list.push(Symbol {
                kind: Some(kind),
                intermediate: false,
                sign: Sign::of(word),
                place: middle(&figure.corners),
                corners: Some(figure.corners),
                handle: handle.map_or("", |shape| shape.handle.as_str()),
                name: word,
            });
            self.shapes.extend(figure.pieces);
        }
    }
}

fn middle(corners: &[Coord<f64>; 4]) -> Coord<f64> {
    let [a, b, c, d] = *corners;
    (a + b + c + d) / 4.0
}
