//! The floor put together from its parts.

use std::collections::BTreeSet;

use super::aims::{self, Aimed};
use super::arrows::Arrows;
use super::candidates::{Lie, lies};
use super::columns::Columns;
use super::ends;
use super::groups::groups;
use super::heights::{self, Height, Settled};
use super::hidden::outranked;
use super::index::Index;
use super::joints::{self, joints};
use super::labels::labels;
use super::layers::Roles;
use super::levels::levels;
use super::lines::{Line, lines};
use super::marking::Marking;
use super::marks::{self, Marks};
use super::missing::complete;
use super::near::{Near, kind};
use super::odds::odds;
use super::plans::plans;
use super::points::points;
use super::readings::HeightText;
use super::slab::{Thickness, slab};
use super::symbols::Symbols;
use super::ticks::aim_by_ticks;
use super::types::{End, Floor, Point, Tendon};
use crate::drawing::{Drawing, Text};
use crate::finding::Finding;
use crate::job::{Conventions, Job};

/// Reads a floor from a drawing. What the drawing does not say is left open and found, never assumed; the result does
/// not depend on the order of the drawing's entities.
pub fn read(drawing: &Drawing, job: &Job) -> (Floor, Vec<Finding>) {
    let conventions = &job.conventions;
    let roles = Roles::new(drawing, conventions);
    let (outranked, mut findings) = outranked(drawing, &roles, conventions.label_reach);
    findings.extend(roles.hidden(drawing, &outranked));
    findings.extend(odds(drawing, conventions));
    findings.extend(roles.hatched(drawing));

    let symbols = Symbols::new(drawing, conventions, &roles);
    let (slab, unread_zones, found) = slab(drawing, job, &roles, &symbols.shapes);
    findings.extend(found);
    let thickness = Thickness::new(&slab, &unread_zones);
    let columns = Columns::new(&slab.columns);

    let (lines, found) = lines(drawing, job, &roles, &symbols);
    findings.extend(found);
    let index = Index::new(lines.iter().map(|line| &line.path));
    let (mut line_ends, found) = ends::ends(&lines, &symbols.list, conventions.end_reach_m);
    findings.extend(found);
    let (joints, found) = joints(&lines, &index, &symbols.joints, conventions.end_reach_m);
    findings.extend(found);

    let (levels, found) = levels(drawing, job, &roles, &lines, &index);
    findings.extend(found);
    let arrows = Arrows::new(drawing, &roles, &index, conventions.arrow_reach_m);
    let groups = groups(drawing, job, &roles, &arrows, &lines, &index);
    let of_others = [&levels.texts, &symbols.texts, &groups.texts];
    let taken = of_others.into_iter().flatten().copied();
    let taken = taken.chain(outranked).collect();
    findings.extend(groups.findings.iter().cloned());
    let (labels, found) = labels(drawing, job, &roles, &taken);
    findings.extend(found);

    let among = Among {
        drawing,
        conventions,
        roles: &roles,
        lines: &lines,
        index: &index,
        columns: &columns,
        arrows: &arrows,
    };
    let (marks, mut settled_marks) = among.marks(labels.marks);
    findings.extend(aims::shared(&marks, &lines));
    findings.extend(marks.findings);
    let (plans, found) = plans(&groups, &mut settled_marks.of_line, &lines);
    findings.extend(found);
    let reserved = plans.claim(&mut settled_marks.of_line);
    let names = marks::names(&lines, &settled_marks.of_line, &reserved);
    let near = Near {
        lines: &lines,
        index: &index,
        names: &names,
        reach: conventions.label_reach,
    };
    findings.extend(near.marks(&marks.texts, &settled_marks));

    let (heights, settled) = among.heights(labels.heights, &thickness, &levels.of_line);
    findings.extend(heights.findings);
    findings.extend(near.heights(&heights.texts, &heights.readings, &settled));
    let mut strays = near.strays(&heights.texts, &heights.readings, &settled, &labels.unread);
    for (text, reading) in heights.astray {
        strays.extend(near.beside(text, kind(reading)));
    }

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
        let told = &mut line_ends[at];
        findings.extend(joints::at_ends(joints.at_ends[at], told, &names[at]));
        let length_m = line.path.length_m();
        findings.extend(ends::left_open(&names[at], told, length_m, conventions));
        let ends = line_ends[at].each_ref().map(|told| told.end);
        tendons.push(Tendon {
            joints: joints.of_line[at].clone(),
            ..drawn(job, line, &names[at], said, ends, points)
        });
    }
    findings.extend(complete(
        &mut tendons,
        &index,
        &columns,
        &strays,
        &thickness,
    ));
    let (made, found) = plans.made(&tendons, &settled.of_line, &thickness, &conventions.height);
    findings.extend(found);
    tendons.extend(made);
    tendons.sort_by_cached_key(|tendon| natural(&tendon.mark));
    findings.extend(marks::findings(
        &tendons,
        &uncounted(&lines, &settled_marks.of_line),
    ));
    (Floor { tendons, slab }, findings)
}

/// Lines of which the labels contradict one another in what they count, by handle.
fn uncounted<'l>(lines: &'l [Line], said: &[Marking]) -> BTreeSet<&'l str> {
    let torn = lines.iter().zip(said).filter(|(_, said)| said.uncounted());
    torn.map(|(line, _)| line.handle.as_str()).collect()
}

/// A tendon that the drawing shows.
fn drawn(
    job: &Job,
    line: &Line,
    mark: &str,
    said: &Marking,
    ends: [End; 2],
    points: Vec<Point>,
) -> Tendon {
    Tendon {
        mark: mark.to_owned(),
        mark_drawn: said.mark.one().is_some(),
        made: false,
        handle: line.handle.clone(),
        layer: line.layer.clone(),
        run: line.run,
        path: line.path.clone(),
        tendons: said.tendons.one().copied().unwrap_or(1),
        // Whatever of the steel is contradicted, nobody knows its force.
        strands: (said.strands.one().copied().or(job.tendon.default_strands))
            .filter(|_| !said.uncounted()),
        strand: said.strand.one().cloned(),
        required_kn: said.required_kn.one().copied(),
        required_kn_per_m: said.required_kn_per_m.one().copied(),
        ends,
        joints: Vec::new(),
        points,
    }
}

/// What labels are settled among.
struct Among<'a> {
    drawing: &'a Drawing,
    conventions: &'a Conventions,
    roles: &'a Roles,
    lines: &'a [Line],
    index: &'a Index,
    columns: &'a Columns<'a>,
    arrows: &'a Arrows,
}

impl Among<'_> {
    fn marks<'t>(&self, labels: Vec<(&'t Text, Marking)>) -> (Aimed<'t, Marking>, Marks) {
        let aimed = aims::aimed(labels, self.arrows, aims::share_of);
        let settled = marks::settle(&aimed.readings, &self.lies(&aimed), self.lines);
        (aimed, settled)
    }

    /// Heights; `levels` are those that level lines give, by line.
    fn heights<'t>(
        &self,
        labels: Vec<(&'t Text, HeightText)>,
        thickness: &Thickness<'_>,
        levels: &[Vec<Height>],
    ) -> (Aimed<'t, HeightText>, Settled) {
        let mut aimed = aims::aimed(labels, self.arrows, |reading, _, _| *reading);
        aim_by_ticks(
            self.drawing,
            self.conventions,
            self.roles,
            self.index,
            &aimed.texts,
            &mut aimed.aims,
        );
        let labels = aimed.texts.iter().zip(&mut aimed.readings);
        for ((text, reading), aim) in labels.zip(&aimed.aims) {
            let foot = aim.as_ref().and_then(|aim| aim.first());
            let place = foot.map_or(text.place, |foot| foot.place);
            reading.weigh(thickness.at(place));
        }
        let mut lies = self.lies(&aimed);
        heights::written_to_ends(&mut lies, &aimed.readings);
        let settled = heights::settle(&aimed.readings, &lies, self.lines, levels);
        (aimed, settled)
    }

    fn lies<R>(&self, labels: &Aimed<'_, R>) -> Vec<Lie> {
        lies(
            &labels.texts,
            &labels.aims,
            self.lines,
            self.index,
            self.conventions.label_reach,
            self.columns,
        )
    }
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
