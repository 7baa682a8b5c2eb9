//! The legend: what the colours and figures mean, what was assumed, and what this is not.

mod inputs;

use geo::Coord;

use self::inputs::inputs;
use super::place::Block;
use super::{extension, layers, ramp, words};
use crate::analysis::Analysis;
use crate::cautions::CAUTIONS;
use crate::drawing::{Align, Drawn};
use crate::finding::Level;
use crate::job::Job;
use crate::losses::Forces;
use crate::units::{FORCE, SHORT};

/// Heading of legend and table; no file name and no date, so that the same floor gives the same drawing.
pub(super) const HEADING: &str = "tautplan: forces in tendons as drawn";
/// Letters in a line.
const LINE: usize = 56;
/// From line to line, in letter heights.
const PITCH: f64 = 1.7;

/// The legend as a block, with letters of the given height.
pub(super) fn legend(analysis: &Analysis, job: &Job, letter_m: f64) -> Block {
    let mut column = Column::new(letter_m);
    column.heading(HEADING);
    column.sentence(&format!(
        "Colours: service force ({}) left along each tendon, % of its jacking force",
        match job.long_term.published.asked_days {
            None => "after all losses".to_owned(),
            Some(_) => format!("after losses, {}", job.long_term.asked_words()),
        }
    ));
    for class in 0..ramp::RAMP.len() {
        column.patch(class);
    }
    if let Some(line) = without_forces(analysis) {
        column.dashes();
        column.sentence(&line);
    }
    column.gap();
    column.sentence(&format!("Figures along tendons: {} per tendon (all strands of one tendon), also where one line stands for several tendons; above or left of their tendon where there is room, in the order of its points; a thin line leads one that stands off its point. What found no room is in the result", job.units.of(FORCE).name));
    column.sentence("Table: first extension at the left end of a tendon, second at the right end; where it runs rather up than across, at the lower and the upper end");
    if analysis
        .floor
        .tendons
        .iter()
        .any(|tendon| !tendon.mark_drawn)
    {
        column.sentence("Marks in this colour beside tendons: given by tautplan, since the drawing has none there");
    }
    let short = job.units.of(SHORT);
    let sample = extension::said(&short.figure(180.0, 0), &short.figure(174.0, 0), short.name);
    column.sentence(&format!("{sample}: extension at a live end before (after) wedge draw-in; strand between anchor and jack is not in it"));
    let some = |of: fn(&Forces) -> bool| {
        let mut forces = analysis
            .results
            .iter()
            .filter_map(|result| result.forces.as_ref());
        forces.any(of)
    };
    if some(|forces| !forces.pulls.is_empty()) {
        column.sentence(&format!("{}: a tendon with intermediate anchors is stressed segment by segment, in this order, and each pull has its extension at its jack; of the two forces at an intermediate anchor the lesser is given", extension::in_pull(2, "ext ...")));
    }
    if some(Forces::both_live) {
        column.sentence("Live at both ends: both jacks pull together, and the two extensions add up to the tendon's; with one jack moved from end to end the first pull is longer and the second shorter");
    }
    column.sentence("Jacking, lock-off and transfer: layers TAUT-FORCE-JACKING, -LOCKOFF, -TRANSFER and their -TEXT, switched off; switch on one stage at a time, the colours mean the same");
    column.gap();
    for (level, what) in [
        (
            Level::Error,
            "error: cannot be built or worked out as drawn",
        ),
        (Level::Warning, "warning: outside usual practice"),
        (Level::Note, "note: worth knowing"),
    ] {
        column.ring(level, what);
    }
    let placeless = analysis.findings.iter().filter(|f| f.place.is_none());
    let placeless = placeless.count();
    if placeless > 0 {
        column.sentence(&format!(
            "{placeless} of the findings have no place on the plan: see the list of findings"
        ));
    }
    column.gap();
    for line in inputs(analysis, job) {
        column.sentence(&line);
    }
    match analysis.assumptions.len() + analysis.fallbacks.len() {
        0 => {}
        1 => column.sentence("One value was assumed, not given: the result file says which"),
        more => column.sentence(&format!(
            "{more} values were assumed, not given: the result file lists each"
        )),
    }
    column.gap();
    for caution in CAUTIONS {
        column.sentence(caution);
    }
    column.done()
}

fn without_forces(analysis: &Analysis) -> Option<String> {
    let all = analysis.results.len();
    let none = analysis.results.iter().filter(|r| {
        let forces = r.forces.as_ref();
        forces.is_none_or(|forces| forces.later.is_none())
    });
    let none = none.count();
    (none > 0).then(|| {
        format!("{none} of {all} tendons: their forces in service could not be worked out, see the findings")
    })
}

/// A column of lines that grows downwards.
struct Column {
    block: Block,
    letter_m: f64,
}

impl Column {
    fn new(letter_m: f64) -> Self {
        Self {
            block: Block::default(),
            letter_m,
        }
    }

    fn heading(&mut self, content: &str) {
        self.line(content, 0.0, 1.5 * self.letter_m);
        self.gap();
    }

    fn sentence(&mut self, sentence: &str) {
        for (number, line) in words::wrap(&words::plain(sentence), LINE)
            .iter()
            .enumerate()
        {
            let indent_m = if number == 0 {
                0.0
            } else {
                1.5 * self.letter_m
            };
            self.line(line, indent_m, self.letter_m);
        }
    }

    fn patch(&mut self, class: usize) {
        let (width_m, half_m) = (5.0 * self.letter_m, 0.6 * self.letter_m);
        let y = self.middle(self.letter_m);
        let corners = [
            (0.0, -half_m),
            (width_m, -half_m),
            (width_m, half_m),
            (0.0, half_m),
        ];
        let solid = Drawn::Solid {
            corners: corners.map(|(x, up)| Coord { x, y: y + up }),
        };
        let ink = ramp::class_ink(class);
        self.block
            .marks
            .push(layers::inked(layers::TABLE, ink, solid));
        let content = format!("{} %", ramp::class_name(class));
        self.line(&content, 6.5 * self.letter_m, self.letter_m);
    }

    /// The sign of a tendon without forces.
    fn dashes(&mut self) {
        let y = self.middle(self.letter_m);
        for from in [0.0, 2.9] {
            let drawn = Drawn::Line {
                points: [from, from + 2.1]
                    .map(|x| Coord {
                        x: x * self.letter_m,
                        y,
                    })
                    .to_vec(),
                width_m: 0.3 * self.letter_m,
                closed: false,
            };
            self.block
                .marks
                .push(layers::inked(layers::TABLE, layers::GREY, drawn));
        }
        self.line("no forces", 6.5 * self.letter_m, self.letter_m);
    }

    fn ring(&mut self, level: Level, what: &str) {
        let radius_m = 0.6 * self.letter_m;
        let centre = Coord {
            x: radius_m,
            y: self.middle(self.letter_m),
        };
        let ink = layers::level_ink(level);
        let circle = Drawn::Circle { centre, radius_m };
        self.block
            .marks
            .push(layers::inked(layers::TABLE, ink, circle));
        self.line(what, 2.2 * self.letter_m, self.letter_m);
    }

    fn gap(&mut self) {
        self.block.height_m += 0.8 * self.letter_m;
    }

    /// Level of the middle of the next line of that height.
    fn middle(&self, height_m: f64) -> f64 {
        -self.block.height_m - PITCH * height_m / 2.0
    }

    fn line(&mut self, content: &str, indent_m: f64, height_m: f64) {
        let drawn = Drawn::Text {
            place: Coord {
                x: indent_m,
                y: self.middle(height_m),
            },
            height_m,
            rotation_rad: 0.0,
            align: Align::MiddleLeft,
            content: content.to_owned(),
        };
        self.block.marks.push(layers::mark(layers::TABLE, drawn));
        let right_m = indent_m + words::width_m(content, height_m);
        self.block.width_m = self.block.width_m.max(right_m);
        self.block.height_m += PITCH * height_m;
    }

    fn done(self) -> Block {
        self.block
    }
}
