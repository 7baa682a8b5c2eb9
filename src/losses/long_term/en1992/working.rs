//! The working of EN 1992-1-1 at one place of a tendon.

use super::super::case::Place;
use super::super::equation::{Equation, n};
use super::method::En1992;
use super::{creep, relaxation};

impl En1992 {
    pub(in super::super) fn equations(&self, place: Place) -> Vec<Equation> {
        let mut lines = self.concrete_lines();
        lines.extend(self.shortening_lines(place));
        lines.extend(self.creep_lines());
        lines.extend(self.shrinkage_lines());
        lines.extend(self.combined_lines(place));
        lines
    }

    fn concrete_lines(&self) -> Vec<Equation> {
        let c = &self.concrete;
        vec![
            Equation::new("f_cm", c.f_cm, "MPa", "EN 1992-1-1 table 3.1")
                .by("f_ck + 8", format!("{} + 8", n(c.f_ck))),
            Equation::new("E_cm", c.e_cm, "MPa", "EN 1992-1-1 table 3.1").by(
                "22 000 (f_cm/10)^0.3",
                format!("22 000 ({}/10)^0.3", n(c.f_cm)),
            ),
            Equation::new("f_cm(t_0)", c.f_cm_t0, "MPa", "EN 1992-1-1 3.1.2(5)")
                .by("f_ck(t_0) + 8", format!("{} + 8", n(c.f_ck_t0))),
            Equation::new("E_cm(t_0)", c.e_cm_t0, "MPa", "EN 1992-1-1 (3.5)").by(
                "(f_cm(t_0)/f_cm)^0.3 E_cm",
                format!("({}/{})^0.3 {}", n(c.f_cm_t0), n(c.f_cm), n(c.e_cm)),
            ),
        ]
    }

    fn shortening_lines(&self, place: Place) -> Vec<Equation> {
        let [sigma_c, _] = self.compression.stresses_mpa(place.eccentricity);
        let mut lines = vec![self.share_line()];
        lines.extend(self.compression.line("Delta sigma_c", place, 0));
        lines.push(
            Equation::new(
                "Delta P_el/A_p",
                self.shortening_mpa(place),
                "MPa",
                "EN 1992-1-1 (5.44)",
            )
            .by(
                "j E_p Delta sigma_c/E_cm(t_0)",
                format!(
                    "{} x {} x {}/{}",
                    n(self.share),
                    n(self.case.steel.modulus_mpa),
                    n(sigma_c),
                    n(self.concrete.e_cm_t0)
                ),
            ),
        );
        lines
    }

    fn share_line(&self) -> Equation {
        let tendons = n(self.case.turn.tendons);
        self.case.turn.ordered("j").unwrap_or_else(|| {
            Equation::new("j", self.share, "", "EN 1992-1-1 5.10.5.1(2)")
                .by("(n - 1)/2n", format!("({tendons} - 1)/(2 x {tendons})"))
        })
    }

    fn creep_lines(&self) -> Vec<Equation> {
        let (c, f_cm) = (&self.creep, self.concrete.f_cm);
        let (h_0, rh) = (n(c.h_0), n(c.humidity));
        let [a_1, a_2, a_3] = [
            creep::alpha_1(f_cm),
            creep::alpha_2(f_cm),
            creep::alpha_3(f_cm),
        ]
        .map(n);
        vec![
            Equation::new("h_0", c.h_0, "mm", "EN 1992-1-1 (B.6)")
                .at(self.case.thickness_from().to_owned()),
            Equation::new("phi_RH", c.phi_rh, "", "EN 1992-1-1 (B.3)").by(
                "[1 + alpha_1 (1 - RH/100)/(0.1 h_0^(1/3))] alpha_2",
                format!("[1 + {a_1} (1 - {rh}/100)/(0.1 x {h_0}^(1/3))] {a_2}"),
            ),
            Equation::new("beta(f_cm)", c.beta_fcm, "", "EN 1992-1-1 (B.4)")
                .by("16.8/sqrt(f_cm)", format!("16.8/sqrt({})", n(f_cm))),
            Equation::new("t_0,adjusted", c.t_0_adjusted, "days", "EN 1992-1-1 (B.9)").by(
                "t_0 [9/(2 + t_0^1.2) + 1]^alpha",
                format!("{0} [9/(2 + {0}^1.2) + 1]^{1}", n(c.t_0), c.alpha),
            ),
            Equation::new("beta(t_0)", c.beta_t0, "", "EN 1992-1-1 (B.5)").by(
                "1/(0.1 + t_0,adjusted^0.2)",
                format!("1/(0.1 + {}^0.2)", n(c.t_0_adjusted)),
            ),
            Equation::new("phi_0", c.phi_0, "", "EN 1992-1-1 (B.2)").by(
                "phi_RH beta(f_cm) beta(t_0)",
                format!("{} x {} x {}", n(c.phi_rh), n(c.beta_fcm), n(c.beta_t0)),
            ),
            Equation::new("beta_H", c.beta_h, "days", "EN 1992-1-1 (B.8)").by(
                "1.5 [1 + (0.012 RH)^18] h_0 + 250 alpha_3 <= 1500 alpha_3",
                format!("1.5 [1 + (0.012 x {rh})^18] {h_0} + 250 x {a_3} <= 1500 x {a_3}"),
            ),
            Equation::new("beta_c(t, t_0)", c.beta_c, "", "EN 1992-1-1 (B.7)").by(
                "[(t - t_0)/(beta_H + t - t_0)]^0.3",
                format!(
                    "[({0} - {1})/({2} + {0} - {1})]^0.3",
                    n(c.t),
                    n(c.t_0),
                    n(c.beta_h)
                ),
            ),
            Equation::new("phi(t, t_0)", c.phi, "", "EN 1992-1-1 (B.1)").by(
                "phi_0 beta_c(t, t_0)",
                format!("{} x {}", n(c.phi_0), n(c.beta_c)),
            ),
        ]
    }

    fn shrinkage_lines(&self) -> Vec<Equation> {
        let (s, t) = (&self.shrinkage, n(self.creep.t));
        let [a_1, a_2] = s.alpha_ds.map(n);
        let [before, after] = s.eps_cs;
        let [early, drying] = s.beta_ds.map(|beta| beta * s.k_h * s.eps_cd_0);
        vec![
            Equation::new("beta_RH", s.beta_rh, "", "EN 1992-1-1 (B.12)").by(
                "1.55 [1 - (RH/100)^3]",
                format!("1.55 [1 - ({}/100)^3]", n(self.creep.humidity)),
            ),
            Equation::new("eps_cd,0", s.eps_cd_0, "", "EN 1992-1-1 (B.11)").by(
                "0.85 (220 + 110 alpha_ds1) exp(-alpha_ds2 f_cm/10) 1e-6 beta_RH",
                format!(
                    "0.85 (220 + 110 x {a_1}) exp(-{a_2} x {}/10) 1e-6 x {}",
                    n(self.concrete.f_cm),
                    n(s.beta_rh)
                ),
            ),
            Equation::new("k_h", s.k_h, "", "EN 1992-1-1 table 3.3")
                .at(format!("h_0 = {} mm", n(self.creep.h_0))),
            Equation::new("eps_cd(t)", drying, "", "EN 1992-1-1 (3.9), (3.10)").by(
                "(t - t_s)/((t - t_s) + 0.04 sqrt(h_0^3)) k_h eps_cd,0",
                format!(
                    "({t} - {0})/(({t} - {0}) + 0.04 sqrt({1}^3)) x {2} x {3}",
                    n(s.t_s),
                    n(self.creep.h_0),
                    n(s.k_h),
                    n(s.eps_cd_0)
                ),
            ),
            Equation::new(
                "eps_ca(t)",
                after - drying,
                "",
                "EN 1992-1-1 (3.11) to (3.13)",
            )
            .by(
                "2.5 (f_ck - 10) 1e-6 [1 - exp(-0.2 sqrt(t))]",
                format!(
                    "2.5 ({} - 10) 1e-6 [1 - exp(-0.2 sqrt({t}))]",
                    n(self.concrete.f_ck)
                ),
            ),
            Equation::new("eps_cs(t_0)", before, "", "EN 1992-1-1 (3.8)").by(
                "eps_cd(t_0) + eps_ca(t_0), the same at t_0",
                format!("{} + {}", n(early), n(before - early)),
            ),
            Equation::new("eps_cs", after - before, "", "EN 1992-1-1 (3.8)").by(
                "eps_cs(t) - eps_cs(t_0), from stressing on",
                format!("{} - {}", n(after), n(before)),
            ),
        ]
    }

    fn combined_lines(&self, place: Place) -> Vec<Equation> {
        let all = self.combined(place);
        let (steel, r) = (&self.case.steel, &self.relaxation);
        let sigma_pi = place.lockoff_mpa - self.shortening_mpa(place);
        let (factor, growth) = relaxation::coefficients(r.class);
        let mut lines: Vec<Equation> = self
            .compression
            .line("sigma_c,QP", place, 1)
            .into_iter()
            .collect();
        let (mu, clause) = (sigma_pi / steel.strength_mpa, relaxation::equation(r.class));
        lines.push(Equation::new("mu", mu, "", "EN 1992-1-1 3.3.2(7)").by(
            "(stress after lock-off - Delta P_el/A_p)/f_pk",
            format!("{}/{}", n(sigma_pi), n(steel.strength_mpa)),
        ));
        lines.push(
            Equation::new("Delta sigma_pr", all.delta_sigma_pr_mpa, "MPa", clause).by(
                "factor rho_1000 e^(growth mu) (t/1000)^(0.75 (1 - mu)) 1e-5 sigma_pi",
                format!(
                    "{factor} x {} e^({growth} x {1}) ({2}/1000)^(0.75 (1 - {1})) 1e-5 x {3}",
                    n(r.rho_1000),
                    n(mu),
                    n(r.hours),
                    n(sigma_pi)
                ),
            ),
        );
        if all.phi > self.creep.phi {
            let nonlinear = Equation::new("phi_nl", all.phi, "", "EN 1992-1-1 (3.7)").by(
                "phi exp(1.5 (sigma_c/f_ck(t_0) - 0.45))",
                format!(
                    "{} exp(1.5 ({}/{} - 0.45))",
                    n(self.creep.phi),
                    n(all.sigma_c_mpa),
                    n(self.concrete.f_ck_t0)
                ),
            );
            lines.push(nonlinear.recalled());
        }
        let mean_mpa = self.case.mean.lockoff_mpa;
        lines.push(
            Equation::new("A_p/A_c", all.a_p_over_a_c, "", "A_p sigma_p = A_c sigma_c").by(
                "sigma_cp/mean stress after lock-off",
                format!("{}/{}", n(self.case.concrete_stress_mpa), n(mean_mpa)),
            ),
        );
        let modular = format!("{}/{}", n(all.e_p_mpa), n(all.e_cm_mpa));
        let denominator = all.denominator();
        lines.push(
            Equation::new("denominator", denominator, "", "EN 1992-1-1 (5.46)").by(
                "1 + (E_p/E_cm)(A_p/A_c)(1 + (A_c/I_c) z_cp^2)(1 + 0.8 phi)",
                format!(
                    "1 + ({modular}) {} (1 + {})(1 + 0.8 x {})",
                    n(all.a_p_over_a_c),
                    n(all.eccentricity),
                    n(all.phi)
                ),
            ),
        );
        let [shrinkage, creep, relaxation] = all.parts_mpa();
        let below = n(denominator);
        for (symbol, value, formula, numbers) in [
            (
                "shrinkage",
                shrinkage,
                "eps_cs E_p/denominator",
                format!("{} x {}/{below}", n(all.eps_cs), n(all.e_p_mpa)),
            ),
            (
                "creep",
                creep,
                "(E_p/E_cm) phi sigma_c,QP/denominator",
                format!(
                    "({modular}) {} x {}/{below}",
                    n(all.phi),
                    n(all.sigma_c_mpa)
                ),
            ),
            (
                "relaxation",
                relaxation,
                "0.8 Delta sigma_pr/denominator",
                format!("0.8 x {}/{below}", n(all.delta_sigma_pr_mpa)),
            ),
        ] {
            let clause = "EN 1992-1-1 (5.46)";
            lines.push(Equation::new(symbol, value, "MPa", clause).by(formula, numbers));
        }
        lines
    }
}
