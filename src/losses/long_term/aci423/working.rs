//! The working of the ACI-ASCE 423 method at one place of a tendon, in psi and inches.

use super::super::case::Place;
use super::super::equation::{Equation, n};
use super::method::{Aci423, Bending};
use super::units::{mm, mpa, psi};
use super::{elastic, relaxation};

/// Where the method's own units come in.
const PSI: &str = "1 psi = 0.00689476 MPa";

impl Aci423 {
    pub(in super::super) fn equations(&self, place: Place) -> Vec<Equation> {
        let in_psi = |symbol, value: f64| {
            Equation::new(symbol, value, "psi", PSI).by("", format!("{} MPa", n(mpa(value))))
        };
        let [early, late] = self.f_c;
        let ([f_ci, f_c], [e_ci, e_c]) = (self.f_c.map(n), self.e_c);
        let modulus = "ACI 318-19 19.2.2.1(b)";
        let mut lines = vec![
            in_psi("f'ci", early),
            in_psi("f'c", late),
            in_psi("E_s", self.e_s),
            in_psi("f_cpa", self.f_cpa),
            Equation::new("E_ci", e_ci, "psi", modulus)
                .by("57 000 sqrt(f'ci)", format!("57 000 sqrt({f_ci})"))
                .recalled(),
            Equation::new("E_c", e_c, "psi", modulus)
                .by("57 000 sqrt(f'c)", format!("57 000 sqrt({f_c})"))
                .recalled(),
            self.turn.ordered("K_es").unwrap_or_else(|| {
                Equation::new("K_es", self.k_es, "", "ACI-ASCE 423 method, ES")
                    .at("stressing in turn".to_owned())
            }),
        ];
        lines.extend(self.elastic_lines(place));
        lines.extend(self.shrinkage_lines());
        lines.extend(self.relaxation_lines(place));
        lines
    }

    fn elastic_lines(&self, place: Place) -> Vec<Equation> {
        let ([es, cr], [e_ci, e_c]) = (self.elastic(place), self.e_c.map(n));
        let (e_s, f_cpa) = (n(self.e_s), n(self.f_cpa));
        let (k_es, k_cr) = (n(self.k_es), n(elastic::K_CR));
        if !self.compression.bonded {
            return vec![
                Equation::new("ES", es, "psi", "ACI-ASCE 423 method, ES unbonded").by(
                    "K_es (E_s/E_ci) f_cpa",
                    format!("{k_es} ({e_s}/{e_ci}) {f_cpa}"),
                ),
                Equation::new("K_cr", elastic::K_CR, "", "ACI-ASCE 423 method, CR").recalled(),
                Equation::new("CR", cr, "psi", "ACI-ASCE 423 method, CR unbonded").by(
                    "K_cr (E_s/E_c) f_cpa",
                    format!("{k_cr} ({e_s}/{e_c}) {f_cpa}"),
                ),
            ];
        }
        let Bending {
            f_cpi,
            f_g,
            f_cir,
            f_cds,
        } = self.bending(place);
        let ([at_stressing, whole], eccentricity) =
            (self.compression.load_ratios.map(n), n(place.eccentricity));
        vec![
            Equation::new("f_cpi", f_cpi, "psi", "ACI-ASCE 423 method, f_cir").by(
                "f_cpa [1 + (A/I) z^2]",
                format!("{f_cpa} [1 + {eccentricity}]"),
            ),
            Equation::new("f_g", f_g, "psi", "load balancing").by(
                "f_cpa (A/I) z^2 x load at stressing/balanced load",
                format!("{f_cpa} x {eccentricity} x {at_stressing}"),
            ),
            Equation::new("K_cir", elastic::K_CIR, "", "ACI-ASCE 423 method, f_cir").recalled(),
            Equation::new("f_cir", f_cir, "psi", "ACI-ASCE 423 method, f_cir").by(
                "K_cir f_cpi - f_g",
                format!("{} x {} - {}", n(elastic::K_CIR), n(f_cpi), n(f_g)),
            ),
            Equation::new("ES", es, "psi", "ACI-ASCE 423 method, ES bonded").by(
                "K_es (E_s/E_ci) f_cir",
                format!("{k_es} ({e_s}/{e_ci}) {}", n(f_cir)),
            ),
            Equation::new("f_cds", f_cds, "psi", "load balancing").by(
                "f_cpa (A/I) z^2 x (permanent - load at stressing)/balanced load",
                format!("{f_cpa} x {eccentricity} ({whole} - {at_stressing})"),
            ),
            Equation::new("K_cr", elastic::K_CR, "", "ACI-ASCE 423 method, CR").recalled(),
            Equation::new("CR", cr, "psi", "ACI-ASCE 423 method, CR bonded").by(
                "K_cr (E_s/E_c)(f_cir - f_cds)",
                format!("{k_cr} ({e_s}/{e_c})({} - {})", n(f_cir), n(f_cds)),
            ),
        ]
    }

    fn shrinkage_lines(&self) -> Vec<Equation> {
        vec![
            Equation::new("K_sh", self.k_sh, "", "ACI-ASCE 423 method, table 1")
                .at(format!(
                    "{} days from end of curing to stressing",
                    n(self.days)
                ))
                .recalled(),
            Equation::new("V/S", self.v_over_s, "in", "1 in = 25.4 mm")
                .by("", format!("{} mm", n(mm(self.v_over_s))))
                .at("half of 2 A/u".to_owned()),
            Equation::new("SH", self.sh, "psi", "ACI-ASCE 423 method, SH").by(
                "8.2e-6 K_sh E_s (1 - 0.06 V/S)(100 - RH)",
                format!(
                    "8.2e-6 x {} x {} (1 - 0.06 x {})(100 - {})",
                    n(self.k_sh),
                    n(self.e_s),
                    n(self.v_over_s),
                    n(self.humidity)
                ),
            ),
        ]
    }

    fn relaxation_lines(&self, place: Place) -> Vec<Equation> {
        let [es, cr] = self.elastic(place);
        let re = relaxation::re(self.k_re, self.j, self.sh, cr, es, self.c);
        let lost = self.at(place);
        let strand = format!("relaxation {}", self.class.word());
        let mut c_line =
            Equation::new("C", self.c, "", "ACI-ASCE 423 method, table 3").at(format!(
                "f_pi/f_pu = {}, the mean after lock-off",
                n(self.f_pi_over_f_pu)
            ));
        if relaxation::c_is_recalled(self.class, self.f_pi_over_f_pu) {
            c_line = c_line.recalled();
        }
        let mut lines = vec![
            Equation::new("K_re", self.k_re, "psi", "ACI-ASCE 423 method, table 2")
                .at(strand.clone()),
            Equation::new("J", self.j, "", "ACI-ASCE 423 method, table 2").at(strand),
            c_line,
            Equation::new("RE", re, "psi", "ACI-ASCE 423 method, RE").by(
                "[K_re - J (SH + CR + ES)] C",
                format!(
                    "[{} - {} ({} + {} + {})] {}",
                    n(self.k_re),
                    n(self.j),
                    n(self.sh),
                    n(cr),
                    n(es),
                    n(self.c)
                ),
            ),
        ];
        for (symbol, value) in [
            ("shortening", lost.shortening_mpa),
            ("shrinkage", lost.shrinkage_mpa),
            ("creep", lost.creep_mpa),
            ("relaxation", lost.relaxation_mpa),
        ] {
            let in_psi = format!("{} psi", n(psi(value)));
            lines.push(Equation::new(symbol, value, "MPa", PSI).by("", in_psi));
        }
        lines
    }
}
