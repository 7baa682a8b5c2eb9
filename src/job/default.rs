//! The job that an empty job file gives. Why each value: the key's sentence and source in the table of keys.

use regex::Regex;

use super::{
    Conventions, Datum, FromFace, HeightReading, Job, Layers, Limits, LongTerm, LongTermMethod,
    Profiling, SlabJob, StrandSize, Stressing, System, Wobble,
};
use crate::units::LengthUnit;

impl Default for Job {
    /// Every key at its default.
    fn default() -> Self {
        Self {
            conventions: conventions(),
            slab: SlabJob { thickness_m: None },
            system: system(),
            stressing: Stressing {
                jacking_ratio: 0.75,
                mu_per_rad: 0.19,
                wobble: Wobble::RadPerM(0.008),
                draw_in_m: 0.006,
            },
            profile: Profiling {
                inflection: 0.1,
                fit_inflection: false,
            },
            long_term: LongTerm {
                method: LongTermMethod::Direct,
                concrete_modulus_transfer_mpa: 28_000.0,
                concrete_modulus_mpa: 33_000.0,
                shortening_share: 0.5,
                concrete_stress_mpa: None,
                shrinkage_strain: 400e-6,
                creep_coefficient: 2.0,
                relaxation_1000h: 0.025,
                relaxation_factor: 3.0,
            },
            limits: Limits {
                cover_m: 0.020,
                hogging_radius_error_m: 2.5,
                hogging_radius_warning_m: 5.0,
                support_residual_warning_m: 0.005,
                support_residual_error_m: 0.010,
                plan_radius_m: 6.0,
                far_end_ratio: 0.80,
                curvature_loss_ratio: 0.15,
                angle_per_m_rad: 0.10,
                jacking_stress_ratio: 0.80,
                jacking_yield_ratio: 0.94,
                anchor_stress_ratio: 0.70,
                one_end_length_m: 35.0,
                opening_clearance_m: 0.150,
                edge_tolerance_m: 0.050,
            },
        }
    }
}

fn conventions() -> Conventions {
    Conventions {
        unit: None,
        layers: Layers {
            banded: words(&["TENDON-BANDED*"]),
            distributed: words(&["TENDON-DISTRIBUTED*"]),
            heights: words(&["TENDON-HEIGHT*"]),
            level_lines: words(&["TENDON-LEVEL-LINE*"]),
            marks: words(&["TENDON-MARK*"]),
            ends: words(&["TENDON-END*"]),
            slab_edge: words(&["SLAB-EDGE*"]),
            slab_opening: words(&["SLAB-OPENING*"]),
            slab_zone: words(&["SLAB-ZONE*"]),
            column: words(&["COLUMN*"]),
        },
        live_end_blocks: words(&["LIVE-END*"]),
        dead_end_blocks: words(&["DEAD-END*"]),
        mark_patterns: expressions(&[
            r"(?i)^(?<mark>[A-Z]{1,3}-?\d+[A-Z]?)\s+(?:(?<tendons>\d+)\s*[x×]\s*)?(?<strands>\d+)\s*[-/S]\s*(?<strand>\d+(?:\.\d+)?)$",
            r"(?i)^(?<mark>[A-Z]{1,3}-?\d+[A-Z]?)$",
            r"(?i)^(?:(?<tendons>\d+)\s*[x×]\s*)?(?<strands>\d+)\s*[-/S]\s*(?<strand>\d+(?:\.\d+)?)$",
        ]),
        height_patterns: height_patterns(LengthUnit::Mm),
        high_words: words(&["H", "HP", "HIGH"]),
        low_words: words(&["L", "LP", "LOW"]),
        thickness_patterns: thickness_patterns(LengthUnit::Mm),
        thickness_unit: LengthUnit::Mm,
        height: HeightReading {
            unit: LengthUnit::Mm,
            datum: Datum::Centroid,
            from: FromFace::Soffit,
            strand_in_duct_low_m: 0.013,
            strand_in_duct_high_m: 0.007,
        },
        label_reach: 3.0,
        end_reach_m: 0.5,
        join_gap_m: 0.010,
        bridge_gap_m: 0.0,
        overlap_m: 0.5,
    }
}

fn system() -> System {
    let size = |name: &str, area_mm2| StrandSize {
        name: name.to_owned(),
        area_mm2,
        strength_mpa: 1860.0,
    };
    System {
        strands: vec![
            size("12.7", 98.7),
            size("12.9", 100.0),
            size("15.2", 140.0),
            size("15.7", 150.0),
        ],
        default_strand: None,
        strand_modulus_mpa: 195_000.0,
        yield_ratio: 0.9,
        duct_height_m: 0.020,
    }
}

/// A number as a drawing in this unit writes it: fractions only where the unit is the inch or the foot, so that
/// `1 1/4` on a metric drawing is never taken for a height.
fn number(unit: LengthUnit) -> &'static str {
    match unit {
        LengthUnit::Mm | LengthUnit::Cm | LengthUnit::M => r"-?\d+(?:\.\d+)?",
        LengthUnit::In | LengthUnit::Ft => {
            r#"-?(?:\d+(?:\.\d+)?(?:[ -]\d+/\d+)?|\d+/\d+|\d*\s?[¼½¾⅛⅜⅝⅞])["']?"#
        }
    }
}

/// Default patterns of heights in this unit: `H165`, `H 165`, `165H`, `165`.
pub(super) fn height_patterns(unit: LengthUnit) -> Vec<Regex> {
    let number = number(unit);
    expressions(&[
        &format!(r"(?i)^(?:(?<word>[A-Z]+)\s*=?\s*)?(?<value>{number})$"),
        &format!(r"(?i)^(?<value>{number})\s*(?<word>[A-Z]+)$"),
    ])
}

/// Default patterns of slab thickness in this unit: `T350`, `T 350`, `T=350`.
pub(super) fn thickness_patterns(unit: LengthUnit) -> Vec<Regex> {
    let number = number(unit);
    expressions(&[&format!(r"(?i)^T\s*=?\s*(?<value>{number})$")])
}

fn words(words: &[&str]) -> Vec<String> {
    words.iter().map(|&word| word.to_owned()).collect()
}

/// All of these patterns compile: the tests count them.
fn expressions(patterns: &[&str]) -> Vec<Regex> {
    patterns
        .iter()
        .filter_map(|pattern| Regex::new(pattern).ok())
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn group(patterns: &[Regex], text: &str, name: &str) -> Option<String> {
        let found = patterns.iter().find_map(|pattern| pattern.captures(text))?;
        found.name(name).map(|part| part.as_str().to_owned())
    }

    #[test]
    fn every_default_pattern_compiles() {
        let read = Job::default().conventions;
        assert_eq!(read.mark_patterns.len(), 3);
        for unit in [LengthUnit::Mm, LengthUnit::In] {
            assert_eq!(height_patterns(unit).len(), 2);
            assert_eq!(thickness_patterns(unit).len(), 1);
        }
    }

    #[test]
    fn marks_are_read_with_their_strands() {
        let patterns = Job::default().conventions.mark_patterns;
        let all = |text: &str| {
            ["mark", "tendons", "strands", "strand"]
                .map(|name| group(&patterns, text, name).unwrap_or_default())
        };
        assert_eq!(all("D012 5-12.7"), ["D012", "", "5", "12.7"]);
        assert_eq!(all("B03 4x5-12.7"), ["B03", "4", "5", "12.7"]);
        assert_eq!(all("b03\n4 x 5S12.7"), ["b03", "4", "5", "12.7"]);
        assert_eq!(all("5-12.7"), ["", "", "5", "12.7"]);
        assert_eq!(all("3x5-15.2"), ["", "3", "5", "15.2"]);
        assert_eq!(all("D7"), ["D7", "", "", ""]);
        assert_eq!(all("SEE NOTE 4"), ["", "", "", ""]);
    }

    #[test]
    fn heights_are_read_with_their_word_on_either_side() {
        let both = |unit, text: &str| {
            ["word", "value"]
                .map(|name| group(&height_patterns(unit), text, name).unwrap_or_default())
        };
        let metric = LengthUnit::Mm;
        assert_eq!(both(metric, "H165"), ["H", "165"]);
        assert_eq!(both(metric, "H 165"), ["H", "165"]);
        assert_eq!(both(metric, "165H"), ["H", "165"]);
        assert_eq!(both(metric, "L30"), ["L", "30"]);
        assert_eq!(both(metric, "-20"), ["", "-20"]);
        assert_eq!(both(metric, "165"), ["", "165"]);
        assert_eq!(both(metric, "1 1/4\""), ["", ""]);
        let inch = LengthUnit::In;
        assert_eq!(both(inch, "1 1/4\""), ["", "1 1/4\""]);
        assert_eq!(both(inch, "H 1-1/4"), ["H", "1-1/4"]);
        assert_eq!(both(inch, "7/8\" L"), ["L", "7/8\""]);
        assert_eq!(both(inch, "1½"), ["", "1½"]);
        assert_eq!(both(inch, "½\""), ["", "½\""]);
        assert_eq!(both(inch, "5.25"), ["", "5.25"]);
    }
}
