//! An aligned dimension: the points it measures, its line, and the picture that shows it.

use super::Xy;
use super::shapes::{Across, Shape, Text, Up};

/// An aligned dimension between two points.
#[derive(Clone)]
pub(crate) struct Measure {
    /// The block that shows it.
    pub(super) block: String,
    pub(super) measured: [Xy; 2],
    /// Ends of the dimension line.
    pub(super) line: [Xy; 2],
    height_mm: f64,
}

impl Measure {
    pub(super) fn new(block: String, from: Xy, to: Xy, shift_mm: f64, height_mm: f64) -> Self {
        let length = (to[0] - from[0]).hypot(to[1] - from[1]);
        let left = [
            -(to[1] - from[1]) / length * shift_mm,
            (to[0] - from[0]) / length * shift_mm,
        ];
        let line = [from, to].map(|end| [end[0] + left[0], end[1] + left[1]]);
        Self {
            block,
            measured: [from, to],
            line,
            height_mm,
        }
    }

    pub(super) fn length_mm(&self) -> f64 {
        let [from, to] = self.measured;
        (to[0] - from[0]).hypot(to[1] - from[1])
    }

    fn rotation_rad(&self) -> f64 {
        let [from, to] = self.measured;
        (to[1] - from[1]).atan2(to[0] - from[0])
    }

    pub(super) fn text_at(&self) -> Xy {
        let [from, to] = self.line;
        let turn = self.rotation_rad();
        let rise = 0.9 * self.height_mm;
        [
            f64::midpoint(from[0], to[0]) - turn.sin() * rise,
            f64::midpoint(from[1], to[1]) + turn.cos() * rise,
        ]
    }

    /// The lines, ticks and figure that stand in the dimension's own block.
    pub(super) fn picture(&self) -> Vec<Shape> {
        let turn = self.rotation_rad();
        let tick = 0.5 * self.height_mm;
        let mut shapes = vec![Shape::Line(self.line)];
        for (end, foot) in self.line.into_iter().zip(self.measured) {
            let [along, across] = [turn.cos() * tick, turn.sin() * tick];
            shapes.push(Shape::Line([foot, end]));
            shapes.push(Shape::Line([
                [end[0] - along + across, end[1] - across - along],
                [end[0] + along - across, end[1] + across + along],
            ]));
        }
        shapes.push(Shape::Text(Text {
            at: self.text_at(),
            height_mm: self.height_mm,
            rotation_rad: turn,
            across: Across::Centre,
            up: Up::Middle,
            content: format!("{:.0}", self.length_mm()),
        }));
        shapes
    }
}
