//! Each fault on its tendon.

use super::{Fault, HIGH_MM, WIDE_MM};
use crate::bays::{self, Drape};
use crate::dxf::Shape;
use crate::path::{Axis, Path, Sweep};
use crate::plan;
use crate::slab::Slab;
use crate::tendon::{DrawnAs, End, Run, Shown, Tendon};

/// Ends the names of layers that are frozen.
pub(super) const SUPERSEDED: &str = "-SUPERSEDED";
const DISTRIBUTED: Drape = Drape {
    below_top_mm: 45.0,
    low_mm: 45.0,
};
const BANDED: Drape = Drape {
    below_top_mm: 90.0,
    low_mm: 45.0,
};

/// Tendons, the faults planted in them, and shapes beside them.
pub(super) struct Planted<'a> {
    slab: &'a Slab,
    pub(super) tendons: Vec<Tendon>,
    pub(super) faults: Vec<Fault>,
    /// Shapes that belong to no tendon's own drawing.
    pub(super) loose: Vec<(&'static str, Shape)>,
}

impl<'a> Planted<'a> {
    /// Every fault, each on a tendon of its own where that can be, and sound tendons between.
    pub(super) fn on(slab: &'a Slab) -> Self {
        let mut planted = Self {
            slab,
            tendons: Vec::new(),
            faults: Vec::new(),
            loose: Vec::new(),
        };
        planted.labels();
        planted.ends();
        planted.heights();
        planted.plan();
        planted.forces();
        planted.sound();
        planted
    }

    /// A sound tendon from edge to edge along y, stressed at both ends.
    fn single(&self, mark: &str, x_mm: f64) -> Tendon {
        self.along(
            mark,
            Run::Distributed,
            Path::straight([x_mm, 0.0], [x_mm, HIGH_MM]),
            DISTRIBUTED,
        )
    }

    fn band(&self, mark: &str, y_mm: f64, reach: [f64; 2], drape: Drape) -> Tendon {
        self.along(
            mark,
            Run::Banded,
            Path::straight([reach[0], y_mm], [reach[1], y_mm]),
            drape,
        )
    }

    fn along(&self, mark: &str, run: Run, path: Path, drape: Drape) -> Tendon {
        let mut tendon = bays::tendon(self.slab, run, path, [End::Live, End::Live], drape);
        mark.clone_into(&mut tendon.mark);
        tendon.lettering.along = false;
        tendon.lettering.mark_station_mm = if run == Run::Banded { 6600.0 } else { 2500.0 };
        tendon
    }

    fn add(&mut self, tendon: Tendon) {
        self.tendons.push(tendon);
    }

    /// Adds a tendon with a fault at a station.
    fn plant(&mut self, rule: &'static str, tendon: Tendon, station_mm: f64, what: &'static str) {
        let at = tendon.path.at(station_mm).0;
        self.faults.push(Fault {
            rule,
            mark: tendon.mark.clone(),
            at,
            what,
        });
        self.tendons.push(tendon);
    }

    fn labels(&mut self) {
        let mut bare = self.single("D01", 600.0);
        for point in &mut bare.points {
            point.shown = Shown::Nothing;
        }
        self.plant(
            "height-missing",
            bare,
            13_000.0,
            "26 m long and without a single height",
        );

        self.ambiguous_pair();

        self.loose.push((
            "TENDON-HEIGHT",
            plan::text([6600.0, 19_500.0], 150.0, "H190"),
        ));
        let what = "a height more than a metre from every tendon";
        self.faults.push(Fault {
            rule: "label-unclaimed",
            mark: String::new(),
            at: [6600.0, 19_500.0],
            what,
        });

        let mut uncounted = self.single("D05", 8200.0);
        uncounted.mark_text = Some("D05".to_owned());
        self.plant(
            "strand-count-missing",
            uncounted,
            2500.0,
            "the mark tells no strands",
        );
    }

    /// Two tendons 500 mm apart, and between them, as near to one as to the other, the lows of both in one bay.
    fn ambiguous_pair(&mut self) {
        for (mark, x_mm, height_mm) in [("D02", 3000.0, 45.0), ("D03", 3500.0, 60.0)] {
            let mut one = self.single(mark, x_mm);
            one.lettering.far_side = x_mm > 3200.0;
            let point = &mut one.points[2];
            point.height_mm = height_mm;
            point.shown = Shown::Nothing;
            self.add(one);
        }
        let y_mm = f64::midpoint(self.slab.grid[1][0], self.slab.grid[1][1]);
        for (words, up) in [("L45", 110.0), ("L60", -110.0)] {
            let at = [3250.0, y_mm + up];
            self.loose
                .push(("TENDON-HEIGHT", plan::centred(at, 100.0, words)));
        }
        let what = "L45 and L60 stand midway between two tendons that both lack a height here";
        for mark in ["D02", "D03"] {
            self.faults.push(Fault {
                rule: "label-ambiguous",
                mark: mark.to_owned(),
                at: [3250.0, y_mm],
                what,
            });
        }
    }

    fn ends(&mut self) {
        let path = Path::straight([10_400.0, 0.0], [10_400.0, self.slab.grid[1][2] + 2000.0]);
        let mut open = self.along(
            "D06",
            Run::Distributed,
            path,
            Drape {
                low_mm: 60.0,
                ..DISTRIBUTED
            },
        );
        open.ends[1] = End::Unknown;
        let length_mm = open.path.length_mm();
        self.plant("end-unknown", open, length_mm, "no symbol at this end");

        let mut unstressed = self.single("D07", 11_600.0);
        unstressed.ends = [End::Dead, End::Dead];
        self.plant("no-live-end", unstressed, 0.0, "a dead end at both ends");
    }

    fn heights(&mut self) {
        let mut flat = self.single("D09", 15_000.0);
        let station_mm = f64::midpoint(self.slab.grid[1][0], self.slab.grid[1][1]);
        flat.points
            .retain(|point| (point.station_mm - station_mm).abs() > 1.0);
        self.plant(
            "highs-in-a-row",
            flat,
            station_mm,
            "the low between the first two highs is not given",
        );

        // Along a band, where a tendon that stays low still passes under the others.
        let mut sunk = self.band("B07", self.slab.grid[1][2] + 450.0, [0.0, WIDE_MM], BANDED);
        let station_mm = self.slab.grid[0][2];
        sunk.points
            .retain(|point| (point.station_mm - station_mm).abs() > 1.0);
        self.plant(
            "lows-in-a-row",
            sunk,
            station_mm,
            "the high over the third line of columns is not given",
        );

        let mut bursting = self.single("D11", 17_900.0);
        bursting.points[3].height_mm = 235.0;
        let station_mm = bursting.points[3].station_mm;
        self.plant(
            "height-outside-cover",
            bursting,
            station_mm,
            "H235 in a slab of 250 mm",
        );

        let mut kinked = self.single("D12", 19_100.0);
        let station_mm = self.slab.grid[1][1];
        // The low of the middle bay drawn beside the column instead of at midspan.
        kinked.points[4].station_mm = station_mm + 900.0;
        self.plant(
            "hogging-radius",
            kinked,
            station_mm,
            "from H205 to L45 in 0.9 m: radius about 2.2 m",
        );
    }

    fn plan(&mut self) {
        let sweep = |from_mm: f64, shift_mm: f64| Sweep {
            from_mm,
            shift_mm,
            radius_mm: 4000.0,
            slope: 1.0 / 15.0,
        };
        let sweeps = [sweep(10_500.0, 200.0), sweep(14_000.0, -200.0)];
        let path = Path::swept(Axis::Y, [0.0, HIGH_MM], 20_300.0, &sweeps);
        let tight = self.along("D13", Run::Distributed, path, DISTRIBUTED);
        self.plant(
            "plan-radius",
            tight,
            10_630.0,
            "swept aside with arcs of 4 m",
        );

        let through = self.single("D08", 12_800.0);
        self.plant(
            "crosses-opening",
            through,
            13_000.0,
            "runs straight through the opening",
        );

        let astray = self.single("D20", 39_000.0);
        self.plant(
            "leaves-slab",
            astray,
            17_800.0,
            "crosses the recess in the slab's edge",
        );

        let twice = self.single("D14", 21_500.0);
        self.loose.push((
            "TENDON-DISTRIBUTED",
            Shape::Polyline {
                corners: twice.path.reversed().corners,
                closed: false,
            },
        ));
        self.plant(
            "duplicate-line",
            twice,
            13_000.0,
            "drawn twice, the second time from its other end",
        );

        let mut old = self.single("D15", 22_700.0);
        old.layer_suffix = SUPERSEDED;
        self.plant(
            "layer-hidden",
            old,
            13_000.0,
            "on a tendon layer that is frozen",
        );
    }

    fn forces(&mut self) {
        let [x, y] = self.slab.grid.clone();
        let what = "one jack for 42 m";
        let mut long = self.band(
            "B01",
            y[1] - 150.0,
            [0.0, WIDE_MM],
            Drape {
                below_top_mm: 90.0,
                low_mm: 105.0,
            },
        );
        long.ends[1] = End::Dead;
        self.plant("one-end-length", long, WIDE_MM, what);

        let mut steep = self.band(
            "B02",
            y[1] + 150.0,
            [0.0, x[4] + 1400.0],
            Drape {
                below_top_mm: 90.0,
                low_mm: 40.0,
            },
        );
        steep.ends[1] = End::Dead;
        let length_mm = steep.path.length_mm();
        let (mark, at) = (steep.mark.clone(), steep.path.at(length_mm).0);
        self.plant(
            "far-end-force",
            steep,
            length_mm,
            "less than 0.80 of the jacking force reaches the dead end",
        );
        let what = "the same four bays on one jack: more than 0.15 of the force lost to angle";
        self.faults.push(Fault {
            rule: "curvature-loss",
            mark,
            at,
            what,
        });

        let path = Path::straight([23_900.0, 0.0], [23_900.0, y[2] + 2000.0]);
        let mut wavy = self.along(
            "D16",
            Run::Distributed,
            path,
            Drape {
                below_top_mm: 40.0,
                low_mm: 35.0,
            },
        );
        wavy.ends[1] = End::Dead;
        let length_mm = wavy.path.length_mm();
        self.plant(
            "curvature-loss",
            wavy,
            length_mm,
            "deep in two bays on one jack: more than 0.15 of the force lost to angle",
        );

        let path = Path::straight([30_000.0, 18_900.0], [30_000.0, HIGH_MM]);
        let mut short = self.along("D17", Run::Distributed, path, DISTRIBUTED);
        short.ends[0] = End::Dead;
        short.lettering.mark_station_mm = 1000.0;
        self.plant(
            "draw-in-reaches-dead-end",
            short,
            0.0,
            "7 m long: the draw-in is felt at the dead end",
        );
    }

    /// Tendons with nothing wrong.
    fn sound(&mut self) {
        let [_, y] = self.slab.grid.clone();
        for (mark, x_mm) in [
            ("D04", 4700.0),
            ("D10", 16_200.0),
            ("D18", 31_500.0),
            ("D19", 33_000.0),
        ] {
            let mut single = self.single(mark, x_mm);
            single.lettering.along = mark == "D18";
            self.add(if mark == "D19" {
                single.reversed()
            } else {
                single
            });
        }
        let mut last = self.single("D21", 36_200.0);
        last.drawn_as = DrawnAs::Pieces;
        self.add(last);
        for (mark, y_mm) in [
            ("B03", y[0] - 150.0),
            ("B04", y[0] + 150.0),
            ("B05", y[2] - 150.0),
            ("B06", y[2] + 150.0),
        ] {
            let band = self.band(mark, y_mm, [0.0, WIDE_MM], BANDED);
            self.add(band);
        }
    }
}
