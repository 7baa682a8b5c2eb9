//! What each method quotes from memory, in words: for the result's list of assumptions and for README.

use crate::job::LongTermMethod;

/// What a method, its stress limits included, quotes from memory; `None` where there is nothing.
pub fn recalled(method: LongTermMethod) -> Option<&'static str> {
    match method {
        LongTermMethod::Direct => None,
        LongTermMethod::En1992 => {
            Some("creep under high stress (3.7), the service limit of 7.2(5)")
        }
        LongTermMethod::Aci423 => Some(
            "K_cir, K_cr, the table of K_sh, of the table of C everything for stress-relieved strand and below 0.64, the \
             modulus of concrete (ACI 318-19 19.2.2.1(b)), the stress limits of ACI 318-19 20.3.2.5.1",
        ),
        LongTermMethod::Bs8110 => Some(
            "relaxation at 1000 hours, half the elastic shortening, shrinkage, the creep coefficient with its ages and its \
             limit of stress, the modulus (BS 8110-2 7.2), the stress limits of 4.7.1; cube strength from cylinder strength \
             (EN 206-1)",
        ),
        LongTermMethod::As3600 => Some(
            "mean strengths and moduli (3.1.2), the range of t_h, the two larger basic drying strains, elastic shortening \
             (3.4.2.3), the losses of 3.4.3, k_4 of relaxation (3.3.4.3), the jacking limit of 17.3.4.6",
        ),
    }
}
