//! The working of AS 3600 at one place of a tendon.

use super::super::case::Place;
use super::super::equation::{Equation, n};
use super::method::As3600;
use super::{concrete, creep, relaxation};

impl As3600 {
    pub(in super::super) fn equations(&self, place: Place) -> Vec<Equation> {
        let mut lines = self.elastic_lines(place);
        lines.extend(self.shrinkage_lines(place));
        lines.extend(self.creep_lines(place));
        lines.extend(self.relaxation_lines(place));
        lines
    }

    fn elastic_lines(&self, place: Place) -> Vec<Equation> {
        let [f_cmi_t, f_cmi] = self.f_cmi;
        let [e_cj, e_c] = self.e_c;
        let [at_stressing, _] = self.compression.stresses_mpa(place.eccentricity);
        let mut lines = vec![
            Equation::new("f_cmi", f_cmi, "MPa", "AS 3600 table 3.1.2")
                .at(format!("f'c = {} MPa", n(self.f_c)))
                .recalled(),
            modulus_line("E_c", e_c, f_cmi),
            Equation::new(
                "f_cmi at stressing",
                f_cmi_t,
                "MPa",
                "the job's strength at stressing",
            )
            .at("the characteristic one, no greater than the mean".to_owned()),
            modulus_line("E_cj", e_cj, f_cmi_t),
        ];
        lines.extend(self.compression.line("sigma at stressing", place, 0));
        let turn = &self.case.turn;
        lines.push(turn.ordered("share").unwrap_or_else(|| {
            Equation::new("share", self.share, "", "as EN 1992-1-1 5.10.5.1(2)").by(
                "(n - 1)/2n",
                format!("({0} - 1)/(2 x {0})", n(turn.tendons)),
            )
        }));
        lines.push(
            Equation::new(
                "shortening",
                self.at(place).shortening_mpa,
                "MPa",
                "AS 3600 3.4.2.3",
            )
            .by(
                "share (E_p/E_cj) sigma",
                format!(
                    "{} ({}/{}) {}",
                    n(self.share),
                    n(self.case.steel.modulus_mpa),
                    n(e_cj),
                    n(at_stressing)
                ),
            )
            .recalled(),
        );
        lines
    }

    fn shrinkage_lines(&self, place: Place) -> Vec<Equation> {
        let (s, clause) = (&self.shrinkage, "AS 3600 3.1.7.2");
        let [curing, _, asked] = self.ages.map(n);
        let [before, after] = s.eps_cs;
        let f_c = n(self.f_c);
        let (formula, numbers) = if self.f_c <= 50.0 {
            (
                "(0.07 f'c - 0.5) 50e-6",
                format!("(0.07 x {f_c} - 0.5) 50e-6"),
            )
        } else {
            (
                "(0.08 f'c - 1.0) 50e-6",
                format!("(0.08 x {f_c} - 1.0) 50e-6"),
            )
        };
        let [given, basic] = s.basic;
        let mut basic_line = Equation::new("eps_csd.b", basic, "", clause).by(
            "(0.9 - 0.005 f'c) eps*_csd.b",
            format!("(0.9 - 0.005 x {f_c}) {}", n(given)),
        );
        // Of the standard's three only the least was at hand.
        if given > 800e-6 {
            basic_line = basic_line.recalled();
        }
        vec![
            Equation::new("t_h", self.t_h, "mm", clause).at(self.case.thickness_from().to_owned()),
            Equation::new("eps*_cse", s.eps_cse_final, "", clause).by(formula, numbers),
            Equation::new("eps_cse", s.eps_cse[1], "", clause).by(
                "eps*_cse (1 - e^(-0.07 t))",
                format!("{} (1 - e^(-0.07 x {asked}))", n(s.eps_cse_final)),
            ),
            Equation::new("k_1", s.k_1[1], "", clause).by(
                "(0.8 + 1.2 e^(-0.005 t_h)) t^0.8/(t^0.8 + 0.15 t_h)",
                format!(
                    "(0.8 + 1.2 e^(-0.005 x {0})) ({asked} - {curing})^0.8/(({asked} - {curing})^0.8 + 0.15 x {0})",
                    n(self.t_h)
                ),
            ),
            Equation::new("k_4", self.k_4, "", clause)
                .at(format!("environment {}", self.environment.word())),
            basic_line,
            Equation::new("eps_csd", after - s.eps_cse[1], "", clause).by(
                "k_1 k_4 eps_csd.b",
                format!("{} x {} x {}", n(s.k_1[1]), n(self.k_4), n(basic)),
            ),
            Equation::new("eps_cs at stressing", before, "", clause).by(
                "eps_cse + eps_csd, the same at stressing",
                format!("{} + {}", n(s.eps_cse[0]), n(before - s.eps_cse[0])),
            ),
            Equation::new("eps_cs", self.eps_cs(), "", clause).by(
                "eps_cs(t) - eps_cs at stressing",
                format!("{} - {}", n(after), n(before)),
            ),
            Equation::new(
                "shrinkage",
                self.at(place).shrinkage_mpa,
                "MPa",
                "AS 3600 3.4.3.2",
            )
            .by(
                "E_p eps_cs/(1 + 15 A_s/A_g)",
                format!(
                    "{} x {}/(1 + 15 x {})",
                    n(self.case.steel.modulus_mpa),
                    n(self.eps_cs()),
                    n(self.steel_ratio)
                ),
            )
            .recalled(),
        ]
    }

    fn creep_lines(&self, place: Place) -> Vec<Equation> {
        let (c, clause) = (&self.creep, "AS 3600 3.1.8.3");
        let [_, stressing, asked] = self.ages.map(n);
        let [_, sustained] = self.compression.stresses_mpa(place.eccentricity);
        let [k_6, phi_cc] = self.phi_cc(sustained);
        let alpha_3 = creep::alpha_3(self.k_4, c.alpha_2);
        let mut lines = vec![
            Equation::new("phi_cc.b", c.phi_cc_b, "", "AS 3600 table 3.1.8.2")
                .at(format!("f'c = {} MPa", n(self.f_c))),
            Equation::new("k_2", c.k_2, "", clause).by(
                "(1 + 1.12 e^(-0.008 t_h)) t^0.8/(t^0.8 + 0.15 t_h)",
                format!(
                    "(1 + 1.12 e^(-0.008 x {0})) ({asked} - {stressing})^0.8/(({asked} - {stressing})^0.8 + 0.15 x {0})",
                    n(self.t_h)
                ),
            ),
            Equation::new("k_3", c.k_3, "", clause)
                .by("2.7/(1 + log(tau))", format!("2.7/(1 + log({stressing}))")),
            Equation::new("k_5", c.k_5, "", clause).at(format!(
                "f'c = {} MPa: 1, above 50 MPa (2 - alpha_3) - 0.02 (1 - alpha_3) f'c, alpha_3 = {}",
                n(self.f_c),
                n(alpha_3)
            )),
        ];
        lines.extend(self.compression.line("sigma_ci", place, 1));
        lines.extend([
            Equation::new("k_6", k_6, "", clause).by(
                "exp(1.5 (sigma_ci/f_cmi - 0.45)), no less than 1",
                format!("exp(1.5 ({}/{} - 0.45))", n(sustained), n(self.f_cmi[0])),
            ),
            Equation::new("phi_cc", phi_cc, "", clause).by(
                "k_2 k_3 k_4 k_5 k_6 phi_cc.b",
                [c.k_2, c.k_3, self.k_4, c.k_5, k_6, c.phi_cc_b]
                    .map(n)
                    .join(" x "),
            ),
            Equation::new("creep", self.at(place).creep_mpa, "MPa", "AS 3600 3.4.3.3")
                .by(
                    "E_p 0.8 phi_cc sigma_ci/E_c",
                    format!(
                        "{} x 0.8 x {} x {}/{}",
                        n(self.case.steel.modulus_mpa),
                        n(phi_cc),
                        n(sustained),
                        n(self.e_c[1])
                    ),
                )
                .recalled(),
        ]);
        lines
    }

    fn relaxation_lines(&self, place: Place) -> Vec<Equation> {
        let lost = self.at(place);
        let [k_4, k_5, r_b] = self.relaxation;
        let [_, stressing, asked] = self.ages.map(n);
        let sigma_pi = n(place.lockoff_mpa - lost.shortening_mpa);
        let r = relaxation::r(k_4, k_5, r_b);
        let lines = vec![
            Equation::new("k_4 of relaxation", k_4, "", "AS 3600 3.3.4.3").by(
                "log(5.4 j^(1/6))",
                format!("log(5.4 ({asked} - {stressing})^(1/6))"),
            ),
            Equation::new("R", r, "", "AS 3600 3.3.4.3").by(
                "k_4 k_5 R_b, the last two the job's",
                [k_4, k_5, r_b].map(n).join(" x "),
            ),
            Equation::new("relaxation", lost.relaxation_mpa, "MPa", "AS 3600 3.4.3.4").by(
                "R (sigma_pi - shrinkage - creep)",
                format!(
                    "{} ({sigma_pi} - {} - {})",
                    n(r),
                    n(lost.shrinkage_mpa),
                    n(lost.creep_mpa)
                ),
            ),
        ];
        lines.into_iter().map(Equation::recalled).collect()
    }
}

/// The modulus by the branch that holds.
fn modulus_line(symbol: &'static str, e_mpa: f64, f_cmi_mpa: f64) -> Equation {
    let strength = n(f_cmi_mpa);
    let line = Equation::new(symbol, e_mpa, "MPa", "AS 3600 3.1.2");
    let line = if concrete::is_weak(f_cmi_mpa) {
        line.by(
            "2400^1.5 x 0.043 sqrt(f_cmi)",
            format!("2400^1.5 x 0.043 sqrt({strength})"),
        )
    } else {
        line.by(
            "2400^1.5 (0.024 sqrt(f_cmi) + 0.12)",
            format!("2400^1.5 (0.024 sqrt({strength}) + 0.12)"),
        )
    };
    line.recalled()
}
