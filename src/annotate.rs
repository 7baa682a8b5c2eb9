//! Decides what to draw back onto the plan; knows nothing of DXF.

mod extension;
mod figures;
mod findings;
mod forces;
mod lanes;
mod layers;
mod legend;
mod marks;
mod place;
mod profile3d;
mod ramp;
mod table;
#[cfg(test)]
mod trials;
mod words;

use geo::Coord;

use crate::analysis::Analysis;
use crate::drawing::Sheet;
use crate::job::Job;

use place::{Extent, Room};

/// What already stands on the plan.
#[derive(Debug, Clone, Default)]
pub struct Surroundings {
    /// Corners of the drawing's own texts, metres. Texts of earlier marks must not be among them, or marking a marked
    /// drawing would push its figures about.
    pub texts: Vec<[Coord<f64>; 4]>,
    /// Lower left and upper right of the whole drawing, if it tells, metres.
    pub extent: Option<[Coord<f64>; 2]>,
}

/// Draws a floor's results: forces, extensions, curves in space, marks that the drawing lacks, findings, legend and
/// table, in metres.
///
/// What is written keeps clear of the drawing's own texts as far as it can, and their usual height is the height of the
/// figures; legend and table keep clear of the whole drawing. The sheet follows the floor's order, so it is the same
/// for the same floor.
pub fn draw(analysis: &Analysis, around: &Surroundings, job: &Job) -> Sheet {
    let occupied = around.texts.as_slice();
    let text_m = lanes::text_height_m(occupied);
    let mut room = Room::new(&analysis.floor, occupied);
    let lanes = lanes::lanes(&analysis.floor, &room, text_m);

    // Later marks cover earlier ones: the colours lie over the curves' hairlines.
    let mut marks = profile3d::curves(analysis);
    marks.extend(forces::without(analysis, &lanes));
    marks.extend(forces::lengths(analysis, &lanes));
    // What must be said takes its place before what may be left out.
    let extensions = extension::texts(analysis, &lanes, job.units, &mut room);
    let given = marks::given(analysis, &lanes, &mut room);
    let rings = findings::rings(analysis, text_m, &mut room);
    marks.extend(figures::figures(analysis, &lanes, job.units, &mut room));
    marks.extend(extensions);
    marks.extend(given);
    marks.extend(rings);

    let floor = Extent::of_floor(&analysis.floor, occupied, &marks).with(around.extent);
    let letter_m = words::table_letter_m(&floor);
    let legend = legend::legend(analysis, job, letter_m);
    let table = table::table(analysis, job, letter_m);
    let apart_m = 6.0 * letter_m;
    let size_m = (
        legend.width_m + apart_m + table.width_m,
        legend.height_m.max(table.height_m),
    );
    let corner = floor.beside(occupied, size_m, apart_m);
    let beyond = Coord {
        x: corner.x + legend.width_m + apart_m,
        y: corner.y,
    };
    marks.extend(legend.moved_to(corner));
    marks.extend(table.moved_to(beyond));

    Sheet {
        layers: layers::layers(),
        marks,
    }
}
