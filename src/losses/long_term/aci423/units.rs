//! The method is published in psi and inches: to and from MPa and mm, here and nowhere else.

/// Megapascals in one pound-force per square inch: 4.4482216152605 N over 645.16 mm².
const PSI_MPA: f64 = 4.448_221_615_260_5 / 645.16;

/// Millimetres in one inch, exactly.
const INCH_MM: f64 = 25.4;

/// MPa as psi.
pub fn psi(mpa: f64) -> f64 {
    mpa / PSI_MPA
}

/// psi as MPa.
pub fn mpa(psi: f64) -> f64 {
    psi * PSI_MPA
}

/// mm as inches.
pub fn inches(mm: f64) -> f64 {
    mm / INCH_MM
}

/// Inches as mm.
pub fn mm(inches: f64) -> f64 {
    inches * INCH_MM
}
