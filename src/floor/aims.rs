//! Labels that say by an arrow, a stroke or a tick which tendon is theirs.

use super::arrows::{Arrows, Pointed};
use super::heard::Heard;
use super::index::Foot;
use super::lines::Line;
use super::marking::Marking;
use super::rules::{LABEL_SHARED, LEADER_ASTRAY};
use crate::drawing::Text;
use crate::finding::{Finding, Level, Wording};

/// The places on tendons, one for each tendon, of which a label means one.
pub(super) type Aim = Vec<Foot>;

/// What a pairing costs less for being pointed out.
pub(super) const AIMED: f64 = 1.5;

/// Labels, each with its aim if it has one; a label that points at several tendons is here once for each.
pub(super) struct Aimed<'a, R> {
    pub(super) texts: Vec<&'a Text>,
    pub(super) readings: Vec<R>,
    pub(super) aims: Vec<Option<Aim>>,
    pub(super) findings: Vec<Finding>,
    /// Labels whose arrow points at no tendon: nobody gets them.
    pub(super) astray: Vec<(&'a Text, R)>,
}

/// Gives labels their aims; `share` makes a label's reading that of one of several tendons, given its number from 1 and
/// how many there are.
pub(super) fn aimed<'a, R: Clone>(
    labels: Vec<(&'a Text, R)>,
    arrows: &Arrows,
    share: impl Fn(&R, usize, usize) -> R,
) -> Aimed<'a, R> {
    let mut aimed = Aimed {
        texts: Vec::with_capacity(labels.len()),
        readings: Vec::with_capacity(labels.len()),
        aims: Vec::with_capacity(labels.len()),
        findings: Vec::new(),
        astray: Vec::new(),
    };
    for (text, reading) in labels {
        let Some(pointed) = arrows.of(text) else {
            aimed.put(text, reading, None);
            continue;
        };
        aimed.findings.extend(astray(text, pointed));
        match pointed.aims.as_slice() {
            [] => aimed.astray.push((text, reading)),
            [aim] => aimed.put(text, reading, Some(aim.clone())),
            several => {
                for (aim, number) in several.iter().zip(1..) {
                    let part = share(&reading, number, several.len());
                    aimed.put(text, part, Some(aim.clone()));
                }
            }
        }
    }
    aimed
}

impl<'a, R> Aimed<'a, R> {
    fn put(&mut self, text: &'a Text, reading: R, aim: Option<Aim>) {
        self.texts.push(text);
        self.readings.push(reading);
        self.aims.push(aim);
    }
}

fn astray(text: &Text, pointed: &Pointed) -> Option<Finding> {
    let (why, place) = pointed.astray.as_ref()?;
    let outcome = if pointed.aims.is_empty() {
        "no tendon was given the label"
    } else {
        "only the other tendons were given the label"
    };
    Some(
        Finding::new(
            &LEADER_ASTRAY,
            Level::Warning,
            Wording::of(|units| {
                let why = why.in_units(units);
                format!("the leader of label {:?} {why}; {outcome}", text.content)
            }),
            "draw the leader's tip onto its tendon, or give a greater `arrow_reach_mm` in the job file's [labels] table",
        )
        .at_place(*place),
    )
}

/// What a mark that points at several lines says of one of them: of `6x5-12.7` on three lines each stands for two
/// tendons, and their marks are numbered. A number that the lines do not divide, and a force of which nobody can say
/// whether it is that of each line or of all, count for none.
pub(super) fn share_of(whole: &Marking, number: usize, of: usize) -> Marking {
    let mut part = whole.clone();
    if let Heard::One(mark) = &mut part.mark {
        *mark = format!("{mark}.{number}");
    }
    if let Heard::One(tendons) = whole.tendons {
        let lines = u32::try_from(of).unwrap_or(u32::MAX);
        part.tendons = if tendons % lines == 0 {
            Heard::One(tendons / lines)
        } else {
            Heard::Torn
        };
    }
    if whole.required_kn.is_said() {
        part.required_kn = Heard::Torn;
    }
    part
}

/// Marks that were numbered because their label points at several lines.
pub(super) fn shared(aimed: &Aimed<'_, Marking>, lines: &[Line]) -> Vec<Finding> {
    let mut findings = Vec::new();
    let mut at = 0;
    while let Some(text) = aimed.texts.get(at) {
        let rest = aimed.texts.get(at..).unwrap_or_default();
        let run = rest.iter().take_while(|other| std::ptr::eq(**other, *text));
        let count = run.count();
        let parts = aimed.readings.get(at..at + count).unwrap_or_default();
        let aims = aimed.aims.get(at..at + count).unwrap_or_default();
        if count > 1 && parts.iter().any(|part| part.mark.one().is_some()) {
            let said: Vec<String> = parts
                .iter()
                .zip(aims)
                .filter_map(|(part, aim)| {
                    let line = lines.get(aim.as_ref()?.first()?.line)?;
                    Some(format!("{} (line {})", part.mark.one()?, line.handle))
                })
                .collect();
            findings.push(
                Finding::new(
                    &LABEL_SHARED,
                    Level::Note,
                    format!(
                        "label {:?} points at {count} lines, which are called {}",
                        text.content,
                        said.join(", ")
                    ),
                    "give each line a mark of its own if they must be told apart otherwise",
                )
                .at_place(text.place),
            );
        }
        if let Some(part) = parts.first().filter(|_| count > 1) {
            findings.extend(undivided(text, part, count));
        }
        at += count.max(1);
    }
    findings
}

/// What a label that points at several lines does not say of each.
fn undivided(text: &Text, part: &Marking, lines: usize) -> Vec<Finding> {
    let wrong = |why: &str, remedy: &str| {
        Finding::new(
            &LABEL_SHARED,
            Level::Error,
            format!("label {:?} points at {lines} lines, {why}", text.content),
            remedy,
        )
        .at_place(text.place)
    };
    let mut findings = Vec::new();
    if part.tendons.is_torn() {
        findings.push(wrong(
            "and its number of tendons cannot be shared out among them: it was not used",
            "write beside each line how many tendons it stands for",
        ));
    }
    if part.required_kn.is_torn() {
        findings.push(wrong(
            "and does not say whether its force is that of each of them or of all together: it was not used",
            "write the force that is required beside each line",
        ));
    }
    findings
}
