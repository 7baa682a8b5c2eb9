//! Quadrangles filed by the grid cells they lie in: what a new one would touch is found in time that does not grow
//! with the sheet.

use std::collections::HashMap;

use geo::Coord;

/// Corners of a convex quadrangle in order around it; a line is one without width.
pub(in crate::annotate) type Quad = [Coord<f64>; 4];

/// Cells that one box may be filed in; a larger one is looked at every time.
const MOST_CELLS: i64 = 1024;

/// So many boxes in the way are a crowd, each counted as often as it is met.
const CROWD: usize = 256;

/// A set of quadrangles.
#[derive(Debug)]
pub(in crate::annotate) struct Boxes {
    cell_m: f64,
    quads: Vec<Quad>,
    cells: HashMap<(i64, i64), Vec<usize>>,
    large: Vec<usize>,
}

impl Boxes {
    /// An empty set with cells of the given width.
    pub(in crate::annotate) fn new(cell_m: f64) -> Self {
        Self {
            cell_m,
            quads: Vec::new(),
            cells: HashMap::new(),
            large: Vec::new(),
        }
    }

    /// Files a quadrangle; refuses one with a corner that is no number.
    pub(in crate::annotate) fn insert(&mut self, quad: Quad) -> bool {
        if !quad.iter().all(|c| c.x.is_finite() && c.y.is_finite()) {
            return false;
        }
        let index = self.quads.len();
        self.quads.push(quad);
        match self.cells_of(&quad) {
            Some(cells) => {
                for cell in cells {
                    self.cells.entry(cell).or_default().push(index);
                }
            }
            None => self.large.push(index),
        }
        true
    }

    /// The quadrangle of that number.
    pub(in crate::annotate) fn quad(&self, index: usize) -> Option<&Quad> {
        self.quads.get(index)
    }

    /// Numbers of the quadrangles that overlap this one, in the order they came.
    pub(in crate::annotate) fn near(&self, quad: &Quad) -> Vec<usize> {
        let mut found: Vec<usize> = self.touching(*quad, |_| true).collect();
        found.sort_unstable();
        found.dedup();
        found
    }

    /// How many quadrangles overlap this one, counted no further than to where no place is any better than another.
    pub(in crate::annotate) fn count(&self, quad: &Quad) -> usize {
        let mut found: Vec<usize> = self.touching(*quad, |_| true).take(CROWD).collect();
        found.sort_unstable();
        found.dedup();
        found.len()
    }

    /// Whether no quadrangle overlaps this one.
    pub(in crate::annotate) fn is_clear(&self, quad: &Quad) -> bool {
        self.touching(*quad, |_| true).next().is_none()
    }

    /// Numbers of those of the quadrangles asked for that overlap this one, some of them more than once.
    pub(in crate::annotate) fn touching(
        &self,
        quad: Quad,
        asked: impl Fn(usize) -> bool,
    ) -> impl Iterator<Item = usize> {
        let cells = self.cells_of(&quad);
        let every = cells.is_none().then_some(0..self.quads.len());
        let filed = cells
            .into_iter()
            .flatten()
            .filter_map(|cell| self.cells.get(&cell))
            .flatten()
            .chain(&self.large)
            .copied();
        filed
            .chain(every.into_iter().flatten())
            .filter(move |&index| asked(index))
            .filter(move |&index| {
                self.quad(index)
                    .is_some_and(|other| !apart_by_bounds(&quad, other) && overlap(&quad, other))
            })
    }

    /// Cells that a quadrangle's bounds lie in, unless there are too many.
    fn cells_of(&self, quad: &Quad) -> Option<impl Iterator<Item = (i64, i64)> + use<>> {
        let cell = |value: f64| {
            #[expect(
                clippy::cast_possible_truncation,
                reason = "saturates, and then counts as large"
            )]
            let cell = (value / self.cell_m).floor() as i64;
            cell
        };
        let xs = quad.map(|c| cell(c.x));
        let ys = quad.map(|c| cell(c.y));
        let (left, right) = (xs.into_iter().min()?, xs.into_iter().max()?);
        let (low, high) = (ys.into_iter().min()?, ys.into_iter().max()?);
        let wide = right.saturating_sub(left).saturating_add(1);
        let tall = high.saturating_sub(low).saturating_add(1);
        let few = wide.saturating_mul(tall) <= MOST_CELLS;
        few.then(|| (left..=right).flat_map(move |x| (low..=high).map(move |y| (x, y))))
    }
}

/// Whether upright bounds alone keep two quadrangles apart: quick, and mostly enough.
fn apart_by_bounds(a: &Quad, b: &Quad) -> bool {
    let beyond = |value: fn(&Coord<f64>) -> f64| {
        let low = |quad: &Quad| quad.iter().map(value).fold(f64::INFINITY, f64::min);
        let high = |quad: &Quad| quad.iter().map(value).fold(f64::NEG_INFINITY, f64::max);
        low(a) > high(b) || low(b) > high(a)
    };
    beyond(|c| c.x) || beyond(|c| c.y)
}

/// Whether two convex quadrangles overlap: no edge of either has them on its two sides (separating axis theorem).
/// Mere touching, to a nanometre, is no overlap.
pub(in crate::annotate) fn overlap(a: &Quad, b: &Quad) -> bool {
    const TOUCH_M: f64 = 1e-9;
    let splits = |one: &Quad, other: &Quad, from: Coord<f64>, to: Coord<f64>| {
        let (across, along) = (from.y - to.y, to.x - from.x);
        // Measured from a corner: far from the origin, plain products would lose the millimetres.
        let span = |quad: &Quad| {
            quad.iter()
                .map(|c| (c.x - from.x) * across + (c.y - from.y) * along)
                .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), value| {
                    (low.min(value), high.max(value))
                })
        };
        let (low_1, high_1) = span(one);
        let (low_2, high_2) = span(other);
        // Apart by so much, in metres times the edge's length, which is rarely needed itself.
        let gap = (low_1 - high_2).max(low_2 - high_1);
        let at_most_m = across.abs() + along.abs();
        at_most_m > 0.0 && gap > -TOUCH_M * at_most_m && gap > -TOUCH_M * across.hypot(along)
    };
    let parted = |one: &Quad, other: &Quad| {
        let [p, q, r, s] = *one;
        [(p, q), (q, r), (r, s), (s, p)]
            .into_iter()
            .any(|(from, to)| splits(one, other, from, to))
    };
    !parted(a, b) && !parted(b, a)
}

#[cfg(test)]
mod tests {
    use super::super::Spot;
    use super::*;
    use std::f64::consts::FRAC_PI_4;

    fn at(x: f64, y: f64) -> Coord<f64> {
        Coord { x, y }
    }

    fn spot(x: f64, y: f64, rotation_rad: f64) -> Quad {
        Spot {
            centre: at(x, y),
            width_m: 2.0,
            height_m: 1.0,
            rotation_rad,
        }
        .quad(0.0)
    }

    #[test]
    fn overlap_sees_turned_boxes_and_not_only_their_bounds() {
        let box_at_origin = spot(0.0, 0.0, 0.0);
        assert!(overlap(&box_at_origin, &spot(1.9, 0.9, 0.0)));
        assert!(!overlap(&box_at_origin, &spot(2.0, 0.0, 0.0)));
        // The bounds meet; the boxes do not.
        assert!(!overlap(&box_at_origin, &spot(1.9, 1.2, -FRAC_PI_4)));
        assert!(overlap(&box_at_origin, &spot(1.3, 0.8, -FRAC_PI_4)));
    }

    #[test]
    fn a_line_without_width_cuts_a_box_and_leaves_its_neighbour() {
        let line = [at(-5.0, 0.2), at(5.0, 0.2), at(5.0, 0.2), at(-5.0, 0.2)];
        assert!(overlap(&line, &spot(0.0, 0.0, 0.0)));
        assert!(!overlap(&line, &spot(0.0, 1.0, 0.0)));
        assert!(!overlap(&line, &spot(8.0, 0.0, 0.0)));
    }

    #[test]
    fn the_grid_finds_what_a_look_at_all_finds() {
        let mut boxes = Boxes::new(1.0);
        let mut all = Vec::new();
        for i in 0..200_u32 {
            let f = f64::from(i);
            let quad = spot((f * 7.3) % 19.0, (f * 3.1) % 17.0, f * 0.37);
            boxes.insert(quad);
            all.push(quad);
        }
        boxes.insert(Spot::upright(at(0.0, 0.0), 500.0, 0.5).quad(0.0));
        all.push(Spot::upright(at(0.0, 0.0), 500.0, 0.5).quad(0.0));
        for i in 0..50_u32 {
            let probe = spot(f64::from(i) * 0.4, f64::from(i) * 0.3, f64::from(i));
            let plain: Vec<usize> = (0..all.len())
                .filter(|&j| overlap(&probe, &all[j]))
                .collect();
            assert_eq!(boxes.near(&probe), plain);
        }
    }

    #[test]
    fn what_is_no_number_is_refused() {
        let mut boxes = Boxes::new(1.0);
        assert!(!boxes.insert(spot(f64::NAN, 0.0, 0.0)));
        assert!(boxes.insert(spot(1e300, 0.0, 0.0)));
        assert_eq!(boxes.count(&spot(0.0, 0.0, 0.0)), 0);
    }
}
