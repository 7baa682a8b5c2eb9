//! Units of what is read and of what is written: turned into and out of the internal ones at the edges only.

/// A length unit that a drawing or a label may use.
#[derive(Debug, Clone, Copy, PartialEq, Eq, serde::Deserialize, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum LengthUnit {
    /// Millimetre.
    Mm,
    /// Centimetre.
    Cm,
    /// Metre.
    M,
    /// Inch (25.4 mm exactly).
    In,
    /// Foot (0.3048 m exactly).
    Ft,
}

impl LengthUnit {
    /// Metres in one of this unit.
    pub fn metres(self) -> f64 {
        match self {
            Self::Mm => 0.001,
            Self::Cm => 0.01,
            Self::M => 1.0,
            Self::In => 0.0254,
            Self::Ft => 0.3048,
        }
    }

    /// The usual short name.
    pub fn name(self) -> &'static str {
        match self {
            Self::Mm => "mm",
            Self::Cm => "cm",
            Self::M => "m",
            Self::In => "in",
            Self::Ft => "ft",
        }
    }
}

/// Units that results are written in.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Units {
    /// Kilonewton, megapascal, millimetre, metre.
    Si,
    /// Kip, kip per square inch, inch, foot.
    Us,
}

impl Units {
    /// Both, the default first.
    pub const ALL: [Self; 2] = [Self::Si, Self::Us];

    /// The word of the job file.
    pub fn name(self) -> &'static str {
        match self {
            Self::Si => "si",
            Self::Us => "us",
        }
    }

    /// The units of this name.
    pub fn named(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|units| units.name() == word)
    }
}

/// A quantity that results hold, with its unit in either system.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Quantity {
    si: &'static str,
    us: &'static str,
    /// SI units in one US unit.
    si_per_us: f64,
    /// Decimals that a figure needs beyond its SI decimals to say no less.
    more: usize,
}

const INCH_MM: f64 = 25.4;
const FOOT_M: f64 = 0.3048;
/// Kilonewtons in one kip: a pound-force is 0.45359237 kg at 9.80665 m/s², both exactly (NIST SP 811 B.8).
pub const KIP_KN: f64 = 0.453_592_37 * 9.806_65;

/// Force of strands.
pub const FORCE: Quantity = quantity("kN", "kip", KIP_KN, 1);
/// Stress, modulus, strength.
pub const STRESS: Quantity = quantity("MPa", "ksi", KIP_KN * 1000.0 / (INCH_MM * INCH_MM), 1);
/// Area of steel.
pub const STEEL: Quantity = quantity("mm2", "in2", INCH_MM * INCH_MM, 5);
/// Heights, extensions, clearances.
pub const SHORT: Quantity = quantity("mm", "in", INCH_MM, 2);
/// Stations, lengths, radii, places on the plan.
pub const LONG: Quantity = quantity("m", "ft", FOOT_M, 0);
/// Area on the plan.
pub const FLOOR: Quantity = quantity("m²", "ft²", FOOT_M * FOOT_M, 0);
/// Angle turned along a length.
pub const TURN: Quantity = quantity("rad/m", "rad/ft", 1.0 / FOOT_M, 1);
/// Loss along a length.
pub const PER_LENGTH: Quantity = quantity("/m", "/ft", 1.0 / FOOT_M, 1);
/// Force along a width.
pub const FORCE_PER_WIDTH: Quantity = quantity("kN/m", "kip/ft", KIP_KN / FOOT_M, 2);
/// Force times length.
pub const WORK: Quantity = quantity("kN m", "kip in", KIP_KN * INCH_MM / 1000.0, 0);

const fn quantity(si: &'static str, us: &'static str, si_per_us: f64, more: usize) -> Quantity {
    Quantity {
        si,
        us,
        si_per_us,
        more,
    }
}

/// A unit that a quantity is written in. Values go in as the quantity's SI unit has them.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Unit {
    /// Its usual short name.
    pub name: &'static str,
    si: f64,
    more: usize,
}

impl Units {
    /// The unit of a quantity.
    pub fn of(self, quantity: Quantity) -> Unit {
        match self {
            Self::Si => Unit {
                name: quantity.si,
                si: 1.0,
                more: 0,
            },
            Self::Us => Unit {
                name: quantity.us,
                si: quantity.si_per_us,
                more: quantity.more,
            },
        }
    }
}

impl Unit {
    /// A value in this unit.
    pub fn value(self, si: f64) -> f64 {
        si / self.si
    }

    /// A figure with as many decimals as say what these say in SI; zero without a sign.
    pub fn figure(self, si: f64, decimals: usize) -> String {
        let decimals = decimals + self.more;
        unsigned_zero(format!("{:.decimals$}", self.value(si)))
    }

    /// A figure with its unit, such as `154.77 kip`.
    pub fn said(self, si: f64, decimals: usize) -> String {
        format!("{} {}", self.figure(si, decimals), self.name)
    }

    /// As [`Unit::figure`], without zeros at the end.
    pub fn brief_figure(self, si: f64, decimals: usize) -> String {
        let figure = self.figure(si, decimals);
        if figure.contains('.') {
            figure
                .trim_end_matches('0')
                .trim_end_matches('.')
                .to_owned()
        } else {
            figure
        }
    }

    /// As [`Unit::said`], without zeros at the end.
    pub fn brief(self, si: f64, decimals: usize) -> String {
        format!("{} {}", self.brief_figure(si, decimals), self.name)
    }

    /// As [`Unit::figure`], with its sign.
    pub fn signed(self, si: f64, decimals: usize) -> String {
        let decimals = decimals + self.more;
        format!("{:+.decimals$}", self.value(si))
    }

    /// A value that the job gives: six significant figures at most, without zeros at the end.
    pub fn given_figure(self, si: f64) -> String {
        let rounded: f64 = format!("{:.5e}", self.value(si)).parse().unwrap_or(si);
        unsigned_zero(format!("{rounded}"))
    }

    /// A value that the job gives, with its unit.
    pub fn given(self, si: f64) -> String {
        format!("{} {}", self.given_figure(si), self.name)
    }

    /// A column's name with the unit at its end, such as `jacking_kip`.
    pub fn column(self, name: &str) -> String {
        format!("{name}_{}", self.name.to_lowercase())
    }
}

fn unsigned_zero(figure: String) -> String {
    if figure
        .bytes()
        .all(|byte| matches!(byte, b'-' | b'0' | b'.'))
    {
        figure.trim_start_matches('-').to_owned()
    } else {
        figure
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const ALL: [Quantity; 10] = [
        FORCE,
        STRESS,
        STEEL,
        SHORT,
        LONG,
        FLOOR,
        TURN,
        PER_LENGTH,
        FORCE_PER_WIDTH,
        WORK,
    ];

    #[test]
    fn a_turn_through_us_units_and_back_changes_nothing() {
        for quantity in ALL {
            for si in [1.0, -0.037, 688.4325, 195_000.0, 1e-6] {
                let back = Units::Us.of(quantity).value(si) * quantity.si_per_us;
                assert!((back - si).abs() <= 1e-12 * si.abs(), "{quantity:?} {si}");
                assert!((Units::Si.of(quantity).value(si) - si).abs() <= 1e-12 * si.abs());
            }
        }
    }

    /// NIST SP 811 B.8: 1 kip = 4.448222 kN, 1 ksi = 6.894757 MPa, 1 in2 = 645.16 mm2, 1 ft2 = 0.09290304 m2.
    #[test]
    fn units_are_as_large_as_their_published_factors() {
        for (quantity, si) in [
            (FORCE, 4.448_222),
            (STRESS, 6.894_757),
            (STEEL, 645.16),
            (SHORT, 25.4),
            (LONG, 0.3048),
            (FLOOR, 0.092_903_04),
            (TURN, 1.0 / 0.3048),
            (PER_LENGTH, 1.0 / 0.3048),
            (FORCE_PER_WIDTH, 4.448_222 / 0.3048),
            (WORK, 4.448_222 * 0.0254),
        ] {
            let one = Units::Us.of(quantity).value(si);
            assert!((one - 1.0).abs() < 1e-7, "{quantity:?} {one}");
        }
    }

    /// Stress times area is force, and work over force is a length, in US units as in SI.
    #[test]
    fn formulas_hold_in_us_units() {
        let us = |quantity, si| Units::Us.of(quantity).value(si);
        let force_kip = us(STRESS, 1860.0) * us(STEEL, 98.7);
        assert!((force_kip - us(FORCE, 1.86 * 98.7)).abs() < 1e-12 * force_kip);
        let length_in = us(WORK, 12.0) / us(FORCE, 688.0);
        assert!((length_in - us(SHORT, 12_000.0 / 688.0)).abs() < 1e-12 * length_in);
    }

    /// The step of a last place is no larger in US units than in SI.
    #[test]
    fn a_us_figure_says_no_less_than_its_si_figure() {
        for quantity in ALL {
            let unit = Units::Us.of(quantity);
            let step_si = quantity.si_per_us / 10_f64.powi(i32::try_from(unit.more).expect("few"));
            assert!(step_si <= 1.0, "{quantity:?}: {step_si}");
        }
    }

    #[test]
    fn figures_are_written_as_their_readers_write_them() {
        let (si, us) = (Units::Si, Units::Us);
        assert_eq!(si.of(FORCE).said(688.4325, 1), "688.4 kN");
        assert_eq!(us.of(FORCE).said(688.4325, 1), "154.77 kip");
        assert_eq!(us.of(SHORT).brief(19.05, 1), "0.75 in");
        assert_eq!(si.of(SHORT).brief(25.0, 1), "25 mm");
        assert_eq!(si.of(SHORT).brief(-0.01, 1), "0 mm");
        assert_eq!(us.of(LONG).given(2.4384), "8 ft");
        assert_eq!(us.of(STRESS).given(195_000.0), "28282.4 ksi");
        assert_eq!(si.of(STRESS).given(195_000.0), "195000 MPa");
        assert_eq!(us.of(FORCE).column("jacking"), "jacking_kip");
        assert_eq!(si.of(STRESS).column("creep"), "creep_mpa");
        assert_eq!(us.of(LONG).figure(-0.0001, 3), "0.000");
    }
}
