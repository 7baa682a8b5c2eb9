//! Whether a reader can tell whose each figure, mark and finding is.

use geo::Coord;

use super::floor::{
    analysis, band, crowd_ends, labels, line, number_points, two_way, without_forces,
};
use super::{RULE, SERVICE, at, beside, boxes, on, overlaps};
use crate::annotate::{draw, layers};
use crate::drawing::{Drawn, Sheet};
use crate::finding::{Finding, Level};
use crate::job::Job;

fn texts<'a>(sheet: &'a Sheet, layer: &'a str) -> Vec<&'a str> {
    on(sheet, layer)
        .filter_map(|mark| match &mark.drawn {
            Drawn::Text { content, .. } => Some(content.as_str()),
            _ => None,
        })
        .collect()
}

#[test]
fn figures_follow_one_another_as_their_points_do_and_one_off_its_point_is_led_there() {
    // Highs half a metre from either anchor, as over a wall near the slab edge, and a label beside every point.
    let mut tendons = band(6, 0.3);
    for (number, worked) in (1_u32..).zip(&mut tendons) {
        crowd_ends(worked, 0.533);
        number_points(worked, 1000.0 * f64::from(number));
    }
    let analysis = analysis(tendons);
    let sheet = draw(&analysis, &beside(&labels(&analysis)), &Job::default());
    let leaders: Vec<Coord<f64>> = on(&sheet, SERVICE)
        .filter_map(|mark| match &mark.drawn {
            Drawn::Line { points, .. } => points.last().copied(),
            _ => None,
        })
        .collect();
    let mut figures = 0;
    for (tendon, number) in analysis.floor.tendons.iter().zip(1_u32..) {
        let mut stands = Vec::new();
        for mark in on(&sheet, SERVICE) {
            let Drawn::Text {
                place,
                content,
                height_m,
                ..
            } = &mark.drawn
            else {
                continue;
            };
            let value: u32 = content.parse().expect("a number");
            if value / 1000 != number {
                continue;
            }
            let point = &tendon.points[(value % 1000) as usize];
            let beside_m = (place.x - point.place.x).abs();
            let led = leaders.iter().any(|end| {
                (*end - point.place).x.abs() < 1e-6 && (*end - point.place).y.abs() < 1e-6
            });
            let nearest = tendon
                .points
                .iter()
                .all(|other| (place.x - other.place.x).abs() >= beside_m - 1e-9);
            assert!(
                led || nearest && beside_m <= 7.0 * height_m + 1e-9,
                "{content} stands {beside_m} m off"
            );
            stands.push((point.station_m, place.x));
        }
        stands.sort_by(|a, b| a.0.total_cmp(&b.0));
        assert!(
            stands.windows(2).all(|two| two[0].1 < two[1].1),
            "{stands:?}"
        );
        figures += stands.len();
    }
    assert!(
        !leaders.is_empty() && figures > 6 * 8,
        "{figures} figures, {} led",
        leaders.len()
    );
}

#[test]
fn a_mark_that_the_drawing_lacks_is_written_beside_its_tendon() {
    let mut analysis = analysis(band(3, 1.0));
    analysis.floor.tendons[1].mark_drawn = false;
    let sheet = draw(&analysis, &beside(&labels(&analysis)), &Job::default());
    let beside_tendon: Vec<(&str, Coord<f64>)> = on(&sheet, layers::TABLE)
        .filter_map(|mark| match &mark.drawn {
            Drawn::Text { place, content, .. } if place.x < 30.0 => {
                Some((content.as_str(), *place))
            }
            _ => None,
        })
        .collect();
    let [(content, place)] = beside_tendon[..] else {
        panic!("{beside_tendon:?}")
    };
    assert_eq!(content, "B2");
    assert!((place.y - 1.0).abs() < 0.3, "{place:?}");
    assert!(
        texts(&sheet, layers::TABLE)
            .join(" ")
            .contains("the drawing has none")
    );
    let all = boxes(&sheet, &[SERVICE, layers::EXTENSION]);
    assert_eq!(overlaps(&all), 0);
}

#[test]
fn a_tendon_without_forces_is_dashed_in_grey_and_the_legend_says_so() {
    let mut tendons = band(3, 1.0);
    without_forces(&mut tendons[1]);
    let analysis = analysis(tendons);
    let sheet = draw(&analysis, &beside(&[]), &Job::default());
    let dashes: Vec<f64> = on(&sheet, layers::FINDING)
        .filter_map(|mark| match &mark.drawn {
            Drawn::Line {
                points, width_m, ..
            } if mark.ink == Some(layers::GREY) && *width_m > 0.05 => Some(points),
            _ => None,
        })
        .inspect(|points| assert!(points.iter().all(|p| (p.y - 1.0).abs() < 1e-9)))
        .map(|points| points[points.len() - 1].x - points[0].x)
        .collect();
    let drawn_m: f64 = dashes.iter().sum();
    assert!(
        dashes.len() > 20 && drawn_m > 15.0 && drawn_m < 25.0,
        "{dashes:?}"
    );
    assert!(texts(&sheet, layers::TABLE).contains(&"no forces"));
}

#[test]
fn the_table_gives_the_left_or_lower_end_first_and_the_size_that_the_job_gives() {
    let (left, right) = (at(0.0, 0.0), at(30.0, 0.0));
    let mut tendons = vec![line("B1", left, right), line("B2", right, left)];
    for (tendon, _) in &mut tendons {
        tendon.strand = None;
    }
    let analysis = analysis(tendons);
    let mut job = Job::default();
    job.tendon.default_strand = Some("15.7".to_owned());
    let sheet = draw(&analysis, &beside(&[]), &job);
    let words = texts(&sheet, layers::TABLE);
    // Both are live at their start: the one drawn from the right is live at its right end.
    let row = |mark: &str| {
        let from = words.iter().position(|word| *word == mark).expect("a row");
        words[from..from + 9].to_vec()
    };
    assert_eq!(row("B1")[3], "live-dead");
    assert_eq!(row("B2")[3], "dead-live");
    assert_eq!(row("B1")[1], "5-15.7");
    assert!(
        row("B1")[7] != "-" && row("B1")[8] == "-",
        "{:?}",
        row("B1")
    );
    assert!(
        row("B2")[7] == "-" && row("B2")[8] != "-",
        "{:?}",
        row("B2")
    );
}

#[test]
fn findings_are_written_over_no_label_and_not_over_one_another_where_there_is_room() {
    let mut analysis = analysis(two_way());
    let places = analysis
        .floor
        .tendons
        .iter()
        .step_by(6)
        .map(|tendon| tendon.points[1].place);
    analysis.findings = places
        .zip(1..)
        .map(|(place, number)| {
            Finding::new(&RULE, Level::Error, "", "")
                .on_tendon(&format!("X{number}"))
                .at_place(place)
        })
        .collect();
    let own = labels(&analysis);
    let sheet = draw(&analysis, &beside(&own), &Job::default());
    let mut all = boxes(&sheet, &[layers::FINDING, layers::EXTENSION]);
    assert_eq!(overlaps(&all), 0);
    all.extend(own.iter().copied());
    assert_eq!(overlaps(&all), overlaps(&own));
}

#[test]
fn both_jacks_are_said_to_pull_together_only_where_a_tendon_has_two() {
    let said = |tendons| {
        let sheet = draw(&analysis(tendons), &beside(&[]), &Job::default());
        texts(&sheet, layers::TABLE)
            .join(" ")
            .contains("both jacks pull together")
    };
    assert!(said(band(2, 1.0)));
    assert!(!said(vec![line("B1", at(0.0, 0.0), at(30.0, 0.0))]));
}
