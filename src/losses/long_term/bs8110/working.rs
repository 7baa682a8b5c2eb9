//! The working of BS 8110 at one place of a tendon.

use super::super::case::Place;
use super::super::equation::{Equation, n};
use super::method::Bs8110;

impl Bs8110 {
    pub(in super::super) fn equations(&self, place: Place) -> Vec<Equation> {
        let lost = self.at(place);
        let stress_mpa = self.stress_mpa(place.eccentricity);
        let ([f_cu_t, f_cu], [e_ci, e_c]) = (self.f_cu, self.e_c);
        let (e_s, stress) = (n(self.e_s), n(stress_mpa));
        let concrete = vec![
            Equation::new("f_cu", f_cu, "MPa", "EN 206-1 table 7")
                .by("cylinder strength/0.8", format!("{}/0.8", n(0.8 * f_cu))),
            Equation::new("f_cu,t", f_cu_t, "MPa", "EN 206-1 table 7")
                .by("cylinder strength/0.8", format!("{}/0.8", n(0.8 * f_cu_t))),
            Equation::new("E_c,28", e_c, "MPa", "BS 8110-2 7.2")
                .by("20 000 + 200 f_cu", format!("20 000 + 200 x {}", n(f_cu))),
            Equation::new("E_c,t", e_ci, "MPa", "BS 8110-2 7.2").by(
                "E_c,28 (0.4 + 0.6 f_cu,t/f_cu)",
                format!("{} (0.4 + 0.6 x {}/{})", n(e_c), n(f_cu_t), n(f_cu)),
            ),
        ];
        let mut lines: Vec<Equation> = concrete.into_iter().map(Equation::recalled).collect();
        lines.extend(self.compression.line("stress", place, 0));
        lines.push(self.turn.ordered("share").unwrap_or_else(|| {
            Equation::new("share", self.share, "", "BS 8110-1 4.8.3")
                .at("stressing in turn: half".to_owned())
                .recalled()
        }));
        let after = vec![
            Equation::new("shortening", lost.shortening_mpa, "MPa", "BS 8110-1 4.8.3").by(
                "share (E_s/E_c,t) stress",
                format!("{} ({e_s}/{}) {stress}", n(self.share), n(e_ci)),
            ),
            Equation::new("strain", self.strain, "", "BS 8110-1 4.8.4")
                .at(format!("environment {}", self.environment.word())),
            Equation::new("shrinkage", lost.shrinkage_mpa, "MPa", "BS 8110-1 4.8.4")
                .by("strain E_s", format!("{} x {e_s}", n(self.strain))),
            Equation::new("coefficient", self.coefficient, "", "BS 8110-1 4.8.5")
                .at(format!("stressing at {} days", n(self.stressing_days))),
            Equation::new("creep", lost.creep_mpa, "MPa", "BS 8110-1 4.8.5").by(
                "coefficient (E_s/E_c,t) stress",
                format!("{} ({e_s}/{}) {stress}", n(self.coefficient), n(e_ci)),
            ),
            Equation::new("loss at 1000 h", self.loss_1000h, "", "BS 8110-1 4.8.2").at(format!(
                "mean load after lock-off over strength = {}",
                n(self.load_over_strength)
            )),
        ];
        lines.extend(after.into_iter().map(Equation::recalled));
        lines.push(
            Equation::new("factor", self.factor, "", "BS 8110-1 table 4.6").at(format!(
                "post-tensioned strand, relaxation {}",
                self.class.word()
            )),
        );
        lines.push(
            Equation::new(
                "relaxation",
                lost.relaxation_mpa,
                "MPa",
                "BS 8110-1 table 4.6",
            )
            .by(
                "loss at 1000 h x factor x stress after lock-off",
                format!(
                    "{} x {} x {}",
                    n(self.loss_1000h),
                    n(self.factor),
                    n(place.lockoff_mpa)
                ),
            ),
        );
        lines
    }
}
