//! Laws of the formulas: what dries not at RH 100, what grows, that no branch jumps, that a refusal names its clause.

use crate::sweep::no_jump;
use proptest::prelude::*;
use tautplan::job::{Cement, RelaxationClass};
use tautplan::losses::long_term::aci423::{self, units};
use tautplan::losses::long_term::en1992::combined::Combined;
use tautplan::losses::long_term::{as3600, bs8110, en1992};

fn cement() -> impl Strategy<Value = Cement> {
    prop::sample::select(Cement::ALL)
}

fn class() -> impl Strategy<Value = RelaxationClass> {
    prop::sample::select(RelaxationClass::ALL)
}

/// φ(t, t0) of EN 1992-1-1; `None` where a clause does not cover it.
fn phi(f_ck: f64, rh: f64, h_0: f64, t_0: f64, cement: Cement, loaded: f64) -> Option<f64> {
    use en1992::{concrete, creep};
    let f_cm = concrete::f_cm(f_ck).ok()?;
    let adjusted = creep::t_0_adjusted(t_0, cement).ok()?;
    let phi_0 = creep::phi_0(
        creep::phi_rh(rh, h_0, f_cm).ok()?,
        creep::beta_fcm(f_cm),
        creep::beta_t0(adjusted),
    );
    let beta_h = creep::beta_h(rh, h_0, f_cm).ok()?;
    Some(creep::phi(
        phi_0,
        creep::beta_c(t_0 + loaded, t_0, beta_h).ok()?,
    ))
}

/// `ε_cs`(t) of EN 1992-1-1.
fn eps_cs(f_ck: f64, rh: f64, h_0: f64, cement: Cement, t: f64) -> Option<f64> {
    use en1992::{concrete, shrinkage};
    let basic = shrinkage::eps_cd_0(
        cement,
        concrete::f_cm(f_ck).ok()?,
        shrinkage::beta_rh(rh).ok()?,
    );
    let drying = shrinkage::eps_cd(
        shrinkage::beta_ds(t, 3.0, h_0).ok()?,
        shrinkage::k_h(h_0).ok()?,
        basic,
    );
    let in_time = shrinkage::beta_as(t).ok()?;
    Some(shrinkage::eps_cs(
        drying,
        shrinkage::eps_ca(in_time, shrinkage::eps_ca_inf(f_ck).ok()?),
    ))
}

/// φ of AS 3600.
fn phi_cc(f_c: f64, t_h: f64, k_4: f64, tau: f64, sigma_o: f64, loaded: f64) -> Option<f64> {
    use as3600::creep;
    let alpha_3 = creep::alpha_3(k_4, creep::alpha_2(t_h).ok()?);
    let k = [
        creep::k_2(loaded, t_h).ok()?,
        creep::k_3(tau).ok()?,
        k_4,
        creep::k_5(f_c, alpha_3).ok()?,
        creep::k_6(sigma_o, 20.0).ok()?,
    ];
    Some(creep::phi_cc(k, creep::phi_cc_b(f_c).ok()?))
}

/// `ε_cs` of AS 3600.
fn eps_cs_as(f_c: f64, t_h: f64, k_4: f64, t: f64) -> Option<f64> {
    use as3600::shrinkage;
    let drying = shrinkage::eps_csd(
        shrinkage::k_1(t, t_h).ok()?,
        k_4,
        shrinkage::eps_csd_basic(f_c, 900e-6).ok()?,
    );
    let autogenous = shrinkage::eps_cse(shrinkage::eps_cse_final(f_c).ok()?, t).ok()?;
    Some(shrinkage::eps_cs(autogenous, drying))
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, cases: 400, ..ProptestConfig::default() })]

    #[test]
    fn nothing_dries_in_water(f_ck in 12.0..90.0, h_0 in 100.0..1500.0, cement in cement(), t in 3.0..20_000.0, k_sh in 0.45..0.92) {
        let f_cm = f_ck + 8.0;
        let alpha_2 = en1992::creep::alpha_2(f_cm);
        let wet = en1992::creep::phi_rh(100.0, h_0, f_cm).expect("covered");
        prop_assert!((wet - alpha_2).abs() < 1e-12);
        prop_assert!(en1992::shrinkage::beta_rh(100.0).expect("covered").abs() < 1e-12);
        let autogenous = en1992::shrinkage::eps_ca_inf(f_ck).expect("covered") * en1992::shrinkage::beta_as(t).expect("covered");
        let all = eps_cs(f_ck, 100.0, h_0, cement, t).expect("covered");
        prop_assert!((all - autogenous).abs() < 1e-15);
        prop_assert!(aci423::shrinkage::sh(k_sh, 28.5e6, 4.0, 100.0).expect("covered").abs() < 1e-9);
    }

    #[test]
    fn creep_and_shrinkage_grow_with_time_and_with_drier_air(
        f_ck in 12.0..90.0, rh in 40.0..99.0, h_0 in 100.0..1500.0, t_0 in 0.5..100.0, cement in cement(), t in 3.0..10_000.0, more in 1.01..5.0,
    ) {
        let grows = |less: Option<f64>, greater: Option<f64>| less.zip(greater).is_some_and(|(a, b)| a <= b * (1.0 + 1e-12));
        prop_assert!(grows(phi(f_ck, rh, h_0, t_0, cement, t), phi(f_ck, rh, h_0, t_0, cement, t * more)));
        prop_assert!(grows(eps_cs(f_ck, rh, h_0, cement, t), eps_cs(f_ck, rh, h_0, cement, t * more)));
        let drier = f64::max(rh / more, 40.0);
        prop_assert!(grows(eps_cs(f_ck, rh, h_0, cement, t), eps_cs(f_ck, drier, h_0, cement, t)));
        let f_c = f64::max(f_ck, 20.0);
        let t_h = f64::min(h_0, 400.0);
        prop_assert!(grows(phi_cc(f_c, t_h, 0.6, f64::max(t_0, 1.0), 2.0, t), phi_cc(f_c, t_h, 0.6, f64::max(t_0, 1.0), 2.0, t * more)));
        prop_assert!(grows(eps_cs_as(f_c, t_h, 0.6, t), eps_cs_as(f_c, t_h, 0.7, t * more)));
        prop_assert!(grows(as3600::relaxation::k_4(t).ok(), as3600::relaxation::k_4(t * more).ok()));
    }

    #[test]
    fn relaxation_grows_with_time_and_with_stress(class in class(), mu in 0.3..0.8, more in 0.0..0.1, hours in 1.0..100_000.0, longer in 1.0..5.0) {
        let of = |mu, hours| {
            let rho = en1992::relaxation::rho_1000(class);
            en1992::relaxation::delta_sigma_pr(class, rho, mu, hours).expect("covered")
        };
        prop_assert!(of(mu, hours) <= of(mu, hours * longer));
        // With stress where the curve of (3.28) to (3.30) rises: from 1000 hours on at least.
        prop_assert!(of(mu, 1000.0) <= of(mu + more, 1000.0));
        if class != RelaxationClass::Bar {
            let at = |ratio: f64| bs8110::relaxation::loss_1000h(class, ratio).expect("covered");
            let ratio = 0.6 + (mu - 0.3) * 0.2;
            prop_assert!(at(ratio) <= at(ratio + more));
            let c = |ratio: f64| aci423::relaxation::c(class, ratio).expect("covered");
            prop_assert!(c(0.6 + (mu - 0.3) * 0.1) <= c(0.6 + (mu - 0.3) * 0.1 + more));
        }
    }

    #[test]
    fn loss_grows_with_concrete_stress(stress in 0.0..8.0, more in 0.0..2.0, phi in 0.5..4.0, eccentricity in 0.0..2.0) {
        let combined = |sigma_c_mpa| Combined {
            eps_cs: 300e-6, e_p_mpa: 195_000.0, e_cm_mpa: 33_000.0, delta_sigma_pr_mpa: 40.0, phi, sigma_c_mpa, a_p_over_a_c: 0.001, eccentricity,
        }.delta_sigma_mpa();
        prop_assert!(combined(stress) <= combined(stress + more));
        let nl = |sigma| en1992::creep::phi_nl(phi, sigma, 20.0).expect("covered");
        prop_assert!(nl(stress) <= nl(stress + more));
        let aci = |stress| aci423::elastic::cr_unbonded(1.6, 28.5e6, 4e6, stress);
        prop_assert!(aci(stress) <= aci(stress + more));
        let bs = |stress| bs8110::concrete::shortening(0.5, 195_000.0, 26_000.0, stress);
        prop_assert!(bs(stress) <= bs(stress + more));
        let standard = |stress| as3600::creep::loss(195_000.0, phi, stress, 30_000.0);
        prop_assert!(standard(stress) <= standard(stress + more));
    }

    #[test]
    fn units_go_there_and_back(number in 1e-6..1e9_f64) {
        let whole = |back: f64| (back / number - 1.0).abs() <= 1e-12;
        prop_assert!(whole(units::mpa(units::psi(number))) && whole(units::psi(units::mpa(number))));
        prop_assert!(whole(units::mm(units::inches(number))) && whole(units::inches(units::mm(number))));
    }
}

#[test]
fn no_formula_jumps_where_it_changes_branch() {
    let n = Cement::N;
    no_jump("phi, f_ck", (12.0, 90.0), 20_000, |x| {
        phi(x, 50.0, 200.0, 7.0, n, 3000.0)
    });
    no_jump("phi, RH", (40.0, 100.0), 20_000, |x| {
        phi(30.0, x, 900.0, 7.0, n, 3000.0)
    });
    no_jump("phi, h_0", (100.0, 2000.0), 20_000, |x| {
        phi(30.0, 80.0, x, 7.0, n, 3000.0)
    });
    for &cement in Cement::ALL {
        no_jump("phi, t_0", (0.2, 60.0), 20_000, |x| {
            phi(30.0, 50.0, 200.0, x, cement, 3000.0)
        });
        no_jump("eps_cs, h_0", (100.0, 900.0), 20_000, |x| {
            eps_cs(30.0, 50.0, x, cement, 3000.0)
        });
    }
    no_jump("phi, stress", (0.0, 20.0), 20_000, |x| {
        en1992::creep::phi_nl(2.0, x, 20.0).ok()
    });
    no_jump("eps_cs, t", (0.0, 9000.0), 20_000, |x| {
        eps_cs(30.0, 50.0, 200.0, n, x)
    });
    no_jump("phi_cc, f'c", (20.0, 100.0), 20_000, |x| {
        phi_cc(x, 200.0, 0.6, 7.0, 2.0, 3000.0)
    });
    no_jump("phi_cc, stress", (0.0, 20.0), 20_000, |x| {
        phi_cc(32.0, 200.0, 0.6, 7.0, x, 3000.0)
    });
    no_jump("eps_cs of AS 3600, f'c", (20.0, 100.0), 20_000, |x| {
        eps_cs_as(x, 200.0, 0.6, 3000.0)
    });
    no_jump("eps_cs of AS 3600, t_h", (50.0, 400.0), 20_000, |x| {
        eps_cs_as(32.0, x, 0.6, 3000.0)
    });
    no_jump("K_sh", (1.0, 60.0), 20_000, |x| {
        aci423::shrinkage::k_sh(x).ok()
    });
    for class in [RelaxationClass::Low, RelaxationClass::Ordinary] {
        no_jump("C", (0.60, 0.75), 20_000, |x| {
            aci423::relaxation::c(class, x).ok()
        });
        no_jump("relaxation", (0.6, 0.8), 20_000, |x| {
            bs8110::relaxation::loss_1000h(class, x).ok()
        });
    }
    no_jump("creep", (3.0, 28.0), 20_000, |x| {
        bs8110::concrete::creep_coefficient(x).ok()
    });
    no_jump("f_cmi", (20.0, 100.0), 20_000, |x| {
        as3600::concrete::f_cmi(x).ok()
    });
}

/// The modulus of AS 3600 changes branch at 40 MPa: its own jump there is 0.1 %.
#[test]
fn the_modulus_of_as_3600_jumps_no_more_than_its_own_branches() {
    let below = as3600::concrete::e_cj(40.0).expect("covered");
    let above = as3600::concrete::e_cj(40.0 + 1e-9).expect("covered");
    assert!((above / below - 1.0).abs() < 2e-3, "{below} {above}");
}

#[test]
fn what_a_clause_does_not_cover_names_the_clause() {
    use en1992::{concrete, creep, relaxation, shrinkage};
    let low = RelaxationClass::Low;
    for (refused, clause) in [
        (concrete::f_cm(11.9).err(), "table 3.1"),
        (concrete::f_cm(90.1).err(), "table 3.1"),
        (concrete::f_cm(f64::NAN).err(), "table 3.1"),
        (creep::phi_rh(39.0, 200.0, 38.0).err(), "3.1.4(2)"),
        (shrinkage::beta_rh(100.1).err(), "3.1.4(2)"),
        (shrinkage::k_h(99.0).err(), "table 3.3"),
        (creep::t_0_adjusted(0.0, Cement::R).err(), "(B.9)"),
        (creep::beta_c(6.0, 7.0, 500.0).err(), "(B.7)"),
        (creep::phi_nl(2.0, 21.0, 20.0).err(), "(3.7)"),
        (
            relaxation::delta_sigma_pr(low, 2.5, 1.1, 1000.0).err(),
            "3.3.2(7)",
        ),
        (
            relaxation::delta_sigma_pr(low, 2.5, 0.7, 500_001.0).err(),
            "3.3.2(8)",
        ),
        (aci423::shrinkage::k_sh(0.9).err(), "table 1"),
        (aci423::shrinkage::k_sh(60.1).err(), "table 1"),
        (aci423::shrinkage::sh(0.85, 28.5e6, 17.0, 70.0).err(), "SH"),
        (aci423::relaxation::c(low, 0.59).err(), "table 3"),
        (
            aci423::relaxation::c(RelaxationClass::Ordinary, 0.76).err(),
            "table 3",
        ),
        (aci423::relaxation::k_re_and_j(low, 256.7).err(), "table 2"),
        (
            aci423::relaxation::k_re_and_j(RelaxationClass::Bar, 270.0).err(),
            "table 2",
        ),
        (bs8110::relaxation::loss_1000h(low, 0.59).err(), "4.8.2"),
        (bs8110::concrete::creep_coefficient(29.0).err(), "4.8.5"),
        (
            bs8110::concrete::creep(1.8, 9.0, 25.0, 195e3, 26e3).err(),
            "4.8.5",
        ),
        (bs8110::concrete::e_c_28(15.0).err(), "table 7.2"),
        (as3600::creep::phi_cc_b(19.0).err(), "table 3.1.8.2"),
        (as3600::creep::k_2(100.0, 401.0).err(), "3.1.8.3"),
        (as3600::creep::k_3(0.5).err(), "3.1.8.3"),
        (as3600::shrinkage::eps_cse_final(101.0).err(), "3.1.1.1"),
        (as3600::relaxation::k_4(0.5).err(), "3.3.4.3"),
    ] {
        let refused = refused.unwrap_or_else(|| panic!("{clause}: nothing was refused"));
        assert!(refused.to_string().contains(clause), "{refused}");
    }
}
