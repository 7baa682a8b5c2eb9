//! The job as every stage reads it: all values present, in internal units.

use std::fmt;

use super::System;
use super::pattern::Pattern;
use super::published::{LongTermMethod, Published};
use crate::units::{LengthUnit, Units};

/// Everything a job decides.
#[derive(Debug, Clone)]
pub struct Job {
    /// Units that results are written in.
    pub units: Units,
    /// The system whose defaults hold.
    pub system: System,
    /// How the drawing is to be read.
    pub conventions: Conventions,
    /// The slab, where the drawing does not say.
    pub slab: SlabJob,
    /// Strand and duct.
    pub tendon: TendonJob,
    /// Jacking, friction, draw-in.
    pub stressing: Stressing,
    /// Shape between the marked heights.
    pub profile: Profiling,
    /// Elastic shortening and long-term loss.
    pub long_term: LongTerm,
    /// Limits of the rules.
    pub limits: Limits,
}

/// Words for the shapes that may mark an end.
pub const END_SHAPES: &[&str] = &["circle", "triangle", "square", "bar", "solid"];

/// Words for the sides of a plan.
pub const SIDES: &[&str] = &["left", "right", "bottom", "top"];

/// How the drawing is to be read.
#[derive(Debug, Clone)]
pub struct Conventions {
    /// Drawing unit; `None`: the drawing's own `$INSUNITS`.
    pub unit: Option<LengthUnit>,
    /// Layer patterns by what lies on them.
    pub layers: Layers,
    /// Direction of banded tendons in plan, radians from x, where a tendon's layer does not tell its run.
    pub banded_along_rad: Option<f64>,
    /// Names of the blocks that mark a live end (shell patterns, any case).
    pub live_end_blocks: Vec<String>,
    /// Names of the blocks that mark a dead end.
    pub dead_end_blocks: Vec<String>,
    /// Names of the blocks that mark an end whose kind an attribute, a word beside or nothing tells.
    pub end_blocks: Vec<String>,
    /// Tags of the attributes of those blocks that hold a live or dead word (shell patterns, any case).
    pub end_attributes: Vec<String>,
    /// Words that mark a live end.
    pub live_end_words: Vec<String>,
    /// Words that mark a dead end.
    pub dead_end_words: Vec<String>,
    /// Names of the blocks that mark an intermediate anchor, where a tendon goes on into the next pour.
    pub intermediate_blocks: Vec<String>,
    /// Words that mark an intermediate anchor.
    pub intermediate_words: Vec<String>,
    /// Shapes that mark a live end: words of [`END_SHAPES`].
    pub live_end_shapes: Vec<String>,
    /// Shapes that mark a dead end, likewise.
    pub dead_end_shapes: Vec<String>,
    /// Patterns of marks, strand counts and required forces; groups `mark`, `tendons`, `strands`, `strand`, `force`,
    /// `force_per_width`, each optional.
    pub mark_patterns: Vec<Pattern>,
    /// Patterns of heights; groups `word` (see `high_words`, `low_words`; optional) and `value`.
    pub height_patterns: Vec<Pattern>,
    /// Words for a high point.
    pub high_words: Vec<String>,
    /// Words for a low point.
    pub low_words: Vec<String>,
    /// Words that stand for mid-depth, whatever the thickness.
    pub middle_words: Vec<String>,
    /// Patterns of a slab's or a zone's thickness and levels; groups `value`, `top`, `soffit`, `down`.
    pub thickness_patterns: Vec<Pattern>,
    /// Unit of thickness texts.
    pub thickness_unit: LengthUnit,
    /// What a height number means.
    pub height: HeightReading,
    /// Reach of a label from its tendon, in text heights.
    pub label_reach: f64,
    /// How far the tip of a leader may lie from the tendon it points at, metres.
    pub arrow_reach_m: f64,
    /// Blocks that mark the place of a height on its tendon (shell patterns, any case).
    pub tick_blocks: Vec<String>,
    /// Patterns of groups of like tendons; groups `first`, `last` (marks), `number`, `spacing`, each optional.
    pub group_patterns: Vec<Pattern>,
    /// How far an end symbol may lie from the end, metres.
    pub end_reach_m: f64,
    /// Gap that still counts as end to end, metres.
    pub join_gap_m: f64,
    /// Gap in a tendon line that is bridged between pieces in line with one another, metres.
    pub bridge_gap_m: f64,
    /// Overlap that makes two pieces in line with one another one tendon, metres.
    pub overlap_m: f64,
}

/// Layer patterns: see [`crate::patterns::Selectors`].
#[derive(Debug, Clone)]
pub struct Layers {
    /// Banded tendons.
    pub banded: Vec<String>,
    /// Distributed tendons.
    pub distributed: Vec<String>,
    /// Tendons of either run, told apart by direction.
    pub tendons: Vec<String>,
    /// Height labels.
    pub heights: Vec<String>,
    /// Lines that give one height to every tendon they cross, and their labels.
    pub level_lines: Vec<String>,
    /// Marks and strand counts.
    pub marks: Vec<String>,
    /// Lines across a group of like tendons.
    pub extents: Vec<String>,
    /// End symbols.
    pub ends: Vec<String>,
    /// Slab edge.
    pub slab_edge: Vec<String>,
    /// Openings.
    pub slab_opening: Vec<String>,
    /// Thickness zones and thickness texts.
    pub slab_zone: Vec<String>,
    /// Columns and walls.
    pub column: Vec<String>,
}

/// What a height number on the drawing means.
#[derive(Debug, Clone)]
pub struct HeightReading {
    /// Unit of the number.
    pub unit: LengthUnit,
    /// What is measured to.
    pub datum: Datum,
    /// What is measured from.
    pub from: FromFace,
    /// Which soffit, where it is one.
    pub soffit: Soffit,
    /// Strand centroid above the duct's underside at a low point, metres (the strand rises to the duct's top).
    pub strand_in_duct_low_m: f64,
    /// Strand centroid above the duct's underside at a high point, metres.
    pub strand_in_duct_high_m: f64,
}

impl fmt::Display for HeightReading {
    /// Such as `mm above the local soffit to the centroid of the strands`.
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let soffit = match self.soffit {
            Soffit::Local => "above the local soffit",
            Soffit::General => "above the general slab's soffit",
        };
        let from = match self.from {
            FromFace::Soffit => soffit,
            FromFace::Top => "below the top of the slab",
            FromFace::NearerFace => "from the nearer face",
        };
        let to = match self.datum {
            Datum::Centroid => "centroid of the strands",
            Datum::DuctUnderside => "underside of the duct",
            Datum::Chair => "top of the chair, which is the underside of the duct",
        };
        write!(f, "{} {from} to the {to}", self.unit.name())
    }
}

/// What a height is measured to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Datum {
    /// The strands' centroid.
    Centroid,
    /// The duct's underside.
    DuctUnderside,
    /// The top of the chair that the duct stands on, which is the duct's underside.
    Chair,
}

/// The face a height is measured from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum FromFace {
    /// The local soffit, upwards.
    Soffit,
    /// The top of the slab, downwards.
    Top,
    /// Whichever of the two is nearer: a high point from the top, a low point from the soffit.
    NearerFace,
}

/// The soffit that heights are measured from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Soffit {
    /// The one at the place.
    Local,
    /// The general slab's: below it, in a drop or a beam, heights are negative.
    General,
}

/// The slab, where the drawing does not say.
#[derive(Debug, Clone)]
pub struct SlabJob {
    /// General thickness, metres; `None`: the drawing's own text.
    pub thickness_m: Option<f64>,
    /// Level of the general slab's top as the drawing counts levels, metres.
    pub top_level_m: f64,
    /// What a zone keeps of the slab around it where its text gives only a top.
    pub step_keeps: StepKeeps,
}

/// What runs on through a step in the top whose text gives neither thickness nor soffit.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum StepKeeps {
    /// The thickness: the soffit steps with the top.
    Thickness,
    /// The soffit: the slab is thinner, or thicker, by the step.
    Soffit,
}

/// A size of strand.
#[derive(Debug, Clone)]
pub struct StrandSize {
    /// Name as written in marks, such as `12.7`.
    pub name: String,
    /// Other names, such as `0.5` for inches; signs, blanks and the form of a fraction do not matter.
    pub aliases: Vec<String>,
    /// Steel area, mm².
    pub area_mm2: f64,
    /// Characteristic tensile strength, MPa.
    pub strength_mpa: f64,
}

/// Strand and duct.
#[derive(Debug, Clone)]
pub struct TendonJob {
    /// Known strand sizes.
    pub strands: Vec<StrandSize>,
    /// Size of a strand where a mark gives only a count; `None`: a finding.
    pub default_strand: Option<String>,
    /// Strands in each tendon for which the drawing gives no number; `None`: a finding.
    pub default_strands: Option<u32>,
    /// Strand modulus, MPa.
    pub strand_modulus_mpa: f64,
    /// Yield (0.1 % proof or as the limit's standard says) as a fraction of strength.
    pub yield_ratio: f64,
    /// Overall height of a duct, metres.
    pub duct_height_m: f64,
}

/// Jacking, friction, draw-in.
#[derive(Debug, Clone)]
pub struct Stressing {
    /// Jacking stress over strength.
    pub jacking_ratio: f64,
    /// Friction coefficient, per radian.
    pub mu_per_rad: f64,
    /// Wobble in either form.
    pub wobble: Wobble,
    /// Wedge draw-in at each live end, metres.
    pub draw_in_m: f64,
    /// Sides of the plan ([`SIDES`]): of a tendon with intermediate anchors between two live ends, the pour at the end that
    /// lies there is stressed first. The first word that tells the two ends apart holds.
    pub first_pour: Vec<String>,
    /// Order of stressing: marks or shell patterns, any letter case; empty where the job gives none.
    pub order: Vec<String>,
}

/// Unintended curvature: φ = μ (α + k s), or φ = μ α + K s.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Wobble {
    /// k, radians per metre, multiplied by μ (EN 1992-1-1 5.10.5.2).
    RadPerM(f64),
    /// K, per metre, on its own (ACI, BS form).
    PerM(f64),
}

/// Shape between the marked heights.
#[derive(Debug, Clone)]
pub struct Profiling {
    /// Hogging length at a high point as a fraction of the span.
    pub inflection: f64,
    /// Fit the hogging length to support heights by least squares.
    pub fit_inflection: bool,
}

/// Elastic shortening and long-term loss.
#[derive(Debug, Clone)]
pub struct LongTerm {
    /// The method whose forces are drawn and checked.
    pub method: LongTermMethod,
    /// Words of the methods to show beside it ([`LongTermMethod::of`]); where it is among them it is shown once.
    pub methods: Vec<String>,
    /// Concrete modulus at stressing, MPa.
    pub concrete_modulus_transfer_mpa: f64,
    /// Concrete modulus at 28 days, MPa.
    pub concrete_modulus_mpa: f64,
    /// Share of (Ep/Eci) σc lost by elastic shortening: 0.5 stressed in turn, 0 all at once (common practice).
    pub shortening_share: f64,
    /// Mean concrete stress, MPa; `None`: from the floor's own tendons and slab.
    pub concrete_stress_mpa: Option<f64>,
    /// Shrinkage strain after stressing.
    pub shrinkage_strain: f64,
    /// Creep coefficient.
    pub creep_coefficient: f64,
    /// Relaxation at 1000 hours, as a fraction of the stress after lock-off.
    pub relaxation_1000h: f64,
    /// Final relaxation over the 1000-hour value.
    pub relaxation_factor: f64,
    /// What the published methods ask.
    pub published: Published,
}

/// Limits of the rules; each field's sentence says which.
#[derive(Debug, Clone)]
pub struct Limits {
    /// Clear concrete between duct and either face, metres.
    pub cover_m: f64,
    /// Hogging radius below which is an error, metres.
    pub hogging_radius_error_m: f64,
    /// Hogging radius below which is a warning, metres.
    pub hogging_radius_warning_m: f64,
    /// Sagging radius below which is an error, metres.
    pub sagging_radius_error_m: f64,
    /// Sagging radius below which is a warning, metres.
    pub sagging_radius_warning_m: f64,
    /// Support height off the curve, metres, above which is a warning.
    pub support_residual_warning_m: f64,
    /// Support height off the curve, metres, above which is an error.
    pub support_residual_error_m: f64,
    /// Plan radius below which is a warning, metres.
    pub plan_radius_m: f64,
    /// Force at the far end over jacking force, below which is a warning.
    pub far_end_ratio: f64,
    /// Share of jacking force lost to angle alone, above which is a warning.
    pub curvature_loss_ratio: f64,
    /// Angle turned per metre, radians, above which is a warning.
    pub angle_per_m_rad: f64,
    /// Jacking stress over strength, above which is an error.
    pub jacking_stress_ratio: f64,
    /// Jacking stress over yield, above which is an error.
    pub jacking_yield_ratio: f64,
    /// Stress at the anchor after lock-off over strength, above which is an error.
    pub anchor_stress_ratio: f64,
    /// Length of a tendon stressed from one end, metres, above which is a warning.
    pub one_end_length_m: f64,
    /// Clear distance between a tendon and an opening, metres, below which is a warning.
    pub opening_clearance_m: f64,
    /// How far a tendon may stand outside the slab edge, metres.
    pub edge_tolerance_m: f64,
    /// Memory that a drawing may take by an estimate, megabytes.
    pub memory_mb: f64,
    /// Entities that block inserts may expand to.
    pub expanded_entities: f64,
}

impl Job {
    /// Patterns of all layers that the job names.
    pub fn layer_patterns(&self) -> Vec<String> {
        let layers = &self.conventions.layers;
        [
            &layers.banded,
            &layers.distributed,
            &layers.tendons,
            &layers.heights,
            &layers.level_lines,
            &layers.marks,
            &layers.extents,
            &layers.ends,
            &layers.slab_edge,
            &layers.slab_opening,
            &layers.slab_zone,
            &layers.column,
        ]
        .into_iter()
        .flatten()
        .cloned()
        .collect()
    }
}
