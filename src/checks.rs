//! The rules: one rule, one documented name, grouped by what they look at.
