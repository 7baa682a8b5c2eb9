//! BS 8110-1:1997.

use tautplan::job::Environment::Interior;
use tautplan::job::RelaxationClass::Ordinary;
use tautplan::losses::long_term::bs8110::{concrete, relaxation};

use crate::{near, rounds_to};

/// Teaching sheet "pre-tensioned losses": class 1, 1000-hour relaxation 8 % at 0.7 of strength, × 1.5 for pretensioning; 300e-6 ×
/// 200 000 N/mm² × 1023 mm²; modular ratio 8 at 12.7 N/mm².
#[test]
fn losses_of_the_teaching_sheet() {
    let loss_1000h = relaxation::loss_1000h(Ordinary, 0.7).expect("covered");
    // The sheet's factor is that of a pretensioned tendon; the clause's product is the same.
    near(relaxation::relaxation(loss_1000h, 1.5), 0.12, 1e-12);
    let strain = concrete::shrinkage_strain(Interior);
    let kn = concrete::shrinkage(strain, 200_000.0) * 1023.0 / 1000.0;
    rounds_to(kn, 61.4, 0.1);
    near(concrete::modular_stress(8.0, 1.0, 12.7), 101.6, 1e-12);
    near(concrete::shortening(0.5, 8.0, 1.0, 12.7), 50.8, 1e-12);
}
