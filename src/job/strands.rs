//! Strand sizes, each a table of its own, and what no single key shows.

use std::ops::Range;

use toml::Spanned;
use toml::de::{DeArray, DeTable, DeValue};

use crate::job::key::quoted;
use crate::job::reading::{Entry, Reader, kind_word, nearest, plain};
use crate::job::{StrandSize, families};

/// A size as it may be pasted.
const EXAMPLE: &str = "type for example\n\
    [[tendon.strand]]\n\
    name = \"12.7\"\n\
    area_mm2 = 98.7\n\
    strength_mpa = 1860";

impl Reader {
    pub(super) fn strands(&mut self, entry: &Entry<'_>, items: &DeArray<'_>) -> Vec<StrandSize> {
        let mut sizes: Vec<StrandSize> = Vec::new();
        if items.iter().next().is_none() {
            self.mistake(
                entry.span(),
                "`strand` is an empty list",
                "expected tables [[tendon.strand]]",
                "take the line out for the usual sizes",
            );
        }
        for item in items {
            let DeValue::Table(fields) = item.get_ref() else {
                self.mistake(
                    item.span(),
                    format!("`strand` cannot hold {}", kind_word(item.get_ref())),
                    "expected tables [[tendon.strand]]",
                    EXAMPLE,
                );
                continue;
            };
            if let Some(size) = self.strand(item.span(), fields) {
                if sizes.iter().any(|other| other.name == size.name) {
                    let span = fields.get("name").map_or(item.span(), Spanned::span);
                    self.mistake(
                        span,
                        format!("there are two strands of the name \"{}\"", plain(&size.name)),
                        "expected each name once",
                        "give the second another name, as marks on the drawing write it, or take it out",
                    );
                } else {
                    sizes.push(size);
                }
            }
        }
        sizes
    }

    fn strand(&mut self, span: Range<usize>, fields: &DeTable<'_>) -> Option<StrandSize> {
        const NEEDED: [&str; 3] = ["name", "area_mm2", "strength_mpa"];
        const FIELDS: [&str; 4] = ["name", "area_mm2", "strength_mpa", "aliases"];
        let before = self.problems.len();
        for name in fields
            .keys()
            .filter(|name| !FIELDS.contains(&name.get_ref().as_ref()))
        {
            let word = plain(name.get_ref());
            let near = nearest(&word, FIELDS);
            self.mistake(
                name.span(),
                format!("unknown key `{word}` in [[tendon.strand]]"),
                format!("the keys of [[tendon.strand]] are {}", FIELDS.join(", ")),
                near.map_or("take the line out".to_owned(), |near| {
                    format!("did you mean `{near}`?")
                }),
            );
        }
        let missing = NEEDED
            .into_iter()
            .filter(|&name| fields.get(name).is_none());
        for name in missing.collect::<Vec<_>>() {
            self.mistake(
                span.clone(),
                format!("this strand has no `{name}`"),
                format!("expected {}", NEEDED.join(", ")),
                EXAMPLE,
            );
        }
        let name = match fields
            .get("name")
            .map(|entry| (entry.get_ref(), entry.span()))
        {
            Some((DeValue::String(name), _)) if !name.trim().is_empty() => Some(name.to_string()),
            Some((other, span)) => {
                self.mistake(
                    span,
                    format!("a strand's `name` cannot be {}", kind_word(other)),
                    "expected the size as marks write it, in quotes",
                    "type for example `name = \"12.7\"`",
                );
                None
            }
            None => None,
        };
        let area_mm2 = fields
            .get("area_mm2")
            .and_then(|entry| self.number("area_mm2", (10.0, 1000.0), "area_mm2 = 98.7", entry));
        let strength_mpa = fields.get("strength_mpa").and_then(|entry| {
            self.number(
                "strength_mpa",
                (1000.0, 2500.0),
                "strength_mpa = 1860",
                entry,
            )
        });
        let aliases = fields
            .get("aliases")
            .map_or_else(Vec::new, |entry| self.aliases(entry));
        if self.problems.len() > before {
            return None;
        }
        Some(StrandSize {
            name: name?,
            aliases,
            area_mm2: area_mm2?,
            strength_mpa: strength_mpa?,
        })
    }

    fn aliases(&mut self, entry: &Entry<'_>) -> Vec<String> {
        let mut aliases = Vec::new();
        let items = match entry.get_ref() {
            DeValue::Array(items) => items.iter().collect(),
            _ => vec![entry],
        };
        for item in items {
            match item.get_ref() {
                DeValue::String(name) if !name.trim().is_empty() => aliases.push(name.to_string()),
                other => self.mistake(
                    item.span(),
                    format!("`aliases` cannot hold {}", kind_word(other)),
                    "expected a list of names, such as [\"0.5\"]",
                    "type for example `aliases = [\"0.5\"]`",
                ),
            }
        }
        aliases
    }

    /// What no single key shows.
    pub(super) fn contradictions(&mut self) {
        let at = |reader: &Self, path: &str| reader.given.get(path).cloned();
        if let (Some(_), Some(span)) = (
            at(self, "stressing.wobble_rad_per_m"),
            at(self, "stressing.wobble_per_m"),
        ) {
            self.mistake(
                span,
                "both `wobble_rad_per_m` and `wobble_per_m` are given",
                "expected one of the two: they say the same thing in different forms",
                "keep `wobble_rad_per_m` if the figure is k of mu (angle + k length), `wobble_per_m` if it is K of mu angle + K length",
            );
        }
        self.unknown_strands();
        let limits = &self.job.limits;
        let radii = [
            (
                "hogging",
                limits.hogging_radius_error_m,
                limits.hogging_radius_warning_m,
            ),
            (
                "sagging",
                limits.sagging_radius_error_m,
                limits.sagging_radius_warning_m,
            ),
        ];
        for (word, error_m, warning_m) in radii {
            if error_m <= warning_m {
                continue;
            }
            let span = at(self, &format!("limits.{word}_radius_error_m"))
                .or_else(|| at(self, &format!("limits.{word}_radius_warning_m")))
                .unwrap_or(0..0);
            self.mistake(
                span,
                format!(
                    "a {word} radius would be an error ({error_m} m) before it is a warning ({warning_m} m)"
                ),
                format!("expected {word}_radius_error_m to be the smaller"),
                format!(
                    "type for example `{word}_radius_error_m = 2.5` and `{word}_radius_warning_m = 5`"
                ),
            );
        }
        let limits = &self.job.limits;
        if limits.support_residual_error_m < limits.support_residual_warning_m {
            let found = format!(
                "a support height off the curve would be an error ({} mm) before it is a warning ({} mm)",
                limits.support_residual_error_m * 1000.0,
                limits.support_residual_warning_m * 1000.0
            );
            let span = at(self, "limits.support_residual_error_mm")
                .or_else(|| at(self, "limits.support_residual_warning_mm"))
                .unwrap_or(0..0);
            self.mistake(
                span,
                found,
                "expected support_residual_warning_mm to be the smaller",
                "type for example `support_residual_warning_mm = 5` and `support_residual_error_mm = 10`",
            );
        }
        // Numbers in inches are written with fractions: the default patterns follow the unit.
        if !self.given.contains_key("height.patterns") {
            self.job.conventions.height_patterns =
                families::height_patterns(self.job.conventions.height.unit);
        }
        if !self.given.contains_key("slab.text_patterns") {
            self.job.conventions.thickness_patterns =
                families::thickness_patterns(self.job.conventions.thickness_unit);
        }
    }

    /// Sizes that other keys name are among the job's; the default one goes by its own name from here on.
    fn unknown_strands(&mut self) {
        let mut named = std::mem::take(&mut self.strand_names);
        let default = self.job.tendon.default_strand.clone();
        let span = self.given.get("tendon.default_strand").cloned();
        named.extend(default.clone().zip(span));
        for (name, span) in named {
            if self.job.tendon.strand_named(&name).is_some() {
                continue;
            }
            let sizes = &self.job.tendon.strands;
            let known: Vec<&str> = sizes.iter().map(|size| size.name.as_str()).collect();
            let list = quoted(&known);
            self.mistake(
                span,
                format!("\"{}\" names a strand that is not known", plain(&name)),
                format!("expected one of {}", plain(&list)),
                "name one of these, or describe the strand in a table [[tendon.strand]]",
            );
        }
        let size = default.and_then(|name| self.job.tendon.strand_named(&name));
        if let Some(name) = size.map(|size| size.name.clone()) {
            self.job.tendon.default_strand = Some(name);
        }
    }
}
