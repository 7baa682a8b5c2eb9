//! AS 3600:2018; computed independently with numpy, no publisher.

use tautplan::losses::long_term::as3600::{creep, shrinkage};

use crate::rounds_to;

/// Shrinkage at 10 950 days: `f'_c`, `t_h`, `k_4`, basic drying strain.
#[test]
fn shrinkage_at_thirty_years() {
    for (f_c, t_h, k_4, basic, computed) in [
        (32.0, 200.0, 0.6, 800e-6, 520.34),
        (40.0, 200.0, 0.5, 800e-6, 456.59),
    ] {
        let autogenous = shrinkage::eps_cse_final(f_c).expect("covered");
        let drying = shrinkage::eps_csd(
            shrinkage::k_1(10_950.0, t_h).expect("covered"),
            k_4,
            shrinkage::eps_csd_basic(f_c, basic).expect("covered"),
        );
        let eps_cse = shrinkage::eps_cse(autogenous, 10_950.0).expect("covered");
        rounds_to(1e6 * shrinkage::eps_cs(eps_cse, drying), computed, 0.01);
    }
}

/// Creep 10 950 days after loading: `f'_c`, `t_h`, τ, `k_4`; stress low.
#[test]
fn creep_at_thirty_years() {
    for (f_c, t_h, tau, k_4, computed) in [
        (40.0, 200.0, 7.0, 0.6, 2.962_17),
        (65.0, 300.0, 28.0, 0.6, 1.446_16),
    ] {
        let alpha_3 = creep::alpha_3(k_4, creep::alpha_2(t_h).expect("covered"));
        let k = [
            creep::k_2(10_950.0, t_h).expect("covered"),
            creep::k_3(tau).expect("covered"),
            k_4,
            creep::k_5(f_c, alpha_3).expect("covered"),
            creep::k_6(1.5, 30.0).expect("covered"),
        ];
        let phi = creep::phi_cc(k, creep::phi_cc_b(f_c).expect("covered"));
        rounds_to(phi, computed, 1e-5);
    }
}
