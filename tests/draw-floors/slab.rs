//! The concrete: edge, thickness, thicker zones, openings, columns, and the lines that give one height to many tendons.

use crate::dxf::Xy;
use crate::tendon::{Kind, Run, Shown, Tendon};

/// Lower left and upper right corner.
pub(crate) type Box2 = [Xy; 2];

/// A floor without its tendons.
pub(crate) struct Slab {
    pub(crate) edge: Vec<Xy>,
    pub(crate) thickness_mm: f64,
    /// Thicker panels, their soffit lower.
    pub(crate) zones: Vec<(Box2, f64)>,
    pub(crate) openings: Vec<Box2>,
    pub(crate) columns: Vec<Xy>,
    pub(crate) column_mm: f64,
    pub(crate) level_lines: Vec<LevelLine>,
    /// Gridlines that cross the x axis and the y axis.
    pub(crate) grid: [Vec<f64>; 2],
}

/// A line along x that gives a height to each distributed tendon it crosses.
#[derive(Clone, Copy)]
pub(crate) struct LevelLine {
    pub(crate) y_mm: f64,
    pub(crate) x_mm: [f64; 2],
    pub(crate) kind: Kind,
    pub(crate) height_mm: f64,
    /// Where its text stands along it.
    pub(crate) text_x_mm: f64,
}

impl Slab {
    pub(crate) fn thickness_at(&self, at: Xy) -> f64 {
        let inside = |corners: &Box2| {
            (0..2).all(|side| corners[0][side] < at[side] && at[side] < corners[1][side])
        };
        let zone = self.zones.iter().find(|(corners, _)| inside(corners));
        zone.map_or(self.thickness_mm, |(_, thickness_mm)| *thickness_mm)
    }

    pub(crate) fn extents(&self) -> Box2 {
        let mut corners = [[f64::MAX; 2], [f64::MIN; 2]];
        for at in &self.edge {
            for side in 0..2 {
                corners[0][side] = corners[0][side].min(at[side]);
                corners[1][side] = corners[1][side].max(at[side]);
            }
        }
        corners
    }

    /// A level line for each stretch of `x_mm` that no gap interrupts.
    pub(crate) fn level_line(
        &mut self,
        y_mm: f64,
        x_mm: [f64; 2],
        gaps: &[[f64; 2]],
        kind: Kind,
        height_mm: f64,
    ) {
        let mut from = x_mm[0];
        for gap in gaps.iter().filter(|gap| gap[0] < x_mm[1]) {
            self.add_level_line(y_mm, [from, gap[0]], kind, height_mm);
            from = gap[1];
        }
        self.add_level_line(y_mm, [from, x_mm[1]], kind, height_mm);
    }

    fn add_level_line(&mut self, y_mm: f64, x_mm: [f64; 2], kind: Kind, height_mm: f64) {
        if x_mm[1] - x_mm[0] > 500.0 {
            let text_x_mm = x_mm[0] + (0.31 * (x_mm[1] - x_mm[0])).min(3350.0);
            self.level_lines.push(LevelLine {
                y_mm,
                x_mm,
                kind,
                height_mm,
                text_x_mm,
            });
        }
    }

    /// Lets the level lines speak for the points that they cross, instead of labels.
    pub(crate) fn settle(&self, tendon: &mut Tendon) {
        if tendon.run != Run::Distributed {
            return;
        }
        for index in 0..tendon.points.len() {
            let at = tendon.place(&tendon.points[index]);
            let point = &mut tendon.points[index];
            let crosses = |line: &&LevelLine| {
                line.kind == point.kind
                    && (line.y_mm - at[1]).abs() < 1.0
                    && line.x_mm[0] < at[0]
                    && at[0] < line.x_mm[1]
            };
            if let Some(line) = self.level_lines.iter().find(crosses) {
                point.height_mm = line.height_mm;
                point.shown = Shown::LevelLine;
            }
        }
    }
}
