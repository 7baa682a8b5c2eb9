//! The keys of the job file, in the order a file shows them.

use super::key::{Key, Kind, Place};
use super::{
    Cement, Datum, END_SHAPES, Environment, FromFace, Job, LongTermMethod, RelaxationClass, SIDES,
    Soffit, StepKeeps, System, Wobble,
};
use crate::units::{LengthUnit, Units};

/// A number that the job always has; `scale` is key units in one internal unit.
macro_rules! number {
    ($least:literal ..= $most:literal, $($place:ident).+, $scale:expr) => {
        Kind::Number {
            least: $least,
            most: $most,
            example: $least,
            get: |job| Some(tidy(job.$($place).+ * $scale)),
            set: |job, number| job.$($place).+ = number / $scale,
        }
    };
}

/// A number that the job may lack.
macro_rules! maybe {
    ($least:literal ..= $most:literal, $example:literal, $($place:ident).+, $scale:expr) => {
        Kind::Number {
            least: $least,
            most: $most,
            example: $example,
            get: |job| job.$($place).+.map(|number| tidy(number * $scale)),
            set: |job, number| job.$($place).+ = Some(number / $scale),
        }
    };
}

/// A list.
macro_rules! place {
    ($($place:ident).+) => {
        Place {
            get: |job| &job.$($place).+,
            set: |job, list| job.$($place).+ = list,
        }
    };
}

/// A length unit that the job always has.
macro_rules! unit {
    ($($place:ident).+) => {
        Kind::Choice {
            words: UNITS,
            get: |job| Some(job.$($place).+.name()),
            set: |job, word| if let Some(unit) = unit(word) { job.$($place).+ = unit },
        }
    };
}

/// A word of a list of kinds.
macro_rules! word {
    ($kind:ident, $($place:ident).+) => {
        Kind::Choice {
            words: $kind::WORDS,
            get: |job| Some(job.$($place).+.word()),
            set: |job, word| if let Some(kind) = $kind::of(word) { job.$($place).+ = kind },
        }
    };
}

const MM: f64 = 1000.0;
const ONE: f64 = 1.0;
const DEG: f64 = 180.0 / std::f64::consts::PI;
const UNITS: &[&str] = &["mm", "cm", "m", "in", "ft"];
const CONVENTION: &str = "drawing convention of this program";

fn unit(word: &str) -> Option<LengthUnit> {
    use LengthUnit::{Cm, Ft, In, M, Mm};
    [Mm, Cm, M, In, Ft]
        .into_iter()
        .find(|unit| unit.name() == word)
}

/// Twelve significant digits: what was typed in millimetres reads back the same after a turn through metres.
fn tidy(number: f64) -> f64 {
    format!("{number:.11e}").parse().unwrap_or(number)
}

const fn key(
    table: &'static str,
    name: &'static str,
    kind: Kind,
    meaning: &'static str,
    source: &'static str,
) -> Key {
    Key {
        table,
        name,
        kind,
        meaning,
        source,
    }
}

/// The name of the place for keys that stand before every table.
pub const ROOT: &str = "";

/// Tables, in order, each with a sentence.
#[rustfmt::skip]
pub const TABLES: &[(&str, &str)] = &[
    (ROOT, "What holds for the whole job; these keys stand before every [table]."),
    ("drawing", "How the drawing is measured and its lines are joined."),
    ("layers", "What lies on which layer: shell patterns, any letter case, also behind the prefix of a reference (REF$0$NAME, REF|NAME). NAME@colour=1 and NAME@linetype=DASHED* pick by what is seen."),
    ("ends", "How the drawing marks the ends of a tendon."),
    ("labels", "How marks and strand counts are written."),
    ("height", "How heights are written and what they measure."),
    ("slab", "The slab's thickness and how the drawing writes it."),
    ("tendon", "Strand and duct."),
    ("stressing", "Jacking, friction, draw-in."),
    ("profile", "The curve between the marked heights."),
    ("long_term", "Elastic shortening, shrinkage, creep, relaxation."),
    ("limits", "Where a finding begins, and how much a drawing may cost."),
];

/// Every key.
#[rustfmt::skip]
pub static KEYS: &[Key] = &[
    key(ROOT, "units", Kind::Choice {
            words: &["si", "us"],
            get: |job| Some(job.units.name()),
            set: |job, word| if let Some(units) = Units::named(word) { job.units = units },
        },
        "Units of what is written; the result file is in SI always, and the keys of this file are in the units of their names.",
        CONVENTION),
    key(ROOT, "system", Kind::Choice {
            words: &["bonded-flat-duct", "greased-single-strand"],
            get: |job| Some(job.system.name()),
            set: |job, word| if let Some(system) = System::named(word) { system.set(job) },
        },
        "The system of tendon, whose usual friction, draw-in, duct, cover and radius in plan are the defaults of their keys.",
        CONVENTION),

    key("drawing", "unit", Kind::Choice {
            words: UNITS,
            get: |job| job.conventions.unit.map(LengthUnit::name),
            set: |job, word| job.conventions.unit = unit(word),
        },
        "Unit of the drawing's coordinates.",
        "the drawing's own $INSUNITS; millimetres where it has none"),
    key("drawing", "join_gap_mm", number!(0.0..=500.0, conventions.join_gap_m, MM),
        "Pieces of a tendon whose ends are this close are one line.", CONVENTION),
    key("drawing", "bridge_gap_mm", number!(0.0..=5000.0, conventions.bridge_gap_m, MM),
        "Pieces in line with one another are one tendon across a gap of up to this length, as where a line is broken at a label.", CONVENTION),
    key("drawing", "overlap_mm", number!(0.0..=5000.0, conventions.overlap_m, MM),
        "Pieces in line with one another that overlap by up to this length are one tendon; more is a line drawn twice.", CONVENTION),
    key("drawing", "banded_along_deg", maybe!(-360.0..=360.0, 0.0, conventions.banded_along_rad, DEG),
        "Direction of banded tendons in plan, degrees from the x axis; for tendons of layers.tendons, of which those nearer to its normal are distributed.",
        "all tendons of layers.tendons are distributed"),

    key("layers", "banded", Kind::Shell(place!(conventions.layers.banded)),
        "Tendons gathered along column lines.", CONVENTION),
    key("layers", "distributed", Kind::Shell(place!(conventions.layers.distributed)),
        "Tendons spread over the floor.", CONVENTION),
    key("layers", "tendons", Kind::Shell(place!(conventions.layers.tendons)),
        "Tendons of either run, told apart by drawing.banded_along_deg.", CONVENTION),
    key("layers", "heights", Kind::Shell(place!(conventions.layers.heights)),
        "Height labels.", CONVENTION),
    key("layers", "level_lines", Kind::Shell(place!(conventions.layers.level_lines)),
        "Lines that give one height to every tendon they cross, and their labels.", CONVENTION),
    key("layers", "marks", Kind::Shell(place!(conventions.layers.marks)),
        "Marks and strand counts.", CONVENTION),
    key("layers", "extents", Kind::Shell(place!(conventions.layers.extents)),
        "Lines across a group of like tendons of which only some are drawn: they say how far it extends.", CONVENTION),
    key("layers", "ends", Kind::Shell(place!(conventions.layers.ends)),
        "Symbols at the ends of tendons: blocks, words, shapes.", CONVENTION),
    key("layers", "slab_edge", Kind::Shell(place!(conventions.layers.slab_edge)),
        "Outline of the slab.", CONVENTION),
    key("layers", "slab_opening", Kind::Shell(place!(conventions.layers.slab_opening)),
        "Openings.", CONVENTION),
    key("layers", "slab_zone", Kind::Shell(place!(conventions.layers.slab_zone)),
        "Zones with a thickness of their own, and thickness texts; on a layer of slab_edge too, outlines that lie in another are zones.", CONVENTION),
    key("layers", "column", Kind::Shell(place!(conventions.layers.column)),
        "Columns and walls.", CONVENTION),

    key("ends", "live_blocks", Kind::Shell(place!(conventions.live_end_blocks)),
        "Blocks that mark an end stressed from (shell patterns, any letter case).", CONVENTION),
    key("ends", "dead_blocks", Kind::Shell(place!(conventions.dead_end_blocks)),
        "Blocks that mark a fixed end (shell patterns, any letter case).", CONVENTION),
    key("ends", "blocks", Kind::Shell(place!(conventions.end_blocks)),
        "Blocks that mark an end whose kind an attribute, a word inside or beside it tells (shell patterns, any letter case).",
        CONVENTION),
    key("ends", "attributes", Kind::Shell(place!(conventions.end_attributes)),
        "Tags of those blocks' attributes that hold a live or dead word (shell patterns, any letter case).", CONVENTION),
    key("ends", "live_words", Kind::Words(place!(conventions.live_end_words)),
        "Words at an end stressed from, as texts or attributes, in any letter case, with or without END behind them.",
        "common practice"),
    key("ends", "dead_words", Kind::Words(place!(conventions.dead_end_words)),
        "Words at a fixed end, likewise.", "common practice"),
    key("ends", "intermediate_blocks", Kind::Shell(place!(conventions.intermediate_blocks)),
        "Blocks that mark an intermediate anchor, where a tendon goes on into the next pour (shell patterns, any letter case).",
        CONVENTION),
    key("ends", "intermediate_words", Kind::Words(place!(conventions.intermediate_words)),
        "Words at an intermediate anchor, as texts or attributes of ends.blocks, in any letter case.", CONVENTION),
    key("ends", "live_shapes", Kind::Choices {
            words: END_SHAPES,
            place: place!(conventions.live_end_shapes),
        },
        "Shapes drawn on layers.ends at an end stressed from; solid is a SOLID or TRACE of any outline, hatches are not read.",
        CONVENTION),
    key("ends", "dead_shapes", Kind::Choices {
            words: END_SHAPES,
            place: place!(conventions.dead_end_shapes),
        },
        "Shapes drawn on layers.ends at a fixed end, likewise.", CONVENTION),
    key("ends", "unmarked_is_dead", Kind::Switch {
            get: |job| job.conventions.unmarked_is_dead,
            set: |job, on| job.conventions.unmarked_is_dead = on,
        },
        "Whether an end without any symbol is a fixed one: for drawings that mark only the ends stressed from.", CONVENTION),
    key("ends", "reach_mm", number!(1.0..=10_000.0, conventions.end_reach_m, MM),
        "How far an end symbol may lie from the end it marks.", CONVENTION),

    key("labels", "reach_text_heights", number!(0.1..=100.0, conventions.label_reach, ONE),
        "How far a label may lie from its tendon, in heights of its own text.", CONVENTION),
    key("labels", "mark_patterns", Kind::Expressions {
            groups: &["mark", "strands", "tendons", "strand", "force", "force_per_width"],
            also: &[],
            says: &["unit", "strands", "strand"],
            place: place!(conventions.mark_patterns),
        },
        "Marks, strands and required forces, the first that fits a line: groups mark, tendons, strands, strand, force, force_per_width. \
         A table may say unit (kN, kip, kN/m, kip/ft), strands (in each tendon of a count), strand.", CONVENTION),

    key("labels", "arrow_reach_mm", number!(1.0..=2000.0, conventions.arrow_reach_m, MM),
        "How far the tip of a leader may lie from the tendon it points at.", CONVENTION),
    key("labels", "tick_blocks", Kind::Shell(place!(conventions.tick_blocks)),
        "Blocks on the layers of heights that mark the place of a height on its tendon (shell patterns, any letter case).", CONVENTION),
    key("labels", "group_patterns", Kind::Expressions {
            groups: &["first", "last", "number", "each", "spacing"],
            also: &[],
            says: &["unit"],
            place: place!(conventions.group_patterns),
        },
        "Groups of like tendons, beside a line of layers.extents: groups first, last, number, each (tendons at a place), spacing, gathered from all patterns that fit.", CONVENTION),

    key("height", "unit", unit!(conventions.height.unit),
        "Unit of the numbers; in and ft may be written with fractions.", CONVENTION),
    key("height", "datum", Kind::Choice {
            words: Datum::WORDS,
            get: |job| Some(job.conventions.height.datum.word()),
            set: |job, word| job.conventions.height.datum = Datum::of(word),
        },
        "What a height is measured to: the strands' centroid, the duct's underside, or the chair below it, which is the same.", CONVENTION),
    key("height", "from", Kind::Choice {
            words: FromFace::WORDS,
            get: |job| Some(job.conventions.height.from.word()),
            set: |job, word| job.conventions.height.from = FromFace::of(word),
        },
        "What a height is measured from: the soffit upwards, the local top downwards, or the nearer of the two (a high point from the top, a low point from the soffit).", CONVENTION),
    key("height", "soffit", Kind::Choice {
            words: &["local", "general"],
            get: |job| Some(match job.conventions.height.soffit {
                Soffit::Local => "local",
                Soffit::General => "general",
            }),
            set: |job, word| job.conventions.height.soffit = match word {
                "general" => Soffit::General,
                _ => Soffit::Local,
            },
        },
        "Which soffit heights are measured from in drops, beams and steps: the one there, or the general slab's (below which heights are negative).", CONVENTION),
    key("height", "patterns", Kind::Expressions {
            groups: &["value"],
            also: &["word"],
            says: &["unit", "from", "datum", "word"],
            place: place!(conventions.height_patterns),
        },
        "Heights, the first that fits a line: groups word (optional) and value. \
         A table may say unit, from, datum, and word where the text has none.", CONVENTION),
    key("height", "high_words", Kind::Words(place!(conventions.high_words)),
        "Words of a high point.", "common practice"),
    key("height", "low_words", Kind::Words(place!(conventions.low_words)),
        "Words of a low point.", "common practice"),
    key("height", "middle_words", Kind::Words(place!(conventions.middle_words)),
        "Words that stand for mid-depth in place of a number.", "common practice"),
    key("height", "strand_in_duct_low_mm", number!(0.0..=300.0, conventions.height.strand_in_duct_low_m, MM),
        "Strands' centroid above the duct's underside at a low point, where the pulled strand lies at the duct's top.",
        "worked out for 12.7 mm strand in a flat duct 20 mm high"),
    key("height", "strand_in_duct_high_mm", number!(0.0..=300.0, conventions.height.strand_in_duct_high_m, MM),
        "Strands' centroid above the duct's underside at a high point, where the pulled strand lies on its bottom.",
        "worked out for 12.7 mm strand in a flat duct 20 mm high"),

    key("slab", "thickness_mm", maybe!(50.0..=5000.0, 250.0, slab.thickness_m, MM),
        "Thickness outside every zone.",
        "the drawing's own text"),
    key("slab", "top_level_m", number!(-1000.0..=10_000.0, slab.top_level_m, ONE),
        "Level of the general slab's top as the drawing counts levels: zones' levels are taken relative to it.", CONVENTION),
    key("slab", "step_keeps", Kind::Choice {
            words: &["thickness", "soffit"],
            get: |job| Some(match job.slab.step_keeps {
                StepKeeps::Thickness => "thickness",
                StepKeeps::Soffit => "soffit",
            }),
            set: |job, word| job.slab.step_keeps = match word {
                "soffit" => StepKeeps::Soffit,
                _ => StepKeeps::Thickness,
            },
        },
        "What a zone whose text gives only a top has in common with the slab around it.",
        "common practice: a thickness holds unless noted otherwise"),
    key("slab", "text_unit", unit!(conventions.thickness_unit),
        "Unit of thickness and level texts; a level with two decimals or more on a drawing in mm is in metres.", CONVENTION),
    key("slab", "text_patterns", Kind::Expressions {
            groups: &["value", "top", "soffit", "down"],
            also: &[],
            says: &["unit"],
            place: place!(conventions.thickness_patterns),
        },
        "Thickness texts: group value.", CONVENTION),

    key("tendon", "strand", Kind::Strands(place!(tendon.strands)),
        "Known sizes of strand; a size given here is added to these, or replaces the one of its name.",
        "ASTM A416 grade 270 (12.7, 15.2) and EN 10138-3 (12.9, 15.7), from memory"),
    key("tendon", "default_strand", Kind::StrandName {
            get: |job| job.tendon.default_strand.as_deref(),
            set: |job, name| job.tendon.default_strand = Some(name.to_owned()),
        },
        "Size of strand where a mark gives only a count.",
        "such a tendon gets a finding and no forces"),
    key("tendon", "default_strands", Kind::Count {
            least: 1,
            most: 100,
            get: |job| job.tendon.default_strands,
            set: |job, count| job.tendon.default_strands = Some(count),
        },
        "Strands in each tendon for which the drawing gives no number, as where a note says so.",
        "such a tendon gets a finding and no forces"),
    key("tendon", "strand_modulus_mpa", number!(100_000.0..=250_000.0, tendon.strand_modulus_mpa, ONE),
        "Modulus of the strand.", "common practice, 195 GPa give or take 10"),
    key("tendon", "yield_ratio", number!(0.5..=1.0, tendon.yield_ratio, ONE),
        "Yield stress of the strand over its strength.", "ASTM A416 low-relaxation strand, from memory"),
    key("tendon", "duct_height_mm", number!(5.0..=300.0, tendon.duct_height_m, MM),
        "Overall height of a duct.", "common practice for flat ducts"),

    key("stressing", "jacking_ratio", number!(0.1..=1.0, stressing.jacking_ratio, ONE),
        "Stress at the jack over strength.", "common practice"),
    key("stressing", "mu_per_rad", number!(0.0..=1.0, stressing.mu_per_rad, ONE),
        "Friction coefficient mu, per radian.", "EN 1992-1-1 table 5.1, from memory"),
    key("stressing", "wobble_rad_per_m", Kind::Number {
            least: 0.0,
            most: 0.1,
            example: 0.008,
            get: |job| match job.stressing.wobble { Wobble::RadPerM(k) => Some(k), Wobble::PerM(_) => None },
            set: |job, k| job.stressing.wobble = Wobble::RadPerM(k),
        },
        "Unintended angle k, in radians per metre, multiplied by mu.",
        "EN 1992-1-1 5.10.5.2 gives 0.005 to 0.010"),
    key("stressing", "wobble_per_m", Kind::Number {
            least: 0.0,
            most: 0.02,
            example: 0.0015,
            get: |job| match job.stressing.wobble { Wobble::PerM(k) => Some(k), Wobble::RadPerM(_) => None },
            set: |job, k| job.stressing.wobble = Wobble::PerM(k),
        },
        "Wobble K per metre, not multiplied by mu; instead of wobble_rad_per_m, never beside it.",
        "wobble_rad_per_m"),
    key("stressing", "draw_in_mm", number!(0.0..=50.0, stressing.draw_in_m, MM),
        "Wedge draw-in at each live end.", "common practice, 5 to 8 mm"),
    key("stressing", "first_pour", Kind::Choices {
            words: SIDES,
            place: place!(stressing.first_pour),
        },
        "Side of the plan whose pour is stressed first, of a tendon with intermediate anchors between two live ends: left or right \
         for one that runs rather across than up, bottom or top for the others. With one live end the pours follow from the dead end.",
        "judgement of this program: the pour at the left or the lower end"),
    key("stressing", "order", Kind::Shell(place!(stressing.order)),
        "Order of stressing: marks or shell patterns, the first stressed first; a tendon that no entry names is stressed after \
         all that are named. Elastic shortening then goes tendon by tendon.",
        "each method's own share for tendons stressed in turn"),

    key("profile", "inflection", number!(0.01..=0.5, profile.inflection, ONE),
        "Hogging length at a high point as a fraction of the span.", "common practice"),
    key("profile", "fit_inflection", Kind::Switch {
            get: |job| job.profile.fit_inflection,
            set: |job, on| job.profile.fit_inflection = on,
        },
        "Fit the hogging length to the support heights by least squares.", CONVENTION),

    key("long_term", "method", word!(LongTermMethod, long_term.method),
        "The method whose forces are drawn and checked; direct: from the strain and coefficients given here; the others by \
         their own clauses.",
        "the first of long_term.methods, else direct, the method that hides nothing"),
    key("long_term", "methods", Kind::Choices {
            words: LongTermMethod::WORDS,
            place: place!(long_term.methods),
        },
        "Methods to show side by side, with the spread between them.",
        "none beside long_term.method"),
    key("long_term", "concrete_modulus_transfer_mpa", number!(5000.0..=80_000.0, long_term.concrete_modulus_transfer_mpa, ONE),
        "Modulus of the concrete at stressing; direct only, the other methods work it out.",
        "EN 1992-1-1 3.1.3(3) for C30/37 at some 60 % of its strength, from memory"),
    key("long_term", "concrete_modulus_mpa", number!(5000.0..=80_000.0, long_term.concrete_modulus_mpa, ONE),
        "Modulus of the concrete at 28 days; direct only, the other methods work it out.", "EN 1992-1-1 table 3.1 for C30/37, from memory"),
    key("long_term", "shortening_share", number!(0.0..=1.0, long_term.shortening_share, ONE),
        "Share of (Ep/Eci) times the concrete stress that is lost by elastic shortening; direct only.",
        "common practice: 0.5 for tendons stressed in turn, 0 where all are stressed at once"),
    key("long_term", "concrete_stress_mpa", maybe!(0.0..=30.0, 1.5, long_term.concrete_stress_mpa, ONE),
        "Mean compression in the concrete along the tendons.",
        "worked out from the floor's own tendons and slab"),
    key("long_term", "shrinkage_strain", number!(0.0..=0.002, long_term.shrinkage_strain, ONE),
        "Shrinkage of the concrete after stressing; direct only.", "common practice for a floor indoors, from memory"),
    key("long_term", "creep_coefficient", number!(0.0..=10.0, long_term.creep_coefficient, ONE),
        "Final creep coefficient; direct only.", "common practice for a floor indoors, from memory"),
    key("long_term", "relaxation_1000h", number!(0.0..=0.2, long_term.relaxation_1000h, ONE),
        "Relaxation at 1000 hours, as a fraction of the stress after lock-off; direct only.",
        "EN 1992-1-1 3.3.2(6), class 2: 2.5 %"),
    key("long_term", "relaxation_factor", number!(0.0..=10.0, long_term.relaxation_factor, ONE),
        "Final relaxation over the 1000-hour value; direct only.", "common practice, from memory"),
    key("long_term", "strength_mpa", number!(1.0..=200.0, long_term.published.strength_mpa, ONE),
        "Cylinder strength of the concrete at 28 days (f_ck, f'c; a cube's strength is taken as this over 0.8).",
        "C30/37, common practice for floors"),
    key("long_term", "strength_at_stressing_mpa", number!(1.0..=200.0, long_term.published.strength_at_stressing_mpa, ONE),
        "Cylinder strength proven before stressing.", "common practice, 20 to 25 MPa"),
    key("long_term", "cement_class", word!(Cement, long_term.published.cement),
        "Class of cement, slow, normal or rapid; en1992.", "EN 1992-1-1 3.1.2(6), the class between the other two"),
    key("long_term", "humidity_percent", number!(0.0..=100.0, long_term.published.humidity, ONE),
        "Mean relative humidity of the air around the floor; en1992 and aci423.", "EN 1992-1-1 figure 3.1: 50 % indoors, from memory"),
    key("long_term", "environment", word!(Environment, long_term.published.environment),
        "Where the floor stands; as3600, and for bs8110 whether that is indoors.", "a floor of a building is indoors"),
    key("long_term", "curing_days", number!(0.0..=1000.0, long_term.published.curing_days, ONE),
        "Age of the concrete at the end of moist curing.", "common practice"),
    key("long_term", "stressing_days", number!(0.1..=1000.0, long_term.published.stressing_days, ONE),
        "Age of the concrete at stressing.", "common practice, 3 to 5 days"),
    key("long_term", "final_days", number!(100.0..=100_000.0, long_term.published.final_days, ONE),
        "Age of the concrete that counts as final; en1992 and as3600.", "50 years, the design working life of EN 1990 table 2.1"),
    key("long_term", "asked_days", maybe!(0.1..=100_000.0, 90.0, long_term.published.asked_days, ONE),
        "Age of the concrete at which the service force is asked for; only en1992 and as3600 know one before the final.",
        "final_days"),
    key("long_term", "notional_thickness_mm", maybe!(10.0..=5000.0, 250.0, long_term.published.notional_thickness_m, MM),
        "2 A/u of the drying slab: h_0, t_h, twice V/S; its thickness where both faces dry, twice that where one does.",
        "the slab's own thickness along the tendon"),
    key("long_term", "relaxation_class", word!(RelaxationClass, long_term.published.relaxation_class),
        "Relaxation of the strand: ordinary (class 1, stress-relieved), low (class 2), bar (class 3).", "common practice"),
    key("long_term", "bonded", Kind::Switch {
            get: |job| job.long_term.published.bonded,
            set: |job, on| job.long_term.published.bonded = on,
        },
        "Whether the ducts are grouted: a bonded tendon loses by the stress at each place, an unbonded one by the mean.",
        "common practice for flat ducts"),
    key("long_term", "bonded_steel_ratio", number!(0.0..=0.1, long_term.published.bonded_steel_ratio, ONE),
        "Bonded steel over concrete area, A_s/A_g, which restrains shrinkage; as3600.", "none, which loses most"),
    key("long_term", "balanced_share", number!(0.2..=2.0, long_term.published.balanced_share, ONE),
        "Share of the permanent load that the tendons' own curvature balances; bonded tendons of the published methods.",
        "judgement of this program: all of it, so that in the end bending adds nothing to the mean stress"),
    key("long_term", "load_share_at_stressing", number!(0.0..=1.0, long_term.published.load_share_at_stressing, ONE),
        "Share of the permanent load that acts at stressing already, the slab's own weight.", "judgement of this program"),
    key("long_term", "drying_basic", number!(0.0..=0.002, long_term.published.drying_basic, ONE),
        "Basic drying shrinkage strain; as3600.", "AS 3600 3.1.7.2: 800e-6; 900e-6 and 1000e-6 elsewhere, from memory"),
    key("long_term", "basic_relaxation", maybe!(0.0..=0.2, 0.02, long_term.published.basic_relaxation, ONE),
        "Basic relaxation R_b of the strand at 1000 hours, as a fraction; as3600, which asks for it.",
        "as3600 gives no loss: the standard's figure was not at hand"),
    key("long_term", "relaxation_stress_factor", maybe!(0.0..=5.0, 1.0, long_term.published.relaxation_stress_factor, ONE),
        "Factor on the basic relaxation for the stress in the strand, and for warmth above 20 degrees; as3600, which asks for it.",
        "as3600 gives no loss: the standard's figure was not at hand"),

    key("limits", "cover_mm", number!(0.0..=300.0, limits.cover_m, MM),
        "Least clear concrete between a duct and either face.", "common practice; the project's durability rules decide"),
    key("limits", "hogging_radius_error_m", number!(0.1..=100.0, limits.hogging_radius_error_m, ONE),
        "Hogging radius below which is an error.", "common practice for flat ducts"),
    key("limits", "hogging_radius_warning_m", number!(0.1..=100.0, limits.hogging_radius_warning_m, ONE),
        "Hogging radius below which is a warning.", "common practice for flat ducts"),
    key("limits", "sagging_radius_error_m", number!(0.1..=100.0, limits.sagging_radius_error_m, ONE),
        "Sagging radius below which is an error.", "as for hogging: a duct kinks whichever way it is bent"),
    key("limits", "sagging_radius_warning_m", number!(0.1..=100.0, limits.sagging_radius_warning_m, ONE),
        "Sagging radius below which is a warning.", "as for hogging: a duct kinks whichever way it is bent"),
    key("limits", "support_residual_warning_mm", number!(0.0..=1000.0, limits.support_residual_warning_m, MM),
        "Drawn support height off the curve, above which is a warning.", "heights are drawn to 5 mm"),
    key("limits", "support_residual_error_mm", number!(0.0..=1000.0, limits.support_residual_error_m, MM),
        "Drawn support height off the curve, above which is an error.", "judgement of this program"),
    key("limits", "plan_radius_m", number!(0.1..=100.0, limits.plan_radius_m, ONE),
        "Radius in plan below which is a warning.", "common practice: 6 m flat duct, 3 m single strand"),
    key("limits", "far_end_ratio", number!(0.0..=1.0, limits.far_end_ratio, ONE),
        "Force at the far end over jacking force, below which is a warning.", "common practice"),
    key("limits", "curvature_loss_ratio", number!(0.0..=1.0, limits.curvature_loss_ratio, ONE),
        "Share of the jacking force lost to angle alone, above which is a warning.",
        "judgement of this program"),
    key("limits", "angle_per_m_rad", number!(0.0..=10.0, limits.angle_per_m_rad, ONE),
        "Angle turned per metre of tendon, above which is a warning.",
        "judgement of this program: bays of 7 to 9 m turn 0.03 to 0.07"),
    key("limits", "jacking_stress_ratio", number!(0.1..=1.0, limits.jacking_stress_ratio, ONE),
        "Jacking stress over strength, above which is an error.", "ACI 318-19 20.3.2.5.1, from memory"),
    key("limits", "jacking_yield_ratio", number!(0.1..=1.0, limits.jacking_yield_ratio, ONE),
        "Jacking stress over yield, above which is an error.", "ACI 318-19 20.3.2.5.1, from memory"),
    key("limits", "anchor_stress_ratio", number!(0.1..=1.0, limits.anchor_stress_ratio, ONE),
        "Stress at the anchor after lock-off over strength, above which is an error.",
        "ACI 318-19 20.3.2.5.1, from memory"),
    key("limits", "one_end_length_m", number!(1.0..=1000.0, limits.one_end_length_m, ONE),
        "Length of a tendon stressed from one end, above which is a warning.", "common practice"),
    key("limits", "opening_clearance_mm", number!(0.0..=5000.0, limits.opening_clearance_m, MM),
        "Clear distance between a tendon and an opening, below which is a warning.", "common practice"),
    key("limits", "edge_tolerance_mm", number!(0.0..=5000.0, limits.edge_tolerance_m, MM),
        "How far a tendon may stand outside the slab's edge.", "judgement of this program"),
    key("limits", "memory_mb", number!(16.0..=1_000_000.0, limits.memory_mb, ONE),
        "Memory that a drawing may take, estimated from its size and entities, in megabytes.", "judgement of this program"),
    key("limits", "expanded_entities", number!(1.0..=100_000_000.0, limits.expanded_entities, ONE),
        "Entities that block inserts may expand to.", "judgement of this program"),
];

/// The key at this place.
pub fn find(table: &str, name: &str) -> Option<&'static Key> {
    KEYS.iter()
        .find(|key| key.table == table && key.name == name)
}

/// The keys of a table, in order.
pub fn of_table(table: &str) -> impl Iterator<Item = &'static Key> {
    KEYS.iter().filter(move |key| key.table == table)
}

/// The job's values by their names in the result, in the order of the keys; keys without a value are left out.
pub(super) fn inputs(job: &Job) -> Vec<(String, serde_json::Value)> {
    KEYS.iter()
        .filter_map(|key| Some((key.input_name(), key.value(job)?)))
        .collect()
}
