//! tautplan reads a post-tensioned floor's tendon layout from DXF, rebuilds every tendon in space, works out the
//! force that is left in it at every point, checks the whole floor, and gives the same drawing back with the answers
//! drawn on it.
//!
//! ```text
//!  tautplan.toml ─▶ job ────┐
//!                           ├─▶ floor ─▶ [ each tendon: profile ─▶ losses ] ─▶ checks ─▶ analysis ─┬─▶ report
//!  plan.dxf ─────▶ drawing ─┘                                                                      └─▶ annotate ─▶ drawing
//!  leaves that every stage may use: units · geometry · numerics · finding · cautions · patterns
//! ```
//!
//! Each stage takes one plain value and returns one, with the findings met on the way; nothing runs back to the left.
//!
//! # Units, axes, signs
//! Metre, kilonewton, megapascal, radian, day; a name that holds a number says its unit (`station_m`, `force_kn`).
//! In plan, x and y are the drawing's, turned into metres. Levels are metres above the top of the general slab, so the
//! strand's level is negative; heights are above the local soffit. Stations run along the plan line from its first
//! drawn vertex. Tension in the strand, compression and shortening in the concrete are positive.
//!
//! A tautplan result is a check of a drawing, not a design certificate: the licensed engineer decides, under the local code.

pub mod cautions;
pub mod finding;
pub mod geometry;
pub mod numerics;
pub mod patterns;
pub mod units;

pub mod job;

pub mod drawing;

pub mod floor;

pub mod profile;

pub mod losses;

pub mod checks;

pub mod analysis;

pub mod annotate;
pub mod report;

pub mod cli;
pub mod commands;
pub mod terminal;
