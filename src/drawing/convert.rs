//! Entities as plan lines: what the library read, through the entity's own plane and its block's place, in metres.

use std::f64::consts::TAU;

use dxf::entities::{Ellipse, EntityType, LwPolyline, Polyline, Spline as DxfSpline};
use geo::Coord;

use super::ShapeKind;
use super::curves::arcs_along;
use super::lettering::normal;
use super::placing::{Placing, across};
use super::spline::Spline;
use super::windows::Record;
use crate::geometry::{Path, Segment};

/// How far arcs may leave a curve that they stand for.
const TOLERANCE_M: f64 = 1e-3;
/// Vertices closer than this are one.
const SAME_PLACE_M: f64 = 1e-6;

/// Nothing is built a million kilometres from the origin, and numbers beyond lose their millimetres.
const FARTHEST_M: f64 = 1e9;
/// Why what lies further is left out.
pub(super) const TOO_FAR: &str =
    "it lies more than a million kilometres from the origin, or nowhere";

/// Whether all of these places are where something can be built.
pub(super) fn is_near(places: impl IntoIterator<Item = Coord<f64>>) -> bool {
    let mut places = places.into_iter();
    places.all(|place| place.x.abs() <= FARTHEST_M && place.y.abs() <= FARTHEST_M)
}

/// A plan line, metres.
#[derive(Debug, Clone)]
pub(super) struct Line {
    pub(super) kind: ShapeKind,
    pub(super) path: Path,
    pub(super) closed: bool,
}

/// The plan line of an entity; `None` for one that has no length in plan or is no line.
///
/// # Errors
/// Why the entity makes no sense.
pub(super) fn line_of(record: &Record, placing: &Placing) -> Result<Option<Line>, &'static str> {
    let mut pieces = Vec::new();
    let (kind, flagged) = match &record.entity {
        EntityType::Line(line) => {
            pieces.push(Segment::Line {
                from: placing.place(flat(&line.p1)),
                to: placing.place(flat(&line.p2)),
            });
            (ShapeKind::Line, false)
        }
        EntityType::LwPolyline(line) => {
            let plane = Placing::extruded(normal(&line.extrusion_direction), record.elevation);
            let closed = line.flags & 1 != 0;
            let placing = placing.after(&plane);
            polyline(&vertices_of_light(line), closed, &placing, &mut pieces);
            (ShapeKind::Polyline, closed)
        }
        EntityType::Polyline(line) => {
            if line.flags & (16 | 64) != 0 {
                // A mesh is a surface, not a line.
                return Ok(None);
            }
            let closed = line.flags & 1 != 0;
            let plane = if line.flags & 8 != 0 {
                Placing::scaled(1.0)
            } else {
                Placing::extruded(normal(&line.normal), line.location.z)
            };
            let placing = placing.after(&plane);
            polyline(&vertices_of_heavy(line), closed, &placing, &mut pieces);
            (ShapeKind::Polyline, closed)
        }
        EntityType::Arc(arc) => {
            let swept_deg = (arc.end_angle - arc.start_angle).rem_euclid(360.0);
            let piece = Segment::Arc {
                centre: flat(&arc.center),
                radius_m: sound_radius(arc.radius)?,
                start_rad: arc.start_angle.to_radians(),
                sweep_rad: if swept_deg > 0.0 {
                    swept_deg.to_radians()
                } else {
                    TAU
                },
            };
            let plane = Placing::extruded(normal(&arc.normal), arc.center.z);
            placing
                .after(&plane)
                .segments(&piece, TOLERANCE_M, &mut pieces);
            (ShapeKind::Arc, false)
        }
        EntityType::Circle(circle) => {
            let piece = Segment::Arc {
                centre: flat(&circle.center),
                radius_m: sound_radius(circle.radius)?,
                start_rad: 0.0,
                sweep_rad: TAU,
            };
            let plane = Placing::extruded(normal(&circle.normal), circle.center.z);
            placing
                .after(&plane)
                .segments(&piece, TOLERANCE_M, &mut pieces);
            (ShapeKind::Circle, true)
        }
        EntityType::Ellipse(ellipse) => {
            ellipse_arc(ellipse, placing, &mut pieces)?;
            let whole = (ellipse.end_parameter - ellipse.start_parameter).abs() >= TAU - 1e-9;
            (ShapeKind::Ellipse, whole)
        }
        EntityType::Solid(_) | EntityType::Trace(_) => {
            filled(&record.entity, placing, &mut pieces);
            (ShapeKind::Solid, true)
        }
        EntityType::Spline(spline) => {
            let points = spline.control_points.iter().chain(&spline.fit_points);
            if !is_near(points.map(|point| placing.place(flat(point)))) {
                return Err(TOO_FAR);
            }
            let curve =
                curve_of(spline).ok_or("its points, knots, weights and degree make no curve")?;
            curve.segments(placing, TOLERANCE_M, &mut pieces);
            (
                ShapeKind::Spline,
                spline.flags & 1 != 0 && curve.is_closed(),
            )
        }
        _ => return Ok(None),
    };
    if !pieces.iter().all(|piece| piece.length_m().is_finite()) {
        return Err("its coordinates, radii or bulges are too large for a length");
    }
    // A path leaves out pieces of no finite length, which here would be a silent loss.
    if !is_near(pieces.iter().flat_map(|piece| [piece.start(), piece.end()])) {
        return Err(TOO_FAR);
    }
    let path = Path::new(pieces);
    let (Some(start), Some(end)) = (path.start(), path.end()) else {
        return Ok(None);
    };
    if path.length_m() <= SAME_PLACE_M {
        return Ok(None);
    }
    let closed = flagged || Placing::joins(start, end, SAME_PLACE_M);
    Ok(Some(Line { kind, path, closed }))
}

/// An ellipse or a part of one, from its start parameter counterclockwise to its end (DXF reference: its points are
/// `centre + cos t · major axis + sin t · minor axis`, in world axes).
fn ellipse_arc(
    ellipse: &Ellipse,
    placing: &Placing,
    out: &mut Vec<Segment>,
) -> Result<(), &'static str> {
    let major = [
        ellipse.major_axis.x,
        ellipse.major_axis.y,
        ellipse.major_axis.z,
    ];
    let ratio = ellipse.minor_axis_ratio;
    let minor = across(normal(&ellipse.normal), major).map(|part| part * ratio);
    let from = ellipse.start_parameter;
    let swept = (ellipse.end_parameter - from).rem_euclid(TAU);
    let sweep = if swept > 1e-12 { swept } else { TAU };
    let half_axes = [major, minor].map(|[x, y, z]| (x * x + y * y + z * z).sqrt());
    if !half_axes
        .iter()
        .all(|length| *length > 0.0 && length.is_finite())
        || !sweep.is_finite()
    {
        return Err("one of its axes has no length");
    }
    let centre = flat(&ellipse.center);
    let along = |t: f64| {
        let (sin, cos) = t.sin_cos();
        let mixed = |a: f64, b: f64| Coord {
            x: a * major[0] + b * minor[0],
            y: a * major[1] + b * minor[1],
        };
        (
            placing.place(centre + mixed(cos, sin)),
            placing.carry(mixed(-sin, cos)),
        )
    };
    let breaks: Vec<f64> = (0..=8)
        .map(|eighth| from + sweep * f64::from(eighth) / 8.0)
        .collect();
    if !is_near(breaks.iter().map(|t| along(*t).0)) {
        return Err(TOO_FAR);
    }
    arcs_along(&along, &breaks, TOLERANCE_M, out);
    Ok(())
}

fn sound_radius(radius: f64) -> Result<f64, &'static str> {
    if radius > 0.0 {
        Ok(radius)
    } else {
        Err("its radius is not positive")
    }
}

type Vertex = (Coord<f64>, f64);

fn vertices_of_light(line: &LwPolyline) -> Vec<Vertex> {
    line.vertices
        .iter()
        .map(|vertex| {
            let place = Coord {
                x: vertex.x,
                y: vertex.y,
            };
            (place, vertex.bulge)
        })
        .collect()
}

fn vertices_of_heavy(line: &Polyline) -> Vec<Vertex> {
    line.vertices()
        // Flag 16: a control point of a fitted curve, which is not on the line.
        .filter(|vertex| vertex.flags & 16 == 0)
        .map(|vertex| (flat(&vertex.location), vertex.bulge))
        .collect()
}

/// The sides of a polyline; a vertex on the one before it gives up its place but not its bulge.
fn polyline(vertices: &[Vertex], closed: bool, placing: &Placing, out: &mut Vec<Segment>) {
    let Some((&(first, first_bulge), rest)) = vertices.split_first() else {
        return;
    };
    let (mut from, mut bulge) = (first, first_bulge);
    let closing = closed.then_some((first, 0.0));
    for (to, next_bulge) in rest.iter().copied().chain(closing) {
        if !Placing::joins(placing.place(from), placing.place(to), SAME_PLACE_M) {
            placing.segments(&Segment::from_bulge(from, to, bulge), TOLERANCE_M, out);
            from = to;
        }
        bulge = next_bulge;
    }
}

/// The outline of a SOLID or TRACE, whose third and fourth corners stand crosswise in the file; of three corners, the
/// fourth stands on the third.
fn filled(entity: &EntityType, placing: &Placing, out: &mut Vec<Segment>) {
    let (corners, extrusion) = match entity {
        EntityType::Solid(solid) => (
            [
                &solid.first_corner,
                &solid.second_corner,
                &solid.fourth_corner,
                &solid.third_corner,
            ],
            &solid.extrusion_direction,
        ),
        EntityType::Trace(trace) => (
            [
                &trace.first_corner,
                &trace.second_corner,
                &trace.fourth_corner,
                &trace.third_corner,
            ],
            &trace.extrusion_direction,
        ),
        _ => return,
    };
    let plane = Placing::extruded(normal(extrusion), corners[0].z);
    let vertices = corners.map(|corner| (flat(corner), 0.0));
    polyline(&vertices, true, &placing.after(&plane), out);
}

fn curve_of(spline: &DxfSpline) -> Option<Spline> {
    let points: Vec<_> = spline.control_points.iter().map(flat).collect();
    let degree = usize::try_from(spline.degree_of_curve).ok()?;
    Spline::new(degree, &spline.knot_values, &points, &spline.weight_values).or_else(|| {
        let fits: Vec<_> = spline.fit_points.iter().map(flat).collect();
        if spline.flags & 1 != 0 {
            return Spline::around(&fits);
        }
        let direction = |tangent: &dxf::Point| {
            let direction = flat(tangent);
            (direction.x != 0.0 || direction.y != 0.0).then_some(direction)
        };
        Spline::through(
            &fits,
            direction(&spline.start_tangent),
            direction(&spline.end_tangent),
        )
    })
}

fn flat(point: &dxf::Point) -> Coord<f64> {
    Coord {
        x: point.x,
        y: point.y,
    }
}
