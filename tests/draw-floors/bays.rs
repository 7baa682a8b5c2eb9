//! Heights bay by bay: high over supports, low between, the anchors at mid-depth.

use crate::path::Path;
use crate::slab::Slab;
use crate::tendon::{DrawnAs, End, Kind, Lettering, Point, Run, Shown, Tendon};

/// How deep a run hangs.
#[derive(Clone, Copy)]
pub(crate) struct Drape {
    /// From the top of the slab down to the strands over a support.
    pub(crate) below_top_mm: f64,
    /// From the soffit up to the strands at a low point.
    pub(crate) low_mm: f64,
}

/// Share of an end span, from the anchor, at which its low point lies.
const END_SPAN_LOW: f64 = 0.43;
/// Shorter stretches than this carry no low point.
const LEAST_SPAN_MM: f64 = 3000.0;

/// Anchors, highs over the supports that the path crosses, lows between. The path goes forward along its run's axis.
pub(crate) fn profile(
    slab: &Slab,
    run: Run,
    path: &Path,
    supports: &[f64],
    drape: Drape,
) -> Vec<Point> {
    let axis = run.axis();
    let length_mm = path.length_mm();
    let [start, end] = [0.0, length_mm].map(|station| axis.along(path.at(station).0));
    let crossed = supports
        .iter()
        .copied()
        .filter(|at| start + 300.0 < *at && *at < end - 300.0)
        .collect::<Vec<_>>();
    let mut places = vec![(Kind::Anchor, 0.0)];
    let low = |places: &mut Vec<(Kind, f64)>, [from, to]: [f64; 2], share: f64| {
        if to - from > LEAST_SPAN_MM {
            places.push((Kind::Low, path.station_at(axis, from + share * (to - from))));
        }
    };
    for (index, support) in crossed.iter().enumerate() {
        match index.checked_sub(1) {
            None => low(&mut places, [start, *support], END_SPAN_LOW),
            Some(before) => low(&mut places, [crossed[before], *support], 0.5),
        }
        places.push((Kind::High, path.station_at(axis, *support)));
    }
    let last = crossed.last().copied().unwrap_or(start);
    low(
        &mut places,
        [last, end],
        if crossed.is_empty() {
            0.5
        } else {
            1.0 - END_SPAN_LOW
        },
    );
    places.push((Kind::Anchor, length_mm));
    let point = |(kind, station_mm): (Kind, f64)| {
        let thickness_mm = slab.thickness_at(path.at(station_mm).0);
        let (height_mm, shown) = match kind {
            Kind::High => (thickness_mm - drape.below_top_mm, Shown::Label),
            Kind::Low => (drape.low_mm, Shown::Label),
            Kind::Anchor | Kind::Support => (thickness_mm / 2.0, Shown::Nothing),
        };
        Point {
            kind,
            station_mm,
            height_mm,
            shown,
        }
    };
    places.into_iter().map(point).collect()
}

/// A sound tendon of five 12.7 mm strands on such a path, labelled all along; the level lines speak where they cross it.
pub(crate) fn tendon(slab: &Slab, run: Run, path: Path, ends: [End; 2], drape: Drape) -> Tendon {
    let supports = &slab.grid[usize::from(run == Run::Distributed)];
    let points = profile(slab, run, &path, supports, drape);
    let mut tendon = Tendon {
        mark: String::new(),
        run,
        tendons: 1,
        strands: 5,
        strand: "12.7",
        ends,
        path,
        points,
        drawn_as: DrawnAs::Polyline,
        lettering: Lettering {
            height_mm: if run == Run::Banded { 90.0 } else { 150.0 },
            far_side: true,
            along: true,
            word: false,
            mark_station_mm: 2400.0,
        },
        layer_suffix: "",
        mark_text: None,
    };
    slab.settle(&mut tendon);
    tendon
}

/// Heights of supports between each high and low next to it, to the nearest millimetre, at about `spacing_mm`:
/// two parabolas that meet on the chord, the upper one a tenth of the span long (see the crate's own account of the profile).
pub(crate) fn with_supports(mut tendon: Tendon, spacing_mm: f64) -> Tendon {
    let turning = |point: &&Point| point.kind != Kind::Low;
    let mut points: Vec<Point> = Vec::new();
    for (index, point) in tendon.points.iter().enumerate() {
        if let Some(before) = points.last().cloned() {
            let (high, low) = if before.kind == Kind::High {
                (&before, point)
            } else {
                (point, &before)
            };
            let span_from = tendon.points[..index]
                .iter()
                .rev()
                .find(turning)
                .map_or(0.0, |end| end.station_mm);
            let span_to = tendon.points[index..]
                .iter()
                .find(turning)
                .map_or(0.0, |end| end.station_mm);
            let length = point.station_mm - before.station_mm;
            if high.kind == Kind::High && low.kind == Kind::Low && length > 2.0 * spacing_mm {
                let hogging = (0.1 * (span_to - span_from)).min(length);
                let mut station_mm = before.station_mm + spacing_mm;
                while station_mm < point.station_mm - 0.6 * spacing_mm {
                    let from_high = (station_mm - high.station_mm).abs();
                    let drop = high.height_mm - low.height_mm;
                    let height_mm = if from_high <= hogging {
                        high.height_mm - drop * from_high * from_high / (length * hogging)
                    } else {
                        let rest = length - from_high;
                        low.height_mm + drop * rest * rest / (length * (length - hogging))
                    };
                    points.push(Point {
                        kind: Kind::Support,
                        station_mm,
                        height_mm: height_mm.round(),
                        shown: Shown::Bare,
                    });
                    station_mm += spacing_mm;
                }
            }
        }
        points.push(point.clone());
    }
    tendon.points = points;
    tendon
}

/// Gives marks `B01`, `B02`... or `D001`... in the order given.
pub(crate) fn number(tendons: &mut [Tendon]) {
    let mut counts = [0_u32; 2];
    for tendon in tendons {
        let count = &mut counts[usize::from(tendon.run == Run::Distributed)];
        *count += 1;
        tendon.mark = match tendon.run {
            Run::Banded => format!("B{count:02}"),
            Run::Distributed => format!("D{count:03}"),
        };
    }
}
