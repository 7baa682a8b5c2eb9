//! Mean concrete stress from the floor's own tendons.
//!
//! The tendons are gathered by direction (a curved one by its chord). Across each direction the slab is cut by a fixed number
//! of lines. What a line cuts out of one slab between two edges, less the openings, times the local thickness, is a section;
//! the lock-off forces of all tendons that cross it, normal to it, over its area, are its mean stress. A tendon's stress is
//! the mean of the sections of its own direction that it crosses. The cost is linear in tendons.

mod direction;
mod section;

use crate::floor::Slab;
use crate::geometry::{Coord, Path, Segment};

use self::direction::Direction;
use self::section::{Leg, legs};
use super::Pulls;

/// Lines across each direction.
const LINES: u32 = 25;

/// A tendon this far outside the slab edge still belongs to the slab beside it, metres (edge strips, drafting).
const BESIDE_M: f64 = 0.5;

/// The floor's sections.
#[derive(Debug, Clone)]
pub struct Sections {
    directions: Vec<Direction>,
    /// Direction of each tendon.
    of_tendon: Vec<usize>,
    lines: Vec<Line>,
    legs: Vec<Leg>,
}

/// A line across the slab: all points whose distance along `direction` is `offset_m`.
#[derive(Debug, Clone, Copy)]
struct Line {
    direction: usize,
    offset_m: f64,
    /// Its legs, as a range of `Sections::legs`.
    legs: (usize, usize),
}

/// A tendon crosses a section.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Crossing {
    /// Index of the section.
    section: usize,
    /// Force normal to it, all tendons of the line, kN.
    normal_kn: f64,
    /// Whether the section lies across the tendon's own direction.
    own: bool,
}

impl Sections {
    /// Cuts a slab across the directions of these plan lines; `None` where no slab outline is drawn.
    pub fn cut<'a>(slab: &Slab, paths: impl Iterator<Item = &'a Path>) -> Option<Self> {
        let (directions, of_tendon) = direction::gather(paths);
        let mut sections = Self {
            directions,
            of_tendon,
            lines: Vec::new(),
            legs: Vec::new(),
        };
        let zones_by_size = section::zones_by_size(slab);
        for index in 0..sections.directions.len() {
            let direction = sections.directions[index];
            let (least_m, most_m) = section::extent(slab, direction)?;
            for line in 0..LINES {
                let share = (f64::from(line) + 0.5) / f64::from(LINES);
                let offset_m = least_m + share * (most_m - least_m);
                let first = sections.legs.len();
                sections
                    .legs
                    .extend(legs(slab, &zones_by_size, direction, offset_m));
                sections.lines.push(Line {
                    direction: index,
                    offset_m,
                    legs: (first, sections.legs.len()),
                });
            }
        }
        (!slab.outlines.is_empty()).then_some(sections)
    }

    /// The sections that a tendon crosses, with its force after lock-off. `tendons`: how many the line stands for.
    pub fn crossings(
        &self,
        tendon: usize,
        path: &Path,
        tendons: u32,
        pulls: &Pulls<'_>,
    ) -> Vec<Crossing> {
        let own = self.of_tendon.get(tendon).copied();
        let mut found = Vec::new();
        for (index, &direction) in self.directions.iter().enumerate() {
            let count = LINES as usize;
            let lines = self.lines.get(index * count..(index + 1) * count);
            let lines = lines.unwrap_or_default();
            for (start_m, piece) in path.pieces() {
                let (low_m, high_m) = direction.extent_of(piece);
                let first = lines.partition_point(|line| line.offset_m < low_m);
                for line in lines.iter().skip(first) {
                    if line.offset_m >= high_m {
                        break;
                    }
                    for along_m in crossed_at(piece, direction, line.offset_m) {
                        let across_m = direction.across_m(piece.place_at(along_m));
                        let Some(section) = self.section_at(line, across_m) else {
                            continue;
                        };
                        let station_m = start_m + along_m;
                        let turn_rad = piece.heading_at(along_m) - direction.heading_rad();
                        let level = 1.0 / pulls.profile().slope(station_m).hypot(1.0);
                        let normal = turn_rad.cos().abs() * level * f64::from(tendons);
                        found.push(Crossing {
                            section,
                            normal_kn: normal * pulls.lockoff_kn(station_m),
                            own: own == Some(line.direction),
                        });
                    }
                }
            }
        }
        found
    }

    /// Mean stress of each tendon, MPa, from the crossings of all, both in the tendons' order. `None` where a tendon crosses no
    /// section (and none lies beside its middle), or where the slab's thickness is not known.
    pub fn stresses_mpa<'a>(
        &self,
        paths: impl Iterator<Item = &'a Path>,
        crossings: &[Vec<Crossing>],
    ) -> Vec<Option<f64>> {
        let mut force_kn = vec![0.0; self.legs.len()];
        for crossing in crossings.iter().flatten() {
            if let Some(sum_kn) = force_kn.get_mut(crossing.section) {
                *sum_kn += crossing.normal_kn;
            }
        }
        let stress_mpa = |section: usize| {
            let area_m2 = self.legs.get(section)?.area_m2?;
            let force_kn = force_kn.get(section)?;
            (area_m2 > 0.0).then(|| 1e-3 * force_kn / area_m2)
        };
        paths
            .enumerate()
            .map(|(tendon, path)| {
                let own: Vec<usize> = crossings
                    .get(tendon)
                    .into_iter()
                    .flatten()
                    .filter(|crossing| crossing.own)
                    .map(|crossing| crossing.section)
                    .collect();
                if own.is_empty() {
                    return stress_mpa(self.beside(tendon, path)?);
                }
                let stresses: Option<Vec<f64>> = own.iter().map(|&at| stress_mpa(at)).collect();
                let stresses = stresses?;
                let count = u32::try_from(stresses.len()).ok()?;
                Some(stresses.iter().sum::<f64>() / f64::from(count))
            })
            .collect()
    }

    /// The section nearest to the middle of a tendon too short to cross one.
    fn beside(&self, tendon: usize, path: &Path) -> Option<usize> {
        let own = *self.of_tendon.get(tendon)?;
        let direction = self.directions.get(own)?;
        let middle = path.place_at(0.5 * path.length_m());
        let along_m = direction.along_m(middle);
        self.lines
            .iter()
            .filter(|line| line.direction == own)
            .filter_map(|line| Some((line, self.section_at(line, direction.across_m(middle))?)))
            .min_by(|(a, _), (b, _)| {
                let away = |line: &Line| (line.offset_m - along_m).abs();
                away(a).total_cmp(&away(b))
            })
            .map(|(_, section)| section)
    }

    /// The section of a line that holds a place across it, or lies beside it.
    fn section_at(&self, line: &Line, across_m: f64) -> Option<usize> {
        let (first, last) = line.legs;
        (first..last)
            .filter_map(|index| {
                let leg = self.legs.get(index)?;
                let outside_m = (leg.from_m - across_m).max(across_m - leg.to_m).max(0.0);
                (outside_m <= BESIDE_M).then_some((index, outside_m))
            })
            .min_by(|(_, a), (_, b)| a.total_cmp(b))
            .map(|(index, _)| index)
    }
}

/// Distances along a piece at which it crosses a line; the line is known to lie within the piece's extent.
fn crossed_at(
    piece: &Segment,
    direction: Direction,
    offset_m: f64,
) -> impl Iterator<Item = f64> + use<> {
    let mut at = [None, None];
    match *piece {
        Segment::Line { from, to } => {
            let (start_m, end_m) = (direction.along_m(from), direction.along_m(to));
            at[0] = Some((offset_m - start_m) / (end_m - start_m) * piece.length_m());
        }
        Segment::Arc {
            centre,
            radius_m,
            start_rad,
            sweep_rad,
        } => {
            let cosine = (offset_m - direction.along_m(centre)) / radius_m;
            let half_rad = cosine.clamp(-1.0, 1.0).acos();
            for (slot, seen_rad) in at.iter_mut().zip([half_rad, -half_rad]) {
                let turned = (direction.heading_rad() + seen_rad - start_rad) * sweep_rad.signum();
                let along_rad = turned.rem_euclid(std::f64::consts::TAU);
                *slot = (along_rad <= sweep_rad.abs()).then_some(along_rad * radius_m);
            }
        }
    }
    at.into_iter()
        .flatten()
        .filter(|along_m| along_m.is_finite())
}

/// A place's two coordinates in a direction, metres.
fn turned(place: Coord<f64>, unit: Coord<f64>) -> (f64, f64) {
    (
        place.x * unit.x + place.y * unit.y,
        place.y * unit.x - place.x * unit.y,
    )
}
