//! Elastic shortening and the long-term losses together, EN 1992-1-1:2004 5.10.5.1 and 5.10.6.

use super::super::outside::{Outside, within};

/// EN 1992-1-1:2004 5.10.5.1(2): j = (n − 1)/2n for n tendons stressed in turn; n from 1 on, 1/2 for a great many.
///
/// # Errors
/// [`Outside`] where there is no tendon.
pub fn j(n: f64) -> Result<f64, Outside> {
    let clause = "EN 1992-1-1 5.10.5.1(2)";
    let n = within("n", n, 1.0..=f64::INFINITY, "", clause)?;
    Ok(0.5 * (1.0 - 1.0 / n))
}

/// EN 1992-1-1:2004 (5.44): `ΔP_el` = `A_p` `E_p` Σ [j `Δσ_c(t)`/`E_cm(t)`], N; terms are (j, `Δσ_c` in MPa, `E_cm(t)` in MPa).
pub fn delta_p_el(a_p_mm2: f64, e_p_mpa: f64, terms: &[(f64, f64, f64)]) -> f64 {
    let sum: f64 = terms
        .iter()
        .map(|(j, delta_sigma_c, e_cm_t)| j * delta_sigma_c / e_cm_t)
        .sum();
    a_p_mm2 * e_p_mpa * sum
}

/// EN 1992-1-1:2004 (5.46), its part (`A_c`/`I_c`) `z_cp`²; mm², mm⁴, mm.
pub fn eccentricity(a_c_mm2: f64, i_c_mm4: f64, z_cp_mm: f64) -> f64 {
    a_c_mm2 / i_c_mm4 * z_cp_mm * z_cp_mm
}

/// What (5.46) is made of.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Combined {
    /// Shrinkage strain `ε_cs`.
    pub eps_cs: f64,
    /// Modulus of the strand `E_p`, MPa.
    pub e_p_mpa: f64,
    /// Modulus of the concrete `E_cm`, MPa.
    pub e_cm_mpa: f64,
    /// Loss by relaxation alone `Δσ_pr`, MPa.
    pub delta_sigma_pr_mpa: f64,
    /// Creep coefficient φ(t, `t_0`).
    pub phi: f64,
    /// Concrete stress at the tendon `σ_c,QP`, MPa.
    pub sigma_c_mpa: f64,
    /// `A_p`/`A_c`.
    pub a_p_over_a_c: f64,
    /// (`A_c`/`I_c`) `z_cp`², [`eccentricity`].
    pub eccentricity: f64,
}

impl Combined {
    /// EN 1992-1-1:2004 (5.46): `Δσ_p,c+s+r` = [`ε_cs` `E_p` + 0.8 `Δσ_pr` + (`E_p`/`E_cm`) φ `σ_c,QP`] / denominator, MPa.
    pub fn delta_sigma_mpa(&self) -> f64 {
        self.parts_mpa().iter().sum()
    }

    /// The share of shrinkage, creep and relaxation in (5.46), each over its denominator, MPa.
    pub fn parts_mpa(&self) -> [f64; 3] {
        [
            self.eps_cs * self.e_p_mpa,
            self.e_p_mpa / self.e_cm_mpa * self.phi * self.sigma_c_mpa,
            0.8 * self.delta_sigma_pr_mpa,
        ]
        .map(|part_mpa| part_mpa / self.denominator())
    }

    /// EN 1992-1-1:2004 (5.46), below the line: 1 + (`E_p`/`E_cm`)(`A_p`/`A_c`)(1 + (`A_c`/`I_c`) `z_cp`²)(1 + 0.8 φ).
    pub fn denominator(&self) -> f64 {
        1.0 + self.e_p_mpa / self.e_cm_mpa
            * self.a_p_over_a_c
            * (1.0 + self.eccentricity)
            * (1.0 + 0.8 * self.phi)
    }
}
