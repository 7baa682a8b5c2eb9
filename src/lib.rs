//! tautplan.
