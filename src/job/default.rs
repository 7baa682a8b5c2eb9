//! The job that an empty job file gives. Why each value: the key's sentence and source in the table of keys.

use super::families::{group_patterns, height_patterns, mark_patterns, thickness_patterns};
use super::{
    Conventions, Datum, FromFace, HeightReading, Job, Layers, Limits, LongTerm, LongTermMethod,
    Profiling, Published, SlabJob, Soffit, StepKeeps, StrandSize, Stressing, System, TendonJob,
    Wobble,
};
use crate::units::{LengthUnit, Units};

impl Default for Job {
    /// Every key at its default.
    fn default() -> Self {
        Self {
            units: Units::Si,
            system: System::BondedFlatDuct,
            conventions: conventions(),
            slab: SlabJob {
                thickness_m: None,
                top_level_m: 0.0,
                step_keeps: StepKeeps::Thickness,
            },
            tendon: tendon(),
            stressing: Stressing {
                jacking_ratio: 0.75,
                mu_per_rad: 0.19,
                wobble: Wobble::RadPerM(0.008),
                draw_in_m: 0.006,
                first_pour: words(&["left", "bottom"]),
                order: Vec::new(),
            },
            profile: Profiling {
                inflection: 0.1,
                fit_inflection: false,
            },
            long_term: LongTerm {
                method: LongTermMethod::Direct,
                methods: Vec::new(),
                concrete_modulus_transfer_mpa: 28_000.0,
                concrete_modulus_mpa: 33_000.0,
                shortening_share: 0.5,
                concrete_stress_mpa: None,
                shrinkage_strain: 400e-6,
                creep_coefficient: 2.0,
                relaxation_1000h: 0.025,
                relaxation_factor: 3.0,
                published: Published::default(),
            },
            limits: Limits {
                cover_m: 0.020,
                hogging_radius_error_m: 2.5,
                hogging_radius_warning_m: 5.0,
                sagging_radius_error_m: 2.5,
                sagging_radius_warning_m: 5.0,
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
                memory_mb: 4000.0,
                expanded_entities: 1_000_000.0,
            },
        }
    }
}

fn conventions() -> Conventions {
    Conventions {
        unit: None,
        banded_along_rad: None,
        layers: Layers {
            banded: words(&["TENDON-BANDED*"]),
            distributed: words(&["TENDON-DISTRIBUTED*"]),
            tendons: Vec::new(),
            heights: words(&["TENDON-HEIGHT*"]),
            level_lines: words(&["TENDON-LEVEL-LINE*"]),
            marks: words(&["TENDON-MARK*"]),
            extents: words(&["TENDON-EXTENT*"]),
            ends: words(&["TENDON-END*"]),
            slab_edge: words(&["SLAB-EDGE*"]),
            slab_opening: words(&["SLAB-OPENING*"]),
            slab_zone: words(&["SLAB-ZONE*"]),
            column: words(&["COLUMN*"]),
        },
        live_end_blocks: words(&["LIVE-END*"]),
        dead_end_blocks: words(&["DEAD-END*"]),
        end_blocks: Vec::new(),
        end_attributes: words(&["*"]),
        live_end_words: words(&["LE", "LIVE", "S", "STRESSING"]),
        dead_end_words: words(&["DE", "DEAD", "FIXED"]),
        intermediate_blocks: words(&["INTERMEDIATE-ANCHOR*"]),
        intermediate_words: words(&["INTERMEDIATE", "INTERMEDIATE ANCHOR", "INT ANCHOR"]),
        live_end_shapes: Vec::new(),
        dead_end_shapes: Vec::new(),
        mark_patterns: mark_patterns(),
        height_patterns: height_patterns(LengthUnit::Mm),
        high_words: words(&["H", "HP", "HIGH"]),
        low_words: words(&["L", "LP", "LOW"]),
        middle_words: words(&["T/2", "h/2", "MID"]),
        thickness_patterns: thickness_patterns(LengthUnit::Mm),
        thickness_unit: LengthUnit::Mm,
        height: HeightReading {
            unit: LengthUnit::Mm,
            datum: Datum::Centroid,
            from: FromFace::Soffit,
            soffit: Soffit::Local,
            strand_in_duct_low_m: 0.013,
            strand_in_duct_high_m: 0.007,
        },
        arrow_reach_m: 0.1,
        tick_blocks: words(&["TICK*", "DOT*"]),
        group_patterns: group_patterns(),
        label_reach: 3.0,
        end_reach_m: 0.5,
        join_gap_m: 0.010,
        bridge_gap_m: 0.0,
        overlap_m: 0.5,
    }
}

fn tendon() -> TendonJob {
    let size = |name: &str, aliases: &[&str], area_mm2| StrandSize {
        name: name.to_owned(),
        aliases: words(aliases),
        area_mm2,
        strength_mpa: 1860.0,
    };
    TendonJob {
        strands: vec![
            size("12.7", &["0.5"], 98.7),
            size("12.9", &[], 100.0),
            size("15.2", &["0.6", "15.24"], 140.0),
            size("15.7", &["0.62"], 150.0),
        ],
        default_strand: None,
        default_strands: None,
        strand_modulus_mpa: 195_000.0,
        yield_ratio: 0.9,
        duct_height_m: 0.020,
    }
}

fn words(words: &[&str]) -> Vec<String> {
    words.iter().map(|&word| word.to_owned()).collect()
}
