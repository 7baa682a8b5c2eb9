//! The extent of what is drawn, and blocks of marks that are set beside it.

use geo::{BoundingRect, Coord};

use super::boxes::Quad;
use crate::annotate::words;
use crate::drawing::{Align, Drawn, Mark};
use crate::floor::Floor;
use crate::geometry::step;

/// An upright rectangle around everything met so far; empty at first.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(in crate::annotate) struct Extent {
    low: Coord<f64>,
    high: Coord<f64>,
}

impl Extent {
    const NONE: Self = Self {
        low: Coord {
            x: f64::INFINITY,
            y: f64::INFINITY,
        },
        high: Coord {
            x: f64::NEG_INFINITY,
            y: f64::NEG_INFINITY,
        },
    };

    /// Around slab, tendons and marks, and around those of the drawing's texts that lie no farther off than the floor
    /// is wide: a stray text a kilometre away belongs to something else.
    pub(in crate::annotate) fn of_floor(floor: &Floor, occupied: &[Quad], marks: &[Mark]) -> Self {
        let mut extent = Self::NONE;
        for outline in &floor.slab.outlines {
            if let Some(bounds) = outline.bounding_rect() {
                extent.add(bounds.min());
                extent.add(bounds.max());
            }
        }
        for tendon in &floor.tendons {
            for place in tendon.path.to_line_string(0.1).0 {
                extent.add(place);
            }
        }
        for mark in marks {
            for corner in corners(&mark.drawn) {
                extent.add(corner);
            }
        }
        let (width_m, height_m) = extent.size_m();
        let reach_m = width_m.max(height_m);
        let bounds = extent;
        for quad in occupied {
            let near = quad.iter().all(|c| {
                extent.is_empty()
                    || (c.x > bounds.low.x - reach_m
                        && c.x < bounds.high.x + reach_m
                        && c.y > bounds.low.y - reach_m
                        && c.y < bounds.high.y + reach_m)
            });
            if near {
                for corner in quad {
                    extent.add(*corner);
                }
            }
        }
        extent
    }

    /// Grown to what the drawing says is its extent, if that is about this floor: no farther off than the floor is wide.
    pub(in crate::annotate) fn with(mut self, drawn: Option<[Coord<f64>; 2]>) -> Self {
        let (width_m, height_m) = self.size_m();
        let reach_m = width_m.max(height_m);
        if let Some([low, high]) = drawn {
            let near = low.x > self.low.x - reach_m
                && low.y > self.low.y - reach_m
                && high.x < self.high.x + reach_m
                && high.y < self.high.y + reach_m;
            if near {
                self.add(low);
                self.add(high);
            }
        }
        self
    }

    /// Width and height, metres; zero if nothing is drawn.
    pub(in crate::annotate) fn size_m(&self) -> (f64, f64) {
        if self.is_empty() {
            return (0.0, 0.0);
        }
        (self.high.x - self.low.x, self.high.y - self.low.y)
    }

    /// Upper left corner for a block of this size (width, height): right of the extent, top to top, and farther right
    /// if one of the drawing's texts stands there.
    pub(in crate::annotate) fn beside(
        &self,
        occupied: &[Quad],
        size_m: (f64, f64),
        apart_m: f64,
    ) -> Coord<f64> {
        let mut corner = if self.is_empty() {
            Coord { x: 0.0, y: 0.0 }
        } else {
            Coord {
                x: self.high.x + apart_m,
                y: self.high.y,
            }
        };
        // Texts by their left edge: one sweep to the right settles it.
        let mut texts: Vec<Self> = occupied.iter().map(Self::of_quad).collect();
        texts.sort_by(|a, b| a.low.x.total_cmp(&b.low.x));
        for text in texts {
            let clear = text.is_empty()
                || text.high.y < corner.y - size_m.1 - apart_m
                || text.low.y > corner.y + apart_m
                || text.high.x < corner.x
                || text.low.x > corner.x + size_m.0;
            if !clear {
                corner.x = text.high.x + apart_m;
            }
        }
        corner
    }

    fn of_quad(quad: &Quad) -> Self {
        let mut extent = Self::NONE;
        for corner in quad {
            extent.add(*corner);
        }
        extent
    }

    fn is_empty(&self) -> bool {
        self.low.x > self.high.x
    }

    fn add(&mut self, place: Coord<f64>) {
        if place.x.is_finite() && place.y.is_finite() {
            self.low.x = self.low.x.min(place.x);
            self.low.y = self.low.y.min(place.y);
            self.high.x = self.high.x.max(place.x);
            self.high.y = self.high.y.max(place.y);
        }
    }
}

/// Corners around what is drawn, in plan.
pub(in crate::annotate) fn corners(drawn: &Drawn) -> Vec<Coord<f64>> {
    match drawn {
        Drawn::Line { points, .. } => points.clone(),
        Drawn::Line3d { points } => points.iter().map(|&[x, y, _]| Coord { x, y }).collect(),
        Drawn::Circle { centre, radius_m } => [-1.0, 1.0]
            .map(|side| Coord {
                x: centre.x + side * radius_m,
                y: centre.y + side * radius_m,
            })
            .to_vec(),
        Drawn::Solid { corners } => corners.to_vec(),
        Drawn::Text {
            place,
            height_m,
            rotation_rad,
            align,
            content,
        } => {
            let width_m = words::width_m(content, *height_m);
            let (back, down) = match align {
                Align::Left => (0.0, 0.0),
                Align::MiddleLeft => (0.0, height_m / 2.0),
                Align::Middle => (width_m / 2.0, height_m / 2.0),
                Align::MiddleRight => (width_m, height_m / 2.0),
            };
            let up = rotation_rad + std::f64::consts::FRAC_PI_2;
            let start = step(step(*place, *rotation_rad, -back), up, -down);
            let end = step(start, *rotation_rad, width_m);
            vec![
                start,
                end,
                step(end, up, *height_m),
                step(start, up, *height_m),
            ]
        }
    }
}

/// Marks drawn around an origin at their upper left corner, and the room they take.
#[derive(Debug, Clone, Default, PartialEq)]
pub(in crate::annotate) struct Block {
    /// The marks: x from 0 to the right, y from 0 down.
    pub(in crate::annotate) marks: Vec<Mark>,
    /// Width, metres.
    pub(in crate::annotate) width_m: f64,
    /// Height, metres.
    pub(in crate::annotate) height_m: f64,
}

impl Block {
    /// The marks with their upper left corner at a place.
    pub(in crate::annotate) fn moved_to(self, corner: Coord<f64>) -> Vec<Mark> {
        let mut marks = self.marks;
        for mark in &mut marks {
            match &mut mark.drawn {
                Drawn::Line { points, .. } => points.iter_mut().for_each(|p| *p = *p + corner),
                Drawn::Line3d { points } => points.iter_mut().for_each(|[x, y, _]| {
                    *x += corner.x;
                    *y += corner.y;
                }),
                Drawn::Text { place, .. } => *place = *place + corner,
                Drawn::Circle { centre, .. } => *centre = *centre + corner,
                Drawn::Solid { corners } => corners.iter_mut().for_each(|c| *c = *c + corner),
            }
        }
        marks
    }
}

#[cfg(test)]
mod tests {
    use super::super::Spot;
    use super::*;

    fn text(x: f64, y: f64, width_m: f64) -> Quad {
        Spot::upright(Coord { x, y }, width_m, 1.0).quad(0.0)
    }

    #[test]
    fn a_block_steps_over_texts_in_its_way_and_a_stray_text_does_not_drag_it_off() {
        let own = [text(0.0, 0.0, 20.0), text(5_000.0, 900.0, 4.0)];
        let marks = [Mark {
            layer: String::new(),
            ink: None,
            drawn: Drawn::Circle {
                centre: Coord { x: 0.0, y: 0.0 },
                radius_m: 10.0,
            },
        }];
        let floor = Extent::of_floor(&Floor::default(), &own, &marks);
        let corner = floor.beside(&own, (30.0, 20.0), 1.0);
        assert!((corner.x - 11.0).abs() < 1e-12 && (corner.y - 10.0).abs() < 1e-12);
        let title = text(40.0, -5.0, 10.0);
        let corner = floor.beside(&[own[0], title], (30.0, 20.0), 1.0);
        assert!((corner.x - 46.0).abs() < 1e-12);
    }

    #[test]
    fn an_empty_floor_has_no_size_and_a_block_still_finds_a_place() {
        let floor = Extent::of_floor(&Floor::default(), &[], &[]);
        assert_eq!(floor.size_m(), (0.0, 0.0));
        let corner = floor.beside(&[], (1.0, 1.0), 1.0);
        assert!(corner.x.abs() < 1e-12);
    }
}
