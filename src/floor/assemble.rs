//! The floor put together from its parts.

use super::candidates::lies;
use super::ends;
use super::heights::{self, Doubt, Settled};
use super::index::Index;
use super::labels::{Labels, labels};
use super::layers::Roles;
use super::levels::levels;
use super::lines::{Line, lines};
use super::marks::{self, Marks};
use super::missing::{Columns, Stray, complete};
use super::points::{points, words};
use super::readings::{HeightText, MarkText, Word};
use super::rules::{LABEL_AMBIGUOUS, LABEL_UNCLAIMED};
use super::slab::{Thickness, slab};
use super::symbols::Symbols;
use super::types::{Floor, PointKind, Tendon};
use crate::drawing::{Drawing, Text};
use crate::finding::{Finding, Level, Wording};
use crate::job::Job;
use crate::units::{LONG, Units};

/// A label that nobody claims is told by the nearest tendon within this many times its reach.
const SEEN: f64 = 4.0;
/// It says that a tendon lacks a height within this many times its reach.
const LACKING: f64 = 2.0;

/// Reads a floor from a drawing. What the drawing does not say is left open and found, never assumed; the result does
/// not depend on the order of the drawing's entities.
pub fn read(drawing: &Drawing, job: &Job) -> (Floor, Vec<Finding>) {
    let conventions = &job.conventions;
    let roles = Roles::new(drawing, conventions);
    let mut findings = roles.hidden(drawing);

    let symbols = Symbols::new(drawing, conventions, &roles);
    let (slab, unread_zones, found) = slab(drawing, job, &roles, &symbols.shapes);
    findings.extend(found);
    let thickness = Thickness::new(&slab, &unread_zones);
    let columns = Columns::new(&slab.columns);

    let (lines, found) = lines(drawing, job, &roles, &symbols.stops(), &symbols.shapes);
    findings.extend(found);
    let index = Index::new(lines.iter().map(|line| &line.path));
    let (line_ends, found) = ends::ends(&lines, &symbols.list, conventions.end_reach_m);
    findings.extend(found);

    let (levels, found) = levels(drawing, job, &roles, &lines, &index);
    findings.extend(found);
    let taken = levels.texts.union(&symbols.texts).copied().collect();
    let (labels, found) = labels(drawing, conventions, &roles, &taken);
    findings.extend(found);
    let Labels {
        heights: height_labels,
        marks: mark_labels,
        unread,
    } = labels;

    let (texts, readings): (Vec<&Text>, Vec<MarkText>) = mark_labels.into_iter().unzip();
    let mark_lies = lies(&texts, &lines, &index, conventions.label_reach, &columns);
    let settled_marks = marks::settle(&readings, &mark_lies, &lines);
    let names = marks::names(&lines, &settled_marks.of_line);
    let near = Near {
        lines: &lines,
        index: &index,
        names: &names,
        reach: conventions.label_reach,
    };
    findings.extend(near.marks(&texts, &settled_marks));

    let (texts, mut readings): (Vec<&Text>, Vec<HeightText>) = height_labels.into_iter().unzip();
    for (text, reading) in texts.iter().zip(&mut readings) {
        reading.weigh(thickness.at(text.place));
    }
    let mut height_lies = lies(&texts, &lines, &index, conventions.label_reach, &columns);
    heights::written_to_ends(&mut height_lies, &readings);
    let settled = heights::settle(&readings, &height_lies, &lines, &levels.of_line);
    findings.extend(near.heights(&texts, &readings, &settled));
    let strays = near.strays(&texts, &readings, &settled, &unread);

    let mut tendons = Vec::with_capacity(lines.len());
    for (at, line) in lines.iter().enumerate() {
        let said = &settled_marks.of_line[at];
        let (points, found) = points(
            &names[at],
            line,
            &settled.of_line[at],
            &thickness,
            &conventions.height,
        );
        findings.extend(found);
        findings.extend(ends::unknown(
            &names[at],
            &line_ends[at],
            line.path.length_m(),
            conventions.end_reach_m,
        ));
        tendons.push(Tendon {
            mark: names[at].clone(),
            mark_drawn: said.mark.is_some(),
            handle: line.handle.clone(),
            layer: line.layer.clone(),
            run: line.run,
            path: line.path.clone(),
            tendons: said.tendons.unwrap_or(1),
            strands: said.strands,
            strand: said.strand.as_ref().map(|written| {
                let known = job.tendon.strand_named(written);
                known.map_or_else(|| written.clone(), |size| size.name.clone())
            }),
            required_kn: said.required_kn,
            required_kn_per_m: said.required_kn_per_m,
            ends: line_ends[at].each_ref().map(|told| told.end),
            points,
        });
    }
    findings.extend(complete(
        &mut tendons,
        &index,
        &columns,
        &strays,
        &thickness,
    ));
    tendons.sort_by_cached_key(|tendon| natural(&tendon.mark));
    findings.extend(marks::findings(&tendons));
    (Floor { tendons, slab }, findings)
}

/// Words for labels, by the tendons near to them.
struct Near<'a> {
    lines: &'a [Line],
    index: &'a Index,
    names: &'a [String],
    reach: f64,
}

impl Near<'_> {
    fn marks(&self, texts: &[&Text], marks: &Marks) -> Vec<Finding> {
        let mut findings: Vec<Finding> = marks
            .unclaimed
            .iter()
            .map(|&label| self.unclaimed(texts[label]))
            .collect();
        findings.extend(marks.doubts.iter().map(|&(label, here, there)| {
            let text = texts[label];
            Finding::new(
                &LABEL_AMBIGUOUS,
                Level::Warning,
                format!(
                    "mark {:?} was taken for the line with handle {}, but fits the one with handle {} about as well",
                    text.content, self.lines[here].handle, self.lines[there].handle
                ),
                "move the mark nearer to its tendon, along it",
            )
            .on_tendon(&self.names[here])
            .at_place(text.place)
        }));
        findings
    }

    fn heights(&self, texts: &[&Text], readings: &[HeightText], settled: &Settled) -> Vec<Finding> {
        let unclaimed = settled.unclaimed.iter();
        let mut findings: Vec<Finding> = unclaimed
            .map(|&label| self.unclaimed(texts[label]))
            .collect();
        findings.extend(settled.doubts.iter().map(|doubt| {
            let here = &self.names[doubt.hosts[0]];
            let there = &self.names[doubt.hosts[1]];
            let (level, tail) = if doubt.tied {
                (
                    Level::Error,
                    format!("fits {here} and {there} equally well; neither was given it"),
                )
            } else {
                (
                    Level::Warning,
                    format!("was taken for {here}, but fits {there} about as well"),
                )
            };
            Finding::new(
                &LABEL_AMBIGUOUS,
                level,
                Wording::of(|units| {
                    format!("height {} {tail}", words(readings[doubt.label], units))
                }),
                "move the label nearer to its tendon, or turn it along the tendon",
            )
            .on_tendon(here)
            .at_station(doubt.stations_m[0])
            .at_place(texts[doubt.label].place)
        }));
        findings
    }

    fn unclaimed(&self, text: &Text) -> Finding {
        let reach_m = self.reach * text.height_m;
        let nearest = self
            .index
            .feet(text.place, SEEN * reach_m)
            .into_iter()
            .min_by(|a, b| a.distance_m.total_cmp(&b.distance_m));
        let tail = |units: Units| {
            let long = |length_m: f64| units.of(LONG).said(length_m, 2);
            let Some(foot) = &nearest else {
                return format!("no tendon is within {}", long(SEEN * reach_m));
            };
            let (name, off) = (&self.names[foot.line], long(foot.distance_m));
            if foot.distance_m > reach_m {
                let reach = long(reach_m);
                format!("{name}, the nearest, is {off} off and the reach is {reach}")
            } else {
                format!("{name}, {off} off, has its own label there")
            }
        };
        let finding = Finding::new(
            &LABEL_UNCLAIMED,
            Level::Warning,
            Wording::of(|units| {
                format!(
                    "label {:?} belongs to no tendon: {}",
                    text.content,
                    tail(units)
                )
            }),
            "move the label to its tendon, or delete it",
        )
        .at_place(text.place);
        match nearest {
            Some(foot) => finding
                .on_tendon(&self.names[foot.line])
                .at_station(foot.station_m),
            None => finding,
        }
    }

    /// Labels without a tendon, beside each tendon that they are near to.
    fn strays(
        &self,
        texts: &[&Text],
        readings: &[HeightText],
        settled: &Settled,
        unread: &[&Text],
    ) -> Vec<Stray> {
        let beside = |text: &Text, kind: Option<PointKind>| -> Vec<Stray> {
            let reach_m = LACKING * self.reach * text.height_m;
            let feet = self.index.feet(text.place, reach_m).into_iter();
            feet.map(|foot| Stray {
                line: foot.line,
                station_m: foot.station_m,
                kind,
                content: text.content.clone(),
            })
            .collect()
        };
        let mut strays: Vec<Stray> = Vec::new();
        for &label in &settled.unclaimed {
            strays.extend(beside(texts[label], kind(readings[label])));
        }
        strays.extend(unread.iter().flat_map(|text| beside(text, None)));
        for Doubt {
            label,
            hosts,
            stations_m,
            ..
        } in settled.doubts.iter().filter(|d| d.tied)
        {
            strays.extend(
                hosts
                    .iter()
                    .zip(stations_m)
                    .map(|(&line, &station_m)| Stray {
                        line,
                        station_m,
                        kind: kind(readings[*label]),
                        content: texts[*label].content.clone(),
                    }),
            );
        }
        strays
    }
}

fn kind(reading: HeightText) -> Option<PointKind> {
    reading.word.map(|word| match word {
        Word::High => PointKind::High,
        Word::Low => PointKind::Low,
    })
}

/// Text before digits, digits as a number: B2 before B10.
fn natural(mark: &str) -> Vec<(String, u64)> {
    let mut parts = vec![(String::new(), 0_u64)];
    let mut in_digits = false;
    for sign in mark.chars() {
        if let Some(digit) = sign.to_digit(10) {
            in_digits = true;
            if let Some((_, number)) = parts.last_mut() {
                *number = number.saturating_mul(10).saturating_add(u64::from(digit));
            }
            continue;
        }
        if in_digits {
            parts.push((String::new(), 0));
            in_digits = false;
        }
        if let Some((text, _)) = parts.last_mut() {
            text.extend(sign.to_uppercase());
        }
    }
    parts
}
