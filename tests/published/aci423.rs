//! The ACI-ASCE 423 method; computed independently with numpy, no publisher.

use tautplan::job::RelaxationClass::Low;
use tautplan::losses::long_term::aci423::{elastic, relaxation, shrinkage};

use crate::{near, rounds_to};

/// An unbonded tendon, in psi: Es 28.5e6, f'ci 3000, f'c 5000, fcpa 200, 3 days from curing to stressing, V/S 4.0 in, RH 70, low
/// relaxation, fpi/fpu 0.75.
#[test]
fn losses_of_an_unbonded_tendon() {
    let e_s = 28.5e6;
    let (e_ci, e_c) = (
        elastic::e_c(3000.0).expect("covered"),
        elastic::e_c(5000.0).expect("covered"),
    );
    let es = elastic::es_unbonded(elastic::K_ES, e_s, e_ci, 200.0);
    let cr = elastic::cr_unbonded(elastic::K_CR, e_s, e_c, 200.0);
    let k_sh = shrinkage::k_sh(3.0).expect("covered");
    near(k_sh, 0.85, 1e-12);
    let sh = shrinkage::sh(k_sh, e_s, 4.0, 70.0).expect("covered");
    let (k_re, j) = relaxation::k_re_and_j(Low, 270.0).expect("covered");
    let c = relaxation::c(Low, 0.75).expect("covered");
    near(c, 1.0, 1e-12);
    let re = relaxation::re(k_re, j, sh, cr, es, c);
    for (found, computed) in [(es, 912.9), (cr, 2262.7), (sh, 4529.1), (re, 4691.8)] {
        rounds_to(found, computed, 0.1);
    }
    // A bonded tendon without eccentricity loses the same.
    let f_cir = elastic::f_cir(elastic::K_CIR, 200.0, 0.0);
    near(
        elastic::es_bonded(elastic::K_ES, e_s, e_ci, f_cir),
        es,
        1e-12,
    );
    near(
        elastic::cr_bonded(elastic::K_CR, e_s, e_c, f_cir, 0.0),
        cr,
        1e-12,
    );
}
