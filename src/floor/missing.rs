//! Heights that the drawing ought to give: told by the neighbours in a run, by columns, by labels that nobody claims.

use geo::Coord;

use super::columns::Columns;
use super::index::Index;
use super::lacks::{Lack, Stray, lacks};
use super::rules::HEIGHT_MISSING;
use super::slab::Thickness;
use super::types::{Point, PointKind, Tendon};
use crate::finding::{Finding, Level};

/// Adds points without a height where one belongs, tendon by tendon, and says why.
pub(super) fn complete(
    tendons: &mut [Tendon],
    index: &Index,
    columns: &Columns<'_>,
    strays: &[Stray],
    thickness: &Thickness<'_>,
) -> Vec<Finding> {
    let mut findings = Vec::new();
    let lacks: Vec<Vec<Lack>> = (0..tendons.len())
        .map(|line| lacks(line, tendons, index, columns, strays))
        .collect();
    for (tendon, lacks) in tendons.iter_mut().zip(lacks) {
        let silent = tendon.points.iter().all(|point| point.height_m.is_none());
        if silent {
            findings.push(no_height(tendon));
        }
        for lack in lacks {
            let place = tendon.path.place_at(lack.station_m);
            if !silent {
                findings.push(missing(tendon, &lack, place));
            }
            let at = tendon
                .points
                .partition_point(|point| point.station_m <= lack.station_m)
                .min(tendon.points.len().saturating_sub(1));
            let faces = thickness.faces_at(place);
            let point = Point {
                kind: lack.kind,
                station_m: lack.station_m,
                place,
                drawn_m: None,
                height_m: None,
                other_soffit_m: None,
                thickness_m: faces.thickness_m,
                top_m: faces.top_m,
            };
            tendon.points.insert(at, point);
        }
    }
    findings
}

fn no_height(tendon: &Tendon) -> Finding {
    let middle_m = tendon.path.length_m() / 2.0;
    Finding::new(
        &HEIGHT_MISSING,
        Level::Error,
        "no label and no level line gives this tendon any height; expected highs and lows such as H165 and L30",
        "write the heights beside the tendon, or check that their layer and reach are those of the job file",
    )
    .on_tendon(&tendon.mark)
    .at_station(middle_m)
    .at_place(tendon.path.place_at(middle_m))
}

fn missing(tendon: &Tendon, lack: &Lack, place: Coord<f64>) -> Finding {
    let what = match lack.kind {
        PointKind::High => "high point",
        PointKind::Low => "low point",
        PointKind::Anchor | PointKind::Support => "height",
    };
    Finding::new(
        &HEIGHT_MISSING,
        Level::Error,
        format!("no {what} is given here; expected one: {}", lack.because),
        format!("write the height of the {what} beside the tendon"),
    )
    .on_tendon(&tendon.mark)
    .at_station(lack.station_m)
    .at_place(place)
}
