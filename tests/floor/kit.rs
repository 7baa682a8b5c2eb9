//! A drawing board for tests: two-way floors drawn in code, with the truth of what was meant.

use geo::Coord;
use tautplan::drawing::{Drawing, Insert, Shape, ShapeKind, Text, UnitFrom};
use tautplan::floor::{Floor, PointKind, Run};
use tautplan::geometry::{Path, Segment, step};

/// A stream of repeatable chances (`SplitMix64`, published by Steele, Lea and Flood, OOPSLA 2014).
pub(crate) struct Dice(pub u64);

impl Dice {
    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut mixed = self.0;
        mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        mixed ^ (mixed >> 31)
    }

    pub(crate) fn below(&mut self, sides: u32) -> u32 {
        u32::try_from(self.next() % u64::from(sides.max(1))).unwrap_or(0)
    }

    pub(crate) fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * f64::from(self.below(10_000)) / 10_000.0
    }

    pub(crate) fn shuffle<T>(&mut self, items: &mut [T]) {
        for last in (1..items.len()).rev() {
            let sides = u32::try_from(last + 1).unwrap_or(u32::MAX);
            items.swap(last, self.below(sides) as usize);
        }
    }
}

pub(crate) fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

/// How labels are written.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Style {
    pub height_m: f64,
    /// From line to the near edge of the text, in text heights: least and most.
    pub off_h: [f64; 2],
    /// Along the tendon, level with the sheet, or by chance for each label.
    pub turn: Turn,
    /// One side for each tendon, or by chance for each label.
    pub sides_mixed: bool,
    /// Text placed by its middle, or by the left end of its base line.
    pub centred: bool,
    /// Along the tendon, metres, either way.
    pub jitter_m: f64,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Turn {
    Along,
    Level,
    Mixed,
}

/// What was meant for one tendon.
#[derive(Clone, Debug)]
pub(crate) struct Meant {
    pub mark: String,
    pub run: Run,
    pub from: Coord<f64>,
    pub to: Coord<f64>,
    /// Kind, distance from `from`, millimetres.
    pub heights: Vec<(PointKind, f64, u32)>,
}

/// A floor under the pencil.
#[derive(Clone, Default)]
pub(crate) struct Board {
    pub drawing: Drawing,
    pub meant: Vec<Meant>,
    handles: u32,
}

impl Board {
    pub(crate) fn new() -> Self {
        Self {
            drawing: Drawing {
                unit_m: 0.001,
                unit_from: UnitFrom::Header,
                ..Drawing::default()
            },
            ..Self::default()
        }
    }

    fn handle(&mut self) -> String {
        self.handles += 1;
        format!("{:X}", 0x100 + self.handles)
    }

    pub(crate) fn shape(&mut self, layer: &str, path: Path, closed: bool) {
        let handle = self.handle();
        self.drawing.shapes.push(Shape {
            handle,
            layer: layer.to_owned(),
            within: None,
            kind: ShapeKind::Polyline,
            path,
            closed,
            ..Shape::default()
        });
    }

    pub(crate) fn line(&mut self, layer: &str, points: &[(f64, f64)]) {
        let points: Vec<Coord<f64>> = points.iter().map(|&(x, y)| at(x, y)).collect();
        self.shape(layer, Path::through(&points), false);
    }

    pub(crate) fn rectangle(&mut self, layer: &str, low: (f64, f64), high: (f64, f64)) {
        let corners = [
            at(low.0, low.1),
            at(high.0, low.1),
            at(high.0, high.1),
            at(low.0, high.1),
            at(low.0, low.1),
        ];
        self.shape(layer, Path::through(&corners), true);
    }

    pub(crate) fn insert(&mut self, layer: &str, block: &str, place: Coord<f64>) {
        let handle = self.handle();
        self.drawing.inserts.push(Insert {
            handle,
            layer: layer.to_owned(),
            within: None,
            block: block.to_owned(),
            place,
            ..Insert::default()
        });
    }

    /// A text by its middle, or by the left end of its base line.
    pub(crate) fn text(
        &mut self,
        layer: &str,
        content: &str,
        place: Coord<f64>,
        height_m: f64,
        rotation_rad: f64,
        centred: bool,
    ) {
        let wide_m = 0.85 * height_m * f64::from(u32::try_from(content.len()).unwrap_or(1));
        let (sin, cos) = rotation_rad.sin_cos();
        let corner = |along_m: f64, up_m: f64| Coord {
            x: place.x + cos * along_m - sin * up_m,
            y: place.y + sin * along_m + cos * up_m,
        };
        let (left_m, down_m) = if centred {
            (-wide_m / 2.0, -height_m / 2.0)
        } else {
            (0.0, 0.0)
        };
        let handle = self.handle();
        self.drawing.texts.push(Text {
            handle,
            layer: layer.to_owned(),
            within: None,
            content: content.to_owned(),
            place,
            corners: [
                corner(left_m, down_m),
                corner(left_m + wide_m, down_m),
                corner(left_m + wide_m, down_m + height_m),
                corner(left_m, down_m + height_m),
            ],
            height_m,
            rotation_rad,
            ..Text::default()
        });
    }

    /// A straight tendon with its mark, ends and heights; labels as the style says.
    pub(crate) fn tendon(&mut self, meant: Meant, style: Style, dice: &mut Dice) {
        let (layer, from, to) = match meant.run {
            Run::Banded => ("TENDON-BANDED", meant.from, meant.to),
            Run::Distributed => ("TENDON-DISTRIBUTED", meant.from, meant.to),
        };
        let (dx, dy) = (to.x - from.x, to.y - from.y);
        let heading_rad = dy.atan2(dx);
        let drawn = if dice.below(2) == 0 {
            [from, to]
        } else {
            [to, from]
        };
        self.shape(layer, Path::through(&drawn), false);
        self.insert("TENDON-END", "LIVE-END", from);
        self.insert("TENDON-END", "DEAD-END", to);
        let mut left = dice.below(2) == 0;
        let mark_m = dice.between(1.2, 2.4);
        self.label(
            ("TENDON-MARK", &format!("{} 5-12.7", meant.mark)),
            step(from, heading_rad, mark_m),
            heading_rad,
            left,
            Style {
                turn: Turn::Along,
                ..style
            },
            dice,
        );
        for &(kind, along_m, millimetres) in &meant.heights {
            if style.sides_mixed {
                left = dice.below(2) == 0;
            }
            let word = match kind {
                PointKind::High => "H",
                PointKind::Low => "L",
                PointKind::Anchor | PointKind::Support => "",
            };
            let jitter_m = dice.between(-style.jitter_m, style.jitter_m);
            self.label(
                ("TENDON-HEIGHT", &format!("{word}{millimetres}")),
                step(from, heading_rad, along_m + jitter_m),
                heading_rad,
                left,
                style,
                dice,
            );
        }
        self.meant.push(meant);
    }

    fn label(
        &mut self,
        (layer, content): (&str, &str),
        foot: Coord<f64>,
        heading_rad: f64,
        left: bool,
        style: Style,
        dice: &mut Dice,
    ) {
        let along = match style.turn {
            Turn::Along => true,
            Turn::Level => false,
            Turn::Mixed => dice.below(2) == 0,
        };
        let h = style.height_m;
        let off_m = h * dice.between(style.off_h[0], style.off_h[1]);
        let wide_m = 0.85 * h * f64::from(u32::try_from(content.len()).unwrap_or(1));
        let normal_rad = heading_rad + if left { 1.0 } else { -1.0 } * std::f64::consts::FRAC_PI_2;
        let readable = |angle_rad: f64| {
            if angle_rad.cos() < -1e-9 {
                angle_rad + std::f64::consts::PI
            } else {
                angle_rad
            }
        };
        let rotation_rad = if along { readable(heading_rad) } else { 0.0 };
        // Half the text's extent square to the line, so that its edge stands `off_m` away.
        let relative = rotation_rad - heading_rad;
        let half_m = f64::midpoint(wide_m * relative.sin().abs(), h * relative.cos().abs());
        let middle = step(foot, normal_rad, off_m + half_m);
        if style.centred {
            self.text(layer, content, middle, h, rotation_rad, true);
        } else {
            // The base line's left end stands at the station, or as near to the line as the text's direction lets it.
            let square = relative.sin().abs() > 0.7;
            let place = if square {
                let toward = (rotation_rad - normal_rad).cos() > 0.0;
                let out_m = if toward { off_m } else { off_m + wide_m };
                step(foot, normal_rad, out_m)
            } else {
                let above = (rotation_rad + std::f64::consts::FRAC_PI_2 - normal_rad).cos() > 0.0;
                step(foot, normal_rad, if above { off_m } else { off_m + h })
            };
            self.text(layer, content, place, h, rotation_rad, false);
        }
    }

    /// Entities in another order.
    pub(crate) fn shuffle(&mut self, dice: &mut Dice) {
        dice.shuffle(&mut self.drawing.shapes);
        dice.shuffle(&mut self.drawing.texts);
        dice.shuffle(&mut self.drawing.inserts);
    }

    /// The whole plan turned about the origin and moved.
    pub(crate) fn moved(&self, turn_rad: f64, by: Coord<f64>) -> Self {
        let (sin, cos) = turn_rad.sin_cos();
        let go = |p: Coord<f64>| Coord {
            x: cos * p.x - sin * p.y + by.x,
            y: sin * p.x + cos * p.y + by.y,
        };
        let mut board = self.clone();
        for shape in &mut board.drawing.shapes {
            shape.path = Path::new(shape.path.segments().iter().map(|segment| match *segment {
                Segment::Line { from, to } => Segment::Line {
                    from: go(from),
                    to: go(to),
                },
                Segment::Arc {
                    centre,
                    radius_m,
                    start_rad,
                    sweep_rad,
                } => Segment::Arc {
                    centre: go(centre),
                    radius_m,
                    start_rad: start_rad + turn_rad,
                    sweep_rad,
                },
            }));
        }
        for text in &mut board.drawing.texts {
            text.place = go(text.place);
            text.corners = text.corners.map(go);
            text.rotation_rad += turn_rad;
        }
        for insert in &mut board.drawing.inserts {
            insert.place = go(insert.place);
        }
        for meant in &mut board.meant {
            meant.from = go(meant.from);
            meant.to = go(meant.to);
        }
        board
    }

    /// Heights that were meant and not found, or found and not meant, tendon by tendon.
    pub(crate) fn wrong(&self, floor: &Floor) -> Vec<String> {
        let mut wrong = Vec::new();
        for meant in &self.meant {
            let Some(tendon) = floor.tendons.iter().find(|t| t.mark == meant.mark) else {
                wrong.push(format!("{}: no tendon of this mark", meant.mark));
                continue;
            };
            let start = tendon.path.start().unwrap_or_default();
            let forward = tautplan::geometry::distance_m(start, meant.from) < 0.01;
            let end = tendon.path.end().unwrap_or_default();
            if !forward && tautplan::geometry::distance_m(end, meant.from) >= 0.01 {
                wrong.push(format!("{}: the mark stands on another tendon", meant.mark));
                continue;
            }
            let length_m = tendon.path.length_m();
            let mut found: Vec<(PointKind, f64, Option<f64>)> = tendon
                .points
                .iter()
                .map(|p| {
                    let along_m = if forward {
                        p.station_m
                    } else {
                        length_m - p.station_m
                    };
                    (p.kind, along_m, p.height_m)
                })
                .collect();
            for &(kind, along_m, millimetres) in &meant.heights {
                let height_m = f64::from(millimetres) / 1000.0;
                let like = found.iter().position(|&(k, s, h)| {
                    k == kind
                        && (s - along_m).abs() < 0.30
                        && h.is_some_and(|h| (h - height_m).abs() < 1e-9)
                });
                match like {
                    Some(place) => {
                        found.swap_remove(place);
                    }
                    None => wrong.push(format!(
                        "{}: {kind:?} {millimetres} at {along_m:.2} not found",
                        meant.mark
                    )),
                }
            }
            for (kind, along_m, height_m) in found {
                if kind != PointKind::Anchor {
                    wrong.push(format!(
                        "{}: {kind:?} {height_m:?} at {along_m:.2} not meant",
                        meant.mark
                    ));
                }
            }
        }
        wrong
    }

    pub(crate) fn labels(&self) -> usize {
        self.meant.iter().map(|meant| meant.heights.len()).sum()
    }
}

/// A floor of columns with bands over them and distributed tendons across.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Grid {
    pub bays: [u32; 2],
    pub band: u32,
    pub spacing_m: f64,
    /// Whether distributed tendons pass over the very middle of columns.
    pub over_columns: bool,
}

/// Draws such a floor.
pub(crate) fn floor(grid: Grid, style: Style, dice: &mut Dice) -> Board {
    let mut board = Board::new();
    let spans = |count: u32, dice: &mut Dice| -> Vec<f64> {
        let mut at_m = 0.3;
        let mut lines = vec![at_m];
        for _ in 0..count {
            at_m += dice.between(6.6, 9.6);
            lines.push(at_m);
        }
        lines
    };
    let xs = spans(grid.bays[0], dice);
    let ys = spans(grid.bays[1], dice);
    let (wide, deep) = (xs[xs.len() - 1] + 0.3, ys[ys.len() - 1] + 0.3);
    board.rectangle("SLAB-EDGE", (0.0, 0.0), (wide, deep));
    board.text(
        "SLAB-ZONE",
        "T250",
        at(wide / 2.0 + 0.77, deep / 2.0 + 0.61),
        0.25,
        0.0,
        true,
    );
    for &x in &xs {
        for &y in &ys {
            board.rectangle("COLUMN", (x - 0.25, y - 0.25), (x + 0.25, y + 0.25));
        }
    }
    let high = |line: usize, base: u32| base + 5 * (u32::try_from(line).unwrap_or(0) % 3);
    let heights = |lines: &[f64], tops: u32, bottoms: u32, dice: &mut Dice| {
        let mut heights = Vec::new();
        let anchored = dice.below(2) == 0;
        let end_m = lines[lines.len() - 1] + 0.3;
        if anchored {
            heights.push((PointKind::Anchor, 0.0, 120));
        }
        for (span, pair) in lines.windows(2).enumerate() {
            if span > 0 {
                heights.push((PointKind::High, pair[0], high(span, tops)));
            }
            let share = if span == 0 { 0.45 } else { 0.5 };
            let low_m = pair[0] + share * (pair[1] - pair[0]);
            heights.push((PointKind::Low, low_m, high(span, bottoms)));
        }
        if anchored {
            heights.push((PointKind::Anchor, end_m, 120));
        }
        heights
    };
    let band_heights = heights(&xs, 195, 35, dice);
    let mut number = 0;
    for &y in &ys {
        for place in 0..grid.band {
            let off_m = 0.3 * (f64::from(place) - f64::from(grid.band - 1) / 2.0);
            let y = (y + off_m).clamp(0.1, deep - 0.1);
            if board
                .meant
                .iter()
                .any(|m| m.run == Run::Banded && (m.from.y - y).abs() < 0.05)
            {
                continue;
            }
            number += 1;
            let meant = Meant {
                mark: format!("B{number:02}"),
                run: Run::Banded,
                from: at(0.0, y),
                to: at(wide, y),
                heights: band_heights.clone(),
            };
            board.tendon(meant, style, dice);
        }
    }
    let across = heights(&ys, 165, 55, dice);
    let mut places: Vec<f64> = Vec::new();
    let mut x = 0.9;
    while x < wide - 0.5 {
        places.push(x);
        x += grid.spacing_m;
    }
    if grid.over_columns {
        places.retain(|x| xs.iter().all(|c| (x - c).abs() > 0.4 * grid.spacing_m));
        places.extend(&xs);
    }
    places.sort_by(f64::total_cmp);
    for (number, &x) in places.iter().enumerate() {
        let meant = Meant {
            mark: format!("D{:03}", number + 1),
            run: Run::Distributed,
            from: at(x, 0.0),
            to: at(x, deep),
            heights: across.clone(),
        };
        board.tendon(meant, style, dice);
    }
    board
}
