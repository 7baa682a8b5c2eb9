//! Where a block's or an entity's own plane lies in the plan: an affine map of x and y.

use geo::Coord;

use crate::geometry::{Segment, distance_m, turn_rad};

use super::curves::arcs_along;

/// An affine map of the plane: `x' = xx x + xy y + x0`, `y' = yx x + yy y + y0`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Placing {
    xx: f64,
    xy: f64,
    yx: f64,
    yy: f64,
    x0: f64,
    y0: f64,
}

impl Placing {
    /// The same scale both ways.
    pub(super) fn scaled(factor: f64) -> Self {
        Self::stretched(factor, factor)
    }

    /// A scale for each axis.
    pub(super) fn stretched(along_x: f64, along_y: f64) -> Self {
        Self {
            xx: along_x,
            xy: 0.0,
            yx: 0.0,
            yy: along_y,
            x0: 0.0,
            y0: 0.0,
        }
    }

    /// A shift.
    pub(super) fn shifted(x0: f64, y0: f64) -> Self {
        Self {
            x0,
            y0,
            ..Self::scaled(1.0)
        }
    }

    /// A turn about the origin.
    pub(super) fn turned(angle_rad: f64) -> Self {
        let (sin, cos) = angle_rad.sin_cos();
        Self {
            xx: cos,
            xy: -sin,
            yx: sin,
            yy: cos,
            x0: 0.0,
            y0: 0.0,
        }
    }

    /// The plane of an entity with this extrusion direction and elevation, seen in plan (arbitrary axis algorithm of
    /// the DXF reference: the x axis is `Y × N` where N is within 1/64 of vertical, else `Z × N`).
    pub(super) fn extruded(normal: [f64; 3], elevation: f64) -> Self {
        let [nx, ny, nz] = normal;
        let length = (nx * nx + ny * ny + nz * nz).sqrt();
        if length <= 0.0 || (nx == 0.0 && ny == 0.0 && nz > 0.0) {
            return Self::scaled(1.0);
        }
        let n = [nx / length, ny / length, nz / length];
        let near_vertical = n[0].abs() < 1.0 / 64.0 && n[1].abs() < 1.0 / 64.0;
        let up = if near_vertical {
            [0.0, 1.0, 0.0]
        } else {
            [0.0, 0.0, 1.0]
        };
        let x_axis = unit(cross(up, n));
        let y_axis = unit(cross(n, x_axis));
        Self {
            xx: x_axis[0],
            xy: y_axis[0],
            yx: x_axis[1],
            yy: y_axis[1],
            x0: n[0] * elevation,
            y0: n[1] * elevation,
        }
    }

    /// This map after `inner`.
    #[must_use]
    pub(super) fn after(&self, inner: &Self) -> Self {
        let origin = self.place(Coord {
            x: inner.x0,
            y: inner.y0,
        });
        Self {
            xx: self.xx * inner.xx + self.xy * inner.yx,
            xy: self.xx * inner.xy + self.xy * inner.yy,
            yx: self.yx * inner.xx + self.yy * inner.yx,
            yy: self.yx * inner.xy + self.yy * inner.yy,
            x0: origin.x,
            y0: origin.y,
        }
    }

    /// Where a point comes to lie.
    pub(super) fn place(&self, point: Coord<f64>) -> Coord<f64> {
        Coord {
            x: self.xx * point.x + self.xy * point.y + self.x0,
            y: self.yx * point.x + self.yy * point.y + self.y0,
        }
    }

    /// What a direction becomes.
    pub(super) fn carry(&self, vector: Coord<f64>) -> Coord<f64> {
        Coord {
            x: self.xx * vector.x + self.xy * vector.y,
            y: self.yx * vector.x + self.yy * vector.y,
        }
    }

    fn determinant(&self) -> f64 {
        self.xx * self.yy - self.xy * self.yx
    }

    /// The scale, if it is the same in all directions: circles stay circles.
    pub(super) fn even_scale(&self) -> Option<f64> {
        let along_x = self.xx.hypot(self.yx);
        let along_y = self.xy.hypot(self.yy);
        let skew = self.xx * self.xy + self.yx * self.yy;
        let even = (along_x - along_y).abs() <= 1e-9 * along_x
            && skew.abs() <= 1e-9 * along_x * along_y
            && along_x > 0.0;
        even.then_some(along_x)
    }

    /// A piece in its new place; an arc that becomes part of an ellipse is drawn by arcs within `tolerance_m` of it.
    pub(super) fn segments(&self, piece: &Segment, tolerance_m: f64, out: &mut Vec<Segment>) {
        match *piece {
            Segment::Line { from, to } => out.push(Segment::Line {
                from: self.place(from),
                to: self.place(to),
            }),
            Segment::Arc {
                centre,
                radius_m,
                start_rad,
                sweep_rad,
            } => {
                if let Some(scale) = self.even_scale() {
                    let (sin, cos) = start_rad.sin_cos();
                    let start = self.carry(Coord { x: cos, y: sin });
                    out.push(Segment::Arc {
                        centre: self.place(centre),
                        radius_m: radius_m * scale,
                        start_rad: turn_rad(start.y.atan2(start.x)),
                        sweep_rad: sweep_rad * self.determinant().signum(),
                    });
                    return;
                }
                let along = |t: f64| {
                    let (sin, cos) = (start_rad + t * sweep_rad).sin_cos();
                    let point = Coord {
                        x: centre.x + radius_m * cos,
                        y: centre.y + radius_m * sin,
                    };
                    let forward = sweep_rad.signum();
                    let tangent = Coord {
                        x: -sin * forward,
                        y: cos * forward,
                    };
                    (self.place(point), self.carry(tangent))
                };
                let breaks: Vec<f64> = (0..=8).map(|eighth| f64::from(eighth) / 8.0).collect();
                arcs_along(&along, &breaks, tolerance_m, out);
            }
        }
    }

    /// Whether two points fall together.
    pub(super) fn joins(from: Coord<f64>, to: Coord<f64>, within_m: f64) -> bool {
        distance_m(from, to) <= within_m
    }
}

/// The vector at right angles to a unit of the first and to the second, as long as the second where they are at right
/// angles themselves.
pub(super) fn across(normal: [f64; 3], vector: [f64; 3]) -> [f64; 3] {
    cross(unit(normal), vector)
}

fn cross(a: [f64; 3], b: [f64; 3]) -> [f64; 3] {
    [
        a[1] * b[2] - a[2] * b[1],
        a[2] * b[0] - a[0] * b[2],
        a[0] * b[1] - a[1] * b[0],
    ]
}

fn unit(v: [f64; 3]) -> [f64; 3] {
    let length = (v[0] * v[0] + v[1] * v[1] + v[2] * v[2]).sqrt();
    if length > 0.0 {
        v.map(|part| part / length)
    } else {
        v
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::geometry::Path;
    use std::f64::consts::{FRAC_PI_2, PI};

    fn at(x: f64, y: f64) -> Coord<f64> {
        Coord { x, y }
    }

    #[test]
    fn an_extrusion_downwards_mirrors_x() {
        let placing = Placing::extruded([0.0, 0.0, -1.0], 7.0);
        assert!(distance_m(placing.place(at(3.0, 2.0)), at(-3.0, 2.0)) < 1e-12);
    }

    #[test]
    fn an_upright_plane_is_seen_edge_on() {
        // Normal along −y: the plane's x is the world's x, its y is z.
        let placing = Placing::extruded([0.0, -1.0, 0.0], 2.0);
        assert!(distance_m(placing.place(at(3.0, 9.0)), at(3.0, -2.0)) < 1e-12);
    }

    #[test]
    fn maps_follow_one_another() {
        let first = Placing::shifted(1.0, 0.0);
        let then = Placing::turned(FRAC_PI_2);
        assert!(distance_m(then.after(&first).place(at(0.0, 0.0)), at(0.0, 1.0)) < 1e-12);
    }

    #[test]
    fn a_mirrored_arc_turns_the_other_way() {
        let piece = Segment::from_bulge(at(0.0, 0.0), at(2.0, 0.0), 0.5);
        let mut out = Vec::new();
        Placing::stretched(-3.0, 3.0).segments(&piece, 1e-3, &mut out);
        assert_eq!(out.len(), 1);
        assert!(distance_m(out[0].start(), at(0.0, 0.0)) < 1e-12);
        assert!(distance_m(out[0].end(), at(-6.0, 0.0)) < 1e-12);
        assert!(out[0].curvature_per_m() < 0.0);
    }

    #[test]
    fn a_stretched_circle_is_an_ellipse_without_corners() {
        let circle = Segment::Arc {
            centre: at(0.0, 0.0),
            radius_m: 1.0,
            start_rad: 0.0,
            sweep_rad: 2.0 * PI,
        };
        let mut out = Vec::new();
        Placing::stretched(4.0, 2.0).segments(&circle, 1e-3, &mut out);
        let path = Path::new(out);
        // Circumference with half axes 4 and 2: 8 E(√3/2 as modulus, k² = 3/4)·… by Ramanujan's second formula.
        let h = (2.0_f64 / 6.0).powi(2);
        let ramanujan = PI * 6.0 * (1.0 + 3.0 * h / (10.0 + (4.0 - 3.0 * h).sqrt()));
        assert!((path.length_m() - ramanujan).abs() < 2e-3);
        assert!(
            path.corners()
                .iter()
                .all(|corner| corner.turn_rad.abs() < 1e-6)
        );
        for step in 0..100 {
            let p = path.place_at(path.length_m() * f64::from(step) / 100.0);
            let off = (p.x / 4.0).hypot(p.y / 2.0) - 1.0;
            assert!(off.abs() < 1e-3, "{off}");
        }
    }
}
