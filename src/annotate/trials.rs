//! The whole sheet, tried on floors made by hand.

mod floor;
mod legible;

use std::collections::BTreeMap;

use geo::Coord;

use super::place::corners;
use super::place::{Quad, Spot};
use super::{draw, layers, ramp};
use crate::analysis::Analysis;
use crate::drawing::{Drawn, Mark, Sheet};
use crate::finding::{Finding, Level, Rule};
use crate::job::Job;
use floor::{analysis, band, labels, line, two_way, without_forces};

fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

fn on<'a>(sheet: &'a Sheet, layer: &'a str) -> impl Iterator<Item = &'a Mark> {
    sheet.marks.iter().filter(move |mark| mark.layer == layer)
}

/// The box of a text, by the same width of letters that the sheet was laid out with.
fn text_box(mark: &Mark) -> Option<Quad> {
    match mark.drawn {
        Drawn::Text { .. } => corners(&mark.drawn).try_into().ok(),
        _ => None,
    }
}

fn boxes(sheet: &Sheet, wanted: &[&str]) -> Vec<Quad> {
    wanted
        .iter()
        .flat_map(|layer| on(sheet, layer).filter_map(text_box))
        .collect()
}

/// Separating axes by sampling: written apart from the sheet's own test, so that one does not vouch for itself.
fn overlap(a: &Quad, b: &Quad) -> bool {
    let ((low_a, high_a), (low_b, high_b)) = (bounds(&[*a]), bounds(&[*b]));
    if low_a.x > high_b.x || low_b.x > high_a.x || low_a.y > high_b.y || low_b.y > high_a.y {
        return false;
    }
    let inside = |p: Coord<f64>, quad: &Quad| {
        let mut signs = (0..4).map(|i| {
            let (from, to) = (quad[i], quad[(i + 1) % 4]);
            (to.x - from.x) * (p.y - from.y) - (to.y - from.y) * (p.x - from.x)
        });
        signs.clone().all(|s| s > 1e-6) || signs.all(|s| s < -1e-6)
    };
    let grid = |quad: &Quad| {
        let quad = *quad;
        (0..=40_u32).flat_map(move |i| {
            (0..=8_u32).map(move |j| {
                let (s, t) = (f64::from(i) / 40.0, f64::from(j) / 8.0);
                quad[0] + (quad[1] - quad[0]) * s + (quad[3] - quad[0]) * t
            })
        })
    };
    grid(a).any(|p| inside(p, b)) || grid(b).any(|p| inside(p, a))
}

fn overlaps(boxes: &[Quad]) -> usize {
    let mut found = 0;
    for (i, a) in boxes.iter().enumerate() {
        found += boxes[i + 1..].iter().filter(|b| overlap(a, b)).count();
    }
    found
}

fn bounds(quads: &[Quad]) -> (Coord<f64>, Coord<f64>) {
    let all = || quads.iter().flatten();
    (
        at(
            all().map(|c| c.x).fold(f64::INFINITY, f64::min),
            all().map(|c| c.y).fold(f64::INFINITY, f64::min),
        ),
        at(
            all().map(|c| c.x).fold(f64::NEG_INFINITY, f64::max),
            all().map(|c| c.y).fold(f64::NEG_INFINITY, f64::max),
        ),
    )
}

const SERVICE: &str = layers::FORCE_TEXT[3];

/// Texts of the drawing and nothing else around the floor.
fn beside(texts: &[[Coord<f64>; 4]]) -> super::Surroundings {
    super::Surroundings {
        texts: texts.to_vec(),
        extent: None,
    }
}

#[test]
fn figures_in_a_band_of_0_3_m_and_its_own_labels_do_not_overlap() {
    let analysis = analysis(band(8, 0.3));
    let own = labels(&analysis);
    let sheet = draw(&analysis, &beside(&own), &Job::default());
    let figures = boxes(&sheet, &[SERVICE, layers::EXTENSION]);
    let wanted: usize = analysis.floor.tendons.iter().map(|t| t.points.len()).sum();
    // Two extensions a tendon; at least seven figures in ten find room.
    assert!(
        figures.len() >= 16 + wanted * 7 / 10,
        "{} of {wanted}",
        figures.len()
    );
    assert_eq!(overlaps(&figures), 0);
    let with_own: Vec<Quad> = figures.iter().chain(&own).copied().collect();
    assert_eq!(
        overlaps(&with_own),
        overlaps(&own),
        "a label is written over"
    );
}

#[test]
fn figures_on_a_two_way_crossing_overlap_nothing_and_mostly_lie_clear_of_every_line() {
    let analysis = analysis(two_way());
    let own = labels(&analysis);
    let sheet = draw(&analysis, &beside(&own), &Job::default());
    let figures = boxes(&sheet, &[SERVICE]);
    let wanted: usize = analysis.floor.tendons.iter().map(|t| t.points.len()).sum();
    assert!(
        figures.len() >= wanted * 8 / 10,
        "{} of {wanted}",
        figures.len()
    );
    let all: Vec<Quad> = boxes(&sheet, &[SERVICE, layers::EXTENSION, layers::FINDING])
        .into_iter()
        .chain(own.iter().copied())
        .collect();
    assert_eq!(overlaps(&all), overlaps(&own));
    let crossed = figures.iter().filter(|quad| {
        analysis.floor.tendons.iter().any(|tendon| {
            tendon
                .path
                .to_line_string(0.02)
                .lines()
                .any(|l| overlap(quad, &[l.start, l.end, l.end, l.start]))
        })
    });
    assert!(crossed.count() * 10 <= figures.len());
}

#[test]
fn where_tendons_lie_too_close_only_the_governing_figures_are_written() {
    let analysis = analysis(band(6, 0.15));
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    let figures = boxes(&sheet, &[SERVICE]);
    // Both anchors, and the least force where neither anchor has it.
    assert!(
        (6..=18).contains(&figures.len()),
        "{} figures",
        figures.len()
    );
    assert_eq!(overlaps(&figures), 0);
}

#[test]
fn in_a_band_a_figure_stands_nearer_to_its_own_tendon_than_the_next_but_one() {
    let mut tendons = band(5, 0.3);
    for (number, (_, result)) in (0_u32..).zip(&mut tendons) {
        let forces_kn = [Some(500.0 + f64::from(number)); 4];
        for point in &mut result.points {
            point.forces_kn = forces_kn;
        }
        for sample in &mut result.samples {
            sample.forces_kn = forces_kn;
        }
    }
    let analysis = analysis(tendons);
    let sheet = draw(&analysis, &beside(&labels(&analysis)), &Job::default());
    for mark in on(&sheet, SERVICE) {
        // Lines lead figures to their points.
        let Drawn::Text { place, content, .. } = &mark.drawn else {
            continue;
        };
        let number = content.strip_prefix("50").expect("500 to 504");
        let own_m = 0.3 * number.parse::<f64>().expect("a number");
        assert!((place.y - own_m).abs() < 0.25, "{content} at {}", place.y);
    }
}

#[test]
fn no_text_reads_upside_down() {
    let analysis = analysis(two_way());
    let sheet = draw(&analysis, &beside(&labels(&analysis)), &Job::default());
    for mark in &sheet.marks {
        if let Drawn::Text { rotation_rad, .. } = mark.drawn {
            assert!(rotation_rad > -1.57 && rotation_rad < 1.58, "{mark:?}");
        }
    }
}

#[test]
fn every_tendon_with_forces_is_coloured_end_to_end_at_all_four_stages() {
    let analysis = analysis(two_way());
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    let whole_m: f64 = analysis
        .floor
        .tendons
        .iter()
        .map(|t| t.path.length_m())
        .sum();
    for layer in layers::FORCE {
        let mut drawn_m = 0.0;
        for mark in on(&sheet, layer) {
            let Drawn::Line {
                points, width_m, ..
            } = &mark.drawn
            else {
                panic!("{layer} holds {mark:?}");
            };
            assert!(*width_m > 0.0 && *width_m <= 0.08);
            assert!(mark.ink.is_some_and(|ink| ramp::RAMP.contains(&ink)));
            drawn_m += points
                .windows(2)
                .map(|p| (p[1].x - p[0].x).hypot(p[1].y - p[0].y))
                .sum::<f64>();
        }
        assert!(
            (drawn_m - whole_m).abs() < 1e-3 * whole_m,
            "{layer}: {drawn_m} of {whole_m}"
        );
    }
}

#[test]
fn coloured_lengths_leave_half_of_the_spacing_free() {
    let analysis = analysis(band(5, 0.1));
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    for mark in on(&sheet, layers::FORCE[3]) {
        let Drawn::Line { width_m, .. } = mark.drawn else {
            panic!("{mark:?}")
        };
        assert!(width_m < 0.05, "{width_m}");
    }
}

#[test]
fn a_tendon_without_forces_draws_none_and_stands_in_the_table() {
    let mut tendons = band(3, 1.0);
    without_forces(&mut tendons[1]);
    let analysis = analysis(tendons);
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    let y = analysis.floor.tendons[1].ends[0].place.y;
    for layer in layers::FORCE
        .into_iter()
        .chain(layers::FORCE_TEXT)
        .chain([layers::EXTENSION])
    {
        assert!(on(&sheet, layer).count() > 0);
        for mark in on(&sheet, layer) {
            assert!(
                corners(&mark.drawn).iter().any(|c| (c.y - y).abs() > 0.3),
                "{mark:?}"
            );
        }
    }
    assert_eq!(on(&sheet, layers::PROFILE).count(), 3, "its curve is known");
    let mark = &analysis.floor.tendons[1].mark;
    let rows = on(&sheet, layers::TABLE)
        .filter(|m| matches!(&m.drawn, Drawn::Text { content, .. } if content == mark));
    assert_eq!(rows.count(), 1);
}

#[test]
fn legend_and_table_keep_clear_of_the_floor_and_of_each_other() {
    let analysis = analysis(two_way());
    let own = labels(&analysis);
    let sheet = draw(&analysis, &beside(&own), &Job::default());
    let floor: Vec<Quad> = sheet
        .marks
        .iter()
        .filter(|mark| mark.layer != layers::TABLE)
        .flat_map(|mark| corners(&mark.drawn))
        .map(|c| [c; 4])
        .chain(own)
        .collect();
    let table: Vec<Quad> = on(&sheet, layers::TABLE)
        .flat_map(|mark| corners(&mark.drawn))
        .map(|c| [c; 4])
        .collect();
    let right = bounds(&floor).1.x;
    let left = bounds(&table).0.x;
    assert!(left > right + 0.5, "table from {left}, floor to {right}");
    assert_eq!(overlaps(&boxes(&sheet, &[layers::TABLE])), 0);
}

#[test]
fn a_title_beside_the_floor_is_not_written_over() {
    let analysis = analysis(band(3, 1.0));
    let title = Spot::upright(at(45.0, 0.0), 6.0, 1.0).quad(0.0);
    let mut own = labels(&analysis);
    own.push(title);
    let sheet = draw(&analysis, &beside(&own), &Job::default());
    for quad in boxes(&sheet, &[layers::TABLE]) {
        assert!(!overlap(&quad, &title));
    }
}

#[test]
fn extensions_in_a_band_are_smaller_than_the_gap_and_do_not_overlap() {
    let analysis = analysis(band(8, 0.2));
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    let texts = boxes(&sheet, &[layers::EXTENSION]);
    assert_eq!(texts.len(), 16);
    assert_eq!(overlaps(&texts), 0);
    for mark in on(&sheet, layers::EXTENSION) {
        let Drawn::Text {
            height_m, content, ..
        } = &mark.drawn
        else {
            panic!("{mark:?}")
        };
        assert!(*height_m <= 0.6 * 0.2 + 1e-9);
        assert!(
            content.starts_with("ext ") && content.contains("(net ") && content.ends_with(" mm")
        );
    }
}

static RULE: Rule = Rule {
    name: "height-missing",
    meaning: "",
};

#[test]
fn each_finding_with_a_place_has_a_ring_in_a_colour_that_is_no_force() {
    let mut analysis = analysis(band(3, 1.0));
    analysis.findings = vec![
        Finding::new(&RULE, Level::Error, "", "")
            .on_tendon("B1")
            .at_place(at(10.0, 0.0)),
        Finding::new(&RULE, Level::Warning, "", "").at_place(at(20.0, 1.0)),
        Finding::new(&RULE, Level::Note, "", ""),
    ];
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    let rings: Vec<(Coord<f64>, f64)> = on(&sheet, layers::FINDING)
        .filter_map(|mark| match mark.drawn {
            Drawn::Circle { centre, radius_m } => Some((centre, radius_m)),
            _ => None,
        })
        .collect();
    assert_eq!(rings.len(), 2);
    assert_eq!((rings[0].0, rings[1].0), (at(10.0, 0.0), at(20.0, 1.0)));
    assert!(rings[0].1 > rings[1].1, "an error has the larger ring");
    for level in [Level::Error, Level::Warning, Level::Note] {
        let ink = layers::level_ink(level);
        assert!(
            ramp::RAMP
                .iter()
                .all(|r| r.index != ink.index && r.rgb != ink.rgb)
        );
    }
}

#[test]
fn the_curves_stand_at_their_true_level() {
    let analysis = analysis(band(2, 1.0));
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    let lowest = on(&sheet, layers::PROFILE)
        .filter_map(|mark| match &mark.drawn {
            Drawn::Line3d { points } => Some(points.iter().map(|p| p[2])),
            _ => None,
        })
        .flatten()
        .fold(f64::INFINITY, f64::min);
    let sampled = analysis.results.iter().flat_map(|r| &r.samples);
    let known = sampled.map(|s| s.level_m).fold(f64::INFINITY, f64::min);
    assert!((lowest - known).abs() < 1e-12 && lowest < -0.1);
}

#[test]
fn the_legend_names_every_class_and_what_the_forces_rest_on() {
    let analysis = analysis(band(2, 1.0));
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    let patches: Vec<_> = on(&sheet, layers::TABLE)
        .filter(|mark| matches!(mark.drawn, Drawn::Solid { .. }))
        .filter_map(|mark| mark.ink)
        .collect();
    assert_eq!(patches, ramp::RAMP);
    let words: Vec<&str> = on(&sheet, layers::TABLE)
        .filter_map(|mark| match &mark.drawn {
            Drawn::Text { content, .. } => Some(content.as_str()),
            _ => None,
        })
        .collect();
    let words = words.join(" ");
    for class in 0..ramp::RAMP.len() {
        assert!(words.contains(&ramp::class_name(class)));
    }
    for said in [
        "friction mu 0.19",
        "not a design certificate",
        "nobody behind",
        "was assumed",
    ] {
        assert!(words.contains(said), "{said} is missing");
    }
}

#[test]
fn the_same_floor_gives_the_same_sheet_and_nothing_promises_anything() {
    let analysis = analysis(two_way());
    let own = labels(&analysis);
    let sheet = draw(&analysis, &beside(&own), &Job::default());
    assert_eq!(sheet, draw(&analysis, &beside(&own), &Job::default()));
    let mut known: BTreeMap<&str, usize> =
        sheet.layers.iter().map(|l| (l.name.as_str(), 0)).collect();
    for mark in &sheet.marks {
        *known
            .get_mut(mark.layer.as_str())
            .expect("a layer of the sheet") += 1;
        if let Drawn::Text {
            content, height_m, ..
        } = &mark.drawn
        {
            assert!(content.is_ascii() && !content.is_empty(), "{content}");
            assert!(*height_m >= 0.03, "{content} is {height_m} high");
            for word in content.to_lowercase().split(|c: char| !c.is_alphabetic()) {
                assert!(!["safe", "ok"].contains(&word), "{content}");
            }
        }
    }
}

#[test]
fn an_empty_floor_gives_legend_and_table_only() {
    let nothing = analysis(Vec::new());
    let sheet = draw(&nothing, &beside(&[]), &Job::default());
    assert!(on(&sheet, layers::TABLE).count() > 0);
    assert!(sheet.marks.iter().all(|mark| mark.layer == layers::TABLE));
}

#[test]
fn broken_numbers_draw_nothing_and_stop_nothing() {
    let mut broken: Analysis = analysis(vec![line("B1", at(0.0, 0.0), at(20.0, 0.0))]);
    for sample in &mut broken.results[0].samples {
        sample.forces_kn = [Some(f64::NAN); 4];
        sample.place.x = f64::NAN;
    }
    let sheet = draw(&broken, &beside(&[[at(f64::NAN, 0.0); 4]]), &Job::default());
    assert_eq!(on(&sheet, layers::FORCE[3]).count(), 0);
}
